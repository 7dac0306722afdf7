//! Reading a parsed document into typed tables: every value keeps its line, every problem is kept.
//!
//! serde's derive stops at the first problem and loses lines inside nested tables, so tables are
//! read here instead, by [`FromToml`]. A value that cannot be read is told and becomes `None`;
//! reading goes on.

pub mod table;
pub mod leaf;
pub mod list;
pub mod keyed;

pub use keyed::{Keyed, MapKey};
pub use leaf::{Amount, Day, OneChar, UnitWritten};
pub use table::{Header, Need};

use std::borrow::Cow;
use std::ops::Range;

use schemars::{JsonSchema, Schema, SchemaGenerator};
use toml::de::DeValue;

use super::problem::{Problem, ProblemKind};
use crate::terms::nearest;

/// A value with its place in the file.
#[derive(Clone, Debug, PartialEq)]
pub struct At<T> {
    /// The line, counted from 1.
    pub line: usize,
    /// The key as messages show it: `[settings] rate-needs.dates`.
    pub key: String,
    /// The value.
    pub value: T,
}

impl<T> At<T> {
    /// The same place with another value.
    pub fn with<U>(&self, value: U) -> At<U> {
        At { line: self.line, key: self.key.clone(), value }
    }

    /// The place of a key inside this table.
    pub fn inside(&self, key: &str) -> At<()> {
        At { line: self.line, key: table::inside(&self.key, key), value: () }
    }
}

impl<T: JsonSchema> JsonSchema for At<T> {
    fn schema_name() -> Cow<'static, str> {
        T::schema_name()
    }

    fn inline_schema() -> bool {
        true
    }

    fn json_schema(generator: &mut SchemaGenerator) -> Schema {
        generator.subschema_for::<T>()
    }
}

/// A value that the site file can hold.
pub trait FromToml: Sized {
    /// How messages say what is wanted: `a number`.
    const WANTS: &'static str;
    /// How the value is written at the top of the file.
    const HEADER: Header = Header::Key;

    /// Reads the value, or tells what is wrong with it.
    fn from_toml(value: &DeValue<'_>, at: &At<()>, problems: &mut Problems<'_>) -> Option<Self>;
}

/// The problems found so far, and what is needed to say where they are.
pub struct Problems<'t> {
    path: &'t str,
    line_starts: Vec<usize>,
    found: Vec<Problem>,
}

impl<'t> Problems<'t> {
    /// No problems yet, of this text in a file shown under this path.
    #[must_use]
    pub fn new(text: &str, path: &'t str) -> Self {
        let breaks = text.bytes().enumerate().filter(|(_, byte)| *byte == b'\n');
        let line_starts = std::iter::once(0).chain(breaks.map(|(at, _)| at + 1)).collect();
        Self { path, line_starts, found: Vec::new() }
    }

    /// The line on which a span begins, counted from 1.
    #[must_use]
    pub fn line(&self, span: &Range<usize>) -> usize {
        self.line_starts.partition_point(|start| *start <= span.start).max(1)
    }

    /// Notes a problem with a value at a known place.
    pub fn tell<T>(&mut self, at: &At<T>, kind: ProblemKind) {
        self.note(Some(at.line), at.key.clone(), kind);
    }

    /// Notes a problem at a line, or of the whole file.
    pub fn note(&mut self, line: Option<usize>, key: String, kind: ProblemKind) {
        self.found.push(Problem { path: self.path.to_owned(), line, key, kind });
    }

    /// Notes that a value has another type than is wanted.
    pub fn wrong_type(&mut self, at: &At<()>, wants: &'static str, found: &DeValue<'_>) {
        self.tell(at, ProblemKind::WrongType { wants, found: type_in_words(found) });
    }

    /// What was found, in the order of the file; what is missing from the whole file comes last.
    #[must_use]
    pub fn into_sorted(mut self) -> Vec<Problem> {
        self.found.sort_by_key(|problem| problem.line.unwrap_or(usize::MAX));
        self.found
    }

    /// Keeps the problems that a condition holds for.
    pub fn retain(&mut self, keep: impl FnMut(&Problem) -> bool) {
        self.found.retain(keep);
    }
}

/// A value's type in words.
fn type_in_words(value: &DeValue<'_>) -> &'static str {
    match value {
        DeValue::String(_) => "text",
        DeValue::Integer(_) => "a whole number",
        DeValue::Float(_) => "a number with a fraction",
        DeValue::Boolean(_) => "true or false",
        DeValue::Datetime(_) => "a date or time",
        DeValue::Array(_) => "a list",
        DeValue::Table(_) => "a table",
    }
}

/// A key that is none of the known ones, with the nearest of them.
pub fn unknown_key(written: &str, known: &[&'static str]) -> ProblemKind {
    let nearest = nearest(written, known.iter().copied()).map(str::to_owned);
    ProblemKind::UnknownKey { nearest, known: known.to_vec() }
}

/// Reads one word of a closed list.
pub fn word<T: Copy>(
    value: &DeValue<'_>,
    at: &At<()>,
    problems: &mut Problems<'_>,
    all: &[T],
    code: impl Fn(T) -> &'static str,
) -> Option<T> {
    let allowed = || all.iter().map(|case| code(*case)).collect();
    let Some(found) = value.as_str() else {
        problems.wrong_type(at, "a word in quotes", value);
        return None;
    };
    let case = all.iter().copied().find(|case| code(*case) == found);
    if case.is_none() {
        let found = found.escape_debug().to_string();
        problems.tell(at, ProblemKind::UnknownWord { found, allowed: allowed() });
    }
    case
}
