//! Rounds: the calendar period of a sample date.

use chrono::{Datelike, NaiveDate};

use crate::site::RoundLength;

/// One monitoring round, as a count of periods since year 0; orders as time does.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Round(i32);

impl Round {
    /// The round so many rounds before this one.
    #[must_use]
    pub fn back(self, rounds: i32) -> Self {
        Self(self.0.saturating_sub(rounds))
    }
}

/// How the site divides its years.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct RoundRules {
    /// The length of a round.
    pub length: RoundLength,
}

impl RoundRules {
    /// Months in a round.
    #[must_use]
    pub fn months(self) -> i32 {
        match self.length {
            RoundLength::Month => 1,
            RoundLength::Quarter => 3,
            RoundLength::HalfYear => 6,
            RoundLength::Year => 12,
        }
    }

    /// The calendar round of a date.
    #[must_use]
    pub fn of(self, date: NaiveDate) -> Round {
        let month0 = i32::try_from(date.month0()).unwrap_or(0);
        Round((date.year() * 12 + month0).div_euclid(self.months()))
    }
}
