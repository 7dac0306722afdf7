//! summary.json, run.json and what pages print with --json.

use std::collections::BTreeMap;

use super::sample;
use ebbwell::deliver::json::Json;
use ebbwell::deliver::{check_json, explain_json, run_json, show_json, summary_json, tables};
use ebbwell::findings::{Findings, LedgerRow};
use ebbwell::terms::{Flag, FlagCode};
use ebbwell::words::caution::STANDING;
use ebbwell::words::explain::find;
use ebbwell::words::page::CheckFacts;
use serde_json::Value;

/// Read by a reader that is not ours.
fn read(text: &str) -> Value {
    serde_json::from_str(text).unwrap_or_else(|error| panic!("{error} in {text}"))
}

#[test]
fn keys_keep_their_order_and_numbers_their_ten_digits() {
    let json = Json::Object(vec![
        ("z", Json::Number(5.0)),
        ("a", Json::Number(std::f64::consts::PI)),
        ("n", Json::Number(f64::NAN)),
        ("big", Json::Number(1e15)),
        ("small", Json::Number(1.25e-7)),
        ("text", Json::text("a\"\u{1b}\n\u{2028}")),
        ("none", Json::List(Vec::new())),
        ("some", Json::List(vec![Json::Count(1), Json::Bool(true), Json::Null])),
    ]);
    let text = json.to_text();
    assert_eq!(
        text,
        "{\n  \"z\": 5,\n  \"a\": 3.141592654,\n  \"n\": null,\n  \"big\": 1e15,\n  \"small\": \
         1.25e-7,\n  \"text\": \"a\\\"\\u001b\\n\u{2028}\",\n  \"none\": [],\n  \"some\": [\n    1,\n    \
         true,\n    null\n  ]\n}\n"
    );
    assert_eq!(read(&text)["small"], 1.25e-7);
}

#[test]
fn the_summary_holds_every_column_by_name_and_null_where_the_table_is_empty() {
    let findings = sample::findings();
    let summary = read(&summary_json(&findings));
    assert_eq!(summary["schema_version"], 1);
    assert_eq!(summary["run"]["as_of"], "2026-06-30");
    assert_eq!(summary["site"]["name"], "Example Yard");
    assert!(summary["caution"].as_str().is_some_and(|text| text.starts_with(STANDING)));
    assert_eq!(summary["verdict_counts"]["rising"], 1);
    assert_eq!(summary["rates_tested"], 4);
    let series = summary["series"].as_array().expect("a list");
    assert_eq!(series.len(), findings.series.len());
    let columns = &tables::all()[0].1;
    for row in series {
        for column in columns {
            assert!(row.get(column).is_some(), "{column}");
        }
        assert!(row["records"].is_array() && row["sentence"].is_string());
    }
    let few = series.iter().find(|row| row["verdict"] == "too-few").expect("too few");
    assert!(few["rate_per_year"].is_null() && few["reach_date"].is_null());
    assert_eq!(few["why_no_rate"], "dates");
    let wells = summary["wells"].as_array().expect("a list");
    assert_eq!(wells[0]["well"], findings.wells[0].well.as_str());
}

#[test]
fn flags_are_objects_that_say_whether_they_were_assessable() {
    let mut findings = sample::findings();
    findings.series.truncate(1);
    findings.series[0].flags = vec![
        Flag::raised(FlagCode::Stale, 2.0, 1.5),
        Flag::not_assessable(FlagCode::Outlier, 0.05),
    ];
    let summary = read(&summary_json(&findings));
    let flags = &summary["series"][0]["flags"];
    assert_eq!(flags[0]["flag"], "stale");
    assert_eq!(flags[0]["standing"], "raised");
    assert_eq!(flags[0]["figure"], 2);
    assert_eq!(flags[0]["threshold"], 1.5);
    assert!(flags[0]["source"].is_string());
    assert_eq!(flags[1]["standing"], "not-assessable");
    assert!(flags[1]["figure"].is_null());
}

#[test]
fn notes_carry_their_text_and_their_records_the_most_important_last() {
    let summary = read(&summary_json(&sample::findings()));
    let notes = summary["notes"].as_array().expect("a list");
    assert_eq!(notes.len(), 3, "the ledger's details are not notes");
    assert_eq!(notes[0]["text"], "34 records: converted from mg/L to ug/L");
    assert_eq!(notes[2]["records"], 11);
}

#[test]
fn run_json_lists_inputs_settings_decisions_and_outputs() {
    let mut run = sample::run();
    run.off_default = vec![("duplicates".into(), "the plan says so".into())];
    run.unreadable = vec![("results/x.csv".into(), "binary".into())];
    let outputs: BTreeMap<String, String> =
        [("summary.csv".to_owned(), "ab".to_owned()), ("charts/a.svg".to_owned(), "cd".to_owned())]
            .into();
    let text = run_json(&run, &sample::site(), &outputs);
    let json = read(&text);
    assert_eq!(json["program"], "ebbwell");
    assert_eq!(json["as_of"], "2026-06-30");
    assert_eq!(json["inputs"][0]["name"], "results/2024.csv");
    assert_eq!(json["inputs"][0]["records"], 300);
    assert_eq!(json["inputs"][0]["bytes"], 12345);
    assert_eq!(json["inputs"][1]["sha256"].as_str().map(str::len), Some(64));
    assert_eq!(json["settings"]["confidence"], "0.9");
    assert_eq!(json["settings_off_default"]["duplicates"], "the plan says so");
    assert_eq!(json["outputs"]["summary.csv"], "ab");
    let (chart, table) = (text.find("charts/a.svg"), text.find("summary.csv"));
    assert!(chart < table, "outputs are sorted by name");
}

#[test]
fn pages_have_a_json_form() {
    let Findings { run, site, notes, arrival, series, wells } = sample::findings();
    let row = LedgerRow { reported: "O.5".into(), outcome: "set-aside", ..LedgerRow::default() };
    let facts =
        CheckFacts { run: &run, site: &site, notes: &notes, arrival: &arrival, examples: &[row] };
    let check = read(&check_json(&facts));
    assert_eq!(check["examples"][0]["reported"], "O.5");
    assert_eq!(check["records"][0]["outcome"], "used");
    assert!(check["caution"].is_string());
    let findings = Findings { run, site, notes, arrival, series, wells };
    let mixed = findings.series.iter().find(|s| s.key.well == "MW-12").expect("the mixed one");
    let show = read(&show_json(&findings, mixed));
    assert_eq!(show["values"].as_array().map(Vec::len), Some(mixed.values.len()));
    assert_eq!(show["values"][9]["mark"], ">");
    assert_eq!(show["values"][0]["files_and_records"][0], "results/lab.csv:2");
    assert!(show["line"][0]["median"].is_number());
    assert!(show["caution"].is_string());
    let explained = read(&explain_json(&find("rising")));
    let kinds: Vec<&str> =
        explained.as_array().expect("a list").iter().filter_map(|e| e["kind"].as_str()).collect();
    assert_eq!(kinds, ["verdict", "reason for having no date", "column"]);
}
