//! Syntax errors of the site file, and which other problems only follow from them.
//!
//! The parser gives up the rest of a document at some errors. So a line that cannot be read is
//! blanked out, with every other byte in its place, and the rest is parsed again.

use std::ops::Range;

use toml::de::{DeTable, Error};

use super::problem::{Problem, ProblemKind};
use super::written::Problems;

/// How many unreadable lines are told at once; past that, mending them is the next step anyway.
const MOST: usize = 25;

/// A syntax error, and how far it reaches.
pub(super) struct Broken {
    line: usize,
    key: String,
    kind: ProblemKind,
    /// The lines that could not be read.
    unread: Range<usize>,
    /// The lines of its block, from its header to the next.
    block: Range<usize>,
    cuts: bool,
}

/// The text with its unreadable lines blanked out, and what is wrong with them.
pub(super) fn mend(text: &str, problems: &Problems<'_>) -> (String, Vec<Broken>) {
    let lines = Lines::new(text);
    let place = |error: &Error| error.span().map_or(text.len(), |span| span.start);
    let mut mended = text.to_owned();
    let mut found: Vec<Broken> = Vec::new();
    for _ in 0..=MOST {
        let errors = DeTable::parse_recoverable(&mended).1;
        let Some(first) = errors.iter().filter(|error| cuts(error)).min_by_key(|e| place(e)) else {
            found.extend(errors.iter().map(|error| Broken::new(error, &lines, problems)));
            break;
        };
        let broken = Broken::new(first, &lines, problems);
        if found.iter().any(|before| before.unread.contains(&broken.line)) {
            // The error stays although its line is gone: no further progress.
            break;
        }
        mended = blanked(&mended, &broken.lost(&lines));
        found.push(broken);
    }
    (mended, found)
}

/// Whether an error may have cost the document keys; a second key and an impossible date do not.
fn cuts(error: &Error) -> bool {
    error.message() != "duplicate key" && !error.message().starts_with("invalid date")
}

/// Tells of the syntax errors and drops what only follows from them: whatever stands on a line
/// that could not be read, what is missing from its block, and references to what a broken block
/// may have listed.
pub(super) fn settle(broken: Vec<Broken>, problems: &mut Problems<'_>) {
    let mut unread = Vec::new();
    for range in broken.iter().map(|broken| &broken.unread) {
        unread.resize(unread.len().max(range.end), false);
        unread[range.clone()].fill(true);
    }
    let cuts: Vec<Range<usize>> =
        broken.iter().filter(|broken| broken.cuts).map(|broken| broken.block.clone()).collect();
    problems.retain(|problem: &Problem| {
        let on_broken_line =
            problem.line.is_some_and(|line| unread.get(line).copied().unwrap_or_default());
        let follows = match problem.kind {
            ProblemKind::Missing { .. }
            | ProblemKind::Needs { .. }
            | ProblemKind::NoReason { .. }
            | ProblemKind::NamesNothing => {
                cuts.iter().any(|block| problem.line.is_none_or(|line| block.contains(&line)))
            }
            ProblemKind::NotListed { .. } => !cuts.is_empty(),
            _ => false,
        };
        !(on_broken_line || follows)
    });
    for broken in broken {
        problems.note(Some(broken.line), broken.key, broken.kind);
    }
}

impl Broken {
    fn new(error: &Error, lines: &Lines<'_>, problems: &Problems<'_>) -> Self {
        let message = error.message();
        let at = error.span().map_or(lines.last(), |span| problems.line(&span)).min(lines.last());
        // What was never closed is wrong where it begins.
        let inside = message.contains("inline table")
            || (message.contains("array") && !message.contains("array table"));
        let line =
            if inside { (1..=at).rev().find(|line| lines.opens(*line)).unwrap_or(at) } else { at };
        let block = lines.block(line);
        let on_header = lines.get(line).trim_start().starts_with('[');
        let key = if on_header { "" } else { header(lines.get(block.start)) };
        let kind = if message == "duplicate key" {
            let name = lines.get(line).split('=').next().unwrap_or_default().trim();
            let what = if on_header { header(lines.get(line)) } else { name };
            ProblemKind::Duplicate { what: what.escape_debug().to_string(), first: None }
        } else {
            ProblemKind::Syntax { message: message.to_owned() }
        };
        let unread = if on_header { line..block.end } else { line..line + 1 };
        Self { line, key: key.to_owned(), kind, unread, block, cuts: cuts(error) }
    }

    /// The lines to blank out: a header's whole block, and of a list or table that is never
    /// closed all up to the next line that begins a key or a table.
    fn lost(&self, lines: &Lines<'_>) -> Range<usize> {
        let begins_anew = |line: &usize| {
            let text = lines.get(*line);
            is_header(text) || text.trim_start().starts_with(char::is_alphabetic)
        };
        let end = if lines.opens(self.line) {
            (self.line + 1..=lines.last()).find(begins_anew).unwrap_or(lines.last() + 1)
        } else {
            self.unread.end
        };
        self.line..end
    }
}

/// The lines of the text, counted from 1, and which of them are headers.
struct Lines<'t> {
    all: Vec<&'t str>,
    headers: Vec<usize>,
}

impl<'t> Lines<'t> {
    fn new(text: &'t str) -> Self {
        let all: Vec<&str> = text.lines().collect();
        let headers = (1..=all.len()).filter(|line| is_header(all[line - 1])).collect();
        Self { all, headers }
    }

    /// The number of the last line, at least 1.
    fn last(&self) -> usize {
        self.all.len().max(1)
    }

    fn get(&self, line: usize) -> &'t str {
        self.all.get(line - 1).copied().unwrap_or_default()
    }

    /// Whether the line's value begins a list or an inline table.
    fn opens(&self, line: usize) -> bool {
        let value = self.get(line).split_once('=').map_or("", |(_, value)| value.trim_start());
        value.starts_with(['[', '{'])
    }

    /// From the header at or before a line to the next.
    fn block(&self, line: usize) -> Range<usize> {
        let next = self.headers.partition_point(|header| *header <= line);
        let begins = next.checked_sub(1).map_or(1, |at| self.headers[at]);
        begins..self.headers.get(next).copied().unwrap_or(self.last() + 1)
    }
}

/// The text with some lines, counted from 1, turned into blanks.
fn blanked(text: &str, lost: &Range<usize>) -> String {
    let mut out = String::with_capacity(text.len());
    for (index, line) in text.split_inclusive('\n').enumerate() {
        if lost.contains(&(index + 1)) {
            out.extend(line.bytes().map(|byte| if byte == b'\n' { '\n' } else { ' ' }));
        } else {
            out.push_str(line);
        }
    }
    out
}

/// Whether a line is a table's header, and not a list's element that begins with a bracket.
fn is_header(line: &str) -> bool {
    let inner = header(line).trim_matches(['[', ']']);
    !inner.is_empty() && inner.chars().all(|c| c.is_ascii_alphanumeric() || "-_.".contains(c))
}

/// A header line without what follows it.
fn header(line: &str) -> &str {
    let line = line.trim();
    match line.rfind(']') {
        Some(end) if line.starts_with('[') => &line[..=end],
        _ => "",
    }
}
