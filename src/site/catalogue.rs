//! The embedded catalogue of analytes: CAS numbers, other names, formulas, half-lives.

use std::sync::LazyLock;

use crate::terms::folded;

use super::cas::trimmed;

/// The table itself; its header says where the facts come from.
const TABLE: &str = include_str!("catalogue.csv");

static ENTRIES: LazyLock<Vec<Entry>> = LazyLock::new(|| {
    TABLE.lines().filter(|line| !line.starts_with('#')).filter_map(entry).collect()
});

/// One substance, mixture or measure.
#[derive(Clone, Debug, PartialEq)]
pub struct Entry {
    /// The usual short name.
    pub name: &'static str,
    /// The CAS number; mixtures and sums have none.
    pub cas: Option<&'static str>,
    /// Other names in laboratory files.
    pub synonyms: Vec<&'static str>,
    /// The formula of what the number counts.
    pub formula: Option<&'static str>,
    /// The half-life of a radionuclide.
    pub half_life_years: Option<f64>,
}

fn entry(line: &'static str) -> Option<Entry> {
    let mut cells = line.split(';');
    let name = cells.next()?;
    let filled = |cell: &'static str| (!cell.is_empty()).then_some(cell);
    Some(Entry {
        name,
        cas: filled(cells.next()?),
        synonyms: cells.next()?.split('|').filter(|name| !name.is_empty()).collect(),
        formula: filled(cells.next()?),
        half_life_years: filled(cells.next()?).and_then(|years| years.parse().ok()),
    })
}

/// Every entry, in the order of the table.
#[must_use]
pub fn all() -> &'static [Entry] {
    &ENTRIES
}

/// The entry with this CAS number.
#[must_use]
pub fn by_cas(cas: &str) -> Option<&'static Entry> {
    let cas = trimmed(cas);
    all().iter().find(|entry| entry.cas == Some(cas))
}

/// The entry with this name or synonym; case, blanks and hyphens do not matter.
#[must_use]
pub fn by_name(name: &str) -> Option<&'static Entry> {
    let name = folded(name);
    let named = |entry: &&Entry| {
        std::iter::once(&entry.name).chain(&entry.synonyms).any(|known| folded(known) == name)
    };
    all().iter().find(named)
}

/// The entry of an analyte: by its CAS number if it has one, else by its name.
#[must_use]
pub fn find(cas: Option<&str>, name: &str) -> Option<&'static Entry> {
    match cas {
        Some(cas) => by_cas(cas),
        None => by_name(name),
    }
}
