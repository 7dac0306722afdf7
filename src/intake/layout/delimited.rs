//! Delimited text becomes a grid: by the declared separator, else by the one that shows a table.

use super::{Grid, cross_tab, long};
use crate::intake::header::mapping;
use crate::intake::split::split;
use crate::site::{ResultsRule, Site};

/// Separators that are tried where none is declared.
const SEPARATORS: [u8; 3] = [b',', b';', b'\t'];
/// How much of a text shows which separator it has, in bytes (judgement).
const SAMPLE: usize = 64 << 10;

/// Splits a text.
pub(super) fn grid(text: &str, rule: &ResultsRule, site: &Site) -> Grid {
    let separator = rule.separator.unwrap_or_else(|| separator(text, rule, site));
    let lines = split(text, separator);
    Grid { sheet: String::new(), hidden: false, lines: lines.lines, blank: lines.blank }
}

/// The separator under which the first line is a header, else under which the text's beginning
/// shows a table, else under which the first line lacks least.
fn separator(text: &str, rule: &ResultsRule, site: &Site) -> u8 {
    let first_line = text.trim_start().lines().next().unwrap_or_default();
    let header = |separator: u8| -> (usize, usize) {
        let lines = split(first_line, separator).lines;
        let cells: Vec<&str> = lines.first().map(|l| l.cells.iter().collect()).unwrap_or_default();
        let found = mapping(cells.iter().copied(), &rule.columns);
        (found.map_or(0, |mapping| usize::MAX - mapping.lacks().len()), cells.len())
    };
    let best = |score: &dyn Fn(u8) -> (u8, usize, usize)| {
        // The first of equals, so that a comma wins where nothing speaks for another.
        SEPARATORS.into_iter().rev().max_by_key(|&separator| score(separator)).unwrap_or(b',')
    };
    let by_header = best(&|separator| {
        let (lacks, cells) = header(separator);
        (0, lacks, cells)
    });
    if header(by_header).0 == usize::MAX {
        return by_header;
    }
    let sample = beginning(text);
    best(&|separator| {
        let lines = split(sample, separator).lines;
        let shown = if long::header(&lines, rule).is_ok() {
            3
        } else {
            match cross_tab::shows(&lines, rule, site) {
                Ok(true) => 2,
                Err(_) => 1,
                Ok(false) => 0,
            }
        };
        let (lacks, cells) = header(separator);
        (shown, lacks, cells)
    })
}

/// The text's first lines.
fn beginning(text: &str) -> &str {
    if text.len() <= SAMPLE {
        return text;
    }
    let cut = (0..=SAMPLE).rev().find(|at| text.is_char_boundary(*at)).unwrap_or(0);
    let end = text[..cut].rfind(['\n', '\r']).unwrap_or(cut);
    &text[..end]
}
