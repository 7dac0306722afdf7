//! Whether neighbouring residuals of a line resemble each other, at any spacing of the dates.
//!
//! The resemblance is that of a continuous first-order autoregression: it fades as φ to the power
//! of the time between two values.

use super::interval::Interval;
use super::line::{Line, line};
use super::normal::HALF_LN_TWO_PI;
use super::tails;

/// Fewest points (a count) with which the fade can be told from the scatter. Source: two unknowns
/// of the line, a scatter and the fade itself.
const FEWEST: usize = 4;

/// The search starts at a fade so slow that it takes this many spans of the record (a count).
/// Source: the likelihood falls without end from about one span on.
const SLOWEST: f64 = 100.0;

/// The search ends at a fade so fast that across the shortest step e to the minus this (a pure
/// number) is left. Source: a correlation of 0.001 moves no likelihood.
const FASTEST: f64 = 7.0;

/// Rates of fading looked at first: each is this factor from the next (a pure number), or more
/// where that would be over [`MOST_RATES`]. Source: the likelihood has no narrower hill than about
/// e in the rate, since every correlation passes from 0.9 to 0.1 over a factor of 20.
const FACTOR: f64 = 1.6;

/// Rates of fading looked at first, at most (a count).
const MOST_RATES: f64 = 100.0;

/// Steps that narrow in on the best rate, at most (a count). Source: 42 golden sections leave
/// 1e-9 of the bracket.
const NARROWINGS: usize = 42;

/// Golden section (a pure number): (3 − √5)/2. Source: arithmetic.
const GOLDEN: f64 = 0.381_966_011_250_105_2;

/// A line with residuals whose resemblance fades with time.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Car1 {
    /// The line by least squares, without any resemblance.
    pub independent: Line,
    /// Log-likelihood of that line.
    pub log_likelihood_independent: f64,
    /// Correlation of values one unit of time apart; 0 where no resemblance is found.
    pub phi: f64,
    /// Log-likelihood with it.
    pub log_likelihood: f64,
    /// Slope of the line fitted with it, by generalised least squares.
    pub slope: f64,
    /// Standard error of that slope, the scatter with n − 2.
    pub slope_error: f64,
    /// Twice the gain in log-likelihood.
    pub lr: f64,
    /// One-sided p of no resemblance.
    pub p: f64,
    /// Factor on the variance of the least-squares slope; 1 or more.
    pub inflation: f64,
}

/// Fits a line with a continuous first-order autoregression of its residuals.
///
/// # Formula
/// ```text
/// corr(eᵢ, eⱼ) = φ^|tᵢ − tⱼ|     0 ≤ φ < 1     r = φ^(tᵢ − tᵢ₋₁)
/// e₁ ~ N(0, σ²)     eᵢ | eᵢ₋₁ ~ N(r·eᵢ₋₁, σ²(1 − r²))     maximised over line, σ and φ
/// LR = 2(ℓ − ℓ at φ = 0)     p = ½·P(χ²₁ > LR), 1 where LR is 0
/// inflation = max(1, Σᵢⱼ dᵢ·dⱼ·φ^|tᵢ − tⱼ| / Σ dᵢ²)     d = t − t̄
/// ```
/// For each φ the line and σ have closed forms; φ is searched on a grid of fading rates −ln φ and
/// then by golden sections. p is halved since φ = 0 is an end of its range.
///
/// # Units
/// `t` in years, `y` in ln(concentration): φ is per year, the slope per year.
///
/// # Limits
/// Order n for each φ. Under about 15 points the test finds next to nothing.
///
/// # None
/// Fewer than four points, two equal times, slices of different length, or points on a line.
///
/// # Reference
/// Jones (1993), Longitudinal Data with Serial Correlation, ch. 3 [from memory]; methods note 5.4.
/// Worked example W03 (R `nlme::gls` with `corCAR1`).
pub fn car1(t: &[f64], y: &[f64]) -> Option<Car1> {
    let independent = line(t, y)?;
    if t.len() < FEWEST {
        return None;
    }
    let sample = Sample::new(t, y, &independent)?;
    let flat = sample.independent();
    if !flat.log_likelihood.is_finite() {
        return None;
    }
    let best = sample.best_rate();
    let with = sample.at(best);
    let lr = 2.0 * (with.log_likelihood - flat.log_likelihood);
    let found = lr > 0.0;
    let with = if found { with } else { flat };
    Some(Car1 {
        independent,
        log_likelihood_independent: flat.log_likelihood,
        phi: if found { (-best).exp() } else { 0.0 },
        log_likelihood: with.log_likelihood,
        slope: independent.slope + with.slope,
        slope_error: with.slope_error,
        lr: if found { lr } else { 0.0 },
        p: if found { 0.5 * tails::chi_squared_upper(lr, 1.0) } else { 1.0 },
        inflation: if found { sample.inflation(best).max(1.0) } else { 1.0 },
    })
}

impl Car1 {
    /// How many independent values tell as much of the slope: n over the inflation.
    pub fn effective(&self) -> f64 {
        self.independent.n as f64 / self.inflation
    }

    /// The interval of the least-squares slope that allows for the resemblance.
    ///
    /// # Formula
    /// ```text
    /// b ± t·SE·√inflation     t with max(n/inflation − 2, 1) degrees of freedom
    /// ```
    /// where `b`, SE are the slope by least squares and its standard error.
    ///
    /// # Units
    /// Per unit of time; `confidence` is a probability, two-sided.
    ///
    /// # Limits
    /// Never narrower than the plain interval, since the inflation is never under 1.
    ///
    /// # Reference
    /// Methods note 5.4.
    pub fn adjusted_interval(&self, confidence: f64) -> Interval {
        self.adjusted(self.independent.slope, self.independent.slope_error(), confidence)
    }

    /// The same for a slope and a standard error found elsewhere, as from a censored likelihood.
    pub fn adjusted(&self, slope: f64, error: f64, confidence: f64) -> Interval {
        let degrees = (self.effective() - 2.0).max(1.0);
        let half = tails::student_within(confidence, degrees) * error * self.inflation.sqrt();
        Interval { low: slope - half, high: slope + half }
    }
}

/// Points in order of time: times and residuals about the least-squares line.
struct Sample {
    /// Times about their mean.
    off: Vec<f64>,
    /// Steps between neighbouring times: one fewer than times, all over zero.
    steps: Vec<f64>,
    residual: Vec<f64>,
}

/// The line at one rate of fading.
#[derive(Clone, Copy)]
struct Faded {
    log_likelihood: f64,
    /// Slope less the least-squares one.
    slope: f64,
    slope_error: f64,
}

impl Sample {
    fn new(t: &[f64], y: &[f64], about: &Line) -> Option<Sample> {
        let mut order: Vec<usize> = (0..t.len()).collect();
        order.sort_unstable_by(|&i, &j| t[i].total_cmp(&t[j]));
        let off: Vec<f64> = order.iter().map(|&i| t[i] - about.t_mean).collect();
        let steps: Vec<f64> = order.windows(2).map(|pair| t[pair[1]] - t[pair[0]]).collect();
        let residual = order.iter().map(|&i| y[i] - about.fitted(t[i])).collect();
        steps.iter().all(|&step| step > 0.0).then_some(Sample { off, steps, residual })
    }

    fn independent(&self) -> Faded {
        let mut sums = Sums::default();
        for (&d, &e) in self.off.iter().zip(&self.residual) {
            sums.add(1.0, d, e);
        }
        sums.solved(self.off.len() as f64, 0.0)
    }

    /// The line where the resemblance fades at `rate`, −ln φ.
    fn at(&self, rate: f64) -> Faded {
        let mut sums = Sums::default();
        let (mut d_before, mut e_before) = (self.off[0], self.residual[0]);
        sums.add(1.0, d_before, e_before);
        // The logarithm of a product of 1 − r², taken whenever the product becomes small.
        let (mut ln_free, mut product) = (0.0, 1.0f64);
        let rest = self.off.iter().zip(&self.residual).skip(1);
        for (&step, (&d, &e)) in self.steps.iter().zip(rest) {
            let lost = -(-rate * step).exp_m1();
            let kept = 1.0 - lost;
            // 1 − r² = (1 − r)(1 + r) keeps its digits where r is near 1.
            let free = lost * (1.0 + kept);
            let weight = 1.0 / free.sqrt();
            sums.add(weight * lost, weight * (d - kept * d_before), weight * (e - kept * e_before));
            product *= free;
            if product < 1e-200 {
                ln_free += product.ln();
                product = 1.0;
            }
            (d_before, e_before) = (d, e);
        }
        sums.solved(self.off.len() as f64, ln_free + product.ln())
    }

    /// The rate of fading with the greatest likelihood, within the bounds of the search.
    fn best_rate(&self) -> f64 {
        let span: f64 = self.off[self.off.len() - 1] - self.off[0];
        let shortest = self.steps.iter().copied().fold(f64::INFINITY, f64::min);
        let (low, high) = ((1.0 / (SLOWEST * span)).ln(), (FASTEST / shortest).ln());
        let wanted = ((high - low) / FACTOR.ln()).ceil().clamp(1.0, MOST_RATES);
        let width = (high - low) / wanted;
        let value = |ln_rate: f64| self.at(ln_rate.exp()).log_likelihood;
        let (mut best, mut most) = (high, f64::NEG_INFINITY);
        for i in 0..=wanted as usize {
            let ln_rate = low + i as f64 * width;
            let here = value(ln_rate);
            if here > most {
                (best, most) = (ln_rate, here);
            }
        }
        narrowed(value, (best - width).max(low), (best + width).min(high)).exp()
    }

    /// Σᵢⱼ dᵢ·dⱼ·φ^|tᵢ − tⱼ| / Σ dᵢ², by carrying the sum over earlier points along.
    fn inflation(&self, rate: f64) -> f64 {
        let (mut earlier, mut pairs) = (0.0, 0.0);
        for (i, &step) in self.steps.iter().enumerate() {
            earlier = (earlier + self.off[i]) * (-rate * step).exp();
            pairs += earlier * self.off[i + 1];
        }
        1.0 + 2.0 * pairs / self.off.iter().map(|d| d * d).sum::<f64>()
    }
}

/// Where a function with one hill between two places is highest, by golden sections.
fn narrowed(value: impl Fn(f64) -> f64, mut low: f64, mut high: f64) -> f64 {
    let (mut left, mut right) = (low + GOLDEN * (high - low), high - GOLDEN * (high - low));
    let (mut at_left, mut at_right) = (value(left), value(right));
    for _ in 0..NARROWINGS {
        if at_left > at_right {
            (high, right, at_right) = (right, left, at_left);
            left = low + GOLDEN * (high - low);
            at_left = value(left);
        } else {
            (low, left, at_left) = (left, right, at_right);
            right = high - GOLDEN * (high - low);
            at_right = value(right);
        }
    }
    0.5 * (low + high)
}

/// Weighted sums of a column of ones, the times and the residuals.
#[derive(Default)]
struct Sums {
    one: f64,
    one_d: f64,
    d: f64,
    one_e: f64,
    d_e: f64,
    e: f64,
}

impl Sums {
    fn add(&mut self, one: f64, d: f64, e: f64) {
        self.one += one * one;
        self.one_d += one * d;
        self.d += d * d;
        self.one_e += one * e;
        self.d_e += d * e;
        self.e += e * e;
    }

    /// The best line through the residuals, with the likelihood of `n` points.
    fn solved(&self, n: f64, ln_free: f64) -> Faded {
        let centre = self.one_d / self.one;
        let spread = self.d - centre * self.one_d;
        let along = self.d_e - centre * self.one_e;
        let slope = along / spread;
        let rss = self.e - self.one_e * self.one_e / self.one - slope * along;
        let variance = rss / n;
        Faded {
            log_likelihood: -n * (HALF_LN_TWO_PI + 0.5) - 0.5 * (n * variance.ln() + ln_free),
            slope,
            slope_error: (rss / (n - 2.0) / spread).sqrt(),
        }
    }
}
