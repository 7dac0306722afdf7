//! Values that are exactly half of a limit, many times: non-detects that were replaced before the
//! file was made.

use std::collections::BTreeMap;

use super::history::{History, Seen};
use super::{Scope, Sentinel};
use crate::ledger::told::Suspicion;
use crate::terms::Reading;

/// How many are many (judgement: one or two happen, since values near a limit have few digits).
const FEWEST: usize = 4;
/// The share of the values under their limit that are exactly half of it (judgement: measured
/// values under the limit are spread over it, replaced ones are all the same).
const SHARE: f64 = 0.8;
/// Two spellings of one number in two units differ by rounding alone.
const ROUNDING: f64 = 1e-9;

/// Looks at each series, and at each analyte of a file where its series are short.
pub fn look(histories: &[History<'_>]) -> Vec<Sentinel> {
    let mut found = Vec::new();
    let mut rest: BTreeMap<(u32, &str, &str), (Vec<&Seen<'_>>, usize)> = BTreeMap::new();
    for history in histories {
        let key = &history.series.key;
        let limits = limits(history);
        let under: Vec<&Seen<'_>> =
            history.seen.iter().filter(|one| is_under(one, &limits).is_some()).collect();
        let halves: Vec<&Seen<'_>> =
            under.iter().copied().filter(|one| is_under(one, &limits) == Some(true)).collect();
        if is_many(halves.len(), under.len()) {
            let records = halves.iter().map(|one| one.said.record).collect();
            let mut one = Sentinel::of(Suspicion::HalfLimit, Scope::Series, records);
            one.site.clone_from(&key.site);
            one.well = Some(key.well.clone());
            one.analyte = Some(key.analyte.clone());
            one.figure = halves.first().map(|half| half.said.reading.number());
            found.push(one);
            continue;
        }
        for seen in under {
            let of_file = rest.entry((seen.file, &key.site, &key.analyte)).or_default();
            of_file.1 += 1;
            if is_under(seen, &limits) == Some(true) {
                of_file.0.push(seen);
            }
        }
    }
    for ((file, site, analyte), (halves, under)) in rest {
        if is_many(halves.len(), under) {
            let records = halves.iter().map(|one| one.said.record).collect();
            let mut one = Sentinel::of(Suspicion::HalfLimit, Scope::Analyte, records);
            one.site = site.to_owned();
            one.file = Some(file);
            one.analyte = Some(analyte.to_owned());
            one.figure = halves.first().map(|half| half.said.reading.number());
            found.push(one);
        }
    }
    found
}

fn is_many(halves: usize, under: usize) -> bool {
    #[allow(clippy::cast_precision_loss)] // counts of results
    let share = halves as f64 / under as f64;
    halves >= FEWEST && share >= SHARE
}

/// The limits of the series' non-detects, for records that bring no limit of their own.
fn limits(history: &History<'_>) -> Vec<f64> {
    let mut limits: Vec<f64> = history
        .seen
        .iter()
        .filter_map(|one| match one.said.reading {
            Reading::Below(limit) => Some(limit),
            _ => None,
        })
        .collect();
    limits.sort_by(f64::total_cmp);
    limits.dedup();
    limits
}

/// Whether a measured value under its limit is exactly half of it; none if it is not under one.
fn is_under(seen: &Seen, of_series: &[f64]) -> Option<bool> {
    let Reading::Measured(value) = seen.said.reading else { return None };
    let own: Vec<f64> =
        [seen.said.reporting_limit, seen.said.detection_limit].into_iter().flatten().collect();
    let limits = if own.is_empty() { of_series } else { &own };
    if !limits.iter().any(|limit| value < *limit) {
        return None;
    }
    let is_half = |limit: &f64| (2.0 * value - limit).abs() <= ROUNDING * limit;
    Some(limits.iter().any(is_half))
}
