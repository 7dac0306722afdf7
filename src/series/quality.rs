//! What the quality control that came with the results says: duplicates, blanks, marks, validation,
//! and the non-detects that say nothing about the limit.

use std::collections::BTreeMap;

use chrono::NaiveDate;

use super::pairs::Agreement;
use super::{DuplicatePair, WellSeries};
use crate::intake::texts::Code;
use crate::intake::{Arrived, FrameError, Tidy};
use crate::ledger::{Fate, NonResult, QualityControl, RecordId, SetAside, Told};
use crate::site::Site;
use crate::terms::{Reading, Unit};

/// What the quality control says.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Quality {
    /// Duplicates and splits.
    pub duplicates: Duplicates,
    /// Blanks.
    pub blanks: Blanks,
    /// Marks that were carried along.
    pub marks: Marks,
    /// To what stage each file's batches were validated, in the order of the files.
    pub validation: Vec<Validated>,
    /// Non-detects whose limit is over the regulatory limit, the newest first.
    pub send_back: Vec<SendBack>,
}

/// Duplicates and splits held against their samples.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Duplicates {
    /// Records that are duplicates or splits.
    pub records: usize,
    /// Pairs that were found.
    pub pairs: usize,
    /// Pairs of which both say enough to be compared.
    pub compared: usize,
    /// The pairs that differ by more than the criterion.
    pub differing: Vec<Differing>,
}

/// A pair that differs.
#[derive(Clone, Debug, PartialEq)]
pub struct Differing {
    /// The well.
    pub well: String,
    /// The analyte.
    pub analyte: String,
    /// The date of both.
    pub date: NaiveDate,
    /// The unit of both.
    pub unit: Unit,
    /// The pair.
    pub pair: DuplicatePair,
}

/// Blanks.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Blanks {
    /// Records of blanks.
    pub records: usize,
    /// Those whose result could not be read, so that nothing is known of them.
    pub unread: usize,
    /// Those in which something was found.
    pub detects: Vec<BlankDetect>,
}

/// A blank in which something was found, with the results of its batch.
#[derive(Clone, Debug, PartialEq)]
pub struct BlankDetect {
    /// The blank's record.
    pub record: RecordId,
    /// What it is called where other records name their well.
    pub name: String,
    /// The analyte.
    pub analyte: String,
    /// The date.
    pub date: NaiveDate,
    /// What was found.
    pub value: f64,
    /// Its unit.
    pub unit: Unit,
    /// How many detects of the analyte its batch holds.
    pub batch_detects: usize,
    /// Those of them that are under [`TIMES_BLANK`] times the blank.
    pub doubtful: Vec<RecordId>,
}

/// A result under this many times what was found in a blank of its batch may come from the same
/// source as the blank's (common practice, no source).
pub const TIMES_BLANK: f64 = 5.0;

/// Marks that were carried along.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Marks {
    /// Samples analysed after their holding time.
    pub holding_time: usize,
    /// Results from a dilution.
    pub diluted: usize,
    /// Results marked as estimated.
    pub estimated: usize,
    /// Results said to be found in a blank too.
    pub in_blank: usize,
    /// Results rejected by the laboratory or by validation.
    pub rejected: usize,
}

/// One file's validation.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Validated {
    /// The file's place in the run.
    pub file: u32,
    /// How many batches it holds: by its batch column, else by date.
    pub batches: usize,
    /// The stage in the site file's words; none where it says nothing.
    pub stage: Option<String>,
}

/// A non-detect that says nothing about the limit.
#[derive(Clone, Debug, PartialEq)]
pub struct SendBack {
    /// The record.
    pub record: RecordId,
    /// The well.
    pub well: String,
    /// The analyte.
    pub analyte: String,
    /// The date.
    pub date: NaiveDate,
    /// Its own limit, in `unit`.
    pub limit: f64,
    /// The regulatory limit, in `unit`.
    pub regulatory: f64,
    /// The unit of both.
    pub unit: Unit,
}

/// Same file and batch, else same file and date; with the analyte.
type Batch = (u32, Code, Option<NaiveDate>, Code);

/// Gathers what the quality control says about records dated up to the as-of date.
///
/// # Errors
/// [`FrameError`], which would be a fault of this program.
pub fn quality(
    tidy: &Tidy,
    site: &Site,
    series: &[WellSeries],
    as_of: NaiveDate,
) -> Result<Quality, FrameError> {
    let mut quality = Quality {
        duplicates: duplicates(series, site, as_of),
        send_back: send_back(series, as_of),
        ..Quality::default()
    };
    for (_, told) in tidy.ledger.told_by_record() {
        match told {
            Told::HoldingTime => quality.marks.holding_time += 1,
            Told::InBlank => quality.marks.in_blank += 1,
            _ => {}
        }
    }
    let mut batches: BTreeMap<u32, std::collections::BTreeSet<(Code, Option<NaiveDate>)>> =
        BTreeMap::new();
    for record in tidy.arrived()? {
        let fate = tidy.ledger.fate(record.record);
        quality.marks.diluted += usize::from(record.diluted);
        quality.marks.estimated += usize::from(record.estimated && fate == Fate::Candidate);
        quality.marks.rejected += usize::from(fate == Fate::SetAside(SetAside::Rejected));
        let date = record.date.filter(|_| record.batch == 0);
        if record.batch != 0 || date.is_some() {
            batches.entry(record.file).or_default().insert((record.batch, date));
        }
        match fate {
            Fate::QualityControl(QualityControl::Duplicate) => quality.duplicates.records += 1,
            Fate::QualityControl(QualityControl::Blank) => {
                quality.blanks.records += 1;
                match (record.reading, record.date, record.unit) {
                    (Some(Reading::Measured(value)), Some(date), Some(unit))
                        if record.analyte != 0 =>
                    {
                        quality.blanks.detects.push(BlankDetect {
                            record: record.record,
                            name: tidy.name(record.well),
                            analyte: tidy.name(record.analyte),
                            date,
                            value,
                            unit,
                            batch_detects: 0,
                            doubtful: Vec::new(),
                        });
                    }
                    (Some(Reading::Below(_)), ..) => {}
                    _ => quality.blanks.unread += 1,
                }
            }
            _ => {}
        }
    }
    if !quality.blanks.detects.is_empty() {
        hold_against_batches(&mut quality.blanks.detects, tidy)?;
    }
    quality.validation = (0..)
        .zip(&tidy.validation)
        .map(|(file, stage)| Validated {
            file,
            batches: batches.get(&file).map_or_else(|| 0, std::collections::BTreeSet::len),
            stage: stage.clone(),
        })
        .collect();
    Ok(quality)
}

/// The batch of a record with its analyte.
fn batch(record: &Arrived) -> Batch {
    let date = record.date.filter(|_| record.batch == 0);
    (record.file, record.batch, date, record.analyte)
}

/// Counts the detects of each blank's batch, and names those that are not far above the blank.
fn hold_against_batches(blanks: &mut [BlankDetect], tidy: &Tidy) -> Result<(), FrameError> {
    let mut of_batch: BTreeMap<Batch, Vec<usize>> = BTreeMap::new();
    let mut records = tidy.arrived()?;
    let mut next = 0;
    for (at, blank) in blanks.iter().enumerate() {
        // Blanks stand in record order.
        let skip = (blank.record - next) as usize;
        next = blank.record + 1;
        if let Some(own) = records.nth(skip) {
            of_batch.entry(batch(&own)).or_default().push(at);
        }
    }
    for record in tidy.arrived()? {
        let Some(Reading::Measured(value)) = record.reading else { continue };
        if tidy.ledger.fate(record.record) != Fate::Candidate {
            continue;
        }
        for &at in of_batch.get(&batch(&record)).map_or(&[][..], Vec::as_slice) {
            let blank = &mut blanks[at];
            blank.batch_detects += 1;
            let value = record.unit.and_then(|unit| unit.convert(value, blank.unit));
            if value.is_some_and(|value| value < TIMES_BLANK * blank.value) {
                blank.doubtful.push(record.record);
            }
        }
    }
    Ok(())
}

fn duplicates(series: &[WellSeries], site: &Site, as_of: NaiveDate) -> Duplicates {
    let mut found = Duplicates::default();
    for one in series {
        for pair in one.duplicates.iter().filter(|pair| pair.date <= as_of) {
            found.pairs += 1;
            found.compared += usize::from(pair.agreement() != Agreement::Neither);
            if pair.differs(site.flags.duplicates_rpd) {
                found.differing.push(Differing {
                    well: one.key.well.clone(),
                    analyte: one.key.analyte.clone(),
                    date: pair.date,
                    unit: one.unit,
                    pair: pair.clone(),
                });
            }
        }
    }
    found.differing.sort_by(|a, b| {
        (b.date, &a.well, &a.analyte, a.pair.duplicate).cmp(&(
            a.date,
            &b.well,
            &b.analyte,
            b.pair.duplicate,
        ))
    });
    found
}

fn send_back(series: &[WellSeries], as_of: NaiveDate) -> Vec<SendBack> {
    let mut found: Vec<SendBack> = Vec::new();
    for one in series {
        let Some(regulatory) = one.limit.as_ref().map(|limit| limit.value) else { continue };
        for candidate in one.candidates.iter().filter(|candidate| candidate.date <= as_of) {
            match candidate.reading {
                Reading::Below(limit) if limit > regulatory => found.push(SendBack {
                    record: candidate.record,
                    well: one.key.well.clone(),
                    analyte: one.key.analyte.clone(),
                    date: candidate.date,
                    limit,
                    regulatory,
                    unit: one.unit,
                }),
                _ => {}
            }
        }
    }
    found.sort_by(|a, b| {
        (b.date, &a.well, &a.analyte, a.record).cmp(&(a.date, &b.well, &b.analyte, b.record))
    });
    found
}

/// Whether a gap holds for the whole well on its date, not for one analyte alone.
#[must_use]
pub fn is_of_the_well(gap: NonResult) -> bool {
    match gap {
        NonResult::Dry
        | NonResult::Destroyed
        | NonResult::NoAccess
        | NonResult::FreeProduct
        | NonResult::NotSampled => true,
        NonResult::NotAnalysed | NonResult::NotReported => false,
    }
}
