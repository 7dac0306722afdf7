//! One sentence a flag, with the figure that raised it and the threshold it crossed.

use super::flag::label;
use super::number::{iso, month, p_value, people, percent, table};
use super::reason;
use crate::terms::{Figure, Flag, FlagCode, Standing, WhyNoDate};

/// The flag's sentence: `one residual is too large for its neighbours (p 0.003, under 0.05)`.
#[must_use]
pub fn sentence(flag: &Flag) -> String {
    if flag.standing == Standing::NotAssessable {
        return not_assessable(flag);
    }
    match (&flag.figure, flag.threshold) {
        (Figure::Number(figure), Some(threshold)) => crossed(flag.code, *figure, threshold),
        (Figure::Number(figure), None) => counted(flag.code, *figure),
        (Figure::Date(date), _) => format!("{} ({})", bare(flag.code), month(*date)),
        (Figure::Word(word), _) => cased(flag.code, word),
        (Figure::Absent, _) => bare(flag.code).to_owned(),
    }
}

/// What is said of a test that could not be made; it is never "passed".
#[must_use]
pub fn not_assessable(flag: &Flag) -> String {
    format!("{}: not assessable with these data, which is not the same as passed", label(flag.code))
}

/// The figure as flags.csv and pages write it; empty where there is none.
#[must_use]
pub fn figure(flag: &Flag) -> String {
    match &flag.figure {
        Figure::Number(figure) => table(*figure),
        Figure::Date(date) => iso(*date),
        Figure::Word(word) => (*word).to_owned(),
        Figure::Absent => String::new(),
    }
}

/// A word that says which case it is.
fn cased(code: FlagCode, word: &str) -> String {
    match (code, WhyNoDate::from_code(word)) {
        (FlagCode::DateWithheld, Some(why)) => {
            format!("no date is given because {}", reason::no_date(why))
        }
        (FlagCode::Unbounded, _) => format!("the date's interval has no {word} end"),
        _ => format!("{} ({word})", bare(code)),
    }
}

/// A number beside its threshold.
fn crossed(code: FlagCode, figure: f64, threshold: f64) -> String {
    let (f, t) = (people(figure), table(threshold));
    let (p, share, over) = (p_value(figure), percent(figure), percent(threshold));
    match code {
        FlagCode::FewDates => format!("{f} dates in the window, under the {t} a date needs"),
        FlagCode::FewDetects => format!("{f} measured values, under the {t} a date needs"),
        FlagCode::ShortRecord => format!("the record covers {f} years, under {t}"),
        FlagCode::MostlyNonDetects => format!("{share} of the dates are non-detects, over {over}"),
        FlagCode::FallingReportingLimits => {
            format!("the reporting limits of non-detects fall over the record ({p}, under {t})")
        }
        FlagCode::UninformativeNonDetects => {
            format!(
                "{share} of the non-detects lie far above the line and add nothing, over {over}"
            )
        }
        FlagCode::LowResultsLost => {
            format!(
                "{share} of the results were zero or negative and are lost (no date over {over})"
            )
        }
        FlagCode::EstimatedResults => format!("{share} of the detects are estimated, over {over}"),
        FlagCode::Stale => format!("the last used date is {f} years old, over {t}"),
        FlagCode::Gap => {
            format!("the longest gap between two dates is {f} years, over {}", people(threshold))
        }
        // Near the reporting limit the difference is told in multiples of it.
        FlagCode::DuplicatesDiffer if threshold <= 1.0 => format!(
            "a duplicate differs from its parent by {f} times the reporting limit, over {t}"
        ),
        FlagCode::DuplicatesDiffer => {
            format!("a duplicate differs from its parent by {f} %, over {t} %")
        }
        FlagCode::UnitSlip if figure < 1.0 => format!(
            "a value is the median of its neighbours divided by {}: a unit may have slipped",
            people(1.0 / figure)
        ),
        FlagCode::UnitSlip => {
            format!("a value is {f} times the median of its neighbours: a unit may have slipped")
        }
        FlagCode::ReportingLimitAboveLimit => {
            format!("non-detects with a reporting limit over the limit of {t}: {f}")
        }
        FlagCode::BeyondHorizon => {
            format!("the date lies {f} years ahead, beyond the {t} of the horizon")
        }
        FlagCode::CopiedValues => format!("{f} equal values follow one another, {t} or more"),
        FlagCode::WideScatter => {
            format!(
                "residuals of ln C scatter by {f}, over {} (a factor of two)",
                people(threshold)
            )
        }
        FlagCode::Outlier => {
            format!("one residual is too large for its neighbours ({p}, under {t})")
        }
        FlagCode::InfluentialPoint => {
            format!("one date decides the answer (Cook's distance {f}, over {t})")
        }
        FlagCode::NotNormal => format!("the residuals are not normal ({p}, under {t})"),
        FlagCode::Autocorrelated => {
            format!("residuals follow one another (correlation {f} a year apart, p under {t})")
        }
        FlagCode::Seasonal => {
            format!("residuals differ between the quarters of the year ({p}, under {t})")
        }
        FlagCode::Slowing => format!("the change slows down ({p}, under {t})"),
        FlagCode::Quickening => format!("the change speeds up ({p}, under {t})"),
        FlagCode::TwoRates => {
            format!("two rates describe the data better than one (AICc lower by {f}, over {t})")
        }
        FlagCode::LevelsOff => {
            format!("the fall levels off at about {f}, where the limit is {t}")
        }
        FlagCode::TestsDisagree => {
            format!("the rate's interval and Kendall's test disagree (Kendall {p}, level {t})")
        }
        FlagCode::FarExtrapolation => {
            format!("the date lies {f} years ahead, over the record's {} years", people(threshold))
        }
        FlagCode::SlowerThanDecay => {
            format!(
                "the upper end of the rate, {f} a year, lies under the decay constant {}",
                people(threshold)
            )
        }
        _ => format!("{} ({f}, threshold {t})", bare(code)),
    }
}

/// A number that has no threshold: a count, mostly.
fn counted(code: FlagCode, figure: f64) -> String {
    let f = people(figure);
    match code {
        FlagCode::ReportingLimitAboveLimit => {
            format!(
                "non-detects with a reporting limit over the limit: {f}; they show nothing about it"
            )
        }
        FlagCode::EstimatedRecensored => {
            format!("detects under their reporting limit taken as non-detects at it: {f}")
        }
        FlagCode::Substituted => format!("non-detects replaced by a number: {f}"),
        FlagCode::LowResultsLost => {
            format!("{} of the results were zero or negative and are lost", percent(figure))
        }
        FlagCode::DuplicatesDiffer => format!("a duplicate differs from its parent by {f} %"),
        FlagCode::LevelsOff => format!("the fall levels off at about {f}"),
        FlagCode::ResultsDenyLine => {
            format!("the line is under the limit, but of the last 4 dates {f} do not show it met")
        }
        _ => format!("{} ({f})", bare(code)),
    }
}

/// The sentence without a figure.
fn bare(code: FlagCode) -> &'static str {
    match code {
        FlagCode::DateWithheld => "no date is given for want of data",
        FlagCode::ReportingLimitAboveLimit => "non-detects have reporting limits over the limit",
        FlagCode::DuplicatesDiffer => {
            "a duplicate differs from its parent by more than the criterion"
        }
        FlagCode::ResultsDenyLine => {
            "the line is under the limit, but the last results do not show it"
        }
        FlagCode::InfluentialPoint => "leaving out one date moves the answer outside its interval",
        FlagCode::WindowMovesDate => "the choice of where the fit begins moves the date",
        FlagCode::TestsDisagree => "the rate's interval and Kendall's test disagree",
        FlagCode::Unbounded => "an end of the date's interval does not exist",
        FlagCode::NotLocated => "the data do not locate the date at all",
        FlagCode::BeyondHorizon => "the date lies beyond the horizon",
        FlagCode::BeyondCalendar => "the date would lie after the year 9999",
        FlagCode::Receding => "the date keeps moving later",
        FlagCode::HistoryChanged => "a result of an earlier delivery changed or vanished",
        FlagCode::DaughterAboveLimit => "a daughter of this analyte exceeds its limit at this well",
        FlagCode::UnitSlip => "a value is about a thousand times its neighbours, or a thousandth",
        FlagCode::Outlier => "one residual is too large for its neighbours",
        other => label(other),
    }
}
