//! What is judged: a series, its points, its fit, and the rules in force.

use chrono::NaiveDate;

use crate::fit::Fit;
use crate::project::Projection;
use crate::series::{DateValue, Points, Round, RoundRules, WellSeries};
use crate::site::{DateNeeds, FlagThresholds};
use crate::terms::{WhyNoRate, Years, years_between};

/// Everything that judging reads beside the data.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct JudgeRules {
    /// The as-of date.
    pub as_of: NaiveDate,
    /// The two-sided confidence.
    pub confidence: f64,
    /// What a date needs.
    pub date_needs: DateNeeds,
    /// Years past the last used date beyond which a date is not told to people.
    pub horizon_years: f64,
    /// The rate within which an interval shows a flat series.
    pub flat_margin: f64,
    /// Thresholds of flags.
    pub flags: FlagThresholds,
    /// Years after which this series' newest result is stale.
    pub stale_after_years: f64,
    /// How the site divides its years.
    pub rounds: RoundRules,
}

/// One series with all that was computed of it.
#[derive(Clone, Copy, Debug)]
pub struct Facts<'a> {
    /// The series.
    pub series: &'a WellSeries,
    /// One value a date.
    pub points: &'a Points,
    /// The fit, or why there is none.
    pub fit: Result<&'a Fit, WhyNoRate>,
    /// The projection onto the limit, where there is a fit and a limit.
    pub projection: Option<&'a Projection>,
    /// Kendall's two-sided p, where every value is measured.
    pub kendall: Option<Kendall>,
    /// The rules.
    pub rules: &'a JudgeRules,
}

/// Kendall's test as judging reads it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Kendall {
    /// S, negative when falling.
    pub s: f64,
    /// Two-sided p.
    pub p: f64,
}

/// How many of the last dates a count looks at.
pub const LAST_DATES: usize = 8;

impl<'a> Facts<'a> {
    /// The values in the window, by date.
    #[must_use]
    pub fn values(&self) -> Vec<&'a DateValue> {
        self.points.fitted().collect()
    }

    /// Dates in the window with a detect.
    #[must_use]
    pub fn detects(&self) -> usize {
        self.points.fitted().filter(|value| value.is_detect()).count()
    }

    /// Dates in the window with a measured value.
    #[must_use]
    pub fn measured(&self) -> usize {
        self.points.fitted().filter(|value| value.is_measured()).count()
    }

    /// Last minus first date in the window.
    #[must_use]
    pub fn length(&self) -> Years {
        self.points.span().map_or(Years(0.0), |span| span.years())
    }

    /// Years from the last used date to the as-of date.
    #[must_use]
    pub fn age(&self) -> Option<f64> {
        self.points.span().map(|span| years_between(span.last, self.rules.as_of).0)
    }

    /// Whether the newest used result is old.
    #[must_use]
    pub fn is_stale(&self) -> bool {
        self.age().is_some_and(|age| age > self.rules.stale_after_years)
    }

    /// The limit in the series' unit.
    #[must_use]
    pub fn limit(&self) -> Option<f64> {
        self.series.limit.as_ref().map(|limit| limit.value)
    }

    /// The last `n` dates in the window.
    #[must_use]
    pub fn last(&self, n: usize) -> Vec<&'a DateValue> {
        let values = self.values();
        values[values.len().saturating_sub(n)..].to_vec()
    }

    /// Distinct rounds of some dates.
    #[must_use]
    pub fn rounds(&self, values: &[&DateValue]) -> usize {
        let rounds: std::collections::BTreeSet<Round> =
            values.iter().map(|value| self.rules.rounds.of(value.date)).collect();
        rounds.len()
    }

    /// Zero or negative results lost, as a share of them and the dates with a value.
    #[must_use]
    pub fn low_results_lost(&self) -> f64 {
        let in_window =
            |date: &&NaiveDate| self.points.window.holds(**date) && **date <= self.rules.as_of;
        let mut lost: Vec<NaiveDate> =
            self.series.low_results.iter().filter(in_window).copied().collect();
        lost.sort_unstable();
        #[allow(clippy::cast_precision_loss)] // counts of dates
        let (lost, dates) = (lost.len() as f64, self.points.fitted().count() as f64);
        if lost > 0.0 { lost / (lost + dates) } else { 0.0 }
    }
}
