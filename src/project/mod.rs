//! Rate and limit give dates: raw times in years from the first used date, with their ends.
//!
//! Nothing here decides whether a date is shown; [`crate::judge`] does.

pub mod band;

pub use band::band;

use chrono::NaiveDate;

use crate::fit::{Fit, RateSign};
use crate::numerics::Crossing;
use crate::terms::date_after;

/// When the line meets the limit, in years from the first used date.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Projection {
    /// When the median line meets the limit.
    pub reach: Option<f64>,
    /// Its early end.
    pub earliest: Option<f64>,
    /// Its late end.
    pub latest: Option<f64>,
    /// When the arithmetic mean meets the limit.
    pub reach_mean: Option<f64>,
    /// When a rising line crosses the limit.
    pub exceed: Option<f64>,
    /// Its early end, not before the last used date.
    pub exceed_earliest: Option<f64>,
    /// Whether the data do not locate the date at all.
    pub not_located: bool,
}

/// A raw time as a calendar date, or why it is none.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Dated {
    /// A date on or after the first used date.
    On(NaiveDate),
    /// Before the first used date.
    BeforeRecord,
    /// After 9999-12-31.
    BeyondCalendar,
}

/// Projects a fit onto a limit in the series' unit.
///
/// # Formula
/// ```text
/// reach: a + b τ = ln L;   mean: a + b τ + s²/2 = ln L;   ends: Fieller, or profile likelihood
/// ```
/// Falling: all of reach. Interval holding zero: the earliest alone, and only where the level's
/// lower end at the last used date is over the limit. Rising with the level under the limit: the
/// exceed date and its early end.
#[must_use]
pub fn project(fit: &Fit, limit: f64) -> Projection {
    let y0 = limit.ln();
    let last = fit.length().0;
    let mut out = Projection::default();
    match fit.sign() {
        RateSign::Falling => {
            if let Crossing::Located { estimate, low, high } = fit.line.crossing(y0, fit.confidence)
            {
                out.reach = Some(estimate);
                out.earliest = Some(low);
                out.latest = Some(high);
                // b is negative here: the mean's line lies s²/2 higher and meets L later.
                out.reach_mean =
                    Some(estimate - fit.line.sd * fit.line.sd / (2.0 * fit.line.slope));
            }
        }
        RateSign::HoldsZero => {
            if fit.level_now_ln.low > y0 {
                out.earliest = fit.line.earliest_crossing_after(last, y0, fit.confidence);
            }
            out.not_located = matches!(fit.line.crossing(y0, fit.confidence), Crossing::WholeLine);
        }
        RateSign::Rising => {
            if fit.line.fitted(last) < y0
                && let Crossing::Located { estimate, low, .. } =
                    fit.line.crossing(y0, fit.confidence)
            {
                out.exceed = Some(estimate);
                let already = fit.level_now_ln.high > y0;
                out.exceed_earliest = Some(if already { last } else { low.max(last) });
            }
        }
    }
    out
}

/// A raw time as a date.
#[must_use]
pub fn dated(fit: &Fit, years: f64) -> Dated {
    match date_after(fit.used.first, years) {
        _ if years < 0.0 => Dated::BeforeRecord,
        Some(date) => Dated::On(date),
        None => Dated::BeyondCalendar,
    }
}

impl Dated {
    /// The date, if it is one.
    #[must_use]
    pub fn date(self) -> Option<NaiveDate> {
        match self {
            Self::On(date) => Some(date),
            Self::BeforeRecord | Self::BeyondCalendar => None,
        }
    }
}
