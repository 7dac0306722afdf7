//! Why a run could not be done, each case with its exit status.

use chrono::NaiveDate;

use crate::deliver::write::WriteError;
use crate::intake::FrameError;
use crate::intake::account::Newest;
use crate::ledger::{Unbalanced, Unreadable};

/// Why a run could not be done.
#[derive(Debug, thiserror::Error)]
#[non_exhaustive]
pub enum Error {
    /// No input could be read as a table with records.
    #[error(
        "no record was read; expected at least one results file with a header and records below \
         it. Put the laboratory's CSV files into the site's results folder, or name them"
    )]
    NothingRead {
        /// Each file and why.
        unreadable: Vec<Unreadable>,
    },
    /// The newest date lies ahead of today and no as-of date was given.
    #[error(
        "{place}: the newest sample date {date} lies after today, {today}; expected no date \
         to come. Correct the date, or name the date of the review with --as-of",
        place = newest.place, date = newest.date
    )]
    NewestAhead {
        /// The record.
        newest: Newest,
        /// Today.
        today: NaiveDate,
    },
    /// A decision names records that do not exist.
    #[error(
        "the site file's decision{s} {ids} match{es} no record; expected at least one each. \
         Compare wells, analytes, dates and record numbers with ledger.csv (ebbwell check)",
        s = if ids.len() == 1 { "" } else { "s" },
        es = if ids.len() == 1 { "es" } else { "" },
        ids = ids.join(", ")
    )]
    DecisionMatchesNothing {
        /// Their ids.
        ids: Vec<String>,
    },
    /// The output could not be written, or would overwrite what is not ours.
    #[error(transparent)]
    Write(#[from] WriteError),
    /// The ledger does not balance: a fault of this program.
    #[error("the ledger does not balance: {0}. Nothing was written; please report this")]
    Unbalanced(#[from] Unbalanced),
    /// The frame failed: a fault of this program.
    #[error("the table could not be held: {0}. Nothing was written; please report this")]
    Frame(#[from] FrameError),
    /// No threads could be started.
    #[error("no threads could be started: {why}")]
    NoThreads {
        /// What the system says.
        why: String,
    },
    /// The run was interrupted.
    #[error("interrupted; the earlier output is whole")]
    Stopped,
}

impl Error {
    /// The exit status.
    #[must_use]
    pub fn exit_status(&self) -> u8 {
        match self {
            Self::NothingRead { .. } | Self::NewestAhead { .. } => 3,
            Self::DecisionMatchesNothing { .. } => 4,
            Self::Write(WriteError::WouldOverwrite { .. }) => 5,
            Self::Write(WriteError::CannotWrite { .. }) | Self::NoThreads { .. } => 6,
            Self::Unbalanced(_) | Self::Frame(_) => 7,
            Self::Stopped | Self::Write(WriteError::Stopped) => 130,
        }
    }
}
