//! What the alternatives to the first-order line have in common.

use super::points::{Mark, Point, Points};

/// Why an alternative is not offered.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Dropped {
    /// Too few points for its parameters to be weighed.
    TooFewPoints {
        /// How many there are.
        n: usize,
        /// How many there would have to be.
        needed: usize,
    },
    /// Measured values on too few dates.
    TooFewDetects {
        /// On how many dates there are measured values.
        dates: usize,
        /// On how many there would have to be.
        needed: usize,
    },
    /// The record does not fall, so that there is nothing to level off.
    NotFalling,
    /// The record bends downwards, a plateau upwards.
    WrongCurvature,
    /// The plateau cannot be told from zero: the first-order line does nearly as well.
    NoPlateau,
    /// No break leaves enough points and enough time on both sides.
    NoRoom,
    /// The search did not end, or ended where the rate is not determined.
    NotConverged {
        /// Steps tried.
        steps: usize,
    },
}

/// Dates with measured values that a curve of three parameters and a scatter need. Source: one more
/// than the line's three, for the one parameter more.
pub const DATES_NEEDED: usize = 4;

/// Refuses records with too few points or measured dates for a model.
pub fn enough(sorted: &[Point], parameters: usize) -> Result<(), Dropped> {
    let needed = parameters + 3;
    if sorted.len() < needed {
        return Err(Dropped::TooFewPoints { n: sorted.len(), needed });
    }
    let dates = measured_dates(sorted);
    if dates < DATES_NEEDED {
        return Err(Dropped::TooFewDetects { dates, needed: DATES_NEEDED });
    }
    Ok(())
}

/// The points in the order of their times.
pub fn in_time_order(points: Points<'_>) -> Vec<Point> {
    let mut sorted: Vec<Point> = points.iter().collect();
    sorted.sort_by(|x, y| x.t.total_cmp(&y.t).then(x.y.total_cmp(&y.y)));
    sorted
}

/// Number of distinct dates with measured values, of points in the order of time.
pub fn measured_dates(sorted: &[Point]) -> usize {
    let mut last = f64::NAN;
    let mut dates = 0;
    for point in sorted.iter().filter(|point| point.mark == Mark::Measured) {
        if point.t != last {
            dates += 1;
            last = point.t;
        }
    }
    dates
}
