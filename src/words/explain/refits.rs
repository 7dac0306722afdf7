//! Procedures that fit again or look at residuals, and the words that they bring.

use super::statistics::statistic;
use super::{Entry, Kind, OURS};
use crate::terms::{ChoiceKind, Model, WhyNoModel};

/// Every procedure of the refits.
pub const REFITS: [Entry; 9] = [
    statistic(
        "censored-kendall",
        "Kendall's test where some values are limits: only pairs whose order is certain count, and \
         the variance is that of all orders of the same values and limits. It assumes independent \
         results.",
        "Var(S) = (4 a b / (n (n-1)(n-2)) + 2 sum A^2 sum B^2 / (n (n-1))) / 4",
        "Daniels 1944, Kendall 1975 (from memory); checked by full permutation",
    ),
    statistic(
        "akritas-theil-sen",
        "The censored form of the Theil-Sen rate: the slope whose residuals, each keeping its \
         censoring, have a Kendall S of zero, with the slopes that the test does not reject as its \
         interval. It assumes independent results.",
        "S(y - b t) = 0;  ends where |S(y - b t)| = z sqrt(Var)",
        "Akritas, Murphy and LaValley 1995; the interval inverts the test as Sen 1968 does",
    ),
    statistic(
        "seasonal-kendall",
        "Kendall's test within each season, summed over the seasons, with a test of whether the \
         seasons agree. A numeric routine of the library; no column uses it.",
        "S = sum of S_j;  chi^2 = sum Z_j^2 - p Zbar^2",
        "Hirsch, Slack and Smith 1982; van Belle and Hughes 1984",
    ),
    statistic(
        "curvature",
        "A quadratic term beside the line. On a fall an upward bend means that the fall slows down, \
         so that a straight line gives dates that are too early. It assumes independent errors.",
        "ln C = a + b t + c (t - tbar)^2;  t test of c, a likelihood ratio with non-detects",
        "textbook least squares; the cut-off of the likelihood ratio is that of the intervals",
    ),
    statistic(
        "decay-to-plateau",
        "Decay to a level that stays. Dropped where the plateau cannot be told from zero, where the \
         record bends the other way, or where the search does not arrive.",
        "ln C = ln(P + A exp(-k t))",
        "judgement of the alternatives; checked against nls of R and NIST nonlinear sets",
    ),
    statistic(
        "broken-line",
        "One rate until a break, another after it, both fitted with the break. Each side keeps at \
         least 4 dates and a year. No p-value is given: the break is chosen by the data.",
        "ln C = a + b t + d max(t - break, 0)",
        "Davies 1987 (from memory) on why no F test holds",
    ),
    statistic(
        "leaving-out",
        "The line without each date in turn (at most 200), without the highest value, without the \
         first year: how far the date moves, and whether the rate's sign turns. A turned sign counts \
         only where the rate's interval excludes zero.",
        "studentized = e / (s_(i) sqrt(1 - h));  Cook's D = e^2 h / (2 s^2 (1 - h)^2)",
        "Cook 1977; Cook and Weisberg 1982 (from memory)",
    ),
    statistic(
        "noncentral-t",
        "The chance that more dates make the rate's interval exclude zero, at the present rate and \
         scatter. Correlated results and non-detects raise the number of rounds.",
        "P(T > t) with T noncentral t, shift |k| sqrt(Sxx) / sd",
        "textbook power of a slope; checked against SciPy",
    ),
    statistic(
        "most-telling",
        "Of all reruns (later beginnings of the fit, each date left out, the highest left out, \
         non-detects at their limit and at half of it, estimated results out, duplicates averaged, \
         fits since each event) the one that changes the answer most: the verdict before the date \
         before the rate.",
        "max over reruns of (verdict differs, |date moved|, |rate moved|)",
        OURS,
    ),
];

/// The coded words of the refits: models, why one is not offered, choices.
#[must_use]
pub fn coded() -> Vec<Entry> {
    let ours = |word, meaning| Entry {
        word,
        kind: Kind::Statistic,
        place: "",
        meaning,
        formula: None,
        source: OURS,
    };
    // `first-order` and `two-rates` are explained as procedure and as flag; a word is there once
    // for each kind.
    let models = Model::ALL
        .iter()
        .filter(|model| **model != Model::FirstOrder)
        .map(|&model| ours(model.code(), crate::words::doubt::model_meaning(model)));
    let dropped =
        WhyNoModel::ALL.iter().map(|&why| ours(why.code(), crate::words::doubt::why_no_model(why)));
    let choices = ChoiceKind::ALL
        .iter()
        .map(|&kind| ours(kind.code(), crate::words::doubt::choice_kind(kind)));
    models.chain(dropped).chain(choices).collect()
}
