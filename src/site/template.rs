//! The embedded templates: analytes and limits of one regime, ready to be edited.

use super::check::check;
use super::checked::Site;
use super::file::SiteFile;
use super::reader::read;
use super::written::Problems;

/// A site file to begin with.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Template {
    /// The name on the command line: `fuel-release`.
    pub name: &'static str,
    /// What it is for.
    pub about: &'static str,
    /// The site file.
    pub text: &'static str,
}

/// The line of every template that carries the site's name.
const NAME_LINE: &str = "name = \"Name of the site\"";

/// Declares a template by its file below `site-templates/`.
macro_rules! template {
    ($name:literal, $about:literal) => {
        Template {
            name: $name,
            about: $about,
            text: include_str!(concat!("../../site-templates/", $name, ".toml")),
        }
    };
}

/// Every template.
pub static ALL: [Template; 6] = [
    template!("fuel-release", "petrol and diesel: BTEX, MTBE and TBA, carbon ranges"),
    template!("chlorinated-solvents", "chlorinated ethenes, ethanes and methanes, 1,4-dioxane"),
    template!("metals-and-salts", "metals, chloride, sulfate, fluoride, perchlorate"),
    template!("farm-chemicals", "nitrogen species and pesticides"),
    template!("fluorinated", "PFAS"),
    template!("radionuclides", "tritium, strontium-90, cesium-137, radium, uranium"),
];

/// The template with this name.
#[must_use]
pub fn named(name: &str) -> Option<&'static Template> {
    ALL.iter().find(|template| template.name == name)
}

/// The text of the template with this name.
#[must_use]
pub fn text(name: &str) -> Option<&'static str> {
    named(name).map(|template| template.text)
}

impl Template {
    /// The template's text with a site's name in place of the placeholder.
    #[must_use]
    pub fn for_site(&self, site: &str) -> String {
        let name = format!("name = {}", toml::Value::from(site.trim()));
        self.text.replacen(NAME_LINE, &name, 1)
    }
}

impl Site {
    /// The site for results files without a site file or template: everything at its default,
    /// every analyte fitted, no limit.
    #[must_use]
    pub fn bare() -> Self {
        check(&SiteFile::default(), &mut Problems::new("", ""))
    }

    /// The site for results files without a site file, with a template's analytes and limits.
    /// `None` for an unknown name. Its name is empty, so results of every site are kept.
    #[must_use]
    pub fn from_template(name: &str) -> Option<Self> {
        let site = read(text(name)?, name).ok()?;
        Some(Self { name: String::new(), ..site })
    }
}
