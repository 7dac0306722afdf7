//! The constant level: no trend at all.

use super::alternatives::Dropped;
use super::columns::columns;
use super::first_order::FirstOrder;
use super::information::{CONSTANT_PARAMETERS, Misfit, aicc};
use super::line::mean;
use super::points::Points;

/// A constant level fitted to a series.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Constant {
    /// ln(concentration).
    pub level: f64,
    /// What it leaves unexplained.
    pub misfit: Misfit,
    /// The criterion of [`aicc`], where there are enough points.
    pub aicc: Option<f64>,
}

/// Fits a constant level: the mean, or the level of greatest likelihood where there are bounds.
///
/// # Formula
/// ```text
/// y = c + e
/// ```
/// where `y` is ln(concentration), `e` normal.
///
/// # Units
/// ln(concentration).
///
/// # Limits
/// `fit` is the first-order fit of the same points; it lends its scaling.
///
/// # Errors
/// [`Dropped::NotConverged`].
///
/// # Reference
/// Worked examples W02, W14, W17, W18.
pub fn constant(points: Points<'_>, fit: &FirstOrder) -> Result<Constant, Dropped> {
    let (level, misfit) = match fit.line() {
        Some(line) => (line.y_mean, Misfit::Squares(line.tss)),
        None => {
            let ones = vec![[1.0]; points.len()];
            let guess = [fit.fitted(mean(points.t()))];
            let level = columns(&ones, points.y(), points.mark(), guess, fit.ml_scale)
                .ok_or(Dropped::NotConverged { steps: 0 })?;
            (level.factors[0], Misfit::LogLikelihood(level.log_likelihood))
        }
    };
    Ok(Constant { level, misfit, aicc: aicc(points.len(), CONSTANT_PARAMETERS, misfit) })
}

impl Constant {
    /// ln(concentration) at any time.
    pub fn fitted(&self) -> f64 {
        self.level
    }
}
