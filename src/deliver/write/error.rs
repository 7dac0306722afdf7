//! Why an output folder was not written, in words.

use std::io;
use std::path::{Path, PathBuf};

use crate::words::clean::shown;

/// Why the outputs were not written. The earlier output is whole in each case.
#[derive(Debug, thiserror::Error)]
#[non_exhaustive]
pub enum WriteError {
    /// Something stands there that this program did not write, or that was changed since (exit 5).
    #[error(
        "{}: {offence}{}. Nothing was written. Give another folder with --out, or --force to replace \
         the program's own files there and keep all others",
        place(folder, name),
        if name.is_empty() { "" } else { " (the first such file)" }
    )]
    WouldOverwrite {
        /// The folder, as given.
        folder: PathBuf,
        /// The first offending file in it; empty where it is the folder itself.
        name: String,
        /// What is wrong with it.
        offence: Offence,
    },
    /// The disk, or its rights, said no (exit 6).
    #[error("{} could not be written: {source}. {} The earlier output, if there was one, is whole", shown(&path.display().to_string()), next_step(source))]
    CannotWrite {
        /// What was being written.
        path: PathBuf,
        /// What the system said.
        source: io::Error,
    },
    /// The run was interrupted before the swap (exit 130).
    #[error("interrupted; the earlier output, if there was one, is whole")]
    Stopped,
}

/// What keeps a folder from being replaced.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
pub enum Offence {
    /// A file is named as the output folder.
    #[error("is a file, not a folder; rename it or give another folder")]
    NotAFolder,
    /// Files, and no run.json that would say who wrote them.
    #[error("was not written by this program: the folder has no run.json")]
    NoRunJson,
    /// A run.json that is not this program's, or was damaged.
    #[error("is not a run.json that this program wrote")]
    UnreadableRunJson,
    /// The outputs of another site or of other inputs.
    #[error("belongs to {0}")]
    OtherRun(String),
    /// A file that run.json does not list.
    #[error("was not written by this program")]
    Stranger,
    /// A file that was changed after it was written.
    #[error("was changed after this program wrote it")]
    Changed,
}

impl WriteError {
    /// The error for something that could not be written.
    #[must_use]
    pub fn cannot(path: &Path, source: io::Error) -> Self {
        Self::CannotWrite { path: path.to_owned(), source }
    }
}

/// The offending file, or the folder.
fn place(folder: &Path, name: &str) -> String {
    let place = if name.is_empty() { folder.to_owned() } else { folder.join(name) };
    shown(&place.display().to_string())
}

/// What to do about a system's refusal.
fn next_step(source: &io::Error) -> &'static str {
    match source.kind() {
        io::ErrorKind::PermissionDenied | io::ErrorKind::ReadOnlyFilesystem => {
            "Give a folder you may write in with --out."
        }
        io::ErrorKind::StorageFull | io::ErrorKind::QuotaExceeded => {
            "Make room on the disk, or give a folder on another with --out."
        }
        io::ErrorKind::ResourceBusy => "Close the programs that hold files of the folder open.",
        _ => "Check the folder, or give another with --out.",
    }
}
