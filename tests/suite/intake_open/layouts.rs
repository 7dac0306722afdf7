//! One data set in every layout of the open standard gives one summary.

use std::collections::BTreeMap;
use std::fs;
use std::path::Path;
use std::process::Command;

use tempfile::TempDir;

const SITE: &str = r#"
[site]
name = "Osier Yard"

[[analyte]]
name = "Benzene"
cas = "71-43-2"
fraction = "total"
limit = "5 ug/L"
limit-source = "40 CFR 141.61"

[[analyte]]
name = "Nitrate"
fraction = "dissolved"
basis = "N"
limit = "10 mg/L as N"
limit-source = "40 CFR 141.62"
"#;

/// One invented record, in words of the standard.
#[derive(Clone, Debug, Default)]
struct Record {
    id: String,
    sample: String,
    kind: &'static str,
    well: &'static str,
    date: String,
    analyte: &'static str,
    fraction: &'static str,
    basis: &'static str,
    condition: &'static str,
    value: String,
    unit: &'static str,
    qualifier: &'static str,
    status: &'static str,
    /// Reporting limit with its unit.
    limit: Option<(&'static str, &'static str)>,
}

/// Ten half-yearly rounds of two analytes in two wells: falling, the last ones not detected; with
/// a trip blank, a replicate, a rejected result and a gap.
fn records() -> Vec<Record> {
    let mut all = Vec::new();
    for (well, start) in [("OY-1", 64.0), ("OY-2", 12.5)] {
        for round in 0..10_u32 {
            let date =
                format!("{}-{}-14", 2015 + round / 2, if round % 2 == 0 { "03" } else { "09" });
            let benzene = start * f64::from(0.5_f32).powi(i32::try_from(round).expect("small"))
                + f64::from(round % 3) * 0.01;
            let nitrate = 20.0 - 1.3 * f64::from(round) + f64::from(round * 7 % 5) * 0.1;
            let sample = format!("{well}-{date}");
            let plain = Record {
                id: format!("R{}", all.len()),
                sample: sample.clone(),
                kind: "Sample-Routine",
                well,
                date: date.clone(),
                status: "Final",
                ..Record::default()
            };
            let mut first = Record {
                analyte: "Benzene",
                fraction: "Total",
                limit: Some(("0.5", "ug/l")),
                ..plain.clone()
            };
            if benzene < 0.5 {
                first.condition = "Not Detected";
            } else {
                first.value = format!("{benzene:.3}");
                first.unit = "ug/l";
            }
            all.push(first.clone());
            let second = Record {
                id: format!("R{}", all.len()),
                analyte: "Nitrate",
                fraction: "Dissolved",
                basis: "as N",
                value: format!("{nitrate:.2}"),
                unit: "mg/l",
                limit: Some(("50", "ug/l")),
                ..plain.clone()
            };
            all.push(second);
            if round == 4 {
                for (kind, value) in [
                    ("Quality Control Sample-Field Replicate", "61"),
                    ("Quality Control Sample-Trip Blank", "1.5"),
                ] {
                    all.push(Record {
                        id: format!("R{}", all.len()),
                        sample: format!("{sample}-{}", value.len()),
                        kind,
                        value: value.to_owned(),
                        unit: "ug/l",
                        condition: "",
                        ..first.clone()
                    });
                }
                all.push(Record {
                    id: format!("R{}", all.len()),
                    sample: format!("{sample}-b"),
                    date: format!("{}-06-01", 2015 + round / 2),
                    status: "Rejected",
                    value: "999".into(),
                    unit: "ug/l",
                    condition: "",
                    ..first.clone()
                });
                all.push(Record {
                    id: format!("R{}", all.len()),
                    sample: format!("{sample}-c"),
                    date: format!("{}-07-01", 2015 + round / 2),
                    condition: "Not Reported",
                    value: String::new(),
                    unit: "",
                    limit: None,
                    ..first.clone()
                });
            }
        }
    }
    all
}

type Cell = fn(&Record) -> String;

fn limit(record: &Record) -> (&'static str, &'static str) {
    record.limit.unwrap_or_default()
}

/// A table of records: each column its header and its cell.
fn render(columns: &[(&str, Cell)]) -> String {
    let mut writer = csv::Writer::from_writer(Vec::new());
    writer.write_record(columns.iter().map(|(header, _)| *header)).expect("memory");
    for record in records() {
        writer.write_record(columns.iter().map(|(_, cell)| cell(&record))).expect("memory");
    }
    String::from_utf8(writer.into_inner().expect("memory")).expect("text")
}

fn plain() -> String {
    render(&[
        ("well", |r| r.well.into()),
        ("analyte", |r| r.analyte.into()),
        ("date", |r| r.date.clone()),
        ("result", |r| r.value.clone()),
        ("unit", |r| if r.condition.is_empty() { r.unit.into() } else { "ug/L".into() }),
        ("qualifier", |r| if r.condition == "Not Detected" { "U".into() } else { String::new() }),
        // One unit a column in the plain table: the result's.
        ("reporting_limit", |r| match (r.analyte, limit(r).0) {
            ("Nitrate", "50") => "0.05".into(),
            (_, limit) => limit.into(),
        }),
        ("fraction", |r| r.fraction.to_lowercase()),
        ("basis", |r| if r.basis.is_empty() { String::new() } else { "N".into() }),
        ("sample_type", |r| match r.kind {
            "Sample-Routine" if r.condition == "Not Reported" => "not reported".into(),
            "Sample-Routine" => "regular".into(),
            kind if kind.contains("Blank") => "trip blank".into(),
            _ => "field duplicate".into(),
        }),
        ("status", |r| r.status.into()),
        ("sample_id", |r| r.sample.clone()),
    ])
}

/// The 2.x columns that all its result layouts share.
fn two_x() -> Vec<(&'static str, Cell)> {
    vec![
        ("OrganizationIdentifier", |_| "OSIER".into()),
        ("OrganizationFormalName", |_| "Osier Yard Trust".into()),
        ("ActivityIdentifier", |r| r.sample.clone()),
        ("ActivityStartDate", |r| r.date.clone()),
        ("ActivityStartTime/Time", |_| "10:20:00".into()),
        ("ActivityStartTime/TimeZoneCode", |_| "CST".into()),
        ("MonitoringLocationIdentifier", |r| r.well.into()),
        ("MonitoringLocationName", |r| format!("Yard well {}", r.well)),
        ("ResultIdentifier", |r| r.id.clone()),
        ("ResultDetectionConditionText", |r| r.condition.into()),
        ("MethodSpeciationName", |r| r.basis.into()),
        ("CharacteristicName", |r| r.analyte.into()),
        ("ResultSampleFractionText", |r| r.fraction.into()),
        ("ResultMeasureValue", |r| r.value.clone()),
        ("ResultMeasure/MeasureUnitCode", |r| r.unit.into()),
        ("MeasureQualifierCode", |r| r.qualifier.into()),
        ("ResultStatusIdentifier", |r| r.status.into()),
        ("ResultValueTypeName", |_| "Actual".into()),
        ("LaboratoryName", |_| "Reed Laboratory".into()),
        ("ProviderName", |_| "STORET".into()),
    ]
}

fn result_layout() -> String {
    let mut columns = two_x();
    columns.push(("ActivityTypeCode", |r| r.kind.into()));
    columns.push(("ActivityMediaName", |_| "Water".into()));
    columns.push(("DetectionQuantitationLimitTypeName", |r| match r.limit {
        Some(_) => "Laboratory Reporting Level".into(),
        None => String::new(),
    }));
    columns.push(("DetectionQuantitationLimitMeasure/MeasureValue", |r| limit(r).0.into()));
    columns.push(("DetectionQuantitationLimitMeasure/MeasureUnitCode", |r| limit(r).1.into()));
    render(&columns)
}

/// The narrow layout has no sample types, so its quality-control records are left out by name.
fn narrow_layout() -> String {
    let mut columns = two_x();
    columns.push(("ActivityTypeCode", |r| r.kind.into()));
    render(&columns)
}

fn limit_table() -> String {
    let mut text = "OrganizationIdentifier,ActivityIdentifier,MonitoringLocationIdentifier,\
                    ResultIdentifier,CharacteristicName,DetectionQuantitationLimitTypeName,\
                    DetectionQuantitationLimitMeasure/MeasureValue,\
                    DetectionQuantitationLimitMeasure/MeasureUnitCode,ProviderName\n"
        .to_owned();
    for record in records() {
        let Some((value, unit)) = record.limit else { continue };
        let Record { id, sample, well, analyte, .. } = &record;
        for (kind, value) in [
            ("Drinking Water Maximum", "5"),
            ("Method Detection Level", "0.01"),
            ("Laboratory Reporting Level", value),
        ] {
            text.push_str(&format!(
                "OSIER,{sample},{well},{id},{analyte},{kind},{value},{unit},STORET\n"
            ));
        }
    }
    text.push_str("OSIER,no such sample,OY-1,R9999,Benzene,Reporting limit,1,ug/l,STORET\n");
    text
}

fn stations() -> &'static str {
    "OrganizationIdentifier,MonitoringLocationIdentifier,MonitoringLocationName,\
     MonitoringLocationTypeName,LatitudeMeasure,LongitudeMeasure,\
     HorizontalCoordinateReferenceSystemDatumName\n\
     OSIER,OY-1,Yard well 1,Well,43.1,-89.7,NAD83\n\
     OSIER,OY-2,Yard well 2,Well,43.2,889.7,NAD83\n"
}

fn outbound_layout() -> String {
    render(&[
        ("Org_Identifier", |_| "OSIER".into()),
        ("Location_Identifier", |r| r.well.into()),
        ("Location_Name", |r| format!("Yard well {}", r.well)),
        ("Location_Latitude", |_| "43.1".into()),
        ("Location_Longitude", |_| "-89.7".into()),
        ("Activity_ActivityIdentifier", |r| r.sample.clone()),
        ("Activity_TypeCode", |r| match r.kind {
            "Sample-Routine" => "Sample - Routine, regular".into(),
            kind => kind.into(),
        }),
        ("Activity_Media", |_| "Water".into()),
        ("Activity_StartDate", |r| r.date.clone()),
        ("Activity_StartTime", |_| "10:20:00".into()),
        ("Activity_StartTimeZone", |_| "CST".into()),
        ("Result_ResultDetectionCondition", |r| r.condition.into()),
        ("Result_Characteristic", |r| match r.analyte {
            "Benzene" => "Benzol, total".into(),
            analyte => analyte.into(),
        }),
        ("Result_CharacteristicUserSupplied", |r| r.analyte.into()),
        ("Result_CASNumber", |_| String::new()),
        ("Result_MethodSpeciation", |r| r.basis.into()),
        ("Result_SampleFraction", |r| match r.fraction {
            "Dissolved" => "Filtered field and/or lab".into(),
            _ => "Unfiltered".into(),
        }),
        ("Result_MeasureIdentifier", |r| r.id.clone()),
        ("Result_Measure", |r| r.value.clone()),
        ("Result_MeasureUnit", |r| r.unit.into()),
        ("Result_MeasureQualifierCode", |r| r.qualifier.into()),
        ("Result_MeasureStatusIdentifier", |r| r.status.into()),
        ("DetectionLimit_TypeA", |r| match r.limit {
            Some(_) => "Method Detection Level".into(),
            None => String::new(),
        }),
        ("DetectionLimit_MeasureA", |r| r.limit.map_or("", |_| "0.01").into()),
        ("DetectionLimit_MeasureUnitA", |r| limit(r).1.into()),
        ("DetectionLimit_TypeB", |r| r.limit.map_or("", |_| "Reporting limit").into()),
        ("DetectionLimit_MeasureB", |r| limit(r).0.into()),
        ("DetectionLimit_MeasureUnitB", |r| limit(r).1.into()),
        ("LabInfo_Name", |_| "Reed Laboratory".into()),
    ])
}

fn upload_layout() -> String {
    render(&[
        ("Project ID", |_| "P1".into()),
        ("Monitoring Location ID", |r| r.well.into()),
        ("Activity ID", |r| r.sample.clone()),
        ("Activity Type", |r| r.kind.into()),
        ("Activity Media Name", |_| "Water".into()),
        ("Activity Start Date", |r| r.date.clone()),
        ("Activity Start Time", |_| "10:20:00".into()),
        ("Activity Start Time Zone", |_| "CST".into()),
        ("Characteristic Name", |r| r.analyte.into()),
        ("Method Speciation", |r| r.basis.into()),
        ("Result Detection Condition", |r| r.condition.into()),
        ("Result Value", |r| r.value.clone()),
        ("Result Unit", |r| r.unit.into()),
        ("Result Qualifier", |r| r.qualifier.into()),
        ("Result Sample Fraction", |r| r.fraction.into()),
        ("Result Status ID", |r| r.status.into()),
        ("Result Value Type", |_| "Actual".into()),
        ("Result Detection/Quantitation Limit Type", |r| {
            r.limit.map_or("", |_| "Reporting limit").into()
        }),
        ("Result Detection/Quantitation Limit Measure", |r| limit(r).0.into()),
        ("Result Detection/Quantitation Limit Unit", |r| limit(r).1.into()),
    ])
}

/// What a review of some files gives: summary.csv, outcomes with their counts, what was said.
struct Reviewed {
    summary: String,
    outcomes: BTreeMap<(String, String), usize>,
    said: String,
}

fn review(site: &str, files: &[(&str, &str)]) -> Reviewed {
    let place = TempDir::new().expect("a folder");
    let folder = place.path().join("osier");
    fs::create_dir_all(folder.join("results")).expect("a folder");
    fs::write(folder.join("site.toml"), site).expect("a site file");
    for (name, text) in files {
        fs::write(folder.join("results").join(name), text).expect("a results file");
    }
    let out = place.path().join("out");
    let output = Command::new(env!("CARGO_BIN_EXE_ebbwell"))
        .args(["review", "--as-of", "2020-01-01", "--out"])
        .arg(&out)
        .arg(&folder)
        .output()
        .expect("the program starts");
    let said = String::from_utf8_lossy(&output.stdout).into_owned()
        + &String::from_utf8_lossy(&output.stderr);
    assert_eq!(output.status.code(), Some(0), "{said}");
    Reviewed {
        summary: text_of(&out, "summary.csv"),
        outcomes: outcomes(&out),
        said: said + &notes(&out),
    }
}

fn text_of(out: &Path, name: &str) -> String {
    fs::read_to_string(out.join(name)).expect("an output")
}

fn notes(out: &Path) -> String {
    let json: serde_json::Value =
        serde_json::from_str(&text_of(out, "summary.json")).expect("JSON");
    json["notes"].to_string()
}

fn outcomes(out: &Path) -> BTreeMap<(String, String), usize> {
    let mut counts = BTreeMap::new();
    let mut ledger = csv::Reader::from_path(out.join("ledger.csv")).expect("a ledger");
    for record in ledger.records() {
        let record = record.expect("a record");
        *counts.entry((record[14].to_owned(), record[15].to_owned())).or_default() += 1;
    }
    counts
}

fn count(reviewed: &Reviewed, outcome: &str, reason: &str) -> usize {
    reviewed.outcomes.get(&(outcome.into(), reason.into())).copied().unwrap_or_default()
}

#[test]
fn the_result_layout_gives_the_summary_of_the_plain_table() {
    let expected = review(SITE, &[("a.csv", &plain())]);
    // Two wells with two analytes; eight records of quality control and gaps.
    assert_eq!(expected.summary.lines().count(), 5, "{}", expected.summary);
    let text = result_layout();
    let found = review(SITE, &[("a.csv", &text)]);
    assert_eq!(found.summary, expected.summary);
    assert_eq!(found.outcomes, expected.outcomes);
    assert_eq!(count(&found, "quality-control", "blank"), 2);
    assert_eq!(count(&found, "quality-control", "duplicate"), 2);
    assert_eq!(count(&found, "set-aside", "rejected"), 2);
    assert_eq!(count(&found, "non-result", "not-reported"), 2);
    assert!(found.said.contains("2.x result layout"), "{}", found.said);
}

#[test]
fn points_in_place_of_slashes_change_nothing() {
    let expected = review(SITE, &[("a.csv", &plain())]);
    let text = result_layout();
    let (header, rest) = text.split_once('\n').expect("a header");
    let dotted = format!("{}\n{rest}", header.replace('/', "."));
    let found = review(SITE, &[("a.csv", &dotted)]);
    assert_eq!((found.summary, found.outcomes), (expected.summary, expected.outcomes));
}

#[test]
fn the_narrow_layout_with_its_limit_table_and_stations_gives_the_same() {
    let expected = review(SITE, &[("a.csv", &plain())]);
    let files = [
        ("narrow.csv", narrow_layout()),
        ("resdetectqntlmt.csv", limit_table()),
        ("station.csv", stations().to_owned()),
    ];
    let files: Vec<(&str, &str)> =
        files.iter().map(|(name, text)| (*name, text.as_str())).collect();
    let found = review(SITE, &files);
    assert_eq!(found.summary, expected.summary);
    let limits = 3 * records().iter().filter(|record| record.limit.is_some()).count();
    assert_eq!(count(&found, "merged", "detection-limit"), limits);
    assert_eq!(count(&found, "set-aside", "unmatched-limit"), 1);
    assert_eq!(count(&found, "merged", "station"), 2);
    assert_eq!(count(&found, "used", ""), count(&expected, "used", ""));
    assert!(found.said.contains("Drinking Water Maximum"), "{}", found.said);
    assert!(!found.said.contains("has no columns for limits"), "{}", found.said);
}

#[test]
fn a_narrow_file_alone_is_told_and_its_non_detects_wait_for_their_limits() {
    let found = review(SITE, &[("narrow.csv", &narrow_layout())]);
    assert!(found.said.contains("has no columns for limits"), "{}", found.said);
    let not_detected = records().iter().filter(|r| r.condition == "Not Detected").count();
    // They lack a unit too, but it is the limit that would bring one.
    assert_eq!(count(&found, "set-aside", "no-reporting-limit"), not_detected);
}

#[test]
fn the_outbound_layout_gives_the_same() {
    let expected = review(SITE, &[("a.csv", &plain())]);
    let found = review(SITE, &[("a.csv", &outbound_layout())]);
    assert_eq!(found.summary, expected.summary);
    assert_eq!(found.outcomes, expected.outcomes);
    assert!(found.said.contains("3.0 outbound layout"), "{}", found.said);
}

#[test]
fn the_upload_layout_gives_the_same() {
    let expected = review(SITE, &[("a.csv", &plain())]);
    let found = review(SITE, &[("a.csv", &upload_layout())]);
    assert_eq!((found.summary, found.outcomes), (expected.summary, expected.outcomes));
    assert!(found.said.contains("web upload layout"), "{}", found.said);
}

#[test]
fn the_declared_order_of_limits_decides_which_one_counts() {
    let limit_of = |settings: &str| -> String {
        let site = super::site(&format!("[site]\nname = \"x\"\n{settings}"));
        let text = "Location_Identifier,Activity_StartDate,Result_Characteristic,\
                    Result_ResultDetectionCondition,Result_Measure,Result_MeasureUnit,\
                    DetectionLimit_TypeA,DetectionLimit_MeasureA,DetectionLimit_MeasureUnitA,\
                    DetectionLimit_TypeB,DetectionLimit_MeasureB,DetectionLimit_MeasureUnitB\n\
                    OY-1,2020-03-14,Benzene,Not Detected,,,Method Detection Level,100,ng/L,\
                    Reporting limit,0.5,ug/L\n\
                    OY-1,2021-03-14,Benzene,Not Detected,,ug/L,Upper Reporting Limit,900,ug/L,\
                    Yard level,0.7,ug/L\n";
        super::values(&site, text).join(" ")
    };
    assert_eq!(limit_of(""), "<0.5 no-reporting-limit");
    let order = "[settings]\nlimit-order = [\"Yard level\", \"Method Detection Level\"]\n";
    assert_eq!(limit_of(order), "<0.1 <0.7");
    let told = ebbwell::site::read(
        "[site]\nname = \"x\"\n[settings]\nlimit-order = [\"Drinking Water Maximum\"]\n",
        "site.toml",
    );
    let told = told.expect_err("no detection limit");
    assert!(told[0].to_string().contains("type of reporting or detection limit"), "{}", told[0]);
}

#[test]
fn stations_are_kept_with_their_coordinates_where_those_can_be_true() {
    let site = super::site(
        "[site]\nname = \"x\"\n[[well]]\nname = \"MW-1\"\naliases = [\
        { name = \"OY-1\", who = \"A\", when = 2026-01-01, why = \"the agency's number\" }]\n",
    );
    for text in [stations().to_owned(), stations().replace(',', ";"), stations().replace(',', "\t")]
    {
        let tidy = super::read_text(&site, &text);
        let found: Vec<(&str, &str, Option<f64>, Option<f64>)> = tidy
            .stations
            .iter()
            .map(|s| (s.well.as_str(), s.name.as_str(), s.latitude, s.longitude))
            .collect();
        let expected = [
            ("MW-1", "Yard well 1", Some(43.1), Some(-89.7)),
            ("OY-2", "Yard well 2", Some(43.2), None),
        ];
        assert_eq!(found, expected);
        assert_eq!((tidy.stations[1].line, tidy.stations[1].datum.as_str()), (3, "NAD83"));
        let rows = super::rows_of(&tidy, &site);
        assert!(rows.iter().all(|row| row.reason == "station"), "{rows:?}");
    }
}

#[test]
fn limits_without_result_identifiers_join_only_where_they_speak_of_one_result() {
    let header =
        "MonitoringLocationIdentifier,ActivityIdentifier,ResultIdentifier,CharacteristicName";
    let results = format!(
        "{header},ActivityStartDate,ResultDetectionConditionText,ResultMeasureValue,\
         ResultMeasure/MeasureUnitCode\nOY-1,S1,,Benzene,2017-03-14,Not Detected,,\n\
         OY-1,S2,R2,Benzene,2018-03-14,Not Detected,,\n\
         OY-1,S3,,Benzene,2019-03-14,Not Detected,,\n"
    );
    let limits = format!(
        "{header},DetectionQuantitationLimitTypeName,DetectionQuantitationLimitMeasure/MeasureValue,\
         DetectionQuantitationLimitMeasure/MeasureUnitCode\n\
         OY-1,S1,R1,Benzene,Reporting limit,0.5,ug/l\nOY-1,S2,,Benzene,Reporting limit,0.6,ug/l\n\
         OY-1,S3,R3,Benzene,Reporting limit,0.7,ug/l\nOY-1,S3,R4,Benzene,Reporting limit,9,ug/l\n"
    );
    let found = review("[site]\nname = \"x\"\n", &[("a.csv", &results), ("b.csv", &limits)]);
    assert_eq!(count(&found, "merged", "detection-limit"), 2);
    assert_eq!(count(&found, "set-aside", "unmatched-limit"), 2);
    assert_eq!(count(&found, "set-aside", "no-reporting-limit"), 1);
    assert_eq!(count(&found, "used", ""), 2);
}
