//! Why a file gave no records, and what to do about it.

use super::clean::{shown, shown_short};
use super::workbook;
use crate::ledger::{CrossTabProblem, NotText, SourceError, TableProblem};
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
        TableProblem::NoHeader { line, lacks, found } => format!(
            "line {line} has no column for {}; found {}; expected headers such as Well, Analyte, Date, \
             Result, Unit. Name them in [[results]] columns = {{ {} = \"their header\" }}",
            listed(lacks.iter().map(|column| column.key())),
            headers(found),
            lacks.first().map_or("well", |column| column.key()),
        ),
        TableProblem::DeclaredMissing { line, missing, found } => format!(
            "line {line} lacks {}, which [[results]] columns declares; found {}; correct the \
             declaration or limit it to the files that have the header",
            listed(missing.iter().map(|(column, header)| {
                format!("{:?} (as {})", shown_short(header, CELL), column.key())
            })),
            headers(found),
        ),
        TableProblem::CrossTab(problem) => cross_tab(problem),
        TableProblem::Workbook(problem) => workbook::why(problem),
        TableProblem::NoSuchSheet { declared, found } => format!(
            "it has no sheet {:?} with cells, which [[results]] sheet declares; found {}; correct \
             the name or take the key away",
            shown_short(declared, CELL),
            headers(found),
        ),
        TableProblem::Sheet { sheet, problem } => {
            format!("sheet {:?}: {}", shown_short(sheet, CELL), why(problem))
        }
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

/// Why a cross-tab cannot be read, and the key that settles it.
fn cross_tab(problem: &CrossTabProblem) -> String {
    match problem {
        CrossTabProblem::NoHead => "[[results]] declares a cross-tab, and no row near the top \
             heads columns of dates, wells or analytes; expected a row such as Well, 2024-03-05, \
             2024-06-05. Correct layout, or name the columns at the left in [[results]] columns"
            .to_owned(),
        CrossTabProblem::Lacks { line, across, lacks, found } => {
            let step = match lacks {
                Column::Analyte => "Write the analyte with its unit, such as Benzene (ug/L), in a \
                     row above, or name the column that holds analytes: [[results]] layout = \
                     \"cross-tab\", columns = { analyte = \"its header\" }"
                    .to_owned(),
                lacks => format!(
                    "Name its column: [[results]] layout = \"cross-tab\", columns = {{ {} = \
                     \"its header\" }}",
                    lacks.key()
                ),
            };
            format!(
                "line {line} heads a cross-tab with {} across, and nothing says where the {} is; \
                 found {}. {step}",
                match across {
                    Column::Well => "wells",
                    Column::Analyte => "analytes",
                    _ => "dates",
                },
                column_word(*lacks),
                headers(found),
            )
        }
        CrossTabProblem::TwoTitles { lines, titles } => format!(
            "lines {} and {} above one block name two analytes, {:?} and {:?}; expected one. Take \
             one away, or name the column that holds analytes: [[results]] columns = {{ analyte = \
             \"its header\" }}",
            lines[0],
            lines[1],
            shown_short(&titles[0], CELL),
            shown_short(&titles[1], CELL),
        ),
        CrossTabProblem::LostTitle { line, text, repeats } => format!(
            "line {line}, {:?}, stands between lines {} and {}, which begin alike, so it seems to \
             name another analyte; expected a name that the site file lists, or one with its unit, \
             such as Benzene (ug/L)",
            shown_short(text, CELL),
            repeats[0],
            repeats[1],
        ),
        CrossTabProblem::LongNames { line } => format!(
            "up to line {line} the names at the left are many times as long as the results beside \
             them; expected names of wells and analytes. Take long texts out of the table"
        ),
        CrossTabProblem::SharedMark { line, header } => format!(
            "line {line}: column {:?} stands beside several results and does not say which of them \
             it marks; expected the mark in the result's cell (0.5 U). Ask for one result a line",
            shown_short(header, CELL),
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
