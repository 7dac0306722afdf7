//! Whether a line can be fitted at all.

use super::line::{Line, line};
use super::points::{Mark, NoLine, Points};

/// Measured values lie on a line where their residual sum of squares is under this share of
/// 1 + Σy². Source: ruled for this program; about 1e-10 of a value, far under any rounding of data.
const ON_A_LINE: f64 = 1e-20;

/// Distinct dates with measured values that a line and its scatter need. Source: two unknowns and
/// a scatter; with fewer the likelihood has no maximum.
const DATES_NEEDED: usize = 3;

/// The least-squares line through the measured values, where a line can be fitted at all.
///
/// # Formula
/// ```text
/// on a line:     RSS < 1e-20·(1 + Σy²), sums over the measured values
/// contradicted:  a limit under that line, or a value above range over it, by more than that
/// ```
///
/// # Units
/// As [`line()`].
///
/// # Limits
/// Dates are distinct where their times differ at all.
///
/// # Errors
/// [`NoLine`]: fewer than three dates; measured values on fewer than three; all on one; measured
/// values exactly on a line that no bound contradicts.
///
/// # Reference
/// Methods note 3.2: with measured values on three dates and not on a line the likelihood has one
/// maximum; on a line it grows for ever as the scatter shrinks, unless a bound forbids it.
pub fn measured_line(points: Points<'_>) -> Result<Line, NoLine> {
    let measured: Vec<_> = points.iter().filter(|point| point.mark == Mark::Measured).collect();
    let dates = distinct(points.t().iter().copied());
    let measured_dates = distinct(measured.iter().map(|point| point.t));
    let on_one_date = dates == 1 || measured.len() >= DATES_NEEDED && measured_dates == 1;
    if points.len() >= DATES_NEEDED && on_one_date {
        return Err(NoLine::OneDate);
    }
    if dates < DATES_NEEDED {
        return Err(NoLine::TooFewDates { dates });
    }
    if measured_dates < DATES_NEEDED {
        return Err(NoLine::TooFewDetects { dates: measured_dates });
    }
    let t: Vec<f64> = measured.iter().map(|point| point.t).collect();
    let y: Vec<f64> = measured.iter().map(|point| point.y).collect();
    let through = line(&t, &y).ok_or(NoLine::NotConverged { steps: 0 })?;
    let square = ON_A_LINE * (1.0 + y.iter().map(|y| y * y).sum::<f64>());
    if through.rss < square && !contradicted(points, &through, square) {
        return Err(NoLine::OnALine);
    }
    Ok(through)
}

/// Number of distinct values, counted no further than three.
fn distinct(values: impl Iterator<Item = f64>) -> usize {
    let mut seen = [f64::NAN; DATES_NEEDED];
    let mut found = 0;
    for value in values {
        if !seen[..found].contains(&value) {
            seen[found] = value;
            found += 1;
            if found == DATES_NEEDED {
                break;
            }
        }
    }
    found
}

/// Whether a bound lies on the wrong side of the line by more than rounding.
fn contradicted(points: Points<'_>, through: &Line, square: f64) -> bool {
    points.iter().any(|point| {
        let over = point.y - through.fitted(point.t);
        match point.mark {
            Mark::Measured => false,
            Mark::Below => over < 0.0 && over * over >= square,
            Mark::Above => over > 0.0 && over * over >= square,
        }
    })
}
