//! The page after `check`: what was read, what was not used and why, and what to do now. No fits.

use std::collections::BTreeMap;

use super::read_as::read_as;
use super::to_do::to_do;
use super::{PageOptions, account, arrival, heading};
use crate::findings::{Arrival, LedgerRow, Note, RunFacts, SiteFacts};
use crate::ledger::{Outcome, Told};
use crate::words::caution::caution;
use crate::words::clean::{shell_word, shown, shown_short};
use crate::words::fate;
use crate::words::layout::{Align, HARD_SPACE, Lines};
use crate::words::number::{count, counted};

/// Longest text of a cell that an example quotes.
const QUOTED: usize = 40;
/// Notes that the page shows.
const NOTES_SHOWN: usize = 20;
/// Files that the page lists.
const FILES_SHOWN: usize = 8;
/// Reasons of one outcome that the first screen names.
const REASONS_IN_SHORT: usize = 5;

/// What a check found out.
#[derive(Clone, Copy, Debug)]
pub struct CheckFacts<'a> {
    /// What was run, on what.
    pub run: &'a RunFacts,
    /// The site.
    pub site: &'a SiteFacts,
    /// What is told once.
    pub notes: &'a [Note],
    /// What was found out about the data before any fit.
    pub arrival: &'a Arrival,
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

/// The page: what was read, what was not used and what to do now stand first.
#[must_use]
pub fn check(facts: &CheckFacts<'_>, options: &PageOptions<'_>) -> String {
    let mut lines = Lines::new(options.width, options.color);
    lines.title(&heading("Check", facts.run, facts.site));
    lines.heading("What was read");
    account::read(&mut lines, facts.run);
    files(&mut lines, facts.run);
    not_used_in_short(&mut lines, facts.run);
    let next = format!("ebbwell review {}", shell_word(options.site_argument));
    to_do(&mut lines, facts.run, facts.arrival, &next);
    arrival::suspicions(&mut lines, facts.run, facts.arrival);
    arrival::quality(&mut lines, facts.run, facts.arrival);
    arrival::completeness(&mut lines, facts.arrival);
    not_used(&mut lines, facts);
    read_as(&mut lines, facts.run);
    let notes: Vec<Note> = facts.notes.iter().filter(|n| !is_said_above(n)).cloned().collect();
    account::notes(&mut lines, &notes, NOTES_SHOWN);
    lines.blank();
    if let Some(folder) = options.folder {
        lines.line(&format!("Written to  {}", shown(folder)));
    }
    lines.blank();
    lines.paragraph(&caution(facts.site), 0);
    lines.finish()
}

/// Whether a section of the page says it already.
fn is_said_above(note: &Note) -> bool {
    matches!(
        note.told,
        Told::Suspected { .. }
            | Told::AnalyteJoined { .. }
            | Told::WellAlias { .. }
            | Told::FractionAssumed { .. }
            | Told::Converted { .. }
    )
}

/// One line a file, the largest first where there are many.
fn files(lines: &mut Lines, run: &RunFacts) {
    let mut places: Vec<usize> = (0..run.files.len()).collect();
    let left = places.len().saturating_sub(FILES_SHOWN);
    if left > 0 {
        places.sort_by_key(|&at| std::cmp::Reverse(run.files[at].records));
        places.truncate(FILES_SHOWN);
    }
    let rows: Vec<Vec<String>> = places
        .into_iter()
        .map(|at| &run.files[at])
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
    if left > 0 {
        lines.aside(&format!("and {}; run.json lists them all", counted(left, "file", "files")), 4);
    }
}

/// One line an outcome: its reasons in short.
fn not_used_in_short(lines: &mut Lines, run: &RunFacts) {
    let outcomes: Vec<Outcome> =
        Outcome::ALL.iter().copied().filter(|outcome| *outcome != Outcome::Used).collect();
    if outcomes.iter().all(|outcome| account::total(run, *outcome) == 0) {
        return;
    }
    lines.heading("What was not used");
    for outcome in outcomes.into_iter().rev() {
        let reasons = account::reasons(run, outcome);
        if reasons.is_empty() {
            continue;
        }
        let left = reasons.len().saturating_sub(REASONS_IN_SHORT);
        let mut said: Vec<String> = reasons
            .iter()
            .take(REASONS_IN_SHORT)
            .map(|reason| format!("{} {}", count(reason.records), reason.reason))
            .map(|text| shown(&text))
            .collect();
        if left > 0 {
            said.push(counted(left, "more reason", "more reasons"));
        }
        let total = count(account::total(run, outcome));
        let what = fate::outcome(outcome);
        lines.hanging(&format!("{total} {what}: {}", said.join(", ")), 2, 4);
    }
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
        format!("{}, {}:{}", shown(&row.file), shown(&row.sheet), shown(&row.record))
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
