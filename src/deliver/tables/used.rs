//! used.csv: one row a date of a series, with the records its value comes from.

use super::rows::{self, OfSeries, columns, words, yes};
use crate::findings::{Cell, Column, Findings, UsedValue};

/// Every column, in order.
pub const COLUMNS: &[Column<OfSeries<UsedValue>>] = columns! { u: OfSeries<UsedValue>;
    "site" => words(&u.key.site),
    "well" => words(&u.key.well),
    "analyte" => words(&u.key.analyte),
    "fraction" => words(u.key.fraction_code()),
    "depth" => words(u.key.depth_text()),
    "date" => Cell::Date(u.of.date),
    "value" => Cell::Number(u.of.reading.number()),
    "mark" => words(u.of.reading.mark()),
    "estimated" => yes(u.of.estimated),
    "in_fit" => yes(u.of.in_fit),
    "fitted_median" => u.of.fitted_median.map_or(Cell::Empty, Cell::Number),
    "residual" => u.of.residual.map_or(Cell::Empty, Cell::Number),
    "files_and_records" => words(&u.of.records.join("; ")),
};

/// The table.
#[must_use]
pub fn used_csv(findings: &Findings) -> String {
    rows::text(COLUMNS, rows::of_series(findings, |series| &series.values))
}
