//! The line through values some of which are only bounds, with profile-likelihood intervals.

use super::ends::Profile;
use super::likelihood::Likelihood;
use super::normal;
use super::peak::{NoPeak, Peak, climb};
use super::points::{Mark, Points};
use super::scaling::Parameters;
use super::tails;
use super::target::{Spread, Target};

/// A bound with a larger share of the distribution on its own side (a probability) tells the fit
/// next to nothing. Source: ruled for this program; simulated coverage in methods note 3.4.
pub const UNINFORMATIVE: f64 = 0.99;

/// The likelihood is scaled anew about the line found where its scale is more than this factor from
/// the guessed one (a pure number). Source: rounding of the moments of measured values grows with
/// the square of the factor; a limit far above everything makes a poor guess.
const WELL_SCALED: f64 = 10.0;

/// Rescalings of the likelihood, at most (a count). Source: each follows the scale by a factor of
/// a thousand; detects that miss a line by 1e-10 need four.
const MOST_RESCALINGS: usize = 12;

/// A line fitted by the likelihood of values and bounds.
#[derive(Clone, Debug, PartialEq)]
pub struct CensoredLine {
    pub(super) likelihood: Likelihood,
    pub(super) peak: Peak,
    pub(super) spread: Spread,
    pub(super) effective: f64,
    uninformative: usize,
    pub(super) flat_fall: f64,
    steps: usize,
}

/// The search for the maximum did not end.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct NotFitted {
    /// Steps taken.
    pub steps: usize,
}

/// Large-sample (Wald) variances of a fitted line, in the caller's units.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Covariance {
    /// Variance of the intercept at time 0.
    pub intercept: f64,
    /// Variance of the slope.
    pub slope: f64,
    /// Covariance of intercept and slope.
    pub intercept_slope: f64,
    /// Variance of the scale.
    pub scale: f64,
}

impl CensoredLine {
    /// Fits the line by maximum likelihood.
    ///
    /// # Formula
    /// ```text
    /// maximise Σ ln φ((y−a−b·t)/σ)/σ + Σ ln Φ((R−a−b·t)/σ) + Σ ln Φ((a+b·t−G)/σ)
    /// ```
    /// over measured values `y`, values at most `R` and values at least `G`; in Olsen's parameters
    /// by Newton's method. The effective number is m = measured + ½ × informative bounds, where a
    /// bound is informative if no more than 0.99 of the fitted distribution lies on its side.
    ///
    /// # Units
    /// `t` in years, `y` in ln(concentration).
    ///
    /// # Limits
    /// Meant for measured values on three or more dates and not on a line, as the first-order fit
    /// sees to; all values measured is allowed.
    ///
    /// # Errors
    /// The number of steps, where the search did not end.
    ///
    /// # Reference
    /// Tobin (1958); Olsen (1978) [from memory]. Worked example W14, R `survreg` on `tobin`, 916
    /// real series.
    pub fn fit(points: Points<'_>) -> Result<CensoredLine, NotFitted> {
        let mut likelihood = Likelihood::new(points).ok_or(NotFitted { steps: 0 })?;
        let mut near = likelihood.scaling().guessed_line();
        let mut taken = 0;
        let mut reached = None;
        for _ in 0..MOST_RESCALINGS {
            match climb(&likelihood, likelihood.scaling().olsen(near)) {
                Ok(peak) => {
                    taken += peak.steps;
                    if (1.0 / WELL_SCALED..=WELL_SCALED).contains(&peak.at.a) {
                        reached = Some(peak);
                        break;
                    }
                    near = likelihood.scaling().line(peak.at);
                    likelihood = Likelihood::about(points, near);
                }
                Err(NoPeak::OutOfScale { at, steps }) => {
                    taken += steps;
                    near = likelihood.scaling().line(at);
                    likelihood = Likelihood::about(points, near);
                }
                Err(NoPeak::NotReached { steps }) => {
                    return Err(NotFitted { steps: taken + steps });
                }
            }
        }
        let not_fitted = NotFitted { steps: taken };
        let peak = reached.ok_or(not_fitted)?;
        let spread = Spread::at(&peak).ok_or(not_fitted)?;
        let line = likelihood.scaling().line(peak.at);
        let (mut effective, mut uninformative) = (0.0, 0);
        for point in points.iter() {
            let z = (point.y - line.intercept - line.slope * point.t) / line.scale;
            match point.mark {
                Mark::Measured => effective += 1.0,
                Mark::Below if normal::lower(z) > UNINFORMATIVE => uninformative += 1,
                Mark::Above if normal::upper(z) > UNINFORMATIVE => {}
                Mark::Below | Mark::Above => effective += 0.5,
            }
        }
        let mut fitted = CensoredLine {
            likelihood,
            peak,
            spread,
            effective,
            uninformative,
            flat_fall: f64::INFINITY,
            steps: taken,
        };
        let scaling = fitted.likelihood.scaling();
        let flat = fitted.profile().held_at(Target::Slope, -scaling.scaled_base_slope());
        fitted.flat_fall = flat.ok_or(not_fitted)?.fall;
        Ok(fitted)
    }

    pub(super) fn profile(&self) -> Profile<'_> {
        Profile {
            likelihood: &self.likelihood,
            highest: self.peak.pass.value,
            spread: &self.spread,
            effective: self.effective,
        }
    }

    /// The fitted line.
    pub fn parameters(&self) -> Parameters {
        self.likelihood.scaling().line(self.peak.at)
    }

    /// The log-likelihood at the fit.
    pub fn log_likelihood(&self) -> f64 {
        self.peak.pass.value + self.likelihood.offset()
    }

    /// Twice the fall of the log-likelihood when the slope is held at zero.
    pub fn flat_fall(&self) -> f64 {
        self.flat_fall
    }

    /// The effective number of values.
    pub fn effective(&self) -> f64 {
        self.effective
    }

    /// Non-detects with more than 0.99 of the fitted distribution under their limit.
    pub fn uninformative(&self) -> usize {
        self.uninformative
    }

    /// The likelihood, to be looked at elsewhere than at its maximum.
    pub fn likelihood(&self) -> &Likelihood {
        &self.likelihood
    }

    /// Newton steps of the fit.
    pub fn steps(&self) -> usize {
        self.steps
    }

    /// Large-sample variances by the delta method.
    ///
    /// # Formula
    /// ```text
    /// J·(−H)⁻¹·Jᵀ
    /// ```
    /// where `H` holds the second derivatives of the log-likelihood in Olsen's parameters and `J`
    /// the derivatives of (intercept, slope, scale) by them.
    ///
    /// # Units
    /// Squares of those of the parameters.
    ///
    /// # Limits
    /// Too small for few values; intervals do not use them.
    ///
    /// # Reference
    /// Worked example W14; R `survreg` on `tobin`.
    pub fn covariance(&self) -> Covariance {
        let (scaling, spread) = (self.likelihood.scaling(), &self.spread);
        let (y, t) = (scaling.y_unit, scaling.t_unit);
        let level = y * y * spread.level_variance;
        let slope = y * y / (t * t) * spread.slope_variance;
        let both = y * y / t * spread.covariance;
        let back = scaling.t_centre;
        Covariance {
            intercept: level - 2.0 * back * both + back * back * slope,
            slope,
            intercept_slope: both - back * slope,
            scale: y * y * spread.scale_variance,
        }
    }

    /// How far twice the log-likelihood may fall inside an interval.
    ///
    /// # Formula
    /// ```text
    /// c = m·ln(1 + t²/(m−2))
    /// ```
    /// where `m` is the effective number and `t` the two-sided quantile of Student's t with m − 2
    /// degrees of freedom. With every value measured the ends are then those of the t interval and
    /// of Fieller's.
    ///
    /// # Units
    /// `confidence` is a probability; the cut-off a log-likelihood.
    ///
    /// # Limits
    /// `m` over 2, which three measured values see to.
    ///
    /// # Reference
    /// Methods note 3.4: derivation and simulated coverage.
    pub fn cut_off(&self, confidence: f64) -> f64 {
        let t = tails::student_within(confidence, self.effective - 2.0);
        self.effective * (t * t / (self.effective - 2.0)).ln_1p()
    }
}
