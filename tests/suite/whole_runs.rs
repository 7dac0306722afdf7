//! Worked examples as whole runs through the program: verdict, dates, flags and sentences.
//!
//! Sources: W02 is Example 21-7 of the US EPA's Unified Guidance (EPA 530-R-09-007) on the ln
//! scale; W16, W17 and W18 are series made for the project's method notes, their figures computed
//! there with general-purpose libraries.

use std::collections::BTreeMap;
use std::fmt::Write as _;
use std::fs;
use std::process::Command;

use chrono::{Days, NaiveDate};
use tempfile::TempDir;

use crate::bench::records::FALSE_ALARMS;

/// What the program says of one series.
struct Run {
    row: BTreeMap<String, String>,
    /// The page with its line breaks folded.
    page: String,
    json: String,
}

/// The date `years` after the beginning of 2010.
fn date(years: f64) -> NaiveDate {
    let days = (years * 365.25).round();
    let start = NaiveDate::from_ymd_opt(2010, 1, 1).expect("a date");
    start.checked_add_days(Days::new(days as u64)).expect("a date")
}

/// Reviews one series at a two-sided confidence.
fn run(points: &[(f64, f64)], limit: f64, confidence: f64) -> Run {
    let place = TempDir::new().expect("a folder");
    let site = place.path().join("site");
    fs::create_dir_all(site.join("results")).expect("a folder");
    let mut settings = "[settings]\ngoal-date = 2040-12-31\n".to_owned();
    if (confidence - 0.9).abs() > 1e-9 {
        let _ = writeln!(
            settings,
            "confidence = {confidence}\nwhy = {{ confidence = \"the worked example's\" }}"
        );
    }
    let text = format!(
        "[site]\nname = \"Worked example\"\n{settings}[[analyte]]\nname = \"TCE\"\n\
         limit = \"{limit} ug/L\"\nlimit-source = \"the worked example\"\n"
    );
    fs::write(site.join("site.toml"), text).expect("a site file");
    let mut table = "well,analyte,date,result,unit\n".to_owned();
    for (years, value) in points {
        let _ = writeln!(table, "W,TCE,{},{value},ug/L", date(*years));
    }
    fs::write(site.join("results/a.csv"), table).expect("a results file");
    let out = place.path().join("out");
    let output = Command::new(env!("CARGO_BIN_EXE_ebbwell"))
        .args(["review", "--out"])
        .arg(&out)
        .arg(&site)
        .output()
        .expect("the program starts");
    assert_eq!(output.status.code(), Some(0), "{}", String::from_utf8_lossy(&output.stderr));
    let mut reader = csv::Reader::from_path(out.join("summary.csv")).expect("a summary");
    let headers = reader.headers().expect("a header").clone();
    let record = reader.records().next().expect("one series").expect("a record");
    let row = headers.iter().map(str::to_owned).zip(record.iter().map(str::to_owned)).collect();
    let page = String::from_utf8(output.stdout).expect("UTF-8");
    let page = page.split_whitespace().collect::<Vec<_>>().join(" ");
    let json = fs::read_to_string(out.join("summary.json")).expect("a summary");
    Run { row, page, json }
}

impl Run {
    fn cell(&self, column: &str) -> &str {
        &self.row[column]
    }

    fn flags(&self) -> Vec<&str> {
        self.cell("flags").split(';').filter(|flag| !flag.is_empty()).collect()
    }

    /// Whether a date cell lies within some days of a time in years.
    fn near(&self, column: &str, years: f64, days: i64) {
        let found: NaiveDate = self.cell(column).parse().expect("a date");
        let off = found.signed_duration_since(date(years)).num_days().abs();
        assert!(off <= days, "{column}: {found} is {off} days from {}", date(years));
    }
}

const W02: [(f64, f64); 10] = [
    (2.0, 54.2),
    (4.0, 44.3),
    (8.0, 45.4),
    (11.0, 38.3),
    (13.0, 27.1),
    (16.0, 30.2),
    (20.0, 28.3),
    (23.0, 17.6),
    (26.0, 14.7),
    (30.0, 4.1),
];

#[test]
fn w02_gets_its_date_and_is_told_to_hang_on_its_last_point() {
    let points: Vec<(f64, f64)> = W02.iter().map(|(month, v)| (month / 12.0, *v)).collect();
    let run = run(&points, 5.0, 0.95);
    assert_eq!(run.cell("verdict"), "attenuating");
    // Months 37.675, 30.463 and 53.936; days of sampling are whole, so a few days are allowed.
    run.near("reach_date", 37.675_440_182 / 12.0, 4);
    run.near("reach_earliest", 30.462_731_382 / 12.0, 4);
    run.near("reach_latest", 53.936_440_911 / 12.0, 6);
    let flags = run.flags();
    for flag in ["influential-point", "outlier", "quickening", "short-record"] {
        assert!(flags.contains(&flag), "{flag}: {flags:?}");
    }
    // Without its last point the date moves to month 49.996 of the notes.
    assert!(run.json.contains("without 2012-07-02 the rate is"), "{}", run.json);
}

const W17: [(f64, f64); 20] = [
    (0.0, 940.0),
    (0.25, 700.0),
    (0.5, 610.0),
    (0.75, 430.0),
    (1.0, 350.0),
    (1.25, 300.0),
    (1.5, 210.0),
    (1.75, 200.0),
    (2.0, 150.0),
    (2.5, 105.0),
    (3.0, 72.0),
    (3.5, 61.0),
    (4.0, 49.0),
    (4.5, 52.0),
    (5.0, 40.0),
    (5.5, 45.0),
    (6.0, 38.0),
    (6.5, 44.0),
    (7.0, 37.0),
    (8.0, 41.0),
];

#[test]
fn w17_promises_a_date_that_the_plateau_denies_and_this_is_told_first() {
    let run = run(&W17, 5.0, 0.9);
    assert_eq!(run.cell("verdict"), "attenuating");
    run.near("reach_date", 10.955, 4);
    assert_eq!((run.cell("alternative_model"), run.cell("alternative_date")), ("plateau", ""));
    assert_eq!(run.cell("pace"), "unclear");
    let flags = run.flags();
    for flag in ["slowing", "two-rates", "levels-off"] {
        assert!(flags.contains(&flag), "{flag}: {flags:?}");
    }
    let denied = run.page.find("The line promises a date that a better model denies");
    let date = run.page.find("meets the limit about");
    assert!(denied.is_some() && denied < date, "{}", run.page);
    // P = 39.17 in the notes.
    assert!(run.page.contains("levelling off at about 39.2 ug/L"), "{}", run.page);
}

const W18: [(f64, f64); 17] = [
    (0.0, 520.0),
    (0.5, 500.0),
    (1.0, 470.0),
    (1.5, 495.0),
    (2.0, 440.0),
    (2.5, 455.0),
    (3.0, 420.0),
    (3.25, 330.0),
    (3.5, 270.0),
    (3.75, 225.0),
    (4.0, 160.0),
    (4.25, 140.0),
    (4.5, 105.0),
    (4.75, 88.0),
    (5.0, 66.0),
    (5.5, 42.0),
    (6.0, 24.0),
];

#[test]
fn w18_has_two_rates_and_no_plateau() {
    let run = run(&W18, 5.0, 0.9);
    assert_eq!(run.cell("alternative_model"), "two-rates");
    assert!(!run.cell("alternative_date").is_empty());
    let flags = run.flags();
    assert!(flags.contains(&"two-rates") && flags.contains(&"quickening"), "{flags:?}");
    assert!(!flags.contains(&"levels-off"), "{flags:?}");
}

fn yearly(y: [f64; 8]) -> Vec<(f64, f64)> {
    y.iter().enumerate().map(|(t, y)| (t as f64, y.exp())).collect()
}

#[test]
fn w16_has_an_interval_a_single_end_and_no_place_at_all() {
    let b1 = run(&yearly([3.9, 3.4, 3.8, 3.1, 3.5, 2.9, 3.3, 2.8]), 1.6_f64.exp(), 0.95);
    assert_eq!(b1.cell("verdict"), "attenuating");
    b1.near("reach_earliest", 10.981_600_412, 3);
    // The sampling days are whole, and this end is 70 years away.
    b1.near("reach_latest", 80.999_177_457, 120);
    let b2 = [3.9, 3.0, 3.8, 2.7, 3.9, 3.0, 3.3, 3.2];
    let open = run(&yearly(b2), 1.6_f64.exp(), 0.95);
    assert_eq!((open.cell("reach_date"), open.cell("reach_latest")), ("", ""));
    open.near("reach_earliest", 10.658_155_431, 3);
    assert_eq!(open.cell("why_no_date"), "interval-holds-zero");
    assert!(open.flags().contains(&"unbounded"), "{:?}", open.flags());
    let nowhere = run(&yearly(b2), 3.3_f64.exp(), 0.95);
    assert_eq!(nowhere.cell("why_no_date"), "not-located");
    assert_eq!(nowhere.cell("reach_earliest"), "");
    assert!(nowhere.flags().contains(&"not-located"), "{:?}", nowhere.flags());
}

#[test]
fn hostile_series_end_in_a_reason() {
    let one_date = run(&[(0.0, 5.0)], 1.0, 0.9);
    assert_eq!((one_date.cell("verdict"), one_date.cell("why_no_rate")), ("too-few", "dates"));
    let quarters = |value: fn(f64) -> f64| -> Vec<(f64, f64)> {
        (0..12).map(|i| (f64::from(i) / 4.0, value(f64::from(i) / 4.0))).collect()
    };
    let equal = run(&quarters(|_| 7.0), 1.0, 0.9);
    assert_eq!(equal.cell("why_no_rate"), "on-a-line");
    let tiny = run(&quarters(|t| 1e-300 * (1.0 + 0.3 * (t * 40.0).sin())), 1e-301, 0.9);
    let huge = run(&quarters(|t| 1e300 * (-t + 0.3 * (t * 40.0).sin()).exp()), 1.0, 0.9);
    for run in [equal, tiny, huge] {
        for (column, cell) in &run.row {
            let lower = cell.to_lowercase();
            assert!(!lower.contains("nan") && !lower.contains("inf"), "{column}: {cell}");
        }
    }
}

/// Sound data should rarely be doubted: exact first-order data with independent normal errors,
/// drawn from a seeded stream, may carry a flag in under 30 % of series, beyond those that say the
/// record is short or the date far.
#[test]
fn sound_series_are_rarely_flagged() {
    const SERIES: usize = 400;
    const ALLOWED: [&str; 5] =
        ["few-dates", "short-record", "far-extrapolation", "beyond-horizon", "stale"];
    for setting in FALSE_ALARMS {
        let place = TempDir::new().expect("a folder");
        let mut table = "well,analyte,date,result,unit\n".to_owned();
        for (well, record) in setting.records(SERIES).enumerate() {
            for (t, value) in record.t.iter().zip(record.concentrations(200.0)) {
                let _ = writeln!(table, "W{well:03},TCE,{},{value},ug/L", date(*t));
            }
        }
        let file = place.path().join("drawn.csv");
        fs::write(&file, table).expect("written");
        let out = place.path().join("out");
        let output = Command::new(env!("CARGO_BIN_EXE_ebbwell"))
            .args(["review", "--template", "chlorinated-solvents", "--formats", "csv", "--out"])
            .arg(&out)
            .arg(&file)
            .output()
            .expect("the program starts");
        assert_eq!(output.status.code(), Some(0), "{}", String::from_utf8_lossy(&output.stderr));
        let mut counts: BTreeMap<String, usize> = BTreeMap::new();
        let mut flagged = 0;
        let mut reader = csv::Reader::from_path(out.join("summary.csv")).expect("a summary");
        let last = reader.headers().expect("a header").len() - 1;
        for row in reader.records() {
            let row = row.expect("a record");
            let raised: Vec<&str> = row[last]
                .split(';')
                .filter(|flag| !flag.is_empty() && !ALLOWED.contains(flag))
                .collect();
            flagged += usize::from(!raised.is_empty());
            for flag in raised {
                *counts.entry(flag.to_owned()).or_default() += 1;
            }
        }
        println!("{setting:?}: {flagged} of {SERIES} flagged, {counts:?}");
        assert!(flagged * 10 < SERIES * 3, "{flagged} of {SERIES}: {counts:?}");
    }
}

/// A series that rises, falls again and never comes near its limit has two rates and nothing that a
/// better model could deny.
#[test]
fn a_series_that_was_never_over_its_limit_is_not_denied() {
    let points: Vec<(f64, f64)> = (0..24)
        .map(|i| {
            let t = f64::from(i) / 4.0;
            let ln = if t < 3.0 { 0.6 * t } else { 1.8 - 0.8 * (t - 3.0) };
            (t, (ln + 0.05 * (f64::from(i) * 2.3).sin()).exp())
        })
        .collect();
    let run = run(&points, 1_000.0, 0.9);
    assert_eq!(run.cell("alternative_model"), "two-rates");
    assert!(run.json.contains("\"alternative_denies\": false"), "{}", run.json);
}
