//! The legend, by shapes; only what occurs in the chart.

use super::canvas::{Across, Along, Canvas, Words};
use super::frame::{Frame, Spot};
use super::marks::{self, Mark, Variant};
use super::reach::Bar;
use super::style::{
    AXIS_ROOM, BAND_OPACITY, DASH, INK, LABEL, LEGEND_COLUMN, LEGEND_ROW, LINE, LINE_STROKE,
    PLOT_X, THIN,
};
use crate::findings::SeriesFinding;
use crate::terms::Span;
use crate::words::number::confidence;

/// Entries in a row.
const ACROSS: usize = 3;
/// Width of a glyph.
const GLYPH: f64 = 70.0;

/// What one entry shows.
#[derive(Clone, Debug, PartialEq)]
pub enum Glyph {
    /// A reading.
    Reading(Mark, Variant),
    /// The solid line.
    Line,
    /// The dashed line.
    Projection,
    /// The band.
    Band,
    /// The bar on the limit line.
    Interval(Bar),
}

/// Glyph and words.
pub type Entry = (Glyph, String);

/// The entries of a chart.
#[must_use]
pub fn entries(series: &SeriesFinding, shown: Option<Span>, level: f64) -> Vec<Entry> {
    let plain = Variant { estimated: false, in_fit: true };
    let fitted = || series.values.iter().filter(|value| value.in_fit);
    let occurs = |mark: Mark| fitted().any(|value| Mark::of(value.reading) == mark);
    let mut entries = Vec::new();
    for (mark, words) in [
        (Mark::Measured, "measured"),
        (Mark::Below, "not detected, at its own limit"),
        (Mark::Between, "known to lie between two values"),
        (Mark::Above, "above the instrument's range"),
    ] {
        if occurs(mark) {
            entries.push((Glyph::Reading(mark, plain), words.to_owned()));
        }
    }
    if series.values.iter().any(|value| value.estimated) {
        let variant = Variant { estimated: true, ..plain };
        entries.push((Glyph::Reading(Mark::Measured, variant), "estimated".to_owned()));
    }
    if series.values.iter().any(|value| !value.in_fit) {
        let variant = Variant { in_fit: false, ..plain };
        entries.push((Glyph::Reading(Mark::Measured, variant), "not in the fit".to_owned()));
    }
    if let Some(fitted) = &series.fitted {
        entries.push((Glyph::Line, "fitted median".to_owned()));
        if fitted.band.last().is_some_and(|point| point.date > fitted.used.last) {
            entries.push((Glyph::Projection, "the same, beyond the data".to_owned()));
        }
        entries.push((Glyph::Band, format!("its {} interval", confidence(level))));
    }
    let bar = shown.and_then(|shown| Bar::of(series, shown));
    // A bar that lies outside the picture is named at its arrow.
    if let Some(bar) = bar.filter(|bar| *bar != Bar::After) {
        entries.push((Glyph::Interval(bar), bar.words().to_owned()));
    }
    entries
}

/// Rows that so many entries take.
#[must_use]
pub fn rows(entries: usize) -> i32 {
    i32::try_from(entries.div_ceil(ACROSS)).unwrap_or(i32::MAX)
}

/// Draws the entries under the time axis.
pub fn draw(canvas: &Canvas<'_>, frame: &Frame, entries: &[Entry]) {
    let words =
        Words { size: LABEL, color: INK, bold: false, anchor: (Across::Left, Along::Center) };
    let top = f64::from(frame.edges.3 + AXIS_ROOM);
    let (mut column, mut row) = (0, 0);
    for (glyph, text) in entries {
        let left = f64::from(PLOT_X.0 - 120 + column * LEGEND_COLUMN);
        let y = top + f64::from(row * LEGEND_ROW);
        draw_glyph(canvas, glyph, (left, y));
        canvas.words(text, (left + GLYPH + 14.0, y), &words);
        column += 1;
        if usize::try_from(column).is_ok_and(|column| column >= ACROSS) {
            (column, row) = (0, row + 1);
        }
    }
}

/// One glyph, centred on the height of its words.
fn draw_glyph(canvas: &Canvas<'_>, glyph: &Glyph, (left, y): Spot) {
    let (middle, right) = (left + GLYPH / 2.0, left + GLYPH);
    let everywhere = (left, y - 30.0, right, y + 30.0);
    match glyph {
        Glyph::Reading(mark, variant) => {
            // A bar or a stem needs room under the mark.
            let up = if matches!(mark, Mark::Below | Mark::Between) { 7.0 } else { 0.0 };
            marks::draw(canvas, *mark, (middle, y - up), y + 16.0, *variant);
        }
        Glyph::Line => canvas.path(&[(left, y), (right, y)], LINE, LINE_STROKE),
        Glyph::Projection => {
            canvas.dashed(&[(left, y), (right, y)], everywhere, LINE, LINE_STROKE, DASH);
        }
        Glyph::Band => {
            let (top, bottom) = (y - 12.0, y + 12.0);
            let outline = [(left, top), (right, top), (right, bottom), (left, bottom)];
            canvas.area(&outline, LINE, BAND_OPACITY);
            canvas.path(&outline[..2], LINE, THIN);
            canvas.path(&outline[2..], LINE, THIN);
        }
        Glyph::Interval(bar) => bar.glyph(canvas, (left + 4.0, y), right - 4.0),
    }
}
