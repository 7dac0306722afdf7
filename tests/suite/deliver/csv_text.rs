//! Text that a spreadsheet must not take for a formula.

use ebbwell::deliver::{csv_text, csv_text_back};
use proptest::prelude::{prop_assert, prop_assert_eq, prop_assume, proptest};

#[test]
fn what_could_be_a_formula_gets_an_apostrophe() {
    for text in
        ["=1+1", "+A1", "-A1", "@SUM(1)", "\tx", "\rx", "'quoted", "-", "=", "-1e400", "-inf"]
    {
        assert_eq!(csv_text(text), format!("'{text}"), "{text:?}");
    }
}

#[test]
fn a_number_and_plain_text_stay_as_they_are() {
    for text in ["-5", "+5", "-0.25", "-1e-7", "-.5", "", "MW-1", " =1", "\u{b5}g/L", "5", "<0.5"] {
        assert_eq!(csv_text(text), text, "{text:?}");
    }
}

#[test]
fn a_nul_never_reaches_a_file() {
    assert_eq!(csv_text("a\0b"), "a\u{fffd}b");
}

proptest! {
    #[test]
    fn guarded_text_reads_back_exactly(text in "[=+\\-@\t\r'a1. ]{0,6}") {
        let guarded = csv_text(&text);
        prop_assert_eq!(csv_text_back(&guarded), text.as_str());
    }

    #[test]
    fn any_text_survives_a_csv_file(text in ".{0,40}") {
        prop_assume!(!text.contains('\0'));
        let mut writer = csv::Writer::from_writer(Vec::new());
        writer.write_record(["x", &*csv_text(&text)]).expect("memory");
        let bytes = writer.into_inner().expect("memory");
        let mut reader = csv::ReaderBuilder::new().has_headers(false).from_reader(&bytes[..]);
        let record = reader.records().next().expect("one record").expect("UTF-8");
        prop_assert_eq!(csv_text_back(&record[1]), text.as_str());
    }

    #[test]
    fn nothing_that_is_not_a_number_begins_like_a_formula(text in "[=+\\-@\t\r'a1.e ]{1,6}") {
        let guarded = csv_text(&text);
        let formula = guarded.starts_with(['=', '+', '-', '@', '\t', '\r']);
        prop_assert!(!formula || guarded.parse::<f64>().is_ok(), "{:?}", guarded);
    }
}
