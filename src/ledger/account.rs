//! The account as tables list it: files, headers, counts, rows.

use serde::Serialize;

/// One results file.
#[derive(Clone, Debug, Serialize)]
pub struct FileFacts {
    /// The shown path: below the site folder with `/`, the shortest telling tail, or `-`.
    pub name: String,
    /// Size in bytes.
    pub bytes: u64,
    /// SHA-256 in hex.
    pub sha256: String,
    /// Records read.
    pub records: usize,
    /// Lines whose cells are all empty.
    pub blank_lines: usize,
    /// Empty cells of a cross-tab.
    pub empty_cells: usize,
    /// The sheets of a workbook that were read.
    pub sheets: Vec<String>,
    /// How it was decoded: `utf-8`, `utf-16le`, `utf-16be`, `windows-1252`; `xlsx` for a workbook.
    pub encoding: &'static str,
}

/// How many records ended in one outcome for one reason.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct OutcomeCount {
    /// The outcome's code.
    pub outcome: &'static str,
    /// The reason's code, empty for `used`.
    pub reason: String,
    /// How many.
    pub records: usize,
}

/// One header that was read.
#[derive(Clone, Debug, Serialize)]
pub struct MappingFacts {
    /// The file.
    pub file: String,
    /// The sheet of a workbook.
    pub sheet: String,
    /// The header as written.
    pub header: String,
    /// The column it was read as; empty where it is not used.
    pub column: String,
}

/// One line of the ledger, as texts ready to be written.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct LedgerRow {
    /// The file's shown path.
    pub file: String,
    /// The sheet of a workbook.
    pub sheet: String,
    /// The line, row or cell.
    pub record: String,
    /// The site.
    pub site: String,
    /// The well as read (after aliases).
    pub well: String,
    /// The date in ISO form where it could be read, else as written.
    pub date: String,
    /// The analyte as shown, else as written.
    pub analyte: String,
    /// The fraction.
    pub fraction: String,
    /// The depth as written.
    pub depth: String,
    /// The result as written.
    pub reported: String,
    /// The unit as written.
    pub unit: String,
    /// The qualifier as written.
    pub qualifier: String,
    /// The reporting limit as written.
    pub reporting_limit: String,
    /// The sample id as written.
    pub sample_id: String,
    /// The outcome's code.
    pub outcome: &'static str,
    /// The reason's code.
    pub reason: String,
    /// What was told about the record, `; `-joined.
    pub detail: String,
}
