//! A unit slip of 1,000: in a whole file, for one analyte of a file, in one sample, in one result.

use std::collections::{BTreeMap, BTreeSet};

use super::history::{History, Seen};
use super::{Scope, Sentinel};
use crate::ledger::RecordId;
use crate::ledger::told::Suspicion;
use crate::numerics::median;

/// The smallest and the largest ratio that is taken for 1,000: half of it and twice it, as for the
/// flag `unit-slip` (common practice, no source).
const LEAST: f64 = 500.0;
/// See [`LEAST`].
const MOST: f64 = 2_000.0;
/// A slip stands out: it is at least this many spreads of the series away (judgement: a series that
/// scatters by a factor of six from date to date does reach 1,000 by itself).
const SPREADS: f64 = 4.0;
/// Other values of its series that a result needs to be held against.
const FEWEST: usize = 4;
/// The same where several series of one file agree.
const FEWEST_TOGETHER: usize = 2;
/// The share of comparable results that slip together before the file, the analyte or the sample is
/// named instead of each result (judgement: some are always near a limit).
const TOGETHER: f64 = 0.75;

/// A result that is 1,000 times its history, or a thousandth.
#[derive(Clone, Copy)]
struct Held<'a> {
    history: &'a History<'a>,
    seen: &'a Seen<'a>,
    /// The files of the neighbours.
    near: [Option<u32>; 4],
    ratio: f64,
    slips: bool,
}

/// The results of one analyte that slip together.
type OfAnalyte<'a> = (&'a str, Vec<Held<'a>>);

/// Looks for slips: first those that whole files share, then single samples and results.
pub fn look(histories: &[History<'_>]) -> Vec<Sentinel> {
    let mut found = by_file(histories);
    let known: BTreeSet<RecordId> = found.iter().flat_map(|one| one.records.clone()).collect();
    found.extend(by_sample(histories, &known));
    found
}

/// Holds one result against neighbours that count; none if there are too few.
fn held<'a>(
    history: &'a History<'a>,
    at: usize,
    spread: Option<f64>,
    fewest: usize,
    counts: impl Fn(&Seen<'_>) -> bool,
) -> Option<Held<'a>> {
    let seen = &history.seen[at];
    let own = seen.ln()?;
    let neighbours = history.neighbours(at, counts);
    let files: Vec<u32> = neighbours.iter().map(|one| one.file).collect();
    let near: Vec<f64> = neighbours.into_iter().filter_map(|one| one.ln()).collect();
    if near.len() < fewest {
        return None;
    }
    let off = own - median(&near)?;
    let size = off.abs().exp();
    let stands_out = spread.is_none_or(|spread| off.abs() >= SPREADS * spread);
    let slips = (LEAST..=MOST).contains(&size) && stands_out;
    let near = std::array::from_fn(|at| files.get(at).copied());
    Some(Held { history, seen, near, ratio: off.exp(), slips })
}

/// Slips that a file shares, against the other files.
fn by_file(histories: &[History<'_>]) -> Vec<Sentinel> {
    let mut analytes: BTreeMap<(&str, &str), Vec<&History<'_>>> = BTreeMap::new();
    for history in histories {
        if history.seen.windows(2).any(|two| two[0].file != two[1].file) {
            let key = &history.series.key;
            analytes.entry((&key.site, &key.analyte)).or_default().push(history);
        }
    }
    let mut together: BTreeMap<(u32, &str), Vec<OfAnalyte<'_>>> = BTreeMap::new();
    let mut comparable: BTreeMap<(u32, &str), usize> = BTreeMap::new();
    for ((site, analyte), of) in analytes {
        for (file, held) in files_held(&of, &BTreeSet::new()) {
            *comparable.entry((file, site)).or_default() += held.len();
        }
        for (file, slips) in files_slipping(&of) {
            together.entry((file, site)).or_default().push((analyte, slips));
        }
    }
    let mut found = Vec::new();
    for (key, analytes) in together {
        let all: Vec<Held<'_>> = analytes.iter().flat_map(|(_, slips)| slips.clone()).collect();
        #[allow(clippy::cast_precision_loss)] // counts of results
        let share = all.len() as f64 / comparable.get(&key).copied().unwrap_or(usize::MAX) as f64;
        let one_way = all.iter().all(|one| (one.ratio > 1.0) == (all[0].ratio > 1.0));
        if analytes.len() >= 2 && one_way && share >= TOGETHER {
            found.push(sentinel(Scope::File, &all));
            continue;
        }
        for (analyte, slips) in analytes {
            let mut one = sentinel(Scope::Analyte, &slips);
            one.analyte = Some(analyte.to_owned());
            found.push(one);
        }
    }
    found
}

/// The files whose results of one analyte slip together. Of files that accuse each other, the one
/// that most other files accuse has slipped, of equals the one delivered last; what has slipped
/// accuses nobody any more.
fn files_slipping<'a>(of: &[&'a History<'a>]) -> Vec<(u32, Vec<Held<'a>>)> {
    let mut found: Vec<(u32, Vec<Held<'_>>)> = Vec::new();
    let mut slipped: BTreeSet<u32> = BTreeSet::new();
    loop {
        let accused = files_held(of, &slipped).into_iter().filter_map(|(file, held)| {
            let slips = slipping(&held).filter(|slips| slips.len() >= 2)?;
            let accusers: BTreeSet<u32> = slips.iter().flat_map(|one| one.near).flatten().collect();
            Some((accusers.len(), file, slips))
        });
        let Some((_, file, slips)) = accused.max_by_key(|one| (one.0, one.1)) else {
            return found;
        };
        slipped.insert(file);
        found.push((file, slips));
    }
}

/// The results of one analyte by file, each held against the other files that have not slipped.
fn files_held<'a>(of: &[&'a History<'a>], slipped: &BTreeSet<u32>) -> BTreeMap<u32, Vec<Held<'a>>> {
    let mut files: BTreeMap<u32, Vec<Held<'_>>> = BTreeMap::new();
    for history in of {
        for at in 0..history.seen.len() {
            let file = history.seen[at].file;
            let counts = |one: &Seen<'_>| {
                one.file != file && !slipped.contains(&one.file) && one.ln().is_some()
            };
            // The spread of the whole series would hold the slipped values too.
            let fewest = FEWEST_TOGETHER;
            if let Some(held) =
                held(history, at, None, fewest, counts).filter(|_| !slipped.contains(&file))
            {
                files.entry(file).or_default().push(held);
            }
        }
    }
    files
}

/// Those that slip one way, if they are most of them.
fn slipping<'a>(all: &[Held<'a>]) -> Option<Vec<Held<'a>>> {
    let way = |up: bool| all.iter().filter(move |one| one.slips && (one.ratio > 1.0) == up);
    let up = way(true).count() >= way(false).count();
    let slips: Vec<Held<'_>> = way(up).copied().collect();
    #[allow(clippy::cast_precision_loss)] // counts of results
    let share = slips.len() as f64 / all.len() as f64;
    (!slips.is_empty() && share >= TOGETHER).then_some(slips)
}

/// Slips of single samples and results, against the dates before and after.
fn by_sample(histories: &[History<'_>], known: &BTreeSet<RecordId>) -> Vec<Sentinel> {
    let mut of_sample: BTreeMap<_, Vec<Held<'_>>> = BTreeMap::new();
    let mut slipped = BTreeSet::new();
    for history in histories {
        for at in 0..history.seen.len() {
            let own = &history.seen[at];
            if known.contains(&own.said.record) {
                continue;
            }
            let counts = |one: &Seen<'_>| {
                one.said.date != own.said.date
                    && one.ln().is_some()
                    && !known.contains(&one.said.record)
            };
            if let Some(held) = held(history, at, history.spread, FEWEST, counts) {
                let key = (&history.series.key.site, &history.series.key.well, own.said.date);
                if held.slips {
                    slipped.insert(key);
                }
                of_sample.entry(key).or_default().push(held);
            }
        }
    }
    let mut found = Vec::new();
    for key in slipped {
        let all = of_sample.get(&key).map_or(&[][..], Vec::as_slice);
        match slipping(all).filter(|slips| slips.len() >= 2) {
            Some(slips) => found.push(sentinel(Scope::Sample, &slips)),
            None => found.extend(
                all.iter().filter(|one| one.slips).map(|one| sentinel(Scope::Result, &[*one])),
            ),
        }
    }
    found
}

/// The sentinel of results that slip together.
fn sentinel(scope: Scope, slips: &[Held<'_>]) -> Sentinel {
    let records = slips.iter().map(|one| one.seen.said.record).collect();
    let ratios: Vec<f64> = slips.iter().map(|one| one.ratio).collect();
    let mut one = Sentinel::of(Suspicion::UnitSlip, scope, records);
    one.figure = median(&ratios);
    if let Some(first) = slips.first() {
        let key = &first.history.series.key;
        one.site.clone_from(&key.site);
        one.file = Some(first.seen.file);
        if matches!(scope, Scope::Sample | Scope::Result) {
            one.well = Some(key.well.clone());
            one.date = Some(first.seen.said.date);
        }
        if scope == Scope::Result {
            one.analyte = Some(key.analyte.clone());
        }
    }
    one
}
