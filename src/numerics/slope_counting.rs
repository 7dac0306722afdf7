//! Counting and listing, among all pairs of points, the slopes at which a pair changes its order.
//!
//! Take a slope m out of a series: of two points the later one stands over the earlier one until m
//! passes the slope between them. Where a value is a bound only half of that can be told.

use std::ops::Range;

use super::inversions::sort_and_count;
use super::points::{Mark, Point};

/// Rounding of a value over a slope (a pure number). Source: twice the spacing of f64 at one.
const ROUNDING: f64 = 2.0 * f64::EPSILON;

/// Runs this short (a count) are sorted by insertion. Source: measured; 8 to 32 differ little.
const SHORT: usize = 16;

/// A slope between two points, with what Kendall's S loses as it is passed.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Critical {
    /// The slope.
    pub slope: f64,
    /// 2 where both values are measured: from a rise to a fall. 1 where one is a bound, or both are
    /// of opposite kinds: from a rise to open, or from open to a fall.
    pub fall: u64,
}

/// Points in order of time and, in one time, of value.
#[derive(Clone, Debug)]
pub struct Timed {
    t: Vec<f64>,
    y: Vec<f64>,
    known: Vec<Known>,
    all_measured: bool,
}

/// On which sides a value is known: 1 or 0.
#[derive(Clone, Copy, Debug, PartialEq)]
struct Known {
    /// It is at most this: measured, or a non-detect.
    above: u8,
    /// It is at least this: measured, or above range.
    below: u8,
}

impl Known {
    fn of(mark: Mark) -> Known {
        Known { above: u8::from(mark != Mark::Above), below: u8::from(mark != Mark::Below) }
    }

    /// What S loses at the slope between two points.
    fn fall(self, other: Known) -> u64 {
        u64::from(self.above * other.below + self.below * other.above)
    }
}

impl Timed {
    /// Sorts the points.
    pub fn new(points: impl Iterator<Item = Point>) -> Timed {
        let mut points: Vec<Point> = points.collect();
        // Minus zero becomes zero, so that it sorts as it compares.
        points.iter_mut().for_each(|point| (point.t, point.y) = (point.t + 0.0, point.y + 0.0));
        points.sort_by(|one, other| one.t.total_cmp(&other.t).then(one.y.total_cmp(&other.y)));
        Timed {
            t: points.iter().map(|point| point.t).collect(),
            y: points.iter().map(|point| point.y).collect(),
            known: points.iter().map(|point| Known::of(point.mark)).collect(),
            all_measured: points.iter().all(|point| point.mark == Mark::Measured),
        }
    }

    /// Number of points.
    pub fn len(&self) -> usize {
        self.t.len()
    }

    /// Whether there are none.
    pub fn is_empty(&self) -> bool {
        self.t.is_empty()
    }

    /// Ranges of points that share a time.
    pub fn times(&self) -> impl Iterator<Item = Range<usize>> {
        let mut start = 0;
        self.t.chunk_by(|x, y| x == y).map(move |group| {
            start += group.len();
            start - group.len()..start
        })
    }

    /// Pairs within a range of rising values whose order is certain; equal values are of one mark.
    pub fn decided(&self, range: Range<usize>) -> i64 {
        let (mut above, mut decided) = (0, 0);
        let mut start = range.start;
        for same in self.y[range].chunk_by(|x, y| x == y) {
            let known = &self.known[start..start + same.len()];
            decided += above * known.iter().map(|k| i64::from(k.below)).sum::<i64>();
            above += known.iter().map(|k| i64::from(k.above)).sum::<i64>();
            start += same.len();
        }
        decided
    }

    /// S once an infinitely falling slope is taken out, and minus S once an infinitely rising one
    /// is: their sum is what is lost over all slopes.
    pub fn reach(&self) -> Reach {
        let mut reach = Reach { rises: 0, falls: 0 };
        let (mut above, mut below) = (0, 0);
        let mut start = 0;
        for group in self.t.chunk_by(|x, y| x == y) {
            let known = &self.known[start..start + group.len()];
            let count = |side: fn(&Known) -> u8| known.iter().map(|k| u64::from(side(k))).sum();
            let (own_above, own_below): (u64, u64) = (count(|k| k.above), count(|k| k.below));
            reach.rises += above * own_below;
            reach.falls += below * own_above;
            above += own_above;
            below += own_below;
            start += group.len();
        }
        reach
    }

    /// Points known from above and points known from below: a pair of one and the other, at unequal
    /// times, is met as often as S loses at its slope.
    pub fn sides(&self) -> [Vec<u32>; 2] {
        let of = |side: fn(&Known) -> u8| {
            let known = self.known.iter().enumerate().filter(|(_, known)| side(known) == 1);
            known.map(|(i, _)| i as u32).collect()
        };
        [of(|known| known.above), of(|known| known.below)]
    }

    /// The slope between two points and what S loses there. None where they share a time, or where
    /// their order is open at any slope.
    pub fn between(&self, i: usize, j: usize) -> Option<Critical> {
        let fall = self.known[i].fall(self.known[j]);
        let apart = self.t[j] - self.t[i];
        (fall > 0 && apart != 0.0)
            .then(|| Critical { slope: (self.y[j] - self.y[i]) / apart, fall })
    }

    /// Bounds of all slopes: the steepest are between neighbouring times.
    pub fn steepest(&self) -> [f64; 2] {
        let (mut lowest, mut highest) = (f64::INFINITY, f64::NEG_INFINITY);
        let mut before: Option<(f64, f64, f64)> = None;
        let mut start = 0;
        for group in self.t.chunk_by(|x, y| x == y) {
            let (bottom, top) = (self.y[start], self.y[start + group.len() - 1]);
            if let Some((time, low, high)) = before {
                lowest = lowest.min((bottom - high) / (group[0] - time));
                highest = highest.max((top - low) / (group[0] - time));
            }
            before = Some((group[0], bottom, top));
            start += group.len();
        }
        [lowest, highest]
    }

    /// What S loses at slopes under `m`.
    ///
    /// # Formula
    /// ```text
    /// Σ fall(i, j) over i before j in time with yⱼ − m·tⱼ < yᵢ − m·tᵢ
    /// ```
    /// by a merge sort that carries along how many values of the left half are known on each side.
    ///
    /// # Units
    /// `m` in value per unit of time.
    ///
    /// # Limits
    /// Slopes that differ from `m` by rounding only may be counted on either side.
    ///
    /// # Reference
    /// Knight (1966), J. Am. Stat. Assoc. 61:436–439, for counting by merging. Held against all
    /// pairs in tests.
    pub fn lost_under(&self, m: f64) -> u64 {
        // In one time the values rise, so that none of its pairs is counted.
        let mut over = self.over(m);
        if self.all_measured {
            return 2 * sort_and_count(&mut over);
        }
        let mut all: Vec<(f64, Known)> = over.into_iter().zip(self.known.iter().copied()).collect();
        let mut spare = all.clone();
        merge_count(&mut all, &mut spare).lost
    }

    /// Lists slopes from `low` to under `high`, at most `most` of them: the pairs that change places
    /// between the two.
    pub fn list(&self, low: f64, high: f64, most: usize) -> Vec<Critical> {
        let over = self.over(low);
        let mut all: Vec<(f64, u32)> = over.into_iter().zip(0..).collect();
        // In one place the earlier one first: a pair that ties at `low` has not changed yet.
        all.sort_unstable_by(|one, other| one.0.total_cmp(&other.0).then(one.1.cmp(&other.1)));
        let over = self.over(high);
        all.iter_mut().for_each(|one| one.0 = over[one.1 as usize]);
        let mut spare = all.clone();
        let mut found = Vec::new();
        self.merge_list(&mut all, &mut spare, most, &mut found);
        found
    }

    fn merge_list(
        &self,
        all: &mut [(f64, u32)],
        spare: &mut [(f64, u32)],
        most: usize,
        found: &mut Vec<Critical>,
    ) {
        if all.len() < 2 {
            return;
        }
        let half = all.len() / 2;
        self.merge_list(&mut all[..half], &mut spare[..half], most, found);
        self.merge_list(&mut all[half..], &mut spare[half..], most, found);
        spare.copy_from_slice(all);
        let (left, right) = spare.split_at(half);
        let (mut i, mut j) = (0, 0);
        for place in all.iter_mut() {
            if j == right.len() || i < left.len() && left[i].0 <= right[j].0 {
                *place = left[i];
                i += 1;
            } else {
                let (_, later) = right[j];
                *place = right[j];
                j += 1;
                if found.len() < most {
                    let passed = left[i..].iter().filter(|(_, earlier)| *earlier < later);
                    let new = passed.filter_map(|one| self.between(one.1 as usize, later as usize));
                    found.extend(new.take(most - found.len()));
                }
            }
        }
    }

    /// Differences between slopes that the values cannot tell, near slopes of this size.
    pub fn resolution(&self, slope: f64) -> f64 {
        let span = self.t.last().map_or(0.0, |last| last - self.t[0]);
        let size = self.y.iter().fold(0.0, |most: f64, y| most.max(y.abs()));
        if span > 0.0 { ROUNDING * (size / span + slope.abs()) } else { 0.0 }
    }

    /// Values over the line of slope `m` through the first time, in order of time.
    fn over(&self, m: f64) -> Vec<f64> {
        self.t.iter().zip(&self.y).map(|(t, y)| y - m * (t - self.t[0])).collect()
    }
}

/// S far below and far above all slopes.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Reach {
    /// S below all slopes.
    pub rises: u64,
    /// Minus S above all slopes.
    pub falls: u64,
}

/// Sums over a sorted run.
#[derive(Clone, Copy)]
struct Run {
    lost: u64,
    above: u64,
    below: u64,
}

fn merge_count(all: &mut [(f64, Known)], spare: &mut [(f64, Known)]) -> Run {
    if all.len() <= SHORT {
        return insert_count(all);
    }
    let half = all.len() / 2;
    let left_run = merge_count(&mut all[..half], &mut spare[..half]);
    let right_run = merge_count(&mut all[half..], &mut spare[half..]);
    let mut lost = left_run.lost + right_run.lost;
    let (mut above, mut below) = (left_run.above, left_run.below);
    spare.copy_from_slice(all);
    let (left, right) = spare.split_at(half);
    let (mut i, mut j) = (0, 0);
    for place in all.iter_mut() {
        if j == right.len() || i < left.len() && left[i].0 <= right[j].0 {
            *place = left[i];
            above -= u64::from(left[i].1.above);
            below -= u64::from(left[i].1.below);
            i += 1;
        } else {
            *place = right[j];
            lost += above * u64::from(right[j].1.below) + below * u64::from(right[j].1.above);
            j += 1;
        }
    }
    Run { lost, above: left_run.above + right_run.above, below: left_run.below + right_run.below }
}

fn insert_count(all: &mut [(f64, Known)]) -> Run {
    let mut run = Run { lost: 0, above: 0, below: 0 };
    for end in 0..all.len() {
        let one = all[end];
        run.above += u64::from(one.1.above);
        run.below += u64::from(one.1.below);
        let mut at = end;
        while at > 0 && all[at - 1].0 > one.0 {
            run.lost += all[at - 1].1.fall(one.1);
            all[at] = all[at - 1];
            at -= 1;
        }
        all[at] = one;
    }
    run
}
