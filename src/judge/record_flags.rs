//! Flags about the record: how long, how dense, how old, how many non-detects.

use chrono::NaiveDate;

use super::facts::Facts;
use crate::numerics::{falling_p, median};
use crate::terms::{Figure, Flag, FlagCode, Reading, years_between};

/// Raises what holds.
#[must_use]
pub fn flags(facts: &Facts<'_>) -> Vec<Flag> {
    let mut flags = Vec::new();
    counts(facts, &mut flags);
    let Some(span) = facts.points.span() else { return flags };
    let values = facts.values();
    let steps: Vec<f64> =
        values.windows(2).map(|pair| years_between(pair[0].date, pair[1].date).0).collect();
    // A single date covers no time and has no spacing.
    let covered = span.years().0 + median(&steps).unwrap_or_default();
    let covered = (covered * 10.0).round() / 10.0;
    let needed = facts.rules.flags.short_record_years;
    if covered < needed {
        flags.push(Flag::raised(FlagCode::ShortRecord, covered, needed));
    }
    flags.extend(gap(&steps));
    if facts.is_stale()
        && let Some(age) = facts.age()
    {
        flags.push(Flag::raised(FlagCode::Stale, age, facts.rules.stale_after_years));
    }
    non_detects(facts, span.first, &mut flags);
    flags
}

/// Fewer dates or detects than a date needs.
fn counts(facts: &Facts<'_>, flags: &mut Vec<Flag>) {
    #[allow(clippy::cast_precision_loss)] // counts of dates
    let mut under = |code, has: usize, needs: usize| {
        if has < needs {
            flags.push(Flag::raised(code, has as f64, needs as f64));
        }
    };
    under(FlagCode::FewDates, facts.points.fitted().count(), facts.rules.date_needs.dates);
    under(FlagCode::FewDetects, facts.measured(), facts.rules.date_needs.detects);
}

/// A gap of more than twice the median spacing and more than a year.
fn gap(steps: &[f64]) -> Option<Flag> {
    const TIMES_SPACING: f64 = 2.0;
    const LEAST_YEARS: f64 = 1.0;
    let spacing = median(steps)?;
    let longest = steps.iter().copied().max_by(f64::total_cmp)?;
    let threshold = (TIMES_SPACING * spacing).max(LEAST_YEARS);
    (longest > threshold).then(|| Flag::raised(FlagCode::Gap, longest, threshold))
}

/// How many, against which limits, and whether those fall.
fn non_detects(facts: &Facts<'_>, first: NaiveDate, flags: &mut Vec<Flag>) {
    let values = facts.values();
    let limits: Vec<(f64, f64)> = values
        .iter()
        .filter_map(|value| match value.reading {
            Reading::Below(limit) => Some((years_between(first, value.date).0, limit)),
            _ => None,
        })
        .collect();
    #[allow(clippy::cast_precision_loss)] // counts of dates
    let (dates, seen) = (values.len() as f64, facts.detects() as f64);
    let share = (dates - seen) / dates;
    let most = facts.rules.flags.mostly_non_detects;
    if share > most {
        flags.push(Flag::raised(FlagCode::MostlyNonDetects, share, most));
    }
    if let Some(limit) = facts.limit() {
        let over = limits.iter().filter(|(_, own)| *own > limit).count();
        if over > 0 {
            #[allow(clippy::cast_precision_loss)] // a count of dates
            let figure = over as f64;
            flags.push(Flag::raised(FlagCode::ReportingLimitAboveLimit, figure, limit));
        }
    }
    flags.extend(falling_limits(&limits));
    #[allow(clippy::cast_precision_loss)] // counts of dates
    if let Ok(fit) = facts.fit
        && fit.line.non_detects > 0
    {
        const ALLOWED: f64 = 0.1;
        let share = fit.line.uninformative as f64 / fit.line.non_detects as f64;
        if share > ALLOWED {
            flags.push(Flag::raised(FlagCode::UninformativeNonDetects, share, ALLOWED));
        }
    }
    #[allow(clippy::cast_precision_loss)] // a count of results
    if facts.points.recensored > 0 {
        let figure = Figure::Number(facts.points.recensored as f64);
        flags.push(Flag::fact(FlagCode::EstimatedRecensored, figure));
    }
    #[allow(clippy::cast_precision_loss)] // a count of results
    if facts.points.substituted > 0 {
        let figure = Figure::Number(facts.points.substituted as f64);
        flags.push(Flag::fact(FlagCode::Substituted, figure));
    }
    let lost = facts.low_results_lost();
    if lost > 0.0 {
        flags.push(Flag::fact(FlagCode::LowResultsLost, Figure::Number(lost)));
    }
}

/// One-sided Kendall p of the non-detects' limits, where the highest is at least twice the lowest.
fn falling_limits(limits: &[(f64, f64)]) -> Option<Flag> {
    const P: f64 = 0.05;
    const RATIO: f64 = 2.0;
    let (t, own): (Vec<f64>, Vec<f64>) = limits.iter().copied().unzip();
    let highest = own.iter().copied().max_by(f64::total_cmp)?;
    let lowest = own.iter().copied().min_by(f64::total_cmp)?;
    let p = falling_p(&t, &own)?;
    (p < P && highest >= RATIO * lowest)
        .then(|| Flag::raised(FlagCode::FallingReportingLimits, p, P))
}
