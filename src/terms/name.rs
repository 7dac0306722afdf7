//! How names are compared: folded for matching, and the nearest known one for a message.

/// A name as it is matched: case, blanks and hyphens folded away (rules for analytes and sites).
///
/// `cis-1,2-DCE` and `CIS 1,2 dce` fold to the same text. Wells are never folded: `001` is not `1`.
#[must_use]
pub fn folded(name: &str) -> String {
    name.chars()
        .filter(|c| !c.is_whitespace() && !matches!(c, '-' | '\u{2010}'..='\u{2014}' | '_'))
        .flat_map(char::to_lowercase)
        .collect()
}

/// The known name nearest to what was written, if any is near enough to be meant.
///
/// Near enough: a Jaro–Winkler similarity of at least 0.75 (judgement: lets `Benzen` and
/// `confidnce` through and keeps `Zinc` from answering `Lead`).
#[must_use]
pub fn nearest<'a>(written: &str, known: impl IntoIterator<Item = &'a str>) -> Option<&'a str> {
    const NEAR_ENOUGH: f64 = 0.75;
    let written = folded(written);
    known
        .into_iter()
        .map(|name| (strsim::jaro_winkler(&written, &folded(name)), name))
        .filter(|(similarity, _)| *similarity >= NEAR_ENOUGH)
        .max_by(|a, b| a.0.total_cmp(&b.0).then_with(|| b.1.cmp(a.1)))
        .map(|(_, name)| name)
}

#[cfg(test)]
mod tests {
    use super::{folded, nearest};

    #[test]
    fn case_blanks_and_hyphens_do_not_tell_names_apart() {
        assert_eq!(folded("cis-1,2-DCE"), folded("CIS 1,2 dce"));
        assert_ne!(folded("1,1-DCE"), folded("1,2-DCE"));
    }

    #[test]
    fn a_misspelling_finds_its_name_and_nonsense_finds_none() {
        assert_eq!(nearest("confidnce", ["confidence", "horizon-years"]), Some("confidence"));
        assert_eq!(nearest("qqqq", ["confidence", "horizon-years"]), None);
    }
}
