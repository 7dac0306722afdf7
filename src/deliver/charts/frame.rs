//! From dates and concentrations to the drawing.

use chrono::{Datelike, NaiveDate};

use super::log_axis::LogAxis;
use super::style::{AXIS_ROOM, LEGEND_BOTTOM, LEGEND_ROW, PLOT_TOP, PLOT_X};
use crate::findings::SeriesFinding;
use crate::terms::{Reading, Span};

/// How far the fitted line may stretch the concentration axis beyond readings and limit.
const LINE_STRETCH: f64 = 10.0;
/// How far its band may, over the record.
const BAND_STRETCH: f64 = 4.0;

/// The plot's rectangle and what its edges mean.
#[derive(Clone, Debug)]
pub struct Frame {
    /// The dates shown.
    pub dates: Span,
    /// The concentration axis.
    pub levels: LogAxis,
    /// Left, top, right, bottom in drawing units.
    pub edges: (i32, i32, i32, i32),
}

/// A point in drawing units before it is rounded.
pub type Spot = (f64, f64);

impl Frame {
    /// The frame of a series over the dates shown, above `legend_rows` rows of legend.
    #[must_use]
    pub fn of(series: &SeriesFinding, dates: Option<Span>, legend_rows: i32) -> Self {
        let year = |year| NaiveDate::from_ymd_opt(year, 1, 1).unwrap_or(NaiveDate::MIN);
        let empty = Span { first: year(2000), last: year(2001) };
        let dates = dates.unwrap_or(empty);
        let bottom = LEGEND_BOTTOM - legend_rows * LEGEND_ROW - AXIS_ROOM;
        let levels = LogAxis::holding(levels(series, dates));
        Self { dates, levels, edges: (PLOT_X.0, PLOT_TOP, PLOT_X.1, bottom) }
    }

    /// Where a date lies from the left.
    #[must_use]
    pub fn x(&self, date: NaiveDate) -> f64 {
        let day = |date: NaiveDate| f64::from(date.num_days_from_ce());
        let (left, _, right, _) = self.edges;
        let share =
            (day(date) - day(self.dates.first)) / (day(self.dates.last) - day(self.dates.first));
        f64::from(left) + share * f64::from(right - left)
    }

    /// Where a concentration lies from the top; none where it has no logarithm.
    #[must_use]
    pub fn y(&self, level: f64) -> Option<f64> {
        (level.is_finite() && level > 0.0).then(|| self.y_of_log(level.log10()))
    }

    /// Where a decimal logarithm lies from the top.
    #[must_use]
    pub fn y_of_log(&self, log: f64) -> f64 {
        let (_, top, _, bottom) = self.edges;
        let share = (log - self.levels.low) / (self.levels.high - self.levels.low);
        f64::from(bottom) - share * f64::from(bottom - top)
    }

    /// Where a level on a date lies.
    #[must_use]
    pub fn spot(&self, date: NaiveDate, level: f64) -> Option<Spot> {
        Some((self.x(date), self.y(level)?))
    }

    /// The rectangle as (left, top, right, bottom).
    #[must_use]
    pub fn rectangle(&self) -> (f64, f64, f64, f64) {
        let (left, top, right, bottom) = self.edges;
        (f64::from(left), f64::from(top), f64::from(right), f64::from(bottom))
    }
}

/// Every concentration the axis has to hold: readings, the limit, and the line within reason.
fn levels(series: &SeriesFinding, dates: Span) -> Vec<f64> {
    let mut levels: Vec<f64> = series.values.iter().map(|value| value.reading.number()).collect();
    levels.extend(series.values.iter().filter_map(|value| match value.reading {
        Reading::Between(low, _) => Some(low),
        _ => None,
    }));
    levels.extend(series.limit);
    let positive = || levels.iter().copied().filter(|level| *level > 0.0);
    let least = positive().fold(f64::INFINITY, f64::min);
    let most = positive().fold(0.0, f64::max);
    let Some(fitted) = &series.fitted else { return levels };
    let shown = fitted.band.iter().filter(|p| (dates.first..=dates.last).contains(&p.date));
    let within = least / LINE_STRETCH..=most * LINE_STRETCH;
    levels.extend(shown.map(|point| point.median).filter(|median| within.contains(median)));
    let over_record = fitted.band.iter().filter(|point| point.date <= fitted.used.last);
    let (low, high) = (least / BAND_STRETCH, most * BAND_STRETCH);
    levels.extend(over_record.flat_map(|p| [p.low.max(low), p.high.min(high)]));
    levels
}

/// A length in drawing units as the backend takes it.
#[must_use]
pub fn whole(length: f64) -> i32 {
    // The drawing is a few thousand units wide, and what lies outside is clipped before.
    #[allow(clippy::cast_possible_truncation)]
    let whole = length.round().clamp(-1e6, 1e6) as i32;
    whole
}
