//! Grid, axes, the limit and the goal date.

use super::canvas::{Across, Along, Canvas, Words};
use super::frame::Frame;
use super::style::{DOTS, GRID, INK, LABEL, LIGHT, LIMIT, LIMIT_STROKE, MARK_STROKE, THIN};
use super::time_axis;
use crate::findings::SeriesFinding;
use crate::words::number::{month, table};

/// Length of a labelled tick and of a small one.
const TICKS: (f64, f64) = (14.0, 7.0);

/// Words in ink at label size.
fn label(anchor: (Across, Along)) -> Words {
    Words { size: LABEL, color: INK, bold: false, anchor }
}

/// Lines of the grid under everything, one a label.
pub fn grid(canvas: &Canvas<'_>, frame: &Frame) {
    let (left, top, right, bottom) = frame.rectangle();
    for tick in frame.levels.ticks.iter().filter(|tick| tick.label.is_some()) {
        let y = frame.y_of_log(tick.log);
        canvas.path(&[(left, y), (right, y)], GRID, THIN);
    }
    for tick in time_axis::ticks(frame.dates).iter().filter(|tick| tick.label.is_some()) {
        let x = frame.x(tick.date);
        canvas.path(&[(x, top), (x, bottom)], GRID, THIN);
    }
}

/// The axes with their ticks and labels, and the unit above.
pub fn axes(canvas: &Canvas<'_>, frame: &Frame, unit: &str) {
    let (left, top, right, bottom) = frame.rectangle();
    canvas.path(&[(left, top), (left, bottom), (right, bottom)], INK, MARK_STROKE);
    for tick in &frame.levels.ticks {
        let y = frame.y_of_log(tick.log);
        let length = if tick.label.is_some() { TICKS.0 } else { TICKS.1 };
        canvas.path(&[(left - length, y), (left, y)], INK, THIN);
        if let Some(text) = &tick.label {
            canvas.words(text, (left - 22.0, y), &label((Across::Right, Along::Center)));
        }
    }
    for tick in time_axis::ticks(frame.dates) {
        let x = frame.x(tick.date);
        let length = if tick.label.is_some() { TICKS.0 } else { TICKS.1 };
        canvas.path(&[(x, bottom), (x, bottom + length)], INK, THIN);
        if let Some(text) = &tick.label {
            canvas.words(text, (x, bottom + 22.0), &label((Across::Center, Along::Top)));
        }
    }
    let above = Words { color: LIGHT, ..label((Across::Left, Along::Bottom)) };
    canvas.words(&format!("{unit}, logarithmic"), (left - 120.0, top - 20.0), &above);
}

/// The limit as a line with its name at its end.
pub fn limit(canvas: &Canvas<'_>, frame: &Frame, series: &SeriesFinding) {
    let Some(limit) = series.limit else { return };
    let Some(y) = frame.y(limit) else { return };
    let (left, _, right, _) = frame.rectangle();
    canvas.path(&[(left, y), (right, y)], LIMIT, LIMIT_STROKE);
    let name = Words { color: LIMIT, bold: true, ..label((Across::Left, Along::Center)) };
    let value = format!("{} {}", table(limit), series.unit.label());
    canvas.words("limit", (right + 12.0, y - 15.0), &name);
    canvas.words(&value, (right + 12.0, y + 15.0), &name);
}

/// The goal date as a dotted line with its name at the top, if it lies in the picture.
pub fn goal(canvas: &Canvas<'_>, frame: &Frame, series: &SeriesFinding) {
    let Some(goal) = series.goal_date else { return };
    if goal < frame.dates.first || goal > frame.dates.last {
        return;
    }
    let (_, top, right, bottom) = frame.rectangle();
    let x = frame.x(goal);
    canvas.dashed(&[(x, top), (x, bottom)], frame.rectangle(), INK, MARK_STROKE, DOTS);
    // Near the right edge the name runs to the left, so that it stays in the picture.
    let (across, dx) = if x > right - 200.0 { (Across::Right, -8.0) } else { (Across::Left, 8.0) };
    let name = label((across, Along::Top));
    canvas.words(&format!("goal {}", month(goal)), (x + dx, top + 4.0), &name);
}
