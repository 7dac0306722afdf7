//! Inputs that once failed, made small. Each is read in a process of its own, as the mutated ones
//! are, under a number far beyond theirs.

use tempfile::TempDir;

use super::Worker;
use super::mutate::Input;
use super::seeds::Kind;

/// The number of the first kept input.
const FIRST: u64 = 1 << 60;

/// The kept inputs, in the order of their numbers.
const KEPT: [fn() -> String; 2] = [long_cell, wide_line];

/// The kept input of a number.
pub fn input(number: u64) -> Option<Input> {
    let at = usize::try_from(number.checked_sub(FIRST)?).ok()?;
    let text = KEPT.get(at)?();
    Some(Input { kind: Kind::Table, from: "kept", bytes: text.into_bytes(), site: 0 })
}

const HEADER: &str = "well,analyte,date,result,unit";
const RECORD: &str = "MW-1,PCE,2024-03-05,4.2,ug/L\n";

/// A cell of 64 KB before 20,000 records.
fn long_cell() -> String {
    let cell = "x".repeat(64 << 10);
    format!("{HEADER}\n{cell},PCE,2024-03-05,4.2,ug/L\n{}", RECORD.repeat(20_000))
}

/// A line of 20,000 cells before 20,000 records.
fn wide_line() -> String {
    format!("{HEADER}\n{}\n{}", ",x".repeat(20_000), RECORD.repeat(20_000))
}

/// Reads a kept input in a process of its own.
fn holds(at: u64) {
    let place = TempDir::new().expect("a folder");
    let report = Worker::start(place.path(), 0, FIRST + at, FIRST + at + 1).finish();
    assert!(report.failures.is_empty(), "{}", report.failures.join("\n"));
    assert_eq!((report.inputs, report.records), (1, 20_001));
}

#[test]
fn one_long_cell_does_not_swell_the_records_after_it() {
    holds(0);
}

#[test]
fn one_wide_line_does_not_swell_the_records_after_it() {
    holds(1);
}
