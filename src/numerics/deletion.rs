//! What each point does to a least-squares line: leverage, outlyingness, influence.

use super::line::line;
use super::tails;

/// A leverage this near to 1 (a pure number) means that the line passes through the point whatever
/// its value is. Source: rounding of the sums behind a leverage.
const WHOLE_LEVERAGE: f64 = 1.0 - 1e-12;

/// The other points lie on a line where they leave less than this share of the residual sum of
/// squares (a pure number). Source: rounding of the difference that gives their own sum.
const NO_REST: f64 = 1e-12;

/// One point beside the line through all of them.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Deletion {
    /// Value less fitted value.
    pub residual: f64,
    /// Share of the point's own value in its fitted value.
    pub leverage: f64,
    /// Residual in units of its own standard error. None where the leverage is 1.
    pub standardized: Option<f64>,
    /// The same with the scatter of the other points: a Student's t with n − 3 degrees of freedom.
    /// Infinite where the other points lie on a line and this one does not. None where the
    /// leverage is 1 or fewer than four points leave no scatter to compare with.
    pub studentized: Option<f64>,
    /// Cook's distance: how far all fitted values move when the point is left out. None where the
    /// leverage is 1.
    pub cook: Option<f64>,
}

/// The point farthest from the line through the others.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Farthest {
    /// Which point, counted from 0.
    pub index: usize,
    /// Its externally studentized residual.
    pub studentized: f64,
    /// Two-sided p of that, times the number of points, at most 1.
    pub bonferroni_p: f64,
}

/// Leverage, standardized and studentized residuals and Cook's distance of every point.
///
/// # Formula
/// ```text
/// h = 1/n + (t−t̄)²/Sxx     standardized = e/(s√(1−h))
/// studentized = e/(s₍ᵢ₎√(1−h))     s₍ᵢ₎² = (RSS − e²/(1−h))/(n−3)     D = e²·h/(2s²(1−h)²)
/// ```
/// where `e` is the residual, `s` the residual standard deviation and s₍ᵢ₎ that without the point.
///
/// # Units
/// `t` in years, `y` in ln(concentration); residuals in the latter, the rest pure numbers.
///
/// # Limits
/// Least squares only: with non-detects a point is left out and the line fitted again.
///
/// # None
/// Fewer than three points, all times equal, or points exactly on a line.
///
/// # Reference
/// Cook (1977), Technometrics 19:15–18; Draper & Smith (1998), ch. 8. Worked example W02.
pub fn deletion_diagnostics(t: &[f64], y: &[f64]) -> Option<Vec<Deletion>> {
    let through = line(t, y)?;
    if through.n < 3 || through.rss <= 0.0 {
        return None;
    }
    let n = through.n as f64;
    let variance = through.rss / through.degrees();
    let one = |(&t, &y): (&f64, &f64)| {
        let off = t - through.t_mean;
        let leverage = 1.0 / n + off * off / through.sxx;
        let residual = y - through.fitted(t);
        let free = 1.0 - leverage;
        if leverage > WHOLE_LEVERAGE {
            return Deletion {
                residual,
                leverage,
                standardized: None,
                studentized: None,
                cook: None,
            };
        }
        let standardized = residual / (variance * free).sqrt();
        let rest = through.rss - residual * residual / free;
        let studentized = if rest <= NO_REST * through.rss {
            f64::INFINITY.copysign(residual)
        } else {
            residual / (rest / (n - 3.0) * free).sqrt()
        };
        Deletion {
            residual,
            leverage,
            standardized: Some(standardized),
            studentized: (through.n > 3).then_some(studentized),
            cook: Some(0.5 * standardized * standardized * leverage / free),
        }
    };
    Some(t.iter().zip(y).map(one).collect())
}

/// The largest externally studentized residual with its Bonferroni p.
///
/// # Formula
/// ```text
/// p = min(1, n·2·P(T > |r|))     T with n − 3 degrees of freedom
/// ```
/// where `n` is the number of points and `r` the studentized residual.
///
/// # Units
/// `p` is a probability.
///
/// # Limits
/// As [`deletion_diagnostics`].
///
/// # None
/// No point has a studentized residual.
///
/// # Reference
/// Cook & Weisberg (1982), ch. 2 [from memory]. Worked example W02.
pub fn farthest(points: &[Deletion]) -> Option<Farthest> {
    let n = points.len() as f64;
    let mut found: Option<(usize, f64)> = None;
    for (index, point) in points.iter().enumerate() {
        let Some(r) = point.studentized else { continue };
        if found.is_none_or(|(_, most)| r.abs() > most.abs()) {
            found = Some((index, r));
        }
    }
    found.map(|(index, studentized)| {
        let one = if studentized.is_finite() {
            tails::student_two_sided(studentized, n - 3.0)
        } else {
            0.0
        };
        Farthest { index, studentized, bonferroni_p: (n * one).min(1.0) }
    })
}
