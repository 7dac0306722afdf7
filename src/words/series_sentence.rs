//! What one series says, in one sentence or a few: trend, level against limit, date or why none.

use chrono::NaiveDate;

use super::number::{confidence, counted, month, people, people_beside, percent, table};
use super::reason;
use crate::findings::SeriesFinding;
use crate::terms::{Pace, PerYear, Verdict, WhyNoDate};

/// The sentence of a series at the two-sided confidence in force.
#[must_use]
pub fn series_sentence(series: &SeriesFinding, level: f64) -> String {
    // What denies a date is told before the date.
    let denial = super::doubt::denial(series).map(|text| {
        let mut letters = text.chars();
        let first = letters.next().map(|letter| letter.to_uppercase().to_string());
        format!("{}{}.", first.unwrap_or_default(), letters.as_str())
    });
    let parts = [trend(series, level), now(series), denial, date(series), goal(series)];
    parts.into_iter().flatten().collect::<Vec<_>>().join(" ")
}

/// The trend with its rate and interval, or why there is no rate.
fn trend(series: &SeriesFinding, level: f64) -> Option<String> {
    if series.verdict == Verdict::Undetected {
        let dates = counted(series.samples, "date", "dates");
        return Some(format!("Never detected on {dates} in the window."));
    }
    let Some(rate) = rate(series, level) else {
        let dates = counted(series.samples, "date", "dates");
        return Some(match series.why_no_rate {
            Some(why) => {
                format!("No rate can be given because {} ({dates}).", reason::no_rate(why))
            }
            None => format!("No rate was fitted ({dates})."),
        });
    };
    let trend = match series.verdict {
        Verdict::Rising => "Concentrations rise",
        Verdict::Attenuating => "Concentrations fall",
        Verdict::Flat => "Concentrations stand still within the flat margin",
        Verdict::Below => "The series is below its limit",
        Verdict::Undecided | Verdict::TooFew | Verdict::Undetected => {
            "Neither a fall nor a rise is shown"
        }
    };
    Some(format!("{trend}: {rate}."))
}

/// The rate with its interval: `rate 0.13 a year (90 % interval 0.11 to 0.15), 12 % less each year`.
#[must_use]
pub fn rate(series: &SeriesFinding, level: f64) -> Option<String> {
    let rate = series.rate_per_year?;
    let yearly = yearly(series, rate).map_or_else(String::new, |text| format!(", {text}"));
    let (value, interval) = match (series.rate_lower, series.rate_upper) {
        (Some(low), Some(high)) => {
            let ends = format!("{} to {}", people(low.0), people(high.0));
            (people_beside(rate.0, low.0, high.0), format!("{} interval {ends}", confidence(level)))
        }
        _ => (people(rate.0), "no interval could be given".to_owned()),
    };
    Some(format!("rate {value} a year ({interval}){yearly}"))
}

/// The change a year in percent, only where the interval shows which way it goes.
fn yearly(series: &SeriesFinding, rate: PerYear) -> Option<String> {
    match (series.rate_lower, series.rate_upper) {
        (Some(low), _) if low.0 > 0.0 => {
            Some(format!("about {} less each year", percent(-(-rate.0).exp_m1())))
        }
        (_, Some(high)) if high.0 < 0.0 => {
            Some(format!("about {} more each year", percent((-rate.0).exp_m1())))
        }
        _ => None,
    }
}

/// The level now with its interval, against the limit; without a fit the last result.
fn now(series: &SeriesFinding) -> Option<String> {
    let when = series.sampled.map(|span| month(span.last))?;
    if let Some(level) = level(series) {
        let against = against_limit(series, series.level_now?);
        return Some(format!("The typical (median) level in {when} is {level}{against}."));
    }
    let last = series.last_result?;
    let against = series.limit.map_or_else(String::new, |limit| {
        let over = if last.exceeds(limit) { ", over the limit of" } else { "; the limit is" };
        format!("{over} {}", table(limit))
    });
    let unit = series.unit.label();
    Some(format!(
        "The last result, of {when}, is {} {unit}{against}.",
        super::number::reading(last)
    ))
}

/// The level with its interval and unit: `12 ug/L (9.1 to 16)`.
#[must_use]
pub fn level(series: &SeriesFinding) -> Option<String> {
    let level = series.level_now?;
    let interval = match (series.level_now_lower, series.level_now_upper) {
        (Some(low), Some(high)) => format!("{} to {}", people(low), people(high)),
        _ => "no interval could be given".to_owned(),
    };
    Some(format!("{} {} ({interval})", people(level), series.unit.label()))
}

/// How the level stands to the limit, in words.
fn against_limit(series: &SeriesFinding, level: f64) -> String {
    match series.limit {
        Some(limit) if level > limit => format!(", over the limit of {}", table(limit)),
        Some(limit) => format!(", at or under the limit of {}", table(limit)),
        None => String::new(),
    }
}

/// When the limit is met, with the interval and the mean's date, or why no date can be supported.
fn date(series: &SeriesFinding) -> Option<String> {
    if let Some(reach) = series.reach_date {
        let main = reach_text(series, reach);
        let mean = match series.reach_date_mean {
            Some(_) if series.beyond_horizon => String::new(),
            Some(mean) => format!(
                "; the arithmetic mean, for which no interval is computed, about {}",
                month(mean)
            ),
            None => String::new(),
        };
        let meets = meets(series);
        return Some(format!("The typical (median) level {meets} the limit {main}{mean}."));
    }
    if series.verdict == Verdict::Rising && series.exceed_date.is_some() {
        return exceed(series);
    }
    match series.why_no_date? {
        // Nothing is left to say: the trend's sentence said it.
        WhyNoDate::Below => None,
        WhyNoDate::NoLimit => Some("No limit applies, so there is no date.".to_owned()),
        WhyNoDate::NoRate if series.why_no_rate.is_none() => None,
        why => {
            let bound = not_before(series).map_or_else(String::new, |bound| format!("; {bound}"));
            Some(format!("No date can be supported because {}{bound}.", reason::no_date(why)))
        }
    }
}

/// `meets`, or `met` where the reach date is not after the last used date.
#[must_use]
pub fn meets(series: &SeriesFinding) -> &'static str {
    match (series.reach_date, series.sampled) {
        (Some(reach), Some(span)) if reach <= span.last => "met",
        _ => "meets",
    }
}

/// Until when at least the limit is not met, where there is no date and that is known.
#[must_use]
pub fn not_before(series: &SeriesFinding) -> Option<String> {
    let earliest = series.reach_earliest.filter(|_| series.reach_date.is_none())?;
    Some(if series.earliest_beyond_horizon {
        "the limit is not met within the horizon".to_owned()
    } else {
        format!("the limit is not met before {}", month(earliest))
    })
}

/// The reach date with its ends as people read it: `about 2031-04 (2029-10 to 2033-02)`.
#[must_use]
pub fn reach(series: &SeriesFinding) -> Option<String> {
    series.reach_date.map(|reach| reach_text(series, reach))
}

fn reach_text(series: &SeriesFinding, reach: NaiveDate) -> String {
    let end = |date: Option<NaiveDate>, beyond: bool| match date {
        Some(_) if beyond => Some("beyond the horizon".to_owned()),
        other => other.map(month),
    };
    let early = end(series.reach_earliest, series.earliest_beyond_horizon);
    let late = end(series.reach_latest, series.latest_beyond_horizon);
    let interval = match (early, late) {
        (Some(early), Some(late)) if early == late => format!("both ends {early}"),
        (Some(early), Some(late)) => format!("{early} to {late}"),
        (Some(early), None) => format!("{early} at the earliest, no latest date"),
        (None, Some(late)) => format!("{late} at the latest, the early end lies before the record"),
        (None, None) => "neither end lies within the record or the calendar".to_owned(),
    };
    let date = if series.beyond_horizon {
        "beyond the horizon".to_owned()
    } else {
        format!("about {}", month(reach))
    };
    format!("{date} ({interval})")
}

/// When a rising line crosses its limit, as a sentence.
#[must_use]
pub fn exceed(series: &SeriesFinding) -> Option<String> {
    let crosses = crosses(series)?;
    Some(format!("If it goes on, the typical (median) level crosses the limit {crosses}."))
}

/// When a rising line crosses its limit: `about 2031-04 (2029-10 at the earliest)`.
#[must_use]
pub fn crosses(series: &SeriesFinding) -> Option<String> {
    let crossing = series.exceed_date?;
    let horizon = series.horizon;
    let beyond = |date: NaiveDate| horizon.is_some_and(|horizon| date > horizon);
    let early = series.exceed_earliest.map_or_else(
        || "no early end could be given".to_owned(),
        |early| match beyond(early) {
            true => "beyond the horizon at the earliest".to_owned(),
            false => format!("{} at the earliest", month(early)),
        },
    );
    Some(match (beyond(crossing), series.exceed_earliest.is_some_and(beyond)) {
        (true, true) => "beyond the horizon".to_owned(),
        (true, false) => format!("beyond the horizon ({early})"),
        (false, _) => format!("about {} ({early})", month(crossing)),
    })
}

/// The goal date, where there is a pace.
fn goal(series: &SeriesFinding) -> Option<String> {
    let goal = month(series.goal_date?);
    Some(match series.pace? {
        Pace::Ahead => format!("That is ahead of the goal, {goal}."),
        Pace::Behind => format!("That is behind the goal, {goal}."),
        Pace::Unclear => format!("Against the goal, {goal}, the pace is unclear."),
    })
}
