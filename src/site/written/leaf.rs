//! Values without keys of their own: texts, numbers, dates, units, concentrations.

use std::borrow::Cow;

use chrono::{Datelike, NaiveDate};
use schemars::{JsonSchema, Schema, SchemaGenerator, json_schema};
use toml::de::{DeFloat, DeInteger, DeValue};

use crate::terms::{Concentration, Unit, UnitText};

use super::super::problem::ProblemKind;
use super::{At, FromToml, Problems};

/// The years a date may have: results and goals of a monitored site lie well within.
const YEARS: std::ops::RangeInclusive<i32> = 1900..=2999;

/// A calendar date, written without quotes.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Day(pub NaiveDate);

/// A concentration with its basis: `10 mg/L as N`.
#[derive(Clone, Debug, PartialEq)]
pub struct Amount {
    /// The number and its unit.
    pub value: Concentration,
    /// What the number counts, if the text says so.
    pub basis: Option<String>,
}

/// A unit of the closed list, with the basis it may add.
#[derive(Clone, Debug, PartialEq)]
pub struct UnitWritten(pub UnitText);

/// A single character.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct OneChar(pub char);

/// Declares how a type stands in the JSON schema.
macro_rules! schema_of {
    ($ty:ty, $name:literal, $($schema:tt)+) => {
        impl JsonSchema for $ty {
            fn schema_name() -> Cow<'static, str> {
                $name.into()
            }

            fn inline_schema() -> bool {
                true
            }

            fn json_schema(_: &mut SchemaGenerator) -> Schema {
                json_schema!($($schema)+)
            }
        }
    };
}

schema_of!(Day, "Day", {"type": "string", "format": "date"});
schema_of!(Amount, "Amount", {"type": "string", "pattern": "^\\s*[0-9.eE+-]+\\s+\\S.*$"});
schema_of!(UnitWritten, "Unit", {"type": "string", "minLength": 1});
schema_of!(OneChar, "Character", {"type": "string", "minLength": 1, "maxLength": 1});

impl FromToml for String {
    const WANTS: &'static str = "text in quotes";

    /// Trims the text and turns line breaks into blanks; other control characters are refused.
    fn from_toml(value: &DeValue<'_>, at: &At<()>, problems: &mut Problems<'_>) -> Option<Self> {
        let Some(text) = value.as_str() else {
            problems.wrong_type(at, Self::WANTS, value);
            return None;
        };
        let text = text.trim();
        if text.is_empty() {
            problems.tell(at, ProblemKind::Empty { wants: "write a text" });
            return None;
        }
        let breaks = ['\n', '\r', '\t'];
        if text.chars().any(|c| c.is_control() && !breaks.contains(&c)) {
            let found = text.escape_debug().to_string();
            problems
                .tell(at, ProblemKind::WrongText { found, wants: "without control characters" });
            return None;
        }
        let parts: Vec<&str> = text.split(breaks).filter(|part| !part.trim().is_empty()).collect();
        Some(parts.join(" "))
    }
}

impl FromToml for bool {
    const WANTS: &'static str = "true or false, without quotes";

    fn from_toml(value: &DeValue<'_>, at: &At<()>, problems: &mut Problems<'_>) -> Option<Self> {
        let found = value.as_bool();
        if found.is_none() {
            problems.wrong_type(at, Self::WANTS, value);
        }
        found
    }
}

impl FromToml for f64 {
    const WANTS: &'static str = "a number";

    fn from_toml(value: &DeValue<'_>, at: &At<()>, problems: &mut Problems<'_>) -> Option<Self> {
        let written = match value {
            DeValue::Float(float) => DeFloat::as_str(float).to_owned(),
            // Through i64, which holds every whole number that a key of ours can mean.
            DeValue::Integer(whole) => integer(whole)
                .map_or_else(|| DeInteger::as_str(whole).to_owned(), |whole| whole.to_string()),
            _ => {
                problems.wrong_type(at, Self::WANTS, value);
                return None;
            }
        };
        let number = written.parse::<Self>().ok().filter(|number| number.is_finite());
        if number.is_none() {
            problems.tell(at, ProblemKind::NotFinite { found: written });
        }
        number
    }
}

fn integer(whole: &DeInteger<'_>) -> Option<i64> {
    i64::from_str_radix(whole.as_str(), whole.radix()).ok()
}

impl FromToml for u64 {
    const WANTS: &'static str = "a whole number";

    fn from_toml(value: &DeValue<'_>, at: &At<()>, problems: &mut Problems<'_>) -> Option<Self> {
        let Some(whole) = value.as_integer() else {
            problems.wrong_type(at, Self::WANTS, value);
            return None;
        };
        let number = integer(whole).and_then(|whole| Self::try_from(whole).ok());
        if number.is_none() {
            let negative = whole.as_str().starts_with('-');
            let wants = if negative { "a whole number that is not negative" } else { "smaller" };
            let wants = wants.to_owned();
            problems.tell(at, ProblemKind::OutOfRange { found: whole.to_string(), wants });
        }
        number
    }
}

impl FromToml for Day {
    const WANTS: &'static str = "a date without quotes and without a time, such as 2030-12-31";

    fn from_toml(value: &DeValue<'_>, at: &At<()>, problems: &mut Problems<'_>) -> Option<Self> {
        let whole = value.as_datetime().filter(|d| d.time.is_none() && d.offset.is_none());
        let Some(found) = whole else {
            problems.wrong_type(at, Self::WANTS, value);
            return None;
        };
        // Without a date the parser has told of a date that does not exist.
        let date = found.date?;
        let day = NaiveDate::from_ymd_opt(date.year.into(), date.month.into(), date.day.into())?;
        if !YEARS.contains(&day.year()) {
            let wants = format!("a date of the years {} to {}", YEARS.start(), YEARS.end());
            problems.tell(at, ProblemKind::OutOfRange { found: day.to_string(), wants });
            return None;
        }
        Some(Self(day))
    }
}

impl FromToml for Amount {
    const WANTS: &'static str = "a concentration in quotes, such as \"5 ug/L\"";

    fn from_toml(value: &DeValue<'_>, at: &At<()>, problems: &mut Problems<'_>) -> Option<Self> {
        let Some(text) = value.as_str() else {
            problems.wrong_type(at, Self::WANTS, value);
            return None;
        };
        let amount = amount(text);
        if amount.is_none() {
            let found = text.escape_debug().to_string();
            problems.tell(
                at,
                ProblemKind::WrongText {
                    found,
                    wants: "a positive number, a blank and a unit, such as \"5 ug/L\" or \"10 mg/L as N\"",
                },
            );
        }
        amount
    }
}

fn amount(text: &str) -> Option<Amount> {
    let (number, unit) = text.trim().split_once(char::is_whitespace)?;
    let plain = |c: char| c.is_ascii_digit() || matches!(c, '.' | 'e' | 'E' | '+' | '-');
    let number = number.chars().all(plain).then(|| number.parse::<f64>().ok())??;
    let UnitText { unit, basis } = Unit::read(unit)?;
    (number.is_finite() && number > 0.0)
        .then_some(Amount { value: Concentration { value: number, unit }, basis })
}

impl FromToml for UnitWritten {
    const WANTS: &'static str = "a unit in quotes, such as \"ug/L\"";

    fn from_toml(value: &DeValue<'_>, at: &At<()>, problems: &mut Problems<'_>) -> Option<Self> {
        let Some(text) = value.as_str() else {
            problems.wrong_type(at, Self::WANTS, value);
            return None;
        };
        let unit = Unit::read(text);
        if unit.is_none() {
            let allowed = Unit::all().map(Unit::label).collect();
            let found = text.escape_debug().to_string();
            problems.tell(at, ProblemKind::UnknownWord { found, allowed });
        }
        unit.map(Self)
    }
}

impl FromToml for OneChar {
    const WANTS: &'static str = "one character in quotes";

    fn from_toml(value: &DeValue<'_>, at: &At<()>, problems: &mut Problems<'_>) -> Option<Self> {
        let mut chars = value.as_str().unwrap_or_default().chars();
        match (chars.next(), chars.next()) {
            (Some(only), None) => Some(Self(only)),
            _ if value.is_str() => {
                let found = value.as_str().unwrap_or_default().escape_debug().to_string();
                problems.tell(at, ProblemKind::WrongText { found, wants: Self::WANTS });
                None
            }
            _ => {
                problems.wrong_type(at, Self::WANTS, value);
                None
            }
        }
    }
}
