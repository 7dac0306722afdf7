//! A measure that may be known only as a range: `0.3` or `{ low = 0.2, high = 0.4 }`.

use std::borrow::Cow;

use schemars::{JsonSchema, Schema, SchemaGenerator, json_schema};
use toml::de::DeValue;

use super::super::written::table::{Entry, Open, table, table_schema};
use super::super::written::{At, FromToml, Header, Need, Problems};

/// One number, or the two ends of a range.
#[derive(Clone, Debug)]
pub enum Measure {
    /// A number.
    Value(f64),
    /// A range.
    Range(RangeTable),
}

table! {
    /// The two ends of a range.
    RangeTable {
        /// The lower end.
        low = "low": f64, needed as "low = 0.2";
        /// The upper end.
        high = "high": f64, needed as "high = 0.4";
    }
}

impl FromToml for Measure {
    const WANTS: &'static str = "a number, or a range such as { low = 0.2, high = 0.4 }";

    fn from_toml(value: &DeValue<'_>, at: &At<()>, problems: &mut Problems<'_>) -> Option<Self> {
        match value {
            DeValue::Integer(_) | DeValue::Float(_) => {
                f64::from_toml(value, at, problems).map(Self::Value)
            }
            DeValue::Table(_) => RangeTable::from_toml(value, at, problems).map(Self::Range),
            _ => {
                problems.wrong_type(at, Self::WANTS, value);
                None
            }
        }
    }
}

impl JsonSchema for Measure {
    fn schema_name() -> Cow<'static, str> {
        "Measure".into()
    }

    fn inline_schema() -> bool {
        true
    }

    fn json_schema(generator: &mut SchemaGenerator) -> Schema {
        let (number, range) =
            (generator.subschema_for::<f64>(), generator.subschema_for::<RangeTable>());
        json_schema!({"anyOf": [number, range]})
    }
}
