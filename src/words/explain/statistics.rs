//! Statistical procedures, with their formulas and where they come from.

use super::{Entry, Kind, OURS};

pub(super) const fn statistic(
    word: &'static str,
    meaning: &'static str,
    formula: &'static str,
    source: &'static str,
) -> Entry {
    Entry { word, kind: Kind::Statistic, place: "", meaning, formula: Some(formula), source }
}

/// Every procedure.
pub const STATISTICS: [Entry; 19] = [
    statistic(
        "first-order",
        "Concentrations fall by the same share each year: a straight line of ln C against time. The \
         line is the median concentration; time is in years of 365.25 days from the first used date.",
        "C(t) = exp(a - k t);  half-life = ln 2 / k;  change a year = 1 - exp(-k)",
        "US EPA/540/S-02/500, p. 1, for what the rate at one well may be used for; the algebra is standard",
    ),
    statistic(
        "effective-number",
        "The number of observations m that stands for n in the cut-off of the profile likelihood: \
         each measured value counts one, each non-detect or `>` value that the line does not already \
         take for certain counts a half. Coverage was simulated with independent errors.",
        "m = detects + (non-detects with Phi(z) <= 0.99) / 2",
        "this program's choice, by simulation (0.90 nominal covers 0.897 to 0.924)",
    ),
    statistic(
        "fieller",
        "The interval of the date at which a fitted line meets the limit, from the joint uncertainty \
         of level and rate. It is not symmetric, and it may lack an end or be the whole line. Its \
         coverage assumes independent normal errors of equal size in ln C.",
        "(d - b u)^2 <= t^2 s^2 (1/n + u^2 / Sxx);  u = date - mean date;  d = ln limit - mean of ln C",
        "Fieller 1954; Draper and Smith 1998, ch. 3, for the inverse-regression form",
    ),
    statistic(
        "profile-likelihood",
        "The interval of a rate, level or date with non-detects: the values that the likelihood, \
         maximised over the rest, does not reject. Without non-detects it is exactly the t and the \
         Fieller interval. Its coverage assumes independent normal errors of equal size in ln C.",
        "2 (l_max - l_profile(x)) <= m ln(1 + t^2 / (m - 2));  t with m - 2 degrees of freedom",
        "likelihood theory; the small-sample cut-off is exact without non-detects and was simulated with them",
    ),
    statistic(
        "fitted-level",
        "The interval of the level at the last used date without non-detects. Its coverage assumes \
         independent normal errors of equal size in ln C.",
        "ln level +- t s sqrt(1/n + (t* - tbar)^2 / Sxx)",
        "textbook least squares",
    ),
    statistic(
        "mann-kendall",
        "A rank test of trend: pairs of dates whose values go up less pairs that go down. Negative S \
         means falling. The p-value is two-sided, exact where it can be; it assumes independent \
         results.",
        "S = sum over i < j of sign(y_j - y_i);  Var = (n (n-1)(2n+5) - sum u (u-1)(2u+5)) / 18",
        "Mann 1945, Kendall 1975; checked against Example 17-6 of the US EPA Unified Guidance",
    ),
    statistic(
        "theil-sen",
        "The median of the slopes of all pairs of dates, on ln C, as a rate that single values cannot \
         carry. Its interval is by ranks and assumes independent results; empty where the series has \
         non-detects.",
        "median of (y_j - y_i) / (t_j - t_i);  ranks (N -+ z sqrt(Var S)) / 2",
        "Theil 1950, Sen 1968; the interval as Gilbert 1987, p. 218 (from a public library's page)",
    ),
    statistic(
        "benjamini-hochberg",
        "Adjusts the p-values of all rates of a site for their number: among the series called at an \
         adjusted p of 0.05 about one in twenty is expected to be wrong.",
        "adjusted p(i) = min over j >= i of p(j) N / j, sorted upwards",
        "Benjamini and Hochberg 1995 (from memory)",
    ),
    statistic(
        "reach-date",
        "When the fitted median line meets the limit. The interval is Fieller's or the profile \
         likelihood's at the confidence in force; the arithmetic mean meets the limit later by \
         s^2 / (2 k). Given only where date-needs are met and the rate's interval lies above zero; \
         its coverage assumes independent errors.",
        "date = first used + round(365.25 (a - ln limit) / k) days",
        "US EPA/540/S-02/500 for the use; intervals see fieller and profile-likelihood",
    ),
    statistic(
        "required-rate",
        "The rate that would bring the level of the last used date to the limit by the goal date. It \
         is not compared with the rate's interval, since the level is fitted too; pace is the test.",
        "ln(level_now / limit) / (goal date - last used date)",
        OURS,
    ),
    statistic(
        "share-over-limit",
        "The share of single samples that would exceed the limit at the last used date, if the line \
         and its scatter hold.",
        "Phi((ln level_now - ln limit) / residual_sd_ln)",
        "the lognormal model of the line",
    ),
    statistic(
        "rounds-to-decisive",
        "The fewest further rounds, at the median spacing, after which a rate of the present size \
         would be told from zero with a chance of 80 %. Assumes independent errors of the present \
         scatter, so it is a lower bound.",
        "noncentral t, tail (1 - confidence) / 2, SE = s / sqrt(Sxx of n + r dates)",
        "power of the t test",
    ),
    statistic(
        "rpd",
        "Relative percent difference of a duplicate and its parent.",
        "RPD = 100 |a - b| / ((a + b) / 2)",
        "project plans for ground water; 30 % is a common criterion",
    ),
    statistic(
        "likelihood-ratio",
        "The test of no slope with non-detects, and the R squared made from the same figure.",
        "LR = 2 (l_line - l_constant);  F = (m - 2)(exp(LR / m) - 1) on 1 and m - 2;  R^2 = 1 - exp(-LR / n)",
        "likelihood theory; exact without non-detects",
    ),
    statistic(
        "shapiro-wilk",
        "A test of whether residuals could be normal.",
        "W = (sum a_i x_(i))^2 / sum (x_i - xbar)^2",
        "Royston 1995, AS R94",
    ),
    statistic(
        "cooks-distance",
        "How far the fitted line moves when one date is left out, in units of its own uncertainty.",
        "D = e^2 h / (2 s^2 (1 - h)^2);  h = 1/n + (t - tbar)^2 / Sxx",
        "Cook 1977",
    ),
    statistic(
        "aicc",
        "Weighs how well a model fits against how many parameters it takes, for short records.",
        "AICc = n ln(RSS / n) + 2 K + 2 K (K + 1) / (n - K - 1);  with non-detects -2 l in place of n ln(RSS / n)",
        "Hurvich and Tsai 1989 (from memory)",
    ),
    statistic(
        "kruskal-wallis",
        "A rank test of whether detrended residuals differ between the quarters of the year.",
        "H = 12 / (N (N + 1)) sum R_j^2 / n_j - 3 (N + 1), corrected for ties",
        "Kruskal and Wallis 1952 (from memory); checked against Example 17-2 of the US EPA Unified Guidance",
    ),
    statistic(
        "continuous-autoregression",
        "A test of whether residuals close in time are alike, for unequal spacing; its inflation of \
         the rate's variance says how much too narrow an interval is that assumes independence.",
        "corr = phi^|dt|;  p = P(chi2[1] > LR) / 2;  VIF = Sxx sum sum w_i w_j phi^|t_i - t_j|",
        "innovations form of a continuous first-order autoregression",
    ),
];
