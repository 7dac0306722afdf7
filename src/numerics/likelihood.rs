//! The likelihood of a straight line with some values known only as bounds, in a form whose
//! logarithm is concave.
//!
//! Measured values enter it through six moments, summed once, so that a pass costs no more than
//! the bounds it has to look at.

use super::line::{Line, line, mean};
use super::normal::{HALF_LN_TWO_PI, lower_tail};
use super::points::{Mark, Points};
use super::scaling::{Olsen, Parameters, Scaling};

/// How far a bound is moved into its own side for the first guess at a line (in ln): ½ ln 2, the
/// limit over √2. Source: methods note 3.2; it only starts the search and decides no result.
const GUESS_SHIFT: f64 = 0.5 * std::f64::consts::LN_2;

/// The log-likelihood at one place, with its first and second derivatives in Olsen's parameters.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Pass {
    /// Log-likelihood of the scaled values.
    pub value: f64,
    /// Derivatives by a, b, c.
    pub gradient: [f64; 3],
    /// Minus the second derivatives by a, b, c; positive definite.
    pub bend: [[f64; 3]; 3],
}

#[derive(Clone, Copy, Debug, PartialEq)]
struct Bound {
    u: f64,
    w: f64,
    /// 1 where the value lies below, −1 where it lies above.
    side: f64,
}

/// Sums over the measured points.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
struct Moments {
    n: f64,
    u: f64,
    uu: f64,
    w: f64,
    wu: f64,
    ww: f64,
}

/// The likelihood of a line, given the points.
#[derive(Clone, Debug, PartialEq)]
pub struct Likelihood {
    scaling: Scaling,
    measured: Moments,
    bounds: Vec<Bound>,
}

impl Likelihood {
    /// Scales the points about a first guess: least squares with every bound moved a little into
    /// its own side.
    ///
    /// # None
    /// All times equal, or values whose squares overflow.
    pub fn new(points: Points<'_>) -> Option<Likelihood> {
        let moved: Vec<f64> = points
            .iter()
            .map(|point| match point.mark {
                Mark::Measured => point.y,
                Mark::Below => point.y - GUESS_SHIFT,
                Mark::Above => point.y + GUESS_SHIFT,
            })
            .collect();
        let guess: Line = line(points.t(), &moved)?;
        let scatter = (guess.rss / guess.n as f64).sqrt();
        let scale = if scatter > 0.0 { scatter } else { 1.0 };
        let start = Parameters { intercept: guess.intercept, slope: guess.slope, scale };
        Some(Self::about(points, start))
    }

    /// Scales the points about a line that is already known to be near.
    pub fn about(points: Points<'_>, near: Parameters) -> Likelihood {
        let t_centre = mean(points.t());
        let t_unit = points.t().iter().fold(0.0, |widest: f64, t| widest.max((t - t_centre).abs()));
        let scaling = Scaling {
            t_centre,
            t_unit,
            base: near.intercept + near.slope * t_centre,
            base_slope: near.slope,
            y_unit: near.scale,
        };
        let mut measured = Moments::default();
        let mut bounds = Vec::new();
        for point in points.iter() {
            let (u, w) = (scaling.u(point.t), scaling.w(point.t, point.y));
            match point.mark {
                Mark::Measured => measured.add(u, w),
                Mark::Below => bounds.push(Bound { u, w, side: 1.0 }),
                Mark::Above => bounds.push(Bound { u, w, side: -1.0 }),
            }
        }
        Likelihood { scaling, measured, bounds }
    }

    /// How times and values are scaled.
    pub fn scaling(&self) -> Scaling {
        self.scaling
    }

    /// What has to be added to a log-likelihood of scaled values to get that of the values.
    pub fn offset(&self) -> f64 {
        -self.measured.n * self.scaling.y_unit.ln()
    }

    /// Log-likelihood of the points under a line with normal scatter.
    ///
    /// # Formula
    /// ```text
    /// measured: −½ ln 2π − ln σ − z²/2     below: ln Φ(z)     above: ln Φ(−z)
    /// z = (y − a − b·t)/σ
    /// ```
    /// where `y` is the value or the bound, Φ the standard normal distribution function.
    ///
    /// # Units
    /// Those of the points.
    ///
    /// # Limits
    /// Minus infinity for a scale that is not over zero.
    ///
    /// # Reference
    /// Tobin (1958), Econometrica 26:24–36. Worked example W14.
    pub fn log_likelihood(&self, line: Parameters) -> f64 {
        if line.scale > 0.0 {
            self.pass(self.scaling.olsen(line)).value + self.offset()
        } else {
            f64::NEG_INFINITY
        }
    }

    /// The log-likelihood of the scaled values with its derivatives.
    ///
    /// # Formula
    /// ```text
    /// z = a·w + b·u + c     x = (w, u, 1)
    /// measured: ln a − z²/2 − ½ ln 2π   gradient −z·x + (1/a, 0, 0)   bend x·xᵀ + (1/a², 0, 0; …)
    /// below:    ln Φ(z)                 gradient m·x                  bend m(m + z)·x·xᵀ
    /// ```
    /// where m = φ(z)/Φ(z), and above is below with −z and −x. The function is concave in
    /// (a, b, c): it has one maximum and Newton's method finds it.
    ///
    /// # Units
    /// Scaled, see [`Scaling`].
    ///
    /// # Limits
    /// Not meant for `a` not over zero.
    ///
    /// # Reference
    /// Olsen (1978), Econometrica 46:1211–1215 [from memory; derivatives checked in tests].
    pub fn pass(&self, at: Olsen) -> Pass {
        let Olsen { a, b, c } = at;
        let m = &self.measured;
        // Σz·w, Σz·u, Σz over the measured points; Σz² follows from them.
        let by_w = a * m.ww + b * m.wu + c * m.w;
        let by_u = a * m.wu + b * m.uu + c * m.u;
        let by_one = a * m.w + b * m.u + c * m.n;
        let squares = a * by_w + b * by_u + c * by_one;
        let mut value = m.n * (a.ln() - HALF_LN_TWO_PI) - 0.5 * squares;
        let mut gradient = [m.n / a - by_w, -by_u, -by_one];
        let (mut ww, mut wu, mut w) = (m.ww + m.n / (a * a), m.wu, m.w);
        let (mut uu, mut u, mut one) = (m.uu, m.u, m.n);
        for bound in &self.bounds {
            let z = a * bound.w + b * bound.u + c;
            let tail = lower_tail(bound.side * z);
            let pull = bound.side * tail.slope;
            value += tail.ln;
            gradient[0] += pull * bound.w;
            gradient[1] += pull * bound.u;
            gradient[2] += pull;
            let (bent_w, bent_u) = (tail.bend * bound.w, tail.bend * bound.u);
            ww += bent_w * bound.w;
            wu += bent_w * bound.u;
            w += bent_w;
            uu += bent_u * bound.u;
            u += bent_u;
            one += tail.bend;
        }
        Pass { value, gradient, bend: [[ww, wu, w], [wu, uu, u], [w, u, one]] }
    }
}

impl Moments {
    fn add(&mut self, u: f64, w: f64) {
        self.n += 1.0;
        self.u += u;
        self.uu += u * u;
        self.w += w;
        self.wu += w * u;
        self.ww += w * w;
    }
}
