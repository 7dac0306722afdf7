//! How much more sampling would settle what is open.

use crate::fit::Fit;
use crate::judge::Facts;
use crate::numerics::rounds::Dates;
use crate::numerics::{Plan, median_spacing, rounds_to_decisive, rounds_to_level};
use crate::terms::MoreRounds;

/// The chance with which the next rounds are to settle it.
const POWER: f64 = 0.8;
/// Two rounds a year.
const HALF_YEARLY: f64 = 0.5;

/// Rounds to a decision, each count independent of the others.
#[must_use]
pub fn more_rounds(facts: &Facts<'_>, fit: &Fit, t: &[f64]) -> MoreRounds {
    let Some(step) = median_spacing(t) else { return MoreRounds::default() };
    let plan = Plan { step, confidence: fit.confidence, power: POWER };
    let half_yearly = Plan { step: HALF_YEARLY, ..plan };
    let dates = Dates::of(t);
    let required = facts
        .limit()
        .zip(facts.series.goal_date)
        .and_then(|(limit, goal)| fit.required_rate(limit, goal));
    MoreRounds {
        decisive: rounds_to_decisive(t, &fit.line, &plan),
        decisive_half_yearly: rounds_to_decisive(t, &fit.line, &half_yearly),
        level: facts.limit().and_then(|limit| rounds_to_level(t, &fit.line, limit.ln(), &plan)),
        at_required_rate: required
            .and_then(|required| dates.rounds(required, fit.line.sd, &plan, 0)),
        smallest_rate_shown: dates.smallest_rate_shown(fit.line.sd, fit.confidence),
    }
}
