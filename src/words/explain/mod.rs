//! The one table from which `explain` and the documentation read: every verdict, pace, method,
//! flag, column, outcome, reason, term and statistic, with its meaning, formula and source.
//!
//! Codes come from the enums, so none can be forgotten; columns and statistics are lists that a test
//! holds against the tables and against the documentation.

pub mod coded;
pub mod summary_columns;
pub mod table_columns;
pub mod statistics;
pub mod refits;
pub mod terms;
pub mod suspicions;

use crate::terms::folded;
use crate::terms::nearest as nearest_name;

/// The source of what this program itself defines.
pub const OURS: &str = "this program's definition";

/// What kind of word an entry explains.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Kind {
    /// A verdict.
    Verdict,
    /// A pace.
    Pace,
    /// A method.
    Method,
    /// A flag.
    Flag,
    /// An outcome of the ledger.
    Outcome,
    /// A reason of the ledger.
    Reason,
    /// A reason for having no rate.
    NoRate,
    /// A reason for having no date.
    NoDate,
    /// A column of a table.
    Column,
    /// Something suspected, or told as a fact, on arrival.
    Suspicion,
    /// A word that pages and the documentation use.
    Term,
    /// A statistical procedure.
    Statistic,
}

impl Kind {
    /// Every kind, in the order of the index.
    pub const ALL: &'static [Self] = &[
        Self::Verdict,
        Self::Pace,
        Self::Method,
        Self::Flag,
        Self::NoRate,
        Self::NoDate,
        Self::Outcome,
        Self::Reason,
        Self::Suspicion,
        Self::Term,
        Self::Statistic,
        Self::Column,
    ];

    /// What one word of this kind is.
    #[must_use]
    pub fn label(self) -> &'static str {
        match self {
            Self::Verdict => "verdict",
            Self::Pace => "pace",
            Self::Method => "method",
            Self::Flag => "flag",
            Self::Outcome => "outcome of a record",
            Self::Reason => "reason in the ledger",
            Self::NoRate => "reason for having no rate",
            Self::NoDate => "reason for having no date",
            Self::Column => "column",
            Self::Suspicion => "sentinel on arrival",
            Self::Term => "term",
            Self::Statistic => "procedure",
        }
    }

    /// The heading over the words of this kind.
    #[must_use]
    pub fn title(self) -> &'static str {
        match self {
            Self::Verdict => "Verdicts",
            Self::Pace => "Paces",
            Self::Method => "Methods",
            Self::Flag => "Flags",
            Self::Outcome => "Outcomes of records",
            Self::Reason => "Reasons in the ledger",
            Self::NoRate => "Why there is no rate",
            Self::NoDate => "Why there is no date",
            Self::Column => "Columns",
            Self::Suspicion => "Sentinels on arrival",
            Self::Term => "Terms",
            Self::Statistic => "Procedures",
        }
    }
}

/// One word explained.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Entry {
    /// The word as files and pages write it.
    pub word: &'static str,
    /// What kind of word it is.
    pub kind: Kind,
    /// For columns the tables that have it, for reasons their outcome; else empty.
    pub place: &'static str,
    /// What it means.
    pub meaning: &'static str,
    /// Its formula, where it has one.
    pub formula: Option<&'static str>,
    /// Where it comes from.
    pub source: &'static str,
}

/// Every entry, by kind, in the order in which outputs list the words.
#[must_use]
pub fn all() -> Vec<Entry> {
    let mut entries = coded::entries();
    entries.extend(suspicions::entries());
    entries.extend(terms::TERMS);
    entries.extend(statistics::STATISTICS);
    entries.extend(refits::REFITS);
    entries.extend(refits::coded());
    entries.extend(summary_columns::SUMMARY);
    entries.extend(table_columns::OTHERS);
    entries.sort_by_key(|entry| Kind::ALL.iter().position(|kind| *kind == entry.kind));
    entries
}

/// The entries of a word, matched without regard to case, blanks, hyphens and underscores. A
/// decision's reason (`decision:D1`) is explained under `decision`.
#[must_use]
pub fn find(word: &str) -> Vec<Entry> {
    let word = word.split_once(':').map_or(word, |(head, _)| head);
    let wanted = folded(word);
    all().into_iter().filter(|entry| folded(entry.word) == wanted).collect()
}

/// The known word nearest to one that is not known.
#[must_use]
pub fn nearest(word: &str) -> Option<&'static str> {
    let words: Vec<&'static str> = all().into_iter().map(|entry| entry.word).collect();
    nearest_name(word, words.iter().copied())
        .and_then(|near| words.iter().copied().find(|known| *known == near))
}
