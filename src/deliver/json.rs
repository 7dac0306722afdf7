//! JSON with its keys in the order they are put in and its numbers written as everywhere here.
//!
//! `serde_json` sorts keys and writes `5.0` and `1e15` its own way; it is used for the text of
//! strings alone.

use std::fmt::Write as _;

use chrono::NaiveDate;

use crate::words::number;

/// A JSON value.
#[derive(Clone, Debug, PartialEq)]
pub enum Json {
    /// Absent.
    Null,
    /// True or false.
    Bool(bool),
    /// A number; one that is not finite is written as null.
    Number(f64),
    /// A count.
    Count(u64),
    /// Text, raw.
    Text(String),
    /// A list.
    List(Vec<Json>),
    /// An object, its keys in order.
    Object(Vec<(&'static str, Json)>),
    /// An object whose keys are data.
    Map(Vec<(String, Json)>),
}

impl Json {
    /// Text.
    #[must_use]
    pub fn text(text: &str) -> Self {
        Self::Text(text.to_owned())
    }

    /// Text, or null where it is absent or empty.
    #[must_use]
    pub fn text_or_null(text: Option<&str>) -> Self {
        text.filter(|text| !text.is_empty()).map_or(Self::Null, Self::text)
    }

    /// A number, or null.
    #[must_use]
    pub fn number(value: Option<f64>) -> Self {
        value.map_or(Self::Null, Self::Number)
    }

    /// A date in ISO form, or null.
    #[must_use]
    pub fn date(date: Option<NaiveDate>) -> Self {
        date.map_or(Self::Null, |date| Self::Text(number::iso(date)))
    }

    /// A count.
    #[must_use]
    pub fn count(n: usize) -> Self {
        // A usize is at most 64 bits wide on every supported machine.
        u64::try_from(n).map_or(Self::Null, Self::Count)
    }

    /// The value as text: two blanks a level, LF, a newline at the end.
    #[must_use]
    pub fn to_text(&self) -> String {
        let mut text = String::new();
        self.put(&mut text, 0);
        text.push('\n');
        text
    }

    fn put(&self, to: &mut String, depth: usize) {
        match self {
            Self::Null => to.push_str("null"),
            Self::Bool(value) => to.push_str(if *value { "true" } else { "false" }),
            Self::Number(value) if value.is_finite() => to.push_str(&number::json(*value)),
            Self::Number(_) => to.push_str("null"),
            Self::Count(n) => {
                // Writing into a string does not fail.
                let _ = write!(to, "{n}");
            }
            Self::Text(text) => put_text(to, text),
            Self::List(items) => {
                put_block(to, depth, ('[', ']'), items, |to, item| item.put(to, depth + 1));
            }
            Self::Object(members) => {
                put_block(to, depth, ('{', '}'), members, |to, (key, value)| {
                    put_member(to, key, value, depth);
                });
            }
            Self::Map(members) => {
                put_block(to, depth, ('{', '}'), members, |to, (key, value)| {
                    put_member(to, key, value, depth);
                });
            }
        }
    }
}

fn put_member(to: &mut String, key: &str, value: &Json, depth: usize) {
    put_text(to, key);
    to.push_str(": ");
    value.put(to, depth + 1);
}

/// A list or object, one item a line; nothing between the brackets where it is empty.
fn put_block<T>(
    to: &mut String,
    depth: usize,
    (open, close): (char, char),
    items: &[T],
    mut put: impl FnMut(&mut String, &T),
) {
    to.push(open);
    for (at, item) in items.iter().enumerate() {
        to.push_str(if at == 0 { "\n" } else { ",\n" });
        to.push_str(&"  ".repeat(depth + 1));
        put(to, item);
    }
    if !items.is_empty() {
        to.push('\n');
        to.push_str(&"  ".repeat(depth));
    }
    to.push(close);
}

fn put_text(to: &mut String, text: &str) {
    match serde_json::to_string(text) {
        Ok(quoted) => to.push_str(&quoted),
        // A string always has a JSON form; a quote from serde_json cannot fail on one.
        Err(_) => to.push_str("null"),
    }
}
