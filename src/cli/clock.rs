//! The only place that reads the clock.

use chrono::NaiveDate;

/// Today, by the machine's local calendar.
pub fn today() -> NaiveDate {
    #[expect(clippy::disallowed_methods, reason = "cli is where the date is read")]
    let now = chrono::Local::now();
    now.date_naive()
}
