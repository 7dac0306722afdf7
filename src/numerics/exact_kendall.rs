//! The exact null distribution of Kendall's S.

use std::sync::LazyLock;

/// Without ties the exact distribution is used up to this many values (a count). Source: ruled for
/// this program; the normal tail is close long before.
pub const MOST_UNTIED: usize = 40;

/// With ties the exact distribution is used up to this many values (a count). Source: ruled for
/// this program: 9! orders can be gone through one by one.
pub const MOST_TIED: usize = 9;

/// The null distribution of S, all orders of the values being equally likely.
#[derive(Clone, Debug, PartialEq)]
pub struct NullScores {
    /// Probability of each S from `−reach` to `reach`.
    probability: Vec<f64>,
    reach: i64,
}

/// Probabilities of 0, 1, … inversions, up to the middle one, for each number of untied values.
static UNTIED: LazyLock<Vec<Vec<f64>>> = LazyLock::new(untied_table);

fn untied_table() -> Vec<Vec<f64>> {
    let mut table = vec![vec![1.0], vec![1.0]];
    for n in 2..=MOST_UNTIED {
        let before = &table[n - 1];
        let most_before = (n - 1) * (n - 2) / 2;
        // The distribution is symmetric, so that the upper half need not be kept.
        let at = |q: usize| before[q.min(most_before - q)];
        let middle = n * (n - 1) / 4;
        let mut row = Vec::with_capacity(middle + 1);
        let mut window = 0.0;
        for q in 0..=middle {
            if q <= most_before {
                window += at(q);
            }
            if q >= n {
                window -= at(q - n);
            }
            row.push(window);
        }
        table.push(row);
    }
    let mut orders = 1.0;
    for (n, row) in table.iter_mut().enumerate().skip(2) {
        orders *= n as f64;
        for count in row {
            *count /= orders;
        }
    }
    table
}

/// Probability that S of untied values is at least `s`.
///
/// # Formula
/// ```text
/// c_n(q) = Σ_{j<n} c_{n−1}(q − j)     S = n(n−1)/2 − 2q     P = Σ_{q ≤ (n(n−1)/2 − s)/2} c_n(q)/n!
/// ```
/// where c_n(q) is the number of orders of n values with q inversions.
///
/// # Units
/// `s` in pairs; the answer is a probability.
///
/// # Limits
/// `n` up to 40; relative error 1e-13.
///
/// # None
/// More than 40 values.
///
/// # Reference
/// Kendall (1975), Rank Correlation Methods, ch. 5 [from memory]. Worked example W13, and scipy's
/// exact Kendall p.
pub fn untied_at_least(n: usize, s: i64) -> Option<f64> {
    if n > MOST_UNTIED {
        return None;
    }
    let pairs = (n * n.saturating_sub(1) / 2) as i64;
    if s > pairs {
        return Some(0.0);
    }
    if s <= -pairs {
        return Some(1.0);
    }
    if s <= 0 {
        // P(S ≥ s) = 1 − P(S ≥ 1 − s): the smaller tail is summed, by symmetry.
        return untied_at_least(n, 1 - s).map(|rest| 1.0 - rest);
    }
    let most = ((pairs - s) / 2) as usize;
    Some(UNTIED[n][..=most].iter().sum())
}

impl NullScores {
    /// The null distribution for the ties that the values and the times have.
    ///
    /// # Formula
    /// ```text
    /// untied times:  S = P − 2q, with the counts of q from Π of Gaussian binomials [N+u over u]_q
    /// tied times:    every order of the values, one by one
    /// ```
    /// where u are the sizes of the groups of equal values, N how many values went before, and P
    /// the number of pairs of unequal values.
    ///
    /// # Units
    /// Probabilities over S in pairs.
    ///
    /// # Limits
    /// Up to 9 values.
    ///
    /// # None
    /// More than 9 values, or slices of different length.
    ///
    /// # Reference
    /// Stanley (1997), Enumerative Combinatorics 1, 1.7 [from memory; tests go through all orders].
    pub fn tied(t: &[f64], y: &[f64]) -> Option<NullScores> {
        if y.len() > MOST_TIED || t.len() != y.len() {
            return None;
        }
        let groups = group_sizes(y);
        if group_sizes(t).iter().any(|&size| size > 1) {
            return Some(Self::one_by_one(t, y));
        }
        let mut counts = vec![1.0];
        let mut before = 0;
        for size in groups {
            counts = product(&counts, &gaussian_binomial(before + size, size));
            before += size;
        }
        let reach = counts.len() as i64 - 1;
        let all: f64 = counts.iter().sum();
        let mut probability = vec![0.0; 2 * reach as usize + 1];
        for (q, count) in counts.iter().enumerate() {
            probability[2 * q] = count / all;
        }
        Some(NullScores { probability, reach })
    }

    /// The null distribution by going through every order of the values.
    pub fn one_by_one(t: &[f64], y: &[f64]) -> NullScores {
        let n = y.len();
        let reach = (n * n.saturating_sub(1) / 2) as i64;
        let mut counts = vec![0.0; 2 * reach as usize + 1];
        let mut order = y.to_vec();
        let mut turns = vec![0; n];
        counts[(brute_score(t, &order) + reach) as usize] += 1.0;
        let mut at = 1;
        // Heap's way through all orders, without recursion.
        while at < n {
            if turns[at] < at {
                let other = if at % 2 == 0 { 0 } else { turns[at] };
                order.swap(other, at);
                counts[(brute_score(t, &order) + reach) as usize] += 1.0;
                turns[at] += 1;
                at = 1;
            } else {
                turns[at] = 0;
                at += 1;
            }
        }
        let all: f64 = counts.iter().sum();
        NullScores { probability: counts.iter().map(|c| c / all).collect(), reach }
    }

    /// Probability that S is at most `s`.
    pub fn at_most(&self, s: i64) -> f64 {
        self.sum(|score| score <= s)
    }

    /// Probability that S is as far from zero as `s` or farther.
    pub fn as_far_as(&self, s: i64) -> f64 {
        self.sum(|score| score.abs() >= s.abs())
    }

    fn sum(&self, wanted: impl Fn(i64) -> bool) -> f64 {
        let chosen = (-self.reach..).zip(&self.probability).filter(|(score, _)| wanted(*score));
        chosen.map(|(_, probability)| probability).sum::<f64>().min(1.0)
    }
}

/// Kendall's S by looking at every pair.
///
/// # Formula
/// ```text
/// S = Σ_{i<j} sign(t_j − t_i)·sign(y_j − y_i)
/// ```
///
/// # Units
/// Pairs: rising less falling.
///
/// # Limits
/// O(n²); the test oracle of the faster way.
///
/// # Reference
/// Mann (1945), Econometrica 13:245–259.
pub fn brute_score(t: &[f64], y: &[f64]) -> i64 {
    let mut score = 0;
    for j in 1..y.len() {
        for i in 0..j {
            score += sign(t[j] - t[i]) * sign(y[j] - y[i]);
        }
    }
    score
}

fn sign(difference: f64) -> i64 {
    i64::from(difference > 0.0) - i64::from(difference < 0.0)
}

/// Sizes of the groups of equal numbers, in rising order of the numbers.
pub fn group_sizes(values: &[f64]) -> Vec<usize> {
    let mut sorted = values.to_vec();
    sorted.sort_unstable_by(f64::total_cmp);
    sorted.chunk_by(|x, y| x == y).map(<[f64]>::len).collect()
}

/// Coefficients of the Gaussian binomial [n over k] in powers of q, by Pascal's rule for it:
/// [n, k] = [n−1, k−1] + qᵏ·[n−1, k].
fn gaussian_binomial(n: usize, k: usize) -> Vec<f64> {
    if k == 0 || k == n {
        return vec![1.0];
    }
    let mut sum = vec![0.0; k * (n - k) + 1];
    for (place, count) in gaussian_binomial(n - 1, k - 1).iter().enumerate() {
        sum[place] += count;
    }
    for (place, count) in gaussian_binomial(n - 1, k).iter().enumerate() {
        sum[place + k] += count;
    }
    sum
}

fn product(x: &[f64], y: &[f64]) -> Vec<f64> {
    let mut all = vec![0.0; x.len() + y.len() - 1];
    for (i, a) in x.iter().enumerate() {
        for (j, b) in y.iter().enumerate() {
            all[i + j] += a * b;
        }
    }
    all
}
