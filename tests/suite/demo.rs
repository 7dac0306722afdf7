//! The demo site, reviewed by the built program as a user would: every case that its README names.

use std::collections::{BTreeMap, BTreeSet};
use std::fs;
use std::path::{Path, PathBuf};
use std::process::{Command, Output};
use std::sync::LazyLock;

use tempfile::TempDir;

/// What the review must say of each series of the demo; `demo-wells/README.md` says what each is
/// there to show. Worked out by the rules in a script of its own before the program ran.
const CASES: &str = "
well   | analyte        | verdict     | method              | why_no_rate | why_no_date         | flags
MW-1   | PCE            | attenuating | least-squares       |             |                     |
MW-2   | cis-1,2-DCE    | below       | least-squares       |             |                     |
MW-3   | Vinyl chloride | below       | count               | detects     | below               | few-detects;date-withheld;mostly-non-detects
MW-4   | Chromium       | below       | least-squares       |             | below               |
MW-5   | Chromium       | flat        | least-squares       |             | interval-holds-zero | seasonal;unbounded
MW-6   | TCE            | attenuating | least-squares       |             | results-deny-line   | results-deny-line;autocorrelated;slowing;two-rates;levels-off
MW-7   | TCE            | attenuating | least-squares       |             |                     | far-extrapolation
MW-7   | Vinyl chloride | rising      | least-squares       |             | rising              | autocorrelated;slowing;two-rates
MW-8   | PCE            | attenuating | least-squares       |             |                     | short-record;far-extrapolation
MW-9   | PCE            | too-few     |                     | dates       | no-rate             | few-dates;few-detects;short-record;date-withheld
MW-10  | Chloride       | undecided   | least-squares       |             | not-located         | short-record;duplicates-differ;not-located
MW-11  | TCE            | attenuating | censored-likelihood |             |                     | short-record;reporting-limit-above-limit
MW-12  | PCE            | attenuating | least-squares       |             |                     | stale
MW-13  | TCE            | undecided   | least-squares       |             | interval-holds-zero | short-record;unit-slip;wide-scatter;outlier;not-normal;tests-disagree;unbounded
MW-14  | Vinyl chloride | below       | censored-likelihood |             |                     | uninformative-non-detects;estimated-recensored
PZ-4/A | PCE            | below       | censored-likelihood |             | below               | short-record;quickening
PZ-4_A | PCE            | undetected  |                     | detects     | no-rate             | few-detects;short-record;date-withheld;mostly-non-detects
=1+1   | PCE            | too-few     |                     | detects     | no-rate             | few-dates;few-detects;short-record;date-withheld;mostly-non-detects
BG-1   | PCE            | undetected  |                     | detects     | no-rate             | few-detects;date-withheld;mostly-non-detects;falling-reporting-limits
";

/// The rows of [`CASES`] by column.
fn cases() -> Vec<Row> {
    let mut lines =
        CASES.trim().lines().map(|line| line.split('|').map(|cell| cell.trim().to_owned()));
    let columns: Vec<String> = lines.next().expect("a header").collect();
    lines.map(|cells| columns.iter().cloned().zip(cells).collect()).collect()
}

/// The results files with their separators and their records, counted with the csv crate.
const FILES: [(&str, u8); 6] = [
    ("2016-2020_alder.csv", b','),
    ("2021-2023_alder.csv", b';'),
    ("2024-2025_birch.csv", b','),
    ("2026-Q1_birch.txt", b'\t'),
    ("2026-Q2_birch.txt", b'\t'),
    ("2026-Q3_birch.txt", b'\t'),
];

type Row = BTreeMap<String, String>;

/// A table as rows by column; a leading `'` that guards a formula is taken off.
fn table(path: &Path) -> Vec<Row> {
    let mut reader = csv::Reader::from_path(path).expect("the table is there");
    let headers = reader.headers().expect("a header").clone();
    let plain = |cell: &str| cell.strip_prefix('\'').unwrap_or(cell).to_owned();
    let rows = reader.records().map(|row| row.expect("a record"));
    rows.map(|row| headers.iter().map(str::to_owned).zip(row.iter().map(plain)).collect()).collect()
}

fn demo() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("demo-wells")
}

/// A review of a site, and the folder that it wrote.
struct Review {
    place: TempDir,
    page: String,
    told: String,
}

/// Runs the program; it must end well.
fn ebbwell(arguments: &[&std::ffi::OsStr]) -> Output {
    let run = Command::new(env!("CARGO_BIN_EXE_ebbwell")).args(arguments).output();
    let run = run.expect("the program starts");
    assert_eq!(run.status.code(), Some(0), "{}", String::from_utf8_lossy(&run.stderr));
    run
}

impl Review {
    fn of(site: &Path, options: &[&str]) -> Self {
        let place = TempDir::new().expect("a temporary folder");
        let out = place.path().join("out");
        let mut arguments =
            vec!["review".as_ref(), site.as_os_str(), "--out".as_ref(), out.as_os_str()];
        arguments.extend(options.iter().map(|option| AsRef::<std::ffi::OsStr>::as_ref(*option)));
        let run = ebbwell(&arguments);
        let text = |bytes| String::from_utf8(bytes).expect("what is told is UTF-8");
        Self { place, page: text(run.stdout), told: text(run.stderr) }
    }

    fn table(&self, name: &str) -> Vec<Row> {
        table(&self.place.path().join("out").join(name))
    }

    /// Every file of the folder with its bytes.
    fn files(&self) -> BTreeMap<String, Vec<u8>> {
        let out = self.place.path().join("out");
        let mut files = BTreeMap::new();
        for folder in [out.clone(), out.join("charts")] {
            for entry in fs::read_dir(folder).expect("an output folder") {
                let path = entry.expect("an entry").path();
                if path.is_file() {
                    let name = path.strip_prefix(&out).expect("below").display().to_string();
                    files.insert(name, fs::read(&path).expect("an output"));
                }
            }
        }
        files
    }
}

/// One review of the demo for all tests that only read it.
static DEMO: LazyLock<Review> = LazyLock::new(|| Review::of(&demo(), &[]));

/// A copy of the demo in which a function has rewritten each results file.
fn altered(change: impl Fn(&str, u8, &[u8]) -> Vec<u8>) -> TempDir {
    let copy = TempDir::new().expect("a temporary folder");
    fs::create_dir(copy.path().join("results")).expect("a results folder");
    fs::copy(demo().join("site.toml"), copy.path().join("site.toml")).expect("the site file");
    for (name, separator) in FILES {
        let bytes = fs::read(demo().join("results").join(name)).expect("a results file");
        let changed = change(name, separator, &bytes);
        fs::write(copy.path().join("results").join(name), changed).expect("written");
    }
    copy
}

fn series<'a>(rows: &'a [Row], well: &str, analyte: &str) -> &'a Row {
    let mut found = rows.iter().filter(|row| row["well"] == well && row["analyte"] == analyte);
    let row = found.next().unwrap_or_else(|| panic!("no row for {analyte} at {well}"));
    assert!(found.next().is_none(), "two rows for {analyte} at {well}");
    row
}

/// The ledger's rows in which each column holds its text.
fn ledger(fits: &[(&str, &str)]) -> Vec<Row> {
    let rows = DEMO.table("ledger.csv").into_iter();
    rows.filter(|row| fits.iter().all(|(column, text)| row[*column] == *text)).collect()
}

/// Asserts that the ledger accounts for exactly one such record with this outcome and reason.
#[track_caller]
fn one_record(fits: &[(&str, &str)], outcome: &str, reason: &str) -> Row {
    let mut rows = ledger(fits);
    assert_eq!(rows.len(), 1, "{fits:?}: {rows:?}");
    let row = rows.remove(0);
    assert_eq!((row["outcome"].as_str(), row["reason"].as_str()), (outcome, reason), "{row:?}");
    row
}

#[test]
fn each_series_has_the_verdict_the_reasons_and_the_flags_it_is_there_to_show() {
    let rows = DEMO.table("summary.csv");
    assert_eq!(rows.len(), cases().len());
    for case in cases() {
        let row = series(&rows, &case["well"], &case["analyte"]);
        let found: Row = case.keys().map(|column| (column.clone(), row[column].clone())).collect();
        assert_eq!(found, case);
        assert_eq!(row["reach_date"].is_empty(), !case["why_no_date"].is_empty(), "{case:?}");
    }
}

#[test]
fn all_seven_verdicts_appear() {
    let found: BTreeSet<String> =
        DEMO.table("summary.csv").iter().map(|r| r["verdict"].clone()).collect();
    let seven = ["attenuating", "below", "flat", "rising", "too-few", "undecided", "undetected"];
    assert!(found.iter().eq(seven), "{found:?}");
}

#[test]
fn the_demos_readme_names_every_well_and_says_that_all_is_invented() {
    let readme = fs::read_to_string(demo().join("README.md")).expect("a README");
    assert!(readme.contains("invented"));
    for case in cases() {
        assert!(readme.contains(&format!("`{}`", case["well"])), "{} is missing", case["well"]);
    }
}

#[test]
fn the_clean_decline_gets_a_rate_and_a_date_with_both_ends() {
    let rows = DEMO.table("summary.csv");
    let row = series(&rows, "MW-1", "PCE");
    // Least squares and Fieller ends in a script of its own (numpy 2.4, scipy 1.17).
    for (column, expected) in
        [("rate_per_year", 0.467309), ("rate_lower", 0.444072), ("rate_upper", 0.490547)]
    {
        let found: f64 = row[column].parse().expect("a number");
        assert!((found - expected).abs() < 1e-5, "{column}: {found}");
    }
    let dates = ["reach_earliest", "reach_date", "reach_latest"].map(|column| row[column].as_str());
    assert_eq!(dates, ["2029-07-04", "2029-10-11", "2030-01-28"]);
    assert_eq!(row["pace"], "ahead");
}

#[test]
fn every_file_has_one_ledger_row_for_each_of_its_records() {
    for (name, separator) in FILES {
        let path = demo().join("results").join(name);
        let mut reader =
            csv::ReaderBuilder::new().delimiter(separator).from_path(path).expect("a file");
        let records = reader.byte_records().map(|record| record.expect("a record"));
        let records = records.filter(|record| record.iter().any(|cell| !cell.is_empty())).count();
        assert_eq!(ledger(&[("file", &format!("results/{name}"))]).len(), records, "{name}");
    }
    assert!(DEMO.table("ledger.csv").iter().all(|row| !row["outcome"].is_empty()));
}

#[test]
fn records_without_a_number_say_why() {
    one_record(&[("well", "MW-10"), ("date", "2025-08-19")], "non-result", "dry");
    one_record(&[("well", "MW-8"), ("date", "2022-08-18")], "non-result", "free-product");
    one_record(&[("well", "MW-12"), ("date", "2025-05-23")], "non-result", "destroyed");
}

#[test]
fn qualifiers_do_what_they_mean() {
    one_record(&[("qualifier", "R")], "set-aside", "rejected");
    one_record(&[("qualifier", "B")], "used", "");
    one_record(&[("qualifier", "UJ")], "used", "");
    // At MW-14 a non-detect of the older laboratory has no detection limit, so J under the reporting
    // limit counts as a non-detect at it. At PZ-4/A every non-detect has one, and J keeps its number.
    let used = DEMO.table("used.csv");
    let marks = |well: &str| {
        let estimated = ledger(&[("well", well), ("qualifier", "J")]);
        let days: Vec<&String> = estimated.iter().map(|row| &row["date"]).collect();
        let rows = used.iter().filter(|row| row["well"] == well && days.contains(&&row["date"]));
        rows.map(|row| row["mark"].clone() + &row["value"]).collect::<Vec<_>>()
    };
    assert_eq!(marks("MW-14"), ["<1", "<1"]);
    assert_eq!(marks("PZ-4/A"), ["0.46"]);
}

#[test]
fn quality_control_samples_stay_out_of_the_series() {
    let duplicate = one_record(&[("sample_id", "B2405-07FD")], "quality-control", "duplicate");
    assert_eq!(duplicate["well"], "MW-10");
    assert_eq!(ledger(&[("outcome", "quality-control"), ("reason", "blank")]).len(), 2);
    let flags = DEMO.table("flags.csv");
    let differ = flags.iter().find(|row| row["flag"] == "duplicates-differ").expect("the flag");
    // 318 and 503 mg/L: 185 over their mean of 410.5.
    let figure: f64 = differ["figure"].parse().expect("a number");
    assert!((figure - 100.0 * 185.0 / 410.5).abs() < 1e-3, "{figure}");
}

#[test]
fn deliveries_that_repeat_or_revise_are_told_apart() {
    let sample =
        |id: &str, file: &str| [("sample_id", id.to_owned()), ("file", format!("results/{file}"))];
    let at = |id: &str, file: &str, outcome: &str, reason: &str| {
        let fits = sample(id, file);
        let fits: Vec<(&str, &str)> =
            fits.iter().map(|(column, text)| (*column, text.as_str())).collect();
        one_record(&fits, outcome, reason)
    };
    at(REVISED, "2024-2025_birch.csv", "set-aside", "superseded");
    at(REVISED, "2026-Q1_birch.txt", "used", "");
    let repeats = ledger(&[("outcome", "merged"), ("reason", "repeat")]);
    assert_eq!(repeats.len(), 1, "{repeats:?}");
    assert_eq!(repeats[0]["sample_id"], "B2602-01");
}

const REVISED: &str = "B2508-02";

#[test]
fn a_renamed_well_is_one_series_and_a_restart_leaves_the_older_record_out_of_the_fit() {
    let rows = DEMO.table("summary.csv");
    assert_eq!(series(&rows, "MW-2", "cis-1,2-DCE")["first_sampled"], "2019-02-11");
    assert_eq!(series(&rows, "MW-8", "PCE")["samples"], "13");
    let used = DEMO.table("used.csv");
    let before = used.iter().filter(|row| row["well"] == "MW-8" && row["in_fit"] == "no");
    assert_eq!(before.count(), 10);
}

#[test]
fn the_windows_1252_file_is_read_and_its_first_such_line_named() {
    assert!(
        ledger(&[("file", "results/2024-2025_birch.csv"), ("reason", "unknown-unit")]).is_empty()
    );
    let said = DEMO.page.clone() + &DEMO.told;
    assert!(said.contains("windows-1252"), "{said}");
}

#[test]
fn names_are_safe_as_formulas_and_as_file_names() {
    let summary = String::from_utf8(DEMO.files()["summary.csv"].clone()).expect("UTF-8");
    assert!(summary.contains(",'=1+1,") && !summary.contains(",=1+1"), "{summary}");
    let charts: Vec<String> =
        DEMO.files().into_keys().filter(|name| name.starts_with("charts/")).collect();
    // One chart for each series; none lost to another on a disk that ignores case.
    let folded: BTreeSet<String> = charts.iter().map(|name| name.to_lowercase()).collect();
    assert_eq!(folded.len(), cases().len(), "{charts:?}");
    let plain = |c: char| c.is_ascii_alphanumeric() || "._-/".contains(c);
    assert!(charts.iter().all(|name| name.chars().all(plain)), "{charts:?}");
}

#[test]
fn the_outputs_stand_in_the_site_folder_under_the_date_of_the_newest_record() {
    let copy = altered(|_, _, bytes| bytes.to_vec());
    let run = ebbwell(&["review".as_ref(), copy.path().as_os_str()]);
    let out = copy.path().join("review-2026-09-10");
    assert!(fs::read(out.join("summary.csv")).expect("the summary") == DEMO.files()["summary.csv"]);
    let page = String::from_utf8(run.stdout).expect("the page is UTF-8");
    assert!(page.contains("regulator") && page.contains("licensed professionals"), "{page}");
}

#[test]
fn one_thread_two_threads_and_a_second_run_give_the_same_bytes() {
    let one = Review::of(&demo(), &["--threads", "1"]).files();
    assert!(one.contains_key("run.json") && one.contains_key("summary.json"));
    assert!(one == Review::of(&demo(), &["--threads", "2"]).files(), "threads show");
    assert!(one == DEMO.files(), "runs differ");
}

#[test]
fn shuffled_records_give_the_same_summary() {
    let shuffled = altered(|_, _, bytes| {
        let mut lines: Vec<&[u8]> = bytes.split_inclusive(|&byte| byte == b'\n').collect();
        // Fisher and Yates with a linear congruential generator (constants of Numerical Recipes).
        let mut state = 20_260_910_u32;
        for last in (2..lines.len()).rev() {
            state = state.wrapping_mul(1_664_525).wrapping_add(1_013_904_223);
            lines.swap(last, 1 + (state >> 8) as usize % last);
        }
        lines.concat()
    });
    let review = Review::of(shuffled.path(), &[]);
    assert!(review.files()["ledger.csv"] != DEMO.files()["ledger.csv"], "nothing was shuffled");
    for table in ["summary.csv", "flags.csv", "wells.csv"] {
        assert!(
            review.files()[table] == DEMO.files()[table],
            "{table} depends on the order of records"
        );
    }
}

#[test]
fn the_same_concentrations_in_another_unit_give_the_same_summary() {
    let in_mg = altered(|name, separator, bytes| {
        if name != "2026-Q2_birch.txt" {
            return bytes.to_vec();
        }
        let mut reader = csv::ReaderBuilder::new().delimiter(separator).from_reader(bytes);
        let mut writer = csv::WriterBuilder::new().delimiter(separator).from_writer(Vec::new());
        let headers = reader.headers().expect("a header").clone();
        writer.write_record(&headers).expect("written");
        for record in reader.records() {
            let record = record.expect("a record");
            let in_micro = record.iter().any(|cell| cell == "ug/L");
            let cells = headers.iter().zip(&record).map(|(header, cell)| {
                match (header, cell.parse::<f64>()) {
                    ("Value" | "DL" | "Reporting Limit", Ok(value)) if in_micro => {
                        (value / 1000.0).to_string()
                    }
                    ("UOM", _) if in_micro => "mg/L".to_owned(),
                    _ => cell.to_owned(),
                }
            });
            writer.write_record(cells).expect("written");
        }
        writer.into_inner().expect("flushed")
    });
    let review = Review::of(in_mg.path(), &[]);
    let units = |review: &Review| {
        review.table("ledger.csv").iter().filter(|row| row["unit"] == "mg/L").count()
    };
    assert!(units(&review) > units(&DEMO), "no unit was changed");
    for (found, expected) in review.table("summary.csv").iter().zip(DEMO.table("summary.csv")) {
        for (column, text) in &expected {
            let same = match (found[column].parse::<f64>(), text.parse::<f64>()) {
                // Both are rounded to 6 digits, so the last may differ by one.
                (Ok(a), Ok(b)) => (a - b).abs() <= 2e-5 * b.abs(),
                _ => &found[column] == text,
            };
            assert!(same, "{column} of {}: {} is not {text}", expected["well"], found[column]);
        }
    }
}
