//! The reach date held against the goal date.

use super::dates::Shown;
use super::facts::Facts;
use super::verdict::Judged;
use crate::terms::{Pace, Verdict};

/// The pace of a series; none without a goal or a limit, or for `undetected` and `too-few`.
#[must_use]
pub fn pace(facts: &Facts<'_>, judged: &Judged, shown: &Shown) -> Option<Pace> {
    let goal = facts.series.goal_date?;
    let limit = facts.limit()?;
    if matches!(judged.verdict, Verdict::Undetected | Verdict::TooFew) {
        return None;
    }
    let over = facts.fit.is_ok_and(|fit| fit.level_now() > limit);
    let met = shown.latest_before_record || shown.latest.is_some_and(|latest| latest <= goal);
    Some(if judged.verdict == Verdict::Below || (met && !judged.results_deny_line) {
        Pace::Ahead
    } else if shown.earliest.is_some_and(|earliest| earliest > goal)
        || (judged.verdict == Verdict::Rising && over)
    {
        Pace::Behind
    } else {
        Pace::Unclear
    })
}

/// Whether the series stands in the way of the site's date: it has a limit, its well is not
/// background, it is neither below nor undetected under low enough limits, and it has no reach
/// date with a latest, or a better model denies the date. One that met its limit before its record does not stand in the way.
#[must_use]
pub fn stands_in_the_way(
    facts: &Facts<'_>,
    judged: &Judged,
    shown: &Shown,
    role: crate::site::Role,
    denied: bool,
) -> bool {
    let Some(limit) = facts.limit() else { return false };
    let seen_low_enough =
        || facts.last(super::facts::LAST_DATES).iter().all(|value| value.reading.meets(limit));
    if role == crate::site::Role::Background || judged.verdict == Verdict::Below {
        return false;
    }
    if judged.verdict == Verdict::Undetected && seen_low_enough() {
        return false;
    }
    // The last results, or a better model, deny the date that the line gives.
    if judged.results_deny_line || denied {
        return true;
    }
    let met_before = shown.latest_before_record;
    !met_before && (shown.reach.is_none() && !reach_before(facts) || shown.latest.is_none())
}

/// Whether the median met the limit before the record began.
fn reach_before(facts: &Facts<'_>) -> bool {
    facts.projection.and_then(|projection| projection.reach).is_some_and(|reach| reach < 0.0)
}
