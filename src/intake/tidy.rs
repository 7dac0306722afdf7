//! All files together: read, settled, and put into one frame.

use polars::prelude::DataFrame;

use super::address;
use super::arrival;
use super::companions::{Companion, Companions};
use super::depths;
use super::frame::{FrameError, frame};
use super::layout::{self, Contents};
use super::names::{Names, unite_spellings};
use super::record::RecordReader;
use super::repeats;
use super::rows::Row;
use super::source::{Collected, Found, Sources, collect};
use super::stations::Station;
use super::table::Table;
use super::texts::Texts;
use super::twins::twins;
use crate::ledger::{
    Fate, FileFacts, Ledger, MappingFacts, Merged, TableProblem, Told, Unreadable,
};
use crate::site::{ResultsRule, Site};

/// Every record of every file in canonical columns and units, with its provisional fate.
#[derive(Clone, Debug)]
pub struct Tidy {
    /// One row a record, in record order.
    pub(crate) frame: DataFrame,
    /// The texts behind the frame's codes.
    pub(crate) texts: Texts,
    /// The account.
    pub ledger: Ledger,
    /// The files that were read, in order of delivery.
    pub files: Vec<FileFacts>,
    /// The files that could not be read as a table.
    pub unreadable: Vec<Unreadable>,
    /// Files in the results folder that are no results files.
    pub ignored: Vec<String>,
    /// Which header was read as which column.
    pub mapping: Vec<MappingFacts>,
    /// What is told about whole files.
    pub told: Vec<Told>,
    /// Where wells stand, from station files.
    pub stations: Vec<Station>,
    /// To what stage each file was validated, where the site file says so.
    pub validation: Vec<Option<String>>,
    /// How many records each decision touched, in the order of the site file.
    pub decided: Vec<usize>,
}

/// Reads all sources.
///
/// `between` is asked before each file and stops the reading when it says so (the caller was
/// interrupted).
///
/// # Errors
/// [`FrameError`] if the frame cannot be built, which would be a fault of this program.
pub fn tidy(
    sources: &Sources,
    site: &Site,
    between: &dyn Fn(&str) -> bool,
) -> Result<Option<Tidy>, FrameError> {
    let Collected { found, refused, ignored } = collect(sources, site);
    let mut unreadable: Vec<Unreadable> = refused
        .into_iter()
        .map(|error| Unreadable {
            name: error.name().to_owned(),
            problem: TableProblem::Source(error),
        })
        .collect();
    let (mut texts, mut ledger, mut names) =
        (Texts::default(), Ledger::default(), Names::default());
    let (mut rows, mut files, mut mapping, mut told) =
        (Vec::new(), Vec::new(), Vec::new(), Vec::new());
    let mut companions = Companions::read(&found, site);
    let mut validation = Vec::new();
    let mut limit_records = Vec::new();
    for (at, file) in found.into_iter().enumerate() {
        if !between(&file.name) {
            return Ok(None);
        }
        let plain = ResultsRule::plain();
        let rule = site.results.get(file.rule).unwrap_or(&plain);
        let place = u32::try_from(files.len()).unwrap_or(u32::MAX);
        if let Some(companion) = companions.at(at) {
            rows.extend(companion.rows(place, site, &mut texts));
            let fate = companion.fate();
            let records = companion.records().iter().map(|_| ledger.open(fate));
            match companion.kind {
                Companion::Limits => limit_records.extend(records),
                Companion::Stations => records.for_each(drop),
            }
            mapping.extend(companion.mapping(&file.name));
            files.push(companion.facts(file));
            validation.push(rule.validation.clone());
            continue;
        }
        let contents = match layout::read(&file, rule, site) {
            Ok(contents) => contents,
            Err(problem) => {
                unreadable.push(Unreadable { name: file.name, problem });
                continue;
            }
        };
        for table in &contents.tables {
            let joined = companions.limits.note(table);
            let limits = &companions.limits;
            let reader = RecordReader { site, rule, table, file: place, limits };
            for line in &table.lines {
                let read = reader.read(line, &mut names, &mut texts);
                let record = ledger.open(read.fate);
                for told in read.told {
                    ledger.tell(record, told);
                }
                rows.push(read.row);
            }
            describe(table, &mut mapping, &mut told);
            told.extend(arrival::notes(table, joined));
        }
        files.push(facts(&file, &contents));
        told.extend(contents.told);
        for (sheet, problem) in contents.refused {
            let problem = TableProblem::Sheet { sheet, problem: Box::new(problem) };
            unreadable.push(Unreadable { name: file.name.clone(), problem });
        }
        validation.push(rule.validation.clone());
    }
    for (record, matched) in limit_records.into_iter().zip(companions.limits.matched()) {
        if *matched {
            ledger.amend(record, Fate::Merged(Merged::DetectionLimit));
        }
    }
    told.extend(twins(&rows, &texts));
    unite_spellings(&mut rows, &texts);
    depths::settle(&mut rows, &mut ledger, site, &texts);
    let file_names: Vec<String> = files.iter().map(|file| file.name.clone()).collect();
    repeats::settle(&rows, &mut ledger, &texts, &file_names);
    let decided = (0..site.decisions.len())
        .map(|place| {
            let by = |row: &&Row| {
                [row.excluded_by, row.qualified_by, row.joined_by]
                    .into_iter()
                    .flatten()
                    .any(|by| usize::from(by) == place)
            };
            rows.iter().filter(by).count()
        })
        .collect();
    let frame = frame(&rows)?;
    let stations = companions.stations;
    Ok(Some(Tidy {
        frame,
        texts,
        ledger,
        files,
        unreadable,
        ignored,
        mapping,
        told,
        stations,
        validation,
        decided,
    }))
}

/// What run.json says of a file.
fn facts(file: &Found, contents: &Contents) -> FileFacts {
    let tables = || contents.tables.iter();
    let sheets = tables().map(|table| table.sheet.clone()).filter(|sheet| !sheet.is_empty());
    FileFacts {
        name: file.name.clone(),
        bytes: file.bytes.len() as u64,
        sha256: file.sha256.clone(),
        records: tables().map(|table| table.lines.len()).sum(),
        blank_lines: tables().map(|table| table.blank).sum(),
        empty_cells: tables().map(|table| table.empty_cells).sum(),
        sheets: sheets.collect(),
        encoding: contents.encoding,
    }
}

/// The mapping of one table, and what is told about the table as a whole.
fn describe(table: &Table, mapping: &mut Vec<MappingFacts>, told: &mut Vec<Told>) {
    let name = address::table(&table.name, &table.sheet);
    for described in &table.described {
        mapping.push(MappingFacts {
            file: table.name.clone(),
            sheet: table.sheet.clone(),
            header: described.header.clone(),
            column: described.column.to_owned(),
        });
        if described.column.is_empty() && table.mapping.open.layout.is_none() {
            let column = described.header.clone();
            told.push(Told::ColumnNotUsed { file: name.clone(), column });
        }
    }
    told.extend(table.told.iter().cloned());
}
