//! Continuous autoregression of residuals, and the quadratic term.

use approx::assert_relative_eq;
use ebbwell::numerics::columns::columns;
use ebbwell::numerics::{Car1, Curvature, Kind, Mark, car1, curvature};

use super::doubts_support::{expected, invented, w03};
use super::support::{CLOSED, Random, Series, interval, printed, steps, w02, w14};

/// A maximum found by a search, in the parameter searched (relative). Source: methods note,
/// section 2.
const SEARCHED: f64 = 1e-4;

fn faded(t: &[f64], y: &[f64]) -> Car1 {
    car1(t, y).expect("four dates or more, not on a line")
}

fn bent(series: &Series) -> Curvature {
    curvature(series.points(), &series.fitted()).expect("four dates or more, not on a bent line")
}

/// Source: W03: R 4.2.2 `nlme::gls` with `corCAR1`, ML, times in years.
#[test]
fn w03_car1() {
    let (days, ppm) = w03();
    let years: Vec<f64> = days.iter().map(|day| day / 365.25).collect();
    let test = faded(&years, &ppm);
    printed(test.log_likelihood_independent, -20.44192004, 8);
    printed(test.log_likelihood, -19.52867970, 8);
    assert_relative_eq!(test.phi, 0.007279166, max_relative = SEARCHED);
    assert_relative_eq!(test.slope, 1.13975555, max_relative = SEARCHED);
    assert_relative_eq!(test.slope_error, 0.1564582461, max_relative = SEARCHED);
    printed(test.independent.slope, 1.130723651, 9);
    printed(test.lr, 1.826, 3);
    printed(test.p, 0.088, 3);
    // In days the same fade is its 365.25th root.
    let by_day = faded(&days, &ppm);
    assert_relative_eq!(by_day.phi.powf(365.25), test.phi, max_relative = SEARCHED);
    assert_relative_eq!(by_day.log_likelihood, test.log_likelihood, max_relative = 1e-10);
    assert_relative_eq!(by_day.inflation, test.inflation, max_relative = SEARCHED);
}

/// Source: `tests/reference/invented-diagnostics.csv`: the whole matrix of correlations, 40 digits.
#[test]
fn car1_of_invented_series_agrees_with_forty_digits() {
    let mut seen = [0, 0];
    for (name, series) in &invented() {
        if !series.points().all_measured() {
            continue;
        }
        let test = faded(&series.t, &series.y);
        let Some(phi) = expected(name, "car1_phi") else {
            assert_eq!((test.phi, test.p), (0.0, 1.0), "{name}");
            seen[0] += 1;
            continue;
        };
        let figure = |quantity| expected(name, quantity).expect("a figure beside φ");
        // The likelihood is flat at its maximum: half of its digits are left to φ.
        assert_relative_eq!(test.phi, phi, max_relative = 1e-5);
        let likelihood = figure("car1_log_likelihood");
        assert_relative_eq!(test.log_likelihood, likelihood, max_relative = 1e-11);
        assert_relative_eq!(test.slope, figure("car1_slope"), max_relative = 1e-6);
        assert_relative_eq!(test.slope_error, figure("car1_slope_error"), max_relative = 1e-6);
        assert_relative_eq!(test.inflation, figure("car1_inflation"), max_relative = 1e-6);
        seen[1] += 1;
    }
    assert_eq!(seen, [2, 7]);
}

/// The log-likelihood of a line with correlations φ^|tᵢ − tⱼ|, from the whole matrix; the slope,
/// its standard error, and the inflation from the definition.
fn whole_matrix(t: &[f64], y: &[f64], phi: f64) -> [f64; 4] {
    let n = t.len();
    let mut root = vec![vec![0.0f64; n]; n];
    for i in 0..n {
        for j in 0..=i {
            let own = phi.powf((t[i] - t[j]).abs());
            let rest = own - (0..j).map(|k| root[i][k] * root[j][k]).sum::<f64>();
            root[i][j] = if i == j { rest.sqrt() } else { rest / root[j][j] };
        }
    }
    let white = |column: &dyn Fn(usize) -> f64| {
        let mut out = vec![0.0; n];
        for i in 0..n {
            let rest = column(i) - (0..i).map(|k| root[i][k] * out[k]).sum::<f64>();
            out[i] = rest / root[i][i];
        }
        out
    };
    let centre = t.iter().sum::<f64>() / n as f64;
    let columns = [white(&|_| 1.0), white(&|i| t[i] - centre), white(&|i| y[i])];
    let product = |i: usize, j: usize| -> f64 {
        columns[i].iter().zip(&columns[j]).map(|(x, y)| x * y).sum()
    };
    let determinant = product(0, 0) * product(1, 1) - product(0, 1) * product(0, 1);
    let slope = (product(0, 0) * product(1, 2) - product(0, 1) * product(0, 2)) / determinant;
    let level = (product(1, 1) * product(0, 2) - product(0, 1) * product(1, 2)) / determinant;
    let rss = product(2, 2) - level * product(0, 2) - slope * product(1, 2);
    let size = n as f64;
    let ln_root: f64 = (0..n).map(|i| root[i][i].ln()).sum();
    let value = -0.5 * size * ((std::f64::consts::TAU * rss / size).ln() + 1.0) - ln_root;
    let error = (rss / (size - 2.0) * product(0, 0) / determinant).sqrt();
    let (mut double, mut sxx) = (0.0, 0.0);
    for i in 0..n {
        sxx += (t[i] - centre) * (t[i] - centre);
        for j in 0..n {
            double += (t[i] - centre) * (t[j] - centre) * phi.powf((t[i] - t[j]).abs());
        }
    }
    [value, slope, error, double / sxx]
}

/// Source: the definition, with the whole matrix of correlations; no φ on a grid does better.
#[test]
fn car1_agrees_with_the_whole_matrix() {
    let mut random = Random(54);
    let mut found = 0;
    for round in 0..60 {
        let series = random.series(0.0);
        let (t, mut y) = (&series.t, series.y.clone());
        if round % 2 == 0 {
            // Residuals that are carried over.
            let mut carried = 0.0;
            for value in &mut y {
                carried = 0.7 * carried + random.normal();
                *value += carried;
            }
        }
        let test = faded(t, &y);
        let at = |phi: f64| whole_matrix(t, &y, phi)[0];
        assert_relative_eq!(at(0.0), test.log_likelihood_independent, max_relative = 1e-9);
        if test.lr > 0.0 {
            found += 1;
            let [value, slope, error, inflation] = whole_matrix(t, &y, test.phi);
            assert_relative_eq!(value, test.log_likelihood, max_relative = 1e-8, epsilon = 1e-8);
            assert_relative_eq!(slope, test.slope, max_relative = 1e-6, epsilon = 1e-8);
            assert_relative_eq!(error, test.slope_error, max_relative = 1e-6);
            assert_relative_eq!(inflation.max(1.0), test.inflation, max_relative = 1e-6);
        }
        for k in 1..200 {
            let phi = (f64::from(k) / 200.0).powi(6);
            assert!(at(phi) <= test.log_likelihood + 1e-7, "{phi} beats {}", test.phi);
        }
    }
    assert!(found > 30, "{found} series resemble themselves");
}

/// Source: methods note 5.4: evenly spaced, the inflation tends to (1 + r)/(1 − r); a long series
/// made with r = 0.6 a step.
#[test]
fn evenly_spaced_inflation_tends_to_the_known_limit() {
    let mut random = Random(55);
    let n = 4_000;
    let mut carried = random.normal();
    let y: Vec<f64> = (0..n)
        .map(|_| {
            carried = 0.6 * carried + 0.8 * random.normal();
            carried
        })
        .collect();
    let test = faded(&steps(n), &y);
    assert!((test.phi - 0.6).abs() < 0.05, "φ {}", test.phi);
    let limit = (1.0 + test.phi) / (1.0 - test.phi);
    assert_relative_eq!(test.inflation, limit, max_relative = 0.01);
    assert_relative_eq!(test.effective(), 4_000.0 / test.inflation, max_relative = 1e-14);
    // Interval: slope ± t·SE·√inflation; 1,000 degrees and more, t at 0.95 is 1.9623 … 1.96.
    let ends = test.adjusted_interval(0.95);
    let error = test.independent.slope_error() * test.inflation.sqrt();
    let half = 0.5 * (ends.high - ends.low);
    assert!(half / error > 1.9599 && half / error < 1.9632, "{}", half / error);
    assert!(test.p < 1e-12);
}

/// Source: by hand: residuals that swing have no resemblance; the interval is then the plain one.
#[test]
fn swinging_residuals_leave_the_interval_alone() {
    let t = steps(16);
    let y: Vec<f64> =
        t.iter().map(|t| 3.0 - 0.1 * t + if t % 2.0 == 0.0 { 0.2 } else { -0.2 }).collect();
    let test = faded(&t, &y);
    assert_eq!((test.phi, test.lr, test.p, test.inflation), (0.0, 0.0, 1.0, 1.0));
    assert_eq!(test.effective(), 16.0);
    let plain = test.independent.slope_interval(0.9);
    interval(test.adjusted_interval(0.9), plain.low, plain.high, 1e-14);
    // Few effective values: never under one degree of freedom (t at 0.90 is 6.313751515).
    let thin = Car1 { inflation: 8.0, ..test };
    let ends = thin.adjusted(0.0, 1.0, 0.9);
    assert_relative_eq!(ends.high, 6.313751515 * 8f64.sqrt(), max_relative = 1e-9);
    assert_relative_eq!(ends.low, -ends.high, max_relative = 1e-14);
}

/// Source: the null: half of the time there is nothing, and 5 % are called resembling. 2,000
/// series of 40 uneven dates: three standard errors are 0.0147.
#[test]
fn independent_residuals_are_called_so() {
    let mut random = Random(56);
    let low = (0..2_000)
        .filter(|_| {
            let mut time = 0.0;
            let mut next = || {
                time += random.between(0.05, 0.5);
                (time, random.normal())
            };
            let (t, y): (Vec<f64>, Vec<f64>) = (0..40).map(|_| next()).unzip();
            faded(&t, &y).p < 0.05
        })
        .count();
    let share = f64::from(low as u32) / 2_000.0;
    assert!((0.015..0.0647).contains(&share), "{share} under 0.05");
}

/// Source: the interface: refusals, and values and spacings far from one.
#[test]
fn odd_series_have_no_resemblance_or_plain_numbers() {
    let t = steps(6);
    assert_eq!(car1(&t[..3], &[1.0, 2.0, 1.0]), None);
    assert_eq!(car1(&t, &[5.0; 6]), None);
    assert_eq!(car1(&[0.0, 1.0, 1.0, 2.0, 3.0], &[1.0, 2.0, 4.0, 3.0, 1.0]), None);
    assert_eq!(car1(&t, &[1.0; 5]), None);
    let y = [1.0, 3.0, 2.5, 2.0, 4.0, 1.5];
    for scale in [1e-9, 1.0, 1e9] {
        let stretched: Vec<f64> = t.iter().map(|t| t * scale).collect();
        let huge: Vec<f64> = y.iter().map(|y| y * 1e100).collect();
        for test in [faded(&stretched, &y), faded(&stretched, &huge)] {
            let numbers = [test.phi, test.log_likelihood, test.slope, test.slope_error, test.p];
            assert!(numbers.iter().all(|number| number.is_finite()), "{test:?}");
            assert!((0.0..1.0).contains(&test.phi) || scale < 1.0);
            assert!(test.inflation >= 1.0 && test.inflation <= 6.0);
        }
    }
    // Order does not matter.
    let (back, y_back): (Vec<f64>, Vec<f64>) =
        (t.iter().rev().copied().collect(), y.iter().rev().copied().collect());
    assert_relative_eq!(
        faded(&back, &y_back).log_likelihood,
        faded(&t, &y).log_likelihood,
        max_relative = 1e-12
    );
    let close = [0.0, 1.0, 1.0 + 1e-12, 2.0, 3.0, 4.0];
    assert!(faded(&close, &y).log_likelihood.is_finite());
}

/// Source: W02: R 4.2.2 `lm` with the square of the centred month.
#[test]
fn w02_bends_downwards() {
    let test = bent(&w02());
    assert_relative_eq!(test.coefficient, -0.003446267, max_relative = CLOSED);
    assert_relative_eq!(test.error.expect("least squares"), 0.001115346, max_relative = CLOSED);
    printed(test.t, -3.08986, 5);
    printed(test.p, 0.0175704, 7);
    assert_eq!(test.degrees, 7.0);
    // RSS 1.048971073 and 0.44374707.
    assert_relative_eq!(test.lr, 10.0 * (1.048971073f64 / 0.44374707).ln(), max_relative = CLOSED);
}

/// Source: W17: a plateau; R 4.2.2: the quadratic's t is 17.927.
#[test]
fn w17_bends_upwards() {
    let t = [
        0.0, 0.25, 0.5, 0.75, 1.0, 1.25, 1.5, 1.75, 2.0, 2.5, 3.0, 3.5, 4.0, 4.5, 5.0, 5.5, 6.0,
        6.5, 7.0, 8.0,
    ];
    let c = "940 700 610 430 350 300 210 200 150 105 72 61 49 52 40 45 38 44 37 41";
    printed(bent(&Series::reported(&t, c)).t, 17.927, 3);
}

/// Source: `tests/reference/invented-diagnostics.csv`: 40 digits, and R 4.2.2 `lm` to 11.
#[test]
fn bends_of_invented_series_agree_with_r() {
    let mut seen = 0;
    for (name, series) in &invented() {
        let Some(coefficient) = expected(name, "bend") else { continue };
        let figure = |quantity| expected(name, quantity).expect("a figure beside the bend");
        let test = bent(series);
        assert_relative_eq!(test.coefficient, coefficient, max_relative = 1e-9);
        let error = test.error.expect("least squares");
        assert_relative_eq!(error, figure("bend_error"), max_relative = 1e-10);
        assert_relative_eq!(test.t, figure("bend_t"), max_relative = 1e-9);
        assert_relative_eq!(test.p, figure("bend_p"), max_relative = 1e-9);
        seen += 1;
    }
    assert_eq!(seen, 9);
}

fn square_columns(t: &[f64]) -> Vec<[f64; 3]> {
    t.iter().map(|&t| [1.0, t, t * t]).collect()
}

/// Source: least squares: without bounds the likelihood's bend is that of `lm`, its scale
/// √(RSS/n); with two columns it is the line of the censored fit.
#[test]
fn columns_are_least_squares_without_bounds_and_the_line_with_two() {
    let mut random = Random(57);
    for round in 0..100 {
        let mut series = random.series(0.0);
        let start = series.t[0];
        series.t.iter_mut().for_each(|t| *t -= start);
        let (fit, test) = (series.fitted(), bent(&series));
        let guess = [fit.intercept, fit.slope, 0.0];
        let found = columns(&square_columns(&series.t), &series.y, &series.mark, guess, fit.sd);
        let found = found.expect("not on a bent line");
        assert_relative_eq!(
            found.factors[2],
            test.coefficient,
            max_relative = 1e-6,
            epsilon = 1e-9
        );
        assert_relative_eq!(
            found.log_likelihood,
            test.log_likelihood,
            max_relative = 1e-9,
            epsilon = 1e-9
        );
        let mut censored = random.series(0.4);
        if round % 2 == 0 {
            censored.mark[0] = Mark::Above;
        }
        let Ok(line) = censored.fit() else { continue };
        let x: Vec<[f64; 2]> = censored.t.iter().map(|&t| [1.0, t]).collect();
        let found = columns(&x, &censored.y, &censored.mark, [0.0, 0.0], 1.0);
        let found = found.expect("a line has a likelihood");
        assert_relative_eq!(found.factors[1], line.slope, max_relative = 1e-6, epsilon = 1e-9);
        assert_relative_eq!(found.scale, line.ml_scale, max_relative = 1e-6);
        assert_relative_eq!(
            found.log_likelihood,
            line.log_likelihood,
            max_relative = 1e-9,
            epsilon = 1e-9
        );
    }
}

/// Source: the stationarity of a maximum, by differences, and the ruled cut-off.
#[test]
fn a_censored_bend_is_a_maximum_and_its_p_meets_the_cut_off() {
    let series = w14();
    let (fit, test) = (series.fitted(), bent(&series));
    assert_eq!((fit.kind, test.error, test.degrees), (Kind::CensoredLikelihood, None, 12.0));
    // m·ln(1 + t²/(m − 2)) at m = 14 and 95 %: 4.666563213 (methods note W14).
    assert_relative_eq!(
        test.lr,
        2.0 * (test.log_likelihood - fit.log_likelihood),
        max_relative = 1e-9
    );
    assert_eq!(test.p < 0.05, test.lr > 4.666563213);
    let student = ((12.0f64) * (4.666563213f64 / 14.0).exp_m1()).sqrt();
    assert_relative_eq!(student, 2.178812830, max_relative = 1e-8);
    assert_eq!(test.t.abs() > student, test.lr > 4.666563213);
    let x = square_columns(&series.t);
    let found = columns(&x, &series.y, &series.mark, [3.9, -0.8, 0.0], 0.23).expect("a maximum");
    assert_relative_eq!(found.factors[2], test.coefficient, max_relative = 1e-6);
    let value = |factors: [f64; 3], scale: f64| -> f64 {
        let one = |i: usize| {
            let mean = x[i].iter().zip(factors).map(|(x, f)| x * f).sum::<f64>();
            let z = (series.y[i] - mean) / scale;
            match series.mark[i] {
                Mark::Below => ebbwell::numerics::normal::lower(z).ln(),
                _ => -0.5 * z * z - scale.ln() - 0.918938533204673,
            }
        };
        (0..x.len()).map(one).sum()
    };
    let top = value(found.factors, found.scale);
    assert_relative_eq!(top, found.log_likelihood, max_relative = 1e-10);
    for k in 0..4 {
        for step in [-1e-3, 1e-3] {
            let (mut factors, mut scale) = (found.factors, found.scale);
            if k == 3 {
                scale += step;
            } else {
                factors[k] += step;
            }
            assert!(value(factors, scale) < top, "factor {k} by {step}");
        }
    }
}

/// Source: the interface: too few times, exact fits, a fit of other points.
#[test]
fn what_cannot_bend_has_no_bend() {
    let few = Series::reported(&[0.0, 1.0, 2.0, 2.0], "9 5 4 3");
    assert_eq!(curvature(few.points(), &few.fitted()), None);
    let few = Series::reported(&steps(6), "9 <5 4 <5 3 <5");
    assert_eq!(curvature(few.points(), &few.fitted()), None);
    assert_eq!(curvature(w02().points(), &few.fitted()), None);
    let x = [[1.0], [1.0], [1.0]];
    let (y, mark) = ([1.0, 2.0, 4.0], [Mark::Measured; 3]);
    assert_eq!(columns(&x, &y, &mark[..2], [0.0], 1.0), None);
    assert_eq!(columns(&x, &y[..2], &mark, [0.0], 1.0), None);
    let mean = columns(&x, &y, &mark, [0.0], 1.0).expect("three values");
    assert_relative_eq!(mean.factors[0], 7.0 / 3.0, max_relative = 1e-9);
    let bowl: Vec<f64> = steps(9).iter().map(|t| (t - 4.0) * (t - 4.0)).collect();
    let exact = Series::measured(&steps(9), &bowl);
    assert_eq!(curvature(exact.points(), &exact.fitted()), None);
    let mut bounded = exact;
    bounded.mark[8] = Mark::Below;
    bounded.y[8] += 1.0;
    let none = curvature(bounded.points(), &bounded.fitted());
    assert_eq!(none, None);
}
