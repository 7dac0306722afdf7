//! One input is read as the program would, and the ledger is held against the records.

use std::fs;
use std::path::Path;
use std::sync::LazyLock;

use chrono::NaiveDate;
use ebbwell::intake::{Sources, Tidy, tidy};
use ebbwell::run::{Error, Formats, Job, Kind as JobKind, SiteFileFacts, Stage, Watch, run};
use ebbwell::site::{Site, read as read_site};
use ebbwell::terms::Effort;

use super::mutate::Input;
use super::seeds::{self, Kind};

/// One input in so many goes through every stage up to the fits, not through intake alone.
const WHOLE: u64 = 100;

/// The sites under which tables are read: none, the demo's, and one that declares everything.
static SITES: LazyLock<Vec<Site>> = LazyLock::new(|| {
    [seeds::BARE_SITE, seeds::DEMO_SITE, seeds::DECLARING_SITE]
        .into_iter()
        .map(|text| read_site(text, "site.toml").expect("a site of the tests"))
        .collect()
});

/// Reads an input; how many records it held, or what is wrong.
pub fn read(input: &Input, number: u64, folder: &Path) -> Result<u64, String> {
    match input.kind {
        Kind::Table => {
            let site = &SITES[input.site % SITES.len()];
            read_sources(&Sources::Standard(input.bytes.clone()), site, number)
        }
        Kind::Workbook => {
            let path = folder.join("book.xlsx");
            fs::write(&path, &input.bytes).map_err(|error| error.to_string())?;
            let site = &SITES[input.site % SITES.len()];
            read_sources(&Sources::Files(vec![path]), site, number)
        }
        Kind::Site => {
            let text = String::from_utf8_lossy(&input.bytes);
            match read_site(&text, "site.toml") {
                Err(problems) if problems.is_empty() => Err("is refused without a reason".into()),
                // Every problem is put into words, which must not fail either.
                Err(problems) => Ok(problems.iter().map(|p| p.to_string().len() as u64).sum()),
                Ok(site) => {
                    let table = seeds::DEMO_TABLE.as_bytes().to_vec();
                    read_sources(&Sources::Standard(table), &site, number)
                }
            }
        }
    }
}

fn read_sources(sources: &Sources, site: &Site, number: u64) -> Result<u64, String> {
    let tidy = tidy(sources, site, &|_| true).map_err(|error| error.to_string())?;
    let tidy = tidy.ok_or("the reading stopped by itself")?;
    let records = balanced(&tidy, site)?;
    if number.is_multiple_of(WHOLE) && records > 0 {
        whole(sources, site)?;
    }
    Ok(records)
}

/// Every record has its row in the ledger, and every refused file its reason.
fn balanced(tidy: &Tidy, site: &Site) -> Result<u64, String> {
    let read: usize = tidy.files.iter().map(|file| file.records).sum();
    let detail =
        |told: &[&ebbwell::ledger::Told]| ebbwell::words::told::details(told.iter().copied());
    let rows = tidy.ledger_rows(site, &detail).map_err(|error| error.to_string())?.count();
    for refused in &tidy.unreadable {
        if ebbwell::words::unreadable::why(&refused.problem).is_empty() {
            return Err("a file is refused without a reason".into());
        }
    }
    if read == tidy.ledger.len() && read == rows {
        Ok(read as u64)
    } else {
        Err(format!("{read} records, {} fates, {rows} rows", tidy.ledger.len()))
    }
}

struct Quiet;

impl Watch for Quiet {
    fn stage(&self, _: Stage, _: &str) {}

    fn stop(&self) -> bool {
        false
    }
}

/// All stages but the fits.
fn whole(sources: &Sources, site: &Site) -> Result<(), String> {
    let job = Job {
        sources: sources.clone(),
        site: site.clone(),
        site_file: SiteFileFacts::default(),
        as_of: None,
        today: NaiveDate::from_ymd_opt(2026, 12, 1).ok_or("a date")?,
        effort: Effort::Full,
        kind: JobKind::Check,
        place: None,
        formats: Formats { csv: true, json: true, svg: false },
        force: false,
        threads: Some(1),
    };
    match run(&job, &Quiet) {
        Ok(ran) => {
            let text = ebbwell::deliver::summary_json(&ran.findings);
            if text.is_empty() { Err("has no summary".into()) } else { Ok(()) }
        }
        Err(error @ (Error::Unbalanced(_) | Error::Frame(_))) => Err(error.to_string()),
        // Dates to come, decisions without a record: the run says so.
        Err(_) => Ok(()),
    }
}
