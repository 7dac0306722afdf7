//! The statement on the quality of the data: what the quality control that came with it says.

use super::clean::shown;
use super::number::{count, counted, iso, people, reading, table};
use crate::findings::Arrival;
use crate::series::pairs::Agreement;
use crate::series::quality::{BlankDetect, Differing, SendBack, TIMES_BLANK};

/// The statement, a paragraph a subject.
#[must_use]
pub fn statement(arrival: &Arrival, rpd_allowed: f64) -> Vec<String> {
    [duplicates(arrival, rpd_allowed), blanks(arrival), marks(arrival), validation(arrival)]
        .into_iter()
        .chain([limits(arrival)])
        .collect()
}

fn duplicates(arrival: &Arrival, allowed: f64) -> String {
    let d = &arrival.quality.duplicates;
    if d.records == 0 {
        return "No duplicates or splits came with the results.".into();
    }
    let alone = d.records.saturating_sub(d.pairs);
    let alone = match alone {
        0 => String::new(),
        n => format!(", {n} without a sample of that date"),
    };
    let within = d.compared - d.differing.len();
    format!(
        "{}{alone}: {} compared, {} within the criterion (RPD {} %; near the reporting limit \
         the difference is at most that limit), {} over it.",
        counted(d.records, "duplicate or split", "duplicates or splits"),
        counted(d.compared, "pair", "pairs"),
        count(within),
        table(allowed),
        count(d.differing.len()),
    )
}

fn blanks(arrival: &Arrival) -> String {
    let b = &arrival.quality.blanks;
    if b.records == 0 {
        return "No blanks came with the results.".into();
    }
    let unread = match b.unread {
        0 => String::new(),
        n => format!(", {n} without a result that can be read"),
    };
    let clean = b.records - b.unread - b.detects.len();
    let found = match b.detects.len() {
        0 => "nothing was found in any other".to_owned(),
        n => format!("something was found in {n}"),
    };
    let found = if b.unread == 0 && b.detects.is_empty() {
        "nothing was found in any".to_owned()
    } else {
        found
    };
    let clean = if b.detects.is_empty() { String::new() } else { format!(", {clean} clean") };
    format!("{}{unread}: {found}{clean}.", counted(b.records, "blank", "blanks"))
}

fn marks(arrival: &Arrival) -> String {
    let m = &arrival.quality.marks;
    let said: Vec<String> = [
        (m.holding_time, "after the holding time"),
        (m.diluted, "from a dilution"),
        (m.estimated, "estimated"),
        (m.in_blank, "found in a blank too"),
        (m.rejected, "rejected"),
    ]
    .into_iter()
    .filter(|(n, _)| *n > 0)
    .map(|(n, what)| format!("{n} {what}"))
    .collect();
    if said.is_empty() {
        "No result is marked for holding time, dilution, estimation, blanks or rejection.".into()
    } else {
        format!("Marks carried along: {}.", said.join(", "))
    }
}

fn validation(arrival: &Arrival) -> String {
    let files = &arrival.quality.validation;
    // Files of one stage stand together, in the order of their first.
    let mut stages: Vec<(&str, Vec<&str>, usize)> = Vec::new();
    let mut silent = 0;
    for one in files {
        let Some(stage) = one.stage.as_deref() else {
            silent += 1;
            continue;
        };
        let name = arrival.file(one.file);
        match stages.iter_mut().find(|(known, ..)| *known == stage) {
            Some((_, names, batches)) => {
                names.push(name);
                *batches += one.batches;
            }
            None => stages.push((stage, vec![name], one.batches)),
        }
    }
    if stages.is_empty() {
        return "Validation: the site file states no stage (`validation` under [[results]])."
            .into();
    }
    let mut said: Vec<String> = stages
        .into_iter()
        .map(|(stage, names, batches)| {
            const NAMED: usize = 2;
            let named: Vec<String> = names.iter().take(NAMED).map(|name| shown(name)).collect();
            let more = names.len().saturating_sub(NAMED);
            let more = if more == 0 { String::new() } else { format!(" and {more} more") };
            let batches = counted(batches, "batch", "batches");
            format!("{}{more} ({batches}): {}", named.join(", "), shown(stage))
        })
        .collect();
    if silent > 0 {
        said.push(format!("{}: no stage stated", counted(silent, "file", "files")));
    }
    format!("Validation: {}.", said.join("; "))
}

fn limits(arrival: &Arrival) -> String {
    match arrival.quality.send_back.len() {
        0 => "No non-detect has a limit over the regulatory limit.".into(),
        n => format!(
            "{} a limit over the regulatory limit and cannot show that it is met.",
            counted(n, "non-detect has", "non-detects have")
        ),
    }
}

/// A pair that differs: `MW-10, Chloride, 2024-05-14: 503 and 318 mg/L, RPD 45 % (file:25)`.
#[must_use]
pub fn differing(one: &Differing, arrival: &Arrival) -> String {
    let by = match one.pair.agreement() {
        Agreement::Rpd(rpd) => format!("RPD {} %", people(rpd)),
        Agreement::NearLimit(times) => format!("{} times the reporting limit apart", people(times)),
        Agreement::Neither => String::new(),
    };
    format!(
        "{}, {}, {}: {} and {} {}, {by} ({})",
        shown(&one.well),
        shown(&one.analyte),
        iso(one.date),
        reading(one.pair.parent_reading),
        reading(one.pair.duplicate_reading),
        one.unit.label(),
        shown(arrival.place(one.pair.duplicate)),
    )
}

/// A blank in which something was found.
#[must_use]
pub fn blank(one: &BlankDetect, arrival: &Arrival) -> String {
    let batch = match (one.batch_detects, one.doubtful.len()) {
        (0, _) => "its batch has no detect of it".to_owned(),
        (n, 0) => format!("all {n} detects of its batch are over {TIMES_BLANK} times that"),
        (n, doubtful) => {
            format!("{doubtful} of the {n} detects of its batch are under {TIMES_BLANK} times that")
        }
    };
    format!(
        "{}, {}, {}: {} {}; {batch} ({})",
        shown(&one.name),
        shown(&one.analyte),
        iso(one.date),
        table(one.value),
        one.unit.label(),
        shown(arrival.place(one.record)),
    )
}

/// A non-detect to send back.
#[must_use]
pub fn send_back(one: &SendBack, arrival: &Arrival) -> String {
    format!(
        "{}, {}, {}: <{} {unit}, the limit is {} {unit} ({})",
        shown(&one.well),
        shown(&one.analyte),
        iso(one.date),
        table(one.limit),
        table(one.regulatory),
        shown(arrival.place(one.record)),
        unit = one.unit.label(),
    )
}
