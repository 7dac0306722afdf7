//! From the text of a site file to a checked site, or to every problem at once.

use toml::de::{DeTable, DeValue};

use super::check::check;
use super::checked::Site;
use super::file::SiteFile;
use super::problem::Problem;
use super::syntax::{mend, settle};
use super::written::{At, FromToml, Problems};

/// Reads and checks a site file.
///
/// `path_shown` is how messages name the file.
///
/// # Errors
/// Every problem of the file at once, in the order of its lines. After a syntax error, what only
/// follows from it (a key that is missing because its line could not be read) is not told.
pub fn read(text: &str, path_shown: &str) -> Result<Site, Vec<Problem>> {
    let text = text.strip_prefix('\u{feff}').unwrap_or(text);
    let mut problems = Problems::new(text, path_shown);
    let (mended, broken) = mend(text, &problems);
    let document = DeValue::Table(DeTable::parse_recoverable(&mended).0.into_inner());
    let top = At { line: 1, key: String::new(), value: () };
    let file = SiteFile::from_toml(&document, &top, &mut problems).unwrap_or_default();
    let site = check(&file, &mut problems);
    settle(broken, &mut problems);
    let found = problems.into_sorted();
    if found.is_empty() {
        return Ok(site);
    }
    Err(found)
}
