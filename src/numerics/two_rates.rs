//! Two first-order rates with a break between them: a continuous broken line.

use super::alternatives::{Dropped, enough};
use super::break_bounds;
use super::break_squares;
use super::first_order::FirstOrder;
use super::information::{Misfit, TWO_RATES_PARAMETERS, aicc};
use super::points::Point;

/// A broken line fitted to a series.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TwoRates {
    /// Where the break is.
    pub break_at: f64,
    /// ln(concentration) of the line there.
    pub level: f64,
    /// Slope before the break; negative when falling.
    pub before: f64,
    /// Slope after it.
    pub after: f64,
    /// Points after the break: what a projection rests on.
    pub n_after: usize,
    /// What it leaves unexplained.
    pub misfit: Misfit,
    /// The criterion of [`aicc`].
    pub aicc: f64,
}

/// Fits two first-order rates with a break between them.
///
/// # Formula
/// ```text
/// y = c + b₁·min(t − ψ, 0) + b₂·max(t − ψ, 0) + e     e normal
/// ```
/// where `y` is ln(concentration), ψ the break. All measured: every stretch between neighbouring
/// dates is searched, exactly, by [`break_squares::best`]; with bounds, by
/// [`break_bounds::best`].
///
/// # Units
/// `t` in years, `y` in ln(concentration); slopes per year.
///
/// # Limits
/// A break leaves at least four points and one year on each side; with bounds also measured values
/// on two dates. `fit` is the first-order fit of the same points. No p-value belongs to the break:
/// it was looked for.
///
/// # Errors
/// [`Dropped`]: fewer than eight points (nine for any room), or measured values on fewer than four dates; no room for a
/// break; a search that did not end.
///
/// # Reference
/// Hudson (1966), J. Am. Stat. Assoc. 61:1097–1129 [from memory]. Worked examples W17 and W18; R
/// `segmented` on the invented series S05.
pub fn two_rates(sorted: &[Point], fit: &FirstOrder) -> Result<TwoRates, Dropped> {
    enough(sorted, TWO_RATES_PARAMETERS)?;
    let broken = if fit.line().is_some() {
        break_squares::best(sorted, fit)?
    } else {
        break_bounds::best(sorted, fit)?
    };
    let aicc = aicc(sorted.len(), TWO_RATES_PARAMETERS, broken.misfit);
    let before = sorted.partition_point(|point| point.t <= broken.break_at);
    Ok(TwoRates {
        break_at: broken.break_at,
        level: broken.level,
        before: broken.before,
        after: broken.after,
        n_after: sorted.len() - before,
        misfit: broken.misfit,
        aicc: aicc.ok_or(Dropped::NotConverged { steps: 0 })?,
    })
}

impl TwoRates {
    /// ln(concentration) of the broken line at time `t`.
    pub fn fitted(&self, t: f64) -> f64 {
        let slope = if t < self.break_at { self.before } else { self.after };
        self.level + slope * (t - self.break_at)
    }

    /// The time from which the broken line stays at or under the level `y0`.
    ///
    /// # Formula
    /// ```text
    /// t = ψ + (y0 − c)/b₂     where the level c at the break is not under y0
    /// t = ψ + (y0 − c)/b₁     where it is: met before the break
    /// ```
    ///
    /// # Units
    /// Those of the times; `y0` in ln(concentration).
    ///
    /// # Limits
    /// Of the median. Projected from the last rate alone.
    ///
    /// # None
    /// The last rate does not fall, so that the line does not stay under `y0`; or it was never over
    /// it.
    ///
    /// # Reference
    /// Methods note 5.8.
    pub fn crossing(&self, y0: f64) -> Option<f64> {
        let over = self.level - y0;
        let slope = if over >= 0.0 { self.after } else { self.before };
        let t = self.break_at - over / slope;
        (self.after < 0.0 && slope < 0.0 && t.is_finite()).then_some(t)
    }
}
