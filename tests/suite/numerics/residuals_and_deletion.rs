//! Residuals: autocorrelation, and what each point does to the line. Many p-values at once.

use std::collections::BTreeMap;

use approx::assert_relative_eq;
use ebbwell::numerics::line::line;
use ebbwell::numerics::{
    benjamini_hochberg, deletion_diagnostics, durbin_watson, farthest, lag_one,
};

use super::support::{CLOSED, Random, number, printed, reference, w02};

/// Source: NIST StRD, certified to 15 digits; `tests/reference/nist-univariate.csv`.
#[test]
fn lag_one_agrees_with_the_certified_sets() {
    let mut sets: BTreeMap<String, (f64, Vec<f64>)> = BTreeMap::new();
    for row in reference("nist-univariate.csv") {
        let set = sets.entry(row[0].clone()).or_insert((f64::NAN, vec![]));
        match row[1].as_str() {
            "r1" => set.0 = number(&row[2]),
            _ => set.1.push(number(&row[2])),
        }
    }
    assert_eq!(sets.len(), 8);
    for (name, (certified, values)) in &sets {
        let found = lag_one(values).expect("the values differ");
        // The last two sets hold differences in the eighth and ninth digit of what f64 can carry.
        let tolerance = if name == "NumAcc3" || name == "NumAcc4" { 1e-11 } else { 1e-13 };
        println!("{name} {found} {certified} {:e}", found / certified - 1.0);
        assert_relative_eq!(found, *certified, max_relative = tolerance);
    }
}

/// Source: by hand.
#[test]
fn nothing_is_told_of_equal_or_single_values() {
    assert_eq!(lag_one(&[1.0]), None);
    assert_eq!(lag_one(&[2.0, 2.0, 2.0]), None);
    assert_eq!(lag_one(&[1.0, -1.0, 1.0, -1.0]), Some(-0.75));
    assert_eq!(durbin_watson(&[]), None);
    assert_eq!(durbin_watson(&[0.0, 0.0]), None);
    assert_eq!(durbin_watson(&[1.0, -1.0, 1.0, -1.0]), Some(3.0));
}

/// Source: W02, table of diagnostics, R 4.2.2 `lm.influence`, `rstandard`, `rstudent`,
/// `cooks.distance`; seven digits after the point. (The fourth studentized residual is 0.30154799;
/// the note cuts it off to …479, and r1 0.07103443 to …343.)
#[test]
fn w02_table_of_diagnostics() {
    let table = [
        [-0.1944612, 0.3227553, -0.6525645, -0.6273433, 0.1014716],
        [-0.2516488, 0.2607984, -0.8083077, -0.7890080, 0.1152565],
        [0.0618958, 0.1671074, 0.1872967, 0.1755854, 0.0035191],
        [0.1085965, 0.1232842, 0.3202947, 0.3015480, 0.0072130],
        [-0.0928110, 0.1066616, -0.2711782, -0.2548380, 0.0043901],
        [0.2322601, 0.1006171, 0.6763407, 0.6515610, 0.0255875],
        [0.4562972, 0.1278177, 1.3492965, 1.4360955, 0.1334039],
        [0.1980972, 0.1746631, 0.6021796, 0.5765047, 0.0383700],
        [0.2348087, 0.2441758, 0.7458768, 0.7233069, 0.0898641],
        [-0.7530346, 0.3721194, -2.6244578, -6.5840493, 2.0410536],
    ];
    let series = w02();
    let points = deletion_diagnostics(&series.t, &series.y).expect("W02 is not on a line");
    assert_eq!(points.len(), table.len());
    for (point, row) in points.iter().zip(table) {
        printed(point.residual, row[0], 7);
        printed(point.leverage, row[1], 7);
        printed(point.standardized.expect("no leverage is 1"), row[2], 7);
        printed(point.studentized.expect("ten points"), row[3], 7);
        printed(point.cook.expect("no leverage is 1"), row[4], 7);
    }
    let far = farthest(&points).expect("ten points");
    assert_eq!(far.index, 9);
    assert_relative_eq!(far.bonferroni_p, 0.003088571, max_relative = CLOSED);
    let residuals: Vec<f64> = points.iter().map(|point| point.residual).collect();
    let ratio = durbin_watson(&residuals).expect("residuals are not zero");
    assert_relative_eq!(ratio, 1.281293508, max_relative = CLOSED);
    printed(lag_one(&residuals).expect("residuals are not zero"), 0.0710344, 7);
}

/// Source: W03, UG Example 17-5, chloride: DW 1.600235906 (R 4.2.2 `lmtest`).
#[test]
fn w03_durbin_watson() {
    let days = [
        76.0, 133.0, 233.0, 407.0, 513.0, 594.0, 688.0, 779.0, 846.0, 940.0, 1043.0, 1150.0,
        1260.0, 1330.0, 1385.0, 1499.0, 1577.0, 1682.0, 1759.0,
    ];
    let ppm = [
        11.5, 12.6, 13.8, 12.3, 12.8, 13.2, 14.1, 13.3, 13.1, 13.2, 15.3, 15.0, 15.2, 15.8, 16.1,
        15.1, 16.4, 17.7, 17.7,
    ];
    let fit = line(&days, &ppm).expect("dates differ");
    assert_relative_eq!(fit.slope, 0.003095752637, max_relative = CLOSED);
    assert_relative_eq!(fit.slope_error(), 0.000334533039, max_relative = CLOSED);
    let residuals: Vec<f64> = days.iter().zip(ppm).map(|(t, y)| y - fit.fitted(*t)).collect();
    let ratio = durbin_watson(&residuals).expect("residuals are not zero");
    assert_relative_eq!(ratio, 1.600235906, max_relative = CLOSED);
}

/// Source: property 15 of the methods note: a refit without the point.
#[test]
fn deletion_agrees_with_a_refit_without_the_point() {
    let mut random = Random(15);
    for _ in 0..100 {
        let series = random.series(0.0);
        let (t, y) = (&series.t, &series.y);
        let through = line(t, y).expect("dates differ");
        let points = deletion_diagnostics(t, y).expect("not on a line");
        for (k, point) in points.iter().enumerate() {
            let without = |values: &[f64]| {
                let kept = values.iter().enumerate().filter(|(i, _)| *i != k);
                kept.map(|(_, v)| *v).collect::<Vec<f64>>()
            };
            let rest = line(&without(t), &without(y)).expect("dates differ");
            let moved: f64 = t.iter().map(|&t| (through.fitted(t) - rest.fitted(t)).powi(2)).sum();
            let cook = moved / (2.0 * through.sd() * through.sd());
            assert_relative_eq!(
                point.cook.expect("free"),
                cook,
                max_relative = 1e-6,
                epsilon = 1e-12
            );
            let off = t[k] - rest.t_mean;
            let spread = 1.0 + 1.0 / rest.n as f64 + off * off / rest.sxx;
            let studentized = (y[k] - rest.fitted(t[k])) / (rest.sd() * spread.sqrt());
            let found = point.studentized.expect("free");
            assert_relative_eq!(found, studentized, max_relative = 1e-6, epsilon = 1e-9);
        }
    }
}

/// Source: by hand: the other points on a line, a point that alone decides the slope, too few.
#[test]
fn degenerate_series_are_told_apart() {
    let t = [0.0, 1.0, 2.0, 3.0, 4.0];
    let points = deletion_diagnostics(&t, &[5.0, 5.0, 5.0, 9.0, 5.0]).expect("one point is off");
    let far = farthest(&points).expect("five points");
    assert_eq!((far.index, far.studentized, far.bonferroni_p), (3, f64::INFINITY, 0.0));
    let lone = deletion_diagnostics(&[0.0, 0.0, 0.0, 1.0], &[1.0, 2.0, 3.0, 9.0]);
    let lone = lone.expect("three values differ");
    assert_eq!((lone[3].standardized, lone[3].studentized, lone[3].cook), (None, None, None));
    assert!(lone[0].studentized.is_some());
    let three = deletion_diagnostics(&t[..3], &[1.0, 5.0, 2.0]).expect("not on a line");
    assert!(three.iter().all(|point| point.studentized.is_none()));
    assert_eq!(farthest(&three), None);
    assert_eq!(deletion_diagnostics(&t, &[5.0; 5]), None);
}

/// Source: the fifteen p-values of Benjamini & Hochberg (1995), section 3.2 [from memory]: at 0.05
/// their procedure finds the first four. By hand: 0.0095 · 15/4 = 0.035625.
#[test]
fn benjamini_and_hochberg_find_four_of_fifteen() {
    let p = [
        0.0001, 0.0004, 0.0019, 0.0095, 0.0201, 0.0278, 0.0298, 0.0344, 0.0459, 0.3240, 0.4262,
        0.5719, 0.6528, 0.7590, 1.0000,
    ];
    let adjusted = benjamini_hochberg(&p);
    assert_eq!(adjusted.iter().filter(|&&q| q <= 0.05).count(), 4);
    assert_relative_eq!(adjusted[3], 0.035625, max_relative = 1e-12);
    // 0.0201·15/5 = 0.0603 is less than what any later one gives.
    assert_relative_eq!(adjusted[4], 0.0603, max_relative = 1e-12);
    assert_eq!(adjusted[14], 1.0);
}

/// Source: the definition, by looking at every later p-value.
#[test]
fn adjusted_p_values_agree_with_the_definition_in_any_order() {
    let mut random = Random(99);
    for _ in 0..100 {
        let n = random.whole(0, 30);
        let p: Vec<f64> = (0..n).map(|_| (random.unit() * 20.0).round() / 20.0).collect();
        let adjusted = benjamini_hochberg(&p);
        let mut sorted = p.clone();
        sorted.sort_by(f64::total_cmp);
        for (p, found) in p.iter().zip(&adjusted) {
            let from = sorted.iter().position(|x| x == p).expect("it is among them");
            let later = (from..n).map(|j| sorted[j] * n as f64 / (j + 1) as f64);
            let least = later.fold(1.0, f64::min);
            assert_relative_eq!(*found, least, max_relative = 1e-14);
        }
    }
}
