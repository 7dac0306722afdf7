//! What one series says, how its date stands against the goal, and how the answer was computed.

use serde::{Deserialize, Serialize};

/// Declares an enum whose variants carry the code that every file writes.
macro_rules! coded {
    ($(#[$meta:meta])* $name:ident { $($(#[$vmeta:meta])* $variant:ident = $code:literal,)+ }) => {
        $(#[$meta])*
        #[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
        #[serde(rename_all = "kebab-case")]
        pub enum $name { $($(#[$vmeta])* #[serde(rename = $code)] $variant,)+ }

        impl $name {
            /// Every case, in the order in which outputs list them.
            pub const ALL: &'static [Self] = &[$(Self::$variant,)+];

            /// The code that files write.
            #[must_use]
            pub fn code(self) -> &'static str {
                match self { $(Self::$variant => $code,)+ }
            }

            /// The case with this code.
            #[must_use]
            pub fn from_code(code: &str) -> Option<Self> {
                Self::ALL.iter().copied().find(|case| case.code() == code)
            }
        }
    };
}
pub(crate) use coded;

coded! {
    /// What one series says: the first rule that holds, in the order in which the rules are asked.
    Verdict {
        /// One date or more, and no detect.
        Undetected = "undetected",
        /// No rate can be fitted or allowed.
        TooFew = "too-few",
        /// The rate's interval lies below zero.
        Rising = "rising",
        /// The level's interval and the last dates lie at or under the limit.
        Below = "below",
        /// The rate's interval lies above zero.
        Attenuating = "attenuating",
        /// The whole rate interval lies within the flat margin.
        Flat = "flat",
        /// None of the others is shown.
        Undecided = "undecided",
    }
}

coded! {
    /// The reach date held against the goal date.
    Pace {
        /// The latest reach date is on or before the goal date, or the series is below its limit.
        Ahead = "ahead",
        /// The earliest reach date is after the goal date, or the series rises over its limit.
        Behind = "behind",
        /// The interval holds the goal date, or an end is missing.
        Unclear = "unclear",
    }
}

coded! {
    /// How the rate, or the verdict, was computed.
    Method {
        /// Least squares on ln C, all detects.
        LeastSquares = "least-squares",
        /// Maximum likelihood with non-detects as what they are.
        CensoredLikelihood = "censored-likelihood",
        /// Least squares with non-detects replaced, because the site file asks for it.
        LeastSquaresSubstituted = "least-squares-substituted",
        /// The last dates counted against the limit, without a fit.
        Count = "count",
    }
}

coded! {
    /// How much is computed.
    Effort {
        /// No refits.
        Quick = "quick",
        /// Everything.
        Full = "full",
    }
}
