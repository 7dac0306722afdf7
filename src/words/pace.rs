//! Paces in words.

use crate::terms::Pace;

/// The short name.
#[must_use]
pub fn label(pace: Pace) -> &'static str {
    match pace {
        Pace::Ahead => "ahead of the goal",
        Pace::Behind => "behind the goal",
        Pace::Unclear => "unclear against the goal",
    }
}

/// The rule that gives this pace.
#[must_use]
pub fn meaning(pace: Pace) -> &'static str {
    match pace {
        Pace::Ahead => {
            "The latest reach date is on or before the goal date, or the verdict is below. Never \
             given where a better model denies the date, where the interval adjusted for \
             correlation changes the verdict, or where the last results deny the line."
        }
        Pace::Behind => {
            "The earliest reach date is after the goal date, or the series rises and its level is \
             over the limit."
        }
        Pace::Unclear => {
            "Neither ahead nor behind: the interval holds the goal date or lacks an end."
        }
    }
}

/// The rule as a formula.
#[must_use]
pub fn formula(pace: Pace) -> Option<&'static str> {
    match pace {
        Pace::Ahead => Some("reach_latest <= goal_date"),
        Pace::Behind => Some("reach_earliest > goal_date"),
        Pace::Unclear => None,
    }
}
