//! Trials on real exports of the open standard that lie beside the project where they are at hand.
//! Nothing of them is kept in the repository; each trial skips, saying so, where they are absent.

use std::collections::BTreeMap;
use std::fs;
use std::path::{Path, PathBuf};

use super::{rows_of, site};

const SITE: &str = "[site]\nname = \"Trial\"\n";

fn sample(name: &str) -> Option<(String, String)> {
    let path: PathBuf = Path::new(env!("CARGO_MANIFEST_DIR")).join("../shared/real/wqx").join(name);
    let text = fs::read_to_string(path).ok();
    if text.is_none() {
        println!("skipped: {name} is not beside the project");
    }
    Some((name.to_owned(), text?))
}

type Counts = BTreeMap<(String, String), usize>;

/// Outcomes and reasons of a file; an empty outcome waits for the merge of its date.
fn counts(name: &str, text: &str) -> (Counts, Vec<String>) {
    let site = bare();
    let tidy = super::read_text(&site, text);
    let mut counts = Counts::new();
    for row in rows_of(&tidy, &site) {
        *counts.entry((row.outcome.to_owned(), row.reason)).or_default() += 1;
    }
    let told: Vec<String> =
        tidy.told.iter().map(|told| ebbwell::words::told::sentence(told, 0)).collect();
    let notes: Vec<String> = tidy
        .ledger
        .told_by_kind()
        .into_iter()
        .map(|(told, records)| ebbwell::words::told::sentence(told, records))
        .collect();
    println!("{name}: {counts:?}\n  {}\n  {}", told.join("\n  "), notes.join("\n  "));
    (counts, told)
}

fn bare() -> ebbwell::site::Site {
    site(SITE)
}

fn of(counts: &Counts, reason: &str) -> usize {
    counts.iter().filter(|((_, found), _)| found == reason).map(|(_, n)| n).sum()
}

/// An independent count over the file's own columns.
fn counted(text: &str, holds: impl Fn(&dyn Fn(&str) -> String) -> bool) -> usize {
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let headers = reader.headers().expect("a header").clone();
    let records: Vec<csv::StringRecord> = reader.records().map(|r| r.expect("a record")).collect();
    let cell = |record: &csv::StringRecord, name: &str| {
        let at = headers.iter().position(|header| header == name);
        at.and_then(|at| record.get(at)).unwrap_or_default().trim().to_owned()
    };
    records.iter().filter(|record| holds(&|name| cell(record, name))).count()
}

#[test]
fn every_sample_goes_through_with_every_record_accounted_for() {
    for name in [
        "narrow_chloride_mit.csv",
        "physchem_groundwater.csv",
        "physchem_detection_conditions.csv",
        "dataretrieval_samples_results.csv",
        "dataretrieval_wqp3_results.csv",
        "dataretrieval_wqp_results.csv",
        "dataretrieval_wqp_detection_limits.csv",
    ] {
        let Some((name, text)) = sample(name) else { continue };
        let (counts, _) = counts(&name, &text);
        assert_eq!(counts.values().sum::<usize>(), counted(&text, |_| true), "{name}");
    }
}
