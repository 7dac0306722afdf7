//! What an interval is asked for, and the line held to it.
//!
//! Holding one quantity fixed leaves two things free: the scale and one more number that tilts or
//! lifts the line. Each target is a plane in Olsen's parameters, on which the log-likelihood is
//! still concave.

use super::likelihood::Likelihood;
use super::peak::Peak;
use super::scaling::Olsen;

/// A quantity of the line, in the scaled units of a [`Likelihood`].
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Target {
    /// Slope of the line less that of the guessed line.
    Slope,
    /// Value of the line less that of the guessed line, at scaled time `u`.
    Level {
        /// The scaled time.
        u: f64,
    },
    /// The time at which the line meets a level, as the angle whose tangent is the scaled time: so
    /// that "never" is ±π/2, an ordinary place.
    Crossing {
        /// The level over the guessed line at scaled time 0.
        over: f64,
        /// Slope of the guessed line.
        base_slope: f64,
    },
}

/// The best line with the variances that the curvature at the peak gives, in scaled units.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Spread {
    /// One over the scale.
    pub a: f64,
    /// Level over the guessed line at scaled time 0.
    pub level: f64,
    /// Slope over that of the guessed line.
    pub slope: f64,
    /// Variance of the level.
    pub level_variance: f64,
    /// Covariance of level and slope.
    pub covariance: f64,
    /// Variance of the slope.
    pub slope_variance: f64,
    /// Variance of the scale.
    pub scale_variance: f64,
}

/// A line held to one value of a [`Target`]: z = θ·p − κ·q, with p = w + … and q straight in u.
/// Every pair is (factor of u, constant).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Held {
    p: [f64; 2],
    q: [f64; 2],
    /// Derivatives of p and q by the value held.
    dp: [f64; 2],
    dq: [f64; 2],
}

/// Where the search for the two free numbers starts.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Guess {
    /// Tilt or lift of the guessed line: κ over θ. [`Held`] is built about it, so that κ starts
    /// at 0.
    pub lean: f64,
    /// θ, one over the scale.
    pub theta: f64,
}

impl Spread {
    /// The variances by the delta method from minus the inverse of the second derivatives.
    ///
    /// # Formula
    /// ```text
    /// level = −c/a   slope = −b/a   scale = 1/a
    /// ∂level = −(∂c + level·∂a)/a   ∂slope = −(∂b + slope·∂a)/a   ∂scale = −∂a/a²
    /// ```
    ///
    /// # None
    /// Second derivatives that are not negative definite in f64.
    pub fn at(peak: &Peak) -> Option<Spread> {
        let Olsen { a, b, c } = peak.at;
        let (level, slope) = (-c / a, -b / a);
        let by_level = [-level / a, 0.0, -1.0 / a];
        let by_slope = [-slope / a, -1.0 / a, 0.0];
        let by_scale = [-1.0 / (a * a), 0.0, 0.0];
        let over = |v: [f64; 3]| super::peak::solve3(peak.pass.bend, v);
        let (level_side, slope_side, scale_side) =
            (over(by_level)?, over(by_slope)?, over(by_scale)?);
        Some(Spread {
            a,
            level,
            slope,
            level_variance: dot(by_level, level_side),
            covariance: dot(by_level, slope_side),
            slope_variance: dot(by_slope, slope_side),
            scale_variance: dot(by_scale, scale_side),
        })
    }

    /// The line nearest to the best one, by these variances, that holds the target at `value`.
    ///
    /// # Formula
    /// ```text
    /// x·(level, slope) = v     Δ = v − x·(level, slope)     V = variance of x·(level, slope)
    /// (level, slope) + C·x·Δ/V     θ = a / √(1 + (Δ²/V)/m)
    /// ```
    /// where `C` is the covariance matrix and `m` the effective number. Exact where every value is
    /// measured.
    pub fn guess(&self, target: Target, value: f64, effective: f64) -> Guess {
        // x is the row that picks the target out of (level, slope); v what it is held to.
        let (x, v) = match target {
            Target::Slope => ([0.0, 1.0], value),
            Target::Level { u } => ([1.0, u], value),
            Target::Crossing { over, base_slope } => {
                let (sin, cos) = value.sin_cos();
                ([cos, sin], over * cos - base_slope * sin)
            }
        };
        let with_level = x[0] * self.level_variance + x[1] * self.covariance;
        let with_slope = x[0] * self.covariance + x[1] * self.slope_variance;
        let variance = x[0] * with_level + x[1] * with_slope;
        let off = v - x[0] * self.level - x[1] * self.slope;
        let level = self.level + with_level / variance * off;
        let slope = self.slope + with_slope / variance * off;
        let lean = match target {
            Target::Slope => level,
            Target::Level { .. } => slope,
            Target::Crossing { over, base_slope } => {
                let (sin, cos) = value.sin_cos();
                cos * (slope + base_slope) - sin * (level - over)
            }
        };
        Guess { lean, theta: self.a / (1.0 + off * off / variance / effective).sqrt() }
    }
}

impl Held {
    /// The line with the target at `value`, leaning as guessed.
    pub fn new(target: Target, value: f64, lean: f64) -> Held {
        match target {
            Target::Slope => {
                Held { p: [-value, -lean], q: [0.0, 1.0], dp: [-1.0, 0.0], dq: [0.0, 0.0] }
            }
            Target::Level { u } => {
                Held { p: [-lean, lean * u - value], q: [1.0, -u], dp: [0.0, -1.0], dq: [0.0, 0.0] }
            }
            Target::Crossing { over, base_slope } => {
                let (sin, cos) = value.sin_cos();
                Held {
                    p: [base_slope - lean * cos, lean * sin - over],
                    q: [cos, -sin],
                    dp: [lean * sin, lean * cos],
                    dq: [-sin, -cos],
                }
            }
        }
    }

    fn olsen(&self, theta: f64, kappa: f64) -> Olsen {
        Olsen {
            a: theta,
            b: theta * self.p[0] - kappa * self.q[0],
            c: theta * self.p[1] - kappa * self.q[1],
        }
    }

    /// The likelihood at these θ and κ with its derivatives on and across the plane.
    pub fn pass(&self, likelihood: &Likelihood, theta: f64, kappa: f64) -> HeldPass {
        let pass = likelihood.pass(self.olsen(theta, kappa));
        let (gradient, bend) = (pass.gradient, pass.bend);
        let by_theta = [1.0, self.p[0], self.p[1]];
        let by_kappa = [0.0, -self.q[0], -self.q[1]];
        let by_value =
            [0.0, theta * self.dp[0] - kappa * self.dq[0], theta * self.dp[1] - kappa * self.dq[1]];
        let bent_theta = times(bend, by_theta);
        let bent_kappa = times(bend, by_kappa);
        HeldPass {
            value: pass.value,
            by_held: dot(gradient, by_value),
            gradient: [dot(gradient, by_theta), dot(gradient, by_kappa)],
            bend: [
                [dot(by_theta, bent_theta), dot(by_theta, bent_kappa)],
                [dot(by_theta, bent_kappa), dot(by_kappa, bent_kappa)],
            ],
            across: [
                gradient[1] * self.dp[0] + gradient[2] * self.dp[1] - dot(by_value, bent_theta),
                -gradient[1] * self.dq[0] - gradient[2] * self.dq[1] - dot(by_value, bent_kappa),
            ],
        }
    }
}

/// The log-likelihood at one place of a held line.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct HeldPass {
    /// Log-likelihood of the scaled values.
    pub value: f64,
    /// Its derivative by the value held.
    pub by_held: f64,
    /// Its derivatives by θ and κ.
    pub gradient: [f64; 2],
    /// Minus its second derivatives by θ and κ.
    pub bend: [[f64; 2]; 2],
    /// Derivatives of the gradient by the value held.
    pub across: [f64; 2],
}

impl HeldPass {
    /// Solves bend · x = `right`.
    ///
    /// # None
    /// A matrix that is not positive definite in f64.
    pub fn solve(&self, right: [f64; 2]) -> Option<[f64; 2]> {
        let [[aa, ab], [_, bb]] = self.bend;
        let rest = bb - ab / aa * ab;
        if !(aa > 0.0 && rest > 0.0 && rest.is_finite()) {
            return None;
        }
        let second = (right[1] - ab / aa * right[0]) / rest;
        Some([(right[0] - ab * second) / aa, second])
    }
}

fn dot(x: [f64; 3], y: [f64; 3]) -> f64 {
    x[0] * y[0] + x[1] * y[1] + x[2] * y[2]
}

fn times(matrix: [[f64; 3]; 3], x: [f64; 3]) -> [f64; 3] {
    matrix.map(|row| dot(row, x))
}
