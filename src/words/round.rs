//! How rounds are named.

use chrono::{Datelike, NaiveDate};

use crate::site::RoundLength;

/// The round of a date: `2026-Q3`, `2026-07`, `2026-H2`, `2026`.
#[must_use]
pub fn label(date: NaiveDate, length: RoundLength) -> String {
    let (year, month0) = (date.year(), date.month0());
    match length {
        RoundLength::Month => format!("{year}-{:02}", month0 + 1),
        RoundLength::Quarter => format!("{year}-Q{}", month0 / 3 + 1),
        RoundLength::HalfYear => format!("{year}-H{}", month0 / 6 + 1),
        RoundLength::Year => year.to_string(),
    }
}
