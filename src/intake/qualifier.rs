//! Qualifier codes: split, looked up in the site file's legend, then in the usual meanings.

use crate::site::Meaning;

/// What one code means without a legend.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Code {
    /// A meaning.
    Means(Meaning),
    /// Not detected, and the limit itself estimated.
    NonDetectEstimated,
    /// Holding time exceeded: used, told.
    HoldingTime,
    /// Only the laboratory's legend can say.
    NeedsLegend,
}

/// The strictest meaning of several codes, in the order of the rules.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Strictest {
    /// Unusable.
    Rejected,
    /// A code that only the laboratory's legend explains.
    Unknown,
    /// Not detected.
    NonDetect,
    /// Over the range of the instrument.
    AboveRange,
    /// Also in a blank.
    Blank,
    /// Estimated.
    Estimated,
    /// Detected.
    Detected,
    /// Says nothing about the value.
    Informational,
}

/// Splits a qualifier cell at `;`, comma, slash and blank.
pub fn codes(text: &str) -> impl Iterator<Item = &str> {
    text.split(|c: char| matches!(c, ';' | ',' | '/') || c.is_whitespace())
        .filter(|code| !code.is_empty())
}

/// The usual meaning of a code (common practice, no source; the federal validation codes mean the
/// same). Codes that laboratories use with different meanings need their legend.
#[must_use]
pub fn usual(code: &str) -> Code {
    match code.to_ascii_uppercase().as_str() {
        "U" | "ND" | "<" => Code::Means(Meaning::NonDetect),
        "UJ" => Code::NonDetectEstimated,
        ">" => Code::Means(Meaning::AboveRange),
        "J" | "J+" | "J-" | "J\u{2212}" => Code::Means(Meaning::Estimated),
        "R" => Code::Means(Meaning::Rejected),
        "H" => Code::HoldingTime,
        "D" => Code::Means(Meaning::Informational),
        _ => Code::NeedsLegend,
    }
}

impl Strictest {
    /// Where a meaning stands.
    #[must_use]
    pub fn of(meaning: Meaning) -> Self {
        match meaning {
            Meaning::Rejected => Self::Rejected,
            Meaning::NonDetect => Self::NonDetect,
            Meaning::AboveRange => Self::AboveRange,
            Meaning::Blank => Self::Blank,
            Meaning::Estimated => Self::Estimated,
            Meaning::Detected => Self::Detected,
            Meaning::Informational => Self::Informational,
        }
    }
}
