//! `[[analyte]]`: names and CAS numbers that agree, limits in units of one kind.

use super::super::cas::{CasCheck, cas_check, trimmed};
use super::super::catalogue;
use super::super::checked::{Analyte, Limit};
use super::super::file::{AnalyteTable, LimitTable};
use super::super::problem::ProblemKind;
use super::super::written::{Amount, At, Problems};
use super::{copy, day, names};
use crate::terms::{Unit, folded};

/// Checks one block; `None` where it has no name.
pub(super) fn check(at: &At<AnalyteTable>, problems: &mut Problems<'_>) -> Option<Analyte> {
    let table = &at.value;
    let cas = table.cas.as_ref().and_then(|at| number(at, table.name.as_ref(), problems));
    let written = amounts(table, problems);
    let unit = table.unit.as_ref().map(|at| at.with(at.value.0.unit));
    let limits: Vec<Limit> = written.iter().map(|(limit, _)| limit.clone()).collect();
    if let Some(first) = unit.as_ref().map(|at| at.value).or(limits.first().map(|l| l.value.unit)) {
        for (_, at) in &written {
            one_dimension(at, first, problems);
        }
    }
    let basis = one_basis(table, &written, problems);
    let name = copy(&table.name)?;
    let half_life_years =
        catalogue::find(cas.as_deref(), &name).and_then(|entry| entry.half_life_years);
    Some(Analyte {
        name,
        cas,
        aliases: table.aliases.as_ref().map_or_else(Vec::new, |list| {
            list.value.iter().map(|alias| alias.value.clone()).collect()
        }),
        unit: unit.map(|at| at.value),
        basis,
        fraction: copy(&table.fraction),
        medium: copy(&table.medium),
        limits,
        goal_date: day(&table.goal_date),
        half_life_years,
    })
}

/// Tells of names, aliases and CAS numbers that two analytes carry. Two spellings of one name at
/// one analyte are no harm.
pub(super) fn distinct<'a>(
    blocks: impl Iterator<Item = &'a At<AnalyteTable>> + Clone,
    problems: &mut Problems<'_>,
) {
    let every_name = blocks.clone().flat_map(|block| {
        let aliases = block.value.aliases.iter().flat_map(|list| &list.value);
        let mut own: Vec<(String, &At<String>)> =
            block.value.name.iter().chain(aliases).map(|at| (folded(&at.value), at)).collect();
        own.sort_by(|(a, _), (b, _)| a.cmp(b));
        own.dedup_by(|(a, _), (b, _)| a == b);
        own
    });
    names::distinct(every_name, problems);
    let numbers = blocks.filter_map(|block| block.value.cas.as_ref());
    names::distinct(numbers.map(|at| (trimmed(&at.value).to_owned(), at)), problems);
}

/// A CAS number that is well formed and not another substance's. A check digit that fails is no
/// problem here: numbers like that stand in official lists.
fn number(
    at: &At<String>,
    name: Option<&At<String>>,
    problems: &mut Problems<'_>,
) -> Option<String> {
    let cas = trimmed(&at.value);
    if cas_check(cas) == CasCheck::Malformed {
        let wants = "a CAS number, such as \"71-43-2\"";
        problems.tell(at, ProblemKind::WrongText { found: at.value.clone(), wants });
        return None;
    }
    if let Some(name) = name
        && let (Some(of), Some(meant)) = (catalogue::by_cas(cas), catalogue::by_name(&name.value))
        && let Some(number) = meant.cas
        && of != meant
    {
        let name = name.value.clone();
        problems.tell(at, ProblemKind::OtherSubstance { of: of.name, name, cas: number });
    }
    Some(cas.to_owned())
}

/// The limits as written, the earliest first, each with its place.
fn amounts(table: &AnalyteTable, problems: &mut Problems<'_>) -> Vec<(Limit, At<Amount>)> {
    if let (Some(limits), Some(_)) = (&table.limits, &table.limit) {
        problems.tell(limits, ProblemKind::EitherOr { other: "limit" });
    }
    if table.limit.is_none() {
        let other = if table.limits.is_some() {
            "limit (an entry of limits takes source and from)"
        } else {
            "limit"
        };
        if let Some(at) = &table.limit_source {
            problems.tell(at, ProblemKind::Needs { other });
        }
        if let Some(at) = &table.limit_from {
            problems.tell(at, ProblemKind::Needs { other });
        }
    }
    let single = table.limit.as_ref().filter(|_| table.limits.is_none()).map(|at| {
        let (from, source) = (day(&table.limit_from), copy(&table.limit_source));
        (Limit { value: at.value.value, from, source }, at.clone())
    });
    let several = table.limits.iter().flat_map(|list| &list.value).filter_map(|entry| {
        let LimitTable { value, from, source } = &entry.value;
        let at = value.as_ref()?;
        let limit = Limit { value: at.value.value, from: day(from), source: copy(source) };
        Some((limit, at.clone()))
    });
    let mut all: Vec<_> = single.into_iter().chain(several).collect();
    all.sort_by_key(|(limit, _)| limit.from);
    one_a_date(all.iter().map(|(limit, at)| (limit, at)), problems);
    all
}

/// Tells of two limits from one date, or of two without a date; they stand next to each other.
pub(super) fn one_a_date<'a>(
    sorted: impl Iterator<Item = (&'a Limit, &'a At<Amount>)>,
    problems: &mut Problems<'_>,
) {
    let mut before: Option<(&Limit, &At<Amount>)> = None;
    for (limit, at) in sorted {
        if let Some((earlier, first)) = before
            && earlier.from == limit.from
        {
            let what = limit.from.map_or_else(
                || "a limit without a date".to_owned(),
                |from| format!("a limit from {from}"),
            );
            // The one written later is the one to look at.
            let (first, second) = if first.line <= at.line { (first, at) } else { (at, first) };
            problems.tell(second, ProblemKind::Duplicate { what, first: Some(first.line) });
        }
        before = Some((limit, at));
    }
}

/// Tells of a limit that does not convert to the analyte's unit.
pub(super) fn one_dimension(at: &At<Amount>, analyte: Unit, problems: &mut Problems<'_>) {
    let unit = at.value.value.unit;
    if unit.dimension() != analyte.dimension() {
        let kind = ProblemKind::OtherDimension { unit: unit.label(), other: analyte.label() };
        problems.tell(at, kind);
    }
}

/// The basis that `basis`, the unit and every limit agree on.
fn one_basis(
    table: &AnalyteTable,
    limits: &[(Limit, At<Amount>)],
    problems: &mut Problems<'_>,
) -> Option<String> {
    let own = table.basis.clone();
    let of_unit = table.unit.as_ref().and_then(|at| Some(at.with(at.value.0.basis.clone()?)));
    let of_limits = limits.iter().filter_map(|(_, at)| Some(at.with(at.value.basis.clone()?)));
    let mut all = own.into_iter().chain(of_unit).chain(of_limits);
    let first = all.next()?;
    for at in all {
        other_basis(&at, &first.value, problems);
    }
    Some(first.value)
}

/// Tells of a basis other than the analyte's.
pub(super) fn other_basis(at: &At<String>, analyte: &str, problems: &mut Problems<'_>) {
    if folded(&at.value) != folded(analyte) {
        let (found, other) = (at.value.clone(), analyte.to_owned());
        problems.tell(at, ProblemKind::OtherBasis { found, other });
    }
}
