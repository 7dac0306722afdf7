//! Whether the points bend away from a straight line.

use super::columns::columns;
use super::first_order::FirstOrder;
use super::line::{Line, line, mean};
use super::points::{Mark, Points};
use super::tails;

/// Distinct times with measured values that a bend and its scatter need (a count). Source: three
/// factors and a scatter; with fewer the likelihood has no maximum.
const DATES_NEEDED: usize = 4;

/// Measured values lie on a bent line where their residual sum of squares is under this share of
/// 1 + Σy² (a pure number). Source: as ruled for the straight line.
const ON_A_BEND: f64 = 1e-20;

/// A quadratic term added to a straight line.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Curvature {
    /// Factor of the squared time: positive where a fall slows down or a rise speeds up.
    pub coefficient: f64,
    /// Its standard error. None with bounds, where the likelihood alone decides.
    pub error: Option<f64>,
    /// Twice the gain in log-likelihood over the straight line.
    pub lr: f64,
    /// Log-likelihood of the bent line.
    pub log_likelihood: f64,
    /// Student's t of the term, with the sign of the coefficient.
    pub t: f64,
    /// Its degrees of freedom.
    pub degrees: f64,
    /// Two-sided p that there is no bend.
    pub p: f64,
}

/// Adds a quadratic term to a fitted straight line.
///
/// # Formula
/// ```text
/// y = a + b·t + c·(t − t̄)² + e
/// all measured:  T = c/SE, n − 3 degrees of freedom;  LR = n·ln(RSS of the line/RSS)
/// with bounds:   LR = 2(ℓ − ℓ of the line);  T² = (m − 2)(exp(LR/m) − 1), m − 2 degrees
/// ```
/// where `m` is the effective number of the straight line. The second p is under α exactly where LR
/// is over m·ln(1 + t²/(m − 2)), t the two-sided quantile of 1 − α: the cut-off of every interval
/// here.
///
/// # Units
/// `t` in years, `y` in ln(concentration): `c` is per year squared, for any origin of time.
///
/// # Limits
/// With bounds the scatter is not charged for the third factor, so that p is a little small: at
/// m = 12 a nominal 5 % is about 6 %.
///
/// # None
/// Measured values on fewer than four times; measured values exactly on a bent line; a search that
/// did not end; `straight` fitted to other points.
///
/// # Reference
/// Draper & Smith (1998), ch. 12; methods note 5.6. Worked examples W02 and W17, R `lm` on nine
/// invented series.
pub fn curvature(points: Points<'_>, straight: &FirstOrder) -> Option<Curvature> {
    if points.len() != straight.n || measured_times(points) < DATES_NEEDED {
        return None;
    }
    match straight.line() {
        Some(through) => by_least_squares(points, straight, through),
        None => by_likelihood(points, straight),
    }
}

fn by_least_squares(
    points: Points<'_>,
    straight: &FirstOrder,
    through: &Line,
) -> Option<Curvature> {
    let (t, y) = (points.t(), points.y());
    let squares: Vec<f64> = t.iter().map(|t| (t - through.t_mean) * (t - through.t_mean)).collect();
    let bent = line(t, &squares)?;
    // What a straight line in time cannot give of the squared time.
    let (mut size, mut along) = (0.0, 0.0);
    for ((&t, &y), &square) in t.iter().zip(y).zip(&squares) {
        let own = square - bent.fitted(t);
        size += own * own;
        along += own * (y - through.fitted(t));
    }
    let coefficient = along / size;
    let residual = |((&t, &y), &square): ((&f64, &f64), &f64)| {
        y - through.fitted(t) - coefficient * (square - bent.fitted(t))
    };
    let rss: f64 = t.iter().zip(y).zip(&squares).map(residual).map(|e| e * e).sum();
    let n = through.n as f64;
    if !scattered(rss, points) {
        return None;
    }
    let degrees = n - 3.0;
    let error = (rss / degrees / size).sqrt();
    let student = coefficient / error;
    let lr = n * (coefficient * coefficient * size / rss).ln_1p();
    Some(Curvature {
        coefficient,
        error: Some(error),
        lr,
        log_likelihood: straight.log_likelihood + 0.5 * lr,
        t: student,
        degrees,
        p: tails::student_two_sided(student, degrees),
    })
}

fn by_likelihood(points: Points<'_>, straight: &FirstOrder) -> Option<Curvature> {
    let centre = mean(points.t());
    let unit = points.t().iter().fold(0.0, |widest: f64, t| widest.max((t - centre).abs()));
    let x: Vec<[f64; 3]> = points
        .t()
        .iter()
        .map(|t| {
            let u = (t - centre) / unit;
            [1.0, u, u * u]
        })
        .collect();
    let guess = [straight.fitted(centre), straight.slope * unit, 0.0];
    let bent = columns(&x, points.y(), points.mark(), guess, straight.ml_scale)?;
    if !scattered(bent.scale * bent.scale * points.count(Mark::Measured) as f64, points) {
        return None;
    }
    let coefficient = bent.factors[2] / (unit * unit);
    let lr = (2.0 * (bent.log_likelihood - straight.log_likelihood)).max(0.0);
    let degrees = straight.m - 2.0;
    let student = (degrees * (lr / straight.m).exp_m1()).sqrt().copysign(coefficient);
    Some(Curvature {
        coefficient,
        error: None,
        lr,
        log_likelihood: bent.log_likelihood,
        t: student,
        degrees,
        p: tails::student_two_sided(student, degrees),
    })
}

/// Whether these squares are more than the rounding of measured values on a bent line.
fn scattered(squares: f64, points: Points<'_>) -> bool {
    let measured = points.iter().filter(|point| point.mark == Mark::Measured);
    squares >= ON_A_BEND * (1.0 + measured.map(|point| point.y * point.y).sum::<f64>())
}

/// Number of distinct times with measured values.
pub(super) fn measured_times(points: Points<'_>) -> usize {
    let measured = points.iter().filter(|point| point.mark == Mark::Measured);
    let mut times: Vec<f64> = measured.map(|point| point.t).collect();
    times.sort_unstable_by(f64::total_cmp);
    times.dedup();
    times.len()
}
