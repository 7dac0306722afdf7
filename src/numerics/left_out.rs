//! The line without one of its points: what a fit owes to each of them.

use super::censored::{CensoredLine, UNINFORMATIVE};
use super::curvature::measured_times;
use super::deletion::{Farthest, deletion_diagnostics};
use super::first_order::{FirstOrder, first_order};
use super::likelihood::Pass;
use super::line::Line;
use super::normal::{self, lower_tail};
use super::peak::{Peak, SMALL_DECREMENT, solve3};
use super::points::{Mark, NoLine, Point, Points};
use super::scaling::{Olsen, Parameters};
use super::tails;
use super::target::Spread;

/// With measured values on this many times (a count) any one point may go and a line is left.
/// Source: a line and its scatter need three.
const DATES_TO_SPARE: usize = 4;

/// The closed form is used while the point leaves free, and the others keep, more than this share
/// (a pure number) of the leverage and of the scatter. Source: what is lost to rounding is 1e-16
/// over this.
const WELL_FREE: f64 = 1e-4;

/// The closed form is used while the squares left are more than this share of 1 + Σy² (a pure
/// number). Source: below, residuals themselves carry few digits.
const WELL_SCATTERED: f64 = 1e-10;

/// Newton steps from the line through all points, at most (a count). Source: two or three arrive;
/// a point that needs more is worth a fit from the beginning.
const WARM_STEPS: usize = 12;

/// A scale that changes by more than this factor (a pure number) is worth a fit from the beginning.
/// Source: rounding of what the point is taken out of.
const WARM_SCALE: f64 = 10.0;

/// A fit without one of its points.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LeftOut {
    /// Which point, counted from 0.
    pub index: usize,
    /// The line through the others, or why there is none.
    pub line: Result<Without, NoLine>,
    /// How far the point lies from that line, in units of what it should: Student's t with m − 2
    /// degrees of freedom, m that of the others. Infinite where they lie on a line and this one
    /// does not. None for a bound, or where the others have no line.
    pub studentized: Option<f64>,
}

/// A line through all points but one.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Without {
    /// Value at time 0.
    pub intercept: f64,
    /// Change per unit of time.
    pub slope: f64,
    /// Residual standard deviation, as [`FirstOrder::sd`].
    pub sd: f64,
    /// Effective number of values.
    pub m: f64,
}

impl Without {
    /// When the line meets `y0`; None where it is level.
    pub fn meets(&self, y0: f64) -> Option<f64> {
        let time = (y0 - self.intercept) / self.slope;
        time.is_finite().then_some(time)
    }
}

impl LeftOut {
    /// By how much later the line meets `y0` without the point; None where either line does not.
    pub fn shift(&self, fit: &FirstOrder, y0: f64) -> Option<f64> {
        let with = (y0 - fit.intercept) / fit.slope;
        let without = self.line.ok()?.meets(y0)?;
        with.is_finite().then_some(without - with)
    }
}

/// Fits the line without each of the points named in `which`.
///
/// # Formula
/// ```text
/// all measured:  b′ = b − d·e/(Sxx·(1−h))     ȳ′ = ȳ − (y−ȳ)/(n−1)     t̄′ = t̄ − d/(n−1)
///                RSS′ = RSS − e²/(1−h)         studentized = e/√(RSS′/(n−3)·(1−h))
/// with bounds:   Newton's method from the line through all points, on ℓ less the point's own part
///                studentized = (y − ŷ′)/(s′·√(1 + v/σ′²))
/// ```
/// where `e`, `h`, `d` are the point's residual, leverage and time about the mean; a dash marks what
/// is found without it; `v` is the variance of ŷ′ by the delta method and σ′ the scale. Where all are
/// measured the second form of the residual becomes the first.
///
/// # Units
/// As [`first_order()`].
///
/// # Limits
/// Order 1 a point where all are measured, else order n. A point that the line hangs on is left out
/// by fitting again from the beginning. Indices over the number of points are passed over, as are
/// all where `fit` is of other points.
///
/// # Reference
/// Cook & Weisberg (1982), ch. 2 [from memory]; methods note 5.5. Worked example W02; held against
/// [`first_order()`] without the point.
pub fn left_out(points: Points<'_>, fit: &FirstOrder, which: &[usize]) -> Vec<LeftOut> {
    if points.len() != fit.n {
        return Vec::new();
    }
    let spare = measured_times(points) >= DATES_TO_SPARE;
    let squares = points.y().iter().map(|y| y * y).sum::<f64>();
    let one = |&index: &usize| {
        let (t, y) = (*points.t().get(index)?, *points.y().get(index)?);
        let point = Point { t, y, mark: *points.mark().get(index)? };
        let quick = match (fit.line(), fit.censored()) {
            _ if !spare => None,
            (Some(line), _) => closed(line, index, &point, squares),
            (_, Some(fitted)) => warm(points, fitted, index, &point),
            _ => None,
        };
        Some(quick.unwrap_or_else(|| afresh(points, fit, index, &point)))
    };
    which.iter().filter_map(one).collect()
}

/// The points worth leaving out where there are more than `most`: those with the largest Cook's
/// distance, or with bounds, which have none, points spread evenly over the record.
///
/// # Formula
/// ```text
/// bounds:  the points of rank ⌊i·(n−1)/(most−1)⌋ in time, i = 0 … most − 1
/// ```
///
/// # Units
/// Indices, in rising order.
///
/// # Limits
/// All points where there are no more than `most`.
///
/// # Reference
/// Ruled for this program.
pub fn worth_leaving_out(points: Points<'_>, most: usize) -> Vec<usize> {
    let n = points.len();
    let mut order: Vec<usize> = (0..n).collect();
    if n <= most {
        return order;
    }
    let cook =
        if points.all_measured() { deletion_diagnostics(points.t(), points.y()) } else { None };
    let mut chosen: Vec<usize> = match cook {
        Some(all) => {
            let size = |i: usize| all[i].cook.unwrap_or(f64::INFINITY);
            order.sort_by(|&i, &j| size(j).total_cmp(&size(i)));
            order.truncate(most);
            order
        }
        None => {
            let t = points.t();
            order.sort_by(|&i, &j| t[i].total_cmp(&t[j]));
            let apart = most.saturating_sub(1).max(1);
            (0..most).map(|i| order[i * (n - 1) / apart]).collect()
        }
    };
    chosen.sort_unstable();
    chosen
}

/// The largest externally studentized residual of those left out, with its Bonferroni p.
///
/// # Formula
/// ```text
/// p = min(1, tested·2·P(T > |r|))     T with m − 2 degrees of freedom
/// ```
///
/// # Units
/// `tested` is the number of measured points, left out or not; `p` is a probability.
///
/// # Limits
/// As [`left_out`].
///
/// # None
/// None of the points has a studentized residual.
///
/// # Reference
/// As [`super::farthest`], which it equals where all points are measured and left out.
pub fn farthest_left_out(left_out: &[LeftOut], tested: usize) -> Option<Farthest> {
    let sized = left_out.iter().filter_map(|one| Some((one, one.studentized?)));
    let (one, studentized) = sized.max_by(|(_, r), (_, q)| r.abs().total_cmp(&q.abs()))?;
    let p = match one.line {
        Ok(line) if studentized.is_finite() => tails::student_two_sided(studentized, line.m - 2.0),
        _ => 0.0,
    };
    let bonferroni_p = (tested as f64 * p).min(1.0);
    Some(Farthest { index: one.index, studentized, bonferroni_p })
}

/// Least squares without a point, from the sums with it.
fn closed(line: &Line, index: usize, point: &Point, squares: f64) -> Option<LeftOut> {
    let n = line.n as f64;
    let off = point.t - line.t_mean;
    let residual = point.y - line.fitted(point.t);
    let free = 1.0 - 1.0 / n - off * off / line.sxx;
    let rss = line.rss - residual * residual / free;
    let sound = free > WELL_FREE
        && rss > WELL_FREE * line.rss
        && rss > WELL_SCATTERED * (1.0 + squares)
        && line.n > 4;
    if !sound {
        return None;
    }
    let slope = line.slope - off * residual / (line.sxx * free);
    let y_mean = line.y_mean - (point.y - line.y_mean) / (n - 1.0);
    let t_mean = line.t_mean - off / (n - 1.0);
    let sd = (rss / (n - 3.0)).sqrt();
    let without = Without { intercept: y_mean - slope * t_mean, slope, sd, m: n - 1.0 };
    Some(LeftOut { index, line: Ok(without), studentized: Some(residual / (sd * free.sqrt())) })
}

/// The likelihood's maximum without a point, by Newton steps from that with it.
fn warm(points: Points<'_>, fitted: &CensoredLine, index: usize, point: &Point) -> Option<LeftOut> {
    let likelihood = fitted.likelihood();
    let scaling = likelihood.scaling();
    let (u, w) = (scaling.u(point.t), scaling.w(point.t, point.y));
    let mut at = fitted.peak.at;
    let mut last = f64::INFINITY;
    for steps in 1..=WARM_STEPS {
        let mut pass = likelihood.pass(at);
        take_out(&mut pass, at, u, w, point.mark);
        let step = solve3(pass.bend, pass.gradient)?;
        let decrement: f64 = step.iter().zip(pass.gradient).map(|(s, g)| s * g).sum();
        at = Olsen { a: at.a + step[0], b: at.b + step[1], c: at.c + step[2] };
        let near = (1.0 / WARM_SCALE..=WARM_SCALE).contains(&(at.a / fitted.peak.at.a));
        if !near || decrement.is_nan() || decrement > last {
            return None;
        }
        if decrement < SMALL_DECREMENT {
            let spread = Spread::at(&Peak { at, pass, steps, decrement })?;
            let line = scaling.line(at);
            let m = effective(points, line, index);
            let sd = line.scale * (m / (m - 2.0)).sqrt();
            let found = Without { intercept: line.intercept, slope: line.slope, sd, m };
            let z = at.a * w + at.b * u + at.c;
            let studentized = (point.mark == Mark::Measured).then(|| studentized(z, u, &spread, m));
            return Some(LeftOut { index, line: Ok(found), studentized });
        }
        last = decrement;
    }
    None
}

/// Takes a point's own part out of the likelihood at a place.
fn take_out(pass: &mut Pass, at: Olsen, u: f64, w: f64, mark: Mark) {
    let z = at.a * w + at.b * u + at.c;
    let x = [w, u, 1.0];
    let (slope, bend) = match mark {
        Mark::Measured => {
            pass.gradient[0] -= 1.0 / at.a;
            pass.bend[0][0] -= 1.0 / (at.a * at.a);
            (-z, 1.0)
        }
        Mark::Below => {
            let tail = lower_tail(z);
            (tail.slope, tail.bend)
        }
        Mark::Above => {
            let tail = lower_tail(-z);
            (-tail.slope, tail.bend)
        }
    };
    for (row, &one) in x.iter().enumerate() {
        pass.gradient[row] -= slope * one;
        for (column, &other) in x.iter().enumerate() {
            pass.bend[row][column] -= bend * one * other;
        }
    }
}

/// How far a point that took no part lies from a line, in units of what it should.
fn studentized(z: f64, u: f64, spread: &Spread, m: f64) -> f64 {
    let level = spread.level_variance + u * (2.0 * spread.covariance + u * spread.slope_variance);
    z * ((m - 2.0) / m).sqrt() / (1.0 + spread.a * spread.a * level).sqrt()
}

/// The effective number of the points but one, as [`CensoredLine`] counts it.
fn effective(points: Points<'_>, line: Parameters, index: usize) -> f64 {
    let worth = |(i, point): (usize, Point)| {
        let z = (point.y - line.intercept - line.slope * point.t) / line.scale;
        match point.mark {
            _ if i == index => 0.0,
            Mark::Measured => 1.0,
            Mark::Below if normal::lower(z) > UNINFORMATIVE => 0.0,
            Mark::Above if normal::upper(z) > UNINFORMATIVE => 0.0,
            Mark::Below | Mark::Above => 0.5,
        }
    };
    points.iter().enumerate().map(worth).sum()
}

/// The line through the other points, fitted from the beginning.
fn afresh(points: Points<'_>, fit: &FirstOrder, index: usize, point: &Point) -> LeftOut {
    let measured = point.mark == Mark::Measured;
    let without = rest(points, index);
    let others = match Points::new(&without.0, &without.1, &without.2) {
        Ok(others) => first_order(others),
        // Points that were sound with one more are sound.
        Err(_) => Err(NoLine::NotConverged { steps: 0 }),
    };
    let line = match others {
        Ok(line) => line,
        Err(none) => {
            let off = point.y - fit.fitted(point.t);
            let alone = measured && none == NoLine::OnALine;
            let studentized = alone.then(|| f64::INFINITY.copysign(off));
            return LeftOut { index, line: Err(none), studentized };
        }
    };
    let distance = || match (line.line(), line.censored()) {
        (_, Some(fitted)) => {
            let (scaling, at) = (fitted.likelihood().scaling(), fitted.peak.at);
            let u = scaling.u(point.t);
            let z = at.a * scaling.w(point.t, point.y) + at.b * u + at.c;
            studentized(z, u, &fitted.spread, line.m)
        }
        (Some(through), _) => {
            let off = point.t - through.t_mean;
            let spread = 1.0 + 1.0 / line.m + off * off / through.sxx;
            (point.y - through.fitted(point.t)) / (line.sd * spread.sqrt())
        }
        _ => f64::NAN,
    };
    let found = Without { intercept: line.intercept, slope: line.slope, sd: line.sd, m: line.m };
    let studentized = measured.then(distance).filter(|far| !far.is_nan());
    LeftOut { index, line: Ok(found), studentized }
}

/// All points but one.
fn rest(points: Points<'_>, index: usize) -> (Vec<f64>, Vec<f64>, Vec<Mark>) {
    fn but<T: Copy>(all: &[T], index: usize) -> Vec<T> {
        all.iter().enumerate().filter(|(i, _)| *i != index).map(|(_, one)| *one).collect()
    }
    (but(points.t(), index), but(points.y(), index), but(points.mark(), index))
}
