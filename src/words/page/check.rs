//! The page after `check`: what was read, what was not used and why, and what to do now. No fits.

use std::collections::BTreeMap;

use super::{PageOptions, account, heading};
use crate::findings::{LedgerRow, Note, RunFacts, SiteFacts};
use crate::ledger::Outcome;
use crate::words::caution::caution;
use crate::words::clean::{shell_word, shown, shown_short};
use crate::words::fate;
use crate::words::layout::{Align, HARD_SPACE, Lines};
use crate::words::number::{count, counted};

/// Longest text of a cell that an example quotes.
const QUOTED: usize = 40;
/// Notes that the page shows.
const NOTES_SHOWN: usize = 60;

/// What a check found out.
#[derive(Clone, Copy, Debug)]
pub struct CheckFacts<'a> {
    /// What was run, on what.
    pub run: &'a RunFacts,
    /// The site.
    pub site: &'a SiteFacts,
    /// What is told once.
    pub notes: &'a [Note],
    /// Some records of each outcome and reason but `used`, in the order of the ledger.
    pub examples: &'a [LedgerRow],
}

/// The first `each` rows of every outcome and reason that is not `used`.
#[must_use]
pub fn examples(rows: impl IntoIterator<Item = LedgerRow>, each: usize) -> Vec<LedgerRow> {
    let mut seen: BTreeMap<(&'static str, String), usize> = BTreeMap::new();
    let used = Outcome::Used.code();
    rows.into_iter()
        .filter(|row| row.outcome != used)
        .filter(|row| {
            let so_far = seen.entry((row.outcome, row.reason.clone())).or_default();
            *so_far += 1;
            *so_far <= each
        })
        .collect()
}

/// The page.
#[must_use]
pub fn check(facts: &CheckFacts<'_>, options: &PageOptions<'_>) -> String {
    let mut lines = Lines::new(options.width, options.color);
    lines.title(&heading("Check", facts.run, facts.site));
    lines.heading("What was read");
    account::read(&mut lines, facts.run);
    files(&mut lines, facts.run);
    columns(&mut lines, facts.run);
    not_used(&mut lines, facts);
    account::notes(&mut lines, facts.notes, NOTES_SHOWN);
    lines.blank();
    if let Some(folder) = options.folder {
        lines.line(&format!("Written to  {}", shown(folder)));
    }
    lines.line(&format!("Next        ebbwell review {}", shell_word(options.site_argument)));
    lines.blank();
    lines.paragraph(&caution(facts.site), 0);
    lines.finish()
}

/// One line a file.
fn files(lines: &mut Lines, run: &RunFacts) {
    let rows: Vec<Vec<String>> = run
        .files
        .iter()
        .map(|file| {
            let blank = match file.blank_lines {
                0 => String::new(),
                n => format!(", {}", counted(n, "blank line", "blank lines")),
            };
            vec![
                shown(&file.name),
                counted(file.records, "record", "records"),
                format!("{}{blank}", file.encoding),
            ]
        })
        .collect();
    lines.rows(&rows, &[Align::Left, Align::Right, Align::Left], 4);
}

/// Which header was read as which column: one line for all files that agree.
fn columns(lines: &mut Lines, run: &RunFacts) {
    let mut of_table: BTreeMap<(&str, &str), Vec<String>> = BTreeMap::new();
    for mapped in run.mapping.iter().filter(|mapped| !mapped.column.is_empty()) {
        let read = of_table.entry((&mapped.file, &mapped.sheet)).or_default();
        read.push(pair(&mapped.header, &mapped.column));
    }
    let mut by_mapping: BTreeMap<Vec<String>, Vec<String>> = BTreeMap::new();
    for ((file, sheet), read) in of_table {
        let table = if sheet.is_empty() { file.to_owned() } else { format!("{file}:{sheet}") };
        by_mapping.entry(read).or_default().push(table);
    }
    if by_mapping.is_empty() {
        return;
    }
    lines.heading("Columns");
    for (read, files) in by_mapping {
        let files: Vec<String> = files.iter().map(|file| shown(file)).collect();
        lines.hanging(&format!("{}: {}", files.join(", "), read.join(", ")), 2, 4);
    }
}

/// `Sample Date = date`, or the name alone where both agree.
fn pair(header: &str, column: &str) -> String {
    if header == column { shown(column) } else { format!("{} = {column}", shown(header)) }
}

/// Every outcome but used: its reasons, each with examples and what to do.
fn not_used(lines: &mut Lines, facts: &CheckFacts<'_>) {
    for &outcome in Outcome::ALL.iter().filter(|outcome| **outcome != Outcome::Used) {
        let reasons = account::reasons(facts.run, outcome);
        if reasons.is_empty() {
            continue;
        }
        let total = count(account::total(facts.run, outcome));
        lines.heading(&format!("{total} {}", fate::outcome(outcome)));
        let gap = format!("{HARD_SPACE}{HARD_SPACE}");
        for reason in reasons {
            let what = fate::reason(reason.outcome, &reason.reason);
            lines.hanging(
                &format!("{}{gap}{what} [{}]", count(reason.records), shown(&reason.reason)),
                2,
                6,
            );
            let found = facts
                .examples
                .iter()
                .filter(|row| row.outcome == reason.outcome && row.reason == reason.reason);
            for row in found {
                lines.hanging(&example(row), 6, 8);
            }
            if let Some(step) = fate::what_to_do_by_code(&reason.reason) {
                lines.hanging(&format!("do: {step}"), 6, 8);
            }
        }
    }
}

/// One record: its place, whose result it is, and what stands there.
fn example(row: &LedgerRow) -> String {
    let place = if row.sheet.is_empty() {
        format!("{}:{}", shown(&row.file), shown(&row.record))
    } else {
        format!("{}:{}!{}", shown(&row.file), shown(&row.sheet), shown(&row.record))
    };
    let whose: Vec<String> =
        [&row.well, &row.analyte, &row.date, &row.reported, &row.unit, &row.qualifier]
            .into_iter()
            .filter(|text| !text.is_empty())
            .map(|text| shown_short(text, QUOTED))
            .collect();
    // What was told of a record that is fine as it stands would only crowd the page.
    let told = row.outcome == Outcome::SetAside.code() && !row.detail.is_empty();
    let detail = if told { format!(" ({})", shown(&row.detail)) } else { String::new() };
    format!("{place} {}{detail}", whose.join(", "))
}
