//! Which dates are shown, and why one is not.

use chrono::NaiveDate;

use super::facts::Facts;
use super::verdict::Judged;
use crate::fit::{Fit, RateSign};
use crate::project::{Dated, dated};
use crate::terms::{Verdict, WhyNoDate, date_after};

/// The dates of a series as they stand in its row.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Shown {
    /// When the median meets the limit.
    pub reach: Option<NaiveDate>,
    /// Its early end.
    pub earliest: Option<NaiveDate>,
    /// Its late end.
    pub latest: Option<NaiveDate>,
    /// When the arithmetic mean meets the limit.
    pub mean: Option<NaiveDate>,
    /// When a rising line crosses the limit.
    pub exceed: Option<NaiveDate>,
    /// Its early end.
    pub exceed_earliest: Option<NaiveDate>,
    /// Why there is no reach date.
    pub why: Option<WhyNoDate>,
    /// The first date-need that is not met: no date is given then.
    pub withheld: Option<WhyNoDate>,
    /// The early end lies before the record: earlier than any date.
    pub earliest_before_record: bool,
    /// The late end lies before the record: met before any date.
    pub latest_before_record: bool,
    /// A date that exists lies after 9999-12-31.
    pub beyond_calendar: bool,
    /// The last date that people read as a date.
    pub horizon: Option<NaiveDate>,
}

/// The share of low results over which no date is given.
const LOW_RESULTS_ALLOWED: f64 = 0.1;

/// Decides which of the projected dates are shown.
#[must_use]
pub fn shown(facts: &Facts<'_>, judged: &Judged) -> Shown {
    let mut out = Shown { withheld: unmet_need(facts), ..Shown::default() };
    if let Ok(fit) = facts.fit {
        out.horizon = date_after(fit.used.last, facts.rules.horizon_years);
        if out.withheld.is_none() {
            fill(facts, fit, judged, &mut out);
        }
    }
    if out.reach.is_none() {
        out.why = Some(why(facts, judged, &out));
    }
    out
}

/// The first date-need that is not met.
fn unmet_need(facts: &Facts<'_>) -> Option<WhyNoDate> {
    let needs = facts.rules.date_needs;
    if facts.points.fitted().count() < needs.dates {
        Some(WhyNoDate::Dates)
    } else if facts.length().0 < needs.years {
        Some(WhyNoDate::Years)
    } else if facts.measured() < needs.detects {
        Some(WhyNoDate::Detects)
    } else if facts.low_results_lost() > LOW_RESULTS_ALLOWED {
        Some(WhyNoDate::LowResults)
    } else {
        None
    }
}

fn fill(facts: &Facts<'_>, fit: &Fit, judged: &Judged, out: &mut Shown) {
    let Some(projection) = facts.projection else { return };
    let mut beyond = false;
    let mut date = |years: Option<f64>| {
        let dated = years.map(|years| dated(fit, years));
        beyond |= dated == Some(Dated::BeyondCalendar);
        dated
    };
    let (reach, earliest, latest) =
        (date(projection.reach), date(projection.earliest), date(projection.latest));
    let (mean, exceed, exceed_earliest) =
        (date(projection.reach_mean), date(projection.exceed), date(projection.exceed_earliest));
    out.beyond_calendar = beyond;
    out.exceed = exceed.and_then(Dated::date);
    out.exceed_earliest = exceed_earliest.and_then(Dated::date);
    if judged.results_deny_line {
        return;
    }
    out.reach = reach.and_then(Dated::date);
    out.earliest = earliest.and_then(Dated::date);
    out.latest = latest.and_then(Dated::date);
    // The mean's date is told beside the median's, never alone.
    out.mean = mean.and_then(Dated::date).filter(|_| out.reach.is_some());
    out.earliest_before_record = earliest == Some(Dated::BeforeRecord);
    out.latest_before_record = latest == Some(Dated::BeforeRecord);
}

/// Why there is no reach date: the first reason that holds.
fn why(facts: &Facts<'_>, judged: &Judged, out: &Shown) -> WhyNoDate {
    let reach = facts.projection.and_then(|projection| projection.reach);
    let before = facts.fit.ok().zip(reach).map(|(fit, years)| dated(fit, years));
    let not_located = facts.projection.is_some_and(|projection| projection.not_located);
    match facts.fit {
        _ if facts.limit().is_none() => WhyNoDate::NoLimit,
        _ if judged.verdict == Verdict::Below => WhyNoDate::Below,
        Err(_) => WhyNoDate::NoRate,
        Ok(_) if out.withheld.is_some() => out.withheld.unwrap_or(WhyNoDate::Dates),
        Ok(fit) if fit.sign() == RateSign::Rising => WhyNoDate::Rising,
        Ok(_) if not_located => WhyNoDate::NotLocated,
        Ok(fit) if fit.sign() == RateSign::HoldsZero => WhyNoDate::IntervalHoldsZero,
        Ok(_) if judged.results_deny_line => WhyNoDate::ResultsDenyLine,
        Ok(_) if before == Some(Dated::BeforeRecord) => WhyNoDate::BeforeRecord,
        Ok(_) => WhyNoDate::BeyondCalendar,
    }
}
