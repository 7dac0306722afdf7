//! File names from the names of wells and analytes: safe everywhere, and never two the same.

use std::collections::BTreeMap;

use sha2::{Digest, Sha256};

use crate::series::SeriesKey;

/// Longest name without its ending, in characters.
const LONGEST: usize = 80;
/// Characters of the hash that tells two names apart.
const HASH_CHARS: usize = 8;
/// Names that Windows keeps for devices, with or without an ending.
const RESERVED: [&str; 4] = ["con", "prn", "aux", "nul"];

/// A text as part of a file name: `[A-Za-z0-9._-]` stays, everything else becomes `_`; no point or
/// blank at the end, no device name, at most 80 characters, never empty.
#[must_use]
pub fn safe(text: &str) -> String {
    let kept = |c: char| c.is_ascii_alphanumeric() || matches!(c, '.' | '_' | '-');
    let mut name: String =
        text.chars().map(|c| if kept(c) { c } else { '_' }).take(LONGEST).collect();
    while name.ends_with('.') {
        name.pop();
    }
    // A leading point hides a file, a leading hyphen looks like an option.
    if name.is_empty() || name.starts_with(['.', '-']) || is_device(&name) {
        name.insert(0, '_');
        name.truncate(LONGEST);
    }
    name
}

/// Whether a name means a device: `CON`, `nul.txt`, `COM1`, `lpt9.svg`.
fn is_device(name: &str) -> bool {
    let stem = name.split('.').next().unwrap_or(name).to_ascii_lowercase();
    let port = |head: &str| {
        stem.strip_prefix(head).is_some_and(|rest| matches!(rest.as_bytes(), [b'1'..=b'9']))
    };
    RESERVED.contains(&stem.as_str()) || port("com") || port("lpt")
}

/// `<well>--<analyte>[--<fraction>][--<depth>]` of a series, before collisions are resolved.
fn stem(key: &SeriesKey) -> String {
    let parts = [key.well.as_str(), &key.analyte, key.fraction_code(), key.depth_text()];
    let present: Vec<&str> = parts.into_iter().filter(|part| !part.is_empty()).collect();
    safe(&present.join("--"))
}

/// One name a series, in their order, with the ending `.svg`.
///
/// Names that agree without regard to case each get a short hash of the series' whole key, so that a
/// series keeps its name whatever its neighbours are called; so does a name that had to be cut.
#[must_use]
pub fn chart_names(keys: &[&SeriesKey]) -> Vec<String> {
    let stems: Vec<String> = keys.iter().map(|key| stem(key)).collect();
    let mut uses: BTreeMap<String, usize> = BTreeMap::new();
    for stem in &stems {
        *uses.entry(stem.to_ascii_lowercase()).or_default() += 1;
    }
    let mut taken: BTreeMap<String, usize> = BTreeMap::new();
    keys.iter()
        .zip(stems)
        .map(|(key, stem)| {
            let alone = uses.get(&stem.to_ascii_lowercase()) == Some(&1);
            let name = if alone && stem.len() < LONGEST { stem } else { hashed(&stem, key) };
            unique(&name, &mut taken)
        })
        .collect()
}

/// The name with the hash of the whole key at its end.
fn hashed(stem: &str, key: &SeriesKey) -> String {
    let mut hash = Sha256::new();
    for part in [&key.site, &key.well, &key.analyte, key.fraction_code(), key.depth_text()] {
        hash.update(part.as_bytes());
        // No text holds a NUL that a file could keep, so parts cannot run into each other.
        hash.update([0]);
    }
    let hex: String =
        hash.finalize().iter().take(HASH_CHARS / 2).map(|b| format!("{b:02x}")).collect();
    let room = LONGEST - HASH_CHARS - 1;
    let head: String = stem.chars().take(room).collect();
    format!("{head}-{hex}")
}

/// The name, with a number where even the hash agrees with an earlier one.
fn unique(name: &str, taken: &mut BTreeMap<String, usize>) -> String {
    let uses = taken.entry(name.to_ascii_lowercase()).or_default();
    *uses += 1;
    if *uses == 1 { format!("{name}.svg") } else { format!("{name}-{uses}.svg") }
}
