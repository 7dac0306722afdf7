//! What a fit is made from, and why there may be none.

/// How one value is known.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Mark {
    /// The value was measured.
    Measured,
    /// The value is known only to be at most the one given: a non-detect.
    Below,
    /// The value is known only to be at least the one given.
    Above,
}

/// Times and values of one series, checked once so that no routine checks them again.
///
/// # Units
/// `t` in years (or any one unit of time), `y` in ln(concentration), or ln of the limit where the
/// mark is not [`Mark::Measured`].
#[derive(Clone, Copy, Debug)]
pub struct Points<'a> {
    t: &'a [f64],
    y: &'a [f64],
    mark: &'a [Mark],
}

/// Why slices are no [`Points`].
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
pub enum BadPoints {
    /// The three slices have different lengths.
    #[error("{times} times, {values} values and {marks} marks: the three must be equally many")]
    Lengths {
        /// Number of times.
        times: usize,
        /// Number of values.
        values: usize,
        /// Number of marks.
        marks: usize,
    },
    /// A time or a value is infinite or not a number.
    #[error("time or value {index} (counted from 0) is not a finite number")]
    NotFinite {
        /// The first such point, counted from 0.
        index: usize,
    },
}

impl<'a> Points<'a> {
    /// Checks that the slices are equally long and every number is finite.
    ///
    /// # Errors
    /// [`BadPoints`] names the first thing wrong.
    pub fn new(t: &'a [f64], y: &'a [f64], mark: &'a [Mark]) -> Result<Self, BadPoints> {
        if t.len() != y.len() || t.len() != mark.len() {
            return Err(BadPoints::Lengths { times: t.len(), values: y.len(), marks: mark.len() });
        }
        let bad = t.iter().zip(y).position(|(t, y)| !(t.is_finite() && y.is_finite()));
        match bad {
            Some(index) => Err(BadPoints::NotFinite { index }),
            None => Ok(Points { t, y, mark }),
        }
    }

    /// Number of points, measured or not.
    pub fn len(&self) -> usize {
        self.t.len()
    }

    /// Whether there are no points.
    pub fn is_empty(&self) -> bool {
        self.t.is_empty()
    }

    /// The times.
    pub fn t(&self) -> &'a [f64] {
        self.t
    }

    /// The values, or the bounds where a value is not measured.
    pub fn y(&self) -> &'a [f64] {
        self.y
    }

    /// How each value is known.
    pub fn mark(&self) -> &'a [Mark] {
        self.mark
    }

    /// Whether every value was measured.
    pub fn all_measured(&self) -> bool {
        self.mark.iter().all(|&mark| mark == Mark::Measured)
    }

    /// Number of points with this mark.
    pub fn count(&self, wanted: Mark) -> usize {
        self.mark.iter().filter(|&&mark| mark == wanted).count()
    }

    /// The points in turn.
    pub fn iter(&self) -> impl Iterator<Item = Point> + use<'a> {
        self.t.iter().zip(self.y).zip(self.mark).map(|((&t, &y), &mark)| Point { t, y, mark })
    }
}

/// One point of a series.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Point {
    /// Its time.
    pub t: f64,
    /// Its value, or the bound.
    pub y: f64,
    /// How the value is known.
    pub mark: Mark,
}

/// Why no line can be fitted.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum NoLine {
    /// Fewer than three distinct dates.
    TooFewDates {
        /// How many there are.
        dates: usize,
    },
    /// Measured values on fewer than three distinct dates.
    TooFewDetects {
        /// On how many dates there are measured values.
        dates: usize,
    },
    /// All points, or all measured ones, share one date.
    OneDate,
    /// The measured values lie exactly on a line that no other point contradicts: the scatter
    /// would be zero and its likelihood has no maximum.
    OnALine,
    /// The search for the maximum did not end.
    NotConverged {
        /// Steps taken.
        steps: usize,
    },
}
