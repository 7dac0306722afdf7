//! One series through the stages: points, fit, projection, verdict, dates, pace, flags.

use chrono::NaiveDate;

use super::job::{Job, Kind};
use crate::fit::{Fit, FitRules, RateSign, fit};
use crate::judge::facts::Kendall;
use crate::judge::pace::stands_in_the_way;
use crate::judge::{Facts, JudgeRules, Judged, Shown, flags, pace, shown, verdict};
use crate::numerics::{TheilSen, mann_kendall, theil_sen};
use crate::project::{Projection, band, project};
use crate::series::{MergeRules, Points, RoundRules, WellSeries, points, window_for};
use crate::site::{Role, Site};
use crate::terms::{BandPoint, Effort, Flag, Pace, WhyNoRate, years_between};

/// The rules of a run.
pub struct Rules<'a> {
    site: &'a Site,
    as_of: NaiveDate,
    effort: Effort,
}

/// Everything computed of one series.
#[derive(Clone, Debug)]
pub struct Computed {
    /// One value a date, and what became of each candidate.
    pub points: Points,
    /// The fit, or why there is none.
    pub fit: Result<Fit, WhyNoRate>,
    /// Kendall's test and Theil–Sen, where every value is measured.
    pub ranks: Option<(Kendall, Option<TheilSen>)>,
    /// The verdict.
    pub judged: Judged,
    /// The dates.
    pub shown: Shown,
    /// The pace.
    pub pace: Option<Pace>,
    /// The flags.
    pub flags: Vec<Flag>,
    /// Dates with a detect in the window.
    pub detects: usize,
    /// The well's role.
    pub role: Role,
    /// Whether the series stands in the way of the site's date.
    pub stands_in_the_way: bool,
    /// The line and its band, for the chart.
    pub band: Vec<BandPoint>,
}

impl<'a> Rules<'a> {
    /// The rules of a job.
    #[must_use]
    pub fn of(job: &'a Job, as_of: NaiveDate) -> Self {
        Self { site: &job.site, as_of, effort: job.effort }
    }

    fn merge(&self, series: &WellSeries) -> MergeRules {
        let settings = &self.site.settings;
        MergeRules {
            known_until: self.as_of,
            window: window_for(self.site, &series.key, self.as_of),
            same_day: settings.same_day,
            duplicates: settings.duplicates,
            non_detects: settings.non_detects,
        }
    }

    fn judge(&self, series: &WellSeries) -> JudgeRules {
        let settings = &self.site.settings;
        JudgeRules {
            as_of: self.as_of,
            confidence: settings.confidence,
            date_needs: settings.date_needs,
            horizon_years: settings.horizon_years,
            flat_margin: settings.flat_margin,
            flags: self.site.flags,
            stale_after_years: self.stale_after(series),
            rounds: RoundRules { length: settings.round },
        }
    }

    /// A well expected less often than yearly is stale after one and a half of its intervals.
    fn stale_after(&self, series: &WellSeries) -> f64 {
        const INTERVALS: f64 = 1.5;
        let names = |list: &[String], name: &str| list.is_empty() || list.iter().any(|n| n == name);
        let every = self
            .site
            .expected
            .iter()
            .filter(|expected| {
                names(&expected.wells, &series.key.well)
                    && names(&expected.analytes, &series.key.analyte)
            })
            .map(|expected| expected.every_months)
            .min();
        match every {
            Some(months) if months > 12 => INTERVALS * f64::from(months) / 12.0,
            _ => self.site.settings.stale_after_years,
        }
    }
}

/// Computes one series. A check merges the dates, so that every record has its fate, and fits
/// nothing.
#[must_use]
pub fn compute(series: &WellSeries, rules: &Rules<'_>, kind: Kind) -> Computed {
    let points = points(series, &rules.merge(series));
    let settings = &rules.site.settings;
    let fitted = match kind {
        Kind::Check => Err(WhyNoRate::NoDatesInWindow),
        Kind::Review => {
            fit(&points, &FitRules { needs: settings.rate_needs, confidence: settings.confidence })
        }
    };
    let limit = series.limit.as_ref().map(|limit| limit.value);
    let projection = fitted.as_ref().ok().zip(limit).map(|(fit, limit)| project(fit, limit));
    let ranks = ranks(&points, settings.confidence);
    let judge_rules = rules.judge(series);
    let facts = Facts {
        series,
        points: &points,
        fit: fitted.as_ref().map_err(|why| *why),
        projection: projection.as_ref(),
        kendall: ranks.map(|(kendall, _)| kendall),
        rules: &judge_rules,
    };
    let judged = verdict(&facts);
    let shown = shown(&facts, &judged);
    let role = rules.site.role_of(&series.key.well);
    let pace = match rules.effort {
        Effort::Full => pace(&facts, &judged, &shown),
        Effort::Quick => None,
    };
    let flags = flags(&facts, &judged, &shown);
    let stands = stands_in_the_way(&facts, &judged, &shown, role);
    let detects = facts.detects();
    let band = fitted.as_ref().map_or_else(
        |_| Vec::new(),
        |fit| band(fit, until(fit, projection.as_ref(), &shown), settings.horizon_years),
    );
    Computed {
        fit: fitted,
        ranks,
        judged,
        shown,
        pace,
        flags,
        detects,
        role,
        stands_in_the_way: stands,
        band,
        points,
    }
}

/// How far the chart's line goes on, in years from the first used date: to the late end of a date
/// that is shown, a little past it.
fn until(fit: &Fit, projection: Option<&Projection>, shown: &Shown) -> Option<f64> {
    const PAST: f64 = 0.05;
    let projection = projection?;
    let farthest = match fit.sign() {
        RateSign::Falling => shown.latest.or(shown.reach),
        RateSign::Rising => shown.exceed,
        RateSign::HoldsZero => shown.earliest.filter(|_| projection.earliest.is_some()),
    }?;
    Some(years_between(fit.used.first, farthest).0 + PAST * fit.length().0)
}

/// Kendall's test and Theil–Sen; with non-detects both wait for their censored forms.
fn ranks(points: &Points, confidence: f64) -> Option<(Kendall, Option<TheilSen>)> {
    /// Two values have one pair, which tests nothing.
    const FEWEST: usize = 3;
    let all_measured = points.fitted().all(|value| value.is_measured());
    let slices = points.slices();
    if !all_measured || slices.t.len() < FEWEST {
        return None;
    }
    let test = mann_kendall(&slices.t, &slices.y)?;
    #[allow(clippy::cast_precision_loss)] // a count of pairs
    let kendall = Kendall { s: test.s as f64, p: test.p };
    Some((kendall, theil_sen(&slices.t, &slices.y, confidence)))
}
