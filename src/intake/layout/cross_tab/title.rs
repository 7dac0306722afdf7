//! Titles: an analyte and its unit above a block, in its corner, or at the head of a column.

use std::collections::HashSet;

use crate::intake::header::mapping;
use crate::site::{Column, Site, catalogue};
use crate::terms::{Unit, folded};

/// A name and the unit that stands with it, as written; empty where none does.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(super) struct Named {
    /// The name.
    pub(super) name: String,
    /// The unit.
    pub(super) unit: String,
}

/// A row of more cells than this is no row of labelled titles (judgement).
const MOST_PAIRED: usize = 8;

/// What title cells say.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub(super) struct Title {
    /// The analyte, if they name one.
    pub(super) analyte: Option<Named>,
    /// The unit, if they name one alone.
    pub(super) unit: Option<String>,
}

/// The names that are known: analytes of the site and the catalogue, wells of the site.
pub(super) struct Known {
    names: HashSet<String>,
    wells: HashSet<String>,
}

impl Known {
    pub(super) fn of(site: &Site) -> Self {
        let listed = site.analytes.iter();
        let listed = listed.flat_map(|a| std::iter::once(&a.name).chain(&a.aliases));
        let entries = catalogue::all().iter();
        let entries = entries.flat_map(|e| std::iter::once(&e.name).chain(&e.synonyms));
        let names = listed.map(|name| folded(name)).chain(entries.map(|name| folded(name)));
        let wells = site.wells.iter().flat_map(|well| {
            std::iter::once(&well.name).chain(well.aliases.iter().map(|alias| &alias.name))
        });
        Self { names: names.collect(), wells: wells.cloned().collect() }
    }

    /// Whether texts head columns of wells: two or more names, each of a listed well or with a
    /// digit in it, as wells have and words such as `Method` have not; or one of a listed well.
    pub(super) fn are_wells<'a>(&self, mut texts: impl ExactSizeIterator<Item = &'a str>) -> bool {
        let several = texts.len() > 1;
        texts.all(|text| {
            let digit = text.bytes().any(|byte| byte.is_ascii_digit());
            self.wells.contains(text) || (several && digit)
        })
    }

    /// Whether a text names an analyte: a name that is known, or one with a unit.
    pub(super) fn is_analyte(&self, text: &str) -> bool {
        let named = named(text);
        !named.name.is_empty() && (!named.unit.is_empty() || self.is_known(&named.name))
    }

    /// Whether a text is the name of a known analyte.
    pub(super) fn is_known(&self, text: &str) -> bool {
        self.names.contains(&folded(&named(text).name)) || self.names.contains(&folded(text))
    }

    /// What a row of one cell, or of pairs such as `Analyte: | Benzene`, says as a title.
    pub(super) fn title(&self, cells: &[&str]) -> Option<Title> {
        let title = match cells {
            [one] => {
                match one.split_once(':').map(|(label, rest)| (labelled(label), rest.trim())) {
                    Some((Some(column), rest)) if !rest.is_empty() => pair(column, rest),
                    _ if self.is_analyte(one) => Title { analyte: Some(named(one)), unit: None },
                    _ => Title::default(),
                }
            }
            cells if cells.len() <= MOST_PAIRED && cells.len() % 2 == 0 => {
                let mut title = Title::default();
                for two in cells.chunks(2) {
                    let column = labelled(two[0].trim_end_matches(':'))?;
                    if labelled(two[1]).is_some() {
                        return None;
                    }
                    let pair = pair(column, two[1]);
                    title.analyte = title.analyte.or(pair.analyte);
                    title.unit = title.unit.or(pair.unit);
                }
                title
            }
            _ => Title::default(),
        };
        (title != Title::default()).then_some(title)
    }
}

/// What `label: text` says.
fn pair(column: Column, text: &str) -> Title {
    match column {
        Column::Analyte => Title { analyte: Some(named(text)), unit: None },
        Column::Unit => Title { analyte: None, unit: Some(text.to_owned()) },
        _ => Title::default(),
    }
}

/// The column that a label is a usual word for, if it is of the analyte or the unit.
fn labelled(label: &str) -> Option<Column> {
    let mapping = mapping(std::iter::once(label), &std::collections::BTreeMap::new()).ok()?;
    let column = mapping.cells.keys().next().copied();
    column.filter(|column| matches!(column, Column::Analyte | Column::Unit))
}

/// Whether a text is a unit; ppb and ppm are, though only the site file says what they mean.
pub(super) fn is_unit(text: &str) -> bool {
    Unit::read(text).is_some() || ["ppb", "ppm"].iter().any(|u| text.trim().eq_ignore_ascii_case(u))
}

/// Splits `Benzene (ug/L)`, `Benzene [ug/L]`, `Benzene, ug/L` and `Benzene in ug/L`.
pub(super) fn named(text: &str) -> Named {
    let text = text.trim();
    let split = |name: &str, unit: &str| {
        let name = name.trim().trim_end_matches([',', ';', ':', '-', '\u{2013}']).trim();
        let name = name.strip_suffix(" in").unwrap_or(name).trim();
        Named { name: name.to_owned(), unit: unit.trim().to_owned() }
    };
    for (open, close) in [('(', ')'), ('[', ']')] {
        if let (Some(from), true) = (text.find(open), text.ends_with(close)) {
            // The last bracket that holds a unit: names have brackets of their own.
            let opens = text[from..].char_indices().filter(|(_, c)| *c == open);
            for (at, _) in opens {
                let inside = &text[from + at + 1..text.len() - 1];
                if is_unit(inside) {
                    return split(&text[..from + at], inside);
                }
            }
        }
    }
    for cut in [',', ' '] {
        if let Some((name, unit)) = text.rsplit_once(cut)
            && is_unit(unit)
        {
            return split(name, unit);
        }
    }
    Named { name: text.to_owned(), unit: String::new() }
}

#[cfg(test)]
mod tests {
    use super::{Known, Named, Site, Title, named};

    fn split(name: &str, unit: &str) -> Named {
        Named { name: name.to_owned(), unit: unit.to_owned() }
    }

    #[test]
    fn a_name_is_split_from_its_unit_and_never_from_its_own_commas() {
        for (text, name, unit) in [
            ("Benzene (ug/L)", "Benzene", "ug/L"),
            ("Nitrate (mg/L as N)", "Nitrate", "mg/L as N"),
            ("1,2-Dichloroethane, ug/L", "1,2-Dichloroethane", "ug/L"),
            ("1,2-Dichloroethane", "1,2-Dichloroethane", ""),
            ("Benzene in \u{b5}g/L", "Benzene", "\u{b5}g/L"),
            ("Chromium(VI) [mg/L]", "Chromium(VI)", "mg/L"),
            ("Vinyl chloride", "Vinyl chloride", ""),
            ("Temp (C)", "Temp (C)", ""),
        ] {
            assert_eq!(named(text), split(name, unit), "{text}");
        }
    }

    #[test]
    fn a_title_names_a_known_analyte_or_one_with_a_unit_or_a_labelled_one() {
        let known = Known::of(&Site::bare());
        let analyte = |name, unit| Some(Title { analyte: Some(split(name, unit)), unit: None });
        assert_eq!(known.title(&["benzene"]), analyte("benzene", ""));
        assert_eq!(known.title(&["Phlogiston (ug/L)"]), analyte("Phlogiston", "ug/L"));
        assert_eq!(known.title(&["Parameter: Phlogiston"]), analyte("Phlogiston", ""));
        assert_eq!(known.title(&["Table 3. Results of 2024"]), None);
        assert_eq!(known.title(&["Units:", "mg/L"]).and_then(|t| t.unit), Some("mg/L".into()));
        assert_eq!(known.title(&["Analyte", "Units"]), None);
        assert_eq!(known.title(&["MW-1", "5"]), None);
    }
}
