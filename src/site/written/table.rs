//! Tables with known keys: one declaration gives the type, the reader and the JSON schema.

use schemars::{JsonSchema, Schema, SchemaGenerator};
use serde_json::{Map, Value, json};
use toml::de::{DeTable, DeValue};

use super::super::problem::ProblemKind;
use super::{At, FromToml, Problems, unknown_key};

/// How a value is written at the top of the file.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Header {
    /// `key = …`.
    Key,
    /// `[key]`.
    Table,
    /// `[[key]]`, once for each.
    Tables,
}

/// Whether a key must be there.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Need {
    /// It may be left out.
    Optional,
    /// It must be there; the example goes into the message.
    Needed(&'static str),
}

/// The key of a table's entry as messages show it.
pub(crate) fn inside(table: &str, key: &str) -> String {
    let key = if key.chars().all(|c| c.is_ascii_alphanumeric() || matches!(c, '-' | '_')) {
        key.to_owned()
    } else {
        format!("\"{}\"", key.escape_debug())
    };
    match table {
        "" => key,
        header if header.starts_with('[') && !header.contains(' ') => format!("{header} {key}"),
        dotted => format!("{dotted}.{key}"),
    }
}

/// The key of a list's element as messages show it; blocks are told apart by their line.
pub(crate) fn element(list: &str, index: usize) -> String {
    if list.starts_with("[[") && !list.contains(' ') {
        list.to_owned()
    } else {
        format!("{list}[{}]", index + 1)
    }
}

/// A table whose unknown keys have been told.
pub(crate) struct Open<'v, 'i> {
    table: &'v DeTable<'i>,
    at: At<()>,
}

impl<'v, 'i> Open<'v, 'i> {
    /// Opens a table and tells of every key that is not known.
    pub(crate) fn new(
        value: &'v DeValue<'i>,
        at: &At<()>,
        known: &[&'static str],
        problems: &mut Problems<'_>,
    ) -> Option<Self> {
        let Some(table) = value.as_table() else {
            let wants = if at.key.starts_with('[') && !at.key.contains(' ') {
                "a table, its keys on lines of their own"
            } else {
                "a table in braces"
            };
            problems.wrong_type(at, wants, value);
            return None;
        };
        for (key, _) in table {
            let name: &str = key.get_ref();
            if !known.contains(&name) {
                let line = Some(problems.line(&key.span()));
                problems.note(line, inside(&at.key, name), unknown_key(name, known));
            }
        }
        Some(Self { table, at: at.clone() })
    }

    /// Reads one key; a needed one that is absent is told.
    pub(crate) fn key<T: FromToml>(
        &self,
        key: &'static str,
        need: Need,
        problems: &mut Problems<'_>,
    ) -> Option<At<T>> {
        let root = self.at.key.is_empty();
        let shown = match T::HEADER {
            Header::Table if root => format!("[{key}]"),
            Header::Tables if root => format!("[[{key}]]"),
            _ => inside(&self.at.key, key),
        };
        let Some((written, value)) = self.table.get_key_value(key) else {
            if let Need::Needed(example) = need {
                let line = (!root).then_some(self.at.line);
                problems.note(line, shown, ProblemKind::Missing { example });
            }
            return None;
        };
        let line = problems.line(&written.span());
        let place = At { line, key: shown, value: () };
        T::from_toml(value.get_ref(), &place, problems).map(|value| place.with(value))
    }
}

/// One key for the JSON schema.
pub(crate) struct Entry {
    pub(crate) key: &'static str,
    pub(crate) need: Need,
    pub(crate) doc: String,
    pub(crate) schema: Schema,
}

impl Entry {
    /// A key with its documentation, as the lines of the doc comment.
    pub(crate) fn new<T: JsonSchema>(
        key: &'static str,
        need: Need,
        doc: &[&str],
        generator: &mut SchemaGenerator,
    ) -> Self {
        Self { key, need, doc: one_line(doc), schema: generator.subschema_for::<T>() }
    }
}

/// The schema of a table with these keys and no others.
pub(crate) fn table_schema(doc: &[&str], entries: Vec<Entry>) -> Schema {
    let mut schema = Schema::default();
    schema.insert("description".into(), json!(one_line(doc)));
    schema.insert("type".into(), json!("object"));
    let needed: Vec<&str> =
        entries.iter().filter(|e| e.need != Need::Optional).map(|e| e.key).collect();
    if !needed.is_empty() {
        schema.insert("required".into(), json!(needed));
    }
    let mut properties = Map::new();
    for entry in entries {
        let mut property = entry.schema;
        property.insert("description".into(), Value::String(entry.doc));
        properties.insert(entry.key.into(), property.into());
    }
    schema.insert("properties".into(), Value::Object(properties));
    schema.insert("additionalProperties".into(), json!(false));
    schema
}

fn one_line(doc: &[&str]) -> String {
    doc.iter().map(|line| line.trim()).collect::<Vec<_>>().join(" ").trim().to_owned()
}

/// Declares a table: its keys with their types, whether they are needed, and what they mean.
macro_rules! table {
    ($(#[doc = $doc:literal])* $name:ident {
        $($(#[doc = $fdoc:literal])* $field:ident = $key:literal: $ty:ty $(, needed as $example:literal)?;)+
    }) => {
        $(#[doc = $doc])*
        #[derive(Clone, Debug, Default)]
        pub struct $name {
            $($(#[doc = $fdoc])* pub $field: Option<At<$ty>>,)+
        }

        impl $name {
            /// The keys of the table, in the order in which they are documented.
            pub const KEYS: &'static [&'static str] = &[$($key,)+];
        }

        impl FromToml for $name {
            const WANTS: &'static str = "a table";
            const HEADER: Header = Header::Table;

            fn from_toml(
                value: &toml::de::DeValue<'_>,
                at: &At<()>,
                problems: &mut Problems<'_>,
            ) -> Option<Self> {
                let table = Open::new(value, at, Self::KEYS, problems)?;
                Some(Self {
                    $($field: table.key(
                        $key,
                        table!(@need $($example)?),
                        problems,
                    ),)+
                })
            }
        }

        impl schemars::JsonSchema for $name {
            fn schema_name() -> std::borrow::Cow<'static, str> {
                stringify!($name).into()
            }

            fn inline_schema() -> bool {
                true
            }

            fn json_schema(generator: &mut schemars::SchemaGenerator) -> schemars::Schema {
                let entries = vec![$(Entry::new::<$ty>(
                    $key,
                    table!(@need $($example)?),
                    &[$($fdoc),*],
                    generator,
                ),)+];
                table_schema(&[$($doc),*], entries)
            }
        }
    };
    (@need) => { Need::Optional };
    (@need $example:literal) => { Need::Needed($example) };
}
pub(crate) use table;
