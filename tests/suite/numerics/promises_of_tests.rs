//! Promises of the trend tests and of deletion on random data: properties 5, 12, 14 and 15 of the
//! methods note, 1,000 cases each.

use approx::relative_eq;
use ebbwell::numerics::exact_kendall::{NullScores, brute_score, untied_at_least};
use ebbwell::numerics::kendall::sorted_score;
use ebbwell::numerics::line::line;
use ebbwell::numerics::slope_selection::PairSlopes;
use ebbwell::numerics::{
    CensoredLine, Crossing, Mark, akritas_theil_sen, certain_pairs, deletion_diagnostics,
    falling_p, mann_kendall, median, theil_sen,
};
use proptest::prelude::*;

use super::support::{Random, Series, steps};

/// Whole numbers, so that there are ties.
fn ties(random: &mut Random, n: usize, most: usize) -> Vec<f64> {
    (0..n).map(|_| random.whole(0, most) as f64).collect()
}

/// A straight or bent rising function of values up to a few hundred.
fn risen(kind: u64, y: f64) -> f64 {
    match kind % 3 {
        0 => 3.0 * y - 7.0,
        1 => (y / 40.0).exp(),
        _ => y * y * y + y,
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(1000))]

    /// Source: property 5: without non-detects the profile's ends are those of t and of Fieller.
    #[test]
    fn profiles_of_measured_values_end_where_closed_forms_do(
        seed: u64, confidence in 0.80..0.99f64, ahead in -1.0..2.0f64
    ) {
        let series = Random(seed).series(0.0);
        let (fit, profile) = (series.fitted(), CensoredLine::fit(series.points()));
        let profile = profile.expect("measured values have a line");
        let (first, last) = (series.t[0], series.t[series.t.len() - 1]);
        let near = |x: f64, y: f64, centre: f64| (x - y).abs() <= 1e-8 * (y - centre).abs();
        let (found, closed) = (profile.slope_interval(confidence), fit.slope_interval(confidence));
        prop_assert!(near(found.low, closed.low, fit.slope));
        prop_assert!(near(found.high, closed.high, fit.slope));
        let y0 = fit.fitted(last + ahead * (last - first));
        let middle = 0.5 * (first + last);
        match (profile.crossing(y0, confidence), fit.crossing(y0, confidence)) {
            (
                Crossing::Located { low, high, .. },
                Crossing::Located { low: early, high: late, .. },
            ) => prop_assert!(near(low, early, middle) && near(high, late, middle)),
            (
                Crossing::TwoRays { before, after },
                Crossing::TwoRays { before: early, after: late },
            ) => prop_assert!(near(before, early, middle) && near(after, late, middle)),
            (found, closed) => prop_assert_eq!(found, closed),
        }
    }

    /// Source: property 12: a rising transform of the values changes nothing, bounds or not.
    #[test]
    fn rising_transforms_leave_the_trend_tests_alone(seed: u64, kind: u64, n in 3usize..50) {
        let mut random = Random(seed);
        let (t, y) = (ties(&mut random, n, 60), ties(&mut random, n, 90));
        let other: Vec<f64> = y.iter().map(|y| risen(kind, *y)).collect();
        prop_assert_eq!(mann_kendall(&t, &y), mann_kendall(&t, &other));
        prop_assert_eq!(falling_p(&t, &y), falling_p(&t, &other));
        let mark: Vec<Mark> = (0..n)
            .map(|_| [Mark::Measured, Mark::Below, Mark::Above][random.whole(0, 2)])
            .collect();
        let one = Series { t: t.clone(), y, mark: mark.clone() };
        let other = Series { t, y: other, mark };
        prop_assert_eq!(certain_pairs(one.points()), certain_pairs(other.points()));
    }

    /// Source: property 12: Knight's S is that of all pairs, with ties in values and times.
    #[test]
    fn sorting_finds_the_score_of_all_pairs(seed: u64, n in 0usize..300, most in 1usize..500) {
        let mut random = Random(seed);
        let (t, y) = (ties(&mut random, n, most), ties(&mut random, n, 501 - most));
        prop_assert_eq!(sorted_score(&t, &y), brute_score(&t, &y));
    }

    /// Source: property 12: without bounds the certain pairs and Daniels' variance are Kendall's S
    /// and the variance corrected for ties.
    #[test]
    fn without_bounds_daniels_variance_is_the_one_for_ties(seed: u64, n in 3usize..120) {
        let mut random = Random(seed);
        let (t, y) = (ties(&mut random, n, 60), ties(&mut random, n, 9));
        let test = certain_pairs(Series::measured(&t, &y).points()).expect("three points");
        let plain = mann_kendall(&t, &y).expect("three points");
        prop_assert_eq!((test.s, test.undecided), (plain.s, 0));
        prop_assert!(relative_eq!(
            test.variance, plain.variance, max_relative = 1e-12, epsilon = 1e-12
        ));
    }

    /// Source: property 12: the exact distribution is symmetric, and its two tails make one.
    #[test]
    fn exact_tails_are_symmetric_and_make_one(seed: u64, n in 2usize..=9, s in -36i64..=36) {
        // Ties in the values; with ties in both the distribution need not be symmetric.
        let null = NullScores::tied(&steps(n), &ties(&mut Random(seed), n, 5)).expect("few values");
        let (low, high) = (null.at_most(s), 1.0 - null.at_most(s - 1));
        let same = |x: f64, y: f64| relative_eq!(x, y, max_relative = 1e-9, epsilon = 1e-12);
        // P(S ≤ s) = P(S ≥ −s), and P(S ≤ s) + P(S ≥ s) counts P(S = s) twice.
        prop_assert!(same(low, 1.0 - null.at_most(-s - 1)), "{low}");
        prop_assert!(low + high >= 1.0 - 1e-12, "{low} {high}");
        prop_assert!(same(null.at_most(36), 1.0) && same(null.at_most(-37), 0.0));
        let untied = untied_at_least(n, s).expect("few values");
        prop_assert!(same(untied, 1.0 - untied_at_least(n, 1 - s).expect("few values")));
    }

    /// Source: property 14: the median slope and Gilbert's ranks from counted slopes are those of
    /// all pairs.
    #[test]
    fn counted_slopes_have_the_median_of_all_pairs(seed: u64, n in 2usize..60) {
        let mut random = Random(seed);
        let (t, y) = (ties(&mut random, n, 90), ties(&mut random, n, 1_000));
        let mut slopes = Vec::new();
        for j in 0..n {
            for i in 0..j {
                if t[i] != t[j] {
                    slopes.push((y[j] - y[i]) / (t[j] - t[i]));
                }
            }
        }
        let sen = theil_sen(&t, &y, 0.9);
        let mut counted = PairSlopes::by_counting(&t, &y);
        prop_assert_eq!(counted.count(), slopes.len() as u64);
        prop_assert_eq!(sen.map(|sen| sen.slope), median(&slopes));
        slopes.sort_by(f64::total_cmp);
        for (rank, slope) in slopes.iter().enumerate().step_by(7) {
            let found = counted.ranked(rank as u64 + 1).expect("a rank").at;
            prop_assert!(relative_eq!(found, *slope, max_relative = 1e-9, epsilon = 1e-9));
        }
        let series = Series::measured(&t, &y);
        let found = akritas_theil_sen(series.points(), 0.9).map(|found| found.slope);
        match (found, median(&slopes)) {
            (Some(one), Some(other)) => {
                prop_assert!(relative_eq!(one, other, max_relative = 1e-12, epsilon = 1e-12));
            }
            (one, other) => prop_assert_eq!(one, other),
        }
    }

    /// Source: property 15: Cook's distance is how far all fitted values move without the point, and
    /// the studentized residual the one to the line without it.
    #[test]
    fn influence_is_what_a_refit_shows(seed: u64) {
        let series = Random(seed).series(0.0);
        let (t, y) = (&series.t, &series.y);
        let through = line(t, y).expect("dates differ");
        let points = deletion_diagnostics(t, y).expect("not on a line");
        for (k, point) in points.iter().enumerate() {
            let without = |values: &[f64]| {
                let kept = values.iter().enumerate().filter(|(i, _)| *i != k);
                kept.map(|(_, v)| *v).collect::<Vec<f64>>()
            };
            let rest = line(&without(t), &without(y)).expect("dates differ");
            let moved: f64 =
                t.iter().map(|&t| (through.fitted(t) - rest.fitted(t)).powi(2)).sum();
            let cook = moved / (2.0 * through.sd() * through.sd());
            let found = point.cook.expect("five dates or more");
            prop_assert!(relative_eq!(found, cook, max_relative = 1e-6, epsilon = 1e-12));
            let off = t[k] - rest.t_mean;
            let spread = 1.0 + 1.0 / rest.n as f64 + off * off / rest.sxx;
            let studentized = (y[k] - rest.fitted(t[k])) / (rest.sd() * spread.sqrt());
            let found = point.studentized.expect("five dates or more");
            prop_assert!(relative_eq!(found, studentized, max_relative = 1e-6, epsilon = 1e-9));
        }
    }
}
