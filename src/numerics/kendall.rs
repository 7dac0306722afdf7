//! Mann and Kendall's test for a monotonic trend.

use super::exact_kendall::{MOST_UNTIED, NullScores, brute_score, group_sizes, untied_at_least};
use super::inversions::sort_and_count;
use super::normal;

/// From this many values on (a count) S is found by sorting. Source: measured; both ways take the
/// same time near here.
pub const SORT_FROM: usize = 200;

/// How a p-value was found.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum PValue {
    /// From the distribution of S itself.
    Exact,
    /// From the normal distribution, with a correction for continuity.
    Normal,
}

/// Mann and Kendall's test.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct MannKendall {
    /// Number of values.
    pub n: usize,
    /// Pairs that rise less pairs that fall: negative when falling.
    pub s: i64,
    /// Variance of S under no trend, corrected for ties.
    pub variance: f64,
    /// S less its own sign, over its standard deviation; 0 where the variance is.
    pub z: f64,
    /// Two-sided p.
    pub p: f64,
    /// Where that p comes from.
    pub p_value: PValue,
    /// S over the number of pairs (Kendall's tau-a).
    pub tau: f64,
}

/// Tests for a monotonic trend.
///
/// # Formula
/// ```text
/// S = Σ_{i<j} sign(t_j − t_i)·sign(y_j − y_i)     Z = (S − sign S)/√Var     tau = S/(n(n−1)/2)
/// Var = [n(n−1)(2n+5) − Σu(u−1)(2u+5) − Σv(v−1)(2v+5)]/18
///     + Σu(u−1)(u−2)·Σv(v−1)(v−2)/(9n(n−1)(n−2)) + Σu(u−1)·Σv(v−1)/(2n(n−1))
/// ```
/// where u and v are the sizes of the groups of equal values and of equal times. p is exact without
/// ties up to 40 values and with ties up to 9, else 2·P(N > |Z|).
///
/// # Units
/// Any rising transform of `y` gives the same answer.
///
/// # Limits
/// By pairs under 200 values, by sorting above. All values equal: Z is 0 and p is 1.
///
/// # None
/// Fewer than two values, or slices of different length.
///
/// # Reference
/// Mann (1945); Kendall (1975) [from memory]. Worked examples W02, W04, W05, W13, W20; EPA
/// QA/G-9S p. 109; 916 real series.
pub fn mann_kendall(t: &[f64], y: &[f64]) -> Option<MannKendall> {
    if y.len() < 2 || t.len() != y.len() {
        return None;
    }
    let n = y.len();
    let s = score(t, y);
    let (values, times) = (group_sizes(y), group_sizes(t));
    let variance = variance(n, &values, &times);
    let z = if variance > 0.0 { (s - s.signum()) as f64 / variance.sqrt() } else { 0.0 };
    let untied = values.len() == n && times.len() == n;
    let exact = if untied && n <= MOST_UNTIED {
        untied_at_least(n, s.abs()).map(|tail| (2.0 * tail).min(1.0))
    } else {
        NullScores::tied(t, y).map(|null| null.as_far_as(s))
    };
    let pairs = n as f64 * (n as f64 - 1.0) / 2.0;
    Some(MannKendall {
        n,
        s,
        variance,
        z,
        p: exact.unwrap_or_else(|| normal::two_sided(z)),
        p_value: if exact.is_some() { PValue::Exact } else { PValue::Normal },
        tau: s as f64 / pairs,
    })
}

/// One-sided p for a fall: how probable an S this low or lower is without a trend.
///
/// # Formula
/// ```text
/// P(S ≤ s), exact as in [`mann_kendall`]; else Φ((s + 1)/√Var)
/// ```
///
/// # Units
/// A probability.
///
/// # Limits
/// 1 where all values are equal.
///
/// # None
/// As [`mann_kendall`].
///
/// # Reference
/// As [`mann_kendall`]. Worked example W20.
pub fn falling_p(t: &[f64], y: &[f64]) -> Option<f64> {
    let test = mann_kendall(t, y)?;
    let exact = match test.p_value {
        PValue::Normal => None,
        PValue::Exact if untied(t, y) => untied_at_least(test.n, -test.s),
        PValue::Exact => NullScores::tied(t, y).map(|null| null.at_most(test.s)),
    };
    let normal = || {
        let spread = test.variance.sqrt();
        if spread > 0.0 { normal::lower((test.s + 1) as f64 / spread) } else { 1.0 }
    };
    Some(exact.unwrap_or_else(normal))
}

fn untied(t: &[f64], y: &[f64]) -> bool {
    group_sizes(t).len() == t.len() && group_sizes(y).len() == y.len()
}

/// Kendall's S: by pairs for a short series, by sorting for a long one.
pub fn score(t: &[f64], y: &[f64]) -> i64 {
    if y.len() < SORT_FROM { brute_score(t, y) } else { sorted_score(t, y) }
}

/// Kendall's S in O(n log n).
///
/// # Formula
/// ```text
/// S = n0 − n1 − n2 + n3 − 2q
/// ```
/// where n0 counts all pairs, n1 those of equal times, n2 of equal values, n3 of both, and q the
/// pairs of falling values once the points are sorted by time and, in one time, by value.
///
/// # Units
/// Pairs.
///
/// # Limits
/// None short of 2³² values.
///
/// # Reference
/// Knight (1966), J. Am. Stat. Assoc. 61:436–439. Worked example W04.
pub fn sorted_score(t: &[f64], y: &[f64]) -> i64 {
    let mut order: Vec<usize> = (0..y.len()).collect();
    order.sort_unstable_by(|&i, &j| t[i].total_cmp(&t[j]).then(y[i].total_cmp(&y[j])));
    let same_time = |i: &usize, j: &usize| t[*i] == t[*j];
    let both: Vec<usize> = order
        .chunk_by(same_time)
        .flat_map(|group| group.chunk_by(|i, j| y[*i] == y[*j]).map(<[usize]>::len))
        .collect();
    let mut values: Vec<f64> = order.iter().map(|&i| y[i]).collect();
    let q = sort_and_count(&mut values) as i64;
    let all = y.len() as i64;
    let equal_values = values.chunk_by(|x, y| x == y).map(<[f64]>::len);
    let equal_times = order.chunk_by(same_time).map(<[usize]>::len);
    all * (all - 1) / 2 - pairs(equal_times) - pairs(equal_values) + pairs(both.into_iter()) - 2 * q
}

fn pairs(groups: impl Iterator<Item = usize>) -> i64 {
    groups.map(|size| (size * (size - 1) / 2) as i64).sum()
}

/// Variance of S without a trend; see [`mann_kendall`].
fn variance(n: usize, values: &[usize], times: &[usize]) -> f64 {
    let sum = |groups: &[usize], term: fn(f64) -> f64| -> f64 {
        groups.iter().map(|&size| term(size as f64)).sum()
    };
    let cubic = |u: f64| u * (u - 1.0) * (2.0 * u + 5.0);
    let two = |u: f64| u * (u - 1.0);
    let three = |u: f64| u * (u - 1.0) * (u - 2.0);
    let n = n as f64;
    let plain = (cubic(n) - sum(values, cubic) - sum(times, cubic)) / 18.0;
    let by_three = sum(values, three) * sum(times, three);
    // With two values the divisor is zero, and so is what it divides.
    let by_three = if by_three > 0.0 { by_three / (9.0 * three(n)) } else { 0.0 };
    plain + by_three + sum(values, two) * sum(times, two) / (2.0 * two(n))
}
