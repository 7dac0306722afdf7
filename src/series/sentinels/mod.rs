//! What should be looked at before any fit: slips that a person makes with units, dates, names and
//! copies, each found by holding what arrived against its own history.
//!
//! A sentinel is a suspicion or a fact, never a change: no record is altered, excluded or held back
//! by one. Every threshold stands beside its reason.

pub mod history;
pub mod unit_slip;
pub mod swapped;
pub mod half_limit;
pub mod equal_batch;
pub mod day_month;
pub mod outside_life;
pub mod panel;

use chrono::NaiveDate;

use super::WellSeries;
use super::round::RoundRules;
use crate::intake::{FrameError, Tidy};
use crate::ledger::RecordId;
use crate::ledger::told::Suspicion;
use crate::site::Site;
use history::History;

/// What kind of thing a sentinel concerns.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Scope {
    /// A whole file.
    File,
    /// One analyte in one file.
    Analyte,
    /// One sample: a well on a date.
    Sample,
    /// One result.
    Result,
    /// A batch: results of one file and batch, else of one file and date.
    Batch,
    /// A series.
    Series,
    /// Two wells.
    Wells,
}

impl Scope {
    /// The code in outputs.
    #[must_use]
    pub fn code(self) -> &'static str {
        match self {
            Self::File => "file",
            Self::Analyte => "analyte",
            Self::Sample => "sample",
            Self::Result => "result",
            Self::Batch => "batch",
            Self::Series => "series",
            Self::Wells => "wells",
        }
    }
}

/// One thing to look at.
#[derive(Clone, Debug, PartialEq)]
pub struct Sentinel {
    /// Which slip is suspected, or which fact is told.
    pub kind: Suspicion,
    /// What it concerns.
    pub scope: Scope,
    /// The site.
    pub site: String,
    /// The file's place in the run, where it concerns one.
    pub file: Option<u32>,
    /// The well.
    pub well: Option<String>,
    /// The other well, of a pair.
    pub other_well: Option<String>,
    /// The analyte.
    pub analyte: Option<String>,
    /// The date.
    pub date: Option<NaiveDate>,
    /// The batch as written.
    pub batch: Option<String>,
    /// Its figure: the ratio of a slip, the value of a copy, how many times likelier a swap is.
    pub figure: Option<f64>,
    /// The records concerned, ascending; for what is absent, those that stand beside the gap.
    pub records: Vec<RecordId>,
}

impl Sentinel {
    /// One that concerns nothing yet.
    pub(super) fn of(kind: Suspicion, scope: Scope, records: Vec<RecordId>) -> Self {
        Self {
            kind,
            scope,
            site: String::new(),
            file: None,
            well: None,
            other_well: None,
            analyte: None,
            date: None,
            batch: None,
            figure: None,
            records,
        }
    }
}

/// Looks at everything that arrived, dated up to the as-of date, in the order of kinds, then of
/// what they concern.
///
/// # Errors
/// [`FrameError`], which would be a fault of this program.
pub fn sentinels(
    tidy: &Tidy,
    site: &Site,
    series: &[WellSeries],
    as_of: NaiveDate,
) -> Result<Vec<Sentinel>, FrameError> {
    let places = tidy.places()?;
    let histories: Vec<History<'_>> =
        series.iter().map(|one| History::of(one, &places, as_of)).collect();
    let mut found = unit_slip::look(&histories);
    found.extend(swapped::look(&histories));
    found.extend(half_limit::look(&histories));
    found.extend(equal_batch::look(&histories, tidy));
    found.extend(day_month::look(tidy)?);
    found.extend(outside_life::look(&histories, site));
    found.extend(outside_life::limits_over(&histories));
    let rules = RoundRules { length: site.settings.round };
    found.extend(panel::look(tidy, series, &places, rules));
    for one in &mut found {
        one.records.sort_unstable();
    }
    found.sort_by(|a, b| order(a).cmp(&order(b)).then_with(|| a.records.cmp(&b.records)));
    Ok(found)
}

/// What sentinels are sorted by.
type Order<'a> = (Suspicion, Scope, &'a str, Option<u32>, [Option<&'a str>; 3], Option<NaiveDate>);

fn order(one: &Sentinel) -> Order<'_> {
    let names = [one.well.as_deref(), one.analyte.as_deref(), one.other_well.as_deref()];
    (one.kind, one.scope, &one.site, one.file, names, one.date)
}
