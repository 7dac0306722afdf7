//! Rows of columns into CSV text.

use std::borrow::Borrow;
use std::io::{self, Write};

use csv::{Terminator, Writer, WriterBuilder};

use crate::deliver::cells::in_csv;
use crate::findings::{Cell, Column, Findings, SeriesFinding};
use crate::series::SeriesKey;

/// A writer with this program's line ends.
pub fn writer<W: Write>(to: W) -> Writer<W> {
    WriterBuilder::new().terminator(Terminator::Any(b'\n')).from_writer(to)
}

/// A header and one line a row, each cell by its column.
///
/// # Errors
/// Where the target cannot be written.
pub fn write_rows<T, R: Borrow<T>>(
    columns: &[Column<T>],
    rows: impl IntoIterator<Item = R>,
    to: &mut dyn Write,
) -> io::Result<()> {
    let mut writer = writer(to);
    writer.write_record(columns.iter().map(|column| column.name))?;
    for row in rows {
        writer.write_record(columns.iter().map(|column| in_csv(&(column.cell)(row.borrow()))))?;
    }
    writer.flush()
}

/// The same as text.
pub fn text<T, R: Borrow<T>>(columns: &[Column<T>], rows: impl IntoIterator<Item = R>) -> String {
    let mut bytes = Vec::new();
    // Writing into memory fails only for rows of unequal length, and every row has one cell a column.
    write_rows(columns, rows, &mut bytes).expect("memory takes rows of one length");
    // Every field is a `String`, and the quoting adds ASCII alone.
    String::from_utf8(bytes).expect("fields are UTF-8")
}

/// A text cell, empty where there is no text.
#[must_use]
pub fn words(text: &str) -> Cell {
    if text.is_empty() { Cell::Empty } else { Cell::Text(text.to_owned()) }
}

/// A yes or no.
#[must_use]
pub fn yes(value: bool) -> Cell {
    words(if value { "yes" } else { "no" })
}

/// A row that belongs to a series.
#[derive(Clone, Debug)]
pub struct OfSeries<T> {
    /// The series.
    pub key: SeriesKey,
    /// The row's own part.
    pub of: T,
}

/// Every part of every series, in the order of the summary.
pub fn of_series<'a, T: Clone + 'a>(
    findings: &'a Findings,
    parts: impl Fn(&'a SeriesFinding) -> &'a [T] + 'a,
) -> impl Iterator<Item = OfSeries<T>> + 'a {
    findings.series.iter().flat_map(move |series| {
        parts(series).iter().map(|part| OfSeries { key: series.key.clone(), of: part.clone() })
    })
}

/// Columns of a table, each with the cell of one row.
macro_rules! columns {
    ($row:ident: $type:ty; $($name:literal => $cell:expr,)+) => {
        &[$(Column { name: $name, cell: |$row: &$type| $cell },)+]
    };
}
pub(crate) use columns;
