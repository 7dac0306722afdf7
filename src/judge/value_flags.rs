//! Flags about single values: slips of a unit, copies, duplicates, estimates.

use super::facts::Facts;
use crate::numerics::median;
use crate::series::pairs::Agreement;
use crate::terms::{Flag, FlagCode, Reading};

/// Raises what holds.
#[must_use]
pub fn flags(facts: &Facts<'_>) -> Vec<Flag> {
    let measured: Vec<f64> = facts
        .values()
        .iter()
        .filter(|value| value.is_measured())
        .map(|value| value.reading.number())
        .collect();
    let mut flags: Vec<Flag> =
        [estimated(facts), unit_slip(&measured), duplicates(facts)].into_iter().flatten().collect();
    flags.extend(copied(facts));
    flags
}

/// The share of detects that are estimated.
fn estimated(facts: &Facts<'_>) -> Option<Flag> {
    let most = facts.rules.flags.estimated_results;
    let detects: Vec<_> = facts.values().into_iter().filter(|value| value.is_detect()).collect();
    let estimated = detects.iter().filter(|value| value.estimated).count();
    #[allow(clippy::cast_precision_loss)] // counts of dates
    let share = estimated as f64 / detects.len() as f64;
    (!detects.is_empty() && share > most)
        .then(|| Flag::raised(FlagCode::EstimatedResults, share, most))
}

/// A value 500 to 2,000 times the median of its four neighbours, or as small; figure: the ratio.
fn unit_slip(measured: &[f64]) -> Option<Flag> {
    const NEIGHBOURS: usize = 4;
    const LEAST: f64 = 500.0;
    const MOST: f64 = 2_000.0;
    if measured.len() <= NEIGHBOURS {
        return None;
    }
    measured.iter().enumerate().find_map(|(at, value)| {
        // Two before and two after; at an end the four nearest.
        let from = at.saturating_sub(2).min(measured.len() - NEIGHBOURS - 1);
        let near: Vec<f64> =
            (from..=from + NEIGHBOURS).filter(|&i| i != at).map(|i| measured[i]).collect();
        let ratio = value / median(&near)?;
        let size = if ratio >= 1.0 { ratio } else { 1.0 / ratio };
        (LEAST..=MOST).contains(&size).then(|| Flag::raised(FlagCode::UnitSlip, ratio, LEAST))
    })
}

/// Four equal consecutive detects of three or more significant digits, or six of any; figure: how
/// many.
fn copied(facts: &Facts<'_>) -> Option<Flag> {
    const OF_THREE_DIGITS: usize = 4;
    const OF_ANY: usize = 6;
    let values = facts.values();
    values
        .chunk_by(|a, b| match (a.reading, b.reading) {
            (Reading::Measured(x), Reading::Measured(y)) => x.total_cmp(&y).is_eq(),
            _ => false,
        })
        .filter(|run| run[0].is_measured())
        .map(|run| {
            let long = significant_digits(run[0].reading.number()) >= 3;
            (run.len(), if long { OF_THREE_DIGITS } else { OF_ANY })
        })
        .filter(|(equal, needed)| equal >= needed)
        .max()
        .map(|(equal, needed)| {
            #[allow(clippy::cast_precision_loss)] // counts of dates
            let (equal, needed) = (equal as f64, needed as f64);
            Flag::raised(FlagCode::CopiedValues, equal, needed)
        })
}

/// Digits of the shortest decimal that is this value, without leading and trailing zeros.
fn significant_digits(value: f64) -> usize {
    let text = format!("{value:e}");
    let mantissa = text.split('e').next().unwrap_or_default();
    mantissa.bytes().filter(u8::is_ascii_digit).count()
}

/// The duplicate that differs most from its parent.
fn duplicates(facts: &Facts<'_>) -> Option<Flag> {
    let allowed = facts.rules.flags.duplicates_rpd;
    let differing = facts
        .series
        .duplicates
        .iter()
        .filter(|pair| pair.date <= facts.rules.as_of && pair.differs(allowed));
    let (mut rpd, mut near) = (None::<f64>, None::<f64>);
    let most = |known: Option<f64>, new: f64| Some(known.map_or(new, |known| known.max(new)));
    for pair in differing {
        match pair.agreement() {
            Agreement::Rpd(figure) => rpd = most(rpd, figure),
            Agreement::NearLimit(figure) => near = most(near, figure),
            Agreement::Neither => {}
        }
    }
    match (rpd, near) {
        (Some(rpd), _) => Some(Flag::raised(FlagCode::DuplicatesDiffer, rpd, allowed)),
        // Near the reporting limit the difference is told in units of that limit.
        (None, Some(near)) => Some(Flag::raised(FlagCode::DuplicatesDiffer, near, 1.0)),
        (None, None) => None,
    }
}

#[cfg(test)]
mod tests {
    use super::{significant_digits, unit_slip};

    #[test]
    fn digits_are_those_of_the_shortest_decimal() {
        assert_eq!(significant_digits(12.3), 3);
        assert_eq!(significant_digits(1200.0), 2);
        assert_eq!(significant_digits(0.005), 1);
    }

    #[test]
    fn a_value_a_thousand_times_its_neighbours_is_a_slip_at_either_end_too() {
        assert!(unit_slip(&[5.0, 4.8, 4600.0, 4.5, 4.4]).is_some());
        assert!(unit_slip(&[5000.0, 4.8, 4.6, 4.5, 4.4]).is_some());
        assert!(unit_slip(&[5.0, 4.8, 4.6, 4.5, 0.0044]).is_some());
        assert_eq!(unit_slip(&[5.0, 4.8, 46.0, 4.5, 4.4]), None);
        assert_eq!(unit_slip(&[5.0, 4.8, 4600.0, 4.5]), None);
    }
}
