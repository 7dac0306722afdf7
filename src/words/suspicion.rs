//! What is suspected on arrival: a label, what it means, what to do, and one sentence each.

use super::clean::shown;
use super::number::{count, counted, iso, people, table};
use super::round;
use crate::findings::Arrival;
use crate::ledger::told::Suspicion;
use crate::series::Sentinel;
use crate::series::sentinels::Scope;

/// What it is called, as the beginning of a line.
#[must_use]
pub fn label(kind: Suspicion) -> &'static str {
    match kind {
        Suspicion::UnitSlip => "unit slip of 1,000 suspected",
        Suspicion::DayMonth => "day and month change places within a file",
        Suspicion::WellsSwapped => "two wells' values exchanged, suspected",
        Suspicion::HalfLimit => "non-detects replaced by half their limit, suspected",
        Suspicion::EqualBatch => "every value of a batch equal",
        Suspicion::OutsideLife => "sampled outside the site's life",
        Suspicion::LimitOverLimit => "not detected, with a limit over the regulatory limit",
        Suspicion::MissingFromPanel => "an analyte missing while the rest of its panel is there",
    }
}

/// What the ledger's detail and the notes say of a record.
#[must_use]
pub fn detail(kind: Suspicion) -> &'static str {
    match kind {
        Suspicion::UnitSlip => "suspected: a unit slip of 1,000; used as it stands",
        Suspicion::DayMonth => "suspected: day and month exchanged; used as read",
        Suspicion::WellsSwapped => "suspected: exchanged with another well; used as it stands",
        Suspicion::HalfLimit => {
            "suspected: a non-detect that was replaced by half its limit; used as it stands"
        }
        Suspicion::EqualBatch => "suspected: one value filled down a batch; used as it stands",
        Suspicion::OutsideLife => "sampled outside the site's life (active-from, active-to); used",
        Suspicion::LimitOverLimit => {
            "not detected, with a limit over the regulatory limit: it cannot show that the limit is met"
        }
        Suspicion::MissingFromPanel => "an analyte of the panel is missing from this round",
    }
}

/// What it means, how it is found, and with which thresholds.
#[must_use]
pub fn meaning(kind: Suspicion) -> &'static str {
    match kind {
        Suspicion::UnitSlip => {
            "A result is 500 to 2,000 times the median of its series' two dates before and two after \
             (four nearest at an end), or as small, and at least four times as far away as the \
             series usually scatters. Where at least three quarters of what can be compared slips \
             the same way, the sample, the analyte of the file or the whole file is named."
        }
        Suspicion::DayMonth => {
            "Some dates of a file prove that the day stands first and others that the month does; or \
             three or more dates in a row lie over 21 days from every date that can be read one way \
             only, and with day and month exchanged within 7 days of one."
        }
        Suspicion::WellsSwapped => {
            "On one date the results of two wells lie at least four spreads off what their own \
             neighbouring dates lead to expect, and exchanged none lies over two spreads off; the \
             sum of squared distances falls by 30 or more. A suspicion, never a proof."
        }
        Suspicion::HalfLimit => {
            "At least four values under their limit, and at least four fifths of such values, are \
             exactly half of it: in a series, or over the short series of an analyte in a file."
        }
        Suspicion::EqualBatch => {
            "Every result of an analyte in a batch (same file and batch, else same file and date) is \
             the same measured value: at four wells or more with three significant digits, at six \
             with fewer."
        }
        Suspicion::OutsideLife => {
            "The sample date lies before the site file's active-from or after its active-to."
        }
        Suspicion::LimitOverLimit => {
            "A non-detect whose own limit is over the regulatory limit says nothing about it."
        }
        Suspicion::MissingFromPanel => {
            "An analyte has no record in a round in which every analyte of its panel has one. The \
             panel is what is reported together with it in at least half of the well's rounds (four \
             or more)."
        }
    }
}

/// Where the rule comes from.
#[must_use]
pub fn source(kind: Suspicion) -> &'static str {
    match kind {
        Suspicion::UnitSlip | Suspicion::EqualBatch => "common practice, no source",
        Suspicion::OutsideLife | Suspicion::LimitOverLimit | Suspicion::MissingFromPanel => {
            "this program's definition"
        }
        Suspicion::DayMonth | Suspicion::WellsSwapped | Suspicion::HalfLimit => {
            "this program's definition; thresholds by judgement"
        }
    }
}

/// What to do about it.
#[must_use]
pub fn step(kind: Suspicion) -> &'static str {
    match kind {
        Suspicion::UnitSlip => {
            "compare with the laboratory's report; if it is a slip, ask for a corrected file, or \
             exclude the records with a [[decision]]"
        }
        Suspicion::DayMonth => "ask for the file with dates as 2024-03-05",
        Suspicion::WellsSwapped => {
            "compare with the field sheet and the chain of custody before anything is changed"
        }
        Suspicion::HalfLimit => {
            "ask for the file as the laboratory reported it, non-detects with their limits"
        }
        Suspicion::EqualBatch => "compare with the laboratory's report",
        Suspicion::OutsideLife => "correct the date, or active-from and active-to under [site]",
        Suspicion::LimitOverLimit => "send them back to the laboratory for a lower limit",
        Suspicion::MissingFromPanel => "ask the laboratory for what is missing, or for the reason",
    }
}

/// One sentinel in a sentence: what it concerns, its figure, where its records stand.
#[must_use]
pub fn sentence(one: &Sentinel, arrival: &Arrival) -> String {
    let whose = whose(one, arrival);
    let what = match one.kind {
        Suspicion::UnitSlip => match (one.scope, one.figure) {
            (Scope::File | Scope::Analyte, Some(ratio)) => {
                format!("{}, about {} the other files", results(one), times(ratio))
            }
            (_, Some(ratio)) => format!("{} the dates around it", times(ratio)),
            (_, None) => results(one),
        },
        Suspicion::DayMonth => format!("{} against the order of the rest", results(one)),
        Suspicion::WellsSwapped => {
            format!("{} fit the other well's record and not their own", results(one))
        }
        Suspicion::HalfLimit => {
            let value = one.figure.map_or_else(String::new, |v| format!(", such as {}", table(v)));
            format!("{} at exactly half their limit{value}", results(one))
        }
        Suspicion::EqualBatch => {
            let value = one.figure.map_or_else(String::new, |v| format!(" {}", table(v)));
            format!("{}, all{value}", results(one))
        }
        Suspicion::OutsideLife => results(one),
        Suspicion::LimitOverLimit => {
            let limit = one.figure.map_or_else(String::new, |v| format!(", up to <{}", table(v)));
            format!("{}{limit}", results(one))
        }
        Suspicion::MissingFromPanel => {
            let beside = counted(one.records.len(), "other analyte is", "other analytes are");
            let of = one.date.map(|date| round::label(date, arrival.round)).unwrap_or_default();
            format!("missing from {of}, {beside} there")
        }
    };
    format!("{whose}: {what}{}", place(one, arrival))
}

/// Whom it concerns.
fn whose(one: &Sentinel, arrival: &Arrival) -> String {
    let mut parts: Vec<String> = Vec::new();
    if let Some(file) = one.file.filter(|_| matches!(one.scope, Scope::File | Scope::Analyte)) {
        parts.push(shown(arrival.file(file)));
    }
    if one.scope == Scope::Batch
        && let Some(file) = one.file
    {
        let batch = one.batch.as_ref().map_or_else(String::new, |b| format!(" batch {}", shown(b)));
        parts.push(format!("{}{batch}", shown(arrival.file(file))));
    }
    match (&one.well, &one.other_well) {
        (Some(a), Some(b)) => parts.push(format!("{} and {}", shown(a), shown(b))),
        (Some(well), None) => parts.push(shown(well)),
        _ => {}
    }
    parts.extend(one.analyte.as_ref().map(|analyte| shown(analyte)));
    if matches!(one.scope, Scope::Sample | Scope::Result | Scope::Batch | Scope::Wells)
        && one.kind != Suspicion::MissingFromPanel
    {
        parts.extend(one.date.map(iso));
    }
    parts.join(", ")
}

/// Where the first record stands.
fn place(one: &Sentinel, arrival: &Arrival) -> String {
    match one.records.first() {
        Some(first) => {
            let more = one.records.len() - 1;
            let more = if more == 0 { String::new() } else { format!(" and {more} more") };
            format!(" ({}{more})", shown(arrival.place(*first)))
        }
        None => String::new(),
    }
}

fn results(one: &Sentinel) -> String {
    counted(one.records.len(), "result", "results")
}

/// `1,040 times`, or `1/1,040 of`.
fn times(ratio: f64) -> String {
    // Three digits are enough of a ratio of about 1,000.
    let rounded = |times: f64| match people(times).parse::<usize>() {
        Ok(whole) => count(whole),
        Err(_) => people(times),
    };
    if ratio >= 1.0 {
        format!("{} times", rounded(ratio))
    } else {
        format!("1/{} of", rounded(1.0 / ratio))
    }
}
