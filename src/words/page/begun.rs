//! What `new` says.

/// A site folder was begun: what to do now.
#[must_use]
pub fn begun(folder: &str, template: &str) -> String {
    format!(
        "Begun: {folder}, with the limits of the template {template}.\n\
         Next: 1. set the name, the authority and the wells in {folder}/site.toml\n\
         \x20     2. put the laboratory's files, untouched, into {folder}/results\n\
         \x20     3. ebbwell check {folder}\n\
         Check every limit with your authority before use.\n"
    )
}
