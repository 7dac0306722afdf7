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
    /// A workbook or another kind of file that is not read.
    OtherKind {
        /// The shown path.
        name: String,
    },
}

impl SourceError {
    /// The shown path.
    #[must_use]
    pub fn name(&self) -> &str {
        match self {
            Self::Io { name, .. } | Self::GivenTwice { name, .. } | Self::OtherKind { name } => {
                name
            }
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
    /// The first line lacks required columns.
    NoHeader {
        /// The required columns that were not found.
        lacks: Vec<Column>,
        /// The cells of the first line.
        found: Vec<String>,
    },
    /// Headers that the site file declares are not there.
    DeclaredMissing {
        /// Our column and the declared header.
        missing: Vec<(Column, String)>,
        /// The cells of the first line.
        found: Vec<String>,
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

/// A file that could not be read as a table.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Unreadable {
    /// The shown path.
    pub name: String,
    /// Why.
    pub problem: TableProblem,
}
