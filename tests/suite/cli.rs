//! The program as a user meets it: exit statuses, messages, folders, standard input.

use std::fs;
use std::io::Write;
use std::path::{Path, PathBuf};
use std::process::{Command, Output, Stdio};

use tempfile::TempDir;

const HEADER: &str = "well,analyte,date,result,unit,qualifier,reporting_limit\n";

fn program() -> Command {
    let mut command = Command::new(env!("CARGO_BIN_EXE_ebbwell"));
    command.env("NO_COLOR", "1");
    command
}

fn run(arguments: &[&str], at: &Path) -> Output {
    program().args(arguments).current_dir(at).output().expect("the program starts")
}

fn status(output: &Output) -> i32 {
    output.status.code().expect("the program ends by itself")
}

fn told(output: &Output) -> String {
    String::from_utf8(output.stderr.clone()).expect("messages are UTF-8")
}

fn said(output: &Output) -> String {
    String::from_utf8(output.stdout.clone()).expect("pages are UTF-8")
}

/// Quarterly results that fall by 0.4 a year from 40 ug/L, with the scatter of a fixed pattern.
fn falling(well: &str) -> String {
    let pattern = [0.06, -0.11, 0.02, 0.09, -0.05, -0.08, 0.11, -0.03];
    (0..16)
        .map(|quarter| {
            let (year, month) = (2022 + quarter / 4, 2 + 3 * (quarter % 4));
            let ln = 40_f64.ln() - 0.1 * f64::from(quarter) + pattern[quarter as usize % 8];
            format!("{well},Benzene,{year}-{month:02}-10,{:.2},ug/L,,0.5\n", ln.exp())
        })
        .collect()
}

fn site_folder(place: &TempDir, results: &[(&str, &str)]) -> PathBuf {
    let site = place.path().join("site");
    fs::create_dir_all(site.join("results")).expect("a folder");
    let text = "[site]\nname = \"Osier Yard\"\n\n[[analyte]]\nname = \"Benzene\"\n\
                cas = \"71-43-2\"\nlimit = \"5 ug/L\"\nlimit-source = \"40 CFR 141.61\"\n";
    fs::write(site.join("site.toml"), text).expect("a site file");
    for (name, text) in results {
        fs::write(site.join("results").join(name), text).expect("a results file");
    }
    site
}

#[test]
fn a_bare_file_is_reviewed_beside_itself_and_its_folder_named_after_it() {
    let place = TempDir::new().expect("a folder");
    fs::write(place.path().join("lab.csv"), format!("{HEADER}{}", falling("MW-1")))
        .expect("written");
    let output = run(&["review", "lab.csv", "--template", "fuel-release"], place.path());
    assert_eq!(status(&output), 0, "{}", told(&output));
    let folder = place.path().join("lab-review-2025-11-10");
    let summary = fs::read_to_string(folder.join("summary.csv")).expect("a summary");
    assert!(summary.lines().nth(1).is_some_and(|row| row.contains(",attenuating,")), "{summary}");
    assert!(folder.join("run.json").is_file());
}

#[test]
fn standard_input_is_one_results_file_called_dash() {
    let place = TempDir::new().expect("a folder");
    let mut child = program()
        .args(["check", "-"])
        .current_dir(place.path())
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .expect("the program starts");
    let text = format!("{HEADER}{}", falling("MW-1"));
    let mut input = child.stdin.take().expect("a pipe");
    input.write_all(text.as_bytes()).expect("read by the program");
    drop(input);
    let output = child.wait_with_output().expect("the program ends");
    assert_eq!(status(&output), 0, "{}", told(&output));
    let ledger = fs::read_to_string(place.path().join("check-2025-11-10/ledger.csv"));
    let ledger = ledger.expect("a ledger");
    assert_eq!(ledger.lines().count(), 17);
    assert!(ledger.lines().nth(1).is_some_and(|row| row.starts_with("'-,,2,")), "{ledger}");
}

#[test]
fn files_that_are_no_tables_are_named_and_the_others_reviewed() {
    let place = TempDir::new().expect("a folder");
    let good = format!("{HEADER}{}", falling("MW-1"));
    let site = site_folder(
        &place,
        &[
            ("a-good.csv", &good),
            ("b-empty.csv", ""),
            ("c-binary.csv", "a\0b"),
            ("d-other.csv", "name,phone\nx,1\n"),
            ("e-again.csv", &good),
            (
                "f-differ.csv",
                "well,location,analyte,date,result,unit\nA,B,Benzene,2024-01-01,1,ug/L\n",
            ),
        ],
    );
    fs::write(site.join("results/g-book.xlsx"), b"PK\x03\x04").expect("written");
    let output = run(&["review", "site"], place.path());
    let message = told(&output);
    assert_eq!(status(&output), 3, "{message}");
    for (name, part) in [
        ("b-empty.csv", "empty"),
        ("c-binary.csv", "NUL"),
        ("d-other.csv", "no column for well, analyte, date, result, unit"),
        ("e-again.csv", "results/a-good.csv"),
        ("f-differ.csv", "\"well\" and \"location\" both mean well"),
        ("g-book.xlsx", "CSV"),
    ] {
        let line = message.lines().find(|line| line.contains(name));
        assert!(line.is_some_and(|line| line.contains(part)), "{name}: {message}");
    }
    assert!(!message.contains("panicked"), "{message}");
    assert!(site.join("review-2025-11-10/summary.csv").is_file());
}

#[test]
fn nothing_but_a_header_is_nothing_to_review() {
    let place = TempDir::new().expect("a folder");
    fs::write(place.path().join("lab.csv"), HEADER).expect("written");
    let output = run(&["review", "lab.csv"], place.path());
    assert_eq!(status(&output), 3, "{}", told(&output));
    assert!(told(&output).contains("no record"), "{}", told(&output));
    assert_eq!(fs::read_dir(place.path()).expect("listed").count(), 1);
}

#[test]
fn wrong_words_on_the_command_line_name_the_nearest() {
    let place = TempDir::new().expect("a folder");
    let good = format!("{HEADER}{}", falling("MW-1"));
    site_folder(&place, &[("a.csv", &good)]);
    for (arguments, part) in [
        (vec!["review", "site", "--template", "fuel-release"], "--template is for bare"),
        (vec!["review", "site/results/a.csv", "--template", "fuel-releese"], "fuel-release"),
        (vec!["new", "x", "--template", "solvents"], "chlorinated-solvents"),
        (vec!["show", "site", "MW-2", "Benzene"], "the nearest is MW-1"),
        (vec!["show", "site", "MW-1", "Benzol acid"], "expected one of: Benzene"),
        (vec!["review", "site", "--fail-on", "risng"], "the nearest is rising"),
        (vec!["review", "site", "--as-of", "soon"], "2026-Q3"),
        (vec!["review", "site", "--effort", "quick"], "not built yet"),
        (vec!["review", "site", "--formats", "xlsx"], "not built yet"),
        (vec!["review", "site", "site"], "stands alone"),
        (vec!["explain", "atenuating"], "attenuating"),
        (vec!["review"], "SITE"),
        (vec!["review", "results-nowhere/"], ""),
    ] {
        let output = run(&arguments, place.path());
        let expected = if arguments.last() == Some(&"results-nowhere/") { 3 } else { 2 };
        assert_eq!(status(&output), expected, "{arguments:?}: {}", told(&output));
        assert!(told(&output).contains(part), "{arguments:?}: {}", told(&output));
    }
}

#[test]
fn an_invalid_site_file_tells_every_problem_with_its_line() {
    let place = TempDir::new().expect("a folder");
    let good = format!("{HEADER}{}", falling("MW-1"));
    let site = site_folder(&place, &[("a.csv", &good)]);
    let text = "[site]\nname = \"Osier Yard\"\n[settings]\nconfidnce = 0.9\nhorizon-years = -3\n\
                [[analyte]]\nname = \"Benzene\"\nlimit = \"5 furlong\"\n";
    fs::write(site.join("site.toml"), text).expect("written");
    let output = run(&["review", "site"], place.path());
    let message = told(&output);
    assert_eq!(status(&output), 4, "{message}");
    for part in [":4:", "confidence", ":5:", ":8:", "3 problems"] {
        assert!(message.contains(part), "{part}: {message}");
    }
}

#[test]
fn a_decision_that_matches_nothing_is_an_invalid_site_file() {
    let place = TempDir::new().expect("a folder");
    let good = format!("{HEADER}{}", falling("MW-1"));
    let site = site_folder(&place, &[("a.csv", &good)]);
    let text = fs::read_to_string(site.join("site.toml")).expect("a site file")
        + "[[decision]]\nid = \"D1\"\nkind = \"exclude\"\nwells = [\"MW-9\"]\n\
           who = \"analyst\"\nwhen = 2026-01-05\nwhy = \"broken seal\"\n";
    fs::write(site.join("site.toml"), text).expect("written");
    let output = run(&["review", "site"], place.path());
    assert_eq!(status(&output), 4, "{}", told(&output));
    assert!(told(&output).contains("D1"), "{}", told(&output));
}

#[test]
fn a_folder_that_is_not_ours_is_never_replaced() {
    let place = TempDir::new().expect("a folder");
    let good = format!("{HEADER}{}", falling("MW-1"));
    let site = site_folder(&place, &[("a.csv", &good)]);
    let folder = site.join("review-2025-11-10");
    fs::create_dir_all(&folder).expect("a folder");
    fs::write(folder.join("letter.txt"), "signed").expect("written");
    let output = run(&["review", "site"], place.path());
    assert_eq!(status(&output), 5, "{}", told(&output));
    assert_eq!(fs::read_dir(&folder).expect("listed").count(), 1);
    fs::remove_file(folder.join("letter.txt")).expect("removed");
    fs::remove_dir(&folder).expect("removed");
    assert_eq!(status(&run(&["review", "site"], place.path())), 0);
    fs::write(folder.join("summary.csv"), "edited").expect("written");
    let output = run(&["review", "site"], place.path());
    assert_eq!(status(&output), 5, "{}", told(&output));
    assert!(told(&output).contains("summary.csv"), "{}", told(&output));
    fs::write(folder.join("letter.txt"), "signed").expect("written");
    let output = run(&["review", "site", "--force"], place.path());
    assert_eq!(status(&output), 0, "{}", told(&output));
    assert_eq!(fs::read_to_string(folder.join("letter.txt")).expect("kept"), "signed");
    assert!(told(&output).contains("letter.txt"), "{}", told(&output));
}

#[test]
fn an_output_that_cannot_be_written_leaves_status_six() {
    let place = TempDir::new().expect("a folder");
    let good = format!("{HEADER}{}", falling("MW-1"));
    site_folder(&place, &[("a.csv", &good)]);
    // A file where a folder is needed cannot be made into one by any user.
    fs::write(place.path().join("plain"), "").expect("written");
    let output = run(&["review", "site", "--out", "plain/below"], place.path());
    assert_eq!(status(&output), 6, "{}", told(&output));
    assert!(!told(&output).contains("panicked"), "{}", told(&output));
}

#[test]
fn a_date_to_come_is_refused_by_name_unless_an_as_of_date_is_given() {
    let place = TempDir::new().expect("a folder");
    let text = format!("{HEADER}{}MW-1,Benzene,2199-01-05,3,ug/L,,\n", falling("MW-1"));
    let site = site_folder(&place, &[("a.csv", &text)]);
    let output = run(&["review", "site"], place.path());
    assert_eq!(status(&output), 3, "{}", told(&output));
    assert!(told(&output).contains("results/a.csv:18"), "{}", told(&output));
    let output = run(&["review", "site", "--as-of", "2025-Q4"], place.path());
    assert_eq!(status(&output), 0, "{}", told(&output));
    let ledger = fs::read_to_string(site.join("review-2025-12-31/ledger.csv")).expect("a ledger");
    assert!(ledger.contains(",set-aside,after-as-of,"), "{ledger}");
}

#[test]
fn fail_on_ends_with_one_only_where_it_is_found() {
    let place = TempDir::new().expect("a folder");
    let good = format!("{HEADER}{}", falling("MW-1"));
    site_folder(&place, &[("a.csv", &good)]);
    let found = run(&["review", "site", "--fail-on", "rising,attenuating"], place.path());
    assert_eq!(status(&found), 1, "{}", told(&found));
    let not = run(&["review", "site", "--fail-on", "rising,unit-slip"], place.path());
    assert_eq!(status(&not), 0, "{}", told(&not));
}

#[test]
fn a_new_site_reads_and_is_never_begun_twice() {
    let place = TempDir::new().expect("a folder");
    let begun = run(&["new", "depot", "--template", "metals-and-salts"], place.path());
    assert_eq!(status(&begun), 0, "{}", told(&begun));
    let text = fs::read_to_string(place.path().join("depot/site.toml")).expect("a site file");
    assert!(text.contains("name = \"depot\""), "{text}");
    let again = run(&["new", "depot", "--template", "metals-and-salts"], place.path());
    assert_eq!(status(&again), 5, "{}", told(&again));
    // A site without results has nothing to review, and says so.
    assert_eq!(status(&run(&["review", "depot"], place.path())), 3);
}

#[test]
fn quiet_silences_the_page_and_json_replaces_it() {
    let place = TempDir::new().expect("a folder");
    let good = format!("{HEADER}{}", falling("MW-1"));
    site_folder(&place, &[("a.csv", &good)]);
    let quiet = run(&["review", "site", "--quiet"], place.path());
    assert_eq!((said(&quiet).as_str(), told(&quiet).as_str()), ("", ""));
    let json = run(&["show", "site", "MW-1", "71-43-2", "--json", "--quiet"], place.path());
    let value: serde_json::Value = serde_json::from_slice(&json.stdout).expect("JSON");
    assert!(value.to_string().contains("\"attenuating\""), "{value}");
}

#[test]
fn every_command_explains_itself_and_packagers_get_their_pages() {
    let place = TempDir::new().expect("a folder");
    for command in ["new", "check", "review", "show", "explain"] {
        let help = run(&[command, "--help"], place.path());
        assert_eq!(status(&help), 0);
        assert!(said(&help).contains("Examples:"), "{command}: {}", said(&help));
    }
    assert!(said(&run(&["completions", "bash"], place.path())).contains("_ebbwell"));
    assert!(said(&run(&["man"], place.path())).contains(".TH ebbwell"));
    let schema = run(&["schema"], place.path());
    let schema: serde_json::Value = serde_json::from_slice(&schema.stdout).expect("JSON");
    assert!(schema.get("properties").is_some());
}
