//! Types of limits of the open water-quality standard, and which of them count.

use crate::terms::folded;

/// What a type of limit is, with its place in the default order of its class.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum LimitType {
    /// What the laboratory reports down to.
    Reporting(usize),
    /// What the method can detect.
    Detection(usize),
    /// A limit of something else: a standard, an upper end, a holding time.
    NoDetectionLimit,
    /// Not known.
    Unknown,
}

/// Reporting limits, the preferred first. The order is practice and no standard's; the names are
/// of the WQX domain list, and one that older records carry ("Historical …").
const REPORTING: [&str; 13] = [
    "Reporting limit",
    "Laboratory Reporting Level",
    "Lower Reporting Limit",
    "Minimum Reporting Level",
    "Practical Quantitation Limit",
    "Lower Quantitation Limit",
    "Sample-Specific Quantitation Limit",
    "Estimated Quantitation Limit",
    "Contract Quantitation Limit",
    "Interim Reporting Level",
    "Blank-adjusted reporting limit",
    "Reporting limit by DQCALC",
    "Historical Lower Reporting Limit",
];

/// Detection limits, the preferred first; sources as above. A limit without a type stands last.
const DETECTION: [&str; 18] = [
    "Method Detection Level",
    "Sample Detection Limit",
    "Long Term Method Detection Level",
    "Instrument Detection Level",
    "Lower limit of detection",
    "Detection Limit",
    "Censoring level",
    "Estimated Detection Level",
    "Contract Detection Limit",
    "Sample-specific min detect conc",
    "Sample-specific critical level",
    "Blank-adjusted method detect limit",
    "Detection limit by DQCALC",
    "Daily detection limit",
    "Required detection limit",
    "Method Detection Limit (MDL)",
    "Elevated Detection Limit",
    "",
];

/// Words of types that stand in the same column and are no detection limits (WQX domain list).
const OTHER: [&str; 9] = [
    "drinkingwatermaximum",
    "waterqualitystandard",
    "upper",
    "uncertainty",
    "holdingtime",
    "taxonomicloss",
    "specifiedinworkplan",
    "calibration",
    "maximum",
];

/// What a type of limit is, by its name.
#[must_use]
pub fn limit_type(name: &str) -> LimitType {
    let written = folded(name);
    let place = |list: &[&str]| list.iter().position(|known| folded(known) == written);
    if let Some(at) = place(&REPORTING) {
        LimitType::Reporting(at)
    } else if let Some(at) = place(&DETECTION) {
        LimitType::Detection(at)
    } else if OTHER.iter().any(|word| written.contains(word)) {
        LimitType::NoDetectionLimit
    } else {
        LimitType::Unknown
    }
}

#[cfg(test)]
mod tests {
    use super::{LimitType, limit_type};

    #[test]
    fn types_are_told_apart_and_standards_are_no_detection_limits() {
        assert_eq!(limit_type("Reporting Limit"), LimitType::Reporting(0));
        assert_eq!(limit_type("Censoring Level"), LimitType::Detection(6));
        assert_eq!(limit_type(""), LimitType::Detection(17));
        for other in [
            "Drinking Water Maximum",
            "Water Quality Standard or Criteria",
            "Upper Quantitation Limit",
            "Upper Reporting Limit",
            "Holding Time Limit",
            "Statistical Uncertainty",
        ] {
            assert_eq!(limit_type(other), LimitType::NoDetectionLimit, "{other}");
        }
        assert_eq!(limit_type("Guess"), LimitType::Unknown);
    }
}
