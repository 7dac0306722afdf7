//! The files of an output folder, each with how its content comes about.

use std::io::{self, Write};

use super::charts::{self, ChartFacts};
use super::{flags_csv, summary_csv, summary_json, used_csv, wells_csv};
use crate::findings::Findings;
use crate::words::caution::STANDING;

/// Writes a content to where it is given.
pub type Writing<'a> = Box<dyn FnOnce(&mut dyn Write) -> io::Result<()> + 'a>;

/// What a file holds.
pub enum Content<'a> {
    /// A text that is ready.
    Text(String),
    /// A content that is made while it is written, so that it is never held whole.
    Written(Writing<'a>),
}

/// One file to be written.
pub struct OutFile<'a> {
    /// Its name below the output folder, with `/`.
    pub name: String,
    /// What it holds.
    pub content: Content<'a>,
}

impl<'a> OutFile<'a> {
    /// A file whose text is ready.
    #[must_use]
    pub fn text(name: &str, text: String) -> Self {
        Self { name: name.to_owned(), content: Content::Text(text) }
    }

    /// A file whose content is made while it is written.
    pub fn written(name: &str, write: impl FnOnce(&mut dyn Write) -> io::Result<()> + 'a) -> Self {
        Self { name: name.to_owned(), content: Content::Written(Box::new(write)) }
    }
}

/// Which formats are written.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Formats {
    /// The tables.
    pub csv: bool,
    /// summary.json.
    pub json: bool,
    /// The charts.
    pub svg: bool,
}

/// The files of a review but run.json, which is written with them. Tables and charts are rendered
/// one after the other while they are written.
#[must_use]
pub fn review_files<'a>(
    findings: &'a Findings,
    formats: Formats,
    ledger: Content<'a>,
) -> Vec<OutFile<'a>> {
    let mut files = Vec::new();
    let mut render = |name: &str, table: fn(&Findings) -> String| {
        files.push(OutFile::written(name, move |to| to.write_all(table(findings).as_bytes())));
    };
    if formats.csv {
        render("summary.csv", summary_csv);
        render("wells.csv", wells_csv);
        render("flags.csv", flags_csv);
        render("used.csv", used_csv);
    }
    if formats.json {
        render("summary.json", summary_json);
    }
    if formats.csv {
        files.push(OutFile { name: "ledger.csv".to_owned(), content: ledger });
    }
    if formats.svg {
        let facts = ChartFacts { confidence: findings.run.confidence, caution: STANDING };
        for (name, series) in charts::chosen(findings).charts {
            files.push(OutFile::written(&name, move |to| {
                to.write_all(charts::series_svg(series, &facts).as_bytes())
            }));
        }
    }
    files
}
