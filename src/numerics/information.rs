//! How well models with different numbers of parameters stand against each other.

/// Share of 1 + Σy² that a residual sum of squares is not taken under. Source: ruled for this
/// program as the sum under which values lie on a line; about 1e-10 of a value.
const ROUNDING_SHARE: f64 = 1e-20;

/// Parameters of a constant level: the level and the scatter.
pub const CONSTANT_PARAMETERS: usize = 2;

/// Parameters of the first-order line: level, rate and scatter.
pub const FIRST_ORDER_PARAMETERS: usize = 3;

/// Parameters of the decay to a plateau: plateau, height over it, rate and scatter.
pub const PLATEAU_PARAMETERS: usize = 4;

/// Parameters of two rates: level, two rates, the break and the scatter.
pub const TWO_RATES_PARAMETERS: usize = 5;

/// What a model fails to explain, on one of two footings that must not be mixed: see [`aicc`].
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Misfit {
    /// Residual sum of squares: every value was measured.
    Squares(f64),
    /// Log-likelihood: some values are bounds.
    LogLikelihood(f64),
}

/// Akaike's criterion with the correction for few values: the lower, the better.
///
/// # Formula
/// ```text
/// all measured:  n·ln(RSS/n) + 2K + 2K(K+1)/(n−K−1)
/// with bounds:   −2ℓ         + 2K + 2K(K+1)/(n−K−1)
/// ```
/// where `n` is the number of values (bounds count as values), `K` the number of parameters with
/// the scatter among them, RSS the residual sum of squares, ℓ the log-likelihood. The two forms
/// differ by a constant, so that models are compared on the same data and the same form only.
///
/// # Units
/// Twice a log-likelihood. A difference of 4 is asked for before a richer model is preferred.
///
/// # Limits
/// Meant for models fitted to the same ln(concentration). What n means where many values are
/// bounds is not settled: the correction is then on the small side.
///
/// # None
/// `n` not over K + 2.
///
/// # Reference
/// Hurvich & Tsai (1989), Biometrika 76:297–307 [from memory]. Worked examples W02, W17, W18.
pub fn aicc(n: usize, parameters: usize, misfit: Misfit) -> Option<f64> {
    if n <= parameters + 2 {
        return None;
    }
    let (n, k) = (n as f64, parameters as f64);
    let misfit = match misfit {
        Misfit::Squares(rss) => n * (rss / n).ln(),
        Misfit::LogLikelihood(value) => -2.0 * value,
    };
    let value = misfit + 2.0 * k + 2.0 * k * (k + 1.0) / (n - k - 1.0);
    value.is_finite().then_some(value)
}

/// The residual sum of squares that rounding alone may leave.
///
/// # Formula
/// ```text
/// 1e-20·(1 + Σy²)
/// ```
///
/// # Units
/// Squares of those of the values.
///
/// # Limits
/// For values of order one and over.
///
/// # Reference
/// Ruled for this program, as for values on a line.
pub fn rounding(y: &[f64]) -> f64 {
    ROUNDING_SHARE * (1.0 + y.iter().map(|y| y * y).sum::<f64>())
}
