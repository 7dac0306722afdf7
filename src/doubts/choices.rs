//! What would change the answer: the same series under every choice that could have been made
//! otherwise.

use std::collections::BTreeMap;

use chrono::NaiveDate;

use super::Setup;
use super::influence::MOST_LEFT_OUT;
use super::rerun::answer;
use crate::judge::{Facts, Judged, Shown};
use crate::numerics::{Points as NumericPoints, worth_leaving_out};
use crate::series::{LeaveOut, MergeRules, SampleRole, Window};
use crate::site::{Duplicates, NonDetects};
use crate::terms::{Answer, Choice, ChoiceKind, ChoiceSpan, Verdict, years_between};

/// At most as many later beginnings of the fit are tried.
const MOST_STARTS: usize = 12;

/// Reruns the series under every choice.
#[must_use]
pub fn rerun_all(facts: &Facts<'_>, setup: &Setup<'_>) -> Vec<Choice> {
    let base = setup.merge;
    let mut rules: Vec<(ChoiceKind, Option<NaiveDate>, MergeRules)> = Vec::new();
    let from =
        |date| MergeRules { window: Window { from: Some(date), to: base.window.to }, ..*base };
    for date in starts(facts) {
        rules.push((ChoiceKind::WindowStart, Some(date), from(date)));
    }
    for date in left_out_dates(facts) {
        let rule = MergeRules { leave_out: LeaveOut::Date(date), ..*base };
        rules.push((ChoiceKind::DateLeftOut, Some(date), rule));
    }
    let highest = MergeRules { leave_out: LeaveOut::Highest, ..*base };
    rules.push((ChoiceKind::HighestLeftOut, None, highest));
    if facts.points.fitted().any(|value| !value.is_detect()) {
        for (kind, non_detects) in [
            (ChoiceKind::NonDetectsAtLimit, NonDetects::AtLimit),
            (ChoiceKind::NonDetectsAtHalf, NonDetects::AtHalf),
        ] {
            rules.push((kind, None, MergeRules { non_detects, ..*base }));
        }
    }
    if facts.points.fitted().any(|value| value.estimated) {
        let rule = MergeRules { leave_out: LeaveOut::Estimated, ..*base };
        rules.push((ChoiceKind::EstimatedOut, None, rule));
    }
    let has_duplicates = facts.series.candidates.iter().any(|c| c.role == SampleRole::Duplicate);
    if has_duplicates && base.duplicates == Duplicates::Primary {
        let rule = MergeRules { duplicates: Duplicates::Average, ..*base };
        rules.push((ChoiceKind::DuplicatesAveraged, None, rule));
    }
    for date in events(facts, setup) {
        rules.push((ChoiceKind::SinceEvent, Some(date), from(date)));
    }
    rules
        .into_iter()
        .map(|(kind, date, rule)| Choice { kind, date, answer: answer(facts, &rule, setup) })
        .collect()
}

/// Later beginnings of the fit: dates of the window, evenly, while eight dates remain.
fn starts(facts: &Facts<'_>) -> Vec<NaiveDate> {
    const DATES: usize = 8;
    let dates: Vec<NaiveDate> = facts.points.fitted().map(|value| value.date).collect();
    let last = dates.len().saturating_sub(DATES);
    let tried = last.min(MOST_STARTS);
    (1..=tried).map(|i| dates[i * last / tried]).collect()
}

/// Dates that are left out one by one.
fn left_out_dates(facts: &Facts<'_>) -> Vec<NaiveDate> {
    let dates: Vec<NaiveDate> = facts.points.fitted().map(|value| value.date).collect();
    let slices = facts.points.slices();
    match NumericPoints::new(&slices.t, &slices.y, &slices.mark) {
        Ok(points) => {
            let which = worth_leaving_out(points, MOST_LEFT_OUT);
            which.into_iter().filter_map(|at| dates.get(at).copied()).collect()
        }
        Err(_) => Vec::new(),
    }
}

/// Events of the well inside the window that do not begin it already.
fn events(facts: &Facts<'_>, setup: &Setup<'_>) -> Vec<NaiveDate> {
    let well = &facts.series.key.well;
    let inside = |date: NaiveDate| {
        facts.points.span().is_some_and(|span| span.first < date && date < span.last)
    };
    let mut dates: Vec<NaiveDate> = setup
        .events
        .iter()
        .filter(|event| event.wells.is_empty() || event.wells.contains(well))
        .map(|event| event.date)
        .filter(|date| inside(*date) && setup.merge.window.from != Some(*date))
        .collect();
    dates.sort_unstable();
    dates.dedup();
    dates
}

/// The span of what the reruns of each kind say.
#[must_use]
pub fn spans(reruns: &[Choice]) -> Vec<ChoiceSpan> {
    let mut kinds: BTreeMap<ChoiceKind, Vec<&Answer>> = BTreeMap::new();
    for choice in reruns {
        kinds.entry(choice.kind).or_default().push(&choice.answer);
    }
    kinds
        .into_iter()
        .map(|(kind, answers)| {
            let rates: Vec<f64> = answers.iter().filter_map(|answer| answer.rate).collect();
            let lowest = rates.iter().copied().min_by(f64::total_cmp);
            let highest = rates.iter().copied().max_by(f64::total_cmp);
            let dates = || answers.iter().filter_map(|answer| answer.reach);
            let mut verdicts: Vec<Verdict> = answers.iter().map(|answer| answer.verdict).collect();
            verdicts.sort_unstable();
            verdicts.dedup();
            ChoiceSpan {
                kind,
                reruns: answers.len(),
                rates: lowest.zip(highest),
                dates: dates().min().zip(dates().max()),
                without_date: answers.iter().filter(|answer| answer.reach.is_none()).count(),
                verdicts,
            }
        })
        .collect()
}

/// The single choice that matters most: one that changes the verdict before one that takes the
/// date away or gives one, before the largest move of the date, before the largest change of the
/// rate. Later beginnings of the fit come last among equals, since they also shorten the record.
#[must_use]
pub fn most_telling(
    facts: &Facts<'_>,
    judged: &Judged,
    shown: &Shown,
    reruns: &[Choice],
) -> Option<Choice> {
    let rate = facts.fit.ok()?.rate.0;
    let weight = |choice: &&Choice| {
        let answer = &choice.answer;
        let moved = match (answer.reach, shown.reach) {
            (Some(then), Some(now)) => years_between(now, then).0.abs(),
            (None, None) => 0.0,
            _ => f64::INFINITY,
        };
        let changed = answer.rate.map_or(f64::INFINITY, |other| (other - rate).abs());
        (answer.verdict != judged.verdict, moved, changed)
    };
    reruns
        .iter()
        .max_by(|a, b| {
            let (x, y) = (weight(a), weight(b));
            x.0.cmp(&y.0)
                .then(x.1.total_cmp(&y.1))
                .then((b.kind == ChoiceKind::WindowStart).cmp(&(a.kind == ChoiceKind::WindowStart)))
                .then(x.2.total_cmp(&y.2))
                .then(b.date.cmp(&a.date))
        })
        .copied()
}
