//! The run.json of an output folder that stands already.

use std::collections::BTreeMap;
use std::fs;
use std::io;
use std::path::Path;

use serde::Deserialize;

/// The name of the file.
pub const NAME: &str = "run.json";

/// What run.json says of the run that wrote the folder.
#[derive(Clone, Debug, PartialEq, Eq, Deserialize)]
pub struct EarlierRun {
    /// The program that wrote it.
    pub program: String,
    /// The site's name, empty for bare files.
    pub site: String,
    /// The results files.
    pub inputs: Vec<EarlierInput>,
    /// SHA-256 of every output by name.
    pub outputs: BTreeMap<String, String>,
}

/// One results file of the earlier run.
#[derive(Clone, Debug, PartialEq, Eq, Deserialize)]
pub struct EarlierInput {
    /// Its shown path.
    pub name: String,
    /// Its SHA-256.
    pub sha256: String,
}

/// What stands where run.json would.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Found {
    /// No file of that name.
    None,
    /// A file that this program did not write, or that was damaged.
    Unreadable,
    /// The record of an earlier run.
    Run(EarlierRun),
}

/// Reads a folder's run.json.
///
/// # Errors
/// Where the file is there and cannot be read at all.
pub fn read(folder: &Path) -> io::Result<Found> {
    let bytes = match fs::read(folder.join(NAME)) {
        Ok(bytes) => bytes,
        Err(error) if error.kind() == io::ErrorKind::NotFound => return Ok(Found::None),
        Err(error) => return Err(error),
    };
    Ok(match serde_json::from_slice::<EarlierRun>(&bytes) {
        Ok(run) if run.program == "ebbwell" => Found::Run(run),
        _ => Found::Unreadable,
    })
}
