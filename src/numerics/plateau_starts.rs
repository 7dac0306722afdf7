//! Where the search for a plateau starts: a coarse grid of rates and heights, on few points.

use super::curve_fit::Height;
use super::points::Mark;

/// Points that the grid is laid over, at most (a count); more are averaged in blocks. Source: the
/// grid looks for the valley, not for its bottom.
const MOST_POINTS: usize = 256;

/// Rates of the grid (a count), evenly in their logarithm.
const RATES: usize = 20;

/// Slowest rate of the grid, per length of the record. Source: slower decay over one record is a
/// straight line to 1 part in 30.
const SLOWEST: f64 = 0.3;

/// Fastest rate of the grid: at the second date that much of the first has decayed (a power of e).
/// Source: faster decay rests on the first date alone.
const FASTEST_TO_SECOND: f64 = 6.0;

/// Heights over the plateau at the first date (a count), evenly in their logarithm.
const HEIGHTS: usize = 12;

/// Lowest height of the grid, ln of its ratio to the plateau.
const LOWEST: f64 = -2.0;

/// Highest height of the grid over the range of the record (in ln). Source: a plateau a little
/// under the lowest result.
const HEADROOM: f64 = 4.0;

/// Starts handed on, at most (a count): the lowest valleys of the grid.
const MOST_STARTS: usize = 3;

/// How far a bound is moved into its own side here (in ln): as for the line's first guess.
const SHIFT: f64 = 0.5 * std::f64::consts::LN_2;

/// The curve ln(P + A·e^(−k·u)) by ln P, ln A and ln k; further parameters do not enter.
///
/// # Formula
/// ```text
/// f = ln(e^p + e^q)     q = a − e^κ·u     s = e^q/(e^p + e^q)
/// ∂p = 1 − s     ∂a = s     ∂κ = −s·e^κ·u
/// ```
///
/// # Units
/// `u` in the unit that 1/k has; the height in ln(concentration).
///
/// # Limits
/// No overflow for heights of any size.
///
/// # Reference
/// Methods note 5.7.
pub fn levelling<const N: usize>(at: &[f64; N], u: f64) -> Height<N> {
    let rate = at[2].exp();
    let decayed = at[1] - rate * u;
    let over = decayed - at[0];
    // The share of the decaying part; of two exponentials the one that cannot overflow.
    let small = (-over.abs()).exp();
    let height = at[0].max(decayed) + small.ln_1p();
    let (share, rest) = if over > 0.0 {
        (1.0 / (1.0 + small), small / (1.0 + small))
    } else {
        (small / (1.0 + small), 1.0 / (1.0 + small))
    };
    let mut by = [0.0; N];
    (by[0], by[1]) = (rest, share);
    by[2] = if share > 0.0 { -share * rate * u } else { 0.0 };
    (height, by)
}

/// A record made short: times and values, bounds moved into their own side.
pub struct Short {
    /// Times.
    pub u: Vec<f64>,
    /// Values.
    pub w: Vec<f64>,
}

/// The record in few points: averages of blocks of neighbours where there are many. Times must be
/// in their order.
pub fn shortened(t: &[f64], y: &[f64], mark: &[Mark]) -> Short {
    let block = t.len().div_ceil(MOST_POINTS).max(1);
    let moved: Vec<f64> = y
        .iter()
        .zip(mark)
        .map(|(y, mark)| match mark {
            Mark::Measured => *y,
            Mark::Below => y - SHIFT,
            Mark::Above => y + SHIFT,
        })
        .collect();
    let averaged = |values: &[f64]| {
        values.chunks(block).map(|block| block.iter().sum::<f64>() / block.len() as f64).collect()
    };
    Short { u: averaged(t), w: averaged(&moved) }
}

/// Starts (ln P, ln A, ln k) in the lowest valleys of the grid, the lowest first.
///
/// # Formula
/// ```text
/// for each k and A/P:  ln P = mean of w − ln(1 + A/P·e^(−k·u));  least squares ranks them
/// ```
///
/// # Units
/// `u` from 0 to 1 over the record.
///
/// # Limits
/// 240 places.
///
/// # Reference
/// Ruled for this program.
pub fn starts(short: &Short) -> Vec<[f64; 3]> {
    let second = short.u.iter().copied().find(|&u| u > short.u[0]).unwrap_or(1.0) - short.u[0];
    let fastest = (FASTEST_TO_SECOND / second).max(2.0 * SLOWEST);
    let (low, high) = short
        .w
        .iter()
        .fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), &w| (low.min(w), high.max(w)));
    let highest = high - low + HEADROOM;
    let along = |i: usize, count: usize| i as f64 / (count - 1) as f64;
    let mut valleys: Vec<(f64, [f64; 3])> = Vec::new();
    for i in 0..RATES {
        let rate = SLOWEST * (fastest / SLOWEST).powf(along(i, RATES));
        let mut best = (f64::INFINITY, [0.0; 3]);
        for j in 0..HEIGHTS {
            let height = LOWEST + (highest - LOWEST) * along(j, HEIGHTS);
            let (level, rss) = ranked(short, rate, height);
            if rss < best.0 {
                best = (rss, [level, level + height, rate.ln()]);
            }
        }
        valleys.push(best);
    }
    let at = |i: usize| valleys.get(i).map_or(f64::INFINITY, |valley| valley.0);
    let mut lowest: Vec<(f64, [f64; 3])> = (0..RATES)
        .filter(|&i| at(i) <= at(i + 1) && (i == 0 || at(i) < at(i - 1)))
        .map(|i| valleys[i])
        .collect();
    lowest.sort_by(|x, y| x.0.total_cmp(&y.0));
    lowest.truncate(MOST_STARTS);
    lowest.into_iter().map(|valley| valley.1).collect()
}

/// The best level and the residual sum of squares of one place of the grid.
fn ranked(short: &Short, rate: f64, height: f64) -> (f64, f64) {
    let shape = |u: f64| levelling(&[0.0, height, rate.ln()], u).0;
    let (mut sum, mut squares) = (0.0, 0.0);
    for (&u, &w) in short.u.iter().zip(&short.w) {
        let rest = w - shape(u);
        sum += rest;
        squares += rest * rest;
    }
    let n = short.u.len() as f64;
    (sum / n, squares - sum * sum / n)
}
