//! Names of charts from the names of wells and analytes.

use std::collections::BTreeSet;

use ebbwell::deliver::names::{chart_names, safe};
use ebbwell::series::SeriesKey;
use ebbwell::site::Fraction;
use proptest::prelude::{prop_assert, prop_assert_eq, proptest};

fn key(well: &str, analyte: &str) -> SeriesKey {
    SeriesKey {
        site: String::new(),
        well: well.into(),
        analyte: analyte.into(),
        fraction: None,
        depth: None,
    }
}

fn names(keys: &[SeriesKey]) -> Vec<String> {
    chart_names(&keys.iter().collect::<Vec<_>>())
}

#[test]
fn a_name_is_well_analyte_fraction_and_depth() {
    let full = SeriesKey {
        fraction: Some(Fraction::Dissolved),
        depth: Some("12 m".into()),
        ..key("MW-1", "1,2-DCE")
    };
    assert_eq!(names(&[full]), ["MW-1--1_2-DCE--dissolved--12_m.svg"]);
    assert_eq!(names(&[key("MW-1", "Benzene")]), ["MW-1--Benzene.svg"]);
}

#[test]
fn hostile_names_stay_in_the_folder() {
    for (text, name) in [
        ("../../etc/passwd", "_.._.._etc_passwd"),
        ("a/b\\c", "a_b_c"),
        ("=1+1", "_1_1"),
        (".hidden", "_.hidden"),
        ("-rf", "_-rf"),
        ("dots...", "dots"),
        ("", "_"),
        ("\u{b5}", "_"),
        ("CON", "_CON"),
        ("nul.txt", "_nul.txt"),
        ("Com7", "_Com7"),
        ("COM0", "COM0"),
        ("lpt12", "lpt12"),
        ("console", "console"),
    ] {
        assert_eq!(safe(text), name, "{text:?}");
    }
}

#[test]
fn names_that_differ_in_case_or_in_odd_characters_get_different_files() {
    let keys = [key("MW-1", "Benzene"), key("mw-1", "Benzene"), key("MW 1", "x"), key("MW/1", "x")];
    let names = names(&keys);
    let lower: BTreeSet<String> = names.iter().map(|name| name.to_lowercase()).collect();
    assert_eq!(lower.len(), 4, "{names:?}");
    assert!(
        names[0].starts_with("MW-1--Benzene-")
            && names[0].len() == "MW-1--Benzene-12345678.svg".len()
    );
    // The hash is of the series alone, so it does not move with its neighbours.
    let fewer = self::names(&keys[..2]);
    assert_eq!(names[..2], fewer[..]);
}

#[test]
fn a_separator_in_a_name_does_not_make_two_series_one() {
    let names = names(&[key("a--b", "c"), key("a", "b--c")]);
    assert_ne!(names[0].to_lowercase(), names[1].to_lowercase());
}

#[test]
fn long_names_are_cut_and_still_differ() {
    let long = "x".repeat(300);
    let names = names(&[key(&long, "Benzene"), key(&long, "Toluene")]);
    assert_ne!(names[0], names[1]);
    assert!(names.iter().all(|name| name.len() <= 84), "{names:?}");
    // Cut, a name could mean another series of another run; its hash does not.
    let alone = self::names(&[key(&long, "Benzene")]);
    assert_eq!(alone[0], names[0]);
}

proptest! {
    #[test]
    fn names_are_safe_and_never_two_the_same(wells in proptest::collection::vec(".{0,90}", 1..12)) {
        let keys: BTreeSet<SeriesKey> = wells.iter().map(|well| key(well, "B")).collect();
        let keys: Vec<SeriesKey> = keys.into_iter().collect();
        let names = names(&keys);
        let lower: BTreeSet<String> = names.iter().map(|name| name.to_lowercase()).collect();
        prop_assert_eq!(lower.len(), keys.len());
        for name in names {
            let stem = name.strip_suffix(".svg").unwrap_or_default();
            let fine = |c: char| c.is_ascii_alphanumeric() || "._-".contains(c);
            prop_assert!(!stem.is_empty() && stem.chars().all(fine), "{}", name);
            prop_assert!(!stem.starts_with(['.', '-']) && !stem.ends_with('.'), "{}", name);
        }
    }
}
