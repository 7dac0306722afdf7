//! Fitting any smooth curve with a few parameters: least squares, or the likelihood of values and
//! bounds.

use super::cholesky::Factor;
use super::damped::{Hill, Lost, climb_damped};
use super::information::rounding;
use super::normal::{HALF_LN_TWO_PI, lower_tail};
use super::points::{Mark, Points};

/// A curve at one time: its value and the derivatives by its parameters.
pub type Height<const N: usize> = (f64, [f64; N]);

/// A curve fitted to values or to values and bounds.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CurveFit<const N: usize> {
    /// The parameters.
    pub at: [f64; N],
    /// Residual sum of squares, or the log-likelihood where there are bounds.
    pub misfit: f64,
    /// Inverse of Σ J·Jᵀ, or of minus the second derivatives of the log-likelihood: times the
    /// residual variance the first is the matrix of variances, the second is that matrix.
    pub inverse: [[f64; N]; N],
    /// Steps tried.
    pub steps: usize,
}

/// Fits a curve by least squares.
///
/// # Formula
/// ```text
/// minimise RSS = Σ(yᵢ − f(tᵢ; θ))², as the top of −½n·ln(RSS + RSS₀)
/// step from g = n·Jᵀe/RSS and B = n·JᵀJ/RSS     (Gauss and Newton)
/// ```
/// where `e` are the residuals, `J` the derivatives of the curve by its parameters, RSS₀ what
/// rounding leaves.
///
/// # Units
/// Those of the caller.
///
/// # Limits
/// The least sum near the start; 300 steps.
///
/// # Errors
/// [`Lost`]: the search did not end, or the parameters cannot be told apart.
///
/// # Reference
/// Bates & Watts (1988), ch. 2 [from memory]. NIST "Misra1a" and "BoxBOD", R `SSasymp` on
/// `Loblolly`: `tests/reference/nonlinear.csv`.
pub fn fit_curve<const N: usize>(
    t: &[f64],
    y: &[f64],
    start: [f64; N],
    curve: impl Fn(&[f64; N], f64) -> Height<N>,
) -> Result<CurveFit<N>, Lost<N>> {
    let floor = rounding(y);
    let n = t.len() as f64;
    let top = climb_damped(start, |at| {
        let mut sums = Sums::default();
        for (&t, &y) in t.iter().zip(y) {
            let (height, by) = curve(at, t);
            sums.add(y - height, 1.0, &by);
        }
        let rss = sums.squares + floor;
        let scale = n / rss;
        Hill {
            value: -0.5 * n * rss.ln(),
            gradient: sums.gradient.map(|g| g * scale),
            bend: sums.bend.map(|row| row.map(|b| b * scale)),
        }
    })?;
    let rss = (-2.0 * top.hill.value / n).exp();
    let inverse = Factor::of(&top.hill.bend).ok_or(Lost {
        at: top.at,
        value: top.hill.value,
        steps: top.steps,
    })?;
    let inverse = inverse.inverse().map(|row| row.map(|v| v * n / rss));
    let misfit =
        t.iter().zip(y).map(|(&t, &y)| y - curve(&top.at, t).0).map(|e| e * e).sum::<f64>();
    Ok(CurveFit { at: top.at, misfit, inverse, steps: top.steps })
}

/// Fits a curve by the likelihood of values and bounds with normal scatter. The last parameter is
/// the logarithm of the scatter; the curve does not depend on it.
///
/// # Formula
/// ```text
/// measured: −½ ln 2π − λ − z²/2     below: ln Φ(z)     above: ln Φ(−z)     z = (y − f(t; θ))/e^λ
/// ```
/// where λ is ln of the scatter. Second derivatives are exact in λ and leave out those of the
/// curve.
///
/// # Units
/// Those of the caller.
///
/// # Limits
/// The highest place near the start; 300 steps. Without bounds it is [`fit_curve`], with the
/// scatter √(RSS/n).
///
/// # Errors
/// [`Lost`]: the search did not end, or the parameters cannot be told apart.
///
/// # Reference
/// Tobin (1958) with a curve in place of the line. Held against the censored line and against
/// [`fit_curve`] in tests.
pub fn fit_curve_with_bounds<const N: usize>(
    points: Points<'_>,
    start: [f64; N],
    curve: impl Fn(&[f64; N], f64) -> Height<N>,
) -> Result<CurveFit<N>, Lost<N>> {
    let last = N - 1;
    let top = climb_damped(start, |at| {
        let scale = at[last].exp();
        let mut sums = Sums::default();
        let mut value = 0.0;
        // Derivatives by λ: first, second, and those mixed with the curve's height.
        let (mut by_scale, mut bent_scale, mut mixed) = (0.0, 0.0, [0.0; N]);
        for point in points.iter() {
            let (height, by) = curve(at, point.t);
            let z = (point.y - height) / scale;
            let cross = match point.mark {
                Mark::Measured => {
                    value -= HALF_LN_TWO_PI + at[last] + 0.5 * z * z;
                    sums.add(z, 1.0, &by);
                    by_scale += z * z - 1.0;
                    bent_scale += 2.0 * z * z;
                    2.0 * z
                }
                Mark::Below | Mark::Above => {
                    let side = if point.mark == Mark::Below { 1.0 } else { -1.0 };
                    let tail = lower_tail(side * z);
                    value += tail.ln;
                    sums.add(-side * tail.slope, tail.bend, &by);
                    by_scale -= side * tail.slope * z;
                    bent_scale += tail.bend * z * z - side * tail.slope * z;
                    tail.bend * z - side * tail.slope
                }
            };
            for (mixed, by) in mixed.iter_mut().zip(by) {
                *mixed += cross * by / scale;
            }
        }
        let mut gradient = sums.gradient.map(|g| g / scale);
        let mut bend = sums.bend.map(|row| row.map(|b| b / (scale * scale)));
        gradient[last] = by_scale;
        for (i, mixed) in mixed.into_iter().enumerate().take(last) {
            bend[i][last] = mixed;
            bend[last][i] = mixed;
        }
        bend[last][last] = bent_scale.max(0.0);
        Hill { value, gradient, bend }
    })?;
    let lost = Lost { at: top.at, value: top.hill.value, steps: top.steps };
    let inverse = Factor::of(&top.hill.bend).ok_or(lost)?.inverse();
    Ok(CurveFit { at: top.at, misfit: top.hill.value, inverse, steps: top.steps })
}

/// Sums over the points: weighted squares and products of the derivatives.
struct Sums<const N: usize> {
    squares: f64,
    gradient: [f64; N],
    bend: [[f64; N]; N],
}

impl<const N: usize> Default for Sums<N> {
    fn default() -> Self {
        Sums { squares: 0.0, gradient: [0.0; N], bend: [[0.0; N]; N] }
    }
}

impl<const N: usize> Sums<N> {
    fn add(&mut self, pull: f64, weight: f64, by: &[f64; N]) {
        self.squares += pull * pull;
        for (i, by_one) in by.iter().enumerate() {
            self.gradient[i] += pull * by_one;
            for (bend, by_other) in self.bend[i].iter_mut().zip(by) {
                *bend += weight * by_one * by_other;
            }
        }
    }
}
