//! Student's t with a shift.

use approx::assert_abs_diff_eq;
use ebbwell::numerics::noncentral_upper;
use ebbwell::numerics::tails::student_upper;

use super::support::{number, reference};

/// Source: `tests/reference/noncentral.csv`, 30 digits two ways by `noncentral.py`, which holds each
/// row against scipy as well.
#[test]
fn tails_agree_with_thirty_digit_values() {
    let rows = reference("noncentral.csv");
    assert_eq!(rows.len(), 328);
    for row in rows {
        let [t, degrees, shift, value] = &row[..] else { panic!("four columns: {row:?}") };
        let found = noncentral_upper(number(t), number(degrees), number(shift));
        assert_abs_diff_eq!(found, number(value), epsilon = 1e-14);
    }
}

/// Source: without a shift it is Student's t.
#[test]
fn without_a_shift_it_is_students_t() {
    for degrees in [1.0, 2.5, 7.0, 30.0, 1e4] {
        for t in [-3.0, 0.0, 0.7, 2.0, 9.0] {
            let found = noncentral_upper(t, degrees, 0.0);
            assert_abs_diff_eq!(found, student_upper(t, degrees), epsilon = 1e-13);
        }
    }
}

/// Source: definition: a larger shift puts more over any t, and shares stay shares.
#[test]
fn it_grows_with_the_shift_and_stays_a_probability() {
    for degrees in [1.0, 4.0, 50.0, 1e5] {
        let mut last = 0.0;
        for step in 0..400 {
            let found = noncentral_upper(2.0, degrees, f64::from(step) / 4.0 - 20.0);
            assert!((0.0..=1.0).contains(&found) && found >= last - 1e-15);
            last = found;
        }
        assert!(last > 0.999_999);
    }
    assert_eq!(noncentral_upper(2.0, 5.0, 1e300), 1.0);
    assert_eq!(noncentral_upper(2.0, 5.0, -1e300), 0.0);
    let far = noncentral_upper(1e12, 3.0, 1.0);
    assert!((0.0..1e-6).contains(&far), "{far}");
}
