//! Flags in words: the short label and the rule behind it. The sentence with a flag's figure is in
//! [`super::flag_sentence`].

use crate::terms::FlagCode;

/// The short label, after which a list stays readable.
#[must_use]
pub fn label(code: FlagCode) -> &'static str {
    match code {
        FlagCode::FewDates => "few dates",
        FlagCode::FewDetects => "few detects",
        FlagCode::ShortRecord => "short record",
        FlagCode::DateWithheld => "date withheld",
        FlagCode::MostlyNonDetects => "mostly non-detects",
        FlagCode::ReportingLimitAboveLimit => "reporting limit above the limit",
        FlagCode::FallingReportingLimits => "falling reporting limits",
        FlagCode::UninformativeNonDetects => "uninformative non-detects",
        FlagCode::EstimatedRecensored => "estimated values taken as non-detects",
        FlagCode::Substituted => "substituted non-detects",
        FlagCode::LowResultsLost => "low results lost",
        FlagCode::EstimatedResults => "many estimated results",
        FlagCode::Stale => "stale",
        FlagCode::Gap => "gap in the record",
        FlagCode::DuplicatesDiffer => "duplicates differ",
        FlagCode::UnitSlip => "possible unit slip",
        FlagCode::CopiedValues => "equal values in a row",
        FlagCode::WideScatter => "wide scatter",
        FlagCode::Outlier => "outlier",
        FlagCode::ResultsDenyLine => "last results deny the line",
        FlagCode::InfluentialPoint => "one date decides",
        FlagCode::NotNormal => "residuals not normal",
        FlagCode::Autocorrelated => "residuals follow one another",
        FlagCode::Seasonal => "seasonal",
        FlagCode::Slowing => "the change slows down",
        FlagCode::Quickening => "the change speeds up",
        FlagCode::TwoRates => "two rates",
        FlagCode::LevelsOff => "levels off",
        FlagCode::WindowMovesDate => "window moves the date",
        FlagCode::TestsDisagree => "tests disagree",
        FlagCode::Unbounded => "an end is missing",
        FlagCode::NotLocated => "date not located",
        FlagCode::FarExtrapolation => "far extrapolation",
        FlagCode::BeyondHorizon => "beyond the horizon",
        FlagCode::BeyondCalendar => "beyond the calendar",
        FlagCode::Receding => "date recedes",
        FlagCode::HistoryChanged => "history changed",
        FlagCode::DaughterAboveLimit => "daughter above its limit",
        FlagCode::SlowerThanDecay => "slower than decay",
    }
}

/// When the flag is raised, and what it means for a reader.
#[must_use]
pub fn meaning(code: FlagCode) -> &'static str {
    match code {
        FlagCode::FewDates => "The window holds fewer dates than date-needs asks for (default 8).",
        FlagCode::FewDetects => {
            "The window holds fewer measured values than date-needs asks for (default 5)."
        }
        FlagCode::ShortRecord => {
            "The record, with one median spacing added and rounded to 0.1 years, is shorter than \
             short-record-years (default 4). Rates of short records are seldom moderately accurate."
        }
        FlagCode::DateWithheld => {
            "A date-need is not met, so no reach date is given; the figure names the need (dates, \
             years, detects or low-results)."
        }
        FlagCode::MostlyNonDetects => {
            "The share of dates that are non-detects is over mostly-non-detects (default 0.5)."
        }
        FlagCode::ReportingLimitAboveLimit => {
            "Used non-detects have reporting limits over the limit; the figure counts them. Such a \
             non-detect says nothing about meeting the limit and never counts as meeting it."
        }
        FlagCode::FallingReportingLimits => {
            "The limits of the non-detects fall over the record (one-sided Kendall p under 0.05) and \
             the highest is at least twice the lowest: a trend of laboratory progress, not of water."
        }
        FlagCode::UninformativeNonDetects => {
            "More than 0.1 of the non-detects have a limit so far above the line that the line says \
             with probability over 0.99 that they would be under it; they add nothing."
        }
        FlagCode::EstimatedRecensored => {
            "A detect lies under its own reporting limit beside non-detects whose detection limit is \
             not known; every such detect became a non-detect at its reporting limit (the figure \
             counts them), since mixing the two censoring points would bend the line."
        }
        FlagCode::Substituted => {
            "Non-detects were replaced by their limit or half of it, as the setting non-detects asks; \
             the figure counts them."
        }
        FlagCode::LowResultsLost => {
            "Zero or negative results without a mark could not be used; the figure is lost / (lost + \
             dates). Over 0.1 no date is given."
        }
        FlagCode::EstimatedResults => {
            "The share of detects that are estimated is over estimated-results (default 0.25)."
        }
        FlagCode::Stale => {
            "The last used date lies longer before the as-of date than stale-after-years (default \
             1.5), or than 1.5 times the expected interval of a well sampled less often than yearly. \
             A stale series is never below."
        }
        FlagCode::Gap => {
            "The longest time between two dates is over a year and over twice the median spacing."
        }
        FlagCode::DuplicatesDiffer => {
            "A field duplicate and its parent differ by a relative percent difference over \
             duplicates-rpd (default 30); near the reporting limit (either value under 5 times it) \
             by more than that limit; with one non-detect, the detect is over its limit."
        }
        FlagCode::UnitSlip => {
            "A value is 500 to 2,000 times the median of its neighbours (two dates before and two \
             after, four at an end), or as small: perhaps mg/L written as ug/L. It is fitted as it \
             stands."
        }
        FlagCode::CopiedValues => {
            "4 equal detects of three or more significant digits follow one another, or 6 of any."
        }
        FlagCode::WideScatter => {
            "The residual standard deviation of ln C is over ln 2: single results commonly lie a \
             factor of two off the line."
        }
        FlagCode::Outlier => {
            "The largest externally studentized residual has a Bonferroni p under 0.05. The value is \
             never left out by the program."
        }
        FlagCode::ResultsDenyLine => {
            "The line and its interval lie at or under the limit, but one of the last 4 dates does \
             not show the limit met, so the series is not called below and gets no reach date."
        }
        FlagCode::InfluentialPoint => {
            "Cook's distance of one date is over 1, or leaving one date out moves the date outside \
             its interval or turns the rate's sign."
        }
        FlagCode::NotNormal => {
            "Shapiro and Wilk's test of the residuals gives p under 0.05 (8 dates or more)."
        }
        FlagCode::Autocorrelated => {
            "Residuals follow one another in time: a continuous first-order autoregression is \
             better, p under 0.05 (15 dates or more). Intervals that assume independence are then \
             too narrow."
        }
        FlagCode::Seasonal => {
            "Detrended residuals differ between calendar quarters, Kruskal and Wallis p under 0.05."
        }
        FlagCode::Slowing => {
            "A quadratic term of the line on the log scale is positive, p under 0.05: the fall slows \
             down, and the straight line's dates are too early."
        }
        FlagCode::Quickening => {
            "A quadratic term of the line on the log scale is negative, p under 0.05: the fall \
             speeds up, or the record holds the top of a rise."
        }
        FlagCode::TwoRates => {
            "Two joined lines describe the data better than one: AICc lower by more than 4."
        }
        FlagCode::LevelsOff => {
            "A decay to a plateau describes the data better than a straight line: AICc lower by more \
             than 4. The figure is the plateau; over the limit, that model never meets it."
        }
        FlagCode::WindowMovesDate => {
            "Leaving out the first year, or the highest value, moves the date outside its interval \
             or turns the rate's sign: the answer rests on where the fit begins."
        }
        FlagCode::TestsDisagree => {
            "The rate's interval and Kendall's test at the same level say different things; look at \
             the chart for one value or a bend that carries the line."
        }
        FlagCode::Unbounded => {
            "An end of the reach interval does not exist: the rate's interval holds zero."
        }
        FlagCode::NotLocated => {
            "Every date agrees with the data at this confidence; the reach date is not located."
        }
        FlagCode::FarExtrapolation => {
            "The time from the last used date to the reach date is longer than the record."
        }
        FlagCode::BeyondHorizon => {
            "The reach date lies further ahead than horizon-years (default 30). Files keep the date, \
             people read `beyond the horizon`."
        }
        FlagCode::BeyondCalendar => "The date would lie after 9999-12-31 and is left empty.",
        FlagCode::Receding => {
            "Over the last 4 rounds with a date the date moved later by more than the time that \
             passed, and is now after the latest date of four such rounds ago."
        }
        FlagCode::HistoryChanged => {
            "A result of an earlier delivery changed or vanished since the output held against."
        }
        FlagCode::DaughterAboveLimit => {
            "A daughter of this analyte exceeds its limit at this well: the parent's fall alone does \
             not make the water clean."
        }
        FlagCode::SlowerThanDecay => {
            "The whole interval of a radionuclide's rate lies under its decay constant: something \
             adds to it."
        }
    }
}

/// The figure as a formula, where it is more than a count or a name.
#[must_use]
pub fn formula(code: FlagCode) -> Option<&'static str> {
    Some(match code {
        FlagCode::ShortRecord => "round(last used - first used + median spacing, 0.1 years) < 4",
        FlagCode::MostlyNonDetects => "non-detects / dates > 0.5",
        FlagCode::UninformativeNonDetects => "Phi((ln R - fitted) / s) > 0.99",
        FlagCode::LowResultsLost => "lost / (lost + dates)",
        FlagCode::EstimatedResults => "estimated detects / detects > 0.25",
        FlagCode::Gap => "longest spacing > max(2 x median spacing, 1 year)",
        FlagCode::DuplicatesDiffer => "RPD = 100 |a - b| / ((a + b) / 2) > 30",
        FlagCode::UnitSlip => "500 <= value / median of neighbours <= 2000, or its inverse",
        FlagCode::WideScatter => "s > ln 2",
        FlagCode::Outlier => "r = e / (s(i) sqrt(1 - h));  p = min(1, n 2 P(T[n-3] > |r|)) < 0.05",
        FlagCode::InfluentialPoint => "D = e^2 h / (2 s^2 (1 - h)^2) > 1",
        FlagCode::Autocorrelated => "corr = phi^|dt|;  p = P(chi2[1] > LR) / 2",
        FlagCode::TwoRates | FlagCode::LevelsOff => {
            "AICc = n ln(RSS / n) + 2 K + 2 K (K + 1) / (n - K - 1)"
        }
        FlagCode::NotLocated => "Fieller: g > 1 and discriminant <= 0",
        FlagCode::Unbounded => "Fieller: g >= 1;  likelihood: LR of zero slope <= cut-off",
        FlagCode::FarExtrapolation => "reach_date - last used > last used - first used",
        FlagCode::SlowerThanDecay => "rate_upper < ln 2 / half-life",
        _ => return None,
    })
}
