//! The fitted line and its band on a run of dates, for charts.

use crate::fit::Fit;
use crate::terms::{BandPoint, date_after};

/// Points over the record, enough for a smooth band.
const OVER_RECORD: i32 = 24;
/// Points beyond the record.
const BEYOND: i32 = 32;

/// The band from the first used date to `until` (years from there), but not further beyond the
/// record than `horizon` years.
#[must_use]
pub fn band(fit: &Fit, until: Option<f64>, horizon: f64) -> Vec<BandPoint> {
    let last = fit.length().0;
    let end = until.map_or(last, |until| until.clamp(last, last + horizon));
    let over = (0..=OVER_RECORD).map(|i| last * f64::from(i) / f64::from(OVER_RECORD));
    let beyond = (1..=BEYOND)
        .map(|i| last + (end - last) * f64::from(i) / f64::from(BEYOND))
        .filter(|_| end > last);
    over.chain(beyond)
        .filter_map(|years| {
            let interval = fit.line.level_interval(years, fit.confidence);
            let point = BandPoint {
                date: date_after(fit.used.first, years)?,
                median: fit.line.fitted(years).exp(),
                low: interval.low.exp(),
                high: interval.high.exp(),
            };
            // A level too large or small for a number has no place on a chart.
            let drawable = |v: f64| v.is_finite() && v > 0.0;
            [point.median, point.low, point.high].into_iter().all(drawable).then_some(point)
        })
        .collect()
}
