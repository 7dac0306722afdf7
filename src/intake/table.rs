//! A table: canonical records that know where they stand, and how its dates and numbers are written.

use csv::StringRecord;

use super::date::DateForm;
use super::date_order::proved;
use super::header::Mapping;
use super::number::NumberForm;
use super::split::Line;
use crate::ledger::{TableProblem, Told};
use crate::site::{Column, ResultsRule};

/// One text, or one sheet of a workbook, ready to be read record by record.
#[derive(Clone, Debug)]
pub struct Table {
    /// The file's shown path.
    pub name: String,
    /// The sheet; empty for a text.
    pub sheet: String,
    /// Which cells hold which columns.
    pub mapping: Mapping,
    /// The header's cells.
    pub header: StringRecord,
    /// The records.
    pub lines: Vec<Line>,
    /// Lines whose cells are all empty.
    pub blank: usize,
    /// Empty cells of a cross-tab.
    pub empty_cells: usize,
    /// Which header was read as which column.
    pub described: Vec<Described>,
    /// What is told about the table.
    pub told: Vec<Told>,
    /// How dates are written.
    pub dates: DateForm,
    /// How numbers are written.
    pub numbers: NumberForm,
}

/// One header and the column it was read as.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Described {
    /// As written.
    pub header: String,
    /// The column's key; empty where it is not used.
    pub column: &'static str,
}

/// How a table's dates are written: as declared, else as the whole column proves.
#[must_use]
pub fn date_form<'a>(rule: &ResultsRule, column: impl Iterator<Item = &'a str>) -> DateForm {
    DateForm {
        order: rule.date_order.or_else(|| proved(column)),
        two_digit_years: rule.two_digit_years,
        serials: rule.serial_dates,
    }
}

/// How a table's numbers are written, as declared.
#[must_use]
pub fn number_form(rule: &ResultsRule) -> NumberForm {
    NumberForm { decimal: rule.decimal, thousands: rule.thousands }
}

/// Two columns of one meaning may stand beside each other only where they never differ; two
/// qualifier columns are both read.
///
/// # Errors
/// [`TableProblem::ColumnsDiffer`] at the first line where they differ.
pub fn agreement(
    lines: &[Line],
    mapping: &Mapping,
    header: &StringRecord,
) -> Result<(), TableProblem> {
    let cell = |line: &Line, at: usize| line.cells.get(at).unwrap_or_default().trim().to_owned();
    for (&column, others) in mapping.also.iter().filter(|(c, _)| **c != Column::Qualifier) {
        let first = mapping.cells[&column];
        for &other in others {
            let differs = lines.iter().find(|line| cell(line, first) != cell(line, other));
            if let Some(line) = differs {
                let name = |at: usize| header.get(at).unwrap_or_default().trim().to_owned();
                return Err(TableProblem::ColumnsDiffer {
                    column,
                    headers: [name(first), name(other)],
                    line: line.line,
                    cells: [cell(line, first), cell(line, other)],
                });
            }
        }
    }
    Ok(())
}

impl Table {
    /// The trimmed cell of a column in a line, empty where the file has no such column or cell.
    #[must_use]
    pub fn cell<'a>(&self, line: &'a Line, column: Column) -> &'a str {
        let at = self.mapping.cells.get(&column);
        at.and_then(|&at| line.cells.get(at)).unwrap_or_default().trim()
    }

    /// All qualifier cells of a line as one text.
    #[must_use]
    pub fn qualifiers(&self, line: &Line) -> String {
        let mut text = self.cell(line, Column::Qualifier).to_owned();
        for &at in self.mapping.also.get(&Column::Qualifier).into_iter().flatten() {
            let more = line.cells.get(at).unwrap_or_default().trim();
            if !more.is_empty() {
                text.push(' ');
                text.push_str(more);
            }
        }
        text.trim().to_owned()
    }

    /// Whether a cell that the record needs holds a spreadsheet's error, such as `#N/A`.
    #[must_use]
    pub fn holds_error(&self, line: &Line) -> bool {
        /// Columns that are carried along and decide nothing.
        const CARRIED: [Column; 3] = [Column::Lab, Column::Batch, Column::Time];
        let needed = self.mapping.cells.iter().filter(|(column, _)| !CARRIED.contains(column));
        needed.filter_map(|(_, at)| line.cells.get(*at)).any(is_cell_error)
    }

    /// Whether a line lacks a required cell, has a filled one past the header, or runs over so
    /// many lines that a quote was opened and not closed.
    #[must_use]
    pub fn is_ragged(&self, line: &Line) -> bool {
        /// A cell of this many lines is a lost quote rather than a comment (judgement).
        const LOST_QUOTE: u64 = 100;
        let width = self.header.len();
        let short = super::header::REQUIRED
            .iter()
            .filter_map(|column| self.mapping.cells.get(column))
            .any(|&at| at >= line.cells.len());
        let surplus = line.cells.iter().skip(width).any(|cell| !cell.trim().is_empty());
        short || surplus || line.spans > LOST_QUOTE
    }
}

/// Whether a text is what spreadsheets show for a formula that failed.
fn is_cell_error(cell: &str) -> bool {
    const ERRORS: [&str; 9] = [
        "#N/A",
        "#DIV/0!",
        "#NAME?",
        "#NULL!",
        "#NUM!",
        "#REF!",
        "#VALUE!",
        "#DATA!",
        "#GETTING_DATA",
    ];
    let cell = cell.trim();
    cell.starts_with('#') && ERRORS.contains(&cell)
}
