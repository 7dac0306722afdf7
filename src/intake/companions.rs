//! Files of the open standard that stand beside the results: detection limits by result, stations.

use std::collections::BTreeMap;

use super::decode::decode;
use super::header::fold;
use super::limit_table::{LimitRow, LimitTables};
use super::limit_types::WrittenLimit;
use super::rows::{Dilution, Kind, Row, Written};
use super::source::Found;
use super::split::{Line, Lines, split};
use super::stations::Station;
use super::texts::Texts;
use crate::ledger::{Fate, FileFacts, MappingFacts, Merged, SetAside};
use crate::site::Site;

/// What kind of file it is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Companion {
    /// Detection limits, a row a limit.
    Limits,
    /// Stations, a row a well.
    Stations,
}

/// A column of a companion file that is read.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
enum Part {
    Well,
    WellName,
    WellType,
    SampleId,
    ResultId,
    Analyte,
    Kind,
    Value,
    Unit,
    Latitude,
    Longitude,
    Datum,
}

/// The standard's names (2.x, then 3.0), folded; and what the mapping calls the column.
const PARTS: [(Part, &str, &[&str]); 12] = [
    (Part::Well, "well", &["monitoringlocationidentifier", "locationidentifier"]),
    (Part::WellName, "well name", &["monitoringlocationname", "locationname"]),
    (Part::WellType, "well type", &["monitoringlocationtypename", "locationtype"]),
    (Part::SampleId, "sample_id", &["activityidentifier"]),
    (Part::ResultId, "result id", &["resultidentifier"]),
    (Part::Analyte, "analyte", &["characteristicname"]),
    (Part::Kind, "limit type", &["detectionquantitationlimittypename"]),
    (Part::Value, "limit", &["detectionquantitationlimitmeasuremeasurevalue"]),
    (Part::Unit, "limit unit", &["detectionquantitationlimitmeasuremeasureunitcode"]),
    (Part::Latitude, "latitude", &["latitudemeasure", "locationlatitude"]),
    (Part::Longitude, "longitude", &["longitudemeasure", "locationlongitude"]),
    (
        Part::Datum,
        "datum",
        &["horizontalcoordinatereferencesystemdatumname", "locationhorzcoordreferencesystemdatum"],
    ),
];

/// A companion file as read.
#[derive(Clone, Debug)]
pub struct CompanionFile {
    /// Its kind.
    pub kind: Companion,
    lines: Lines,
    parts: BTreeMap<Part, usize>,
    encoding: &'static str,
}

/// All companions of a run.
#[derive(Clone, Debug, Default)]
pub struct Companions {
    files: BTreeMap<usize, CompanionFile>,
    /// The limits.
    pub limits: LimitTables,
    /// The stations, in the order of the files.
    pub stations: Vec<Station>,
}

impl Companions {
    /// Reads the companions among the files.
    #[must_use]
    pub fn read(found: &[Found], site: &Site) -> Self {
        let mut all = Self::default();
        for (place, file) in found.iter().enumerate() {
            if !may_be_companion(&file.bytes) {
                continue;
            }
            let encoding = site.results.get(file.rule).and_then(|rule| rule.encoding);
            let Ok(decoded) = decode(&file.bytes, encoding) else { continue };
            let Some(companion) = recognised(&decoded.text, decoded.encoding) else {
                continue;
            };
            match companion.kind {
                Companion::Limits => {
                    for line in companion.records() {
                        all.limits.push(&file.name, companion.limit_row(line));
                    }
                }
                Companion::Stations => {
                    let wells = companion.records().iter();
                    all.stations
                        .extend(wells.map(|line| companion.station(line, &file.name, site)));
                }
            }
            all.files.insert(place, companion);
        }
        all
    }

    /// The companion at a place among the files that were found.
    #[must_use]
    pub fn at(&self, place: usize) -> Option<&CompanionFile> {
        self.files.get(&place)
    }
}

/// Whether the beginning of a file holds a word that every companion's header has, so that no
/// other file is decoded twice. In UTF-16 each letter stands beside a NUL.
fn may_be_companion(bytes: &[u8]) -> bool {
    /// The longest header looked at, in bytes; those of the standard have under 2,000.
    const HEAD: usize = 65_536;
    let head = bytes.get(..HEAD).unwrap_or(bytes).iter().filter(|byte| **byte != 0);
    let head: Vec<u8> = head.map(u8::to_ascii_lowercase).collect();
    head.windows(b"identifier".len()).any(|word| word == b"identifier")
}

/// A text whose header is that of a companion.
fn recognised(text: &str, encoding: &'static str) -> Option<CompanionFile> {
    let first = text.trim_start().lines().next().unwrap_or_default();
    for separator in [b',', b';', b'\t'] {
        let header = split(first, separator).lines.into_iter().next()?;
        let folded: Vec<String> = header.cells.iter().map(fold).collect();
        let at = |names: &[&str]| folded.iter().position(|name| names.contains(&name.as_str()));
        let parts: BTreeMap<Part, usize> =
            PARTS.iter().filter_map(|(part, _, names)| Some((*part, at(names)?))).collect();
        let has = |wanted: &[Part]| wanted.iter().all(|part| parts.contains_key(part));
        let holds_results =
            at(&["resultmeasurevalue", "resultmeasure", "resultcharacteristic"]).is_some();
        let kind = if holds_results {
            continue;
        } else if has(&[Part::Well, Part::SampleId, Part::Analyte, Part::Value]) {
            Companion::Limits
        } else if has(&[Part::Well, Part::Latitude, Part::Longitude]) && !has(&[Part::Analyte]) {
            Companion::Stations
        } else {
            continue;
        };
        let lines = split(text, separator);
        return Some(CompanionFile { kind, lines, parts, encoding });
    }
    None
}

impl CompanionFile {
    fn cell<'a>(&self, line: &'a Line, part: Part) -> &'a str {
        let at = self.parts.get(&part);
        at.and_then(|&at| line.cells.get(at)).unwrap_or_default().trim()
    }

    /// What becomes of its records; a limit's waits for its result.
    #[must_use]
    pub fn fate(&self) -> Fate {
        match self.kind {
            Companion::Limits => Fate::SetAside(SetAside::UnmatchedLimit),
            Companion::Stations => Fate::Merged(Merged::Station),
        }
    }

    /// The records below the header.
    #[must_use]
    pub fn records(&self) -> &[Line] {
        self.lines.lines.get(1..).unwrap_or_default()
    }

    fn limit_row(&self, line: &Line) -> LimitRow {
        let cell = |part| self.cell(line, part).to_owned();
        LimitRow {
            key: [Part::Well, Part::SampleId, Part::Analyte].map(cell),
            result_id: cell(Part::ResultId),
            limit: WrittenLimit {
                kind: cell(Part::Kind),
                value: cell(Part::Value),
                unit: cell(Part::Unit),
            },
        }
    }

    fn station(&self, line: &Line, file: &str, site: &Site) -> Station {
        let cell = |part| self.cell(line, part);
        Station::new(
            site,
            file,
            line.line,
            [Part::Well, Part::WellName, Part::WellType, Part::Datum].map(cell),
            [Part::Latitude, Part::Longitude].map(cell),
        )
    }

    /// Each record as a row of the ledger; it belongs to no series.
    pub fn rows(&self, file: u32, site: &Site, texts: &mut Texts) -> Vec<Row> {
        let site = texts.code(&site.name);
        self.records()
            .iter()
            .map(|line| {
                let mut code = |part| texts.code(self.cell(line, part));
                let written = Written {
                    well: code(Part::Well),
                    analyte: code(Part::Analyte),
                    unit: code(Part::Unit),
                    reporting_limit: code(Part::Value),
                    sample_id: code(Part::SampleId),
                    ..Written::default()
                };
                Row {
                    file,
                    sheet: 0,
                    line: line.line,
                    column: 0,
                    written,
                    site,
                    well: 0,
                    analyte: 0,
                    cas: 0,
                    listed: None,
                    fraction: 0,
                    depth: 0,
                    day: None,
                    time: 0,
                    reading: None,
                    unit: None,
                    basis: 0,
                    reporting_limit: None,
                    detection_limit: None,
                    estimated: false,
                    kind: Kind::Other,
                    dilution: Dilution::None,
                    excluded_by: None,
                    qualified_by: None,
                    batch: 0,
                    joined_by: None,
                }
            })
            .collect()
    }

    /// The file's facts.
    #[must_use]
    pub fn facts(&self, file: Found) -> FileFacts {
        FileFacts {
            name: file.name,
            bytes: file.bytes.len() as u64,
            sha256: file.sha256,
            records: self.records().len(),
            blank_lines: self.lines.blank,
            empty_cells: 0,
            sheets: Vec::new(),
            encoding: self.encoding,
        }
    }

    /// Which header was read as what.
    #[must_use]
    pub fn mapping(&self, file: &str) -> Vec<MappingFacts> {
        let header = self.lines.lines.first();
        let headers = header.into_iter().flat_map(|line| line.cells.iter().enumerate());
        headers
            .map(|(at, header)| {
                let part = PARTS.iter().find(|(part, ..)| self.parts.get(part) == Some(&at));
                MappingFacts {
                    file: file.to_owned(),
                    sheet: String::new(),
                    header: header.trim().to_owned(),
                    column: part.map_or_else(String::new, |(_, key, _)| (*key).to_owned()),
                }
            })
            .collect()
    }
}
