//! The straight line by least squares, with the intervals that are exact for it.

use super::interval::{Crossing, Interval};
use super::tails;

/// A straight line fitted by least squares, with the sums its intervals need.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Line {
    /// Number of points.
    pub n: usize,
    /// Mean time.
    pub t_mean: f64,
    /// Mean value: the line passes through it at the mean time.
    pub y_mean: f64,
    /// Sum of squares of the times about their mean.
    pub sxx: f64,
    /// Change of the fitted value per unit of time.
    pub slope: f64,
    /// Fitted value at time 0.
    pub intercept: f64,
    /// Residual sum of squares.
    pub rss: f64,
    /// Sum of squares of the values about their mean.
    pub tss: f64,
}

/// Fits the straight line `y = a + b·t` by least squares.
///
/// # Formula
/// ```text
/// b = Σ(tᵢ−t̄)(yᵢ−ȳ) / Sxx     a = ȳ − b·t̄     RSS = Σ(yᵢ−ȳ−b(tᵢ−t̄))²     Sxx = Σ(tᵢ−t̄)²
/// ```
/// where `t̄`, `ȳ` are means. Sums are taken about the means, in two passes.
///
/// # Units
/// `t` in years, `y` in ln(concentration): the slope is per year.
///
/// # Limits
/// Values whose squares overflow give no line.
///
/// # None
/// Fewer than two points, all times equal, or slices of different length.
///
/// # Reference
/// Draper & Smith (1998), ch. 1. Checked against NIST "Norris": `tests/reference/nist-norris.csv`.
pub fn line(t: &[f64], y: &[f64]) -> Option<Line> {
    let n = t.len();
    if n < 2 || y.len() != n {
        return None;
    }
    let (t_mean, y_mean) = (mean(t), mean(y));
    let (mut sxx, mut sxy, mut tss) = (0.0, 0.0, 0.0);
    for (t, y) in t.iter().zip(y) {
        let (dt, dy) = (t - t_mean, y - y_mean);
        sxx += dt * dt;
        sxy += dt * dy;
        tss += dy * dy;
    }
    if sxx.is_nan() || sxx <= 0.0 {
        return None;
    }
    let slope = sxy / sxx;
    let residual = |(t, y): (&f64, &f64)| y - y_mean - slope * (t - t_mean);
    let rss: f64 = t.iter().zip(y).map(residual).map(|e| e * e).sum();
    let intercept = y_mean - slope * t_mean;
    let line = Line { n, t_mean, y_mean, sxx, slope, intercept, rss, tss };
    (slope.is_finite() && rss.is_finite() && tss.is_finite()).then_some(line)
}

/// The arithmetic mean, corrected once for the rounding of its own sum.
///
/// # Formula
/// ```text
/// m = Σx/n     x̄ = m + Σ(x − m)/n
/// ```
///
/// # Units
/// Those of the values.
///
/// # Limits
/// Not a number for an empty slice.
///
/// # Reference
/// Chan, Golub & LeVeque (1983), Am. Stat. 37:242–247 [from memory]. Checked against NIST's
/// univariate sets: `tests/reference/nist-univariate.csv`.
pub fn mean(values: &[f64]) -> f64 {
    let n = values.len() as f64;
    let rough = values.iter().sum::<f64>() / n;
    rough + values.iter().map(|x| x - rough).sum::<f64>() / n
}

impl Line {
    /// Degrees of freedom left for the scatter: n − 2.
    pub fn degrees(&self) -> f64 {
        self.n as f64 - 2.0
    }

    /// Residual standard deviation √(RSS/(n−2)), in the unit of the values.
    pub fn sd(&self) -> f64 {
        (self.rss / self.degrees()).sqrt()
    }

    /// Fitted value at time `t`.
    pub fn fitted(&self, t: f64) -> f64 {
        self.y_mean + self.slope * (t - self.t_mean)
    }

    /// Standard error of the slope: s/√Sxx.
    pub fn slope_error(&self) -> f64 {
        self.sd() / self.sxx.sqrt()
    }

    /// Share of the scatter that the line explains: 1 − RSS/TSS.
    pub fn r_squared(&self) -> f64 {
        1.0 - self.rss / self.tss
    }

    /// Two-sided p that the slope is zero: Student's t of slope over its standard error, n − 2.
    pub fn slope_p(&self) -> f64 {
        tails::student_two_sided(self.slope / self.slope_error(), self.degrees())
    }

    /// The interval of the slope.
    ///
    /// # Formula
    /// ```text
    /// b ± t·s/√Sxx
    /// ```
    /// where `t` is the two-sided quantile of Student's t with n − 2 degrees of freedom.
    ///
    /// # Units
    /// Value per unit of time; `confidence` a probability, two-sided.
    ///
    /// # Limits
    /// Three points or more.
    ///
    /// # Reference
    /// Draper & Smith (1998), ch. 1. Worked example W02.
    pub fn slope_interval(&self, confidence: f64) -> Interval {
        let half = tails::student_within(confidence, self.degrees()) * self.slope_error();
        Interval { low: self.slope - half, high: self.slope + half }
    }

    /// The interval of the fitted (mean) value at time `t`, pointwise.
    ///
    /// # Formula
    /// ```text
    /// ŷ(t) ± q·s·√(1/n + (t−t̄)²/Sxx)
    /// ```
    /// where `q` is the two-sided quantile of Student's t with n − 2 degrees of freedom.
    ///
    /// # Units
    /// Those of the values; `confidence` a probability, two-sided.
    ///
    /// # Limits
    /// Three points or more.
    ///
    /// # Reference
    /// Draper & Smith (1998), ch. 1. Worked example W02.
    pub fn level_interval(&self, t: f64, confidence: f64) -> Interval {
        let off = t - self.t_mean;
        let spread = (1.0 / self.n as f64 + off * off / self.sxx).sqrt();
        let half = tails::student_within(confidence, self.degrees()) * self.sd() * spread;
        let level = self.fitted(t);
        Interval { low: level - half, high: level + half }
    }

    /// The times at which the line may meet `y0`: Fieller's set.
    ///
    /// # Formula
    /// ```text
    /// (d − b·u)² ≤ E·(1/n + u²/Sxx)      u = τ − t̄     d = y0 − ȳ     E = q²·s²
    /// A·u² − 2·b·d·u + (d² − E/n) ≤ 0    A = b² − E/Sxx
    /// disc = E/(n·Sxx) · (b²·Sxx + n·d² − E)
    /// ```
    /// where `q` is the two-sided quantile of Student's t with n − 2 degrees of freedom. `A > 0`
    /// exactly when the slope's interval excludes zero; then the set is one interval. Else it is
    /// two rays where `disc > 0`, and every time where it is not. The nearer root is taken as a
    /// quotient with the farther one, so that neither loses digits when `A` is small.
    ///
    /// # Units
    /// Those of the times; `y0` in those of the values; `confidence` a probability, two-sided.
    ///
    /// # Limits
    /// Three points or more.
    ///
    /// # Reference
    /// Fieller (1954), J. R. Stat. Soc. B 16:175–185. Worked examples W02 and W16.
    pub fn crossing(&self, y0: f64, confidence: f64) -> Crossing {
        let n = self.n as f64;
        let q = tails::student_within(confidence, self.degrees());
        let e = q * q * self.rss / self.degrees();
        let d = y0 - self.y_mean;
        let a = self.slope * self.slope - e / self.sxx;
        let inner = self.slope * self.slope * self.sxx + n * d * d - e;
        if a <= 0.0 && inner <= 0.0 {
            return Crossing::WholeLine;
        }
        let middle = self.slope * d;
        let root = (e / (n * self.sxx) * inner.max(0.0)).sqrt();
        let sum = middle + root.copysign(middle);
        // A slope interval that ends exactly at zero is read as one that holds it.
        let a = if a == 0.0 { -0.0 } else { a };
        let (far, near) = (sum / a, (d * d - e / n) / sum);
        // With the level at the mean value both terms vanish together: ends lie evenly round t̄.
        let near = if sum == 0.0 { -far } else { near };
        let (first, last) = (self.t_mean + far.min(near), self.t_mean + far.max(near));
        if a > 0.0 {
            let estimate = self.t_mean + d / self.slope;
            Crossing::Located { estimate, low: first, high: last }
        } else {
            Crossing::TwoRays { before: first, after: last }
        }
    }
}
