//! The least-squares line against certified values.

use approx::assert_relative_eq;
use ebbwell::numerics::line::{Line, line, mean};

use super::support::{CERTIFIED, number, reference, w02};

/// Source: NIST StRD "Norris", certified to 15 digits; `tests/reference/nist-norris.csv`.
#[test]
fn norris_to_eleven_digits() {
    let rows = reference("nist-norris.csv");
    let y: Vec<f64> = rows.iter().map(|row| number(&row[0])).collect();
    let x: Vec<f64> = rows.iter().map(|row| number(&row[1])).collect();
    let fit = line(&x, &y).expect("Norris has a line");
    assert_eq!(fit.n, 36);
    assert_relative_eq!(fit.intercept, -0.262323073774029, max_relative = CERTIFIED);
    assert_relative_eq!(fit.slope, 1.00211681802045, max_relative = CERTIFIED);
    assert_relative_eq!(fit.slope_error(), 0.429796848199937e-3, max_relative = CERTIFIED);
    assert_relative_eq!(fit.sd(), 0.884796396144373, max_relative = CERTIFIED);
    assert_relative_eq!(fit.r_squared(), 0.999993745883712, max_relative = CERTIFIED);
    assert_relative_eq!(fit.rss, 26.6173985294224, max_relative = CERTIFIED);
    let f = (fit.slope / fit.slope_error()).powi(2);
    assert_relative_eq!(f, 5436385.54079785, max_relative = CERTIFIED);
    let of_intercept = fit.sd() * (1.0 / 36.0 + fit.t_mean * fit.t_mean / fit.sxx).sqrt();
    assert_relative_eq!(of_intercept, 0.232818234301152, max_relative = CERTIFIED);
}

/// Source: W02, t̄ 15.3, ȳ 3.226159841, Sxx 794.1, RSS 1.048971073.
#[test]
fn w02_sums() {
    let series = w02();
    let Line { t_mean, y_mean, sxx, rss, .. } = line(&series.t, &series.y).expect("W02");
    assert_relative_eq!(t_mean, 15.3, max_relative = CERTIFIED);
    assert_relative_eq!(y_mean, 3.226159841, max_relative = 1e-9);
    assert_relative_eq!(sxx, 794.1, max_relative = CERTIFIED);
    assert_relative_eq!(rss, 1.048971073, max_relative = 1e-9);
}

/// Source: by hand: through (0, 0), (1, 0), (2, 2) least squares draws t − 1/3.
#[test]
fn a_line_by_hand() {
    let fit = line(&[0.0, 1.0, 2.0], &[0.0, 0.0, 2.0]).expect("three dates");
    assert_relative_eq!(fit.slope, 1.0, max_relative = 1e-15);
    assert_relative_eq!(fit.intercept, -1.0 / 3.0, max_relative = 1e-15);
    assert_relative_eq!(fit.fitted(5.0), 14.0 / 3.0, max_relative = 1e-15);
}

/// Source: the definition: nothing to draw a line through.
#[test]
fn no_line_without_two_dates() {
    assert_eq!(line(&[], &[]), None);
    assert_eq!(line(&[1.0], &[2.0]), None);
    assert_eq!(line(&[1.0, 1.0], &[2.0, 3.0]), None);
    assert_eq!(line(&[1.0, 2.0], &[2.0]), None);
    assert_eq!(line(&[1.0, 2.0], &[1e300, -1e300]), None);
}

/// Source: by hand; a plain sum of these loses the ones.
#[test]
fn the_mean_is_corrected_for_its_own_rounding() {
    let values: Vec<f64> = (0..1000).map(|i| 1e15 + f64::from(i % 2)).collect();
    assert_eq!(mean(&values), 1e15 + 0.5);
}
