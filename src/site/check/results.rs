//! `[[results]]`: patterns that stay inside the site folder, marks that can be told from digits.

use std::collections::BTreeMap;

use super::super::checked::ResultsRule;
use super::super::delivery::{Decimal, SerialDates, TwoDigitYears};
use super::super::file::ResultsTable;
use super::super::problem::ProblemKind;
use super::super::written::{At, OneChar, Problems};
use super::{copy, names};

impl ResultsRule {
    /// Every file below `results/`, with nothing declared.
    #[must_use]
    pub fn plain() -> Self {
        Self {
            files: "results/**".to_owned(),
            layout: None,
            sheet: None,
            encoding: None,
            separator: None,
            columns: BTreeMap::new(),
            date_order: None,
            two_digit_years: TwoDigitYears::Refused,
            serial_dates: SerialDates::Refused,
            decimal: Decimal::Point,
            thousands: None,
            ppb_in_water: false,
            uncertainty: None,
            sample_types: BTreeMap::new(),
            validation: None,
        }
    }
}

/// Checks one block.
pub(super) fn check(at: &At<ResultsTable>, problems: &mut Problems<'_>) -> ResultsRule {
    let table = &at.value;
    if let Some(files) = &table.files {
        pattern(files, problems);
    }
    let plain = ResultsRule::plain();
    let decimal = copy(&table.decimal).unwrap_or(plain.decimal);
    ResultsRule {
        files: copy(&table.files).unwrap_or(plain.files),
        layout: copy(&table.layout),
        sheet: copy(&table.sheet),
        encoding: copy(&table.encoding),
        separator: table.separator.as_ref().and_then(|at| separator(at, problems)),
        columns: table.columns.as_ref().map(|at| at.value.values()).unwrap_or_default(),
        date_order: copy(&table.date_order),
        two_digit_years: match copy(&table.two_digit_years) {
            Some(true) => TwoDigitYears::Read,
            Some(false) | None => plain.two_digit_years,
        },
        serial_dates: copy(&table.serial_dates).unwrap_or(plain.serial_dates),
        decimal,
        thousands: table.thousands.as_ref().and_then(|at| thousands(at, decimal, problems)),
        ppb_in_water: copy(&table.ppb_in_water).unwrap_or(plain.ppb_in_water),
        uncertainty: copy(&table.uncertainty),
        sample_types: table.sample_types.as_ref().map(|at| at.value.values()).unwrap_or_default(),
        validation: copy(&table.validation),
    }
}

/// Tells of a pattern that stands in two blocks.
pub(super) fn distinct<'a>(
    blocks: impl Iterator<Item = &'a At<ResultsTable>>,
    problems: &mut Problems<'_>,
) {
    let files = blocks.filter_map(|block| block.value.files.as_ref());
    names::distinct(files.map(|at| (at.value.clone(), at)), problems);
}

/// Tells of a pattern that leaves the site folder, or that can match nothing as it is written.
pub(super) fn pattern(at: &At<String>, problems: &mut Problems<'_>) {
    inside_folder(at, problems);
    let whole = |part: &str| !part.contains("**") || part == "**";
    let closed = at.value.matches('[').count() == at.value.matches(']').count();
    if !at.value.split('/').all(whole) || !closed {
        let wants = "a pattern with *, ?, [ ] or, between slashes, **";
        problems.tell(at, ProblemKind::WrongText { found: at.value.clone(), wants });
    }
}

/// Tells of a path or pattern that leaves the site folder or is written for one system only.
pub(super) fn inside_folder(at: &At<String>, problems: &mut Problems<'_>) {
    let path = &at.value;
    let leaves = path.starts_with('/')
        || path.contains('\\')
        || path.contains(':')
        || path.split('/').any(|part| part == "..");
    if leaves {
        let wants = "inside the site folder, with / between folders, such as results/*.csv";
        problems.tell(at, ProblemKind::WrongText { found: path.clone(), wants });
    }
}

fn separator(at: &At<OneChar>, problems: &mut Problems<'_>) -> Option<u8> {
    let mark = at.value.0;
    let plain = mark == '\t' || (mark.is_ascii_punctuation() && !"\".+-<>".contains(mark));
    if !plain {
        let wants = "a comma, semicolon, bar, tab or the like";
        problems.tell(at, ProblemKind::WrongText { found: mark.escape_debug().to_string(), wants });
        return None;
    }
    u8::try_from(mark).ok()
}

fn thousands(at: &At<OneChar>, decimal: Decimal, problems: &mut Problems<'_>) -> Option<char> {
    let mark = at.value.0;
    let decimal = match decimal {
        Decimal::Point => '.',
        Decimal::Comma => ',',
    };
    // Comma, point, blank and its narrow kinds, and the two apostrophes.
    let usual = [',', '.', ' ', '\u{a0}', '\u{202f}', '\'', '\u{2019}'].contains(&mark);
    if !usual || mark == decimal {
        let wants = "a comma, point, blank or apostrophe, and not the decimal mark";
        problems.tell(at, ProblemKind::WrongText { found: mark.escape_debug().to_string(), wants });
        return None;
    }
    Some(mark)
}
