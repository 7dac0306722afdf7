//! The columns of summary.csv and summary.json.

use super::{Entry, Kind, OURS};

const TABLES: &str = "summary.csv";

const fn column(word: &'static str, meaning: &'static str) -> Entry {
    Entry { word, kind: Kind::Column, place: TABLES, meaning, formula: None, source: OURS }
}

const fn computed(
    word: &'static str,
    meaning: &'static str,
    formula: &'static str,
    source: &'static str,
) -> Entry {
    Entry { formula: Some(formula), source, ..column(word, meaning) }
}

const FIT: &str = "the fit; see least-squares and censored-likelihood";
const INTERVAL: &str = "see fieller and profile-likelihood";

/// Every column of the summary, in its order.
pub const SUMMARY: [Entry; 54] = [
    column("site", "The site's name; empty for bare files without a site column."),
    column("well", "The well, as the laboratory or the site file's alias names it."),
    column("well_role", "plume, source, sentinel or background, from the site file."),
    column(
        "analyte",
        "The analyte as the site file or template names it, else the commonest spelling.",
    ),
    column("cas", "The analyte's CAS number."),
    column("fraction", "dissolved, total, or empty where it is not known."),
    column("depth", "The depth as written, where the site file keeps depths separate."),
    column(
        "unit",
        "The unit of every concentration of the row: the limit's, else the site file's, else the commonest on the newest date.",
    ),
    column("limit", "The limit in force at the as-of date, in `unit`."),
    column("limit_source", "Where the limit comes from, as the site file or template says."),
    column("goal_date", "The date by which the limit is to be met, as the site file says."),
    column("samples", "Dates in the window, after merging to one value a date."),
    column("detects", "Dates in the window with a detect; a `>` value is one."),
    column("first_sampled", "The first date in the window."),
    column("last_sampled", "The last date in the window."),
    column(
        "last_result",
        "The value of the last date in the window, with its mark `<` or `>`, in `unit`. The text as reported is in ledger.csv.",
    ),
    column(
        "verdict",
        "What the series says, the first rule that holds: undetected, too-few, rising, below, attenuating, flat or undecided.",
    ),
    column(
        "pace",
        "The reach date against the goal date: ahead, behind or unclear; empty without goal or limit, and for undetected and too-few.",
    ),
    column(
        "method",
        "How the rate or the verdict was computed: least-squares, censored-likelihood, least-squares-substituted or count.",
    ),
    computed(
        "rate_per_year",
        "The first-order rate; positive means falling.",
        "ln C = a - k t",
        FIT,
    ),
    computed(
        "rate_lower",
        "The lower end of the rate's interval.",
        "k - t s / sqrt(Sxx), or the profile likelihood",
        INTERVAL,
    ),
    computed(
        "rate_upper",
        "The upper end of the rate's interval.",
        "k + t s / sqrt(Sxx), or the profile likelihood",
        INTERVAL,
    ),
    computed(
        "half_life_years",
        "Years in which the level halves; empty where the rate is not positive.",
        "ln 2 / k",
        FIT,
    ),
    computed(
        "half_life_lower",
        "The short end of the half-life; empty where the rate's interval holds zero.",
        "ln 2 / rate_upper",
        INTERVAL,
    ),
    computed(
        "half_life_upper",
        "The long end of the half-life; empty where the rate's interval holds zero.",
        "ln 2 / rate_lower",
        INTERVAL,
    ),
    computed(
        "level_at_start",
        "The fitted median concentration at the first used date.",
        "exp(a)",
        FIT,
    ),
    computed(
        "level_now",
        "The fitted median concentration at the last used date; never carried on to the as-of date.",
        "exp(a - k t*)",
        FIT,
    ),
    computed(
        "level_now_lower",
        "The lower end of the level's interval.",
        "ln level - t s sqrt(1/n + (t* - tbar)^2 / Sxx)",
        INTERVAL,
    ),
    computed(
        "level_now_upper",
        "The upper end of the level's interval.",
        "ln level + t s sqrt(1/n + (t* - tbar)^2 / Sxx)",
        INTERVAL,
    ),
    computed(
        "share_over_limit_now",
        "The share of single samples over the limit at the last used date, by the line and its scatter.",
        "Phi((ln level_now - ln limit) / residual_sd_ln)",
        "the lognormal model of the line",
    ),
    computed(
        "residual_sd_ln",
        "The scatter of ln C about the line.",
        "sqrt(RSS / (n - 2)); with non-detects the ML scale times sqrt(m / (m - 2))",
        FIT,
    ),
    computed(
        "r_squared",
        "The share of the variance of ln C that the line explains. Descriptive only: a good one proves nothing.",
        "1 - RSS / TSS; with non-detects 1 - exp(-LR / n)",
        FIT,
    ),
    computed(
        "slope_p",
        "The two-sided p-value of no slope.",
        "T = k / SE on n - 2; with non-detects F(1, m - 2) of (m - 2)(exp(LR / m) - 1)",
        FIT,
    ),
    computed(
        "slope_p_adjusted",
        "The same, adjusted for the number of series of the site.",
        "Benjamini-Hochberg",
        "Benjamini and Hochberg 1995 (from memory)",
    ),
    computed(
        "kendall_s",
        "Kendall's S: pairs of dates that rise less pairs that fall; negative when falling.",
        "sum over i < j of sign(y_j - y_i)",
        "Mann 1945, Kendall 1975",
    ),
    computed(
        "kendall_p",
        "Its two-sided p-value, exact where it can be.",
        "see mann-kendall",
        "Mann 1945, Kendall 1975",
    ),
    computed(
        "sen_rate_per_year",
        "The Theil-Sen rate of ln C; positive means falling. Empty with non-detects.",
        "-median of (y_j - y_i) / (t_j - t_i)",
        "Theil 1950, Sen 1968",
    ),
    computed(
        "sen_rate_lower",
        "The lower end of the Theil-Sen rate.",
        "see theil-sen",
        "Gilbert 1987 (from a public library's page)",
    ),
    computed(
        "sen_rate_upper",
        "The upper end of the Theil-Sen rate.",
        "see theil-sen",
        "Gilbert 1987 (from a public library's page)",
    ),
    computed(
        "reach_date",
        "When the fitted median line meets the limit.",
        "first used + round(365.25 (a - ln limit) / k) days",
        FIT,
    ),
    computed(
        "reach_earliest",
        "The early end of the reach date. Alone, without a reach date: the date before which the limit is not met.",
        "the early root of Fieller's equation, or the profile likelihood",
        INTERVAL,
    ),
    computed(
        "reach_latest",
        "The late end of the reach date; with confidence 0.90 the one-sided 95 % date.",
        "the late root of Fieller's equation, or the profile likelihood",
        INTERVAL,
    ),
    computed(
        "reach_date_mean",
        "When the arithmetic mean of the same model meets the limit.",
        "reach_date + s^2 / (2 k) years",
        "the lognormal model of the line",
    ),
    computed(
        "exceed_date",
        "When a rising line that is still under the limit crosses it.",
        "first used + round(365.25 (a - ln limit) / k) days",
        FIT,
    ),
    computed(
        "exceed_earliest",
        "The early end of exceed_date, not before the last used date.",
        "the early root of Fieller's equation, or the profile likelihood",
        INTERVAL,
    ),
    computed(
        "required_rate_per_year",
        "The rate that would bring the level now to the limit by the goal date; empty if it meets the limit, or the goal is not after the last used date.",
        "ln(level_now / limit) / (goal date - last used date)",
        OURS,
    ),
    column(
        "alternative_model",
        "A model that describes the series better than one rate (AICc lower by more than 4): a plateau or two rates.",
    ),
    column("alternative_date", "Its reach date; empty if it never meets the limit."),
    column(
        "rounds_to_decisive",
        "The fewest further rounds, at the median spacing, for an 80 % chance to tell a rate of the present size from zero; 0 if it is told already, empty over 200.",
    ),
    column(
        "previous_verdict",
        "The verdict on what was known at the last earlier round with data.",
    ),
    column(
        "reach_shift_years",
        "The new reach date less the one of the last earlier round with data; positive means later.",
    ),
    column(
        "why_no_rate",
        "Why there is no rate: no-dates-in-window, dates, detects, on-a-line or not-converged.",
    ),
    column("why_no_date", "Why there is no reach date, the first reason that holds."),
    column(
        "flags",
        "Every flag that is raised, in their order, joined by `;`. Figures, thresholds and sources are in flags.csv.",
    ),
];
