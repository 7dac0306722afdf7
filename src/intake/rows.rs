//! One record in canonical form, before it becomes a row of the frame.

use super::texts::Code;
use crate::terms::{Reading, Unit};

/// Whether a record is a sample, its duplicate, or neither.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Kind {
    /// An ordinary sample.
    Sample,
    /// A duplicate of one.
    Duplicate,
    /// Blanks, spikes, reference samples, and records without a result.
    Other,
}

/// Whether a record is one of a pair of analyses, diluted and not.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Dilution {
    /// Neither.
    None,
    /// From a dilution (`D`).
    Diluted,
    /// Above the calibration (`E`), held until a dilution or a legend settles it.
    OverCalibration,
}

/// The texts of a record as written, as codes.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Written {
    /// The well.
    pub well: Code,
    /// The analyte.
    pub analyte: Code,
    /// The date.
    pub date: Code,
    /// The result.
    pub result: Code,
    /// The unit.
    pub unit: Code,
    /// The qualifiers.
    pub qualifier: Code,
    /// The reporting limit, else the detection limit.
    pub reporting_limit: Code,
    /// The sample's identifier.
    pub sample_id: Code,
    /// The depth.
    pub depth: Code,
    /// The fraction.
    pub fraction: Code,
}

/// One record in canonical form.
#[derive(Clone, Debug, PartialEq)]
pub struct Row {
    /// The file's place in the run.
    pub file: u32,
    /// The sheet; empty for a text.
    pub sheet: Code,
    /// The line on which the record starts, the row of a sheet.
    pub line: u64,
    /// The column of a cross-tab's cell, counted from 1; 0 where the record is a line.
    pub column: u32,
    /// The cells as written.
    pub written: Written,
    /// The site.
    pub site: Code,
    /// The well, aliases applied; 0 where there is none.
    pub well: Code,
    /// The analyte as shown; 0 where there is none.
    pub analyte: Code,
    /// The CAS number.
    pub cas: Code,
    /// The analyte's place among those listed.
    pub listed: Option<usize>,
    /// The fraction as a number: 0 none, 1 dissolved, 2 total.
    pub fraction: u8,
    /// The depth that tells series apart; 0 where none does.
    pub depth: Code,
    /// Days since 1970-01-01.
    pub day: Option<i32>,
    /// The time of day as written.
    pub time: Code,
    /// What it says, in `unit`.
    pub reading: Option<Reading>,
    /// The result's unit.
    pub unit: Option<Unit>,
    /// What the number counts.
    pub basis: Code,
    /// The reporting limit, in `unit`.
    pub reporting_limit: Option<f64>,
    /// The detection limit, in `unit`.
    pub detection_limit: Option<f64>,
    /// Marked as estimated.
    pub estimated: bool,
    /// Sample, duplicate, or neither.
    pub kind: Kind,
    /// Diluted, or over the calibration.
    pub dilution: Dilution,
    /// The laboratory's batch as written; 0 where the file has none.
    pub batch: Code,
    /// The decision that excludes it.
    pub excluded_by: Option<u16>,
    /// The decision that says what its qualifiers mean.
    pub qualified_by: Option<u16>,
    /// The decision that joined its well to another.
    pub joined_by: Option<u16>,
}
