//! CAS check digits, the words for fractions, the catalogue.

use std::collections::BTreeMap;

use ebbwell::site::{CasCheck, Fraction, cas_check, catalogue};
use ebbwell::terms::folded;
use proptest::prelude::{prop_assert_eq, proptest};

#[test]
fn cas_numbers_hold_fail_or_are_malformed() {
    // The registry's own example, then numbers of common analytes.
    for holds in ["107-07-3", "71-43-2", "127-18-4", "179601-23-1", " 7440-38-2 ", "71-43-2."] {
        assert_eq!(cas_check(holds), CasCheck::Holds, "{holds}");
    }
    // Well formed in the federal list of characteristics, and failing.
    for fails in ["56336-06-3", "71-43-3"] {
        assert_eq!(cas_check(fails), CasCheck::Fails, "{fails}");
    }
    for malformed in [
        "",
        "71-43",
        "71-43-2-1",
        "7-43-2",
        "71-4-2",
        "71-43-22",
        "benzene",
        "7440/05/03",
        "7440-05-3a",
        "7a-43-2",
        "71-4x-2",
        "12345678-12-1",
        "٧١-٤٣-٢",
        "71–43–2",
    ] {
        assert_eq!(cas_check(malformed), CasCheck::Malformed, "{malformed}");
    }
}

proptest! {
    #[test]
    fn of_ten_check_digits_exactly_one_holds(head in 10_u32..10_000_000, middle in 0_u32..100) {
        let number = |check: u32| format!("{head}-{middle:02}-{check}");
        let holds = (0..10).filter(|check| cas_check(&number(*check)) == CasCheck::Holds).count();
        prop_assert_eq!(holds, 1);
    }
}

#[test]
fn the_words_for_fractions_are_read_and_no_others() {
    for text in ["dissolved", "Filtered", "diss", "D", "F", "wf", " DISSOLVED "] {
        assert_eq!(Fraction::read(text), Some(Fraction::Dissolved), "{text}");
    }
    for text in ["total", "Unfiltered", "recoverable", "T", "wu"] {
        assert_eq!(Fraction::read(text), Some(Fraction::Total), "{text}");
    }
    for text in ["", "dis", "N", "suspended", "non-filterable"] {
        assert_eq!(Fraction::read(text), None, "{text}");
    }
    assert_eq!((Fraction::Dissolved.code(), Fraction::Total.code()), ("dissolved", "total"));
}

#[test]
fn every_name_of_the_catalogue_means_one_substance() {
    let mut names = BTreeMap::new();
    let mut numbers = BTreeMap::new();
    for entry in catalogue::all() {
        for name in entry.synonyms.iter().chain([&entry.name]) {
            let before = names.insert(folded(name), entry.name);
            assert!(before.is_none_or(|before| before == entry.name), "{name}: {before:?}");
            assert_eq!(catalogue::by_name(name), Some(entry), "{name}");
        }
        if let Some(cas) = entry.cas {
            assert_eq!(cas_check(cas), CasCheck::Holds, "{cas}");
            assert_eq!(numbers.insert(cas, entry.name), None, "{cas}");
            assert_eq!(catalogue::by_cas(&format!(" {cas}. ")), Some(entry));
        }
    }
    assert_eq!(catalogue::all().len(), 84);
}

#[test]
fn the_catalogue_holds_half_lives_for_nuclides_only() {
    // Years; sources in the catalogue's header.
    let known = [
        ("Tritium", 12.32),
        ("Strontium-90", 28.8),
        ("Cesium-137", 30.1),
        ("Radium-226", 1600.0),
        ("Radium-228", 5.75),
    ];
    let found: Vec<(&str, f64)> = catalogue::all()
        .iter()
        .filter_map(|entry| Some((entry.name, entry.half_life_years?)))
        .collect();
    assert_eq!(found, known);
}

#[test]
fn names_that_would_hide_a_fraction_or_a_basis_are_not_in_the_catalogue() {
    for name in ["arsenic dissolved", "lead total", "nitrate", "ammonium", "adjusted gross alpha"] {
        assert_eq!(catalogue::by_name(name), None, "{name}");
    }
}
