//! Result cells in every usual spelling: read as intended, or set aside with their reason.

use proptest::prelude::{ProptestConfig, prop, prop_assert_eq, proptest};

use super::{read_text, rows_of, site, values};

const SITE: &str = "[site]\nname = \"Osier Yard\"\n";
const COMMA: &str = "[site]\nname = \"Osier Yard\"\n[[results]]\nfiles = \"*\"\ndecimal = \"comma\"\n\
                     thousands = \".\"\n";

/// A cell, and what becomes of it in ug/L beside a reporting limit of 0.2 ug/L.
const CELLS: &[(&str, &str)] = &[
    // Numbers.
    ("0.5", "0.5"),
    (" 0.5 ", "0.5"),
    (".5", "0.5"),
    ("5.", "5"),
    ("1.2e3", "1200"),
    ("1.2E-3", "0.0012"),
    ("+4", "4"),
    ("0", "low-result"),
    ("-4", "low-result"),
    // Below.
    ("<0.5", "<0.5"),
    ("< 0.5", "<0.5"),
    ("<.5", "<0.5"),
    ("<\u{a0}0.5", "<0.5"),
    ("<5E-1", "<0.5"),
    ("<0.5 U", "<0.5"),
    ("<0.5U", "<0.5"),
    ("<0.5 J", "<0.5 e"),
    ("<0.5 UJ", "<0.5 e"),
    ("<0", "<0.2"),
    ("<RL", "<0.2"),
    ("< MDL", "<0.2"),
    ("<BG", "<0.2"),
    ("<LQ", "<0.2"),
    // Marks behind the number.
    ("0.5 U", "<0.5"),
    ("0.5U", "<0.5"),
    ("0.5u", "<0.5"),
    ("0.1 U", "<0.2"),
    ("0.5 (U)", "<0.5"),
    ("0.5 [U]", "<0.5"),
    ("0.5 ND", "<0.5"),
    ("0.5 nd", "<0.5"),
    ("0.5 UJ", "<0.5 e"),
    ("0.5UJ", "<0.5 e"),
    ("0.5 U,J", "<0.5 e"),
    ("0.5 J", "0.5 e"),
    ("0.5J", "0.5 e"),
    ("0.5 j", "0.5 e"),
    ("0.5 J+", "0.5 e"),
    ("0.5J-", "0.5 e"),
    ("0.5 H", "0.5"),
    ("0.5 D", "0.5"),
    ("0.5D", "0.5"),
    ("0.5 R", "rejected"),
    ("0.5 B", "qualifier-needs-legend"),
    ("0.5 JB", "qualifier-needs-legend"),
    ("0.5 NJ", "qualifier-needs-legend"),
    ("0.5E", "qualifier-needs-legend"),
    ("0.5*", "qualifier-needs-legend"),
    ("0.5 U *", "qualifier-needs-legend"),
    // Words.
    ("ND", "<0.2"),
    ("nd", "<0.2"),
    ("N.D.", "<0.2"),
    ("n.d.", "<0.2"),
    ("n. d.", "<0.2"),
    ("N/D", "<0.2"),
    ("U", "<0.2"),
    ("u", "<0.2"),
    ("BRL", "<0.2"),
    ("brl", "<0.2"),
    ("BDL", "<0.2"),
    ("BQL", "<0.2"),
    ("non-detect", "<0.2"),
    ("Non Detect", "<0.2"),
    ("nondetect", "<0.2"),
    ("Not Detected", "<0.2"),
    ("not detected", "<0.2"),
    ("NOT-DETECTED", "<0.2"),
    ("None Detected", "<0.2"),
    ("Below Detection Limit", "<0.2"),
    ("below reporting limit", "<0.2"),
    ("n.n.", "<0.2"),
    ("nicht nachweisbar", "<0.2"),
    ("non d\u{e9}tect\u{e9}", "<0.2"),
    ("no detectado", "<0.2"),
    ("ND U", "<0.2"),
    ("ND J", "<0.2 e"),
    // Words with their limit.
    ("ND (0.5)", "<0.5"),
    ("ND(0.5)", "<0.5"),
    ("ND [0.5]", "<0.5"),
    ("ND<0.5", "<0.5"),
    ("ND <0.5", "<0.5"),
    ("ND < 0.5", "<0.5"),
    ("ND (<0.5)", "<0.5"),
    ("ND(<.5)", "<0.5"),
    ("ND@0.5", "<0.5"),
    ("ND @ 0.5", "<0.5"),
    ("ND at 0.5", "<0.5"),
    ("ND 0.5", "<0.5"),
    ("ND .5", "<0.5"),
    ("ND0.5", "<0.5"),
    ("ND:0.5", "<0.5"),
    ("ND=0.5", "<0.5"),
    ("n.d. (0.5)", "<0.5"),
    ("n.d. <0.5", "<0.5"),
    ("U 0.5", "<0.5"),
    ("U0.5", "<0.5"),
    ("U (0.5)", "<0.5"),
    ("BRL (0.5)", "<0.5"),
    ("BDL<0.5", "<0.5"),
    ("non-detect (0.5)", "<0.5"),
    ("Not Detected <0.5", "<0.5"),
    ("ND (RL 0.5)", "<0.5"),
    ("ND (MDL=0.5)", "<0.5"),
    ("ND (0.5 ug/L)", "<0.5"),
    ("ND (0.5) J", "unreadable-number"),
    // Above.
    (">2000", ">2000"),
    ("> 2000", ">2000"),
    (">2000 J", ">2000 e"),
    (">2e3", ">2000"),
    (">0", "above-range"),
    // The unit in the cell.
    ("0.5 ug/L", "0.5"),
    ("0.5ug/L", "0.5"),
    ("<0.5 ug/L", "<0.5"),
    ("<0.5 \u{b5}g/L", "<0.5"),
    ("0.5 ug/L J", "0.5 e"),
    ("0.5 J ug/L", "0.5 e"),
    ("0.5 U UG/L", "<0.5"),
    (">2000 ug/l", ">2000"),
    ("0.5 mg/L", "unknown-unit"),
    ("0.5 furlong/L", "unreadable-number"),
    ("0.5 ppb", "unreadable-number"),
    ("0.5 NTU", "unreadable-number"),
    ("0.5 %", "unreadable-number"),
    // Not certain, so not read.
    ("\u{2264}0.5", "unreadable-number"),
    ("<=0.5", "unreadable-number"),
    ("\u{2265}2000", "unreadable-number"),
    (">=2000", "unreadable-number"),
    ("<0,5", "unreadable-number"),
    ("0,5", "unreadable-number"),
    ("1,234", "unreadable-number"),
    ("5,1,2", "unreadable-number"),
    ("0.5 0.6", "unreadable-number"),
    ("0.5-0.6", "unreadable-number"),
    ("0.5 +/- 0.1", "unreadable-number"),
    ("0.5 \u{b1} 0.1", "unreadable-number"),
    ("(0.5)", "unreadable-number"),
    ("~0.5", "unreadable-number"),
    ("ca. 0.5", "unreadable-number"),
    ("0.5?", "unreadable-number"),
    ("0.5 <", "unreadable-number"),
    ("<<0.5", "unreadable-number"),
    ("< >0.5", "unreadable-number"),
    ("<O.5", "unreadable-number"),
    ("<", "unreadable-number"),
    (">", "unreadable-number"),
    ("--", "unreadable-number"),
    ("trace", "unreadable-number"),
    ("NaN", "unreadable-number"),
    ("inf", "unreadable-number"),
    ("1e400", "unreadable-number"),
    ("0x10", "unreadable-number"),
    ("NDX 0.5", "unreadable-number"),
    ("ND (0.5", "unreadable-number"),
    ("ND ()", "unreadable-number"),
    ("ND 0.5 0.6", "unreadable-number"),
    ("J 0.5", "unreadable-number"),
    ("NA", "unreadable-number"),
    ("", "no-result"),
    // Words that say why there is no result.
    ("DRY", "dry"),
    ("not sampled", "not-sampled"),
    ("No access", "no-access"),
];

fn table(cells: &[&str], header: &str, limit: &str) -> String {
    let mut text = format!("{header}\n");
    for (cell, day) in cells.iter().zip(0_u32..) {
        let (year, month, day) = (1990 + day / 300, 1 + day / 25 % 12, 1 + day % 25);
        text.push_str(&format!(
            "MW-1;Benzene;{year}-{month:02}-{day:02};\"{cell}\";ug/L;{limit}\n"
        ));
    }
    text
}

const HEADER: &str = "well;analyte;date;result;unit;reporting limit";

#[test]
fn every_usual_spelling_reads_as_intended_or_is_set_aside() {
    let cells: Vec<&str> = CELLS.iter().map(|(cell, _)| *cell).collect();
    let found = values(&site(SITE), &table(&cells, HEADER, "0.2"));
    assert_eq!(found.len(), CELLS.len());
    let wrong: Vec<String> = CELLS
        .iter()
        .zip(&found)
        .filter(|((_, expected), found)| expected != &found.as_str())
        .map(|((cell, expected), found)| format!("`{cell}` is {found}, intended {expected}"))
        .collect();
    assert_eq!(wrong, Vec::<String>::new());
}

#[test]
fn decimal_commas_are_read_in_every_spelling_where_they_are_declared() {
    let cells: &[(&str, &str)] = &[
        ("0,5", "0.5"),
        ("<0,5", "<0.5"),
        ("< 0,5", "<0.5"),
        ("<,5", "<0.5"),
        ("0,5 U", "<0.5"),
        ("0,5UJ", "<0.5 e"),
        ("0,5 J", "0.5 e"),
        ("n.d. (0,5)", "<0.5"),
        ("ND<0,5", "<0.5"),
        (">2.000", ">2000"),
        ("1.234,5", "1234.5"),
        ("<0,5 \u{3bc}g/l", "<0.5"),
        ("0.5", "unreadable-number"),
        ("12.34,5", "unreadable-number"),
    ];
    let written: Vec<&str> = cells.iter().map(|(cell, _)| *cell).collect();
    let found = values(&site(COMMA), &table(&written, HEADER, "\"0,2\""));
    let expected: Vec<&str> = cells.iter().map(|(_, expected)| *expected).collect();
    assert_eq!(found, expected);
}

#[test]
fn a_word_without_any_limit_is_set_aside_for_the_limit() {
    for cell in ["ND", "n.d.", "BRL", "U", "<RL"] {
        let found = values(&site(SITE), &table(&[cell], HEADER, ""));
        assert_eq!(found, ["no-reporting-limit"], "{cell}");
    }
}

#[test]
fn a_unit_in_the_cell_stands_in_for_a_column_without_one() {
    let text = "well,analyte,date,result,unit\nMW-1,Benzene,2024-03-05,<0.5 mg/L,\n\
                MW-1,Benzene,2024-06-05,0.5 mg/L as C6H6,\n";
    let tidy = read_text(&site(SITE), text);
    let rows = rows_of(&tidy, &site(SITE));
    assert!(rows.iter().all(|row| row.outcome.is_empty()), "{rows:?}");
    let both = text.replace("0.5 mg/L,", "0.5 mg/L,ug/L");
    let rows = rows_of(&read_text(&site(SITE), &both), &site(SITE));
    assert_eq!(rows[0].reason, "unknown-unit");
    assert!(rows[0].detail.contains("mg/L"), "{}", rows[0].detail);
}

/// Pieces of which cells, dates and numbers are made, some of them hostile.
const PIECES: [&str; 34] = [
    "0.5",
    "<",
    ">",
    "U",
    "J",
    "ND",
    "(",
    ")",
    "[",
    "]",
    " ",
    "\u{a0}",
    "ug/L",
    "mg/L as N",
    "e",
    "E",
    "-",
    "+",
    ".",
    ",",
    "*",
    "T",
    "12:30",
    "Mar",
    "M\u{e4}rz",
    "2024",
    "\u{2212}",
    "\u{b5}",
    "\u{130}",
    "\u{202e}",
    "79",
    "01",
    "6",
    "@",
];

proptest! {
    #![proptest_config(ProptestConfig::with_cases(300))]

    /// Whatever stands in result, date and CAS cells, each record has one row and nothing panics.
    #[test]
    fn any_pieces_in_any_order_are_read_or_set_aside(
        cells in prop::collection::vec(prop::collection::vec(0..PIECES.len(), 0..7), 3..9)
    ) {
        let cell = |pieces: &Vec<usize>| -> String {
            pieces.iter().map(|&piece| PIECES[piece]).collect::<String>().replace(';', "")
        };
        let mut text = "well;analyte;cas;date;result;unit\nMW-1;Benzene;;2024-01-01;1;ug/L\n".to_owned();
        for pieces in &cells {
            let cell = cell(pieces);
            text.push_str(&format!("MW-1;Benzene;\"{cell}\";\"{cell}\";\"{cell}\";ug/L\n"));
        }
        let site = site(SITE);
        let rows = rows_of(&read_text(&site, &text), &site);
        prop_assert_eq!(rows.len(), cells.len() + 1);
    }
}
