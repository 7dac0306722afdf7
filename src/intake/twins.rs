//! Well names that differ in spelling alone: told, never merged.

use std::collections::{BTreeMap, BTreeSet};

use super::rows::Row;
use super::texts::{Code, Texts};
use crate::ledger::Told;

/// One note for each set of wells of a site that are one name but for case, hyphens, blanks and
/// leading zeros: `MW-1`, `MW1`, `MW-01`.
#[must_use]
pub fn twins(rows: &[Row], texts: &Texts) -> Vec<Told> {
    let wells: BTreeSet<(Code, Code)> =
        rows.iter().filter(|row| row.well != 0).map(|row| (row.site, row.well)).collect();
    let mut alike: BTreeMap<(Code, String), Vec<String>> = BTreeMap::new();
    for (site, well) in wells {
        let well = texts.text(well);
        alike.entry((site, bare(well))).or_default().push(well.to_owned());
    }
    let several = alike.into_values().filter(|wells| wells.len() > 1);
    let mut told: Vec<Told> = several
        .map(|mut wells| {
            wells.sort_unstable();
            Told::WellTwins { wells }
        })
        .collect();
    told.sort_unstable();
    told.dedup();
    told
}

/// A name without what near-twins differ in. A mark between two numbers stays: `1-1` is not `11`.
fn bare(name: &str) -> String {
    let lower = name.to_lowercase();
    let mut bare = String::with_capacity(lower.len());
    let mut after_number = false;
    for part in lower.split(|c: char| !c.is_alphanumeric()) {
        let mut rest = part;
        while let Some(first) = rest.chars().next() {
            let is_number = first.is_ascii_digit();
            let end = rest.find(|c: char| c.is_ascii_digit() != is_number).unwrap_or(rest.len());
            let (run, after) = rest.split_at(end);
            if is_number && after_number {
                bare.push('-');
            }
            let digits = run.trim_start_matches('0');
            bare.push_str(match (is_number, digits.is_empty()) {
                (true, true) => "0",
                (true, false) => digits,
                (false, _) => run,
            });
            after_number = is_number;
            rest = after;
        }
    }
    bare
}

#[cfg(test)]
mod tests {
    use super::bare;

    #[test]
    fn spelling_alone_makes_twins_and_a_number_more_does_not() {
        for name in ["MW-1", "MW1", "MW-01", "mw 001", "MW_1", "MW.01"] {
            assert_eq!(bare(name), "mw1", "{name}");
        }
        for name in ["MW-10", "MW-11", "MW-1R", "MW-1-1", "MW-1S", "OW-1", "MW-100"] {
            assert_ne!(bare(name), "mw1", "{name}");
        }
        assert_ne!(bare("1-1"), bare("11"));
        assert_ne!(bare("MW-1-2"), bare("MW-12"));
        assert_eq!(bare("MW-10"), "mw10");
        assert_eq!((bare("MW-00").as_str(), bare("MW").as_str()), ("mw0", "mw"));
    }
}
