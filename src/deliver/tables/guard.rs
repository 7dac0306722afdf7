//! Text that a spreadsheet must not take for a formula.

use std::borrow::Cow;

/// A text field as CSV holds it.
///
/// Text that starts with `=`, `+`, `-`, `@`, tab, carriage return or `'` gets a leading `'`, so that
/// no spreadsheet evaluates it and [`csv_text_back`] gives the text again. A field that is wholly a
/// number (`-5`) never does. NUL, which no spreadsheet holds, becomes U+FFFD.
#[must_use]
pub fn csv_text(text: &str) -> Cow<'_, str> {
    let text = if text.contains('\0') {
        Cow::Owned(text.replace('\0', "\u{fffd}"))
    } else {
        Cow::Borrowed(text)
    };
    if needs_guard(&text) { Cow::Owned(format!("'{text}")) } else { text }
}

/// The text that [`csv_text`] guarded.
#[must_use]
pub fn csv_text_back(field: &str) -> &str {
    field.strip_prefix('\'').unwrap_or(field)
}

fn needs_guard(text: &str) -> bool {
    text.starts_with(['=', '+', '-', '@', '\t', '\r', '\'']) && !is_number(text)
}

/// Whether a field is wholly a number: a sign, digits with at most one point, an exponent.
fn is_number(text: &str) -> bool {
    let digits = text.strip_prefix(['-', '+']).unwrap_or(text);
    digits.starts_with(|c: char| c.is_ascii_digit() || c == '.')
        && digits
            .bytes()
            .all(|b| b.is_ascii_digit() || matches!(b, b'.' | b'e' | b'E' | b'-' | b'+'))
        && text.parse::<f64>().is_ok_and(f64::is_finite)
}
