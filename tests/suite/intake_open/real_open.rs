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

#[test]
fn a_narrow_sample_lacks_the_limits_of_its_non_detects() {
    let Some((name, text)) = sample("narrow_chloride_mit.csv") else { return };
    let (counts, told) = counts(&name, &text);
    let expected = counted(&text, |cell| cell("ResultDetectionConditionText") == "Not Detected");
    assert_eq!(of(&counts, "no-reporting-limit"), expected);
    assert!(told.iter().any(|line| line.contains("has no columns for limits")), "{told:?}");
}

#[test]
fn the_groundwater_sample_is_set_aside_for_units_and_conditions_alone() {
    let Some((name, text)) = sample("physchem_groundwater.csv") else { return };
    let (counts, _) = counts(&name, &text);
    let mass = |unit: &str| unit.to_lowercase().starts_with("mg/l");
    let unit = |cell: &dyn Fn(&str) -> String| cell("ResultMeasure/MeasureUnitCode");
    let value = |cell: &dyn Fn(&str) -> String| cell("ResultMeasureValue");
    let unknown = counted(&text, |cell| !value(cell).is_empty() && !mass(&unit(cell)));
    assert_eq!(of(&counts, "unknown-unit"), unknown);
    let condition =
        counted(&text, |cell| cell("ResultDetectionConditionText") == "Detected Not Quantified");
    assert_eq!(of(&counts, "condition-needs-legend"), condition);
    let low = counted(&text, |cell| {
        mass(&unit(cell)) && value(cell).parse::<f64>().is_ok_and(|value| value <= 0.0)
    });
    assert_eq!(of(&counts, "low-result"), low);
    let rest: usize = counts.values().sum::<usize>() - unknown - condition - low;
    assert_eq!(of(&counts, "") + of(&counts, "repeat"), rest);
}

#[test]
fn each_detection_condition_of_the_sample_ends_as_ruled() {
    let Some((name, text)) = sample("physchem_detection_conditions.csv") else { return };
    let (counts, _) = counts(&name, &text);
    let other = |cell: &dyn Fn(&str) -> String| {
        ["Suspended", "Non-filterable"].contains(&cell("ResultSampleFractionText").as_str())
    };
    let with = |words: &str| {
        counted(&text, |cell| !other(cell) && cell("ResultDetectionConditionText") == words)
    };
    assert_eq!(of(&counts, "other-fraction"), counted(&text, |cell| other(cell)));
    assert_eq!(of(&counts, "condition-needs-legend"), with("Detected Not Quantified"));
    assert_eq!(of(&counts, "above-range"), with("Present Above Quantification Limit"));
    assert_eq!(of(&counts, "no-reporting-limit") + of(&counts, "no-result"), 0);
}

#[test]
fn a_limit_table_of_other_results_stays_unmatched() {
    let Some((_, results)) = sample("dataretrieval_wqp_results.csv") else { return };
    let Some((_, limits)) = sample("dataretrieval_wqp_detection_limits.csv") else { return };
    let place = tempfile::TempDir::new().expect("a folder");
    let files: Vec<PathBuf> = [("a.csv", &results), ("b.csv", &limits)]
        .into_iter()
        .map(|(name, text)| {
            let path = place.path().join(name);
            fs::write(&path, text).expect("a copy");
            path
        })
        .collect();
    let site = bare();
    let read = ebbwell::intake::tidy(&ebbwell::intake::Sources::Files(files), &site, &|_| true);
    let tidy = read.expect("a frame").expect("not stopped");
    let rows = rows_of(&tidy, &site);
    let unmatched = rows.iter().filter(|row| row.reason == "unmatched-limit").count();
    assert_eq!(unmatched, counted(&limits, |_| true));
    assert_eq!(rows.len(), counted(&limits, |_| true) + counted(&results, |_| true));
}
