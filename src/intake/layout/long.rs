//! One result a line: a header, perhaps below title lines, and records below it.

use csv::StringRecord;

use super::{Grid, emptied, own_cells};
use crate::intake::address;
use crate::intake::header::{Mapping, REQUIRED, mapping};
use crate::intake::split::Line;
use crate::intake::table::{Described, Table, agreement, date_form, number_form};
use crate::ledger::{TableProblem, Told};
use crate::site::{Column, ResultsRule};

/// The header is looked for in this many rows from the top (judgement: title blocks of laboratory
/// reports have ten to twenty).
pub(super) const HEADER_WITHIN: usize = 40;

/// A header found: its place among the rows and what its cells mean.
pub(super) struct Header {
    at: usize,
    mapping: Mapping,
}

/// Finds the first row that has every required column.
///
/// # Errors
/// [`TableProblem::NoHeader`] or [`TableProblem::DeclaredMissing`] of the row that lacks least.
pub(super) fn header(lines: &[Line], rule: &ResultsRule) -> Result<Header, TableProblem> {
    let mut nearest: Option<(usize, TableProblem)> = None;
    for (at, line) in lines.iter().take(HEADER_WITHIN).enumerate() {
        let cells = own_cells(line);
        let (lacking, problem) = match mapping(cells.iter().map(String::as_str), &rule.columns) {
            Ok(mapping) => {
                let lacks = mapping.lacks();
                if lacks.is_empty() {
                    return Ok(Header { at, mapping });
                }
                let found = cells.clone();
                (lacks.len(), TableProblem::NoHeader { line: line.line, lacks, found })
            }
            Err(missing) => {
                let missing: Vec<(Column, String)> =
                    missing.into_iter().map(|m| (m.column, m.header)).collect();
                let lacking = REQUIRED.len() + missing.len();
                let found = cells.clone();
                (lacking, TableProblem::DeclaredMissing { line: line.line, missing, found })
            }
        };
        if nearest.as_ref().is_none_or(|(least, _)| lacking < *least) {
            nearest = Some((lacking, problem));
        }
        if holds_data(&cells) {
            break;
        }
    }
    let nothing = || TableProblem::NotText(crate::ledger::NotText::Empty);
    Err(nearest.map_or_else(nothing, |(_, problem)| problem))
}

/// Whether a line is a record rather than a title: as many cells as a record needs, one a number.
fn holds_data(cells: &[String]) -> bool {
    let filled = || cells.iter().filter(|cell| !cell.is_empty());
    filled().count() >= REQUIRED.len() && filled().any(|cell| cell.parse::<f64>().is_ok())
}

/// The rows below a header as a table.
///
/// # Errors
/// [`TableProblem::ColumnsDiffer`] where two columns of one meaning differ.
pub(super) fn table(
    file: &str,
    grid: Grid,
    rule: &ResultsRule,
    Header { at, mapping }: Header,
) -> Result<Table, TableProblem> {
    let name = address::table(file, &grid.sheet);
    let mut lines = grid.lines;
    let mut above: Vec<Line> = lines.drain(..=at).collect();
    let header: StringRecord = above.pop().as_ref().map(own_cells).unwrap_or_default().into();
    for line in lines.iter_mut().filter(|line| !line.filled.is_empty()) {
        keep_own(line, &mapping);
    }
    lines.retain(|line| line.cells.iter().any(|cell| !cell.trim().is_empty()));
    agreement(&lines, &mapping, &header)?;
    let at = mapping.cells.get(&Column::Date).copied();
    let dates = date_form(rule, lines.iter().filter_map(|line| line.cells.get(at?)));
    let told = above.first().map(|first| Told::LinesBesideTable {
        table: name,
        lines: above.len(),
        first: own_cells(first).into_iter().find(|cell| !cell.is_empty()).unwrap_or_default(),
    });
    Ok(Table {
        name: file.to_owned(),
        sheet: grid.sheet,
        described: described(&mapping, &header),
        mapping,
        header,
        lines,
        blank: grid.blank,
        empty_cells: 0,
        told: told.into_iter().collect(),
        dates,
        numbers: number_form(rule),
    })
}

/// Of cells that merged ones filled, keeps those filled downwards. A merged result is one result:
/// only words such as DRY are kept in the lines below it.
fn keep_own(line: &mut Line, mapping: &Mapping) {
    let result = mapping.cells.get(&Column::Result).copied();
    let cells = &line.cells;
    let out: Vec<u32> = line
        .filled
        .iter()
        .filter(|filled| {
            let at = filled.column as usize;
            let number = cells.get(at).unwrap_or_default().bytes().any(|b| b.is_ascii_digit());
            filled.across || (Some(at) == result && number)
        })
        .map(|filled| filled.column)
        .collect();
    emptied(line, |at| out.contains(&at));
    line.filled = line.filled.iter().copied().filter(|f| !out.contains(&f.column)).collect();
}

/// Which header was read as which column, in the order of the cells.
fn described(mapping: &Mapping, header: &StringRecord) -> Vec<Described> {
    let also = mapping.also.iter().flat_map(|(c, all)| all.iter().map(|&at| (at, c.key())));
    let mut used: Vec<(usize, &'static str)> = mapping
        .cells
        .iter()
        .map(|(column, &at)| (at, column.key()))
        .chain(also)
        .chain(mapping.unused.iter().map(|(at, _)| (*at, "")))
        .chain((0..header.len()).filter_map(|at| Some((at, mapping.open.key(at)?))))
        .collect();
    used.sort_unstable();
    let text = |at: usize| header.get(at).unwrap_or_default().trim().to_owned();
    used.into_iter().map(|(at, column)| Described { header: text(at), column }).collect()
}
