//! Kendall's test, and both trend statistics of the worked examples.

use approx::assert_relative_eq;
use ebbwell::numerics::exact_kendall::brute_score;
use ebbwell::numerics::kendall::sorted_score;
use ebbwell::numerics::line::line;
use ebbwell::numerics::{Mark, PValue, certain_pairs, falling_p, mann_kendall, theil_sen};

use super::support::{CLOSED, Random, Series, interval, printed, steps, w02, w14};

/// W04: UG Example 17-6, sulfate, with the dates as the example writes them.
fn w04() -> (Vec<f64>, Vec<f64>) {
    let t = vec![
        89.6, 89.8, 90.1, 90.3, 90.6, 90.8, 91.1, 91.3, 91.6, 91.8, 92.1, 92.6, 93.1, 93.6, 94.1,
        94.6, 95.1, 95.6, 95.8, 96.1, 96.3, 96.6, 96.8,
    ];
    let ppm = vec![
        480.0, 450.0, 490.0, 520.0, 485.0, 510.0, 510.0, 530.0, 510.0, 560.0, 560.0, 540.0, 590.0,
        550.0, 600.0, 700.0, 570.0, 610.0, 650.0, 620.0, 830.0, 720.0, 590.0,
    ];
    (t, ppm)
}

/// Source: W04, UG pp. 17-33…34, re-run in R 4.2.2.
#[test]
fn w04_kendall_with_ties_and_theil_sen() {
    let (t, ppm) = w04();
    let test = mann_kendall(&t, &ppm).expect("23 values");
    assert_eq!((test.n, test.s, test.variance), (23, 194, 1428.0));
    assert_eq!(test.p_value, PValue::Normal);
    assert_relative_eq!(test.z, 5.107321597, max_relative = CLOSED);
    assert_relative_eq!(test.p, 3.267574e-7, max_relative = CLOSED);
    assert_relative_eq!(test.tau, 0.7667984, max_relative = CLOSED);
    let sen = theil_sen(&t, &ppm, 0.95).expect("dates differ");
    assert_eq!(sen.pairs, 253);
    assert_relative_eq!(sen.slope, 26.6666667, max_relative = CLOSED);
    assert_relative_eq!(sen.intercept, -1909.3333, max_relative = CLOSED);
    interval(sen.interval.expect("enough pairs"), 20.0, 35.71182, CLOSED);
    let at_90 = theil_sen(&t, &ppm, 0.90).expect("dates differ");
    interval(at_90.interval.expect("enough pairs"), 20.0, 34.33737, CLOSED);
}

/// Source: W04, the trap: with true decimal years.
#[test]
fn w04_with_true_decimal_years() {
    let (t, ppm) = w04();
    let years: Vec<f64> = t
        .iter()
        .map(|t| {
            let month = ((t - t.floor()) * 10.0).round();
            1900.0 + t.floor() + (month - 0.5) / 12.0
        })
        .collect();
    let sen = theil_sen(&years, &ppm, 0.95).expect("dates differ");
    assert_relative_eq!(sen.slope, 26.49350649, max_relative = CLOSED);
    interval(sen.interval.expect("enough pairs"), 19.43954840, 35.15659677, CLOSED);
    assert_eq!(mann_kendall(&years, &ppm).expect("23 values").s, 194);
}

/// Source: W05, UG pp. 17-36…38, re-run in R 4.2.2.
#[test]
fn w05_exact_kendall_and_theil_sen() {
    let t = [89.6, 90.1, 90.8, 91.1, 92.1, 93.1, 94.1, 95.6, 96.1, 96.3];
    let ppm = [56.0, 53.0, 51.0, 55.0, 52.0, 60.0, 62.0, 59.0, 61.0, 63.0];
    let test = mann_kendall(&t, &ppm).expect("ten values");
    assert_eq!((test.s, test.variance, test.p_value), (25, 125.0, PValue::Exact));
    assert_relative_eq!(test.z, 2.146625, max_relative = CLOSED);
    assert_relative_eq!(test.tau, 0.5555556, max_relative = CLOSED);
    assert_relative_eq!(test.p, 0.0286094577, max_relative = CLOSED);
    let sen = theil_sen(&t, &ppm, 0.95).expect("dates differ");
    assert_relative_eq!(sen.slope, 1.3333333, max_relative = CLOSED);
    assert_relative_eq!(sen.intercept, -65.9666667, max_relative = CLOSED);
    interval(sen.interval.expect("enough pairs"), 0.3992083, 2.3333333, CLOSED);
    let at_90 = theil_sen(&t, &ppm, 0.90).expect("dates differ");
    interval(at_90.interval.expect("enough pairs"), 0.5821123, 2.25, CLOSED);
    let least = line(&t, &ppm).expect("dates differ");
    assert_relative_eq!(least.slope, 1.387765025, max_relative = CLOSED);
    assert_relative_eq!(least.slope_error(), 0.3629469572, max_relative = CLOSED);
}

/// Source: W02: Theil–Sen on ln C and the exact p, R 4.2.2.
#[test]
fn w02_kendall_and_theil_sen() {
    let series = w02();
    let test = mann_kendall(&series.t, &series.y).expect("ten values");
    assert_eq!(test.s, -39);
    assert_relative_eq!(test.p, 0.0001151896, max_relative = CLOSED);
    let falling = falling_p(&series.t, &series.y).expect("ten values");
    assert_relative_eq!(falling, 0.5 * 0.0001151896, max_relative = CLOSED);
    let sen = theil_sen(&series.t, &series.y, 0.95).expect("dates differ");
    assert_relative_eq!(sen.slope, -0.05668740295, max_relative = CLOSED);
    assert_relative_eq!(sen.intercept, 4.197319207, max_relative = CLOSED);
    let ends = sen.interval.expect("enough pairs");
    interval(ends, -0.1019198513, -0.0390194228, CLOSED);
    let crossing = (5f64.ln() - sen.intercept) / sen.slope;
    assert_relative_eq!(crossing, 45.65178788, max_relative = CLOSED);
}

/// Source: EPA QA/G-9S (2006) p. 109, quoted second hand: S 22, Var 155.33, Z 1.685.
#[test]
fn epa_example_with_ties() {
    let y = [10.0, 10.0, 10.0, 5.0, 10.0, 20.0, 18.0, 17.0, 15.0, 24.0, 15.0];
    let test = mann_kendall(&steps(11), &y).expect("eleven values");
    assert_eq!((test.s, test.p_value), (22, PValue::Normal));
    assert_relative_eq!(test.variance, 466.0 / 3.0, max_relative = 1e-14);
    printed(test.z, 1.685, 3);
}

/// Source: W20, data as recalled from the USGS handbook and EPA QA/G-9 [from memory], computed.
#[test]
fn w20_hand_checks() {
    let t = [1.0, 2.0, 3.0, 4.0, 5.0, 6.0, 7.0];
    let y = [1.0, 2.0, 3.0, 4.0, 5.0, 16.0, 7.0];
    let test = mann_kendall(&t, &y).expect("seven values");
    assert_eq!(test.s, 19);
    assert_relative_eq!(test.tau, 0.9047619, max_relative = CLOSED);
    let sen = theil_sen(&t, &y, 0.90).expect("dates differ");
    assert_eq!((sen.slope, sen.intercept), (1.0, 0.0));
    assert_relative_eq!(
        line(&t, &y).expect("dates differ").slope,
        1.7142857,
        max_relative = CLOSED
    );
    let rising = [5.0, 6.0, 11.0, 8.0, 10.0];
    assert_eq!(mann_kendall(&steps(5), &rising).expect("five values").s, 6);
    let falling = rising.map(|y| -y);
    let p = falling_p(&steps(5), &falling).expect("five values");
    assert_relative_eq!(p, 0.1166667, max_relative = CLOSED);
    // This low or lower, of a rise: all but the tail beyond it.
    let p = falling_p(&steps(5), &rising).expect("five values");
    assert_relative_eq!(p, 1.0 - 5.0 / 120.0, max_relative = CLOSED);
}

/// Source: property 12 of the methods note: Knight equals all pairs, with ties in both.
#[test]
fn sorting_and_pairing_give_the_same_score() {
    let mut random = Random(14);
    for round in 0..300 {
        let n = random.whole(0, 400);
        let grid = if round % 3 == 0 { 1e9 } else { 30.0 };
        let mut draw = || (random.unit() * grid).round();
        let t: Vec<f64> = (0..n).map(|_| draw()).collect();
        let y: Vec<f64> = (0..n).map(|_| draw()).collect();
        assert_eq!(sorted_score(&t, &y), brute_score(&t, &y));
    }
    let (t, ppm) = w04();
    assert_eq!(sorted_score(&t, &ppm), 194);
}

/// Source: W14: S −96, 12 open pairs, Daniels variance 464.6666667; computed in R 4.2.2.
#[test]
fn w14_certain_pairs() {
    let series = w14();
    let test = certain_pairs(series.points()).expect("sixteen points");
    assert_eq!((test.s, test.undecided), (-96, 12));
    assert_relative_eq!(test.variance, 464.6666667, max_relative = CLOSED);
    assert_relative_eq!(test.z, -4.407099398, max_relative = CLOSED);
    // Printed to six digits.
    assert_relative_eq!(test.p, 1.04764e-5, max_relative = 5e-6);
}

/// Source: W21: S −8, and the variance over all 720 orders.
#[test]
fn w21_certain_pairs_and_the_variance_of_all_orders() {
    let series = Series::reported(&steps(6), "5 <4 3 <3.5 2 1");
    let test = certain_pairs(series.points()).expect("six points");
    assert_eq!(test.s, -8);
    assert_relative_eq!(test.variance, 15.33333333, max_relative = CLOSED);
}

/// Source: property 12 of the methods note: without bounds it is the tie formula.
#[test]
fn without_bounds_certain_pairs_are_all_pairs() {
    let mut random = Random(16);
    for _ in 0..100 {
        let n = random.whole(3, 40);
        let mut draw = |grid: usize| (0..n).map(|_| random.whole(0, grid) as f64).collect();
        let (t, y): (Vec<f64>, Vec<f64>) = (draw(60), draw(9));
        let plain = mann_kendall(&t, &y).expect("three values or more");
        let test = certain_pairs(Series::measured(&t, &y).points()).expect("three points");
        assert_eq!((test.s, test.undecided), (plain.s, 0));
        assert_relative_eq!(test.variance, plain.variance, max_relative = 1e-12, epsilon = 1e-12);
    }
}

/// Source: by hand, after the rule that a pair counts only where its order is sure.
#[test]
fn above_range_pairs_count_where_certain() {
    let cases = [
        ("5 >4 6", 1), // 5 to >4 open, 5 to 6 up, >4 to 6 open
        (">9 5 2", -3),
        ("<2 >2 3", 2), // <2 to >2 up, <2 to 3 up, >2 to 3 open
        (">3 >4 <3", -2),
    ];
    for (results, s) in cases {
        let series = Series::reported(&steps(3), results);
        assert_eq!(certain_pairs(series.points()).expect("three points").s, s, "{results}");
    }
    let marks = Series::reported(&steps(3), "5 >4 6").mark;
    assert_eq!(marks, [Mark::Measured, Mark::Above, Mark::Measured]);
}
