//! What is to be run, and who watches.

use std::path::PathBuf;

use chrono::NaiveDate;

pub use crate::deliver::Formats;
use crate::findings::InputHash;
use crate::intake::Sources;
use crate::site::Site;
use crate::terms::Effort;
pub use crate::terms::Stage;

/// Everything that a run needs to know; the date of today is handed in.
#[derive(Clone, Debug)]
pub struct Job {
    /// Where results come from.
    pub sources: Sources,
    /// The checked site.
    pub site: Site,
    /// The site file or template the site was read from.
    pub site_file: SiteFileFacts,
    /// The as-of date, if one was given.
    pub as_of: Option<NaiveDate>,
    /// Today, for refusing dates that lie ahead.
    pub today: NaiveDate,
    /// How much is computed.
    pub effort: Effort,
    /// What is done with the data.
    pub kind: Kind,
    /// Where files go; none are made without.
    pub place: Option<Place>,
    /// Which formats are written.
    pub formats: Formats,
    /// Replace an output folder that was changed by hand.
    pub force: bool,
    /// How many threads fit series; as many as there are processors if absent.
    pub threads: Option<usize>,
}

/// What a run does with the data.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Kind {
    /// Reads everything, fits nothing.
    Check,
    /// The main job.
    Review,
}

/// Where a run's files go.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Place {
    /// This folder.
    Given(PathBuf),
    /// `<prefix>review-<as-of>` or `<prefix>check-<as-of>` inside a folder.
    Beside {
        /// The folder.
        parent: PathBuf,
        /// `<stem>-` for a bare file, else empty.
        prefix: String,
    },
}

/// The file that the site was read from.
#[derive(Clone, Debug, Default)]
pub struct SiteFileFacts {
    /// The site file with its hash.
    pub file: Option<InputHash>,
    /// The template's name.
    pub template: Option<String>,
}

/// Hears progress and can stop the run.
pub trait Watch: Sync {
    /// A stage begins; `what` names the file where one is meant.
    fn stage(&self, stage: Stage, what: &str);
    /// Whether the run is to stop; asked between files, series and outputs.
    fn stop(&self) -> bool;
}
