//! Promises that need no reference numbers: the properties of the methods note, section 8.

use approx::relative_eq;
use ebbwell::numerics::{Crossing, FirstOrder, Interval, mann_kendall, theil_sen};
use proptest::prelude::*;

use super::support::{Random, Series};

/// What rounding may change (relative to the size of what is compared).
const ROUNDING: f64 = 1e-8;

fn same(x: f64, y: f64) -> bool {
    relative_eq!(x, y, max_relative = ROUNDING, epsilon = 1e-9)
}

fn same_interval(x: Interval, y: Interval) -> bool {
    same(x.low, y.low) && same(x.high, y.high)
}

/// The crossing with every time put through a rising straight function.
fn mapped(crossing: Crossing, f: impl Fn(f64) -> f64) -> Crossing {
    match crossing {
        Crossing::Located { estimate, low, high } => {
            Crossing::Located { estimate: f(estimate), low: f(low), high: f(high) }
        }
        Crossing::TwoRays { before, after } => {
            Crossing::TwoRays { before: f(before), after: f(after) }
        }
        Crossing::WholeLine => Crossing::WholeLine,
    }
}

/// Times agree beside the distance from `middle`: far ends carry fewer digits.
fn same_crossing(x: Crossing, y: Crossing, middle: f64) -> bool {
    let near = |x: f64, y: f64| (x - y).abs() <= 1e-7 * (1.0 + (x - middle).abs());
    match (x, y) {
        (
            Crossing::Located { estimate, low, high },
            Crossing::Located { estimate: estimate2, low: low2, high: high2 },
        ) => near(estimate, estimate2) && near(low, low2) && near(high, high2),
        (
            Crossing::TwoRays { before, after },
            Crossing::TwoRays { before: before2, after: after2 },
        ) => near(before, before2) && near(after, after2),
        (x, y) => x == y,
    }
}

/// A series with a line whose crossing is not on the brink of having no end: there a rounding may
/// tip it.
fn sound(seed: u64, share: f64) -> Option<(Series, FirstOrder, f64)> {
    let series = Random(seed).series(share);
    let fit = series.fit().ok()?;
    let y0 = fit.fitted(series.t[series.t.len() - 1] + 2.0);
    let brink = fit.slope_p > 0.09 && fit.slope_p < 0.11;
    (!brink).then_some((series, fit, y0))
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(300))]

    /// Source: property 1: every concentration, limit and level times one factor.
    #[test]
    fn a_factor_on_all_concentrations_leaves_rate_and_dates(
        seed: u64, share in 0.0..0.6f64, shift in -50.0..50.0f64
    ) {
        if let Some((mut series, fit, y0)) = sound(seed, share) {
            let middle = 0.5 * (series.t[0] + series.t[series.t.len() - 1]);
            let test = mann_kendall(&series.t, &series.y);
            series.y.iter_mut().for_each(|y| *y += shift);
            let moved = series.fitted();
            prop_assert!(same(moved.slope, fit.slope));
            prop_assert!(same(moved.intercept, fit.intercept + shift));
            prop_assert!(same(moved.sd, fit.sd));
            prop_assert!(same(moved.slope_p, fit.slope_p));
            prop_assert!(same_interval(moved.slope_interval(0.9), fit.slope_interval(0.9)));
            let before = fit.level_interval(middle, 0.9);
            let before = Interval { low: before.low + shift, high: before.high + shift };
            prop_assert!(same_interval(moved.level_interval(middle, 0.9), before));
            let crossing = moved.crossing(y0 + shift, 0.9);
            prop_assert!(same_crossing(crossing, fit.crossing(y0, 0.9), middle));
            let after = mann_kendall(&series.t, &series.y);
            prop_assert_eq!(after.map(|t| t.s), test.map(|t| t.s));
        }
    }

    /// Source: property 2: all dates moved.
    #[test]
    fn moving_all_dates_moves_the_crossing_and_leaves_the_rate(
        seed: u64, share in 0.0..0.6f64, shift in -100.0..100.0f64
    ) {
        if let Some((mut series, fit, y0)) = sound(seed, share) {
            let middle = 0.5 * (series.t[0] + series.t[series.t.len() - 1]) + shift;
            series.t.iter_mut().for_each(|t| *t += shift);
            let moved = series.fitted();
            prop_assert!(same(moved.slope, fit.slope));
            prop_assert!(same_interval(moved.slope_interval(0.9), fit.slope_interval(0.9)));
            let expected = mapped(fit.crossing(y0, 0.9), |t| t + shift);
            prop_assert!(same_crossing(moved.crossing(y0, 0.9), expected, middle));
        }
    }

    /// Source: property 3: days or years.
    #[test]
    fn in_days_the_rate_is_a_365th_and_the_crossing_the_same_day(
        seed: u64, share in 0.0..0.6f64
    ) {
        const DAYS: f64 = 365.25;
        if let Some((mut series, fit, y0)) = sound(seed, share) {
            let middle = 0.5 * (series.t[0] + series.t[series.t.len() - 1]) * DAYS;
            series.t.iter_mut().for_each(|t| *t *= DAYS);
            let moved = series.fitted();
            prop_assert!(same(moved.slope * DAYS, fit.slope));
            prop_assert!(same(moved.r_squared, fit.r_squared));
            let expected = mapped(fit.crossing(y0, 0.9), |t| t * DAYS);
            prop_assert!(same_crossing(moved.crossing(y0, 0.9), expected, middle));
        }
    }

    /// Source: property 4: the order of the points does not matter, whatever they are.
    #[test]
    fn the_order_of_points_does_not_matter(seed: u64, share in 0.0..0.6f64) {
        if let Some((series, fit, y0)) = sound(seed, share) {
            let middle = 0.5 * (series.t[0] + series.t[series.t.len() - 1]);
            let mut order: Vec<usize> = (0..series.t.len()).collect();
            let mut random = Random(!seed);
            for last in (1..order.len()).rev() {
                order.swap(last, random.whole(0, last));
            }
            let mixed = Series {
                t: order.iter().map(|&i| series.t[i]).collect(),
                y: order.iter().map(|&i| series.y[i]).collect(),
                mark: order.iter().map(|&i| series.mark[i]).collect(),
            };
            let again = mixed.fitted();
            prop_assert!(same(again.slope, fit.slope));
            prop_assert!(same_interval(again.slope_interval(0.9), fit.slope_interval(0.9)));
            prop_assert!(same_crossing(again.crossing(y0, 0.9), fit.crossing(y0, 0.9), middle));
            let (first, second) =
                (theil_sen(&series.t, &series.y, 0.9), theil_sen(&mixed.t, &mixed.y, 0.9));
            prop_assert_eq!(first.map(|s| s.slope), second.map(|s| s.slope));
            prop_assert_eq!(first.map(|s| s.interval), second.map(|s| s.interval));
            let (first, second) =
                (mann_kendall(&series.t, &series.y), mann_kendall(&mixed.t, &mixed.y));
            prop_assert_eq!(first, second);
        }
    }

    /// Source: property 20 of the methods note: no number is missing, and shares are shares.
    #[test]
    fn a_fit_tells_plain_numbers(seed: u64, share in 0.0..0.7f64) {
        if let Some((_, fit, _)) = sound(seed, share) {
            let numbers = [
                fit.slope, fit.intercept, fit.sd, fit.ml_scale, fit.r_squared, fit.slope_p,
                fit.log_likelihood, fit.m,
            ];
            prop_assert!(numbers.iter().all(|number| number.is_finite()), "{fit:?}");
            prop_assert!((0.0..=1.0).contains(&fit.r_squared));
            prop_assert!((0.0..=1.0).contains(&fit.slope_p));
            prop_assert_eq!(fit.detects + fit.non_detects, fit.n);
            prop_assert!(fit.m >= 3.0 && fit.m <= fit.n as f64);
        }
    }

    /// Source: the interface: times may be tied; nothing breaks.
    #[test]
    fn tied_times_break_nothing(seed: u64, share in 0.0..0.6f64) {
        let mut series = Random(seed).series(share);
        series.t.iter_mut().for_each(|t| *t = t.round());
        if let Ok(fit) = series.fit() {
            let ends = fit.slope_interval(0.9);
            prop_assert!(ends.low < fit.slope && fit.slope < ends.high);
            let _ = fit.crossing(fit.fitted(40.0), 0.9);
            prop_assert!(mann_kendall(&series.t, &series.y).is_some());
            prop_assert!(theil_sen(&series.t, &series.y, 0.9).is_some());
        }
    }
}
