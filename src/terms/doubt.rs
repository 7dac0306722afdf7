//! What refitting says of an answer: other models, other choices, how much more data it wants.

use chrono::NaiveDate;
use serde::{Deserialize, Serialize};

use super::verdict::coded;
use super::{Verdict, WhyNoRate};

coded! {
    /// The models that stand beside the first-order line.
    Model {
        /// No change with time.
        Constant = "constant",
        /// One rate.
        FirstOrder = "first-order",
        /// Decay to a plateau.
        Plateau = "plateau",
        /// One rate, then another.
        TwoRates = "two-rates",
    }
}

coded! {
    /// Why a model is not offered.
    WhyNoModel {
        /// Too few dates for its parameters.
        TooFewDates = "too-few-dates",
        /// Measured values on too few dates.
        TooFewDetects = "too-few-detects",
        /// The record does not fall.
        NotFalling = "not-falling",
        /// The record bends the other way.
        OtherBend = "other-bend",
        /// Its plateau cannot be told from zero.
        NoPlateau = "no-plateau",
        /// No break leaves enough dates and time on both sides.
        NoRoom = "no-room",
        /// The search did not arrive.
        NotConverged = "not-converged",
    }
}

/// One model on the same data.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ModelFit {
    /// Which.
    pub model: Model,
    /// Akaike's criterion with its correction for few data; lower is better.
    pub aicc: Option<f64>,
    /// When its median meets the limit; none where it never does, or without a limit.
    pub meets_limit: Option<NaiveDate>,
    /// The level it tends to, for the plateau.
    pub plateau: Option<f64>,
    /// When the rate changes, for two rates.
    pub break_date: Option<NaiveDate>,
    /// Why it is not offered.
    pub why_not: Option<WhyNoModel>,
}

/// The better model, where one is.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Alternative {
    /// Which.
    pub model: Model,
    /// When it meets the limit; none where it never does.
    pub date: Option<NaiveDate>,
    /// Whether it denies the straight line's date: it never meets the limit, or after the goal.
    pub denies: bool,
}

/// The rate's interval with the resemblance of neighbouring residuals allowed for.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Adjusted {
    /// Correlation of residuals one year apart.
    pub phi: f64,
    /// Lower end of the rate.
    pub rate_lower: f64,
    /// Upper end of the rate.
    pub rate_upper: f64,
    /// Whether the verdict would be another.
    pub changes_verdict: bool,
}

coded! {
    /// A choice behind an answer that could have been made otherwise.
    ChoiceKind {
        /// The fit begins later.
        WindowStart = "window-start",
        /// One date is left out.
        DateLeftOut = "date-left-out",
        /// The highest value is left out.
        HighestLeftOut = "highest-left-out",
        /// Non-detects count as their limit.
        NonDetectsAtLimit = "non-detects-at-limit",
        /// Non-detects count as half their limit.
        NonDetectsAtHalf = "non-detects-at-half",
        /// Estimated results are left out.
        EstimatedOut = "estimated-out",
        /// Duplicates are averaged in.
        DuplicatesAveraged = "duplicates-averaged",
        /// The fit begins at an event.
        SinceEvent = "since-event",
    }
}

/// The answer under one choice.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Answer {
    /// The rate.
    pub rate: Option<f64>,
    /// Why there is none.
    pub why_no_rate: Option<WhyNoRate>,
    /// The verdict.
    pub verdict: Verdict,
    /// The reach date as it would be shown.
    pub reach: Option<NaiveDate>,
}

/// One rerun.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Choice {
    /// What was chosen otherwise.
    pub kind: ChoiceKind,
    /// The date concerned, where it is one.
    pub date: Option<NaiveDate>,
    /// What the data say then.
    pub answer: Answer,
}

/// All reruns of one kind: the span of what they say.
#[derive(Clone, Debug, PartialEq)]
pub struct ChoiceSpan {
    /// The kind.
    pub kind: ChoiceKind,
    /// How many reruns.
    pub reruns: usize,
    /// Lowest and highest rate.
    pub rates: Option<(f64, f64)>,
    /// Earliest and latest reach date among those that have one.
    pub dates: Option<(NaiveDate, NaiveDate)>,
    /// Reruns without a reach date.
    pub without_date: usize,
    /// The verdicts, in their order.
    pub verdicts: Vec<Verdict>,
}

/// How much more sampling would settle it.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct MoreRounds {
    /// Rounds at the present spacing until the rate's interval excludes zero.
    pub decisive: Option<usize>,
    /// The same with two rounds a year.
    pub decisive_half_yearly: Option<usize>,
    /// Rounds until the level is told from the limit.
    pub level: Option<usize>,
    /// Rounds that a fall at the required rate would need.
    pub at_required_rate: Option<usize>,
    /// The smallest rate that the present record could have shown.
    pub smallest_rate_shown: Option<f64>,
}
