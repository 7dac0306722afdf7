//! summary.csv: one row a series.

use super::rows;
use crate::findings::Findings;
use crate::findings::columns::SUMMARY;

/// The table.
#[must_use]
pub fn summary_csv(findings: &Findings) -> String {
    rows::text(SUMMARY, &findings.series)
}
