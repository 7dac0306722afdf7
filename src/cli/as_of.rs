//! `--as-of`: a date, or a period of which the last day is meant.

use chrono::{Days, Months, NaiveDate};

/// Reads `2026-09-30`, `2026`, `2026-H2`, `2026-Q3` or `2026-07`.
pub fn as_of(text: &str) -> Option<NaiveDate> {
    if let Ok(date) = NaiveDate::parse_from_str(text, "%Y-%m-%d") {
        return (text.len() == 10).then_some(date);
    }
    let (year, part) = text.split_once('-').unwrap_or((text, ""));
    if year.len() != 4 || !year.bytes().all(|b| b.is_ascii_digit()) {
        return None;
    }
    let year: i32 = year.parse().ok()?;
    let number =
        |digits: &str, most: u32| digits.parse::<u32>().ok().filter(|n| (1..=most).contains(n));
    let last_month = match part.as_bytes() {
        [] if !text.contains('-') => 12,
        [b'H' | b'h', _] => 6 * number(&part[1..], 2)?,
        [b'Q' | b'q', _] => 3 * number(&part[1..], 4)?,
        [_, _] => number(part, 12)?,
        _ => return None,
    };
    let first_of_last = NaiveDate::from_ymd_opt(year, last_month, 1)?;
    first_of_last.checked_add_months(Months::new(1))?.checked_sub_days(Days::new(1))
}

#[cfg(test)]
mod tests {
    use super::as_of;

    #[test]
    fn a_period_means_its_last_day() {
        for (text, date) in [
            ("2026-09-30", "2026-09-30"),
            ("2026", "2026-12-31"),
            ("2026-H1", "2026-06-30"),
            ("2026-Q3", "2026-09-30"),
            ("2024-02", "2024-02-29"),
        ] {
            assert_eq!(as_of(text).map(|d| d.to_string()).as_deref(), Some(date), "{text}");
        }
        for text in ["26", "2026-Q5", "2026-13", "2026-", "2026-Q", "2026-H3", "soon", "2026-9-3"] {
            assert_eq!(as_of(text), None, "{text}");
        }
    }
}
