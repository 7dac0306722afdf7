//! The first-order line: ln(concentration) falling or rising evenly with time.

use super::censored::CensoredLine;
use super::existence::measured_line;
use super::interval::{Crossing, Interval};
use super::line::Line;
use super::normal::HALF_LN_TWO_PI;
use super::points::{Mark, NoLine, Points};
use super::tails;

/// How a line was fitted.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Kind {
    /// Least squares: every value was measured.
    LeastSquares,
    /// Maximum likelihood: some values are bounds.
    CensoredLikelihood,
}

/// One fitted line, with what its intervals need.
#[derive(Clone, Debug, PartialEq)]
pub struct FirstOrder {
    /// Number of points.
    pub n: usize,
    /// Points measured, or known only to be at least their value.
    pub detects: usize,
    /// Points known only to be at most their value.
    pub non_detects: usize,
    /// Of the non-detects, those whose limit has more than 0.99 of the fitted distribution under
    /// it.
    pub uninformative: usize,
    /// Effective number of values: measured + ½ × informative bounds.
    pub m: f64,
    /// Change of ln(concentration) per unit of time; negative when falling.
    pub slope: f64,
    /// ln(concentration) of the line at time 0.
    pub intercept: f64,
    /// Residual standard deviation: √(RSS/(n−2)); by likelihood, the scale times √(m/(m−2)).
    pub sd: f64,
    /// Maximum-likelihood scale: √(RSS/n) where every value is measured.
    pub ml_scale: f64,
    /// 1 − RSS/TSS; by likelihood, 1 − exp(−LR/n).
    pub r_squared: f64,
    /// Two-sided p that the slope is zero.
    pub slope_p: f64,
    /// Log-likelihood at the fit, of normal ln(concentration).
    pub log_likelihood: f64,
    /// How the line was fitted.
    pub kind: Kind,
    state: State,
}

#[derive(Clone, Debug, PartialEq)]
enum State {
    Closed(Line),
    Profile(Box<CensoredLine>),
}

/// Fits the first-order line: least squares if every value was measured, else the likelihood of
/// values and bounds.
///
/// # Formula
/// ```text
/// y = a + b·t + e     e normal with standard deviation σ
/// least squares:  p of b from Student's t with n − 2;  R² = 1 − RSS/TSS;  m = n
/// likelihood:     LR = 2(ℓ̂ − ℓ of the level line);  R² = 1 − exp(−LR/n)
///                 p of (m−2)(exp(LR/m) − 1) as F with 1 and m − 2
/// ```
/// where `y` is ln(concentration), and m = measured + ½ × bounds with no more than 0.99 of the
/// fitted distribution on their own side.
///
/// # Units
/// `t` in years, `y` in ln(concentration): the slope is per year.
///
/// # Limits
/// Concentrations from 1e-300 to 1e300; any number of points; times in any order, ties allowed.
///
/// # Errors
/// [`NoLine`]: fewer than three dates; measured values on fewer than three; all on one; measured
/// values exactly on a line that no bound contradicts; a search that did not end.
///
/// # Reference
/// Draper & Smith (1998), ch. 1; Tobin (1958); Olsen (1978) [from memory]. NIST "Norris", worked
/// examples W02 and W14, R `survreg` on `tobin`, 916 real series.
pub fn first_order(points: Points<'_>) -> Result<FirstOrder, NoLine> {
    let through = measured_line(points)?;
    if points.all_measured() {
        Ok(FirstOrder::least_squares(through))
    } else {
        let fitted = CensoredLine::fit(points)
            .map_err(|no_peak| NoLine::NotConverged { steps: no_peak.steps })?;
        Ok(FirstOrder::likelihood(points, fitted))
    }
}

impl FirstOrder {
    fn least_squares(through: Line) -> FirstOrder {
        let n = through.n as f64;
        let ml_scale = (through.rss / n).sqrt();
        FirstOrder {
            n: through.n,
            detects: through.n,
            non_detects: 0,
            uninformative: 0,
            m: n,
            slope: through.slope,
            intercept: through.intercept,
            sd: through.sd(),
            ml_scale,
            r_squared: through.r_squared(),
            slope_p: through.slope_p(),
            log_likelihood: -n * (ml_scale.ln() + HALF_LN_TWO_PI + 0.5),
            kind: Kind::LeastSquares,
            state: State::Closed(through),
        }
    }

    fn likelihood(points: Points<'_>, fitted: CensoredLine) -> FirstOrder {
        let (m, line) = (fitted.effective(), fitted.parameters());
        let non_detects = points.count(Mark::Below);
        let fall = fitted.flat_fall();
        let student = ((m - 2.0) * (fall / m).exp_m1()).sqrt();
        FirstOrder {
            n: points.len(),
            detects: points.len() - non_detects,
            non_detects,
            uninformative: fitted.uninformative(),
            m,
            slope: line.slope,
            intercept: line.intercept,
            sd: line.scale * (m / (m - 2.0)).sqrt(),
            ml_scale: line.scale,
            r_squared: -(-fall / points.len() as f64).exp_m1(),
            slope_p: tails::student_two_sided(student, m - 2.0),
            log_likelihood: fitted.log_likelihood(),
            kind: Kind::CensoredLikelihood,
            state: State::Profile(Box::new(fitted)),
        }
    }

    /// ln(concentration) of the line at time `t`.
    pub fn fitted(&self, t: f64) -> f64 {
        match &self.state {
            // About the mean time, where the sum loses no digits.
            State::Closed(line) => line.fitted(t),
            State::Profile(_) => self.intercept + self.slope * t,
        }
    }

    /// The two-sided interval of the slope.
    ///
    /// # Formula
    /// The t interval of [`Line::slope_interval`], or the profile interval of
    /// [`CensoredLine::slope_interval`]; the second becomes the first as non-detects vanish.
    ///
    /// # Units
    /// Per unit of time; `confidence` is a probability, 0.90 for 5 % in each tail.
    ///
    /// # Limits
    /// `confidence` between 0 and 1.
    ///
    /// # Reference
    /// Worked examples W02 and W14.
    pub fn slope_interval(&self, confidence: f64) -> Interval {
        match &self.state {
            State::Closed(line) => line.slope_interval(confidence),
            State::Profile(fitted) => fitted.slope_interval(confidence),
        }
    }

    /// The two-sided interval of the line's level at time `t`, in ln(concentration).
    ///
    /// # Formula
    /// That of [`Line::level_interval`] or [`CensoredLine::level_interval`].
    ///
    /// # Units
    /// ln(concentration); `confidence` as in [`FirstOrder::slope_interval`].
    ///
    /// # Limits
    /// Of the median line, not of a single sample.
    ///
    /// # Reference
    /// Worked example W02.
    pub fn level_interval(&self, t: f64, confidence: f64) -> Interval {
        match &self.state {
            State::Closed(line) => line.level_interval(t, confidence),
            State::Profile(fitted) => fitted.level_interval(t, confidence),
        }
    }

    /// The times at which the line may meet the level `y0`.
    ///
    /// # Formula
    /// Fieller's set of [`Line::crossing`] or the profile set of [`CensoredLine::crossing`].
    ///
    /// # Units
    /// Those of the times; `y0` in ln(concentration).
    ///
    /// # Limits
    /// Located only where the slope's interval at this confidence excludes zero, whichever its
    /// sign.
    ///
    /// # Reference
    /// Worked examples W02, W14 and W16.
    pub fn crossing(&self, y0: f64, confidence: f64) -> Crossing {
        match &self.state {
            State::Closed(line) => line.crossing(y0, confidence),
            State::Profile(fitted) => fitted.crossing(y0, confidence),
        }
    }

    /// Until when, after `from`, the data exclude that the line meets `y0`.
    ///
    /// Meant for slopes whose interval holds zero: there is no latest time, but there may be an
    /// earliest. `y0` may be excluded at `from` because the level lies over it or under it; the
    /// caller knows which it asks about.
    ///
    /// # Formula
    /// ```text
    /// the least τ > from at which y0 lies inside the level's interval at τ
    /// ```
    ///
    /// # Units
    /// Those of the times; `y0` in ln(concentration).
    ///
    /// # Limits
    /// As [`FirstOrder::crossing`].
    ///
    /// # None
    /// `y0` is not excluded at `from`, or it stays excluded for ever.
    ///
    /// # Reference
    /// Worked example W16, series B2.
    pub fn earliest_crossing_after(&self, from: f64, y0: f64, confidence: f64) -> Option<f64> {
        self.crossing(y0, confidence).excluded_until(from)
    }

    /// The fit by likelihood, where there is one: parameters, Wald variances and single ends.
    pub fn censored(&self) -> Option<&CensoredLine> {
        match &self.state {
            State::Closed(_) => None,
            State::Profile(fitted) => Some(fitted),
        }
    }

    /// The fit by least squares, where there is one.
    pub fn line(&self) -> Option<&Line> {
        match &self.state {
            State::Closed(line) => Some(line),
            State::Profile(_) => None,
        }
    }
}
