//! Kendall's S over the pairs whose order is certain, and the sums behind its variance, by sorting.

use super::points::{Mark, Point, Points};
use super::slope_counting::Timed;

/// Sums over a matrix of scores, 1, −1 or 0 for each ordered pair.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct ScoreSums {
    /// Squares of the sums of the rows, summed.
    pub rows: i64,
    /// Number of scores that are not zero.
    pub squares: i64,
}

/// What the test of certain pairs is made from.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct CertainCounts {
    /// Certain rises less certain falls.
    pub s: i64,
    /// Pairs of unequal times whose order the bounds leave open; measured ties are not open.
    pub undecided: usize,
    /// Sums over the order of values.
    pub values: ScoreSums,
    /// Sums over the order of times.
    pub times: ScoreSums,
}

/// Counts certain pairs in O(n log n).
///
/// # Formula
/// ```text
/// key = (y, 0 | 1 | 2) for at most, measured, at least
/// j surely over i:  j known from below, i from above, keyⱼ > keyᵢ
/// row of i:  #{known from below: key > keyᵢ}·[i known from above] − the same under it
/// S = rises − lost − ties:  rises the pairs of unequal times that could be one, lost as in
///     `Timed::lost_under`, ties the pairs of equal measured values at unequal times
/// ```
///
/// # Units
/// Pairs; any rising transform of the values gives the same answer.
///
/// # Limits
/// Up to a million points, beyond which sums of squares overflow.
///
/// # Reference
/// Knight (1966), J. Am. Stat. Assoc. 61:436–439; Daniels (1944), Biometrika 33:129–135 [from
/// memory]. Held against all pairs in tests.
pub fn certain_counts(points: Points<'_>) -> CertainCounts {
    let ranked = ranked(points);
    let values = score_sums(&ranked);
    let measured_ties = measured_ties(&ranked);
    let n = ranked.len() as i64;
    let timed = Timed::new(ranked.into_iter());
    let (mut decided_within, mut same_time) = (0, 0);
    for group in timed.times() {
        let size = group.len() as i64;
        same_time += size * (size - 1) / 2;
        decided_within += timed.decided(group);
    }
    let reach = timed.reach();
    let s = reach.rises as i64 - timed.lost_under(0.0) as i64 - measured_ties;
    let pairs = n * (n - 1) / 2 - same_time;
    let decided = values.squares / 2 - decided_within;
    let undecided = (pairs - decided - measured_ties) as usize;
    CertainCounts { s, undecided, values, times: time_sums(points.t()) }
}

/// The sums over the order of values alone, in O(n log n); the times play no part.
pub fn value_sums(points: Points<'_>) -> ScoreSums {
    score_sums(&ranked(points))
}

/// The sums over the order of times alone, in O(n log n).
pub fn time_sums(t: &[f64]) -> ScoreSums {
    let mut sorted = t.to_vec();
    sorted.sort_unstable_by(f64::total_cmp);
    let (n, mut earlier) = (t.len() as i64, 0);
    let mut sums = ScoreSums::default();
    for group in sorted.chunk_by(|x, y| x == y) {
        let size = group.len() as i64;
        let later = n - earlier - size;
        sums.rows += size * (later - earlier) * (later - earlier);
        sums.squares += size * (n - size);
        earlier += size;
    }
    sums
}

/// The sums over the order of ranked points.
fn score_sums(ranked: &[Point]) -> ScoreSums {
    // Points known from above and from below, up to each rank.
    let ranks = ranked.last().map_or(0, |point| point.y as usize + 1);
    let (mut above, mut below) = (vec![0i64; ranks + 1], vec![0i64; ranks + 1]);
    for point in ranked {
        above[point.y as usize + 1] += i64::from(point.mark != Mark::Above);
        below[point.y as usize + 1] += i64::from(point.mark != Mark::Below);
    }
    for rank in 0..ranks {
        above[rank + 1] += above[rank];
        below[rank + 1] += below[rank];
    }
    let mut sums = ScoreSums::default();
    for point in ranked {
        let rank = point.y as usize;
        let over = if point.mark == Mark::Above { 0 } else { below[ranks] - below[rank + 1] };
        let under = if point.mark == Mark::Below { 0 } else { above[rank] };
        sums.rows += (over - under) * (over - under);
        sums.squares += over + under;
    }
    sums
}

/// The variance of S without a trend.
///
/// # Formula
/// ```text
/// Var = ab/(n(n−1)(n−2)) + ΣA²·ΣB²/(2n(n−1))     a = Σᵢ(Σⱼ Aᵢⱼ)² − ΣA²
/// ```
/// where A are the scores of the values, B those of the times, and b is to B as a to A.
///
/// # Units
/// Pairs squared.
///
/// # Limits
/// 0 for fewer than two points.
///
/// # Reference
/// Daniels (1944), Biometrika 33:129–135 [from memory]. Worked examples W14 and W21.
pub fn daniels_variance(n: usize, values: ScoreSums, times: ScoreSums) -> f64 {
    if n < 2 {
        return 0.0;
    }
    let n = n as f64;
    let skew = |sums: ScoreSums| (sums.rows - sums.squares) as f64;
    // With two points the divisor is zero, and so is what it divides.
    let skewed =
        if n > 2.0 { skew(values) * skew(times) / (n * (n - 1.0) * (n - 2.0)) } else { 0.0 };
    skewed + values.squares as f64 * times.squares as f64 / (2.0 * n * (n - 1.0))
}

/// The points with their values replaced by the ranks of their keys, counted from 0.
fn ranked(points: Points<'_>) -> Vec<Point> {
    let mut all: Vec<Point> = points.iter().collect();
    let class = |mark: Mark| match mark {
        Mark::Below => 0u8,
        Mark::Measured => 1,
        Mark::Above => 2,
    };
    // Minus zero becomes zero, so that it sorts as it compares.
    all.iter_mut().for_each(|point| (point.t, point.y) = (point.t + 0.0, point.y + 0.0));
    all.sort_unstable_by(|one, other| {
        one.y.total_cmp(&other.y).then(class(one.mark).cmp(&class(other.mark)))
    });
    let mut rank = 0.0;
    let mut before: Option<(f64, Mark)> = None;
    for point in &mut all {
        if before.is_some_and(|(y, mark)| y != point.y || mark != point.mark) {
            rank += 1.0;
        }
        before = Some((point.y, point.mark));
        point.y = rank;
    }
    all
}

/// Pairs of equal measured values at unequal times; the points are sorted by rank.
fn measured_ties(ranked: &[Point]) -> i64 {
    let pairs = |count: usize| (count * count.saturating_sub(1) / 2) as i64;
    let mut ties = 0;
    for group in ranked.chunk_by(|one, other| one.y == other.y) {
        if group.len() > 1 && group[0].mark == Mark::Measured {
            let mut times: Vec<f64> = group.iter().map(|point| point.t).collect();
            times.sort_unstable_by(f64::total_cmp);
            let together = times.chunk_by(|x, y| x == y).map(|same| pairs(same.len()));
            ties += pairs(group.len()) - together.sum::<i64>();
        }
    }
    ties
}
