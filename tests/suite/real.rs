//! A trial on real results that lie beside the project where they are at hand: the 55,544 open
//! results of a national laboratory's monitoring network (CC0). Skips, saying so, where the folder
//! is absent; nothing of it is kept in the repository.

use std::collections::BTreeMap;
use std::fmt::Write as _;
use std::fs;
use std::path::{Path, PathBuf};
use std::process::Command;

use tempfile::TempDir;

/// How the file is declared, and what of it is asked for. Limits are the federal ones; where no
/// checked one exists the analyte has none.
const SITE: &str = r#"
[site]
name = "Trial on open results"

[[results]]
files = "*.csv"
columns = { well = "site_no", analyte = "parm_short_nm", date = "sample_dt", result = "result_va", unit = "unit_cd", qualifier = "remark_cd", reporting_limit = "rpt_lev_va", uncertainty = "lab_sd_va", sample_type = "sample_type_cd", medium = "medium_cd" }
uncertainty = "1-sigma"
sample-types = { "9" = "regular", "7" = "duplicate", "2" = "blank", "6" = "reference" }

[[qualifier]]
code = "E"
means = "estimated"
who = "trial"
when = 2026-01-01
why = "the source's legend: E is an estimated value"
"#;

/// Name, alias in the file, fraction, unit, limit.
const ANALYTES: [(&str, &str, &str, &str, &str); 14] = [
    ("Tritium", "Tritium, wu", "total", "pCi/L", "20000 pCi/L"),
    ("Chloride", "Chloride, wf", "dissolved", "mg/L", "250 mg/L"),
    ("Sodium", "Sodium, wf", "dissolved", "mg/L", ""),
    ("Strontium-90", "Sr-90, wu", "total", "pCi/L", "8 pCi/L"),
    ("Chromium", "Chromium, wf", "dissolved", "ug/L", "100 ug/L"),
    ("Sulfate", "Sulfate, wf", "dissolved", "mg/L", "250 mg/L"),
    ("Nitrate and nitrite as N", "NO3+NO2, wf", "dissolved", "mg/L", "10 mg/L"),
    ("Cesium-137", "Cs-137, wu", "total", "pCi/L", ""),
    ("1,1-DCE", "1,1-Dichloroethene, wu", "total", "ug/L", "7 ug/L"),
    ("1,1,1-TCA", "1,1,1-Trichloroethane, wu", "total", "ug/L", "200 ug/L"),
    ("TCE", "Trichloroethene, wu", "total", "ug/L", "5 ug/L"),
    ("PCE", "Tetrachloroethene, wu", "total", "ug/L", "5 ug/L"),
    ("Carbon tetrachloride", "Tetrachloromethane, wu", "total", "ug/L", "5 ug/L"),
    ("Chloroform", "Trichloromethane, wu", "total", "ug/L", ""),
];

pub fn shared() -> Option<PathBuf> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("../shared/real");
    if folder.join("inl_results.csv").is_file() {
        return Some(folder);
    }
    println!("skipped: the open results are not beside the project");
    None
}

/// The site folder of the trial: the file as it is, and a site file with its mappings.
pub fn site_folder(shared: &Path, place: &TempDir) -> PathBuf {
    let site = place.path().join("trial");
    fs::create_dir_all(site.join("results")).expect("a folder");
    let file = shared.join("inl_results.csv");
    fs::copy(&file, site.join("results/inl_results.csv")).expect("copied");
    let mut text = SITE.to_owned();
    for (name, alias, fraction, unit, limit) in ANALYTES {
        let _ = writeln!(
            text,
            "\n[[analyte]]\nname = {name:?}\naliases = [{alias:?}]\nfraction = {fraction:?}\n\
             unit = {unit:?}\nmedium = \"WG\""
        );
        if !limit.is_empty() {
            let _ = writeln!(text, "limit = {limit:?}\nlimit-source = \"40 CFR 141 or 143\"");
        }
    }
    for (number, name) in names_of_one_site(&file) {
        let _ = writeln!(
            text,
            "\n[[well]]\nname = {number:?}\naliases = [{{ name = {name:?}, who = \"trial\", when = \
             2026-01-01, why = \"the network's own name of the well\" }}]"
        );
    }
    fs::write(site.join("site.toml"), text).expect("a site file");
    site
}

/// Names that stand for exactly one site number, by number.
fn names_of_one_site(file: &Path) -> Vec<(String, String)> {
    let mut numbers: BTreeMap<String, Vec<String>> = BTreeMap::new();
    let mut reader = csv::Reader::from_path(file).expect("the open results");
    for record in reader.records() {
        let record = record.expect("a record");
        let of_name = numbers.entry(record[0].to_owned()).or_default();
        if !of_name.contains(&record[11].to_owned()) {
            of_name.push(record[11].to_owned());
        }
    }
    let single = numbers.into_iter().filter(|(_, numbers)| numbers.len() == 1);
    single.map(|(name, mut numbers)| (numbers.remove(0), name)).collect()
}

#[test]
fn every_record_of_the_open_results_is_accounted_for() {
    let Some(shared) = shared() else { return };
    let place = TempDir::new().expect("a folder");
    let site = site_folder(&shared, &place);
    let out = place.path().join("out");
    let output = Command::new(env!("CARGO_BIN_EXE_ebbwell"))
        .args(["review", "--out"])
        .arg(&out)
        .arg(&site)
        .output()
        .expect("the program starts");
    let message = String::from_utf8_lossy(&output.stderr).into_owned();
    assert_eq!(output.status.code(), Some(0), "{message}");
    let mut counts: BTreeMap<(String, String), usize> = BTreeMap::new();
    let mut ledger = csv::Reader::from_path(out.join("ledger.csv")).expect("a ledger");
    for record in ledger.records() {
        let record = record.expect("a record");
        *counts.entry((record[14].to_owned(), record[15].to_owned())).or_default() += 1;
    }
    println!("{counts:#?}");
    assert_eq!(counts.values().sum::<usize>(), 55_544);
    let of = |outcome: &str, reason: &str| {
        counts.get(&(outcome.to_owned(), reason.to_owned())).copied().unwrap_or_default()
    };
    // Counted independently from the file's own columns: type 7 is 3,311 records, type 2 one,
    // type 6 are 56, type H four, medium WGQ with type 9 are 66.
    assert_eq!(of("quality-control", "duplicate"), 3_311);
    assert_eq!(of("quality-control", "blank"), 1);
    assert_eq!(of("quality-control", "reference"), 56);
    assert_eq!(of("set-aside", "unknown-sample-type"), 4);
    assert_eq!(of("set-aside", "other-medium"), 66);
}
