//! First-order decay to a plateau: concentrations that level off.

use super::alternatives::{Dropped, enough};
use super::curvature::curvature;
use super::curve_fit::{CurveFit, fit_curve, fit_curve_with_bounds};
use super::damped::Lost;
use super::first_order::FirstOrder;
use super::information::{Misfit, PLATEAU_PARAMETERS, aicc, rounding};
use super::line::mean;
use super::plateau_starts::{levelling, shortened, starts};
use super::points::{Mark, Point, Points};
use super::tails;

/// Confidence at which a plateau must be told from zero (a probability, two-sided). Source: that of
/// the program's intervals by default; to be preferred by its criterion a plateau needs more.
const TOLD_FROM_ZERO: f64 = 0.90;

/// Standard error of ln k over which the rate is not determined (a pure number). Source: a factor of
/// twenty either way.
const MOST_RATE_ERROR: f64 = 3.0;

/// A decay to a plateau fitted to a series.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Plateau {
    /// ln of the plateau P.
    pub ln_plateau: f64,
    /// ln of the height A over it at time 0.
    pub ln_height: f64,
    /// The rate k of the part that decays; over zero.
    pub rate: f64,
    /// Standard errors of ln P, ln A and ln k.
    pub errors: [f64; 3],
    /// What it leaves unexplained.
    pub misfit: Misfit,
    /// The criterion of [`aicc`].
    pub aicc: f64,
}

/// Fits a first-order decay to a plateau.
///
/// # Formula
/// ```text
/// y = ln(P + A·e^(−k·t)) + e     e normal
/// kept only if   n·ln(RSS₁/RSS) or 2(ℓ − ℓ₁)  >  m·ln(1 + q²/(m−3))
/// ```
/// where `y` is ln(concentration); RSS₁ and ℓ₁ belong to the first-order line, which is P = 0; `q`
/// is the two-sided 90 % quantile of Student's t with m − 3 degrees of freedom, m the effective
/// number. Searched for over ln P, ln A and ln k from the valleys of a grid.
///
/// # Units
/// `t` in years, `y` in ln(concentration).
///
/// # Limits
/// `fit` is the first-order fit of the same points.
///
/// # Errors
/// [`Dropped`]: fewer than seven points, or measured values on fewer than four dates; a record that
/// does not fall, or bends downwards; a plateau that cannot be told from zero; a search that did not
/// end, or a rate that is not determined.
///
/// # Reference
/// Methods note 5.7. Worked examples W17 and W18; R `nls` on the invented series S05.
pub fn plateau(points: Points<'_>, sorted: &[Point], fit: &FirstOrder) -> Result<Plateau, Dropped> {
    enough(sorted, PLATEAU_PARAMETERS)?;
    if fit.slope >= 0.0 {
        return Err(Dropped::NotFalling);
    }
    if curvature(points, fit).is_some_and(|bend| bend.coefficient <= 0.0) {
        return Err(Dropped::WrongCurvature);
    }
    let scaled = Scaled::new(sorted);
    let found = scaled.search(fit)?;
    let first = if fit.line().is_some() {
        Misfit::Squares(fit.ml_scale * fit.ml_scale * fit.n as f64)
    } else {
        Misfit::LogLikelihood(fit.log_likelihood)
    };
    let quantile = tails::student_within(TOLD_FROM_ZERO, fit.m - 3.0);
    let cut_off = fit.m * (quantile * quantile / (fit.m - 3.0)).ln_1p();
    let told = match (first, found.misfit) {
        (Misfit::Squares(first), Misfit::Squares(rss)) => {
            let floor = rounding(points.y());
            fit.n as f64 * ((first + floor) / (rss + floor)).ln() > cut_off
        }
        (Misfit::LogLikelihood(first), Misfit::LogLikelihood(value)) => {
            2.0 * (value - first) > cut_off
        }
        _ => false,
    };
    if !told {
        return Err(Dropped::NoPlateau);
    }
    if !found.located {
        return Err(Dropped::NotConverged { steps: found.steps });
    }
    let aicc = aicc(points.len(), PLATEAU_PARAMETERS, found.misfit);
    Ok(scaled.unscaled(&found, aicc.ok_or(Dropped::NotConverged { steps: found.steps })?))
}

/// The points in the order of time, with times from 0 to 1 and values about their mean.
struct Scaled {
    start: f64,
    span: f64,
    middle: f64,
    t: Vec<f64>,
    y: Vec<f64>,
    mark: Vec<Mark>,
}

/// The best place found, whether or not it serves: ln P, ln A and ln k in scaled units.
#[derive(Clone, Copy)]
struct Found {
    at: [f64; 3],
    variance: [[f64; 3]; 3],
    misfit: Misfit,
    located: bool,
    steps: usize,
}

impl Scaled {
    fn new(sorted: &[Point]) -> Scaled {
        let y: Vec<f64> = sorted.iter().map(|point| point.y).collect();
        let start = sorted[0].t;
        let span = sorted[sorted.len() - 1].t - start;
        let middle = mean(&y);
        Scaled {
            start,
            span,
            middle,
            t: sorted.iter().map(|point| (point.t - start) / span).collect(),
            y: y.iter().map(|y| y - middle).collect(),
            mark: sorted.iter().map(|point| point.mark).collect(),
        }
    }

    /// The best of the tops that the starts lead to: one that serves before one that does not.
    fn search(&self, fit: &FirstOrder) -> Result<Found, Dropped> {
        let short = shortened(&self.t, &self.y, &self.mark);
        let mut found: Vec<Found> =
            starts(&short).into_iter().map(|start| squares(&short.u, &short.w, start)).collect();
        best_first(&mut found);
        if short.u.len() < self.t.len() {
            found.truncate(1);
        }
        if fit.line().is_none() || short.u.len() < self.t.len() {
            found.iter_mut().for_each(|found| *found = self.fitted(fit, found));
            best_first(&mut found);
        }
        found.first().copied().ok_or(Dropped::NotConverged { steps: 0 })
    }

    /// The search on the whole record, from a place found on the short one.
    fn fitted(&self, fit: &FirstOrder, near: &Found) -> Found {
        if fit.line().is_some() {
            return squares(&self.t, &self.y, near.at);
        }
        let start = [near.at[0], near.at[1], near.at[2], fit.ml_scale.ln()];
        let points = Points::new(&self.t, &self.y, &self.mark);
        let fitted = points.map(|points| fit_curve_with_bounds(points, start, levelling::<4>));
        let first = |at: [f64; 4]| [at[0], at[1], at[2]];
        match fitted {
            Ok(Ok(CurveFit { at, misfit, inverse, steps })) => {
                let rows = inverse.map(first);
                let variance = [rows[0], rows[1], rows[2]];
                let located = variance[2][2].sqrt() < MOST_RATE_ERROR;
                let misfit = Misfit::LogLikelihood(misfit);
                Found { at: first(at), variance, misfit, located, steps }
            }
            Ok(Err(Lost { at, value, steps })) => {
                Found::lost(first(at), Misfit::LogLikelihood(value), steps)
            }
            // Scaled points are finite where the points are.
            Err(_) => Found::lost(near.at, Misfit::LogLikelihood(f64::NEG_INFINITY), 0),
        }
    }

    fn unscaled(&self, found: &Found, aicc: f64) -> Plateau {
        let rate = found.at[2].exp() / self.span;
        // ln A at time 0 from ln A at the first date: moved by k times that date.
        let moved = rate * self.start;
        let v = &found.variance;
        let height = v[1][1] + 2.0 * moved * v[1][2] + moved * moved * v[2][2];
        Plateau {
            ln_plateau: self.middle + found.at[0],
            ln_height: self.middle + found.at[1] + moved,
            rate,
            errors: [v[0][0], height, v[2][2]].map(f64::sqrt),
            misfit: found.misfit,
            aicc,
        }
    }
}

impl Found {
    fn lost(at: [f64; 3], misfit: Misfit, steps: usize) -> Found {
        Found { at, variance: [[f64::INFINITY; 3]; 3], misfit, located: false, steps }
    }

    /// What is to be made small: the misfit on either footing.
    fn rank(&self) -> f64 {
        match self.misfit {
            Misfit::Squares(rss) => rss,
            Misfit::LogLikelihood(value) => -value,
        }
    }
}

fn best_first(found: &mut [Found]) {
    found.sort_by(|x, y| y.located.cmp(&x.located).then(x.rank().total_cmp(&y.rank())));
}

/// The search by least squares.
fn squares(t: &[f64], y: &[f64], start: [f64; 3]) -> Found {
    let n = t.len() as f64;
    match fit_curve(t, y, start, levelling::<3>) {
        Ok(CurveFit { at, misfit, inverse, steps }) => {
            let residual = misfit / (n - 3.0);
            let variance = inverse.map(|row| row.map(|v| v * residual));
            let located = variance[2][2].sqrt() < MOST_RATE_ERROR;
            Found { at, variance, misfit: Misfit::Squares(misfit), located, steps }
        }
        Err(Lost { at, value, steps }) => {
            Found::lost(at, Misfit::Squares((-2.0 * value / n).exp()), steps)
        }
    }
}

impl Plateau {
    /// ln(concentration) of the curve at time `t`.
    pub fn fitted(&self, t: f64) -> f64 {
        levelling(&[self.ln_plateau, self.ln_height, self.rate.ln()], t).0
    }

    /// The time at which the curve meets the level `y0`.
    ///
    /// # Formula
    /// ```text
    /// t = (ln A − ln(e^y0 − P))/k
    /// ```
    ///
    /// # Units
    /// Those of the times; `y0` in ln(concentration).
    ///
    /// # Limits
    /// Of the median; before the record where the level lies over it.
    ///
    /// # None
    /// The plateau is not under `y0`: the curve never meets it.
    ///
    /// # Reference
    /// Methods note 5.7. Worked example W17.
    pub fn crossing(&self, y0: f64) -> Option<f64> {
        let under = self.ln_plateau - y0;
        let t = (self.ln_height - y0 - (-under.exp()).ln_1p()) / self.rate;
        (under < 0.0 && t.is_finite()).then_some(t)
    }
}
