//! Headers become columns: by declared names, by usual words, by the open standard's names.

use std::collections::BTreeMap;
use std::collections::btree_map::Entry;

use super::open_names::{OpenColumns, meaning, open_columns};
use crate::site::Column;
use crate::terms::Unit;

/// Which cell of a record holds which column.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Mapping {
    /// The first cell of each column.
    pub cells: BTreeMap<Column, usize>,
    /// Further cells of the same meaning; qualifiers are all read, others must agree.
    pub also: BTreeMap<Column, Vec<usize>>,
    /// The unit in a header's brackets: `Result (ug/L)`.
    pub units: BTreeMap<Column, Unit>,
    /// Headers that were not matched, with their cells.
    pub unused: Vec<(usize, String)>,
    /// What the open standard has beside these columns.
    pub open: OpenColumns,
}

/// A declared header that the file does not have.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Missing {
    /// Our column.
    pub column: Column,
    /// The header it was declared to be.
    pub header: String,
}

/// Usual words for each column, folded (no case, blanks, underscores or punctuation). The names of
/// the open water-quality standard stand in `open_names`.
const WORDS: [(Column, &[&str]); 22] = [
    (
        Column::Well,
        &[
            "well",
            "location",
            "station",
            "monitoringpoint",
            "samplelocation",
            "samplepoint",
            "monitoringlocation",
        ],
    ),
    (
        Column::Analyte,
        &["analyte", "parameter", "chemical", "compound", "constituent", "characteristic"],
    ),
    (Column::Date, &["date", "sampledate", "sampled", "datesampled", "collectiondate"]),
    (Column::Result, &["result", "value", "concentration", "resultvalue"]),
    (Column::Unit, &["unit", "units", "uom", "resultunit"]),
    (Column::Site, &["site", "facility"]),
    (Column::Cas, &["cas", "casrn"]),
    (Column::Fraction, &["fraction", "totaldissolved", "filtered"]),
    (Column::Qualifier, &["qualifier", "qualifiers", "flag", "labqualifier", "qual", "remark"]),
    (Column::DetectionLimit, &["detectionlimit", "dl", "mdl", "lod", "methoddetectionlimit"]),
    (Column::ReportingLimit, &["reportinglimit", "rl", "pql", "mrl", "loq", "quantitationlimit"]),
    (Column::SampleType, &["sampletype"]),
    (Column::SampleId, &["sampleid", "samplenumber", "sampleno"]),
    (Column::Depth, &["depth", "sampledepth"]),
    (Column::Lab, &["lab", "laboratory"]),
    (Column::Time, &["time", "sampletime"]),
    (Column::Uncertainty, &["uncertainty", "countinguncertainty"]),
    (Column::Basis, &["basis"]),
    (Column::DetectionCondition, &["detectioncondition"]),
    (Column::Status, &["status", "resultstatus"]),
    (Column::Medium, &["medium", "matrix"]),
    (Column::Batch, &["batch", "batchid", "labbatch"]),
];

/// The columns without which a file is no results table.
pub const REQUIRED: [Column; 5] =
    [Column::Well, Column::Analyte, Column::Date, Column::Result, Column::Unit];

/// The columns after whose name a trailing id, name, no, number or code says nothing more.
const TRAILED: [Column; 4] = [Column::Well, Column::Analyte, Column::Cas, Column::Site];
const TRAILS: [&str; 5] = ["id", "name", "number", "code", "no"];

/// A header without case, blanks, underscores and punctuation.
#[must_use]
pub fn fold(header: &str) -> String {
    header.chars().filter(|c| c.is_alphanumeric()).flat_map(char::to_lowercase).collect()
}

/// The usual meaning of a header, if it has one.
fn usual(folded: &str, open: bool) -> Option<Column> {
    let exact = |text: &str| {
        let own = WORDS.iter().find(|(_, words)| words.contains(&text)).map(|(column, _)| *column);
        own.or_else(|| meaning(text))
    };
    let trailed = || {
        TRAILS
            .iter()
            .filter_map(|trail| folded.strip_suffix(trail))
            .filter_map(exact)
            .find(|column| TRAILED.contains(column))
    };
    // In a layout of the open standard `MonitoringLocationName` is a name, not the well.
    exact(folded).or_else(|| if open { None } else { trailed() })
}

/// `Result (ug/L)` and `Result [ug/L]` as the header's name and the unit in its brackets.
fn bracketed(header: &str) -> (&str, Option<Unit>) {
    let header = header.trim();
    for (open, close) in [('(', ')'), ('[', ']')] {
        if let (Some(from), true) = (header.rfind(open), header.ends_with(close)) {
            let inside = &header[from + 1..header.len() - 1];
            if let Some(text) = Unit::read(inside) {
                return (header[..from].trim(), Some(text.unit));
            }
        }
    }
    (header, None)
}

/// Matches a header row to columns; declared names first, and alone where they are given.
///
/// # Errors
/// [`Missing`] for each declared header that the row does not have.
pub fn mapping<'a>(
    headers: impl Iterator<Item = &'a str>,
    declared: &BTreeMap<Column, String>,
) -> Result<Mapping, Vec<Missing>> {
    let headers: Vec<&str> = headers.map(str::trim).collect();
    let mut mapping = Mapping::default();
    let mut missing = Vec::new();
    for (&column, name) in declared {
        let at = headers
            .iter()
            .position(|header| header == name)
            .or_else(|| headers.iter().position(|header| fold(header) == fold(name)));
        match at {
            Some(at) => {
                mapping.cells.insert(column, at);
                if let (_, Some(unit)) = bracketed(headers[at]) {
                    mapping.units.insert(column, unit);
                }
            }
            None => missing.push(Missing { column, header: name.clone() }),
        }
    }
    if !missing.is_empty() {
        return Err(missing);
    }
    let taken: Vec<usize> = mapping.cells.values().copied().collect();
    let folded: Vec<String> = headers.iter().map(|header| fold(bracketed(header).0)).collect();
    mapping.open = open_columns(&folded);
    let open = mapping.open.layout.is_some();
    let meanings: Vec<Option<Column>> = folded.iter().map(|header| usual(header, open)).collect();
    let well_elsewhere =
        declared.contains_key(&Column::Well) || meanings.contains(&Some(Column::Well));
    for (at, header) in headers.iter().enumerate() {
        if taken.contains(&at) {
            continue;
        }
        let (name, unit) = bracketed(header);
        let meaning = match meanings[at] {
            // "site id" is the well where nothing else is.
            Some(Column::Site) if fold(name) == "siteid" && !well_elsewhere => Some(Column::Well),
            meaning => meaning,
        };
        match meaning {
            Some(column) if !declared.contains_key(&column) => {
                if let Some(unit) = unit {
                    mapping.units.entry(column).or_insert(unit);
                }
                match mapping.cells.entry(column) {
                    Entry::Occupied(_) => mapping.also.entry(column).or_default().push(at),
                    Entry::Vacant(free) => {
                        free.insert(at);
                    }
                }
            }
            _ if header.is_empty() || mapping.open.key(at).is_some() => {}
            _ => mapping.unused.push((at, (*header).to_owned())),
        }
    }
    Ok(mapping)
}

impl Mapping {
    /// The required columns that the header lacks; a unit in the result's brackets will do.
    #[must_use]
    pub fn lacks(&self) -> Vec<Column> {
        let has = |column: &Column| {
            self.cells.contains_key(column)
                || (*column == Column::Unit && self.units.contains_key(&Column::Result))
        };
        REQUIRED.iter().copied().filter(|column| !has(column)).collect()
    }
}

#[cfg(test)]
mod tests {
    use super::{BTreeMap, Column, Unit, mapping};

    fn columns(header: &str) -> Vec<(Column, usize)> {
        let mapping = mapping(header.split(','), &BTreeMap::new()).expect("nothing declared");
        mapping.cells.into_iter().collect()
    }

    #[test]
    fn usual_words_match_with_case_blanks_and_punctuation_folded() {
        let found =
            columns("Sample Location ID,Parameter Name,Date_Sampled,Result (ug/L),CAS No.,RL");
        let expected = [
            (Column::Well, 0),
            (Column::Analyte, 1),
            (Column::Date, 2),
            (Column::Result, 3),
            (Column::Cas, 4),
            (Column::ReportingLimit, 5),
        ];
        assert!(expected.iter().all(|pair| found.contains(pair)), "{found:?}");
    }

    #[test]
    fn a_unit_in_the_results_brackets_is_the_unit() {
        let mapping = mapping("well,analyte,date,Result [mg/L]".split(','), &BTreeMap::new());
        let mapping = mapping.expect("nothing declared");
        assert_eq!(mapping.units.get(&Column::Result), Some(&Unit::MG_PER_L));
        assert_eq!(mapping.lacks(), []);
    }

    #[test]
    fn site_id_is_the_well_only_where_no_other_well_is() {
        assert!(columns("site id,analyte,date,result,unit").contains(&(Column::Well, 0)));
        let both = columns("site id,well,analyte,date,result,unit");
        assert!(both.contains(&(Column::Site, 0)) && both.contains(&(Column::Well, 1)));
    }

    #[test]
    fn a_declared_header_wins_and_a_missing_one_is_named() {
        let declared = BTreeMap::from([(Column::Well, "site_no".to_owned())]);
        let found = mapping("station,site_no,analyte".split(','), &declared).expect("present");
        assert_eq!(found.cells.get(&Column::Well), Some(&1));
        let missing = mapping("station,analyte".split(','), &declared).expect_err("absent");
        assert_eq!(missing[0].header, "site_no");
    }
}
