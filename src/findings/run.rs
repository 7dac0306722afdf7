//! What was run, on what, and what became of the records.

use chrono::NaiveDate;
use serde::Serialize;

use crate::ledger::Told;
pub use crate::ledger::{FileFacts, LedgerRow, MappingFacts, OutcomeCount};
use crate::terms::Effort;

/// The run itself.
#[derive(Clone, Debug)]
pub struct RunFacts {
    /// The program's version.
    pub version: &'static str,
    /// The as-of date in force.
    pub as_of: NaiveDate,
    /// The effort.
    pub effort: Effort,
    /// The two-sided confidence in force.
    pub confidence: f64,
    /// The horizon in years after the last used date.
    pub horizon_years: f64,
    /// SHA-256 of the site file, if there is one.
    pub site_file: Option<InputHash>,
    /// The site file's template, for bare files with `--template`.
    pub template: Option<String>,
    /// Every results file, in delivery order.
    pub files: Vec<FileFacts>,
    /// Records by outcome and reason over all files.
    pub outcomes: Vec<OutcomeCount>,
    /// Files that could not be read as a table: shown path and why.
    pub unreadable: Vec<(String, String)>,
    /// Settings in force as (key, value), in the order of the site file's documentation.
    pub settings: Vec<(String, String)>,
    /// Settings off their default as (key, why).
    pub off_default: Vec<(String, String)>,
    /// Decisions in force: id, kind, who, when, why, records touched.
    pub decisions: Vec<DecisionFacts>,
    /// Which header of which file was read as which column.
    pub mapping: Vec<MappingFacts>,
    /// Which names and units were read as which.
    pub applied: Vec<AppliedFacts>,
    /// The relative percent difference over which duplicates differ.
    pub rpd_allowed: f64,
}

/// A name or unit that was read as another.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct AppliedFacts {
    /// What it is: `analyte`, `well`, `fraction` (taken as the listed one) or `unit`.
    pub what: &'static str,
    /// As written; for a fraction, the analyte.
    pub from: String,
    /// As read.
    pub to: String,
    /// How many records it concerns.
    pub records: usize,
}

/// A file that is not a results file but decides the run.
#[derive(Clone, Debug, Serialize)]
pub struct InputHash {
    /// Its name below the site folder.
    pub name: String,
    /// Size in bytes.
    pub bytes: u64,
    /// SHA-256 in hex.
    pub sha256: String,
}

/// A decision as run.json lists it.
#[derive(Clone, Debug, Serialize)]
pub struct DecisionFacts {
    /// Its id.
    pub id: String,
    /// Its kind.
    pub kind: String,
    /// Who.
    pub who: String,
    /// When.
    pub when: NaiveDate,
    /// Why.
    pub why: String,
    /// How many records it touched.
    pub records: usize,
}

/// The site as findings show it.
#[derive(Clone, Debug)]
pub struct SiteFacts {
    /// The site's name, empty for bare files.
    pub name: String,
    /// The authority it answers to.
    pub authority: Option<String>,
    /// The citation printed with the caution.
    pub citation: Option<String>,
    /// The round that the as-of date falls in, as people name it: `2026-Q3`.
    pub round: String,
}

/// Something told once.
#[derive(Clone, Debug, PartialEq)]
pub struct Note {
    /// What.
    pub told: Told,
    /// How many records it concerns.
    pub records: usize,
}
