//! Cross-tabs: which are read, how their cells are addressed, and why others are refused.

use super::{ledger, read_bytes, records, refusal, site, told};

fn of(text: &str) -> Vec<String> {
    records(text.as_bytes(), &site(""))
}

#[test]
fn each_cell_is_a_record_with_its_address_and_empty_ones_are_counted() {
    let text = "Benzene (ug/L)\n\nWell,2024-03-05,2024-06-05\nMW-1,4.2,\nMW-2,dry,<0.5\n";
    let expected = [
        "B4 MW-1 Benzene 2024-03-05 4.2 ug/L",
        "B5 MW-2 Benzene 2024-03-05 dry ug/L dry",
        "C5 MW-2 Benzene 2024-06-05 <0.5 ug/L",
    ];
    assert_eq!(of(text), expected);
    let tidy = read_bytes(text.as_bytes(), &site(""));
    assert_eq!((tidy.files[0].empty_cells, tidy.files[0].blank_lines), (1, 1));
    let mapped: Vec<(&str, &str)> =
        tidy.mapping.iter().map(|m| (m.header.as_str(), m.column.as_str())).collect();
    let expected =
        [("Well", "well"), ("2024-03-05 and 1 more across", "date"), ("Benzene", "analyte")];
    assert_eq!(mapped, expected);
}

#[test]
fn a_footnote_is_told_and_no_record() {
    let text = "Benzene (ug/L)\nWell,2024-03-05,2024-06-05\nMW-1,4.2,4\nAll by North Lab\n";
    assert_eq!(of(text).len(), 2);
    let told = told(text.as_bytes(), &site(""));
    assert!(told.iter().any(|told| told.contains("1 line") && told.contains("North")), "{told:?}");
}

#[test]
fn the_order_of_day_and_month_is_proved_by_all_dates_across() {
    let text = "Benzene (ug/L)\nWell,05/03/2024,25/03/2024\nMW-1,4.2,4\n";
    assert_eq!(of(text)[0], "B3 MW-1 Benzene 2024-03-05 4.2 ug/L");
    let open = "Benzene (ug/L)\nWell,05/03/2024,06/03/2024\nMW-1,4.2,4\n";
    assert!(of(open)[0].ends_with("ambiguous-date"), "{:?}", of(open));
}

#[test]
fn labels_in_the_corner_and_titles_in_pairs_are_understood() {
    let expected = ["B4 MW-1 Benzene 2024-03-05 4.2 ug/L", "C4 MW-1 Benzene 2024-06-05 4 ug/L"];
    for head in ["Date", "Well", ""] {
        let text =
            format!("Parameter:,Benzene\nUnits:,ug/L\n{head},2024-03-05,2024-06-05\nMW-1,4.2,4\n");
        assert_eq!(of(&text), expected, "{head}");
    }
    for head in ["Date", "Well", "", "Sampled"] {
        let text = format!("Benzene;in\n\nBenzene (ug/L)\n{head};MW-1;MW-2\n2024-03-05;4.2;4\n");
        let text = text.replace("Benzene;in\n\n", "");
        let expected = ["B3 MW-1 Benzene 2024-03-05 4.2 ug/L", "C3 MW-2 Benzene 2024-03-05 4 ug/L"];
        assert_eq!(of(&text), expected, "{head}");
    }
}

#[test]
fn a_row_of_units_and_columns_beside_the_analytes_are_read() {
    let text = "Well,Date,Sample ID,Benzene,Toluene,Remarks of the crew\n,,,ug/L,mg/L,\n\
                MW-1,2024-03-05,S-7,4.2,0.1,windy\n";
    let expected = ["D3 MW-1 Benzene 2024-03-05 4.2 ug/L", "E3 MW-1 Toluene 2024-03-05 0.1 mg/L"];
    assert_eq!(of(text), expected);
    let rows = ledger(text.as_bytes(), &site(""));
    assert!(rows.iter().all(|row| row.sample_id == "S-7"));
}

#[test]
fn a_title_between_rows_begins_a_block_under_the_same_head() {
    let text = "Well,2024-03-05,2024-06-05\nBenzene (ug/L)\nMW-1,4.2,4\nToluene (mg/L)\nMW-1,1,2\n";
    let expected = [
        "B3 MW-1 Benzene 2024-03-05 4.2 ug/L",
        "C3 MW-1 Benzene 2024-06-05 4 ug/L",
        "B5 MW-1 Toluene 2024-03-05 1 mg/L",
        "C5 MW-1 Toluene 2024-06-05 2 mg/L",
    ];
    assert_eq!(of(text), expected);
}

#[test]
fn a_cell_under_no_head_is_a_record_that_says_what_it_lacks() {
    let text = "Benzene (ug/L)\nWell,2024-03-05,2024-06-05\nMW-1,4.2,4,7\n,5,\n";
    let expected = [
        "B3 MW-1 Benzene 2024-03-05 4.2 ug/L",
        "C3 MW-1 Benzene 2024-06-05 4 ug/L",
        "D3 MW-1 Benzene 7 ug/L no-date",
        "B4 Benzene 2024-03-05 5 ug/L no-well",
    ];
    assert_eq!(of(text), expected);
}

#[test]
fn what_is_ambiguous_is_refused_with_the_key_that_settles_it() {
    for (text, parts) in [
        ("Well,2024-03-05,2024-06-05\nMW-1,4.2,4\n", vec!["analyte", "Benzene (ug/L)"]),
        ("Analyte,2024-03-05,2024-06-05\nBenzene,4.2,4\n", vec!["columns = { well ="]),
        ("Date,Benzene (ug/L),Toluene (mg/L)\n2024-03-05,4.2,4\n", vec!["columns = { well ="]),
        ("Date,MW-1,MW-2\n2024-03-05,4.2,4\n", vec!["analyte", "row above"]),
        (
            "Benzene (ug/L)\nToluene (ug/L)\nWell,2024-03-05,2024-06-05\nMW-1,4.2,4\n",
            vec!["lines 1 and 2", "\"Benzene\" and \"Toluene\""],
        ),
        (
            "Benzene (ug/L)\nToluene,2024-03-05,2024-06-05\nMW-1,4.2,4\n",
            vec!["lines 1 and 2", "\"Benzene\" and \"Toluene\""],
        ),
        (
            "Well,2024-03-05,2024-06-05\nBenzene (ug/L)\nMW-1,4.2,4\nMW-2\nOctarine\nMW-1,5,6\n",
            vec!["line 5, \"Octarine\"", "lines 3 and 6"],
        ),
        (
            "Benzene (ug/L)\nWell,2024-03-05,2024-06-05\nMW-1,4.2,4\nOctarine\n\
             Well,2024-03-05,2024-06-05\nMW-1,5,6\n",
            vec!["line 5 heads", "where the analyte is"],
        ),
        (
            "Well,Date,Benzene (ug/L),Toluene (mg/L),Qualifier\nMW-1,2024-03-05,4.2,4,U\n",
            vec!["\"Qualifier\"", "0.5 U"],
        ),
    ] {
        let why = refusal(text.as_bytes(), &site(""));
        assert!(parts.iter().all(|part| why.contains(part)), "{text}{why}");
    }
}

#[test]
fn a_declared_cross_tab_is_read_by_the_declared_columns() {
    let text = "Bore,Tag,Phlogiston,Benzene\nMW-1,2024-03-05,4.2,4\n";
    assert!(refusal(text.as_bytes(), &site("")).contains("no column for"));
    let declared = site("layout = \"cross-tab\"\ncolumns = { well = \"Bore\", date = \"Tag\" }");
    let expected = [
        "C2 MW-1 Phlogiston 2024-03-05 4.2 analyte-not-listed",
        "D2 MW-1 Benzene 2024-03-05 4 no-unit",
    ];
    assert_eq!(records(text.as_bytes(), &declared), expected);
    let nothing = refusal(b"a,b\nc,d\n", &site("layout = \"cross-tab\""));
    assert!(nothing.contains("declares a cross-tab"), "{nothing}");
    let long = b"well,analyte,date,result,unit\nMW-1,Benzene,2024-03-05,4,ug/L\n";
    assert_eq!(records(long, &site("layout = \"long\"")).len(), 1);
}

#[test]
fn a_long_table_with_words_of_its_own_is_never_taken_for_a_cross_tab() {
    for text in [
        "Site,Parameter,SampleDate,Conc.\nMW-1,Benzene,2024-03-05,4.2\n",
        "Parameter,SampleDate,Conc.,Method\nBenzene,2024-03-05,4.2,8260\n",
        "Well,Parameter,Date,Analysed,Conc (ug/L)\nMW-1,Benzene,2024-03-05,2024-03-09,4.2\n",
        "MW-1,Benzene,2024-03-05,2024-03-09,4.2,ug/L\nMW-1,Benzene,2024-06-05,2024-06-09,4,ug/L\n",
        "2024-03-05,MW-1,Benzene,4.2,ug/L\n2024-06-05,MW-1,Benzene,4,ug/L\n",
    ] {
        let why = refusal(text.as_bytes(), &site(""));
        assert!(why.contains("line 1 has no column for"), "{text}{why}");
    }
}

#[test]
fn a_name_at_the_left_is_not_written_into_more_records_than_memory_holds() {
    let heads: String = (0..2_000).map(|year| format!(",{}-01-01", 1900 + year % 300)).collect();
    let cells = ",5".repeat(2_000);
    let text = format!("Benzene (ug/L)\nWell{heads}\n{}{cells}\n", "x".repeat(500_000));
    assert!(refusal(text.as_bytes(), &site("")).contains("many times as long"));
}

#[test]
fn a_later_block_may_have_columns_that_the_first_has_not() {
    let text = "Well,Date,Benzene (ug/L)\nMW-1,2024-03-05,4.2\nWell,Date,Sample ID,Toluene (mg/L)\n\
                MW-1,2024-03-05,S-7,1\n";
    let rows = ledger(text.as_bytes(), &site(""));
    let said: Vec<(&str, &str)> =
        rows.iter().map(|row| (row.analyte.as_str(), row.sample_id.as_str())).collect();
    assert_eq!(said, [("Benzene", ""), ("Toluene", "S-7")]);
}
