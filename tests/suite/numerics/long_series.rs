//! Series of tens of thousands of dates: the fast ways against the definitions.

use approx::assert_relative_eq;
use ebbwell::numerics::certain_counts::certain_counts;
use ebbwell::numerics::critical_slopes::CriticalSlopes;
use ebbwell::numerics::exact_kendall::brute_score;
use ebbwell::numerics::slope_counting::Timed;
use ebbwell::numerics::slope_selection::PairSlopes;
use ebbwell::numerics::{
    Mark, Points, akritas_theil_sen, car1, certain_pairs, curvature, left_out, mann_kendall,
    seasonal_kendall, theil_sen, worth_leaving_out,
};

use super::support::{Random, Series};

/// `n` dates a few days apart with a slow fall, about `share` of them under a limit of their own.
fn long(seed: u64, n: usize, share: f64) -> Series {
    let mut random = Random(seed);
    let mut series = Series { t: vec![], y: vec![], mark: vec![] };
    let mut time = 0.0;
    for _ in 0..n {
        time += random.between(0.01, 0.03);
        let y = 5.0 - 0.01 * time + 0.5 * random.normal();
        let below = random.unit() < share;
        series.t.push(time);
        series.y.push(if below { y + 0.3 * random.unit() } else { y });
        series.mark.push(if below { Mark::Below } else { Mark::Measured });
    }
    series
}

/// S of the residuals over a slope, over certain pairs.
fn score_over(series: &Series, b: f64) -> i64 {
    let left: Vec<f64> = series.t.iter().zip(&series.y).map(|(t, y)| y - b * t).collect();
    certain_counts(Points::new(&series.t, &left, &series.mark).expect("finite")).s
}

/// Source: all pairs, 3,000 points of which 4,498,500 have slopes.
#[test]
fn theil_and_sen_by_counting_are_all_pairs() {
    let series = long(1, 3_000, 0.0);
    let sen = theil_sen(&series.t, &series.y, 0.9).expect("dates differ");
    let mut all = PairSlopes::by_pairs(&series.t, &series.y);
    let count = all.count();
    assert_eq!((sen.pairs, count), (4_498_500, 4_498_500));
    let middle = all.ranked(count / 2).expect("a rank");
    assert_relative_eq!(sen.slope, 0.5 * (middle.at + middle.next), max_relative = 1e-12);
    // Gilbert's ranks: C = 1.644853627·√Var, Var = n(n − 1)(2n + 5)/18.
    let half = 0.5 * 1.6448536269514722 * (2_999.0 * 3_000.0 * 6_005.0 / 18.0f64).sqrt();
    let ends = sen.interval.expect("many pairs");
    let mut at = |rank: f64| {
        let found = all.ranked(rank as u64).expect("a rank");
        found.at + rank.fract() * (found.next - found.at)
    };
    let middle = 0.5 * count as f64;
    assert_relative_eq!(ends.low, at(middle - half), max_relative = 1e-9);
    assert_relative_eq!(ends.high, at(middle + half + 1.0), max_relative = 1e-9);
    assert_eq!(mann_kendall(&series.t, &series.y).expect("3,000").s, brute_score(&series.t, &series.y));
}

/// Source: the slope by all pairs of 1,200 points, with 40 % bounds.
#[test]
fn the_censored_slope_by_counting_is_that_of_all_pairs() {
    let series = long(2, 1_200, 0.4);
    let timed = || vec![Timed::new(series.points().iter())];
    let (mut listed, mut counted) =
        (CriticalSlopes::of(timed(), usize::MAX), CriticalSlopes::of(timed(), 0));
    let (zero, other) = (listed.zero().expect("pairs"), counted.zero().expect("pairs"));
    assert_relative_eq!(zero.low, other.low, max_relative = 1e-10);
    assert_relative_eq!(zero.high, other.high, max_relative = 1e-10);
    for height in [1.0, 100.5, 20_000.25] {
        let (one, other) = (listed.ends(height), counted.ends(height));
        let pair = (one.low.expect("low"), other.low.expect("low"));
        assert_relative_eq!(pair.0, pair.1, max_relative = 1e-9);
        let pair = (one.high.expect("high"), other.high.expect("high"));
        assert_relative_eq!(pair.0, pair.1, max_relative = 1e-9);
    }
}

/// Source: the definitions: half of the slopes lie under the median one, S of the residuals is zero
/// at the censored slope and ±z·√Var at the ends.
#[test]
fn a_hundred_thousand_dates_are_worked_through() {
    let plain = long(3, 100_000, 0.0);
    let sen = theil_sen(&plain.t, &plain.y, 0.9).expect("dates differ");
    assert_eq!(sen.pairs, 4_999_950_000);
    assert!(score_over(&plain, sen.slope).abs() <= 2, "{}", sen.slope);
    let ends = sen.interval.expect("many pairs");
    let spread = 1.6448536269514722 * (1e5 * 99_999.0 * 200_005.0 / 18.0f64).sqrt();
    assert_relative_eq!(score_over(&plain, ends.low) as f64, spread, max_relative = 1e-6);
    assert_relative_eq!(score_over(&plain, ends.high) as f64, -spread, max_relative = 1e-6);
    let censored = long(4, 100_000, 0.4);
    let found = akritas_theil_sen(censored.points(), 0.9).expect("measured pairs");
    assert!(score_over(&censored, found.slope).abs() <= 2, "{found:?}");
    for (end, sign) in [(found.ends.low, 1.0), (found.ends.high, -1.0)] {
        let end = end.expect("many pairs");
        let left: Vec<f64> =
            censored.t.iter().zip(&censored.y).map(|(t, y)| y - end * t).collect();
        let left = Points::new(&censored.t, &left, &censored.mark).expect("finite");
        let test = certain_pairs(left).expect("many points");
        let z = test.s as f64 / test.variance.sqrt();
        assert_relative_eq!(z, sign * 1.6448536269514722, max_relative = 1e-4);
    }
    let season: Vec<usize> = (0..100_000).map(|i| i % 4).collect();
    let seasonal = seasonal_kendall(&plain.t, &plain.y, &season, 0.9).expect("four seasons");
    let slope = seasonal.slope.expect("many pairs");
    assert!((slope - sen.slope).abs() < ends.high - ends.low, "{slope}");
}

/// Source: the definition of a step: three quarters of the values are copies of one, so that more
/// than half of the slopes are zero; and a straight stretch whose slopes differ by rounding only.
#[test]
fn very_many_equal_slopes_end_the_search() {
    let series = long(5, 20_000, 0.0);
    let copied: Vec<f64> =
        series.y.iter().enumerate().map(|(i, y)| if i % 4 == 0 { *y } else { 4.5 }).collect();
    let sen = theil_sen(&series.t, &copied, 0.9).expect("dates differ");
    assert_eq!(sen.slope, 0.0);
    assert_eq!(sen.interval.map(|ends| (ends.low, ends.high)), Some((0.0, 0.0)));
    let straight: Vec<f64> = series.t.iter().map(|t| 3.0 - 0.7 * t).collect();
    let sen = theil_sen(&series.t, &straight, 0.9).expect("dates differ");
    assert_relative_eq!(sen.slope, -0.7, max_relative = 1e-9);
    let level = theil_sen(&series.t, &vec![2.0; 20_000], 0.9).expect("dates differ");
    assert_eq!((level.slope, level.intercept), (0.0, 2.0));
    // Rounded values: many exact ties at many slopes.
    let rounded: Vec<f64> = series.y.iter().map(|y| (y * 10.0).round() / 10.0).collect();
    let whole: Vec<f64> = (0..20_000).map(f64::from).collect();
    let sen = theil_sen(&whole, &rounded, 0.9).expect("dates differ");
    let below = Timed::new(Series::measured(&whole, &rounded).points().iter());
    let half = below.lost_under(sen.slope - 1e-12) as f64 / (2.0 * sen.pairs as f64);
    assert!(half <= 0.5 + 1e-6, "{half}");
    let half = below.lost_under(sen.slope + 1e-12) as f64 / (2.0 * sen.pairs as f64);
    assert!(half >= 0.5 - 1e-6, "{half}");
}

/// Source: the interface: nine detects among ten thousand bounds, and times all but equal.
#[test]
fn lopsided_series_end_the_search() {
    let mut series = long(6, 10_000, 1.0);
    for i in 0..9 {
        series.mark[i * 1_100] = Mark::Measured;
    }
    let found = akritas_theil_sen(series.points(), 0.9).expect("measured pairs");
    assert!(score_over(&series, found.zero.low - 1e-7) >= 0);
    assert!(score_over(&series, found.zero.high + 1e-7) <= 0);
    let mut close = long(7, 2_000, 0.3);
    close.t.iter_mut().for_each(|t| *t = 1e6 + *t * 1e-9);
    let found = akritas_theil_sen(close.points(), 0.9).expect("measured pairs");
    assert!(found.slope.is_finite());
}

/// Source: the interface: long records pass through every diagnostic.
#[test]
fn diagnostics_of_long_series_end() {
    let plain = long(8, 20_000, 0.0);
    let test = car1(&plain.t, &plain.y).expect("not on a line");
    assert!(test.phi < 1.0 && test.inflation >= 1.0);
    let fit = plain.fitted();
    let bend = curvature(plain.points(), &fit).expect("not on a bent line");
    assert!(bend.p > 1e-4, "{bend:?}");
    let censored = long(9, 20_000, 0.3);
    let fit = censored.fitted();
    assert!(curvature(censored.points(), &fit).is_some());
    let which = worth_leaving_out(censored.points(), 50);
    let without = left_out(censored.points(), &fit, &which);
    assert_eq!(without.len(), 50);
    for one in without {
        let line = one.line.expect("many points");
        assert_relative_eq!(line.slope, fit.slope, max_relative = 0.01);
    }
}
