//! What refits found out about a series, for summary.json.

use super::json::Json;
use crate::findings::SeriesFinding;
use crate::terms::{Answer, Choice, ChoiceSpan, ModelFit};
use crate::words::doubt;

/// The keys that refits add to a series.
#[must_use]
pub fn doubts(series: &SeriesFinding) -> Vec<(&'static str, Json)> {
    let rounds = &series.more_rounds;
    let count = |n: Option<usize>| n.map_or(Json::Null, Json::count);
    vec![
        ("alternative_denies", Json::Bool(series.alternative_denies)),
        ("models", Json::List(series.models.iter().map(model).collect())),
        (
            "rate_correlation_adjusted",
            series.adjusted.as_ref().map_or(Json::Null, |adjusted| {
                Json::Object(vec![
                    ("phi", Json::Number(adjusted.phi)),
                    ("rate_lower", Json::Number(adjusted.rate_lower)),
                    ("rate_upper", Json::Number(adjusted.rate_upper)),
                    ("changes_verdict", Json::Bool(adjusted.changes_verdict)),
                ])
            }),
        ),
        ("choices", Json::List(series.spans.iter().map(span).collect())),
        (
            "most_telling",
            series.most_telling.as_ref().map_or(Json::Null, |choice| telling(choice, series)),
        ),
        (
            "more_rounds",
            Json::Object(vec![
                ("decisive", count(rounds.decisive)),
                ("decisive_half_yearly", count(rounds.decisive_half_yearly)),
                ("level", count(rounds.level)),
                ("at_required_rate", count(rounds.at_required_rate)),
                ("smallest_rate_shown", Json::number(rounds.smallest_rate_shown)),
            ]),
        ),
    ]
}

fn model(fit: &ModelFit) -> Json {
    Json::Object(vec![
        ("model", Json::text(fit.model.code())),
        ("aicc", Json::number(fit.aicc)),
        ("meets_limit", Json::date(fit.meets_limit)),
        ("plateau", Json::number(fit.plateau)),
        ("break_date", Json::date(fit.break_date)),
        ("why_not", Json::text_or_null(fit.why_not.map(crate::terms::WhyNoModel::code))),
    ])
}

fn span(span: &ChoiceSpan) -> Json {
    let (low, high) = span.rates.unzip();
    let (first, last) = span.dates.unzip();
    Json::Object(vec![
        ("choice", Json::text(span.kind.code())),
        ("reruns", Json::count(span.reruns)),
        ("rate_lowest", Json::number(low)),
        ("rate_highest", Json::number(high)),
        ("reach_first", Json::date(first)),
        ("reach_last", Json::date(last)),
        ("without_date", Json::count(span.without_date)),
        (
            "verdicts",
            Json::List(span.verdicts.iter().map(|verdict| Json::text(verdict.code())).collect()),
        ),
    ])
}

fn telling(choice: &Choice, series: &SeriesFinding) -> Json {
    let Answer { rate, verdict, reach, .. } = choice.answer;
    Json::Object(vec![
        ("choice", Json::text(choice.kind.code())),
        ("date", Json::date(choice.date)),
        ("rate_per_year", Json::number(rate)),
        ("verdict", Json::text(verdict.code())),
        ("reach_date", Json::date(reach)),
        ("text", Json::Text(doubt::most_telling(choice, series.verdict))),
    ])
}
