//! The frame grouped into series: one stable sort by one packed key, then runs of rows.

use std::collections::BTreeMap;

use chrono::NaiveDate;
use polars::prelude::{
    Column, DataFrame, Float64Chunked, Int32Chunked, IntoLazy, PolarsError, PolarsResult,
    SortMultipleOptions, UInt8Chunked, UInt32Chunked, col,
};

use super::assemble::{Assembler, RunRow};
use super::{SeriesKey, WellSeries};
use crate::intake::frame::{ABOVE, BELOW, MEASURED, NO_UNIT};
use crate::intake::names::{date_of, fraction_of};
use crate::intake::{FrameError, Tidy};
use crate::ledger::{Fate, QualityControl, RecordId, Told};
use crate::site::Site;
use crate::terms::{Reading, Unit};

/// Site, well, analyte, fraction and depth as the frame's codes.
type Codes = (u32, u32, u32, u8, u32);

/// Groups the frame into series, sorted by key, and amends the fates of records whose dimension or
/// basis is not their series'.
///
/// # Errors
/// [`FrameError`], which would be a fault of this program.
pub fn group(
    tidy: &mut Tidy,
    site: &Site,
    as_of: NaiveDate,
) -> Result<Vec<WellSeries>, FrameError> {
    let (keys, of_record) = series_of_records(tidy)?;
    tell_unknown_fractions(tidy, &keys, &of_record);
    let sorted = sorted_runs(&tidy.frame, &of_record)?;
    let columns = Columns::of(&sorted)?;
    let mut all = Vec::with_capacity(keys.len());
    let mut start = 0;
    while start < sorted.height() {
        let series = columns.series(start)?;
        let mut end = start + 1;
        while end < sorted.height() && columns.series(end)? == series {
            end += 1;
        }
        let rows: Vec<RunRow> =
            (start..end).map(|at| columns.row(at, tidy)).collect::<PolarsResult<_>>()?;
        let key = keys[series as usize].clone();
        let assembled = Assembler { site, as_of, texts: &tidy.texts }.assemble(key, &rows);
        for (record, fate) in assembled.amended {
            tidy.ledger.amend(record, fate);
        }
        for (record, told) in assembled.told {
            tidy.ledger.tell(record, told);
        }
        all.push(assembled.series);
        start = end;
    }
    Ok(all)
}

/// Every series by key, and for each record its series' place; none for records without a row.
fn series_of_records(tidy: &Tidy) -> PolarsResult<(Vec<SeriesKey>, Vec<Option<u32>>)> {
    let frame = &tidy.frame;
    let code = |name: &str| frame.column(name)?.u32();
    let (sites, wells, analytes, depths) =
        (code("site")?, code("well")?, code("analyte")?, code("depth")?);
    let fractions = frame.column("fraction")?.u8()?;
    let codes_at = |at: usize| -> Option<Codes> {
        let codes = (
            sites.get(at)?,
            wells.get(at)?,
            analytes.get(at)?,
            fractions.get(at)?,
            depths.get(at)?,
        );
        (codes.1 != 0 && codes.2 != 0).then_some(codes)
    };
    let belongs =
        |fate: Fate| fate.gives_a_row() || fate == Fate::QualityControl(QualityControl::Duplicate);
    let text = |code: u32| tidy.texts.text(code).to_owned();
    let key = |(site, well, analyte, fraction, depth): Codes| SeriesKey {
        site: text(site),
        well: text(well),
        analyte: text(analyte),
        fraction: fraction_of(fraction),
        depth: tidy.texts.filled(depth).map(str::to_owned),
    };
    let mut gives_row: BTreeMap<Codes, bool> = BTreeMap::new();
    for (at, fate) in tidy.ledger.fates().iter().enumerate() {
        if let Some(codes) = codes_at(at).filter(|_| belongs(*fate)) {
            *gives_row.entry(codes).or_default() |= fate.gives_a_row();
        }
    }
    let mut keys: Vec<(SeriesKey, Codes)> = gives_row
        .into_iter()
        .filter(|(_, gives_row)| *gives_row)
        .map(|(codes, _)| (key(codes), codes))
        .collect();
    keys.sort();
    let places: BTreeMap<Codes, u32> =
        keys.iter().zip(0..).map(|((_, codes), place)| (*codes, place)).collect();
    let of_record = tidy
        .ledger
        .fates()
        .iter()
        .enumerate()
        .map(|(at, fate)| {
            codes_at(at).filter(|_| belongs(*fate)).and_then(|c| places.get(&c).copied())
        })
        .collect();
    Ok((keys.into_iter().map(|(key, _)| key).collect(), of_record))
}

/// A result without a fraction stands in a series of its own: told where its well and analyte
/// have a series with a fraction too.
fn tell_unknown_fractions(tidy: &mut Tidy, keys: &[SeriesKey], of_record: &[Option<u32>]) {
    let alone = |key: &SeriesKey| {
        key.fraction.is_none()
            && keys.iter().any(|other| {
                other.fraction.is_some()
                    && (&other.site, &other.well, &other.analyte)
                        == (&key.site, &key.well, &key.analyte)
            })
    };
    let split: Vec<bool> = keys.iter().map(alone).collect();
    for (at, series) in of_record.iter().enumerate() {
        if let Some(series) = series.filter(|series| split[*series as usize]) {
            let analyte = keys[series as usize].analyte.clone();
            let record = RecordId::try_from(at).unwrap_or(RecordId::MAX);
            tidy.ledger.tell(record, Told::FractionUnknown { analyte });
        }
    }
}

/// The rows that belong to a series, sorted by series, then day, then record.
fn sorted_runs(frame: &DataFrame, of_record: &[Option<u32>]) -> PolarsResult<DataFrame> {
    /// Days lie far inside this offset, so that a day before 1970 packs as a positive number.
    const DAY_OFFSET: i64 = 1 << 31;
    let record: Vec<u32> = (0..of_record.len()).filter_map(|at| at.try_into().ok()).collect();
    let days = frame.column("day")?.i32()?;
    let packed: Vec<Option<u64>> = of_record
        .iter()
        .zip(days.iter())
        .map(|(series, day)| {
            let day = u64::try_from(i64::from(day.unwrap_or(i32::MIN)) + DAY_OFFSET).ok()?;
            Some((u64::from((*series)?) << 32) | day)
        })
        .collect();
    let mut with_keys = frame.clone();
    with_keys.with_column(Column::new("series".into(), of_record.to_vec()))?;
    with_keys.with_column(Column::new("record".into(), record))?;
    with_keys.with_column(Column::new("packed".into(), packed))?;
    with_keys
        .lazy()
        .filter(col("packed").is_not_null())
        .sort(["packed"], SortMultipleOptions::default().with_maintain_order(true))
        .select([
            col("series"),
            col("record"),
            col("day"),
            col("mark"),
            col("value"),
            col("unit"),
            col("basis"),
            col("cas"),
            col("reporting_limit"),
            col("detection_limit"),
            col("estimated"),
            col("excluded_by"),
        ])
        .collect()
}

/// The sorted frame's columns.
struct Columns<'a> {
    series: &'a UInt32Chunked,
    record: &'a UInt32Chunked,
    day: &'a Int32Chunked,
    mark: &'a UInt8Chunked,
    value: &'a Float64Chunked,
    unit: &'a UInt8Chunked,
    basis: &'a UInt32Chunked,
    cas: &'a UInt32Chunked,
    reporting_limit: &'a Float64Chunked,
    detection_limit: &'a Float64Chunked,
    estimated: &'a UInt8Chunked,
    excluded_by: &'a UInt32Chunked,
}

impl<'a> Columns<'a> {
    fn of(frame: &'a DataFrame) -> PolarsResult<Self> {
        Ok(Self {
            series: frame.column("series")?.u32()?,
            record: frame.column("record")?.u32()?,
            day: frame.column("day")?.i32()?,
            mark: frame.column("mark")?.u8()?,
            value: frame.column("value")?.f64()?,
            unit: frame.column("unit")?.u8()?,
            basis: frame.column("basis")?.u32()?,
            cas: frame.column("cas")?.u32()?,
            reporting_limit: frame.column("reporting_limit")?.f64()?,
            detection_limit: frame.column("detection_limit")?.f64()?,
            estimated: frame.column("estimated")?.u8()?,
            excluded_by: frame.column("excluded_by")?.u32()?,
        })
    }

    fn series(&self, at: usize) -> PolarsResult<u32> {
        self.series.get(at).ok_or_else(gap)
    }

    fn row(&self, at: usize, tidy: &Tidy) -> PolarsResult<RunRow> {
        let record = self.record.get(at).ok_or_else(gap)?;
        let reading = self.value.get(at).and_then(|value| match self.mark.get(at) {
            Some(MEASURED) => Some(Reading::Measured(value)),
            Some(BELOW) => Some(Reading::Below(value)),
            Some(ABOVE) => Some(Reading::Above(value)),
            _ => None,
        });
        let unit = self.unit.get(at).filter(|unit| *unit != NO_UNIT).and_then(Unit::from_code);
        Ok(RunRow {
            record,
            fate: tidy.ledger.fate(record),
            date: self.day.get(at).and_then(date_of),
            reading,
            unit,
            basis: self.basis.get(at).ok_or_else(gap)?,
            cas: self.cas.get(at).ok_or_else(gap)?,
            reporting_limit: self.reporting_limit.get(at),
            detection_limit: self.detection_limit.get(at),
            estimated: self.estimated.get(at) == Some(1),
            excluded_by: self.excluded_by.get(at).and_then(|place| u16::try_from(place).ok()),
        })
    }
}

/// A column that has no gaps by construction has one.
fn gap() -> PolarsError {
    PolarsError::NoData("a column without gaps has one".into())
}
