//! One point of a fitted line with its band.

use chrono::NaiveDate;

/// The fitted median and its interval on one date.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct BandPoint {
    /// The date.
    pub date: NaiveDate,
    /// The fitted median.
    pub median: f64,
    /// Its lower end.
    pub low: f64,
    /// Its upper end.
    pub high: f64,
}
