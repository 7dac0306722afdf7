//! How numbers and dates are written, in files and for people.
//!
//! One rule for all: the shortest decimal of the value rounded to some significant digits, without
//! trailing zeros, plain from 1e-5 up to 1e15 and as `1.23e-7` outside; −0 is 0. Only the count of
//! digits differs: 6 in tables, 10 in JSON, 3 where a person reads an estimate.

use chrono::{Datelike, NaiveDate};

use crate::terms::Reading;

/// Significant digits of tables, and of values that a person compares with the laboratory's sheet.
const TABLE_DIGITS: usize = 6;
/// Significant digits of JSON.
const JSON_DIGITS: usize = 10;
/// Significant digits of estimates on pages and charts (judgement: no rate is known better).
const PEOPLE_DIGITS: usize = 3;

/// A number as tables write it, to 6 significant digits; empty where it is not finite.
#[must_use]
pub fn table(value: f64) -> String {
    shortest(value, TABLE_DIGITS)
}

/// A number as JSON writes it, to 10 significant digits; empty where it is not finite.
#[must_use]
pub fn json(value: f64) -> String {
    shortest(value, JSON_DIGITS)
}

/// An estimate as people read it, to 3 significant digits; empty where it is not finite.
#[must_use]
pub fn people(value: f64) -> String {
    shortest(value, PEOPLE_DIGITS)
}

/// An estimate beside its interval. Where the interval holds zero no digit is finer than the third of
/// its wider end, so that `0.0000249 (-0.00765 to 0.0077)` reads `0.00002`.
#[must_use]
pub fn people_beside(value: f64, low: f64, high: f64) -> String {
    let end = low.abs().max(high.abs());
    let coarser = low < 0.0 && high > 0.0 && end.is_finite() && value.abs() < end;
    if !coarser {
        return people(value);
    }
    // The logarithm of a finite number lies between -324 and 309.
    #[allow(clippy::cast_possible_truncation)]
    let decimals = PEOPLE_DIGITS as i32 - 1 - end.log10().floor() as i32;
    match usize::try_from(decimals) {
        Ok(decimals) => {
            let rounded = format!("{value:.decimals$}").parse::<f64>();
            rounded.map_or_else(|_| people(value), people)
        }
        Err(_) => people(value),
    }
}

/// The shortest decimal of `value` rounded to `digits` significant digits.
///
/// Whether it is written plainly is decided by the rounded value: 9.999999e-6 at 6 digits is
/// `0.00001`. A value that is not finite has no digits and is written as nothing.
#[must_use]
pub fn shortest(value: f64, digits: usize) -> String {
    if !value.is_finite() {
        return String::new();
    }
    // `{:e}` with a precision rounds the exact binary value once, correctly.
    let written = format!("{:.*e}", digits.saturating_sub(1), value.abs());
    let Some((mantissa, exponent)) = written.split_once('e') else { return written };
    let Ok(exponent) = exponent.parse::<i32>() else { return written };
    let mut digits: String = mantissa.chars().filter(char::is_ascii_digit).collect();
    digits.truncate(digits.trim_end_matches('0').len().max(1));
    // −0 is not under 0, so it has no sign.
    let sign = if value < 0.0 { "-" } else { "" };
    format!("{sign}{}", placed(&digits, exponent))
}

/// Significant digits with their decimal exponent, as text.
fn placed(digits: &str, exponent: i32) -> String {
    let (first, rest) = digits.split_at(1);
    if !(-5..15).contains(&exponent) {
        let point = if rest.is_empty() { "" } else { "." };
        return format!("{first}{point}{rest}e{exponent}");
    }
    let magnitude = exponent.unsigned_abs() as usize;
    if exponent < 0 {
        format!("0.{}{digits}", "0".repeat(magnitude - 1))
    } else if rest.len() <= magnitude {
        format!("{digits}{}", "0".repeat(magnitude - rest.len()))
    } else {
        let (whole, fraction) = digits.split_at(magnitude + 1);
        format!("{whole}.{fraction}")
    }
}

/// A date as files write it: `2031-04-17`.
#[must_use]
pub fn iso(date: NaiveDate) -> String {
    format!("{:04}-{:02}-{:02}", date.year(), date.month(), date.day())
}

/// A date as people read it: `2031-04`. No estimate here is known to the day.
#[must_use]
pub fn month(date: NaiveDate) -> String {
    format!("{:04}-{:02}", date.year(), date.month())
}

/// A count as people read it: `55,544`.
#[must_use]
pub fn count(n: usize) -> String {
    let plain = n.to_string();
    let mut grouped = String::with_capacity(plain.len() + plain.len() / 3);
    for (at, digit) in plain.chars().enumerate() {
        if at > 0 && (plain.len() - at).is_multiple_of(3) {
            grouped.push(',');
        }
        grouped.push(digit);
    }
    grouped
}

/// A count with its noun: `1 record`, `34 records`.
#[must_use]
pub fn counted(n: usize, one: &str, many: &str) -> String {
    format!("{} {}", count(n), if n == 1 { one } else { many })
}

/// A reading with its mark, as tables write it: `<0.5`; an interval as `0.2 to 0.5`.
#[must_use]
pub fn reading(reading: Reading) -> String {
    match reading {
        Reading::Between(low, high) => format!("{} to {}", table(low), table(high)),
        other => format!("{}{}", other.mark(), table(other.number())),
    }
}

/// A share as people read it: `12 %`, `0.4 %`; whole percents from 1 % on.
#[must_use]
pub fn percent(share: f64) -> String {
    let hundred = 100.0 * share;
    if !hundred.is_finite() {
        return String::new();
    }
    let written = if hundred.abs() >= 1.0 { format!("{hundred:.0}") } else { shortest(hundred, 1) };
    // Rounding leaves `-0` of a tiny negative share only above; `shortest` writes 0 itself.
    format!("{written} %")
}

/// A p-value as people read it: `p 0.03`, and `p under 0.001` below that.
#[must_use]
pub fn p_value(p: f64) -> String {
    if p < 0.001 { "p under 0.001".to_owned() } else { format!("p {}", shortest(p, 2)) }
}

/// The confidence as people read it: `90 %`, `97.5 %`.
#[must_use]
pub fn confidence(level: f64) -> String {
    format!("{} %", shortest(100.0 * level, 4))
}
