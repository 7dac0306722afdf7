//! Lines for a terminal: wrapping, aligned columns, and the two styles that are used.
//!
//! Widths are counted in terminal columns. Styles are put on after wrapping, so that no escape
//! sequence is ever counted or cut; without colour the text is the same without them.

/// A blank at which no line is broken.
pub const HARD_SPACE: char = '\u{a0}';
/// The same as a text, to hold words together.
pub const HELD: &str = "\u{a0}";
/// The widest line that is written, so that sentences stay readable on wide terminals.
const WIDEST: usize = 100;
/// The narrowest line that is wrapped to.
const NARROWEST: usize = 40;

/// The line width for a terminal of `width` columns.
#[must_use]
pub fn line_width(width: usize) -> usize {
    width.clamp(NARROWEST, WIDEST)
}

/// How many terminal columns a text takes: none for combining marks, two for wide East Asian
/// characters and emoji (the main blocks), one for the rest.
#[must_use]
pub fn columns(text: &str) -> usize {
    text.chars()
        .map(|c| match u32::from(c) {
            0x300..=0x36f | 0x483..=0x489 | 0x591..=0x5bd | 0x610..=0x61a | 0x64b..=0x65f => 0,
            0x1ab0..=0x1aff | 0x1dc0..=0x1dff | 0x20d0..=0x20ff | 0xfe00..=0xfe2f => 0,
            0x1100..=0x115f | 0x2e80..=0x303e | 0x3041..=0xa4cf | 0xac00..=0xd7a3 => 2,
            0xf900..=0xfaff | 0xfe30..=0xfe6f | 0xff00..=0xff60 | 0xffe0..=0xffe6 => 2,
            0x1f300..=0x1f64f | 0x1f900..=0x1f9ff | 0x20000..=0x3fffd => 2,
            _ => 1,
        })
        .sum()
}

/// Bold and dim, or neither.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Style {
    /// Whether the terminal takes them.
    pub color: bool,
}

impl Style {
    /// Text that stands out.
    #[must_use]
    pub fn bold(self, text: &str) -> String {
        self.put(text, "1")
    }

    /// Text that stands back.
    #[must_use]
    pub fn dim(self, text: &str) -> String {
        self.put(text, "2")
    }

    fn put(self, text: &str, code: &str) -> String {
        if self.color && !text.is_empty() {
            format!("\u{1b}[{code}m{text}\u{1b}[0m")
        } else {
            text.to_owned()
        }
    }
}

/// Lines of a page as they are put together.
#[derive(Clone, Debug)]
pub struct Lines {
    text: String,
    width: usize,
    style: Style,
}

impl Lines {
    /// An empty page for a terminal of `width` columns.
    #[must_use]
    pub fn new(width: usize, color: bool) -> Self {
        Self { text: String::new(), width: line_width(width), style: Style { color } }
    }

    /// A title: bold, wrapped.
    pub fn title(&mut self, text: &str) {
        for line in wrapped(text, self.width, 0, 0) {
            let line = self.style.bold(&line);
            self.line(&line);
        }
    }

    /// A heading with a blank line before it.
    pub fn heading(&mut self, text: &str) {
        self.blank();
        self.title(text);
    }

    /// A paragraph, indented by `indent` columns.
    pub fn paragraph(&mut self, text: &str, indent: usize) {
        self.hanging(text, indent, indent);
    }

    /// A paragraph whose later lines are indented by `rest` columns.
    pub fn hanging(&mut self, text: &str, first: usize, rest: usize) {
        for line in wrapped(text, self.width, first, rest) {
            self.line(&line);
        }
    }

    /// A name that stands out, indented.
    pub fn strong(&mut self, text: &str, indent: usize) {
        for line in wrapped(text, self.width, indent, indent + 2) {
            let line = self.style.bold(&line);
            self.line(&line);
        }
    }

    /// A paragraph that stands back.
    pub fn aside(&mut self, text: &str, indent: usize) {
        for line in wrapped(text, self.width, indent, indent) {
            let line = self.style.dim(&line);
            self.line(&line);
        }
    }

    /// One line that is never wrapped, so that it can be copied.
    pub fn line(&mut self, text: &str) {
        self.text.push_str(text);
        self.text.push('\n');
    }

    /// One blank line, unless the page is empty or one stands there already.
    pub fn blank(&mut self) {
        if !self.text.is_empty() && !self.text.ends_with("\n\n") {
            self.text.push('\n');
        }
    }

    /// Rows of aligned columns, indented; the last column is wrapped under itself.
    pub fn rows(&mut self, rows: &[Vec<String>], aligned: &[Align], indent: usize) {
        const GAP: usize = 2;
        let last = aligned.len().saturating_sub(1);
        let widths: Vec<usize> = (0..last)
            .map(|at| rows.iter().filter_map(|row| row.get(at)).map(|c| columns(c)).max())
            .map(Option::unwrap_or_default)
            .collect();
        let before: usize = indent + widths.iter().map(|w| w + GAP).sum::<usize>();
        for row in rows {
            let mut line = " ".repeat(indent);
            for (at, cell) in row.iter().take(last).enumerate() {
                line.push_str(&padded(cell, widths[at], aligned[at]));
                line.push_str(&" ".repeat(GAP));
            }
            let tail = row.get(last).map(String::as_str).unwrap_or_default();
            let mut tails = wrapped(tail, self.width.max(before + 20), before, before).into_iter();
            line.push_str(tails.next().unwrap_or_default().trim_start());
            self.line(line.trim_end());
            tails.for_each(|more| self.line(&more));
        }
    }

    /// The finished page, ending in one newline.
    #[must_use]
    pub fn finish(self) -> String {
        let trimmed = self.text.trim_end_matches('\n');
        format!("{trimmed}\n")
    }
}

/// Which side of its column a cell keeps to.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Align {
    /// Words.
    Left,
    /// Numbers.
    Right,
}

fn padded(cell: &str, width: usize, align: Align) -> String {
    let space = " ".repeat(width.saturating_sub(columns(cell)));
    match align {
        Align::Left => format!("{cell}{space}"),
        Align::Right => format!("{space}{cell}"),
    }
}

/// A text in lines of at most `width` columns, broken at blanks; a word longer than a line is cut.
/// A no-break space ([`HARD_SPACE`]) is never broken at, and comes out as a blank.
#[must_use]
pub fn wrapped(text: &str, width: usize, first: usize, rest: usize) -> Vec<String> {
    let mut lines = Vec::new();
    let mut line = " ".repeat(first);
    let (mut used, mut empty) = (first, true);
    for word in text.split([' ', '\n']).filter(|word| !word.is_empty()) {
        let mut word = word.replace(HARD_SPACE, " ");
        if !empty && used + 1 + columns(&word) > width {
            lines.push(std::mem::replace(&mut line, " ".repeat(rest)));
            (used, empty) = (rest, true);
        }
        while empty && used + columns(&word) > width && width > used {
            let head: String = fitting(&word, width - used);
            word = word[head.len()..].to_owned();
            line.push_str(&head);
            lines.push(std::mem::replace(&mut line, " ".repeat(rest)));
            used = rest;
        }
        if !empty {
            line.push(' ');
            used += 1;
        }
        line.push_str(&word);
        used += columns(&word);
        empty = false;
    }
    lines.push(line);
    lines
}

/// The longest beginning of a word that takes at most `most` columns, at least one character.
fn fitting(word: &str, most: usize) -> String {
    let mut head = String::new();
    for c in word.chars() {
        let wider = columns(&head) + columns(c.encode_utf8(&mut [0; 4]));
        if !head.is_empty() && wider > most {
            break;
        }
        head.push(c);
    }
    head
}
