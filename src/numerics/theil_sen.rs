//! Theil and Sen's slope: the median of the slopes of all pairs.

use super::critical_slopes::{CriticalSlopes, Ends};
use super::interval::Interval;
use super::kendall::mann_kendall;
use super::points::{Mark, Points};
use super::slope_selection::{PAIRS_UP_TO, PairSlopes};
use super::tails;

/// A line by medians.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TheilSen {
    /// Median slope of all pairs with different times.
    pub slope: f64,
    /// Median value less slope times median time.
    pub intercept: f64,
    /// Gilbert's interval of the slope. None where too few pairs leave an end open.
    pub interval: Option<Interval>,
    /// Number of pairs with different times.
    pub pairs: u64,
}

/// Theil and Sen's line with Gilbert's interval of its slope.
///
/// # Formula
/// ```text
/// b = median of (yⱼ − yᵢ)/(tⱼ − tᵢ)     a = median y − b·median t
/// C = z·√Var(S)     ranks (N − C)/2 and (N + C)/2 + 1, read between the sorted slopes
/// ```
/// where N is the number of pairs with different times, Var(S) the variance of Kendall's S with its
/// correction for ties, and z the two-sided normal quantile of `confidence`.
///
/// # Units
/// `t` in years, `y` in ln(concentration): the slope is per year. `confidence` is a probability.
///
/// # Limits
/// Up to 1,000 points all slopes are held in memory (4 MB); above, memory is of order n.
///
/// # None
/// No two different times, or slices of different length. The interval alone is None where the
/// lower rank is under 1.
///
/// # Reference
/// Theil (1950); Sen (1968), J. Am. Stat. Assoc. 63:1379–1389; Conover (1980) for the intercept;
/// Gilbert (1987), p. 218 [second hand]. Worked examples W02, W04, W05, W20; 916 real series.
pub fn theil_sen(t: &[f64], y: &[f64], confidence: f64) -> Option<TheilSen> {
    let test = mann_kendall(t, y)?;
    let spread = tails::normal_quantile(0.5 * (1.0 - confidence)) * test.variance.sqrt();
    if y.len() > PAIRS_UP_TO {
        return by_counting(t, y, spread);
    }
    let mut slopes = PairSlopes::new(t, y);
    let pairs = slopes.count();
    let slope = slopes.ranked(pairs.div_ceil(2))?;
    let slope = if pairs % 2 == 1 { slope.at } else { 0.5 * (slope.at + slope.next) };
    let (first, last) = (0.5 * (pairs as f64 - spread), 0.5 * (pairs as f64 + spread) + 1.0);
    let interval = if first >= 1.0 {
        let low = between_ranks(&mut slopes, first)?;
        let high = between_ranks(&mut slopes, last)?;
        Some(Interval { low, high })
    } else {
        None
    };
    let intercept = median(y)? - slope * median(t)?;
    Some(TheilSen { slope, intercept, interval, pairs })
}

/// The same for many points, on the staircase of S.
fn by_counting(t: &[f64], y: &[f64], spread: f64) -> Option<TheilSen> {
    let mark = vec![Mark::Measured; t.len()];
    let mut slopes = CriticalSlopes::new(Points::new(t, y, &mark).ok()?);
    let zero = slopes.zero()?;
    let slope = 0.5 * (zero.low + zero.high);
    let interval = match slopes.ends(spread) {
        Ends { low: Some(low), high: Some(high) } => Some(Interval { low, high }),
        _ => None,
    };
    let intercept = median(y)? - slope * median(t)?;
    Some(TheilSen { slope, intercept, interval, pairs: slopes.rises() })
}

/// The slope at a rank that need not be whole.
fn between_ranks(slopes: &mut PairSlopes, rank: f64) -> Option<f64> {
    let whole = rank.floor();
    let found = slopes.ranked((whole as u64).min(slopes.count()))?;
    let share = rank - whole;
    // Written so that a share of 0 gives the slope itself.
    Some(found.at + share * (found.next - found.at))
}

/// The median: the middle value, or the mean of the two middle ones.
///
/// # Formula
/// ```text
/// n odd: x₍₍n+1₎/₂₎     n even: (x₍n/2₎ + x₍n/2+1₎)/2
/// ```
///
/// # Units
/// Those of the values.
///
/// # Limits
/// Finite values.
///
/// # None
/// No values.
///
/// # Reference
/// Definition.
pub fn median(values: &[f64]) -> Option<f64> {
    if values.is_empty() {
        return None;
    }
    let mut sorted = values.to_vec();
    let half = sorted.len() / 2;
    let (below, middle, _) = sorted.select_nth_unstable_by(half, f64::total_cmp);
    let middle = *middle;
    if values.len() % 2 == 1 {
        return Some(middle);
    }
    below.iter().copied().max_by(f64::total_cmp).map(|lower| 0.5 * (lower + middle))
}
