//! The open water-quality standard's own column names, and which of its layouts a header is.
//!
//! Names are those of the federal WQX mapping of 2024 (public domain), folded: `/`, `.`, `_`, blanks
//! and case say nothing, so that copies with another mark in place of the slash read alike.

use crate::site::Column;

/// A layout of the open standard that holds results.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum OpenLayout {
    /// The 2.x results with limits (physical and chemical, 63 or 81 columns).
    Result,
    /// The 2.x results without limits (narrow).
    Narrow,
    /// The 3.0 outbound results.
    Outbound,
    /// The web upload.
    Upload,
}

/// Where the columns of the standard stand that have no canonical column.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct OpenColumns {
    /// The layout, if the header is one of the standard's.
    pub layout: Option<OpenLayout>,
    /// Limits with their types and units.
    pub limits: Vec<LimitCells>,
    /// The result's identifier.
    pub result_id: Option<usize>,
    /// Further names of the analyte: user-supplied, then comparable.
    pub other_names: Vec<usize>,
}

/// The cells of one limit.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct LimitCells {
    /// Its type.
    pub kind: Option<usize>,
    /// Its value.
    pub value: usize,
    /// Its unit.
    pub unit: Option<usize>,
}

impl OpenLayout {
    /// What the layout is called.
    #[must_use]
    pub fn label(self) -> &'static str {
        match self {
            Self::Result => "2.x result layout",
            Self::Narrow => "2.x narrow result layout",
            Self::Outbound => "3.0 outbound layout",
            Self::Upload => "web upload layout",
        }
    }
}

/// The standard's names for the canonical columns: 2.x, 3.0 outbound, web upload.
const NAMES: [(Column, &[&str]); 17] = [
    (Column::Well, &["monitoringlocationidentifier", "locationidentifier", "monitoringlocationid"]),
    (Column::Analyte, &["characteristicname", "resultcharacteristic"]),
    (Column::Date, &["activitystartdate"]),
    (Column::Result, &["resultmeasurevalue", "resultmeasure", "resultvalue"]),
    (Column::Unit, &["resultmeasuremeasureunitcode", "resultmeasureunit", "resultunit"]),
    (Column::Cas, &["resultcasnumber"]),
    (Column::Fraction, &["resultsamplefractiontext", "resultsamplefraction"]),
    (Column::Qualifier, &["measurequalifiercode", "resultmeasurequalifiercode", "resultqualifier"]),
    (Column::SampleType, &["activitytypecode", "activitytype"]),
    (Column::SampleId, &["activityidentifier", "activityactivityidentifier", "activityid"]),
    (Column::Depth, &["activitydepthheightmeasuremeasurevalue", "activitydepthheightmeasure"]),
    (Column::Lab, &["laboratoryname", "labinfoname"]),
    (Column::Time, &["activitystarttimetime", "activitystarttime"]),
    (
        // One narrow export spells speciation as specification.
        Column::Basis,
        &[
            "methodspeciationname",
            "methodspecificationname",
            "resultmethodspeciation",
            "methodspeciation",
        ],
    ),
    (
        Column::DetectionCondition,
        &[
            "resultdetectionconditiontext",
            "resultresultdetectioncondition",
            "resultdetectioncondition",
        ],
    ),
    (
        Column::Status,
        &["resultstatusidentifier", "resultmeasurestatusidentifier", "resultstatusid"],
    ),
    (Column::Medium, &["activitymedianame", "activitymedia"]),
];

/// Type, value and unit of a limit: 2.x, web upload, 3.0 with its letters.
const LIMITS: [[&str; 3]; 4] = [
    [
        "detectionquantitationlimittypename",
        "detectionquantitationlimitmeasuremeasurevalue",
        "detectionquantitationlimitmeasuremeasureunitcode",
    ],
    [
        "resultdetectionquantitationlimittype",
        "resultdetectionquantitationlimitmeasure",
        "resultdetectionquantitationlimitunit",
    ],
    ["detectionlimittypea", "detectionlimitmeasurea", "detectionlimitmeasureunita"],
    ["detectionlimittypeb", "detectionlimitmeasureb", "detectionlimitmeasureunitb"],
];

/// The canonical column of a folded name of the standard.
#[must_use]
pub fn meaning(folded: &str) -> Option<Column> {
    NAMES.iter().find(|(_, names)| names.contains(&folded)).map(|(column, _)| *column)
}

/// What a header of folded names is in the open standard.
#[must_use]
pub fn open_columns(folded: &[String]) -> OpenColumns {
    let at = |name: &str| folded.iter().position(|header| header == name);
    let every = |name: &str| -> Vec<usize> {
        let found = folded.iter().enumerate().filter(|(_, header)| *header == name);
        found.map(|(at, _)| at).collect()
    };
    let limits: Vec<LimitCells> = LIMITS
        .iter()
        .flat_map(|[kind, value, unit]| {
            let (kinds, units) = (every(kind), every(unit));
            every(value).into_iter().enumerate().map(move |(nth, value)| LimitCells {
                kind: kinds.get(nth).copied(),
                value,
                unit: units.get(nth).copied(),
            })
        })
        .collect();
    let has = |names: &[&str]| names.iter().all(|name| at(name).is_some());
    let layout = if has(&["locationidentifier", "resultcharacteristic", "resultmeasure"]) {
        Some(OpenLayout::Outbound)
    } else if has(&["monitoringlocationidentifier", "characteristicname", "resultmeasurevalue"]) {
        Some(if limits.is_empty() { OpenLayout::Narrow } else { OpenLayout::Result })
    } else if has(&["monitoringlocationid", "characteristicname", "resultvalue"]) {
        Some(OpenLayout::Upload)
    } else {
        None
    };
    OpenColumns {
        layout,
        limits,
        result_id: at("resultidentifier").or_else(|| at("resultmeasureidentifier")),
        other_names: ["resultcharacteristicusersupplied", "resultcharacteristiccomparable"]
            .into_iter()
            .filter_map(at)
            .collect(),
    }
}

impl OpenColumns {
    /// What a cell is read as, if it is one of these.
    #[must_use]
    pub fn key(&self, at: usize) -> Option<&'static str> {
        let of_limit = |cells: &LimitCells| match at {
            _ if cells.value == at => Some("limit"),
            _ if cells.kind == Some(at) => Some("limit type"),
            _ if cells.unit == Some(at) => Some("limit unit"),
            _ => None,
        };
        self.limits
            .iter()
            .find_map(of_limit)
            .or_else(|| (self.result_id == Some(at)).then_some("result id"))
            .or_else(|| self.other_names.contains(&at).then_some("other name of the analyte"))
    }
}
