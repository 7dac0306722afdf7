//! One series with every candidate reading of every date.

use chrono::NaiveDate;

use super::{DuplicatePair, SeriesKey};
use crate::ledger::RecordId;
use crate::terms::{Reading, Unit};

/// The limit that judges a series, in the series' unit.
#[derive(Clone, Debug, PartialEq)]
pub struct AppliedLimit {
    /// The number, in the series' unit.
    pub value: f64,
    /// The law or guideline it comes from.
    pub source: Option<String>,
}

/// Whether a candidate is the sample itself or its field duplicate.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum SampleRole {
    /// The sample.
    Primary,
    /// A duplicate that the site file asks to average in.
    Duplicate,
}

/// One reading that may enter its date's value.
#[derive(Clone, Debug, PartialEq)]
pub struct Candidate {
    /// The record it came from.
    pub record: RecordId,
    /// The sampling date.
    pub date: NaiveDate,
    /// What it says, in the series' unit.
    pub reading: Reading,
    /// The record's own reporting limit, in the series' unit.
    pub reporting_limit: Option<f64>,
    /// The record's own detection limit, in the series' unit.
    pub detection_limit: Option<f64>,
    /// Marked as estimated.
    pub estimated: bool,
    /// Sample or duplicate.
    pub role: SampleRole,
    /// The decision (its place in the site file) that excludes it, if any.
    pub excluded_by: Option<u16>,
}

/// All that is known of one series.
#[derive(Clone, Debug, PartialEq)]
pub struct WellSeries {
    /// What makes it one series.
    pub key: SeriesKey,
    /// The analyte's CAS number.
    pub cas: Option<String>,
    /// The unit of every number in it.
    pub unit: Unit,
    /// The limit in force at the as-of date.
    pub limit: Option<AppliedLimit>,
    /// The goal date in force.
    pub goal_date: Option<NaiveDate>,
    /// Candidates by date, then record.
    pub candidates: Vec<Candidate>,
    /// Duplicates with their parents.
    pub duplicates: Vec<DuplicatePair>,
    /// Dates of zero or negative results without a mark that could not be used.
    pub low_results: Vec<NaiveDate>,
    /// Every record that belongs to the series, whatever became of it.
    pub records: Vec<RecordId>,
}
