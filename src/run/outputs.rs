//! Where files go, and which are written.

use std::path::PathBuf;

use chrono::NaiveDate;

use super::job::{Job, Kind, Place, Stage, Watch};
use super::{Error, set_aside_rows};
use crate::deliver::write::{OutDir, Owner, may_write, write};
use crate::deliver::{Content, OutFile, ledger_csv, review_files};
use crate::findings::{Findings, LedgerRow};
use crate::intake::Tidy;
use crate::ledger::Told;
use crate::words;
use crate::words::page::examples;

/// A finished run.
#[derive(Clone, Debug)]
pub struct Ran {
    /// What was found out.
    pub findings: Findings,
    /// The folder that was written, if any.
    pub folder: Option<Folder>,
    /// Examples of records that were not used, a few for each reason.
    pub examples: Vec<LedgerRow>,
    /// Series that got no chart because there are too many.
    pub charts_left_out: usize,
}

/// A folder that was written.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Folder {
    /// Its path.
    pub path: PathBuf,
    /// Files in it that are not ours and were kept.
    pub kept: Vec<String>,
}

/// How many examples of each reason a page names.
const EXAMPLES: usize = 3;

/// The output folder of a job at an as-of date.
#[must_use]
pub fn folder(job: &Job, as_of: NaiveDate) -> Option<OutDir> {
    let path = match job.place.as_ref()? {
        Place::Given(path) => path.clone(),
        Place::Beside { parent, prefix } => {
            let kind = match job.kind {
                Kind::Check => "check",
                Kind::Review => "review",
            };
            parent.join(format!("{prefix}{kind}-{as_of}"))
        }
    };
    Some(OutDir { path, force: job.force })
}

/// Writes what the job asks for and gathers what the pages need.
///
/// # Errors
/// [`Error::Write`] where the folder is not ours or cannot be written.
pub fn deliver(
    job: &Job,
    tidy: &Tidy,
    findings: Findings,
    folder: Option<OutDir>,
    watch: &dyn Watch,
) -> Result<Ran, Error> {
    watch.stage(Stage::Writing, "");
    let detail = |told: &[&Told]| words::told::details(told.iter().copied());
    let rows = || tidy.ledger_rows(&job.site, &detail);
    let examples = examples(set_aside_rows(rows()?), EXAMPLES);
    let mut charts_left_out = 0;
    let written = match folder {
        None => None,
        Some(out) => {
            may_write(&out, &Owner::of(&findings.run, &findings.site))?;
            let rows = rows()?;
            let ledger = Content::Written(Box::new(move |to| ledger_csv(rows, to)));
            let files: Vec<OutFile<'_>> = match job.kind {
                Kind::Check => vec![OutFile { name: "ledger.csv".to_owned(), content: ledger }],
                Kind::Review => {
                    charts_left_out = crate::deliver::charts::chosen(&findings).left_out;
                    review_files(&findings, job.formats, ledger)
                }
            };
            let written = write(&out, &findings.run, &findings.site, files, &|| watch.stop())?;
            Some(Folder { path: out.path, kept: written.kept })
        }
    };
    Ok(Ran { findings, folder: written, examples, charts_left_out })
}
