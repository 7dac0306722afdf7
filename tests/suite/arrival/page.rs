//! The check page and its JSON, on the demo and on the simulated site.

use std::path::Path;
use std::process::Command;

use ebbwell::findings::Findings;
use ebbwell::words::page::{CheckFacts, PageOptions, check};
use tempfile::TempDir;

use super::simulated::Yard;

fn page(findings: &Findings) -> String {
    let facts = CheckFacts {
        run: &findings.run,
        site: &findings.site,
        notes: &findings.notes,
        arrival: &findings.arrival,
        examples: &[],
    };
    let options = PageOptions {
        width: 100,
        color: false,
        site_argument: "yard",
        folder: None,
        charts_left_out: 0,
    };
    check(&facts, &options)
}

fn unwrapped(page: &str) -> String {
    page.split_whitespace().collect::<Vec<_>>().join(" ")
}

#[test]
fn the_first_screen_says_what_was_read_what_was_not_used_and_what_to_do() {
    let demo = Path::new(env!("CARGO_MANIFEST_DIR")).join("demo-wells");
    let place = TempDir::new().expect("a folder");
    let run = Command::new(env!("CARGO_BIN_EXE_ebbwell"))
        .args(["check", "--color", "never", "--out"])
        .arg(place.path().join("out"))
        .arg(demo)
        .output()
        .expect("the program starts");
    let page = String::from_utf8(run.stdout).expect("text");
    // A terminal of 40 lines.
    let first = unwrapped(&page.lines().take(40).collect::<Vec<_>>().join("\n"));
    for wanted in [
        "What was read 289 records in 6 files: 280 used",
        "What was not used 2 set aside: 1 rejected, 1 superseded",
        "What to do now 1. Unit slip of 1,000 suspected, 1 case: compare with the laboratory's report",
        "Send 2 non-detects back to the laboratory",
        "1 result of this round is missing without a reason",
        "Next ebbwell review",
        "MW-13, TCE, 2025-05-21: 1/1,110 of the dates around it (results/2024-2025_birch.csv:79)",
    ] {
        assert!(first.contains(wanted), "{wanted:?} in\n{page}");
    }
    let text = unwrapped(&page);
    for wanted in [
        "MW-10, Chloride, 2024-05-14: 318 and 503 mg/L, RPD 45.1 %",
        "stage 2A, by the invented data manager of the site",
        "MW-12: PCE (the well is destroyed)",
        "=1+1: PCE (no record, no reason)",
        "Wells by alias: OW-2 = MW-2 (4)",
        "Units converted: mg/L to ug/L (20)",
    ] {
        assert!(text.contains(wanted), "{wanted:?} in\n{page}");
    }
    assert!(page.lines().count() < 130, "{} lines", page.lines().count());
}

#[test]
fn the_mapping_and_every_finding_stand_in_the_json_and_in_run_json() {
    let demo = Path::new(env!("CARGO_MANIFEST_DIR")).join("demo-wells");
    let place = TempDir::new().expect("a folder");
    let out = place.path().join("out");
    let run = Command::new(env!("CARGO_BIN_EXE_ebbwell"))
        .args(["check", "--json", "--out"])
        .arg(&out)
        .arg(demo)
        .output()
        .expect("the program starts");
    let json: serde_json::Value = serde_json::from_slice(&run.stdout).expect("JSON");
    assert_eq!(json["sentinels"][0]["sentinel"], "unit-slip");
    assert_eq!(json["sentinels"][0]["well"], "MW-13");
    assert_eq!(json["sentinels"][0]["records"][0], "results/2024-2025_birch.csv:79");
    assert_eq!(json["quality"]["non_detects_over_limit"][0]["well"], "MW-11");
    assert_eq!(json["quality"]["duplicates"]["differing"][0]["well"], "MW-10");
    let lacking = json["completeness"]["lacking"].as_array().expect("a list");
    assert_eq!(lacking.len(), 2, "{lacking:?}");
    let text = std::fs::read_to_string(out.join("run.json")).expect("run.json");
    let run: serde_json::Value = serde_json::from_str(&text).expect("JSON");
    for found in [&json["applied"], &run["applied"]] {
        let of = |what: &str| {
            let all = found.as_array().expect("a list").iter();
            all.filter(|one| one["what"] == what).count()
        };
        assert_eq!((of("well"), of("unit"), of("fraction")), (1, 1, 1));
        assert!(of("analyte") > 5);
    }
    assert_eq!(run["mapping"][0]["header"], "Location");
}

#[test]
fn a_page_names_a_few_and_counts_the_rest() {
    let yard = Yard::clean().plant(
        |s| s.analyte == 3 && s.well >= 10,
        |s| {
            s.written = Some("<10".into());
            s.limit = 10.0;
        },
    );
    let page = page(&yard.check());
    assert!(page.contains("32 non-detects have a limit over the regulatory limit"), "{page}");
    assert!(page.contains("and 29 others; --json lists them all"), "{page}");
    assert_eq!(page.matches("the limit is 2 ug/L").count(), 3, "{page}");
    assert!(page.lines().count() < 60, "{page}");
}
