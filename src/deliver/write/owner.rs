//! Whose output a folder may hold: the same site, or the same inputs.

use crate::deliver::earlier_run::EarlierRun;
use crate::findings::{RunFacts, SiteFacts};
use crate::terms::folded;
use crate::words::clean::shown;

/// The site and the inputs of a run.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Owner {
    /// The site's name; empty for bare files.
    pub site: String,
    /// The results files as they are shown.
    pub inputs: Vec<String>,
}

impl Owner {
    /// The owner of a run's outputs.
    #[must_use]
    pub fn of(run: &RunFacts, site: &SiteFacts) -> Self {
        let inputs = run.files.iter().map(|file| file.name.clone()).collect();
        Self { site: site.name.clone(), inputs }
    }

    /// Whether an earlier run names the same site, or else the same results files.
    #[must_use]
    pub fn owns(&self, earlier: &EarlierRun) -> bool {
        let same_site = !self.site.is_empty() && folded(&self.site) == folded(&earlier.site);
        let mut ours: Vec<&str> = self.inputs.iter().map(String::as_str).collect();
        let mut theirs: Vec<&str> = earlier.inputs.iter().map(|i| i.name.as_str()).collect();
        ours.sort_unstable();
        theirs.sort_unstable();
        let both_bare = self.site.is_empty() && earlier.site.is_empty();
        same_site || (both_bare && !ours.is_empty() && ours == theirs)
    }

    /// What an earlier run was about, for a message.
    #[must_use]
    pub fn described(earlier: &EarlierRun) -> String {
        if !earlier.site.is_empty() {
            return format!("the site {}", shown(&earlier.site));
        }
        match earlier.inputs.as_slice() {
            [] => "a run without inputs".to_owned(),
            [one] => format!("the results file {}", shown(&one.name)),
            [first, rest @ ..] => {
                format!("the results file {} and {} more", shown(&first.name), rest.len())
            }
        }
    }
}
