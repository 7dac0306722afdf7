//! What a run leaves behind: tables, charts, JSON, and the folder that holds them.
//!
//! Renderers are pure, from findings to text. [`write`](mod@write) is the only code that makes files.

pub mod arrival_json;
pub mod json;
pub mod cells;
pub mod tables;
pub mod doubts_json;
pub mod summary_json;
pub mod run_json;
pub mod page_json;
pub mod names;
pub mod charts;
pub mod files;
pub mod earlier_run;
pub mod write;
pub mod new_site;

pub use files::{Content, Formats, OutFile, review_files};
pub use new_site::{NewSiteError, new_site};
pub use page_json::{check_json, explain_json, show_json};
pub use run_json::run_json;
pub use summary_json::summary_json;
pub use tables::{
    csv_text, csv_text_back, flags_csv, ledger_csv, summary_csv, used_csv, wells_csv,
};
pub use write::{OutDir, Owner, WriteError, Written, may_write};
