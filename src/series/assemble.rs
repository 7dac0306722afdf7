//! One run of rows becomes one series: its unit and basis settled, its candidates gathered.

use std::collections::BTreeMap;

use chrono::NaiveDate;

use super::{AppliedLimit, Candidate, DuplicatePair, SampleRole, SeriesKey, WellSeries};
use crate::intake::texts::{Code, Texts};
use crate::ledger::{Fate, QualityControl, RecordId, SetAside, Told};
use crate::site::Site;
use crate::terms::{Reading, Unit, folded};

/// One row of a run.
#[derive(Clone, Debug)]
pub struct RunRow {
    /// The record.
    pub record: RecordId,
    /// Its fate so far.
    pub fate: Fate,
    /// Its date.
    pub date: Option<NaiveDate>,
    /// What it says, in its own unit.
    pub reading: Option<Reading>,
    /// Its unit.
    pub unit: Option<Unit>,
    /// Its basis.
    pub basis: Code,
    /// Its CAS number.
    pub cas: Code,
    /// Its reporting limit.
    pub reporting_limit: Option<f64>,
    /// Its detection limit.
    pub detection_limit: Option<f64>,
    /// Estimated.
    pub estimated: bool,
    /// The decision that excludes it.
    pub excluded_by: Option<u16>,
}

/// Turns runs into series.
pub struct Assembler<'a> {
    /// The site.
    pub site: &'a Site,
    /// The as-of date, which decides the limit in force.
    pub as_of: NaiveDate,
    /// The texts behind codes.
    pub texts: &'a Texts,
}

/// A series, and what became of records that cannot belong to it.
pub struct Assembled {
    /// The series.
    pub series: WellSeries,
    /// Changed fates.
    pub amended: Vec<(RecordId, Fate)>,
    /// What is told.
    pub told: Vec<(RecordId, Told)>,
}

impl Assembler<'_> {
    /// Assembles one run.
    #[must_use]
    pub fn assemble(&self, key: SeriesKey, rows: &[RunRow]) -> Assembled {
        let limit = self.site.limit_for(&key.well, &key.analyte, self.as_of);
        let listed = self.site.analyte_named(&key.analyte);
        let unit = limit
            .map(|limit| limit.value.unit)
            .or_else(|| listed.and_then(|analyte| analyte.unit))
            .or_else(|| commonest_unit(rows))
            .unwrap_or(Unit::UG_PER_L);
        let basis = match listed.and_then(|analyte| analyte.basis.as_deref()) {
            Some(basis) => Some(folded(basis)),
            None => self.commonest_basis(rows),
        };
        let mut out = Assembled {
            series: WellSeries {
                cas: rows.iter().find_map(|row| self.texts.filled(row.cas)).map(str::to_owned),
                unit,
                limit: limit.and_then(|limit| {
                    let value = limit.value.in_unit(unit)?;
                    Some(AppliedLimit { value, source: limit.source.clone() })
                }),
                goal_date: self.site.goal_for(&key.well, &key.analyte),
                candidates: Vec::new(),
                duplicates: Vec::new(),
                low_results: Vec::new(),
                records: rows.iter().map(|row| row.record).collect(),
                key,
            },
            amended: Vec::new(),
            told: Vec::new(),
        };
        for row in rows {
            self.place(row, unit, basis.as_deref(), &mut out);
        }
        out.series.records.sort_unstable();
        out.series.duplicates = pairs(&out.series.candidates);
        out
    }

    /// Puts one row among the candidates, the low results, or the set-aside.
    fn place(&self, row: &RunRow, unit: Unit, basis: Option<&str>, out: &mut Assembled) {
        if row.fate == Fate::SetAside(SetAside::LowResult) {
            out.series.low_results.extend(row.date);
        }
        let role = match row.fate {
            Fate::Candidate => SampleRole::Primary,
            Fate::QualityControl(QualityControl::Duplicate) => SampleRole::Duplicate,
            _ => return,
        };
        let (Some(date), Some(reading), Some(own)) = (row.date, row.reading, row.unit) else {
            return;
        };
        let mut refuse = |why| {
            if role == SampleRole::Primary {
                out.amended.push((row.record, Fate::SetAside(why)));
            }
        };
        let convert = |value: f64| own.convert(value, unit);
        let Some(reading) = converted(reading, convert) else {
            refuse(SetAside::OtherDimension);
            return;
        };
        let own_basis = self.texts.filled(row.basis).map(folded);
        if own_basis.is_some() && basis.is_some() && own_basis.as_deref() != basis {
            refuse(SetAside::OtherBasis);
            return;
        }
        if own != unit {
            let told = Told::Converted { from: own.label(), to: unit.label() };
            out.told.push((row.record, told));
        }
        out.series.candidates.push(Candidate {
            record: row.record,
            date,
            reading,
            reporting_limit: row.reporting_limit.and_then(convert),
            detection_limit: row.detection_limit.and_then(convert),
            estimated: row.estimated,
            role,
            excluded_by: row.excluded_by,
        });
    }

    /// The basis that most candidates state; the least of equals; none where none states one.
    fn commonest_basis(&self, rows: &[RunRow]) -> Option<String> {
        let mut counts: BTreeMap<String, usize> = BTreeMap::new();
        for row in rows.iter().filter(|row| row.fate == Fate::Candidate) {
            if let Some(basis) = self.texts.filled(row.basis) {
                *counts.entry(folded(basis)).or_default() += 1;
            }
        }
        counts.into_iter().max_by(|a, b| a.1.cmp(&b.1).then(b.0.cmp(&a.0))).map(|(basis, _)| basis)
    }
}

/// The unit most used on the newest date, then the least.
fn commonest_unit(rows: &[RunRow]) -> Option<Unit> {
    let usable = || rows.iter().filter(|row| row.fate == Fate::Candidate && row.unit.is_some());
    let newest = usable().filter_map(|row| row.date).max()?;
    let mut counts: BTreeMap<Unit, usize> = BTreeMap::new();
    for unit in usable().filter(|row| row.date == Some(newest)).filter_map(|row| row.unit) {
        *counts.entry(unit).or_default() += 1;
    }
    counts.into_iter().max_by(|a, b| a.1.cmp(&b.1).then(b.0.cmp(&a.0))).map(|(unit, _)| unit)
}

/// A reading with its number converted.
fn converted(reading: Reading, convert: impl Fn(f64) -> Option<f64>) -> Option<Reading> {
    Some(match reading {
        Reading::Measured(v) => Reading::Measured(convert(v)?),
        Reading::Below(v) => Reading::Below(convert(v)?),
        Reading::Above(v) => Reading::Above(convert(v)?),
        Reading::Between(low, high) => Reading::Between(convert(low)?, convert(high)?),
    })
}

/// Each duplicate with the first sample of its date.
fn pairs(candidates: &[Candidate]) -> Vec<DuplicatePair> {
    let of = |role| candidates.iter().filter(move |c: &&Candidate| c.role == role);
    let mut pairs: Vec<DuplicatePair> = of(SampleRole::Duplicate)
        .filter_map(|duplicate| {
            let parent = of(SampleRole::Primary)
                .filter(|parent| parent.date == duplicate.date)
                .min_by_key(|parent| parent.record)?;
            let limits = [parent.reporting_limit, duplicate.reporting_limit];
            Some(DuplicatePair {
                date: duplicate.date,
                parent: parent.record,
                duplicate: duplicate.record,
                parent_reading: parent.reading,
                duplicate_reading: duplicate.reading,
                reporting_limit: limits.into_iter().flatten().max_by(f64::total_cmp),
            })
        })
        .collect();
    pairs.sort_by_key(|pair| (pair.date, pair.duplicate));
    pairs
}
