//! Dates: ISO, the month in words, or day and month in an order that is declared or proved; the
//! time kept apart.

use chrono::{Days, NaiveDate};

use super::month_names::{Named, named};
use crate::site::{DateOrder, SerialDates, TwoDigitYears};

/// How a file writes its dates.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct DateForm {
    /// The order of day and month, declared or proved; none if neither.
    pub order: Option<DateOrder>,
    /// What two digits of a year mean.
    pub two_digit_years: TwoDigitYears,
    /// Whether bare numbers are spreadsheet serials.
    pub serials: SerialDates,
}

/// A date cell as read.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum DateText {
    /// A date, and the time of day as written.
    Date(NaiveDate, String),
    /// Day and month could stand in either order.
    Ambiguous,
    /// No date.
    Unreadable,
}

/// The years in which groundwater was sampled and this program is used.
pub const YEARS: std::ops::RangeInclusive<i32> = 1900..=2200;

/// Reads a date cell.
#[must_use]
pub fn date(text: &str, form: DateForm) -> DateText {
    let (day, time) = split_time(text.trim());
    if let Some(date) = serial(day, form.serials) {
        return DateText::Date(date, time.to_owned());
    }
    let Some([a, b, c]) = parts(day) else {
        let named = named(day);
        return named.map_or(DateText::Unreadable, |named| in_words(&named, form, time));
    };
    let made = |year: Option<i32>, month: &str, day: &str| {
        let date = year
            .and_then(|year| NaiveDate::from_ymd_opt(year, month.parse().ok()?, day.parse().ok()?));
        match date.filter(|date| YEARS.contains(&chrono::Datelike::year(date))) {
            Some(date) => DateText::Date(date, time.to_owned()),
            None => DateText::Unreadable,
        }
    };
    if a.len() == 4 {
        return made(a.parse().ok(), b, c);
    }
    match form.order {
        Some(DateOrder::YearMonthDay) => made(year_of(a, form.two_digit_years), b, c),
        Some(DateOrder::DayMonthYear) => made(year_of(c, form.two_digit_years), b, a),
        Some(DateOrder::MonthDayYear) => made(year_of(c, form.two_digit_years), a, b),
        // Without an order: a part above 12 or equal parts leave one reading.
        None => match (a.parse::<u32>(), b.parse::<u32>()) {
            (Ok(first), Ok(second)) if first > 12 || first == second => {
                made(year_of(c, form.two_digit_years), b, a)
            }
            (Ok(_), Ok(second)) if second > 12 => made(year_of(c, form.two_digit_years), a, b),
            _ if made(year_of(c, form.two_digit_years), a, b) == DateText::Unreadable => {
                DateText::Unreadable
            }
            _ => DateText::Ambiguous,
        },
    }
}

/// A date with its month in words needs no order.
fn in_words(named: &Named, form: DateForm, time: &str) -> DateText {
    let (day, year) = match (form.order, named.day.len(), named.year.len()) {
        // `24-Mar-12` where the year is declared to stand first.
        (Some(DateOrder::YearMonthDay), 2, 2) => (&named.year, &named.day),
        _ => (&named.day, &named.year),
    };
    let date = year_of(year, form.two_digit_years)
        .and_then(|year| NaiveDate::from_ymd_opt(year, named.month, day.parse().ok()?))
        .filter(|date| YEARS.contains(&chrono::Datelike::year(date)));
    date.map_or(DateText::Unreadable, |date| DateText::Date(date, time.to_owned()))
}

/// `2024-03-05T10:20` and `2024-03-05 10:20 +01:00` as date and time; the local day stands.
#[must_use]
pub fn split_time(text: &str) -> (&str, &str) {
    let at = text
        .match_indices(['T', ' '])
        .map(|(at, _)| at)
        .find(|at| *at >= 6 && looks_like_time(&text[at + 1..]));
    match at {
        Some(at) => (text[..at].trim_end().trim_end_matches(','), text[at + 1..].trim()),
        None => (text, ""),
    }
}

fn looks_like_time(text: &str) -> bool {
    let text = text.trim();
    let hour = text.split(':').next().unwrap_or_default();
    text.contains(':') && (1..=2).contains(&hour.len()) && hour.bytes().all(|b| b.is_ascii_digit())
}

/// The three numbers of a date between `-`, `/` or `.`, each of digits alone.
#[must_use]
pub fn parts(text: &str) -> Option<[&str; 3]> {
    let separator = text.chars().find(|c| matches!(c, '-' | '/' | '.'))?;
    let mut parts = text.split(separator);
    let three = [parts.next()?, parts.next()?, parts.next()?];
    let sound = three
        .iter()
        .all(|part| (1..=4).contains(&part.len()) && part.bytes().all(|b| b.is_ascii_digit()));
    (sound && parts.next().is_none()).then_some(three)
}

/// A year of four digits, or of two where the site file says what they mean.
fn year_of(text: &str, two: TwoDigitYears) -> Option<i32> {
    /// Two digits from here on are of the last century (POSIX `%y`).
    const PIVOT: i32 = 70;
    match (text.len(), two) {
        (4, _) => text.parse().ok(),
        (2, TwoDigitYears::Read) => {
            let year: i32 = text.parse().ok()?;
            Some(if year < PIVOT { 2000 + year } else { 1900 + year })
        }
        _ => None,
    }
}

/// A declared spreadsheet serial: days after 1899-12-30, or after 1904-01-01.
fn serial(text: &str, serials: SerialDates) -> Option<NaiveDate> {
    let origin = match serials {
        SerialDates::Refused => return None,
        SerialDates::From1900 => NaiveDate::from_ymd_opt(1899, 12, 30)?,
        SerialDates::From1904 => NaiveDate::from_ymd_opt(1904, 1, 1)?,
    };
    let days: u64 = text.split('.').next()?.parse().ok()?;
    let date = origin.checked_add_days(Days::new(days))?;
    YEARS.contains(&chrono::Datelike::year(&date)).then_some(date)
}

#[cfg(test)]
mod tests {
    use super::{DateForm, DateOrder, DateText, SerialDates, TwoDigitYears, date};

    fn read(text: &str, order: Option<DateOrder>) -> String {
        let form = DateForm {
            order,
            two_digit_years: TwoDigitYears::Refused,
            serials: SerialDates::Refused,
        };
        match date(text, form) {
            DateText::Date(date, time) => format!("{date} {time}"),
            DateText::Ambiguous => "ambiguous".into(),
            DateText::Unreadable => "unreadable".into(),
        }
    }

    #[test]
    fn iso_dates_are_read_and_their_time_kept() {
        assert_eq!(read("2024-03-05", None), "2024-03-05 ");
        assert_eq!(read("2024-03-05T10:20:00Z", None), "2024-03-05 10:20:00Z");
        assert_eq!(read("2024/03/05 23:59", None), "2024-03-05 23:59");
        assert_eq!(read("5 Mar 2024 10:20 PM", None), "2024-03-05 10:20 PM");
        assert_eq!(read("2024-03-05T23:30:00-07:00", None), "2024-03-05 23:30:00-07:00");
    }

    #[test]
    fn day_and_month_need_an_order_or_a_part_above_twelve() {
        assert_eq!(read("05/03/2024", None), "ambiguous");
        assert_eq!(read("25/03/2024", None), "2024-03-25 ");
        assert_eq!(read("03/25/2024", None), "2024-03-25 ");
        assert_eq!(read("05/03/2024", Some(DateOrder::DayMonthYear)), "2024-03-05 ");
        assert_eq!(read("05.03.2024", Some(DateOrder::MonthDayYear)), "2024-05-03 ");
        assert_eq!(read("25/03/2024", Some(DateOrder::MonthDayYear)), "unreadable");
    }

    #[test]
    fn what_is_no_date_is_said_to_be_none() {
        for text in ["", "45292", "24-03-05", "2024-02-30", "0024-03-05", "2024-03", "soon"] {
            assert_eq!(read(text, None), "unreadable", "{text}");
        }
    }

    #[test]
    fn declared_serials_and_two_digit_years_are_read() {
        let form = DateForm {
            order: Some(DateOrder::MonthDayYear),
            two_digit_years: TwoDigitYears::Read,
            serials: SerialDates::From1900,
        };
        // 45292 is 2024-01-01 in the 1900 date system of spreadsheets (common practice).
        assert!(
            matches!(date("45292", form), DateText::Date(d, _) if d.to_string() == "2024-01-01")
        );
        assert!(
            matches!(date("3/5/24", form), DateText::Date(d, _) if d.to_string() == "2024-03-05")
        );
    }
}
