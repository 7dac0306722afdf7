//! The pages of `explain`: one word in full, or all words by kind.

use super::PageOptions;
use crate::words::explain::{Entry, Kind, all};
use crate::words::layout::Lines;

/// The entries of one word; a word may be both a column and a reason.
#[must_use]
pub fn explain(entries: &[Entry], options: &PageOptions<'_>) -> String {
    let mut lines = Lines::new(options.width, options.color);
    for entry in entries {
        lines.blank();
        let place =
            if entry.place.is_empty() { String::new() } else { format!(" of {}", entry.place) };
        lines.title(&format!("{} ({}{place})", entry.word, entry.kind.label()));
        lines.paragraph(entry.meaning, 2);
        if let Some(formula) = entry.formula {
            lines.hanging(&format!("Formula: {formula}"), 2, 4);
        }
        lines.hanging(&format!("Source: {}", entry.source), 2, 4);
    }
    lines.finish()
}

/// Every word that `explain` knows, by kind.
#[must_use]
pub fn index(options: &PageOptions<'_>) -> String {
    let mut lines = Lines::new(options.width, options.color);
    lines.paragraph(
        "ebbwell explain WORD tells the meaning, formula and source of any of these.",
        0,
    );
    let entries = all();
    for kind in Kind::ALL {
        let mut words: Vec<&str> =
            entries.iter().filter(|entry| entry.kind == *kind).map(|entry| entry.word).collect();
        words.dedup();
        lines.heading(kind.title());
        lines.paragraph(&words.join(", "), 2);
    }
    lines.finish()
}
