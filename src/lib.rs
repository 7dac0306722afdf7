//! Ebbwell screens first-order attenuation of groundwater contaminants, well by well.
//!
//! A results file goes through these stages, each one function from one noun to the next, and may
//! use only what stands above it here. The order of the `mod` lines is the direction of the data;
//! a test holds it.
//!
//! | stage | gives |
//! |---|---|
//! | [`numerics`] | estimates, tests and intervals on plain numbers |
//! | [`terms`] | the words every stage shares |
//! | [`site`] | the site file as written → [`site::Site`] as checked |
//! | [`ledger`] | what became of every record |
//! | [`intake`] | results files → [`intake::Tidy`], one frame, one row a record |
//! | [`series`] | the frame → [`series::WellSeries`] → [`series::Points`], one value a date |
//! | [`fit`] | points → [`fit::Fit`], or why there is none |
//! | [`project`] | fit and limit → raw dates with their ends |
//! | [`judge`] | the verdict, the dates that are shown, the pace, the flags |
//! | [`doubts`] | everything that fits again: diagnostics, other models, other choices |
//! | [`findings`] | [`findings::Findings`], all that a run found out |
//! | [`words`] | every label, sentence and explanation |
//! | [`deliver`] | tables, charts, JSON; `deliver::write` alone makes files |
//! | [`run`](mod@run) | the stages in order: [`run::run`] takes a [`run::Job`] |
//!
//! Places are kept for `earlier` (after intake: an earlier output folder), `review` (after doubts:
//! rounds held against rounds), `flowpath` and `chain` (before findings), and `verify` (after run).
//!
//! The promise to users covers [`run::run`], [`run::Job`], [`findings::Findings`] and
//! [`numerics`]; everything else is `pub` so that the one test binary reaches it.

pub mod numerics;
pub mod terms;
pub mod site;
pub mod ledger;
pub mod intake;
pub mod series;
pub mod fit;
pub mod project;
pub mod judge;
pub mod doubts;
pub mod findings;
pub mod words;
pub mod deliver;
pub mod run;
