//! One file as a table: decoded, split, its header matched, its date order settled.

use csv::StringRecord;

use super::date::DateForm;
use super::date_order::proved;
use super::decode::decode;
use super::header::{Mapping, mapping};
use super::number::NumberForm;
use super::source::Found;
use super::split::{Line, Lines, split};
use crate::ledger::TableProblem;
use crate::site::{Column, ResultsRule};

/// A results file, ready to be read record by record.
#[derive(Clone, Debug)]
pub struct Table {
    /// The shown path.
    pub name: String,
    /// Which cells hold which columns.
    pub mapping: Mapping,
    /// The header's cells.
    pub header: StringRecord,
    /// The records below the header.
    pub lines: Vec<Line>,
    /// Lines whose cells are all empty.
    pub blank: usize,
    /// How it was decoded.
    pub encoding: &'static str,
    /// The line from which windows-1252 was guessed.
    pub guessed_at_line: Option<u64>,
    /// How dates are written.
    pub dates: DateForm,
    /// How numbers are written.
    pub numbers: NumberForm,
}

/// Reads a file as a table by its rule.
///
/// # Errors
/// [`TableProblem`] where the bytes are no text or the first line is no header.
pub fn table(file: &Found, rule: &ResultsRule) -> Result<Table, TableProblem> {
    let decoded = decode(&file.bytes, rule.encoding).map_err(TableProblem::NotText)?;
    let (mut split, mapping) = best_split(&decoded.text, rule)?;
    let header = split.lines.remove(0).cells;
    agreement(&split.lines, &mapping, &header)?;
    let order = rule.date_order.or_else(|| {
        let at = mapping.cells.get(&Column::Date).copied();
        proved(split.lines.iter().filter_map(|line| line.cells.get(at?)))
    });
    Ok(Table {
        name: file.name.clone(),
        mapping,
        header,
        lines: split.lines,
        blank: split.blank,
        encoding: decoded.encoding,
        guessed_at_line: decoded.guessed_at_line,
        dates: DateForm {
            order,
            two_digit_years: rule.two_digit_years,
            serials: rule.serial_dates,
        },
        numbers: NumberForm { decimal: rule.decimal, thousands: rule.thousands },
    })
}

/// Splits by the declared separator, else by the one whose first line is the best header.
fn best_split(text: &str, rule: &ResultsRule) -> Result<(Lines, Mapping), TableProblem> {
    const SEPARATORS: [u8; 3] = [b',', b';', b'\t'];
    let first_line = text.trim_start().lines().next().unwrap_or_default();
    let headers = |separator: u8| -> Vec<String> {
        let lines = split(first_line, separator).lines;
        lines.first().map(|l| l.cells.iter().map(str::to_owned).collect()).unwrap_or_default()
    };
    let matched =
        |separator: u8| mapping(headers(separator).iter().map(String::as_str), &rule.columns);
    let separator = rule.separator.unwrap_or_else(|| {
        let score = |separator: u8| match matched(separator) {
            Ok(mapping) => (usize::MAX - mapping.lacks().len(), headers(separator).len()),
            Err(_) => (0, headers(separator).len()),
        };
        // The first of equals, so that a comma wins where nothing speaks for another.
        SEPARATORS.into_iter().rev().max_by_key(|&separator| score(separator)).unwrap_or(b',')
    });
    let split = split(text, separator);
    let found: Vec<String> = split
        .lines
        .first()
        .map(|line| line.cells.iter().map(|cell| cell.trim().to_owned()).collect())
        .unwrap_or_default();
    let mapping = mapping(found.iter().map(String::as_str), &rule.columns).map_err(|missing| {
        TableProblem::DeclaredMissing {
            missing: missing.into_iter().map(|m| (m.column, m.header)).collect(),
            found: found.clone(),
        }
    })?;
    let lacks = mapping.lacks();
    if lacks.is_empty() {
        Ok((split, mapping))
    } else {
        Err(TableProblem::NoHeader { lacks, found })
    }
}

/// Two columns of one meaning may stand beside each other only where they never differ; two
/// qualifier columns are both read.
fn agreement(lines: &[Line], mapping: &Mapping, header: &StringRecord) -> Result<(), TableProblem> {
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
