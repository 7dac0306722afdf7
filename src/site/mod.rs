//! The site file: what is written in it, what is checked of it, its templates, and the embedded
//! catalogue of analytes.
//!
//! [`read`] goes from text to [`Site`], or to every problem at once. The keys are declared once,
//! in [`file`](mod@file); the JSON schema of [`schema()`] comes from the same declaration.

pub mod problem;
pub mod written;
pub mod choices;
pub mod delivery;
pub mod fraction;
pub mod limit_type;
pub mod cas;
pub mod catalogue;
pub mod checked;
pub mod file;
mod syntax;
mod check;
mod reader;
pub mod template;
mod lookup;
mod schema;

pub use cas::{CasCheck, cas_check};
pub use checked::{
    Analyte, DateNeeds, Decision, Event, Expected, FlagThresholds, Limit, Listing, OffDefault,
    Qualifier, RateNeeds, Restart, ResultsRule, Settings, Site, Well, WellAlias, WellLimit,
};
pub use choices::{
    DecisionKind, Depths, Duplicates, EventKind, Meaning, NonDetects, Role, RoundLength, SameDay,
    Setting,
};
pub use delivery::{
    Column, DateOrder, Decimal, Encoding, Layout, SampleType, SerialDates, Sigma, TwoDigitYears,
};
pub use file::SiteFile;
pub use fraction::Fraction;
pub use limit_type::{LimitType, limit_type};
pub use lookup::{JoinedBy, WellMatch};
pub use problem::{Problem, ProblemKind};
pub use reader::read;
pub use schema::schema;
