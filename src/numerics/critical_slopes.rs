//! Where Kendall's S of what is left over a slope passes a given height, slope by slope.
//!
//! S of the residuals yᵢ − m·tᵢ falls in steps as m rises: at the slope between two measured
//! points by 2, at one between a measured point and a bound by 1. Theil and Sen's slope, its form
//! with non-detects, its form within seasons and the intervals of all three are places on this
//! staircase.

use super::interval::Interval;
use super::points::{Point, Points};
use super::slope_counting::{Critical, Timed};
use super::slope_gaps::Staircase;
use super::slope_search::SlopeSearch;

/// Up to this many pairs (a count) every slope is computed and sorted; above, slopes are counted
/// and the places closed in on. Source: measured; both ways take about 0.1 ms there.
pub const PAIRS_UP_TO: usize = 10_000;

/// The staircase of one series, or of several groups of points taken together.
#[derive(Clone, Debug)]
pub struct CriticalSlopes {
    search: SlopeSearch,
    rises: u64,
    falls: u64,
    /// Whether the window holds every slope.
    few: bool,
    /// The slopes looked at last; every slope where there are few.
    window: Window,
}

/// Neighbouring slopes, sorted, with what is lost up to each.
#[derive(Clone, Debug, Default)]
struct Window {
    before: u64,
    stairs: Staircase,
}

/// One step of the staircase.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Step {
    /// The slope.
    pub slope: f64,
    /// What S loses there.
    pub fall: u64,
    /// What it has lost before.
    pub before: u64,
}

/// The ends of an interval, each of which may be open.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Ends {
    /// Lower end; None where no slope is too low.
    pub low: Option<f64>,
    /// Upper end; None where no slope is too high.
    pub high: Option<f64>,
}

impl CriticalSlopes {
    /// The staircase of a series.
    pub fn new(points: Points<'_>) -> CriticalSlopes {
        Self::of(vec![Timed::new(points.iter())], PAIRS_UP_TO)
    }

    /// The staircase of pairs within groups: points with one label make a group.
    ///
    /// # None
    /// Labels and points that are not equally many.
    pub fn within(points: Points<'_>, labels: &[usize]) -> Option<CriticalSlopes> {
        if labels.len() != points.len() {
            return None;
        }
        let mut labelled: Vec<(usize, Point)> = labels.iter().copied().zip(points.iter()).collect();
        labelled.sort_by_key(|one| one.0);
        let groups = labelled.chunk_by(|one, other| one.0 == other.0);
        let groups = groups.map(|group| Timed::new(group.iter().map(|one| one.1)));
        Some(Self::of(groups.collect(), PAIRS_UP_TO))
    }

    /// The same with a given number of pairs up to which every slope is computed.
    pub fn of(groups: Vec<Timed>, pairs_up_to: usize) -> CriticalSlopes {
        let (mut rises, mut falls) = (0, 0);
        for reach in groups.iter().map(Timed::reach) {
            rises += reach.rises;
            falls += reach.falls;
        }
        let pairs = |group: &Timed| group.len() * group.len().saturating_sub(1) / 2;
        let few = groups.iter().map(pairs).sum::<usize>() <= pairs_up_to;
        let search = SlopeSearch::new(groups, rises + falls, !few);
        let window = if few { Window::new(0, search.every_slope()) } else { Window::default() };
        CriticalSlopes { search, rises, falls, few, window }
    }

    /// S below all slopes.
    pub fn rises(&self) -> u64 {
        self.rises
    }

    /// Minus S above all slopes.
    pub fn falls(&self) -> u64 {
        self.falls
    }

    /// Every slope, where there are few.
    pub fn staircase(&self) -> Option<&Staircase> {
        self.few.then_some(&self.window.stairs)
    }

    /// The slopes at which S is zero, or the one where it passes zero.
    ///
    /// # Formula
    /// ```text
    /// from the slope that loses the rises-th part of S to the one that loses the next
    /// ```
    ///
    /// # None
    /// S is nowhere over zero, or nowhere under it.
    pub fn zero(&mut self) -> Option<Interval> {
        if self.rises == 0 || self.falls == 0 {
            return None;
        }
        let low = self.at(self.rises)?.slope;
        let high = self.at(self.rises + 1)?.slope;
        Some(Interval { low, high })
    }

    /// The slopes at which S passes `height` and minus `height`, read between the steps.
    ///
    /// # Formula
    /// ```text
    /// W = Σ fall of slopes up to and with s, as a straight function between neighbouring steps
    /// low:   W = rises − height       high:  the same from above, W′ = falls − height
    /// ```
    /// With every value measured W/2 is the rank of a slope, and the ends are read at the ranks
    /// (N − height)/2 and (N + height)/2 + 1.
    ///
    /// # Limits
    /// An end is open where the height is not passed before the last step.
    ///
    /// # Reference
    /// Gilbert (1987), p. 218 [second hand], carried over to steps of unequal height.
    pub fn ends(&mut self, height: f64) -> Ends {
        Ends { low: self.low_end(height), high: self.high_end(height) }
    }

    /// The lower of the two [`CriticalSlopes::ends`].
    pub fn low_end(&mut self, height: f64) -> Option<f64> {
        let wanted = self.rises as f64 - height;
        if wanted.is_nan() || wanted < 1.0 {
            return None;
        }
        let step = self.at(wanted as u64 + 1)?;
        let earlier = self.at(step.before)?;
        let share = (wanted - step.before as f64) / step.fall as f64;
        Some(earlier.slope + share * (step.slope - earlier.slope))
    }

    /// The upper of the two [`CriticalSlopes::ends`].
    pub fn high_end(&mut self, height: f64) -> Option<f64> {
        let wanted = self.falls as f64 - height;
        if wanted.is_nan() || wanted < 1.0 {
            return None;
        }
        let all = self.rises + self.falls;
        let step = self.at(all - wanted as u64)?;
        let after = all - step.before - step.fall;
        let later = if after > 0 { self.at(all - after + 1)? } else { return None };
        let share = (wanted - after as f64) / step.fall as f64;
        Some(later.slope + share * (step.slope - later.slope))
    }

    /// The step at which the `place`-th part of S is lost, counted from 1.
    ///
    /// # Formula
    /// ```text
    /// the least slope s with  Σ fall of slopes up to and with s ≥ place
    /// ```
    /// For many pairs it is looked for as [`SlopeSearch::round`] tells.
    ///
    /// # Limits
    /// Where slopes are counted, those that differ by rounding only may change places; of very many
    /// such one is taken for all.
    ///
    /// # None
    /// A place of 0 or over what is lost in all.
    pub fn at(&mut self, place: u64) -> Option<Step> {
        if place == 0 || place > self.rises + self.falls {
            return None;
        }
        if let Some(step) = self.window.at(place) {
            return Some(step);
        }
        let found = self.search.round(place);
        let window = Window::new(found.before, found.slopes);
        let step = if found.complete { window.at(place) } else { None };
        // Where the place is not among them, what there is differs by rounding only: any will do.
        let slopes = &window.stairs.slopes;
        let any = slopes.get(slopes.len() / 2).map_or(found.middle, |one| one.slope);
        if found.complete {
            self.window = window;
        }
        step.or(Some(Step { slope: any, fall: 1, before: place - 1 }))
    }
}

impl Window {
    fn new(before: u64, slopes: Vec<Critical>) -> Window {
        Window { before, stairs: Staircase::new(before, slopes) }
    }

    fn at(&self, place: u64) -> Option<Step> {
        if place <= self.before {
            return None;
        }
        let Staircase { slopes, upto } = &self.stairs;
        let index = upto.partition_point(|&upto| upto < place);
        let Critical { slope, fall } = *slopes.get(index)?;
        Some(Step { slope, fall, before: upto[index] - fall })
    }
}
