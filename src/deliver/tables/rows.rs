//! Rows of columns into CSV text.

use std::io::{self, Write};

use csv::{Terminator, Writer, WriterBuilder};

use crate::deliver::cells::in_csv;
use crate::findings::{Column, Findings};
use crate::series::SeriesKey;

/// A writer with this program's line ends and quoting.
pub fn writer<W: Write>(to: W) -> Writer<W> {
    WriterBuilder::new().terminator(Terminator::Any(b'\n')).from_writer(to)
}

/// A header and one line a row, each cell by its column.
///
/// # Errors
/// Where the target cannot be written.
pub fn write_rows<T>(
    columns: &[Column<T>],
    rows: impl IntoIterator<Item = T>,
    to: &mut dyn Write,
) -> io::Result<()> {
    let mut writer = writer(to);
    writer.write_record(columns.iter().map(|column| column.name))?;
    for row in rows {
        writer.write_record(columns.iter().map(|column| in_csv(&(column.cell)(&row))))?;
    }
    writer.flush()
}

/// The same as text.
pub fn text<T>(columns: &[Column<T>], rows: impl IntoIterator<Item = T>) -> String {
    let mut bytes = Vec::new();
    // Writing into memory fails only for records of unequal length, and every row here has one cell
    // for each column.
    write_rows(columns, rows, &mut bytes).expect("memory takes every row");
    // Every field is a `String`, and the quoting adds ASCII.
    String::from_utf8(bytes).expect("fields are UTF-8")
}

/// The columns that name a series, for tables whose rows belong to one.
macro_rules! keyed_columns {
    ($row:ident: $type:ty; $($name:literal => $cell:expr,)*) => {
        &[
            Column { name: "site", cell: |$row: &$type| crate::deliver::tables::rows::words(&$row.key.site) },
            Column { name: "well", cell: |$row: &$type| crate::deliver::tables::rows::words(&$row.key.well) },
            Column { name: "analyte", cell: |$row: &$type| crate::deliver::tables::rows::words(&$row.key.analyte) },
            Column { name: "fraction", cell: |$row: &$type| crate::deliver::tables::rows::words($row.key.fraction_code()) },
            Column { name: "depth", cell: |$row: &$type| crate::deliver::tables::rows::words($row.key.depth_text()) },
            $(Column { name: $name, cell: |$row: &$type| $cell },)*
        ]
    };
}
pub(crate) use keyed_columns;

/// A text cell, empty where there is no text.
#[must_use]
pub fn words(text: &str) -> crate::findings::Cell {
    if text.is_empty() { crate::findings::Cell::Empty } else { crate::findings::Cell::Text(text.to_owned()) }
}

/// One row of a table that belongs to a series, with what it is a row of.
pub struct OfSeries<'a, T> {
    /// The series.
    pub key: &'a SeriesKey,
    /// The row's own part.
    pub of: &'a T,
}
/// Every part of every series, in the order of the summary.
pub fn of_series<'a, T: 'a, I>(
    findings: &'a Findings,
    parts: impl Fn(&'a crate::findings::SeriesFinding) -> I + 'a,
) -> impl Iterator<Item = OfSeries<'a, T>>
where
    I: IntoIterator<Item = &'a T>,
{
    findings
        .series
        .iter()
        .flat_map(move |series| parts(series).into_iter().map(|of| OfSeries { key: &series.key, of }))
}
