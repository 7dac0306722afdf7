//! `[[expected]]`, `[[event]]`, `[[decision]]` and `[[qualifier]]`.

use super::super::checked::{Decision, Event, Expected, Qualifier, Restart, Site};
use super::super::choices::{DecisionKind, EventKind};
use super::super::file::{DecisionTable, EventTable, ExpectedTable, QualifierTable};
use super::super::problem::ProblemKind;
use super::super::written::{At, Problems};
use super::{copy, day, in_order, names, results, within};

/// Checks one `[[expected]]` block.
pub(super) fn expected(
    at: &At<ExpectedTable>,
    site: &Site,
    problems: &mut Problems<'_>,
) -> Expected {
    let table = &at.value;
    let round = site.settings.round.months();
    if let Some(every) = &table.every {
        // Ten years: no plan samples more rarely.
        within(every, &(1..=120), problems);
    }
    let every = copy(&table.every).and_then(|months| u32::try_from(months).ok());
    Expected {
        wells: names::wells(table.wells.as_ref(), site, problems),
        analytes: names::analytes(table.analytes.as_ref(), site, problems),
        every_months: every.unwrap_or(round),
    }
}

/// Checks one `[[event]]` block.
pub(super) fn event(
    at: &At<EventTable>,
    site: &Site,
    problems: &mut Problems<'_>,
) -> Option<Event> {
    let table = &at.value;
    let restart = match table.restart.as_ref()?.value {
        true => Restart::Yes,
        false => Restart::No,
    };
    if restart == Restart::Yes {
        let reasons = [
            (table.who.is_none(), "who", "who = \"…\": a restart says who, when and why"),
            (table.when.is_none(), "when", "when = 2026-07-01: a restart says who, when and why"),
            (table.why.is_none(), "why", "why = \"…\": a restart says who, when and why"),
        ];
        for (_, key, example) in reasons.into_iter().filter(|(missing, ..)| *missing) {
            problems.tell(&at.inside(key), ProblemKind::Missing { example });
        }
    }
    let wells = names::wells(table.wells.as_ref(), site, problems);
    Some(Event {
        date: day(&table.date)?,
        what: copy(&table.what)?,
        restart,
        wells,
        kind: copy(&table.kind).unwrap_or(EventKind::Other),
        who: copy(&table.who),
        when: day(&table.when),
        why: copy(&table.why),
    })
}

/// Checks one `[[decision]]` block.
pub(super) fn decision(
    at: &At<DecisionTable>,
    site: &Site,
    problems: &mut Problems<'_>,
) -> Option<Decision> {
    let table = &at.value;
    in_order(table.from.as_ref(), table.to.as_ref(), problems);
    let wells = names::wells(table.wells.as_ref(), site, problems);
    let analytes = names::analytes(table.analytes.as_ref(), site, problems);
    let samples = names::texts(table.samples.as_ref(), problems);
    let records = table.records.as_ref().map_or(&[][..], |list| list.value.as_slice());
    names::distinct(records.iter().map(|at| (at.value, at)), problems);
    for record in records {
        within(record, &(1..=u64::from(u32::MAX)), problems);
    }
    if let Some(file) = &table.file {
        results::inside_folder(file, problems);
    }
    if names_nothing(table) {
        problems.tell(at, ProblemKind::NamesNothing);
    }
    // A line number means nothing once a second file is delivered.
    if let (Some(records), None) = (&table.records, &table.file) {
        problems.tell(records, ProblemKind::Needs { other: "file" });
    }
    let kind = table.kind.as_ref()?;
    suits_kind(table, kind, problems);
    Some(Decision {
        id: copy(&table.id)?,
        kind: kind.value,
        means: copy(&table.means),
        wells,
        analytes,
        from: day(&table.from),
        to: day(&table.to),
        samples,
        file: copy(&table.file),
        records: records.iter().map(|record| record.value).collect(),
        who: copy(&table.who)?,
        when: day(&table.when)?,
        why: copy(&table.why)?,
    })
}

fn names_nothing(table: &DecisionTable) -> bool {
    table.wells.is_none()
        && table.analytes.is_none()
        && table.from.is_none()
        && table.to.is_none()
        && table.samples.is_none()
        && table.file.is_none()
        && table.records.is_none()
}

/// Keys that the kind of decision asks for, and keys that it cannot use.
fn suits_kind(table: &DecisionTable, kind: &At<DecisionKind>, problems: &mut Problems<'_>) {
    match kind.value {
        DecisionKind::UseQualifier if table.means.is_none() => {
            problems.tell(kind, ProblemKind::Needs { other: "means" });
        }
        DecisionKind::Join => suits_join(table, kind, problems),
        DecisionKind::Window => {
            let other = "kind = \"window\", which goes by wells, analytes and dates";
            if table.from.is_none() && table.to.is_none() {
                problems.tell(kind, ProblemKind::Needs { other: "from or to" });
            }
            if let Some(at) = &table.samples {
                problems.tell(at, ProblemKind::Pointless { other });
            }
            if let Some(at) = &table.file {
                problems.tell(at, ProblemKind::Pointless { other });
            }
            if let Some(at) = &table.records {
                problems.tell(at, ProblemKind::Pointless { other });
            }
        }
        DecisionKind::Exclude | DecisionKind::UseQualifier => {}
    }
    if let Some(means) = &table.means
        && kind.value != DecisionKind::UseQualifier
    {
        let other = "a kind other than \"use-qualifier\"";
        problems.tell(means, ProblemKind::Pointless { other });
    }
}

/// A join names the kept well first and then those that join it; it goes by wells and dates alone.
fn suits_join(table: &DecisionTable, kind: &At<DecisionKind>, problems: &mut Problems<'_>) {
    let wells = table.wells.as_ref().map_or(0, |wells| wells.value.len());
    if wells < 2 {
        let other = "wells: the name that is kept, then each well that joins it";
        problems.tell(kind, ProblemKind::Needs { other });
    }
    let other = "kind = \"join\", which goes by wells and dates";
    if let Some(at) = &table.analytes {
        problems.tell(at, ProblemKind::Pointless { other });
    }
    if let Some(at) = &table.samples {
        problems.tell(at, ProblemKind::Pointless { other });
    }
    if let Some(at) = &table.file {
        problems.tell(at, ProblemKind::Pointless { other });
    }
    if let Some(at) = &table.records {
        problems.tell(at, ProblemKind::Pointless { other });
    }
}

/// Tells of two decisions with one id.
pub(super) fn distinct_ids<'a>(
    blocks: impl Iterator<Item = &'a At<DecisionTable>>,
    problems: &mut Problems<'_>,
) {
    let ids = blocks.filter_map(|block| block.value.id.as_ref());
    names::distinct(ids.map(|at| (at.value.clone(), at)), problems);
}

/// Checks one `[[qualifier]]` block.
pub(super) fn qualifier(at: &At<QualifierTable>, problems: &mut Problems<'_>) -> Option<Qualifier> {
    let table = &at.value;
    match (&table.code, &table.condition) {
        (None, None) => {
            let example = "code = \"B\", or condition = \"…\"";
            problems.tell(&at.inside("code"), ProblemKind::Missing { example });
        }
        (Some(_), Some(condition)) => {
            problems.tell(condition, ProblemKind::EitherOr { other: "code" });
        }
        (Some(code), None) => single_code(code, problems),
        (None, Some(_)) => {}
    }
    for pattern in table.files.iter().flat_map(|list| &list.value) {
        results::pattern(pattern, problems);
    }
    Some(Qualifier {
        code: copy(&table.code),
        condition: copy(&table.condition),
        means: copy(&table.means)?,
        files: names::texts(table.files.as_ref(), problems),
        who: copy(&table.who)?,
        when: day(&table.when)?,
        why: copy(&table.why)?,
    })
}

/// Qualifiers are split before they are looked up, so a code that would be split never matches.
fn single_code(at: &At<String>, problems: &mut Problems<'_>) {
    if at.value.contains(|c: char| c.is_whitespace() || matches!(c, ';' | ',' | '/')) {
        let wants = "one code without blank, comma, semicolon or slash";
        problems.tell(at, ProblemKind::WrongText { found: at.value.clone(), wants });
    }
}

/// Tells of two meanings for one code or condition in the same files.
pub(super) fn distinct_codes<'a>(
    blocks: impl Iterator<Item = &'a At<QualifierTable>>,
    problems: &mut Problems<'_>,
) {
    let keyed = blocks.filter_map(|block| {
        let table = &block.value;
        let at = table.code.as_ref().or(table.condition.as_ref())?;
        let mut files: Vec<&str> = table
            .files
            .iter()
            .flat_map(|list| &list.value)
            .map(|file| file.value.as_str())
            .collect();
        files.sort_unstable();
        Some(((table.code.is_some(), at.value.clone(), files), at))
    });
    names::distinct(keyed, problems);
}
