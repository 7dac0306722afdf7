//! Syntax errors of the site file, and which other problems only follow from them.

use toml::de::Error;

use super::problem::{Problem, ProblemKind};
use super::written::Problems;

/// Tells of the parser's errors and drops what only follows from them.
pub(super) fn settle(text: &str, errors: &[Error], problems: &mut Problems<'_>) {
    if errors.is_empty() {
        return;
    }
    let lines: Vec<&str> = text.lines().collect();
    let is_header =
        |line: usize| lines.get(line - 1).is_some_and(|text| text.trim_start().starts_with('['));
    let mut broken = Vec::new();
    let mut notes = Vec::new();
    let mut some_missing = false;
    for error in errors {
        let span = error.span().unwrap_or(text.len()..text.len());
        let line = problems.line(&span);
        let duplicate = error.message() == "duplicate key";
        let date = error.message().starts_with("invalid date");
        some_missing |= !duplicate && !date;
        let end = if is_header(line) {
            (line + 1..=lines.len()).find(|next| is_header(*next)).unwrap_or(lines.len() + 1)
        } else {
            line + 1
        };
        broken.push(line..end);
        notes.push((line, kind(text, error, duplicate)));
    }
    problems.retain(|problem: &Problem| {
        let follows = problem.line.is_none_or(|line| broken.iter().any(|b| b.contains(&line)));
        let absence = matches!(
            problem.kind,
            ProblemKind::Missing { .. }
                | ProblemKind::Needs { .. }
                | ProblemKind::NotListed { .. }
                | ProblemKind::NoReason { .. }
                | ProblemKind::NamesNothing
        );
        !(follows || absence && some_missing)
    });
    for (line, kind) in notes {
        problems.note(Some(line), String::new(), kind);
    }
}

fn kind(text: &str, error: &Error, duplicate: bool) -> ProblemKind {
    let written = error.span().and_then(|span| text.get(span)).unwrap_or_default();
    if duplicate {
        return ProblemKind::Duplicate { what: written.escape_debug().to_string(), first: None };
    }
    ProblemKind::Syntax { message: error.message().to_owned() }
}
