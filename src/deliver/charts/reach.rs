//! The reach interval as a bar on the limit line, its date as a diamond, open ends as arrows.

use chrono::NaiveDate;

use super::canvas::{Across, Along, Canvas, Words};
use super::frame::{Frame, Spot};
use super::style::{INK, LABEL, MARK_STROKE, RADIUS};
use crate::findings::SeriesFinding;
use crate::terms::Span;

/// Stroke of the bar.
const BAR: u32 = 9;
/// Half the height of the bar's end marks.
const CAP: f64 = 16.0;

/// What the bar on the limit line says.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Bar {
    /// The date the limit is met, with its interval.
    Met,
    /// The date by which it is met; the rest lies before the record.
    MetBy,
    /// The date before which it is not met; more is not known.
    NotBefore,
    /// The date a rising line crosses it.
    Crossed,
    /// All of it lies after the dates shown.
    After,
}

impl Bar {
    /// The bar of a series over the dates shown, where it has one.
    #[must_use]
    pub fn of(series: &SeriesFinding, shown: Span) -> Option<Self> {
        series.limit?;
        let (date, early, late) = dates(series);
        let first = early.or(date).or(late)?;
        Some(if first > shown.last {
            Self::After
        } else if series.exceed_date.is_some() {
            Self::Crossed
        } else if date.is_none() && late.is_none() {
            Self::NotBefore
        } else if date.is_none() && early.is_none() {
            Self::MetBy
        } else {
            Self::Met
        })
    }

    /// Its words in the legend.
    #[must_use]
    pub fn words(self) -> &'static str {
        match self {
            Self::Met => "limit met: date and interval",
            Self::MetBy => "limit met, at the latest",
            Self::NotBefore => "limit not met before",
            Self::Crossed => "limit crossed: date and early end",
            Self::After => "limit not met within the dates shown",
        }
    }

    /// Its glyph in the legend, between two ends.
    pub fn glyph(self, canvas: &Canvas<'_>, (left, y): Spot, right: f64) {
        canvas.path(&[(left, y), (right, y)], INK, BAR);
        match self {
            Self::MetBy => arrow(canvas, (left, y), -1.0),
            _ => cap(canvas, (left, y)),
        }
        match self {
            Self::Met | Self::MetBy => cap(canvas, (right, y)),
            Self::NotBefore | Self::Crossed | Self::After => arrow(canvas, (right, y), 1.0),
        }
        if matches!(self, Self::Met | Self::Crossed) {
            diamond(canvas, ((left + right) / 2.0, y));
        }
    }
}

/// Draws the bar.
pub fn interval(canvas: &Canvas<'_>, frame: &Frame, series: &SeriesFinding) {
    let Some(y) = series.limit.and_then(|limit| frame.y(limit)) else { return };
    let Some(bar) = Bar::of(series, frame.dates) else { return };
    let (left, _, right, _) = frame.rectangle();
    if bar == Bar::After {
        let anchor = (Across::Right, Along::Bottom);
        let words = Words { size: LABEL, color: INK, bold: false, anchor };
        canvas.words(bar.words(), (right - 4.0, y - 18.0), &words);
        return arrow(canvas, (right, y), 1.0);
    }
    let (date, early, late) = dates(series);
    // An early end that does not exist lies before the record, a late one after all dates.
    let from = early.map_or(f64::NEG_INFINITY, |date| frame.x(date));
    let to = late.map_or(f64::INFINITY, |date| frame.x(date));
    canvas.path(&[(from.max(left), y), (to.min(right), y)], INK, BAR);
    if from >= left {
        cap(canvas, (from, y));
    } else {
        arrow(canvas, (left, y), -1.0);
    }
    if to <= right {
        cap(canvas, (to, y));
    } else {
        arrow(canvas, (right, y), 1.0);
    }
    if let Some(x) = date.map(|date| frame.x(date)).filter(|x| (left..=right).contains(x)) {
        diamond(canvas, (x, y));
    }
}

/// The date with its early and late end.
fn dates(series: &SeriesFinding) -> (Option<NaiveDate>, Option<NaiveDate>, Option<NaiveDate>) {
    if series.exceed_date.is_some() {
        (series.exceed_date, series.exceed_earliest, None)
    } else {
        (series.reach_date, series.reach_earliest, series.reach_latest)
    }
}

/// An end that exists.
fn cap(canvas: &Canvas<'_>, at: Spot) {
    canvas.path(&[(at.0, at.1 - CAP), (at.0, at.1 + CAP)], INK, MARK_STROKE);
}

/// An end that lies outside the picture or does not exist.
fn arrow(canvas: &Canvas<'_>, at: Spot, toward: f64) {
    let back = at.0 - toward * 1.4 * CAP;
    canvas.area(&[at, (back, at.1 - CAP), (back, at.1 + CAP)], INK, 1.0);
}

/// The date itself.
fn diamond(canvas: &Canvas<'_>, at: Spot) {
    let d = 1.6 * f64::from(RADIUS);
    let corners = [(at.0, at.1 - d), (at.0 + d, at.1), (at.0, at.1 + d), (at.0 - d, at.1)];
    canvas.hollow(&corners, INK, MARK_STROKE);
}
