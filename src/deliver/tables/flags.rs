//! flags.csv: one row a flag of a series, those that could not be assessed too.

use super::rows::{self, OfSeries, columns, words};
use crate::findings::{Cell, Column, Findings};
use crate::terms::{Figure, Flag};
use crate::words::flag_sentence::sentence;

/// Every column, in order.
pub const COLUMNS: &[Column<OfSeries<Flag>>] = columns! { f: OfSeries<Flag>;
    "site" => words(&f.key.site),
    "well" => words(&f.key.well),
    "analyte" => words(&f.key.analyte),
    "fraction" => words(f.key.fraction_code()),
    "depth" => words(f.key.depth_text()),
    "flag" => words(f.of.code.code()),
    "figure" => figure(&f.of.figure),
    "threshold" => f.of.threshold.map_or(Cell::Empty, Cell::Number),
    "source" => words(f.of.code.source()),
    "note" => words(&sentence(&f.of)),
};

/// The figure as a cell.
#[must_use]
pub fn figure(figure: &Figure) -> Cell {
    match figure {
        Figure::Number(value) => Cell::Number(*value),
        Figure::Date(date) => Cell::Date(*date),
        Figure::Word(word) => words(word),
        Figure::Absent => Cell::Empty,
    }
}

/// The table.
#[must_use]
pub fn flags_csv(findings: &Findings) -> String {
    rows::text(COLUMNS, rows::of_series(findings, |series| &series.flags))
}
