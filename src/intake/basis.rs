//! What a number counts: `as N` of a speciation column, and a basis that only the listing states.

/// The bare basis of a cell: `as N` and `N` are one.
#[must_use]
pub fn bare(text: &str) -> &str {
    let text = text.trim();
    match text.split_once(char::is_whitespace) {
        Some((first, rest)) if first.eq_ignore_ascii_case("as") => rest.trim(),
        _ => text,
    }
}

#[cfg(test)]
mod tests {
    use super::bare;

    #[test]
    fn the_word_as_says_nothing_more() {
        assert_eq!(
            [bare("as N"), bare(" As  CaCO3 "), bare("NO3"), bare("as")].join(" "),
            "N CaCO3 NO3 as"
        );
    }
}
