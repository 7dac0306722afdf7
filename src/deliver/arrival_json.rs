//! What was found out on arrival, in JSON: every sentinel, the quality of the data, completeness.

use super::json::Json;
use crate::findings::Arrival;
use crate::ledger::RecordId;
use crate::series::Sentinel;
use crate::series::completeness::{Asked, Lacking, RoundCount};
use crate::series::quality::{BlankDetect, Differing, SendBack, Validated};
use crate::words::{completeness as completeness_words, number, quality as quality_words};
use crate::words::{round, suspicion};

/// Every sentinel with all its records.
#[must_use]
pub fn sentinels(arrival: &Arrival) -> Json {
    Json::List(arrival.sentinels.iter().map(|one| sentinel(one, arrival)).collect())
}

fn sentinel(one: &Sentinel, arrival: &Arrival) -> Json {
    let text = |text: &Option<String>| Json::text_or_null(text.as_deref());
    Json::Object(vec![
        ("sentinel", Json::text(one.kind.code())),
        ("concerns", Json::text(one.scope.code())),
        ("site", Json::text_or_null(Some(&one.site))),
        ("file", one.file.map_or(Json::Null, |file| Json::text(arrival.file(file)))),
        ("batch", text(&one.batch)),
        ("well", text(&one.well)),
        ("other_well", text(&one.other_well)),
        ("analyte", text(&one.analyte)),
        ("date", Json::date(one.date)),
        ("figure", Json::number(one.figure)),
        ("text", Json::Text(suspicion::sentence(one, arrival))),
        ("records", places(&one.records, arrival)),
    ])
}

fn places(records: &[RecordId], arrival: &Arrival) -> Json {
    Json::List(records.iter().map(|record| Json::text(arrival.place(*record))).collect())
}

/// What the quality control says.
#[must_use]
pub fn quality(arrival: &Arrival, rpd_allowed: f64) -> Json {
    let q = &arrival.quality;
    let statement = quality_words::statement(arrival, rpd_allowed);
    Json::Object(vec![
        ("statement", Json::List(statement.into_iter().map(Json::Text).collect())),
        (
            "duplicates",
            Json::Object(vec![
                ("records", Json::count(q.duplicates.records)),
                ("pairs", Json::count(q.duplicates.pairs)),
                ("compared", Json::count(q.duplicates.compared)),
                ("rpd_allowed_percent", Json::Number(rpd_allowed)),
                (
                    "differing",
                    Json::List(
                        q.duplicates.differing.iter().map(|d| differing(d, arrival)).collect(),
                    ),
                ),
            ]),
        ),
        (
            "blanks",
            Json::Object(vec![
                ("records", Json::count(q.blanks.records)),
                ("unread", Json::count(q.blanks.unread)),
                (
                    "detects",
                    Json::List(q.blanks.detects.iter().map(|b| blank(b, arrival)).collect()),
                ),
            ]),
        ),
        (
            "marks",
            Json::Object(vec![
                ("holding_time", Json::count(q.marks.holding_time)),
                ("diluted", Json::count(q.marks.diluted)),
                ("estimated", Json::count(q.marks.estimated)),
                ("in_blank", Json::count(q.marks.in_blank)),
                ("rejected", Json::count(q.marks.rejected)),
            ]),
        ),
        ("validation", Json::List(q.validation.iter().map(|v| validated(v, arrival)).collect())),
        (
            "non_detects_over_limit",
            Json::List(q.send_back.iter().map(|one| send_back(one, arrival)).collect()),
        ),
    ])
}

fn differing(one: &Differing, arrival: &Arrival) -> Json {
    Json::Object(vec![
        ("well", Json::text(&one.well)),
        ("analyte", Json::text(&one.analyte)),
        ("date", Json::date(Some(one.date))),
        ("sample", Json::Text(number::reading(one.pair.parent_reading))),
        ("duplicate", Json::Text(number::reading(one.pair.duplicate_reading))),
        ("unit", Json::text(one.unit.label())),
        ("records", places(&[one.pair.parent, one.pair.duplicate], arrival)),
    ])
}

fn blank(one: &BlankDetect, arrival: &Arrival) -> Json {
    Json::Object(vec![
        ("blank", Json::text(&one.name)),
        ("analyte", Json::text(&one.analyte)),
        ("date", Json::date(Some(one.date))),
        ("found", Json::Number(one.value)),
        ("unit", Json::text(one.unit.label())),
        ("record", Json::text(arrival.place(one.record))),
        ("batch_detects", Json::count(one.batch_detects)),
        ("doubtful", places(&one.doubtful, arrival)),
    ])
}

fn validated(one: &Validated, arrival: &Arrival) -> Json {
    Json::Object(vec![
        ("file", Json::text(arrival.file(one.file))),
        ("batches", Json::count(one.batches)),
        ("stage", Json::text_or_null(one.stage.as_deref())),
    ])
}

fn send_back(one: &SendBack, arrival: &Arrival) -> Json {
    Json::Object(vec![
        ("well", Json::text(&one.well)),
        ("analyte", Json::text(&one.analyte)),
        ("date", Json::date(Some(one.date))),
        ("non_detect_limit", Json::Number(one.limit)),
        ("limit", Json::Number(one.regulatory)),
        ("unit", Json::text(one.unit.label())),
        ("record", Json::text(arrival.place(one.record))),
    ])
}

/// Expected against received; null where the site file expects nothing.
#[must_use]
pub fn completeness(arrival: &Arrival) -> Json {
    let found = &arrival.completeness;
    if found.asked == Asked::No {
        return Json::Null;
    }
    let rounds = found.rounds.iter().map(|one| of_round(one, arrival));
    Json::Object(vec![
        ("rounds", Json::List(rounds.collect())),
        ("lacking", Json::List(found.lacking.iter().map(lacking).collect())),
    ])
}

fn of_round(one: &RoundCount, arrival: &Arrival) -> Json {
    Json::Object(vec![
        ("round", Json::Text(round::label(one.date, arrival.round))),
        ("due", Json::count(one.due)),
        ("received", Json::count(one.received)),
        ("not_used", Json::count(one.not_used)),
        ("explained", Json::count(one.explained)),
        ("missing", Json::count(one.missing)),
    ])
}

fn lacking(one: &Lacking) -> Json {
    Json::Object(vec![
        ("well", Json::text(&one.well)),
        ("analyte", Json::text(&one.analyte)),
        ("reason", Json::text_or_null(Some(&completeness_words::why_code(one.why)))),
        ("text", Json::Text(completeness_words::why(one.why))),
    ])
}
