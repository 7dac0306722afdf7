//! Picking slopes of given rank among all pairs of points.

use super::inversions::{list, sort_and_count};

/// Up to this many points (a count) every pair's slope is computed; above, slopes are counted and
/// the ranks closed in on. Source: measured; both ways take about 2 ms at 1,000.
pub const PAIRS_UP_TO: usize = 1_000;

/// Halvings of the range of slopes, at most (a count). Source: what is left of the range is then
/// under the rounding of a slope.
const MOST_HALVINGS: usize = 64;

/// Slopes of all pairs with different times, to be asked for by rank.
#[derive(Clone, Debug)]
pub struct PairSlopes {
    how: How,
    count: u64,
}

#[derive(Clone, Debug)]
enum How {
    /// All of them, in no order.
    All(Vec<f64>),
    /// Points sorted by time, the slopes not computed.
    Sorted(Sorted),
}

#[derive(Clone, Debug)]
struct Sorted {
    t: Vec<f64>,
    y: Vec<f64>,
    lowest: f64,
    highest: f64,
}

impl PairSlopes {
    /// Looks at the points; for many, only sorts them.
    pub fn new(t: &[f64], y: &[f64]) -> PairSlopes {
        if y.len() <= PAIRS_UP_TO { Self::by_pairs(t, y) } else { Self::by_counting(t, y) }
    }

    /// Computes every slope: n(n−1)/2 numbers.
    pub fn by_pairs(t: &[f64], y: &[f64]) -> PairSlopes {
        let mut slopes = Vec::with_capacity(y.len() * y.len().saturating_sub(1) / 2);
        for j in 1..y.len() {
            for i in 0..j {
                let apart = t[j] - t[i];
                if apart != 0.0 {
                    slopes.push((y[j] - y[i]) / apart);
                }
            }
        }
        PairSlopes { count: slopes.len() as u64, how: How::All(slopes) }
    }

    /// Sorts the points by time and keeps the slopes implicit: memory stays of order n.
    pub fn by_counting(t: &[f64], y: &[f64]) -> PairSlopes {
        let mut order: Vec<usize> = (0..y.len()).collect();
        order.sort_by(|&i, &j| t[i].total_cmp(&t[j]).then(y[i].total_cmp(&y[j])));
        let sorted_t: Vec<f64> = order.iter().map(|&i| t[i]).collect();
        let sorted_y: Vec<f64> = order.iter().map(|&i| y[i]).collect();
        let n = y.len() as u64;
        let tied = sorted_t.chunk_by(|x, y| x == y).map(|group| group.len() as u64);
        let count = n * n.saturating_sub(1) / 2 - tied.map(|u| u * (u - 1) / 2).sum::<u64>();
        // The steepest slopes are between neighbouring times.
        let (mut lowest, mut highest) = (f64::INFINITY, f64::NEG_INFINITY);
        let mut start = 0;
        let mut before: Option<(f64, f64, f64)> = None;
        for group in sorted_t.chunk_by(|x, y| x == y) {
            let (bottom, top) = (sorted_y[start], sorted_y[start + group.len() - 1]);
            if let Some((time, low, high)) = before {
                lowest = lowest.min((bottom - high) / (group[0] - time));
                highest = highest.max((top - low) / (group[0] - time));
            }
            before = Some((group[0], bottom, top));
            start += group.len();
        }
        let how = How::Sorted(Sorted { t: sorted_t, y: sorted_y, lowest, highest });
        PairSlopes { how, count }
    }

    /// Number of slopes.
    pub fn count(&self) -> u64 {
        self.count
    }

    /// The slope of this rank, counted from 1, and the one above it (the same at the top).
    ///
    /// # Formula
    /// ```text
    /// #{slopes < m} = #{i before j in time : yⱼ − m·tⱼ < yᵢ − m·tᵢ}
    /// ```
    /// For many points m is halved in on until few slopes are left, which are then listed.
    ///
    /// # Units
    /// Value per unit of time.
    ///
    /// # Limits
    /// Where slopes are counted, those that differ by rounding only may change places.
    ///
    /// # None
    /// A rank of 0 or over the number of slopes.
    ///
    /// # Reference
    /// Cole, Salowe, Steiger & Szemerédi (1989), SIAM J. Comput. 18:792–810 for counting slopes by
    /// inversions [from memory]; the halving is plain bisection. Held against all pairs in tests.
    pub fn ranked(&mut self, rank: u64) -> Option<Ranked> {
        if rank == 0 || rank > self.count {
            return None;
        }
        let following = (rank + 1).min(self.count);
        match &mut self.how {
            How::All(slopes) => {
                let place = (rank - 1) as usize;
                let (_, at, above) = slopes.select_nth_unstable_by(place, f64::total_cmp);
                let at = *at;
                let next = above.iter().copied().min_by(f64::total_cmp);
                Some(Ranked { at, next: next.unwrap_or(at) })
            }
            How::Sorted(sorted) => {
                Some(Ranked { at: sorted.ranked(rank), next: sorted.ranked(following) })
            }
        }
    }
}

/// Two neighbouring slopes.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Ranked {
    /// The slope of the rank asked for.
    pub at: f64,
    /// The slope one rank higher.
    pub next: f64,
}

impl Sorted {
    fn ranked(&self, rank: u64) -> f64 {
        let few = 4 * self.y.len() as u64;
        // Fewer than `rank` slopes lie under `low`, `rank` or more under `high`.
        // Neither starts on an outermost slope, where rounding decides on which side it is.
        let width = (self.highest - self.lowest).max(f64::MIN_POSITIVE);
        let (mut low, mut below_low) = (self.lowest - width, 0);
        let mut high = self.highest + width;
        let mut below_high = u64::MAX;
        for _ in 0..MOST_HALVINGS {
            let middle = low + 0.5 * (high - low);
            let below = self.below(middle);
            if below < rank {
                (low, below_low) = (middle, below);
            } else {
                (high, below_high) = (middle, below);
            }
            if below_high - below_low <= few {
                break;
            }
        }
        let mut left = self.between(low, high, few as usize + 1);
        left.sort_unstable_by(f64::total_cmp);
        let place = (rank - below_low - 1) as usize;
        // More than a few are left only where they are equal but for rounding: any will do.
        let place = if left.len() as u64 > few { 0 } else { place.min(left.len().max(1) - 1) };
        left.get(place).copied().unwrap_or(low)
    }

    /// Number of slopes under `m`.
    fn below(&self, m: f64) -> u64 {
        let mut over: Vec<f64> = self.over(m);
        self.sort_within_times(&mut over);
        sort_and_count(&mut over)
    }

    /// Values over the line of slope `m` through the origin, in order of time.
    fn over(&self, m: f64) -> Vec<f64> {
        self.t.iter().zip(&self.y).map(|(t, y)| y - m * (t - self.t[0])).collect()
    }

    /// Equal times make no pair: sorted upwards, they make no inversion either.
    fn sort_within_times(&self, over: &mut [f64]) {
        let mut start = 0;
        for group in self.t.chunk_by(|x, y| x == y) {
            over[start..start + group.len()].sort_unstable_by(f64::total_cmp);
            start += group.len();
        }
    }

    /// Slopes from `low` to under `high`: the pairs that change places between the two.
    fn between(&self, low: f64, high: f64, most: usize) -> Vec<f64> {
        let (at_low, at_high) = (self.over(low), self.over(high));
        let mut order: Vec<usize> = (0..self.y.len()).collect();
        order.sort_by(|&i, &j| at_low[i].total_cmp(&at_low[j]));
        list(&mut order, &at_high, most)
            .into_iter()
            .filter(|pair| self.t[pair.second] > self.t[pair.first])
            .map(|pair| (pair.first, pair.second))
            .map(|(i, j)| (self.y[j] - self.y[i]) / (self.t[j] - self.t[i]))
            .collect()
    }
}
