//! The exact null distribution of Kendall's S.

use approx::assert_relative_eq;
use ebbwell::numerics::exact_kendall::{NullScores, untied_at_least};
use ebbwell::numerics::{PValue, falling_p, mann_kendall};

use super::support::{CLOSED, Random, printed, steps};

/// Source: W13, exact null tails P(S ≥ s), computed; printed to four significant digits.
#[test]
fn w13_exact_tails() {
    let table: [(usize, &[(i64, &str)]); 9] = [
        (4, &[(4, "0.1667"), (6, "0.04167")]),
        (5, &[(6, "0.1167"), (8, "0.04167"), (10, "0.008333")]),
        (6, &[(7, "0.1361"), (9, "0.06806"), (11, "0.02778"), (13, "0.008333")]),
        (7, &[(11, "0.06806"), (13, "0.03452"), (15, "0.01508"), (17, "0.005357")]),
        (
            8,
            &[(12, "0.08943"), (14, "0.05434"), (16, "0.03051"), (18, "0.01558"), (20, "0.007068")],
        ),
        (
            9,
            &[(16, "0.05972"), (18, "0.03759"), (20, "0.02231"), (22, "0.01237"), (24, "0.006333")],
        ),
        (
            10,
            &[(17, "0.07787"), (19, "0.05416"), (21, "0.03628"), (23, "0.02331"), (27, "0.008333")],
        ),
        (11, &[(23, "0.04328"), (25, "0.03009"), (31, "0.00827")]),
        (12, &[(24, "0.05798"), (26, "0.04316"), (30, "0.02237"), (36, "0.006885")]),
    ];
    for (n, row) in table {
        for (s, text) in row {
            let tail = untied_at_least(n, *s).expect("n is up to 40");
            let digits = text.len() as i32 - 2;
            printed(tail, text.parse().expect("a number"), digits);
        }
    }
    let least = |n: usize, p: f64| (0..=1000).find(|&s| untied_at_least(n, s).expect("n") <= p);
    let at_5 = [6, 8, 11, 13, 16, 18, 21, 23, 26, 28, 33, 35, 38, 42, 45, 49, 52];
    let at_1 = [10, 13, 17, 20, 24, 27, 31, 36, 40, 43, 49, 52, 58, 63, 67, 72];
    let parity = |n: usize, s: i64| s + (s - (n * (n - 1) / 2) as i64).rem_euclid(2);
    for (n, expected) in (4..=20).zip(at_5) {
        assert_eq!(least(n, 0.05).map(|s| parity(n, s)), Some(expected), "n {n}");
    }
    for (n, expected) in (5..=20).zip(at_1) {
        assert_eq!(least(n, 0.01).map(|s| parity(n, s)), Some(expected), "n {n}");
    }
}

/// Source: property 12 of the methods note, by way of what is known without the distribution: with
/// an odd number of pairs S is never 0, so that half of it lies over 0; and the mean of S² is
/// n(n − 1)(2n + 5)/18 (Kendall 1975 [from memory]).
#[test]
fn the_exact_tails_give_one_half_and_the_known_variance() {
    for n in 2..=40 {
        let pairs = n * (n - 1) / 2;
        let tail = |s: usize| untied_at_least(n, s as i64).expect("n is up to 40");
        if pairs % 2 == 1 {
            assert_relative_eq!(tail(1), 0.5, max_relative = 1e-12);
        }
        // The mean of S² is the sum of (2s − 1)·P(|S| ≥ s).
        let mean_square: f64 = (1..=pairs).map(|s| 2.0 * (2 * s - 1) as f64 * tail(s)).sum();
        let variance = (n * (n - 1) * (2 * n + 5)) as f64 / 18.0;
        assert_relative_eq!(mean_square, variance, max_relative = 1e-12);
        assert_eq!(untied_at_least(n, -(pairs as i64)), Some(1.0));
        assert_eq!(untied_at_least(n, pairs as i64 + 1), Some(0.0));
    }
    assert_eq!(untied_at_least(41, 5), None);
}

/// Source: Hollander & Wolfe (1973) p. 187, as in R's help of `cor.test`: T = 26, exact p 0.1194.
#[test]
fn tuna_exact_p() {
    let x = [44.4, 45.9, 41.9, 53.3, 44.7, 44.1, 50.7, 45.2, 60.1];
    let y = [2.6, 3.1, 2.5, 5.0, 3.6, 4.0, 5.2, 2.8, 3.8];
    let test = mann_kendall(&x, &y).expect("nine values");
    assert_eq!((test.s, test.p_value), (2 * 26 - 36, PValue::Exact));
    assert_relative_eq!(test.tau, 0.4444444, max_relative = CLOSED);
    assert_relative_eq!(test.p, 0.11943893298059964, max_relative = 1e-12);
}

/// Source: by hand, and by going through every order.
#[test]
fn ties_in_a_short_series_give_an_exact_p() {
    let mut random = Random(12);
    for _ in 0..40 {
        let n = random.whole(2, 7);
        let t = steps(n);
        let y: Vec<f64> = (0..n).map(|_| random.whole(0, 3) as f64).collect();
        let smart = NullScores::tied(&t, &y).expect("up to nine values");
        let plain = NullScores::one_by_one(&t, &y);
        for s in -30..=30 {
            assert_relative_eq!(smart.at_most(s), plain.at_most(s), epsilon = 1e-12);
            assert_relative_eq!(smart.as_far_as(s), plain.as_far_as(s), epsilon = 1e-12);
        }
    }
    // 1, 1, 2: of its three orders one has S = 2, one S = 0 and one S = −2.
    let test = mann_kendall(&steps(3), &[1.0, 1.0, 2.0]).expect("three values");
    assert_eq!((test.s, test.p_value), (2, PValue::Exact));
    assert_relative_eq!(test.p, 2.0 / 3.0, max_relative = 1e-14);
    let equal = mann_kendall(&steps(12), &[3.0; 12]).expect("twelve values");
    assert_eq!((equal.s, equal.variance, equal.z, equal.p), (0, 0.0, 0.0, 1.0));
    assert_eq!(falling_p(&steps(12), &[3.0; 12]), Some(1.0));
    assert_eq!(mann_kendall(&[1.0], &[2.0]), None);
    assert_eq!(mann_kendall(&[1.0, 2.0], &[2.0]), None);
}

/// Source: the null distribution by going through every order, ties in time as well.
#[test]
fn the_variance_is_that_of_all_orders_with_ties_in_both() {
    let mut random = Random(13);
    for _ in 0..30 {
        let n = random.whole(3, 7);
        let t: Vec<f64> = (0..n).map(|_| random.whole(0, 4) as f64).collect();
        let y: Vec<f64> = (0..n).map(|_| random.whole(0, 3) as f64).collect();
        let null = NullScores::one_by_one(&t, &y);
        let chance = |s: i64| null.at_most(s) - null.at_most(s - 1);
        let variance: f64 = (-30..=30).map(|s| (s * s) as f64 * chance(s)).sum();
        let test = mann_kendall(&t, &y).expect("three values or more");
        assert_relative_eq!(test.variance, variance, max_relative = 1e-9, epsilon = 1e-12);
    }
}
