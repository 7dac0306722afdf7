//! Small systems and the climb that uses them.

use approx::assert_relative_eq;
use ebbwell::numerics::cholesky::{Factor, dot};
use ebbwell::numerics::damped::{Hill, climb_damped};

use super::support::Random;

/// Source: the product of matrix and answer, for random matrices with rows of very unlike size.
#[test]
fn a_solved_system_put_back_gives_the_right_side() {
    let mut random = Random(12);
    for _ in 0..500 {
        let size: [f64; 4] = std::array::from_fn(|_| 10f64.powf(random.between(-6.0, 6.0)));
        let rows: Vec<[f64; 4]> =
            (0..6).map(|_| std::array::from_fn(|i| size[i] * random.normal())).collect();
        let matrix: [[f64; 4]; 4] = std::array::from_fn(|i| {
            std::array::from_fn(|j| rows.iter().map(|row| row[i] * row[j]).sum())
        });
        let right: [f64; 4] = std::array::from_fn(|i| size[i] * random.normal());
        let factor = Factor::of(&matrix).expect("six random rows have full rank");
        let x = factor.solve(right);
        for i in 0..4 {
            assert!((dot(&matrix[i], &x) - right[i]).abs() < 1e-7 * size[i], "{matrix:?}");
            let column = std::array::from_fn(|j| factor.inverse()[j][i]);
            for j in 0..4 {
                let expected = if i == j { 1.0 } else { 0.0 };
                assert!((dot(&matrix[j], &column) * size[i] / size[j] - expected).abs() < 1e-7);
            }
        }
    }
}

/// Source: by hand: not of full rank, not positive, not finite.
#[test]
fn a_matrix_without_an_inverse_is_refused() {
    assert_eq!(Factor::of(&[[1.0, 1.0], [1.0, 1.0]]), None);
    assert_eq!(Factor::of(&[[1.0, 1.0], [1.0, 1.0 + 1e-15]]), None);
    assert_eq!(Factor::of(&[[1.0, 2.0], [2.0, 1.0]]), None);
    assert_eq!(Factor::of(&[[0.0, 0.0], [0.0, 1.0]]), None);
    assert_eq!(Factor::of(&[[1.0, f64::NAN], [f64::NAN, 1.0]]), None);
    assert_eq!(Factor::of(&[[f64::INFINITY]]), None);
    assert!(Factor::of(&[[1.0, 1.0 - 1e-9], [1.0 - 1e-9, 1.0]]).is_some());
}

/// Source: by hand: −(x − 1)⁴ − (y + 2)² has its top at (1, −2); its bend vanishes there in x, so
/// that undamped steps are slow and the last ones are lost in rounding.
#[test]
fn a_climb_ends_at_the_top_or_says_that_it_did_not() {
    let hill = |at: &[f64; 2]| {
        let (x, y) = (at[0] - 1.0, at[1] + 2.0);
        Hill {
            value: -x.powi(4) - y * y,
            gradient: [-4.0 * x.powi(3), -2.0 * y],
            bend: [[12.0 * x * x, 0.0], [0.0, 2.0]],
        }
    };
    let top = climb_damped([5.0, 5.0], hill).expect("a top");
    assert_relative_eq!(top.at[1], -2.0, epsilon = 1e-6);
    assert!((top.at[0] - 1.0).abs() < 0.01, "{top:?}");

    // A slope without an end, and a place where there is no function.
    let slope = |at: &[f64; 1]| Hill { value: at[0], gradient: [1.0], bend: [[1e-3]] };
    let lost = climb_damped([0.0], slope).expect_err("no top");
    assert!(lost.steps == 300 && lost.at[0] > 1e3, "{lost:?}");
    let nowhere = |_: &[f64; 1]| Hill { value: f64::NAN, gradient: [1.0], bend: [[1.0]] };
    assert_eq!(climb_damped([0.0], nowhere).expect_err("no function").steps, 0);
}
