//! Tables whose keys are data: a header, a code, a setting.

use std::borrow::Cow;
use std::collections::BTreeMap;

use schemars::{JsonSchema, Schema, SchemaGenerator, json_schema};
use toml::de::DeValue;

use super::table::inside;
use super::{At, FromToml, Problems};

/// A key that is data.
pub trait MapKey: Ord + Sized + 'static {
    /// The keys there are; empty where any text is one.
    const KNOWN: &'static [Self];

    /// Reads the key, or tells what is wrong with it.
    fn from_key(key: &str, at: &At<()>, problems: &mut Problems<'_>) -> Option<Self>;

    /// The key as it is written.
    fn written(&self) -> &str;
}

impl MapKey for String {
    const KNOWN: &'static [Self] = &[];

    fn from_key(key: &str, at: &At<()>, problems: &mut Problems<'_>) -> Option<Self> {
        Self::from_toml(&DeValue::String(Cow::Borrowed(key)), at, problems)
    }

    fn written(&self) -> &str {
        self
    }
}

/// A table whose keys are data.
#[derive(Clone, Debug)]
pub struct Keyed<K, T>(pub BTreeMap<K, At<T>>);

impl<K: MapKey + Clone, T: Clone> Keyed<K, T> {
    /// The entries without their places.
    pub fn values(&self) -> BTreeMap<K, T> {
        self.0.iter().map(|(key, at)| (key.clone(), at.value.clone())).collect()
    }
}

impl<K: MapKey, T: FromToml> FromToml for Keyed<K, T> {
    const WANTS: &'static str = "a table in braces, such as { name = \"value\" }";

    fn from_toml(value: &DeValue<'_>, at: &At<()>, problems: &mut Problems<'_>) -> Option<Self> {
        let Some(table) = value.as_table() else {
            problems.wrong_type(at, Self::WANTS, value);
            return None;
        };
        let mut read = BTreeMap::new();
        for (key, item) in table {
            let place = At {
                line: problems.line(&key.span()),
                key: inside(&at.key, key.get_ref()),
                value: (),
            };
            let name = K::from_key(key.get_ref(), &place, problems);
            let item = T::from_toml(item.get_ref(), &place, problems);
            if let (Some(name), Some(item)) = (name, item) {
                read.insert(name, place.with(item));
            }
        }
        Some(Self(read))
    }
}

impl<K: MapKey, T: JsonSchema> JsonSchema for Keyed<K, T> {
    fn schema_name() -> Cow<'static, str> {
        "Keyed".into()
    }

    fn inline_schema() -> bool {
        true
    }

    fn json_schema(generator: &mut SchemaGenerator) -> Schema {
        let value = generator.subschema_for::<T>();
        if K::KNOWN.is_empty() {
            return json_schema!({"type": "object", "additionalProperties": value});
        }
        let properties: BTreeMap<&str, &Schema> =
            K::KNOWN.iter().map(|key| (key.written(), &value)).collect();
        json_schema!({"type": "object", "properties": properties, "additionalProperties": false})
    }
}
