//! What stands in workbooks beside plain cells.

use rust_xlsxwriter::{Format, Workbook};

use super::by_hand::{book, one_row, text};
use super::grids::{Cell, Grid, Typed, add_sheet, row, xlsx};
use super::{ledger, records, refusal, site, told};

const NUMBER: &str = "<c r=\"D2\"><v>4.2</v></c>";
const DATE: &str = "<c r=\"C2\" s=\"1\"><v>45292</v></c>";

fn long() -> Grid {
    vec![
        row(&["Well ID", "Analyte", "Sample\nDate", "Result\n(ug/L)"]),
        vec!["MW-1".into(), "Benzene".into(), Cell::Date(2024, 3, 5), Cell::Number(4.2)],
        vec!["MW-2".into(), "Benzene".into(), Cell::Date(2024, 3, 5), "<0.5".into()],
    ]
}

#[test]
fn title_rows_above_a_header_with_line_breaks_are_told_and_no_records() {
    let mut grid = vec![row(&["Laboratory report 7"]), Vec::new(), row(&["Printed", "2024-04-01"])];
    grid.extend(long());
    let bytes = xlsx(&[("Round 1", &grid)], Typed::Yes);
    let expected =
        ["Round 1!5 MW-1 Benzene 2024-03-05 4.2", "Round 1!6 MW-2 Benzene 2024-03-05 <0.5"];
    assert_eq!(records(&bytes, &site("")), expected);
    let told = told(&bytes, &site(""));
    assert!(
        told.iter().any(|told| told.contains("2 lines above") && told.contains("report 7")),
        "{told:?}"
    );
}

#[test]
fn every_sheet_that_holds_a_table_is_read_and_the_others_are_told() {
    let cover = vec![row(&["Annual report"]), row(&["prepared for", "the owner"])];
    let mut later = long();
    later[1][2] = Cell::Date(2024, 6, 5);
    later[2][2] = Cell::Date(2024, 6, 5);
    let mut made = Workbook::new();
    add_sheet(&mut made, "Cover", &cover, Typed::Yes);
    add_sheet(&mut made, "March", &long(), Typed::Yes);
    add_sheet(&mut made, "June", &later, Typed::No);
    made.worksheet_from_name("June").expect("a sheet").set_hidden(true);
    let bytes = made.save_to_buffer().expect("a workbook");
    let rows = ledger(&bytes, &site(""));
    let sheets: Vec<&str> = rows.iter().map(|row| row.sheet.as_str()).collect();
    assert_eq!(sheets, ["March", "March", "June", "June"]);
    let said = told(&bytes, &site(""));
    assert!(
        said.iter().any(|told| told.contains("Cover") && told.contains("no results table")),
        "{said:?}"
    );
    assert!(said.iter().any(|told| told.contains("June") && told.contains("hidden")), "{said:?}");
    let rows = ledger(&bytes, &site("sheet = \"June\""));
    assert_eq!(rows.len(), 2);
    let none = refusal(&bytes, &site("sheet = \"July\""));
    assert!(none.contains("no sheet \"July\"") && none.contains("\"March\""), "{none}");
}

#[test]
fn a_merged_well_is_filled_in_with_a_note_and_a_merged_result_is_one_result() {
    let mut made = Workbook::new();
    let mut grid = long();
    grid[2][0] = Cell::Empty;
    grid.push(vec![Cell::Empty, "Toluene".into(), Cell::Date(2024, 3, 5), Cell::Empty]);
    add_sheet(&mut made, "Data", &grid, Typed::Yes);
    let sheet = made.worksheet_from_name("Data").expect("a sheet");
    let plain = Format::new();
    sheet.merge_range(1, 0, 3, 0, "MW-7", &plain).expect("a merged well");
    sheet.merge_range(2, 3, 3, 3, "1.5", &plain).expect("a merged result");
    let bytes = made.save_to_buffer().expect("a workbook");
    let rows = ledger(&bytes, &site(""));
    assert!(rows.iter().all(|row| row.well == "MW-7"), "{rows:?}");
    let details: Vec<bool> = rows.iter().map(|row| row.detail.contains("merged")).collect();
    assert_eq!(details, [false, true, true]);
    let results: Vec<&str> = rows.iter().map(|row| row.reported.as_str()).collect();
    assert_eq!(results, ["4.2", "1.5", ""]);
}

#[test]
fn texts_and_numbers_and_dates_of_either_calendar_are_read() {
    let plain = book(&one_row(NUMBER, DATE), "");
    assert_eq!(records(&plain, &site("")), ["Data!2 001 Benzene 2024-01-01 4.2 ug/L"]);
    // The calendar of 1904 begins 1,462 days later.
    let apple = book(&one_row(NUMBER, DATE), "<workbookPr date1904=\"1\"/>");
    assert_eq!(records(&apple, &site("")), ["Data!2 001 Benzene 2028-01-02 4.2 ug/L"]);
    let bare = book(&one_row(NUMBER, "<c r=\"C2\"><v>45292</v></c>"), "");
    assert_eq!(records(&bare, &site("")), ["Data!2 001 Benzene 45292 4.2 ug/L unreadable-date"]);
    let declared = site("serial-dates = \"1900\"");
    assert_eq!(records(&bare, &declared), ["Data!2 001 Benzene 2024-01-01 4.2 ug/L"]);
    let comma = site("decimal = \"comma\"");
    assert_eq!(records(&plain, &comma), ["Data!2 001 Benzene 2024-01-01 4,2 ug/L"]);
}

#[test]
fn a_record_with_an_error_cell_is_set_aside() {
    let error = book(&one_row("<c r=\"D2\" t=\"e\"><v>#DIV/0!</v></c>", DATE), "");
    assert_eq!(
        records(&error, &site("")),
        ["Data!2 001 Benzene 2024-01-01 #DIV/0! ug/L cell-error"]
    );
    let as_text = b"well,analyte,date,result,unit\nMW-1,Benzene,#N/A,4,ug/L\n";
    assert_eq!(records(as_text, &site("")), ["2 MW-1 Benzene #N/A 4 ug/L cell-error"]);
}

#[test]
fn a_million_empty_rows_are_blank_and_no_records() {
    let mut data = one_row(NUMBER, DATE).replace("</sheetData>", "");
    for row in 3..=1_000_000 {
        data.push_str(&format!("<row r=\"{row}\"/>"));
    }
    data.push_str(&format!("<row r=\"1000001\">{}</row></sheetData>", text("A1000001", "MW-2")));
    let bytes = book(&data, "");
    let tidy = super::read_bytes(&bytes, &site(""));
    assert_eq!((tidy.ledger.len(), tidy.files[0].blank_lines), (2, 999_998));
}

#[test]
fn a_decision_names_a_row_and_a_place_names_the_sheet() {
    let text = format!(
        "{}\n[[decision]]\nid = \"D1\"\nkind = \"exclude\"\nfile = \"-\"\nrecords = [2, 3]\nwho = \"analyst\"\n\
         when = 2024-05-01\nwhy = \"pump failed\"\n",
        super::SITE
    );
    let site = ebbwell::site::read(&text, "site.toml").expect("a site");
    let tidy = super::read_bytes(&xlsx(&[("Round 1", &long())], Typed::Yes), &site);
    assert_eq!(tidy.decided, [2]);
    assert_eq!(tidy.place(0), "-:Round 1!2");
}
