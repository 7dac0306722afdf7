//! Ends and intervals of a censored line.

use super::censored::CensoredLine;
use super::interval::{Crossing, Interval};
use super::stretches::{End, Side};

impl CensoredLine {
    /// An end by the joint Newton search alone.
    ///
    /// # None
    /// There is no such end, or twelve steps did not reach it.
    pub fn joint_end(&self, end: End, cut_off: f64) -> Option<f64> {
        let stretch = self.stretch(end, cut_off)?;
        self.profile().joint(&stretch, cut_off).map(|value| self.unscaled(end, value))
    }

    /// An end by the nested search alone.
    ///
    /// # None
    /// There is no such end, or no bracket was found.
    pub fn nested_end(&self, end: End, cut_off: f64) -> Option<f64> {
        let stretch = self.stretch(end, cut_off)?;
        self.profile().nested(&stretch, cut_off).map(|value| self.unscaled(end, value))
    }

    /// An end by the joint search, by the nested one where that does not arrive.
    ///
    /// # Formula
    /// ```text
    /// 2·[ℓ̂ − ℓ_p(ψ)] = c
    /// ```
    /// where `ℓ_p` is the log-likelihood at its best with the quantity ψ held, `c` the cut-off.
    ///
    /// # Units
    /// Those of the quantity; the cut-off as [`CensoredLine::cut_off`] gives it.
    ///
    /// # Limits
    /// See [`super::ends::Profile`].
    ///
    /// # None
    /// There is no such end: only for a crossing, where no time is excluded.
    ///
    /// # Reference
    /// Methods note 3.4 and 4.4. Worked example W14.
    pub fn end(&self, end: End, cut_off: f64) -> Option<f64> {
        let stretch = self.stretch(end, cut_off)?;
        let profile = self.profile();
        let found = profile.joint(&stretch, cut_off);
        let found = found.or_else(|| profile.nested(&stretch, cut_off));
        found.map(|value| self.unscaled(end, value))
    }

    /// The interval of the slope. An end that no search reached is infinite.
    ///
    /// # Formula, Units, Limits, Reference
    /// See [`CensoredLine::end`]; `confidence` is a probability, two-sided.
    pub fn slope_interval(&self, confidence: f64) -> Interval {
        self.interval(confidence, End::Slope)
    }

    /// The interval of the fitted level at time `t`. An end that no search reached is infinite.
    ///
    /// # Formula, Units, Limits, Reference
    /// See [`CensoredLine::end`]; `confidence` is a probability, two-sided.
    pub fn level_interval(&self, t: f64, confidence: f64) -> Interval {
        self.interval(confidence, |side| End::Level { t, side })
    }

    /// The times at which the line may meet `y0`.
    ///
    /// # Formula
    /// ```text
    /// { τ : D(τ) ≤ c }     D(±∞) = D(slope = 0)     max D = D(slope = 0 and level = y0)
    /// ```
    /// where `D` is twice the fall of the log-likelihood and `c` the cut-off. The set is one
    /// interval where D(±∞) > c, every time where max D ≤ c, and two rays between those.
    ///
    /// # Units
    /// Those of the times; `confidence` is a probability, two-sided.
    ///
    /// # Limits
    /// An end that no search reached is infinite.
    ///
    /// # Reference
    /// Methods note 4.4. The last identity: every line held to meet `y0` at any one time may be the
    /// level line through `y0`, and the best slope of the one held at the right time is zero.
    pub fn crossing(&self, y0: f64, confidence: f64) -> Crossing {
        let cut_off = self.cut_off(confidence);
        let low = self.end(End::Crossing { y0, side: Side::Low }, cut_off);
        let high = self.end(End::Crossing { y0, side: Side::High }, cut_off);
        if self.flat_fall > cut_off {
            let line = self.parameters();
            Crossing::Located {
                estimate: (y0 - line.intercept) / line.slope,
                low: low.unwrap_or(f64::NEG_INFINITY),
                high: high.unwrap_or(f64::INFINITY),
            }
        } else if low.is_none() && high.is_none() {
            Crossing::WholeLine
        } else {
            Crossing::TwoRays {
                before: low.unwrap_or(f64::NEG_INFINITY),
                after: high.unwrap_or(f64::INFINITY),
            }
        }
    }

    fn interval(&self, confidence: f64, end: impl Fn(Side) -> End) -> Interval {
        let cut_off = self.cut_off(confidence);
        Interval {
            low: self.end(end(Side::Low), cut_off).unwrap_or(f64::NEG_INFINITY),
            high: self.end(end(Side::High), cut_off).unwrap_or(f64::INFINITY),
        }
    }

    fn unscaled(&self, end: End, value: f64) -> f64 {
        let s = self.likelihood.scaling();
        match end {
            End::Slope(_) => s.base_slope + value * s.y_unit / s.t_unit,
            End::Level { t, .. } => s.guessed(t) + value * s.y_unit,
            End::Crossing { .. } => s.t_centre + s.t_unit * value.tan(),
        }
    }
}
