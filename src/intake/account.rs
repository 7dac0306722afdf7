//! The account of [`Tidy`]: ledger rows, counts, the newest usable date.

use chrono::NaiveDate;
use polars::prelude::{Column, DataFrame, IntoLazy, PolarsResult, UInt32Chunked, col, len};

use super::Tidy;
use super::address;
use super::frame::FrameError;
use super::names::{date_of, fraction_of};
use super::texts::Code;
use crate::ledger::{Fate, LedgerRow, OutcomeCount, RecordId, Told};
use crate::site::Site;

/// The newest record that can be used, as messages name it.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Newest {
    /// Its date.
    pub date: NaiveDate,
    /// Where it stands: `file:record`, `file:sheet!record`.
    pub place: String,
}

impl Tidy {
    /// The texts of a code column.
    fn codes<'a>(&'a self, name: &str) -> PolarsResult<&'a UInt32Chunked> {
        self.frame.column(name)?.u32()
    }

    /// `file:record` or `file:sheet!record`.
    #[must_use]
    pub fn place(&self, record: RecordId) -> String {
        let at = record as usize;
        let code = |name: &str| self.codes(name).ok().and_then(|codes| codes.get(at));
        let line = self.frame.column("line").and_then(|c| c.u64()).ok().and_then(|l| l.get(at));
        let file = code("file").and_then(|file| self.files.get(file as usize));
        match (file, code("sheet"), line, code("column")) {
            (Some(file), Some(sheet), Some(line), Some(column)) => {
                let record = address::record(line, column);
                address::place(&file.name, self.texts.text(sheet), &record)
            }
            _ => unreachable!("record numbers come from this frame"),
        }
    }

    /// The newest date among records that can be used, with the record that bears it.
    ///
    /// # Errors
    /// [`FrameError`], which would be a fault of this program.
    pub fn newest(&self) -> Result<Option<Newest>, FrameError> {
        let days = self.frame.column("day")?.i32()?;
        let newest = self
            .ledger
            .fates()
            .iter()
            .enumerate()
            .filter(|(_, fate)| **fate == Fate::Candidate)
            .filter_map(|(at, _)| Some((days.get(at)?, std::cmp::Reverse(at))))
            .max();
        let Some((day, std::cmp::Reverse(at))) = newest else { return Ok(None) };
        let record = RecordId::try_from(at).unwrap_or(RecordId::MAX);
        Ok(date_of(day).map(|date| Newest { date, place: self.place(record) }))
    }

    /// Records by outcome and reason, in the order of the outcomes, most first.
    ///
    /// # Errors
    /// [`FrameError`], which would be a fault of this program.
    pub fn counts(&self, site: &Site) -> Result<Vec<OutcomeCount>, FrameError> {
        let places: Vec<u32> = (0..self.ledger.len()).filter_map(|at| at.try_into().ok()).collect();
        self.counts_of(&places, site)
    }

    /// The same for some records.
    ///
    /// # Errors
    /// [`FrameError`], which would be a fault of this program.
    pub fn counts_of(
        &self,
        records: &[RecordId],
        site: &Site,
    ) -> Result<Vec<OutcomeCount>, FrameError> {
        let mut kinds: Vec<Fate> = records.iter().map(|&r| settled(self.ledger.fate(r))).collect();
        kinds.sort_unstable();
        kinds.dedup();
        let number = |record: &RecordId| {
            let fate = settled(self.ledger.fate(*record));
            kinds.binary_search(&fate).ok().and_then(|at| u32::try_from(at).ok())
        };
        let fates: Vec<Option<u32>> = records.iter().map(number).collect();
        let frame = DataFrame::new(records.len(), vec![Column::new("fate".into(), fates)])?;
        let counted = frame.lazy().group_by([col("fate")]).agg([len().alias("n")]).collect()?;
        let (fates, numbers) = (counted.column("fate")?.u32()?, counted.column("n")?.u32()?);
        let mut counts: Vec<(Fate, usize)> = fates
            .iter()
            .zip(numbers.iter())
            .filter_map(|(fate, n)| Some((*kinds.get(fate? as usize)?, n? as usize)))
            .collect();
        let place = |fate: Fate| {
            fate.outcome().and_then(|outcome| {
                crate::ledger::Outcome::ALL.iter().position(|known| *known == outcome)
            })
        };
        counts.sort_by(|a, b| place(a.0).cmp(&place(b.0)).then(b.1.cmp(&a.1)).then(a.0.cmp(&b.0)));
        Ok(counts
            .into_iter()
            .map(|(fate, records)| OutcomeCount {
                outcome: fate.outcome().map_or("", crate::ledger::Outcome::code),
                reason: fate.reason(|place| decision_id(site, place)),
                records,
            })
            .collect())
    }

    /// Every record as a line of ledger.csv, in record order. `detail` words what was told.
    ///
    /// # Errors
    /// [`FrameError`], which would be a fault of this program.
    pub fn ledger_rows<'a>(
        &'a self,
        site: &'a Site,
        detail: &'a dyn Fn(&[&Told]) -> String,
    ) -> Result<impl Iterator<Item = LedgerRow> + 'a, FrameError> {
        let frame = &self.frame;
        let lines = frame.column("line")?.u64()?;
        let days = frame.column("day")?.i32()?;
        let fractions = frame.column("fraction")?.u8()?;
        let file = self.codes("file")?;
        let (sheet, column) = (self.codes("sheet")?, self.codes("column")?);
        let code = |name: &str| self.codes(name);
        let [site_c, well, well_w, analyte, analyte_w, date_w] = [
            code("site")?,
            code("well")?,
            code("well_written")?,
            code("analyte")?,
            code("analyte_written")?,
            code("date_written")?,
        ];
        let [depth, reported, unit, qualifier, limit, sample, fraction_w] = [
            code("depth_written")?,
            code("reported")?,
            code("unit_written")?,
            code("qualifier")?,
            code("limit_written")?,
            code("sample_id")?,
            code("fraction_written")?,
        ];
        let text = |codes: &UInt32Chunked, at: usize| -> String {
            codes.get(at).map_or_else(String::new, |code: Code| self.texts.text(code).to_owned())
        };
        let mut told = self.ledger.told_by_record().into_iter().peekable();
        Ok((0..self.ledger.len()).map(move |at| {
            let record = RecordId::try_from(at).unwrap_or(RecordId::MAX);
            let mut of_record = Vec::new();
            while let Some((_, note)) = told.next_if(|(id, _)| *id == record) {
                of_record.push(note);
            }
            let fate = self.ledger.fate(record);
            let first = |a: &UInt32Chunked, b: &UInt32Chunked| {
                let shown = text(a, at);
                if shown.is_empty() { text(b, at) } else { shown }
            };
            let day = days.get(at).and_then(date_of).map(|date| date.to_string());
            let fraction = fractions.get(at).and_then(fraction_of).map(|f| f.code().to_owned());
            let file = file.get(at).and_then(|file| self.files.get(file as usize));
            LedgerRow {
                file: file.map_or_else(String::new, |file| file.name.clone()),
                sheet: text(sheet, at),
                record: lines
                    .get(at)
                    .zip(column.get(at))
                    .map_or_else(String::new, |(line, column)| address::record(line, column)),
                site: text(site_c, at),
                well: first(well, well_w),
                date: day.unwrap_or_else(|| text(date_w, at)),
                analyte: first(analyte, analyte_w),
                fraction: fraction.unwrap_or_else(|| text(fraction_w, at)),
                depth: text(depth, at),
                reported: text(reported, at),
                unit: text(unit, at),
                qualifier: text(qualifier, at),
                reporting_limit: text(limit, at),
                sample_id: text(sample, at),
                outcome: fate.outcome().map_or("", crate::ledger::Outcome::code),
                reason: fate.reason(|place| decision_id(site, place)),
                detail: detail(&of_record),
            }
        }))
    }
}

/// How a used record was used is a detail, not a reason: all of them count together.
fn settled(fate: Fate) -> Fate {
    match fate {
        Fate::Used(_) => Fate::Used(crate::ledger::UsedAs::Alone),
        other => other,
    }
}

/// The id of the decision at a place of the site file.
fn decision_id(site: &Site, place: u16) -> String {
    site.decisions.get(usize::from(place)).map_or_else(String::new, |d| d.id.clone())
}
