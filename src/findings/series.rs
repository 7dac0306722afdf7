//! What a run found out about one series.

use chrono::NaiveDate;

use crate::series::SeriesKey;
use crate::site::Role;
pub use crate::terms::BandPoint;
use crate::terms::{
    Adjusted, Choice, ChoiceSpan, Flag, Method, ModelFit, MoreRounds, Pace, PerYear, Reading, Span,
    Unit, Verdict, WhyNoDate, WhyNoRate,
};

/// One series; a field that does not apply is `None`, never zero.
#[derive(Clone, Debug)]
pub struct SeriesFinding {
    /// Site, well, analyte, fraction, depth.
    pub key: SeriesKey,
    /// The well's role.
    pub role: Role,
    /// The analyte's CAS number.
    pub cas: Option<String>,
    /// The unit of every concentration here.
    pub unit: Unit,
    /// The limit in force, in `unit`.
    pub limit: Option<f64>,
    /// Where the limit comes from.
    pub limit_source: Option<String>,
    /// The goal date in force.
    pub goal_date: Option<NaiveDate>,
    /// Dates in the window, after merging.
    pub samples: usize,
    /// Dates in the window with a detect.
    pub detects: usize,
    /// First and last date in the window.
    pub sampled: Option<Span>,
    /// The reading of the last used date.
    pub last_result: Option<Reading>,
    /// The verdict.
    pub verdict: Verdict,
    /// The reach date against the goal date.
    pub pace: Option<Pace>,
    /// How it was computed.
    pub method: Option<Method>,
    /// The first-order rate.
    pub rate_per_year: Option<PerYear>,
    /// Its lower end.
    pub rate_lower: Option<PerYear>,
    /// Its upper end.
    pub rate_upper: Option<PerYear>,
    /// Level at the first used date.
    pub level_at_start: Option<f64>,
    /// Level at the last used date.
    pub level_now: Option<f64>,
    /// Its lower end.
    pub level_now_lower: Option<f64>,
    /// Its upper end.
    pub level_now_upper: Option<f64>,
    /// The share of single samples over the limit at the last used date.
    pub share_over_limit_now: Option<f64>,
    /// Residual standard deviation of ln C.
    pub residual_sd_ln: Option<f64>,
    /// Share of the variance explained (a likelihood-ratio form with non-detects).
    pub r_squared: Option<f64>,
    /// Two-sided p of no slope.
    pub slope_p: Option<f64>,
    /// The same, adjusted over the site's series.
    pub slope_p_adjusted: Option<f64>,
    /// Kendall's S, negative when falling.
    pub kendall_s: Option<f64>,
    /// Its two-sided p.
    pub kendall_p: Option<f64>,
    /// Theil–Sen rate, positive when falling.
    pub sen_rate_per_year: Option<f64>,
    /// Its lower end.
    pub sen_rate_lower: Option<f64>,
    /// Its upper end.
    pub sen_rate_upper: Option<f64>,
    /// When the line meets the limit.
    pub reach_date: Option<NaiveDate>,
    /// The early end.
    pub reach_earliest: Option<NaiveDate>,
    /// The late end.
    pub reach_latest: Option<NaiveDate>,
    /// When the arithmetic mean meets the limit.
    pub reach_date_mean: Option<NaiveDate>,
    /// When a rising line crosses the limit.
    pub exceed_date: Option<NaiveDate>,
    /// Its early end.
    pub exceed_earliest: Option<NaiveDate>,
    /// The rate that would meet the limit by the goal date.
    pub required_rate_per_year: Option<f64>,
    /// The better model, if one is.
    pub alternative_model: Option<&'static str>,
    /// Its date.
    pub alternative_date: Option<NaiveDate>,
    /// Further rounds to a decision.
    pub rounds_to_decisive: Option<usize>,
    /// The verdict of the round before.
    pub previous_verdict: Option<Verdict>,
    /// How far the date moved, in years, positive is later.
    pub reach_shift_years: Option<f64>,
    /// Why there is no rate.
    pub why_no_rate: Option<WhyNoRate>,
    /// Why there is no reach date.
    pub why_no_date: Option<WhyNoDate>,
    /// Flags in their order, raised and not assessable.
    pub flags: Vec<Flag>,
    /// Whether the reach date lies beyond the horizon (people then read "beyond the horizon").
    pub beyond_horizon: bool,
    /// Whether the early end of the reach interval lies beyond the horizon.
    pub earliest_beyond_horizon: bool,
    /// Whether the late end of the reach interval lies beyond the horizon.
    pub latest_beyond_horizon: bool,
    /// The last date that people read as a date.
    pub horizon: Option<NaiveDate>,
    /// Whether the series stands in the way of the site's date.
    pub stands_in_the_way: bool,
    /// The value of each date, those outside the window too.
    pub values: Vec<UsedValue>,
    /// The fitted line with its band, for charts and `used.csv`.
    pub fitted: Option<Fitted>,
    /// Duplicates with their parents.
    pub duplicates: Vec<DuplicateFinding>,
    /// How many records of each fate the series has, by outcome and reason code.
    pub records: Vec<super::OutcomeCount>,
    /// Whether the better model denies the date that the line gives.
    pub alternative_denies: bool,
    /// Every model on the same data.
    pub models: Vec<ModelFit>,
    /// The rate's interval with correlation allowed for, where that is found.
    pub adjusted: Option<Adjusted>,
    /// What other choices would say, a span a kind.
    pub spans: Vec<ChoiceSpan>,
    /// The single choice or sample that matters most.
    pub most_telling: Option<Choice>,
    /// How much more sampling would settle it.
    pub more_rounds: MoreRounds,
}

/// One date's value as used.csv lists it.
#[derive(Clone, Debug, PartialEq)]
pub struct UsedValue {
    /// The date.
    pub date: NaiveDate,
    /// Its value.
    pub reading: Reading,
    /// Whether it is estimated.
    pub estimated: bool,
    /// Whether it is fitted.
    pub in_fit: bool,
    /// The fitted median on the date, where a line exists.
    pub fitted_median: Option<f64>,
    /// ln value − ln fitted, for measured values in the fit.
    pub residual: Option<f64>,
    /// `file:record` of each record that enters the value.
    pub records: Vec<String>,
}

/// A fitted line, as far as a chart needs it.
#[derive(Clone, Debug, PartialEq)]
pub struct Fitted {
    /// First and last used date.
    pub used: Span,
    /// The line and its band, dates ascending; beyond `used.last` it is a projection.
    pub band: Vec<BandPoint>,
}

/// A duplicate pair as tables list it.
#[derive(Clone, Debug, PartialEq)]
pub struct DuplicateFinding {
    /// The date.
    pub date: NaiveDate,
    /// What the sample says.
    pub parent: Reading,
    /// What the duplicate says.
    pub duplicate: Reading,
    /// Relative percent difference, where both are measured.
    pub rpd_percent: Option<f64>,
    /// Whether the pair differs by more than the criterion.
    pub differs: bool,
    /// `file:record` of the duplicate.
    pub record: String,
}

impl SeriesFinding {
    /// Whether the last used date's reading is a detect over the limit.
    #[must_use]
    pub fn over_limit_now(&self) -> bool {
        match (self.last_result, self.limit) {
            (Some(reading), Some(limit)) => reading.exceeds(limit),
            _ => false,
        }
    }

    /// Half-life with its ends: (estimate, lower, upper) in years, where the rate's sign allows it.
    #[must_use]
    pub fn half_life_years(&self) -> (Option<f64>, Option<f64>, Option<f64>) {
        let (Some(rate), Some(lower), Some(upper)) =
            (self.rate_per_year, self.rate_lower, self.rate_upper)
        else {
            return (None, None, None);
        };
        let estimate = rate.half_life().map(|years| years.0);
        // The ends exist only where the whole interval is positive.
        let ends = (lower.0 > 0.0)
            .then(|| (upper.half_life().map(|y| y.0), lower.half_life().map(|y| y.0)));
        let (low, high) = ends.unwrap_or((None, None));
        (estimate, low, high)
    }
}
