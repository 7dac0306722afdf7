//! One line of a table becomes a row and a provisional fate.

use chrono::NaiveDate;

use super::basis;
use super::cell::{ResultCell, cell};
use super::date::{DateText, date};
use super::limit_table::LimitTables;
use super::names::{Names, day_number};
use super::number::number;
use super::qualifier::Strictest;
use super::rows::{Dilution, Kind, Row, Written};
use super::sample_type::{non_result, sample_type};
use super::split::Line;
use super::table::Table;
use super::texts::Texts;
use super::value::{Said, reading};
use crate::ledger::told::Expected;
use crate::ledger::{Fate, NonResult, QualityControl, SetAside, Told};
use crate::site::{Column, DecisionKind, ResultsRule, SampleType, Site};
use crate::terms::{Unit, UnitText};

/// Reads the records of one table.
pub struct RecordReader<'a> {
    /// The site.
    pub site: &'a Site,
    /// How the file is declared.
    pub rule: &'a ResultsRule,
    /// The file as a table.
    pub table: &'a Table,
    /// The file's place in the run.
    pub file: u32,
    /// The detection-limit tables beside it.
    pub limits: &'a LimitTables,
}

/// A row, its provisional fate, and what is told about it.
pub struct Read {
    /// The row.
    pub row: Row,
    /// Its fate so far.
    pub fate: Fate,
    /// What is told.
    pub told: Vec<Told>,
}

impl RecordReader<'_> {
    /// Reads one line.
    pub fn read(&self, line: &Line, names: &mut Names, texts: &mut Texts) -> Read {
        let mut told = Vec::new();
        if !line.filled.is_empty() {
            told.push(Told::MergedFilled);
        }
        let written = self.written(line, texts);
        let read_date = self.date(line, texts.text(written.date));
        if read_date == Err(Fate::SetAside(SetAside::AmbiguousDate)) {
            told.push(Told::AmbiguousDates { file: self.table.name.clone() });
        }
        let (day, time) = match &read_date {
            Ok((day, time)) => (Some(*day), texts.code(time)),
            Err(_) => (None, 0),
        };
        let resolved = names.resolve(self, line, day, texts, &mut told);
        let mut row = Row {
            file: self.file,
            sheet: texts.code(&self.table.sheet),
            line: line.line,
            column: line.column,
            written,
            site: resolved.site,
            well: resolved.well,
            analyte: resolved.analyte,
            cas: resolved.cas,
            listed: resolved.listed,
            fraction: resolved.fraction,
            depth: written.depth,
            day: day.map(day_number),
            time,
            reading: None,
            unit: None,
            basis: 0,
            reporting_limit: None,
            detection_limit: None,
            estimated: false,
            kind: Kind::Other,
            dilution: Dilution::None,
            batch: texts.code(self.table.cell(line, Column::Batch)),
            excluded_by: None,
            qualified_by: None,
            joined_by: resolved.joined_by,
        };
        row.excluded_by = self.decided(DecisionKind::Exclude, &row, day, texts);
        let kind = self.kind(line, texts.text(written.result), &mut told);
        let fate = match kind {
            _ if self.table.is_ragged(line) => Fate::SetAside(SetAside::Ragged),
            _ if self.table.holds_error(line) => Fate::SetAside(SetAside::CellError),
            _ if resolved.other_site => Fate::SetAside(SetAside::OtherSite),
            Err(fate @ Fate::QualityControl(QualityControl::Blank)) => {
                self.blank(line, &mut row, day, texts);
                fate
            }
            Err(fate @ (Fate::QualityControl(_) | Fate::SetAside(_))) => fate,
            _ if row.well == 0 => Fate::SetAside(SetAside::NoWell),
            Err(gap) => gap,
            Ok(kind) => {
                row.kind = kind;
                // A duplicate is held against its sample whatever its medium is called: agencies
                // give quality control a medium of its own.
                let other_medium = Fate::SetAside(SetAside::OtherMedium);
                let refused = resolved
                    .refused
                    .filter(|fate| kind != Kind::Duplicate || *fate != other_medium);
                let named = refused.map_or(Ok(()), Err);
                let dated = named.and(read_date.map(|_| ()));
                let fate = match dated {
                    Ok(()) => self.value(line, &mut row, day, texts, &mut told),
                    Err(fate) => Err(fate),
                };
                match (fate, kind) {
                    (_, Kind::Duplicate) => Fate::QualityControl(QualityControl::Duplicate),
                    (Ok(()), _) => Fate::Candidate,
                    (Err(fate), _) => fate,
                }
            }
        };
        if !fate.gives_a_row() {
            // A blank or another site's sample is not used, so its well needs no word.
            told.retain(|told| !matches!(told, Told::WellNotListed { .. }));
        }
        Read { row, fate, told }
    }

    fn written(&self, line: &Line, texts: &mut Texts) -> Written {
        let mut code = |column| texts.code(self.table.cell(line, column));
        let reporting_limit = match code(Column::ReportingLimit) {
            0 => code(Column::DetectionLimit),
            limit => limit,
        };
        Written {
            well: code(Column::Well),
            analyte: code(Column::Analyte),
            date: code(Column::Date),
            result: code(Column::Result),
            unit: code(Column::Unit),
            reporting_limit,
            sample_id: code(Column::SampleId),
            depth: code(Column::Depth),
            fraction: code(Column::Fraction),
            qualifier: texts.code(&self.table.qualifiers(line)),
        }
    }

    /// The sample date and the time of day, or the fate that a cell without a date has.
    fn date(&self, line: &Line, text: &str) -> Result<(NaiveDate, String), Fate> {
        if text.is_empty() {
            return Err(Fate::SetAside(SetAside::NoDate));
        }
        match date(text, self.table.dates) {
            DateText::Date(date, time) => {
                let column = self.table.cell(line, Column::Time);
                Ok((date, if column.is_empty() { time } else { column.to_owned() }))
            }
            DateText::Ambiguous => Err(Fate::SetAside(SetAside::AmbiguousDate)),
            DateText::Unreadable => Err(Fate::SetAside(SetAside::UnreadableDate)),
        }
    }

    /// Sample or duplicate, or the fate of a record that is neither.
    fn kind(&self, line: &Line, result: &str, told: &mut Vec<Told>) -> Result<Kind, Fate> {
        let text = self.table.cell(line, Column::SampleType);
        let declared = self.rule.sample_types.get(text).copied();
        let kind = match (declared, text.is_empty()) {
            (Some(kind), _) => kind,
            (None, true) => non_result(result).unwrap_or(SampleType::Regular),
            (None, false) => match sample_type(text) {
                Some(SampleType::Regular) => non_result(result).unwrap_or(SampleType::Regular),
                Some(kind) => kind,
                None => {
                    told.push(Told::UnknownSampleType { written: text.to_owned() });
                    return Err(Fate::SetAside(SetAside::UnknownSampleType));
                }
            },
        };
        match kind {
            SampleType::Regular => Ok(Kind::Sample),
            SampleType::Duplicate => Ok(Kind::Duplicate),
            SampleType::Blank => Err(Fate::QualityControl(QualityControl::Blank)),
            SampleType::Spike => Err(Fate::QualityControl(QualityControl::Spike)),
            SampleType::Reference => Err(Fate::QualityControl(QualityControl::Reference)),
            SampleType::Dry => Err(Fate::NonResult(NonResult::Dry)),
            SampleType::Destroyed => Err(Fate::NonResult(NonResult::Destroyed)),
            SampleType::NoAccess => Err(Fate::NonResult(NonResult::NoAccess)),
            SampleType::FreeProduct => Err(Fate::NonResult(NonResult::FreeProduct)),
            SampleType::NotSampled => Err(Fate::NonResult(NonResult::NotSampled)),
            SampleType::NotAnalysed => Err(Fate::NonResult(NonResult::NotAnalysed)),
            SampleType::NotReported => Err(Fate::NonResult(NonResult::NotReported)),
        }
    }

    /// What a blank says, for the statement on quality. Its number enters no fit, so what cannot be
    /// read of it is no note of its own: a blank without a reading is counted as such.
    fn blank(&self, line: &Line, row: &mut Row, day: Option<NaiveDate>, texts: &mut Texts) {
        if self.value(line, row, day, texts, &mut Vec::new()).is_err() {
            row.reading = None;
        }
    }

    /// Marks, unit, limits and number of a record whose well, analyte and date stand.
    fn value(
        &self,
        line: &Line,
        row: &mut Row,
        day: Option<NaiveDate>,
        texts: &mut Texts,
        told: &mut Vec<Told>,
    ) -> Result<(), Fate> {
        let written = cell(texts.text(row.written.result), self.table.numbers);
        let cell = written.result;
        let marks = self.marks(line, row, day, &written.codes, texts, told)?;
        row.estimated = marks.estimated;
        row.dilution = marks.dilution;
        row.qualified_by = marks.decided_by;
        if cell == ResultCell::Unreadable {
            let found = texts.text(row.written.result).to_owned();
            told.push(Told::Unreadable { column: "result", found, expected: Expected::Result });
            return Err(Fate::SetAside(SetAside::UnreadableNumber));
        }
        let nothing = cell == ResultCell::Empty
            && !matches!(
                marks.strictest,
                Some(Strictest::NonDetect | Strictest::AboveRange | Strictest::Unknown)
            );
        if nothing {
            return Err(Fate::SetAside(SetAside::NoResult));
        }
        if cell == ResultCell::Empty {
            // Without a number no unit is missed.
            if let Some(fate) = marks.unknown {
                return Err(fate);
            }
            if marks.strictest == Some(Strictest::AboveRange) {
                return Err(Fate::SetAside(SetAside::AboveRange));
            }
        }
        let typed = self.typed_limits(line, told);
        let not_detected = matches!(cell, ResultCell::Below(_) | ResultCell::NotDetected)
            || marks.strictest == Some(Strictest::NonDetect);
        let own_value = matches!(cell, ResultCell::Below(_) | ResultCell::Number(_));
        if not_detected && !own_value && row.written.reporting_limit == 0 && typed.is_empty() {
            // Without a unit too, it is the limit that would bring one.
            return Err(marks.unknown.unwrap_or(Fate::SetAside(SetAside::NoReportingLimit)));
        }
        let limit_unit = typed.unit().filter(|_| not_detected);
        let unit = self.unit(line, row, (written.unit.as_ref(), limit_unit), texts, told)?;
        row.unit = Some(unit);
        self.tell_basis(row, told);
        if row.written.reporting_limit == 0 {
            let shown = typed.shown(texts.text(row.written.unit));
            row.written.reporting_limit = texts.code(&shown);
        }
        let [reporting, detection] = typed.in_unit(unit, told);
        row.reporting_limit = self.limit(line, Column::ReportingLimit, unit, told).or(reporting);
        row.detection_limit = self.limit(line, Column::DetectionLimit, unit, told).or(detection);
        let uncertainty = number(self.table.cell(line, Column::Uncertainty), self.table.numbers)
            .filter(|uncertainty| *uncertainty > 0.0)
            .zip(self.rule.uncertainty);
        let (read, note) = reading(&Said {
            cell,
            unit,
            strictest: marks.strictest,
            reporting_limit: row.reporting_limit,
            detection_limit: row.detection_limit,
            uncertainty,
        });
        row.reading = read.as_ref().ok().copied();
        // A code without a legend holds the record back whatever its number says.
        if let Some(fate) = marks.unknown {
            return Err(fate);
        }
        told.extend(note);
        read.map(|_| ())
    }

    /// The result's unit: the one in its cell, else its column's; a non-detect without one takes
    /// its limit's.
    fn unit(
        &self,
        line: &Line,
        row: &mut Row,
        (in_cell, of_limit): (Option<&UnitText>, Option<&str>),
        texts: &mut Texts,
        told: &mut Vec<Told>,
    ) -> Result<Unit, Fate> {
        let units = &self.table.mapping.units;
        let text = texts.text(row.written.unit).to_owned();
        let column_basis = texts.code(basis::bare(self.table.cell(line, Column::Basis)));
        if let Some(own) = in_cell {
            let column = if text.is_empty() {
                units.get(&Column::Result).copied()
            } else {
                Unit::read(&text).map(|read| read.unit)
            };
            let agree = column.map_or(text.is_empty(), |column| column == own.unit);
            if !agree {
                told.push(Told::UnitsDiffer { cell: own.unit.label(), column: text });
                return Err(Fate::SetAside(SetAside::UnknownUnit));
            }
            row.basis = own.basis.as_ref().map_or(column_basis, |basis| texts.code(basis));
            return Ok(own.unit);
        }
        let of = |column: &Column| units.get(column).copied();
        let in_header = of(&Column::Result)
            .or_else(|| of(&Column::ReportingLimit))
            .or_else(|| of(&Column::DetectionLimit));
        let text = match (text.is_empty(), in_header, of_limit) {
            (false, ..) => text,
            (true, Some(unit), _) => {
                row.basis = column_basis;
                return Ok(unit);
            }
            (true, None, Some(of_limit)) => of_limit.to_owned(),
            (true, None, None) => return Err(Fate::SetAside(SetAside::NoUnit)),
        };
        let in_water = match text.to_ascii_lowercase().as_str() {
            "ppb" if self.rule.ppb_in_water => Some(Unit::UG_PER_L),
            "ppm" if self.rule.ppb_in_water => Some(Unit::MG_PER_L),
            _ => None,
        };
        match (in_water, Unit::read(&text)) {
            (Some(unit), _) => {
                row.basis = column_basis;
                Ok(unit)
            }
            (None, Some(read)) => {
                row.basis = match read.basis {
                    Some(basis) => texts.code(&basis),
                    None => column_basis,
                };
                Ok(read.unit)
            }
            (None, None) => {
                told.push(Told::UnknownUnit { written: text });
                Err(Fate::SetAside(SetAside::UnknownUnit))
            }
        }
    }

    /// A positive limit in the result's unit; one that cannot be read is told and left out.
    fn limit(&self, line: &Line, column: Column, unit: Unit, told: &mut Vec<Told>) -> Option<f64> {
        let text = self.table.cell(line, column);
        if text.is_empty() {
            return None;
        }
        let own = self.table.mapping.units.get(&column).copied().unwrap_or(unit);
        let read = number(text, self.table.numbers);
        if read.is_none() {
            told.push(Told::Unreadable {
                column: column.key(),
                found: text.to_owned(),
                expected: Expected::Limit,
            });
        }
        read.filter(|limit| *limit > 0.0).and_then(|limit| own.convert(limit, unit))
    }
}
