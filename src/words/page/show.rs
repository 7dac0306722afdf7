//! The page of one series in full: what it says, its figures, its flags, its records.

use super::{PageOptions, heading, series_name, show_doubts, show_values};
use crate::findings::{Findings, SeriesFinding};
use crate::terms::Standing;
use crate::words::caution::caution;
use crate::words::clean::shown;
use crate::words::layout::{Align, Lines};
use crate::words::number::{
    confidence, count, iso, month, p_value, people, people_beside, percent, table,
};
use crate::words::{fate, flag_sentence, method, pace, reason, series_sentence, verdict};

/// The page.
#[must_use]
pub fn show(findings: &Findings, series: &SeriesFinding, options: &PageOptions<'_>) -> String {
    let mut lines = Lines::new(options.width, options.color);
    lines.title(&heading("Series", &findings.run, &findings.site));
    lines.title(&series_name(&series.key, &findings.site));
    lines.blank();
    lines.paragraph(&series_sentence::series_sentence(series, findings.run.confidence), 0);
    lines.heading("Figures");
    lines.rows(&figures(series, findings.run.confidence), &[Align::Left, Align::Left], 2);
    flags(&mut lines, series);
    show_doubts::doubts(&mut lines, series);
    show_values::values(&mut lines, series);
    show_values::duplicates(&mut lines, series);
    records(&mut lines, series);
    lines.blank();
    lines.line("Next        ebbwell explain WORD   (any verdict, flag, column or reason above)");
    lines.blank();
    lines.paragraph(&caution(&findings.site), 0);
    lines.finish()
}

/// A value with its ends, or the value and that it has none.
fn ranged(value: Option<f64>, low: Option<f64>, high: Option<f64>) -> Option<String> {
    let value = value?;
    Some(match (low, high) {
        (Some(low), Some(high)) => {
            let value = people_beside(value, low, high);
            format!("{value} ({} to {})", people(low), people(high))
        }
        (Some(low), None) => format!("{} ({} at least, no upper end)", people(value), people(low)),
        (None, Some(high)) => format!("{} (no lower end, {} at most)", people(value), people(high)),
        (None, None) => format!("{} (no interval could be given)", people(value)),
    })
}

/// The half-life with its ends, or why it has none.
fn half_life(series: &SeriesFinding) -> Option<String> {
    let (half, low, high) = series.half_life_years();
    match (half, series.rate_lower) {
        (Some(half), Some(rate)) if rate.0 <= 0.0 => {
            Some(format!("{} (no interval, since the rate's holds zero)", people(half)))
        }
        _ => ranged(half, low, high),
    }
}

/// Every figure that the series has, one a line.
fn figures(series: &SeriesFinding, level: f64) -> Vec<Vec<String>> {
    let unit = series.unit.label();
    let in_unit = |text: String| format!("{text} {unit}");
    let rate = |r: Option<crate::terms::PerYear>| r.map(|rate| rate.0);
    let span = series.sampled.map(|s| format!("{} to {}", iso(s.first), iso(s.last)));
    let limit = series.limit.map(|l| {
        let source = series.limit_source.as_deref();
        let source = source.map_or_else(String::new, |s| format!(" ({})", shown(s)));
        format!("{} {unit}{source}", table(l))
    });
    let rows = [
        ("verdict", Some(format!("{}: {}", series.verdict.code(), verdict::gloss(series.verdict)))),
        ("pace", series.pace.map(|p| pace::label(p).to_owned())),
        ("method", series.method.map(|m| method::label(m).to_owned())),
        ("well role", Some(series.role.code().to_owned())),
        ("CAS number", series.cas.as_deref().map(shown)),
        ("limit", limit),
        ("goal date", series.goal_date.map(iso)),
        (
            "dates in the window",
            Some(format!("{}, {} with a detect", count(series.samples), count(series.detects))),
        ),
        ("first and last date", span),
        ("confidence", Some(format!("{}, two-sided", confidence(level)))),
        (
            "rate a year",
            ranged(rate(series.rate_per_year), rate(series.rate_lower), rate(series.rate_upper)),
        ),
        ("half-life, years", half_life(series)),
        (
            "Theil-Sen rate a year",
            ranged(series.sen_rate_per_year, series.sen_rate_lower, series.sen_rate_upper),
        ),
        (
            "level at the start",
            series
                .level_at_start
                .map(|l| format!("{} (the line's; no interval is computed)", in_unit(people(l)))),
        ),
        (
            "level now",
            ranged(series.level_now, series.level_now_lower, series.level_now_upper).map(in_unit),
        ),
        (
            "single samples over the limit now",
            series
                .share_over_limit_now
                .map(|s| format!("{} by the line and its scatter", share(s))),
        ),
        ("scatter of ln C", series.residual_sd_ln.map(people)),
        ("R squared", series.r_squared.map(people)),
        ("test of no slope", series.slope_p.map(p_value)),
        ("the same, adjusted for all series", series.slope_p_adjusted.map(p_value)),
        (
            "Kendall's S",
            series.kendall_s.map(|s| {
                let p = series.kendall_p.map_or_else(String::new, |p| format!(" ({})", p_value(p)));
                format!("{}{p}", table(s))
            }),
        ),
        ("limit met", series_sentence::reach(series)),
        (
            "limit met by the mean",
            series.reach_date_mean.map(|d| format!("about {} (no interval is computed)", month(d))),
        ),
        ("limit not met", series_sentence::not_before(series)),
        ("limit crossed", series_sentence::crosses(series)),
        (
            "required rate a year",
            series
                .required_rate_per_year
                .map(|r| format!("{} from the level now to the goal", people(r))),
        ),
        (
            "why no rate",
            series.why_no_rate.map(|w| format!("{}: {}", w.code(), reason::no_rate(w))),
        ),
        (
            "why no date",
            series.why_no_date.map(|w| format!("{}: {}", w.code(), reason::no_date(w))),
        ),
    ];
    rows.into_iter()
        .filter_map(|(name, text)| text.map(|text| vec![name.to_owned(), text]))
        .collect()
}

/// A share for people: never more exact than it is known.
fn share(share: f64) -> String {
    const SMALL: f64 = 0.001;
    if share < SMALL {
        "under 0.1 %".to_owned()
    } else if share > 1.0 - SMALL {
        "over 99.9 %".to_owned()
    } else {
        format!("about {}", percent(share))
    }
}

/// Each flag with its figure, threshold and source; tests that could not be made after them.
fn flags(lines: &mut Lines, series: &SeriesFinding) {
    if series.flags.is_empty() {
        lines.heading("No flag is raised");
        return;
    }
    lines.heading("Flags");
    let (raised, not): (Vec<_>, Vec<_>) =
        series.flags.iter().partition(|flag| flag.standing == Standing::Raised);
    for flag in raised {
        lines.hanging(&format!("{}: {}", flag.code.code(), flag_sentence::sentence(flag)), 2, 4);
        lines.hanging(&figure_line(flag), 4, 6);
    }
    for flag in not {
        lines.hanging(&flag_sentence::not_assessable(flag), 2, 4);
    }
}

fn figure_line(flag: &crate::terms::Flag) -> String {
    let figure = flag_sentence::figure(flag);
    let figure = if figure.is_empty() { String::new() } else { format!("figure {figure}, ") };
    let threshold =
        flag.threshold.map_or_else(String::new, |t| format!("threshold {}, ", table(t)));
    format!("{figure}{threshold}source: {}", flag.code.source())
}

/// The series' records by outcome and reason.
fn records(lines: &mut Lines, series: &SeriesFinding) {
    if series.records.is_empty() {
        return;
    }
    lines.heading("Records");
    let rows: Vec<Vec<String>> = series
        .records
        .iter()
        .map(|of| {
            vec![count(of.records), of.outcome.to_owned(), fate::reason(of.outcome, &of.reason)]
        })
        .collect();
    lines.rows(&rows, &[Align::Right, Align::Left, Align::Left], 2);
}
