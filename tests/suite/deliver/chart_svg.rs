//! The charts as SVG text.

use super::sample;
use ebbwell::deliver::charts::{ChartFacts, chosen, series_svg};
use ebbwell::findings::{Findings, SeriesFinding};
use ebbwell::terms::{Pace, Reading, Verdict};
use ebbwell::words::caution::STANDING;

fn chart(series: &SeriesFinding) -> String {
    series_svg(series, &ChartFacts { confidence: 0.9, caution: STANDING })
}

/// Checks that tags open and close in order and that text holds no stray mark-up: enough to know
/// that the text is one well-formed element.
fn assert_well_formed(svg: &str) {
    let mut open: Vec<&str> = Vec::new();
    let mut rest = svg;
    while let Some((text, tail)) = rest.split_once('<') {
        assert!(!text.contains('>'), "a stray > in {text:?}");
        assert_entities(text);
        let (tag, after) = tail.split_once('>').unwrap_or_else(|| panic!("unclosed {tail:?}"));
        assert_entities(tag);
        assert_eq!(tag.matches('"').count() % 2, 0, "{tag}");
        if let Some(name) = tag.strip_prefix('/') {
            assert_eq!(open.pop(), Some(name));
        } else if !tag.ends_with('/') {
            assert!(!open.is_empty() || rest.len() == svg.len(), "a second root");
            open.push(tag.split([' ', '\n']).next().unwrap_or(tag));
        }
        rest = after;
    }
    assert!(open.is_empty(), "{open:?}");
    assert!(rest.trim().is_empty(), "{rest:?}");
    let bad = svg.chars().find(|c| c.is_control() && *c != '\n');
    assert_eq!(bad, None, "XML has no such character");
}

fn assert_entities(text: &str) {
    for part in text.split('&').skip(1) {
        let known = ["lt;", "gt;", "amp;", "quot;", "apos;"].iter().any(|e| part.starts_with(e));
        assert!(known, "&{part}");
    }
}

#[test]
fn every_sample_gives_one_well_formed_picture_without_a_gap_in_its_numbers() {
    for series in sample::findings().series.iter().chain([&sample::empty("a", "b")]) {
        let svg = chart(series);
        assert_well_formed(&svg);
        assert!(!svg.contains("NaN") && !svg.contains("inf\""), "{svg}");
        assert_eq!(svg, chart(series), "the same series gives the same bytes");
    }
}

#[test]
fn a_picture_says_in_words_what_it_shows() {
    let svg = chart(&sample::mixed());
    assert!(svg.starts_with("<svg width=\"900\" height=\"570\" viewBox=\"0 0 1800 1140\" "));
    assert!(svg.lines().next().is_some_and(|line| line.contains("role=\"img\"")));
    assert!(svg.contains("<title>MW-12, Trichloroethylene</title>"), "{svg}");
    let description = svg.split("<desc>").nth(1).and_then(|d| d.split("</desc>").next());
    let description = description.expect("a description");
    assert!(description.contains("30 measured values, 8 non-detects, 2 other readings"));
    assert!(description.contains("typical (median) level met the limit"), "{description}");
    assert!(svg.contains(STANDING));
    assert!(
        svg.contains("\nlimit\n") && svg.contains("\n5 ug/L\n"),
        "the limit is named at its line"
    );
}

#[test]
fn hostile_names_are_text_and_nothing_else() {
    let mut series = sample::decline();
    series.key.well = "</svg><script>alert('1')</script>\u{1b}[2J\u{202e}".into();
    series.key.analyte = "\"onload=\"x\" & <b>".into();
    series.key.site = "]]>\u{0}\u{ffff}".into();
    series.key.depth = Some("<".into());
    let svg = chart(&series);
    assert_well_formed(&svg);
    assert!(!svg.contains("<script") && !svg.contains('\u{202e}') && !svg.contains("]]>"), "{svg}");
    assert!(svg.contains("&lt;script&gt;"));
}

#[test]
fn each_kind_of_reading_has_a_shape_of_its_own_at_every_date_and_in_the_legend() {
    // How often each shape occurs: disc, hollow disc, hollow triangle, bar, ring, light cross.
    let shapes = |reading: Reading, estimated: bool, in_fit: bool| {
        let dates = sample::quarters("2020-01-01", 2);
        let readings: Vec<_> = dates.iter().map(|date| (*date, reading)).collect();
        let mut series = sample::with(sample::empty("a", "b"), &readings);
        for value in &mut series.values {
            (value.estimated, value.in_fit) = (estimated, in_fit);
        }
        let svg = chart(&series);
        [
            "r=\"9\" opacity=\"1\" fill=\"#000000\"",
            "r=\"9\" opacity=\"1\" fill=\"none\" stroke=\"#000000\"",
            "<polygon opacity=\"1\" fill=\"#FFFFFF\"",
            "<polyline fill=\"none\" opacity=\"1\" stroke=\"#000000\" stroke-width=\"3\"",
            "r=\"16\"",
            "stroke=\"#767676\" stroke-width=\"3\"",
        ]
        .map(|shape| svg.matches(shape).count())
    };
    // The axes are one line of the width of a bar; a legend entry adds one of its kind.
    assert_eq!(shapes(Reading::Measured(3.0), false, true), [3, 0, 0, 1, 0, 0]);
    assert_eq!(shapes(Reading::Below(3.0), false, true), [0, 3, 0, 1, 0, 0]);
    assert_eq!(shapes(Reading::Above(3.0), false, true), [0, 0, 3, 4, 0, 0]);
    assert_eq!(shapes(Reading::Between(2.5, 3.0), false, true), [0, 0, 0, 10, 0, 0]);
    assert_eq!(shapes(Reading::Measured(3.0), true, true), [4, 0, 0, 1, 3, 0]);
    let [disc, .., cross] = shapes(Reading::Measured(3.0), false, false);
    assert_eq!((disc, cross), (0, 6), "crosses alone");
}

#[test]
fn a_long_name_is_cut_in_the_headline_and_whole_in_the_title() {
    let mut series = sample::decline();
    series.key.well = "x".repeat(300);
    let svg = chart(&series);
    let longest = svg.lines().filter(|l| l.starts_with("xx")).map(|l| l.chars().count()).max();
    assert_eq!(longest, Some(80));
    assert!(svg.contains(&format!("<title>{}, Benzene</title>", series.key.well)));
}

#[test]
fn the_line_is_dashed_beyond_the_last_used_date_only() {
    let series = sample::decline();
    let svg = chart(&series);
    let line = "stroke=\"#0072B2\" stroke-width=\"5\"";
    let runs = svg.lines().filter(|l| l.contains(line)).count();
    assert!(runs > 10, "dashes are pieces of the line: {runs}");
    let mut within = sample::decline();
    within.reach_date = None;
    within.reach_latest = None;
    within.reach_earliest = None;
    let fewer = chart(&within).lines().filter(|l| l.contains(line)).count();
    assert!(fewer < runs);
    let words = ["fitted median", "the same, beyond the data", "its 90 % interval"];
    assert!(words.iter().all(|words| svg.contains(words)));
}

#[test]
fn the_legend_names_only_what_occurs() {
    let plain = chart(&sample::too_few());
    assert!(plain.contains("\nmeasured\n"));
    for absent in ["not detected", "estimated", "not in the fit", "fitted median", "limit met"] {
        assert!(!plain.contains(&format!("\n{absent}")), "{absent}");
    }
    let mixed = chart(&sample::mixed());
    for present in [
        "not detected, at its own limit",
        "known to lie between two values",
        "above the instrument&apos;s range",
        "estimated",
        "not in the fit",
        "limit met: date and interval",
    ] {
        assert!(mixed.contains(&format!("\n{present}\n")), "{present}");
    }
    assert!(chart(&sample::undecided()).contains("limit not met before"));
    let mut far = sample::decline();
    far.reach_date = Some(sample::date("2300-01-01"));
    far.reach_earliest = Some(sample::date("2200-01-01"));
    far.reach_latest = None;
    assert!(chart(&far).contains("limit not met within the dates shown"));
}

#[test]
fn the_bar_on_the_limit_line_says_what_is_known() {
    let says = |series: &SeriesFinding, words: &str| {
        assert!(chart(series).contains(&format!("\n{words}\n")), "{words}");
    };
    let mut series = sample::decline();
    says(&series, "limit met: date and interval");
    let latest = series.reach_latest;
    (series.reach_date, series.reach_earliest) = (None, None);
    says(&series, "limit met, at the latest");
    (series.reach_latest, series.reach_earliest) = (None, latest);
    says(&series, "limit not met before");
    (series.exceed_date, series.exceed_earliest) = (latest, latest);
    says(&series, "limit crossed: date and early end");
    series.limit = None;
    assert!(!chart(&series).contains("limit crossed"));
}

#[test]
fn a_line_that_is_not_carried_on_has_no_dashes_in_the_legend() {
    let mut series = sample::decline();
    let fitted = series.fitted.as_mut().expect("a line");
    fitted.band.retain(|point| point.date <= fitted.used.last);
    assert!(!chart(&series).contains("the same, beyond the data"));
}

/// A run of so many series, half of them rising.
fn many(n: usize) -> Findings {
    let mut findings = sample::findings();
    findings.series = (0..n)
        .map(|at| {
            let mut series = sample::undetected();
            series.key.well = format!("W{at:05}");
            if at % 2 == 0 {
                series.verdict = Verdict::Rising;
            }
            series
        })
        .collect();
    findings
}

#[test]
fn up_to_a_thousand_series_each_has_a_chart_and_over_that_those_that_matter() {
    let findings = many(1_000);
    let all = chosen(&findings);
    assert_eq!((all.charts.len(), all.left_out, all.single_dates), (1_000, 0, 0));
    let mut findings = many(1_002);
    findings.series[1].pace = Some(Pace::Behind);
    findings.series[3].last_result = Some(Reading::Measured(50.0));
    let some = chosen(&findings);
    assert_eq!((some.charts.len(), some.left_out), (503, 499));
    assert_eq!(some.charts[0].0, "charts/W00000--Benzene.svg");
}

#[test]
fn a_series_with_one_date_has_no_chart() {
    let mut findings = sample::findings();
    findings.series[0].values.truncate(1);
    let chosen = chosen(&findings);
    assert_eq!(chosen.single_dates, 1);
    assert_eq!(chosen.charts.len() + 1, findings.series.len());
}
