//! Whether groups of values lie at one height.

use std::collections::BTreeMap;

use super::tails;

/// Kruskal and Wallis' test.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct KruskalWallis {
    /// Number of groups with a value.
    pub groups: usize,
    /// Number of values in the smallest of them.
    pub smallest: usize,
    /// H, corrected for ties.
    pub h: f64,
    /// Degrees of freedom: groups − 1.
    pub degrees: f64,
    /// Probability of an H this large or larger where all groups have one distribution.
    pub p: f64,
}

/// Tests whether groups of values lie at one height, by ranks.
///
/// # Formula
/// ```text
/// H = (n − 1)·Σ_g n_g(R̄_g − R̄)² / Σᵢ(Rᵢ − R̄)²     p = P(χ² > H), groups − 1 degrees of freedom
/// ```
/// where `R` are the ranks, tied values sharing the mean of theirs, and R̄ = (n + 1)/2. This is the
/// usual 12/(n(n+1))·Σ R_g²/n_g − 3(n+1) over 1 − Σ(u³ − u)/(n³ − n), u the sizes of ties.
///
/// # Units
/// Any rising transform of the values gives the same answer; `groups` holds a label for each value.
///
/// # Limits
/// The χ² tail is fair from three values a group on. A trend shows as a difference between groups
/// and hides one: take it out first.
///
/// # None
/// Fewer than two groups, all values equal, or slices of different length.
///
/// # Reference
/// Kruskal & Wallis (1952), J. Am. Stat. Assoc. 47:583–621 [from memory]. Worked
/// examples W06, W07 and W12.
pub fn kruskal_wallis(values: &[f64], groups: &[usize]) -> Option<KruskalWallis> {
    if values.len() != groups.len() {
        return None;
    }
    let n = values.len() as f64;
    let middle = 0.5 * (n + 1.0);
    let mut sums: BTreeMap<usize, GroupSum> = BTreeMap::new();
    let mut all = 0.0;
    for (rank, &group) in mid_ranks(values).iter().zip(groups) {
        let off = rank - middle;
        let sum = sums.entry(group).or_default();
        sum.n += 1;
        sum.ranks += off;
        all += off * off;
    }
    if sums.len() < 2 || all <= 0.0 {
        return None;
    }
    let between: f64 = sums.values().map(|sum| sum.ranks * sum.ranks / sum.n as f64).sum();
    let h = (n - 1.0) * between / all;
    let degrees = sums.len() as f64 - 1.0;
    Some(KruskalWallis {
        groups: sums.len(),
        smallest: sums.values().map(|sum| sum.n).min()?,
        h,
        degrees,
        p: tails::chi_squared_upper(h, degrees),
    })
}

/// Values of one group and their ranks about the middle one.
#[derive(Default)]
struct GroupSum {
    n: usize,
    ranks: f64,
}

/// Ranks counted from 1, in the order given; equal values share the mean of their ranks.
///
/// # Formula
/// ```text
/// Rᵢ = 1 + #{xⱼ < xᵢ} + ½·#{j ≠ i : xⱼ = xᵢ}
/// ```
///
/// # Units
/// Ranks.
///
/// # Limits
/// Finite values.
///
/// # Reference
/// Definition.
pub fn mid_ranks(values: &[f64]) -> Vec<f64> {
    let mut order: Vec<usize> = (0..values.len()).collect();
    order.sort_unstable_by(|&i, &j| values[i].total_cmp(&values[j]));
    let mut ranks = vec![0.0; values.len()];
    let mut before = 0;
    for tied in order.chunk_by(|&i, &j| values[i] == values[j]) {
        let shared = before as f64 + 0.5 * (tied.len() as f64 + 1.0);
        tied.iter().for_each(|&i| ranks[i] = shared);
        before += tied.len();
    }
    ranks
}
