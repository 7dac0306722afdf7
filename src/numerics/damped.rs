//! The way up a hill that need not be concave: Newton steps, damped until they climb.

use super::cholesky::{Factor, dot};

/// Steps tried, taken or not, at most (a count). Source: worked examples take 5 to 30; a valley that
/// runs out to infinity is left after this.
const MOST_STEPS: usize = 300;

/// The decrement (twice the rise that an undamped step foresees, in log-likelihood) under which the
/// search ends. Source: a hundred-millionth of a standard error from the top.
const SMALL_DECREMENT: f64 = 1e-16;

/// A decrement under which a search that can climb no further ends well (log-likelihood). Source:
/// what rounding leaves of the logarithm of a sum over 100,000 values.
const ROUNDED_DECREMENT: f64 = 1e-7;

/// Damping at the start (share of the diagonal). Source: Marquardt (1963) takes 0.01; starts from a
/// grid are nearer.
const FIRST_DAMPING: f64 = 1e-3;

/// Factor by which damping falls after a step that climbed and rises after one that did not.
const DAMPING_FACTOR: f64 = 10.0;

/// Share of the rise foreseen under which damping grows although the step climbed (a pure number).
/// Source: Fletcher (1971) [from memory]; without it a step that overshoots to and fro may take
/// hundreds.
const POOR_SHARE: f64 = 0.25;

/// Share of the rise foreseen over which damping falls (a pure number). Source: as above.
const GOOD_SHARE: f64 = 0.75;

/// Damping under which it is left out (share of the diagonal).
const LEAST_DAMPING: f64 = 1e-9;

/// Damping over which no step is worth trying (share of the diagonal).
const MOST_DAMPING: f64 = 1e12;

/// A function at one place, with its gradient and an approximation to minus its second derivatives.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Hill<const N: usize> {
    /// Height.
    pub value: f64,
    /// First derivatives.
    pub gradient: [f64; N],
    /// Minus the second derivatives, or what stands for them; its diagonal not below zero.
    pub bend: [[f64; N]; N],
}

/// A top that was reached.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Top<const N: usize> {
    /// Where it is.
    pub at: [f64; N],
    /// The function there.
    pub hill: Hill<N>,
    /// Steps tried.
    pub steps: usize,
}

/// A search that did not arrive.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Lost<const N: usize> {
    /// How far it came.
    pub at: [f64; N],
    /// The height there.
    pub value: f64,
    /// Steps tried.
    pub steps: usize,
}

/// Climbs from `start` to a top near it.
///
/// # Formula
/// ```text
/// (B + λ·diag B)·step = g     decrement = gᵀ·B⁻¹·g
/// ```
/// where `g` is the gradient and `B` stands for minus the second derivatives. λ falls tenfold after
/// a step that climbs over ¾ of what it foresaw, rises tenfold after one that climbs under ¼ of it or
/// not at all.
///
/// # Units
/// Those of the caller; the function is a log-likelihood or like one.
///
/// # Limits
/// 300 steps; the top is that of the hill the start stands on.
///
/// # Errors
/// [`Lost`]: no top within the steps, or a function that is not finite at the start.
///
/// # Reference
/// Marquardt (1963), J. SIAM 11:431–441 [from memory]. NIST "Misra1a" and "BoxBOD", R `SSasymp` on
/// `Loblolly`.
pub fn climb_damped<const N: usize>(
    start: [f64; N],
    function: impl Fn(&[f64; N]) -> Hill<N>,
) -> Result<Top<N>, Lost<N>> {
    let mut at = start;
    let mut hill = function(&at);
    let mut damping = FIRST_DAMPING;
    for steps in 0..MOST_STEPS {
        let lost = Lost { at, value: hill.value, steps };
        if !hill.value.is_finite() {
            return Err(lost);
        }
        let decrement = Factor::of(&hill.bend)
            .map_or(f64::INFINITY, |factor| dot(&factor.solve(hill.gradient), &hill.gradient));
        if decrement < SMALL_DECREMENT {
            return Ok(Top { at, hill, steps });
        }
        let climbed = stepped(&hill, damping).and_then(|step| {
            let next = moved(&at, &step)?;
            let next_hill = function(&next);
            let share = (next_hill.value - hill.value) / foreseen(&hill, &step);
            (next_hill.value > hill.value).then_some((next, next_hill, share))
        });
        // How much of the rise foreseen came about tells how far the approximation reaches.
        damping = match climbed {
            Some((next, next_hill, share)) => {
                (at, hill) = (next, next_hill);
                if share < POOR_SHARE {
                    (damping * DAMPING_FACTOR).max(FIRST_DAMPING)
                } else if share > GOOD_SHARE {
                    damping / DAMPING_FACTOR
                } else {
                    damping
                }
            }
            None => (damping * DAMPING_FACTOR).max(FIRST_DAMPING),
        };
        if damping < LEAST_DAMPING {
            damping = 0.0;
        } else if damping > MOST_DAMPING {
            let rounded = decrement < ROUNDED_DECREMENT;
            return if rounded { Ok(Top { at, hill, steps }) } else { Err(lost) };
        }
    }
    Err(Lost { at, value: hill.value, steps: MOST_STEPS })
}

/// The damped step.
fn stepped<const N: usize>(hill: &Hill<N>, damping: f64) -> Option<[f64; N]> {
    let mut bend = hill.bend;
    for (i, row) in bend.iter_mut().enumerate() {
        row[i] *= 1.0 + damping;
    }
    Some(Factor::of(&bend)?.solve(hill.gradient))
}

fn moved<const N: usize>(at: &[f64; N], step: &[f64; N]) -> Option<[f64; N]> {
    let next = std::array::from_fn(|i| at[i] + step[i]);
    next.iter().all(|x: &f64| x.is_finite()).then_some(next)
}

/// The rise of the parabola that gradient and bend describe.
fn foreseen<const N: usize>(hill: &Hill<N>, step: &[f64; N]) -> f64 {
    dot(&hill.gradient, step) - 0.5 * dot(&hill.bend.map(|row| dot(&row, step)), step)
}
