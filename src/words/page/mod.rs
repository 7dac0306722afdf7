//! The pages of the terminal: what a person reads after `review`, `check`, `show` and `explain`.
//!
//! Every text from a file is made harmless before it enters a page; without colour a page says the
//! same. Each returns a text that ends in one newline.

pub mod account;
pub mod first;
pub mod review;
pub mod check;
pub mod arrival;
pub mod to_do;
pub mod read_as;
pub mod show;
pub mod show_values;
pub mod show_doubts;
pub mod begun;
pub mod explained;

pub use begun::begun;
pub use check::{CheckFacts, check, examples};
pub use explained::{explain, index};
pub use review::review;
pub use show::show;

use super::clean::shown;
use super::number::iso;
use crate::findings::{RunFacts, SiteFacts};
use crate::series::SeriesKey;

/// What a page has to know besides the findings.
#[derive(Clone, Copy, Debug)]
pub struct PageOptions<'a> {
    /// The terminal's width in columns.
    pub width: usize,
    /// Whether bold and dim may be used.
    pub color: bool,
    /// The site as the user named it on the command line, for the next command.
    pub site_argument: &'a str,
    /// The output folder as people see it; none if nothing was written.
    pub folder: Option<&'a str>,
    /// How many charts were left out because there are too many series.
    pub charts_left_out: usize,
}

/// The first line: what this is, of which site, known until when.
#[must_use]
pub fn heading(what: &str, run: &RunFacts, site: &SiteFacts) -> String {
    let name = if site.name.is_empty() { "results files" } else { &site.name };
    let round = if site.round.is_empty() {
        String::new()
    } else {
        format!("round {}, ", shown(&site.round))
    };
    format!("{what}: {}, {round}as of {}", shown(name), iso(run.as_of))
}

/// A series as a line names it: `MW-3, Benzene (dissolved, depth 12 m)`, with the site where it is
/// not the run's only one.
#[must_use]
pub fn series_name(key: &SeriesKey, site: &SiteFacts) -> String {
    let mut name = String::new();
    if key.site != site.name && !key.site.is_empty() {
        name.push_str(&format!("{}: ", shown(&key.site)));
    }
    name.push_str(&format!("{}, {}", shown(&key.well), shown(&key.analyte)));
    let depth = key.depth.as_deref().map(|depth| format!("depth {}", shown(depth)));
    let parts: Vec<String> =
        key.fraction.map(|f| f.code().to_owned()).into_iter().chain(depth).collect();
    if !parts.is_empty() {
        name.push_str(&format!(" ({})", parts.join(", ")));
    }
    name
}
