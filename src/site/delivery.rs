//! How a results file is written: its columns, its sample types, its numbers and dates.

use serde::{Deserialize, Serialize};

use crate::terms::verdict::coded;

use super::choices::{choice, keys};
use super::written::{At, FromToml, MapKey, Problems, unknown_key, word};

choice! {
    /// A column of the canonical long table.
    Column {
        /// The well.
        Well = "well",
        /// The analyte.
        Analyte = "analyte",
        /// The sample date.
        Date = "date",
        /// The result as reported.
        Result = "result",
        /// The result's unit.
        Unit = "unit",
        /// The site.
        Site = "site",
        /// The CAS number.
        Cas = "cas",
        /// Dissolved or total.
        Fraction = "fraction",
        /// The laboratory's qualifiers.
        Qualifier = "qualifier",
        /// The detection limit.
        DetectionLimit = "detection_limit",
        /// The reporting limit.
        ReportingLimit = "reporting_limit",
        /// What kind of sample it is.
        SampleType = "sample_type",
        /// The sample's identifier.
        SampleId = "sample_id",
        /// The depth sampled.
        Depth = "depth",
        /// The laboratory.
        Lab = "lab",
        /// The time of day.
        Time = "time",
        /// The counting uncertainty.
        Uncertainty = "uncertainty",
        /// What the number counts: `N`, `NO3`.
        Basis = "basis",
        /// The detection condition in words.
        DetectionCondition = "detection_condition",
        /// The result's status.
        Status = "status",
        /// The medium sampled.
        Medium = "medium",
        /// The laboratory's batch.
        Batch = "batch",
    }
}

impl Column {
    /// The canonical header: `detection_limit`.
    #[must_use]
    pub fn key(self) -> &'static str {
        self.code()
    }
}

keys!(Column);

choice! {
    /// What kind of sample a record tells of.
    SampleType {
        /// An ordinary sample.
        Regular = "regular",
        /// A field or laboratory duplicate, replicates too.
        Duplicate = "duplicate",
        /// A trip, field, equipment or laboratory blank.
        Blank = "blank",
        /// A spiked sample.
        Spike = "spike",
        /// A reference sample.
        Reference = "reference",
        /// No result: the well was dry.
        Dry = "dry",
        /// No result: the well is destroyed.
        Destroyed = "destroyed",
        /// No result: the well could not be reached.
        NoAccess = "no-access",
        /// No result: free product in the well.
        FreeProduct = "free-product",
        /// No result: not sampled.
        NotSampled = "not-sampled",
        /// No result: sampled and not analysed.
        NotAnalysed = "not-analysed",
        /// No result: not reported.
        NotReported = "not-reported",
    }
}

choice! {
    /// How a results file is laid out.
    Layout {
        /// One result a line.
        Long = "long",
        /// Wells or analytes across, one result a cell.
        CrossTab = "cross-tab",
    }
}

choice! {
    /// How a results file is encoded.
    Encoding {
        /// UTF-8.
        Utf8 = "utf-8",
        /// UTF-16, little end first.
        Utf16Le = "utf-16le",
        /// UTF-16, big end first.
        Utf16Be = "utf-16be",
        /// Windows code page 1252.
        Windows1252 = "windows-1252",
    }
}

choice! {
    /// The order of year, month and day in a written date.
    DateOrder {
        /// `2026-09-30`.
        YearMonthDay = "year-month-day",
        /// `30/09/2026`.
        DayMonthYear = "day-month-year",
        /// `09/30/2026`.
        MonthDayYear = "month-day-year",
    }
}

choice! {
    /// What bare numbers in the date column are, where they are spreadsheet serials.
    SerialDates {
        /// No serials: a bare number is no date.
        Refused = "no",
        /// Days of the 1900 calendar, the usual one.
        From1900 = "1900",
        /// Days of the 1904 calendar.
        From1904 = "1904",
    }
}

choice! {
    /// The decimal mark.
    Decimal {
        /// `0.5`.
        Point = "point",
        /// `0,5`.
        Comma = "comma",
    }
}

choice! {
    /// What the uncertainty column holds.
    Sigma {
        /// One standard deviation.
        One = "1-sigma",
        /// Two standard deviations.
        Two = "2-sigma",
    }
}

/// Whether years of two digits are read: 70 to 99 as 1970 to 1999, 00 to 69 as 2000 to 2069 (the
/// convention of POSIX `%y`).
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
#[serde(rename_all = "kebab-case")]
pub enum TwoDigitYears {
    /// A date with such a year is unreadable.
    Refused,
    /// They are read.
    Read,
}
