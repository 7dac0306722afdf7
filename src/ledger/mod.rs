//! The account of every input record: what became of it, why, and what was told about it.
//!
//! A fate is provisional at intake, amended by `series` when results of one date are merged, and
//! closed after that. [`Ledger::balance`] holds the sums together: a run whose ledger does not
//! balance is a broken promise and writes nothing.

pub mod account;
pub mod fate;
pub mod told;
pub mod unreadable;

pub use account::{FileFacts, LedgerRow, MappingFacts, OutcomeCount};
pub use fate::{Fate, Merged, NonResult, Outcome, QualityControl, SetAside, UsedAs};
pub use told::Told;
pub use unreadable::{
    Cap, CrossTabProblem, NotText, SourceError, TableProblem, Unreadable, WorkbookProblem,
};

/// One record's number in the run: files in delivery order, records in file order, from 0.
pub type RecordId = u32;

/// Fates of all records, and what was told about some of them.
#[derive(Clone, Debug, Default)]
pub struct Ledger {
    fates: Vec<Fate>,
    told: Vec<(RecordId, Told)>,
}

/// A ledger whose sums do not hold.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
pub enum Unbalanced {
    /// More or fewer fates than records were read.
    #[error("{read} records were read and {accounted} are accounted for")]
    Count {
        /// Records read from the files.
        read: usize,
        /// Fates in the ledger.
        accounted: usize,
    },
    /// A record still waits for its fate.
    #[error("record number {record} was never decided")]
    Open {
        /// Its number in the run.
        record: RecordId,
    },
}

impl Ledger {
    /// Adds the next record's provisional fate and returns the record's number.
    ///
    /// # Panics
    /// With more than 4,294,967,295 records, which no table of this program holds.
    pub fn open(&mut self, fate: Fate) -> RecordId {
        let id = RecordId::try_from(self.fates.len()).expect("fewer than 2^32 records");
        self.fates.push(fate);
        id
    }

    /// Changes a record's fate.
    pub fn amend(&mut self, record: RecordId, fate: Fate) {
        self.fates[record as usize] = fate;
    }

    /// The fate of a record.
    #[must_use]
    pub fn fate(&self, record: RecordId) -> Fate {
        self.fates[record as usize]
    }

    /// Notes something about a record that people are told once, grouped.
    pub fn tell(&mut self, record: RecordId, told: Told) {
        self.told.push((record, told));
    }

    /// What was told, by record: sorted by record, then by kind.
    #[must_use]
    pub fn told_by_record(&self) -> Vec<(RecordId, &Told)> {
        let mut told: Vec<_> = self.told.iter().map(|(id, told)| (*id, told)).collect();
        told.sort();
        told.dedup();
        told
    }

    /// What was told, grouped: each with how many records it concerns.
    #[must_use]
    pub fn told_by_kind(&self) -> Vec<(&Told, usize)> {
        let mut groups: std::collections::BTreeMap<&Told, Vec<RecordId>> =
            std::collections::BTreeMap::new();
        for (record, told) in &self.told {
            groups.entry(told.group()).or_default().push(*record);
        }
        groups
            .into_iter()
            .map(|(told, mut records)| {
                records.sort_unstable();
                records.dedup();
                (told, records.len())
            })
            .collect()
    }

    /// How many records there are.
    #[must_use]
    pub fn len(&self) -> usize {
        self.fates.len()
    }

    /// Whether no record was read.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.fates.is_empty()
    }

    /// All fates in the order of the records.
    #[must_use]
    pub fn fates(&self) -> &[Fate] {
        &self.fates
    }

    /// Checks that every record read has one final fate.
    ///
    /// # Errors
    /// [`Unbalanced`], naming the difference or the first open record.
    pub fn balance(&self, read: usize) -> Result<(), Unbalanced> {
        if self.fates.len() != read {
            return Err(Unbalanced::Count { read, accounted: self.fates.len() });
        }
        match self.fates.iter().position(|fate| *fate == Fate::Candidate) {
            Some(at) => {
                Err(Unbalanced::Open { record: RecordId::try_from(at).unwrap_or(RecordId::MAX) })
            }
            None => Ok(()),
        }
    }
}
