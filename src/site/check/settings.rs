//! `[settings]` and `[flags]`: ranges, defaults, and a reason for each one off its default.
//!
//! Statistical, and so in need of a reason: confidence, horizon, stale-after, flat margin, round
//! grace, the needs of rates and dates, same-day, duplicates, non-detects, and every threshold.
//! The goal date and the length of a round describe the site's obligations and need none.

use std::collections::BTreeMap;
use std::fmt::{Debug, Display};
use std::ops::RangeInclusive;

use super::super::checked::{DateNeeds, FlagThresholds, OffDefault, RateNeeds, Settings};
use super::super::choices::{Duplicates, NonDetects, RoundLength, SameDay, Setting};
use super::super::file::{DateNeedsTable, FlagsTable, RateNeedsTable, SettingsTable, SiteFile};
use super::super::limit_type::{LimitType, limit_type};
use super::super::problem::ProblemKind;
use super::super::written::{At, Problems};
use super::{copy, day, names, within};
use crate::terms::folded;

impl Default for Settings {
    fn default() -> Self {
        Self {
            confidence: 0.90,
            goal_date: None,
            horizon_years: 30.0,
            stale_after_years: 1.5,
            // ln 2 / 20 per year to three digits: a half-life of 20 years.
            flat_margin: 0.0347,
            round: RoundLength::Quarter,
            round_grace_days: 14,
            rate_needs: RateNeeds { dates: 4, detects: 3 },
            date_needs: DateNeeds { dates: 8, years: 1.5, detects: 5 },
            same_day: SameDay::Mean,
            duplicates: Duplicates::Primary,
            non_detects: NonDetects::Censored,
            limit_order: Vec::new(),
            off_default: Vec::new(),
        }
    }
}

impl Default for FlagThresholds {
    fn default() -> Self {
        Self {
            short_record_years: 4.0,
            mostly_non_detects: 0.5,
            estimated_results: 0.25,
            duplicates_rpd: 30.0,
        }
    }
}

/// Checks both tables together, since the reasons of both stand in `[settings]`.
pub(super) fn check(file: &SiteFile, problems: &mut Problems<'_>) -> (Settings, FlagThresholds) {
    let unwritten = (SettingsTable::default(), FlagsTable::default());
    let table = file.settings.as_ref().map_or(&unwritten.0, |at| &at.value);
    let flags = file.flags.as_ref().map_or(&unwritten.1, |at| &at.value);
    let mut settings = Settings::default();
    let why = table.why.as_ref().map(|at| at.value.values()).unwrap_or_default();
    let mut off = Off { why, found: Vec::new(), problems };
    settings.goal_date = day(&table.goal_date);
    settings.round = copy(&table.round).unwrap_or(settings.round);
    let Settings { confidence, horizon_years, stale_after_years, flat_margin, .. } = settings;
    settings.confidence =
        off.number(Setting::Confidence, &table.confidence, confidence, 0.5..=0.999);
    settings.horizon_years =
        off.number(Setting::HorizonYears, &table.horizon_years, horizon_years, 1.0..=1000.0);
    settings.stale_after_years = off.number(
        Setting::StaleAfterYears,
        &table.stale_after_years,
        stale_after_years,
        0.1..=100.0,
    );
    settings.flat_margin =
        off.number(Setting::FlatMargin, &table.flat_margin, flat_margin, 0.0001..=10.0);
    settings.round_grace_days = off.grace_days(&table.round_grace_days, settings.round);
    settings.rate_needs = off.rate_needs(table.rate_needs.as_ref(), settings.rate_needs);
    settings.date_needs = off.date_needs(table.date_needs.as_ref(), settings.date_needs);
    settings.same_day =
        off.word(Setting::SameDay, &table.same_day, settings.same_day, SameDay::code);
    settings.duplicates =
        off.word(Setting::Duplicates, &table.duplicates, settings.duplicates, Duplicates::code);
    settings.non_detects =
        off.word(Setting::NonDetects, &table.non_detects, settings.non_detects, NonDetects::code);
    let was = FlagThresholds::default();
    let flags = FlagThresholds {
        short_record_years: off.number(
            Setting::ShortRecordYears,
            &flags.short_record_years,
            was.short_record_years,
            0.1..=100.0,
        ),
        mostly_non_detects: off.number(
            Setting::MostlyNonDetects,
            &flags.mostly_non_detects,
            was.mostly_non_detects,
            0.0..=1.0,
        ),
        estimated_results: off.number(
            Setting::EstimatedResults,
            &flags.estimated_results,
            was.estimated_results,
            0.0..=1.0,
        ),
        // The relative percent difference of two positive numbers is under 200.
        duplicates_rpd: off.number(
            Setting::DuplicatesRpd,
            &flags.duplicates_rpd,
            was.duplicates_rpd,
            0.0..=200.0,
        ),
    };
    settings.off_default = off.found;
    settings.limit_order = limit_order(table.limit_order.as_ref(), problems);
    (settings, flags)
}

/// Collects what is off its default, with the reason given.
struct Off<'p, 't> {
    why: BTreeMap<Setting, String>,
    found: Vec<OffDefault>,
    problems: &'p mut Problems<'t>,
}

impl Off<'_, '_> {
    /// Notes a value off its default and asks for its reason.
    fn compare<T, V: PartialEq>(
        &mut self,
        setting: Setting,
        at: &At<T>,
        was: &V,
        is: &V,
        shown: impl Fn(&V) -> String,
    ) {
        if was == is {
            return;
        }
        let (was, is) = (shown(was), shown(is));
        match self.why.get(&setting) {
            Some(why) => {
                let (key, why) = (setting.code().to_owned(), why.clone());
                self.found.push(OffDefault { key, was, is, why });
            }
            None => {
                let key = setting.code();
                self.problems.tell(at, ProblemKind::NoReason { key, was, is });
            }
        }
    }

    fn number(
        &mut self,
        setting: Setting,
        key: &Option<At<f64>>,
        was: f64,
        range: RangeInclusive<f64>,
    ) -> f64 {
        let Some(at) = key else { return was };
        if within(at, &range, self.problems) {
            self.compare(setting, at, &was, &at.value, f64::to_string);
        }
        at.value
    }

    fn word<T: Copy + PartialEq + Debug>(
        &mut self,
        setting: Setting,
        key: &Option<At<T>>,
        was: T,
        code: impl Fn(T) -> &'static str,
    ) -> T {
        let Some(at) = key else { return was };
        self.compare(setting, at, &was, &at.value, |word| code(*word).to_owned());
        at.value
    }

    /// Days of grace: at most a sixth of a round, which caps the default too.
    fn grace_days(&mut self, key: &Option<At<u64>>, round: RoundLength) -> u32 {
        let most = round.most_grace_days();
        let was = Settings::default().round_grace_days.min(most);
        let Some(at) = key else { return was };
        let is = u32::try_from(at.value).unwrap_or(most);
        if within(at, &(0..=u64::from(most)), self.problems) {
            self.compare(Setting::RoundGraceDays, at, &was, &is, u32::to_string);
        }
        is
    }

    /// A line with scatter to judge by takes three dates, and three measured values.
    fn rate_needs(&mut self, key: Option<&At<RateNeedsTable>>, was: RateNeeds) -> RateNeeds {
        let Some(at) = key else { return was };
        let is = RateNeeds {
            dates: self.count(&at.value.dates, was.dates),
            detects: self.count(&at.value.detects, was.detects),
        };
        self.compare(Setting::RateNeeds, at, &was, &is, RateNeeds::to_string);
        is
    }

    fn date_needs(&mut self, key: Option<&At<DateNeedsTable>>, was: DateNeeds) -> DateNeeds {
        let Some(at) = key else { return was };
        if let Some(years) = &at.value.years {
            within(years, &(0.0..=100.0), self.problems);
        }
        let is = DateNeeds {
            dates: self.count(&at.value.dates, was.dates),
            years: copy(&at.value.years).unwrap_or(was.years),
            detects: self.count(&at.value.detects, was.detects),
        };
        self.compare(Setting::DateNeeds, at, &was, &is, DateNeeds::to_string);
        is
    }

    fn count(&mut self, key: &Option<At<u64>>, was: usize) -> usize {
        let Some(at) = key else { return was };
        within(at, &(3..=1000), self.problems);
        usize::try_from(at.value).unwrap_or(was)
    }
}

/// The order describes what the deliveries hold, as a column does, and needs no reason.
fn limit_order(list: Option<&At<Vec<At<String>>>>, problems: &mut Problems<'_>) -> Vec<String> {
    for at in list.iter().flat_map(|list| &list.value) {
        let folded = folded(&at.value);
        if folded.is_empty() || limit_type(&at.value) == LimitType::NoDetectionLimit {
            let wants = "a type of reporting or detection limit, such as \"Reporting limit\"";
            problems.tell(at, ProblemKind::WrongText { found: at.value.clone(), wants });
        }
    }
    names::texts(list, problems)
}

impl Display for RateNeeds {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(f, "dates {}, detects {}", self.dates, self.detects)
    }
}

impl Display for DateNeeds {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(f, "dates {}, years {}, detects {}", self.dates, self.years, self.detects)
    }
}
