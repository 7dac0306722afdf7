//! The table that `explain` and the documentation read is complete.

use ebbwell::deliver::tables;
use ebbwell::ledger::told::Suspicion;
use ebbwell::ledger::{Merged, NonResult, Outcome, QualityControl, SetAside, UsedAs};
use ebbwell::terms::{
    ChoiceKind, FlagCode, Method, Model, Pace, Verdict, WhyNoDate, WhyNoModel, WhyNoRate,
};
use ebbwell::words::explain::{Kind, all, find, nearest};

#[test]
fn every_word_of_every_closed_list_is_explained() {
    let codes = |kind: Kind, codes: Vec<&'static str>| codes.into_iter().map(move |c| (kind, c));
    let wanted = codes(Kind::Verdict, Verdict::ALL.iter().map(|v| v.code()).collect())
        .chain(codes(Kind::Pace, Pace::ALL.iter().map(|v| v.code()).collect()))
        .chain(codes(Kind::Method, Method::ALL.iter().map(|v| v.code()).collect()))
        .chain(codes(Kind::Flag, FlagCode::ALL.iter().map(|v| v.code()).collect()))
        .chain(codes(Kind::NoRate, WhyNoRate::ALL.iter().map(|v| v.code()).collect()))
        .chain(codes(Kind::NoDate, WhyNoDate::ALL.iter().map(|v| v.code()).collect()))
        .chain(codes(Kind::Outcome, Outcome::ALL.iter().map(|v| v.code()).collect()))
        .chain(codes(Kind::Reason, UsedAs::ALL.iter().map(|v| v.code()).collect()))
        .chain(codes(Kind::Reason, Merged::ALL.iter().map(|v| v.code()).collect()))
        .chain(codes(Kind::Reason, NonResult::ALL.iter().map(|v| v.code()).collect()))
        .chain(codes(Kind::Reason, QualityControl::ALL.iter().map(|v| v.code()).collect()))
        .chain(codes(Kind::Suspicion, Suspicion::ALL.iter().map(|v| v.code()).collect()))
        .chain(codes(Kind::Reason, SetAside::ALL.iter().map(|v| v.code()).collect()));
    let wanted = wanted
        .chain(codes(Kind::Statistic, Model::ALL.iter().map(|v| v.code()).collect()))
        .chain(codes(Kind::Statistic, WhyNoModel::ALL.iter().map(|v| v.code()).collect()))
        .chain(codes(Kind::Statistic, ChoiceKind::ALL.iter().map(|v| v.code()).collect()));
    for (kind, code) in wanted {
        let hits = find(code);
        assert!(hits.iter().any(|entry| entry.kind == kind && entry.word == code), "{code}");
    }
}

#[test]
fn every_column_of_every_table_is_explained_and_no_other() {
    let tables = tables::all();
    for (table, columns) in &tables {
        for column in columns {
            let hits: Vec<_> = find(column)
                .into_iter()
                .filter(|e| e.kind == Kind::Column && e.word == *column)
                .filter(|e| e.place.split(", ").any(|place| place == *table))
                .collect();
            assert_eq!(hits.len(), 1, "{table}: {column}");
        }
    }
    for entry in all().into_iter().filter(|entry| entry.kind == Kind::Column) {
        for place in entry.place.split(", ").filter(|place| *place != "summary.json") {
            let columns = tables.iter().find(|(table, _)| *table == place).map(|(_, c)| c);
            assert!(columns.is_some_and(|c| c.contains(&entry.word)), "{place}: {}", entry.word);
        }
    }
}

#[test]
fn the_terms_and_procedures_of_the_documentation_are_explained() {
    for word in [
        "least-squares",
        "censored-likelihood",
        "effective-number",
        "fieller",
        "profile-likelihood",
        "mann-kendall",
        "theil-sen",
        "benjamini-hochberg",
        "reach-date",
        "required-rate",
        "hindcast",
        "round",
        "one-censoring-point",
        "rpd",
        "first-order",
        "rounds-to-decisive",
        "ledger",
        "decision",
        "confidence",
        "censored-kendall",
        "akritas-theil-sen",
        "decay-to-plateau",
        "broken-line",
        "most-telling",
    ] {
        assert!(!find(word).is_empty(), "{word}");
    }
}

#[test]
fn every_entry_has_a_meaning_and_a_source_and_is_there_once() {
    let mut seen = std::collections::BTreeSet::new();
    for entry in all() {
        assert!(entry.meaning.len() > 3, "{}", entry.word);
        assert!(!entry.source.is_empty(), "{}", entry.word);
        assert!(!entry.meaning.contains("  "), "{}: {}", entry.word, entry.meaning);
        assert!(seen.insert((entry.word, entry.kind, entry.place)), "{} twice", entry.word);
    }
}

#[test]
fn intervals_are_never_explained_without_what_they_assume() {
    for word in ["fieller", "profile-likelihood", "fitted-level", "theil-sen", "reach-date"] {
        let entry = find(word).into_iter().find(|e| e.kind == Kind::Statistic);
        let meaning = entry.expect("a procedure").meaning;
        assert!(meaning.contains("assumes independent"), "{word}: {meaning}");
    }
    for method in ["least-squares", "censored-likelihood"] {
        assert!(find(method)[0].meaning.contains("assumes independent"), "{method}");
    }
}

#[test]
fn words_are_found_however_they_are_written() {
    assert_eq!(find("Mann\u{2013}Kendall").len(), 1);
    assert_eq!(find("REACH DATE").len(), find("reach_date").len());
    // A word may be a column, a reason for no rate and a reason for no date.
    assert_eq!(find("detects").len(), 3);
    assert!(find("decision:D-7").iter().any(|entry| entry.word == "decision"));
    assert!(find("furlong").is_empty());
    assert_eq!(nearest("attenuatting"), Some("attenuating"));
    assert_eq!(nearest("qqqqqq"), None);
}
