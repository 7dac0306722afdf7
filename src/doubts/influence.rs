//! Points and windows on which the answer hangs.

use chrono::{Months, NaiveDate};

use super::Setup;
use crate::fit::{Fit, FitRules, RateSign, fit as fit_points};
use crate::judge::Facts;
use crate::numerics::{
    Crossing, Points, deletion_diagnostics, farthest_left_out, left_out, worth_leaving_out,
};
use crate::series::{LeaveOut, MergeRules, Window, points};
use crate::terms::{Figure, Flag, FlagCode, Method, date_after};

/// At most as many dates are left out one by one (those with the largest Cook's distance; with
/// non-detects, which have none, evenly over the record).
pub const MOST_LEFT_OUT: usize = 200;
/// Cook's distance over which a point is influential.
const COOK: f64 = 1.0;
/// Bonferroni p under which a point is an outlier.
const OUTLIER_P: f64 = 0.05;

/// Raises what holds.
#[must_use]
pub fn flags(facts: &Facts<'_>, fit: &Fit, numeric: Points<'_>, setup: &Setup<'_>) -> Vec<Flag> {
    let mut flags = Vec::new();
    let y0 = facts.limit().map(f64::ln);
    let which = worth_leaving_out(numeric, MOST_LEFT_OUT);
    let without = left_out(numeric, &fit.line, &which);
    // Least squares has its outlier without refits.
    if fit.method == Method::CensoredLikelihood
        && let Some(found) = farthest_left_out(&without, fit.line.detects)
        && found.bonferroni_p < OUTLIER_P
    {
        flags.push(Flag::raised(FlagCode::Outlier, found.bonferroni_p, OUTLIER_P));
    }
    let moved = without
        .iter()
        .filter_map(|one| one.line.ok())
        .find_map(|line| moves(fit, y0, line.slope, y0.and_then(|y0| line.meets(y0))));
    let cook = (fit.method == Method::LeastSquares)
        .then(|| deletion_diagnostics(numeric.t(), numeric.y()))
        .flatten()
        .and_then(|points| points.iter().filter_map(|p| p.cook).max_by(f64::total_cmp))
        .filter(|cook| *cook > COOK);
    match (moved, cook) {
        (Some(figure), _) => flags.push(Flag::fact(FlagCode::InfluentialPoint, figure)),
        (None, Some(cook)) => {
            flags.push(Flag::raised(FlagCode::InfluentialPoint, cook, COOK));
        }
        (None, None) => {}
    }
    flags.extend(window(facts, fit, y0, setup));
    flags
}

/// The refitted date, where a refit puts it outside the interval or turns the rate's sign.
fn moves(fit: &Fit, y0: Option<f64>, slope: f64, meets: Option<f64>) -> Option<Figure> {
    let shown = |years: Option<f64>| {
        years
            .and_then(|years| date_after(fit.used.first, years))
            .map_or(Figure::Absent, Figure::Date)
    };
    // Where the rate's interval holds zero every date can turn its sign: that is no news.
    let shown_sign = fit.sign() != RateSign::HoldsZero;
    if shown_sign && slope * fit.line.slope < 0.0 {
        return Some(shown(meets.filter(|_| slope < 0.0)));
    }
    let Some(Crossing::Located { low, high, .. }) =
        y0.map(|y0| fit.line.crossing(y0, fit.confidence)).filter(|_| fit.line.slope < 0.0)
    else {
        return None;
    };
    let outside = meets.is_none_or(|meets| meets < low || meets > high);
    outside.then(|| shown(meets))
}

/// Without the first year (if three quarters of the dates and eight remain), or without the
/// highest value.
fn window(facts: &Facts<'_>, fit: &Fit, y0: Option<f64>, setup: &Setup<'_>) -> Option<Flag> {
    const SHARE: f64 = 0.75;
    const DATES: usize = 8;
    let dates: Vec<NaiveDate> = facts.points.fitted().map(|value| value.date).collect();
    let year_later = fit.used.first.checked_add_months(Months::new(12))?;
    let remaining = dates.iter().filter(|date| **date >= year_later).count();
    #[allow(clippy::cast_precision_loss)] // counts of dates
    let enough = remaining >= DATES && remaining as f64 >= SHARE * dates.len() as f64;
    let without_year = MergeRules {
        window: Window { from: Some(year_later), to: setup.merge.window.to },
        ..*setup.merge
    };
    let without_highest = MergeRules { leave_out: LeaveOut::Highest, ..*setup.merge };
    let rules = FitRules { needs: setup.rate_needs, confidence: fit.confidence };
    let again = |merge: &MergeRules| -> Option<Figure> {
        let other = fit_points(&points(facts.series, merge), &rules).ok()?;
        // Times of the other fit count from its own first date.
        let shift = fit.years(other.used.first);
        let meets = y0.map(|y0| (y0 - other.line.intercept) / other.line.slope + shift);
        moves(fit, y0, other.line.slope, meets.filter(|meets| meets.is_finite()))
    };
    let found = enough.then(|| again(&without_year)).flatten().or_else(|| again(&without_highest));
    found.map(|figure| Flag::fact(FlagCode::WindowMovesDate, figure))
}
