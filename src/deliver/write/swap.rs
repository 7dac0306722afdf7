//! The swap of the earlier output for the new one, and the healing of one that was stopped.

use std::fs::{self, File, TryLockError};
use std::io;
use std::path::{Path, PathBuf};

use super::error::WriteError;
use super::stage::{LOCK, OLD, Stage, sync_folder};

/// Characters of the target's name that the staging folder's name repeats.
const NAME_REPEATED: usize = 60;

/// The output folder and the folder it stands in.
#[derive(Clone, Debug)]
pub struct Target {
    /// The folder that holds it; the staging folder stands there too.
    pub parent: PathBuf,
    /// The output folder itself.
    pub path: PathBuf,
}

impl Target {
    /// The target of a path as given. A link to a folder means the folder. Parent folders that are
    /// missing are made.
    ///
    /// # Errors
    /// Where the path has no parent, or the parent can be neither found nor made.
    pub fn of(path: &Path) -> Result<Self, WriteError> {
        let cannot = |error| WriteError::cannot(path, error);
        if let Ok(whole) = fs::canonicalize(path) {
            let parent = whole.parent().map(Path::to_owned);
            let root = || cannot(io::Error::other("the root folder cannot be an output folder"));
            return Ok(Self { parent: parent.ok_or_else(root)?, path: whole });
        }
        let nameless = || cannot(io::Error::other("the path does not end in a folder's name"));
        let name = path.file_name().ok_or_else(nameless)?;
        let parent = match path.parent() {
            Some(parent) if !parent.as_os_str().is_empty() => parent,
            _ => Path::new("."),
        };
        fs::create_dir_all(parent).map_err(cannot)?;
        let parent = fs::canonicalize(parent).map_err(cannot)?;
        Ok(Self { path: parent.join(name), parent })
    }

    /// How the names of this target's staging folders begin.
    #[must_use]
    pub fn stage_prefix(&self) -> String {
        let name = self.path.file_name().map(|name| name.to_string_lossy()).unwrap_or_default();
        let name: String = name.chars().take(NAME_REPEATED).collect();
        format!(".{name}.ebbwell-")
    }

    /// Swaps the staged output in: old aside, new in, old removed. If the new one cannot be moved
    /// in, the old one is moved back.
    ///
    /// # Errors
    /// Where a rename is refused.
    pub fn swap(&self, stage: Stage) -> Result<(), WriteError> {
        let cannot = |error| WriteError::cannot(&self.path, error);
        let (new, old) = (stage.new_output(), stage.old_output());
        let earlier = fs::metadata(&self.path).ok();
        if let Some(earlier) = &earlier {
            fs::set_permissions(&new, earlier.permissions()).map_err(cannot)?;
            fs::rename(&self.path, &old).map_err(cannot)?;
        }
        if let Err(error) = fs::rename(&new, &self.path) {
            if earlier.is_some() {
                fs::rename(&old, &self.path).map_err(cannot)?;
            }
            return Err(cannot(error));
        }
        sync_folder(&self.parent).map_err(cannot)?;
        stage.remove();
        Ok(())
    }

    /// Heals what runs that ended in the middle left beside the target: an earlier output that was
    /// moved aside and never replaced is moved back, staging folders are removed. Staging folders
    /// of runs that are at work are left alone.
    ///
    /// # Errors
    /// Where the earlier output cannot be moved back.
    pub fn heal(&self) -> Result<(), WriteError> {
        let prefix = self.stage_prefix();
        let entries = fs::read_dir(&self.parent);
        let entries = entries.map_err(|error| WriteError::cannot(&self.parent, error))?;
        let mut left: Vec<PathBuf> = entries
            .filter_map(Result::ok)
            .filter(|entry| entry.file_name().to_string_lossy().starts_with(&prefix))
            .map(|entry| entry.path())
            .collect();
        left.sort();
        for stage in left.iter().filter(|stage| is_abandoned(stage)) {
            let old = stage.join(OLD);
            if old.is_dir() && !self.path.exists() {
                fs::rename(&old, &self.path).map_err(|e| WriteError::cannot(&self.path, e))?;
                sync_folder(&self.parent).map_err(|e| WriteError::cannot(&self.path, e))?;
            }
            // What cannot be removed now is removed by a later run.
            let _ = fs::remove_dir_all(stage);
        }
        Ok(())
    }
}

/// Whether a staging folder has our lock file and no run holds it.
fn is_abandoned(stage: &Path) -> bool {
    let Ok(lock) = File::open(stage.join(LOCK)) else { return false };
    !matches!(lock.try_lock(), Err(TryLockError::WouldBlock))
}
