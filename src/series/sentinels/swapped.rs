//! A well's values exchanged with a neighbour's on one date: two wells whose panels fit each other's
//! history much better than their own.

use std::collections::{BTreeMap, BTreeSet};

use super::history::{History, Seen};
use super::{Scope, Sentinel};
use crate::ledger::told::Suspicion;
use crate::numerics::median;
use crate::terms::Reading;

/// How many spreads off one result of each well lies before a swap is thought of (judgement: a
/// normal value lies there once in 16,000).
const OFF: f64 = 4.0;
/// How many spreads off every result may lie after the exchange.
const FITS: f64 = 2.0;
/// By how much the exchange lowers the sum of squared distances: 30 is a likelihood ratio of e^15
/// (judgement: a site of 100 wells and 100 dates has half a million pairs to look at).
const GAIN: f64 = 30.0;
/// The least spread, on the ln scale: the repeatability of sampling and laboratory together, about
/// 15 % (common practice, no source).
const LEAST_SPREAD: f64 = 0.15;
/// The spread about a history of non-detects, whose level is not known: a factor of two.
const UNSEEN_SPREAD: f64 = std::f64::consts::LN_2;
/// No single result counts for more than this many spreads, so that one cannot carry a panel.
const FARTHEST: f64 = 8.0;

/// What the dates around lead to expect.
#[derive(Clone, Copy)]
enum Expected {
    About(f64),
    UpTo(f64),
}

/// One result beside what its own history leads to expect.
struct Panelled<'a> {
    analyte: (&'a str, &'a str, &'a str),
    seen: &'a Seen<'a>,
    expected: Expected,
    spread: f64,
}

/// Looks at every date with two wells that both lie off their own histories.
pub fn look(histories: &[History<'_>]) -> Vec<Sentinel> {
    let mut panels: BTreeMap<_, BTreeMap<&str, Vec<Panelled<'_>>>> = BTreeMap::new();
    for history in histories {
        let key = &history.series.key;
        let spread = history.spread.unwrap_or(UNSEEN_SPREAD).max(LEAST_SPREAD);
        for (at, seen) in history.seen.iter().enumerate() {
            let Some(expected) = expected(history, at) else { continue };
            let spread = match expected {
                Expected::About(_) => spread,
                Expected::UpTo(_) => spread.max(UNSEEN_SPREAD),
            };
            let analyte = (key.analyte.as_str(), key.fraction_code(), key.depth_text());
            let of_date = panels.entry((&key.site, seen.said.date)).or_default();
            let one = Panelled { analyte, seen, expected, spread };
            of_date.entry(&key.well).or_default().push(one);
        }
    }
    let mut found = Vec::new();
    for ((site, date), mut wells) in panels {
        wells.retain(|_, panel| {
            panel.iter().any(|one| distance(one.seen, one.expected, one.spread) >= OFF)
        });
        let mut exchanged: BTreeSet<&str> = BTreeSet::new();
        let mut pairs: Vec<(f64, &str, &str)> = Vec::new();
        let names: Vec<&str> = wells.keys().copied().collect();
        for (at, a) in names.iter().enumerate() {
            for b in &names[at + 1..] {
                if let Some(gain) = gain(&wells[a], &wells[b]) {
                    pairs.push((gain, a, b));
                }
            }
        }
        // The clearest exchange first; a well is exchanged once.
        pairs.sort_by(|x, y| y.0.total_cmp(&x.0).then((x.1, x.2).cmp(&(y.1, y.2))));
        for (gain, a, b) in pairs {
            if exchanged.contains(a) || exchanged.contains(b) {
                continue;
            }
            exchanged.extend([a, b]);
            let both = || wells[a].iter().chain(&wells[b]);
            let shared = |one: &&Panelled<'_>| {
                let has = |panel: &[Panelled<'_>]| panel.iter().any(|o| o.analyte == one.analyte);
                has(&wells[a]) && has(&wells[b])
            };
            let records = both().filter(shared).map(|one| one.seen.said.record).collect();
            let mut one = Sentinel::of(Suspicion::WellsSwapped, Scope::Wells, records);
            one.site = site.to_owned();
            one.date = Some(date);
            one.well = Some(a.to_owned());
            one.other_well = Some(b.to_owned());
            one.figure = Some(gain);
            found.push(one);
        }
    }
    found
}

/// How much better two panels fit each other's history, if they do.
fn gain(a: &[Panelled<'_>], b: &[Panelled<'_>]) -> Option<f64> {
    let mut as_is = 0.0;
    let mut exchanged = 0.0;
    let (mut off_a, mut off_b) = (0.0_f64, 0.0_f64);
    for one in a {
        for other in b.iter().filter(|other| other.analyte == one.analyte) {
            let own = (
                distance(one.seen, one.expected, one.spread),
                distance(other.seen, other.expected, other.spread),
            );
            let theirs = (
                distance(one.seen, other.expected, other.spread),
                distance(other.seen, one.expected, one.spread),
            );
            if theirs.0 > FITS || theirs.1 > FITS {
                return None;
            }
            as_is += own.0.powi(2) + own.1.powi(2);
            exchanged += theirs.0.powi(2) + theirs.1.powi(2);
            (off_a, off_b) = (off_a.max(own.0), off_b.max(own.1));
        }
    }
    let gain = as_is - exchanged;
    (off_a >= OFF && off_b >= OFF && gain >= GAIN).then_some(gain)
}

/// What the dates around one result lead to expect: the median of what was measured, or where three
/// of four were not detected, no more than the highest of their limits.
fn expected(history: &History<'_>, at: usize) -> Option<Expected> {
    const MOST_OF_FOUR: usize = 3;
    let date = history.seen[at].said.date;
    let near = history.neighbours(at, |one| one.said.date != date);
    let measured: Vec<f64> = near.iter().filter_map(|one| one.ln()).collect();
    if measured.len() >= MOST_OF_FOUR {
        return median(&measured).map(Expected::About);
    }
    let limits: Vec<f64> = near
        .iter()
        .filter_map(|one| match one.said.reading {
            Reading::Below(limit) if limit > 0.0 => Some(limit.ln()),
            _ => None,
        })
        .collect();
    (limits.len() >= MOST_OF_FOUR)
        .then(|| limits.into_iter().max_by(f64::total_cmp).map(Expected::UpTo))
        .flatten()
}

/// How many spreads a reading lies from what is expected; none where the two do not contradict.
fn distance(seen: &Seen, expected: Expected, spread: f64) -> f64 {
    let off = match (seen.said.reading, expected) {
        (Reading::Measured(value), Expected::About(level)) => (value.ln() - level).abs(),
        (Reading::Measured(value), Expected::UpTo(level)) => (value.ln() - level).max(0.0),
        (Reading::Below(limit), Expected::About(level)) => (level - limit.ln()).max(0.0),
        _ => 0.0,
    };
    (off / spread).min(FARTHEST)
}
