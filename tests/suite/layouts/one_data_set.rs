//! One data set in many renderings gives one summary, to the digit.

use std::fs;
use std::process::Command;

use tempfile::TempDir;

use super::SITE;
use super::grids::{Cell, Grid, Typed, csv, row, xlsx};

const WELLS: [&str; 3] = ["MW-1", "001", "B/2"];
const ANALYTES: [(&str, &str); 2] = [("Benzene", "ug/L"), ("Toluene", "mg/L")];

fn dates() -> Vec<Cell> {
    (0..12_u16)
        .map(|q| Cell::Date(2021 + q / 4, 2 + 3 * (q % 4) as u8, 10 + (q % 7) as u8))
        .collect()
}

/// The result of a well, an analyte and a date: falling with a fixed scatter, some not detected,
/// some not sampled, one dry.
fn result(well: usize, analyte: usize, date: usize) -> Cell {
    let scatter = [0.06, -0.11, 0.02, 0.09, -0.05, -0.08, 0.11, -0.03];
    if (well + 2 * analyte + date) % 9 == 8 {
        return Cell::Empty;
    }
    if (well, date) == (1, 4) {
        return "dry".into();
    }
    let ln = [3.7, 2.4, 0.9][well] - 0.12 * date as f64 + scatter[(well + date + analyte) % 8];
    let value = (ln.exp() * 100.0).round() / 100.0;
    if value < 1.0 { "<1".into() } else { Cell::Number(value) }
}

fn filled() -> impl Iterator<Item = (usize, usize, usize)> {
    (0..WELLS.len())
        .flat_map(|w| (0..ANALYTES.len()).flat_map(move |a| (0..12).map(move |d| (w, a, d))))
        .filter(|&(w, a, d)| result(w, a, d) != Cell::Empty)
}

fn long() -> Grid {
    let mut grid = vec![row(&["well", "analyte", "date", "result", "unit"])];
    for (w, a, d) in filled() {
        let (analyte, unit) = ANALYTES[a];
        let date = dates()[d].clone();
        grid.push(vec![WELLS[w].into(), analyte.into(), date, result(w, a, d), unit.into()]);
    }
    grid
}

/// Wells down and dates across, one block an analyte with its title above.
fn wells_down() -> Grid {
    let mut grid = Vec::new();
    for (a, (analyte, unit)) in ANALYTES.iter().enumerate() {
        grid.push(vec![Cell::Text(format!("{analyte} ({unit})"))]);
        grid.push(std::iter::once("Well".into()).chain(dates()).collect());
        for (w, well) in WELLS.iter().enumerate() {
            let results = (0..12).map(|d| result(w, a, d));
            grid.push(std::iter::once((*well).into()).chain(results).collect());
        }
        grid.push(Vec::new());
    }
    grid
}

/// Wells down and dates across, the analyte and its unit in columns.
fn analytes_in_a_column() -> Grid {
    let head = row(&["Well", "Analyte", "Unit"]);
    let mut grid = vec![head.into_iter().chain(dates()).collect()];
    for (w, well) in WELLS.iter().enumerate() {
        for (a, (analyte, unit)) in ANALYTES.iter().enumerate() {
            let results = (0..12).map(|d| result(w, a, d));
            grid.push(row(&[well, analyte, unit]).into_iter().chain(results).collect());
        }
    }
    grid
}

/// Dates down and wells across, the analyte in the corner of each block.
fn dates_down() -> Grid {
    let mut grid = Vec::new();
    for (a, (analyte, unit)) in ANALYTES.iter().enumerate() {
        let corner = Cell::Text(format!("{analyte}, {unit}"));
        grid.push(std::iter::once(corner).chain(WELLS.map(Cell::from)).collect());
        for (d, date) in dates().into_iter().enumerate() {
            let results = (0..WELLS.len()).map(|w| result(w, a, d));
            grid.push(std::iter::once(date).chain(results).collect());
        }
    }
    grid
}

/// Analytes across with units in the header, well and date at the left.
fn analytes_across() -> Grid {
    let heads = ANALYTES.iter().map(|(analyte, unit)| Cell::Text(format!("{analyte}\n({unit})")));
    let mut grid: Grid = vec![row(&["Location", "Sample Date"]).into_iter().chain(heads).collect()];
    for (w, well) in WELLS.iter().enumerate() {
        for (d, date) in dates().into_iter().enumerate() {
            let results = (0..ANALYTES.len()).map(|a| result(w, a, d));
            grid.push([Cell::from(*well), date].into_iter().chain(results).collect());
        }
    }
    grid
}

/// summary.csv of a review of a site folder with this one file.
fn summary(name: &str, bytes: &[u8]) -> String {
    let place = TempDir::new().expect("a folder");
    let results = place.path().join("site/results");
    fs::create_dir_all(&results).expect("a folder");
    fs::write(place.path().join("site/site.toml"), SITE).expect("a site file");
    fs::write(results.join(name), bytes).expect("a results file");
    let output = Command::new(env!("CARGO_BIN_EXE_ebbwell"))
        .args(["review", "site", "--formats", "csv", "--out", "out", "--as-of", "2024-06-30"])
        .current_dir(place.path())
        .output()
        .expect("the program starts");
    let message = String::from_utf8_lossy(&output.stderr).into_owned();
    assert_eq!(output.status.code(), Some(0), "{name}: {message}");
    fs::read_to_string(place.path().join("out/summary.csv")).expect("a summary")
}

#[track_caller]
fn same_summary(grid: &Grid) {
    let expected = summary("long.csv", &csv(&long()));
    assert_eq!(expected.lines().count(), 1 + WELLS.len() * ANALYTES.len());
    let renderings = [
        ("text.csv", csv(grid)),
        ("typed.xlsx", xlsx(&[("Data", grid)], Typed::Yes)),
        ("texts.xlsx", xlsx(&[("Data", grid)], Typed::No)),
    ];
    for (name, bytes) in renderings {
        assert_eq!(summary(name, &bytes), expected, "{name}");
    }
}

#[test]
fn a_long_table() {
    same_summary(&long());
}

#[test]
fn wells_down_and_dates_across_in_blocks() {
    same_summary(&wells_down());
}

#[test]
fn wells_down_and_dates_across_with_analytes_in_a_column() {
    same_summary(&analytes_in_a_column());
}

#[test]
fn dates_down_and_wells_across() {
    same_summary(&dates_down());
}

#[test]
fn analytes_across_with_units_in_the_header() {
    same_summary(&analytes_across());
}

#[test]
fn a_sheet_for_each_analyte() {
    let expected = summary("long.csv", &csv(&long()));
    let both = wells_down();
    let half = both.len() / 2;
    let (benzene, toluene) = (both[..half].to_vec(), both[half..].to_vec());
    let bytes = xlsx(&[("Benzene", &benzene), ("Toluene", &toluene)], Typed::Yes);
    assert_eq!(summary("sheets.xlsx", &bytes), expected);
}
