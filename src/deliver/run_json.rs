//! run.json: what was run, on which inputs, with which outputs. Written last; whoever holds the
//! folder can check every file against it.

use std::collections::BTreeMap;

use super::json::Json;
use crate::findings::{RunFacts, SiteFacts};

/// The record of the run; `outputs` gives the SHA-256 of every file beside it.
#[must_use]
pub fn run_json(run: &RunFacts, site: &SiteFacts, outputs: &BTreeMap<String, String>) -> String {
    let outputs = outputs.iter().map(|(name, hash)| (name.clone(), Json::text(hash)));
    Json::Object(vec![
        ("program", Json::text("ebbwell")),
        ("version", Json::text(run.version)),
        ("site", Json::text(&site.name)),
        ("as_of", Json::date(Some(run.as_of))),
        ("round", Json::text_or_null(Some(&site.round))),
        ("effort", Json::text(run.effort.code())),
        ("confidence", Json::Number(run.confidence)),
        ("horizon_years", Json::Number(run.horizon_years)),
        ("template", Json::text_or_null(run.template.as_deref())),
        ("site_file", site_file(run)),
        ("inputs", inputs(run)),
        ("settings", pairs(&run.settings)),
        ("settings_off_default", pairs(&run.off_default)),
        ("decisions", decisions(run)),
        ("mapping", mapping(run)),
        ("applied", applied(run)),
        ("outputs", Json::Map(outputs.collect())),
    ])
    .to_text()
}

fn site_file(run: &RunFacts) -> Json {
    run.site_file.as_ref().map_or(Json::Null, |file| {
        Json::Object(vec![
            ("name", Json::text(&file.name)),
            ("bytes", Json::Count(file.bytes)),
            ("sha256", Json::text(&file.sha256)),
        ])
    })
}

fn inputs(run: &RunFacts) -> Json {
    let files = run.files.iter().map(|file| {
        Json::Object(vec![
            ("name", Json::text(&file.name)),
            ("bytes", Json::Count(file.bytes)),
            ("sha256", Json::text(&file.sha256)),
            ("records", Json::count(file.records)),
            ("blank_lines", Json::count(file.blank_lines)),
            ("empty_cells", Json::count(file.empty_cells)),
            ("encoding", Json::text(file.encoding)),
            ("sheets", Json::List(file.sheets.iter().map(|sheet| Json::text(sheet)).collect())),
        ])
    });
    Json::List(files.collect())
}

/// Settings as an object in their documented order.
fn pairs(settings: &[(String, String)]) -> Json {
    Json::Map(settings.iter().map(|(key, value)| (key.clone(), Json::text(value))).collect())
}

fn decisions(run: &RunFacts) -> Json {
    let decisions = run.decisions.iter().map(|decision| {
        Json::Object(vec![
            ("id", Json::text(&decision.id)),
            ("kind", Json::text(&decision.kind)),
            ("who", Json::text(&decision.who)),
            ("when", Json::date(Some(decision.when))),
            ("why", Json::text(&decision.why)),
            ("records", Json::count(decision.records)),
        ])
    });
    Json::List(decisions.collect())
}

/// Which header was read as which column.
pub(super) fn mapping(run: &RunFacts) -> Json {
    let mapping = run.mapping.iter().map(|mapped| {
        Json::Object(vec![
            ("file", Json::text(&mapped.file)),
            ("sheet", Json::text_or_null(Some(&mapped.sheet))),
            ("header", Json::text(&mapped.header)),
            ("column", Json::text_or_null(Some(&mapped.column))),
        ])
    });
    Json::List(mapping.collect())
}

/// Which names and units were read as which.
pub(super) fn applied(run: &RunFacts) -> Json {
    let applied = run.applied.iter().map(|one| {
        Json::Object(vec![
            ("what", Json::text(one.what)),
            ("from", Json::text(&one.from)),
            ("to", Json::text(&one.to)),
            ("records", Json::count(one.records)),
        ])
    });
    Json::List(applied.collect())
}
