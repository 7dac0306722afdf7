//! ledger.csv: one row an input record, written as it comes, never held whole.

use std::io::{self, Write};

use super::rows::{self, columns, words};
use crate::findings::{Column, LedgerRow};

/// Every column, in order.
pub const COLUMNS: &[Column<LedgerRow>] = columns! { r: LedgerRow;
    "file" => words(&r.file),
    "sheet" => words(&r.sheet),
    "record" => words(&r.record),
    "site" => words(&r.site),
    "well" => words(&r.well),
    "date" => words(&r.date),
    "analyte" => words(&r.analyte),
    "fraction" => words(&r.fraction),
    "depth" => words(&r.depth),
    "reported" => words(&r.reported),
    "unit" => words(&r.unit),
    "qualifier" => words(&r.qualifier),
    "reporting_limit" => words(&r.reporting_limit),
    "sample_id" => words(&r.sample_id),
    "outcome" => words(r.outcome),
    "reason" => words(&r.reason),
    "detail" => words(&r.detail),
};

/// Writes the table.
///
/// # Errors
/// Where the target cannot be written.
pub fn ledger_csv(rows: impl IntoIterator<Item = LedgerRow>, to: &mut dyn Write) -> io::Result<()> {
    rows::write_rows(COLUMNS, rows, to)
}
