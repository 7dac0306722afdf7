//! What is looked at before any fit: sentinels, quality, completeness.

use chrono::NaiveDate;

use super::Error;
use super::job::Job;
use crate::findings::{AppliedFacts, Arrival};
use crate::intake::Tidy;
use crate::ledger::Told;
use crate::ledger::told::Suspicion;
use crate::series::{WellSeries, completeness, quality, sentinels};

/// Looks at everything that arrived, and notes in the ledger which records are suspected of what.
///
/// # Errors
/// [`Error::Frame`], which would be a fault of this program.
pub fn arrival(
    job: &Job,
    tidy: &mut Tidy,
    series: &[WellSeries],
    as_of: NaiveDate,
) -> Result<Arrival, Error> {
    let sentinels = sentinels(tidy, &job.site, series, as_of)?;
    let quality = quality(tidy, &job.site, series, as_of)?;
    let completeness = completeness(tidy, &job.site, as_of)?;
    let records = Arrival::records(&sentinels, &quality);
    let places = records.into_iter().map(|record| (record, tidy.place(record))).collect();
    for one in &sentinels {
        // The records beside a gap are as they should be.
        if one.kind != Suspicion::MissingFromPanel {
            for &record in &one.records {
                tidy.ledger.tell(record, Told::Suspected { what: one.kind });
            }
        }
    }
    Ok(Arrival {
        sentinels,
        quality,
        completeness,
        round: job.site.settings.round,
        files: tidy.files.iter().map(|file| file.name.clone()).collect(),
        places,
    })
}

/// Which names and units were read as which, and how many records each concerns.
#[must_use]
pub fn applied(tidy: &Tidy) -> Vec<AppliedFacts> {
    let fact = |what, from: &str, to: &str, records| {
        Some(AppliedFacts { what, from: from.to_owned(), to: to.to_owned(), records })
    };
    tidy.ledger
        .told_by_kind()
        .into_iter()
        .filter_map(|(told, records)| match told {
            Told::AnalyteJoined { written, listed, .. } => {
                fact("analyte", written, listed, records)
            }
            Told::WellAlias { written, well } => fact("well", written, well, records),
            Told::FractionAssumed { analyte, fraction } => {
                fact("fraction", analyte, fraction, records)
            }
            Told::Converted { from, to } => fact("unit", from, to, records),
            _ => None,
        })
        .collect()
}
