//! One series through the stages: points, fit, projection, verdict, dates, pace, flags.

use chrono::NaiveDate;

use super::job::{Job, Kind};
use crate::doubts::{Doubts, Setup, doubts};
use crate::fit::{Fit, FitRules, RateSign, fit};
use crate::judge::facts::Kendall;
use crate::judge::pace::stands_in_the_way;
use crate::judge::{Facts, JudgeRules, Judged, Shown, flags, shown, sort_flags, verdict};
use crate::numerics::{
    Points as NumericPoints, akritas_theil_sen, certain_pairs, mann_kendall, theil_sen,
};
use crate::project::{Projection, band, project};
use crate::series::{LeaveOut, MergeRules, Points, RoundRules, WellSeries, points, window_for};
use crate::site::{Role, Site};
use crate::terms::{BandPoint, Effort, Flag, WhyNoRate, years_between};

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
    /// Kendall's test and Theil–Sen.
    pub ranks: Option<(Kendall, Option<Sen>)>,
    /// The verdict.
    pub judged: Judged,
    /// The dates.
    pub shown: Shown,
    /// What refits found out, the pace among it.
    pub doubts: Doubts,
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
            leave_out: LeaveOut::Nothing,
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
    let merge = rules.merge(series);
    let points = points(series, &merge);
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
    let mut flags = flags(&facts, &judged, &shown);
    let doubts = match (rules.effort, kind) {
        (Effort::Full, Kind::Review) => {
            let setup = Setup {
                merge: &merge,
                rate_needs: settings.rate_needs,
                events: &rules.site.events,
            };
            doubts(&facts, &judged, &shown, &setup)
        }
        _ => Doubts::default(),
    };
    flags.extend(doubts.flags.iter().cloned());
    sort_flags(&mut flags);
    let denied = doubts.alternative.is_some_and(|alternative| alternative.denies);
    let stands = stands_in_the_way(&facts, &judged, &shown, role, denied);
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
        doubts,
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

/// Kendall's test and Theil–Sen; with non-detects over the pairs whose order is certain.
fn ranks(points: &Points, confidence: f64) -> Option<(Kendall, Option<Sen>)> {
    /// Two values have one pair, which tests nothing.
    const FEWEST: usize = 3;
    let slices = points.slices();
    let detects = points.fitted().filter(|value| value.is_detect()).count();
    if slices.t.len() < FEWEST || detects == 0 {
        return None;
    }
    if points.fitted().all(|value| value.is_measured()) {
        let test = mann_kendall(&slices.t, &slices.y)?;
        #[allow(clippy::cast_precision_loss)] // a count of pairs
        let kendall = Kendall { s: test.s as f64, p: test.p };
        let sen = theil_sen(&slices.t, &slices.y, confidence).map(|sen| Sen {
            slope: sen.slope,
            low: sen.interval.map(|interval| interval.low),
            high: sen.interval.map(|interval| interval.high),
        });
        return Some((kendall, sen));
    }
    let numeric = NumericPoints::new(&slices.t, &slices.y, &slices.mark).ok()?;
    let test = certain_pairs(numeric)?;
    #[allow(clippy::cast_precision_loss)] // a count of pairs
    let kendall = Kendall { s: test.s as f64, p: test.p };
    let sen = akritas_theil_sen(numeric, confidence).map(|sen| Sen {
        slope: sen.slope,
        low: sen.ends.low,
        high: sen.ends.high,
    });
    Some((kendall, sen))
}

/// Theil and Sen's slope, per year, with the ends that exist.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Sen {
    /// The slope of ln C, negative when falling.
    pub slope: f64,
    /// Its lower end.
    pub low: Option<f64>,
    /// Its upper end.
    pub high: Option<f64>,
}
