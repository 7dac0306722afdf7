//! The trend test for series with non-detects: only pairs whose order is sure are counted.

use super::certain_counts::{certain_counts, daniels_variance};
use super::normal;
use super::points::{Mark, Point, Points};

/// Kendall's test over the pairs whose order is certain.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CertainPairs {
    /// Certain rises less certain falls: negative when falling.
    pub s: i64,
    /// Pairs of unequal times whose order the bounds leave open.
    pub undecided: usize,
    /// Variance of S under no trend.
    pub variance: f64,
    /// S less its own sign, over its standard deviation; 0 where the variance is.
    pub z: f64,
    /// Two-sided p from the normal distribution.
    pub p: f64,
}

/// Tests for a monotonic trend where some values are bounds.
///
/// # Formula
/// ```text
/// S = ½ Σᵢⱼ Aᵢⱼ·Bᵢⱼ     Aᵢⱼ = 1, −1 or 0: value j surely over, surely under, or neither
/// Var = 4ab/(4n(n−1)(n−2)) + 2·ΣA²·ΣB²/(4n(n−1))     a = Σᵢ(Σⱼ Aᵢⱼ)² − ΣA²
/// ```
/// where B is the same for the times, b is to B as a to A, and the sums of squares run over all
/// ordered pairs. A value at most R is surely not over one of R or more; two non-detects are open.
///
/// # Units
/// Any rising transform of the values gives the same answer.
///
/// # Limits
/// By sorting, in O(n log n), up to a million points; the normal p is fair from about ten values on.
///
/// # None
/// Fewer than three points.
///
/// # Reference
/// Daniels (1944), Biometrika 33:129–135 [from memory]. Worked examples W14 and W21; without
/// bounds it equals [`super::mann_kendall`].
pub fn certain_pairs(points: Points<'_>) -> Option<CertainPairs> {
    let n = points.len();
    if n < 3 {
        return None;
    }
    let counts = certain_counts(points);
    let variance = daniels_variance(n, counts.values, counts.times);
    Some(CertainPairs::told(counts.s, counts.undecided, variance))
}

impl CertainPairs {
    fn told(s: i64, undecided: usize, variance: f64) -> CertainPairs {
        let z = if variance > 0.0 { (s - s.signum()) as f64 / variance.sqrt() } else { 0.0 };
        CertainPairs { s, undecided, variance, z, p: normal::two_sided(z) }
    }
}

/// The same by looking at every pair, in O(n²): what the sorting is held against in tests.
pub fn brute_certain_pairs(points: Points<'_>) -> Option<CertainPairs> {
    let n = points.len();
    if n < 3 {
        return None;
    }
    let all: Vec<Point> = points.iter().collect();
    let (mut twice_s, mut undecided) = (0, 0);
    let mut values = Scores::default();
    let mut times = Scores::default();
    for (i, one) in all.iter().enumerate() {
        let (mut value_row, mut time_row) = (0, 0);
        for (j, other) in all.iter().enumerate() {
            let value = order(one, other);
            let time = i64::from(other.t > one.t) - i64::from(other.t < one.t);
            twice_s += value * time;
            value_row += value;
            time_row += time;
            values.squares += value * value;
            times.squares += time * time;
            if i < j && time != 0 && open(one, other) {
                undecided += 1;
            }
        }
        values.rows += value_row * value_row;
        times.rows += time_row * time_row;
    }
    let n = n as f64;
    let variance = values.skew() * times.skew() / (n * (n - 1.0) * (n - 2.0))
        + (values.squares as f64) * (times.squares as f64) / (2.0 * n * (n - 1.0));
    Some(CertainPairs::told(twice_s / 2, undecided, variance))
}

/// Sums over one matrix of scores.
#[derive(Default)]
struct Scores {
    /// Σᵢ(Σⱼ Aᵢⱼ)².
    rows: i64,
    /// Σ A² over all ordered pairs.
    squares: i64,
}

impl Scores {
    fn skew(&self) -> f64 {
        (self.rows - self.squares) as f64
    }
}

/// 1 where the other value is surely over the one, −1 where surely under, 0 where neither.
fn order(one: &Point, other: &Point) -> i64 {
    match (one.mark, other.mark) {
        (Mark::Measured, Mark::Measured) => i64::from(other.y > one.y) - i64::from(other.y < one.y),
        (Mark::Below, Mark::Measured | Mark::Above) => i64::from(other.y >= one.y),
        (Mark::Measured | Mark::Above, Mark::Below) => -i64::from(one.y >= other.y),
        (Mark::Measured, Mark::Above) => i64::from(other.y >= one.y),
        (Mark::Above, Mark::Measured) => -i64::from(one.y >= other.y),
        (Mark::Below, Mark::Below) | (Mark::Above, Mark::Above) => 0,
    }
}

/// Whether bounds leave the order of two values open; measured ties are not open.
fn open(one: &Point, other: &Point) -> bool {
    order(one, other) == 0 && (one.mark != Mark::Measured || other.mark != Mark::Measured)
}
