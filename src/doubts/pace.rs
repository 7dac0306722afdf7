//! The pace after all refits: never `ahead` where a better model denies the date, or where
//! correlation allowed for changes the verdict.

use super::Doubts;
use crate::judge::{Facts, Judged, Shown, pace as plain};
use crate::terms::Pace;

/// The pace of a series at full effort.
#[must_use]
pub fn pace(facts: &Facts<'_>, judged: &Judged, shown: &Shown, doubts: &Doubts) -> Option<Pace> {
    let denied = doubts.alternative.is_some_and(|alternative| alternative.denies)
        || doubts.adjusted.is_some_and(|adjusted| adjusted.changes_verdict);
    plain(facts, judged, shown).map(|pace| match pace {
        Pace::Ahead if denied => Pace::Unclear,
        other => other,
    })
}
