//! Estimates, tests and intervals on plain slices of numbers.
//!
//! Nothing here knows of dates, units, words for people, files or threads: a caller hands over
//! times in years and natural logarithms of concentrations, and gets numbers back.
//!
//! The order of the `mod` lines is the order of dependence: a file uses only what stands above it.
//!
//! | question | answered by |
//! |---|---|
//! | how fast does it fall | [`first_order()`] |
//! | how sure is that | [`FirstOrder::slope_interval`] |
//! | where does the line stand at a time | [`FirstOrder::level_interval`] |
//! | when does the line meet a level | [`FirstOrder::crossing`] |
//! | is there any monotonic trend | [`mann_kendall`]; with non-detects [`certain_pairs()`] |
//! | is there a fall | [`falling_p`] |
//! | what is the slope if a few values are wild | [`theil_sen()`] |
//! | does one point decide the line | [`deletion_diagnostics`], [`farthest`] |
//! | do neighbouring residuals resemble each other | [`lag_one`], [`durbin_watson`] |
//! | which of many p-values stand | [`benjamini_hochberg`] |

pub mod normal;
pub mod tails;
pub mod points;
pub mod interval;
pub mod line;
pub mod scaling;
pub mod likelihood;
pub mod peak;
pub mod target;
pub mod ends;
pub mod censored;
pub mod stretches;
pub mod censored_ends;
pub mod existence;
pub mod first_order;
pub mod inversions;
pub mod exact_kendall;
pub mod kendall;
pub mod certain_pairs;
pub mod slope_selection;
pub mod theil_sen;
pub mod residuals;
pub mod deletion;
pub mod many;

pub use censored::{CensoredLine, Covariance};
pub use certain_pairs::{CertainPairs, certain_pairs};
pub use deletion::{Deletion, Farthest, deletion_diagnostics, farthest};
pub use first_order::{FirstOrder, Kind, first_order};
pub use interval::{Crossing, Interval};
pub use kendall::{MannKendall, PValue, falling_p, mann_kendall};
pub use many::benjamini_hochberg;
pub use points::{BadPoints, Mark, NoLine, Point, Points};
pub use residuals::{durbin_watson, lag_one};
pub use scaling::Parameters;
pub use stretches::{End, Side};
pub use theil_sen::{TheilSen, median, theil_sen};
