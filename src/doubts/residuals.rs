//! Residuals: normal, independent, the same in every quarter of the year.

use chrono::Datelike;

use crate::fit::{Fit, RateSign};
use crate::judge::Facts;
use crate::numerics::{Interval, Mark, car1, kruskal_wallis, shapiro_wilk};
use crate::series::points::Slices;
use crate::terms::{Adjusted, Flag, FlagCode, Verdict};

/// What the residuals say.
#[derive(Clone, Debug, Default)]
pub struct Diagnosis {
    /// Raised and not assessable.
    pub flags: Vec<Flag>,
    /// The rate's interval with correlation allowed for, where it is found.
    pub adjusted: Option<Adjusted>,
}

/// Every residual test is made at this level.
const P: f64 = 0.05;
/// The share of non-detects up to which detects' residuals stand for all.
const MOST_NON_DETECTS: f64 = 0.2;
/// Fewer residuals than this say nothing about normality.
const FEWEST_FOR_NORMALITY: usize = 8;
/// Fewer residuals than this have no power against correlation.
const FEWEST_FOR_CORRELATION: usize = 15;
/// Each quarter of the year needs as many.
const FEWEST_A_QUARTER: usize = 3;

/// Residuals of the measured values, with their times and quarters.
struct Residuals {
    t: Vec<f64>,
    y: Vec<f64>,
    residual: Vec<f64>,
    quarter: Vec<usize>,
}

/// Tests the residuals of a fit.
#[must_use]
pub fn diagnose(facts: &Facts<'_>, fit: &Fit, slices: &Slices) -> Diagnosis {
    let mut out = Diagnosis::default();
    #[allow(clippy::cast_precision_loss)] // counts of dates
    let share = fit.line.non_detects as f64 / fit.line.n as f64;
    if share > MOST_NON_DETECTS {
        for code in [FlagCode::NotNormal, FlagCode::Autocorrelated, FlagCode::Seasonal] {
            out.flags.push(Flag::not_assessable(code, P));
        }
        return out;
    }
    let of = measured(facts, fit, slices);
    out.flags.extend(normality(&of));
    out.flags.extend(season(&of));
    if of.residual.len() < FEWEST_FOR_CORRELATION {
        out.flags.push(Flag::not_assessable(FlagCode::Autocorrelated, P));
    } else if let Some(found) = car1(&of.t, &of.y).filter(|found| found.p < P) {
        out.flags.push(Flag::raised(FlagCode::Autocorrelated, found.phi, P));
        let plain = fit.rate_interval;
        // The standard error behind the interval at its own degrees of freedom.
        let quantile = crate::numerics::tails::student_within(fit.confidence, fit.line.m - 2.0);
        let error = (plain.high - plain.low) / (2.0 * quantile);
        let slope = found.adjusted(fit.line.slope, error, fit.confidence);
        out.adjusted = Some(adjusted(facts, fit, found.phi, slope));
    }
    out
}

fn measured(facts: &Facts<'_>, fit: &Fit, slices: &Slices) -> Residuals {
    let mut out =
        Residuals { t: Vec::new(), y: Vec::new(), residual: Vec::new(), quarter: Vec::new() };
    for (at, value) in facts.points.fitted().enumerate() {
        if slices.mark[at] == Mark::Measured {
            out.t.push(slices.t[at]);
            out.y.push(slices.y[at]);
            out.residual.push(slices.y[at] - fit.line.fitted(slices.t[at]));
            out.quarter.push(value.date.month0() as usize / 3);
        }
    }
    out
}

fn normality(of: &Residuals) -> Option<Flag> {
    if of.residual.len() < FEWEST_FOR_NORMALITY {
        return Some(Flag::not_assessable(FlagCode::NotNormal, P));
    }
    let test = shapiro_wilk(&of.residual)?;
    (test.p < P).then(|| Flag::raised(FlagCode::NotNormal, test.p, P))
}

/// Kruskal–Wallis by calendar quarter; the line has been taken out already.
fn season(of: &Residuals) -> Option<Flag> {
    let test = kruskal_wallis(&of.residual, &of.quarter)
        .filter(|test| test.groups > 1 && test.smallest >= FEWEST_A_QUARTER);
    match test {
        None => Some(Flag::not_assessable(FlagCode::Seasonal, P)),
        Some(test) => (test.p < P).then(|| Flag::raised(FlagCode::Seasonal, test.p, P)),
    }
}

/// The adjusted interval of the rate, and whether the verdict would be another under it.
fn adjusted(facts: &Facts<'_>, fit: &Fit, phi: f64, slope: Interval) -> Adjusted {
    let (rate_lower, rate_upper) = (-slope.high, -slope.low);
    let sign = if rate_lower > 0.0 {
        RateSign::Falling
    } else if rate_upper < 0.0 {
        RateSign::Rising
    } else {
        RateSign::HoldsZero
    };
    let margin = facts.rules.flat_margin;
    let within = |low: f64, high: f64| low >= -margin && high <= margin;
    let was_flat = within(fit.rate_interval.low, fit.rate_interval.high);
    let verdict = crate::judge::verdict(facts).verdict;
    let changes_verdict = match verdict {
        Verdict::Rising | Verdict::Attenuating => sign != fit.sign(),
        Verdict::Flat => was_flat && !within(rate_lower, rate_upper),
        _ => false,
    };
    Adjusted { phi, rate_lower, rate_upper, changes_verdict }
}
