//! Flags: named reasons to trust a fit or a date less, each with its figure and its source.

use chrono::NaiveDate;
use serde::{Deserialize, Serialize};

use super::verdict::coded;

coded! {
    /// Every flag, in the order in which outputs list them.
    FlagCode {
        /// Fewer dates than `date-needs` asks for.
        FewDates = "few-dates",
        /// Fewer detects than `date-needs` asks for.
        FewDetects = "few-detects",
        /// A record shorter than moderately accurate rates need.
        ShortRecord = "short-record",
        /// A date could not be given for want of data.
        DateWithheld = "date-withheld",
        /// Most dates are non-detects.
        MostlyNonDetects = "mostly-non-detects",
        /// A non-detect's limit is over the regulatory limit: it shows nothing about meeting it.
        ReportingLimitAboveLimit = "reporting-limit-above-limit",
        /// Reporting limits fall over the record.
        FallingReportingLimits = "falling-reporting-limits",
        /// Many non-detects say almost nothing about the line.
        UninformativeNonDetects = "uninformative-non-detects",
        /// Detects under their own reporting limit were taken as non-detects at it.
        EstimatedRecensored = "estimated-recensored",
        /// Non-detects were replaced by a number, as the site file asks.
        Substituted = "substituted",
        /// Zero or negative results without a mark could not be used.
        LowResultsLost = "low-results-lost",
        /// Many detects are estimated.
        EstimatedResults = "estimated-results",
        /// The newest result is old.
        Stale = "stale",
        /// A long gap in the record.
        Gap = "gap",
        /// A duplicate differs from its parent by more than the criterion.
        DuplicatesDiffer = "duplicates-differ",
        /// A value about a thousand times its neighbours, or a thousandth.
        UnitSlip = "unit-slip",
        /// Equal values follow one another.
        CopiedValues = "copied-values",
        /// The scatter about the line is more than a factor of two.
        WideScatter = "wide-scatter",
        /// One residual is too large for its neighbours.
        Outlier = "outlier",
        /// The line is under the limit, the last results are not.
        ResultsDenyLine = "results-deny-line",
        /// One date decides the answer.
        InfluentialPoint = "influential-point",
        /// Residuals are not normal.
        NotNormal = "not-normal",
        /// Residuals follow one another.
        Autocorrelated = "autocorrelated",
        /// Residuals differ between the quarters of the year.
        Seasonal = "seasonal",
        /// The fall slows down.
        Slowing = "slowing",
        /// The fall speeds up.
        Quickening = "quickening",
        /// Two rates describe the data better than one.
        TwoRates = "two-rates",
        /// A decay to a plateau describes the data better.
        LevelsOff = "levels-off",
        /// The choice of the window moves the date.
        WindowMovesDate = "window-moves-date",
        /// The rate's interval and Kendall's test say different things.
        TestsDisagree = "tests-disagree",
        /// The reach interval lacks an end.
        Unbounded = "unbounded",
        /// The data do not locate the date at all.
        NotLocated = "not-located",
        /// The date lies further ahead than the record is long.
        FarExtrapolation = "far-extrapolation",
        /// The date lies beyond the horizon.
        BeyondHorizon = "beyond-horizon",
        /// The date lies after 9999-12-31.
        BeyondCalendar = "beyond-calendar",
        /// The date keeps moving later.
        Receding = "receding",
        /// A result of an earlier delivery changed or vanished.
        HistoryChanged = "history-changed",
        /// A daughter of this analyte exceeds its limit at this well.
        DaughterAboveLimit = "daughter-above-limit",
        /// A radionuclide falls more slowly than it decays.
        SlowerThanDecay = "slower-than-decay",
    }
}

/// The figure that raised a flag.
#[derive(Clone, Debug, PartialEq, Serialize)]
#[serde(untagged)]
pub enum Figure {
    /// A number.
    Number(f64),
    /// A date.
    Date(NaiveDate),
    /// The word that names which case it is, as a code: `years`.
    Word(&'static str),
    /// None applies.
    Absent,
}

/// Whether the test found something or could not be made.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
#[serde(rename_all = "kebab-case")]
pub enum Standing {
    /// The threshold is crossed.
    Raised,
    /// Too few data for the test. This is never "passed".
    NotAssessable,
}

/// One flag of one series.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Flag {
    /// Which one.
    pub code: FlagCode,
    /// Raised, or not assessable.
    pub standing: Standing,
    /// The figure that crossed the threshold.
    pub figure: Figure,
    /// The threshold in force, where it is a number.
    pub threshold: Option<f64>,
}

impl Flag {
    /// A flag raised by a number that crossed a threshold.
    #[must_use]
    pub fn raised(code: FlagCode, figure: f64, threshold: f64) -> Self {
        Self {
            code,
            standing: Standing::Raised,
            figure: Figure::Number(figure),
            threshold: Some(threshold),
        }
    }

    /// A flag raised by a fact that has no numeric threshold.
    #[must_use]
    pub fn fact(code: FlagCode, figure: Figure) -> Self {
        Self { code, standing: Standing::Raised, figure, threshold: None }
    }

    /// A test that could not be made.
    #[must_use]
    pub fn not_assessable(code: FlagCode, threshold: f64) -> Self {
        Self {
            code,
            standing: Standing::NotAssessable,
            figure: Figure::Absent,
            threshold: Some(threshold),
        }
    }
}

impl FlagCode {
    /// Where the threshold comes from.
    #[must_use]
    pub fn source(self) -> &'static str {
        match self {
            Self::FewDates | Self::FewDetects | Self::EstimatedResults => {
                "common practice, no source"
            }
            Self::Stale | Self::UnitSlip | Self::CopiedValues => "common practice, no source",
            Self::ShortRecord => {
                "reviews of long-term monitoring: about 4 years of quarterly data for a moderately \
                 accurate rate (Enviro Wiki, Long-Term Monitoring - Data Analysis)"
            }
            Self::MostlyNonDetects => "practice for censored records (from memory)",
            Self::ReportingLimitAboveLimit => "a limit over L says nothing about attaining L",
            Self::FallingReportingLimits | Self::UninformativeNonDetects => {
                "censored likelihood: a non-detect far above the line adds nothing"
            }
            Self::Substituted => {
                "the site file's setting (substitution distorts trends: Helsel 2005)"
            }
            Self::DuplicatesDiffer => {
                "relative percent difference, 30 % for ground water in project plans; the \
                 reporting-limit criterion near the limit from memory"
            }
            Self::WideScatter => "judgement: a factor of two either way",
            Self::Outlier => "Bonferroni test of the externally studentized residual (Cook 1977)",
            Self::InfluentialPoint => "Cook 1977; date when each sample is left out",
            Self::NotNormal => "Royston 1995, AS R94",
            Self::Autocorrelated => "continuous AR(1), likelihood ratio",
            Self::Seasonal => "Kruskal-Wallis on detrended residuals",
            Self::Slowing | Self::Quickening => "quadratic term, t test",
            Self::TwoRates | Self::LevelsOff => "AICc (Hurvich and Tsai 1989, from memory)",
            Self::TestsDisagree => "Kendall's test beside the rate's interval",
            Self::Unbounded | Self::NotLocated => "Fieller 1954; profile likelihood",
            Self::FarExtrapolation => {
                "US EPA, MNA Frequent Question 8: uncertainty grows with the timeframe"
            }
            Self::Receding | Self::WindowMovesDate => "judgement: the answer depends on a choice",
            Self::SlowerThanDecay => "the decay constant ln 2 / half-life",
            Self::DateWithheld
            | Self::EstimatedRecensored
            | Self::LowResultsLost
            | Self::Gap
            | Self::ResultsDenyLine
            | Self::BeyondHorizon
            | Self::BeyondCalendar
            | Self::HistoryChanged
            | Self::DaughterAboveLimit => "this program's rule",
        }
    }

    /// Whether the flag needs refits, and so full effort.
    #[must_use]
    pub fn needs_refit(self) -> bool {
        matches!(
            self,
            Self::InfluentialPoint
                | Self::NotNormal
                | Self::Autocorrelated
                | Self::Seasonal
                | Self::Slowing
                | Self::Quickening
                | Self::TwoRates
                | Self::LevelsOff
                | Self::WindowMovesDate
                | Self::Receding
                | Self::HistoryChanged
        )
    }
}
