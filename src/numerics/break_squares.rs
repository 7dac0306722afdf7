//! The best break by least squares, among all places it may have, in one pass over the record.

use super::alternatives::Dropped;
use super::broken::{Broken, stretches};
use super::cholesky::Factor;
use super::first_order::FirstOrder;
use super::information::Misfit;
use super::points::Point;

/// Running mean and sums of squares and products about it.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
struct Moments {
    n: f64,
    t: f64,
    y: f64,
    tt: f64,
    ty: f64,
    yy: f64,
}

impl Moments {
    /// With one more point: Welford's formulas, which lose no digits.
    fn with(mut self, t: f64, y: f64) -> Moments {
        self.n += 1.0;
        let (dt, dy) = (t - self.t, y - self.y);
        self.t += dt / self.n;
        self.y += dy / self.n;
        self.tt += dt * (t - self.t);
        self.ty += dt * (y - self.y);
        self.yy += dy * (y - self.y);
        self
    }

    fn slope(&self) -> f64 {
        self.ty / self.tt
    }

    fn rss(&self) -> f64 {
        (self.yy - self.ty * self.slope()).max(0.0)
    }

    /// The fitted value at `t`, and its variance in units of the residual variance.
    fn at(&self, t: f64) -> (f64, f64) {
        let off = t - self.t;
        (self.y + self.slope() * off, 1.0 / self.n + off * off / self.tt)
    }
}

/// The broken line with the least residual sum of squares.
///
/// # Formula
/// ```text
/// RSS(ψ) = RSS₁ + RSS₂ + (ŷ₁(ψ) − ŷ₂(ψ))²/(v₁(ψ) + v₂(ψ))
/// ```
/// between two neighbouring dates, where 1 and 2 are the lines fitted apart to the points before
/// and after, `v` the variances of their fitted values at ψ over the residual variance. It is least
/// where the two lines meet, or else at an end of the stretch.
///
/// # Units
/// Those of the points.
///
/// # Limits
/// Any number of points; time and memory grow in proportion. Of equal sums the earliest break.
///
/// # Errors
/// [`Dropped::NoRoom`].
///
/// # Reference
/// Hudson (1966) [from memory]. Held against a search over a fine grid of breaks in tests.
pub fn best(sorted: &[Point], fit: &FirstOrder) -> Result<Broken, Dropped> {
    let origin = sorted[0].t;
    // About the first-order line the values are small and the sums exact.
    let at = |point: &Point| (point.t - origin, point.y - fit.fitted(point.t));
    let mut after = vec![Moments::default(); sorted.len() + 1];
    for (i, point) in sorted.iter().enumerate().rev() {
        let (t, y) = at(point);
        after[i] = after[i + 1].with(t, y);
    }
    let mut before = Moments::default();
    let mut counted = 0;
    let mut lowest: Option<(f64, f64)> = None;
    for (j, low, high) in stretches(sorted) {
        for point in &sorted[counted..j] {
            let (t, y) = at(point);
            before = before.with(t, y);
        }
        counted = j;
        let right = &after[j];
        if !(before.tt > 0.0 && right.tt > 0.0) {
            continue;
        }
        let (low, high) = (low - origin, high - origin);
        let apart = before.rss() + right.rss();
        let sum_at = |t: f64| {
            let ((left_y, left_v), (right_y, right_v)) = (before.at(t), right.at(t));
            let gap = left_y - right_y;
            apart + gap * gap / (left_v + right_v)
        };
        let meeting = low - (before.at(low).0 - right.at(low).0) / (before.slope() - right.slope());
        let mut offer = |rss: f64, t: f64| {
            if lowest.is_none_or(|(least, _)| rss < least) {
                lowest = Some((rss, t));
            }
        };
        offer(sum_at(low), low);
        if low < meeting && meeting < high {
            offer(apart, meeting);
        }
        offer(sum_at(high), high);
    }
    let (_, place) = lowest.ok_or(Dropped::NoRoom)?;
    at_break(sorted, fit, origin + place).ok_or(Dropped::NotConverged { steps: 1 })
}

/// The broken line with its break at `break_at`, by least squares.
///
/// # Formula
/// ```text
/// columns 1, min(t − ψ, 0), max(t − ψ, 0); normal equations about the first-order line
/// ```
///
/// # Units
/// Those of the points.
///
/// # Limits
/// Two dates or more on each side of the break.
///
/// # None
/// The columns do not determine the line.
///
/// # Reference
/// Draper & Smith (1998), ch. 14 [from memory]. Worked example W18.
pub fn at_break(sorted: &[Point], fit: &FirstOrder, break_at: f64) -> Option<Broken> {
    let columns = |t: f64| {
        let off = t - break_at;
        [1.0, off.min(0.0), off.max(0.0)]
    };
    let mut products = [[0.0; 3]; 3];
    let mut right = [0.0; 3];
    for point in sorted {
        let x = columns(point.t);
        let y = point.y - fit.fitted(point.t);
        for i in 0..3 {
            right[i] += x[i] * y;
            for j in 0..3 {
                products[i][j] += x[i] * x[j];
            }
        }
    }
    let [level, before, after] = Factor::of(&products)?.solve(right);
    let residual = |point: &Point| {
        let x = columns(point.t);
        point.y - fit.fitted(point.t) - level * x[0] - before * x[1] - after * x[2]
    };
    let rss: f64 = sorted.iter().map(residual).map(|e| e * e).sum();
    Some(Broken {
        break_at,
        level: level + fit.fitted(break_at),
        before: before + fit.slope,
        after: after + fit.slope,
        misfit: Misfit::Squares(rss),
    })
}
