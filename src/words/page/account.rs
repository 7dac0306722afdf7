//! What was read and what was not used, shared by `review` and `check`.

use crate::findings::{Note, OutcomeCount, RunFacts};
use crate::ledger::Outcome;
use crate::words::clean::shown;
use crate::words::fate;
use crate::words::layout::{Align, HELD, Lines};
use crate::words::number::{count, counted};
use crate::words::told;

/// One paragraph: how many records in how many files, and how they ended.
pub fn read(lines: &mut Lines, run: &RunFacts) {
    let records: usize = run.files.iter().map(|file| file.records).sum();
    let ended: Vec<String> = Outcome::ALL
        .iter()
        .map(|&outcome| (outcome, total(run, outcome)))
        .filter(|(_, records)| *records > 0)
        .map(|(outcome, records)| {
            format!("{} {}", count(records), fate::outcome(outcome)).replace(' ', HELD)
        })
        .collect();
    let files = counted(run.files.len(), "file", "files");
    let text = format!("{} in {files}", counted(records, "record", "records"));
    let ended = if ended.is_empty() { String::new() } else { format!(": {}", ended.join(", ")) };
    lines.paragraph(&format!("{text}{ended}."), 2);
    for (file, why) in &run.unreadable {
        lines.hanging(&format!("{} could not be read: {}", shown(file), shown(why)), 2, 4);
    }
}

/// How many records ended in an outcome.
#[must_use]
pub fn total(run: &RunFacts, outcome: Outcome) -> usize {
    run.outcomes.iter().filter(|c| c.outcome == outcome.code()).map(|c| c.records).sum()
}

/// The reasons of one outcome, the commonest first.
#[must_use]
pub fn reasons(run: &RunFacts, outcome: Outcome) -> Vec<&OutcomeCount> {
    let mut counts: Vec<_> = run
        .outcomes
        .iter()
        .filter(|count| count.outcome == outcome.code() && count.records > 0)
        .collect();
    counts.sort_by(|a, b| b.records.cmp(&a.records).then_with(|| a.reason.cmp(&b.reason)));
    counts
}

/// The reasons of the records set aside, at most `most` of them, each with what to do about it.
pub fn set_aside(lines: &mut Lines, run: &RunFacts, most: usize) {
    let reasons = reasons(run, Outcome::SetAside);
    if reasons.is_empty() {
        return;
    }
    lines.paragraph("Set aside:", 2);
    let rows: Vec<Vec<String>> = reasons.iter().take(most).map(|count| aside(count)).collect();
    lines.rows(&rows, &[Align::Right, Align::Left], 4);
    if let Some(left) = reasons.len().checked_sub(most).filter(|left| *left > 0) {
        lines.paragraph(
            &format!(
                "and {} more; ledger.csv has every record",
                counted(left, "reason", "reasons")
            ),
            4,
        );
    }
}

fn aside(reason: &OutcomeCount) -> Vec<String> {
    let what = fate::reason(reason.outcome, &reason.reason);
    let step = fate::what_to_do_by_code(&reason.reason);
    let step = step.map_or_else(String::new, |step| format!(": {step}"));
    vec![count(reason.records), format!("{what}{step}")]
}

/// What is told once, the most important last; at most `most`, the lesser ones are counted.
pub fn notes(lines: &mut Lines, notes: &[Note], most: usize) {
    let mut said: Vec<Note> = notes.iter().filter(|note| note.told.is_said()).cloned().collect();
    if said.is_empty() {
        return;
    }
    told::sort_notes(&mut said);
    lines.heading("Said once (the most important last)");
    let lesser = said.len().saturating_sub(most);
    if lesser > 0 {
        let lesser = counted(lesser, "lesser note", "lesser notes");
        lines.aside(&format!("{lesser} in summary.json and ledger.csv"), 2);
    }
    for note in said.iter().skip(lesser) {
        lines.hanging(&told::sentence(&note.told, note.records), 2, 4);
    }
}
