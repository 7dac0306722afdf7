//! Dates with the month in words: English, French, German, Spanish, in full or short.

/// Day, month and year of a date with the month in words; which of two numbers is the day follows
/// from their places: `12 March 2024`, `March 12, 2024`, `2024 March 12`.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Named {
    /// The day.
    pub day: String,
    /// The month, 1 to 12.
    pub month: u32,
    /// The year as written.
    pub year: String,
}

/// Names of the months, folded, January first: the full and the usual short ones of the four
/// languages (dictionary forms; a word that is a month in one of them is the same month in the
/// others).
const MONTHS: [&[&str]; 12] = [
    &["january", "jan", "janvier", "janv", "januar", "janner", "jaenner", "enero", "ene"],
    &["february", "feb", "febr", "fevrier", "fevr", "fev", "februar", "febrero"],
    &["march", "mar", "mars", "marz", "maerz", "mrz", "marzo"],
    &["april", "apr", "avril", "avr", "abril", "abr"],
    &["may", "mai", "mayo"],
    &["june", "jun", "juin", "juni", "junio"],
    &["july", "jul", "juillet", "juil", "juli", "julio"],
    &["august", "aug", "aout", "agosto", "ago"],
    &["september", "sep", "sept", "septembre", "septiembre", "setiembre"],
    &["october", "oct", "octobre", "oktober", "okt", "octubre"],
    &["november", "nov", "novembre", "noviembre"],
    &["december", "dec", "decembre", "dezember", "dez", "diciembre", "dic"],
];

/// Small words between the parts.
const BETWEEN: [&str; 4] = ["de", "del", "of", "le"];

/// Endings of a day's number: `12th`, `1er`.
const ORDINALS: [&str; 5] = ["st", "nd", "rd", "th", "er"];

/// The month that a word names.
#[must_use]
pub fn month(word: &str) -> Option<u32> {
    let folded = folded(word);
    MONTHS.iter().zip(1..).find(|(names, _)| names.contains(&folded.as_str())).map(|(_, n)| n)
}

/// Reads a date with the month in words.
#[must_use]
pub fn named(text: &str) -> Option<Named> {
    let words = words(text)?;
    let words: Vec<&str> = words
        .iter()
        .map(String::as_str)
        .filter(|w| !BETWEEN.contains(&folded(w).as_str()))
        .collect();
    let words = without_ordinal(&words);
    let [a, b, c] = words[..] else { return None };
    let made = |day: &str, at: &str, year: &str| {
        let sound = (1..=2).contains(&day.len()) && digits(day) && digits(year);
        let month = month(at).filter(|_| sound)?;
        Some(Named { day: day.to_owned(), month, year: year.to_owned() })
    };
    if a.len() == 4 && digits(a) {
        return made(c, b, a);
    }
    made(a, b, c).or_else(|| made(b, a, c))
}

/// Words and numbers, in order; nothing but blanks, `-`, `/`, `.` and `,` may stand between them.
fn words(text: &str) -> Option<Vec<String>> {
    let mut words: Vec<String> = Vec::new();
    let mut before = None;
    for c in text.chars() {
        let kind = match c {
            c if c.is_ascii_digit() => Some('0'),
            c if c.is_alphabetic() => Some('a'),
            c if c.is_whitespace() || matches!(c, '-' | '/' | '.' | ',') => None,
            _ => return None,
        };
        match (kind, words.last_mut()) {
            (None, _) => {}
            (Some(_), Some(word)) if kind == before => word.push(c),
            (Some(_), _) => words.push(c.into()),
        }
        before = kind;
    }
    Some(words)
}

/// The words without the ending of the day's number.
fn without_ordinal<'a>(words: &[&'a str]) -> Vec<&'a str> {
    let after_number = |at: usize| at > 0 && words.get(at - 1).is_some_and(|word| digits(word));
    let ending =
        |at: usize, word: &str| after_number(at) && ORDINALS.contains(&folded(word).as_str());
    words
        .iter()
        .enumerate()
        .filter(|(at, word)| !ending(*at, word))
        .map(|(_, word)| *word)
        .collect()
}

fn digits(text: &str) -> bool {
    !text.is_empty() && text.bytes().all(|b| b.is_ascii_digit())
}

/// A word in lower case and without accents.
fn folded(word: &str) -> String {
    let plain = |c: char| match c {
        '\u{e9}' | '\u{e8}' => 'e',
        '\u{fb}' | '\u{fc}' => 'u',
        '\u{e4}' => 'a',
        c => c,
    };
    word.chars().flat_map(char::to_lowercase).map(plain).collect()
}

#[cfg(test)]
mod tests {
    use super::{MONTHS, month, named};

    fn read(text: &str) -> String {
        named(text).map_or_else(
            || "none".to_owned(),
            |date| format!("{} {} {}", date.year, date.month, date.day),
        )
    }

    #[test]
    fn the_month_is_found_in_four_languages_and_every_usual_place() {
        for text in [
            "12-Mar-2024",
            "12 March 2024",
            "Mar 12, 2024",
            "MARCH 12 2024",
            "March 12th, 2024",
            "12. M\u{e4}rz 2024",
            "12.Mrz.2024",
            "12 mars 2024",
            "12 de marzo de 2024",
            "12/MAR/2024",
            "12MAR2024",
            "2024-Mar-12",
        ] {
            assert_eq!(read(text), "2024 3 12", "{text}");
        }
        assert_eq!(read("1er f\u{e9}vr. 2024"), "2024 2 1");
        assert_eq!(read("3. J\u{e4}nner 2024"), "2024 1 3");
        assert_eq!(read("3 ao\u{fb}t 2024"), "2024 8 3");
    }

    #[test]
    fn a_date_without_a_day_or_with_another_word_is_none() {
        for text in
            ["Mar-2024", "March 2024", "12 Lenz 2024", "12 Mar", "Tue 12 Mar 2024", "12-Mar~2024"]
        {
            assert_eq!(read(text), "none", "{text}");
        }
    }

    #[test]
    fn no_word_names_two_months() {
        for (names, number) in MONTHS.iter().zip(1..) {
            for name in *names {
                assert_eq!(month(name), Some(number), "{name}");
            }
        }
    }
}
