//! Other models, other choices, and how much more data an answer wants, in words.

use super::number::{counted, month, people};
use crate::findings::SeriesFinding;
use crate::terms::{
    Adjusted, Answer, Choice, ChoiceKind, ChoiceSpan, Model, ModelFit, Verdict, WhyNoModel,
};

/// A model's name in a sentence.
#[must_use]
pub fn model(model: Model) -> &'static str {
    match model {
        Model::Constant => "no trend",
        Model::FirstOrder => "one rate",
        Model::Plateau => "decay to a plateau",
        Model::TwoRates => "two rates",
    }
}

/// What a model says of the data.
#[must_use]
pub fn model_meaning(model: Model) -> &'static str {
    match model {
        Model::Constant => "A model without any change over time. It is shown and never preferred.",
        Model::FirstOrder => "One first-order rate over the whole window.",
        Model::Plateau => "Decay to a level that stays.",
        Model::TwoRates => "One rate until a break, another after it.",
    }
}

/// Why a model is not offered.
#[must_use]
pub fn why_no_model(why: WhyNoModel) -> &'static str {
    match why {
        WhyNoModel::TooFewDates => "too few dates for its parameters",
        WhyNoModel::TooFewDetects => "measured values on too few dates",
        WhyNoModel::NotFalling => "the record does not fall",
        WhyNoModel::OtherBend => "the record bends the other way",
        WhyNoModel::NoPlateau => "a plateau cannot be told from zero",
        WhyNoModel::NoRoom => "no break leaves enough dates and time on both sides",
        WhyNoModel::NotConverged => "the search did not arrive",
    }
}

/// That a better model denies the straight line's date.
#[must_use]
pub fn denial(series: &SeriesFinding) -> Option<String> {
    if !series.alternative_denies {
        return None;
    }
    let code = series.alternative_model?;
    let named = Model::from_code(code).map_or(code, model);
    let says = match series.alternative_date {
        None if code == Model::TwoRates.code() => {
            "does not meet the limit and stay there".to_owned()
        }
        None => "never meets the limit".to_owned(),
        Some(date) => format!("meets it about {}, after the goal", month(date)),
    };
    let plateau =
        series.models.iter().find_map(|fit| fit.plateau.filter(|_| fit.model.code() == code));
    let level = plateau.map_or_else(String::new, |level| {
        format!(", levelling off at about {} {}", people(level), series.unit.label())
    });
    Some(format!("{named} describes the data better and {says}{level}"))
}

/// One model on the same data: its criterion, and when it meets the limit or why it is not offered.
#[must_use]
pub fn model_line(fit: &ModelFit, unit: &str) -> String {
    if let Some(why) = fit.why_not {
        return format!("not offered: {}", why_no_model(why));
    }
    let aicc =
        fit.aicc.map_or_else(|| "no AICc".to_owned(), |aicc| format!("AICc {}", people(aicc)));
    let extra = match (fit.plateau, fit.break_date) {
        (Some(level), _) => format!("; levels off at {} {unit}", people(level)),
        (None, Some(date)) => format!("; the rate changes about {}", month(date)),
        (None, None) => String::new(),
    };
    let meets = match fit.meets_limit {
        Some(date) => format!("; meets the limit about {}", month(date)),
        None if fit.model == Model::Constant => String::new(),
        None => "; no date at which it meets the limit".to_owned(),
    };
    format!("{aicc}{extra}{meets}")
}

/// The kind of a choice, for a table.
#[must_use]
pub fn choice_kind(kind: ChoiceKind) -> &'static str {
    match kind {
        ChoiceKind::WindowStart => "fit begins later",
        ChoiceKind::DateLeftOut => "one date left out",
        ChoiceKind::HighestLeftOut => "highest value left out",
        ChoiceKind::NonDetectsAtLimit => "non-detects at their limit",
        ChoiceKind::NonDetectsAtHalf => "non-detects at half their limit",
        ChoiceKind::EstimatedOut => "estimated results left out",
        ChoiceKind::DuplicatesAveraged => "duplicates averaged in",
        ChoiceKind::SinceEvent => "fit since an event",
    }
}

/// The span of what reruns of one kind say.
#[must_use]
pub fn span(span: &ChoiceSpan) -> String {
    let rates = span.rates.map_or_else(
        || "no rate".to_owned(),
        |(low, high)| {
            if low.total_cmp(&high).is_eq() {
                format!("rate {}", people(low))
            } else {
                format!("rate {} to {}", people(low), people(high))
            }
        },
    );
    let dates = match span.dates {
        Some((first, last)) if month(first) == month(last) => format!("; date {}", month(first)),
        Some((first, last)) => format!("; date {} to {}", month(first), month(last)),
        None => String::new(),
    };
    let without = match (span.dates, span.without_date) {
        (_, 0) => String::new(),
        (None, _) => "; no date".to_owned(),
        (Some(_), n) => format!("; {n} without a date"),
    };
    let verdicts: Vec<&str> = span.verdicts.iter().map(|verdict| verdict.code()).collect();
    let reruns = counted(span.reruns, "rerun", "reruns");
    format!("{rates}{dates}{without}; {} ({reruns})", verdicts.join(", "))
}

/// The choice that matters most, as a clause: `without 2025-05 the verdict is attenuating`.
#[must_use]
pub fn most_telling(choice: &Choice, verdict: Verdict) -> String {
    let date = choice.date.map_or_else(String::new, |date| date.to_string());
    let lead = match choice.kind {
        ChoiceKind::WindowStart => format!("begun on {date}"),
        ChoiceKind::DateLeftOut => format!("without {date}"),
        ChoiceKind::HighestLeftOut => "without the highest value".to_owned(),
        ChoiceKind::NonDetectsAtLimit => "with non-detects at their limit".to_owned(),
        ChoiceKind::NonDetectsAtHalf => "with non-detects at half their limit".to_owned(),
        ChoiceKind::EstimatedOut => "without estimated results".to_owned(),
        ChoiceKind::DuplicatesAveraged => "with duplicates averaged in".to_owned(),
        ChoiceKind::SinceEvent => format!("since the event of {date}"),
    };
    format!("{lead} {}", answer(&choice.answer, verdict))
}

fn answer(answer: &Answer, verdict: Verdict) -> String {
    let rate = answer.rate.map_or_else(
        || "no rate".to_owned(),
        |rate| format!("the rate is {} a year", people(rate)),
    );
    let date = answer.reach.map_or_else(
        || "there is no date".to_owned(),
        |date| format!("the date is {}", month(date)),
    );
    if answer.verdict == verdict {
        format!("{rate} and {date}")
    } else {
        format!("the verdict is {}: {rate}, {date}", answer.verdict.code())
    }
}

/// The rate's interval with correlation allowed for.
#[must_use]
pub fn adjusted(adjusted: &Adjusted) -> String {
    let verdict = if adjusted.changes_verdict { "; the verdict would be another" } else { "" };
    format!(
        "{} to {} a year with neighbouring residuals' resemblance allowed for (correlation {} a \
         year apart){verdict}",
        people(adjusted.rate_lower),
        people(adjusted.rate_upper),
        people(adjusted.phi)
    )
}

/// How many more rounds would settle the rate; the caution with it.
#[must_use]
pub fn more_rounds(series: &SeriesFinding) -> Vec<(&'static str, String)> {
    let rounds = &series.more_rounds;
    let count = |n: Option<usize>| n.map(|n| n.to_string());
    let decided = |n: Option<usize>| match n {
        Some(0) => Some("none: the rate's interval excludes zero already".to_owned()),
        other => count(other),
    };
    let mut rows = Vec::new();
    let mut row = |name, text: Option<String>| {
        if let Some(text) = text {
            rows.push((name, text));
        }
    };
    row("rounds to a decisive rate", decided(rounds.decisive));
    if rounds.decisive != Some(0) {
        row("with two rounds a year", count(rounds.decisive_half_yearly));
    }
    let level = match rounds.level {
        Some(0) => Some("none: its interval excludes the limit already".to_owned()),
        other => count(other),
    };
    row("rounds to tell the level from the limit", level);
    row("rounds to show the required rate", count(rounds.at_required_rate));
    row(
        "smallest rate this record could show",
        rounds.smallest_rate_shown.map(|rate| format!("{} a year", people(rate))),
    );
    rows
}

/// What every count of rounds rests on.
pub const ROUNDS_CAUTION: &str = "Rounds are counted at 80 % power and the present scatter; \
                                  correlated results and non-detects raise the number.";
