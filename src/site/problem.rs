//! What can be wrong with a site file: one enum, so that every sentence can be read in one sitting.

use chrono::NaiveDate;

/// One problem of a site file, with its place.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
#[error("{}: {}{kind}", place(path, *line), shown(key))]
pub struct Problem {
    /// The file as it is shown to people: `site.toml`.
    pub path: String,
    /// The line, counted from 1; none where something is missing from the whole file.
    pub line: Option<usize>,
    /// The key with its table: `[settings] rate-needs.dates`; empty for a syntax error.
    pub key: String,
    /// What is wrong.
    pub kind: ProblemKind,
}

fn place(path: &str, line: Option<usize>) -> String {
    line.map_or_else(|| path.to_owned(), |line| format!("{path}:{line}"))
}

fn shown(key: &str) -> String {
    if key.is_empty() { String::new() } else { format!("{key} ") }
}

/// What is wrong, what was found, what is expected and what to do next.
///
/// Each sentence follows the key it is about: `[settings] confidence is 90; …`.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
#[non_exhaustive]
pub enum ProblemKind {
    /// The file is not TOML at this place.
    #[error("not readable here: {message}")]
    Syntax {
        /// What the parser says.
        message: String,
    },
    /// A key or a table stands twice, or two things carry one name.
    #[error("{what} stands twice{}; keep one of the two", first_seen(*first))]
    Duplicate {
        /// What stands twice.
        what: String,
        /// The line of the first.
        first: Option<usize>,
    },
    /// A key that is not known.
    #[error("is not a key{}", nearest_key(nearest.as_deref(), known))]
    UnknownKey {
        /// The nearest known one.
        nearest: Option<String>,
        /// All known ones, for a key that resembles none.
        known: Vec<&'static str>,
    },
    /// A needed key is absent.
    #[error("is missing; write {example}")]
    Missing {
        /// The key with a value such as it takes.
        example: &'static str,
    },
    /// A value of another type.
    #[error("is {found}; it must be {wants}")]
    WrongType {
        /// What it must be.
        wants: &'static str,
        /// What was found.
        found: &'static str,
    },
    /// A number that is not finite, or too large to hold.
    #[error("is {found}, which is not a finite number")]
    NotFinite {
        /// The number as written.
        found: String,
    },
    /// A number or date out of range.
    #[error("is {found}; it must be {wants}")]
    OutOfRange {
        /// The value as written.
        found: String,
        /// The range in words.
        wants: String,
    },
    /// A word that is none of the key's words.
    #[error("is \"{found}\"; its words are {}", quoted(allowed))]
    UnknownWord {
        /// The word as written.
        found: String,
        /// The words of the key.
        allowed: Vec<&'static str>,
    },
    /// A text that does not read as what the key holds.
    #[error("is \"{found}\"; it must be {wants}")]
    WrongText {
        /// The text as written.
        found: String,
        /// What it must be, with an example.
        wants: &'static str,
    },
    /// An empty text or list.
    #[error("is empty; {wants}")]
    Empty {
        /// What to do.
        wants: &'static str,
    },
    /// Two keys that say the same thing in two ways.
    #[error("stands beside {other}; keep one of the two")]
    EitherOr {
        /// The other key.
        other: &'static str,
    },
    /// A key that cannot mean anything beside another.
    #[error("says nothing beside {other}; leave it out")]
    Pointless {
        /// What stands beside it.
        other: &'static str,
    },
    /// A key that says nothing without another.
    #[error("needs {other} beside it")]
    Needs {
        /// The other key, with what it is for.
        other: &'static str,
    },
    /// A last date before its first.
    #[error("is {to}, before its beginning on {from}; swap the two or correct one")]
    Backwards {
        /// The first date.
        from: NaiveDate,
        /// The last date.
        to: NaiveDate,
    },
    /// A name that is not listed.
    #[error("names \"{found}\", which is no listed {what}{}", nearest_name(nearest.as_deref()))]
    NotListed {
        /// The name as written.
        found: String,
        /// What it should be: an analyte.
        what: &'static str,
        /// The nearest listed name.
        nearest: Option<String>,
    },
    /// A statistical setting off its default, and no reason for it.
    #[error(
        "is {is} in place of {was} and no reason is given; add {key} = \"…\" to why in [settings]"
    )]
    NoReason {
        /// The key by itself.
        key: &'static str,
        /// The default.
        was: String,
        /// What the file says.
        is: String,
    },
    /// A unit of another dimension than the analyte's.
    #[error("is in {unit}, which does not convert to {other}; give both in units of one kind")]
    OtherDimension {
        /// The unit.
        unit: &'static str,
        /// The analyte's unit.
        other: &'static str,
    },
    /// Another basis than the analyte's.
    #[error("counts as {found}, and the analyte as {other}; give both on one basis")]
    OtherBasis {
        /// The basis of this value.
        found: String,
        /// The analyte's basis.
        other: String,
    },
    /// A CAS number of another substance than the name.
    #[error("is the CAS number of {of}, and \"{name}\" has {cas}; correct the one or the other")]
    OtherSubstance {
        /// The substance whose number it is.
        of: &'static str,
        /// The name written.
        name: String,
        /// The number of that name.
        cas: &'static str,
    },
    /// A decision that names no record.
    #[error(
        "names no records; give at least one of wells, analytes, from, to, samples, file, records"
    )]
    NamesNothing,
    /// Work that is designed and not built.
    #[error("belongs to work that is not built yet; leave it out for now")]
    NotBuilt,
}

fn first_seen(line: Option<usize>) -> String {
    line.map_or_else(String::new, |line| format!(", first on line {line}"))
}

fn nearest_key(nearest: Option<&str>, known: &[&str]) -> String {
    nearest.map_or_else(
        || format!("; the keys here are {}", known.join(", ")),
        |key| format!("; the nearest is {key}"),
    )
}

fn nearest_name(nearest: Option<&str>) -> String {
    nearest.map_or_else(
        || "; list it or correct the name".to_owned(),
        |name| format!("; the nearest is \"{name}\""),
    )
}

fn quoted(words: &[&str]) -> String {
    words.iter().map(|word| format!("\"{word}\"")).collect::<Vec<_>>().join(", ")
}
