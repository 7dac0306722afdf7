//! What was found out about the data on arrival, before any fit.

use std::collections::BTreeMap;

use crate::ledger::RecordId;
use crate::ledger::told::Suspicion;
use crate::series::{Completeness, Quality, Sentinel};
use crate::site::RoundLength;

/// Sentinels, quality and completeness, with the places of every record they name.
#[derive(Clone, Debug)]
pub struct Arrival {
    /// What should be looked at.
    pub sentinels: Vec<Sentinel>,
    /// What the quality control says.
    pub quality: Quality,
    /// Expected against received.
    pub completeness: Completeness,
    /// The length of a round, for its name.
    pub round: RoundLength,
    /// The files by their place in the run.
    pub files: Vec<String>,
    /// `file:record` of every record named here.
    pub places: BTreeMap<RecordId, String>,
}

impl Arrival {
    /// Nothing was found.
    #[must_use]
    pub fn nothing() -> Self {
        Self {
            sentinels: Vec::new(),
            quality: Quality::default(),
            completeness: Completeness::default(),
            round: RoundLength::Quarter,
            files: Vec::new(),
            places: BTreeMap::new(),
        }
    }

    /// `file:record` of a record; empty for one that is not named here.
    #[must_use]
    pub fn place(&self, record: RecordId) -> &str {
        self.places.get(&record).map_or("", String::as_str)
    }

    /// The name of a file.
    #[must_use]
    pub fn file(&self, file: u32) -> &str {
        self.files.get(file as usize).map_or("", String::as_str)
    }

    /// The sentinels of one kind.
    pub fn of(&self, kind: Suspicion) -> impl Iterator<Item = &Sentinel> {
        self.sentinels.iter().filter(move |one| one.kind == kind)
    }

    /// Every record that anything here names.
    #[must_use]
    pub fn records(sentinels: &[Sentinel], quality: &Quality) -> Vec<RecordId> {
        let pairs = quality.duplicates.differing.iter();
        let mut records: Vec<RecordId> = sentinels
            .iter()
            .flat_map(|one| one.records.iter().copied())
            .chain(pairs.flat_map(|one| [one.pair.parent, one.pair.duplicate]))
            .chain(quality.blanks.detects.iter().map(|blank| blank.record))
            .chain(quality.blanks.detects.iter().flat_map(|blank| blank.doubtful.clone()))
            .chain(quality.send_back.iter().map(|one| one.record))
            .collect();
        records.sort_unstable();
        records.dedup();
        records
    }
}
