//! From the site file as written to the site as checked: ranges, references, reasons.
//!
//! Everything that could be read is checked, so one run tells every problem. What could not be
//! read was told already and is passed over here.

mod analytes;
mod history;
mod later;
mod names;
mod results;
mod settings;
mod wells;

use std::fmt::Display;
use std::ops::RangeInclusive;

use chrono::NaiveDate;

use super::checked::{FlagThresholds, Listing, ResultsRule, Settings, Site};
use super::file::{SiteFile, SiteTable};
use super::problem::ProblemKind;
use super::written::{At, Day, Problems};

/// Checks a site file and fills in every default.
///
/// The site is to be used only where no problem was told.
pub(super) fn check(file: &SiteFile, problems: &mut Problems<'_>) -> Site {
    later::refuse(file, problems);
    let mut site = named(file.site.as_ref().map(|site| &site.value), problems);
    let (settings, flags) = settings::check(file, problems);
    (site.settings, site.flags) = (settings, flags);
    site.results = list(&file.results).map(|rule| results::check(rule, problems)).collect();
    results::distinct(list(&file.results), problems);
    if site.results.is_empty() {
        site.results.push(ResultsRule::plain());
    }
    site.analytes = list(&file.analyte).filter_map(|a| analytes::check(a, problems)).collect();
    analytes::distinct(list(&file.analyte), problems);
    if !site.analytes.is_empty() {
        site.listing = Listing::Listed;
    }
    site.wells = list(&file.well).filter_map(|w| wells::check(w, &site, problems)).collect();
    wells::distinct(list(&file.well), problems);
    site.expected = list(&file.expected).map(|e| history::expected(e, &site, problems)).collect();
    site.events = list(&file.event).filter_map(|e| history::event(e, &site, problems)).collect();
    site.events.sort_by_key(|event| event.date);
    site.decisions =
        list(&file.decision).filter_map(|d| history::decision(d, &site, problems)).collect();
    history::distinct_ids(list(&file.decision), problems);
    site.qualifiers =
        list(&file.qualifier).filter_map(|q| history::qualifier(q, problems)).collect();
    history::distinct_codes(list(&file.qualifier), problems);
    site
}

/// A site of which only `[site]` is filled in.
fn named(table: Option<&SiteTable>, problems: &mut Problems<'_>) -> Site {
    let unwritten = SiteTable::default();
    let table = table.unwrap_or(&unwritten);
    in_order(table.active_from.as_ref(), table.active_to.as_ref(), problems);
    Site {
        name: copy(&table.name).unwrap_or_default(),
        authority: copy(&table.authority),
        citation: copy(&table.citation),
        aliases: names::texts(table.aliases.as_ref(), problems),
        active_from: day(&table.active_from),
        active_to: day(&table.active_to),
        listing: Listing::Everything,
        settings: Settings::default(),
        flags: FlagThresholds::default(),
        results: Vec::new(),
        analytes: Vec::new(),
        wells: Vec::new(),
        expected: Vec::new(),
        events: Vec::new(),
        decisions: Vec::new(),
        qualifiers: Vec::new(),
    }
}

/// The blocks of one kind.
fn list<T>(blocks: &Option<At<Vec<At<T>>>>) -> std::slice::Iter<'_, At<T>> {
    blocks.as_ref().map_or(&[][..], |blocks| blocks.value.as_slice()).iter()
}

/// The value of a key, where it is there.
fn copy<T: Clone>(key: &Option<At<T>>) -> Option<T> {
    key.as_ref().map(|at| at.value.clone())
}

/// The date of a key, where it is there.
fn day(key: &Option<At<Day>>) -> Option<NaiveDate> {
    key.as_ref().map(|at| at.value.0)
}

/// Tells of a last date before its first.
fn in_order(from: Option<&At<Day>>, to: Option<&At<Day>>, problems: &mut Problems<'_>) {
    if let (Some(from), Some(to)) = (from, to)
        && from.value.0 > to.value.0
    {
        problems.tell(to, ProblemKind::Backwards { from: from.value.0, to: to.value.0 });
    }
}

/// Whether a number is within its range; one that is not is told.
fn within<T: PartialOrd + Display>(
    at: &At<T>,
    range: &RangeInclusive<T>,
    problems: &mut Problems<'_>,
) -> bool {
    let holds = range.contains(&at.value);
    if !holds {
        let (low, high) = (range.start(), range.end());
        let kind = ProblemKind::OutOfRange {
            found: at.value.to_string(),
            wants: format!("a number from {low} to {high}"),
        };
        problems.tell(at, kind);
    }
    holds
}
