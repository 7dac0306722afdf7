//! Rounds to decisive, and the smallest rate shown.

use approx::assert_relative_eq;
use ebbwell::numerics::{
    Dates, FirstOrder, Plan, first_order, median_spacing, rounds_to_decisive, rounds_to_level,
};

use super::support::{Random, Series, printed, steps};

const QUARTERLY: Plan = Plan { step: 0.25, confidence: 0.90, power: 0.80 };

/// Quarters from the start of a record.
fn quarters(n: usize) -> Vec<f64> {
    steps(n).iter().map(|step| step / 4.0).collect()
}

/// Source: practice note G, "rounds to decisive": half-life, σ, even chance, 80 % chance. Ours agree
/// to the round; one round off is allowed.
#[test]
fn rounds_from_nothing_agree_with_the_practice_table() {
    let table: [(f64, [(usize, usize); 3]); 4] = [
        (1.0, [(5, 6), (7, 9), (10, 13)]),
        (2.0, [(7, 9), (10, 13), (15, 20)]),
        (5.0, [(11, 15), (17, 22), (27, 35)]),
        (10.0, [(17, 22), (27, 35), (42, 55)]),
    ];
    for (half_life, row) in table {
        for (sd, (even, likely)) in [0.2, 0.4, 0.8].into_iter().zip(row) {
            let rate = std::f64::consts::LN_2 / half_life;
            for (power, expected) in [(0.50, even), (0.80, likely)] {
                let plan = Plan { power, ..QUARTERLY };
                let found = Dates::NONE.rounds(rate, sd, &plan, 1).expect("under 200 rounds");
                let setting = (half_life, sd, power);
                assert!(found.abs_diff(expected) <= 1, "{setting:?}: {found} for {expected}");
            }
        }
    }
}

/// Source: methods note 1.4, table, computed in R 4.2.2; printed to three decimals.
#[test]
fn the_smallest_rate_shown_agrees_with_the_methods_table() {
    let table =
        [(4, 2.612), (8, 0.600), (12, 0.303), (16, 0.191), (20, 0.134), (28, 0.080), (40, 0.046)];
    for (n, expected) in table {
        let dates = Dates::of(&quarters(n));
        let found = dates.smallest_rate_shown(0.5, 0.90).expect("three dates or more");
        printed(found, expected, 3);
        let counted = Dates::NONE.with(n, 0.25).smallest_rate_shown(0.5, 0.90);
        assert_relative_eq!(counted.expect("the same dates"), found, max_relative = 1e-12);
    }
    assert_eq!(Dates::of(&quarters(2)).smallest_rate_shown(0.5, 0.90), None);
    assert_eq!(Dates::of(&[1.0, 1.0, 1.0]).smallest_rate_shown(0.5, 0.90), None);
}

/// Source: sums over the dates themselves.
#[test]
fn dates_to_come_are_counted_as_if_they_were_there() {
    let mut random = Random(71);
    for _ in 0..200 {
        let mut t: Vec<f64> = (0..random.whole(1, 30)).map(|_| random.between(-5.0, 5.0)).collect();
        let (rounds, step) = (random.whole(0, 40), random.between(0.05, 2.0));
        let coming = Dates::of(&t).with(rounds, step);
        let last = t.iter().copied().fold(f64::NEG_INFINITY, f64::max);
        t.extend((1..=rounds).map(|i| last + step * i as f64));
        let there = Dates::of(&t);
        for rate in [0.01, 0.1, 1.0] {
            let (a, b) = (coming.power(rate, 0.5, 0.9), there.power(rate, 0.5, 0.9));
            assert!((a - b).abs() < 1e-9, "{a} {b}");
        }
    }
}

/// A record of a slow rate, and its fit.
fn unclear(n: usize, rate: f64, sd: f64, seed: u64) -> (Vec<f64>, FirstOrder) {
    let mut random = Random(seed);
    let t = quarters(n);
    let y: Vec<f64> = t.iter().map(|t| 3.0 - rate * t + sd * random.normal()).collect();
    let fit = Series::measured(&t, &y).fitted();
    (t, fit)
}

/// Source: the definition of rules: zero where the interval holds no zero, the least r otherwise.
#[test]
fn the_least_number_of_rounds_is_told() {
    let (t, clear) = unclear(20, 1.0, 0.2, 1);
    assert_eq!(rounds_to_decisive(&t, &clear, &QUARTERLY), Some(0));
    let (t, fit) = unclear(12, 0.15, 0.4, 7);
    assert!(fit.slope_interval(0.90).holds_zero());
    let found = rounds_to_decisive(&t, &fit, &QUARTERLY).expect("within 200 rounds");
    let power = |r: usize| Dates::of(&t).with(r, 0.25).power(fit.slope, fit.sd, 0.90);
    assert!(found >= 1 && power(found) >= 0.80 && power(found - 1) < 0.80, "{found}");
    // Half as often takes fewer rounds but more years; an even chance fewer than a good one.
    let seldom = rounds_to_decisive(&t, &fit, &Plan { step: 0.5, ..QUARTERLY }).expect("within");
    assert!(seldom < found && 2 * seldom > found, "{seldom} and {found}");
    let even = rounds_to_decisive(&t, &fit, &Plan { power: 0.5, ..QUARTERLY }).expect("within");
    assert!(1 <= even && even < found);
    // A rate of nothing is never shown.
    assert_eq!(Dates::of(&t).rounds(0.0, 0.5, &QUARTERLY, 1), None);
    assert_eq!(Dates::of(&t).rounds(1e-9, 0.5, &QUARTERLY, 1), None);
}

/// Source: the definition: an interval that just holds zero asks for one round more at least, even
/// where an even chance is all that is wanted.
#[test]
fn a_rate_that_is_nearly_shown_takes_one_round() {
    let t = quarters(10);
    let wave = |i: usize| if i.is_multiple_of(2) { 0.3 } else { -0.3 };
    let y: Vec<f64> = (0..10).map(wave).collect();
    let level = Series::measured(&t, &y).fitted();
    let line = level.line().expect("all measured");
    let needed = Dates::of(&t).smallest_rate_shown(line.sd(), 0.90).expect("ten dates");
    let tilted = |share: f64| {
        let slope = -share * needed - level.slope;
        let y: Vec<f64> = t.iter().zip(&y).map(|(t, y)| y + slope * t).collect();
        Series::measured(&t, &y).fitted()
    };
    let even = Plan { power: 0.5, ..QUARTERLY };
    assert_eq!(rounds_to_decisive(&t, &tilted(1.001), &even), Some(0));
    assert_eq!(rounds_to_decisive(&t, &tilted(0.9995), &even), Some(1));
    // The level likewise, with a limit at the very end of its interval.
    let fit = tilted(2.0);
    let now = fit.level_interval(t[9], 0.90);
    assert_eq!(rounds_to_level(&t, &fit, now.high + 1e-6, &even), Some(0));
    assert_eq!(rounds_to_level(&t, &fit, now.high - 1e-6, &even), Some(1));
}

/// Source: as above, for the level: the chance at r is enough, one round less is not.
#[test]
fn the_level_needs_rounds_of_its_own() {
    let (t, fit) = unclear(12, 0.3, 0.5, 3);
    let last = t[t.len() - 1];
    let now = fit.level_interval(last, 0.90);
    assert_eq!(rounds_to_level(&t, &fit, now.low - 0.01, &QUARTERLY), Some(0));
    // A limit a little over the level, which the line leaves further behind.
    let found = rounds_to_level(&t, &fit, now.high - 0.05, &QUARTERLY).expect("within 200 rounds");
    assert!((1..20).contains(&found), "{found}");
    let (_, flat) = unclear(12, 0.0, 0.5, 4);
    assert!(rounds_to_level(&t, &flat, flat.fitted(last), &QUARTERLY).is_none_or(|r| r > 5));
}

/// Source: the middle of the gaps, by hand.
#[test]
fn the_median_spacing_leaves_out_repeated_dates() {
    assert_eq!(median_spacing(&[3.0, 0.0, 1.0, 1.0]), Some(1.5));
    assert_eq!(median_spacing(&[0.0, 1.0, 1.5, 7.0]), Some(1.0));
    assert_eq!(median_spacing(&[2.0, 2.0]), None);
    assert_eq!(median_spacing(&[]), None);
}

/// Source: simulation, 4,000 records at each of six settings: a present record, the rounds told for
/// its true rate and scatter, and how often the rate is then shown. Three standard errors allowed.
#[test]
fn the_chance_promised_is_the_chance_simulated() {
    const RUNS: usize = 4_000;
    let allowed = 3.0 * (0.8f64 * 0.2 / RUNS as f64).sqrt();
    let settings = [
        (4, 0.4, 0.3, 0.25),
        (8, 0.2, 0.5, 0.25),
        (12, 0.1, 0.5, 0.5),
        (12, 0.05, 0.2, 1.0),
        (20, 0.03, 0.3, 0.25),
        (16, 0.15, 1.0, 0.5),
    ];
    let mut random = Random(99);
    for (n, rate, sd, step) in settings {
        let plan = Plan { step, ..QUARTERLY };
        let mut t = quarters(n);
        // Not quite regular, as dates are.
        t.iter_mut().for_each(|t| *t += 0.05 * random.unit());
        let rounds = Dates::of(&t).rounds(rate, sd, &plan, 1).expect("within 200 rounds");
        let last = t[n - 1];
        let mut shown = |rounds: usize| {
            let mut t = t.clone();
            t.extend((1..=rounds).map(|i| last + step * i as f64));
            let mark = vec![ebbwell::numerics::Mark::Measured; t.len()];
            let runs = (0..RUNS).filter(|_| {
                let y: Vec<f64> = t.iter().map(|t| sd * random.normal() - rate * t).collect();
                let points = ebbwell::numerics::Points::new(&t, &y, &mark).expect("sound");
                first_order(points).is_ok_and(|fit| fit.slope_interval(0.90).high < 0.0)
            });
            runs.count() as f64 / RUNS as f64
        };
        let (enough, short) = (shown(rounds), shown(rounds - 1));
        assert!(enough >= 0.80 - allowed, "{rounds} rounds give {enough}");
        assert!(short < 0.80 + allowed, "{} rounds give {short}", rounds - 1);
        let promised = Dates::of(&t).with(rounds, step).power(rate, sd, 0.90);
        assert!((enough - promised).abs() <= allowed, "{enough} for {promised}");
    }
}
