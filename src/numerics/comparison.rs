//! The first-order line against its alternatives.

use super::alternatives::{Dropped, in_time_order};
use super::constant::{Constant, constant};
use super::first_order::FirstOrder;
use super::information::{FIRST_ORDER_PARAMETERS, Misfit, aicc};
use super::plateau::{Plateau, plateau};
use super::points::Points;
use super::two_rates::{TwoRates, two_rates};

/// How much lower the criterion of a richer model must be before it is preferred (twice a
/// log-likelihood). Source: common practice; ruled for this program.
pub const PREFERRED_BY: f64 = 4.0;

/// An alternative that may be preferred to the first-order line.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Better {
    /// Decay to a plateau.
    Plateau(Plateau),
    /// Two rates.
    TwoRates(TwoRates),
}

/// The first-order line beside its alternatives, on the same data and the same footing.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Comparison {
    /// No trend.
    pub constant: Result<Constant, Dropped>,
    /// What the first-order line leaves unexplained.
    pub first_order: Misfit,
    /// The criterion of the first-order line, where there are enough points.
    pub first_order_aicc: Option<f64>,
    /// Decay to a plateau.
    pub plateau: Result<Plateau, Dropped>,
    /// Two rates.
    pub two_rates: Result<TwoRates, Dropped>,
    /// Of plateau and two rates the one with the lower criterion, if lower than that of the
    /// first-order line by more than [`PREFERRED_BY`].
    pub better: Option<Better>,
}

/// Fits the alternatives to the points that `fit` was fitted to, and weighs them.
///
/// # Formula
/// ```text
/// better = argmin(AICc of plateau, AICc of two rates), if under AICc of first-order − 4
/// ```
/// See [`aicc`], [`constant`], [`plateau`], [`two_rates`]. The constant is never preferred: with few
/// values the penalty alone would favour it.
///
/// # Units
/// `t` in years, `y` in ln(concentration).
///
/// # Limits
/// 100,000 points in about a tenth of a second. Errors are taken to be independent: correlated ones
/// make richer models look better than they are.
///
/// # Reference
/// Methods note 5.7. Worked examples W02, W17, W18; invented series S01 and S05.
pub fn compare(points: Points<'_>, fit: &FirstOrder) -> Comparison {
    let sorted = in_time_order(points);
    let first_order = match fit.line() {
        Some(line) => Misfit::Squares(line.rss),
        None => Misfit::LogLikelihood(fit.log_likelihood),
    };
    let first_order_aicc = aicc(points.len(), FIRST_ORDER_PARAMETERS, first_order);
    let plateau = plateau(points, &sorted, fit);
    let two_rates = two_rates(&sorted, fit);
    let offered = [plateau.ok().map(Better::Plateau), two_rates.ok().map(Better::TwoRates)];
    let best = offered.into_iter().flatten().min_by(|x, y| x.aicc().total_cmp(&y.aicc()));
    let better = best.filter(|best| {
        first_order_aicc.is_some_and(|first_order| best.aicc() < first_order - PREFERRED_BY)
    });
    Comparison {
        constant: constant(points, fit),
        first_order,
        first_order_aicc,
        plateau,
        two_rates,
        better,
    }
}

impl Better {
    /// The criterion of [`aicc`].
    pub fn aicc(&self) -> f64 {
        match self {
            Better::Plateau(plateau) => plateau.aicc,
            Better::TwoRates(two_rates) => two_rates.aicc,
        }
    }

    /// ln(concentration) of the model at time `t`.
    pub fn fitted(&self, t: f64) -> f64 {
        match self {
            Better::Plateau(plateau) => plateau.fitted(t),
            Better::TwoRates(two_rates) => two_rates.fitted(t),
        }
    }

    /// The time from which the model stays at or under `y0`: [`Plateau::crossing`] or
    /// [`TwoRates::crossing`].
    ///
    /// # None
    /// It never does.
    pub fn crossing(&self, y0: f64) -> Option<f64> {
        match self {
            Better::Plateau(plateau) => plateau.crossing(y0),
            Better::TwoRates(two_rates) => two_rates.crossing(y0),
        }
    }
}
