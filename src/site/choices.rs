//! The closed lists of words that the site file may use, each an enum that owns its codes.

use serde::{Deserialize, Serialize};

use crate::terms::verdict::coded;

use super::written::{At, FromToml, MapKey, Problems, unknown_key, word};

/// Declares an enum of words that the site file may write.
macro_rules! choice {
    ($(#[$meta:meta])* $name:ident { $($(#[$vmeta:meta])* $variant:ident = $code:literal,)+ }) => {
        coded! {
            $(#[$meta])*
            #[derive(schemars::JsonSchema)]
            $name { $($(#[$vmeta])* $variant = $code,)+ }
        }

        impl FromToml for $name {
            const WANTS: &'static str = "one of its words in quotes";

            fn from_toml(
                value: &toml::de::DeValue<'_>,
                at: &At<()>,
                problems: &mut Problems<'_>,
            ) -> Option<Self> {
                word(value, at, problems, Self::ALL, Self::code)
            }
        }
    };
}
pub(super) use choice;

/// Lets an enum's codes be the keys of a table.
macro_rules! keys {
    ($name:ident) => {
        impl MapKey for $name {
            const KNOWN: &'static [Self] = Self::ALL;

            fn from_key(key: &str, at: &At<()>, problems: &mut Problems<'_>) -> Option<Self> {
                let found = Self::from_code(key);
                if found.is_none() {
                    let known: Vec<_> = Self::ALL.iter().map(|case| case.code()).collect();
                    problems.tell(at, unknown_key(key, &known));
                }
                found
            }

            fn written(&self) -> &str {
                self.code()
            }
        }
    };
}
pub(super) use keys;

choice! {
    /// A setting or threshold that may carry a reason.
    Setting {
        /// The confidence of every interval.
        Confidence = "confidence",
        /// The date by which limits are to be met.
        GoalDate = "goal-date",
        /// Years past the last used date beyond which a date is not told.
        HorizonYears = "horizon-years",
        /// Years after which the newest result is stale.
        StaleAfterYears = "stale-after-years",
        /// The rate within which an interval shows a flat series.
        FlatMargin = "flat-margin",
        /// The length of a round.
        Round = "round",
        /// Days by which a sample may miss its round's edge.
        RoundGraceDays = "round-grace-days",
        /// What a rate needs.
        RateNeeds = "rate-needs",
        /// What a date needs.
        DateNeeds = "date-needs",
        /// What several detects of one date give.
        SameDay = "same-day",
        /// What field duplicates do.
        Duplicates = "duplicates",
        /// What non-detects contribute to a fit.
        NonDetects = "non-detects",
        /// A record shorter than this is short.
        ShortRecordYears = "short-record-years",
        /// The share over which a series is mostly non-detects.
        MostlyNonDetects = "mostly-non-detects",
        /// The share of estimated detects over which the flag is raised.
        EstimatedResults = "estimated-results",
        /// The difference over which duplicates differ.
        DuplicatesRpd = "duplicates-rpd",
    }
}
keys!(Setting);

choice! {
    /// How long a monitoring round is: a calendar period.
    RoundLength {
        /// A calendar month.
        Month = "month",
        /// A calendar quarter.
        Quarter = "quarter",
        /// Half a calendar year.
        HalfYear = "half-year",
        /// A calendar year.
        Year = "year",
    }
}

impl RoundLength {
    /// The round's length in months.
    #[must_use]
    pub fn months(self) -> u32 {
        match self {
            Self::Month => 1,
            Self::Quarter => 3,
            Self::HalfYear => 6,
            Self::Year => 12,
        }
    }

    /// The most days of grace: a sixth of a round (rules for rounds), in whole days of its
    /// nominal length of 30, 91, 182 or 365 days.
    #[must_use]
    pub fn most_grace_days(self) -> u32 {
        match self {
            Self::Month => 5,
            Self::Quarter => 15,
            Self::HalfYear => 30,
            Self::Year => 60,
        }
    }
}

choice! {
    /// What several detects of one date give.
    SameDay {
        /// Their arithmetic mean.
        Mean = "mean",
        /// The highest of them.
        Highest = "highest",
    }
}

choice! {
    /// What a field duplicate does to its parent's result.
    Duplicates {
        /// Nothing: the parent's result stands.
        Primary = "primary",
        /// It is averaged with the parent's result.
        Average = "average",
    }
}

choice! {
    /// What a non-detect contributes to a fit.
    NonDetects {
        /// That the concentration lies somewhere under its limit.
        Censored = "censored",
        /// The value of its limit, as if measured.
        AtLimit = "at-limit",
        /// Half of its limit, as if measured.
        AtHalf = "at-half",
    }
}

choice! {
    /// What a well is for.
    Role {
        /// A well in the plume.
        Plume = "plume",
        /// A well at the source.
        Source = "source",
        /// A well between the plume and what must stay clean.
        Sentinel = "sentinel",
        /// A well that shows what the water carries anyway; it never counts for the site's date.
        Background = "background",
    }
}

choice! {
    /// What results from several depths of one well are.
    Depths {
        /// A series for each depth.
        Separate = "separate",
        /// One series.
        Together = "together",
    }
}

choice! {
    /// What happened on an event's date.
    EventKind {
        /// Pumping began, stopped or changed.
        Pump = "pump",
        /// Something was injected.
        Dose = "dose",
        /// Soil was dug out.
        Dig = "dig",
        /// The laboratory or its method changed.
        Lab = "lab",
        /// Anything else.
        Other = "other",
    }
}

choice! {
    /// What a decision does to the records it names.
    DecisionKind {
        /// Sets them aside.
        Exclude = "exclude",
        /// Restricts the fit to the dates it names.
        Window = "window",
        /// Joins the records of several wells into one.
        Join = "join",
        /// Says what their qualifiers mean.
        UseQualifier = "use-qualifier",
    }
}

choice! {
    /// What a laboratory's qualifier or detection condition means.
    Meaning {
        /// Not detected at the limit.
        NonDetect = "non-detect",
        /// Detected, the value estimated.
        Estimated = "estimated",
        /// Unusable.
        Rejected = "rejected",
        /// Also found in a blank: used, estimated, told.
        Blank = "blank",
        /// Says nothing about the value.
        Informational = "informational",
        /// Over the range of the instrument.
        AboveRange = "above-range",
        /// Detected.
        Detected = "detected",
    }
}
