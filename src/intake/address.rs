//! Where a record stands, as ledger and messages write it.

/// The record of a line, a row, or one cell: `7`, or `C7` where a column is given (from 1).
#[must_use]
pub fn record(line: u64, column: u32) -> String {
    if column == 0 { line.to_string() } else { format!("{}{line}", letters(column)) }
}

/// `file:record`, or `file:sheet!record` in a workbook.
#[must_use]
pub fn place(file: &str, sheet: &str, record: &str) -> String {
    if sheet.is_empty() { format!("{file}:{record}") } else { format!("{file}:{sheet}!{record}") }
}

/// A table's name in messages: the file, or `file:sheet` in a workbook.
#[must_use]
pub fn table(file: &str, sheet: &str) -> String {
    if sheet.is_empty() { file.to_owned() } else { format!("{file}:{sheet}") }
}

/// A column as spreadsheets letter it: 1 is `A`, 27 is `AA`.
#[must_use]
pub fn letters(column: u32) -> String {
    let mut rest = column;
    let mut letters = Vec::new();
    while rest > 0 {
        rest -= 1;
        letters.push(char::from(b'A' + u8::try_from(rest % 26).unwrap_or_default()));
        rest /= 26;
    }
    letters.iter().rev().collect()
}

#[cfg(test)]
mod tests {
    use super::{letters, place, record};

    #[test]
    fn addresses_read_as_in_a_spreadsheet() {
        let columns = [(1, "A"), (26, "Z"), (27, "AA"), (702, "ZZ"), (703, "AAA"), (16_384, "XFD")];
        for (column, expected) in columns {
            assert_eq!(letters(column), expected);
        }
        assert_eq!(place("lab.xlsx", "Round 3", &record(7, 3)), "lab.xlsx:Round 3!C7");
        assert_eq!(place("lab.csv", "", &record(7, 0)), "lab.csv:7");
    }
}
