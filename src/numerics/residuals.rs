//! What residuals tell: whether neighbours resemble each other.

use super::line::mean;

/// Lag-1 autocorrelation of values in their order.
///
/// # Formula
/// ```text
/// r₁ = Σ eᵢ·eᵢ₋₁ / Σ eᵢ²     e = value − mean
/// ```
/// where the first sum runs over the second to the last value.
///
/// # Units
/// A pure number between −1 and 1.
///
/// # Limits
/// Takes the steps as equal, whatever the dates are.
///
/// # None
/// Fewer than two values, or all equal.
///
/// # Reference
/// Box & Jenkins (1976), ch. 2. Checked against NIST's univariate sets:
/// `tests/reference/nist-univariate.csv`.
pub fn lag_one(values: &[f64]) -> Option<f64> {
    if values.len() < 2 {
        return None;
    }
    let centre = mean(values);
    let square: f64 = values.iter().map(|x| (x - centre) * (x - centre)).sum();
    let product: f64 = values.windows(2).map(|w| (w[0] - centre) * (w[1] - centre)).sum();
    (square > 0.0).then(|| product / square)
}

/// Durbin and Watson's ratio of residuals in time order.
///
/// # Formula
/// ```text
/// d = Σ (eᵢ − eᵢ₋₁)² / Σ eᵢ²
/// ```
/// where `e` are the residuals and the first sum runs over the second to the last.
///
/// # Units
/// A pure number between 0 and 4: about 2 without autocorrelation, less with a positive one.
///
/// # Limits
/// Takes the steps as equal. No p-value: that depends on the times of the residuals.
///
/// # None
/// Fewer than two residuals, or all zero.
///
/// # Reference
/// Durbin & Watson (1950), Biometrika 37:409–428. Worked examples W02 and W03.
pub fn durbin_watson(residuals: &[f64]) -> Option<f64> {
    if residuals.len() < 2 {
        return None;
    }
    let square: f64 = residuals.iter().map(|e| e * e).sum();
    let steps: f64 = residuals.windows(2).map(|w| (w[1] - w[0]) * (w[1] - w[0])).sum();
    (square > 0.0).then(|| steps / square)
}
