//! Terms of the documentation and the pages.

use super::{Entry, Kind, OURS};

const fn term(word: &'static str, meaning: &'static str) -> Entry {
    Entry { word, kind: Kind::Term, place: "", meaning, formula: None, source: OURS }
}

/// Every term.
pub const TERMS: [Entry; 19] = [
    term("result", "One reported value of one analyte in one sample."),
    term(
        "series",
        "The results of one analyte, and of one fraction and depth where these are kept apart, at \
         one well through time.",
    ),
    term(
        "round",
        "One monitoring event: by default the calendar quarter of the sample date (setting round). A \
         sample within round-grace-days of an edge is counted with the neighbouring round if its \
         well has another result in this round and none in that one. What was known at a round is \
         what a review as of its last day finds.",
    ),
    term(
        "limit",
        "The regulatory concentration limit that applies to an analyte, at a well where that is \
         given, in force at the as-of date. Meets means at or under it, exceeds means over it.",
    ),
    term(
        "rate",
        "The first-order attenuation rate constant at one well, per year; positive means falling. It \
         says how soon a goal is met at that well. It is neither the rate along the flow path nor a \
         rate of biodegradation.",
    ),
    term(
        "level",
        "The fitted median (typical) concentration on a date; half of single samples lie above it.",
    ),
    term(
        "decision",
        "A person's choice that changes what is fitted: an exclusion, a window, a join, the use of a \
         qualifier. It stands in the site file with who, when and why, and the ledger names it at \
         every record it touched as decision:<id>.",
    ),
    term(
        "as-of",
        "The date up to which results are known to the run. Without --as-of it is the date of the \
         newest record that can be used.",
    ),
    term(
        "ledger",
        "The account of every input record: one outcome and, but for used, one reason each. Its rows equal the records read, or the run fails.",
    ),
    term("effort", "How much is computed: quick makes no refits, full makes all of them."),
    term(
        "confidence",
        "The two-sided confidence of every interval (default 0.90, so 5 % in each tail; the upper end \
         is then also the one-sided 95 % limit). Table, chart, verdict and sentence read the same \
         interval.",
    ),
    term(
        "window",
        "The dates that are fitted: the whole record, or from the last event with restart = true, or \
         as a decision says. Dates outside it are shown and not fitted.",
    ),
    term(
        "non-detect",
        "A result known only to lie under a limit of its own. It enters the likelihood as that, and \
         is never replaced by a number unless the site file asks for it.",
    ),
    term(
        "one-censoring-point",
        "A series whose detects reach below its reporting limits must not mix the two. Where every \
         non-detect has a detection limit, that is its limit; otherwise every detect under its own \
         reporting limit becomes a non-detect at it (flag estimated-recensored). Mixing the two \
         covered 29 % instead of 90 % in simulation.",
    ),
    term(
        "one-value-a-date",
        "Results of one series on one date are one value: a detect beats a non-detect, two \
         non-detects keep the lower limit, detects are averaged (or the highest counts, as set).",
    ),
    term("goal-date", "The date by which the limit is to be met, from the site file."),
    term(
        "horizon",
        "How many years after the last used date a reach date is still read out to people (default 30).",
    ),
    term(
        "hindcast",
        "A fit made with what was known at an earlier round and held against what came after: held, \
         missed-early, missed-late, overdue or open.",
    ),
    term(
        "stands-in-the-way",
        "A series stands in the way of the site's date if it has a limit, is not background, is not \
         below, is not undetected with its last 8 limits at or under the limit, and has no reach \
         date with a latest, or a better model denies its date.",
    ),
];
