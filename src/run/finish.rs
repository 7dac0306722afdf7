//! What was computed becomes findings.

use chrono::NaiveDate;

use super::Error;
use super::facts::{run_facts, site_facts};
use super::job::Job;
use super::one_series::Computed;
use crate::findings::{
    Arrival, DuplicateFinding, Findings, Fitted, Note, SeriesFinding, UsedValue, WellFinding,
};
use crate::intake::Tidy;
use crate::ledger::Told;
use crate::numerics::normal;
use crate::series::pairs::Agreement;
use crate::series::{DateValue, WellSeries};
use crate::terms::{PerYear, Reading, Verdict};

/// Findings from everything that was computed, sorted as every table is.
///
/// # Errors
/// [`Error::Frame`], which would be a fault of this program.
pub fn findings(
    job: &Job,
    tidy: &Tidy,
    as_of: NaiveDate,
    arrival: Arrival,
    series: &[WellSeries],
    computed: Vec<Computed>,
) -> Result<Findings, Error> {
    let mut all = Vec::with_capacity(series.len());
    for (one, computed) in series.iter().zip(computed) {
        if super::has_row(one, tidy) {
            all.push(series_finding(job, tidy, one, computed)?);
        }
    }
    Ok(Findings {
        run: run_facts(job, tidy, as_of)?,
        site: site_facts(job, as_of),
        notes: notes(job, tidy),
        arrival,
        wells: wells(&all),
        series: all,
    })
}

/// What is told once: about files, then about records.
fn notes(job: &Job, tidy: &Tidy) -> Vec<Note> {
    let of_files = tidy.told.iter().map(|told| Note { told: told.clone(), records: 0 });
    let of_records = tidy
        .ledger
        .told_by_kind()
        .into_iter()
        .filter(|(told, _)| told.is_said())
        .map(|(told, records)| Note { told: told.clone(), records });
    let ignored = tidy
        .ignored
        .iter()
        .map(|file| Note { told: Told::FileLeftAlone { file: file.clone() }, records: 0 });
    let empty = tidy.files.iter().filter(|file| file.records == 0).map(|file| Note {
        told: Told::FileWithoutRecords { file: file.name.clone() },
        records: 0,
    });
    let mut notes: Vec<Note> = of_files.chain(of_records).chain(ignored).chain(empty).collect();
    notes.extend(job.site.settings.off_default.iter().map(|setting| Note {
        told: Told::SettingOffDefault { key: setting.key.clone(), is: setting.is.clone() },
        records: 0,
    }));
    crate::words::told::sort_notes(&mut notes);
    notes
}

fn series_finding(
    job: &Job,
    tidy: &Tidy,
    series: &WellSeries,
    computed: Computed,
) -> Result<SeriesFinding, Error> {
    let Computed { points, fit, ranks, judged, shown, doubts, flags, detects, role, .. } = computed;
    let fit = fit.ok();
    let limit = series.limit.as_ref().map(|limit| limit.value);
    let level_now = fit.as_ref().map(|fit| fit.level_now());
    let beyond = |date: Option<NaiveDate>| {
        date.zip(shown.horizon).is_some_and(|(date, horizon)| date > horizon)
    };
    let sen = ranks.and_then(|(_, sen)| sen);
    Ok(SeriesFinding {
        key: series.key.clone(),
        role,
        cas: series.cas.clone(),
        unit: series.unit,
        limit,
        limit_source: series.limit.as_ref().and_then(|limit| limit.source.clone()),
        goal_date: series.goal_date,
        samples: points.fitted().count(),
        detects,
        sampled: points.span(),
        last_result: points.fitted().last().map(|value| value.reading),
        verdict: judged.verdict,
        pace: doubts.pace,
        method: judged.method,
        rate_per_year: fit.as_ref().map(|fit| fit.rate),
        rate_lower: fit.as_ref().map(|fit| PerYear(fit.rate_interval.low)),
        rate_upper: fit.as_ref().map(|fit| PerYear(fit.rate_interval.high)),
        level_at_start: fit.as_ref().map(|fit| fit.median(fit.used.first)),
        level_now,
        level_now_lower: fit.as_ref().map(|fit| fit.level_now_ln.low.exp()),
        level_now_upper: fit.as_ref().map(|fit| fit.level_now_ln.high.exp()),
        share_over_limit_now: fit
            .as_ref()
            .zip(limit)
            .map(|(fit, limit)| normal::lower((fit.level_now().ln() - limit.ln()) / fit.line.sd)),
        residual_sd_ln: fit.as_ref().map(|fit| fit.line.sd),
        r_squared: fit.as_ref().map(|fit| fit.line.r_squared),
        slope_p: fit.as_ref().map(|fit| fit.line.slope_p),
        slope_p_adjusted: None,
        kendall_s: ranks.map(|(kendall, _)| kendall.s),
        kendall_p: ranks.map(|(kendall, _)| kendall.p),
        sen_rate_per_year: sen.map(|sen| -sen.slope),
        sen_rate_lower: sen.and_then(|sen| sen.high).map(|high| -high),
        sen_rate_upper: sen.and_then(|sen| sen.low).map(|low| -low),
        reach_date: shown.reach,
        reach_earliest: shown.earliest,
        reach_latest: shown.latest,
        reach_date_mean: shown.mean,
        exceed_date: shown.exceed,
        exceed_earliest: shown.exceed_earliest,
        required_rate_per_year: fit
            .as_ref()
            .and_then(|fit| fit.required_rate(limit?, series.goal_date?)),
        alternative_model: doubts.alternative.map(|alternative| alternative.model.code()),
        alternative_date: doubts.alternative.and_then(|alternative| alternative.date),
        rounds_to_decisive: doubts.rounds.decisive,
        previous_verdict: None,
        reach_shift_years: None,
        why_no_rate: judged.why_no_rate,
        why_no_date: shown.why,
        flags,
        beyond_horizon: beyond(shown.reach),
        earliest_beyond_horizon: beyond(shown.earliest),
        latest_beyond_horizon: beyond(shown.latest),
        horizon: shown.horizon,
        stands_in_the_way: computed.stands_in_the_way,
        values: points.dates.iter().map(|value| used_value(value, fit.as_ref(), tidy)).collect(),
        fitted: fit.as_ref().map(|fit| Fitted { used: fit.used, band: computed.band }),
        duplicates: duplicates(series, job.site.flags.duplicates_rpd, tidy),
        records: tidy.counts_of(&series.records, &job.site)?,
        alternative_denies: doubts.alternative.is_some_and(|alternative| alternative.denies),
        models: doubts.models,
        adjusted: doubts.adjusted,
        spans: doubts.spans,
        most_telling: doubts.most_telling,
        more_rounds: doubts.rounds,
    })
}

fn used_value(value: &DateValue, fit: Option<&crate::fit::Fit>, tidy: &Tidy) -> UsedValue {
    // Outside the window the line says nothing.
    let median = fit.filter(|_| value.in_fit).map(|fit| fit.median(value.date));
    let residual = match value.reading {
        Reading::Measured(v) if value.in_fit && !value.substituted => {
            median.map(|median| v.ln() - median.ln())
        }
        _ => None,
    };
    UsedValue {
        date: value.date,
        reading: value.reading,
        estimated: value.estimated,
        in_fit: value.in_fit,
        fitted_median: median,
        residual,
        records: value.records.iter().map(|record| tidy.place(*record)).collect(),
    }
}

fn duplicates(series: &WellSeries, allowed: f64, tidy: &Tidy) -> Vec<DuplicateFinding> {
    series
        .duplicates
        .iter()
        .map(|pair| DuplicateFinding {
            date: pair.date,
            parent: pair.parent_reading,
            duplicate: pair.duplicate_reading,
            rpd_percent: match (pair.parent_reading, pair.duplicate_reading, pair.agreement()) {
                (_, _, Agreement::Rpd(rpd)) => Some(rpd),
                (Reading::Measured(a), Reading::Measured(b), _) => {
                    Some(200.0 * (a - b).abs() / (a + b))
                }
                _ => None,
            },
            differs: pair.differs(allowed),
            record: tidy.place(pair.duplicate),
        })
        .collect()
}

/// One row a well over its series.
fn wells(series: &[SeriesFinding]) -> Vec<WellFinding> {
    let same = |a: &SeriesFinding, b: &SeriesFinding| {
        (&a.key.site, &a.key.well) == (&b.key.site, &b.key.well)
    };
    series
        .chunk_by(same)
        .map(|of_well| {
            let counts = |verdict| of_well.iter().filter(|s| s.verdict == verdict).count();
            let latest = of_well
                .iter()
                .filter(|s| s.limit.is_some() && s.reach_date.is_some())
                .max_by_key(|s| (s.reach_date, std::cmp::Reverse(&s.key)));
            let in_the_way = of_well.iter().find(|s| s.stands_in_the_way);
            let mut verdicts = [0; 7];
            for (count, verdict) in verdicts.iter_mut().zip(Verdict::ALL) {
                *count = counts(*verdict);
            }
            WellFinding {
                site: of_well[0].key.site.clone(),
                well: of_well[0].key.well.clone(),
                role: of_well[0].role,
                series: of_well.len(),
                verdicts,
                over_limit_now: of_well.iter().filter(|s| s.over_limit_now()).count(),
                controlling_analyte: latest.or(in_the_way).map(|s| s.key.analyte.clone()),
                reach_date: latest.and_then(|s| s.reach_date),
                reach_earliest: latest.and_then(|s| s.reach_earliest),
                reach_latest: latest.and_then(|s| s.reach_latest),
                stands_in_the_way: of_well.iter().filter(|s| s.stands_in_the_way).count(),
                last_sampled: of_well.iter().filter_map(|s| s.sampled).map(|s| s.last).max(),
            }
        })
        .collect()
}
