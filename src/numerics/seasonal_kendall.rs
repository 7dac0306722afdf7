//! Kendall's test within seasons, taken together.

use super::certain_counts::{certain_counts, daniels_variance};
use super::critical_slopes::{CriticalSlopes, Ends};
use super::normal;
use super::points::{Mark, Points};
use super::tails;

/// Kendall's test of one season.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SeasonTest {
    /// The season's label.
    pub season: usize,
    /// Number of values.
    pub n: usize,
    /// Rises less falls within the season.
    pub s: i64,
    /// Variance of that without a trend, corrected for ties.
    pub variance: f64,
}

/// Whether the seasons have one trend.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Heterogeneity {
    /// χ² of the differences between seasons.
    pub chi_squared: f64,
    /// Its degrees of freedom: seasons with a test, less one.
    pub degrees: f64,
    /// Probability of as large a χ² where all seasons have one trend.
    pub p: f64,
    /// χ² of the trend that they share, with one degree of freedom.
    pub trend: f64,
}

/// The seasonal test of Hirsch, Slack and Smith.
#[derive(Clone, Debug, PartialEq)]
pub struct SeasonalKendall {
    /// Each season with a value, by its label.
    pub seasons: Vec<SeasonTest>,
    /// Sum of the S of the seasons: negative when falling.
    pub s: i64,
    /// Sum of their variances.
    pub variance: f64,
    /// S less its own sign, over its standard deviation; 0 where the variance is.
    pub z: f64,
    /// Two-sided p from the normal distribution.
    pub p: f64,
    /// Kendall's tau of the seasons, weighted by their numbers of values.
    pub tau: f64,
    /// Median of the slopes of pairs within a season. None where no season has two times.
    pub slope: Option<f64>,
    /// Gilbert's interval of that slope; its ends are open together.
    pub ends: Ends,
    /// Whether the seasons differ. None with fewer than two seasons that have a test.
    pub heterogeneity: Option<Heterogeneity>,
}

/// Tests for a trend that is not mistaken for the seasons, nor the seasons for it.
///
/// # Formula
/// ```text
/// S = Σ_g S_g     Var = Σ_g Var_g     Z = (S − sign S)/√Var     tau = Σ n_g·tau_g / Σ n_g
/// b = median of (yⱼ − yᵢ)/(tⱼ − tᵢ), i and j of one season     C = z·√Var, ranks as in `theil_sen`
/// Z_g = S_g/√Var_g     trend χ² = p·Z̄²     χ² of differences = Σ(Z_g − Z̄)², p − 1 degrees
/// ```
/// where g are the seasons, of which those with a single value count for nothing, and p is the number of
/// those whose variance is over zero.
///
/// # Units
/// `t` in years, `y` in ln(concentration): the slope is per year. `season` holds a label for each
/// point; `confidence` is a probability.
///
/// # Limits
/// Seasons are taken as independent of each other. Z is fair from about ten values in all on. Where
/// the seasons differ, S and the slope stand for none of them.
///
/// # None
/// Slices of different length, values that are not finite, or no season with two values.
///
/// # Reference
/// Hirsch, Slack & Smith (1982), Water Resour. Res. 18:107–121; van Belle & Hughes (1984), Water
/// Resour. Res. 20:127–136; Gilbert (1987), p. 227 [second hand]. Worked example W06.
pub fn seasonal_kendall(
    t: &[f64],
    y: &[f64],
    season: &[usize],
    confidence: f64,
) -> Option<SeasonalKendall> {
    let mark = vec![Mark::Measured; t.len()];
    let points = Points::new(t, y, &mark).ok()?;
    let mut slopes = CriticalSlopes::within(points, season)?;
    let seasons = by_season(points, season);
    let tested = seasons.iter().filter(|season| season.n > 1);
    let (mut s, mut variance, mut tau, mut values) = (0, 0.0, 0.0, 0.0);
    for season in tested {
        s += season.s;
        variance += season.variance;
        tau += season.s as f64 / (0.5 * (season.n as f64 - 1.0));
        values += season.n as f64;
    }
    if values == 0.0 {
        return None;
    }
    let z = if variance > 0.0 { (s - s.signum()) as f64 / variance.sqrt() } else { 0.0 };
    let zero = slopes.zero();
    let quantile = tails::normal_quantile(0.5 * (1.0 - confidence));
    Some(SeasonalKendall {
        s,
        variance,
        z,
        p: normal::two_sided(z),
        tau: tau / values,
        slope: zero.map(|zero| zero.low + 0.5 * (zero.high - zero.low)),
        ends: slopes.ends(quantile * variance.sqrt()),
        heterogeneity: heterogeneity(&seasons),
        seasons,
    })
}

fn by_season(points: Points<'_>, season: &[usize]) -> Vec<SeasonTest> {
    let mut order: Vec<usize> = (0..points.len()).collect();
    order.sort_by_key(|&i| season[i]);
    let groups = order.chunk_by(|&i, &j| season[i] == season[j]);
    let one = |group: &[usize]| {
        let of = |all: &[f64]| group.iter().map(|&i| all[i]).collect::<Vec<f64>>();
        let (t, y, mark) = (of(points.t()), of(points.y()), vec![Mark::Measured; group.len()]);
        let (n, season) = (group.len(), season[group[0]]);
        // Values that were finite together are so apart.
        let counts = Points::new(&t, &y, &mark).ok().map(certain_counts);
        let (s, variance) = counts.map_or((0, 0.0), |counts| {
            (counts.s, daniels_variance(n, counts.values, counts.times))
        });
        SeasonTest { season, n, s, variance }
    };
    groups.map(one).collect()
}

fn heterogeneity(seasons: &[SeasonTest]) -> Option<Heterogeneity> {
    let tested = seasons.iter().filter(|season| season.variance > 0.0);
    let z: Vec<f64> = tested.map(|season| season.s as f64 / season.variance.sqrt()).collect();
    if z.len() < 2 {
        return None;
    }
    let count = z.len() as f64;
    let mean = z.iter().sum::<f64>() / count;
    let chi_squared = z.iter().map(|z| (z - mean) * (z - mean)).sum();
    let degrees = count - 1.0;
    let p = tails::chi_squared_upper(chi_squared, degrees);
    Some(Heterogeneity { chi_squared, degrees, p, trend: count * mean * mean })
}
