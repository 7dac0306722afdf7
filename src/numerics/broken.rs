//! A broken line, and where its break may lie.

use super::information::Misfit;
use super::points::Point;

/// Points that a break leaves on each side, at least (a count). Source: methods note 5.8.
pub const POINTS_EACH_SIDE: usize = 4;

/// Time that a break leaves on each side, at least (years). Source: methods note 5.8.
pub const YEARS_EACH_SIDE: f64 = 1.0;

/// A broken line with its break, before it is weighed.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Broken {
    /// Where the break is.
    pub break_at: f64,
    /// Value there.
    pub level: f64,
    /// Slope before it.
    pub before: f64,
    /// Slope after it.
    pub after: f64,
    /// What it leaves unexplained.
    pub misfit: Misfit,
}

/// The stretches in which a break may lie, between neighbouring dates: how many points stand before
/// it, and from where to where.
///
/// # Formula
/// ```text
/// at least 4 points before ψ and 4 after it     first + 1 ≤ ψ ≤ last − 1
/// ```
///
/// # Units
/// `t` in years.
///
/// # Limits
/// Points in the order of time. A point at the break stands on neither side.
///
/// # Reference
/// Methods note 5.8.
pub fn stretches(sorted: &[Point]) -> impl Iterator<Item = (usize, f64, f64)> {
    let n = sorted.len();
    let t = |i: usize| sorted[i].t;
    let room = (n > 2 * POINTS_EACH_SIDE).then(|| {
        let (left, right) = (t(POINTS_EACH_SIDE - 1), t(n - POINTS_EACH_SIDE));
        let first = sorted.partition_point(|point| point.t <= left);
        let last = sorted.partition_point(|point| point.t < right);
        let after_left = sorted.get(first).map_or(f64::INFINITY, |point| point.t);
        let before_right = if last > 0 { t(last - 1) } else { f64::NEG_INFINITY };
        (after_left.max(t(0) + YEARS_EACH_SIDE), before_right.min(t(n - 1) - YEARS_EACH_SIDE))
    });
    let (earliest, latest) = room.unwrap_or((f64::INFINITY, f64::NEG_INFINITY));
    (1..n).filter_map(move |j| {
        let (left, right) = (t(j - 1), t(j));
        let (low, high) = (left.max(earliest), right.min(latest));
        (left < right && low <= high).then_some((j, low, high))
    })
}
