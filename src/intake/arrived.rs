//! The records as they arrived, for whoever looks at them before any fit.

use chrono::NaiveDate;
use polars::prelude::{Int32Chunked, UInt32Chunked};

use super::Tidy;
use super::frame::{ABOVE, BELOW, FrameError, MEASURED, NO_UNIT};
use super::names::date_of;
use super::texts::Code;
use crate::ledger::RecordId;
use crate::terms::{Reading, Unit};

/// One record: whose it is, where it stands, what it says in its own unit.
#[derive(Clone, Debug, PartialEq)]
pub struct Arrived {
    /// The record.
    pub record: RecordId,
    /// The file's place in the run.
    pub file: u32,
    /// The laboratory's batch as written; 0 where there is none.
    pub batch: Code,
    /// The site.
    pub site: Code,
    /// The well; 0 where there is none.
    pub well: Code,
    /// The analyte; 0 where there is none.
    pub analyte: Code,
    /// The date.
    pub date: Option<NaiveDate>,
    /// The date as written.
    pub date_written: Code,
    /// What it says, in `unit`.
    pub reading: Option<Reading>,
    /// Its unit.
    pub unit: Option<Unit>,
    /// Whether it comes from a dilution.
    pub diluted: bool,
    /// Whether it is marked as estimated.
    pub estimated: bool,
}

/// Where records stand and what was analysed together with them.
pub struct Places<'a> {
    files: &'a UInt32Chunked,
    batches: &'a UInt32Chunked,
    days: &'a Int32Chunked,
}

impl Places<'_> {
    /// The file of a record, as its place in the run.
    #[must_use]
    pub fn file(&self, record: RecordId) -> u32 {
        self.files.get(record as usize).unwrap_or_default()
    }

    /// The batch of a record as written; 0 where there is none.
    #[must_use]
    pub fn batch(&self, record: RecordId) -> Code {
        self.batches.get(record as usize).unwrap_or_default()
    }

    /// The date of a record.
    #[must_use]
    pub fn date(&self, record: RecordId) -> Option<NaiveDate> {
        self.days.get(record as usize).and_then(date_of)
    }
}

impl Tidy {
    /// Where records stand.
    ///
    /// # Errors
    /// [`FrameError`], which would be a fault of this program.
    pub fn places(&self) -> Result<Places<'_>, FrameError> {
        let code = |name: &str| self.frame.column(name)?.u32();
        let days = self.frame.column("day")?.i32()?;
        Ok(Places { files: code("file")?, batches: code("batch")?, days })
    }

    /// The text of a code, as an owned name.
    #[must_use]
    pub fn name(&self, code: Code) -> String {
        self.texts.text(code).to_owned()
    }

    /// Every record in record order, one after the other.
    ///
    /// # Errors
    /// [`FrameError`], which would be a fault of this program.
    pub fn arrived(&self) -> Result<impl Iterator<Item = Arrived> + '_, FrameError> {
        let frame = &self.frame;
        let code = |name: &str| frame.column(name)?.u32();
        let byte = |name: &str| frame.column(name)?.u8();
        let (files, batches, sites) = (code("file")?, code("batch")?, code("site")?);
        let (wells, analytes, written) = (code("well")?, code("analyte")?, code("date_written")?);
        let (marks, units) = (byte("mark")?, byte("unit")?);
        let (diluted, estimated) = (byte("diluted")?, byte("estimated")?);
        let (days, values) = (frame.column("day")?.i32()?, frame.column("value")?.f64()?);
        let some = |code: Option<Code>| code.unwrap_or_default();
        Ok((0..frame.height()).map(move |at| {
            let reading = values.get(at).and_then(|value| match marks.get(at) {
                Some(MEASURED) => Some(Reading::Measured(value)),
                Some(BELOW) => Some(Reading::Below(value)),
                Some(ABOVE) => Some(Reading::Above(value)),
                _ => None,
            });
            Arrived {
                record: RecordId::try_from(at).unwrap_or(RecordId::MAX),
                file: some(files.get(at)),
                batch: some(batches.get(at)),
                site: some(sites.get(at)),
                well: some(wells.get(at)),
                analyte: some(analytes.get(at)),
                date: days.get(at).and_then(date_of),
                date_written: some(written.get(at)),
                reading,
                unit: units.get(at).filter(|unit| *unit != NO_UNIT).and_then(Unit::from_code),
                diluted: diluted.get(at) == Some(1),
                estimated: estimated.get(at) == Some(1),
            }
        }))
    }
}
