//! Tails and quantiles against 40-digit values.

use approx::assert_relative_eq;
use ebbwell::numerics::normal::{self, lower_tail};
use ebbwell::numerics::tails;

use super::support::{number, reference};

/// Source: `tests/reference/tails.csv`, computed by `tails.py` with 40 digits.
#[test]
fn tails_and_quantiles_agree_with_forty_digit_values() {
    let rows = reference("tails.csv");
    assert_eq!(rows.len(), 208);
    for row in &rows {
        let (what, x, expected) = (row[0].as_str(), number(&row[1]), number(&row[3]));
        let degrees = || number(&row[2]);
        let (found, tolerance) = match what {
            "normal_lower" => (normal::lower(x), 2e-13),
            "ln_lower" => (lower_tail(x).ln, 2e-15),
            "mills" => (lower_tail(x).slope, 2e-15),
            "bend" => (lower_tail(x).bend, 1e-12),
            "normal_quantile" => (tails::normal_quantile(x), 2e-15),
            "student_upper" => (tails::student_upper(x, degrees()), 2e-12),
            // Over 1,000 degrees an expansion, which loses a little far out only.
            "student_quantile" => {
                let far_out = degrees() > 1_000.0 && x < 1e-8;
                (tails::student_quantile(x, degrees()), if far_out { 2e-11 } else { 1e-12 })
            }
            "chi_squared_upper" => (tails::chi_squared_upper(x, degrees()), 1e-12),
            "fisher_upper_2" => (tails::fisher_upper(x, 2.0, degrees()), 1e-12),
            other => panic!("no such row: {other}"),
        };
        let off = (found / expected - 1.0).abs();
        assert!(off <= tolerance, "{row:?}: found {found}, off by {off:e}");
    }
}

/// Source: symmetry of Student's t, and the limits stated in the documentation.
#[test]
fn quantiles_end_for_every_tail_and_every_number_of_degrees() {
    for degrees in [0.1, 0.5, 1.0, 1.5, 3.0, 999.5, 1000.5, 3e7, 1e12, f64::INFINITY] {
        for tail in [0.0, 1e-300, 1e-12, 0.05, 0.5, 0.95, 1.0] {
            let t = tails::student_quantile(tail, degrees);
            assert!(t.is_finite(), "{tail} {degrees}: {t}");
            let mirrored = tails::student_quantile(1.0 - tail, degrees);
            assert_relative_eq!(t, -mirrored, max_relative = 1e-3, epsilon = 1e-12);
        }
    }
    assert_eq!(tails::student_upper(f64::INFINITY, 5.0), 0.0);
    assert_eq!(tails::student_two_sided(0.0, 5.0), 1.0);
}

/// Source: W02 and W13 use these; R 4.2.2 `qt(0.95, 8)` and `qt(0.975, 8)`, by way of their bands.
#[test]
fn the_two_sided_quantile_leaves_half_on_each_side() {
    let one_sided = tails::student_quantile(0.05, 8.0);
    assert_relative_eq!(tails::student_within(0.90, 8.0), one_sided, max_relative = 1e-13);
    assert_relative_eq!(tails::student_upper(one_sided, 8.0), 0.05, max_relative = 1e-12);
}
