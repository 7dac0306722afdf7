//! Readings: a filled disc for a measured value, a hollow one with a stem for a non-detect, a hollow
//! triangle for a value above the range, a bar for an interval; a ring for estimated; a light cross
//! for what is not fitted.

use super::canvas::Canvas;
use super::frame::{Frame, Spot};
use super::style::{INK, LIGHT, MARK_STROKE, PAPER, RADIUS, RING, THIN};
use crate::findings::SeriesFinding;
use crate::terms::Reading;

/// What a mark stands for.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Mark {
    /// A measured value.
    Measured,
    /// A value under its limit.
    Below,
    /// A value between two.
    Between,
    /// A value above the range.
    Above,
}

impl Mark {
    /// The mark of a reading.
    #[must_use]
    pub fn of(reading: Reading) -> Self {
        match reading {
            Reading::Measured(_) => Self::Measured,
            Reading::Below(_) => Self::Below,
            Reading::Between(..) => Self::Between,
            Reading::Above(_) => Self::Above,
        }
    }
}

/// How a mark is varied.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Variant {
    /// With a ring.
    pub estimated: bool,
    /// Dark, or light and crossed.
    pub in_fit: bool,
}

/// Every reading of the series.
pub fn readings(canvas: &Canvas<'_>, frame: &Frame, series: &SeriesFinding) {
    let (_, _, _, bottom) = frame.rectangle();
    for value in &series.values {
        let Some(at) = frame.spot(value.date, value.reading.number()) else { continue };
        let foot = match value.reading {
            Reading::Between(low, _) => frame.y(low).unwrap_or(bottom),
            _ => bottom,
        };
        let variant = Variant { estimated: value.estimated, in_fit: value.in_fit };
        draw(canvas, Mark::of(value.reading), at, foot, variant);
    }
}

/// One mark; stems and bars end at `foot`.
pub fn draw(canvas: &Canvas<'_>, mark: Mark, at: Spot, foot: f64, variant: Variant) {
    let color = if variant.in_fit { INK } else { LIGHT };
    let r = f64::from(RADIUS);
    match mark {
        // The cross below is all of a measured value that is not fitted.
        Mark::Measured if !variant.in_fit => {}
        Mark::Measured => canvas.disc(at, RADIUS, color),
        Mark::Below => {
            canvas.path(&[(at.0, at.1 + r), (at.0, foot)], color, THIN);
            canvas.disc(at, RADIUS, PAPER);
            canvas.ring(at, RADIUS, color, MARK_STROKE);
        }
        Mark::Between => {
            canvas.path(&[at, (at.0, foot)], color, MARK_STROKE);
            for y in [at.1, foot] {
                canvas.path(&[(at.0 - r, y), (at.0 + r, y)], color, MARK_STROKE);
            }
        }
        Mark::Above => {
            let (wide, high) = (1.2 * r, 1.4 * r);
            let corners =
                [(at.0, at.1 - high), (at.0 + wide, at.1 + 0.7 * r), (at.0 - wide, at.1 + 0.7 * r)];
            canvas.hollow(&corners, color, MARK_STROKE);
        }
    }
    if variant.estimated {
        canvas.ring(at, RING, color, THIN);
    }
    if !variant.in_fit {
        for (dx, dy) in [(r, r), (r, -r)] {
            canvas.path(&[(at.0 - dx, at.1 - dy), (at.0 + dx, at.1 + dy)], color, MARK_STROKE);
        }
    }
}
