//! The page after `review`: read in a minute by a busy person.

use super::{PageOptions, account, first, heading};
use crate::findings::Findings;
use crate::terms::Verdict;
use crate::words::caution::caution;
use crate::words::clean::{shell_word, shown};
use crate::words::layout::{Align, Lines};
use crate::words::number::{confidence, count, counted};
use crate::words::verdict;

/// Reasons for setting records aside that the page shows; the others are counted.
const REASONS_SHOWN: usize = 6;
/// Notes that the page shows; `check` shows more.
const NOTES_SHOWN: usize = 8;

/// The order in which the page counts verdicts: what asks for attention first.
const BY_ATTENTION: [Verdict; 7] = [
    Verdict::Rising,
    Verdict::Flat,
    Verdict::Undecided,
    Verdict::Attenuating,
    Verdict::Below,
    Verdict::Undetected,
    Verdict::TooFew,
];

/// The page.
#[must_use]
pub fn review(findings: &Findings, options: &PageOptions<'_>) -> String {
    let mut lines = Lines::new(options.width, options.color);
    lines.title(&heading("Review", &findings.run, &findings.site));
    lines.heading("What was read");
    account::read(&mut lines, &findings.run);
    account::set_aside(&mut lines, &findings.run, REASONS_SHOWN);
    verdicts(&mut lines, findings);
    first::first(&mut lines, findings);
    if let Some(chance) = first::by_chance(findings) {
        lines.blank();
        lines.paragraph(&chance, 0);
    }
    account::notes(&mut lines, &findings.notes, NOTES_SHOWN);
    lines.blank();
    if let Some(folder) = options.folder {
        lines.line(&format!("Written to  {}", shown(folder)));
        if options.charts_left_out > 0 {
            let left = counted(options.charts_left_out, "chart is", "charts are");
            lines.paragraph(
                &format!(
                    "{left} left out: only series that rise, are behind their goal, \
                or are over their limit without a date have one"
                ),
                12,
            );
        }
    }
    lines.line(&format!("Next        {}", next_command(findings, options.site_argument)));
    lines.blank();
    lines.paragraph(&caution(&findings.site), 0);
    lines.finish()
}

/// The verdicts that occur, with what each means and how many are over their limit now.
fn verdicts(lines: &mut Lines, findings: &Findings) {
    let series = counted(findings.series.len(), "series", "series");
    let wells = counted(findings.wells.len(), "well", "wells");
    let level = confidence(findings.run.confidence);
    lines.heading(&format!("What {series} at {wells} say, at {level} confidence (two-sided)"));
    let rows: Vec<Vec<String>> = BY_ATTENTION
        .iter()
        .filter_map(|&verdict| {
            let of: Vec<_> = findings.series.iter().filter(|s| s.verdict == verdict).collect();
            let over = of.iter().filter(|s| s.over_limit_now()).count();
            let over = if over == 0 {
                String::new()
            } else {
                format!("; last result over the limit: {}", count(over))
            };
            (!of.is_empty()).then(|| {
                vec![
                    count(of.len()),
                    verdict::label(verdict).to_owned(),
                    format!("{}{over}", verdict::gloss(verdict)),
                ]
            })
        })
        .collect();
    lines.rows(&rows, &[Align::Right, Align::Left, Align::Left], 2);
}

/// One command that leads on: the foremost series in full, else what could not be used, else what
/// the commonest verdict means.
fn next_command(findings: &Findings, site: &str) -> String {
    let site = shell_word(site);
    if let Some(series) = first::foremost(findings) {
        return show_command(&site, series);
    }
    let aside = account::reasons(&findings.run, crate::ledger::Outcome::SetAside);
    if !aside.is_empty() {
        return format!("ebbwell check {site}");
    }
    let commonest = findings.verdict_counts().into_iter().max_by_key(|(_, count)| *count);
    commonest.map_or_else(
        || format!("ebbwell check {site}"),
        |(verdict, _)| format!("ebbwell explain {}", verdict.code()),
    )
}

/// The command that shows one series in full.
fn show_command(site: &str, series: &crate::findings::SeriesFinding) -> String {
    let (well, analyte) = (&series.key.well, &series.key.analyte);
    let fraction = match series.key.fraction_code() {
        "" => String::new(),
        code => format!(" --fraction {code}"),
    };
    // A name that looks like an option has to stand behind `--`.
    let guard = if well.starts_with('-') || analyte.starts_with('-') { " --" } else { "" };
    format!("ebbwell show{fraction}{guard} {site} {} {}", shell_word(well), shell_word(analyte))
}
