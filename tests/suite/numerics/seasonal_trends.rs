//! Kendall's test within seasons.

use approx::assert_relative_eq;
use ebbwell::numerics::critical_slopes::Ends;
use ebbwell::numerics::{mann_kendall, median, seasonal_kendall, theil_sen};

use super::doubts_support::invented;
use super::normality_and_groups::w06;
use super::support::{CLOSED, Random, printed, steps};

/// Source: W06, UG Example 14-10, re-run in R 4.2.2.
#[test]
fn w06_seasonal_kendall() {
    let (t, y, month) = w06();
    let test = seasonal_kendall(&t, &y, &month, 0.95).expect("twelve months");
    for season in &test.seasons {
        let february = season.season == 1;
        assert_eq!((season.n, season.s), (3, if february { 2 } else { 3 }));
        printed(season.variance, if february { 2.6666667 } else { 3.6666667 }, 7);
    }
    assert_eq!((test.seasons.len(), test.s), (12, 35));
    assert_relative_eq!(test.variance, 43.0, max_relative = 1e-14);
    assert_relative_eq!(test.z, 5.184951391, max_relative = CLOSED);
    assert_relative_eq!(test.p, 2.16071e-7, max_relative = 3e-6);
    assert_relative_eq!(test.tau, (11.0 + 2.0 / 3.0) / 12.0, max_relative = 1e-14);
    assert_relative_eq!(test.slope.expect("three years"), 0.06, max_relative = 1e-9);
    assert_relative_eq!(test.ends.low.expect("36 slopes"), 0.05786914, max_relative = CLOSED);
    assert_relative_eq!(test.ends.high.expect("36 slopes"), 0.07213086, max_relative = CLOSED);
    let between = test.heterogeneity.expect("twelve months");
    assert_eq!(between.degrees, 11.0);
    assert_relative_eq!(between.chi_squared, 0.1071881801, max_relative = CLOSED);
    assert_relative_eq!(between.trend, 28.39281182, max_relative = CLOSED);
    assert_relative_eq!(between.trend + between.chi_squared, 28.5, max_relative = CLOSED);
    assert!(between.p > 0.999_999);
}

/// Source: the heterogeneity toy of W06: help pages of a public R statistics library.
#[test]
fn seasons_that_go_apart_cancel_and_are_told() {
    let t = [0.0, 1.0, 2.0, 3.0, 0.5, 1.5, 2.5, 3.5];
    let y = [5.0, 6.0, 7.0, 8.0, 8.0, 7.0, 6.0, 5.0];
    let season = [1, 1, 1, 1, 2, 2, 2, 2];
    let test = seasonal_kendall(&t, &y, &season, 0.9).expect("two seasons");
    assert_eq!((test.s, test.z, test.p, test.tau), (0, 0.0, 1.0, 0.0));
    let between = test.heterogeneity.expect("two seasons");
    assert_relative_eq!(between.chi_squared, 8.307692308, max_relative = CLOSED);
    assert_relative_eq!(between.p, 0.003947752, max_relative = CLOSED);
    assert_eq!((between.degrees, between.trend), (1.0, 0.0));
    // Six slopes of 1 and six of −1.
    assert_eq!(test.slope, Some(0.0));
}

/// Source: `ref_py.json` of the reference answers: S09, brute force and pymannkendall: −28, −28,
/// −28, −26; variance 261.3333333; slope of ln C with true dates −0.22816000080675203.
#[test]
fn the_seasonal_invented_series_agrees_with_brute_force() {
    let series = &invented()["S09_seasonal"];
    // Positions, as the reference takes them: the record is quarterly without a gap.
    let quarter: Vec<usize> = (0..series.t.len()).map(|i| i % 4).collect();
    let test = seasonal_kendall(&series.t, &series.y, &quarter, 0.9).expect("four quarters");
    let scores: Vec<i64> = test.seasons.iter().map(|season| season.s).collect();
    assert_eq!(scores, [-28, -28, -28, -26]);
    assert_relative_eq!(test.variance, 784.0 / 3.0, max_relative = 1e-14);
    assert_relative_eq!(test.z, -6.742626358035986, max_relative = 1e-12);
    assert_relative_eq!(test.p, 1.5554886074625828e-11, max_relative = 1e-9);
    assert_relative_eq!(test.tau, -0.9821428571428571, max_relative = 1e-12);
    let slope = test.slope.expect("eight years");
    assert_relative_eq!(slope, -0.22816000080675203, max_relative = 1e-10);
}

/// Source: the definition over all pairs, with ties in values and times; one season is the plain
/// test and Theil and Sen's line.
#[test]
fn seasons_agree_with_all_pairs_and_one_season_is_the_plain_test() {
    let mut random = Random(12);
    for round in 0..300 {
        let n = random.whole(2, 60);
        let grid = if round % 2 == 0 { 9 } else { 90_000 };
        let mut draw = |most: usize| (0..n).map(|_| random.whole(0, most) as f64).collect();
        let (t, y): (Vec<f64>, Vec<f64>) = (draw(40), draw(grid));
        let season: Vec<usize> = (0..n).map(|_| random.whole(3, 6)).collect();
        let mut slopes = Vec::new();
        let mut s = 0;
        for j in 0..n {
            for i in 0..n {
                if season[i] == season[j] && t[i] < t[j] {
                    slopes.push((y[j] - y[i]) / (t[j] - t[i]));
                    s += i64::from(y[j] > y[i]) - i64::from(y[j] < y[i]);
                }
            }
        }
        let test = seasonal_kendall(&t, &y, &season, 0.9);
        let Some(test) = test else {
            assert!(slopes.is_empty());
            continue;
        };
        assert_eq!(test.s, s);
        match (test.slope, median(&slopes)) {
            (Some(found), Some(middle)) => {
                assert_relative_eq!(found, middle, max_relative = 1e-12, epsilon = 1e-12);
            }
            (found, middle) => assert_eq!(found, middle),
        }
        assert_eq!(test.ends.low.is_some(), test.ends.high.is_some());
        let plain = mann_kendall(&t, &y).expect("two values");
        let one = seasonal_kendall(&t, &y, &vec![7; n], 0.9).expect("one season");
        assert_eq!(one.s, plain.s);
        assert_relative_eq!(one.variance, plain.variance, max_relative = 1e-12);
        assert_relative_eq!(one.z, plain.z, max_relative = 1e-12);
        assert_eq!(one.heterogeneity, None);
        let Some(sen) = theil_sen(&t, &y, 0.9) else { continue };
        let slope = one.slope.expect("two times");
        assert_relative_eq!(slope, sen.slope, max_relative = 1e-12, epsilon = 1e-12);
        match sen.interval {
            None => assert_eq!(one.ends, Ends { low: None, high: None }),
            Some(ends) => {
                let (low, high) = (one.ends.low.expect("low"), one.ends.high.expect("high"));
                assert_relative_eq!(low, ends.low, max_relative = 1e-9, epsilon = 1e-12);
                assert_relative_eq!(high, ends.high, max_relative = 1e-9, epsilon = 1e-12);
            }
        }
    }
}

/// Source: the interface: what has no test; a single value in a season counts for nothing.
#[test]
fn lone_values_have_no_season() {
    let t = steps(4);
    assert_eq!(seasonal_kendall(&t, &t, &[1, 2, 3, 4], 0.9), None);
    assert_eq!(seasonal_kendall(&t, &t, &[1, 2, 3], 0.9), None);
    assert_eq!(seasonal_kendall(&t, &[1.0, f64::NAN, 2.0, 3.0], &[1; 4], 0.9), None);
    assert_eq!(seasonal_kendall(&[], &[], &[], 0.9), None);
    let test = seasonal_kendall(&t, &[1.0, 9.0, 2.0, 3.0], &[1, 8, 1, 1], 0.9).expect("three");
    assert_eq!((test.s, test.tau, test.seasons.len()), (3, 1.0, 2));
    let level = seasonal_kendall(&t, &[5.0; 4], &[1, 1, 2, 2], 0.9).expect("two seasons");
    assert_eq!((level.s, level.variance, level.p, level.slope), (0, 0.0, 1.0, Some(0.0)));
    assert_eq!(level.heterogeneity, None);
}
