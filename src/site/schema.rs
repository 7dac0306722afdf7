//! The JSON schema of the site file, draft-07: the draft that editors' TOML helpers read.

use schemars::generate::SchemaSettings;
use serde_json::Value;

use super::file::SiteFile;

/// The JSON schema of the site file.
#[must_use]
pub fn schema() -> Value {
    let settings = SchemaSettings::draft07().with(|settings| settings.inline_subschemas = true);
    let mut schema = settings.into_generator().into_root_schema_for::<SiteFile>();
    schema.insert("title".into(), "Ebbwell site file".into());
    schema.to_value()
}
