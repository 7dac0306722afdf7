//! Sentences about series, flags, records and notes.

use crate::deliver::sample;
use ebbwell::findings::{Note, SiteFacts};
use ebbwell::ledger::told::Expected;
use ebbwell::ledger::{Merged, NonResult, Outcome, QualityControl, SetAside, Told};
use ebbwell::site::JoinedBy;
use ebbwell::terms::{Figure, Flag, FlagCode, Pace, Verdict, WhyNoDate, WhyNoRate};
use ebbwell::words::caution::{STANDING, caution};
use ebbwell::words::clean::is_unsafe;
use ebbwell::words::series_sentence::series_sentence;
use ebbwell::words::{fate, flag, flag_sentence, reason, told};

#[test]
fn a_date_is_said_of_the_median_with_its_interval_and_the_means_date() {
    let text = series_sentence(&sample::decline(), 0.9);
    assert!(text.contains("typical (median) level meets the limit about 20"), "{text}");
    assert!(text.contains("90 % interval"), "{text}");
    assert!(text.contains("the arithmetic mean, for which no interval is computed"), "{text}");
    assert!(text.contains("ahead of the goal, 2034-12"), "{text}");
    assert!(text.contains("over the limit of 5"), "{text}");
}

#[test]
fn beyond_the_horizon_people_read_no_date() {
    let mut series = sample::decline();
    series.beyond_horizon = true;
    series.latest_beyond_horizon = true;
    let text = series_sentence(&series, 0.9);
    assert!(text.contains("meets the limit beyond the horizon (20"), "{text}");
    assert!(text.contains("to beyond the horizon)"), "{text}");
    assert!(!text.contains("arithmetic mean"), "{text}");
    series.earliest_beyond_horizon = true;
    let text = series_sentence(&series, 0.9);
    assert!(!text.contains("about 20"), "{text}");
}

#[test]
fn without_a_date_the_sentence_says_why() {
    for &why in WhyNoDate::ALL {
        let mut series = sample::undecided();
        series.why_no_date = Some(why);
        let text = series_sentence(&series, 0.9);
        match why {
            WhyNoDate::Below | WhyNoDate::NoRate => {}
            WhyNoDate::NoLimit => assert!(text.contains("No limit applies"), "{text}"),
            other => assert!(
                text.contains(&format!(
                    "No date can be supported because {}",
                    reason::no_date(other)
                )),
                "{text}"
            ),
        }
    }
    let text = series_sentence(&sample::undecided(), 0.9);
    assert!(text.contains("the limit is not met before 2027-04"), "{text}");
    assert!(!text.contains("each year"), "a change a year is said only where it is shown: {text}");
}

#[test]
fn what_lies_behind_is_told_as_past() {
    let mut series = sample::decline();
    series.reach_date = series.sampled.map(|span| span.last);
    assert!(series_sentence(&series, 0.9).contains("(median) level met the limit about 2025-05"));
    series.reach_date = Some(sample::date("2025-06-01"));
    assert!(series_sentence(&series, 0.9).contains("(median) level meets the limit about 2025-06"));
}

#[test]
fn a_bound_beyond_the_horizon_is_not_read_out_as_a_date() {
    let mut series = sample::undecided();
    series.reach_earliest = Some(sample::date("2075-10-01"));
    series.earliest_beyond_horizon = true;
    let text = series_sentence(&series, 0.9);
    assert!(text.contains("; the limit is not met within the horizon."), "{text}");
    assert!(!text.contains("2075"), "{text}");
}

#[test]
fn without_a_rate_the_sentence_says_why() {
    for &why in WhyNoRate::ALL {
        let mut series = sample::too_few();
        series.why_no_rate = Some(why);
        let text = series_sentence(&series, 0.9);
        assert!(text.contains(&format!("No rate can be given because {}", reason::no_rate(why))));
        assert!(text.contains("The last result, of 2024-08, is"), "{text}");
    }
}

#[test]
fn a_rise_names_when_the_limit_is_crossed_and_how_early() {
    let mut series = sample::rise();
    series.exceed_date = Some(sample::date("2029-03-04"));
    series.exceed_earliest = Some(sample::date("2027-11-30"));
    let text = series_sentence(&series, 0.9);
    assert!(text.contains("crosses the limit about 2029-03 (2027-11 at the earliest)"), "{text}");
    assert!(text.starts_with("Concentrations rise: rate -0."), "{text}");
    assert!(text.contains("more each year"), "{text}");
}

#[test]
fn no_sentence_holds_a_gap_or_a_number_that_is_none() {
    let mut all = sample::findings().series;
    for &verdict in Verdict::ALL {
        for &pace in Pace::ALL {
            let mut series = sample::decline();
            series.verdict = verdict;
            series.pace = Some(pace);
            series.reach_latest = None;
            all.push(series.clone());
            series.reach_earliest = None;
            all.push(series);
        }
    }
    for series in &all {
        let text = series_sentence(series, 0.9);
        for bad in ["NaN", "inf", "  ", " .", "()", " ,"] {
            assert!(!text.contains(bad), "{bad:?} in {text}");
        }
        assert!(text.ends_with('.'), "{text}");
    }
}

#[test]
fn a_flag_says_its_figure_and_its_threshold() {
    let outlier = Flag::raised(FlagCode::Outlier, 0.003, 0.05);
    assert_eq!(
        flag_sentence::sentence(&outlier),
        "one residual is too large for its neighbours (p 0.003, under 0.05)"
    );
    for &code in FlagCode::ALL {
        for figure in [0.25, 12.0] {
            let text = flag_sentence::sentence(&Flag::raised(code, figure, 0.5));
            assert!(text.chars().any(|c| c.is_ascii_digit()), "{code:?}: {text}");
        }
        let word = flag_sentence::sentence(&Flag::fact(code, Figure::Word("years")));
        assert!(word.contains("years") || word.contains("than a date needs"), "{word}");
        let date = Figure::Date(sample::date("2031-05-06"));
        assert!(flag_sentence::sentence(&Flag::fact(code, date)).ends_with("(2031-05)"));
        assert!(!flag_sentence::sentence(&Flag::fact(code, Figure::Absent)).is_empty());
    }
}

#[test]
fn flags_with_a_case_or_a_special_figure_say_it_in_words() {
    let said = |flag: Flag| flag_sentence::sentence(&flag);
    let word = |code, word| said(Flag::fact(code, Figure::Word(word)));
    let raised = |code, figure, threshold| said(Flag::raised(code, figure, threshold));
    assert_eq!(
        word(FlagCode::DateWithheld, "years"),
        "no date is given because the record is shorter than a date needs"
    );
    assert_eq!(word(FlagCode::Unbounded, "latest"), "the date's interval has no latest end");
    assert_eq!(
        said(Flag::fact(FlagCode::ResultsDenyLine, Figure::Number(3.0))),
        "the line is under the limit, but of the last 4 dates 3 do not show it met"
    );
    assert_eq!(
        raised(FlagCode::UnitSlip, 0.001, 500.0),
        "a value is the median of its neighbours divided by 1000: a unit may have slipped"
    );
    assert_eq!(
        raised(FlagCode::ReportingLimitAboveLimit, 2.0, 5.0),
        "non-detects with a reporting limit over the limit of 5: 2"
    );
    assert_eq!(
        raised(FlagCode::DuplicatesDiffer, 45.067, 30.0),
        "a duplicate differs from its parent by 45.1 %, over 30 %"
    );
    assert_eq!(
        raised(FlagCode::DuplicatesDiffer, 2.5, 1.0),
        "a duplicate differs from its parent by 2.5 times the reporting limit, over 1"
    );
}

#[test]
fn a_test_that_could_not_be_made_is_never_called_passed() {
    for &code in FlagCode::ALL {
        let text = flag_sentence::sentence(&Flag::not_assessable(code, 0.05));
        assert!(text.starts_with(flag::label(code)), "{text}");
        assert!(text.contains("not assessable"), "{text}");
        assert!(text.contains("not the same as passed"), "{text}");
    }
}

#[test]
fn every_reason_has_words_of_its_own() {
    let mut seen = std::collections::BTreeSet::new();
    let codes = Merged::ALL
        .iter()
        .map(|m| (Outcome::Merged, m.code()))
        .chain(NonResult::ALL.iter().map(|n| (Outcome::NonResult, n.code())))
        .chain(QualityControl::ALL.iter().map(|q| (Outcome::QualityControl, q.code())))
        .chain(SetAside::ALL.iter().map(|s| (Outcome::SetAside, s.code())));
    for (outcome, code) in codes {
        let words = fate::reason(outcome.code(), code);
        assert!(words.contains(' ') || outcome == Outcome::QualityControl, "{code}: {words}");
        assert!(seen.insert(words), "{code} shares its words with another");
    }
    assert_eq!(fate::reason("set-aside", "decision:D1"), "excluded by decision D1");
}

/// One of each case of what is told, with hostile text where there is text.
fn one_of_each() -> Vec<Told> {
    let x = || "\u{1b}[31m\u{202e}<x>".to_owned();
    vec![
        Told::DecodedWindows1252 { file: x(), line: 3 },
        Told::ColumnNotUsed { file: x(), column: x() },
        Told::AnalyteJoined { written: x(), listed: x(), by: JoinedBy::Cas },
        Told::CasCheckDigit { cas: x() },
        Told::WellAlias { written: x(), well: x() },
        Told::WellNotListed { well: x() },
        Told::AnalyteNotListed { written: x(), nearest: Some(x()) },
        Told::AnalyteNotListed { written: x(), nearest: None },
        Told::FractionAssumed { analyte: x(), fraction: x() },
        Told::FractionUnknown { analyte: x() },
        Told::LimitsDiffer,
        Told::HoldingTime,
        Told::InBlank,
        Told::UnknownQualifier { code: x() },
        Told::UnknownCondition { condition: x() },
        Told::UnknownSampleType { written: x() },
        Told::UnknownUnit { written: x() },
        Told::AmbiguousDates { file: x() },
        Told::Revised { was: x(), is: x(), place: x() },
        Told::NonDetectUnderDetect,
        Told::Recensored,
        Told::DetectionLimitTaken,
        Told::UnderDetectableActivity,
        Told::AveragedOf { n: 2 },
        Told::OutsideFit,
        Told::DuplicateAveraged,
        Told::Converted { from: "mg/L", to: "ug/L" },
        Told::Decision { id: x() },
        Told::Unreadable { column: "result", found: x(), expected: Expected::Result },
        Told::FileLeftAlone { file: x() },
        Told::FileWithoutRecords { file: x() },
        Told::SettingOffDefault { key: x(), is: x() },
    ]
}

#[test]
fn what_is_told_is_harmless_and_counts_in_the_right_number() {
    for told in one_of_each() {
        let text = told::sentence(&told, 34);
        assert!(!text.is_empty() && !text.chars().any(is_unsafe), "{text:?}");
    }
    let told = Told::Converted { from: "mg/L", to: "ug/L" };
    assert_eq!(told::sentence(&told, 1), "1 record: converted from mg/L to ug/L");
    assert_eq!(told::sentence(&told, 34), "34 records: converted from mg/L to ug/L");
}

#[test]
fn the_ledgers_own_words_stand_in_the_detail() {
    let all = [Told::AveragedOf { n: 2 }, Told::OutsideFit, Told::DuplicateAveraged];
    assert_eq!(told::details(&all), "averaged of 2; outside-fit; averaged");
}

#[test]
fn the_most_important_note_comes_last() {
    let note = |told, records| Note { told, records };
    let mut notes = vec![
        note(Told::UnknownQualifier { code: "B".into() }, 2),
        note(Told::Converted { from: "mg/L", to: "ug/L" }, 900),
        note(Told::UnknownUnit { written: "furlong".into() }, 7),
        note(Told::InBlank, 3),
    ];
    told::sort_notes(&mut notes);
    let order: Vec<usize> = notes.iter().map(|note| note.records).collect();
    assert_eq!(order, [900, 3, 2, 7]);
}

#[test]
fn the_caution_names_the_authority_where_one_is_given() {
    let site = |authority: Option<&str>, citation: Option<&str>| SiteFacts {
        authority: authority.map(str::to_owned),
        citation: citation.map(str::to_owned),
        ..sample::site()
    };
    assert_eq!(caution(&site(None, None)), STANDING);
    assert!(STANDING.contains("responsible regulator and licensed professionals"));
    let both = caution(&site(Some("State Water Office"), Some("Order 12")));
    assert!(both.ends_with("Authority named by the site file: State Water Office (Order 12)."));
    assert_eq!(caution(&site(Some("  "), None)), STANDING);
}
