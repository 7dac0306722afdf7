//! Readings grouped by site, well, analyte, fraction and depth, merged to one value a date.
//!
//! [`points()`] is the only way from a series to a fit: it applies the censoring point, the merge of
//! one date, the window and the substitution setting, and says what became of every record.

pub mod key;
pub mod well_series;
pub mod round;
pub mod recensor;
pub mod merge;
pub mod points;
pub mod pairs;
pub mod window;
pub mod grouping;
pub mod assemble;
pub mod sentinels;
pub mod quality;
pub mod completeness;

pub use completeness::{Completeness, completeness};
pub use grouping::group;
pub use key::SeriesKey;
pub use pairs::DuplicatePair;
pub use points::{DateValue, LeaveOut, MergeRules, Points, Window, points};
pub use quality::{Quality, quality};
pub use round::{Round, RoundRules};
pub use sentinels::{Sentinel, sentinels};
pub use well_series::{AppliedLimit, Candidate, SampleRole, WellSeries};
pub use window::window_for;
