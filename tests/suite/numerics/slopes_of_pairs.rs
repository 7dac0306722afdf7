//! Theil and Sen's slope from many pairs and from few.

use approx::assert_relative_eq;
use ebbwell::numerics::slope_selection::PairSlopes;
use ebbwell::numerics::{median, theil_sen};

use super::support::{Random, steps};

/// Source: properties 13 and 14 of the methods note.
#[test]
fn slope_selection_equals_the_slopes_of_all_pairs() {
    let mut random = Random(17);
    for round in 0..60 {
        let n = random.whole(2, 120);
        let grid = if round % 2 == 0 { 20.0 } else { 1e6 };
        let t: Vec<f64> = (0..n).map(|_| (random.unit() * 90.0).round()).collect();
        let y: Vec<f64> = (0..n).map(|_| (random.unit() * grid).round()).collect();
        let (mut all, mut counted) =
            (PairSlopes::by_pairs(&t, &y), PairSlopes::by_counting(&t, &y));
        assert_eq!(all.count(), counted.count());
        assert_eq!(all.ranked(0), None);
        assert_eq!(counted.ranked(counted.count() + 1), None);
        for _ in 0..20 {
            let rank = random.whole(1, all.count().max(1) as usize) as u64;
            let (Some(one), Some(other)) = (all.ranked(rank), counted.ranked(rank)) else {
                break;
            };
            let size = 1e-12 * grid;
            assert_relative_eq!(one.at, other.at, max_relative = 1e-9, epsilon = size);
            assert_relative_eq!(one.next, other.next, max_relative = 1e-9, epsilon = size);
        }
    }
}

/// Source: property 13 of the methods note, on a series long enough to be counted.
#[test]
fn a_long_series_has_a_slope_and_a_steeper_one_adds_to_it() {
    let mut random = Random(18);
    let t: Vec<f64> = (0..3_000).map(|i| f64::from(i) / 52.0).collect();
    let y: Vec<f64> = t.iter().map(|t| 3.0 - 0.2 * t + random.normal()).collect();
    let steeper: Vec<f64> = t.iter().zip(&y).map(|(t, y)| y + 0.5 * t).collect();
    let first = theil_sen(&t, &y, 0.95).expect("dates differ");
    let second = theil_sen(&t, &steeper, 0.95).expect("dates differ");
    assert_relative_eq!(second.slope, first.slope + 0.5, max_relative = 1e-9);
    let (ends, steep) = (first.interval.expect("many pairs"), second.interval.expect("many pairs"));
    assert_relative_eq!(steep.low, ends.low + 0.5, max_relative = 1e-9);
    assert_relative_eq!(steep.high, ends.high + 0.5, max_relative = 1e-9);
    assert!(ends.low < -0.2 && -0.2 < ends.high);
    let mut all = PairSlopes::by_pairs(&t, &y);
    let rank = all.count().div_ceil(2);
    assert_relative_eq!(all.ranked(rank).expect("a rank").at, first.slope, max_relative = 1e-6);
    // Copied values: nearly every slope is exactly zero.
    let copied: Vec<f64> = (0..3_000).map(|i| if i % 100 == 0 { 1.0 } else { 2.0 }).collect();
    assert_eq!(theil_sen(&t, &copied, 0.95).expect("dates differ").slope, 0.0);
}

/// Source: by hand: few pairs leave an end open; the median of an even number.
#[test]
fn few_pairs_leave_the_interval_open() {
    let sen = theil_sen(&steps(4), &[4.0, 3.0, 3.5, 1.0], 0.95).expect("dates differ");
    assert_eq!((sen.pairs, sen.interval), (6, None));
    assert_eq!(theil_sen(&[1.0, 1.0], &[2.0, 3.0], 0.95), None);
    assert_eq!(median(&[3.0, 1.0, 2.0, 10.0]), Some(2.5));
    assert_eq!(median(&[3.0, 1.0, 2.0]), Some(2.0));
    assert_eq!(median(&[]), None);
}
