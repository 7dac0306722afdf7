//! All that a run found out: sorted, serialisable; counts of records, never the rows.

pub mod series;
pub mod wells;
pub mod run;
pub mod columns;
pub mod arrival;

pub use arrival::Arrival;
pub use columns::{Cell, Column};
pub use run::{
    AppliedFacts, DecisionFacts, FileFacts, InputHash, LedgerRow, Note, OutcomeCount, RunFacts,
    SiteFacts,
};
pub use series::{BandPoint, DuplicateFinding, Fitted, SeriesFinding, UsedValue};
pub use wells::WellFinding;

use crate::terms::Verdict;

/// The version of `summary.json`; later work adds keys and changes none.
pub const SCHEMA_VERSION: u32 = 1;

/// The findings of one run.
#[derive(Clone, Debug)]
pub struct Findings {
    /// What was run, on what.
    pub run: RunFacts,
    /// The site.
    pub site: SiteFacts,
    /// What is told once, most important last.
    pub notes: Vec<Note>,
    /// What was found out about the data before any fit.
    pub arrival: Arrival,
    /// One entry a series, sorted by site, well, analyte, fraction, depth.
    pub series: Vec<SeriesFinding>,
    /// One entry a well, sorted by site and well.
    pub wells: Vec<WellFinding>,
}

impl Findings {
    /// How many series have each verdict, in the order of the verdicts.
    #[must_use]
    pub fn verdict_counts(&self) -> Vec<(Verdict, usize)> {
        Verdict::ALL
            .iter()
            .map(|&verdict| (verdict, self.series.iter().filter(|s| s.verdict == verdict).count()))
            .collect()
    }

    /// How many rates were tested, and about how many of them would show rising by chance alone.
    #[must_use]
    pub fn rising_by_chance(&self) -> (usize, f64) {
        let tested = self.series.iter().filter(|s| s.rate_per_year.is_some()).count();
        #[allow(clippy::cast_precision_loss)] // a count of series
        let expected = tested as f64 * (1.0 - self.run.confidence) / 2.0;
        (tested, expected)
    }
}
