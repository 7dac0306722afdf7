//! What the program says of a record, and whether it is true: the rate's interval and the earliest
//! and latest date.

use ebbwell::numerics::{Crossing, FirstOrder, Interval, Mark, first_order};

use super::records::{Record, Truth};

/// Confidence of every interval here (two-sided).
pub const CONFIDENCE: f64 = 0.90;

/// Dates that a rate needs. Source: the ruling on verdicts, `rate-needs`.
const DATES_NEEDED: usize = 4;

/// Measured dates that a rate needs. Source: as above.
const DETECTS_NEEDED: usize = 3;

/// Which side of an interval the truth lies on.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Truths {
    /// Inside, or there is no end on its side.
    Covered,
    /// Under the lower or before the earlier end.
    Under,
    /// Over the upper or after the later end.
    Over,
}

/// The interval of a fit, open where an end does not exist.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Ends {
    /// Lower or earlier end.
    pub low: f64,
    /// Upper or later end.
    pub high: f64,
}

impl Ends {
    /// Where the truth lies.
    pub fn holds(&self, truth: f64) -> Truths {
        if truth < self.low {
            Truths::Under
        } else if truth > self.high {
            Truths::Over
        } else {
            Truths::Covered
        }
    }
}

/// The interval of the rate, which is minus the slope.
pub fn rate(slope: Interval) -> Ends {
    Ends { low: -slope.high, high: -slope.low }
}

/// The fit of a record, where the gates of a rate let it through. The gates of a date play no part:
/// nothing here depends on a date being printed.
pub fn fitted(record: &Record) -> Option<FirstOrder> {
    // Every date has one value here.
    let measured = record.points().count(Mark::Measured);
    if record.t.len() < DATES_NEEDED || measured < DETECTS_NEEDED {
        return None;
    }
    first_order(record.points()).ok()
}

/// The earliest and the latest time at which the limit `y0` may be met, as the program tells them.
///
/// # Formula
/// ```text
/// the rate's interval excludes zero:  both ends of the crossing
/// it does not:                        no latest; an earliest where the limit is excluded at the
///                                     last date, for as long as it is
/// ```
pub fn reach(fit: &FirstOrder, last: f64, y0: f64) -> Ends {
    match fit.crossing(y0, CONFIDENCE) {
        Crossing::Located { low, high, .. } => Ends { low, high },
        Crossing::TwoRays { .. } | Crossing::WholeLine => {
            let earliest = fit.earliest_crossing_after(last, y0, CONFIDENCE);
            Ends { low: earliest.unwrap_or(f64::NEG_INFINITY), high: f64::INFINITY }
        }
    }
}

/// What became of one run.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Run {
    /// Measured dates.
    pub detects: usize,
    /// Where the true rate and the true date lie; nothing where the gates refused.
    pub told: Option<(Truths, Truths)>,
}

impl Run {
    /// Fits a record and holds the truth against it: the limit is met one length of the record
    /// after its last date.
    pub fn of(truth: &Truth, record: &Record) -> Run {
        let told = fitted(record).map(|fit| {
            let met = 2.0 * truth.last();
            let rate = rate(fit.slope_interval(CONFIDENCE)).holds(truth.rate);
            (rate, reach(&fit, truth.last(), truth.level(met)).holds(met))
        });
        Run { detects: record.detects(), told }
    }
}

/// Source: by hand.
#[test]
fn an_open_end_covers() {
    let open = Ends { low: 1.0, high: f64::INFINITY };
    assert_eq!(open.holds(1e300), Truths::Covered);
    assert_eq!(open.holds(0.9), Truths::Under);
    assert_eq!(Ends { low: 1.0, high: 2.0 }.holds(2.1), Truths::Over);
}

/// Source: W16, series B2 of the methods note: no latest, an earliest of 10.66; and none at all for
/// a limit in the middle of the data.
#[test]
fn a_rate_that_is_not_shown_gives_no_latest_date() {
    let t: Vec<f64> = (0..8).map(f64::from).collect();
    let y = vec![3.9, 3.0, 3.8, 2.7, 3.9, 3.0, 3.3, 3.2];
    let record = Record { t, y, mark: vec![Mark::Measured; 8] };
    let fit = fitted(&record).expect("eight dates");
    let far = reach(&fit, 7.0, 0.0);
    assert!(far.low > 7.0 && far.high == f64::INFINITY, "{far:?}");
    let near = reach(&fit, 7.0, 3.3);
    assert_eq!(near, Ends { low: f64::NEG_INFINITY, high: f64::INFINITY });
}
