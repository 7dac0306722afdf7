//! Field duplicates held against their parents.

use chrono::NaiveDate;

use crate::ledger::RecordId;
use crate::terms::Reading;

/// A duplicate and the sample it repeats.
#[derive(Clone, Debug, PartialEq)]
pub struct DuplicatePair {
    /// The date of both.
    pub date: NaiveDate,
    /// The sample's record.
    pub parent: RecordId,
    /// The duplicate's record.
    pub duplicate: RecordId,
    /// What the sample says.
    pub parent_reading: Reading,
    /// What the duplicate says.
    pub duplicate_reading: Reading,
    /// The larger of the two reporting limits, where known.
    pub reporting_limit: Option<f64>,
}

/// How a pair compares.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Agreement {
    /// Relative percent difference, in percent.
    Rpd(f64),
    /// Absolute difference in units of the reporting limit, for values near it.
    NearLimit(f64),
    /// Nothing to compare: both not detected, or a reading without a firm value.
    Neither,
}

impl DuplicatePair {
    /// Compares the pair by the criterion that fits its size.
    ///
    /// # Formula
    /// ```text
    /// RPD = 100 |a − b| / ((a + b)/2);  where either value is under 5 × its reporting limit,
    /// |a − b| ÷ reporting limit; with one non-detect, (detect − limit) ÷ reporting limit + 1
    /// ```
    /// The near-limit criterion is crossed above 1.
    ///
    /// # Reference
    /// RPD as project plans define it; 5 × the reporting limit from memory.
    #[must_use]
    pub fn agreement(&self) -> Agreement {
        const NEAR: f64 = 5.0;
        match (self.parent_reading, self.duplicate_reading) {
            (Reading::Measured(a), Reading::Measured(b)) => match self.reporting_limit {
                Some(limit) if a < NEAR * limit || b < NEAR * limit => {
                    Agreement::NearLimit((a - b).abs() / limit)
                }
                _ => Agreement::Rpd(200.0 * (a - b).abs() / (a + b)),
            },
            (Reading::Measured(v), Reading::Below(limit))
            | (Reading::Below(limit), Reading::Measured(v)) => Agreement::NearLimit(v / limit),
            _ => Agreement::Neither,
        }
    }

    /// Whether the pair differs by more than the criterion allows (RPD in percent).
    #[must_use]
    pub fn differs(&self, rpd_allowed: f64) -> bool {
        match self.agreement() {
            Agreement::Rpd(rpd) => rpd > rpd_allowed,
            Agreement::NearLimit(ratio) => ratio > 1.0,
            Agreement::Neither => false,
        }
    }
}
