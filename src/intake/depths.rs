//! Wells sampled at several depths: separate, together, or undecided.

use std::collections::{BTreeMap, BTreeSet};

use super::rows::Row;
use super::texts::{Code, Texts};
use crate::ledger::{Fate, Ledger, SetAside};
use crate::site::{Depths, Site};

/// Settles which depth tells series apart: none, unless the site file says `separate`. Candidates
/// of a well with results at more than one depth wait for that word.
pub fn settle(rows: &mut [Row], ledger: &mut Ledger, site: &Site, texts: &Texts) {
    let mut depths: BTreeMap<(Code, Code), BTreeSet<String>> = BTreeMap::new();
    for (row, fate) in rows.iter().zip(ledger.fates()) {
        if *fate == Fate::Candidate && row.depth != 0 {
            let same = same_depth(texts.text(row.depth));
            depths.entry((row.site, row.well)).or_default().insert(same);
        }
    }
    for (at, row) in rows.iter_mut().enumerate() {
        let said = site.well_named(texts.text(row.well)).and_then(|well| well.depths);
        let several = depths.get(&(row.site, row.well)).is_some_and(|depths| depths.len() > 1);
        match said {
            Some(Depths::Separate) => {}
            Some(Depths::Together) => row.depth = 0,
            None => {
                row.depth = 0;
                let record = u32::try_from(at).unwrap_or(u32::MAX);
                if several && ledger.fate(record) == Fate::Candidate {
                    ledger.amend(record, Fate::SetAside(SetAside::DepthDiffers));
                }
            }
        }
    }
}

/// `5` and `5.0` are one depth; what is no number is compared as written.
fn same_depth(text: &str) -> String {
    text.parse::<f64>().map_or_else(|_| text.to_owned(), |depth| depth.to_string())
}
