//! The answer again, under other rules: points, fit, projection, verdict, dates.

use super::Setup;
use crate::fit::{FitRules, fit};
use crate::judge::{Facts, shown, verdict};
use crate::project::project;
use crate::series::{MergeRules, points};
use crate::terms::Answer;

/// What the data of a series say under other merge rules; everything else stays.
#[must_use]
pub fn answer(facts: &Facts<'_>, merge: &MergeRules, setup: &Setup<'_>) -> Answer {
    let points = points(facts.series, merge);
    let rules = FitRules { needs: setup.rate_needs, confidence: facts.rules.confidence };
    let fitted = fit(&points, &rules);
    let limit = facts.limit();
    let projection = fitted.as_ref().ok().zip(limit).map(|(fit, limit)| project(fit, limit));
    let again = Facts {
        points: &points,
        fit: fitted.as_ref().map_err(|why| *why),
        projection: projection.as_ref(),
        // Kendall's test decides no verdict and no date.
        kendall: None,
        ..*facts
    };
    let judged = verdict(&again);
    Answer {
        rate: fitted.as_ref().ok().map(|fit| fit.rate.0),
        why_no_rate: judged.why_no_rate,
        verdict: judged.verdict,
        reach: shown(&again, &judged).reach,
    }
}
