//! Text from files made harmless before a person or a terminal meets it.

/// Whether a character must not reach a terminal or a chart: control characters (C0, C1, DEL),
/// line and paragraph separators, marks that turn the direction of writing, and invisible
/// characters that let two names look alike.
#[must_use]
pub fn is_unsafe(c: char) -> bool {
    c.is_control()
        || matches!(
            c,
            '\u{061c}'
                | '\u{200b}'..='\u{200f}'
                | '\u{2028}'..='\u{202e}'
                | '\u{2060}'..='\u{206f}'
                | '\u{feff}'
                | '\u{fff9}'..='\u{fffb}'
                | '\u{fffe}'
                | '\u{ffff}'
        )
}

/// A text as it may be shown: every unsafe character becomes U+FFFD, so that it is seen.
#[must_use]
pub fn shown(text: &str) -> String {
    text.chars().map(|c| if is_unsafe(c) { '\u{fffd}' } else { c }).collect()
}

/// The same, cut to at most `most` characters with an ellipsis.
#[must_use]
pub fn shown_short(text: &str, most: usize) -> String {
    let shown = shown(text);
    if shown.chars().count() <= most {
        return shown;
    }
    let kept: String = shown.chars().take(most.saturating_sub(1)).collect();
    format!("{kept}\u{2026}")
}

/// A word as a shell takes it: bare where that is safe, else in single quotes.
#[must_use]
pub fn shell_word(word: &str) -> String {
    let word = shown(word);
    let bare =
        |c: char| c.is_ascii_alphanumeric() || matches!(c, '.' | '_' | '-' | '/' | ',' | ':');
    if !word.is_empty() && word.chars().all(bare) {
        return word;
    }
    format!("'{}'", word.replace('\'', "'\\''"))
}
