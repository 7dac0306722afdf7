//! The pages of the terminal.

use crate::deliver::sample;
use ebbwell::findings::LedgerRow;
use ebbwell::ledger::Outcome;
use ebbwell::terms::{Pace, Verdict};
use ebbwell::words::caution::STANDING;
use ebbwell::words::explain::{all, find};
use ebbwell::words::layout::columns;
use ebbwell::words::page::{
    CheckFacts, PageOptions, check, examples, explain, index, review, show,
};

fn options(width: usize, color: bool) -> PageOptions<'static> {
    PageOptions {
        width,
        color,
        site_argument: "demo wells",
        folder: Some("demo wells/review-2026-06-30"),
        charts_left_out: 0,
    }
}

/// The text in one line, so that a wrapped sentence can be looked for.
fn unwrapped(page: &str) -> String {
    page.split_whitespace().collect::<Vec<_>>().join(" ")
}

#[test]
fn the_review_page_tells_what_a_busy_person_needs_in_a_minute() {
    let page = review(&sample::findings(), &options(90, false));
    let text = unwrapped(&page);
    for wanted in [
        "Review: Example Yard, round 2026-Q2, as of 2026-06-30",
        "412 records in 2 files: 371 used, 9 merged into another record",
        "18 set aside",
        "11 a qualifier that only the laboratory's legend explains: add a [[qualifier]]",
        "1 rising concentrations go up; last result over the limit: 1",
        "MW-7, Vinyl chloride typical level",
        "Of 4 rates tested, about 0.2 would show rising by chance alone.",
        "34 records: converted from mg/L to ug/L",
        "Written to demo wells/review-2026-06-30",
        "Next ebbwell show 'demo wells' MW-7 'Vinyl chloride'",
        "State Water Office",
        STANDING,
    ] {
        assert!(text.contains(wanted), "{wanted:?} in\n{page}");
    }
    assert!(!text.contains("averaged of"), "a detail of the ledger is not said: {page}");
    assert!(page.lines().count() <= 60, "{} lines", page.lines().count());
}

#[test]
fn a_series_stands_under_the_first_reason_to_look_at_it() {
    let mut findings = sample::findings();
    for series in &mut findings.series {
        if series.verdict == Verdict::Attenuating {
            series.pace = Some(Pace::Behind);
        }
    }
    let page = review(&findings, &options(90, false));
    let at = |text: &str| page.find(text).unwrap_or_else(|| panic!("{text} in\n{page}"));
    assert!(at("\nRising\n") < at("MW-7, Vinyl chloride"));
    assert!(at("MW-7, Vinyl chloride") < at("\nOver the limit, and no date can be supported\n"));
    assert!(at("MW-9, 1,1-Dichloroethylene") < at("\nBehind the goal date\n"));
    assert!(at("\nBehind the goal date\n") < at("MW-3, Benzene"));
    assert!(unwrapped(&page).contains("goal 2034-12"), "{page}");
    assert_eq!(page.matches("MW-7, Vinyl chloride").count(), 1);
}

#[test]
fn pages_keep_to_the_width_and_say_the_same_without_colour() {
    let findings = sample::findings();
    for width in [40, 80, 100, 300] {
        let page = review(&findings, &options(width, false));
        for line in page.lines().filter(|line| !line.starts_with("Next ")) {
            assert!(columns(line) <= width.clamp(40, 100), "{width}: {line}");
        }
    }
    let plain = review(&findings, &options(80, false));
    let styled = review(&findings, &options(80, true));
    assert!(!plain.contains('\u{1b}'));
    let stripped =
        styled.replace("\u{1b}[1m", "").replace("\u{1b}[2m", "").replace("\u{1b}[0m", "");
    assert_ne!(styled, plain);
    assert_eq!(stripped, plain);
}

#[test]
fn text_from_files_cannot_steer_a_terminal() {
    let mut findings = sample::findings();
    let hostile = "\u{1b}]0;owned\u{7}\u{202e}MW\u{9b}2J";
    findings.site.name = hostile.into();
    findings.run.unreadable = vec![(hostile.into(), hostile.into())];
    for series in &mut findings.series {
        series.key.well = hostile.into();
        series.key.analyte = hostile.into();
        series.key.site = hostile.into();
        series.limit_source = Some(hostile.into());
        for value in &mut series.values {
            value.records = vec![hostile.into()];
        }
    }
    let row = LedgerRow {
        file: hostile.into(),
        reported: hostile.into(),
        detail: hostile.into(),
        outcome: "set-aside",
        reason: "unreadable-number".into(),
        ..LedgerRow::default()
    };
    let options =
        PageOptions { folder: Some(hostile), site_argument: hostile, ..options(80, false) };
    let facts = CheckFacts {
        run: &findings.run,
        site: &findings.site,
        notes: &findings.notes,
        arrival: &findings.arrival,
        examples: &[row],
    };
    for page in [
        review(&findings, &options),
        show(&findings, &findings.series[0], &options),
        check(&facts, &options),
    ] {
        let bad = page.chars().find(|c| (c.is_control() && *c != '\n') || *c == '\u{202e}');
        assert_eq!(bad, None, "{page:?}");
    }
}

#[test]
fn the_check_page_shows_where_a_record_stands_and_what_to_do() {
    let findings = sample::findings();
    let row = |record: &str| LedgerRow {
        file: "results/2024.csv".into(),
        record: record.into(),
        well: "MW-3".into(),
        reported: "O.5".into(),
        outcome: Outcome::SetAside.code(),
        reason: "unreadable-number".into(),
        ..LedgerRow::default()
    };
    let used = LedgerRow { outcome: Outcome::Used.code(), ..row("1") };
    let rows = vec![used, row("17"), row("18"), row("19")];
    let some = examples(rows, 2);
    assert_eq!(some.len(), 2);
    let facts = CheckFacts {
        run: &findings.run,
        site: &findings.site,
        notes: &findings.notes,
        arrival: &findings.arrival,
        examples: &some,
    };
    let page = check(&facts, &options(90, false));
    let text = unwrapped(&page);
    for wanted in [
        "results/2024.csv 300 records utf-8, 2 blank lines",
        "4 the result cannot be read as a number [unreadable-number] results/2024.csv:17 MW-3, O.5",
        "results/2024.csv:18",
        "do: declare `decimal` or `thousands` under [[results]]",
        "Next ebbwell review 'demo wells'",
        STANDING,
    ] {
        assert!(text.contains(wanted), "{wanted:?} in\n{page}");
    }
    assert!(!text.contains("results/2024.csv:19"), "{page}");
}

#[test]
fn the_page_of_a_series_shows_values_with_their_records_and_flags_with_their_sources() {
    let findings = sample::findings();
    let series = findings.series.iter().find(|s| s.key.well == "MW-3").expect("the decline");
    let text = unwrapped(&show(&findings, series, &options(100, false)));
    for wanted in [
        "MW-3, Benzene",
        "limit 5 ug/L (40 CFR 141.61)",
        "outlier: one residual is too large for its neighbours (p 0.0031, under 0.05)",
        "figure 0.0031, threshold 0.05, source: Bonferroni test",
        "residuals not normal: not assessable",
        "2018-02-14 198.931",
        "results/lab.csv:2",
        "Records 30 used",
        STANDING,
    ] {
        assert!(text.contains(wanted), "{wanted:?} in {text}");
    }
    let mixed = findings.series.iter().find(|s| s.key.well == "MW-12").expect("the mixed one");
    let text = unwrapped(&show(&findings, mixed, &options(100, false)));
    for wanted in ["<10", ">50", "2 to 5", "outside the fit", "estimated"] {
        assert!(text.contains(wanted), "{wanted:?} in {text}");
    }
}

#[test]
fn a_run_without_series_still_has_a_page() {
    let mut findings = sample::findings();
    findings.series.clear();
    findings.wells.clear();
    findings.notes.clear();
    let page = review(&findings, &options(80, false));
    assert!(page.contains("No series rises"), "{page}");
    assert!(page.contains("Next        ebbwell check 'demo wells'"), "{page}");
    findings.run.outcomes.clear();
    assert!(review(&findings, &options(80, false)).contains("Next        ebbwell"));
}

#[test]
fn a_name_like_an_option_stands_behind_two_hyphens() {
    let mut findings = sample::findings();
    for series in &mut findings.series {
        series.key.well = "-x".into();
        series.key.fraction = Some(ebbwell::site::Fraction::Dissolved);
    }
    let page = review(&findings, &options(80, false));
    assert!(page.contains("show --fraction dissolved -- 'demo wells' -x 'Vinyl"), "{page}");
}

#[test]
fn explain_prints_every_entry_and_the_index_every_word() {
    let page = explain(&find("detects"), &options(80, false));
    assert_eq!(page.matches("Source: ").count(), 3, "{page}");
    let words = unwrapped(&index(&options(80, false)));
    for entry in all() {
        assert!(words.contains(entry.word), "{}", entry.word);
    }
}
