//! What is told once, grouped: one sentence for the page and the notes, one detail for the ledger.

use super::clean::{shown, shown_short};
use super::number::counted;
use super::{suspicion, told_arrival};
use crate::findings::Note;
use crate::ledger::Told;
use crate::ledger::told::Expected;
use crate::site::{Column, JoinedBy};

/// A cell in a note is cut at this many characters.
const QUOTED: usize = 40;

/// One grouped line: `34 records: unit UG/L read as ug/L`.
#[must_use]
pub fn sentence(told: &Told, records: usize) -> String {
    let text = detail(told);
    match told {
        Told::DecodedWindows1252 { .. }
        | Told::ColumnNotUsed { .. }
        | Told::FileLeftAlone { .. }
        | Told::FileWithoutRecords { .. }
        | Told::WellTwins { .. }
        | Told::MixedDates { .. }
        | Told::OpenLayout { .. }
        | Told::NoLimitColumns { .. }
        | Told::LinesBesideTable { .. }
        | Told::SheetLeftAlone { .. }
        | Told::SheetHidden { .. }
        | Told::ReadAsCrossTab { .. }
        | Told::SettingOffDefault { .. } => text,
        _ if records == 0 => text,
        _ => format!("{}: {text}", counted(records, "record", "records")),
    }
}

/// The details of one record, joined as ledger.csv writes them.
#[must_use]
pub fn details<'a>(told: impl IntoIterator<Item = &'a Told>) -> String {
    told.into_iter().map(detail).collect::<Vec<_>>().join("; ")
}

/// What was told about one record, without its count.
#[must_use]
pub fn detail(told: &Told) -> String {
    match told {
        Told::DecodedWindows1252 { file, line } => format!(
            "{} is not UTF-8; it was read as windows-1252 (first line concerned: {line})",
            shown(file)
        ),
        Told::ColumnNotUsed { file, column } => {
            format!(
                "{}: column `{}` has no known meaning and is not used",
                shown(file),
                shown(column)
            )
        }
        Told::AnalyteJoined { written, listed, by } => {
            let by = match by {
                JoinedBy::Cas => "its CAS number",
                JoinedBy::Name => "its name",
                JoinedBy::Synonym => "another name in the catalogue",
            };
            format!("analyte `{}` read as {} by {by}", shown(written), shown(listed))
        }
        Told::CasCheckDigit { cas } => {
            format!("CAS number {} fails its check digit; used as written", shown(cas))
        }
        Told::WellAlias { written, well } => {
            format!("well `{}` read as {} by an alias", shown(written), shown(well))
        }
        Told::WellNotListed { well } => {
            format!("well {} is not in the site file; used all the same", shown(well))
        }
        Told::AnalyteNotListed { written, nearest } => {
            let hint = nearest
                .as_deref()
                .map_or_else(String::new, |n| format!("; the nearest listed is {}", shown(n)));
            format!("analyte `{}` is not listed{hint}", shown(written))
        }
        Told::FractionAssumed { analyte, fraction } => format!(
            "{} without a fraction, taken as the listed one, {}",
            shown(analyte),
            shown(fraction)
        ),
        Told::FractionUnknown { analyte } => format!(
            "{} without a fraction, and none is listed: a series of its own",
            shown(analyte)
        ),
        Told::UnknownQualifier { code } => {
            format!("qualifier `{}` has no declared meaning", shown(code))
        }
        Told::UnknownCondition { condition } => {
            format!("detection condition `{}` has no declared meaning", shown(condition))
        }
        Told::UnknownSampleType { written } => {
            format!("sample type `{}` is neither known nor mapped", shown(written))
        }
        Told::UnknownUnit { written } => format!("unit `{}` is not known", shown(written)),
        Told::UnitsDiffer { .. }
        | Told::BasisTaken { .. }
        | Told::CasRestored { .. }
        | Told::CasAgainstName { .. }
        | Told::WellTwins { .. }
        | Told::MixedDates { .. }
        | Told::OpenLayout { .. }
        | Told::NoLimitColumns { .. }
        | Told::NoDetectionLimit { .. }
        | Told::LimitTypeUnknown { .. }
        | Told::LimitUnit { .. }
        | Told::LimitJoined { .. } => told_arrival::detail(told),
        Told::AmbiguousDates { file } => format!(
            "{}: day and month could be either way round; `date-order` under [[results]] settles it",
            shown(file)
        ),
        Told::Revised { was, is, place } => format!(
            "{} revised to {} by {}; the later one counts",
            shown(was),
            shown(is),
            shown(place)
        ),
        Told::Converted { from, to } => format!("converted from {from} to {to}"),
        Told::Decision { id } => format!("decision {}", shown(id)),
        Told::Unreadable { column, found, expected } => {
            format!("{column}: found `{}`, expected {}", shown(found), expectation(*expected))
        }
        Told::FileLeftAlone { file } => {
            format!("{} is no results file and was left alone", shown(file))
        }
        Told::LinesBesideTable { table, lines, first } => format!(
            "{}: {} above or beside the table, without a record (the first says `{}`)",
            shown(table),
            counted(*lines, "line", "lines"),
            shown_short(first, QUOTED)
        ),
        Told::SheetLeftAlone { table } => {
            format!("{} holds no results table and was left alone", shown(table))
        }
        Told::SheetHidden { table } => {
            format!("{} is a hidden sheet; it was read like the others", shown(table))
        }
        Told::ReadAsCrossTab { table, across } => format!(
            "{} was read as a cross-tab with {} across",
            shown(table),
            match across {
                Column::Well => "wells",
                Column::Analyte => "analytes",
                _ => "dates",
            }
        ),
        Told::MergedFilled => "the text of a merged cell was filled in".into(),
        Told::FileWithoutRecords { file } => {
            format!("{} has a header and no record below it", shown(file))
        }
        Told::SettingOffDefault { key, is } => {
            format!("setting {} is off its default: {}", shown(key), shown(is))
        }
        Told::Suspected { what } => suspicion::detail(*what).into(),
        Told::LimitsDiffer => {
            "the non-detect's result and its reporting limit differ; the larger is its limit".into()
        }
        Told::HoldingTime => "the holding time was exceeded; used".into(),
        Told::InBlank => "also found in a blank; used as estimated".into(),
        Told::NonDetectUnderDetect => {
            "a non-detect whose limit lies under a detect of the same date; the detect counts"
                .into()
        }
        Told::Recensored => {
            "a detect under its own reporting limit, taken as a non-detect at that limit".into()
        }
        Told::DetectionLimitTaken => "the detection limit is the limit of this non-detect".into(),
        Told::UnderDetectableActivity => {
            "an activity under its detectable level, taken as a non-detect at that level".into()
        }
        // The ledger's own words for these three (rules, section 1).
        Told::AveragedOf { n } => format!("averaged of {n}"),
        Told::OutsideFit => "outside-fit".into(),
        Told::DuplicateAveraged => "averaged".into(),
    }
}

/// What a cell should have held.
fn expectation(expected: Expected) -> &'static str {
    match expected {
        Expected::Result => {
            "a result such as 0.5, <0.5, 0.5 U, ND (0.5), >2000, or ND with a limit in its own column"
        }
        Expected::Limit => "a positive number",
        Expected::Date => "a date such as 2024-03-05",
    }
}

/// How much a note matters: 0 for what was read as meant, 3 for records that were lost.
#[must_use]
pub fn weight(told: &Told) -> u8 {
    match told {
        Told::AveragedOf { .. }
        | Told::OutsideFit
        | Told::Decision { .. }
        | Told::Converted { .. }
        | Told::DuplicateAveraged
        | Told::AnalyteJoined { .. }
        | Told::WellAlias { .. }
        | Told::LimitsDiffer
        | Told::OpenLayout { .. }
        | Told::LimitJoined { .. }
        | Told::ReadAsCrossTab { .. }
        | Told::FileLeftAlone { .. } => 0,
        Told::CasCheckDigit { .. }
        | Told::WellNotListed { .. }
        | Told::FractionAssumed { .. }
        | Told::HoldingTime
        | Told::UnderDetectableActivity
        | Told::DetectionLimitTaken
        | Told::CasRestored { .. }
        | Told::BasisTaken { .. }
        | Told::NoDetectionLimit { .. }
        | Told::LinesBesideTable { .. }
        | Told::SheetLeftAlone { .. }
        | Told::MergedFilled
        | Told::ColumnNotUsed { .. } => 1,
        Told::DecodedWindows1252 { .. }
        | Told::FractionUnknown { .. }
        | Told::InBlank
        | Told::NonDetectUnderDetect
        | Told::Recensored
        | Told::FileWithoutRecords { .. }
        | Told::SheetHidden { .. }
        | Told::SettingOffDefault { .. }
        | Told::CasAgainstName { .. }
        | Told::WellTwins { .. }
        | Told::MixedDates { .. }
        | Told::NoLimitColumns { .. }
        | Told::LimitTypeUnknown { .. }
        | Told::LimitUnit { .. }
        | Told::Suspected { .. }
        | Told::Revised { .. } => 2,
        Told::AnalyteNotListed { .. }
        | Told::UnknownQualifier { .. }
        | Told::UnknownCondition { .. }
        | Told::UnknownSampleType { .. }
        | Told::UnknownUnit { .. }
        | Told::UnitsDiffer { .. }
        | Told::AmbiguousDates { .. }
        | Told::Unreadable { .. } => 3,
    }
}

/// Sorts notes as people read them: the most important last, then by number of records, then by
/// what was told.
pub fn sort_notes(notes: &mut [Note]) {
    notes.sort_by(|a, b| {
        (weight(&a.told), a.records).cmp(&(weight(&b.told), b.records)).then(a.told.cmp(&b.told))
    });
}
