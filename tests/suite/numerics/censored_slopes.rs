//! The slope with non-detects and its interval; certain pairs by sorting.

use approx::{assert_relative_eq, relative_eq};
use ebbwell::numerics::certain_counts::{certain_counts, daniels_variance};
use ebbwell::numerics::certain_pairs::brute_certain_pairs;
use ebbwell::numerics::critical_slopes::{CriticalSlopes, Ends};
use ebbwell::numerics::slope_counting::Timed;
use ebbwell::numerics::{
    AkritasTheilSen, Mark, Points, akritas_theil_sen, certain_pairs, theil_sen,
};
use proptest::prelude::*;

use super::support::{Random, Series, printed, steps, w14};

fn slope(series: &Series) -> AkritasTheilSen {
    akritas_theil_sen(series.points(), 0.9).expect("some pair could rise and some could fall")
}

/// A series with bounds of both kinds and ties in times and values.
fn mixed(random: &mut Random, n: usize) -> Series {
    let (times, values) = (random.whole(1, 60), random.whole(1, 60));
    let (below, above) = (random.unit() * 0.8, random.unit() * 0.2);
    let mut series = Series { t: vec![], y: vec![], mark: vec![] };
    for _ in 0..n {
        series.t.push(random.whole(0, times) as f64);
        series.y.push(random.whole(0, values) as f64 - 10.0);
        let kind = random.unit();
        series.mark.push(if kind < below {
            Mark::Below
        } else if kind < below + above {
            Mark::Above
        } else {
            Mark::Measured
        });
    }
    series
}

/// S of the residuals over a slope, over all pairs.
fn score_over(series: &Series, b: f64) -> i64 {
    let left: Vec<f64> = series.t.iter().zip(&series.y).map(|(t, y)| y - b * t).collect();
    let points = Points::new(&series.t, &left, &series.mark).expect("finite");
    brute_certain_pairs(points).expect("three points").s
}

/// Source: W14: S(b) = 0 for b in (−0.7901277180, −0.7887003385), k 0.7894140; R 4.2.2.
#[test]
fn w14_slope() {
    let series = w14();
    let found = slope(&series);
    printed(found.zero.low, -0.7901277180, 10);
    printed(found.zero.high, -0.7887003385, 10);
    printed(found.slope, -0.7894140, 7);
    assert_relative_eq!(found.slope, 0.5 * (found.zero.low + found.zero.high), max_relative = 1e-15);
    assert_eq!(score_over(&series, found.slope), 0);
    let Ends { low: Some(low), high: Some(high) } = found.ends else { panic!("both ends") };
    // The trend of the residuals is significant a little outside of the ends, and not inside.
    let z = |b: f64| {
        let left: Vec<f64> = series.t.iter().zip(&series.y).map(|(t, y)| y - b * t).collect();
        let points = Points::new(&series.t, &left, &series.mark).expect("finite");
        let test = certain_pairs(points).expect("sixteen points");
        test.s as f64 / test.variance.sqrt()
    };
    assert!(z(low - 0.03) > 1.6449 && z(low + 0.03) < 1.6449, "{low}");
    assert!(z(high + 0.03) < -1.6449 && z(high - 0.03) > -1.6449, "{high}");
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(1000))]

    /// Source: property 12 of the methods note: sorting equals all pairs, with bounds and ties.
    #[test]
    fn certain_pairs_by_sorting_equal_all_pairs(seed: u64, n in 3usize..80) {
        let series = mixed(&mut Random(seed), n);
        let brute = brute_certain_pairs(series.points()).expect("three points or more");
        let counts = certain_counts(series.points());
        prop_assert_eq!((counts.s, counts.undecided), (brute.s, brute.undecided));
        let variance = daniels_variance(n, counts.values, counts.times);
        prop_assert!(relative_eq!(variance, brute.variance, max_relative = 1e-12));
    }

    /// Source: the definition: S of residuals over all pairs is over zero before the zero set, zero
    /// in it, under zero after it.
    #[test]
    fn the_slope_is_where_the_trend_of_residuals_passes_zero(seed: u64, n in 3usize..40) {
        let series = mixed(&mut Random(seed), n);
        let Some(found) = akritas_theil_sen(series.points(), 0.9) else {
            // No pair could rise, or none could fall.
            let (low, high) = (score_over(&series, -1e6), score_over(&series, 1e6));
            prop_assert!(low == 0 || high == 0, "{low} {high}");
            return Ok(());
        };
        // Slopes of whole numbers under 60 lie 1/3600 or more apart.
        let near = 1e-5;
        prop_assert!(score_over(&series, found.zero.low - near) > 0);
        prop_assert!(score_over(&series, found.zero.high + near) < 0);
        if found.zero.high > found.zero.low + 3.0 * near {
            prop_assert_eq!(score_over(&series, found.slope), 0);
            prop_assert_eq!(score_over(&series, found.zero.low + near), 0);
            prop_assert_eq!(score_over(&series, found.zero.high - near), 0);
        }
        if let Some(low) = found.ends.low {
            prop_assert!(low <= found.zero.low, "{found:?}");
        }
        if let Some(high) = found.ends.high {
            prop_assert!(high >= found.zero.high, "{found:?}");
        }
    }

    /// Source: property 13 of the methods note: adding c·t to the values adds c to the slope.
    #[test]
    fn a_steeper_series_has_a_steeper_slope(seed: u64, share in 0.0..0.6f64, c in -3.0..3.0f64) {
        let series = Random(seed).series(share);
        let mut steeper = series.clone();
        steeper.y.iter_mut().zip(&series.t).for_each(|(y, t)| *y += c * t);
        let same = |x: f64, y: f64| relative_eq!(x + c, y, max_relative = 1e-8, epsilon = 1e-9);
        let pair = |series: &Series| akritas_theil_sen(series.points(), 0.9);
        match (pair(&series), pair(&steeper)) {
            (Some(one), Some(other)) => {
                prop_assert!(same(one.slope, other.slope));
                let ends = [
                    (one.ends.low, other.ends.low), (one.ends.high, other.ends.high),
                ];
                for ends in ends {
                    match ends {
                        (Some(one), Some(other)) => prop_assert!(same(one, other), "{ends:?}"),
                        (one, other) => prop_assert_eq!(one, other),
                    }
                }
            }
            (one, other) => prop_assert_eq!(one.is_some(), other.is_some()),
        }
        let sen = |y: &[f64]| theil_sen(&series.t, y, 0.9).expect("dates differ");
        let (one, other) = (sen(&series.y), sen(&steeper.y));
        prop_assert!(same(one.slope, other.slope));
        if let (Some(one), Some(other)) = (one.interval, other.interval) {
            prop_assert!(same(one.low, other.low) && same(one.high, other.high));
        }
    }

    /// Source: the definition: without bounds it is Theil and Sen's slope with Gilbert's interval.
    #[test]
    fn without_bounds_it_is_theil_and_sens_slope(seed: u64, n in 3usize..60) {
        let mut series = mixed(&mut Random(seed), n);
        series.mark = vec![Mark::Measured; n];
        let sen = theil_sen(&series.t, &series.y, 0.9);
        let found = akritas_theil_sen(series.points(), 0.9);
        prop_assert_eq!(sen.is_some(), found.is_some());
        if let (Some(sen), Some(found)) = (sen, found) {
            prop_assert!(relative_eq!(sen.slope, found.slope, max_relative = 1e-12, epsilon = 1e-12));
            let ends = sen.interval.map(|ends| (ends.low, ends.high));
            match (ends, found.ends) {
                (Some((low, high)), Ends { low: Some(one), high: Some(other) }) => {
                    prop_assert!(relative_eq!(low, one, max_relative = 1e-9, epsilon = 1e-12));
                    prop_assert!(relative_eq!(high, other, max_relative = 1e-9, epsilon = 1e-12));
                }
                (ends, found) => {
                    prop_assert_eq!(ends, None);
                    prop_assert_eq!(found, Ends { low: None, high: None });
                }
            }
        }
    }

    /// Source: property 14 of the methods note: counting slopes finds the places that listing them
    /// does, with bounds, ties and groups.
    #[test]
    fn counted_slopes_are_those_of_all_pairs(seed: u64, n in 3usize..120, groups in 1usize..4) {
        let mut random = Random(seed);
        let series = mixed(&mut random, n);
        let labels: Vec<usize> = (0..n).map(|_| random.whole(1, groups)).collect();
        let of = |label: usize| {
            let points = series.points().iter().zip(&labels).filter(move |(_, own)| **own == label);
            Timed::new(points.map(|(point, _)| point))
        };
        let timed = || (1..=groups).map(of).collect::<Vec<Timed>>();
        let (mut listed, mut counted) =
            (CriticalSlopes::of(timed(), usize::MAX), CriticalSlopes::of(timed(), 0));
        prop_assert_eq!((listed.rises(), listed.falls()), (counted.rises(), counted.falls()));
        let all = listed.rises() + listed.falls();
        prop_assert_eq!(counted.at(0), None);
        prop_assert_eq!(counted.at(all + 1), None);
        for _ in 0..10 {
            let place = random.whole(1, all.max(1) as usize) as u64;
            if let (Some(one), Some(other)) = (listed.at(place), counted.at(place)) {
                prop_assert!(relative_eq!(
                    one.slope, other.slope, max_relative = 1e-9, epsilon = 1e-12
                ), "{place} of {all}: {one:?} {other:?}");
            }
        }
    }
}

/// Source: the nominal 90 %: 1,000 series a cell, three standard errors of a tail of 0.05 are 0.021.
/// The full table (n 8 to 100, k 0 to 1, 4,000 runs) was simulated when the method was written.
#[test]
fn the_interval_covers_what_it_says() {
    let mut random = Random(90);
    for (n, limit, rate) in [(12, 4.2, 0.3), (20, 4.0, 0.3), (20, 3.2, 1.0), (40, 3.5, 0.3)] {
        let (mut under, mut over, mut runs, mut bounds) = (0.0, 0.0, 0.0, 0);
        for _ in 0..1_000 {
            let mut series = Series { t: vec![], y: vec![], mark: vec![] };
            for i in 0..n {
                let t = 0.25 * f64::from(i) + 0.05 * random.unit();
                let y = 5.0 - rate * t + 0.4 * random.normal();
                let limit = if i % 3 == 0 { limit + 0.3 } else { limit };
                series.t.push(t);
                series.y.push(y.max(limit));
                series.mark.push(if y < limit { Mark::Below } else { Mark::Measured });
                bounds += i32::from(y < limit);
            }
            let Some(found) = akritas_theil_sen(series.points(), 0.9) else { continue };
            runs += 1.0;
            under += f64::from(u8::from(found.ends.high.is_some_and(|high| high < -rate)));
            over += f64::from(u8::from(found.ends.low.is_some_and(|low| low > -rate)));
        }
        let (under, over) = (under / runs, over / runs);
        let covered = 1.0 - under - over;
        let cell = format!("n {n}, rate {rate}, {bounds} bounds: {under} {over}");
        assert!(runs > 900.0 && f64::from(bounds) > 150.0 * f64::from(n), "{cell}");
        assert!((0.87..0.945).contains(&covered) && under < 0.075 && over < 0.075, "{cell}");
    }
}

/// Source: by hand: what holds the slope on one side only, and what on neither.
#[test]
fn a_slope_that_is_not_held_is_none() {
    let none = |results: &str| {
        let count = results.split_whitespace().count();
        akritas_theil_sen(Series::reported(&steps(count), results).points(), 0.9)
    };
    // Only falls are possible: any steeper fall would do as well.
    assert_eq!(none("9 <5 <4 <3"), None);
    assert_eq!(none("<9 <5 <4"), None);
    assert_eq!(none("<1 <1 5"), None);
    assert_eq!(none("7"), None);
    let same = Series::reported(&[2.0, 2.0, 2.0], "1 2 3");
    assert_eq!(akritas_theil_sen(same.points(), 0.9), None);
    // Two measured values and a bound between them: the slope between the two.
    let found = none("8 <9 2").expect("one measured pair");
    assert_relative_eq!(found.slope, 0.5 * (2f64.ln() - 8f64.ln()), max_relative = 1e-12);
    assert_eq!(found.ends, Ends { low: None, high: None });
    // Above range: 5, >6, then 4 and 3: the bound rises over 5 at slopes under ln(6/5) a step, and
    // over 4 and 3 it falls at any slope over ln(4/6) and ½ ln(3/6).
    let found = none("5 >6 4 3").expect("measured pairs");
    assert!(found.slope < 0.0 && found.slope > (3f64 / 6.0).ln(), "{found:?}");
}

/// Source: the interval inverts the test: a trend is outside of one where the other finds it.
#[test]
fn ends_and_test_agree_on_a_fall() {
    let mut random = Random(91);
    let (mut agree, mut runs) = (0, 0);
    for _ in 0..400 {
        let series = random.series(0.3);
        let Some(found) = akritas_theil_sen(series.points(), 0.9) else { continue };
        let test = certain_pairs(series.points()).expect("five points or more");
        let falling = found.ends.high.is_some_and(|high| high < 0.0);
        let rising = found.ends.low.is_some_and(|low| low > 0.0);
        runs += 1;
        agree += i32::from((falling || rising) == (test.p < 0.1));
    }
    // They differ where the continuity correction or a reading between steps decides.
    assert!(f64::from(agree) > 0.95 * f64::from(runs), "{agree} of {runs}");
}
