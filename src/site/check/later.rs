//! Keys of work that is not built yet: an error that says so, one line each to remove later.

use super::super::file::SiteFile;
use super::super::problem::ProblemKind;
use super::super::written::{At, Problems};
use super::list;

/// Refuses every key whose work is not built.
pub(super) fn refuse(file: &SiteFile, problems: &mut Problems<'_>) {
    for path in list(&file.flowpath) {
        problems.tell(path, ProblemKind::NotBuilt);
    }
    for chain in list(&file.chain) {
        problems.tell(chain, ProblemKind::NotBuilt);
    }
    not_built(file.vapour.as_ref(), problems);
    not_built(file.attainment.as_ref(), problems);
}

fn not_built<T>(key: Option<&At<T>>, problems: &mut Problems<'_>) {
    if let Some(at) = key {
        problems.tell(at, ProblemKind::NotBuilt);
    }
}
