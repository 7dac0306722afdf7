//! A site folder to begin with.

use std::fs;
use std::io::{self, Write as _};
use std::path::{Path, PathBuf};

/// Why a site folder was not begun.
#[derive(Debug, thiserror::Error)]
#[non_exhaustive]
pub enum NewSiteError {
    /// There is a site file already (exit 5).
    #[error(
        "{}: there is a site file already, and it was left as it is. Name a folder that has none",
        path.display()
    )]
    Exists {
        /// The site file.
        path: PathBuf,
    },
    /// The disk, or its rights, said no (exit 6).
    #[error("{} could not be made: {source}. Name a folder that you may write to", path.display())]
    CannotMake {
        /// What was being made.
        path: PathBuf,
        /// What the system said.
        source: io::Error,
    },
}

/// Makes a folder with a `site.toml` and an empty `results/`. A folder that already has a site
/// file is left as it is.
///
/// # Errors
/// [`NewSiteError`], with the path.
pub fn new_site(folder: &Path, site_file: &str) -> Result<(), NewSiteError> {
    let file = folder.join("site.toml");
    let cannot = |path: &Path| {
        let path = path.to_owned();
        move |source| NewSiteError::CannotMake { path, source }
    };
    let results = folder.join("results");
    fs::create_dir_all(&results).map_err(cannot(&results))?;
    let mut made = match fs::OpenOptions::new().write(true).create_new(true).open(&file) {
        Ok(made) => made,
        Err(error) if error.kind() == io::ErrorKind::AlreadyExists => {
            return Err(NewSiteError::Exists { path: file });
        }
        Err(error) => return Err(cannot(&file)(error)),
    };
    made.write_all(site_file.as_bytes()).map_err(cannot(&file))?;
    made.sync_all().map_err(cannot(&file))
}
