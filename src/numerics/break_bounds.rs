//! The best break where some values are bounds: a grid of breaks, then a closer look.

use super::alternatives::Dropped;
use super::broken::{Broken, stretches};
use super::columns::columns;
use super::first_order::FirstOrder;
use super::information::Misfit;
use super::normal::lower_tail;
use super::points::{Mark, Point};

/// Breaks of the grid, at most (a count). Source: one at every date of a record of twenty years of
/// quarters.
const MOST_BREAKS: usize = 80;

/// Points that the grid is laid over, at most (a count); of more, every so manieth is looked at.
/// Source: their likelihood is as smooth as that of all.
const MOST_POINTS: usize = 1_000;

/// Steps of a closer look, at most (a count). Source: measured; five or six arrive.
const CLOSER_STEPS: usize = 40;

/// A closer look ends at this share of the record. Source: a second of twenty years.
const CLOSE: f64 = 1e-9;

/// The same where the record was thinned for the grid. Source: far under what so many points leave
/// unknown.
const CLOSE_IF_THINNED: f64 = 1e-5;

/// A closer look ends where no more than this is to be gained (log-likelihood). Source: rounding.
const SMALL_GAIN: f64 = 1e-12;

/// The broken line of greatest likelihood.
///
/// # Formula
/// ```text
/// max over ψ of ℓ(ψ)     ℓ(ψ) = max over level, slopes and scatter
/// ℓ′(ψ) = −b₁·Σ gᵢ (tᵢ < ψ) − b₂·Σ gᵢ (tᵢ > ψ)
/// ```
/// where `g` are the derivatives of the log-likelihood by the fitted values. Every date may be the
/// break; between two of them there is a top where ℓ′ falls through zero.
///
/// # Units
/// Those of the points.
///
/// # Limits
/// The grid has 80 breaks on 1,000 points at most; from the best of them a longer record is climbed in
/// full.
///
/// # Errors
/// [`Dropped::NoRoom`]; [`Dropped::NotConverged`].
///
/// # Reference
/// Methods note 5.8. Held against [`super::break_squares::best`] where all is measured, in tests.
pub fn best(sorted: &[Point], fit: &FirstOrder) -> Result<Broken, Dropped> {
    let (low, high) = room(sorted).ok_or(Dropped::NoRoom)?;
    let thin: Vec<Point> =
        sorted.iter().step_by(sorted.len().div_ceil(MOST_POINTS)).copied().collect();
    let straight = Held {
        broken: Broken {
            break_at: low,
            level: fit.fitted(low),
            before: fit.slope,
            after: fit.slope,
            misfit: Misfit::LogLikelihood(fit.log_likelihood),
        },
        value: fit.log_likelihood,
        scale: fit.ml_scale,
        lean: [0.0; 2],
    };
    let record = Record::new(&thin);
    let breaks = grid(&thin, low, high);
    let lost = Dropped::NotConverged { steps: breaks.len() };
    let coarse: Vec<Held> = breaks.iter().filter_map(|&at| record.held(at, &straight)).collect();
    let closer = coarse.windows(2).filter_map(|pair| record.between(pair[0], pair[1], CLOSE));
    let all = coarse.iter().copied().chain(closer);
    let found = all.reduce(|best, held| if held.value > best.value { held } else { best });
    let found = found.ok_or(lost)?;
    if thin.len() == sorted.len() {
        return Ok(found.broken);
    }
    let record = Record::new(sorted);
    let step = (high - low) / breaks.len() as f64;
    record.uphill(&found, step, low, high).map(|held| held.broken).ok_or(lost)
}

/// Breaks to try, from `low` to `high`.
fn grid(thin: &[Point], low: f64, high: f64) -> Vec<f64> {
    let inside = thin.iter().map(|point| point.t).filter(|&t| low < t && t < high);
    let mut breaks: Vec<f64> = std::iter::once(low).chain(inside).collect();
    breaks.dedup();
    let every = breaks.len().div_ceil(MOST_BREAKS);
    let mut breaks: Vec<f64> = breaks.into_iter().step_by(every).collect();
    if low < high {
        breaks.push(high);
    }
    breaks
}

/// From where to where a break may lie: with measured values on two dates on each side, since with
/// fewer a slope may run off to infinity under a row of non-detects.
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

/// A broken line with its break held, at its best.
#[derive(Clone, Copy)]
struct Held {
    broken: Broken,
    /// The log-likelihood.
    value: f64,
    scale: f64,
    /// Its derivatives by the break, from the left and from the right.
    lean: [f64; 2],
}

/// The record in columns.
struct Record {
    t: Vec<f64>,
    y: Vec<f64>,
    mark: Vec<Mark>,
    span: f64,
}

impl Record {
    fn new(sorted: &[Point]) -> Record {
        Record {
            t: sorted.iter().map(|point| point.t).collect(),
            y: sorted.iter().map(|point| point.y).collect(),
            mark: sorted.iter().map(|point| point.mark).collect(),
            span: sorted[sorted.len() - 1].t - sorted[0].t,
        }
    }

    /// The broken line with its break at `at`, searched for from another one.
    ///
    /// # None
    /// The columns do not determine the line, or the search did not end.
    fn held(&self, at: f64, near: &Held) -> Option<Held> {
        let row = |&t: &f64| {
            let off = (t - at) / self.span;
            [1.0, off.min(0.0), off.max(0.0)]
        };
        let x: Vec<[f64; 3]> = self.t.iter().map(row).collect();
        let start = near.broken;
        let guess = [start.level, start.before * self.span, start.after * self.span];
        let fitted = columns(&x, &self.y, &self.mark, guess, near.scale)?;
        let [level, before, after] = fitted.factors;
        let broken = Broken {
            break_at: at,
            level,
            before: before / self.span,
            after: after / self.span,
            misfit: Misfit::LogLikelihood(fitted.log_likelihood),
        };
        let mut pulls = [0.0; 3];
        for ((x, &y), &mark) in x.iter().zip(&self.y).zip(&self.mark) {
            let z = (y - level - before * x[1] - after * x[2]) / fitted.scale;
            let pull = match mark {
                Mark::Measured => z,
                Mark::Below => -lower_tail(z).slope,
                Mark::Above => lower_tail(-z).slope,
            };
            let side = if x[1] < 0.0 {
                0
            } else if x[2] > 0.0 {
                2
            } else {
                1
            };
            pulls[side] += pull / fitted.scale;
        }
        let [left, here, right] = pulls;
        let lean = [
            -broken.before * left - broken.after * (here + right),
            -broken.before * (left + here) - broken.after * right,
        ];
        Some(Held { broken, value: fitted.log_likelihood, scale: fitted.scale, lean })
    }

    /// The top that a walk from `from` leads to, in growing steps until one is past it.
    fn uphill(&self, from: &Held, step: f64, low: f64, high: f64) -> Option<Held> {
        let mut here = self.held(from.broken.break_at, from)?;
        let side = if here.lean[1] > 0.0 { 1.0 } else { -1.0 };
        let (behind, ahead) = if side > 0.0 { (1, 0) } else { (0, 1) };
        let mut step = side * step;
        while side * here.lean[behind] > 0.0 {
            let at = (here.broken.break_at + step).clamp(low, high);
            if at == here.broken.break_at {
                break;
            }
            let next = self.held(at, &here)?;
            if side * next.lean[ahead] < 0.0 {
                let (left, right) = if side > 0.0 { (here, next) } else { (next, here) };
                return self.between(left, right, CLOSE_IF_THINNED);
            }
            here = next;
            step *= 2.0;
        }
        Some(here)
    }

    /// The top between two breaks, where the likelihood rises from the one and falls to the other:
    /// by the false position, halved where that is slow.
    fn between(&self, left: Held, right: Held, close: f64) -> Option<Held> {
        let (mut low, mut high) = (left, right);
        let (mut rising, mut falling) = (low.lean[1], high.lean[0]);
        if !(rising > 0.0 && falling < 0.0) {
            return None;
        }
        for step in 0..CLOSER_STEPS {
            let (from, to) = (low.broken.break_at, high.broken.break_at);
            if to - from <= close * self.span {
                break;
            }
            let share = if step % 3 == 2 { 0.5 } else { rising / (rising - falling) };
            let at = from + share.clamp(1e-3, 1.0 - 1e-3) * (to - from);
            let near = if share < 0.5 { &low } else { &high };
            let held = self.held(at, near)?;
            let gain = (to - from) * held.lean[0].abs().min(held.lean[1].abs());
            if gain < SMALL_GAIN || held.lean[0] > 0.0 && held.lean[1] < 0.0 {
                return Some(held);
            }
            if held.lean[1] > 0.0 {
                (low, rising) = (held, held.lean[1]);
            } else {
                (high, falling) = (held, held.lean[0]);
            }
        }
        Some(if low.value > high.value { low } else { high })
    }
}
