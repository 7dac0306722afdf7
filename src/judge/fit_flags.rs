//! Flags about the fit and its date.

use super::dates::Shown;
use super::facts::Facts;
use super::verdict::Judged;
use crate::fit::{Fit, RateSign};
use crate::numerics::{deletion_diagnostics, farthest};
use crate::terms::{Figure, Flag, FlagCode, Method, Verdict, WhyNoDate, years_between};

/// Raises what holds.
#[must_use]
pub fn flags(facts: &Facts<'_>, judged: &Judged, shown: &Shown) -> Vec<Flag> {
    let mut flags = Vec::new();
    if let Some(need) = shown.withheld {
        flags.push(Flag::fact(FlagCode::DateWithheld, Figure::Word(need.code())));
    }
    let Ok(fit) = facts.fit else { return flags };
    if fit.line.sd > std::f64::consts::LN_2 {
        flags.push(Flag::raised(FlagCode::WideScatter, fit.line.sd, std::f64::consts::LN_2));
    }
    flags.extend(outlier(facts, fit));
    if judged.results_deny_line {
        let over = facts
            .limit()
            .map(|limit| facts.last(4).iter().filter(|value| !value.reading.meets(limit)).count());
        #[allow(clippy::cast_precision_loss)] // a count of at most four
        let figure = over.map_or(Figure::Absent, |over| Figure::Number(over as f64));
        flags.push(Flag::fact(FlagCode::ResultsDenyLine, figure));
    }
    flags.extend(tests_disagree(facts, fit));
    flags.extend(open_end(facts, judged, shown));
    horizon(facts, fit, shown, &mut flags);
    flags
}

/// Bonferroni p of the largest externally studentized residual, where every value is measured.
fn outlier(facts: &Facts<'_>, fit: &Fit) -> Option<Flag> {
    const P: f64 = 0.05;
    if fit.method != Method::LeastSquares {
        return None;
    }
    let slices = facts.points.slices();
    let found = farthest(&deletion_diagnostics(&slices.t, &slices.y)?)?;
    (found.bonferroni_p < P).then(|| Flag::raised(FlagCode::Outlier, found.bonferroni_p, P))
}

/// The rate's interval and Kendall's p at the same level say different things.
fn tests_disagree(facts: &Facts<'_>, fit: &Fit) -> Option<Flag> {
    let kendall = facts.kendall?;
    let level = 1.0 - facts.rules.confidence;
    let by_rank = match kendall.p < level {
        false => RateSign::HoldsZero,
        true if kendall.s < 0.0 => RateSign::Falling,
        true => RateSign::Rising,
    };
    (by_rank != fit.sign()).then(|| Flag::raised(FlagCode::TestsDisagree, kendall.p, level))
}

/// An end of the reach interval that does not exist, or no interval at all.
fn open_end(facts: &Facts<'_>, judged: &Judged, shown: &Shown) -> Option<Flag> {
    let speaks =
        matches!(judged.verdict, Verdict::Attenuating | Verdict::Flat | Verdict::Undecided);
    let projection = facts.projection?;
    if !speaks || shown.withheld.is_some() {
        return None;
    }
    if projection.not_located {
        Some(Flag::fact(FlagCode::NotLocated, Figure::Absent))
    } else if projection.latest.is_none() {
        Some(Flag::fact(FlagCode::Unbounded, Figure::Word("latest")))
    } else {
        None
    }
}

/// How far ahead the date lies.
fn horizon(facts: &Facts<'_>, fit: &Fit, shown: &Shown, flags: &mut Vec<Flag>) {
    if let Some(date) = shown.reach.or(shown.exceed) {
        let ahead = years_between(fit.used.last, date).0;
        if ahead > fit.length().0 {
            flags.push(Flag::raised(FlagCode::FarExtrapolation, ahead, fit.length().0));
        }
        if ahead > facts.rules.horizon_years {
            flags.push(Flag::raised(FlagCode::BeyondHorizon, ahead, facts.rules.horizon_years));
        }
    }
    if shown.beyond_calendar || shown.why == Some(WhyNoDate::BeyondCalendar) {
        flags.push(Flag::fact(FlagCode::BeyondCalendar, Figure::Absent));
    }
}
