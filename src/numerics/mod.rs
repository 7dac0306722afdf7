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
//! | is there a trend within seasons, the same in all | [`seasonal_kendall()`] |
//! | what is the slope if a few values are wild | [`theil_sen()`] |
//! | what is it with non-detects | [`akritas_theil_sen()`] |
//! | does one point decide the line | [`deletion_diagnostics`], [`farthest`] |
//! | what is the line without it | [`left_out()`], [`farthest_left_out`] |
//! | do neighbouring residuals resemble each other | [`lag_one`], [`durbin_watson`] |
//! | do they at any spacing, and what interval is then right | [`car1()`], [`Car1::adjusted_interval`] |
//! | are the residuals normal | [`shapiro_wilk()`] |
//! | does the line bend | [`curvature()`] |
//! | do seasons differ | [`kruskal_wallis()`] |
//! | does another model do better, and when does it meet a level | [`compare`], [`Better::crossing`] |
//! | how many more rounds would show the rate | [`rounds_to_decisive`], [`Dates::rounds`] |
//! | how small a rate could the record have shown | [`Dates::smallest_rate_shown`] |
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
pub mod passing;
pub mod slope_counting;
pub mod certain_counts;
pub mod certain_pairs;
pub mod slope_selection;
pub mod slope_gaps;
pub mod slope_search;
pub mod critical_slopes;
pub mod theil_sen;
pub mod akritas_theil_sen;
pub mod seasonal_kendall;
pub mod residuals;
pub mod deletion;
pub mod shapiro_wilk;
pub mod kruskal_wallis;
pub mod car1;
pub mod cholesky;
pub mod columns;
pub mod curvature;
pub mod left_out;
pub mod many;
pub mod damped;
pub mod curve_fit;
pub mod information;
pub mod alternatives;
pub mod constant;
pub mod plateau_starts;
pub mod plateau;
pub mod broken;
pub mod break_squares;
pub mod break_bounds;
pub mod two_rates;
pub mod comparison;
pub mod noncentral;
pub mod rounds;

pub use akritas_theil_sen::{AkritasTheilSen, akritas_theil_sen};
pub use alternatives::Dropped;
pub use car1::{Car1, car1};
pub use censored::{CensoredLine, Covariance};
pub use certain_pairs::{CertainPairs, certain_pairs};
pub use comparison::{Better, Comparison, compare};
pub use constant::Constant;
pub use curvature::{Curvature, curvature};
pub use deletion::{Deletion, Farthest, deletion_diagnostics, farthest};
pub use first_order::{FirstOrder, Kind, first_order};
pub use information::{Misfit, aicc};
pub use interval::{Crossing, Interval};
pub use kendall::{MannKendall, PValue, falling_p, mann_kendall};
pub use kruskal_wallis::{KruskalWallis, kruskal_wallis};
pub use left_out::{LeftOut, Without, farthest_left_out, left_out, worth_leaving_out};
pub use many::benjamini_hochberg;
pub use noncentral::noncentral_upper;
pub use plateau::Plateau;
pub use points::{BadPoints, Mark, NoLine, Point, Points};
pub use residuals::{durbin_watson, lag_one};
pub use rounds::{Dates, Plan, median_spacing, rounds_to_decisive, rounds_to_level};
pub use scaling::Parameters;
pub use seasonal_kendall::{Heterogeneity, SeasonTest, SeasonalKendall, seasonal_kendall};
pub use shapiro_wilk::{ShapiroWilk, shapiro_wilk};
pub use stretches::{End, Side};
pub use theil_sen::{TheilSen, median, theil_sen};
pub use two_rates::TwoRates;
