//! The tables as CSV: UTF-8 without BOM, LF, a header always.

pub mod guard;
pub mod rows;
pub mod summary;
pub mod wells;
pub mod flags;
pub mod used;
pub mod ledger;

pub use flags::flags_csv;
pub use guard::{csv_text, csv_text_back};
pub use ledger::ledger_csv;
pub use summary::summary_csv;
pub use used::used_csv;
pub use wells::wells_csv;

use crate::findings::columns::SUMMARY;

/// Every table with its columns, for `explain` and the documentation.
#[must_use]
pub fn all() -> Vec<(&'static str, Vec<&'static str>)> {
    vec![
        ("summary.csv", SUMMARY.iter().map(|column| column.name).collect()),
        ("wells.csv", wells::COLUMNS.iter().map(|column| column.name).collect()),
        ("ledger.csv", ledger::COLUMNS.iter().map(|column| column.name).collect()),
        ("flags.csv", flags::COLUMNS.iter().map(|column| column.name).collect()),
        ("used.csv", used::COLUMNS.iter().map(|column| column.name).collect()),
    ]
}
