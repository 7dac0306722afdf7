//! How many more rounds of sampling would make a rate decisive, and how small a rate the present
//! record could have shown.

use super::first_order::FirstOrder;
use super::line::mean;
use super::noncentral::noncentral_upper;
use super::tails;
use super::theil_sen::median;

/// Rounds looked ahead, at most (a count). Source: ruled for this program; fifty years of quarters.
pub const MOST_ROUNDS: usize = 200;

/// Dates that a rate with an interval needs (a count). Source: two parameters and a scatter.
const DATES_NEEDED: usize = 3;

/// What is planned, and how sure one wants to be.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Plan {
    /// Time between two rounds to come.
    pub step: f64,
    /// Two-sided confidence of the interval that has to exclude zero (a probability).
    pub confidence: f64,
    /// Chance with which it is to do so (a probability).
    pub power: f64,
}

/// The dates of a record, as far as a rate's precision depends on them.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Dates {
    n: usize,
    mean: f64,
    sxx: f64,
    last: f64,
}

impl Dates {
    /// No dates yet: rounds are counted from nothing.
    pub const NONE: Dates = Dates { n: 0, mean: 0.0, sxx: 0.0, last: 0.0 };

    /// The dates of a record, in any order.
    pub fn of(t: &[f64]) -> Dates {
        if t.is_empty() {
            return Dates::NONE;
        }
        let middle = mean(t);
        let sxx = t.iter().map(|t| (t - middle) * (t - middle)).sum();
        let last = t.iter().copied().fold(f64::NEG_INFINITY, f64::max);
        Dates { n: t.len(), mean: middle, sxx, last }
    }

    /// With so many rounds more, evenly spaced after the last.
    ///
    /// # Formula
    /// ```text
    /// Sxx = Sxx₁ + step²·r(r² − 1)/12 + n·r/(n + r)·(t̄₂ − t̄₁)²
    /// ```
    /// where 1 are the dates there are, 2 the `r` rounds to come.
    pub fn with(&self, rounds: usize, step: f64) -> Dates {
        if rounds == 0 {
            return *self;
        }
        let (n, r) = (self.n as f64, rounds as f64);
        let mean = self.last + step * (r + 1.0) / 2.0;
        let apart = mean - self.mean;
        Dates {
            n: self.n + rounds,
            mean: self.mean + apart * r / (n + r),
            sxx: self.sxx
                + step * step * r * (r * r - 1.0) / 12.0
                + n * r / (n + r) * apart * apart,
            last: self.last + step * r,
        }
    }

    fn degrees(&self) -> Option<f64> {
        (self.n >= DATES_NEEDED && self.sxx > 0.0).then_some(self.n as f64 - 2.0)
    }

    /// The chance that the interval of a rate excludes zero, on its own side.
    ///
    /// # Formula
    /// ```text
    /// P(T > q)     T noncentral with n − 2 degrees and shift |k|·√Sxx/σ
    /// ```
    /// where `q` is the two-sided quantile of Student's t.
    ///
    /// # Units
    /// `rate` per unit of time, `sd` in ln(concentration).
    ///
    /// # Limits
    /// Independent errors, every value measured: correlation and non-detects lower the chance.
    ///
    /// # Reference
    /// Lenth (1989), Appl. Stat. 38:185–189 for the distribution [from memory]. Simulated in tests.
    pub fn power(&self, rate: f64, sd: f64, confidence: f64) -> f64 {
        self.degrees().map_or(0.0, |degrees| {
            let quantile = tails::student_within(confidence, degrees);
            noncentral_upper(quantile, degrees, rate.abs() * self.sxx.sqrt() / sd)
        })
    }

    /// The fewest rounds more, `least` or over, that give the planned chance at this rate.
    ///
    /// # Formula
    /// ```text
    /// least r:  power of n + r dates ≥ planned     found by halving, since power grows with r
    /// ```
    ///
    /// # Units
    /// As [`Dates::power`].
    ///
    /// # Limits
    /// As [`Dates::power`].
    ///
    /// # None
    /// More than [`MOST_ROUNDS`].
    ///
    /// # Reference
    /// From nothing: practice note G, 24 figures.
    pub fn rounds(&self, rate: f64, sd: f64, plan: &Plan, least: usize) -> Option<usize> {
        let enough =
            |r: usize| self.with(r, plan.step).power(rate, sd, plan.confidence) >= plan.power;
        if !enough(MOST_ROUNDS) {
            return None;
        }
        let (mut short, mut long) = (least, MOST_ROUNDS);
        while short < long {
            let middle = (short + long) / 2;
            if enough(middle) {
                long = middle;
            } else {
                short = middle + 1;
            }
        }
        Some(long)
    }

    /// The smallest rate that a record with these dates and this scatter could have shown: one
    /// whose interval would just have excluded zero.
    ///
    /// # Formula
    /// ```text
    /// k = q·σ/√Sxx
    /// ```
    /// where `q` is the two-sided quantile of Student's t with n − 2 degrees of freedom. A true
    /// rate of that size is shown in about half of such records.
    ///
    /// # Units
    /// Per unit of time; `sd` in ln(concentration).
    ///
    /// # Limits
    /// As [`Dates::power`].
    ///
    /// # None
    /// Fewer than three dates, or all on one.
    ///
    /// # Reference
    /// Methods note 1.4, table.
    pub fn smallest_rate_shown(&self, sd: f64, confidence: f64) -> Option<f64> {
        let degrees = self.degrees()?;
        Some(tails::student_within(confidence, degrees) * sd / self.sxx.sqrt())
    }
}

/// The median time between neighbouring dates.
///
/// # None
/// Fewer than two distinct dates.
pub fn median_spacing(t: &[f64]) -> Option<f64> {
    let mut sorted = t.to_vec();
    sorted.sort_by(f64::total_cmp);
    sorted.dedup();
    let gaps: Vec<f64> = sorted.windows(2).map(|pair| pair[1] - pair[0]).collect();
    median(&gaps)
}

/// The fewest rounds more that would make the rate of a fit decisive.
///
/// # Formula
/// ```text
/// 0 where the rate's interval excludes zero, else the least r ≥ 1 of [`Dates::rounds`] at |k| and
/// the residual standard deviation of the fit
/// ```
///
/// # Units
/// A count; `plan` in the unit of the times.
///
/// # Limits
/// Takes the fitted rate and scatter for the true ones. As [`Dates::power`].
///
/// # None
/// More than [`MOST_ROUNDS`].
///
/// # Reference
/// As [`Dates::rounds`]; six settings simulated in tests.
pub fn rounds_to_decisive(t: &[f64], fit: &FirstOrder, plan: &Plan) -> Option<usize> {
    if !fit.slope_interval(plan.confidence).holds_zero() {
        return Some(0);
    }
    Dates::of(t).rounds(fit.slope, fit.sd, plan, 1)
}

/// The fewest rounds more after which the level of a fit would be told from `y0`, if the line went
/// on as it goes.
///
/// # Formula
/// ```text
/// 0 where the level's interval at the last date excludes y0, else the least r ≥ 1 with
/// P(T > q) ≥ planned     T noncentral, shift |ŷ(t*) − y0|/(σ·√(1/n′ + (t*−t̄′)²/Sxx′))
/// ```
/// where t* is the last of the rounds to come, n′, t̄′ and Sxx′ are those of all dates by then, `q`
/// is the two-sided quantile of Student's t with n′ − 2 degrees of freedom.
///
/// # Units
/// A count; `y0` in ln(concentration), `plan` in the unit of the times.
///
/// # Limits
/// As [`rounds_to_decisive`]. The chance need not grow with every round: a line that comes near the
/// level is harder to tell from it.
///
/// # None
/// More than [`MOST_ROUNDS`].
///
/// # Reference
/// As [`Dates::power`], for the level in place of the rate.
pub fn rounds_to_level(t: &[f64], fit: &FirstOrder, y0: f64, plan: &Plan) -> Option<usize> {
    let dates = Dates::of(t);
    let now = fit.level_interval(dates.last, plan.confidence);
    if y0 < now.low || y0 > now.high {
        return Some(0);
    }
    (1..=MOST_ROUNDS).find(|&rounds| {
        let then = dates.with(rounds, plan.step);
        let Some(degrees) = then.degrees() else { return false };
        let off = then.last - then.mean;
        let error = fit.sd * (1.0 / then.n as f64 + off * off / then.sxx).sqrt();
        let quantile = tails::student_within(plan.confidence, degrees);
        let shift = (fit.fitted(then.last) - y0).abs() / error;
        noncentral_upper(quantile, degrees, shift) >= plan.power
    })
}
