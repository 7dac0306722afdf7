//! Grids of cells, written as text or as a workbook.

use rust_xlsxwriter::{ExcelDateTime, Format, Workbook};

/// A cell.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum Cell {
    Empty,
    Text(String),
    Number(f64),
    Date(u16, u8, u8),
}

impl From<&str> for Cell {
    fn from(text: &str) -> Self {
        if text.is_empty() { Self::Empty } else { Self::Text(text.to_owned()) }
    }
}

impl Cell {
    pub(super) fn text(&self) -> String {
        match self {
            Self::Empty => String::new(),
            Self::Text(text) => text.clone(),
            Self::Number(number) => number.to_string(),
            Self::Date(year, month, day) => format!("{year}-{month:02}-{day:02}"),
        }
    }
}

pub(super) type Grid = Vec<Vec<Cell>>;

/// A row of texts.
pub(super) fn row(cells: &[&str]) -> Vec<Cell> {
    cells.iter().map(|cell| (*cell).into()).collect()
}

pub(super) fn csv(grid: &Grid) -> Vec<u8> {
    let mut writer = csv::WriterBuilder::new().flexible(true).from_writer(Vec::new());
    for row in grid {
        let cells: Vec<String> = row.iter().map(Cell::text).collect();
        writer
            .write_record(if cells.is_empty() { vec![String::new()] } else { cells })
            .expect("in memory");
    }
    writer.into_inner().expect("in memory")
}

/// How cells are written into a workbook.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Typed {
    /// Numbers and dates as such.
    Yes,
    /// Everything as text.
    No,
}

pub(super) fn add_sheet(book: &mut Workbook, name: &str, grid: &Grid, typed: Typed) {
    let sheet = book.add_worksheet();
    sheet.set_name(name).expect("a sheet's name");
    let format = Format::new().set_num_format("dd/mm/yyyy");
    for (at, row) in (0..).zip(grid) {
        for (column, cell) in (0..).zip(row) {
            let written = match (cell, typed) {
                (Cell::Empty, _) => continue,
                (Cell::Number(number), Typed::Yes) => sheet.write_number(at, column, *number),
                (Cell::Date(year, month, day), Typed::Yes) => {
                    let date = ExcelDateTime::from_ymd(*year, *month, *day).expect("a date");
                    sheet.write_datetime_with_format(at, column, &date, &format)
                }
                (cell, _) => sheet.write_string(at, column, cell.text()),
            };
            written.expect("a cell");
        }
    }
}

pub(super) fn xlsx(sheets: &[(&str, &Grid)], typed: Typed) -> Vec<u8> {
    let mut book = Workbook::new();
    for (name, grid) in sheets {
        add_sheet(&mut book, name, grid, typed);
    }
    book.save_to_buffer().expect("a workbook")
}
