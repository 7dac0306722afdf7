//! Counting and listing, among all pairs of points, the slopes at which a pair changes its order.
//!
//! Take a slope m out of a series: of two points the later one stands over the earlier one until m
//! passes the slope between them. Where a value is a bound only half of that can be told.

use std::ops::Range;

use super::passing::{Passing, Place, merge_sort};
use super::points::{Mark, Point};

/// Rounding of a value over a slope (a pure number). Source: twice the spacing of f64 at one.
const ROUNDING: f64 = 2.0 * f64::EPSILON;

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
    base: Option<Base>,
}

/// Points in order of what is left over a slope, from which others are soon reached.
#[derive(Clone, Debug)]
struct Base {
    m: f64,
    order: Vec<u32>,
    /// What is lost under it.
    lost: u64,
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
            base: None,
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
        let Some(base) = &self.base else {
            // In one time the values rise, so that none of its pairs is counted.
            return self.counted(&mut self.over(m, 0..self.len() as u32));
        };
        let changed = self.counted(&mut self.over(m, base.order.iter().copied()));
        if m < base.m { base.lost.saturating_sub(changed) } else { base.lost + changed }
    }

    /// Puts the points in the order they have over the slope `m`: slopes near it are then counted
    /// and listed in a time nearly proportional to the number of points.
    pub fn rest_on(&mut self, m: f64) {
        let mut all = self.over(m, 0..self.len() as u32);
        let lost = self.counted(&mut all);
        let order = all.iter().map(|one| one.index).collect();
        self.base = Some(Base { m, order, lost });
    }

    /// Sorts the points; what S loses by it.
    fn counted(&self, all: &mut [Place]) -> u64 {
        let mut lost = Lost { known: &self.known, lost: 0, above: 0, below: 0 };
        merge_sort(all, &mut lost);
        lost.lost
    }

    /// Lists slopes from `low` to under `high`, at most `most` of them: the pairs that change places
    /// between the two.
    pub fn list(&self, low: f64, high: f64, most: usize) -> Vec<Critical> {
        let mut all = match &self.base {
            Some(base) => self.over(low, base.order.iter().copied()),
            None => self.over(low, 0..self.len() as u32),
        };
        merge_sort(&mut all, &mut Silent);
        let order: Vec<u32> = all.iter().map(|one| one.index).collect();
        let mut all = self.over(high, order.into_iter());
        let mut listed = Listed { timed: self, most, found: Vec::new() };
        merge_sort(&mut all, &mut listed);
        listed.found
    }

    /// Differences between slopes that the values cannot tell, near slopes of this size.
    pub fn resolution(&self, slope: f64) -> f64 {
        let span = self.t.last().map_or(0.0, |last| last - self.t[0]);
        let size = self.y.iter().fold(0.0, |most: f64, y| most.max(y.abs()));
        if span > 0.0 { ROUNDING * (size / span + slope.abs()) } else { 0.0 }
    }

    /// Values over the line of slope `m` through the first time, in the order asked for.
    fn over(&self, m: f64, order: impl Iterator<Item = u32>) -> Vec<Place> {
        let one = |index: u32| {
            let (t, y) = (self.t[index as usize], self.y[index as usize]);
            Place { over: y - m * (t - self.t[0]), index }
        };
        order.map(one).collect()
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

/// Counts what S loses.
struct Lost<'a> {
    known: &'a [Known],
    lost: u64,
    /// Of the earlier ones not yet placed, those known on each side.
    above: u64,
    below: u64,
}

impl Passing for Lost<'_> {
    fn begin(&mut self, earlier: &[Place]) {
        (self.above, self.below) = (0, 0);
        for one in earlier {
            let known = self.known[one.index as usize];
            self.above += u64::from(known.above);
            self.below += u64::from(known.below);
        }
    }

    fn placed(&mut self, earlier: &Place) {
        let known = self.known[earlier.index as usize];
        self.above -= u64::from(known.above);
        self.below -= u64::from(known.below);
    }

    fn passes(&mut self, _: &[Place], later: &Place) {
        let known = self.known[later.index as usize];
        self.lost += self.above * u64::from(known.below) + self.below * u64::from(known.above);
    }

    fn passes_one(&mut self, earlier: &Place, later: &Place) {
        self.lost += self.known[earlier.index as usize].fall(self.known[later.index as usize]);
    }
}

/// Lists the slopes of pairs that change places.
struct Listed<'a> {
    timed: &'a Timed,
    most: usize,
    found: Vec<Critical>,
}

impl Passing for Listed<'_> {
    fn passes_one(&mut self, earlier: &Place, later: &Place) {
        if earlier.index < later.index && self.found.len() < self.most {
            self.found.extend(self.timed.between(earlier.index as usize, later.index as usize));
        }
    }

    fn passes(&mut self, earlier: &[Place], later: &Place) {
        for one in earlier {
            if self.found.len() == self.most {
                break;
            }
            self.passes_one(one, later);
        }
    }
}

/// Only sorts.
struct Silent;

impl Passing for Silent {
    fn passes_one(&mut self, _: &Place, _: &Place) {}
    fn passes(&mut self, _: &[Place], _: &Place) {}
}
