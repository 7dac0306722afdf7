//! Which files a run reads, in which order, under which names, and how each is declared.

use std::path::{Path, PathBuf};

use sha2::{Digest, Sha256};

use crate::ledger::SourceError;
use crate::site::{ResultsRule, Site};

/// Where results come from.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Sources {
    /// A site folder's `results/`.
    Folder(PathBuf),
    /// Results files named one by one.
    Files(Vec<PathBuf>),
    /// Standard input, already read by the caller.
    Standard(Vec<u8>),
}

/// One results file, read whole.
#[derive(Clone, Debug)]
pub struct Found {
    /// The shown path.
    pub name: String,
    /// Its bytes.
    pub bytes: Vec<u8>,
    /// SHA-256 of the bytes, in hex.
    pub sha256: String,
    /// The place of its rule among the site's; the number of rules where none matches.
    pub rule: usize,
}

/// What was found.
#[derive(Clone, Debug, Default)]
pub struct Collected {
    /// Files in order of delivery.
    pub found: Vec<Found>,
    /// Files that were not read, each named.
    pub refused: Vec<SourceError>,
    /// Files in the results folder that are no results files, left alone.
    pub ignored: Vec<String>,
}

/// Endings of results files. Those that turn out to be of a kind that is not read are named, each
/// with what to do; what a file is, its bytes say.
const RESULTS: [&str; 11] =
    ["csv", "txt", "tsv", "tab", "dat", "xlsx", "xlsm", "xls", "xlsb", "ods", "parquet"];

/// Reads every file of the sources: in the order of the site's rules, then of the names.
#[must_use]
pub fn collect(sources: &Sources, site: &Site) -> Collected {
    let mut out = Collected::default();
    let named: Vec<(String, PathBuf)> = match sources {
        Sources::Standard(bytes) => {
            let rule = rule_of("-", &site.results);
            out.found.push(found("-".to_owned(), bytes.clone(), rule));
            return out;
        }
        Sources::Folder(folder) => folder_files(folder, &mut out),
        Sources::Files(paths) => shortest_tails(paths),
    };
    let mut ordered: Vec<(usize, String, PathBuf)> =
        named.into_iter().map(|(name, path)| (rule_of(&name, &site.results), name, path)).collect();
    ordered.sort();
    for (rule, name, path) in ordered {
        let ending = path.extension().and_then(|e| e.to_str()).map(str::to_ascii_lowercase);
        let in_folder = matches!(sources, Sources::Folder(_));
        match ending.as_deref() {
            // What a person names is read whatever its ending; a folder holds other things too.
            ending if in_folder && !ending.is_some_and(|ending| RESULTS.contains(&ending)) => {
                out.ignored.push(name);
                continue;
            }
            _ => {}
        }
        match std::fs::read(&path) {
            Ok(bytes) => {
                let file = found(name, bytes, rule);
                match out.found.iter().find(|other| other.sha256 == file.sha256) {
                    Some(other) => out.refused.push(SourceError::GivenTwice {
                        name: file.name,
                        same_as: other.name.clone(),
                    }),
                    None => out.found.push(file),
                }
            }
            Err(error) => out.refused.push(SourceError::Io { name, why: error.to_string() }),
        }
    }
    out
}

fn found(name: String, bytes: Vec<u8>, rule: usize) -> Found {
    let sha256 = sha256_hex(&bytes);
    Found { name, bytes, sha256, rule }
}

/// SHA-256 of bytes, in hex.
#[must_use]
pub fn sha256_hex(bytes: &[u8]) -> String {
    hex(&Sha256::digest(bytes))
}

/// Bytes in lower-case hexadecimal.
#[must_use]
pub fn hex(bytes: &[u8]) -> String {
    use std::fmt::Write as _;
    bytes.iter().fold(String::new(), |mut text, byte| {
        // Writing to a String cannot fail.
        let _ = write!(text, "{byte:02x}");
        text
    })
}

/// The first rule whose pattern matches.
fn rule_of(name: &str, rules: &[ResultsRule]) -> usize {
    let below = name.strip_prefix("results/").unwrap_or(name);
    let file = name.rsplit('/').next().unwrap_or(name);
    rules
        .iter()
        .position(|rule| {
            glob::Pattern::new(&rule.files)
                .is_ok_and(|p| [name, below, file].iter().any(|text| p.matches(text)))
        })
        .unwrap_or(rules.len())
}

/// Every file below `results/`, named below the site folder.
fn folder_files(folder: &Path, out: &mut Collected) -> Vec<(String, PathBuf)> {
    let mut files = Vec::new();
    let mut waiting = vec![("results".to_owned(), folder.join("results"))];
    while let Some((name, path)) = waiting.pop() {
        let entries = match std::fs::read_dir(&path) {
            Ok(entries) => entries,
            Err(error) => {
                out.refused.push(SourceError::Io { name, why: error.to_string() });
                continue;
            }
        };
        for entry in entries {
            let entry = match entry {
                Ok(entry) => entry,
                Err(error) => {
                    out.refused
                        .push(SourceError::Io { name: name.clone(), why: error.to_string() });
                    continue;
                }
            };
            let leaf = entry.file_name().to_string_lossy().into_owned();
            if leaf.starts_with('.') {
                continue;
            }
            let below = (format!("{name}/{leaf}"), entry.path());
            if entry.path().is_dir() {
                waiting.push(below);
            } else {
                files.push(below);
            }
        }
    }
    files.sort();
    files
}

/// Each path's shortest tail that tells it apart from the others.
fn shortest_tails(paths: &[PathBuf]) -> Vec<(String, PathBuf)> {
    let parts: Vec<Vec<String>> = paths
        .iter()
        .map(|path| path.iter().map(|part| part.to_string_lossy().into_owned()).collect())
        .collect();
    let tail = |at: usize, length: usize| {
        let parts = &parts[at];
        parts[parts.len().saturating_sub(length)..].join("/")
    };
    let most = parts.iter().map(Vec::len).max().unwrap_or(1);
    (0..paths.len())
        .map(|at| {
            let alone = |length: &usize| {
                (0..paths.len())
                    .all(|other| other == at || tail(other, *length) != tail(at, *length))
            };
            let length = (1..=most).find(alone).unwrap_or(most);
            (tail(at, length).trim_start_matches('/').to_owned(), paths[at].clone())
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::{PathBuf, shortest_tails};

    #[test]
    fn bare_files_are_named_by_what_tells_them_apart() {
        let paths = ["a/2024/lab.csv", "a/2025/lab.csv", "a/old.csv"].map(PathBuf::from);
        let names: Vec<String> = shortest_tails(&paths).into_iter().map(|(name, _)| name).collect();
        assert_eq!(names, ["2024/lab.csv", "2025/lab.csv", "old.csv"]);
    }
}
