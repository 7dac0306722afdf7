//! What stands in an output folder, and whether it may be replaced.

use std::fs::{self, File};
use std::io::{self, Read};
use std::path::{Path, PathBuf};

use sha2::{Digest, Sha256};

use super::error::{Offence, WriteError};
use super::owner::Owner;
use crate::deliver::earlier_run::{self, Found};

/// Bytes hashed at a time.
const CHUNK: usize = 1 << 16;

/// What stands in the folder.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Standing {
    /// The first file in the way of replacing the folder, and why; an empty name is the folder.
    pub offence: Option<(String, Offence)>,
    /// Files that the program did not write, as they are named below the folder.
    pub strangers: Vec<Stranger>,
}

/// A file, or a link, that the program did not write.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Stranger {
    /// Its name below the folder, with `/`.
    pub name: String,
    /// Where it stands.
    pub path: PathBuf,
}

/// Looks at every file of the folder; nothing stands in the way where there is none.
///
/// # Errors
/// Where the folder or a file in it cannot be read.
pub fn inspect(folder: &Path, owner: &Owner) -> Result<Standing, WriteError> {
    match fs::metadata(folder) {
        Err(error) if error.kind() == io::ErrorKind::NotFound => return Ok(Standing::default()),
        Err(error) => return Err(WriteError::cannot(folder, error)),
        Ok(found) if !found.is_dir() => {
            let offence = Some((String::new(), Offence::NotAFolder));
            return Ok(Standing { offence, strangers: Vec::new() });
        }
        Ok(_) => {}
    }
    let mut files = Vec::new();
    walk(folder, "", &mut files)?;
    files.sort_by(|a, b| a.name.cmp(&b.name));
    let record = folder.join(earlier_run::NAME);
    let found = earlier_run::read(folder).map_err(|error| WriteError::cannot(&record, error))?;
    match found {
        Found::None => {
            let first = files.first().map(|file| (file.name.clone(), Offence::NoRunJson));
            Ok(Standing { offence: first, strangers: files })
        }
        Found::Unreadable => {
            let offence = Some((earlier_run::NAME.to_owned(), Offence::UnreadableRunJson));
            Ok(Standing { offence, strangers: files })
        }
        Found::Run(earlier) => {
            let mut standing = Standing::default();
            if !owner.owns(&earlier) {
                let whose = Offence::OtherRun(Owner::described(&earlier));
                standing.offence = Some((earlier_run::NAME.to_owned(), whose));
            }
            for file in files.into_iter().filter(|file| file.name != earlier_run::NAME) {
                match earlier.outputs.get(&file.name) {
                    None => {
                        standing.offend(&file.name, Offence::Stranger);
                        standing.strangers.push(file);
                    }
                    Some(listed) => {
                        let hash = hash(&file.path);
                        let hash = hash.map_err(|error| WriteError::cannot(&file.path, error))?;
                        if hash != *listed {
                            standing.offend(&file.name, Offence::Changed);
                        }
                    }
                }
            }
            Ok(standing)
        }
    }
}

impl Standing {
    /// Keeps the first offence.
    fn offend(&mut self, name: &str, offence: Offence) {
        self.offence.get_or_insert_with(|| (name.to_owned(), offence));
    }
}

/// Every file below a folder; links are listed and not followed.
fn walk(folder: &Path, below: &str, files: &mut Vec<Stranger>) -> Result<(), WriteError> {
    let cannot = |error| WriteError::cannot(folder, error);
    for entry in fs::read_dir(folder).map_err(cannot)? {
        let entry = entry.map_err(cannot)?;
        let name = format!("{below}{}", entry.file_name().to_string_lossy());
        if entry.file_type().map_err(cannot)?.is_dir() {
            walk(&entry.path(), &format!("{name}/"), files)?;
        } else {
            files.push(Stranger { name, path: entry.path() });
        }
    }
    Ok(())
}

/// SHA-256 of a file in hex.
fn hash(path: &Path) -> io::Result<String> {
    let mut file = File::open(path)?;
    let mut hash = Sha256::new();
    let mut chunk = vec![0; CHUNK];
    loop {
        match file.read(&mut chunk)? {
            0 => return Ok(hex(hash)),
            n => hash.update(&chunk[..n]),
        }
    }
}

/// A finished hash in hex.
#[must_use]
pub fn hex(hash: Sha256) -> String {
    hash.finalize().iter().map(|byte| format!("{byte:02x}")).collect()
}
