//! The only code that makes files: a whole output folder at once, or nothing.
//!
//! Everything is written into a folder beside the target, made durable, and swapped in by two
//! renames. Until then the earlier output stands untouched; a swap that was stopped between its
//! renames is healed by the next run.

pub mod error;
pub mod owner;
pub mod folder;
pub mod stage;
pub mod swap;

pub use error::{Offence, WriteError};
pub use owner::Owner;

use std::collections::BTreeMap;
use std::path::PathBuf;

use self::folder::Standing;
use self::stage::Stage;
use self::swap::Target;
use super::earlier_run;
use super::files::{Content, OutFile};
use super::run_json;
use crate::findings::{RunFacts, SiteFacts};

/// Where the outputs go.
#[derive(Clone, Debug)]
pub struct OutDir {
    /// The folder.
    pub path: PathBuf,
    /// Whether the program's own files are replaced whatever their hash, and strangers kept.
    pub force: bool,
}

/// What was written.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Written {
    /// SHA-256 of every file but run.json, by name.
    pub outputs: BTreeMap<String, String>,
    /// Files that the program did not write and that were kept.
    pub kept: Vec<String>,
}

/// Asks early, before any fit, whether the folder may be written; heals a stopped swap.
///
/// # Errors
/// [`WriteError`] as [`write()`] would give it.
pub fn may_write(out: &OutDir, owner: &Owner) -> Result<(), WriteError> {
    let target = Target::of(&out.path)?;
    target.heal()?;
    Stage::beside(&target)?;
    inspected(out, owner, &target).map(drop)
}

/// Writes the files and run.json into the folder, all or none.
///
/// `stop` is asked before each file and once before the swap.
///
/// # Errors
/// [`WriteError::WouldOverwrite`] for a folder that this program did not write for this site or
/// these inputs, or that was changed since; [`WriteError::CannotWrite`] where the disk says no;
/// [`WriteError::Stopped`] if `stop` said so. The earlier output is whole in each case.
pub fn write(
    out: &OutDir,
    run: &RunFacts,
    site: &SiteFacts,
    files: Vec<OutFile<'_>>,
    stop: &dyn Fn() -> bool,
) -> Result<Written, WriteError> {
    let target = Target::of(&out.path)?;
    target.heal()?;
    let mut stage = Stage::beside(&target)?;
    for file in files {
        if stop() {
            return Err(WriteError::Stopped);
        }
        stage.put(file)?;
    }
    let outputs = stage.outputs().clone();
    let record = Content::Text(run_json(run, site, &outputs));
    stage.put(OutFile { name: earlier_run::NAME.to_owned(), content: record })?;
    let standing = inspected(out, &Owner::of(run, site), &target)?;
    let kept = stage.keep(&standing.strangers)?;
    stage.make_durable()?;
    if stop() {
        return Err(WriteError::Stopped);
    }
    target.swap(stage)?;
    Ok(Written { outputs, kept })
}

/// What stands in the folder, refused where it may not be replaced.
fn inspected(out: &OutDir, owner: &Owner, target: &Target) -> Result<Standing, WriteError> {
    let standing = folder::inspect(&target.path, owner)?;
    match standing.offence {
        Some((name, offence)) if !out.force || offence == Offence::NotAFolder => {
            Err(WriteError::WouldOverwrite { folder: out.path.clone(), name, offence })
        }
        _ => Ok(standing),
    }
}
