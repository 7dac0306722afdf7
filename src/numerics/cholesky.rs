//! Small symmetric positive definite systems.

/// The factor of a symmetric positive definite matrix, with its rows and columns brought to a unit
/// diagonal first, so that parameters of any size may stand side by side.
///
/// # Formula
/// ```text
/// D·A·D = L·Lᵀ     D = diag(1/√aᵢᵢ)
/// ```
/// where `L` is lower triangular.
///
/// # Units
/// None of its own.
///
/// # Limits
/// A pivot under [`FLAT`] of the unit diagonal counts as zero.
///
/// # Reference
/// Golub & Van Loan (1996), 4.2 [from memory]. Checked against the product of matrix and answer.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Factor<const N: usize> {
    lower: [[f64; N]; N],
    unit: [f64; N],
}

/// A pivot of a matrix with unit diagonal that counts as zero (a pure number). Source: the rounding
/// of sums of some thousand products in f64.
const FLAT: f64 = 1e-14;

impl<const N: usize> Factor<N> {
    /// Factors the matrix.
    ///
    /// # None
    /// A matrix that is not positive definite in f64, or not finite.
    pub fn of(matrix: &[[f64; N]; N]) -> Option<Factor<N>> {
        let mut unit = [0.0; N];
        for (i, unit) in unit.iter_mut().enumerate() {
            if !(matrix[i][i] > 0.0 && matrix[i][i].is_finite()) {
                return None;
            }
            *unit = 1.0 / matrix[i][i].sqrt();
        }
        let mut lower = [[0.0; N]; N];
        for i in 0..N {
            for j in 0..=i {
                let mut rest = matrix[i][j] * unit[i] * unit[j];
                for (x, y) in lower[i][..j].iter().zip(&lower[j][..j]) {
                    rest -= x * y;
                }
                if i > j {
                    lower[i][j] = rest / lower[j][j];
                } else if rest > FLAT {
                    lower[i][i] = rest.sqrt();
                } else {
                    return None;
                }
            }
        }
        Some(Factor { lower, unit })
    }

    /// The x with matrix · x = `right`.
    pub fn solve(&self, right: [f64; N]) -> [f64; N] {
        let mut x = right;
        for i in 0..N {
            x[i] *= self.unit[i];
            for j in 0..i {
                x[i] -= self.lower[i][j] * x[j];
            }
            x[i] /= self.lower[i][i];
        }
        for i in (0..N).rev() {
            for j in i + 1..N {
                x[i] -= self.lower[j][i] * x[j];
            }
            x[i] /= self.lower[i][i];
        }
        for (x, unit) in x.iter_mut().zip(self.unit) {
            *x *= unit;
        }
        x
    }

    /// The inverse of the matrix.
    pub fn inverse(&self) -> [[f64; N]; N] {
        let mut columns = [[0.0; N]; N];
        for (i, column) in columns.iter_mut().enumerate() {
            column[i] = 1.0;
            *column = self.solve(*column);
        }
        columns
    }
}

/// The sum of products.
pub fn dot<const N: usize>(x: &[f64; N], y: &[f64; N]) -> f64 {
    x.iter().zip(y).map(|(x, y)| x * y).sum()
}
