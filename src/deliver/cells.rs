//! How one cell of a table is written in CSV and in JSON.

use super::json::Json;
use super::tables::csv_text;
use crate::findings::Cell;
use crate::terms::Reading;
use crate::words::number::{iso, table};

/// The cell as CSV writes it; text is guarded, numbers never are.
#[must_use]
pub fn in_csv(cell: &Cell) -> String {
    match cell {
        Cell::Empty => String::new(),
        Cell::Text(text) => csv_text(text).into_owned(),
        Cell::Number(value) => table(*value),
        Cell::Count(n) => n.to_string(),
        Cell::Date(date) => iso(*date),
        Cell::Codes(codes) => codes.join(";"),
        Cell::Marked(reading) => marked(*reading, table),
    }
}

/// The cell as JSON writes it; text stays raw.
#[must_use]
pub fn in_json(cell: &Cell) -> Json {
    match cell {
        Cell::Empty => Json::Null,
        Cell::Text(text) => Json::text(text),
        Cell::Number(value) => Json::Number(*value),
        Cell::Count(n) => Json::count(*n),
        Cell::Date(date) => Json::date(Some(*date)),
        Cell::Codes(codes) => Json::List(codes.iter().map(|code| Json::text(code)).collect()),
        Cell::Marked(reading) => Json::Text(marked(*reading, crate::words::number::json)),
    }
}

/// `<0.5`: the mark and the number.
fn marked(reading: Reading, write: fn(f64) -> String) -> String {
    format!("{}{}", reading.mark(), write(reading.number()))
}
