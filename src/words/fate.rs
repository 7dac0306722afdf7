//! Outcomes and reasons of the ledger in words, and what a person can do about each.

use super::clean::shown;
use crate::ledger::{Merged, NonResult, Outcome, QualityControl, SetAside, UsedAs};

/// What an outcome is called, after a count: `371 used`.
#[must_use]
pub fn outcome(outcome: Outcome) -> &'static str {
    match outcome {
        Outcome::Used => "used",
        Outcome::Merged => "merged into another record",
        Outcome::NonResult => "without a result",
        Outcome::QualityControl => "quality control",
        Outcome::SetAside => "set aside",
    }
}

/// The rule behind an outcome.
#[must_use]
pub fn outcome_meaning(outcome: Outcome) -> &'static str {
    match outcome {
        Outcome::Used => {
            "The record's number enters the value of its date. The detail says `averaged of n` where \
             several detects share the date, and `outside-fit` where the date lies outside the \
             window or before a restart."
        }
        Outcome::Merged => {
            "The record lost to another record of the same sample or date, or only describes one."
        }
        Outcome::NonResult => "The record reports that there is no result, and why.",
        Outcome::QualityControl => {
            "The record is a duplicate, a blank, a spike or a reference sample. It is not fitted."
        }
        Outcome::SetAside => {
            "The record could not be used, for the reason given. Nothing is set aside in silence."
        }
    }
}

/// How a used record entered its date's value.
#[must_use]
pub fn used_as(used: UsedAs) -> &'static str {
    match used {
        UsedAs::Alone => "its number is the date's value",
        UsedAs::Averaged => "averaged with the other detects of its date",
        UsedAs::OutsideFit => "outside the window of the fit; shown, not fitted",
    }
}

/// What a merged record lost to.
#[must_use]
pub fn merged(why: Merged) -> &'static str {
    match why {
        Merged::Repeat => "the same sample delivered again with the same result",
        Merged::SameDay => "another result of the same date counts",
        Merged::SupersededByDilution => "the diluted analysis of the same sample counts",
        Merged::DetectionLimit => "a detection-limit row, joined to its result",
        Merged::Station => "a station row",
    }
}

/// Why there is no result.
#[must_use]
pub fn non_result(why: NonResult) -> &'static str {
    match why {
        NonResult::Dry => "the well was dry",
        NonResult::Destroyed => "the well is destroyed",
        NonResult::NoAccess => "the well could not be reached",
        NonResult::FreeProduct => "free product stood in the well",
        NonResult::NotSampled => "no sample was taken",
        NonResult::NotAnalysed => "the sample was not analysed",
        NonResult::NotReported => "the result was not reported",
    }
}

/// The kind of a quality-control sample.
#[must_use]
pub fn quality_control(kind: QualityControl) -> &'static str {
    match kind {
        QualityControl::Duplicate => "duplicate, compared with its parent",
        QualityControl::Blank => "blank",
        QualityControl::Spike => "spiked sample",
        QualityControl::Reference => "reference sample",
    }
}

/// Why a record was set aside.
#[must_use]
pub fn set_aside(why: SetAside) -> &'static str {
    match why {
        SetAside::UnreadableNumber => "the result cannot be read as a number",
        SetAside::UnreadableDate => "the date cannot be read",
        SetAside::AmbiguousDate => "day and month could be either way round",
        SetAside::NoWell => "no well",
        SetAside::NoAnalyte => "no analyte",
        SetAside::NoDate => "no date",
        SetAside::NoResult => "no result and no mark that says why",
        SetAside::NoUnit => "no unit",
        SetAside::NoReportingLimit => "a non-detect without any limit",
        SetAside::UnknownUnit => "the unit is not one this program knows",
        SetAside::OtherDimension => "the unit measures something else than the series' unit",
        SetAside::OtherBasis => "reported on another basis than the series",
        SetAside::OtherFraction => "another fraction than the one the site file lists",
        SetAside::OtherMedium => "another medium than the analyte's",
        SetAside::OtherSite => "a record of another site",
        SetAside::AnalyteNotListed => "the analyte is not in the site file or template",
        SetAside::DepthDiffers => "the well has results at more than one depth",
        SetAside::UnknownSampleType => "the sample type is not known",
        SetAside::QualifierNeedsLegend => "a qualifier that only the laboratory's legend explains",
        SetAside::ConditionNeedsLegend => "a detection condition that needs a meaning",
        SetAside::Rejected => "rejected by the laboratory or by validation",
        SetAside::AboveRange => "above the instrument's range, without a value",
        SetAside::LowResult => "zero or negative without a mark",
        SetAside::Superseded => "a later delivery revised it",
        SetAside::UnmatchedLimit => "a detection-limit row without its result",
        SetAside::Ragged => "cells are missing or left over",
        SetAside::CellError => "the cell holds a spreadsheet error",
        SetAside::AfterAsOf => "sampled after the as-of date",
    }
}

/// The next step for records set aside for a reason; none where nothing needs doing.
#[must_use]
pub fn what_to_do(why: SetAside) -> Option<&'static str> {
    Some(match why {
        SetAside::UnreadableNumber => {
            "declare `decimal` or `thousands` under [[results]], or ask the laboratory"
        }
        SetAside::UnreadableDate => "ask the laboratory for dates as 2024-03-05",
        SetAside::AmbiguousDate => "set `date-order` under [[results]]",
        SetAside::NoWell | SetAside::NoAnalyte | SetAside::NoDate => {
            "fill the cell at the source, or name the column in `columns` under [[results]]"
        }
        SetAside::NoResult => "ask the laboratory what the empty cell means",
        SetAside::NoUnit => "ask the laboratory, or give the analyte's `unit` in the site file",
        SetAside::NoReportingLimit => "ask the laboratory for the reporting limits",
        SetAside::UnknownUnit => {
            "ask for a unit such as ug/L; for ppb or ppm in water set `ppb-in-water`"
        }
        SetAside::OtherDimension | SetAside::OtherBasis => {
            "correct the unit at the source, or set `unit` or `basis` of the analyte"
        }
        SetAside::OtherFraction => {
            "list the other `fraction` as an analyte of its own, if it is wanted"
        }
        SetAside::OtherMedium => "nothing, unless the analyte's `medium` is wrong",
        SetAside::OtherSite => {
            "nothing, unless the site goes by that name: then `aliases` under [site]"
        }
        SetAside::AnalyteNotListed => "add an [[analyte]], or an alias of one",
        SetAside::DepthDiffers => "set the well's `depths` to \"separate\" or \"together\"",
        SetAside::UnknownSampleType => "map the type in `sample-types` under [[results]]",
        SetAside::QualifierNeedsLegend => "add a [[qualifier]] with the laboratory's meaning",
        SetAside::ConditionNeedsLegend => "add a [[qualifier]] with this `condition`",
        SetAside::AboveRange => "ask the laboratory for the diluted result",
        SetAside::LowResult => "ask the laboratory for the reporting limit",
        SetAside::UnmatchedLimit => "check that the file with the results was handed in",
        SetAside::Ragged => "open the file at the record and mend its cells",
        SetAside::CellError => "mend the workbook's formula or ask for the value",
        SetAside::Rejected | SetAside::Superseded | SetAside::AfterAsOf => return None,
    })
}

/// The next step for a reason given by its code.
#[must_use]
pub fn what_to_do_by_code(reason: &str) -> Option<&'static str> {
    SetAside::from_code(reason).and_then(what_to_do)
}

/// A reason's sentence by the codes of the ledger; the code itself if it is not of the lists.
#[must_use]
pub fn reason(outcome: &str, reason: &str) -> String {
    if let Some(id) = reason.strip_prefix("decision:") {
        return format!("excluded by decision {}", shown(id));
    }
    let known = match Outcome::from_code(outcome) {
        Some(Outcome::Merged) => Merged::from_code(reason).map(merged),
        Some(Outcome::NonResult) => NonResult::from_code(reason).map(non_result),
        Some(Outcome::QualityControl) => QualityControl::from_code(reason).map(quality_control),
        Some(Outcome::SetAside) => SetAside::from_code(reason).map(set_aside),
        Some(Outcome::Used) | None => None,
    };
    known.map_or_else(|| shown(reason), str::to_owned)
}
