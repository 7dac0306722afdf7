//! The ends of a profile-likelihood interval: where the log-likelihood, at its best with one
//! quantity held, has fallen by half a cut-off.
//!
//! Two ways, which tests hold against each other: a joint Newton search in the quantity and the
//! two free numbers, which is fast, and a bracket with a maximisation inside, which always ends.

use super::likelihood::Likelihood;
use super::peak::{MOST_HALVINGS, MOST_STEPS, SMALL_DECREMENT, SURE_DECREMENT};
use super::target::{Held, HeldPass, Spread, Target};

/// Joint Newton steps, at most (a count). Source: ruled for this program; five or six arrive.
const JOINT_STEPS: usize = 12;

/// A joint step this small beside the distance from the estimate (a pure number) is the last.
/// Source: the step squares the error.
const SMALL_STEP: f64 = 1e-9;

/// Steps of the bracketed search, at most (a count). Source: 100 halvings exhaust f64.
const NESTED_STEPS: usize = 120;

/// A bracketed step this small beside the distance from the estimate (a pure number) is the last.
const FINE_STEP: f64 = 1e-13;

/// Doublings of a bracket, at most (a count). Source: 2⁴⁰⁰ standard errors; more would overflow.
const MOST_DOUBLINGS: usize = 400;

/// What a profile is made from.
#[derive(Clone, Copy, Debug)]
pub struct Profile<'a> {
    /// The likelihood.
    pub likelihood: &'a Likelihood,
    /// Its greatest logarithm.
    pub highest: f64,
    /// The best line and its variances.
    pub spread: &'a Spread,
    /// The effective number of values.
    pub effective: f64,
}

/// A stretch with exactly one end in it.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Stretch {
    /// What the interval is of.
    pub target: Target,
    /// A place that belongs to the interval.
    pub inside: f64,
    /// A place that does not; where it is infinite the search finds one by doubling.
    pub outside: f64,
    /// Where the end is expected.
    pub start: f64,
    /// The estimate, from which steps are measured.
    pub estimate: f64,
}

/// The best line with a quantity held.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Constrained {
    /// Twice the fall of the log-likelihood from its highest.
    pub fall: f64,
    /// Derivative of the fall by the quantity held.
    pub slope: f64,
}

impl Profile<'_> {
    /// The fall of the log-likelihood with the target held at `value`.
    ///
    /// # Formula
    /// ```text
    /// D(ψ) = 2·(max ℓ − max over θ, κ of ℓ(ψ, θ, κ))     D′ = −2·∂ℓ/∂ψ at that maximum
    /// ```
    ///
    /// # Units
    /// `value` scaled as the target says; the fall in log-likelihood.
    ///
    /// # Limits
    /// As [`super::peak::climb`].
    ///
    /// # None
    /// The inner search did not end.
    ///
    /// # Reference
    /// Murphy & van der Vaart (2000), J. Am. Stat. Assoc. 95:449–465 [from memory].
    pub fn held_at(&self, target: Target, value: f64) -> Option<Constrained> {
        let guess = self.spread.guess(target, value, self.effective);
        let held = Held::new(target, value, guess.lean);
        let (mut theta, mut kappa) = (guess.theta, 0.0);
        let mut pass = held.pass(self.likelihood, theta, kappa);
        for _ in 0..MOST_STEPS {
            let step = pass.solve(pass.gradient)?;
            let decrement = pair(step, pass.gradient);
            let mut share = 1.0;
            let mut halvings = 0;
            loop {
                let (next_theta, next_kappa) = (theta + share * step[0], kappa + share * step[1]);
                if next_theta > 0.0 {
                    let next = held.pass(self.likelihood, next_theta, next_kappa);
                    if decrement < SURE_DECREMENT || next.value >= pass.value {
                        (theta, kappa, pass) = (next_theta, next_kappa, next);
                        break;
                    }
                }
                share *= 0.5;
                halvings += 1;
                if halvings > MOST_HALVINGS {
                    return None;
                }
            }
            if decrement < SMALL_DECREMENT {
                let fall = 2.0 * (self.highest - pass.value);
                return Some(Constrained { fall: fall.max(0.0), slope: -2.0 * pass.by_held });
            }
        }
        None
    }

    /// The end in a stretch, by Newton steps in the quantity, θ and κ at once.
    ///
    /// # Formula
    /// ```text
    /// g = 0     √D = √c     D = 2(ℓ̂ − ℓ) − gᵀM⁻¹g     D′ = −2(∂ℓ/∂ψ + gᵀM⁻¹h)
    /// δψ = 2√D(√c − √D)/D′     (δθ, δκ) = M⁻¹(g + δψ·h)
    /// ```
    /// where `g` and `M` are the gradient and minus the second derivatives in (θ, κ), `h` the
    /// derivative of `g` by ψ, `c` the cut-off. The root of D is solved for, since it is nearly
    /// straight where D is nearly a parabola. A step that would leave the stretch is shortened.
    ///
    /// # Units
    /// Scaled, as the target says.
    ///
    /// # Limits
    /// Twelve steps.
    ///
    /// # None
    /// It did not arrive: the nested search decides then.
    ///
    /// # Reference
    /// After Venzon & Moolgavkar (1988), Appl. Stat. 37:87–94 [from memory]; held against
    /// [`Profile::nested`] in tests.
    pub fn joint(&self, stretch: &Stretch, cut_off: f64) -> Option<f64> {
        let Stretch { target, inside, outside, estimate, .. } = *stretch;
        let (low, high) = (inside.min(outside), inside.max(outside));
        let mut value = stretch.start;
        let guess = self.spread.guess(target, value, self.effective);
        let (mut theta, mut kappa, lean) = (guess.theta, 0.0, guess.lean);
        for _ in 0..JOINT_STEPS {
            let pass: HeldPass = Held::new(target, value, lean).pass(self.likelihood, theta, kappa);
            let climb = pass.solve(pass.gradient)?;
            let tilt = pass.solve(pass.across)?;
            let decrement = pair(climb, pass.gradient);
            let fall = 2.0 * (self.highest - pass.value) - decrement;
            let rise = -2.0 * (pass.by_held + pair(pass.gradient, tilt));
            let root = fall.max(0.0).sqrt();
            let mut by = 2.0 * root * (cut_off.sqrt() - root) / rise;
            if !by.is_finite() || by == 0.0 && root != cut_off.sqrt() {
                return None;
            }
            let small = by.abs() <= SMALL_STEP * (value - estimate).abs();
            let mut share = 1.0;
            if value + by <= low {
                share = 0.5 * (low - value) / by;
            } else if value + by >= high {
                share = 0.5 * (high - value) / by;
            }
            by *= share;
            let next_theta = theta + share * climb[0] + by * tilt[0];
            kappa += share * climb[1] + by * tilt[1];
            // The scale may not change sign; a quarter is a long way for one step.
            theta = next_theta.max(0.25 * theta);
            value += by;
            if small && decrement.abs() < SMALL_DECREMENT {
                return (low < value && value < high).then_some(value);
            }
        }
        None
    }

    /// The end in a stretch, by a bracket with a maximisation inside.
    ///
    /// # Formula
    /// ```text
    /// √D(ψ) = √c     by Newton steps kept inside a shrinking bracket, halved where they leave it
    /// ```
    ///
    /// # Units
    /// Scaled, as the target says.
    ///
    /// # Limits
    /// 400 doublings to find a bracket, 120 steps in it.
    ///
    /// # None
    /// No bracket, or an inner search that did not end.
    ///
    /// # Reference
    /// The safeguard is that of Press et al., Numerical Recipes, 9.4 [from memory, written anew].
    pub fn nested(&self, stretch: &Stretch, cut_off: f64) -> Option<f64> {
        let Stretch { target, mut inside, estimate, .. } = *stretch;
        let mut outside = stretch.outside;
        let mut value = stretch.start;
        if outside.is_infinite() {
            let mut reach = value - inside;
            for _ in 0..MOST_DOUBLINGS {
                if self.held_at(target, inside + reach)?.fall > cut_off {
                    outside = inside + reach;
                    break;
                }
                inside += reach;
                reach *= 2.0;
            }
            if outside.is_infinite() {
                return None;
            }
        }
        let mut last_step = f64::INFINITY;
        for _ in 0..NESTED_STEPS {
            let here = self.held_at(target, value)?;
            if here.fall > cut_off {
                outside = value;
            } else {
                inside = value;
            }
            let root = here.fall.sqrt();
            let mut next = value + 2.0 * root * (cut_off.sqrt() - root) / here.slope;
            let within = inside.min(outside) < next && next < inside.max(outside);
            if !(within && (next - value).abs() <= 0.5 * last_step) {
                next = 0.5 * (inside + outside);
            }
            last_step = (next - value).abs();
            value = next;
            if last_step <= FINE_STEP * (value - estimate).abs() {
                return Some(value);
            }
        }
        None
    }
}

fn pair(x: [f64; 2], y: [f64; 2]) -> f64 {
    x[0] * y[0] + x[1] * y[1]
}
