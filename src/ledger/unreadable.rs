//! Files that gave no records, and why: they are told, and the others are read.

use crate::site::Column;

/// A file that was not read.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum SourceError {
    /// The file or folder cannot be read.
    Io {
        /// The shown path.
        name: String,
        /// What the system says.
        why: String,
    },
    /// The bytes are those of another file of this run.
    GivenTwice {
        /// The shown path.
        name: String,
        /// The other's shown path.
        same_as: String,
    },
}

impl SourceError {
    /// The shown path.
    #[must_use]
    pub fn name(&self) -> &str {
        match self {
            Self::Io { name, .. } | Self::GivenTwice { name, .. } => name,
        }
    }
}

/// Why bytes are no text.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum NotText {
    /// Nothing in the file.
    Empty,
    /// A NUL byte: a binary file, or UTF-16 without its mark.
    Binary {
        /// Where the first NUL stands.
        byte: usize,
    },
    /// The declared encoding does not fit the bytes.
    Malformed {
        /// The declared encoding.
        declared: &'static str,
    },
}

/// Why a file is no results table.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum TableProblem {
    /// It could not be opened, came twice, or is of a kind that is not read.
    Source(SourceError),
    /// Its bytes are no text.
    NotText(NotText),
    /// No line near the top has all required columns.
    NoHeader {
        /// The line that has most of them.
        line: u64,
        /// The required columns that were not found.
        lacks: Vec<Column>,
        /// The cells of that line.
        found: Vec<String>,
    },
    /// Headers that the site file declares are not there.
    DeclaredMissing {
        /// The line that has most of them.
        line: u64,
        /// Our column and the declared header.
        missing: Vec<(Column, String)>,
        /// The cells of that line.
        found: Vec<String>,
    },
    /// A cross-tab that could be read in more than one way.
    CrossTab(CrossTabProblem),
    /// A workbook that cannot be read.
    Workbook(WorkbookProblem),
    /// A workbook without the sheet that the site file names.
    NoSuchSheet {
        /// The declared sheet.
        declared: String,
        /// The sheets that have cells.
        found: Vec<String>,
    },
    /// A sheet of a workbook.
    Sheet {
        /// The sheet.
        sheet: String,
        /// What is wrong with it.
        problem: Box<TableProblem>,
    },
    /// Two columns of one meaning differ.
    ColumnsDiffer {
        /// The meaning.
        column: Column,
        /// Their headers.
        headers: [String; 2],
        /// The first line where they differ.
        line: u64,
        /// What stands there.
        cells: [String; 2],
    },
}

/// Why a cross-tab cannot be read without a guess.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum CrossTabProblem {
    /// `layout` declares one, and no row heads columns of dates, wells or analytes.
    NoHead,
    /// Nothing says where the well, the analyte or the date stands.
    Lacks {
        /// The row whose cells head the columns.
        line: u64,
        /// What stands across, as a key of `columns`.
        across: Column,
        /// What was not found.
        lacks: Column,
        /// The cells of that row.
        found: Vec<String>,
    },
    /// Two titles above one block name an analyte.
    TwoTitles {
        /// Their rows.
        lines: [u64; 2],
        /// What they say.
        titles: [String; 2],
    },
    /// A line between rows of a block that seems to be a title and names no known analyte.
    LostTitle {
        /// The line.
        line: u64,
        /// What it says.
        text: String,
        /// Two rows, above and below it, with the same cells at the left.
        repeats: [u64; 2],
    },
    /// Names at the left so long that writing them into each record would take all memory.
    LongNames {
        /// The row at which reading stopped.
        line: u64,
    },
    /// One column of marks beside several results.
    SharedMark {
        /// The row whose cells head the columns.
        line: u64,
        /// The column's header.
        header: String,
    },
}

/// Why a workbook cannot be read.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum WorkbookProblem {
    /// Under a password.
    Locked,
    /// Another kind of workbook: `xls`, `xlsb`, `ods`.
    OtherFormat {
        /// Which.
        format: &'static str,
    },
    /// A zip archive that is no workbook.
    OtherArchive,
    /// The archive or its parts are damaged.
    Damaged {
        /// What the reader says.
        why: String,
    },
    /// More than any workbook of results needs.
    OverCap {
        /// Of what.
        cap: Cap,
        /// How much was found before reading stopped.
        found: u64,
        /// How much is read at the most.
        most: u64,
    },
}

/// What a workbook may hold only so much of.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Cap {
    /// Bytes of the file.
    FileBytes,
    /// Entries of the archive.
    Entries,
    /// Bytes unpacked.
    UnpackedBytes,
    /// Bytes unpacked a byte packed.
    Ratio,
    /// Distinct texts.
    Texts,
    /// Rows of a sheet.
    Rows,
    /// Columns of a sheet.
    Columns,
    /// Filled cells.
    Cells,
    /// Bytes of text in cells.
    TextBytes,
    /// Places, filled or not.
    Places,
}

/// A file that could not be read as a table.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Unreadable {
    /// The shown path.
    pub name: String,
    /// Why.
    pub problem: TableProblem,
}
