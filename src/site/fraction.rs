//! Dissolved or total, as laboratories write it.

use serde::{Deserialize, Serialize};

use crate::terms::verdict::coded;

use super::choices::choice;
use super::written::{At, FromToml, Problems, word};

choice! {
    /// Which part of a sample was analysed.
    Fraction {
        /// What passes a filter.
        Dissolved = "dissolved",
        /// All of it.
        Total = "total",
    }
}

impl Fraction {
    /// Reads the usual words: dissolved, filtered, diss, D, F, wf; total, unfiltered,
    /// recoverable, T, wu; and the open water-quality standard's words for where a sample was
    /// filtered. Case and blanks around them do not matter.
    #[must_use]
    pub fn read(text: &str) -> Option<Self> {
        match text.trim().to_lowercase().as_str() {
            "dissolved"
            | "filtered"
            | "diss"
            | "d"
            | "f"
            | "wf"
            | "filtered, field"
            | "filtered, lab"
            | "filtered field and/or lab"
            | "filterable" => Some(Self::Dissolved),
            "total" | "unfiltered" | "recoverable" | "total recoverable" | "t" | "wu"
            | "unfiltered, field" => Some(Self::Total),
            _ => None,
        }
    }
}
