//! The order of day and month that breaks within a file.

use super::simulated::{check_table, told};

const SITE: &str = "[site]\nname = \"x\"\n";

fn table(dates: &[&str]) -> String {
    let mut text = "well,analyte,date,result,unit\n".to_owned();
    for (at, date) in dates.iter().enumerate() {
        text.push_str(&format!("W-{at},PCE,{date},{}.5,ug/L\n", at + 3));
    }
    text
}

#[test]
fn a_file_that_proves_both_orders_is_told_with_the_records_of_the_rarer() {
    let text = table(&["14/03/2024", "15/03/2024", "16/03/2024", "03/17/2024"]);
    let findings = check_table(&text, SITE);
    assert_eq!(told(&findings.arrival), ["day-month-order file - (1)"]);
    assert_eq!(findings.arrival.place(findings.arrival.sentinels[0].records[0]), "-:5");
}

#[test]
fn a_stretch_that_fits_its_round_only_when_exchanged_is_suspected() {
    // Sampled from 29 February to 8 March; the last four were typed month first.
    let text = table(&[
        "29/02/2024",
        "29/02/2024",
        "01/03/2024",
        "04/03/2024",
        "03/05/2024",
        "03/06/2024",
        "03/07/2024",
        "03/08/2024",
        "13/03/2024",
    ]);
    assert_eq!(told(&check_table(&text, SITE).arrival), ["day-month-order file - (4)"]);
}

#[test]
fn dates_all_over_the_year_one_odd_visit_and_iso_dates_are_no_break() {
    let over_the_year =
        table(&["14/01/2024", "05/02/2024", "06/03/2024", "07/08/2024", "08/09/2024"]);
    let one_visit = table(&["29/02/2024", "01/03/2024", "03/08/2024", "13/03/2024"]);
    let iso = table(&["2024-02-14", "2024-03-02", "2024-05-03", "2024-06-03", "2024-07-03"]);
    for text in [over_the_year, one_visit, iso] {
        assert_eq!(told(&check_table(&text, SITE).arrival), [""; 0], "{text}");
    }
}
