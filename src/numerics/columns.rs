//! Any few columns fitted to values some of which are only bounds.
//!
//! The straight line has a likelihood of its own, written for speed; this one serves every other
//! mean that is a sum of columns: a bend, a known break, seasons.

use super::cholesky::Factor;
use super::normal::{HALF_LN_TWO_PI, lower_tail};
use super::peak::{MOST_HALVINGS, MOST_STEPS, SMALL_DECREMENT, SURE_DECREMENT};
use super::points::Mark;

/// The values are scaled anew where the scale found is more than this factor from the guessed one
/// (a pure number). Source: as for the straight line; rounding.
const WELL_SCALED: f64 = 1e3;

/// Rescalings, at most (a count). Source: as for the straight line.
const MOST_RESCALINGS: usize = 12;

/// Means that are sums of K columns, with a normal scatter, fitted by likelihood.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Columns<const K: usize> {
    /// Factor of each column.
    pub factors: [f64; K],
    /// Maximum-likelihood scale.
    pub scale: f64,
    /// Log-likelihood at the fit.
    pub log_likelihood: f64,
    /// Newton steps taken.
    pub steps: usize,
}

/// A place in Olsen's parameters: one over the scale, and the factors over the scale.
#[derive(Clone, Copy)]
struct Place<const K: usize> {
    theta: f64,
    delta: [f64; K],
}

/// The log-likelihood at a place with its derivatives.
struct Pass<const K: usize> {
    value: f64,
    /// By θ, then by each δ.
    by_theta: f64,
    by_delta: [f64; K],
    /// Minus the second derivatives, the last as its lower triangle.
    theta_theta: f64,
    theta_delta: [f64; K],
    delta_delta: [[f64; K]; K],
}

/// Fits the factors of K columns by the likelihood of values and bounds.
///
/// # Formula
/// ```text
/// z = θ·w − Σ δₖ·xₖ     w = (y − Σ gₖ·xₖ)/s     factor = gₖ + s·δₖ/θ     scale = s/θ
/// measured: ln θ − z²/2 − ½ ln 2π − ln s     below: ln Φ(z)     above: ln Φ(−z)
/// ```
/// where `x` are the columns, `g` and `s` the guessed factors and scale that the values are scaled
/// about. In (θ, δ) the function is concave; Newton's method with halved steps climbs it.
///
/// # Units
/// Those of the values and the columns.
///
/// # Limits
/// Columns of order one. K is small: each step solves a system of K + 1.
///
/// # None
/// Slices of different length, or a search that did not end: columns that depend on each other, or
/// measured values that the columns fit exactly.
///
/// # Reference
/// Olsen (1978), Econometrica 46:1211–1215 [from memory]. With two columns it is the line of
/// [`super::first_order()`], with all values measured least squares: held so in tests.
pub fn columns<const K: usize>(
    x: &[[f64; K]],
    y: &[f64],
    mark: &[Mark],
    guess: [f64; K],
    guessed_scale: f64,
) -> Option<Columns<K>> {
    if x.len() != y.len() || x.len() != mark.len() {
        return None;
    }
    let measured = mark.iter().filter(|&&mark| mark == Mark::Measured).count() as f64;
    let (mut about, mut unit) = (guess, guessed_scale);
    let mut taken = 0;
    for _ in 0..MOST_RESCALINGS {
        let w: Vec<f64> = x.iter().zip(y).map(|(x, y)| (y - dot(x, &about)) / unit).collect();
        let climb = climb(&Scaled { x, w: &w, mark })?;
        taken += climb.steps;
        let Place { theta, delta } = climb.at;
        let factors = std::array::from_fn(|k| about[k] + unit * delta[k] / theta);
        if (1.0 / WELL_SCALED..=WELL_SCALED).contains(&theta) {
            return Some(Columns {
                factors,
                scale: unit / theta,
                log_likelihood: climb.value - measured * unit.ln(),
                steps: taken,
            });
        }
        (about, unit) = (factors, unit / theta);
        if !(unit > 0.0 && unit.is_finite() && factors.iter().all(|f| f.is_finite())) {
            return None;
        }
    }
    None
}

/// Values scaled about a guess.
struct Scaled<'a, const K: usize> {
    x: &'a [[f64; K]],
    w: &'a [f64],
    mark: &'a [Mark],
}

struct Climb<const K: usize> {
    at: Place<K>,
    value: f64,
    steps: usize,
}

/// Newton's method from the guess, to the top or until the scale is far from the guessed one.
fn climb<const K: usize>(scaled: &Scaled<'_, K>) -> Option<Climb<K>> {
    let mut at = Place { theta: 1.0, delta: [0.0; K] };
    let mut pass = scaled.pass(&at);
    for steps in 1..=MOST_STEPS {
        let step = pass.step()?;
        let decrement = step.theta * pass.by_theta + dot(&step.delta, &pass.by_delta);
        if !decrement.is_finite() {
            return None;
        }
        let mut share = 1.0;
        let mut halvings = 0;
        (at, pass) = loop {
            let next = at.moved(&step, share);
            if next.theta > 0.0 {
                let next_pass = scaled.pass(&next);
                if decrement < SURE_DECREMENT || next_pass.value >= pass.value {
                    break (next, next_pass);
                }
            }
            share *= 0.5;
            halvings += 1;
            if halvings > MOST_HALVINGS {
                return None;
            }
        };
        let astray = !(1.0 / WELL_SCALED..=WELL_SCALED).contains(&at.theta);
        if astray || decrement < SMALL_DECREMENT {
            return Some(Climb { at, value: pass.value, steps });
        }
    }
    None
}

impl<const K: usize> Scaled<'_, K> {
    fn pass(&self, at: &Place<K>) -> Pass<K> {
        let mut sum = Pass {
            value: 0.0,
            by_theta: 0.0,
            by_delta: [0.0; K],
            theta_theta: 0.0,
            theta_delta: [0.0; K],
            delta_delta: [[0.0; K]; K],
        };
        let (ln_theta, one_over) = (at.theta.ln(), 1.0 / at.theta);
        for ((x, &w), &mark) in self.x.iter().zip(self.w).zip(self.mark) {
            let z = at.theta * w - dot(&at.delta, x);
            // Value, first derivative and minus the second derivative by z.
            let (value, slope, bend) = match mark {
                Mark::Measured => {
                    sum.by_theta += one_over;
                    sum.theta_theta += one_over * one_over;
                    (ln_theta - 0.5 * z * z - HALF_LN_TWO_PI, -z, 1.0)
                }
                Mark::Below => {
                    let tail = lower_tail(z);
                    (tail.ln, tail.slope, tail.bend)
                }
                Mark::Above => {
                    let tail = lower_tail(-z);
                    (tail.ln, -tail.slope, tail.bend)
                }
            };
            sum.value += value;
            sum.by_theta += slope * w;
            sum.theta_theta += bend * w * w;
            for k in 0..K {
                sum.by_delta[k] -= slope * x[k];
                sum.theta_delta[k] -= bend * w * x[k];
                for l in 0..=k {
                    sum.delta_delta[k][l] += bend * x[k] * x[l];
                }
            }
        }
        sum
    }
}

impl<const K: usize> Pass<K> {
    /// Newton's step: the δ are eliminated, then θ is solved for.
    fn step(&self) -> Option<Place<K>> {
        let factor = Factor::of(&self.delta_delta)?;
        let by_theta = factor.solve(self.theta_delta);
        let by_gradient = factor.solve(self.by_delta);
        let rest = self.theta_theta - dot(&self.theta_delta, &by_theta);
        if !(rest > 0.0 && rest.is_finite()) {
            return None;
        }
        let theta = (self.by_theta - dot(&self.theta_delta, &by_gradient)) / rest;
        let delta = std::array::from_fn(|k| by_gradient[k] - theta * by_theta[k]);
        Some(Place { theta, delta })
    }
}

impl<const K: usize> Place<K> {
    fn moved(&self, step: &Place<K>, share: f64) -> Place<K> {
        let delta = std::array::from_fn(|k| self.delta[k] + share * step.delta[k]);
        Place { theta: self.theta + share * step.theta, delta }
    }
}

fn dot<const K: usize>(x: &[f64; K], y: &[f64; K]) -> f64 {
    x.iter().zip(y).map(|(x, y)| x * y).sum()
}
