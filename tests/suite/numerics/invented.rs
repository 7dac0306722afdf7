//! Fifteen invented series against values computed with 40 digits by other ways.

use std::collections::BTreeMap;

use approx::assert_relative_eq;
use ebbwell::numerics::{
    Crossing, Mark, PValue, deletion_diagnostics, durbin_watson, farthest, lag_one, mann_kendall,
    theil_sen,
};

use super::support::{Series, day, number, reference};

/// Ours against the 40-digit values (relative). Source: what 15 digits leave after the sums.
const AGREED: f64 = 1e-10;

struct Invented {
    series: Series,
    limit: f64,
    expected: BTreeMap<String, f64>,
}

fn invented() -> BTreeMap<String, Invented> {
    let mut all: BTreeMap<String, Invented> = BTreeMap::new();
    let mut first = BTreeMap::new();
    for row in reference("invented-series.csv") {
        let [name, date, mark, value, limit] = &row[..] else { panic!("five columns: {row:?}") };
        let start = *first.entry(name.clone()).or_insert(day(date));
        let one = all.entry(name.clone()).or_insert_with(|| Invented {
            series: Series { t: vec![], y: vec![], mark: vec![] },
            limit: number(limit),
            expected: BTreeMap::new(),
        });
        one.series.t.push((day(date) - start) / 365.25);
        one.series.y.push(number(value).ln());
        one.series.mark.push(match mark.as_str() {
            "<" => Mark::Below,
            ">" => Mark::Above,
            _ => Mark::Measured,
        });
    }
    for row in reference("series-expected.csv") {
        let one = all.get_mut(&row[0]).expect("expected values are of known series");
        one.expected.insert(row[1].clone(), number(&row[2]));
    }
    all
}

/// Asserts every quantity found against the expected one of that name.
fn agree(name: &str, one: &Invented, found: &[(&str, f64)]) {
    for (what, found) in found {
        let expected = one.expected.get(*what);
        let expected = *expected.unwrap_or_else(|| panic!("{name} has an expected {what}"));
        println!("{name} {what}: found {found}, expected {expected}");
        assert_relative_eq!(*found, expected, max_relative = AGREED, epsilon = 1e-13);
    }
}

/// Source: `tests/reference/series-expected.csv`, computed by `series.py` with 40 digits.
#[test]
fn fits_and_intervals_agree_with_forty_digit_values() {
    let all = invented();
    assert_eq!(all.len(), 15);
    for (name, one) in &all {
        let fit = one.series.fitted();
        let last = one.series.t[one.series.t.len() - 1];
        let (slope, level) = (fit.slope_interval(0.90), fit.level_interval(last, 0.90));
        let found = [
            ("intercept", fit.intercept),
            ("slope", fit.slope),
            ("ml_scale", fit.ml_scale),
            ("log_likelihood", fit.log_likelihood),
            ("m", fit.m),
            ("slope_p", fit.slope_p),
            ("r_squared", fit.r_squared),
            ("slope_low", slope.low),
            ("slope_high", slope.high),
            ("level_low", level.low),
            ("level_high", level.high),
        ];
        agree(name, one, &found);
        let y0 = one.limit.ln();
        match fit.crossing(y0, 0.90) {
            Crossing::Located { low, high, .. } => {
                agree(name, one, &[("crossing_low", low), ("crossing_high", high)]);
            }
            Crossing::TwoRays { .. } => {
                let until = fit.earliest_crossing_after(last, y0, 0.90);
                let until = until.expect("the limit is excluded at the last date");
                agree(name, one, &[("excluded_until", until)]);
            }
            Crossing::WholeLine => panic!("{name} excludes some dates"),
        }
    }
}

/// Source: as above; the figures agree with statsmodels, scipy and R `lm` to 13 digits.
#[test]
fn diagnostics_of_measured_series_agree_with_forty_digit_values() {
    let mut seen = 0;
    for (name, one) in &invented() {
        let Some(line) = one.series.fitted().line().copied() else {
            continue;
        };
        seen += 1;
        let (t, y) = (&one.series.t, &one.series.y);
        let points = deletion_diagnostics(t, y).expect("the series is not on a line");
        let residuals: Vec<f64> = points.iter().map(|point| point.residual).collect();
        let cook = points.iter().filter_map(|point| point.cook).fold(0.0, f64::max);
        let far = farthest(&points).expect("some point is farthest");
        let found = [
            ("rss", line.rss),
            ("sd", line.sd()),
            ("ols_r_squared", line.r_squared()),
            ("durbin_watson", durbin_watson(&residuals).expect("residuals are not zero")),
            ("lag_one", lag_one(&residuals).expect("residuals are not zero")),
            ("cook", cook),
            ("studentized", far.studentized),
            ("bonferroni_p", far.bonferroni_p),
        ];
        agree(name, one, &found);
    }
    assert_eq!(seen, 9);
}

/// Source: as above; exact p agree with scipy's and R's exact Kendall to 12 digits.
#[test]
fn trend_tests_of_measured_series_agree_with_forty_digit_values() {
    for (name, one) in &invented() {
        if !one.series.points().all_measured() {
            continue;
        }
        let (t, y) = (&one.series.t, &one.series.y);
        let test = mann_kendall(t, y).expect("two values or more");
        let untied = name != "S07_ties" && test.n <= 40 && test.p_value == PValue::Exact;
        let sen = theil_sen(t, y, 0.90).expect("two dates or more");
        let found = [
            ("kendall_s", test.s as f64),
            ("kendall_variance", test.variance),
            ("kendall_p", test.p),
            ("sen_slope", sen.slope),
            ("sen_intercept", sen.intercept),
        ];
        assert!(untied || test.p_value == PValue::Normal, "{name}: {:?}", test.p_value);
        agree(name, one, &found);
    }
}
