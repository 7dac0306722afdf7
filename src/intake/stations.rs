//! Stations of the open standard: where a well stands and what else it is called.

use crate::site::{Site, WellMatch};

/// One well of a station file.
#[derive(Clone, Debug, PartialEq)]
pub struct Station {
    /// The well: as listed, else as written.
    pub well: String,
    /// Its name in the file, which may differ from its identifier.
    pub name: String,
    /// What kind of place it is: `Well`.
    pub kind: String,
    /// Degrees north, if readable and inside -90 to 90.
    pub latitude: Option<f64>,
    /// Degrees east, if readable and inside -180 to 180.
    pub longitude: Option<f64>,
    /// The datum of both, as written.
    pub datum: String,
    /// The file.
    pub file: String,
    /// The line.
    pub line: u64,
}

impl Station {
    /// A station from its cells: well, name, kind, datum; latitude and longitude.
    #[must_use]
    pub fn new(
        site: &Site,
        file: &str,
        line: u64,
        [well, name, kind, datum]: [&str; 4],
        [latitude, longitude]: [&str; 2],
    ) -> Self {
        let listed = match site.well_of(well, None) {
            WellMatch::Listed(listed) | WellMatch::Alias(listed, _) => listed.name.as_str(),
            WellMatch::Unlisted => well,
        };
        let degrees = |text: &str, most: f64| {
            text.parse::<f64>().ok().filter(|degrees| degrees.abs() <= most)
        };
        Self {
            well: listed.to_owned(),
            name: name.to_owned(),
            kind: kind.to_owned(),
            latitude: degrees(latitude, 90.0),
            longitude: degrees(longitude, 180.0),
            datum: datum.to_owned(),
            file: file.to_owned(),
            line,
        }
    }
}
