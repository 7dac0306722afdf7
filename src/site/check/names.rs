//! Lists of names, and names that refer to what is listed.

use std::collections::BTreeMap;

use super::super::checked::{Listing, Site};
use super::super::problem::ProblemKind;
use super::super::written::{At, Problems};
use crate::terms::nearest;

/// A list of texts without repeats; a repeat is told.
pub(super) fn texts(
    list: Option<&At<Vec<At<String>>>>,
    problems: &mut Problems<'_>,
) -> Vec<String> {
    let items = list.map_or(&[][..], |list| list.value.as_slice());
    distinct(items.iter().map(|item| (item.value.clone(), item)), problems);
    items.iter().map(|item| item.value.clone()).collect()
}

/// Well names, each alias replaced by its well's name. Wells need not be listed.
pub(super) fn wells(
    list: Option<&At<Vec<At<String>>>>,
    site: &Site,
    problems: &mut Problems<'_>,
) -> Vec<String> {
    let canonical = |name: String| {
        if site.well_named(&name).is_some() {
            return name;
        }
        let mut with_alias =
            site.wells.iter().filter(|well| well.aliases.iter().any(|alias| alias.name == name));
        match (with_alias.next(), with_alias.next()) {
            (Some(well), None) => well.name.clone(),
            _ => name,
        }
    };
    texts(list, problems).into_iter().map(canonical).collect()
}

/// Analyte names as listed; one that is not listed is told, where analytes are listed at all.
pub(super) fn analytes(
    list: Option<&At<Vec<At<String>>>>,
    site: &Site,
    problems: &mut Problems<'_>,
) -> Vec<String> {
    texts(list, problems);
    let items = list.map_or(&[][..], |list| list.value.as_slice());
    items.iter().filter_map(|item| analyte(item, site, problems)).collect()
}

/// One analyte name as listed.
pub(super) fn analyte(at: &At<String>, site: &Site, problems: &mut Problems<'_>) -> Option<String> {
    if site.listing == Listing::Everything {
        return Some(at.value.clone());
    }
    let found = site.analyte_of(None, &at.value);
    if found.is_none() {
        let listed = site.analytes.iter().flat_map(|a| std::iter::once(&a.name).chain(&a.aliases));
        let kind = ProblemKind::NotListed {
            found: at.value.clone(),
            what: "analyte",
            nearest: nearest(&at.value, listed.map(String::as_str)).map(str::to_owned),
        };
        problems.tell(at, kind);
    }
    found.map(|(index, _)| site.analytes[index].name.clone())
}

/// Tells of the second and every further thing that carries one name.
pub(super) fn distinct<'a, K: Ord, T: std::fmt::Display + 'a>(
    items: impl Iterator<Item = (K, &'a At<T>)>,
    problems: &mut Problems<'_>,
) {
    let mut seen: BTreeMap<K, usize> = BTreeMap::new();
    for (name, at) in items {
        match seen.get(&name) {
            Some(line) => {
                let what = format!("\"{}\"", at.value);
                problems.tell(at, ProblemKind::Duplicate { what, first: Some(*line) });
            }
            None => {
                seen.insert(name, at.line);
            }
        }
    }
}
