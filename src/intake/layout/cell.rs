//! A workbook's cell as the text that a delimited file would hold.

use calamine::{DataRef, ExcelDateTime};

use crate::site::Decimal;

/// Serials from 1900-01-01 to 2200-12-31 in the 1900 calendar, the years in which this program
/// reads dates; anything else with a date's format is written as the number it is.
const SERIALS: std::ops::Range<f64> = 1.0..109_938.0;

/// Writes a cell: text as it is, a number as its shortest decimal, a date in ISO form.
pub(super) fn text(value: &DataRef<'_>, decimal: Decimal) -> String {
    match value {
        DataRef::Empty => String::new(),
        DataRef::String(text) | DataRef::DateTimeIso(text) | DataRef::DurationIso(text) => {
            text.clone()
        }
        DataRef::SharedString(text) => (*text).to_owned(),
        DataRef::Int(number) => number.to_string(),
        DataRef::Float(value) => number(*value, decimal),
        DataRef::Bool(true) => "TRUE".to_owned(),
        DataRef::Bool(false) => "FALSE".to_owned(),
        DataRef::Error(error) => error.to_string(),
        DataRef::DateTime(moment) => date(moment, decimal),
    }
}

/// The shortest decimal that is this number, with the mark that the file's numbers are declared to
/// have; very large and very small ones with an exponent.
fn number(value: f64, decimal: Decimal) -> String {
    let plain = value == 0.0 || (1e-5..1e16).contains(&value.abs());
    let text = if plain { value.to_string() } else { format!("{value:e}") };
    match decimal {
        Decimal::Point => text,
        Decimal::Comma => text.replace('.', ","),
    }
}

/// A cell with a date's format: `2024-03-05`, `2024-03-05T10:20:00`, or `10:20:00` alone.
fn date(moment: &ExcelDateTime, decimal: Decimal) -> String {
    let serial = moment.as_f64();
    let (year, month, day, hour, minute, second, _) = moment.to_ymd_hms_milli();
    let time = format!("{hour:02}:{minute:02}:{second:02}");
    if (0.0..1.0).contains(&serial) {
        time
    } else if !SERIALS.contains(&serial) || moment.is_duration() {
        number(serial, decimal)
    } else if serial.fract() == 0.0 {
        format!("{year:04}-{month:02}-{day:02}")
    } else {
        format!("{year:04}-{month:02}-{day:02}T{time}")
    }
}

#[cfg(test)]
mod tests {
    use super::{DataRef, Decimal, ExcelDateTime, text};
    use calamine::{CellErrorType, ExcelDateTimeType};

    fn written(value: &DataRef<'_>) -> String {
        text(value, Decimal::Point)
    }

    fn moment(serial: f64, is_1904: bool) -> DataRef<'static> {
        DataRef::DateTime(ExcelDateTime::new(serial, ExcelDateTimeType::DateTime, is_1904))
    }

    #[test]
    fn numbers_are_their_shortest_decimals() {
        for (value, expected) in
            [(5.0, "5"), (0.1, "0.1"), (1e-7, "1e-7"), (0.00005, "0.00005"), (-3.25, "-3.25")]
        {
            assert_eq!(written(&DataRef::Float(value)), expected);
        }
        assert_eq!(text(&DataRef::Float(0.5), Decimal::Comma), "0,5");
        assert_eq!(written(&DataRef::SharedString("001")), "001");
    }

    #[test]
    fn dates_are_iso_in_either_calendar_and_never_invented() {
        // 2024-01-01 is 45292 in the 1900 calendar and 1,462 less in that of 1904.
        assert_eq!(written(&moment(45_292.0, false)), "2024-01-01");
        assert_eq!(written(&moment(43_830.0, true)), "2024-01-01");
        assert_eq!(written(&moment(45_292.5, false)), "2024-01-01T12:00:00");
        assert_eq!(written(&moment(0.5, false)), "12:00:00");
        assert_eq!(written(&moment(-5.0, false)), "-5");
        assert_eq!(written(&moment(1e12, false)), "1000000000000");
    }

    #[test]
    fn errors_keep_their_sign() {
        assert_eq!(written(&DataRef::Error(CellErrorType::NA)), "#N/A");
        assert_eq!(written(&DataRef::Error(CellErrorType::Div0)), "#DIV/0!");
    }
}
