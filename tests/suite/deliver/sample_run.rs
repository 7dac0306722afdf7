//! An invented run over the sample series.

use super::sample::{date, decline, mixed, rise, too_few, undecided, undetected};
use ebbwell::findings::{
    Arrival, FileFacts, Findings, Note, OutcomeCount, RunFacts, SeriesFinding, SiteFacts,
    WellFinding,
};
use ebbwell::ledger::Told;
use ebbwell::site::Role;
use ebbwell::terms::{Effort, Verdict};

pub fn run() -> RunFacts {
    RunFacts {
        version: "0.1.0",
        as_of: date("2026-06-30"),
        effort: Effort::Full,
        confidence: 0.9,
        horizon_years: 30.0,
        site_file: None,
        template: None,
        files: vec![
            file("results/2024.csv", 300, 2, "utf-8"),
            file("results/2025.csv", 112, 0, "windows-1252"),
        ],
        outcomes: vec![
            outcome("used", "", 371),
            outcome("merged", "repeat", 9),
            outcome("non-result", "dry", 4),
            outcome("quality-control", "duplicate", 10),
            outcome("set-aside", "qualifier-needs-legend", 11),
            outcome("set-aside", "unreadable-number", 4),
            outcome("set-aside", "after-as-of", 3),
        ],
        unreadable: Vec::new(),
        settings: vec![("confidence".into(), "0.9".into())],
        off_default: Vec::new(),
        decisions: Vec::new(),
        mapping: Vec::new(),
        applied: Vec::new(),
        rpd_allowed: 30.0,
    }
}

fn file(name: &str, records: usize, blank_lines: usize, encoding: &'static str) -> FileFacts {
    FileFacts {
        name: name.into(),
        bytes: 12_345,
        sha256: format!("{records:064x}"),
        records,
        blank_lines,
        empty_cells: 0,
        sheets: Vec::new(),
        encoding,
    }
}

fn outcome(outcome: &'static str, reason: &str, records: usize) -> OutcomeCount {
    OutcomeCount { outcome, reason: reason.into(), records }
}

pub fn site() -> SiteFacts {
    SiteFacts {
        name: "Example Yard".into(),
        authority: Some("State Water Office".into()),
        citation: None,
        round: "2026-Q2".into(),
    }
}

/// A whole run over the sample series.
pub fn findings() -> Findings {
    let mut series = vec![decline(), rise(), mixed(), undecided(), too_few(), undetected()];
    series.sort_by(|a, b| a.key.cmp(&b.key));
    let wells = series.iter().map(well).collect();
    Findings {
        run: run(),
        site: site(),
        notes: vec![
            Note { told: Told::Converted { from: "mg/L", to: "ug/L" }, records: 34 },
            Note { told: Told::UnknownQualifier { code: "B".into() }, records: 11 },
            Note {
                told: Told::DecodedWindows1252 { file: "results/2025.csv".into(), line: 17 },
                records: 112,
            },
            Note { told: Told::AveragedOf { n: 2 }, records: 2 },
        ],
        arrival: Arrival::nothing(),
        series,
        wells,
    }
}

fn well(series: &SeriesFinding) -> WellFinding {
    let mut verdicts = [0; 7];
    for (at, verdict) in Verdict::ALL.iter().enumerate() {
        verdicts[at] = usize::from(series.verdict == *verdict);
    }
    WellFinding {
        site: series.key.site.clone(),
        well: series.key.well.clone(),
        role: Role::Plume,
        series: 1,
        verdicts,
        over_limit_now: usize::from(series.over_limit_now()),
        controlling_analyte: None,
        reach_date: series.reach_date,
        reach_earliest: series.reach_earliest,
        reach_latest: series.reach_latest,
        stands_in_the_way: 0,
        last_sampled: series.sampled.map(|span| span.last),
    }
}
