//! Verdicts in words.

use crate::terms::Verdict;

/// The short name.
#[must_use]
pub fn label(verdict: Verdict) -> &'static str {
    match verdict {
        Verdict::Undetected => "undetected",
        Verdict::TooFew => "too few data",
        Verdict::Rising => "rising",
        Verdict::Below => "below the limit",
        Verdict::Attenuating => "attenuating",
        Verdict::Flat => "flat",
        Verdict::Undecided => "undecided",
    }
}

/// What a series with this verdict shows, in half a line.
#[must_use]
pub fn gloss(verdict: Verdict) -> &'static str {
    match verdict {
        Verdict::Undetected => "never detected in the window",
        Verdict::TooFew => "no rate can be fitted or allowed",
        Verdict::Rising => "concentrations go up",
        Verdict::Below => "level and last results at or under the limit",
        Verdict::Attenuating => "concentrations go down",
        Verdict::Flat => "shown to change by no more than the flat margin",
        Verdict::Undecided => "the data show neither a fall, a rise nor a standstill",
    }
}

/// The rule that gives this verdict, in full.
#[must_use]
pub fn meaning(verdict: Verdict) -> &'static str {
    match verdict {
        Verdict::Undetected => {
            "The series has one date or more in the window and not one detect. Whether the \
             reporting limits were low enough to see the limit is told by the flag \
             reporting-limit-above-limit."
        }
        Verdict::TooFew => {
            "No rate can be fitted, or the data are too few for one to be allowed; why_no_rate says \
             which. It is given before any other verdict but undetected, unless the last 8 dates \
             alone show the series below its limit (method count)."
        }
        Verdict::Rising => "The whole interval of the rate lies below zero: concentrations go up.",
        Verdict::Below => {
            "The series is not stale, has at least 8 fitted dates, the upper end of the level's \
             interval at the last used date is at or under the limit, and each of the last 4 dates \
             is a detect at or under the limit or a non-detect whose reporting limit is. Without a \
             fit: the last 8 dates, in 4 rounds or more over 1.5 years or more, all do so (method \
             count). It says what the data show, not that cleanup is complete."
        }
        Verdict::Attenuating => {
            "The whole interval of the rate lies above zero: concentrations go down."
        }
        Verdict::Flat => {
            "The whole interval of the rate lies within plus or minus flat-margin (default ln 2 / 20 \
             a year, a halving in 20 years): shown to stand still, which is more than no trend found."
        }
        Verdict::Undecided => {
            "The rate's interval holds zero and is wider than the flat margin: the data show neither \
             a fall, a rise nor a standstill. It is not the same as flat."
        }
    }
}

/// The rule as a formula.
#[must_use]
pub fn formula(verdict: Verdict) -> Option<&'static str> {
    Some(match verdict {
        Verdict::Undetected => "samples >= 1 and detects = 0",
        Verdict::TooFew => return None,
        Verdict::Rising => "rate_upper < 0",
        Verdict::Below => "level_now_upper <= limit and the last 4 dates at or under it",
        Verdict::Attenuating => "rate_lower > 0",
        Verdict::Flat => "-flat-margin <= rate_lower and rate_upper <= flat-margin",
        Verdict::Undecided => "rate_lower <= 0 <= rate_upper, and not flat",
    })
}
