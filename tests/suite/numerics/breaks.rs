//! The search for a break: against a fine grid, with and without bounds, and at length.

use std::time::Instant;

use approx::assert_relative_eq;
use ebbwell::numerics::alternatives::in_time_order;
use ebbwell::numerics::break_squares::{at_break, best};
use ebbwell::numerics::broken::stretches;
use ebbwell::numerics::{Dropped, Mark, Misfit, break_bounds, compare};
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
        prop_assert!((value - likely(rss(squares.misfit), n)).abs() < 1e-5, "{found:?} {squares:?}");
        prop_assert!((found.break_at - squares.break_at).abs() < 1e-3, "{found:?} {squares:?}");
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
        // Three times what was measured on a slow core, so that a busy one does not fail it.
        assert!(took.as_secs_f64() < if bounds { 3.0 } else { 0.5 }, "{took:?}");
        let plateau = found.plateau.expect("a plateau");
        assert_relative_eq!(plateau.ln_plateau, 5f64.ln(), epsilon = 0.02);
        assert_relative_eq!(plateau.rate, 0.6, epsilon = 0.02);
        assert!(found.two_rates.expect("two rates").after > -0.2);
    }
}
