//! Site files that nobody writes: told or read, never a panic.

use ebbwell::site::read;
use ebbwell::site::template::ALL;
use proptest::prelude::{Just, Strategy, any, prop_oneof, proptest};

use super::told;

/// Values that are wrong for some keys and extreme for others.
const VALUES: [&str; 25] = [
    "nan",
    "-nan",
    "inf",
    "-inf",
    "1e400",
    "-1e400",
    "1e-400",
    "-0.0",
    "99999999999999999999999999999999999999999999",
    "-9223372036854775808",
    "0xffffffffffffffff",
    "0b1",
    "1_000",
    "true",
    "\"\"",
    "\"\\u0000\"",
    "\"\\U0010FFFF\"",
    "'''\n\n'''",
    "[]",
    "[[[[1]]]]",
    "{}",
    "{ a = { b = { c = 1 } } }",
    "0001-01-01",
    "9999-12-31T23:59:59.999999999+23:59",
    "07:32:00",
];

#[test]
fn every_key_bears_every_value_without_a_panic() {
    let mut read_values = 0;
    for (header, keys) in tables() {
        for key in keys {
            for value in VALUES {
                let text = format!("[site]\nname = \"x\"\n[{header}]\n{key} = {value}\n");
                let blocks = format!("[site]\nname = \"x\"\n[[{header}]]\n{key} = {value}\n");
                for text in [text, blocks] {
                    let problems = read(&text, "site.toml").err().unwrap_or_default();
                    assert!(problems.iter().all(|p| p.line.is_none_or(|line| line <= 7)), "{text}");
                    read_values += 1;
                }
            }
        }
    }
    assert!(read_values > 5000, "{read_values}");
}

/// Every table of the schema with its keys.
fn tables() -> Vec<(String, Vec<String>)> {
    let schema = ebbwell::site::schema();
    let properties = schema["properties"].as_object().expect("tables");
    properties
        .iter()
        .map(|(table, described)| {
            let here = described.get("items").unwrap_or(described);
            let keys = here["properties"].as_object().expect("keys");
            (table.clone(), keys.keys().cloned().collect())
        })
        .collect()
}

#[test]
fn numbers_that_are_none_or_too_large_are_told() {
    let keys =
        [("settings", "confidence"), ("settings", "horizon-years"), ("flags", "duplicates-rpd")];
    for (table, key) in keys {
        for value in ["nan", "-nan", "inf", "-inf", "1e400", "-1e400"] {
            let told = told(&format!("[site]\nname = \"x\"\n[{table}]\n{key} = {value}\n"));
            assert!(told.contains("which is not a finite number"), "{key} = {value}: {told}");
        }
    }
    for value in ["99999999999999999999999999", "-1", "0x8000000000000000"] {
        let told = told(&format!("[site]\nname = \"x\"\n[settings]\nround-grace-days = {value}\n"));
        assert!(told.contains("round-grace-days is "), "{value}: {told}");
    }
}

#[test]
fn an_empty_file_lacks_its_site_and_nothing_else() {
    for text in ["", "\n\n", "# only a comment\n", "\u{feff}"] {
        let told = told(text);
        assert!(told.starts_with("site.toml: [site] is missing"), "{told}");
        assert_eq!(told.lines().count(), 1, "{told}");
    }
    assert!(told("[site]\n").starts_with("site.toml:1: [site] name is missing"));
}

#[test]
fn nesting_without_end_is_told() {
    let deep = 50_000;
    for text in [
        format!("a = {}{}", "[".repeat(deep), "]".repeat(deep)),
        format!("a = {}", "[".repeat(deep)),
        format!("a = {}1{}", "{ b = ".repeat(deep), " }".repeat(deep)),
        format!("[{}]\n", "a.".repeat(deep)),
        format!("{}a = 1\n", "a.".repeat(deep)),
    ] {
        assert!(!told(&text).is_empty());
    }
}

#[test]
fn ten_thousand_mistakes_are_ten_thousand_lines() {
    let mut text = String::from("[site]\nname = \"x\"\n");
    for number in 0..5000 {
        text.push_str(&format!("[[analyte]]\nname = \"A{number}\"\nlimt = 5\ncas = \"1\"\n"));
    }
    assert_eq!(told(&text).lines().count(), 10_000 + 4_999);
}

#[test]
fn of_twenty_thousand_unreadable_lines_the_first_are_told() {
    let told = told(&"what is this\n".repeat(20_000));
    assert_eq!(told.lines().count(), 26, "{told}");
    assert!(told.starts_with("site.toml:1: not readable here: "), "{told}");
    let twice = "[site]\nname = \"x\"\n".to_owned() + &"[flags]\n".repeat(5_000);
    assert_eq!(super::told(&twice).lines().count(), 4_999);
}

fn piece() -> impl Strategy<Value = String> {
    prop_oneof![
        Just("[".to_owned()),
        Just("]".to_owned()),
        Just("\"".to_owned()),
        Just("'''".to_owned()),
        Just("=".to_owned()),
        Just("\n[[well]]\n".to_owned()),
        Just("\nname = ".to_owned()),
        Just("{ a = ".to_owned()),
        Just("\r".to_owned()),
        Just("\u{0}".to_owned()),
        any::<String>(),
    ]
}

proptest! {
    #[test]
    fn any_text_is_read_or_told(pieces in proptest::collection::vec(piece(), 0..40)) {
        let _ = told(&pieces.concat());
    }

    #[test]
    fn a_template_with_a_piece_put_in_or_cut_out_is_read_or_told(
        which in 0_usize..6,
        at in 0_usize..9000,
        cut in 0_usize..60,
        piece in piece(),
    ) {
        let chars: Vec<char> = ALL[which].text.chars().collect();
        let at = at.min(chars.len());
        let rest = (at + cut).min(chars.len());
        let text: String =
            chars[..at].iter().copied().chain(piece.chars()).chain(chars[rest..].iter().copied()).collect();
        let lines = text.lines().count() + 1;
        let problems = read(&text, "site.toml").err().unwrap_or_default();
        assert!(problems.iter().all(|problem| problem.line.is_none_or(|line| line <= lines)));
    }
}
