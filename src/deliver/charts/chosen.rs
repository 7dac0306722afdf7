//! Which series get a chart, and under which name.

use crate::deliver::names::chart_names;
use crate::findings::{Findings, SeriesFinding};
use crate::terms::{Pace, Verdict};
use crate::words::page::first::is_over_without_date;

/// Series up to which every one gets a chart.
const ALL_UP_TO: usize = 1_000;
/// Dates from which a chart shows anything.
const DATES: usize = 2;

/// The charts of a run.
#[derive(Clone, Debug)]
pub struct Chosen<'a> {
    /// File name below the output folder and series, in the order of the summary.
    pub charts: Vec<(String, &'a SeriesFinding)>,
    /// Series left out because there are too many.
    pub left_out: usize,
    /// Series with fewer than two dates.
    pub single_dates: usize,
}

/// Every series with two dates or more; over 1,000 series only those that rise, are behind their
/// goal, or are over the limit without a date.
#[must_use]
pub fn chosen(findings: &Findings) -> Chosen<'_> {
    let dated: Vec<&SeriesFinding> =
        findings.series.iter().filter(|series| series.values.len() >= DATES).collect();
    let single_dates = findings.series.len() - dated.len();
    let many = findings.series.len() > ALL_UP_TO;
    let kept: Vec<&SeriesFinding> =
        dated.iter().copied().filter(|series| !many || matters(series)).collect();
    let keys: Vec<_> = kept.iter().map(|series| &series.key).collect();
    let names = chart_names(&keys).into_iter().map(|name| format!("charts/{name}"));
    Chosen { left_out: dated.len() - kept.len(), charts: names.zip(kept).collect(), single_dates }
}

fn matters(series: &SeriesFinding) -> bool {
    series.verdict == Verdict::Rising
        || series.pace == Some(Pace::Behind)
        || is_over_without_date(series)
}
