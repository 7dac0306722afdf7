//! The new output while it comes about, in a folder beside the target.
//!
//! ```text
//! .<name>.ebbwell-<random>/lock   held while the run lives
//!                          new/   the new output
//!                          old/   the earlier output during the swap
//! ```

use std::collections::BTreeMap;
use std::fs::{self, File};
use std::io::{self, BufWriter, Write};
use std::panic::resume_unwind;
use std::path::{Path, PathBuf};
use std::thread;

use sha2::{Digest, Sha256};
use tempfile::TempDir;

use super::error::WriteError;
use super::folder::{Stranger, hex};
use super::swap::Target;
use crate::deliver::files::{Content, OutFile};

/// The file whose lock says that a run is at work.
pub const LOCK: &str = "lock";
/// The new output inside the staging folder.
pub const NEW: &str = "new";
/// The earlier output inside the staging folder during a swap.
pub const OLD: &str = "old";

/// Files waited for at once (measured: 850 files take 5.6 s one by one and 0.1 s so).
const SYNCED_AT_ONCE: usize = 16;

/// The staging folder; dropped, it removes itself with all that it holds.
pub struct Stage {
    folder: TempDir,
    // Held for its lock; the system releases it when the process ends, however it ends.
    _lock: File,
    target: PathBuf,
    outputs: BTreeMap<String, String>,
    paths: Vec<PathBuf>,
}

impl Stage {
    /// An empty staging folder beside the target.
    ///
    /// # Errors
    /// Where the parent folder cannot be written.
    pub fn beside(target: &Target) -> Result<Self, WriteError> {
        let cannot = |error| WriteError::cannot(&target.parent, error);
        let mut builder = tempfile::Builder::new();
        let folder =
            builder.prefix(&target.stage_prefix()).tempdir_in(&target.parent).map_err(cannot)?;
        let lock = File::create(folder.path().join(LOCK)).map_err(cannot)?;
        // Where a file system knows no locks, runs into one folder at once are not told apart.
        let _ = lock.try_lock();
        fs::create_dir(folder.path().join(NEW)).map_err(cannot)?;
        Ok(Self {
            folder,
            _lock: lock,
            target: target.path.clone(),
            outputs: BTreeMap::new(),
            paths: Vec::new(),
        })
    }

    /// Where the new output comes about.
    #[must_use]
    pub fn new_output(&self) -> PathBuf {
        self.folder.path().join(NEW)
    }

    /// Where the earlier output goes during the swap.
    #[must_use]
    pub fn old_output(&self) -> PathBuf {
        self.folder.path().join(OLD)
    }

    /// SHA-256 of every file put so far, by name.
    #[must_use]
    pub fn outputs(&self) -> &BTreeMap<String, String> {
        &self.outputs
    }

    /// Writes one file. An error names the file where it would have stood.
    ///
    /// # Errors
    /// Where the disk says no.
    pub fn put(&mut self, file: OutFile<'_>) -> Result<(), WriteError> {
        let path = self.new_output().join(&file.name);
        let hash = put(&path, file.content)
            .map_err(|error| WriteError::cannot(&self.target.join(&file.name), error))?;
        self.outputs.insert(file.name, hash);
        self.paths.push(path);
        Ok(())
    }

    /// Takes files over that the program did not write, unless one of ours has the name.
    ///
    /// # Errors
    /// Where one can neither be linked nor copied.
    pub fn keep(&mut self, strangers: &[Stranger]) -> Result<Vec<String>, WriteError> {
        let mut kept = Vec::new();
        for stranger in strangers.iter().filter(|s| !self.outputs.contains_key(&s.name)) {
            let path = self.new_output().join(&stranger.name);
            keep(&stranger.path, &path)
                .map_err(|error| WriteError::cannot(&stranger.path, error))?;
            kept.push(stranger.name.clone());
        }
        Ok(kept)
    }

    /// Makes every file and folder durable, so that the swap never uncovers half a file.
    ///
    /// # Errors
    /// Where the disk says no.
    pub fn make_durable(&self) -> Result<(), WriteError> {
        let cannot = |error| WriteError::cannot(&self.target, error);
        let mut folders: Vec<&Path> = self.paths.iter().filter_map(|path| path.parent()).collect();
        folders.sort_unstable();
        folders.dedup();
        sync_files(&self.paths).map_err(cannot)?;
        for folder in folders {
            sync_folder(folder).map_err(cannot)?;
        }
        sync_folder(self.folder.path()).map_err(cannot)
    }

    /// Removes the staging folder. What cannot be removed now is removed by the next run.
    pub fn remove(self) {
        let _ = self.folder.close();
    }
}

/// Makes files durable, some at once: the threads wait for the disk and compute nothing.
fn sync_files(paths: &[PathBuf]) -> io::Result<()> {
    let sync = |first: usize| {
        let mut own = paths.iter().skip(first).step_by(SYNCED_AT_ONCE);
        own.try_for_each(|path| File::open(path)?.sync_all())
    };
    thread::scope(|scope| {
        let waits: Vec<_> = (0..SYNCED_AT_ONCE.min(paths.len()))
            .map(|first| scope.spawn(move || sync(first)))
            .collect();
        waits.into_iter().try_for_each(|wait| {
            // A panic there is a panic here.
            wait.join().unwrap_or_else(|panic| resume_unwind(panic))
        })
    })
}

/// Makes a folder's list of names durable; systems that cannot open a folder do so by themselves.
///
/// # Errors
/// Where the disk says no.
pub fn sync_folder(folder: &Path) -> io::Result<()> {
    if cfg!(unix) { File::open(folder)?.sync_all() } else { Ok(()) }
}

/// Writes a file with the folders it stands in and returns its hash.
fn put(path: &Path, content: Content<'_>) -> io::Result<String> {
    if let Some(folder) = path.parent() {
        fs::create_dir_all(folder)?;
    }
    let mut to = Hashing { to: BufWriter::new(File::create(path)?), hash: Sha256::new() };
    match content {
        Content::Text(text) => to.write_all(text.as_bytes())?,
        Content::Written(write) => write(&mut to)?,
    }
    to.flush()?;
    Ok(hex(to.hash))
}

/// The same file under a second name; a copy where the file system has no such thing.
fn keep(from: &Path, to: &Path) -> io::Result<()> {
    if let Some(folder) = to.parent() {
        fs::create_dir_all(folder)?;
    }
    fs::hard_link(from, to).or_else(|_| fs::copy(from, to).map(drop))
}

/// Hashes what passes through.
struct Hashing<W> {
    to: W,
    hash: Sha256,
}

impl<W: Write> Write for Hashing<W> {
    fn write(&mut self, bytes: &[u8]) -> io::Result<usize> {
        let taken = self.to.write(bytes)?;
        self.hash.update(&bytes[..taken]);
        Ok(taken)
    }

    fn flush(&mut self) -> io::Result<()> {
        self.to.flush()
    }
}
