//! What a run found out about one well.

use chrono::NaiveDate;

use crate::site::Role;

/// One well over all its series.
#[derive(Clone, Debug)]
pub struct WellFinding {
    /// The site.
    pub site: String,
    /// The well.
    pub well: String,
    /// Its role.
    pub role: Role,
    /// How many series it has.
    pub series: usize,
    /// How many of them have each verdict, in the order of `Verdict::ALL`.
    pub verdicts: [usize; 7],
    /// Series whose last result is a detect over the limit.
    pub over_limit_now: usize,
    /// The analyte of the latest reach date, else the one that stands in the way.
    pub controlling_analyte: Option<String>,
    /// The latest reach date.
    pub reach_date: Option<NaiveDate>,
    /// Its early end.
    pub reach_earliest: Option<NaiveDate>,
    /// Its late end.
    pub reach_latest: Option<NaiveDate>,
    /// How many series stand in the way of the site's date.
    pub stands_in_the_way: usize,
    /// The newest used date.
    pub last_sampled: Option<NaiveDate>,
}
