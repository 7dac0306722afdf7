//! Every label, sentence and explanation people read, one file a kind, keyed by the enums, and how
//! numbers and dates are written. A second language is a second set of these files.
//!
//! Nothing here computes: a sentence only says what `findings` holds. Text that comes from files is
//! made harmless by [`clean`] before it enters a sentence.

pub mod number;
pub mod clean;
pub mod verdict;
pub mod pace;
pub mod method;
pub mod flag;
pub mod flag_sentence;
pub mod reason;
pub mod fate;
pub mod fate_rules;
mod told_arrival;
pub mod told;
pub mod suspicion;
pub mod quality;
pub mod completeness;
pub mod caution;
pub mod round;
pub mod progress;
pub mod workbook;
pub mod unreadable;
pub mod doubt;
pub mod series_sentence;
pub mod explain;
pub mod layout;
pub mod page;
