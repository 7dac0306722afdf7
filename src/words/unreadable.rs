//! Why a file gave no records, and what to do about it.

use super::clean::{shown, shown_short};
use crate::ledger::{NotText, SourceError, TableProblem};
use crate::site::Column;

/// A cell in a message is cut at this many characters.
const CELL: usize = 40;
/// A message names at most this many headers.
const HEADERS: usize = 12;

/// What was found, what was expected, and the next step.
#[must_use]
pub fn why(problem: &TableProblem) -> String {
    match problem {
        TableProblem::Source(SourceError::Io { why, .. }) => {
            format!("it could not be read: {}; check its name and its permissions", shown(why))
        }
        TableProblem::Source(SourceError::GivenTwice { same_as, .. }) => format!(
            "its bytes are those of {}; one of the two was read, take the other away",
            shown(same_as)
        ),
        TableProblem::Source(SourceError::OtherKind { .. }) => {
            "a workbook or another binary table, which this version does not read; save each \
             sheet as CSV (UTF-8) and put that in its place"
                .to_owned()
        }
        TableProblem::NotText(NotText::Empty) => {
            "the file is empty; expected a header and results below it; ask for it again".to_owned()
        }
        TableProblem::NotText(NotText::Binary { byte }) => format!(
            "byte {byte} is NUL, so it is no delimited text; expected CSV. If it is UTF-16 \
             without a mark, declare encoding = \"utf-16le\" in [[results]]"
        ),
        TableProblem::NotText(NotText::Malformed { declared }) => format!(
            "its bytes are not {declared}, which [[results]] declares; correct encoding or take \
             the key away"
        ),
        TableProblem::NoHeader { lacks, found } => format!(
            "line 1 has no column for {}; found {}; expected headers such as Well, Analyte, Date, \
             Result, Unit. Name them in [[results]] columns = {{ {} = \"their header\" }}",
            listed(lacks.iter().map(|column| column.key())),
            headers(found),
            lacks.first().map_or("well", |column| column.key()),
        ),
        TableProblem::DeclaredMissing { missing, found } => format!(
            "line 1 lacks {}, which [[results]] columns declares; found {}; correct the \
             declaration or limit it to the files that have the header",
            listed(missing.iter().map(|(column, header)| {
                format!("{:?} (as {})", shown_short(header, CELL), column.key())
            })),
            headers(found),
        ),
        TableProblem::ColumnsDiffer { column, headers, line, cells } => format!(
            "columns {:?} and {:?} both mean {} and differ on line {line} ({:?} and {:?}); say \
             which one counts: [[results]] columns = {{ {} = {:?} }}",
            shown_short(&headers[0], CELL),
            shown_short(&headers[1], CELL),
            column_word(*column),
            shown_short(&cells[0], CELL),
            shown_short(&cells[1], CELL),
            column.key(),
            shown_short(&headers[0], CELL),
        ),
    }
}

fn column_word(column: Column) -> String {
    column.key().replace('_', " ")
}

fn headers(found: &[String]) -> String {
    let more = found.len().saturating_sub(HEADERS);
    let mut text =
        listed(found.iter().take(HEADERS).map(|header| format!("{:?}", shown_short(header, CELL))));
    if more > 0 {
        text.push_str(&format!(" and {more} more"));
    }
    if text.is_empty() { "nothing".to_owned() } else { text }
}

fn listed<T: ToString>(items: impl Iterator<Item = T>) -> String {
    items.map(|item| item.to_string()).collect::<Vec<_>>().join(", ")
}
