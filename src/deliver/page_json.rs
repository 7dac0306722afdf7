//! What `check`, `show` and `explain` print with `--json`.

use super::arrival_json;
use super::cells::in_json;
use super::json::Json;
use super::run_json::{applied, mapping};
use super::summary_json::{notes, outcomes, run, series as series_json, site};
use super::tables::ledger;
use crate::findings::{Findings, SCHEMA_VERSION, SeriesFinding, UsedValue};
use crate::words::caution;
use crate::words::explain::Entry;
use crate::words::page::CheckFacts;

/// A check: what was read, what was told, and examples of what is not used.
#[must_use]
pub fn check_json(facts: &CheckFacts<'_>) -> String {
    let examples = facts.examples.iter().map(|row| {
        Json::Object(ledger::COLUMNS.iter().map(|c| (c.name, in_json(&(c.cell)(row)))).collect())
    });
    Json::Object(vec![
        ("schema_version", Json::Count(u64::from(SCHEMA_VERSION))),
        ("run", run(facts.run)),
        ("site", site(facts.site)),
        ("caution", Json::Text(caution::caution(facts.site))),
        ("notes", notes(facts.notes)),
        ("sentinels", arrival_json::sentinels(facts.arrival)),
        ("quality", arrival_json::quality(facts.arrival, facts.run.rpd_allowed)),
        ("completeness", arrival_json::completeness(facts.arrival)),
        ("mapping", mapping(facts.run)),
        ("applied", applied(facts.run)),
        ("records", outcomes(&facts.run.outcomes)),
        ("examples", Json::List(examples.collect())),
    ])
    .to_text()
}

/// One series with its values and its line.
#[must_use]
pub fn show_json(findings: &Findings, series: &SeriesFinding) -> String {
    let fitted = series.fitted.as_ref().map_or(Json::Null, |fitted| {
        let band = fitted.band.iter().map(|point| {
            Json::Object(vec![
                ("date", Json::date(Some(point.date))),
                ("median", Json::Number(point.median)),
                ("low", Json::Number(point.low)),
                ("high", Json::Number(point.high)),
            ])
        });
        Json::List(band.collect())
    });
    Json::Object(vec![
        ("schema_version", Json::Count(u64::from(SCHEMA_VERSION))),
        ("run", run(&findings.run)),
        ("site", site(&findings.site)),
        ("caution", Json::Text(caution::caution(&findings.site))),
        ("series", series_json(series, findings.run.confidence)),
        ("values", Json::List(series.values.iter().map(value).collect())),
        ("line", fitted),
    ])
    .to_text()
}

fn value(value: &UsedValue) -> Json {
    let records = value.records.iter().map(|place| Json::text(place));
    Json::Object(vec![
        ("date", Json::date(Some(value.date))),
        ("value", Json::Number(value.reading.number())),
        ("mark", Json::text_or_null(Some(value.reading.mark()))),
        ("estimated", Json::Bool(value.estimated)),
        ("in_fit", Json::Bool(value.in_fit)),
        ("fitted_median", Json::number(value.fitted_median)),
        ("residual", Json::number(value.residual)),
        ("files_and_records", Json::List(records.collect())),
    ])
}

/// Entries of `explain`.
#[must_use]
pub fn explain_json(entries: &[Entry]) -> String {
    let entries = entries.iter().map(|entry| {
        Json::Object(vec![
            ("word", Json::text(entry.word)),
            ("kind", Json::text(entry.kind.label())),
            ("of", Json::text_or_null(Some(entry.place))),
            ("meaning", Json::text(entry.meaning)),
            ("formula", Json::text_or_null(entry.formula)),
            ("source", Json::text(entry.source)),
        ])
    });
    Json::List(entries.collect()).to_text()
}
