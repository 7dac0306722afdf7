//! Quantiles and tails of Student's t, F and chi-squared, and the normal quantile.
//!
//! This is the only file that names `statrs`. Upper tails are computed as upper tails, never as
//! one minus a lower tail, so that a p-value of 1e-30 is not told as zero.
//!
//! What is kept away from `statrs` 0.19.1, because it was measured to go wrong there: its Student
//! t quantile (1.83 for 1.96 at 1e7 degrees of freedom, no return above; 3 % of the right value at
//! 1 degree and a tail of 1e-10), and its incomplete beta function at very many degrees of freedom
//! (8 digits at 1e7).

use statrs::function::beta::{beta_reg, inv_beta_reg};
use statrs::function::erf::erfc_inv;
use statrs::function::gamma::{gamma_ur, ln_gamma};

use super::normal;

/// Above this many degrees of freedom Student's t is taken through the normal distribution.
/// Source: measured; the incomplete beta function carries 13 digits up to here, the expansion 14
/// from here on.
const MANY_DEGREES: f64 = 1_000.0;

/// Quantiles are asked for at tails no smaller than this (a probability). Source: `statrs` issue
/// 435 tells of inverse tails that do not end on smaller ones.
const SMALLEST_TAIL: f64 = 1e-12;

/// Newton steps that polish a quantile, at most. Source: two are enough from a start good to six
/// digits, eight from the worst start measured.
const POLISHING_STEPS: usize = 12;

/// A polishing step this small beside the quantile (a pure number) is the last. Source: the steps
/// converge quadratically, so that the error left is far under the 1e-13 of the tail itself.
const ENOUGH: f64 = 1e-12;

/// The z with the probability `tail` over it.
///
/// # Formula
/// ```text
/// z = √2 · erfc⁻¹(2·tail)
/// ```
/// where `erfc⁻¹` is the inverse of the complementary error function.
///
/// # Units
/// `tail` is a probability; the answer is in standard deviations.
///
/// # Limits
/// `tail` is first brought into 1e-12 … 1 − 1e-12. Relative error 1e-15 for tails up to ½.
///
/// # Reference
/// Abramowitz & Stegun (1964), 26.2.22. Checked against `tests/reference/tails.csv`.
pub fn normal_quantile(tail: f64) -> f64 {
    std::f64::consts::SQRT_2 * erfc_inv(2.0 * guarded(tail))
}

/// Probability that Student's t is over `t`.
///
/// # Formula
/// ```text
/// t ≥ 0:  ½ I(ν/(ν + t²); ν/2, ½)      t < 0:  1 − the same at −t
/// ```
/// where ν is `degrees` (it need not be whole) and `I` is the regularised incomplete beta
/// function.
///
/// # Units
/// `t` is a pure number, `degrees` the degrees of freedom; the answer is a probability.
///
/// # Limits
/// `degrees` over zero. Relative error 1e-12 or less; over 1,000 degrees the normal tail at the
/// deviate of Hill's expansion, 1e-12 for |t| up to 8.
///
/// # Reference
/// Abramowitz & Stegun (1964), 26.7.1. Checked against `tests/reference/tails.csv`.
pub fn student_upper(t: f64, degrees: f64) -> f64 {
    if degrees > MANY_DEGREES {
        return normal::upper(normal_of_student(t, degrees));
    }
    if t < 0.0 {
        return 1.0 - student_upper(-t, degrees);
    }
    let rest = degrees / (degrees + t * t);
    0.5 * beta_reg(0.5 * degrees, 0.5, rest)
}

/// Probability that Student's t is as far from zero as `t` or farther, on either side.
///
/// # Formula
/// ```text
/// p = 2 · P(T > |t|)
/// ```
///
/// # Units
/// As [`student_upper`].
///
/// # Limits
/// As [`student_upper`].
///
/// # Reference
/// As [`student_upper`].
pub fn student_two_sided(t: f64, degrees: f64) -> f64 {
    (2.0 * student_upper(t.abs(), degrees)).min(1.0)
}

/// The t with the probability `tail` over it.
///
/// # Formula
/// ```text
/// ν ≤ 1000:  P(T > t) = tail, by Newton steps from the inverse incomplete beta function
/// ν > 1000:  t = z + g₁/ν + g₂/ν² + g₃/ν³ + g₄/ν⁴
/// g₁ = (z³+z)/4     g₂ = (5z⁵+16z³+3z)/96     g₃ = (3z⁷+19z⁵+17z³−15z)/384
/// g₄ = (79z⁹+776z⁷+1482z⁵−1920z³−945z)/92160
/// ```
/// where ν is `degrees` and `z` the normal quantile of the same tail. The steps are taken in
/// (ln t, ln tail), which is nearly straight far out.
///
/// # Units
/// As [`student_upper`].
///
/// # Limits
/// `tail` is first brought into 1e-12 … 1 − 1e-12. Relative error 3e-12; over 1,000 degrees and for
/// a tail of 1e-10, 2e-11.
///
/// # Reference
/// Abramowitz & Stegun (1964), 26.7.5 [from memory; checked]. `tests/reference/tails.csv`.
pub fn student_quantile(tail: f64, degrees: f64) -> f64 {
    let tail = guarded(tail);
    if tail > 0.5 {
        return -student_quantile(1.0 - tail, degrees);
    }
    if degrees > MANY_DEGREES {
        return student_of_normal(normal_quantile(tail), degrees);
    }
    let rest = inv_beta_reg(0.5 * degrees, 0.5, 2.0 * tail);
    let start = (degrees * (1.0 - rest) / rest).sqrt();
    // Beyond one half the start may be 0 or infinite; the normal quantile is a start as well.
    let start = if start.is_finite() { start } else { normal_quantile(tail) };
    polished_student(start, tail, degrees)
}

/// Two-sided quantile: the t that Student's t stays within, either way, with `confidence`.
///
/// # Formula
/// ```text
/// P(|T| ≤ t) = confidence
/// ```
///
/// # Units
/// `confidence` is a probability, such as 0.90 for 5 % in each tail.
///
/// # Limits
/// As [`student_quantile`].
///
/// # Reference
/// As [`student_quantile`].
pub fn student_within(confidence: f64, degrees: f64) -> f64 {
    student_quantile(0.5 * (1.0 - confidence), degrees)
}

/// Probability that a chi-squared variable is over `x`.
///
/// # Formula
/// ```text
/// Q(ν/2, x/2)
/// ```
/// where ν is `degrees` and `Q` the regularised upper incomplete gamma function.
///
/// # Units
/// `x` is a pure number, the answer a probability.
///
/// # Limits
/// 1 for `x` not over zero.
///
/// # Reference
/// Abramowitz & Stegun (1964), 26.4.19. Checked against `tests/reference/tails.csv`.
pub fn chi_squared_upper(x: f64, degrees: f64) -> f64 {
    if x > 0.0 { gamma_ur(0.5 * degrees, 0.5 * x) } else { 1.0 }
}

/// Probability that an F variable is over `f`.
///
/// # Formula
/// ```text
/// I(ν₂/(ν₂ + ν₁ f); ν₂/2, ν₁/2)
/// ```
/// where ν₁ and ν₂ are the degrees of freedom above and below the line, `I` as in
/// [`student_upper`].
///
/// # Units
/// `f` is a pure number, the answer a probability.
///
/// # Limits
/// 1 for `f` not over zero.
///
/// # Reference
/// Abramowitz & Stegun (1964), 26.6.2. Checked against `tests/reference/tails.csv`.
pub fn fisher_upper(f: f64, above: f64, below: f64) -> f64 {
    if f > 0.0 { beta_reg(0.5 * below, 0.5 * above, below / (below + above * f)) } else { 1.0 }
}

fn guarded(tail: f64) -> f64 {
    tail.clamp(SMALLEST_TAIL, 1.0 - SMALLEST_TAIL)
}

/// Newton steps on a start near the quantile of a tail not over ½.
fn polished_student(start: f64, tail: f64, degrees: f64) -> f64 {
    let half = 0.5 * (degrees + 1.0);
    let ln_peak =
        ln_gamma(half) - ln_gamma(0.5 * degrees) - 0.5 * (degrees * std::f64::consts::PI).ln();
    let mut t = start.max(f64::MIN_POSITIVE);
    for _ in 0..POLISHING_STEPS {
        let here = student_upper(t, degrees);
        let density = (ln_peak - half * (t * t / degrees).ln_1p()).exp();
        let step = if t > 1.0 {
            t * ((here / density / t) * (here / tail).ln()).exp_m1()
        } else {
            (here - tail) / density
        };
        t = (t + step).max(0.0);
        if step.abs() <= ENOUGH * t {
            break;
        }
    }
    t
}

/// Student's t with the same tail as the normal deviate `z`, for many degrees of freedom.
fn student_of_normal(z: f64, degrees: f64) -> f64 {
    let q = z * z;
    let g1 = (q + 1.0) / 4.0;
    let g2 = ((5.0 * q + 16.0) * q + 3.0) / 96.0;
    let g3 = (((3.0 * q + 19.0) * q + 17.0) * q - 15.0) / 384.0;
    let g4 = ((((79.0 * q + 776.0) * q + 1482.0) * q - 1920.0) * q - 945.0) / 92_160.0;
    z * (1.0 + (g1 + (g2 + (g3 + g4 / degrees) / degrees) / degrees) / degrees)
}

/// The normal deviate with the same tail as Student's `t`, for many degrees of freedom: Hill
/// (1970), Comm. ACM 13:617–619 [from memory; checked in tests].
fn normal_of_student(t: f64, degrees: f64) -> f64 {
    let a = degrees - 0.5;
    let b = 48.0 * a * a;
    let q = a * (t * t / degrees).ln_1p();
    let second = -(((0.4 * q + 3.3) * q + 24.0) * q + 85.5) / (0.8 * q * q + 100.0 + b);
    t.signum() * q.sqrt() * (1.0 + (q + 3.0 + second) / b)
}
