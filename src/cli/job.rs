//! Arguments become a job.

use std::path::PathBuf;

use ebbwell::run::{Formats, Job, Kind, Place};
use ebbwell::terms::Effort;

use super::args::{EffortArg, HowArgs, OutputArgs};
use super::as_of::as_of;
use super::clock::today;
use super::exit::Exit;
use super::site::{Refused, open};

/// The job of a reading command.
pub fn job(
    sites: &[PathBuf],
    how: &HowArgs,
    output: Option<&OutputArgs>,
    kind: Kind,
) -> Result<Job, Refused> {
    let usage = |message: String| Refused { message, exit: Exit::Usage };
    if how.effort == EffortArg::Quick {
        return Err(usage("--effort quick is not built yet; leave it out for full effort".into()));
    }
    let as_of = match how.as_of.as_deref() {
        None => None,
        Some(text) => Some(as_of(text).ok_or_else(|| {
            usage(format!(
                "--as-of {text:?} is no date or period; expected 2026-09-30, 2026, 2026-H2, \
                 2026-Q3 or 2026-07"
            ))
        })?),
    };
    let formats = formats(output.map_or(&[][..], |output| &output.formats)).map_err(usage)?;
    let opened = open(sites, how.template.as_deref())?;
    let place = output.map(|output| match &output.out {
        Some(path) => Place::Given(path.clone()),
        None => opened.place.clone(),
    });
    Ok(Job {
        sources: opened.sources,
        site: opened.site,
        site_file: opened.site_file,
        as_of,
        today: today(),
        effort: Effort::Full,
        kind,
        place,
        formats,
        force: output.is_some_and(|output| output.force),
        threads: how.threads.map(usize::from),
    })
}

/// The formats to write: all that are built, or those named.
fn formats(named: &[String]) -> Result<Formats, String> {
    if named.is_empty() {
        return Ok(Formats { csv: true, json: true, svg: true });
    }
    let mut formats = Formats { csv: false, json: false, svg: false };
    for name in named {
        match name.trim() {
            "csv" => formats.csv = true,
            "json" => formats.json = true,
            "svg" => formats.svg = true,
            later @ ("xlsx" | "html") => {
                return Err(format!(
                    "--formats {later}: this format is not built yet; expected csv, json or svg"
                ));
            }
            other => {
                return Err(format!("--formats {other:?} is unknown; expected csv, json or svg"));
            }
        }
    }
    Ok(formats)
}
