//! What becomes of a record: closed lists of outcomes and reasons.

use serde::{Deserialize, Serialize};

use crate::terms::verdict::coded;

coded! {
    /// The five ways a record can end.
    Outcome {
        /// Its number enters the date's value.
        Used = "used",
        /// It lost to another record of the same sample or date.
        Merged = "merged",
        /// It reports that there is no result, and why.
        NonResult = "non-result",
        /// It is a duplicate, a blank, a spike or a reference sample.
        QualityControl = "quality-control",
        /// It could not be used, for a stated reason.
        SetAside = "set-aside",
    }
}

coded! {
    /// How a used record entered its date's value (the ledger's detail).
    UsedAs {
        /// Alone.
        Alone = "alone",
        /// As one of several detects of the date.
        Averaged = "averaged",
        /// Its date lies outside the window or before a restart.
        OutsideFit = "outside-fit",
    }
}

coded! {
    /// What a merged record lost to.
    Merged {
        /// The same sample delivered again with the same result.
        Repeat = "repeat",
        /// Another result of the same date.
        SameDay = "same-day",
        /// The diluted analysis of the same sample.
        SupersededByDilution = "superseded-by-dilution",
        /// A detection-limit row joined to its result.
        DetectionLimit = "detection-limit",
        /// A station row.
        Station = "station",
    }
}

coded! {
    /// Why there is no result.
    NonResult {
        /// The well was dry.
        Dry = "dry",
        /// The well is destroyed.
        Destroyed = "destroyed",
        /// The well could not be reached.
        NoAccess = "no-access",
        /// Free product stood in the well.
        FreeProduct = "free-product",
        /// No sample was taken.
        NotSampled = "not-sampled",
        /// The sample was not analysed.
        NotAnalysed = "not-analysed",
        /// The result was not reported.
        NotReported = "not-reported",
    }
}

coded! {
    /// Kinds of quality-control samples.
    QualityControl {
        /// A second sample or analysis of a parent.
        Duplicate = "duplicate",
        /// A blank.
        Blank = "blank",
        /// A spiked sample.
        Spike = "spike",
        /// A reference material.
        Reference = "reference",
    }
}

coded! {
    /// Why a record was set aside.
    SetAside {
        /// The result is not a number that can be read exactly.
        UnreadableNumber = "unreadable-number",
        /// The date cannot be read.
        UnreadableDate = "unreadable-date",
        /// The order of day and month is neither declared nor proved.
        AmbiguousDate = "ambiguous-date",
        /// No well.
        NoWell = "no-well",
        /// No analyte.
        NoAnalyte = "no-analyte",
        /// No date.
        NoDate = "no-date",
        /// No result and no mark.
        NoResult = "no-result",
        /// No unit.
        NoUnit = "no-unit",
        /// A non-detect without any limit.
        NoReportingLimit = "no-reporting-limit",
        /// A unit outside the closed list.
        UnknownUnit = "unknown-unit",
        /// A unit of another dimension than the series'.
        OtherDimension = "other-dimension",
        /// Another basis than the series'.
        OtherBasis = "other-basis",
        /// A fraction other than the one listed.
        OtherFraction = "other-fraction",
        /// A medium other than the analyte's declared one.
        OtherMedium = "other-medium",
        /// A record of another site.
        OtherSite = "other-site",
        /// An analyte that the site file does not list.
        AnalyteNotListed = "analyte-not-listed",
        /// A well with results at more than one depth, undecided.
        DepthDiffers = "depth-differs",
        /// A sample type neither known nor mapped.
        UnknownSampleType = "unknown-sample-type",
        /// A qualifier that only the laboratory's legend explains.
        QualifierNeedsLegend = "qualifier-needs-legend",
        /// A detection condition that only a legend explains.
        ConditionNeedsLegend = "condition-needs-legend",
        /// Rejected by validation.
        Rejected = "rejected",
        /// Above the range of the instrument, without a value.
        AboveRange = "above-range",
        /// Zero or negative without a mark.
        LowResult = "low-result",
        /// A later delivery revised it.
        Superseded = "superseded",
        /// A detection-limit row without its result.
        UnmatchedLimit = "unmatched-limit",
        /// A record with missing or surplus cells that matter.
        Ragged = "ragged",
        /// A spreadsheet error in the cell.
        CellError = "cell-error",
        /// Sampled after the as-of date.
        AfterAsOf = "after-as-of",
    }
}

/// What became of one record.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Fate {
    /// Provisional: can be used, waits for the merge of its date.
    Candidate,
    /// Used.
    Used(UsedAs),
    /// Lost to another.
    Merged(Merged),
    /// No result, and why.
    NonResult(NonResult),
    /// Quality control.
    QualityControl(QualityControl),
    /// Set aside.
    SetAside(SetAside),
    /// Set aside by the decision with this place in the site file.
    Decision(u16),
}

impl Fate {
    /// The outcome; `None` while the record still waits.
    #[must_use]
    pub fn outcome(self) -> Option<Outcome> {
        match self {
            Self::Candidate => None,
            Self::Used(_) => Some(Outcome::Used),
            Self::Merged(_) => Some(Outcome::Merged),
            Self::NonResult(_) => Some(Outcome::NonResult),
            Self::QualityControl(_) => Some(Outcome::QualityControl),
            Self::SetAside(_) | Self::Decision(_) => Some(Outcome::SetAside),
        }
    }

    /// The reason's code; empty for `used`. `decision_id` names decisions by their place.
    #[must_use]
    pub fn reason(self, decision_id: impl Fn(u16) -> String) -> String {
        match self {
            Self::Candidate | Self::Used(_) => String::new(),
            Self::Merged(why) => why.code().to_owned(),
            Self::NonResult(why) => why.code().to_owned(),
            Self::QualityControl(kind) => kind.code().to_owned(),
            Self::SetAside(why) => why.code().to_owned(),
            Self::Decision(place) => format!("decision:{}", decision_id(place)),
        }
    }

    /// Whether a record with this fate, having a well, gives its series a row (rules of section 2:
    /// used, merged, non-result, or set aside for its date, number, unit, limit, qualifier or
    /// condition).
    #[must_use]
    pub fn gives_a_row(self) -> bool {
        match self {
            Self::Candidate | Self::Used(_) | Self::Merged(_) | Self::NonResult(_) => true,
            Self::QualityControl(_) | Self::Decision(_) => false,
            Self::SetAside(why) => matches!(
                why,
                SetAside::UnreadableNumber
                    | SetAside::UnreadableDate
                    | SetAside::AmbiguousDate
                    | SetAside::NoDate
                    | SetAside::NoResult
                    | SetAside::NoUnit
                    | SetAside::NoReportingLimit
                    | SetAside::UnknownUnit
                    | SetAside::OtherDimension
                    | SetAside::OtherBasis
                    | SetAside::QualifierNeedsLegend
                    | SetAside::ConditionNeedsLegend
                    | SetAside::Rejected
                    | SetAside::AboveRange
                    | SetAside::LowResult
            ),
        }
    }
}
