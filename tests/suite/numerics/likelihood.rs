//! The censored likelihood: its values, its derivatives and the climb to its maximum.

use approx::assert_relative_eq;
use ebbwell::numerics::likelihood::Likelihood;
use ebbwell::numerics::peak::climb;
use ebbwell::numerics::scaling::Olsen;
use ebbwell::numerics::{Kind, Mark, Parameters};
use proptest::prelude::*;

use super::support::{CERTIFIED, Random, Series, number, reference, w14};

/// Source: `tests/reference/tobin.csv`: R 4.2.2 `survreg`, on the raw scale, non-detects at 0.
#[test]
fn tobin_by_age_agrees_with_survreg() {
    let mut series = Series { t: vec![], y: vec![], mark: vec![] };
    for row in reference("tobin.csv") {
        series.t.push(number(&row[0]));
        series.y.push(number(&row[1]));
        let below = number(&row[1]) == 0.0;
        series.mark.push(if below { Mark::Below } else { Mark::Measured });
    }
    let fit = series.fitted();
    assert_eq!((fit.kind, fit.n, fit.non_detects), (Kind::CensoredLikelihood, 20, 13));
    assert_relative_eq!(fit.intercept, 5.49690323950726, max_relative = 1e-9);
    assert_relative_eq!(fit.slope, -0.162985436251344, max_relative = 1e-9);
    assert_relative_eq!(fit.ml_scale, 5.89280042030793, max_relative = 1e-9);
    assert_relative_eq!(fit.log_likelihood, -29.2309771597581, max_relative = CERTIFIED);
    let line = fit.censored().expect("tobin is fitted by likelihood");
    let fall = 2.0 * (29.4921995481776 - 29.2309771597581);
    assert_relative_eq!(line.flat_fall(), fall, max_relative = 1e-9);
    let wald = line.covariance();
    assert_relative_eq!(wald.intercept.sqrt(), 10.7918996161057, max_relative = 1e-8);
    assert_relative_eq!(wald.slope.sqrt(), 0.231189885765823, max_relative = 1e-8);
    let of_ln_scale = wald.scale.sqrt() / fit.ml_scale;
    assert_relative_eq!(of_ln_scale, 0.308050877872346, max_relative = 1e-8);
}

/// Source: W14: from (3.5, −0.7, 0.5) six full steps reach the maximum.
#[test]
fn w14_newton_arrives_in_six_steps_from_the_printed_start() {
    let series = w14();
    let likelihood = Likelihood::new(series.points()).expect("dates differ");
    let start = Parameters { intercept: 3.5, slope: -0.7, scale: 0.5 };
    let peak = climb(&likelihood, likelihood.scaling().olsen(start)).expect("the climb ends");
    assert!(peak.steps <= 6, "{} steps", peak.steps);
    let found = likelihood.scaling().line(peak.at);
    assert_relative_eq!(found.slope, -0.8017700711, max_relative = 1e-9);
    assert_relative_eq!(found.scale, 0.2321973886, max_relative = 1e-9);
}

/// Some points of all three kinds, and a place to look at their likelihood.
fn place(random: &mut Random) -> (Series, Olsen) {
    let mut series = random.series(0.4);
    for (index, mark) in series.mark.iter_mut().enumerate() {
        if index % 5 == 4 {
            *mark = Mark::Above;
        }
    }
    let at = Olsen {
        a: random.between(0.2, 3.0),
        b: random.between(-2.0, 2.0),
        c: random.between(-2.0, 2.0),
    };
    (series, at)
}

/// Source: differences of the values, at a step that leaves about eight digits.
#[test]
fn derivatives_are_those_of_the_values() {
    let mut random = Random(3);
    for _ in 0..50 {
        let (series, at) = place(&mut random);
        let likelihood = Likelihood::new(series.points()).expect("dates differ");
        let step = 1e-5;
        let moved = |k: usize, by: f64| {
            let mut next = [at.a, at.b, at.c];
            next[k] += by;
            likelihood.pass(Olsen { a: next[0], b: next[1], c: next[2] })
        };
        let here = likelihood.pass(at);
        for k in 0..3 {
            let (up, down) = (moved(k, step), moved(k, -step));
            let size = here.bend[k][k];
            let gradient = (up.value - down.value) / (2.0 * step);
            assert_relative_eq!(here.gradient[k], gradient, epsilon = 1e-6 * (1.0 + size));
            for l in 0..3 {
                let bend = -(up.gradient[l] - down.gradient[l]) / (2.0 * step);
                let size = (here.bend[k][k] * here.bend[l][l]).sqrt();
                assert_relative_eq!(here.bend[k][l], bend, epsilon = 1e-6 * (1.0 + size));
            }
        }
    }
}

/// Source: the definition, term by term, with the tails of `normal`.
#[test]
fn values_are_the_sum_of_the_terms() {
    let mut random = Random(4);
    for _ in 0..50 {
        let (series, _) = place(&mut random);
        let likelihood = Likelihood::new(series.points()).expect("dates differ");
        let line = Parameters {
            intercept: random.between(-3.0, 8.0),
            slope: random.between(-1.0, 1.0),
            scale: random.between(0.3, 3.0),
        };
        let mut sum = 0.0;
        for point in series.points().iter() {
            let z = (point.y - line.intercept - line.slope * point.t) / line.scale;
            sum += match point.mark {
                Mark::Measured => -0.5 * z * z - (line.scale * std::f64::consts::TAU.sqrt()).ln(),
                Mark::Below => ebbwell::numerics::normal::lower_tail(z).ln,
                Mark::Above => ebbwell::numerics::normal::lower_tail(-z).ln,
            };
        }
        assert_relative_eq!(likelihood.log_likelihood(line), sum, max_relative = 1e-9);
    }
    let series = w14();
    let likelihood = Likelihood::new(series.points()).expect("dates differ");
    let flat = Parameters { intercept: 1.0, slope: 0.0, scale: 0.0 };
    assert_eq!(likelihood.log_likelihood(flat), f64::NEG_INFINITY);
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(300))]

    /// Source: property 7 of the methods note.
    #[test]
    fn a_non_detect_with_a_huge_limit_changes_nothing(seed: u64, share in 0.1..0.6f64, place: f64) {
        let mut random = Random(seed);
        let series = random.series(share);
        if let Ok(before) = series.fit() && before.kind == Kind::CensoredLikelihood {
            let mut with = series;
            with.t.push(place.rem_euclid(30.0));
            with.y.push(600.0);
            with.mark.push(Mark::Below);
            if !with.t[with.t.len() - 1].is_finite() {
                return Ok(());
            }
            let after = with.fitted();
            prop_assert_eq!(after.uninformative, before.uninformative + 1);
            prop_assert_eq!(after.m, before.m);
            prop_assert!((after.slope - before.slope).abs() <= 1e-9 * (1.0 + before.slope.abs()));
            prop_assert!((after.ml_scale / before.ml_scale - 1.0).abs() <= 1e-9);
            prop_assert!((after.log_likelihood - before.log_likelihood).abs() <= 1e-8);
        }
    }

    /// Source: property 7 of the methods note: at fixed parameters.
    #[test]
    fn raising_a_limit_never_lowers_the_likelihood(seed: u64, by in 0.0..5.0f64, which: usize) {
        let mut random = Random(seed);
        let mut series = random.series(0.5);
        let limits: Vec<usize> =
            (0..series.y.len()).filter(|&i| series.mark[i] == Mark::Below).collect();
        if !limits.is_empty() {
            let line = Parameters {
                intercept: random.between(-3.0, 8.0),
                slope: random.between(-1.0, 1.0),
                scale: random.between(0.1, 3.0),
            };
            let value = |series: &Series| {
                let likelihood = Likelihood::about(series.points(), line);
                likelihood.log_likelihood(line)
            };
            let before = value(&series);
            series.y[limits[which % limits.len()]] += by;
            prop_assert!(value(&series) >= before - 1e-9 * (1.0 + before.abs()));
        }
    }
}
