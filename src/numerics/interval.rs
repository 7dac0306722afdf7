//! The shapes an interval can have.

/// A two-sided interval.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Interval {
    /// Lower end.
    pub low: f64,
    /// Upper end.
    pub high: f64,
}

impl Interval {
    /// Whether zero lies inside or on an end.
    pub fn holds_zero(&self) -> bool {
        self.low <= 0.0 && 0.0 <= self.high
    }
}

/// The times at which a fitted line may meet a level: the set that the data do not exclude.
///
/// # Units
/// Those of the times the line was fitted to.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Crossing {
    /// The slope's interval excludes zero: one interval round the estimate.
    Located {
        /// Where the fitted line meets the level.
        estimate: f64,
        /// Earliest time not excluded.
        low: f64,
        /// Latest time not excluded.
        high: f64,
    },
    /// The slope's interval holds zero, and a stretch of time is excluded: every time up to
    /// `before` and every time from `after` on is not.
    TwoRays {
        /// Latest time not excluded of those before the excluded stretch; minus infinity where the
        /// slope's interval ends exactly at zero and this ray is lost.
        before: f64,
        /// Earliest time not excluded of those after it; infinity as above.
        after: f64,
    },
    /// No time is excluded: the data do not locate the crossing.
    WholeLine,
}

impl Crossing {
    /// The end of the excluded stretch that `from` lies in, if it ends after `from`.
    ///
    /// # None
    /// Where `from` itself is not excluded, or the exclusion goes on for ever.
    pub fn excluded_until(&self, from: f64) -> Option<f64> {
        match *self {
            Crossing::Located { low, .. } if from < low => Some(low),
            Crossing::TwoRays { before, after } if before < from && from < after => {
                after.is_finite().then_some(after)
            }
            _ => None,
        }
    }
}
