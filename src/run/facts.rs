//! What was run, on what: for run.json and the pages.

use chrono::NaiveDate;

use super::Error;
use super::job::Job;
use crate::findings::{DecisionFacts, RunFacts, SiteFacts};
use crate::intake::Tidy;
use crate::site::Site;
use crate::words;

/// The facts of a run.
///
/// # Errors
/// [`Error::Frame`], which would be a fault of this program.
pub fn run_facts(job: &Job, tidy: &Tidy, as_of: NaiveDate) -> Result<RunFacts, Error> {
    let settings = &job.site.settings;
    Ok(RunFacts {
        version: env!("CARGO_PKG_VERSION"),
        as_of,
        effort: job.effort,
        confidence: settings.confidence,
        horizon_years: settings.horizon_years,
        site_file: job.site_file.file.clone(),
        template: job.site_file.template.clone(),
        files: tidy.files.clone(),
        outcomes: tidy.counts(&job.site)?,
        unreadable: tidy
            .unreadable
            .iter()
            .map(|file| (file.name.clone(), words::unreadable::why(&file.problem)))
            .collect(),
        settings: settings_in_force(&job.site),
        off_default: settings
            .off_default
            .iter()
            .map(|setting| (setting.key.clone(), setting.why.clone()))
            .collect(),
        decisions: job
            .site
            .decisions
            .iter()
            .zip(&tidy.decided)
            .map(|(decision, records)| DecisionFacts {
                id: decision.id.clone(),
                kind: decision.kind.code().to_owned(),
                who: decision.who.clone(),
                when: decision.when,
                why: decision.why.clone(),
                records: *records,
            })
            .collect(),
        mapping: tidy.mapping.clone(),
        applied: super::arrival::applied(tidy),
        rpd_allowed: job.site.flags.duplicates_rpd,
    })
}

/// The site as findings show it.
#[must_use]
pub fn site_facts(job: &Job, as_of: NaiveDate) -> SiteFacts {
    SiteFacts {
        name: job.site.name.clone(),
        authority: job.site.authority.clone(),
        citation: job.site.citation.clone(),
        round: words::round::label(as_of, job.site.settings.round),
    }
}

/// Every setting that changes a number, with its value, in the order of the site file.
fn settings_in_force(site: &Site) -> Vec<(String, String)> {
    let settings = &site.settings;
    let flags = &site.flags;
    let number = words::number::table;
    let rate = settings.rate_needs;
    let date = settings.date_needs;
    let pairs: [(&str, String); 19] = [
        ("confidence", number(settings.confidence)),
        ("goal-date", settings.goal_date.map_or_else(String::new, |date| date.to_string())),
        ("horizon-years", number(settings.horizon_years)),
        ("stale-after-years", number(settings.stale_after_years)),
        ("flat-margin", number(settings.flat_margin)),
        ("round", settings.round.code().to_owned()),
        ("round-grace-days", settings.round_grace_days.to_string()),
        ("rate-needs.dates", rate.dates.to_string()),
        ("rate-needs.detects", rate.detects.to_string()),
        ("date-needs.dates", date.dates.to_string()),
        ("date-needs.years", number(date.years)),
        ("date-needs.detects", date.detects.to_string()),
        ("same-day", settings.same_day.code().to_owned()),
        ("duplicates", settings.duplicates.code().to_owned()),
        ("non-detects", settings.non_detects.code().to_owned()),
        ("limit-order", settings.limit_order.join("; ")),
        ("flags.short-record-years", number(flags.short_record_years)),
        ("flags.mostly-non-detects", number(flags.mostly_non_detects)),
        ("flags.duplicates-rpd", number(flags.duplicates_rpd)),
    ];
    let estimated = ("flags.estimated-results", number(flags.estimated_results));
    pairs.into_iter().chain([estimated]).map(|(key, value)| (key.to_owned(), value)).collect()
}
