//! Student's t with a shift: how often a real trend is found.

use super::normal;

/// Points of the sum, at most (a count). Source: one degree of freedom takes 900.
const MOST_TERMS: f64 = 4_000.0;

/// Widest spacing of the sum (in ln of the scatter). Source: measured; twice this leaves errors of
/// 2e-10, this one of 1e-15.
const WIDEST_SPACING: f64 = 0.06;

/// Spacing over the width of the peak (a pure number). Source: measured; the error falls as
/// exp(−π²/spacing²), 0.5 leaves 1e-11.
const SPACING: f64 = 0.35;

/// Weights under e to minus this are left out. Source: rounding of f64.
const FAR: f64 = 40.0;

/// Probability that Student's t with a shift is over `t`.
///
/// # Formula
/// ```text
/// T = (Z + δ)/S     P(T > t) = ∫ Φ(δ − t·s) f(s) ds
/// f(eˣ)·eˣ ∝ exp(ν(x − (e²ˣ − 1)/2))
/// ```
/// where `Z` is standard normal, ν·S² chi-squared with ν = `degrees`, independent of it, and δ is
/// `shift`. Summed over evenly spaced x, which for a smooth function that dies out on both sides is
/// exact but for terms like exp(−c/spacing).
///
/// # Units
/// `t` and `shift` are pure numbers; the answer is a probability.
///
/// # Limits
/// `degrees` over zero. Absolute error 1e-14 for |t| up to 300; at most 4,000 terms.
///
/// # Reference
/// Johnson, Kotz & Balakrishnan (1995), ch. 31 [from memory]. Checked against
/// `tests/reference/noncentral.csv`.
pub fn noncentral_upper(t: f64, degrees: f64, shift: f64) -> f64 {
    let width = 1.0 / (degrees + 0.5 * t * t).sqrt();
    let (left, right) = (FAR / degrees + (FAR / degrees).sqrt(), (FAR / degrees).sqrt());
    let spacing = WIDEST_SPACING.min(SPACING * width).max((left + right) / MOST_TERMS);
    let (first, last) = ((-left / spacing).floor() as i64, (right / spacing).ceil() as i64);
    let (mut over, mut all) = (0.0, 0.0);
    for i in first..=last {
        let x = i as f64 * spacing;
        let weight = (degrees * (x - 0.5 * (2.0 * x).exp_m1())).exp();
        all += weight;
        over += weight * normal::lower(shift - t * x.exp());
    }
    over / all
}
