//! A result cell as laboratories spell it: sign, number, unit and codes, or a word for "not
//! detected". What is not certain is unreadable, never guessed.

use super::number::{NumberForm, number};
use super::qualifier::{Code, codes, usual};
use crate::terms::{Unit, UnitText};

/// What a result cell says about the number.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum ResultCell {
    /// Nothing.
    Empty,
    /// A number.
    Number(f64),
    /// `<v`.
    Below(f64),
    /// `>v`.
    Above(f64),
    /// `ND` without a number.
    NotDetected,
    /// Anything else.
    Unreadable,
}

/// A result cell as read.
#[derive(Clone, Debug, PartialEq)]
pub struct Cell {
    /// The number, or what stands in its place.
    pub result: ResultCell,
    /// Qualifier codes that stand in the cell: `0.5 UJ`.
    pub codes: Vec<String>,
    /// The unit, if it stands in the cell: `<0.5 ug/L`.
    pub unit: Option<UnitText>,
}

/// Words for "not detected", folded (common practice, no source): English, and what German, French
/// and Spanish laboratories write.
const NOT_DETECTED: [&str; 29] = [
    "nd",
    "u",
    "nondetect",
    "nondetected",
    "nondetectable",
    "notdetected",
    "notdetectable",
    "nonedetected",
    "undetected",
    "bdl",
    "bmdl",
    "brl",
    "bql",
    "blq",
    "blod",
    "bloq",
    "bpql",
    "belowdetection",
    "belowdetectionlimit",
    "belowmethoddetectionlimit",
    "belowreportinglimit",
    "belowquantitationlimit",
    "belowquantificationlimit",
    "nn",
    "nichtnachweisbar",
    "nichtnachgewiesen",
    "nondetecte",
    "nodetectado",
    "nodetectada",
];

/// Names of limits, folded (common practice, no source): `<RL`, `ND (MDL = 0.5)`. The last four are
/// the German and French ones.
const LIMITS: [&str; 17] = [
    "rl",
    "dl",
    "mdl",
    "pql",
    "lod",
    "loq",
    "mrl",
    "lrl",
    "crdl",
    "crql",
    "reportinglimit",
    "detectionlimit",
    "methoddetectionlimit",
    "bg",
    "ng",
    "lq",
    "ld",
];

/// Reads a result cell.
#[must_use]
pub fn cell(text: &str, form: NumberForm) -> Cell {
    let text = text.trim();
    let read = match text.chars().next() {
        None => Some(Cell::of(ResultCell::Empty)),
        Some('<') if LIMITS.contains(&folded_word(&text[1..]).as_str()) => {
            Some(Cell::of(ResultCell::NotDetected))
        }
        Some('<') => valued(&text[1..], form, ResultCell::Below),
        Some('>') => valued(&text[1..], form, ResultCell::Above),
        Some(c) if c.is_alphabetic() => worded(text, form),
        Some(_) => valued(text, form, ResultCell::Number),
    };
    read.unwrap_or_else(|| Cell::of(ResultCell::Unreadable))
}

impl Cell {
    fn of(result: ResultCell) -> Self {
        Self { result, codes: Vec::new(), unit: None }
    }
}

/// A number, then perhaps its unit, then perhaps codes.
fn valued(text: &str, form: NumberForm, made: fn(f64) -> ResultCell) -> Option<Cell> {
    let text = text.trim_start();
    let (digits, rest) = text.split_at(number_end(text, form));
    let result = made(number(digits, form)?);
    let (unit, codes) = unit_and_codes(rest)?;
    Some(Cell { result, codes, unit })
}

/// Where the number at the start of a text ends. An `e` belongs to it only before digits, so that
/// `0.5E` is a number with a code.
fn number_end(text: &str, form: NumberForm) -> usize {
    let bytes = text.as_bytes();
    let digit = |at: usize| bytes.get(at).is_some_and(u8::is_ascii_digit);
    let sign = |at: usize| matches!(bytes.get(at), Some(b'+' | b'-'));
    let mut end = 0;
    let mut in_exponent = false;
    for (at, c) in text.char_indices() {
        let after = at + c.len_utf8();
        let belongs = match c {
            '0'..='9' | '.' => true,
            ',' => digit(after),
            '+' | '-' => at == 0 || (in_exponent && matches!(bytes[at - 1], b'e' | b'E')),
            'e' | 'E' if !in_exponent && at > 0 => {
                in_exponent = digit(after) || (sign(after) && digit(after + 1));
                in_exponent
            }
            c => form.thousands == Some(c) && at > 0 && digit(after),
        };
        if !belongs {
            break;
        }
        end = after;
    }
    end
}

/// What follows a number: a unit of the closed list, codes, both in either order, or nothing.
fn unit_and_codes(rest: &str) -> Option<(Option<UnitText>, Vec<String>)> {
    let words: Vec<&str> = rest.split_whitespace().collect();
    if let Some(codes) = all_codes(&words) {
        return Some((None, codes));
    }
    // The shortest run of words that is a unit, at either end; the others must be codes.
    for taken in 1..=words.len() {
        let (head, tail) = words.split_at(taken);
        let finished = !head.last().is_some_and(|word| word.eq_ignore_ascii_case("as"));
        if let (true, Some(unit), Some(codes)) =
            (finished, Unit::read(&head.join(" ")), all_codes(tail))
        {
            return Some((Some(unit), codes));
        }
        let (head, tail) = words.split_at(words.len() - taken);
        if let (Some(codes), Some(unit)) = (all_codes(head), Unit::read(&tail.join(" "))) {
            return Some((Some(unit), codes));
        }
    }
    None
}

/// The words as qualifier codes, if each is one.
fn all_codes(words: &[&str]) -> Option<Vec<String>> {
    let mut found = Vec::new();
    for word in words {
        for (open, close) in [('(', ')'), ('[', ']')] {
            if word.starts_with(open) != word.ends_with(close) {
                return None;
            }
        }
        let bare = word.trim_matches(|c| matches!(c, '(' | ')' | '[' | ']'));
        if bare.is_empty() || Unit::read(bare).is_some() {
            return None;
        }
        for code in codes(bare) {
            found.push(known_code(code)?);
        }
    }
    Some(found)
}

/// A code: a usual one in either case, or one or two capital letters, or asterisks, which then need
/// their legend. Longer words are no codes, so that a unit outside the closed list never passes as
/// one.
fn known_code(code: &str) -> Option<String> {
    let letters = code.trim_end_matches(['+', '-', '\u{2212}']);
    let capitals = (1..=2).contains(&letters.len())
        && letters.bytes().all(|b| b.is_ascii_uppercase())
        && code.chars().count() <= letters.len() + 1;
    let asterisks = code.bytes().all(|b| b == b'*');
    if code.len() > 1 && NOT_DETECTED.contains(&folded_word(code).as_str()) {
        return Some("ND".to_owned());
    }
    let means = !matches!(usual(code), Code::NeedsLegend) && !matches!(code, "<" | ">");
    (means || capitals || asterisks).then(|| code.to_owned())
}

/// A word for "not detected", alone, with its limit, or with codes.
fn worded(text: &str, form: NumberForm) -> Option<Cell> {
    let is_word = |text: &str| NOT_DETECTED.contains(&folded_word(text).as_str());
    if is_word(text) {
        return Some(Cell::of(ResultCell::NotDetected));
    }
    if let Some((word, rest)) = text.split_once(char::is_whitespace)
        && is_word(word)
        && let Some(codes) = all_codes(&rest.split_whitespace().collect::<Vec<_>>())
    {
        return Some(Cell { result: ResultCell::NotDetected, codes, unit: None });
    }
    let at = text.find(|c: char| c.is_ascii_digit() || "<([@:=".contains(c))?;
    // `ND .5` and `U.5`: the point before the first digit belongs to the number.
    let at = if text[..at].ends_with('.') && text[at..].starts_with(|c: char| c.is_ascii_digit()) {
        at - 1
    } else {
        at
    };
    let (word, rest) = text.split_at(at);
    let word = word.trim_end();
    if !is_word(word) && !word.strip_suffix(" at").is_some_and(is_word) {
        return None;
    }
    let rest = rest.trim_start_matches(['@', ':', '=']).trim();
    let inside = [('(', ')'), ('[', ']')]
        .into_iter()
        .find_map(|(open, close)| rest.strip_prefix(open)?.strip_suffix(close))
        .unwrap_or(rest)
        .trim();
    let named = inside.find(|c: char| !c.is_alphabetic()).map(|end| inside.split_at(end));
    let value = match named {
        Some((name, value)) if LIMITS.contains(&folded_word(name).as_str()) => {
            value.trim_start().trim_start_matches(['=', ':'])
        }
        _ => inside,
    };
    let value = value.trim_start();
    valued(value.strip_prefix('<').unwrap_or(value), form, ResultCell::Below)
}

/// A word without case, blanks, points, hyphens, slashes and accents.
fn folded_word(text: &str) -> String {
    text.chars()
        .filter(|c| {
            !c.is_whitespace() && !matches!(c, '.' | '-' | '_' | '/' | '\u{2010}'..='\u{2013}')
        })
        .flat_map(char::to_lowercase)
        .map(|c| if matches!(c, '\u{e8}' | '\u{e9}') { 'e' } else { c })
        .collect()
}
