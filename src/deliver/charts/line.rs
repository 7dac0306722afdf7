//! The fitted line with its band: solid between the first and the last used date, dashed beyond.

use chrono::NaiveDate;

use super::canvas::Canvas;
use super::clip;
use super::frame::{Frame, Spot};
use super::style::{BAND_OPACITY, DASH, LINE, LINE_STROKE, THIN};
use crate::findings::{BandPoint, SeriesFinding};

/// The band as a light area with thin edges.
pub fn band(canvas: &Canvas<'_>, frame: &Frame, series: &SeriesFinding) {
    let Some(fitted) = &series.fitted else { return };
    let inside = frame.rectangle();
    let along = |pick: fn(&BandPoint) -> f64| -> Vec<Spot> {
        fitted.band.iter().filter_map(|p| frame.spot(p.date, pick(p))).collect()
    };
    let (low, high) = (along(|p| p.low), along(|p| p.high));
    let outline: Vec<Spot> = high.iter().copied().chain(low.iter().rev().copied()).collect();
    canvas.area(&clip::area(&outline, inside), LINE, BAND_OPACITY);
    canvas.clipped(&low, inside, LINE, THIN);
    canvas.clipped(&high, inside, LINE, THIN);
}

/// The line.
pub fn line(canvas: &Canvas<'_>, frame: &Frame, series: &SeriesFinding) {
    let Some(fitted) = &series.fitted else { return };
    let inside = frame.rectangle();
    let (first, last) = (fitted.used.first, fitted.used.last);
    canvas.clipped(&stretch(frame, &fitted.band, first, last), inside, LINE, LINE_STROKE);
    let beyond = stretch(frame, &fitted.band, last, frame.dates.last);
    canvas.dashed(&beyond, inside, LINE, LINE_STROKE, DASH);
}

/// The line from one date to another, its ends found between the neighbouring points: the line is
/// straight on the logarithmic axis.
fn stretch(frame: &Frame, band: &[BandPoint], from: NaiveDate, to: NaiveDate) -> Vec<Spot> {
    let spots: Vec<(NaiveDate, Spot)> = band
        .iter()
        .filter_map(|point| Some((point.date, frame.spot(point.date, point.median)?)))
        .collect();
    let mut line = Vec::new();
    line.extend(between(frame, &spots, from));
    line.extend(spots.iter().filter(|(date, _)| from < *date && *date < to).map(|(_, spot)| *spot));
    line.extend(between(frame, &spots, to));
    line
}

/// The line's point on a date; none outside its points.
fn between(frame: &Frame, spots: &[(NaiveDate, Spot)], date: NaiveDate) -> Option<Spot> {
    let pair = spots.windows(2).find(|pair| pair[0].0 <= date && date <= pair[1].0)?;
    let (a, b, x) = (pair[0].1, pair[1].1, frame.x(date));
    let share = if b.0 > a.0 { (x - a.0) / (b.0 - a.0) } else { 0.0 };
    Some((x, a.1 + share * (b.1 - a.1)))
}
