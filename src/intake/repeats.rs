//! The same sample delivered again, and the same sample analysed again in a dilution.

use std::collections::BTreeMap;

use super::address;
use super::rows::{Dilution, Kind, Row};
use super::texts::{Code, Texts};
use crate::ledger::{Fate, Ledger, Merged, RecordId, SetAside, Told};
use crate::terms::Reading;

/// Site, well, analyte, fraction, depth and day of a sample.
type SampleKey = (Code, Code, Code, u8, Code, i32);

/// Settles repeats over all files: an equal result of the same sample is merged as a repeat, an
/// unequal one in a later file supersedes the earlier, unequal ones of one file both stay.
pub fn settle(rows: &[Row], ledger: &mut Ledger, texts: &Texts, files: &[String]) {
    let mut samples: BTreeMap<SampleKey, Vec<RecordId>> = BTreeMap::new();
    for (at, row) in rows.iter().enumerate() {
        let record = u32::try_from(at).unwrap_or(u32::MAX);
        let Some(day) = row.day else { continue };
        let open = match ledger.fate(record) {
            Fate::Candidate | Fate::SetAside(SetAside::Rejected) => true,
            Fate::SetAside(SetAside::QualifierNeedsLegend) => {
                row.dilution == Dilution::OverCalibration
            }
            _ => false,
        };
        if open && row.kind == Kind::Sample {
            let key = (row.site, row.well, row.analyte, row.fraction, row.written.depth, day);
            samples.entry(key).or_default().push(record);
        }
    }
    for records in samples.values().filter(|records| records.len() > 1) {
        dilutions(records, rows, ledger);
        deliveries(records, rows, ledger, texts, files);
    }
}

/// Whether two records of one day tell of the same sample: equal sample ids where both have one,
/// else the same time of day.
fn same_sample(a: &Row, b: &Row) -> bool {
    match (a.written.sample_id, b.written.sample_id) {
        (0, _) | (_, 0) => a.time == b.time,
        (a, b) => a == b,
    }
}

/// A result over the calibration loses to the diluted analysis of the same sample.
fn dilutions(records: &[RecordId], rows: &[Row], ledger: &mut Ledger) {
    let row = |record: RecordId| &rows[record as usize];
    for &over in records.iter().filter(|r| row(**r).dilution == Dilution::OverCalibration) {
        let diluted = records.iter().any(|&other| {
            row(other).dilution == Dilution::Diluted
                && ledger.fate(other) == Fate::Candidate
                && same_sample(row(over), row(other))
        });
        if diluted {
            ledger.amend(over, Fate::Merged(Merged::SupersededByDilution));
        }
    }
}

/// Repeats and revisions among the records of one day.
fn deliveries(
    records: &[RecordId],
    rows: &[Row],
    ledger: &mut Ledger,
    texts: &Texts,
    files: &[String],
) {
    let row = |record: RecordId| &rows[record as usize];
    let mut standing: Vec<RecordId> = Vec::new();
    for &record in records {
        let open =
            matches!(ledger.fate(record), Fate::Candidate | Fate::SetAside(SetAside::Rejected));
        if !open {
            continue;
        }
        let same: Vec<RecordId> =
            standing.iter().copied().filter(|&s| same_sample(row(s), row(record))).collect();
        let repeats = same.iter().any(|&earlier| {
            equal_result(row(earlier), row(record)) && ledger.fate(earlier) == ledger.fate(record)
        });
        if repeats {
            if ledger.fate(record) == Fate::Candidate {
                ledger.amend(record, Fate::Merged(Merged::Repeat));
            }
            continue;
        }
        for earlier in same.into_iter().filter(|&s| row(s).file < row(record).file) {
            standing.retain(|&s| s != earlier);
            if ledger.fate(earlier) == Fate::Candidate {
                ledger.amend(earlier, Fate::SetAside(SetAside::Superseded));
                ledger.tell(
                    earlier,
                    Told::Revised {
                        was: shown(row(earlier), texts),
                        is: shown(row(record), texts),
                        place: place_of(row(record), texts, files),
                    },
                );
            }
        }
        standing.push(record);
    }
}

/// Where a record stands.
fn place_of(row: &Row, texts: &Texts, files: &[String]) -> String {
    let record = address::record(row.line, row.column);
    address::place(&files[row.file as usize], texts.text(row.sheet), &record)
}

/// The result as written, with its qualifier and unit.
fn shown(row: &Row, texts: &Texts) -> String {
    let cells = [row.written.result, row.written.qualifier, row.written.unit];
    let filled: Vec<&str> = cells.into_iter().filter_map(|code| texts.filled(code)).collect();
    filled.join(" ")
}

/// Whether two records report the same: mark and value, in whichever unit, and estimated or not.
fn equal_result(a: &Row, b: &Row) -> bool {
    let same_value = match (a.reading, b.reading, a.unit, b.unit) {
        (Some(x), Some(y), Some(from), Some(to)) => {
            let converted = from.convert(x.number(), to);
            let close = converted.is_some_and(|v| {
                // Two decimal spellings of one value in two units differ by rounding alone.
                (v - y.number()).abs() <= 1e-12 * v.abs().max(y.number().abs())
            });
            std::mem::discriminant::<Reading>(&x) == std::mem::discriminant::<Reading>(&y) && close
        }
        (None, None, _, _) => a.written.result == b.written.result,
        _ => false,
    };
    same_value && a.estimated == b.estimated
}
