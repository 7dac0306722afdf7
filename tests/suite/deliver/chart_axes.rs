//! Ticks of both axes, and what is clipped.

use super::sample::{self, date};
use chrono::{Datelike, Days};
use ebbwell::deliver::charts::clip;
use ebbwell::deliver::charts::log_axis::LogAxis;
use ebbwell::deliver::charts::time_axis::{range, ticks};
use ebbwell::terms::Span;
use proptest::prelude::{prop_assert, proptest};

fn labels(low: f64, high: f64) -> Vec<String> {
    LogAxis::holding([low, high]).ticks.into_iter().filter_map(|tick| tick.label).collect()
}

#[test]
fn a_range_without_a_power_of_ten_still_has_labels() {
    assert_eq!(labels(2.0, 8.0), ["1", "2", "5", "10"]);
    assert_eq!(labels(0.3, 0.9), ["0.2", "0.5", "1"]);
    assert_eq!(labels(4.9, 5.1), ["2", "5", "10"]);
    assert_eq!(labels(7.0, 7.0), ["5", "10"]);
}

#[test]
fn labels_are_one_ten_a_tenth_and_never_ten_point_nought() {
    assert_eq!(labels(0.15, 9000.0), ["0.1", "1", "10", "100", "1000", "10000"]);
    assert_eq!(labels(0.0003, 0.9), ["0.001", "0.01", "0.1", "1"]);
}

#[test]
fn twelve_decades_are_thinned() {
    let labels = labels(1e-6, 1e6);
    assert!((2..=8).contains(&labels.len()), "{labels:?}");
    assert_eq!(labels.first().map(String::as_str), Some("1e-6"));
    let ticks = LogAxis::holding([1e-6, 1e6]).ticks.len();
    assert!(ticks <= 16, "{ticks} ticks");
}

#[test]
fn what_has_no_logarithm_is_left_out_and_nothing_gives_an_axis_all_the_same() {
    let axis = LogAxis::holding([0.0, -3.0, f64::NAN, f64::INFINITY, 3.0]);
    assert!(axis.low < 3.0_f64.log10() && axis.high > 3.0_f64.log10());
    let empty = LogAxis::holding([]);
    assert!(empty.low < empty.high && empty.ticks.len() > 1);
    let tiny = LogAxis::holding([5e-324, f64::MAX]);
    assert!(tiny.low.is_finite() && tiny.high.is_finite());
}

proptest! {
    #[test]
    fn any_range_lies_inside_its_axis_with_two_labels_or_more(
        low in -30.0_f64..30.0, span in 0.0_f64..20.0,
    ) {
        let (least, most) = (10_f64.powf(low), 10_f64.powf(low + span));
        let axis = LogAxis::holding([least, most]);
        prop_assert!(axis.low < least.log10() && most.log10() < axis.high);
        let labelled = axis.ticks.iter().filter(|tick| tick.label.is_some()).count();
        prop_assert!((2..=10).contains(&labelled), "{} labels", labelled);
        prop_assert!(axis.ticks.windows(2).all(|pair| pair[0].log < pair[1].log));
    }
}

fn years(first: &str, last: &str) -> Vec<(String, String)> {
    let span = Span { first: date(first), last: date(last) };
    let labelled = ticks(span).into_iter().filter_map(|t| Some((t.date.to_string(), t.label?)));
    labelled.collect()
}

#[test]
fn years_are_labelled_at_the_first_of_january() {
    let labels = years("2016-03-01", "2025-10-01");
    assert_eq!(labels.len(), 9);
    assert_eq!(labels[0], ("2017-01-01".into(), "2017".into()));
    assert!(labels.iter().all(|(date, _)| date.ends_with("-01-01")));
}

#[test]
fn long_spans_are_thinned_and_short_ones_show_months() {
    assert!((3..=12).contains(&years("1900-01-01", "2026-01-01").len()));
    assert!((2..=12).contains(&years("1000-01-01", "9999-12-31").len()));
    let short = years("2025-01-15", "2025-06-20");
    assert_eq!(short[0], ("2025-02-01".into(), "2025-02".into()));
    assert!(years("2024-01-15", "2026-03-01").len() <= 13);
}

#[test]
fn the_projection_is_shown_to_the_latest_date_but_at_most_two_records_long() {
    let series = sample::decline();
    let (last, latest) =
        (series.sampled.expect("dates").last, series.reach_latest.expect("a latest"));
    let shown = range(&series).expect("dates");
    assert!(shown.last >= latest && shown.last < latest + Days::new(500));
    let mut far = sample::decline();
    far.reach_latest = Some(date("2200-01-01"));
    let record = last - far.values[0].date;
    let shown = range(&far).expect("dates");
    assert!(shown.last <= last + record * 2 + chrono::Duration::days(400), "{shown:?}");
    far.reach_earliest = Some(date("2150-01-01"));
    let nearer = range(&far).expect("dates");
    assert!(nearer.last < shown.last, "a date out of sight does not flatten the data");
    assert_eq!(range(&sample::empty("a", "b")), None);
}

#[test]
fn a_series_that_ends_with_the_calendar_does_not_overflow_it() {
    let mut series = sample::too_few();
    let last = date("9999-12-31");
    for (at, value) in series.values.iter_mut().enumerate() {
        value.date = last - Days::new(200 - 100 * at as u64);
    }
    let shown = range(&series).expect("dates");
    assert!(shown.last >= last && shown.last.year() < 11_000);
}

#[test]
fn a_line_is_cut_at_the_edges_it_crosses() {
    let inside = (0.0, 0.0, 10.0, 10.0);
    assert_eq!(clip::segment((-5.0, 5.0), (15.0, 5.0), inside), Some(((0.0, 5.0), (10.0, 5.0))));
    assert_eq!(clip::segment((2.0, 3.0), (4.0, 5.0), inside), Some(((2.0, 3.0), (4.0, 5.0))));
    assert_eq!(clip::segment((-5.0, -1.0), (15.0, -1.0), inside), None);
    assert_eq!(clip::segment((5.0, -10.0), (5.0, 5.0), inside), Some(((5.0, 0.0), (5.0, 5.0))));
    assert_eq!(clip::segment((-4.0, 8.0), (3.0, 15.0), inside), None);
}

#[test]
fn an_area_is_cut_at_the_edges_it_crosses() {
    let inside = (0.0, 0.0, 10.0, 10.0);
    let area = |outline: &[(f64, f64)]| {
        let cut = clip::area(outline, inside);
        assert!(cut.iter().all(|s| (0.0..=10.0).contains(&s.0) && (0.0..=10.0).contains(&s.1)));
        let shoelace: f64 = (0..cut.len())
            .map(|i| (cut[i], cut[(i + 1) % cut.len()]))
            .map(|(a, b)| a.0 * b.1 - b.0 * a.1)
            .sum();
        shoelace.abs() / 2.0
    };
    assert_eq!(area(&[(-5.0, -5.0), (15.0, -5.0), (15.0, 15.0), (-5.0, 15.0)]), 100.0);
    assert_eq!(area(&[(2.0, 2.0), (4.0, 2.0), (4.0, 4.0), (2.0, 4.0)]), 4.0);
    assert_eq!(area(&[(5.0, -5.0), (15.0, 5.0), (5.0, 5.0)]), 25.0);
    assert_eq!(area(&[(11.0, 1.0), (12.0, 1.0), (12.0, 2.0)]), 0.0);
}
