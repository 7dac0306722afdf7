//! In which stretch an end of an interval lies, and where to start looking for it.

use std::f64::consts::FRAC_PI_2;

use super::censored::CensoredLine;
use super::ends::Stretch;
use super::peak::{MOST_STEPS, SMALL_DECREMENT};
use super::scaling::Olsen;
use super::target::Target;

/// Which end of an interval.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Side {
    /// The lower or earlier one.
    Low,
    /// The upper or later one.
    High,
}

/// An end of an interval, in the caller's units.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum End {
    /// Of the slope.
    Slope(Side),
    /// Of the level at time `t`.
    Level {
        /// The time.
        t: f64,
        /// Which end.
        side: Side,
    },
    /// Of the times at which the line may meet the level `y0`. Where the slope's interval holds
    /// zero, the low one is the end of the ray before the excluded stretch, the high one the
    /// beginning of the ray after it.
    Crossing {
        /// The level.
        y0: f64,
        /// Which end.
        side: Side,
    },
}

/// The level line through `y0`, at its best: the line that denies every crossing of `y0` most.
#[derive(Clone, Copy, Debug, PartialEq)]
struct Constant {
    /// Twice the fall of the log-likelihood.
    fall: f64,
    /// The angle of the time at which a crossing of `y0` is denied most.
    angle: f64,
}

impl Side {
    fn sign(self) -> f64 {
        match self {
            Side::Low => -1.0,
            Side::High => 1.0,
        }
    }
}

impl CensoredLine {
    /// The stretch that holds the end.
    ///
    /// For slope and level the fall has one minimum and rises for ever on both sides. The times of
    /// a crossing close to a circle through ±∞, on which the fall has one minimum and one maximum.
    pub(super) fn stretch(&self, end: End, cut_off: f64) -> Option<Stretch> {
        let spread = &self.spread;
        // What the cut-off would be on the scale of the Wald statistic.
        let wald = self.effective * (cut_off / self.effective).exp_m1();
        let outward = |target, estimate: f64, variance: f64, side: Side| Stretch {
            target,
            inside: estimate,
            outside: side.sign() * f64::INFINITY,
            start: estimate + side.sign() * (wald * variance).sqrt(),
            estimate,
        };
        match end {
            End::Slope(side) => {
                Some(outward(Target::Slope, spread.slope, spread.slope_variance, side))
            }
            End::Level { t, side } => {
                let u = self.likelihood.scaling().u(t);
                let variance = spread.level_variance
                    + u * (2.0 * spread.covariance + u * spread.slope_variance);
                let estimate = spread.level + u * spread.slope;
                Some(outward(Target::Level { u }, estimate, variance, side))
            }
            End::Crossing { y0, side } => self.crossing_stretch(y0, side, cut_off, wald),
        }
    }

    fn crossing_stretch(&self, y0: f64, side: Side, cut_off: f64, wald: f64) -> Option<Stretch> {
        let scaling = self.likelihood.scaling();
        let over = (y0 - scaling.base) / scaling.y_unit;
        let base_slope = scaling.scaled_base_slope();
        let target = Target::Crossing { over, base_slope };
        let never = side.sign() * FRAC_PI_2;
        let spread = &self.spread;
        let (rise, gap) = (spread.slope + base_slope, over - spread.level);
        let (inside, outside, estimate) = if self.flat_fall > cut_off {
            let estimate = (gap / rise).atan();
            (estimate, never, estimate)
        } else {
            let constant = self.constant(over, base_slope)?;
            if constant.fall <= cut_off {
                return None;
            }
            (never, constant.angle, constant.angle)
        };
        // Fieller's ends with the Wald variances, exact where every value is measured.
        let a = rise * rise - wald * spread.slope_variance;
        let middle = rise * gap + wald * spread.covariance;
        let c = gap * gap - wald * spread.level_variance;
        let sum = middle + (middle * middle - a * c).max(0.0).sqrt().copysign(middle);
        let (low, high) = (inside.min(outside), inside.max(outside));
        let start = [(sum / a).atan(), (c / sum).atan()]
            .into_iter()
            .find(|angle| low < *angle && *angle < high)
            .unwrap_or(0.5 * (low + high));
        Some(Stretch { target, inside, outside, start, estimate })
    }

    /// The best scale of the level line through `y0`, by Newton's method in one unknown.
    fn constant(&self, over: f64, base_slope: f64) -> Option<Constant> {
        let spread = &self.spread;
        let (lift, tilt) = (over - spread.level, -base_slope - spread.slope);
        let (level, both, slope) =
            (spread.level_variance, spread.covariance, spread.slope_variance);
        let wald = (lift * lift * slope - 2.0 * lift * tilt * both + tilt * tilt * level)
            / (level * slope - both * both);
        let mut theta = spread.a / (1.0 + wald / self.effective).sqrt();
        let (mut low, mut high) = (0.0, f64::INFINITY);
        for _ in 0..MOST_STEPS {
            let at = Olsen { a: theta, b: theta * base_slope, c: -theta * over };
            let pass = self.likelihood.pass(at);
            let x = [1.0, base_slope, -over];
            let dot = |row: [f64; 3]| row[0] * x[0] + row[1] * x[1] + row[2] * x[2];
            let (gradient, bend) = (dot(pass.gradient), dot(pass.bend.map(dot)));
            let step = gradient / bend;
            if !step.is_finite() {
                return None;
            }
            if gradient * step < SMALL_DECREMENT {
                let fall = 2.0 * (self.peak.pass.value - pass.value);
                let angle = (pass.gradient[1] / pass.gradient[2]).atan();
                return Some(Constant { fall, angle });
            }
            // The gradient falls with the scale's inverse: its sign tells which side the peak is.
            if gradient > 0.0 {
                low = theta;
            } else {
                high = theta;
            }
            let next = theta + step;
            theta = if next <= low || next >= high {
                0.5 * (low + high.min(2.0 * theta))
            } else {
                next
            };
        }
        None
    }
}
