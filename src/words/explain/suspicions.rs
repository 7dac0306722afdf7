//! What is suspected on arrival, explained.

use super::{Entry, Kind};
use crate::ledger::told::Suspicion;
use crate::words::suspicion;

/// Every one of them.
#[must_use]
pub fn entries() -> Vec<Entry> {
    Suspicion::ALL
        .iter()
        .map(|&kind| Entry {
            word: kind.code(),
            kind: Kind::Suspicion,
            place: "",
            meaning: suspicion::meaning(kind),
            formula: None,
            source: suspicion::source(kind),
        })
        .collect()
}
