//! What was found out on arrival: suspicions, the quality of the data, completeness.

use crate::findings::{Arrival, RunFacts};
use crate::ledger::told::Suspicion;
use crate::series::Sentinel;
use crate::series::completeness::Asked;
use crate::words::layout::Lines;
use crate::words::number::{count, counted};
use crate::words::{completeness, quality, round, suspicion};

/// How many examples of each kind a page names.
const NAMED: usize = 3;

/// What is suspected, a kind after the other; what only the quality of the data tells is left to
/// that section.
pub fn suspicions(lines: &mut Lines, run: &RunFacts, arrival: &Arrival) {
    let kinds: Vec<(Suspicion, Vec<&Sentinel>)> = Suspicion::ALL
        .iter()
        .filter(|kind| **kind != Suspicion::LimitOverLimit)
        .map(|&kind| (kind, newest_first(arrival, kind)))
        .filter(|(_, of)| !of.is_empty())
        .collect();
    lines.heading("Looked at on arrival");
    if kinds.is_empty() {
        lines.paragraph(
            "No unit slip, no exchanged wells or dates, no replaced non-detect, no copied batch and \
             no gap in a panel was found.",
            2,
        );
    }
    for (kind, of) in kinds {
        let now = of.iter().filter(|one| is_of_the_round(one, arrival, run)).count();
        let now = match kind {
            Suspicion::MissingFromPanel => format!(", {} of them in this round", count(now)),
            _ => String::new(),
        };
        let label = suspicion::label(kind);
        lines.hanging(&format!("{}  {label}{now} [{}]", count(of.len()), kind.code()), 2, 6);
        examples(lines, of.len(), of.iter().map(|one| suspicion::sentence(one, arrival)));
        lines.hanging(&format!("do: {}", suspicion::step(kind)), 6, 8);
    }
}

/// Whether a sentinel is dated in the round of the as-of date.
fn is_of_the_round(one: &Sentinel, arrival: &Arrival, run: &RunFacts) -> bool {
    let label = |date| round::label(date, arrival.round);
    one.date.is_some_and(|date| label(date) == label(run.as_of))
}

/// The sentinels of a kind, those of the newest date first.
fn newest_first(arrival: &Arrival, kind: Suspicion) -> Vec<&Sentinel> {
    let mut of: Vec<&Sentinel> = arrival.of(kind).collect();
    of.sort_by_key(|one| std::cmp::Reverse(one.date));
    of
}

/// The statement on quality, with a few pairs, blanks and non-detects by name.
pub fn quality(lines: &mut Lines, run: &RunFacts, arrival: &Arrival) {
    lines.heading("Quality of the data");
    let found = &arrival.quality;
    for paragraph in quality::statement(arrival, run.rpd_allowed) {
        lines.hanging(&paragraph, 2, 4);
    }
    let part = |lines: &mut Lines, what: &str, n: usize, said: Vec<String>| {
        if n > 0 {
            lines.hanging(what, 2, 4);
            examples(lines, n, said.into_iter());
        }
    };
    let pairs = &found.duplicates.differing;
    let said = pairs.iter().take(NAMED).map(|one| quality::differing(one, arrival));
    part(lines, "Duplicates over the criterion:", pairs.len(), said.collect());
    let blanks = &found.blanks.detects;
    let said = blanks.iter().take(NAMED).map(|one| quality::blank(one, arrival));
    part(lines, "Found in blanks:", blanks.len(), said.collect());
    let back = &found.send_back;
    let said = back.iter().take(NAMED).map(|one| quality::send_back(one, arrival));
    part(lines, "To send back to the laboratory, the newest first:", back.len(), said.collect());
}

/// What the rounds hold of what they should.
pub fn completeness(lines: &mut Lines, arrival: &Arrival) {
    /// How many wells with a gap the page names.
    const WELLS: usize = 8;
    lines.heading("Completeness");
    for paragraph in completeness::statement(arrival) {
        lines.hanging(&paragraph, 2, 4);
    }
    if arrival.completeness.asked == Asked::No {
        return;
    }
    let lacking = completeness::lacking(arrival);
    for line in lacking.iter().take(WELLS) {
        lines.hanging(line, 6, 8);
    }
    more(lines, lacking.len().saturating_sub(WELLS), "line", "lines");
}

/// At most a few sentences, and how many more there are.
fn examples(lines: &mut Lines, all: usize, sentences: impl Iterator<Item = String>) {
    for sentence in sentences.take(NAMED) {
        lines.hanging(&sentence, 6, 8);
    }
    more(lines, all.saturating_sub(NAMED), "other", "others");
}

fn more(lines: &mut Lines, left: usize, one: &str, many: &str) {
    if left > 0 {
        lines.aside(&format!("and {}; --json lists them all", counted(left, one, many)), 6);
    }
}
