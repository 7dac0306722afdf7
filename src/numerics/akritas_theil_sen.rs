//! Theil and Sen's slope for series with non-detects: the slope whose residuals have no trend.

use super::certain_counts::{ScoreSums, daniels_variance, time_sums, value_sums};
use super::critical_slopes::{CriticalSlopes, Ends};
use super::interval::Interval;
use super::kendall::mann_kendall;
use super::points::Points;
use super::slope_gaps::{Gap, Staircase};
use super::tails;

/// Rounds in which an end and the variance at it are brought to agree, at most (a count). Source:
/// three or four suffice for series so long that their slopes are counted.
const MOST_ROUNDS: usize = 30;

/// A round that moves an end by less than this share of its distance from the slope (a pure number)
/// is the last. Source: far under the width of an interval.
const SMALL_MOVE: f64 = 1e-6;

/// Akritas, Murphy and LaValley's slope.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct AkritasTheilSen {
    /// The slope: the middle of the slopes in [`AkritasTheilSen::zero`].
    pub slope: f64,
    /// Slopes whose residuals have an S of zero; one slope where S passes zero there.
    pub zero: Interval,
    /// The interval. An end is open where no slope on that side is rejected.
    pub ends: Ends,
}

/// The slope whose residuals have no trend, where some values are bounds.
///
/// # Formula
/// ```text
/// S(b) = Kendall's S of y − b·t over the pairs whose order is certain
/// slope:  the middle of the b with S(b) = 0
/// ends:   S(b) = ±z·√Var(b)     Var(b) Daniels' variance of the residuals y − b·t
/// ```
/// where z is the two-sided normal quantile of `confidence`. S and Var change in steps; each end
/// lies in the first stretch between two steps on which |S| is over z·√Var, at the share of it that
/// Gilbert's ranks give. With every value measured this is [`super::theil_sen()`], the variance
/// being that of the values.
///
/// # Units
/// `t` in years, `y` in ln(concentration): the slope is per year, negative when falling.
/// `confidence` is a probability.
///
/// # Limits
/// Up to about 140 points all slopes are held in memory; above, memory is of order n. The variance
/// is taken anew at each b since it depends on it: simulated (n 8 to 100, up to 70 % non-detects,
/// 4,000 runs a cell), a nominal 90 % covers 0.89 to 0.95 so, no tail over 0.061. With the variance
/// at the slope one tail reaches 0.11, with that at b = 0 a steep series covers 0.95 to 1.00.
///
/// # None
/// No certain pair could rise, or none could fall: the slope is not held on one side.
///
/// # Reference
/// Akritas, Murphy & LaValley (1995), J. Am. Stat. Assoc. 90:170–177 [from memory], for the
/// slope; the interval inverts Kendall's test as Sen (1968) does. Worked example W14.
pub fn akritas_theil_sen(points: Points<'_>, confidence: f64) -> Option<AkritasTheilSen> {
    let mut slopes = CriticalSlopes::new(points);
    let zero = slopes.zero()?;
    let slope = zero.low + 0.5 * (zero.high - zero.low);
    let z = tails::normal_quantile(0.5 * (1.0 - confidence));
    let ends = if points.all_measured() {
        slopes.ends(z * mann_kendall(points.t(), points.y())?.variance.sqrt())
    } else {
        let times = time_sums(points.t());
        let height = |b: f64| z * variance(points, b, times).sqrt();
        let (rises, falls, near) = (slopes.rises(), slopes.falls(), height(slope));
        if let Some(stairs) = slopes.staircase() {
            // The upper end is the lower one of the values upside down.
            let turned = stairs.turned();
            let high = first_rejected(&turned, falls, near, |b| height(-b));
            let low = first_rejected(stairs, rises, near, height);
            Ends { low, high: high.map(|high| -high) }
        } else {
            Ends {
                low: settled(slope, near, height, |height| slopes.low_end(height)),
                high: settled(slope, near, height, |height| slopes.high_end(height)),
            }
        }
    };
    let finite = slope.is_finite() && zero.low.is_finite() && zero.high.is_finite();
    finite.then_some(AkritasTheilSen { slope, zero, ends })
}

/// Daniels' variance of S of the residuals over a slope.
fn variance(points: Points<'_>, b: f64, times: ScoreSums) -> f64 {
    let (t, y) = (points.t(), points.y());
    // Times from the first one given: residuals keep their digits wherever the origin lies.
    let left: Vec<f64> = t.iter().zip(y).map(|(time, y)| y - b * (time - t[0])).collect();
    match Points::new(t, &left, points.mark()) {
        Ok(residuals) => daniels_variance(points.len(), value_sums(residuals), times),
        Err(_) => f64::INFINITY,
    }
}

/// The end in the first stretch below the slope on which S is over the height there.
///
/// Sought from where the height `near` the slope would put it, by steps outwards of twice the last,
/// and by halving once a stretch is rejected.
fn first_rejected(
    stairs: &Staircase,
    rises: u64,
    near: f64,
    height: impl Fn(f64) -> f64,
) -> Option<f64> {
    let excess = |gap: &Gap| rises as f64 - gap.lost as f64 - height(gap.middle());
    let mut inside = stairs.gap_above(rises);
    let mut outside: Option<Gap> = None;
    // Places up to `low` are rejected or farther out, those after `high` are inside.
    let (mut low, mut high) = (0, inside.lost);
    let (mut place, mut stride) = ((rises as f64 - near).max(0.0) as u64 + 1, 1);
    while low < high {
        let gap = stairs.gap_below(place.clamp(low + 1, high));
        if excess(&gap) > 0.0 {
            low = gap.upto;
            outside = Some(gap);
        } else {
            high = gap.lost;
            inside = gap;
        }
        if outside.is_some() {
            place = low + high.saturating_sub(low).div_ceil(2);
        } else {
            place = high.saturating_sub(stride);
            stride *= 2;
        }
    }
    let outside = outside?;
    let (over, under) = (excess(&outside), excess(&inside));
    let (outer, inner) = (outside.low?, outside.high?);
    Some(outer + over / (over - under) * (inner - outer))
}

/// The end that agrees with the height at itself, for slopes so many that steps do not matter.
fn settled(
    slope: f64,
    near: f64,
    height: impl Fn(f64) -> f64,
    mut end: impl FnMut(f64) -> Option<f64>,
) -> Option<f64> {
    let mut last = end(near)?;
    let mut next = last;
    for _ in 0..MOST_ROUNDS {
        next = end(height(last))?;
        if (next - last).abs() <= SMALL_MOVE * (next - slope).abs() {
            return Some(next);
        }
        (last, next) = (next, last);
    }
    // Where the two do not settle, the outer one.
    Some(if (next - slope).abs() > (last - slope).abs() { next } else { last })
}
