//! Intake of long CSV: what becomes of each kind of record.

use ebbwell::intake::{Sources, Tidy, tidy};
use ebbwell::ledger::LedgerRow;
use ebbwell::site::{Site, read};
use proptest::prelude::{
    ProptestConfig, Strategy, any, prop, prop_assert, prop_assert_eq, proptest,
};

const SITE: &str = r#"
[site]
name = "Osier Yard"
aliases = ["OY"]

[[results]]
files = "*"
ppb-in-water = true
uncertainty = "1-sigma"
sample-types = { "77" = "spike" }

[[analyte]]
name = "Benzene"
cas = "71-43-2"
limit = "5 ug/L"
limit-source = "40 CFR 141.61"

[[analyte]]
name = "Nitrate"
basis = "N"
unit = "mg/L"
medium = "water"

[[analyte]]
name = "Chromium"
fraction = "dissolved"
unit = "ug/L"

[[analyte]]
name = "Tritium"
unit = "pCi/L"

[[well]]
name = "MW-1"
aliases = [{ name = "B-1", to = 2020-12-31, who = "surveyor", when = 2021-01-05, why = "renamed" }]

[[qualifier]]
code = "B"
means = "blank"
who = "chemist"
when = 2024-01-05
why = "legend of the laboratory"

[[decision]]
id = "D1"
kind = "exclude"
wells = ["MW-8"]
who = "analyst"
when = 2024-05-01
why = "pump failed during purging"
"#;

fn site() -> Site {
    read(SITE, "site.toml").unwrap_or_else(|problems| panic!("{problems:?}"))
}

fn read_table(site: &Site, text: &str) -> Tidy {
    let tidy = tidy(&Sources::Standard(text.as_bytes().to_vec()), site, &|_| true);
    tidy.expect("a frame").expect("not stopped")
}

/// The ledger of a table, before any merge of dates.
fn ledger(site: &Site, text: &str) -> Vec<LedgerRow> {
    let tidy = read_table(site, text);
    assert_eq!(tidy.unreadable, []);
    let detail =
        |told: &[&ebbwell::ledger::Told]| ebbwell::words::told::details(told.iter().copied());
    tidy.ledger_rows(site, &detail).expect("rows").collect()
}

/// The outcome of one record under a header of every column it fills: `column=cell` pairs over a
/// plain sample of benzene.
fn fate(cells: &[(&str, &str)]) -> (String, String) {
    let mut record = vec![
        ("well", "MW-1"),
        ("analyte", "Benzene"),
        ("date", "2024-03-05"),
        ("result", "4.2"),
        ("unit", "ug/L"),
    ];
    for &(column, cell) in cells {
        match record.iter_mut().find(|(known, _)| *known == column) {
            Some(known) => known.1 = cell,
            None => record.push((column, cell)),
        }
    }
    let header: Vec<&str> = record.iter().map(|(column, _)| *column).collect();
    let cells: Vec<String> = record.iter().map(|(_, cell)| format!("\"{cell}\"")).collect();
    let rows = ledger(&site(), &format!("{}\n{}\n", header.join(","), cells.join(",")));
    assert_eq!(rows.len(), 1);
    (rows[0].outcome.to_owned(), rows[0].reason.clone())
}

#[test]
fn each_reason_to_set_a_record_aside_has_its_record() {
    for (cells, reason) in [
        (vec![("result", "<O.5")], "unreadable-number"),
        (vec![("result", "1e400")], "unreadable-number"),
        (vec![("result", "NaN")], "unreadable-number"),
        (vec![("result", "5,1,2")], "unreadable-number"),
        (vec![("date", "2024-02-30")], "unreadable-date"),
        (vec![("date", "05/03/2024")], "ambiguous-date"),
        (vec![("date", "")], "no-date"),
        (vec![("well", " ")], "no-well"),
        (vec![("analyte", "")], "no-analyte"),
        (vec![("result", "")], "no-result"),
        (vec![("unit", "")], "no-unit"),
        (vec![("unit", "furlong/L")], "unknown-unit"),
        (vec![("qualifier", "U"), ("result", "")], "no-reporting-limit"),
        (vec![("result", "0")], "low-result"),
        (vec![("result", "-1")], "low-result"),
        (vec![("qualifier", "R")], "rejected"),
        (vec![("qualifier", "J R")], "rejected"),
        (vec![("status", "Rejected")], "rejected"),
        (vec![("qualifier", "E")], "qualifier-needs-legend"),
        (vec![("qualifier", "U,N")], "qualifier-needs-legend"),
        (vec![("qualifier", ">"), ("result", "")], "above-range"),
        (vec![("detection condition", "Trace")], "condition-needs-legend"),
        (vec![("sample type", "oddity")], "unknown-sample-type"),
        (vec![("analyte", "Phlogiston")], "analyte-not-listed"),
        (vec![("site", "Elsewhere")], "other-site"),
        (vec![("analyte", "Chromium"), ("fraction", "total")], "other-fraction"),
        (vec![("analyte", "Nitrate"), ("unit", "mg/L"), ("medium", "soil")], "other-medium"),
    ] {
        assert_eq!(fate(&cells), ("set-aside".to_owned(), reason.to_owned()), "{cells:?}");
    }
}

#[test]
fn what_can_be_used_waits_for_its_date() {
    let candidate = (String::new(), String::new());
    for cells in [
        vec![("result", "<0.5")],
        vec![("result", ">2000")],
        vec![("unit", "ppb")],
        vec![("qualifier", "J+")],
        vec![("qualifier", "B")],
        vec![("qualifier", "H")],
        vec![("qualifier", "UJ"), ("reporting limit", "0.5")],
        vec![("result", ""), ("qualifier", "ND"), ("detection limit", "0.1")],
        vec![("detection condition", "Not Detected"), ("result", ""), ("RL", "1")],
        vec![("site", "oy")],
        vec![("analyte", "benzol")],
        vec![("analyte", "?"), ("cas", "71-43-2")],
        vec![("date", "25/03/2024")],
        vec![("sample type", "Sample-Routine")],
        vec![("analyte", "Tritium"), ("unit", "pCi/L"), ("result", "-3"), ("uncertainty", "5")],
    ] {
        assert_eq!(fate(&cells), candidate, "{cells:?}");
    }
}

#[test]
fn quality_control_and_records_without_a_result_are_told_apart() {
    for (cell, outcome, reason) in [
        ("Field Duplicate", "quality-control", "duplicate"),
        ("Trip Blank", "quality-control", "blank"),
        ("77", "quality-control", "spike"),
        ("Quality Control Sample-Field Replicate", "quality-control", "duplicate"),
        ("dry", "non-result", "dry"),
        ("free product", "non-result", "free-product"),
        ("No Access", "non-result", "no-access"),
    ] {
        let found = fate(&[("sample type", cell)]);
        assert_eq!(found, (outcome.to_owned(), reason.to_owned()), "{cell}");
    }
    assert_eq!(fate(&[("result", "DRY")]), ("non-result".to_owned(), "dry".to_owned()));
    let gap = fate(&[("detection condition", "Not Reported")]);
    assert_eq!(gap, ("non-result".to_owned(), "not-reported".to_owned()));
}

#[test]
fn an_alias_counts_in_its_time_only() {
    let rows = ledger(
        &site(),
        "well,analyte,date,result,unit\nB-1,Benzene,2020-03-05,4,ug/L\nB-1,Benzene,2021-03-05,4,ug/L\n",
    );
    assert_eq!((rows[0].well.as_str(), rows[1].well.as_str()), ("MW-1", "B-1"));
    assert!(rows[0].detail.contains("B-1"), "{}", rows[0].detail);
}

#[test]
fn a_diluted_analysis_supersedes_the_one_over_the_calibration() {
    let rows = ledger(
        &site(),
        "well,analyte,date,result,unit,qualifier\nMW-1,Benzene,2024-03-05,900,ug/L,E\n\
         MW-1,Benzene,2024-03-05,1200,ug/L,D\n",
    );
    assert_eq!((rows[0].outcome, rows[0].reason.as_str()), ("merged", "superseded-by-dilution"));
    assert_eq!(rows[1].outcome, "");
}

#[test]
fn the_same_sample_twice_is_a_repeat_and_two_values_both_stay() {
    let rows = ledger(
        &site(),
        "well,analyte,date,result,unit,sample_id\nMW-1,Benzene,2024-03-05,4.0,ug/L,S1\n\
         MW-1,Benzene,2024-03-05,0.004,mg/L,S1\nMW-1,Benzene,2024-03-05,4.0,ug/L,S2\n\
         MW-1,Benzene,2024-03-05,5.0,ug/L,S1\n",
    );
    let outcomes: Vec<(&str, &str)> =
        rows.iter().map(|row| (row.outcome, row.reason.as_str())).collect();
    assert_eq!(outcomes, [("", ""), ("merged", "repeat"), ("", ""), ("", "")]);
}

#[test]
fn several_depths_wait_for_a_word() {
    let text = "well,analyte,date,result,unit,depth\nMW-3,Benzene,2024-03-05,4,ug/L,5\n\
                MW-3,Benzene,2024-06-05,4,ug/L,5.0\n";
    assert_eq!(ledger(&site(), text)[0].reason, "");
    let rows = ledger(&site(), &format!("{text}MW-3,Benzene,2024-06-05,4,ug/L,12\n"));
    assert!(rows.iter().all(|row| row.reason == "depth-differs"), "{rows:?}");
}

#[test]
fn separators_line_ends_and_marks_of_the_encoding_change_nothing() {
    let plain = "well,analyte,date,result,unit\nMW-1,Benzene,2024-03-05,4.2,ug/L\n\
                 MW-1,Benzene,2024-06-05,3.9,ug/L\n";
    let values = |text: &str| -> Vec<[String; 4]> {
        let rows = ledger(&site(), text);
        rows.into_iter().map(|row| [row.record, row.well, row.date, row.reported]).collect()
    };
    let expected = values(plain);
    for text in [
        plain.replace(',', ";"),
        plain.replace(',', "\t"),
        plain.replace('\n', "\r\n"),
        plain.replace('\n', "\r"),
        format!("\u{feff}{plain}"),
        plain.replace("well", "\"Sample Location ID\"").replace("unit", " Units "),
    ] {
        assert_eq!(values(&text), expected, "{text:?}");
    }
}

#[test]
fn surplus_cells_count_only_where_they_are_filled() {
    let rows = ledger(
        &site(),
        "well,analyte,date,result,unit,lab\nMW-1,Benzene,2024-03-05,4,ug/L\n\
         MW-1,Benzene,2024-06-05,4,ug/L,x,,\nMW-1,Benzene,2024-09-05,4,ug/L,x,y\n\
         MW-1,Benzene,2024-12-05\n",
    );
    let reasons: Vec<&str> = rows.iter().map(|row| row.reason.as_str()).collect();
    assert_eq!(reasons, ["", "", "ragged", "ragged"]);
}

#[test]
fn a_decision_names_its_records_by_well() {
    let tidy = read_table(
        &site(),
        "well,analyte,date,result,unit\nMW-8,Benzene,2024-03-05,4,ug/L\nMW-1,Benzene,2024-03-05,4,ug/L\n",
    );
    assert_eq!(tidy.decided, [1]);
}

/// Cells that laboratories and accidents produce.
fn cell() -> impl Strategy<Value = String> {
    let known = prop::sample::select(vec![
        "MW-1",
        "Benzene",
        "2024-03-05",
        "05/03/2024",
        "4.2",
        "<0.5",
        ">10",
        "ND",
        "ug/L",
        "mg/L",
        "U",
        "J",
        "R",
        "",
        " ",
        "0",
        "-3",
        "1e400",
        "NaN",
        "dry",
        "duplicate",
        "71-43-2",
        "dissolved",
        "=1+1",
        "\u{b5}g/L",
        "5,1",
        "1/2",
        "\u{202e}x",
        "2024-13-45",
        "45292",
    ]);
    let known = known.prop_map(str::to_owned);
    prop::strategy::Union::new([known.boxed(), any::<String>().boxed()])
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 400, failure_persistence: None, ..ProptestConfig::default() })]

    /// Property 20 of the method notes: whatever stands in a cell is used as intended or has a
    /// reason, and every record has one ledger row; no input makes the program stop.
    #[test]
    fn any_table_of_any_cells_has_one_ledger_row_a_record(
        table in prop::collection::vec(prop::collection::vec(cell(), 12), 0..20),
        listed in any::<bool>(),
    ) {
        let mut writer = csv::Writer::from_writer(Vec::new());
        let header = [
            "well", "analyte", "date", "result", "unit", "qualifier", "reporting_limit",
            "detection_limit", "cas", "fraction", "sample_type", "depth",
        ];
        writer.write_record(header).expect("in memory");
        for row in &table {
            writer.write_record(row).expect("in memory");
        }
        let text = String::from_utf8(writer.into_inner().expect("in memory")).expect("UTF-8");
        let site = if listed { site() } else { Site::bare() };
        let holds_nul = table.iter().flatten().any(|cell| cell.contains('\0'));
        let read = tidy(&Sources::Standard(text.into_bytes()), &site, &|_| true);
        let read = read.expect("a frame").expect("not stopped");
        if holds_nul {
            prop_assert_eq!(read.unreadable.len(), 1);
        } else {
            let filled = table.iter().filter(|row| row.iter().any(|cell| !cell.trim().is_empty()));
            prop_assert_eq!(read.ledger.len(), filled.count());
            prop_assert_eq!(read.files[0].records, read.ledger.len());
            for row in read.ledger_rows(&site, &|_| String::new()).expect("rows") {
                prop_assert!(row.outcome.is_empty() == row.reason.is_empty());
            }
        }
    }
}
