//! All values of a batch equal: a cell that was filled down.

use std::collections::{BTreeMap, BTreeSet};

use super::history::{History, Seen};
use super::{Scope, Sentinel};
use crate::intake::Tidy;
use crate::ledger::told::Suspicion;
use crate::terms::Reading;

/// Equal values of three or more significant digits that are no accident, and of any number of
/// digits: as for the flag `copied-values` (common practice, no source).
const OF_THREE_DIGITS: usize = 4;
/// See [`OF_THREE_DIGITS`].
const OF_ANY: usize = 6;

/// Looks at each analyte of each batch: same file and batch, else same file and date.
pub fn look(histories: &[History<'_>], tidy: &Tidy) -> Vec<Sentinel> {
    let mut batches: BTreeMap<_, Vec<(&History<'_>, &Seen<'_>)>> = BTreeMap::new();
    for history in histories {
        let key = &history.series.key;
        for seen in &history.seen {
            let date = (seen.batch == 0).then_some(seen.said.date);
            let batch = (seen.file, seen.batch, date, key.site.as_str(), key.analyte.as_str());
            batches.entry(batch).or_default().push((history, seen));
        }
    }
    let mut found = Vec::new();
    for ((file, batch, date, site, analyte), all) in batches {
        let Some(value) = one_value(&all) else { continue };
        let wells: BTreeSet<&str> = all.iter().map(|(h, _)| h.series.key.well.as_str()).collect();
        let needed = if significant_digits(value) >= 3 { OF_THREE_DIGITS } else { OF_ANY };
        if wells.len() < needed {
            continue;
        }
        let records = all.iter().map(|(_, seen)| seen.said.record).collect();
        let mut one = Sentinel::of(Suspicion::EqualBatch, Scope::Batch, records);
        one.site = site.to_owned();
        one.file = Some(file);
        one.analyte = Some(analyte.to_owned());
        one.date = date;
        one.batch = (batch != 0).then(|| tidy.name(batch));
        one.figure = Some(value);
        found.push(one);
    }
    found
}

/// The one value that every result of a batch has; none if any differs or is no measured value.
fn one_value(all: &[(&History<'_>, &Seen<'_>)]) -> Option<f64> {
    let measured = |seen: &Seen<'_>| match seen.said.reading {
        Reading::Measured(value) => Some(value),
        _ => None,
    };
    let first = measured(all.first()?.1)?;
    all.iter()
        .all(|(_, seen)| measured(seen).is_some_and(|value| value.total_cmp(&first).is_eq()))
        .then_some(first)
}

/// Digits of the shortest decimal that is this value, without leading and trailing zeros.
fn significant_digits(value: f64) -> usize {
    let text = format!("{value:e}");
    let mantissa = text.split('e').next().unwrap_or_default();
    mantissa.bytes().filter(u8::is_ascii_digit).count()
}
