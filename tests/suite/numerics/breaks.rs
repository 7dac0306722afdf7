//! The search for a break: against a fine grid, with and without bounds, and at length.

use std::time::Instant;

use approx::assert_relative_eq;
use ebbwell::numerics::alternatives::in_time_order;
use ebbwell::numerics::break_squares::{at_break, best};
use ebbwell::numerics::broken::stretches;
use ebbwell::numerics::columns::columns;
use ebbwell::numerics::{Dropped, Mark, Misfit, Point, break_bounds, compare};
use proptest::prelude::*;

use super::support::{Random, Series};

fn rss(misfit: Misfit) -> f64 {
    match misfit {
        Misfit::Squares(rss) => rss,
        Misfit::LogLikelihood(_) => panic!("all was measured: {misfit:?}"),
    }
}

/// What the log-likelihood of least squares is.
fn likely(rss: f64, n: usize) -> f64 {
    let n = n as f64;
    -0.5 * n * ((std::f64::consts::TAU * rss / n).ln() + 1.0)
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(200))]

    /// Source: 2,000 breaks over the record, each fitted by normal equations: none is better.
    #[test]
    fn no_break_of_a_fine_grid_is_better(seed: u64, ties: bool) {
        let mut series = Random(seed).series(0.0);
        if ties {
            series.t.iter_mut().for_each(|t| *t = (*t * 2.0).round() / 2.0);
        }
        let Ok(fit) = series.fit() else { return Ok(()) };
        let sorted = in_time_order(series.points());
        let broken = match best(&sorted, &fit) {
            Ok(broken) => broken,
            Err(dropped) => {
                prop_assert_eq!(dropped, Dropped::NoRoom);
                return Ok(());
            }
        };
        let (first, last) = (sorted[0].t, sorted[sorted.len() - 1].t);
        for i in 0..=2000 {
            let at = first + (last - first) * f64::from(i) / 2000.0;
            let before = sorted.iter().filter(|point| point.t < at).count();
            let after = sorted.iter().filter(|point| point.t > at).count();
            // The break found leaves as much on each side as is asked of these.
            if before >= 4 && after >= 4 && at >= first + 1.0 && at <= last - 1.0 {
                let inside = stretches(&sorted).any(|(_, low, high)| low <= at && at <= high);
                if let (true, Some(other)) = (inside, at_break(&sorted, &fit, at)) {
                    prop_assert!(rss(broken.misfit) <= rss(other.misfit) * (1.0 + 1e-9));
                }
            }
        }
        let before = sorted.iter().filter(|point| point.t < broken.break_at).count();
        let after = sorted.iter().filter(|point| point.t > broken.break_at).count();
        prop_assert!(before >= 4 && after >= 4, "{before} before and {after} after");
        prop_assert!(broken.break_at >= first + 1.0 - 1e-9);
        prop_assert!(broken.break_at <= last - 1.0 + 1e-9);
    }

    /// Source: without bounds the greatest likelihood is least squares. A bound far over everything
    /// turns the one search into the other and changes nothing else.
    #[test]
    fn with_bounds_the_search_finds_the_break_of_least_squares(seed: u64) {
        let mut random = Random(seed);
        let n = random.whole(16, 40);
        let t: Vec<f64> = (0..n).map(|i| i as f64 / 4.0).collect();
        let at = random.between(0.35, 0.65) * t[n - 1];
        let (before, after) = (random.between(-0.3, 0.3), random.between(-2.5, -1.5));
        let mean = |t: f64| 3.0 + before * (t - at).min(0.0) + after * (t - at).max(0.0);
        let y: Vec<f64> = t.iter().map(|&t| mean(t) + 0.2 * random.normal()).collect();
        let series = Series::measured(&t, &y);
        let fit = series.fitted();
        let squares = best(&in_time_order(series.points()), &fit).expect("room");
        let mut bounded = series;
        bounded.t.push(t[n / 2]);
        bounded.y.push(1e3);
        bounded.mark.push(Mark::Below);
        let fit = bounded.fitted();
        let found = break_bounds::best(&in_time_order(bounded.points()), &fit).expect("room");
        let Misfit::LogLikelihood(value) = found.misfit else { panic!("{found:?}") };
        prop_assert!((value - likely(rss(squares.misfit), n)).abs() < 1e-8, "{found:?} {squares:?}");
        prop_assert!((found.break_at - squares.break_at).abs() < 1e-5, "{found:?} {squares:?}");
    }
}

/// Source: the likelihood itself at 300 breaks over the record, a third of it non-detects: none is
/// higher.
#[test]
fn with_bounds_no_break_of_a_fine_grid_is_better() {
    let mut random = Random(300);
    let mut tried = 0;
    for _ in 0..150 {
        let series = random.series(0.35);
        let Ok(fit) = series.fit() else { continue };
        let sorted = in_time_order(series.points());
        if series.points().all_measured() {
            continue;
        }
        let Ok(found) = break_bounds::best(&sorted, &fit) else { continue };
        let Misfit::LogLikelihood(best) = found.misfit else { panic!("{found:?}") };
        tried += 1;
        let y: Vec<f64> = sorted.iter().map(|point| point.y).collect();
        let mark: Vec<Mark> = sorted.iter().map(|point| point.mark).collect();
        let measured: Vec<f64> = sorted
            .iter()
            .filter(|point| point.mark == Mark::Measured)
            .map(|point| point.t)
            .collect();
        let (first, last) = (sorted[0].t, sorted[sorted.len() - 1].t);
        for i in 0..=300 {
            let at = first + (last - first) * f64::from(i) / 300.0;
            let room = stretches(&sorted).any(|(_, low, high)| low <= at && at <= high);
            if !room || at < measured[1] || at > measured[measured.len() - 2] {
                continue;
            }
            let row = |point: &Point| {
                let off = point.t - at;
                [1.0, off.min(0.0), off.max(0.0)]
            };
            let x: Vec<[f64; 3]> = sorted.iter().map(row).collect();
            let guess = [fit.fitted(at), fit.slope, fit.slope];
            if let Some(other) = columns(&x, &y, &mark, guess, fit.ml_scale) {
                assert!(other.log_likelihood <= best + 1e-8, "{at} is better than {found:?}");
            }
        }
    }
    assert!(tried > 80, "{tried}");
}

/// Source: least squares on 20,000 dates: the search that looks at every twentieth point first
/// arrives at the same break.
#[test]
fn a_long_record_with_one_bound_has_the_break_of_least_squares() {
    let n = 20_000;
    let mut random = Random(6);
    let t: Vec<f64> = (0..n).map(|i| i as f64 / 1000.0).collect();
    for (before, after) in [(-0.1, -0.5), (-0.6, -0.05)].repeat(4) {
        let mean = |t: f64| 6.0 + before * (t - 8.0).min(0.0) + after * (t - 8.0).max(0.0);
        let y: Vec<f64> = t.iter().map(|&t| mean(t) + 0.8 * random.normal()).collect();
        let mut series = Series::measured(&t, &y);
        let fit = series.fitted();
        let squares = best(&in_time_order(series.points()), &fit).expect("room");
        series.t.push(10.0);
        series.y.push(1e3);
        series.mark.push(Mark::Below);
        let fit = series.fitted();
        let found = break_bounds::best(&in_time_order(series.points()), &fit).expect("room");
        let Misfit::LogLikelihood(value) = found.misfit else { panic!("{found:?}") };
        assert!((value - likely(rss(squares.misfit), n)).abs() < 1e-3, "{found:?} {squares:?}");
        assert!((found.break_at - squares.break_at).abs() < 1e-3, "{found:?} {squares:?}");
    }
}

/// Source: issue 5: long series in a moment; the time grows in proportion.
#[test]
fn a_hundred_thousand_dates_are_compared_in_a_moment() {
    let n = 100_000;
    let mut random = Random(8);
    let t: Vec<f64> = (0..n).map(|i| i as f64 * 20.0 / n as f64).collect();
    let mean = |t: f64| (5.0 + 500.0 * (-0.6 * t).exp()).ln();
    let values: Vec<f64> = t.iter().map(|&t| mean(t) + 0.4 * random.normal()).collect();
    let limit = 5.5f64.ln();
    for bounds in [false, true] {
        let below = |y: f64| bounds && y < limit;
        let series = Series {
            t: t.clone(),
            y: values.iter().map(|&y| if below(y) { limit } else { y }).collect(),
            mark: values
                .iter()
                .map(|&y| if below(y) { Mark::Below } else { Mark::Measured })
                .collect(),
        };
        let fit = series.fitted();
        let start = Instant::now();
        let found = compare(series.points(), &fit);
        let took = start.elapsed();
        // Measured: 0.1 and 0.5 seconds. Twenty times that lets a busy machine pass, and no search
        // that looks at every pair.
        assert!(took.as_secs_f64() < if bounds { 10.0 } else { 2.0 }, "{took:?}");
        let plateau = found.plateau.expect("a plateau");
        assert_relative_eq!(plateau.ln_plateau, 5f64.ln(), epsilon = 0.02);
        assert_relative_eq!(plateau.rate, 0.6, epsilon = 0.02);
        assert!(found.two_rates.expect("two rates").after > -0.2);
    }
}
