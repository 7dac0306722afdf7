//! A file's bytes become tables: grids of cells first, then records.
//!
//! Two things vary independently. Bytes are delimited text or a workbook, and give a grid of cells
//! (a workbook one a sheet). A grid is long, one result a line, or a cross-tab, one result a cell.
//! Each is a file here; what comes out is a [`Table`] of canonical records that know where they
//! stand, and nothing after it knows which layout it was.

mod archive;
mod cell;
pub mod cross_tab;
mod delimited;
mod long;
mod merged;
mod workbook;

use csv::StringRecord;

use super::address;
use super::decode::decode;
use super::source::Found;
use super::split::Line;
use super::table::Table;
use crate::ledger::{TableProblem, Told, WorkbookProblem};
use crate::site::{Layout, ResultsRule, Site};

/// The rows of one text or sheet.
#[derive(Clone, Debug)]
pub struct Grid {
    /// The sheet; empty for a text.
    pub sheet: String,
    /// Whether the sheet is hidden.
    pub hidden: bool,
    /// Rows that are not empty, in order.
    pub lines: Vec<Line>,
    /// Empty rows between them.
    pub blank: usize,
}

/// Everything that a file held.
#[derive(Clone, Debug)]
pub struct Contents {
    /// Its tables in the order of its sheets.
    pub tables: Vec<Table>,
    /// Sheets that should be tables and could not be read.
    pub refused: Vec<(String, TableProblem)>,
    /// What is told about the file.
    pub told: Vec<Told>,
    /// How it was decoded.
    pub encoding: &'static str,
}

/// Reads a file.
///
/// # Errors
/// [`TableProblem`] where the file holds no table that can be read.
pub fn read(file: &Found, rule: &ResultsRule, site: &Site) -> Result<Contents, TableProblem> {
    if workbook::is_ole(&file.bytes) {
        return Err(TableProblem::Workbook(workbook::ole_problem(&file.bytes)));
    }
    if file.bytes.starts_with(b"PAR1") {
        return Err(TableProblem::Workbook(WorkbookProblem::OtherFormat { format: "parquet" }));
    }
    if workbook::is_archive(&file.bytes) {
        return sheets(file, rule, site);
    }
    let decoded = decode(&file.bytes, rule.encoding).map_err(TableProblem::NotText)?;
    let grid = delimited::grid(&decoded.text, rule, site);
    let told = decoded
        .guessed_at_line
        .map(|line| Told::DecodedWindows1252 { file: file.name.clone(), line });
    Ok(Contents {
        tables: vec![table(&file.name, grid, rule, site)?],
        refused: Vec::new(),
        told: told.into_iter().collect(),
        encoding: decoded.encoding,
    })
}

/// The sheets of a workbook: those that hold tables are read, the others told.
fn sheets(file: &Found, rule: &ResultsRule, site: &Site) -> Result<Contents, TableProblem> {
    let grids = workbook::grids(&file.bytes, rule.decimal).map_err(TableProblem::Workbook)?;
    if let Some(declared) = &rule.sheet
        && !grids.iter().any(|grid| grid.sheet == *declared)
    {
        let found = grids.into_iter().map(|grid| grid.sheet).collect();
        return Err(TableProblem::NoSuchSheet { declared: declared.clone(), found });
    }
    let mut contents =
        Contents { tables: Vec::new(), refused: Vec::new(), told: Vec::new(), encoding: "xlsx" };
    let mut no_tables = Vec::new();
    for grid in grids {
        let (sheet, hidden) = (grid.sheet.clone(), grid.hidden);
        let name = address::table(&file.name, &sheet);
        if rule.sheet.as_ref().is_some_and(|declared| *declared != sheet) {
            contents.told.push(Told::SheetLeftAlone { table: name });
            continue;
        }
        match table(&file.name, grid, rule, site) {
            Ok(table) => {
                if hidden {
                    contents.told.push(Told::SheetHidden { table: name });
                }
                contents.tables.push(table);
            }
            Err(problem) if is_no_table(&problem) && rule.sheet.is_none() => {
                no_tables.push((sheet, name, problem));
            }
            Err(problem) => contents.refused.push((sheet, problem)),
        }
    }
    if contents.tables.is_empty() {
        // The first sheet that should be a table, else the first of all, says why there is none.
        let first = no_tables.into_iter().map(|(sheet, _, problem)| (sheet, problem)).next();
        return Err(match contents.refused.into_iter().next().or(first) {
            Some((sheet, problem)) => TableProblem::Sheet { sheet, problem: Box::new(problem) },
            None => TableProblem::NotText(crate::ledger::NotText::Empty),
        });
    }
    contents.told.extend(no_tables.into_iter().map(|(_, table, _)| Told::SheetLeftAlone { table }));
    Ok(contents)
}

/// Whether a sheet is of another kind: cover pages, legends and charts have few of our columns.
fn is_no_table(problem: &TableProblem) -> bool {
    /// A sheet that lacks more of the five required columns than this is no table (judgement).
    const MOST_LACKING: usize = 2;
    match problem {
        TableProblem::NoHeader { lacks, .. } => lacks.len() > MOST_LACKING,
        TableProblem::DeclaredMissing { .. } => true,
        _ => false,
    }
}

/// One grid as a table, in the declared layout or the one that it shows.
fn table(file: &str, grid: Grid, rule: &ResultsRule, site: &Site) -> Result<Table, TableProblem> {
    match rule.layout {
        Some(Layout::Long) => {
            let head = long::header(&grid.lines, rule)?;
            long::table(file, grid, rule, head)
        }
        Some(Layout::CrossTab) => match cross_tab::table(file, &grid, rule, site) {
            Ok(Some(table)) => Ok(table),
            Ok(None) => Err(TableProblem::CrossTab(crate::ledger::CrossTabProblem::NoHead)),
            Err(problem) => Err(TableProblem::CrossTab(problem)),
        },
        None => match long::header(&grid.lines, rule) {
            Ok(head) => long::table(file, grid, rule, head),
            Err(no_header) => match cross_tab::table(file, &grid, rule, site) {
                Ok(Some(table)) => Ok(table),
                Ok(None) => Err(no_header),
                Err(problem) => Err(TableProblem::CrossTab(problem)),
            },
        },
    }
}

/// A cell on one line: line breaks and runs of blanks are one blank.
fn one_line(cell: &str) -> String {
    cell.split_whitespace().collect::<Vec<_>>().join(" ")
}

/// The cells of a line on one line each, without those that a merged cell filled across.
fn own_cells(line: &Line) -> Vec<String> {
    let mut cells: Vec<String> = line.cells.iter().map(one_line).collect();
    for filled in line.filled.iter().filter(|filled| filled.across) {
        if let Some(cell) = cells.get_mut(filled.column as usize) {
            cell.clear();
        }
    }
    cells
}

/// A line with some cells emptied.
fn emptied(line: &mut Line, out: impl Fn(u32) -> bool) {
    let cells = line.cells.iter().zip(0_u32..);
    line.cells = cells.map(|(cell, at)| if out(at) { "" } else { cell }).collect::<StringRecord>();
}
