//! What is told once, grouped, with the records in the ledger's detail.
//!
//! Each case carries the figures its sentence needs; the sentence itself is in `words`.

use crate::site::{Column, JoinedBy};

/// Something about a record that a person should know although it was dealt with.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Told {
    /// A file decoded as windows-1252; the first line with a byte outside ASCII.
    DecodedWindows1252 {
        /// The file.
        file: String,
        /// The line.
        line: u64,
    },
    /// A header that could not be matched to any meaning; its cells are kept out.
    ColumnNotUsed {
        /// The file.
        file: String,
        /// The header.
        column: String,
    },
    /// An analyte name joined to the listed one.
    AnalyteJoined {
        /// As written.
        written: String,
        /// The listed name.
        listed: String,
        /// How.
        by: JoinedBy,
    },
    /// A CAS number whose check digit does not hold.
    CasCheckDigit {
        /// As written.
        cas: String,
    },
    /// A well read under another name by an alias.
    WellAlias {
        /// As written.
        written: String,
        /// The site's name.
        well: String,
    },
    /// A well that the site file does not list; used all the same.
    WellNotListed {
        /// The well.
        well: String,
    },
    /// An analyte that is not listed, with the nearest listed name.
    AnalyteNotListed {
        /// As written.
        written: String,
        /// The nearest, if any.
        nearest: Option<String>,
    },
    /// A result without a fraction joined to the listed one.
    FractionAssumed {
        /// The analyte.
        analyte: String,
        /// The listed fraction.
        fraction: String,
    },
    /// A result without a fraction where none is listed: a series of its own.
    FractionUnknown {
        /// The analyte.
        analyte: String,
    },
    /// The result's own limit and the reporting limit differ; the larger was taken.
    LimitsDiffer,
    /// The holding time was exceeded.
    HoldingTime,
    /// Found in a blank too.
    InBlank,
    /// A qualifier code that needs a legend.
    UnknownQualifier {
        /// The code.
        code: String,
    },
    /// A detection condition that needs a legend.
    UnknownCondition {
        /// The words.
        condition: String,
    },
    /// A sample type that is neither known nor mapped.
    UnknownSampleType {
        /// As written.
        written: String,
    },
    /// A unit outside the closed list.
    UnknownUnit {
        /// As written.
        written: String,
    },
    /// The unit in the result cell and the unit beside it differ.
    UnitsDiffer {
        /// In the cell.
        cell: &'static str,
        /// In its column or header.
        column: String,
    },
    /// A result without a basis where the listed analyte has one.
    BasisTaken {
        /// The analyte.
        analyte: String,
        /// The listed basis.
        basis: String,
    },
    /// A CAS number that a spreadsheet had turned into a date.
    CasRestored {
        /// As written.
        written: String,
        /// As restored.
        cas: String,
    },
    /// A CAS number of one substance beside the name of another; the number counts.
    CasAgainstName {
        /// The number.
        cas: String,
        /// The name beside it.
        written: String,
        /// The name of the substance with the number.
        listed: String,
    },
    /// Well names that differ in hyphens, blanks, leading zeros or case alone.
    WellTwins {
        /// The names.
        wells: Vec<String>,
    },
    /// A file whose dates stand in both orders of day and month.
    MixedDates {
        /// The file.
        file: String,
        /// Dates that only day first can be.
        day_first: usize,
        /// Dates that only month first can be.
        month_first: usize,
    },
    /// A file in a layout of the open water-quality standard.
    OpenLayout {
        /// The file.
        file: String,
        /// The layout.
        layout: &'static str,
        /// How many of its columns are not used.
        unused: usize,
    },
    /// A file of the open standard that has no columns for limits.
    NoLimitColumns {
        /// The file.
        file: String,
    },
    /// A type of limit that is no detection limit; ignored.
    NoDetectionLimit {
        /// The type.
        kind: String,
    },
    /// A type of limit that has no rank; ignored.
    LimitTypeUnknown {
        /// The type.
        kind: String,
    },
    /// A limit whose unit is not known or of another dimension; ignored.
    LimitUnit {
        /// The unit.
        unit: String,
    },
    /// A limit that came from a detection-limit table.
    LimitJoined {
        /// The table's file.
        file: String,
    },
    /// The order of day and month is neither declared nor proved.
    AmbiguousDates {
        /// The file.
        file: String,
    },
    /// A later delivery revised this result.
    Revised {
        /// The earlier value as written.
        was: String,
        /// The later value as written.
        is: String,
        /// Where the later one stands, `file:line`.
        place: String,
    },
    /// A non-detect's limit lies under a detect of the same date.
    NonDetectUnderDetect,
    /// A detect under its own reporting limit taken as a non-detect at it.
    Recensored,
    /// Non-detects of the series take their detection limit as their limit.
    DetectionLimitTaken,
    /// An activity under its minimum detectable level.
    UnderDetectableActivity,
    /// Averaged with other results of its date.
    AveragedOf {
        /// How many.
        n: u32,
    },
    /// Outside the window of the fit.
    OutsideFit,
    /// A quality-control duplicate averaged in.
    DuplicateAveraged,
    /// Converted from another unit.
    Converted {
        /// From.
        from: &'static str,
        /// To.
        to: &'static str,
    },
    /// The decision that touched the record.
    Decision {
        /// Its id.
        id: String,
    },
    /// The text that could not be read, with its column.
    Unreadable {
        /// The column.
        column: &'static str,
        /// What stood there.
        found: String,
        /// What was expected, as a key of `words`.
        expected: Expected,
    },
    /// A file in the results folder that is no results file.
    FileLeftAlone {
        /// The file.
        file: String,
    },
    /// Lines above the header, or beside the blocks of a cross-tab, that are no records.
    LinesBesideTable {
        /// The file, or `file:sheet`.
        table: String,
        /// How many.
        lines: usize,
        /// What the first says.
        first: String,
    },
    /// A sheet that holds no results table.
    SheetLeftAlone {
        /// `file:sheet`.
        table: String,
    },
    /// A hidden sheet that was read.
    SheetHidden {
        /// `file:sheet`.
        table: String,
    },
    /// A table that was read as a cross-tab.
    ReadAsCrossTab {
        /// The file, or `file:sheet`.
        table: String,
        /// What stands across.
        across: Column,
    },
    /// A cell of the record was filled from a merged one.
    MergedFilled,
    /// A file with a header and nothing below it.
    FileWithoutRecords {
        /// The file.
        file: String,
    },
    /// Something to look at before any fit.
    Suspected {
        /// What.
        what: Suspicion,
    },
    /// A statistical setting that is not at its default.
    SettingOffDefault {
        /// The key.
        key: String,
        /// What it is.
        is: String,
    },
}

/// What is suspected, or told as a fact, of records on arrival.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Suspicion {
    /// 1,000 times its history, or a thousandth.
    UnitSlip,
    /// Day and month in another order than in the rest of the file.
    DayMonth,
    /// Two wells' values exchanged on one date.
    WellsSwapped,
    /// Non-detects replaced by half of their limit before the file was made.
    HalfLimit,
    /// Every value of a batch equal.
    EqualBatch,
    /// Dated outside the site's life.
    OutsideLife,
    /// Not detected, with a limit over the regulatory limit.
    LimitOverLimit,
    /// Absent from a round in which its panel is present.
    MissingFromPanel,
}

impl Suspicion {
    /// All of them, in the order of outputs.
    pub const ALL: [Self; 8] = [
        Self::UnitSlip,
        Self::DayMonth,
        Self::WellsSwapped,
        Self::HalfLimit,
        Self::EqualBatch,
        Self::OutsideLife,
        Self::LimitOverLimit,
        Self::MissingFromPanel,
    ];

    /// The code in outputs.
    #[must_use]
    pub fn code(self) -> &'static str {
        match self {
            Self::UnitSlip => "unit-slip",
            Self::DayMonth => "day-month-order",
            Self::WellsSwapped => "wells-swapped",
            Self::HalfLimit => "half-limit",
            Self::EqualBatch => "equal-batch",
            Self::OutsideLife => "outside-site-life",
            Self::LimitOverLimit => "limit-over-limit",
            Self::MissingFromPanel => "missing-from-panel",
        }
    }
}

/// What a cell should have held.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Expected {
    /// A result: `0.5`, `<0.5`, `>2000`, `ND` with a limit.
    Result,
    /// A positive limit.
    Limit,
    /// A date: `2024-03-05`.
    Date,
}

impl Told {
    /// The case under which the note is counted; all but the revised results are their own group.
    #[must_use]
    pub fn group(&self) -> &Self {
        self
    }

    /// Whether the note is said to people at all, or stands in the ledger's detail alone.
    #[must_use]
    pub fn is_said(&self) -> bool {
        !matches!(self, Self::AveragedOf { .. } | Self::OutsideFit | Self::Decision { .. })
    }
}
