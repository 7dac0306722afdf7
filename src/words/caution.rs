//! The caution that stands on every output a person reads.

use super::clean::shown;
use crate::findings::SiteFacts;

/// The standing sentence, without the site's authority.
pub const STANDING: &str = "This program screens; it does not decide. Cleanup decisions rest with \
    the responsible regulator and licensed professionals.";

/// The caution of a site: the standing sentence, and the authority and citation it names.
#[must_use]
pub fn caution(site: &SiteFacts) -> String {
    let mut text = STANDING.to_owned();
    let given = |text: &Option<String>| text.as_deref().map(shown).filter(|t| !t.trim().is_empty());
    match (given(&site.authority), given(&site.citation)) {
        (Some(authority), Some(citation)) => {
            text.push_str(&format!(" Authority named by the site file: {authority} ({citation})."));
        }
        (Some(authority), None) => {
            text.push_str(&format!(" Authority named by the site file: {authority}."));
        }
        (None, Some(citation)) => {
            text.push_str(&format!(" Citation in the site file: {citation}."));
        }
        (None, None) => {}
    }
    text
}
