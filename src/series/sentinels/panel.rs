//! An analyte that is missing from a round in which its panel is present.

use std::collections::{BTreeMap, BTreeSet};

use chrono::NaiveDate;

use super::{Scope, Sentinel};
use crate::intake::{Places, Tidy};
use crate::ledger::RecordId;
use crate::ledger::told::Suspicion;
use crate::series::WellSeries;
use crate::series::round::{Round, RoundRules};

/// Rounds of a well before it has a panel (judgement: half of three is one or two).
const FEWEST_ROUNDS: usize = 4;

/// One well's rounds: which analytes each holds, and one record of each with its date.
type Rounds<'a> = BTreeMap<Round, BTreeMap<&'a str, (RecordId, NaiveDate)>>;

/// Looks at each well: its panel is what is reported together in at least half of its rounds.
pub fn look(
    tidy: &Tidy,
    series: &[WellSeries],
    places: &Places<'_>,
    rules: RoundRules,
) -> Vec<Sentinel> {
    let same =
        |a: &WellSeries, b: &WellSeries| (&a.key.site, &a.key.well) == (&b.key.site, &b.key.well);
    series.chunk_by(same).flat_map(|of| of_well(&rounds(tidy, of, places, rules), of)).collect()
}

/// The rounds of one well.
fn rounds<'a>(
    tidy: &Tidy,
    of: &'a [WellSeries],
    places: &Places<'_>,
    rules: RoundRules,
) -> Rounds<'a> {
    let mut rounds = Rounds::new();
    for one in of {
        for &record in one.records.iter().filter(|r| tidy.ledger.fate(**r).gives_a_row()) {
            if let Some(date) = places.date(record) {
                let held = rounds.entry(rules.of(date)).or_default();
                held.insert(one.key.analyte.as_str(), (record, date));
            }
        }
    }
    rounds
}

/// The gaps of one well.
fn of_well(rounds: &Rounds<'_>, of: &[WellSeries]) -> Vec<Sentinel> {
    let mut found = Vec::new();
    if rounds.len() < FEWEST_ROUNDS {
        return found;
    }
    for (analyte, panel) in panels(rounds) {
        // Before its first and after its last round an analyte was not asked for, except in the
        // newest round, where that cannot be known yet.
        let with = |round: &Round| rounds[round].contains_key(analyte);
        let first = rounds.keys().find(|round| with(round));
        let newest = rounds.keys().next_back();
        let last = rounds.keys().rev().find(|round| with(round));
        let missing = rounds.iter().filter(|(round, held)| {
            let asked = first.is_some_and(|first| first < round)
                && (last.is_some_and(|last| *round < last) || newest == Some(*round));
            asked && !held.contains_key(analyte) && panel.iter().all(|b| held.contains_key(b))
        });
        for (_, held) in missing {
            let beside = || panel.iter().filter_map(|beside| held.get(beside));
            let records = beside().map(|(record, _)| *record).collect();
            let mut one = Sentinel::of(Suspicion::MissingFromPanel, Scope::Sample, records);
            one.site.clone_from(&of[0].key.site);
            one.well = Some(of[0].key.well.clone());
            one.analyte = Some(analyte.to_owned());
            one.date = beside().map(|(_, date)| *date).max();
            found.push(one);
        }
    }
    found
}

/// Each analyte with those that are reported beside it in at least half of the rounds.
fn panels<'a>(rounds: &Rounds<'a>) -> Vec<(&'a str, BTreeSet<&'a str>)> {
    let analytes: BTreeSet<&str> = rounds.values().flat_map(|held| held.keys().copied()).collect();
    let analytes: Vec<&str> = analytes.into_iter().collect();
    let width = analytes.len();
    let mut together = vec![0_usize; width * width];
    for held in rounds.values() {
        let places: Vec<usize> =
            (0..width).filter(|&place| held.contains_key(analytes[place])).collect();
        for &a in &places {
            for &b in &places {
                together[a * width + b] += 1;
            }
        }
    }
    let beside = |a: usize| -> BTreeSet<&'a str> {
        let often = |b: &usize| *b != a && 2 * together[a * width + b] >= rounds.len();
        (0..width).filter(often).map(|b| analytes[b]).collect()
    };
    (0..width).map(|a| (analytes[a], beside(a))).filter(|(_, panel)| !panel.is_empty()).collect()
}
