//! The time axis: true time, ticks at 1 January, thinned over long spans; months over short ones.

use chrono::{Datelike, Days, NaiveDate};

use crate::findings::SeriesFinding;
use crate::terms::Span;

/// Labels at most.
const MOST_LABELS: i32 = 12;
/// Years under which months are labelled.
const MONTHS_UNDER_YEARS: f64 = 2.5;
/// How far a projection is shown after the last date, in record lengths.
const MOST_AHEAD: u64 = 2;
/// The shortest record length that a projection is measured by, in days.
const SHORTEST_RECORD: u64 = 90;

/// One tick.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Tick {
    /// Its date.
    pub date: NaiveDate,
    /// Its label; none for a small tick.
    pub label: Option<String>,
}

/// The dates the axis shows: every value, and the projection as far as it helps.
///
/// To the late end of the reach interval, but at most twice the record's length after the last
/// date; if even its early end lies beyond that, half the record, since more would only flatten the
/// data.
#[must_use]
pub fn range(series: &SeriesFinding) -> Option<Span> {
    let first = series.values.first()?.date;
    let last = series.values.last()?.date;
    let record = last.signed_duration_since(first).num_days().unsigned_abs().max(SHORTEST_RECORD);
    // Dates have four-digit years and the calendar six, so three records fit behind any of them.
    let cap = last + Days::new(MOST_AHEAD * record);
    let date = series.reach_date.or(series.exceed_date);
    let early = series.reach_earliest.or(series.exceed_earliest).or(date).or(series.reach_latest);
    let late = series.reach_latest.or(date).or(early);
    let end = match (early, late) {
        (Some(early), _) if early > cap => last + Days::new(record / 2),
        (_, Some(late)) => late.clamp(last, cap),
        _ => last,
    };
    let room = Days::new(record / 12 + 20);
    Some(Span { first: first - Days::new(record / 30 + 10), last: end + room })
}

/// The ticks inside a span.
#[must_use]
pub fn ticks(span: Span) -> Vec<Tick> {
    let years = span.years().0;
    let steps = if years < MONTHS_UNDER_YEARS { months(years) } else { yearly(years) };
    let mut ticks = Vec::new();
    for year in span.first.year()..=span.last.year() {
        for month in 1..=12 {
            let Some(date) = NaiveDate::from_ymd_opt(year, month, 1) else { continue };
            if date < span.first || date > span.last {
                continue;
            }
            if let Some(label) = steps.at(year, month) {
                ticks.push(Tick { date, label });
            }
        }
    }
    ticks
}

/// Which months carry a tick and which of them a label.
enum Steps {
    /// A tick a month, a label every so many.
    Months(u32),
    /// A label every so many years; small ticks every so many months.
    Years { labels: i32, small: u32 },
}

impl Steps {
    /// Outer: whether there is a tick; inner: whether it has a label.
    fn at(&self, year: i32, month: u32) -> Option<Option<String>> {
        match *self {
            Self::Months(step) => {
                Some(((month - 1).is_multiple_of(step)).then(|| format!("{year:04}-{month:02}")))
            }
            Self::Years { labels, small } => {
                let labelled = month == 1 && year.rem_euclid(labels) == 0;
                let ticked = small > 0 && (month - 1).is_multiple_of(small);
                (labelled || ticked).then(|| labelled.then(|| format!("{year:04}")))
            }
        }
    }
}

fn months(years: f64) -> Steps {
    let fits = |step: &u32| years * 12.0 / f64::from(*step) <= f64::from(MOST_LABELS);
    Steps::Months([1, 2, 3, 6].into_iter().find(fits).unwrap_or(6))
}

fn yearly(years: f64) -> Steps {
    let fits = |step: &i32| years / f64::from(*step) <= f64::from(MOST_LABELS);
    let labels = [1, 2, 5, 10, 20, 50, 100, 200, 500].into_iter().find(fits).unwrap_or(1000);
    let small = match labels {
        1 => 3,
        2 | 5 => 12,
        _ => 0,
    };
    Steps::Years { labels, small }
}
