//! The stretches between neighbouring critical slopes, on which Kendall's S does not change.

use super::slope_counting::Critical;

/// Critical slopes in rising order.
#[derive(Clone, Debug, Default)]
pub struct Staircase {
    /// The slopes.
    pub slopes: Vec<Critical>,
    /// What S has lost up to and with each.
    pub upto: Vec<u64>,
}

/// A stretch without a critical slope in it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Gap {
    /// Its lower end; None below all slopes.
    pub low: Option<f64>,
    /// Its upper end; None above all slopes.
    pub high: Option<f64>,
    /// What S has lost below it.
    pub lost: u64,
    /// What S has lost with its upper end.
    pub upto: u64,
}

impl Gap {
    /// A slope inside the stretch.
    pub fn middle(&self) -> f64 {
        // A step beyond an outermost slope, large beside its rounding.
        let beyond = |slope: f64| 1.0 + slope.abs();
        match (self.low, self.high) {
            (Some(low), Some(high)) => low + 0.5 * (high - low),
            (Some(low), None) => low + beyond(low),
            (None, Some(high)) => high - beyond(high),
            (None, None) => 0.0,
        }
    }
}

impl Staircase {
    /// Sorts the slopes, before which S has lost `before`.
    pub fn new(before: u64, mut slopes: Vec<Critical>) -> Staircase {
        slopes.sort_unstable_by(|one, other| {
            one.slope.total_cmp(&other.slope).then(one.fall.cmp(&other.fall))
        });
        let mut staircase = Staircase { slopes, upto: Vec::new() };
        staircase.sum(before);
        staircase
    }

    /// The staircase of the values upside down.
    pub fn turned(&self) -> Staircase {
        let turned = |one: &Critical| Critical { slope: -one.slope, fall: one.fall };
        let slopes = self.slopes.iter().rev().map(turned).collect();
        let mut staircase = Staircase { slopes, upto: Vec::new() };
        staircase.sum(0);
        staircase
    }

    fn sum(&mut self, mut lost: u64) {
        let upto = self.slopes.iter().map(|one| {
            lost += one.fall;
            lost
        });
        self.upto = upto.collect();
    }

    /// The stretch below the slope at which the `place`-th part of S is lost.
    pub fn gap_below(&self, place: u64) -> Gap {
        let at = self.upto.partition_point(|&upto| upto < place);
        let equal = self.slopes.get(at).map(|one| one.slope);
        let first = equal.map_or(at, |own| self.slopes.partition_point(|one| one.slope < own));
        self.gap_before(first)
    }

    /// The stretch above the slope at which the `place`-th part of S is lost.
    pub fn gap_above(&self, place: u64) -> Gap {
        let at = self.upto.partition_point(|&upto| upto < place);
        let equal = self.slopes.get(at).map(|one| one.slope);
        let next = equal.map_or(at, |own| self.slopes.partition_point(|one| one.slope <= own));
        self.gap_before(next)
    }

    /// The stretch before the slope with this index, the first of its size.
    fn gap_before(&self, index: usize) -> Gap {
        let before = index.checked_sub(1);
        let high = self.slopes.get(index).map(|one| one.slope);
        let last = high.map_or(index, |own| self.slopes.partition_point(|one| one.slope <= own));
        Gap {
            low: before.map(|before| self.slopes[before].slope),
            high,
            lost: before.map_or(0, |before| self.upto[before]),
            upto: last.checked_sub(1).map_or(0, |last| self.upto[last]),
        }
    }
}
