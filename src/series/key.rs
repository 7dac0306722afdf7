//! What makes a series one series.

use crate::site::Fraction;

/// Site, well, analyte, fraction and depth; sorts as every table does.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct SeriesKey {
    /// The site's name, empty for bare files without a site column.
    pub site: String,
    /// The well, as the laboratory or the alias table names it.
    pub well: String,
    /// The analyte as shown.
    pub analyte: String,
    /// Dissolved, total, or unknown.
    pub fraction: Option<Fraction>,
    /// The depth as written, where depths are kept separate.
    pub depth: Option<String>,
}

impl SeriesKey {
    /// The fraction's code, empty where unknown.
    #[must_use]
    pub fn fraction_code(&self) -> &'static str {
        self.fraction.map_or("", Fraction::code)
    }

    /// The depth, empty where depths are not kept separate.
    #[must_use]
    pub fn depth_text(&self) -> &str {
        self.depth.as_deref().unwrap_or_default()
    }
}
