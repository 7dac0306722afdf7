//! Why a rate or a date is absent: a result, not an error.

use serde::{Deserialize, Serialize};

use super::verdict::coded;

coded! {
    /// Why a series has no rate.
    WhyNoRate {
        /// Every date lies outside the window.
        NoDatesInWindow = "no-dates-in-window",
        /// Fewer dates than `rate-needs` asks for.
        Dates = "dates",
        /// Fewer measured values on distinct dates than `rate-needs` asks for.
        Detects = "detects",
        /// The detects lie exactly on a line that no non-detect contradicts: no scatter to judge by.
        OnALine = "on-a-line",
        /// The search for the best fit did not arrive.
        NotConverged = "not-converged",
    }
}

coded! {
    /// Why a series has no reach date, the first that holds.
    WhyNoDate {
        /// No limit applies.
        NoLimit = "no-limit",
        /// The level is at or under the limit already.
        Below = "below",
        /// There is no rate.
        NoRate = "no-rate",
        /// Fewer dates than `date-needs` asks for.
        Dates = "dates",
        /// A shorter record than `date-needs` asks for.
        Years = "years",
        /// Fewer detects than `date-needs` asks for.
        Detects = "detects",
        /// Too many low results could not be used.
        LowResults = "low-results",
        /// Concentrations rise.
        Rising = "rising",
        /// The data do not locate the date at all.
        NotLocated = "not-located",
        /// The rate's interval holds zero.
        IntervalHoldsZero = "interval-holds-zero",
        /// The line is under the limit, the last results are not.
        ResultsDenyLine = "results-deny-line",
        /// The line met the limit before the first used date.
        BeforeRecord = "before-record",
        /// The date lies after 9999-12-31.
        BeyondCalendar = "beyond-calendar",
    }
}
