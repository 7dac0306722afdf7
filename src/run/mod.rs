//! The stages in order: `run(&Job, &dyn Watch)`.

pub mod job;
pub mod error;
pub mod one_series;
pub mod finish;
pub mod facts;
pub mod arrival;
pub mod outputs;

pub use error::Error;
pub use job::{Formats, Job, Kind, Place, SiteFileFacts, Stage, Watch};
pub use outputs::{Folder, Ran};

use chrono::Days;
use rayon::prelude::*;

use crate::intake::{Tidy, tidy};
use crate::ledger::{Fate, LedgerRow};
use crate::numerics::benjamini_hochberg;
use crate::series::{WellSeries, group};
use one_series::{Computed, Rules, compute};

/// Runs a job: reads, groups, fits, judges, and writes where the job says so.
///
/// # Errors
/// [`Error`], each case with its exit status. "It cannot be fitted" is a finding, not an error.
pub fn run(job: &Job, watch: &dyn Watch) -> Result<Ran, Error> {
    let between = |file: &str| {
        watch.stage(Stage::Reading, file);
        !watch.stop()
    };
    let mut tidy = tidy(&job.sources, &job.site, &between)?.ok_or(Error::Stopped)?;
    if tidy.ledger.is_empty() {
        return Err(Error::NothingRead { unreadable: tidy.unreadable });
    }
    let as_of = as_of(job, &tidy)?;
    watch.stage(Stage::Grouping, "");
    let series = group(&mut tidy, &job.site, as_of)?;
    decisions_that_match_nothing(job, &tidy, &series)?;
    let arrival = arrival::arrival(job, &mut tidy, &series, as_of)?;
    let folder = outputs::folder(job, as_of);
    let rules = Rules::of(job, as_of);
    watch.stage(Stage::Fitting, "");
    let computed = in_pool(job.threads, || {
        series
            .par_iter()
            .map(|one| (!watch.stop()).then(|| compute(one, &rules, job.kind)))
            .collect::<Option<Vec<Computed>>>()
    })?
    .ok_or(Error::Stopped)?;
    for one in &computed {
        for (record, fate) in &one.points.fates {
            tidy.ledger.amend(*record, *fate);
        }
        for (record, told) in &one.points.told {
            tidy.ledger.tell(*record, told.clone());
        }
    }
    let read = tidy.files.iter().map(|file| file.records).sum();
    tidy.ledger.balance(read)?;
    let mut findings = finish::findings(job, &tidy, as_of, arrival, &series, computed)?;
    adjust_many(&mut findings);
    watch.stage(Stage::Writing, "");
    outputs::deliver(job, &tidy, findings, folder, watch)
}

/// The as-of date: the job's, else that of the newest usable record, which must not lie ahead.
fn as_of(job: &Job, tidy: &Tidy) -> Result<chrono::NaiveDate, Error> {
    if let Some(as_of) = job.as_of {
        return Ok(as_of);
    }
    let Some(newest) = tidy.newest()? else {
        // Nothing can be used: the account is still worth writing, as of today.
        return Ok(job.today);
    };
    let tomorrow = job.today.checked_add_days(Days::new(1)).unwrap_or(job.today);
    if newest.date > tomorrow {
        return Err(Error::NewestAhead { newest, today: job.today });
    }
    Ok(newest.date)
}

/// A decision that matches nothing is a mistake in the site file.
fn decisions_that_match_nothing(
    job: &Job,
    tidy: &Tidy,
    series: &[WellSeries],
) -> Result<(), Error> {
    use crate::site::DecisionKind;
    let names = |list: &[String], name: &str| list.is_empty() || list.iter().any(|n| n == name);
    let unmatched: Vec<String> = job
        .site
        .decisions
        .iter()
        .zip(&tidy.decided)
        .filter(|(decision, touched)| match decision.kind {
            DecisionKind::Window => !series.iter().any(|one| {
                names(&decision.wells, &one.key.well) && names(&decision.analytes, &one.key.analyte)
            }),
            DecisionKind::Exclude | DecisionKind::UseQualifier | DecisionKind::Join => {
                **touched == 0
            }
        })
        .map(|(decision, _)| decision.id.clone())
        .collect();
    if unmatched.is_empty() {
        Ok(())
    } else {
        Err(Error::DecisionMatchesNothing { ids: unmatched })
    }
}

/// Adjusts the slope's p over all series of each site for their number.
fn adjust_many(findings: &mut crate::findings::Findings) {
    for site in findings.series.chunk_by_mut(|a, b| a.key.site == b.key.site) {
        let tested: Vec<usize> = (0..site.len()).filter(|&at| site[at].slope_p.is_some()).collect();
        let p: Vec<f64> = tested.iter().filter_map(|&at| site[at].slope_p).collect();
        for (&at, adjusted) in tested.iter().zip(benjamini_hochberg(&p)) {
            site[at].slope_p_adjusted = Some(adjusted);
        }
    }
}

/// Runs in the one pool of this program, bounded by the job.
fn in_pool<T: Send>(threads: Option<usize>, work: impl FnOnce() -> T + Send) -> Result<T, Error> {
    let mut builder = rayon::ThreadPoolBuilder::new();
    if let Some(threads) = threads {
        builder = builder.num_threads(threads);
    }
    let pool = builder.build().map_err(|error| Error::NoThreads { why: error.to_string() })?;
    Ok(pool.install(work))
}

/// The rows of the ledger that are not used, for pages that name examples.
fn set_aside_rows(rows: impl Iterator<Item = LedgerRow>) -> impl Iterator<Item = LedgerRow> {
    rows.filter(|row| row.outcome != crate::ledger::Outcome::Used.code())
}

/// Whether a series' records still give it a row once every fate is final.
fn has_row(series: &WellSeries, tidy: &Tidy) -> bool {
    series.records.iter().any(|&record| {
        let fate = tidy.ledger.fate(record);
        fate.gives_a_row() && fate != Fate::Candidate
    })
}
