//! What a run says it is doing.

use super::clean::shown_short;
use crate::terms::Stage;

/// A file name longer than this is cut.
const NAME: usize = 48;

/// The stage in words.
#[must_use]
pub fn stage(stage: Stage, what: &str) -> String {
    match stage {
        Stage::Reading => format!("reading {}", shown_short(what, NAME)),
        Stage::Grouping => "grouping results by well and analyte".to_owned(),
        Stage::Fitting => "fitting".to_owned(),
        Stage::Writing => "writing".to_owned(),
    }
}
