//! Finding, among the slopes of very many pairs, the few round a given place.

use super::slope_counting::{Critical, Timed};

/// Pairs drawn to guess where a place is, at most (a count). Source: measured; leaves 1.6 % of the
/// slopes, four standard errors either way.
const MOST_DRAWN: u64 = 65_536;

/// One in so many pairs is drawn (a count). Source: measured; of fewer pairs a longer list is
/// cheaper than a better guess.
const DRAWN_OF: u64 = 8;

/// Width of the guessed range in standard errors of the drawn rank (a pure number). Source: four
/// are missed once in 16,000.
const GUESS_WIDTH: f64 = 4.0;

/// Counts that close in on a place, at most (a count). Source: two to six arrive; every third is a
/// halving, and 50 halvings exhaust a slope's digits.
const MOST_COUNTS: usize = 150;

/// A range of so many resolutions (a pure number) is not narrowed further. Source: pairs far apart in
/// time still change places across it.
const UNTOLD: f64 = 4.0;

/// Slopes are listed at the latest when so much of S is left (a count). Source: a list this short
/// costs less than one more count.
const FEWEST: u64 = 1_000;

/// Points in groups, only pairs within a group being looked at.
#[derive(Clone, Debug)]
pub struct SlopeSearch {
    groups: Vec<Timed>,
    /// What S loses over all slopes.
    all: u64,
    /// Sorted slopes of random pairs.
    drawn: Vec<f64>,
    /// What is lost under each slope that was asked about.
    known: Vec<(f64, u64)>,
}

/// A range of slopes: what is lost under each end.
#[derive(Clone, Copy)]
struct SlopeRange {
    low: f64,
    high: f64,
    before: u64,
    upto: u64,
}

/// The slopes round a place.
#[derive(Clone, Debug)]
pub struct Found {
    /// What is lost before them.
    pub before: u64,
    /// The slopes, in no order.
    pub slopes: Vec<Critical>,
    /// Whether these are all of the range; if not, all there are differ by rounding only.
    pub complete: bool,
    /// The middle of the range.
    pub middle: f64,
}

impl SlopeSearch {
    /// Draws pairs, always the same ones, and sorts the points over the middle one of their slopes,
    /// unless `draws` says that no place will be looked for.
    pub fn new(mut groups: Vec<Timed>, all: u64, draws: bool) -> SlopeSearch {
        let drawn = if draws && all > 0 { drawn(&groups) } else { Vec::new() };
        if let Some(&middle) = drawn.get(drawn.len() / 2) {
            groups.iter_mut().for_each(|group| group.rest_on(middle));
        }
        SlopeSearch { groups, all, drawn, known: Vec::new() }
    }

    /// Every slope, in no order.
    pub fn every_slope(&self) -> Vec<Critical> {
        let mut slopes = Vec::new();
        for group in &self.groups {
            for j in 1..group.len() {
                slopes.extend((0..j).filter_map(|i| group.between(i, j)));
            }
        }
        slopes
    }

    /// What S loses at slopes under `m`.
    pub fn lost_under(&self, m: f64) -> u64 {
        self.groups.iter().map(|group| group.lost_under(m)).sum()
    }

    /// The slopes round the one at which the `place`-th part of S is lost.
    ///
    /// # Formula
    /// ```text
    /// guess:   slopes of drawn pairs, at the place's share of them ± 4 standard errors of that rank
    /// close in: read the place between the ends of the range, count what is lost under that slope
    /// list:    the pairs that change places between the ends, once few are left
    /// ```
    ///
    /// # Units
    /// `place` in parts of S, counted from 1.
    ///
    /// # Limits
    /// Order n·log n for each count; a range as narrow as the rounding of the values ends the
    /// search as well.
    ///
    /// # Reference
    /// Dillencourt, Mount & Netanyahu (1992), Int. J. Comput. Geom. Appl. 2:1–27, for guessing by a
    /// random sample [from memory]. Held against all pairs in tests.
    pub fn round(&mut self, place: u64) -> Found {
        let SlopeRange { low, high, before, .. } = self.closed_in(place);
        let most = self.few() as usize + 1;
        let mut slopes = Vec::new();
        for group in &self.groups {
            slopes.extend(group.list(low, high, most - slopes.len()));
        }
        let complete = slopes.len() < most;
        Found { before, slopes, complete, middle: low + 0.5 * (high - low) }
    }

    /// A range with the place in it and few slopes.
    fn closed_in(&mut self, place: u64) -> SlopeRange {
        let mut range = self.widest();
        for &(m, lost) in &self.known {
            range.tighten(m, lost, place);
        }
        for guess in self.guesses(place) {
            self.tighten(&mut range, guess, place);
        }
        let few = self.few();
        for count in 0..MOST_COUNTS {
            let inside = range.upto - range.before;
            let width = range.high - range.low;
            if inside <= few || width <= UNTOLD * self.resolution(range.low) {
                break;
            }
            // Aim a little to that side of the place on which more is left, so that the next aim is at
            // the other side.
            let aim = if place - range.before > range.upto - place {
                place.saturating_sub(few / 8)
            } else {
                place + few / 8
            };
            let share = (aim as f64 - range.before as f64) / inside as f64;
            let inner = share > 0.0 && share < 1.0 && count % 3 < 2;
            let m = range.low + if inner { share } else { 0.5 } * width;
            self.tighten(&mut range, m, place);
        }
        range
    }

    /// Counts what is lost under `m` and moves one end of a range there.
    fn tighten(&mut self, range: &mut SlopeRange, m: f64, place: u64) {
        if range.low < m && m < range.high {
            let lost = self.lost_under(m);
            self.known.push((m, lost));
            range.tighten(m, lost, place);
        }
    }

    /// Slopes of drawn pairs that the place is most likely between; where many are the same, the
    /// two sides of that one.
    fn guesses(&self, place: u64) -> Vec<f64> {
        let n = self.drawn.len() as f64;
        let share = place as f64 / self.all as f64;
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
    fn widest(&self) -> SlopeRange {
        let (mut low, mut high) = (f64::INFINITY, f64::NEG_INFINITY);
        for [lowest, highest] in self.groups.iter().map(Timed::steepest) {
            low = low.min(lowest);
            high = high.max(highest);
        }
        // An outermost slope may not stand on the end itself, where rounding decides.
        let untold = UNTOLD * self.resolution(low.abs().max(high.abs()));
        let width = (high - low).max(untold).clamp(f64::MIN_POSITIVE, f64::MAX);
        let (low, high) = ((low - width).max(f64::MIN), (high + width).min(f64::MAX));
        SlopeRange { low, high, before: 0, upto: self.all }
    }

    /// So much of S may be left for slopes to be listed: that of as many pairs as there are points,
    /// whether or not their order can be told.
    fn few(&self) -> u64 {
        let points: u64 = self.groups.iter().map(|group| group.len() as u64).sum();
        (2 * self.all / points.max(1)).max(FEWEST)
    }
}

impl SlopeRange {
    fn tighten(&mut self, m: f64, lost: u64, place: u64) {
        if self.low < m && m < self.high {
            if lost < place {
                (self.low, self.before) = (m, lost);
            } else {
                (self.high, self.upto) = (m, lost);
            }
        }
    }
}

/// Slopes of pairs drawn as often as S loses at them.
fn drawn(groups: &[Timed]) -> Vec<f64> {
    let sides: Vec<[Vec<u32>; 2]> = groups.iter().map(Timed::sides).collect();
    let mut all = 0;
    let product = |[above, below]: &[Vec<u32>; 2]| {
        all += (above.len() * below.len()) as u64;
        all
    };
    let upto: Vec<u64> = sides.iter().map(product).collect();
    let mut bits = Bits(0);
    let wanted = MOST_DRAWN.min(all / DRAWN_OF);
    let mut slopes = Vec::with_capacity(wanted as usize);
    for _ in 0..wanted {
        let place = bits.under(all);
        let at = upto.partition_point(|&upto| upto <= place);
        let [above, below] = &sides[at];
        let i = above[bits.under(above.len() as u64) as usize];
        let j = below[bits.under(below.len() as u64) as usize];
        slopes.extend(groups[at].between(i as usize, j as usize).map(|one| one.slope));
    }
    slopes.sort_unstable_by(f64::total_cmp);
    slopes
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
