//! Which series a busy person looks at first, and the lines each gets.

use crate::findings::{Findings, SeriesFinding};
use crate::terms::{Pace, Standing, Verdict, WhyNoDate};
use crate::words::layout::{HARD_SPACE, Lines};
use crate::words::number::{counted, month, table};
use crate::words::page::series_name;
use crate::words::{doubt, flag, reason, series_sentence};

/// Series shown of each group; the others are counted.
const SHOWN: usize = 4;

/// One reason to look at a series first.
struct Group<'a> {
    title: &'static str,
    series: Vec<&'a SeriesFinding>,
}

/// The series that matter first, each in the first group that takes it: a date that a better model
/// denies (by level), rising (by adjusted p), over the limit without a date (by how far over),
/// behind the goal (by date, the latest first).
fn groups(findings: &Findings) -> [Group<'_>; 4] {
    let (mut denied, mut rising) = (Vec::new(), Vec::new());
    let (mut over, mut behind) = (Vec::new(), Vec::new());
    for series in &findings.series {
        if series.alternative_denies && series.reach_date.is_some() {
            denied.push(series);
        } else if series.verdict == Verdict::Rising {
            rising.push(series);
        } else if is_over_without_date(series) {
            over.push(series);
        } else if series.pace == Some(Pace::Behind) {
            behind.push(series);
        }
    }
    // A series without the figure comes after those with it; ties keep the order of the tables.
    rising.sort_by(|a, b| by(a.slope_p_adjusted.or(a.slope_p), b.slope_p_adjusted.or(b.slope_p)));
    denied.sort_by(|a, b| by(times_limit(b), times_limit(a)));
    over.sort_by(|a, b| by(times_limit(b), times_limit(a)));
    behind.sort_by_key(|series| std::cmp::Reverse(series.reach_date));
    [
        Group { title: "The line promises a date that a better model denies", series: denied },
        Group { title: "Rising", series: rising },
        Group { title: "Over the limit, and no date can be supported", series: over },
        Group { title: "Behind the goal date", series: behind },
    ]
}

fn by(a: Option<f64>, b: Option<f64>) -> std::cmp::Ordering {
    match (a, b) {
        (Some(a), Some(b)) => a.total_cmp(&b),
        (a, b) => b.is_some().cmp(&a.is_some()),
    }
}

/// Whether the level or the last result is over the limit and there is no date.
#[must_use]
pub fn is_over_without_date(series: &SeriesFinding) -> bool {
    series.reach_date.is_none() && times_limit(series).is_some_and(|times| times > 1.0)
}

/// The level or the last detect, whichever is higher, as a multiple of the limit.
fn times_limit(series: &SeriesFinding) -> Option<f64> {
    let limit = series.limit?;
    let detect = series.last_result.filter(|r| r.is_detect()).map(|r| r.number());
    let higher = [series.level_now, detect].into_iter().flatten().max_by(f64::total_cmp)?;
    Some(higher / limit)
}

/// The series that heads the page, for the next command.
#[must_use]
pub fn foremost(findings: &Findings) -> Option<&SeriesFinding> {
    groups(findings).into_iter().find_map(|group| group.series.first().copied())
}

/// Writes the groups that hold any series.
pub fn first(lines: &mut Lines, findings: &Findings) {
    let groups = groups(findings);
    if groups.iter().all(|group| group.series.is_empty()) {
        lines.heading("No series rises, is over its limit without a date, or is behind its goal");
        return;
    }
    for group in groups.iter().filter(|group| !group.series.is_empty()) {
        lines.heading(group.title);
        for series in group.series.iter().take(SHOWN) {
            entry(lines, findings, series);
        }
        if let Some(left) = group.series.len().checked_sub(SHOWN).filter(|left| *left > 0) {
            lines.paragraph(&format!("and {left} more, in summary.csv"), 2);
        }
    }
}

/// One series: its name, level against limit, rate with interval, date with interval, doubts.
fn entry(lines: &mut Lines, findings: &Findings, series: &SeriesFinding) {
    lines.strong(&series_name(&series.key, &findings.site), 2);
    lines.hanging(&level(series), 4, 6);
    let rate = series_sentence::rate(series, findings.run.confidence).unwrap_or_else(|| {
        series.why_no_rate.map_or_else(
            || "no rate was fitted".to_owned(),
            |why| format!("no rate: {}", reason::no_rate(why)),
        )
    });
    lines.hanging(&rate, 4, 6);
    if let Some(date) = date(series) {
        lines.hanging(&date, 4, 6);
    }
    if let Some(denial) = doubt::denial(series) {
        lines.hanging(&denial, 4, 6);
    }
    let doubts: Vec<&str> = series
        .flags
        .iter()
        .filter(|flag| flag.standing == Standing::Raised)
        .map(|raised| flag::label(raised.code))
        .collect();
    // Without a rate there is nothing to doubt: the reason is said above.
    if !doubts.is_empty() && series.rate_per_year.is_some() {
        lines.hanging(&format!("doubts: {}", doubts.join(", ")), 4, 6);
    }
    let telling = series.most_telling.filter(|choice| {
        choice.answer.verdict != series.verdict || choice.answer.reach != series.reach_date
    });
    if let Some(choice) = telling {
        let text = doubt::most_telling(&choice, series.verdict);
        lines.hanging(&format!("most telling: {text}"), 4, 6);
    }
}

fn level(series: &SeriesFinding) -> String {
    let when = series.sampled.map_or_else(String::new, |span| format!(" in {}", month(span.last)));
    let limit = series
        .limit
        .map_or_else(|| "no limit".to_owned(), |limit| format!("limit {}", table(limit)));
    match (series_sentence::level(series), series.last_result) {
        (Some(level), _) => format!("typical level {level}{when}; {limit}"),
        (None, Some(last)) => {
            let unit = series.unit.label();
            format!("last result {} {unit}{when}; {limit}", crate::words::number::reading(last))
        }
        (None, None) => format!("no result in the window; {limit}"),
    }
}

fn date(series: &SeriesFinding) -> Option<String> {
    if let Some(reach) = series_sentence::reach(series) {
        let goal = series
            .goal_date
            .map_or_else(String::new, |date| format!("; goal{HARD_SPACE}{}", month(date)));
        let meets = series_sentence::meets(series);
        return Some(format!("typical (median) level {meets} the limit {reach}{goal}"));
    }
    if let Some(crosses) = series_sentence::crosses(series) {
        return Some(format!("typical (median) level crosses the limit {crosses}"));
    }
    let why = series.why_no_date?;
    // That it rises is the heading already, and that there is no rate the line before.
    let said = series.verdict == Verdict::Rising || why == WhyNoDate::NoRate;
    (!said).then(|| {
        let bound = series_sentence::not_before(series);
        let bound = bound.map_or_else(String::new, |bound| format!("; {bound}"));
        format!("no date: {}{bound}", reason::no_date(why))
    })
}

/// How many rates were tested and how many would show rising by chance.
#[must_use]
pub fn by_chance(findings: &Findings) -> Option<String> {
    let (tested, expected) = findings.rising_by_chance();
    (tested > 0).then(|| {
        format!(
            "Of {} tested, about {} would show rising by chance alone.",
            counted(tested, "rate", "rates"),
            crate::words::number::shortest(expected, 2)
        )
    })
}
