//! The standard normal distribution: tails, and the logarithm of a tail with its derivatives.
//!
//! Written here rather than taken from a crate, since the complementary error function of
//! `statrs` 0.19.1 was measured to carry 10 to 11 digits only, and every censored likelihood rests
//! on this one function.

/// ½ ln 2π, the constant of the normal density (a pure number). Source: arithmetic.
pub const HALF_LN_TWO_PI: f64 = 0.918_938_533_204_672_7;

/// Where the mapping of 0 … ∞ onto −1 … 1 has its zero (in standard deviations). Source: the
/// value among 2 … 6 with which the coefficients of [`MILLS`] fall fastest.
const SHIFT: f64 = 5.0;

/// Coefficients of (x + 5)·R(x), R the Mills ratio, in powers of s = (x − 5)/(x + 5), lowest first
/// (pure numbers). Source: `tests/reference/mills_coefficients.py`; largest relative error 4e-16.
const MILLS: [f64; 26] = [
    1.928_081_047_153_157_8,
    -1.667_866_595_188_96,
    1.241_547_061_573_866_4,
    -0.785_911_075_546_558_9,
    0.413_644_715_732_683_8,
    -0.173_254_734_086_729_37,
    0.052_125_502_412_278_8,
    -0.007_503_282_826_693_918,
    -0.001_999_961_974_984_366,
    0.001_365_859_209_063_712_4,
    -0.000_148_833_052_323_398,
    -0.000_124_735_896_168_795_83,
    4.181_458_586_632_463e-5,
    9.975_548_949_125_13e-6,
    -6.945_033_138_491_628e-6,
    -8.377_371_303_684_879e-7,
    1.093_663_352_359_394_2e-6,
    9.913_947_820_502_682e-8,
    -1.764_123_968_977_190_4e-7,
    -1.981_024_532_049_252_3e-8,
    2.817_201_197_544_303_2e-8,
    4.703_057_213_634_89e-9,
    -3.844_184_064_964_92e-9,
    -8.850_270_014_353_632e-10,
    3.125_605_447_160_412_5e-10,
    8.821_471_242_288_742e-11,
];

/// Below this z (in standard deviations) ln Φ is summed as an asymptotic series. Source: with the
/// seven terms of [`FAR_TAIL`] the first term left out is 3e-16 of the whole here.
const FAR_BELOW: f64 = -30.0;

/// Coefficients of Φ(z)·(−z)/φ(z) in powers of −1/z², lowest first: the odd factorials (pure
/// numbers). Source: Abramowitz & Stegun (1964), 26.2.12 [from memory; checked in tests].
const FAR_TAIL: [f64; 7] = [1.0, 1.0, 3.0, 15.0, 105.0, 945.0, 10_395.0];

/// The Mills ratio at `x` not below zero: the upper tail over the density.
///
/// # Formula
/// ```text
/// R(x) = (1 − Φ(x))/φ(x) = P(s)/(x + 5)     s = (x − 5)/(x + 5)
/// ```
/// where φ and Φ are the standard normal density and distribution function and `P` is the
/// polynomial with the coefficients [`MILLS`]. Odd and even powers are summed apart, which lets a
/// processor do two things at once.
///
/// # Units
/// `x` in standard deviations; the ratio in the same.
///
/// # Limits
/// Relative error 4e-16 for every `x ≥ 0`; not meant for negative `x`.
///
/// # Reference
/// The mapping: Shepherd & Laframboise (1981), Math. Comp. 36:249–253 [from memory]. Checked
/// against `tests/reference/tails.csv`.
fn mills_ratio(x: f64) -> f64 {
    let s = (x - SHIFT) / (x + SHIFT);
    let square = s * s;
    let (mut even, mut odd) = (0.0, 0.0);
    for pair in MILLS.chunks_exact(2).rev() {
        even = even * square + pair[0];
        odd = odd * square + pair[1];
    }
    (even + s * odd) / (x + SHIFT)
}

/// The standard normal density at `z`.
///
/// # Formula
/// ```text
/// φ(z) = exp(−z²/2 − ½ ln 2π)
/// ```
///
/// # Units
/// `z` in standard deviations; the density per standard deviation.
///
/// # Limits
/// Zero beyond |z| = 38.
///
/// # Reference
/// Abramowitz & Stegun (1964), 26.2.1.
pub fn density(z: f64) -> f64 {
    (-0.5 * z * z - HALF_LN_TWO_PI).exp()
}

/// Probability that a standard normal variable is over `z`.
///
/// # Formula
/// ```text
/// z ≥ 0:  φ(z)·R(z)        z < 0:  1 − φ(z)·R(−z)
/// ```
/// where φ is the density and `R` the Mills ratio.
///
/// # Units
/// `z` in standard deviations; the answer is a probability.
///
/// # Limits
/// Relative error 1e-13 or less up to z = 37; 0 over 38.
///
/// # Reference
/// Abramowitz & Stegun (1964), 26.2.3. Checked against `tests/reference/tails.csv`.
pub fn upper(z: f64) -> f64 {
    let tail = density(z) * mills_ratio(z.abs());
    if z < 0.0 { 1.0 - tail } else { tail }
}

/// Probability that a standard normal variable is at most `z`: [`upper`] of `−z`.
///
/// # Formula
/// ```text
/// Φ(z) = 1 − Φ(−z)
/// ```
///
/// # Units
/// `z` in standard deviations; the answer is a probability.
///
/// # Limits
/// As [`upper`].
///
/// # Reference
/// Abramowitz & Stegun (1964), 26.2.5.
pub fn lower(z: f64) -> f64 {
    upper(-z)
}

/// Probability that a standard normal variable is as far from zero as `z` or farther.
///
/// # Formula
/// ```text
/// p = 2·(1 − Φ(|z|))
/// ```
///
/// # Units
/// `z` in standard deviations; the answer is a probability.
///
/// # Limits
/// As [`upper`].
///
/// # Reference
/// As [`upper`].
pub fn two_sided(z: f64) -> f64 {
    (2.0 * upper(z.abs())).min(1.0)
}

/// What a value known only to lie below a bound adds to a log-likelihood and to its derivatives.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LowerTail {
    /// ln Φ(z).
    pub ln: f64,
    /// First derivative of ln Φ: φ(z)/Φ(z).
    pub slope: f64,
    /// Minus the second derivative of ln Φ; between 0 and 1.
    pub bend: f64,
}

/// ln Φ(z) with its first two derivatives, without loss far below zero.
///
/// # Formula
/// ```text
/// m = φ(z)/Φ(z)     (ln Φ)′ = m     −(ln Φ)″ = m(m + z)
/// z ≤ 0:    m = 1/R(−z)   ln Φ = ln φ(z) + ln R(−z)
/// z < −30:  R(−z) = S/(−z)   S = Σ (−1)ᵏ (2k−1)‼ z⁻²ᵏ   m + z = −z(1 − S)/S
/// ```
/// where φ and Φ are the standard normal density and distribution function and `R` is the Mills
/// ratio. The last form keeps m + z, elsewhere the difference of two nearly equal numbers.
///
/// # Units
/// `z` in standard deviations.
///
/// # Limits
/// Relative error of `ln` and `slope` 1e-15, of `bend` 1e-12. Over z = 38 slope and bend are zero,
/// as they should be; under about −1e154 `ln` is minus infinity.
///
/// # Reference
/// Abramowitz & Stegun (1964), 26.2.12. Checked against `tests/reference/tails.csv`.
pub fn lower_tail(z: f64) -> LowerTail {
    if z < FAR_BELOW {
        let power = -1.0 / (z * z);
        let mut rest = 0.0;
        for coefficient in FAR_TAIL[1..].iter().rev() {
            rest = power * (coefficient + rest);
        }
        let sum = FAR_TAIL[0] + rest;
        let slope = -z / sum;
        let ln = -0.5 * z * z - HALF_LN_TWO_PI - (-z).ln() + rest.ln_1p();
        return LowerTail { ln, slope, bend: slope * (z * rest / sum) };
    }
    if z <= 0.0 {
        let ratio = mills_ratio(-z);
        let slope = 1.0 / ratio;
        let ln = -0.5 * z * z - HALF_LN_TWO_PI + ratio.ln();
        return LowerTail { ln, slope, bend: slope * (slope + z) };
    }
    let density = density(z);
    let over = density * mills_ratio(z);
    let slope = density / (1.0 - over);
    LowerTail { ln: (-over).ln_1p(), slope, bend: slope * (slope + z) }
}
