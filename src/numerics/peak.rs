//! The highest point of a censored likelihood, by Newton's method.

use super::likelihood::{Likelihood, Pass};
use super::scaling::Olsen;

/// Newton steps from one start, at most (a count). Source: a fit takes 4 to 8; a scale that is
/// wrong by a factor of a million takes 20 more, since a step at most doubles it.
pub const MOST_STEPS: usize = 200;

/// The decrement (twice the rise in log-likelihood that a step foresees) under which a step is the
/// last. Source: methods note 3.2; the step squares the error, so what is left is near rounding.
pub const SMALL_DECREMENT: f64 = 1e-12;

/// Halvings of one step, at most (a count). Source: 2⁻⁶⁰ of a step is nothing in f64.
pub const MOST_HALVINGS: usize = 60;

/// The climb stops for the likelihood to be scaled anew where the scale is more than this factor
/// from the guessed one (a pure number). Source: keeps moments of measured values good to ten
/// digits, since their rounding grows with the square of the factor.
const OUT_OF_SCALE: f64 = 1e3;

/// A decrement under which a full step is taken without asking whether it climbs (a pure number).
/// Source: well inside the region of quadratic convergence, where a rise is lost in rounding.
pub const SURE_DECREMENT: f64 = 1e-6;

/// A maximum of the likelihood.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Peak {
    /// Where it is.
    pub at: Olsen,
    /// The likelihood and its derivatives there.
    pub pass: Pass,
    /// Newton steps taken.
    pub steps: usize,
    /// Decrement of the last step.
    pub decrement: f64,
}

/// Climbs to the maximum from `start`.
///
/// # Formula
/// ```text
/// step = B⁻¹·g     decrement = gᵀ·B⁻¹·g     halved until the log-likelihood rises
/// ```
/// where `g` is the gradient and `B` minus the matrix of second derivatives, in Olsen's
/// parameters. The function is concave, so that the start decides the number of steps only.
///
/// # Units
/// Scaled, as the likelihood's.
///
/// # Limits
/// 200 steps of at most 60 halvings.
///
/// # Errors
/// [`NoPeak`]: the search did not end, or the likelihood has to be scaled anew.
///
/// # Reference
/// Olsen (1978), Econometrica 46:1211–1215 [from memory]. Worked example W14; 916 real series.
pub fn climb(likelihood: &Likelihood, start: Olsen) -> Result<Peak, NoPeak> {
    let mut at = start;
    let mut pass = likelihood.pass(at);
    for steps in 1..=MOST_STEPS {
        let lost = NoPeak::NotReached { steps };
        let step = solve3(pass.bend, pass.gradient).ok_or(lost)?;
        let decrement: f64 = step.iter().zip(pass.gradient).map(|(s, g)| s * g).sum();
        if !decrement.is_finite() {
            return Err(lost);
        }
        let mut share = 1.0;
        let mut halvings = 0;
        let (next, next_pass) = loop {
            let next = moved(at, step, share);
            if next.a > 0.0 {
                let next_pass = likelihood.pass(next);
                if decrement < SURE_DECREMENT || next_pass.value >= pass.value {
                    break (next, next_pass);
                }
            }
            share *= 0.5;
            halvings += 1;
            if halvings > MOST_HALVINGS {
                return Err(lost);
            }
        };
        (at, pass) = (next, next_pass);
        if !(1.0 / OUT_OF_SCALE..=OUT_OF_SCALE).contains(&at.a) {
            return Err(NoPeak::OutOfScale { at, steps });
        }
        if decrement < SMALL_DECREMENT {
            return Ok(Peak { at, pass, steps, decrement });
        }
    }
    Err(NoPeak::NotReached { steps: MOST_STEPS })
}

/// Why a climb stopped short of the maximum.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum NoPeak {
    /// It did not arrive.
    NotReached {
        /// Steps taken.
        steps: usize,
    },
    /// The scale is far from the guessed one: scale the likelihood anew about `at` and go on.
    OutOfScale {
        /// How far it came.
        at: Olsen,
        /// Steps taken.
        steps: usize,
    },
}

fn moved(at: Olsen, step: [f64; 3], share: f64) -> Olsen {
    Olsen { a: at.a + share * step[0], b: at.b + share * step[1], c: at.c + share * step[2] }
}

/// Solves a symmetric positive definite system of three, by Cholesky's method.
///
/// # None
/// A matrix that is not positive definite in f64.
pub fn solve3(matrix: [[f64; 3]; 3], right: [f64; 3]) -> Option<[f64; 3]> {
    let l00 = root(matrix[0][0])?;
    let (l10, l20) = (matrix[1][0] / l00, matrix[2][0] / l00);
    let l11 = root(matrix[1][1] - l10 * l10)?;
    let l21 = (matrix[2][1] - l20 * l10) / l11;
    let l22 = root(matrix[2][2] - l20 * l20 - l21 * l21)?;
    let y0 = right[0] / l00;
    let y1 = (right[1] - l10 * y0) / l11;
    let y2 = (right[2] - l20 * y0 - l21 * y1) / l22;
    let x2 = y2 / l22;
    let x1 = (y1 - l21 * x2) / l11;
    let x0 = (y0 - l10 * x1 - l20 * x2) / l00;
    Some([x0, x1, x2])
}

fn root(square: f64) -> Option<f64> {
    (square > 0.0 && square.is_finite()).then(|| square.sqrt())
}
