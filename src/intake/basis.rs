//! What a number counts: `as N` of a speciation column, and a basis that only the listing states.

use super::record::RecordReader;
use super::rows::Row;
use crate::ledger::Told;

impl RecordReader<'_> {
    /// One CAS number serves nitrate as N and as NO3: a result that does not say which counts as
    /// the listing says, and that is told.
    pub(super) fn tell_basis(&self, row: &Row, told: &mut Vec<Told>) {
        let listed = row.listed.map(|at| &self.site.analytes[at]);
        if let Some(analyte) = listed
            && row.basis == 0
            && let Some(basis) = &analyte.basis
        {
            told.push(Told::BasisTaken { analyte: analyte.name.clone(), basis: basis.clone() });
        }
    }
}

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
