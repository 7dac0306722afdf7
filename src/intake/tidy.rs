//! All files together: read, settled, and put into one frame.

use polars::prelude::DataFrame;

use super::depths;
use super::frame::{FrameError, frame};
use super::names::{Names, unite_spellings};
use super::record::RecordReader;
use super::repeats;
use super::rows::Row;
use super::source::{Collected, Sources, collect};
use super::table::{Table, table};
use super::texts::Texts;
use crate::ledger::{FileFacts, Ledger, MappingFacts, TableProblem, Told, Unreadable};
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
    let mut validation = Vec::new();
    for file in found {
        if !between(&file.name) {
            return Ok(None);
        }
        let plain = ResultsRule::plain();
        let rule = site.results.get(file.rule).unwrap_or(&plain);
        let table = match table(&file, rule) {
            Ok(table) => table,
            Err(problem) => {
                unreadable.push(Unreadable { name: file.name, problem });
                continue;
            }
        };
        let place = u32::try_from(files.len()).unwrap_or(u32::MAX);
        let reader = RecordReader { site, rule, table: &table, file: place };
        for line in &table.lines {
            let read = reader.read(line, &mut names, &mut texts);
            let record = ledger.open(read.fate);
            for told in read.told {
                ledger.tell(record, told);
            }
            rows.push(read.row);
        }
        files.push(FileFacts {
            name: file.name,
            bytes: file.bytes.len() as u64,
            sha256: file.sha256,
            records: table.lines.len(),
            blank_lines: table.blank,
            encoding: table.encoding,
        });
        validation.push(rule.validation.clone());
        describe(&table, &mut mapping, &mut told);
    }
    unite_spellings(&mut rows, &texts);
    depths::settle(&mut rows, &mut ledger, site, &texts);
    let file_names: Vec<String> = files.iter().map(|file| file.name.clone()).collect();
    repeats::settle(&rows, &mut ledger, &texts, &file_names);
    let decided = (0..site.decisions.len())
        .map(|place| {
            let by = |row: &&Row| {
                [row.excluded_by, row.qualified_by]
                    .into_iter()
                    .flatten()
                    .any(|by| usize::from(by) == place)
            };
            rows.iter().filter(by).count()
        })
        .collect();
    let frame = frame(&rows)?;
    Ok(Some(Tidy {
        frame,
        texts,
        ledger,
        files,
        unreadable,
        ignored,
        mapping,
        told,
        validation,
        decided,
    }))
}

/// The mapping of one file, and what is told about the file as a whole.
fn describe(table: &Table, mapping: &mut Vec<MappingFacts>, told: &mut Vec<Told>) {
    let header = |at: usize| table.header.get(at).unwrap_or_default().trim().to_owned();
    let mut used: Vec<(usize, &str)> = table
        .mapping
        .cells
        .iter()
        .map(|(column, &at)| (at, column.key()))
        .chain(table.mapping.also.iter().flat_map(|(c, all)| all.iter().map(|&at| (at, c.key()))))
        .chain(table.mapping.unused.iter().map(|(at, _)| (*at, "")))
        .collect();
    used.sort_unstable();
    for (at, column) in used {
        mapping.push(MappingFacts {
            file: table.name.clone(),
            header: header(at),
            column: column.to_owned(),
        });
        if column.is_empty() {
            told.push(Told::ColumnNotUsed { file: table.name.clone(), column: header(at) });
        }
    }
    if let Some(line) = table.guessed_at_line {
        told.push(Told::DecodedWindows1252 { file: table.name.clone(), line });
    }
}
