//! Cross-tabs: one result a cell, with dates, wells or analytes across.
//!
//! A cross-tab is made of blocks. Above a block may stand its analyte and unit; a head row names
//! what stands across; the rows below it hold one result a cell. It is read only where each of
//! well, analyte and date has exactly one place; else it is refused with what settles it.

mod head;
mod title;
mod unpivot;

use std::collections::BTreeMap;

use csv::StringRecord;

use super::Grid;
use crate::intake::header::Mapping;
use crate::intake::split::Line;
use crate::intake::table::{Described, Table, date_form, number_form};
use crate::ledger::{CrossTabProblem, Told};
use crate::site::{Column, ResultsRule, Site};
use title::Known;
use unpivot::Unpivot;

/// What reading a cross-tab needs to know.
struct Context<'a> {
    rule: &'a ResultsRule,
    known: Known,
}

/// Reads a grid as a cross-tab; none where it shows none.
///
/// # Errors
/// [`CrossTabProblem`] where it is one and cannot be read without a guess.
pub(super) fn table(
    file: &str,
    grid: &Grid,
    rule: &ResultsRule,
    site: &Site,
) -> Result<Option<Table>, CrossTabProblem> {
    let context = Context { rule, known: Known::of(site) };
    let Some(read) = Unpivot::read(&grid.lines, &context)? else { return Ok(None) };
    let name = crate::intake::address::table(file, &grid.sheet);
    let mut told = vec![Told::ReadAsCrossTab { table: name.clone(), across: read.across }];
    if let Some(first) = read.beside.first() {
        let (lines, first) = (read.beside.len(), first.clone());
        told.push(Told::LinesBesideTable { table: name, lines, first });
    }
    let columns = read.columns();
    let cells: BTreeMap<Column, usize> = columns.iter().copied().zip(0..).collect();
    let at = cells.get(&Column::Date).copied();
    Ok(Some(Table {
        name: file.to_owned(),
        sheet: grid.sheet.clone(),
        mapping: Mapping { cells, ..Mapping::default() },
        header: columns.iter().map(|column| column.key()).collect::<StringRecord>(),
        blank: grid.blank,
        empty_cells: read.empty,
        dates: date_form(rule, read.lines.iter().filter_map(|line| line.cells.get(at?))),
        numbers: number_form(rule),
        described: read.described,
        told,
        lines: read.lines,
    }))
}

/// Whether the beginning of a text shows a cross-tab.
///
/// # Errors
/// [`CrossTabProblem`] where it shows one that cannot be read without a guess.
pub(super) fn shows(
    lines: &[Line],
    rule: &ResultsRule,
    site: &Site,
) -> Result<bool, CrossTabProblem> {
    let context = Context { rule, known: Known::of(site) };
    Unpivot::read(lines, &context).map(|read| read.is_some())
}

/// The columns without which a record says nothing, in the order of the made records.
const KEYS: [Column; 5] =
    [Column::Well, Column::Analyte, Column::Date, Column::Result, Column::Unit];

fn describe(header: &str, column: &'static str) -> Described {
    Described { header: header.to_owned(), column }
}
