//! Detection conditions of the open water-quality standard, in its words.

use crate::site::Meaning;
use crate::terms::folded;

/// What a detection condition says.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Condition {
    /// A meaning that the result takes.
    Means(Meaning),
    /// There is no result: a gap, never a zero.
    Gap,
    /// Only a legend can say.
    NeedsLegend,
}

/// Conditions that say "not detected" (words of the WQX domain list, one spelled as the standard
/// spells it).
const NON_DETECT: [&str; 11] = [
    "Not Detected",
    "Not Detected at Detection Limit",
    "Not Detected at Reporting Limit",
    "Below Detection Limit",
    "Below Method Detection Limit",
    "Below Reporting Limit",
    "Below Sample-specific Detect Limit",
    "Below System Detection Limit",
    "Below Daily Detection Limit",
    "Below Long-term Blank-basd Dt Limit",
    "Present Below Quantification Limit",
];

const ABOVE: [&str; 2] = ["Present Above Quantification Limit", "Above Operating Range"];
const GAP: [&str; 2] = ["Not Reported", "Unable to Measure"];

/// Reads a detection condition; a site file's legend comes before this list.
#[must_use]
pub fn condition(text: &str) -> Condition {
    let written = folded(text);
    let says = |list: &[&str]| list.iter().any(|word| folded(word) == written);
    if says(&NON_DETECT) {
        Condition::Means(Meaning::NonDetect)
    } else if says(&ABOVE) {
        Condition::Means(Meaning::AboveRange)
    } else if says(&GAP) {
        Condition::Gap
    } else if written == "detected" {
        Condition::Means(Meaning::Detected)
    } else {
        Condition::NeedsLegend
    }
}
