//! Text becomes records: each with the line it starts on, blank lines counted.

use csv::{ReaderBuilder, StringRecord};

/// One record: the line it starts on, counted from 1, and its cells.
#[derive(Clone, Debug, PartialEq)]
pub struct Line {
    /// The line of a text, the row of a sheet.
    pub line: u64,
    /// The column of the one cell that it is, counted from 1; 0 where it is a whole line.
    pub column: u32,
    /// How many lines it spans.
    pub spans: u64,
    /// The cells.
    pub cells: StringRecord,
    /// The cells that were filled from a merged one.
    pub filled: Box<[Filled]>,
}

/// A cell that was filled from a merged one.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Filled {
    /// Its place in the line, counted from 0.
    pub column: u32,
    /// Whether the merged cell's text stands in another column.
    pub across: bool,
}

impl Line {
    /// A whole line on one line.
    #[must_use]
    pub fn whole(line: u64, cells: StringRecord) -> Self {
        Self { line, column: 0, spans: 1, cells, filled: Box::default() }
    }
}

/// All records of a file.
#[derive(Clone, Debug, PartialEq)]
pub struct Lines {
    /// Records in order, the header first.
    pub lines: Vec<Line>,
    /// Lines whose cells are all empty.
    pub blank: usize,
}

/// Splits a text at a separator. Quotes hold separators and line ends; a quote inside an unquoted
/// cell is a character like any other.
#[must_use]
pub fn split(text: &str, separator: u8) -> Lines {
    let mut reader = ReaderBuilder::new()
        .has_headers(false)
        .flexible(true)
        .delimiter(separator)
        .from_reader(text.as_bytes());
    let mut lines = Vec::new();
    let mut blank = 0;
    let mut counter = LineCounter { bytes: text.as_bytes(), at: 0, line: 1 };
    let mut cells = StringRecord::new();
    // With flexible records over valid UTF-8 in memory the reader has nothing left to fail at.
    while let Ok(true) = reader.read_record(&mut cells) {
        let from = cells.position().map_or(0, |position| position.byte());
        blank += counter.skip_line_ends(usize::try_from(from).unwrap_or(usize::MAX));
        let line = counter.line;
        let to = usize::try_from(reader.position().byte()).unwrap_or(usize::MAX);
        let spans = counter.advance(to).max(1);
        if cells.iter().all(|cell| cell.trim().is_empty()) {
            blank += 1;
        } else {
            lines.push(Line { spans, ..Line::whole(line, own(&cells)) });
        }
    }
    Lines { lines, blank }
}

/// The cells of a record alone. A clone would copy the reader's whole buffers, which are as long as
/// the longest record so far: one long cell or wide line would swell every record after it.
fn own(cells: &StringRecord) -> StringRecord {
    let mut own = StringRecord::with_capacity(cells.as_slice().len(), cells.len());
    own.extend(cells.iter());
    own
}

/// Counts line ends (`\n`, `\r\n`, bare `\r`) as the reader moves on.
struct LineCounter<'a> {
    bytes: &'a [u8],
    at: usize,
    line: u64,
}

impl LineCounter<'_> {
    /// Moves to a byte and returns how many line ends were passed.
    fn advance(&mut self, to: usize) -> u64 {
        let to = to.min(self.bytes.len());
        let mut passed = 0;
        while self.at < to {
            // `\r\n` counts at its `\r`, wherever the reader stopped between the two.
            let after_return = self.at > 0 && self.bytes[self.at - 1] == b'\r';
            match self.bytes[self.at] {
                b'\r' => passed += 1,
                b'\n' if !after_return => passed += 1,
                _ => {}
            }
            self.at += 1;
        }
        self.line += passed;
        passed
    }

    /// Moves to a byte and on over empty lines, which the reader leaves out; returns their number.
    fn skip_line_ends(&mut self, from: usize) -> usize {
        self.advance(from);
        let start = self.line;
        let mut to = self.at;
        while matches!(self.bytes.get(to), Some(b'\n' | b'\r')) {
            to += 1;
        }
        self.advance(to);
        usize::try_from(self.line - start).unwrap_or(usize::MAX)
    }
}

#[cfg(test)]
mod tests {
    use super::split;

    fn lines(text: &str) -> (Vec<(u64, Vec<String>)>, usize) {
        let split = split(text, b',');
        let lines = split.lines.iter();
        let lines = lines.map(|l| (l.line, l.cells.iter().map(str::to_owned).collect())).collect();
        (lines, split.blank)
    }

    #[test]
    fn a_record_knows_its_line_past_blank_lines_and_quoted_line_ends() {
        let (lines, blank) = lines("a,b\n\n\"x\ny\",1\n,,\nc,d\n");
        let starts: Vec<u64> = lines.iter().map(|(line, _)| *line).collect();
        assert_eq!(starts, [1, 3, 6]);
        assert_eq!(blank, 2);
        assert_eq!(lines[1].1, ["x\ny", "1"]);
    }

    #[test]
    fn every_kind_of_line_end_is_one() {
        for end in ["\n", "\r\n", "\r"] {
            let (lines, blank) = lines(&["a,b", "c,d", "", "e,f", ""].join(end));
            let starts: Vec<u64> = lines.iter().map(|(line, _)| *line).collect();
            assert_eq!((starts, blank), (vec![1, 2, 4], 1), "{end:?}");
        }
    }

    #[test]
    fn a_stray_quote_is_a_character() {
        let (lines, _) = lines("a,b\n5\" casing,1\nx,2\n");
        assert_eq!(lines.len(), 3);
        assert_eq!(lines[1].1[0], "5\" casing");
    }
}
