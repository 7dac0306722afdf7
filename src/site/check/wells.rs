//! `[[well]]`: places, aliases that mean one well on one date, limits of listed analytes.

use super::super::checked::{Limit, Site, Well, WellAlias, WellLimit};
use super::super::choices::Role;
use super::super::file::{AliasTable, WellLimitTable, WellTable};
use super::super::problem::ProblemKind;
use super::super::written::{Amount, At, Problems};
use super::analytes::{one_a_date, one_dimension, other_basis};
use super::{copy, day, in_order, names, within};

/// Checks one block; `None` where it has no name.
pub(super) fn check(at: &At<WellTable>, site: &Site, problems: &mut Problems<'_>) -> Option<Well> {
    let table = &at.value;
    place(table, problems);
    let aliases: Vec<WellAlias> = table
        .aliases
        .iter()
        .flat_map(|list| &list.value)
        .filter_map(|entry| alias(&entry.value, problems))
        .collect();
    let limits = limits(table, site, problems);
    Some(Well {
        name: copy(&table.name)?,
        role: copy(&table.role).unwrap_or(Role::Plume),
        latitude: copy(&table.latitude),
        longitude: copy(&table.longitude),
        x: copy(&table.x),
        y: copy(&table.y),
        aliases,
        depths: copy(&table.depths),
        limits,
        goal_date: day(&table.goal_date),
    })
}

/// Both coordinates or none, of one kind.
fn place(table: &WellTable, problems: &mut Problems<'_>) {
    let pairs = [
        (&table.latitude, &table.longitude, "latitude", "longitude"),
        (&table.x, &table.y, "x", "y"),
    ];
    for (first, second, first_key, second_key) in pairs {
        match (first, second) {
            (Some(at), None) => problems.tell(at, ProblemKind::Needs { other: second_key }),
            (None, Some(at)) => problems.tell(at, ProblemKind::Needs { other: first_key }),
            _ => {}
        }
    }
    if let Some(at) = &table.latitude {
        within(at, &(-90.0..=90.0), problems);
    }
    if let Some(at) = &table.longitude {
        within(at, &(-180.0..=180.0), problems);
    }
    if let (Some(_), Some(at)) = (&table.latitude, &table.x) {
        problems.tell(at, ProblemKind::EitherOr { other: "latitude" });
    }
}

fn alias(table: &AliasTable, problems: &mut Problems<'_>) -> Option<WellAlias> {
    in_order(table.from.as_ref(), table.to.as_ref(), problems);
    Some(WellAlias {
        name: copy(&table.name)?,
        from: day(&table.from),
        to: day(&table.to),
        who: copy(&table.who)?,
        when: day(&table.when)?,
        why: copy(&table.why)?,
    })
}

fn limits(table: &WellTable, site: &Site, problems: &mut Problems<'_>) -> Vec<WellLimit> {
    let mut all: Vec<(WellLimit, At<Amount>)> = Vec::new();
    for entry in table.limits.iter().flat_map(|list| &list.value) {
        let WellLimitTable { analyte, value, from, source } = &entry.value;
        let analyte = analyte.as_ref().and_then(|at| names::analyte(at, site, problems));
        let (Some(analyte), Some(at)) = (analyte, value) else { continue };
        if let Some(listed) = site.analyte_named(&analyte) {
            let unit = listed.limits.first().map(|limit| limit.value.unit).or(listed.unit);
            if let Some(unit) = unit {
                one_dimension(at, unit, problems);
            }
            if let (Some(basis), Some(known)) = (&at.value.basis, &listed.basis) {
                other_basis(&at.with(basis.clone()), known, problems);
            }
        }
        let limit = Limit { value: at.value.value, from: day(from), source: copy(source) };
        all.push((WellLimit { analyte, limit }, at.clone()));
    }
    all.sort_by(|(a, _), (b, _)| (&a.analyte, a.limit.from).cmp(&(&b.analyte, b.limit.from)));
    for same in all.chunk_by(|(a, _), (b, _)| a.analyte == b.analyte) {
        one_a_date(same.iter().map(|(well, at)| (&well.limit, at)), problems);
    }
    all.into_iter().map(|(limit, _)| limit).collect()
}

/// Tells of names that mean two wells on one date. An alias with a beginning or an end may be
/// another well's name: labels do get swapped for a while.
pub(super) fn distinct<'a>(
    blocks: impl Iterator<Item = &'a At<WellTable>> + Clone,
    problems: &mut Problems<'_>,
) {
    let own = blocks.clone().filter_map(|block| block.value.name.as_ref());
    names::distinct(own.clone().map(|at| (at.value.clone(), at)), problems);
    let tables = blocks.flat_map(|block| &block.value.aliases).flat_map(|list| &list.value);
    let mut seen: Vec<(&At<String>, &AliasTable)> = Vec::new();
    for AliasPlace { name, table } in tables.filter_map(|at| AliasPlace::of(&at.value)) {
        let always = table.from.is_none() && table.to.is_none();
        let as_name = own.clone().find(|at| always && at.value == name.value);
        let as_alias = seen
            .iter()
            .find(|(other, earlier)| other.value == name.value && overlap(earlier, table))
            .map(|(at, _)| *at);
        if let Some(first) = as_name.or(as_alias) {
            let what = format!("\"{}\"", name.value);
            problems.tell(name, ProblemKind::Duplicate { what, first: Some(first.line) });
        }
        seen.push((name, table));
    }
}

/// An alias with its name's place.
struct AliasPlace<'a> {
    name: &'a At<String>,
    table: &'a AliasTable,
}

impl<'a> AliasPlace<'a> {
    fn of(table: &'a AliasTable) -> Option<Self> {
        table.name.as_ref().map(|name| Self { name, table })
    }
}

fn overlap(a: &AliasTable, b: &AliasTable) -> bool {
    let begins_by_end = |from, to| match (from, to) {
        (Some(from), Some(to)) => from <= to,
        _ => true,
    };
    begins_by_end(day(&a.from), day(&b.to)) && begins_by_end(day(&b.from), day(&a.to))
}
