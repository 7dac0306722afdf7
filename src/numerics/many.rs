//! Many tests at once.

/// Benjamini and Hochberg's adjusted p-values, in the order given.
///
/// # Formula
/// ```text
/// q₍ᵢ₎ = min over j ≥ i of  min(1, p₍ⱼ₎·N/j)
/// ```
/// where p₍₁₎ ≤ … ≤ p₍N₎ are the sorted p-values. Calling every test with q ≤ α a finding keeps the
/// expected share of false ones among the findings at α.
///
/// # Units
/// Probabilities.
///
/// # Limits
/// Independent or positively dependent tests.
///
/// # Reference
/// Benjamini & Hochberg (1995), J. R. Stat. Soc. B 57:289–300. Checked against the definition by
/// looking at every j.
pub fn benjamini_hochberg(p: &[f64]) -> Vec<f64> {
    let mut order: Vec<usize> = (0..p.len()).collect();
    order.sort_by(|&i, &j| p[i].total_cmp(&p[j]));
    let mut adjusted = vec![1.0; p.len()];
    let mut least: f64 = 1.0;
    for (rank, &index) in order.iter().enumerate().rev() {
        least = least.min(p[index] * p.len() as f64 / (rank + 1) as f64);
        adjusted[index] = least;
    }
    adjusted
}
