//! An analyte that is missing from a round in which its panel is present.

use std::collections::{BTreeMap, BTreeSet};

use super::{Scope, Sentinel};
use crate::intake::texts::Code;
use crate::intake::{FrameError, Tidy};
use crate::ledger::RecordId;
use crate::ledger::told::Suspicion;
use crate::series::round::{Round, RoundRules};

/// Rounds of a well before it has a panel (judgement: half of three is one or two).
const FEWEST_ROUNDS: usize = 4;

/// One well's rounds: which analytes each holds, and one record of each.
type Rounds = BTreeMap<Round, BTreeMap<Code, RecordId>>;

/// Looks at each well: its panel is what is reported together in at least half of its rounds.
///
/// # Errors
/// [`FrameError`], which would be a fault of this program.
pub fn look(tidy: &Tidy, rules: RoundRules) -> Result<Vec<Sentinel>, FrameError> {
    let mut wells: BTreeMap<(Code, Code), Rounds> = BTreeMap::new();
    let mut dates = BTreeMap::new();
    for record in tidy.arrived()? {
        let fate = tidy.ledger.fate(record.record);
        let Some(date) = record.date.filter(|_| fate.gives_a_row()) else { continue };
        if record.well == 0 || record.analyte == 0 {
            continue;
        }
        let round = rules.of(date);
        let of_well = wells.entry((record.site, record.well)).or_default();
        of_well.entry(round).or_default().insert(record.analyte, record.record);
        dates.insert(record.record, date);
    }
    let mut found = Vec::new();
    for ((site, well), rounds) in wells.into_iter().filter(|(_, r)| r.len() >= FEWEST_ROUNDS) {
        for (analyte, panel) in panels(&rounds) {
            // Before its first and after its last round an analyte was not asked for, except in the
            // newest round, where that cannot be known yet.
            let with = |round: &Round| rounds[round].contains_key(&analyte);
            let first = rounds.keys().find(|round| with(round));
            let newest = rounds.keys().next_back();
            let last = rounds.keys().rev().find(|round| with(round));
            let missing = rounds.iter().filter(|(round, held)| {
                let asked = first.is_some_and(|first| first < round)
                    && (last.is_some_and(|last| *round < last) || newest == Some(*round));
                asked && !held.contains_key(&analyte) && panel.iter().all(|b| held.contains_key(b))
            });
            for (_, held) in missing {
                let records: Vec<RecordId> =
                    panel.iter().filter_map(|beside| held.get(beside)).copied().collect();
                let date = records.iter().filter_map(|record| dates.get(record)).max().copied();
                let mut one = Sentinel::of(Suspicion::MissingFromPanel, Scope::Sample, records);
                one.site = tidy.name(site);
                one.well = Some(tidy.name(well));
                one.analyte = Some(tidy.name(analyte));
                one.date = date;
                found.push(one);
            }
        }
    }
    Ok(found)
}

/// Each analyte with those that are reported beside it in at least half of the rounds.
fn panels(rounds: &Rounds) -> Vec<(Code, BTreeSet<Code>)> {
    let analytes: BTreeSet<Code> = rounds.values().flat_map(|held| held.keys().copied()).collect();
    let analytes: Vec<Code> = analytes.into_iter().collect();
    let width = analytes.len();
    let mut together = vec![0_usize; width * width];
    for held in rounds.values() {
        let places: Vec<usize> =
            (0..width).filter(|&place| held.contains_key(&analytes[place])).collect();
        for &a in &places {
            for &b in &places {
                together[a * width + b] += 1;
            }
        }
    }
    let beside = |a: usize| -> BTreeSet<Code> {
        let often = |b: &usize| *b != a && 2 * together[a * width + b] >= rounds.len();
        (0..width).filter(often).map(|b| analytes[b]).collect()
    };
    (0..width).map(|a| (analytes[a], beside(a))).filter(|(_, panel)| !panel.is_empty()).collect()
}
