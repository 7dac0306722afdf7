//! The result cell, the qualifiers, the limits: what one record says.

use super::cell::ResultCell;
use super::qualifier::Strictest;
use crate::ledger::{Fate, SetAside, Told};
use crate::site::Sigma;
use crate::terms::{Dimension, Reading, Unit};

/// Everything a record says about its value; limits already in the result's unit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Said {
    /// The result cell.
    pub cell: ResultCell,
    /// The result's unit.
    pub unit: Unit,
    /// The strictest qualifier or condition; `None` without any.
    pub strictest: Option<Strictest>,
    /// The reporting limit.
    pub reporting_limit: Option<f64>,
    /// The detection limit.
    pub detection_limit: Option<f64>,
    /// The uncertainty, and what it means if that is declared.
    pub uncertainty: Option<(f64, Sigma)>,
}

/// The reading, or why there is none, and what is told.
pub type Judged = (Result<Reading, Fate>, Option<Told>);

/// What the record says as a reading.
///
/// A non-detect's limit is its own `<v`, else the larger of the result (if positive) and the
/// reporting limit, with the detection limit where there is none. In activity units a result under
/// its own detectable level is a non-detect at that level, whatever its sign.
pub fn reading(said: &Said) -> Judged {
    let aside = |why: SetAside| (Err(Fate::SetAside(why)), None);
    let positive = |v: f64| v > 0.0;
    let marked_below = said.strictest == Some(Strictest::NonDetect);
    match said.cell {
        ResultCell::Unreadable => aside(SetAside::UnreadableNumber),
        ResultCell::Below(v) if positive(v) => (Ok(Reading::Below(v)), None),
        ResultCell::Below(_) | ResultCell::NotDetected => non_detect(None, said),
        ResultCell::Empty if marked_below => non_detect(None, said),
        ResultCell::Number(v) if marked_below => non_detect(Some(v), said),
        ResultCell::Above(v) if positive(v) => (Ok(Reading::Above(v)), None),
        ResultCell::Above(_) => aside(SetAside::AboveRange),
        ResultCell::Empty if said.strictest == Some(Strictest::AboveRange) => {
            aside(SetAside::AboveRange)
        }
        ResultCell::Empty => aside(SetAside::NoResult),
        ResultCell::Number(v) if said.strictest == Some(Strictest::AboveRange) => {
            if positive(v) {
                (Ok(Reading::Above(v)), None)
            } else {
                aside(SetAside::AboveRange)
            }
        }
        ResultCell::Number(v) => measured(v, said),
    }
}

/// A marked non-detect: its limit is the larger of the result and the reporting limit.
fn non_detect(result: Option<f64>, said: &Said) -> Judged {
    let result = result.filter(|v| *v > 0.0);
    let limit = said.reporting_limit.or(said.detection_limit).filter(|v| *v > 0.0);
    match (result, limit) {
        (Some(v), Some(limit)) => {
            let told = v.total_cmp(&limit).is_ne().then_some(Told::LimitsDiffer);
            (Ok(Reading::Below(v.max(limit))), told)
        }
        (Some(v), None) | (None, Some(v)) => (Ok(Reading::Below(v)), None),
        (None, None) => (Err(Fate::SetAside(SetAside::NoReportingLimit)), None),
    }
}

/// A number without a mark.
fn measured(v: f64, said: &Said) -> Judged {
    if said.unit.dimension() == Dimension::Activity
        && let Some(level) = detectable_level(said)
        && v < level
    {
        return (Ok(Reading::Below(level)), Some(Told::UnderDetectableActivity));
    }
    if v > 0.0 {
        (Ok(Reading::Measured(v)), None)
    } else {
        (Err(Fate::SetAside(SetAside::LowResult)), None)
    }
}

/// The record's own minimum detectable level: its detection limit, else the critical level from
/// the declared uncertainty, else its reporting level.
fn detectable_level(said: &Said) -> Option<f64> {
    /// The critical level is 1.645 standard deviations of the net count: 5 % of blanks exceed it
    /// (Currie 1968, from memory).
    const CRITICAL: f64 = 1.645;
    let critical = said.uncertainty.map(|(uncertainty, sigma)| match sigma {
        Sigma::One => CRITICAL * uncertainty,
        Sigma::Two => CRITICAL * uncertainty / 2.0,
    });
    said.detection_limit.or(critical).or(said.reporting_limit).filter(|level| *level > 0.0)
}

#[cfg(test)]
mod tests {
    use super::super::cell::cell;
    use super::super::number::NumberForm;
    use super::{Reading, ResultCell, Said, Strictest, Told, Unit, reading};
    use crate::ledger::{Fate, SetAside};
    use crate::site::{Decimal, Sigma};

    const FORM: NumberForm = NumberForm { decimal: Decimal::Point, thousands: None };

    fn said(text: &str) -> Said {
        Said {
            cell: cell(text, FORM).result,
            unit: Unit::UG_PER_L,
            strictest: None,
            reporting_limit: None,
            detection_limit: None,
            uncertainty: None,
        }
    }

    #[test]
    fn a_marked_non_detect_takes_the_larger_limit_and_tells() {
        let mut said = said("0.2");
        said.strictest = Some(Strictest::NonDetect);
        said.reporting_limit = Some(0.1);
        assert_eq!(reading(&said), (Ok(Reading::Below(0.2)), Some(Told::LimitsDiffer)));
        said.cell = ResultCell::Empty;
        said.reporting_limit = None;
        assert_eq!(reading(&said).0, Err(Fate::SetAside(SetAside::NoReportingLimit)));
        said.detection_limit = Some(0.05);
        assert_eq!(reading(&said).0, Ok(Reading::Below(0.05)));
    }

    #[test]
    fn an_activity_under_its_critical_level_is_a_non_detect_whatever_its_sign() {
        let mut said = said("-10.7");
        said.unit = Unit::PCI_PER_L;
        assert_eq!(reading(&said).0, Err(Fate::SetAside(SetAside::LowResult)));
        said.uncertainty = Some((57.6, Sigma::One));
        said.reporting_limit = Some(500.0);
        assert_eq!(reading(&said).0, Ok(Reading::Below(1.645 * 57.6)));
        said.detection_limit = Some(90.0);
        assert_eq!(reading(&said).0, Ok(Reading::Below(90.0)));
    }

    #[test]
    fn zero_without_a_mark_is_a_low_result() {
        assert_eq!(reading(&said("0")).0, Err(Fate::SetAside(SetAside::LowResult)));
        assert_eq!(reading(&said("-1")).0, Err(Fate::SetAside(SetAside::LowResult)));
    }
}
