//! Times in years of 365.25 days, rates per year, spans of dates.

use chrono::{Days, NaiveDate};
use serde::Serialize;

/// Days in a year, the convention of every rate here (reference answers use the same).
pub const DAYS_PER_YEAR: f64 = 365.25;

/// A duration in years of 365.25 days.
#[derive(Clone, Copy, Debug, PartialEq, PartialOrd, Serialize)]
#[serde(transparent)]
pub struct Years(pub f64);

/// A first-order rate constant per year; positive means falling.
#[derive(Clone, Copy, Debug, PartialEq, PartialOrd, Serialize)]
#[serde(transparent)]
pub struct PerYear(pub f64);

impl PerYear {
    /// The half-life, ln 2 ÷ k; none where the rate is not positive.
    #[must_use]
    pub fn half_life(self) -> Option<Years> {
        (self.0 > 0.0).then(|| Years(std::f64::consts::LN_2 / self.0))
    }
}

/// A first and a last date, both included.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
pub struct Span {
    /// The first date.
    pub first: NaiveDate,
    /// The last date.
    pub last: NaiveDate,
}

impl Span {
    /// Last minus first.
    #[must_use]
    pub fn years(self) -> Years {
        years_between(self.first, self.last)
    }
}

/// Years from one date to another, negative if the second is earlier.
#[must_use]
pub fn years_between(from: NaiveDate, to: NaiveDate) -> Years {
    let days = i32::try_from(to.signed_duration_since(from).num_days());
    // Calendar dates here have four-digit years, so the day count always fits.
    Years(f64::from(days.unwrap_or(i32::MAX)) / DAYS_PER_YEAR)
}

/// The date a number of years after another, `from + round(365.25 τ)` days.
///
/// `None` before year 1 or after 9999-12-31, where no calendar date is written.
#[must_use]
pub fn date_after(from: NaiveDate, years: f64) -> Option<NaiveDate> {
    let days = (years * DAYS_PER_YEAR).round();
    // 4,000,000 days are beyond the calendar in either direction.
    if !days.is_finite() || days.abs() > 4e6 {
        return None;
    }
    // Within the bound just checked the cast is exact.
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)]
    let shift = Days::new(days.abs() as u64);
    let date =
        if days < 0.0 { from.checked_sub_days(shift)? } else { from.checked_add_days(shift)? };
    let first = NaiveDate::from_ymd_opt(1, 1, 1)?;
    let last = NaiveDate::from_ymd_opt(9999, 12, 31)?;
    (first..=last).contains(&date).then_some(date)
}

#[cfg(test)]
mod tests {
    use super::{NaiveDate, date_after, years_between};

    #[test]
    fn a_date_and_its_distance_undo_each_other() {
        let from = NaiveDate::from_ymd_opt(2017, 3, 14).expect("a date");
        let to = NaiveDate::from_ymd_opt(2022, 1, 16).expect("a date");
        assert_eq!(date_after(from, years_between(from, to).0), Some(to));
        assert_eq!(date_after(to, -years_between(from, to).0), Some(from));
        assert_eq!(date_after(from, 9e3), None);
        assert_eq!(date_after(from, f64::NAN), None);
    }
}
