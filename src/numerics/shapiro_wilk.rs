//! Whether values look like a sample of a normal distribution.

use super::line::mean;
use super::normal;
use super::tails;

/// Fewest values (a count) the test is defined for. Source: Royston (1995).
const FEWEST: usize = 3;

/// Most values (a count) its p-value was fitted to. Source: Royston (1995).
const MOST: usize = 5_000;

/// Up to this many values (a count) only the outermost coefficient is corrected. Source: Royston
/// (1995).
const ONE_CORRECTED: usize = 5;

/// Up to this many values (a count) ln(1 − W) is taken once more as a logarithm. Source: Royston
/// (1995).
const SMALL: usize = 11;

/// Share of the mean square of the values that the place of a rank is moved in by: plotting
/// positions (i − 3/8)/(n + 1/4). Source: Blom (1958), as Royston (1995) takes them.
const BLOM: [f64; 2] = [0.375, 0.25];

/// Correction of the outermost coefficient, in powers of 1/√n, lowest first (pure numbers). Source:
/// Royston (1995), AS R94; methods note 5.3.
const OUTERMOST: [f64; 6] = [0.0, 0.221157, -0.147981, -2.07119, 4.434685, -2.706056];

/// The same for the coefficient next to it.
const NEXT: [f64; 6] = [0.0, 0.042981, -0.293762, -1.752461, 5.682633, -3.582633];

/// Where ln(1 − W) of 4 to 11 values is measured from, in powers of n (pure numbers). Source: as
/// [`OUTERMOST`]; so are the four that follow.
const SMALL_ORIGIN: [f64; 2] = [-2.273, 0.459];

/// Mean of the transformed W of 4 to 11 values, in powers of n.
const SMALL_MEAN: [f64; 4] = [0.5440, -0.39978, 0.025054, -0.0006714];

/// Logarithm of its standard deviation, in powers of n.
const SMALL_LN_SD: [f64; 4] = [1.3822, -0.77857, 0.062767, -0.0020322];

/// Mean of ln(1 − W) of 12 values or more, in powers of ln n.
const LARGE_MEAN: [f64; 4] = [-1.5861, -0.31082, -0.083751, 0.0038915];

/// Logarithm of its standard deviation, in powers of ln n.
const LARGE_LN_SD: [f64; 3] = [-0.4803, -0.082676, 0.0030302];

/// Shapiro and Wilk's test.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ShapiroWilk {
    /// Number of values.
    pub n: usize,
    /// How straight the values lie on normal scores: 1 is perfect.
    pub w: f64,
    /// Probability of a W this small or smaller for a normal sample.
    pub p: f64,
}

/// Tests whether values look like a sample of a normal distribution.
///
/// # Formula
/// ```text
/// W = (Σ aᵢ·x₍ᵢ₎)² / Σ(xᵢ − x̄)²     a from mᵢ = Φ⁻¹((i − 3/8)/(n + 1/4)), ends corrected
/// n = 3:       p = (6/π)(asin √W − asin √¾)
/// 4 … 11:      p = P(N > (−ln(γ − ln(1 − W)) − μ)/σ)
/// 12 and more: p = P(N > (ln(1 − W) − μ)/σ)
/// ```
/// where x₍ᵢ₎ are the sorted values, a has length 1, and γ, μ, ln σ are polynomials in n or ln n.
/// 1 − W is summed as Σ(x₍ᵢ₎ − x̄ − b·aᵢ)²/Σ(xᵢ − x̄)² with b = Σ aᵢ·x₍ᵢ₎, which keeps its digits
/// where W is near 1.
///
/// # Units
/// Any straight function of the values gives the same answer.
///
/// # Limits
/// 3 to 5,000 values. Residuals of a line are a little correlated, so that p is approximate there.
///
/// # None
/// Fewer than 3 values or more than 5,000, all equal, or not finite.
///
/// # Reference
/// Royston (1995), Appl. Stat. 44:547–551 (AS R94). Worked examples W02, W03, W08, W10; R
/// `shapiro.test` on nine invented series.
pub fn shapiro_wilk(values: &[f64]) -> Option<ShapiroWilk> {
    let n = values.len();
    if !(FEWEST..=MOST).contains(&n) {
        return None;
    }
    let mut sorted = values.to_vec();
    sorted.sort_unstable_by(f64::total_cmp);
    let (least, range) = (sorted[0], sorted[n - 1] - sorted[0]);
    if !(range > 0.0 && range.is_finite()) {
        return None;
    }
    // In units of the range no square overflows or vanishes.
    sorted.iter_mut().for_each(|x| *x = (*x - least) / range);
    let centre = mean(&sorted);
    let upper = upper_coefficients(n);
    // The lower half of the coefficients mirrors the upper one, the middle one of an odd number is 0.
    let coefficient = |i: usize| {
        let from_top = n - 1 - i;
        if i < from_top.min(upper.len()) {
            -upper[i]
        } else {
            upper.get(from_top).copied().unwrap_or(0.0)
        }
    };
    let along: f64 = sorted.iter().enumerate().map(|(i, x)| coefficient(i) * (x - centre)).sum();
    let (mut rest, mut all) = (0.0, 0.0);
    for (i, x) in sorted.iter().enumerate() {
        let off = x - centre;
        let left = off - along * coefficient(i);
        rest += left * left;
        all += off * off;
    }
    let missing = rest / all;
    Some(ShapiroWilk { n, w: 1.0 - missing, p: p_value(n, missing) })
}

/// Coefficients of the values in the upper half, the highest first.
fn upper_coefficients(n: usize) -> Vec<f64> {
    if n == FEWEST {
        return vec![std::f64::consts::FRAC_1_SQRT_2];
    }
    let score =
        |rank: usize| tails::normal_quantile((rank as f64 + 1.0 - BLOM[0]) / (n as f64 + BLOM[1]));
    let mut scores: Vec<f64> = (0..n / 2).map(score).collect();
    let square = 2.0 * scores.iter().map(|m| m * m).sum::<f64>();
    let u = 1.0 / (n as f64).sqrt();
    let corrections: &[[f64; 6]] =
        if n <= ONE_CORRECTED { &[OUTERMOST] } else { &[OUTERMOST, NEXT] };
    let (mut scores_left, mut length_left) = (square, 1.0);
    for (m, correction) in scores.iter_mut().zip(corrections) {
        scores_left -= 2.0 * *m * *m;
        *m = polynomial(correction, u) + *m / square.sqrt();
        length_left -= 2.0 * *m * *m;
    }
    let scale = (scores_left / length_left).sqrt();
    scores.iter_mut().skip(corrections.len()).for_each(|m| *m /= scale);
    scores
}

/// The p-value, from 1 − W.
fn p_value(n: usize, missing: f64) -> f64 {
    let size = n as f64;
    if n == FEWEST {
        let angle = (1.0 - missing).sqrt().asin() - 0.75f64.sqrt().asin();
        return (6.0 / std::f64::consts::PI * angle).clamp(0.0, 1.0);
    }
    let (w, mean, ln_sd) = if n <= SMALL {
        // W of so few values cannot be so low that the outer logarithm had no argument.
        let w = -(polynomial(&SMALL_ORIGIN, size) - missing.ln()).ln();
        (w, polynomial(&SMALL_MEAN, size), polynomial(&SMALL_LN_SD, size))
    } else {
        let x = size.ln();
        (missing.ln(), polynomial(&LARGE_MEAN, x), polynomial(&LARGE_LN_SD, x))
    };
    normal::upper((w - mean) / ln_sd.exp())
}

/// A polynomial with these coefficients, lowest power first.
fn polynomial(coefficients: &[f64], x: f64) -> f64 {
    coefficients.iter().rev().fold(0.0, |sum, c| sum * x + c)
}
