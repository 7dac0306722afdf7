//! summary.json: the whole of the findings for a script. Later work adds keys and changes none.

use super::arrival_json;
use super::cells::in_json;
use super::charts;
use super::json::Json;
use crate::findings::columns::SUMMARY;
use crate::findings::{
    DuplicateFinding, Findings, Note, OutcomeCount, RunFacts, SCHEMA_VERSION, SeriesFinding,
    SiteFacts, WellFinding,
};
use crate::terms::{Effort, Figure, Flag};
use crate::words::{caution, flag_sentence, number, series_sentence, told};

/// The whole summary as text.
#[must_use]
pub fn summary_json(findings: &Findings) -> String {
    let (tested, by_chance) = findings.rising_by_chance();
    let chosen = charts::chosen(findings);
    let counts = findings.verdict_counts();
    let level = findings.run.confidence;
    Json::Object(vec![
        ("schema_version", Json::Count(u64::from(SCHEMA_VERSION))),
        ("run", run(&findings.run)),
        ("site", site(&findings.site)),
        ("caution", Json::Text(caution::caution(&findings.site))),
        ("notes", notes(&findings.notes)),
        ("sentinels", arrival_json::sentinels(&findings.arrival)),
        ("quality", arrival_json::quality(&findings.arrival, findings.run.rpd_allowed)),
        ("completeness", arrival_json::completeness(&findings.arrival)),
        (
            "verdict_counts",
            Json::Object(
                counts.into_iter().map(|(verdict, n)| (verdict.code(), Json::count(n))).collect(),
            ),
        ),
        ("rates_tested", Json::count(tested)),
        ("rising_by_chance", Json::Number(by_chance)),
        ("charts_left_out", Json::count(chosen.left_out)),
        ("wells", Json::List(findings.wells.iter().map(well).collect())),
        ("series", Json::List(findings.series.iter().map(|s| series(s, level)).collect())),
    ])
    .to_text()
}

/// What was run, and what became of the records.
#[must_use]
pub fn run(run: &RunFacts) -> Json {
    let full = run.effort == Effort::Full;
    let files = run.files.iter().map(|file| {
        Json::Object(vec![
            ("name", Json::text(&file.name)),
            ("records", Json::count(file.records)),
            ("blank_lines", Json::count(file.blank_lines)),
            ("empty_cells", Json::count(file.empty_cells)),
            ("encoding", Json::text(file.encoding)),
        ])
    });
    let unreadable = run.unreadable.iter().map(|(name, why)| {
        Json::Object(vec![("name", Json::text(name)), ("why", Json::text(why))])
    });
    Json::Object(vec![
        ("version", Json::text(run.version)),
        ("as_of", Json::date(Some(run.as_of))),
        ("effort", Json::text(run.effort.code())),
        ("refits", Json::Bool(full)),
        ("confidence", Json::Number(run.confidence)),
        ("horizon_years", Json::Number(run.horizon_years)),
        ("template", Json::text_or_null(run.template.as_deref())),
        ("files", Json::List(files.collect())),
        ("unreadable", Json::List(unreadable.collect())),
        ("records", outcomes(&run.outcomes)),
    ])
}

/// Records by outcome and reason.
#[must_use]
pub fn outcomes(counts: &[OutcomeCount]) -> Json {
    let counts = counts.iter().map(|count| {
        Json::Object(vec![
            ("outcome", Json::text(count.outcome)),
            ("reason", Json::text_or_null(Some(&count.reason))),
            ("records", Json::count(count.records)),
        ])
    });
    Json::List(counts.collect())
}

/// The site.
#[must_use]
pub fn site(site: &SiteFacts) -> Json {
    Json::Object(vec![
        ("name", Json::text(&site.name)),
        ("authority", Json::text_or_null(site.authority.as_deref())),
        ("citation", Json::text_or_null(site.citation.as_deref())),
        ("round", Json::text_or_null(Some(&site.round))),
    ])
}

/// What is told once, the most important last.
#[must_use]
pub fn notes(notes: &[Note]) -> Json {
    let mut notes: Vec<Note> = notes.iter().filter(|note| note.told.is_said()).cloned().collect();
    told::sort_notes(&mut notes);
    let said = notes.iter().map(|note| {
        Json::Object(vec![
            ("text", Json::Text(told::sentence(&note.told, note.records))),
            ("records", Json::count(note.records)),
        ])
    });
    Json::List(said.collect())
}

fn well(well: &WellFinding) -> Json {
    let columns = super::tables::wells::COLUMNS;
    Json::Object(columns.iter().map(|c| (c.name, in_json(&(c.cell)(well)))).collect())
}

/// One series: every column by name, flags as objects, and what the table has no room for.
#[must_use]
pub fn series(series: &SeriesFinding, level: f64) -> Json {
    let mut members: Vec<(&'static str, Json)> = SUMMARY
        .iter()
        .filter(|column| column.name != "flags")
        .map(|column| (column.name, in_json(&(column.cell)(series))))
        .collect();
    members.push(("flags", Json::List(series.flags.iter().map(flag).collect())));
    members.push(("beyond_horizon", Json::Bool(series.beyond_horizon)));
    members.push(("stands_in_the_way", Json::Bool(series.stands_in_the_way)));
    members.push(("sentence", Json::Text(series_sentence::series_sentence(series, level))));
    members.extend(super::doubts_json::doubts(series));
    members.push(("duplicates", Json::List(series.duplicates.iter().map(duplicate).collect())));
    members.push(("records", outcomes(&series.records)));
    Json::Object(members)
}

/// One flag with all that it carries.
#[must_use]
pub fn flag(flag: &Flag) -> Json {
    let standing = match flag.standing {
        crate::terms::Standing::Raised => "raised",
        crate::terms::Standing::NotAssessable => "not-assessable",
    };
    let figure = match &flag.figure {
        Figure::Number(value) => Json::Number(*value),
        Figure::Date(date) => Json::date(Some(*date)),
        Figure::Word(word) => Json::text(word),
        Figure::Absent => Json::Null,
    };
    Json::Object(vec![
        ("flag", Json::text(flag.code.code())),
        ("standing", Json::text(standing)),
        ("figure", figure),
        ("threshold", Json::number(flag.threshold)),
        ("source", Json::text(flag.code.source())),
        ("note", Json::Text(flag_sentence::sentence(flag))),
    ])
}

fn duplicate(pair: &DuplicateFinding) -> Json {
    Json::Object(vec![
        ("date", Json::date(Some(pair.date))),
        ("parent", Json::Text(number::reading(pair.parent))),
        ("duplicate", Json::Text(number::reading(pair.duplicate))),
        ("rpd_percent", Json::number(pair.rpd_percent)),
        ("differs", Json::Bool(pair.differs)),
        ("record", Json::text(&pair.record)),
    ])
}
