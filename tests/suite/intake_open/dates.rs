//! Dates in every usual spelling.

use super::{read_text, rows_of, site};

const SITE: &str = "[site]\nname = \"Osier Yard\"\n";

fn dates(site_text: &str, cells: &[&str]) -> Vec<String> {
    let mut text = "well;analyte;date;result;unit\n".to_owned();
    for cell in cells {
        text.push_str(&format!("MW-1;Benzene;\"{cell}\";4;ug/L\n"));
    }
    let site = site(site_text);
    let rows = rows_of(&read_text(&site, &text), &site);
    let shown = |row: ebbwell::ledger::LedgerRow| match row.outcome {
        "" | "merged" => row.date,
        _ => row.reason,
    };
    rows.into_iter().map(shown).collect()
}

#[test]
fn one_day_in_every_spelling_is_one_day() {
    let cells = [
        "2024-03-12",
        "2024/03/12",
        "2024.3.12",
        "2024-03-12T10:20:00Z",
        "2024-03-12 23:50 -07:00",
        "2024-03-12 23:50:00 MST",
        "12-Mar-2024",
        "12-MAR-2024 14:05",
        "12Mar2024",
        "12 March 2024",
        "12th March 2024",
        "Mar 12, 2024",
        "Mar. 12 2024",
        "March 12, 2024 2:05 PM",
        "12. M\u{e4}rz 2024",
        "12. Mrz. 2024",
        "12.Maerz.2024",
        "12 mars 2024",
        "12 de marzo de 2024",
        "12-mar-2024",
        "2024 March 12",
    ];
    for (cell, found) in cells.iter().zip(dates(SITE, &cells)) {
        assert_eq!(found, "2024-03-12", "{cell}");
    }
}

#[test]
fn every_month_is_known_in_four_languages() {
    let months = [
        "January Jan janvier janv. Januar J\u{e4}nner enero ene.",
        "February Feb. f\u{e9}vrier f\u{e9}vr. fevr Februar febrero",
        "March Mar. mars M\u{e4}rz marzo",
        "April Apr avril avr. abril abr.",
        "May mai Mai mayo",
        "June Jun. juin Juni junio",
        "July Jul. juillet juil. Juli julio",
        "August Aug. ao\u{fb}t aout agosto ago.",
        "September Sep Sept. septembre septiembre",
        "October Oct. octobre Oktober Okt. octubre",
        "November Nov. novembre noviembre",
        "December Dec. d\u{e9}cembre d\u{e9}c. Dezember Dez. diciembre dic.",
    ];
    for (words, month) in months.iter().zip(1..) {
        for word in words.split(' ') {
            let expected = format!("2023-{month:02}-09");
            assert_eq!(dates(SITE, &[&format!("9 {word} 2023")]), [expected], "{word}");
        }
    }
}

#[test]
fn what_is_no_certain_date_is_set_aside() {
    for (cell, reason) in [
        ("05/03/2024", "ambiguous-date"),
        ("05.03.2024", "ambiguous-date"),
        ("12-Mar-24", "unreadable-date"),
        ("Mar-2024", "unreadable-date"),
        ("2024-03", "unreadable-date"),
        ("31-Feb-2024", "unreadable-date"),
        ("32 March 2024", "unreadable-date"),
        ("12 Lenz 2024", "unreadable-date"),
        ("45292", "unreadable-date"),
        ("n/a", "unreadable-date"),
        ("12 Mar 0024", "unreadable-date"),
    ] {
        assert_eq!(dates(SITE, &[cell]), [reason], "{cell}");
    }
}

#[test]
fn two_digit_years_and_serials_are_read_where_they_are_declared() {
    let rule = |keys: &str| format!("{SITE}[[results]]\nfiles = \"*\"\n{keys}\n");
    let two = rule("two-digit-years = true");
    assert_eq!(dates(&two, &["12-Mar-24", "12-Mar-98"]), ["2024-03-12", "1998-03-12"]);
    // 45363 in the 1900 system and 43901 in the 1904 system are 2024-03-12 (1,462 days apart).
    assert_eq!(dates(&rule("serial-dates = \"1900\""), &["45363", "45363.5"])[0], "2024-03-12");
    assert_eq!(dates(&rule("serial-dates = \"1904\""), &["43901"]), ["2024-03-12"]);
}

#[test]
fn a_file_in_both_orders_is_told_with_its_counts_and_its_doubtful_dates_wait() {
    let site = site(SITE);
    let text = "well,analyte,date,result,unit\nMW-1,Benzene,14/03/2024,4,ug/L\n\
                MW-1,Benzene,03/15/2024,4,ug/L\nMW-1,Benzene,03/16/2024,4,ug/L\n\
                MW-1,Benzene,05/03/2024,4,ug/L\n";
    let tidy = read_text(&site, text);
    let said: Vec<String> =
        tidy.told.iter().map(|told| ebbwell::words::told::sentence(told, 0)).collect();
    let found = said
        .iter()
        .any(|line| line.contains("1 date with the day first and 2 dates with the month first"));
    assert!(found, "{said:?}");
    let rows = rows_of(&tidy, &site);
    assert_eq!(rows[0].date, "2024-03-14");
    assert_eq!(rows[1].date, "2024-03-15");
    assert_eq!(rows[3].reason, "ambiguous-date");
    assert!(rows[3].detail.contains("date-order"), "{}", rows[3].detail);
}
