//! The frame: texts as codes, dates as days, numbers in the result's own unit.

use polars::prelude::{Column, DataFrame, PolarsError};

use super::rows::{Dilution, Kind, Row};
use crate::terms::{Reading, Unit};

/// The frame could not be built or read, which is a fault of this program: its columns have one
/// length and known types.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[error("{why}")]
pub struct FrameError {
    why: String,
}

impl From<PolarsError> for FrameError {
    fn from(error: PolarsError) -> Self {
        Self { why: error.to_string() }
    }
}

/// The frame's number for a record without a unit.
pub(crate) const NO_UNIT: u8 = u8::MAX;
/// The frame's number for an ordinary sample.
pub(crate) const SAMPLE: u8 = 0;
/// The frame's number for a duplicate.
pub(crate) const DUPLICATE: u8 = 1;
/// The frame's number for everything else.
const OTHER: u8 = 2;
/// The frame's numbers for what a record says; 0 is nothing.
pub(crate) const MEASURED: u8 = 1;
/// Not detected.
pub(crate) const BELOW: u8 = 2;
/// Over the range.
pub(crate) const ABOVE: u8 = 3;

/// Puts rows into a frame, one row a record in record order.
///
/// # Errors
/// A polars error, which would be a fault of this program: all columns have one length.
pub(crate) fn frame(rows: &[Row]) -> Result<DataFrame, PolarsError> {
    macro_rules! column {
        ($name:literal, $cell:expr) => {
            Column::new($name.into(), rows.iter().map($cell).collect::<Vec<_>>())
        };
    }
    let mark = |row: &Row| match row.reading {
        None => 0_u8,
        Some(Reading::Measured(_)) => MEASURED,
        Some(Reading::Below(_) | Reading::Between(..)) => BELOW,
        Some(Reading::Above(_)) => ABOVE,
    };
    let kind = |row: &Row| match row.kind {
        Kind::Sample => SAMPLE,
        Kind::Duplicate => DUPLICATE,
        Kind::Other => OTHER,
    };
    let columns = vec![
        column!("file", |r| r.file),
        column!("sheet", |r| r.sheet),
        column!("line", |r| r.line),
        column!("column", |r| r.column),
        column!("well_written", |r| r.written.well),
        column!("analyte_written", |r| r.written.analyte),
        column!("date_written", |r| r.written.date),
        column!("reported", |r| r.written.result),
        column!("unit_written", |r| r.written.unit),
        column!("qualifier", |r| r.written.qualifier),
        column!("limit_written", |r| r.written.reporting_limit),
        column!("sample_id", |r| r.written.sample_id),
        column!("depth_written", |r| r.written.depth),
        column!("fraction_written", |r| r.written.fraction),
        column!("site", |r| r.site),
        column!("well", |r| r.well),
        column!("analyte", |r| r.analyte),
        column!("cas", |r| r.cas),
        column!("fraction", |r| r.fraction),
        column!("depth", |r| r.depth),
        column!("day", |r| r.day),
        column!("mark", mark),
        column!("value", |r| r.reading.map(Reading::number)),
        column!("unit", |r| r.unit.map_or(NO_UNIT, Unit::code)),
        column!("basis", |r| r.basis),
        column!("reporting_limit", |r| r.reporting_limit),
        column!("detection_limit", |r| r.detection_limit),
        column!("estimated", |r| u8::from(r.estimated)),
        column!("kind", kind),
        column!("batch", |r| r.batch),
        column!("diluted", |r| u8::from(r.dilution == Dilution::Diluted)),
        column!("excluded_by", |r| r.excluded_by.map(u32::from)),
    ];
    DataFrame::new(rows.len(), columns)
}
