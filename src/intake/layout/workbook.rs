//! A workbook becomes one grid a sheet, cell by cell; whole-sheet ranges, which a file of two cells
//! can make as large as it likes, are never asked for.

use std::io::Cursor;
use std::panic::{AssertUnwindSafe, catch_unwind};

use calamine::{Reader, SheetType, SheetVisible, Xlsx};
use csv::StringRecord;

use super::archive::{Weighed, weigh};
use super::merged::fill;
use super::{Grid, cell};
use crate::intake::split::Line;
use crate::ledger::{Cap, WorkbookProblem};
use crate::site::Decimal;

/// The rows of a sheet (ECMA-376: 1,048,576).
const MOST_ROWS: u64 = 1 << 20;
/// The columns of a sheet (ECMA-376: 16,384).
const MOST_COLUMNS: u64 = 1 << 14;
/// The most filled cells of a workbook: twice a sheet of a million rows of eight (judgement).
const MOST_CELLS: u64 = 16 << 20;
/// Bytes of text in all cells: any workbook may have this many and so many more for each byte it
/// unpacks to. A text shared by many cells is stored once, so a small file could hold any number
/// (judgement: the reference to a shared text is itself about 30 bytes).
const FREE_TEXT: u64 = 32 << 20;
const TEXT_A_BYTE: u64 = 4;
/// Places, filled or not, up to the last filled cell of each row: any workbook may have this many
/// and so many more for each filled cell. Tables fill most of their places (judgement).
const FREE_PLACES: u64 = 2 << 20;
const PLACES_A_CELL: u64 = 32;

/// Whether bytes are a zip archive, as workbooks are.
#[must_use]
pub fn is_archive(bytes: &[u8]) -> bool {
    bytes.starts_with(b"PK\x03\x04") || bytes.starts_with(b"PK\x05\x06")
}

/// Whether bytes are an OLE container: an old workbook, or a newer one under a password.
#[must_use]
pub fn is_ole(bytes: &[u8]) -> bool {
    bytes.starts_with(&[0xD0, 0xCF, 0x11, 0xE0, 0xA1, 0xB1, 0x1A, 0xE1])
}

/// What an OLE container holds: an encrypted package, or an old workbook.
#[must_use]
pub fn ole_problem(bytes: &[u8]) -> WorkbookProblem {
    let name: Vec<u8> = "EncryptedPackage".encode_utf16().flat_map(u16::to_le_bytes).collect();
    if bytes.windows(name.len()).any(|window| window == name) {
        WorkbookProblem::Locked
    } else {
        WorkbookProblem::OtherFormat { format: "xls" }
    }
}

/// Reads every sheet that has cells.
///
/// # Errors
/// [`WorkbookProblem`] where the archive is damaged, over a cap, or no workbook.
pub fn grids(bytes: &[u8], decimal: Decimal) -> Result<Vec<Grid>, WorkbookProblem> {
    let weighed = weigh(bytes)?;
    // The reader is not ours: should it panic on bytes it did not expect, this file is damaged and
    // the others are read.
    catch_unwind(AssertUnwindSafe(|| sheets(bytes, decimal, weighed))).unwrap_or_else(|_| {
        Err(WorkbookProblem::Damaged { why: "its parts contradict each other".to_owned() })
    })
}

fn sheets(bytes: &[u8], decimal: Decimal, weighed: Weighed) -> Result<Vec<Grid>, WorkbookProblem> {
    let mut book: Xlsx<_> = Xlsx::new(Cursor::new(bytes)).map_err(damaged)?;
    let listed: Vec<(String, bool)> = book
        .sheets_metadata()
        .iter()
        .filter(|sheet| sheet.typ == SheetType::WorkSheet)
        .map(|sheet| (sheet.name.clone(), sheet.visible != SheetVisible::Visible))
        .collect();
    let most_text = FREE_TEXT + TEXT_A_BYTE * weighed.unpacked;
    let mut budget = Budget { cells: 0, places: 0, text: 0, most_text };
    let mut grids = Vec::new();
    for (name, hidden) in listed {
        let mut grid = sheet(&mut book, name, decimal, &mut budget)?;
        grid.hidden = hidden;
        if weighed.merged && !grid.lines.is_empty() {
            let regions = book.merge_cells_by_sheet_name(&grid.sheet).map_err(damaged)?;
            fill(&mut grid.lines, &regions, &mut |text| budget.fill(text))?;
        }
        if !grid.lines.is_empty() {
            grids.push(grid);
        }
    }
    Ok(grids)
}

/// One sheet: its cells in their order, gaps filled with empty cells.
fn sheet(
    book: &mut Xlsx<Cursor<&[u8]>>,
    name: String,
    decimal: Decimal,
    budget: &mut Budget,
) -> Result<Grid, WorkbookProblem> {
    let mut cells = book.worksheet_cells_reader(&name).map_err(damaged)?;
    let mut rows = Rows::default();
    while let Some(cell) = cells.next_cell().map_err(damaged)? {
        let (row, column) = cell.get_position();
        let text = cell::text(cell.get_value(), decimal);
        if !text.trim().is_empty() {
            rows.add(row.into(), column.into(), &text, budget)?;
        }
    }
    drop(cells);
    let (lines, blank) = rows.finish();
    Ok(Grid { sheet: name, hidden: false, lines, blank })
}

/// Rows as they come.
#[derive(Default)]
struct Rows {
    lines: Vec<Line>,
    row: u64,
    cells: StringRecord,
}

impl Rows {
    fn add(
        &mut self,
        row: u64,
        column: u64,
        text: &str,
        budget: &mut Budget,
    ) -> Result<(), WorkbookProblem> {
        over(Cap::Rows, row + 1, MOST_ROWS)?;
        over(Cap::Columns, column + 1, MOST_COLUMNS)?;
        if row != self.row {
            self.close();
        }
        let filled = self.cells.len() as u64;
        if row < self.row || column < filled {
            let why = format!("row {} holds a cell out of its place", row + 1);
            return Err(WorkbookProblem::Damaged { why });
        }
        self.row = row;
        budget.cell(column + 1 - filled, text.len() as u64)?;
        for _ in filled..column {
            self.cells.push_field("");
        }
        self.cells.push_field(text);
        Ok(())
    }

    fn close(&mut self) {
        if !self.cells.is_empty() {
            self.lines.push(Line::whole(self.row + 1, std::mem::take(&mut self.cells)));
        }
    }

    /// The rows, and how many between the first and the last are blank.
    fn finish(mut self) -> (Vec<Line>, usize) {
        self.close();
        let span = match (self.lines.first(), self.lines.last()) {
            (Some(first), Some(last)) => last.line - first.line + 1,
            _ => 0,
        };
        let blank = usize::try_from(span).unwrap_or(usize::MAX) - self.lines.len();
        (self.lines, blank)
    }
}

/// What has been read of a workbook, held against the caps.
struct Budget {
    cells: u64,
    places: u64,
    text: u64,
    most_text: u64,
}

impl Budget {
    fn cell(&mut self, places: u64, text: u64) -> Result<(), WorkbookProblem> {
        self.cells += 1;
        over(Cap::Cells, self.cells, MOST_CELLS)?;
        self.text(text)?;
        self.places(places)
    }

    /// One place of a merged region, filled with so much text.
    fn fill(&mut self, text: u64) -> Result<(), WorkbookProblem> {
        self.text(text)?;
        self.places(1)
    }

    fn text(&mut self, more: u64) -> Result<(), WorkbookProblem> {
        self.text += more;
        over(Cap::TextBytes, self.text, self.most_text)
    }

    /// A sheet that is nearly all gaps would be as large as its corners are apart.
    fn places(&mut self, more: u64) -> Result<(), WorkbookProblem> {
        self.places = self.places.saturating_add(more);
        over(Cap::Places, self.places, FREE_PLACES + PLACES_A_CELL * self.cells)
    }
}

fn over(cap: Cap, found: u64, most: u64) -> Result<(), WorkbookProblem> {
    if found > most { Err(WorkbookProblem::OverCap { cap, found, most }) } else { Ok(()) }
}

fn damaged(error: calamine::XlsxError) -> WorkbookProblem {
    match error {
        calamine::XlsxError::Password => WorkbookProblem::Locked,
        other => WorkbookProblem::Damaged { why: other.to_string() },
    }
}
