//! Where Kendall's S of what is left over a slope passes a given height, slope by slope.
//!
//! S of the residuals yᵢ − m·tᵢ falls in steps as m rises: at the slope between two measured
//! points by 2, at one between a measured point and a bound by 1. Theil and Sen's slope, its form
//! with non-detects, its form within seasons and the intervals of all three are places on this
//! staircase.

use super::interval::Interval;
use super::points::{Point, Points};
use super::slope_counting::{Critical, Timed};

/// Up to this many pairs (a count) every slope is computed and sorted; above, slopes are counted
/// and the places closed in on. Source: measured; both ways take about 15 ms there.
pub const PAIRS_UP_TO: usize = 250_000;

/// Pairs drawn to guess where a place is (a count). Source: measured; leaves 1.6 % of the slopes,
/// four standard errors either way.
const DRAWN: usize = 65_536;

/// Width of the guessed range in standard errors of the drawn rank (a pure number). Source: four
/// are missed once in 16,000.
const GUESS_WIDTH: f64 = 4.0;

/// Counts that close in on a place, at most (a count). Source: two to six arrive; every third is a
/// halving, and 50 halvings exhaust a slope's digits.
const MOST_COUNTS: usize = 150;

/// Slopes are listed at the latest when so much of S is left (a count). Source: a list this short
/// costs less than one more count.
const FEWEST: u64 = 1_000;

/// The staircase of one series, or of several groups of points taken together.
#[derive(Clone, Debug)]
pub struct CriticalSlopes {
    groups: Vec<Timed>,
    rises: u64,
    falls: u64,
    /// Sorted slopes of random pairs; empty where every slope is in the window.
    drawn: Vec<f64>,
    window: Window,
}

/// Neighbouring slopes, sorted, with what is lost up to each.
#[derive(Clone, Debug, Default)]
struct Window {
    before: u64,
    slopes: Vec<Critical>,
    /// Lost up to and with each slope.
    upto: Vec<u64>,
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
        let pairs: usize = groups.iter().map(|group| group.len() * group.len().saturating_sub(1) / 2).sum();
        let mut all = CriticalSlopes { groups, rises, falls, drawn: Vec::new(), window: Window::default() };
        if pairs <= pairs_up_to {
            all.window = Window::new(0, all.every_slope());
        } else if rises + falls > 0 {
            all.drawn = all.draw();
        }
        all
    }

    /// S below all slopes.
    pub fn rises(&self) -> u64 {
        self.rises
    }

    /// Minus S above all slopes.
    pub fn falls(&self) -> u64 {
        self.falls
    }

    /// S between the slopes next to `m`: what is lost under `m` taken from its highest.
    pub fn score(&self, m: f64) -> i64 {
        self.rises as i64 - self.lost_under(m) as i64
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
    /// For many pairs: guessed from slopes of pairs drawn at random (always the same), closed in on
    /// by counting, and listed once few are left.
    ///
    /// # Limits
    /// Where slopes are counted, those that differ by rounding only may change places; of very many
    /// such one is taken for all.
    ///
    /// # None
    /// A place of 0 or over what is lost in all.
    ///
    /// # Reference
    /// Dillencourt, Mount & Netanyahu (1992), Int. J. Comput. Geom. Appl. 2:1–27, for guessing by a
    /// random sample [from memory]. Held against all pairs in tests.
    pub fn at(&mut self, place: u64) -> Option<Step> {
        if place == 0 || place > self.rises + self.falls {
            return None;
        }
        if let Some(step) = self.window.at(place) {
            return Some(step);
        }
        let Range { low, high, before, .. } = self.closed_in(place);
        let most = self.few() as usize + 1;
        let mut slopes = Vec::new();
        for group in &self.groups {
            slopes.extend(group.list(low, high, most - slopes.len()));
        }
        let told = slopes.len() < most;
        let found = Window::new(before, slopes);
        let step = if told { found.at(place) } else { None };
        // Where the place is not found, what is left differs by rounding only: any will do.
        let any = found.slopes.get(found.slopes.len() / 2).copied();
        if told {
            self.window = found;
        }
        step.or_else(|| {
            let slope = any.map_or(low + 0.5 * (high - low), |one| one.slope);
            Some(Step { slope, fall: 1, before: place - 1 })
        })
    }

    /// A range with the place in it and few slopes.
    fn closed_in(&self, place: u64) -> Range {
        let mut range = self.widest();
        for guess in self.guesses(place) {
            self.tighten(&mut range, guess, place);
        }
        let few = self.few();
        for count in 0..MOST_COUNTS {
            let inside = range.upto - range.before;
            let width = range.high - range.low;
            if inside <= few || width <= self.resolution(range.low) {
                break;
            }
            // Aim a little to that side of the place on which more is left.
            let aim = if place - range.before > range.upto - place {
                place.saturating_sub(few / 4)
            } else {
                place + few / 4
            };
            let share = (aim as f64 - range.before as f64) / inside as f64;
            let inner = share > 0.0 && share < 1.0 && count % 3 < 2;
            let m = range.low + if inner { share } else { 0.5 } * width;
            self.tighten(&mut range, m, place);
        }
        range
    }

    /// Moves one end of a range to `m`.
    fn tighten(&self, range: &mut Range, m: f64, place: u64) {
        if range.low < m && m < range.high {
            let lost = self.lost_under(m);
            if lost < place {
                (range.low, range.before) = (m, lost);
            } else {
                (range.high, range.upto) = (m, lost);
            }
        }
    }

    /// Slopes of drawn pairs that the place is most likely between; where many are the same, the
    /// two sides of that one.
    fn guesses(&self, place: u64) -> Vec<f64> {
        let n = self.drawn.len() as f64;
        let share = place as f64 / (self.rises + self.falls) as f64;
        let wide = 1.0 + GUESS_WIDTH * (n * share * (1.0 - share)).sqrt();
        let at = |rank: f64| {
            let rank = (rank >= 0.0).then_some(rank as usize);
            rank.and_then(|rank| self.drawn.get(rank)).copied()
        };
        let mut guesses: Vec<f64> =
            [share * n - wide, share * n + wide].into_iter().filter_map(at).collect();
        let neighbours = [share * n - 1.0, share * n, share * n + 1.0].map(at);
        if let [Some(one), Some(same), Some(other)] = neighbours
            && one == other
        {
            guesses.extend([same - self.resolution(same), same + self.resolution(same)]);
        }
        guesses
    }

    /// Differences between slopes that the values cannot tell.
    fn resolution(&self, slope: f64) -> f64 {
        self.groups.iter().map(|group| group.resolution(slope)).fold(0.0, f64::max)
    }

    /// A range that holds every slope.
    fn widest(&self) -> Range {
        let (mut low, mut high) = (f64::INFINITY, f64::NEG_INFINITY);
        for [lowest, highest] in self.groups.iter().map(Timed::steepest) {
            low = low.min(lowest);
            high = high.max(highest);
        }
        // An outermost slope may not stand on the end itself, where rounding decides.
        let width = (high - low).clamp(f64::MIN_POSITIVE, f64::MAX);
        let (low, high) = ((low - width).max(f64::MIN), (high + width).min(f64::MAX));
        Range { low, high, before: 0, upto: self.rises + self.falls }
    }

    /// So much of S may be left for slopes to be listed: about as many pairs as there are points,
    /// whether or not their order can be told.
    fn few(&self) -> u64 {
        let points: u64 = self.groups.iter().map(|group| group.len() as u64).sum();
        (4 * (self.rises + self.falls) / points.max(1)).max(FEWEST)
    }

    fn lost_under(&self, m: f64) -> u64 {
        self.groups.iter().map(|group| group.lost_under(m)).sum()
    }

    fn every_slope(&self) -> Vec<Critical> {
        let mut slopes = Vec::new();
        for group in &self.groups {
            for j in 1..group.len() {
                slopes.extend((0..j).filter_map(|i| group.between(i, j)));
            }
        }
        slopes
    }

    /// Slopes of pairs drawn as often as S loses at them.
    fn draw(&self) -> Vec<f64> {
        let sides: Vec<[Vec<u32>; 2]> = self.groups.iter().map(Timed::sides).collect();
        let mut all = 0;
        let product = |[above, below]: &[Vec<u32>; 2]| {
            all += (above.len() * below.len()) as u64;
            all
        };
        let upto: Vec<u64> = sides.iter().map(product).collect();
        let mut bits = Bits(0);
        let mut slopes = Vec::with_capacity(DRAWN);
        for _ in 0..DRAWN {
            let place = bits.under(all);
            let at = upto.partition_point(|&upto| upto <= place);
            let [above, below] = &sides[at];
            let i = above[bits.under(above.len() as u64) as usize];
            let j = below[bits.under(below.len() as u64) as usize];
            slopes.extend(self.groups[at].between(i as usize, j as usize).map(|one| one.slope));
        }
        slopes.sort_unstable_by(f64::total_cmp);
        slopes
    }
}

/// A range of slopes: what is lost under each end.
struct Range {
    low: f64,
    high: f64,
    before: u64,
    upto: u64,
}

impl Window {
    fn new(before: u64, mut slopes: Vec<Critical>) -> Window {
        slopes.sort_unstable_by(|one, other| {
            one.slope.total_cmp(&other.slope).then(one.fall.cmp(&other.fall))
        });
        let mut lost = before;
        let upto = slopes.iter().map(|one| {
            lost += one.fall;
            lost
        });
        let upto = upto.collect();
        Window { before, slopes, upto }
    }

    fn at(&self, place: u64) -> Option<Step> {
        if place <= self.before {
            return None;
        }
        let index = self.upto.partition_point(|&upto| upto < place);
        let Critical { slope, fall } = *self.slopes.get(index)?;
        Some(Step { slope, fall, before: self.upto[index] - fall })
    }
}

/// A fixed stream of random numbers: SplitMix64, Steele, Lea & Flood (2014) [from memory].
struct Bits(u64);

impl Bits {
    /// A number under `n`, each nearly equally often.
    fn under(&mut self, n: u64) -> u64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mut x = self.0;
        x = (x ^ (x >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        x = (x ^ (x >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        x ^= x >> 31;
        ((u128::from(x) * u128::from(n)) >> 64) as u64
    }
}
