//! Numbers: read once, exactly, or not at all.

use crate::site::Decimal;

/// How a file writes its numbers.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct NumberForm {
    /// The decimal mark.
    pub decimal: Decimal,
    /// The thousands separator, if one is declared.
    pub thousands: Option<char>,
}

/// Reads a number as declared; `None` for anything else, for overflow, and for a number that is
/// not zero but would be read as zero.
#[must_use]
pub fn number(text: &str, form: NumberForm) -> Option<f64> {
    let plain = plain(text.trim(), form)?;
    let value: f64 = plain.parse().ok()?;
    let mantissa = plain.split(['e', 'E']).next()?;
    let vanished = value == 0.0 && mantissa.bytes().any(|b| b.is_ascii_digit() && b != b'0');
    (value.is_finite() && !vanished).then_some(value)
}

/// The number with a point and without thousands separators, if every character has its place.
fn plain(text: &str, form: NumberForm) -> Option<String> {
    let point = match form.decimal {
        Decimal::Point => '.',
        Decimal::Comma => ',',
    };
    let unsigned = text.strip_prefix(['+', '-']).unwrap_or(text);
    let (mantissa, exponent) = match unsigned.split_once(['e', 'E']) {
        Some((mantissa, exponent)) => (mantissa, Some(exponent)),
        None => (unsigned, None),
    };
    let (whole, part) = match mantissa.split_once(point) {
        Some((whole, part)) => (whole, Some(part)),
        None => (mantissa, None),
    };
    let whole = match form.thousands {
        Some(separator) if whole.contains(separator) => grouped(whole, separator)?,
        _ => whole.to_owned(),
    };
    let digits = |text: &str| text.bytes().all(|b| b.is_ascii_digit());
    let some_digit = !whole.is_empty() || part.is_some_and(|part| !part.is_empty());
    if !digits(&whole) || !part.is_none_or(digits) || !some_digit {
        return None;
    }
    let mut plain = String::with_capacity(text.len() + 1);
    plain.push_str(if text.starts_with('-') { "-" } else { "" });
    plain.push_str(if whole.is_empty() { "0" } else { &whole });
    if let Some(part) = part.filter(|part| !part.is_empty()) {
        plain.push('.');
        plain.push_str(part);
    }
    if let Some(exponent) = exponent {
        let power = exponent.strip_prefix(['+', '-']).unwrap_or(exponent);
        if power.is_empty() || !digits(power) {
            return None;
        }
        plain.push('e');
        plain.push_str(exponent);
    }
    Some(plain)
}

/// `1 234 567` with its separators taken out, if each stands before three digits.
fn grouped(whole: &str, separator: char) -> Option<String> {
    let mut groups = whole.split(separator);
    let first = groups.next()?;
    let sound = (1..=3).contains(&first.len());
    let mut joined = first.to_owned();
    for group in groups {
        if group.len() != 3 {
            return None;
        }
        joined.push_str(group);
    }
    sound.then_some(joined)
}

#[cfg(test)]
mod tests {
    use super::{Decimal, NumberForm, number};

    const POINT: NumberForm = NumberForm { decimal: Decimal::Point, thousands: None };

    #[test]
    fn plain_numbers_are_read_exactly() {
        for (text, value) in
            [("5", 5.0), ("0.1", 0.1), (" 1.2e-3 ", 1.2e-3), ("-4", -4.0), (".5", 0.5), ("5.", 5.0)]
        {
            assert_eq!(number(text, POINT), Some(value), "{text}");
        }
    }

    #[test]
    fn what_is_no_number_is_refused() {
        for text in
            ["1e400", "NaN", "inf", "5,1,2", "1,234", "", "-", ".", "1e", "0x10", "1 2", "1e-400"]
        {
            assert_eq!(number(text, POINT), None, "{text}");
        }
        assert_eq!(number("0.000", POINT), Some(0.0));
    }

    #[test]
    fn commas_and_thousands_are_read_as_declared() {
        let comma = NumberForm { decimal: Decimal::Comma, thousands: Some('.') };
        assert_eq!(number("1.234,5", comma), Some(1234.5));
        assert_eq!(number("0,5", comma), Some(0.5));
        assert_eq!(number("12.34,5", comma), None);
        let point = NumberForm { decimal: Decimal::Point, thousands: Some(',') };
        assert_eq!(number("1,234,567.8", point), Some(1_234_567.8));
        assert_eq!(number("5,1,2", point), None);
    }
}
