//! The best break where some values are bounds: a grid of breaks, then a closer look.

use super::alternatives::Dropped;
use super::broken::{Broken, stretches};
use super::columns::columns;
use super::first_order::FirstOrder;
use super::information::Misfit;
use super::points::{Mark, Point};

/// Breaks of the grid, at most (a count). Source: one between any two dates of a record of fifteen
/// years of quarters; the closer look finds the rest.
const MOST_BREAKS: usize = 60;

/// Points that the grid is laid over, at most (a count); of more, every so manieth is looked at.
const MOST_POINTS: usize = 1_000;

/// Steps of the closer look in one stretch (a count). Source: 0.618³⁰, half a millionth of it.
const CLOSER_STEPS: usize = 30;

/// The same where the record was thinned for the grid: a third of a per cent of a stretch, far under
/// what so many points leave unknown.
const STEPS_IF_THINNED: usize = 12;

/// The golden section (a pure number). Source: (√5 − 1)/2.
const GOLDEN: f64 = 0.618_033_988_749_894_9;

/// The broken line of greatest likelihood.
///
/// # Formula
/// ```text
/// max over ψ of ℓ(ψ)     ℓ(ψ) = max over level, slopes and scatter
/// ```
/// first over a grid of breaks, then by golden sections on both sides of the best of them.
///
/// # Units
/// Those of the points.
///
/// # Limits
/// 60 breaks on at most 1,000 points, then 2 × 30 on all, 2 × 12 where there are more. Where ℓ(ψ) has several tops the grid
/// decides which.
///
/// # Errors
/// [`Dropped::NoRoom`]; [`Dropped::NotConverged`].
///
/// # Reference
/// Methods note 5.8. Held against [`super::break_squares::best`] where all is measured, in tests.
pub fn best(sorted: &[Point], fit: &FirstOrder) -> Result<Broken, Dropped> {
    let (low, high) = room(sorted).ok_or(Dropped::NoRoom)?;
    let straight = Broken {
        break_at: low,
        level: fit.fitted(low),
        before: fit.slope,
        after: fit.slope,
        misfit: Misfit::LogLikelihood(fit.log_likelihood),
    };
    let thin: Vec<Point> =
        sorted.iter().step_by(sorted.len().div_ceil(MOST_POINTS)).copied().collect();
    let breaks = grid(&thin, low, high);
    let lost = Dropped::NotConverged { steps: breaks.len() };
    let steps = if thin.len() < sorted.len() { STEPS_IF_THINNED } else { CLOSER_STEPS };
    let (mut top, mut near) = (0, None);
    for (i, &at) in breaks.iter().enumerate() {
        let broken = at_break(&thin, at, &straight, fit.ml_scale);
        if height(&broken) > height(&near) {
            (top, near) = (i, broken);
        }
    }
    let near = near.ok_or(lost)?;
    let mut found = at_break(sorted, breaks[top], &near, fit.ml_scale);
    for (from, to) in [
        (breaks[top.saturating_sub(1)], breaks[top]),
        (breaks[top], breaks[(top + 1).min(breaks.len() - 1)]),
    ] {
        let start = found.unwrap_or(near);
        if from < to {
            let closer = golden(from, to, steps, |at| at_break(sorted, at, &start, fit.ml_scale));
            if height(&closer) > height(&found) {
                found = closer;
            }
        }
    }
    found.ok_or(lost)
}

/// Breaks to try, from `low` to `high`.
fn grid(thin: &[Point], low: f64, high: f64) -> Vec<f64> {
    let inside = thin.iter().map(|point| point.t).filter(|&t| low < t && t < high);
    let mut breaks: Vec<f64> = std::iter::once(low).chain(inside).collect();
    breaks.dedup();
    let every = breaks.len().div_ceil(MOST_BREAKS);
    let mut breaks: Vec<f64> = breaks.into_iter().step_by(every).collect();
    breaks.push(high);
    breaks
}

fn height(found: &Option<Broken>) -> f64 {
    match found.map(|broken| broken.misfit) {
        Some(Misfit::LogLikelihood(value)) => value,
        _ => f64::NEG_INFINITY,
    }
}

/// From where to where a break may lie.
fn room(sorted: &[Point]) -> Option<(f64, f64)> {
    let measured: Vec<f64> =
        sorted.iter().filter(|point| point.mark == Mark::Measured).map(|point| point.t).collect();
    // The break may not lie before the second measured date, nor after the last but one.
    let second = *measured.iter().find(|&&t| t > measured[0])?;
    let last = measured[measured.len() - 1];
    let last_but_one = *measured.iter().rev().find(|&&t| t < last)?;
    let mut places = stretches(sorted)
        .map(|(_, low, high)| (low.max(second), high.min(last_but_one)))
        .filter(|(low, high)| low <= high);
    let (low, high) = places.next()?;
    Some((low, places.last().map_or(high, |(_, high)| high)))
}

fn golden(from: f64, to: f64, steps: usize, at: impl Fn(f64) -> Option<Broken>) -> Option<Broken> {
    let (mut low, mut high) = (from, to);
    let mut left = at(high - GOLDEN * (high - low));
    let mut right = at(low + GOLDEN * (high - low));
    for _ in 0..steps {
        if height(&left) >= height(&right) {
            high = low + GOLDEN * (high - low);
            right = left;
            left = at(high - GOLDEN * (high - low));
        } else {
            low = high - GOLDEN * (high - low);
            left = right;
            right = at(low + GOLDEN * (high - low));
        }
    }
    if height(&left) >= height(&right) { left } else { right }
}

/// The broken line with its break at `break_at`, by likelihood, searched for from another one.
///
/// # Formula
/// ```text
/// columns 1, min(t − ψ, 0), max(t − ψ, 0) of the concave likelihood
/// ```
///
/// # Units
/// Those of the points; `scale` is a guess at the scatter.
///
/// # Limits
/// As [`columns`].
///
/// # None
/// As [`columns`].
///
/// # Reference
/// Tobin (1958) with three columns.
pub fn at_break(sorted: &[Point], break_at: f64, near: &Broken, scale: f64) -> Option<Broken> {
    let span = sorted[sorted.len() - 1].t - sorted[0].t;
    let row = |point: &Point| {
        let off = (point.t - break_at) / span;
        [1.0, off.min(0.0), off.max(0.0)]
    };
    let x: Vec<[f64; 3]> = sorted.iter().map(row).collect();
    let y: Vec<f64> = sorted.iter().map(|point| point.y).collect();
    let mark: Vec<Mark> = sorted.iter().map(|point| point.mark).collect();
    let guess = [near.level, near.before * span, near.after * span];
    let fitted = columns(&x, &y, &mark, guess, scale)?;
    Some(Broken {
        break_at,
        level: fitted.factors[0],
        before: fitted.factors[1] / span,
        after: fitted.factors[2] / span,
        misfit: Misfit::LogLikelihood(fitted.log_likelihood),
    })
}
