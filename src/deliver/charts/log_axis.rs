//! The concentration axis: logarithmic, with ticks of our own.
//!
//! The range is snapped outward to 1, 2 or 5 times a power of ten. Up to two and a half decades
//! every such value is labelled; beyond, decades are, thinned where there are many. So there are at least two
//! labels, whatever the range.

use crate::words::number::table;

/// Room kept beyond the outermost value on either side, as a decimal logarithm: a factor of 1.08.
const ROOM: f64 = 0.033_4;
/// Decades up to which 1, 2 and 5 are labelled.
const DECADES_LABELLED_FINELY: f64 = 2.501;
/// Decades up to which the values between are ticked.
const DECADES_TICKED_FINELY: f64 = 5.001;
/// Labels at most when only decades are labelled.
const MOST_LABELS: i32 = 8;

/// One tick.
#[derive(Clone, Debug, PartialEq)]
pub struct Tick {
    /// Decimal logarithm of its value.
    pub log: f64,
    /// Its label; none for a small tick.
    pub label: Option<String>,
}

/// The axis.
#[derive(Clone, Debug, PartialEq)]
pub struct LogAxis {
    /// Decimal logarithm of the lower end.
    pub low: f64,
    /// Decimal logarithm of the upper end.
    pub high: f64,
    /// Its ticks, upward.
    pub ticks: Vec<Tick>,
}

impl LogAxis {
    /// An axis that holds every positive finite value; one decade from 1 where there is none.
    #[must_use]
    pub fn holding(values: impl IntoIterator<Item = f64>) -> Self {
        let usable = values.into_iter().filter(|v| v.is_finite() && *v > 0.0).map(f64::log10);
        let (least, most) =
            usable.fold((f64::INFINITY, f64::NEG_INFINITY), |(a, b), v| (a.min(v), b.max(v)));
        if least > most {
            return Self::between((1, 0), (1, 1));
        }
        Self::between(below(least - ROOM), above(most + ROOM))
    }

    /// The axis between two values of the form 1, 2 or 5 times a power of ten.
    fn between(low: (i32, i32), high: (i32, i32)) -> Self {
        let (low_log, high_log) = (log(low), log(high));
        let decades = high_log - low_log;
        let step = ((high.1 - low.1) / MOST_LABELS + 1).max(1);
        let mut ticks = Vec::new();
        for exponent in low.1..=high.1 {
            for digit in 1..=9 {
                let at = log((digit, exponent));
                if at < low_log - 1e-9 || at > high_log + 1e-9 {
                    continue;
                }
                let fine = decades <= DECADES_LABELLED_FINELY && matches!(digit, 1 | 2 | 5);
                let labelled = fine || (digit == 1 && exponent.rem_euclid(step) == 0);
                if labelled || digit == 1 || decades <= DECADES_TICKED_FINELY {
                    let label = labelled.then(|| table(f64::from(digit) * 10_f64.powi(exponent)));
                    ticks.push(Tick { log: at, label });
                }
            }
        }
        Self { low: low_log, high: high_log, ticks }
    }
}

fn log((digit, exponent): (i32, i32)) -> f64 {
    f64::from(digit).log10() + f64::from(exponent)
}

/// The largest 1, 2 or 5 times a power of ten at or under a logarithm, as (digit, exponent).
fn below(value: f64) -> (i32, i32) {
    let exponent = exponent_of(value);
    let digit = [5, 2, 1].into_iter().find(|d| log((*d, exponent)) <= value + 1e-12);
    digit.map_or((5, exponent - 1), |digit| (digit, exponent))
}

/// The least 1, 2 or 5 times a power of ten at or over a logarithm, as (digit, exponent).
fn above(value: f64) -> (i32, i32) {
    let exponent = exponent_of(value);
    let digit = [1, 2, 5].into_iter().find(|d| log((*d, exponent)) >= value - 1e-12);
    digit.map_or((1, exponent + 1), |digit| (digit, exponent))
}

/// The power of ten at or under a logarithm.
fn exponent_of(value: f64) -> i32 {
    // The logarithm of a positive finite number lies between -324 and 309.
    #[allow(clippy::cast_possible_truncation)]
    let exponent = value.floor() as i32;
    exponent
}
