//! The verdict: the first rule that holds.

use super::facts::{Facts, LAST_DATES};
use crate::fit::{Fit, RateSign};
use crate::terms::{Method, Verdict, WhyNoRate};

/// A verdict with how it was reached.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Judged {
    /// The verdict.
    pub verdict: Verdict,
    /// How the rate or the verdict was computed.
    pub method: Option<Method>,
    /// Why there is no rate.
    pub why_no_rate: Option<WhyNoRate>,
    /// The line is under the limit, but the last results are not.
    pub results_deny_line: bool,
}

/// The fewest fitted dates for `below` by level.
const BELOW_DATES: usize = 8;
/// The last dates that must each meet the limit for `below` by level.
const LAST_MUST_MEET: usize = 4;
/// The fewest rounds that the last dates must lie in for `below` by count.
const COUNT_ROUNDS: usize = 4;
/// The fewest years that the last dates must span for `below` by count.
const COUNT_YEARS: f64 = 1.5;

/// Judges one series.
#[must_use]
pub fn verdict(facts: &Facts<'_>) -> Judged {
    let plain = |verdict| Judged {
        verdict,
        method: facts.fit.ok().map(|fit| fit.method),
        why_no_rate: facts.fit.err(),
        results_deny_line: false,
    };
    if facts.points.fitted().next().is_some() && facts.detects() == 0 {
        return plain(Verdict::Undetected);
    }
    let fit = match facts.fit {
        Ok(fit) => fit,
        Err(_) if below_by_count(facts) => {
            return Judged { method: Some(Method::Count), ..plain(Verdict::Below) };
        }
        Err(_) => return plain(Verdict::TooFew),
    };
    if fit.sign() == RateSign::Rising {
        return plain(Verdict::Rising);
    }
    let line_below = line_is_below(facts, fit);
    if line_below && last_meet(facts) {
        return plain(Verdict::Below);
    }
    let rest = if fit.sign() == RateSign::Falling {
        Verdict::Attenuating
    } else if within_margin(fit, facts.rules.flat_margin) {
        Verdict::Flat
    } else {
        Verdict::Undecided
    };
    Judged { results_deny_line: line_below, ..plain(rest) }
}

/// The upper end of the level at the last used date is at or under the limit, on enough dates
/// that are not old.
fn line_is_below(facts: &Facts<'_>, fit: &Fit) -> bool {
    let under = facts.limit().is_some_and(|limit| fit.level_now_ln.high <= limit.ln());
    under && !facts.is_stale() && facts.points.fitted().count() >= BELOW_DATES
}

/// Each of the last dates is a detect at or under the limit, or a non-detect whose limit is.
fn last_meet(facts: &Facts<'_>) -> bool {
    facts.limit().is_some_and(|limit| {
        facts.last(LAST_MUST_MEET).iter().all(|value| value.reading.meets(limit))
    })
}

/// Too little for a rate, and yet long enough at or under the limit.
fn below_by_count(facts: &Facts<'_>) -> bool {
    let Some(limit) = facts.limit() else { return false };
    let last = facts.last(LAST_DATES);
    let (Some(first), Some(newest)) = (last.first(), last.last()) else { return false };
    let years = crate::terms::years_between(first.date, newest.date).0;
    last.len() == LAST_DATES
        && facts.rounds(&last) >= COUNT_ROUNDS
        && years >= COUNT_YEARS
        && !facts.is_stale()
        && last.iter().all(|value| value.reading.meets(limit))
}

fn within_margin(fit: &Fit, margin: f64) -> bool {
    fit.rate_interval.low >= -margin && fit.rate_interval.high <= margin
}
