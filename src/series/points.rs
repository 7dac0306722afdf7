//! From candidates to one value a date: the only way to a fit.

use chrono::NaiveDate;

use super::merge::{Merged as MergedDate, merge_date};
use super::recensor::{Recensored, recensor};
use super::{Candidate, SampleRole, WellSeries};
use crate::ledger::{Fate, Merged, RecordId, SetAside, Told, UsedAs};
use crate::site::{Duplicates, NonDetects, SameDay};
use crate::terms::{Reading, Span, time::DAYS_PER_YEAR};

/// The dates whose values are fitted; the others stay visible.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Window {
    /// The first date, included; the whole record if absent.
    pub from: Option<NaiveDate>,
    /// The last date, included.
    pub to: Option<NaiveDate>,
}

impl Window {
    /// Whether a date lies in the window.
    #[must_use]
    pub fn holds(&self, date: NaiveDate) -> bool {
        self.from.is_none_or(|from| from <= date) && self.to.is_none_or(|to| date <= to)
    }
}

/// Everything that decides which numbers a fit sees.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct MergeRules {
    /// Only samples dated up to here are known.
    pub known_until: NaiveDate,
    /// The window of the fit.
    pub window: Window,
    /// Several detects of one date.
    pub same_day: SameDay,
    /// Whether duplicates are averaged in.
    pub duplicates: Duplicates,
    /// What a non-detect contributes.
    pub non_detects: NonDetects,
    /// What a rerun leaves out; nothing in the main fit.
    pub leave_out: LeaveOut,
}

/// What a rerun leaves out of the fit, to see how much hangs on it.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum LeaveOut {
    /// Nothing.
    Nothing,
    /// One date.
    Date(NaiveDate),
    /// The highest measured value of the window.
    Highest,
    /// Estimated results.
    Estimated,
}

/// The value of one date.
#[derive(Clone, Debug, PartialEq)]
pub struct DateValue {
    /// The date.
    pub date: NaiveDate,
    /// What the samples of the date say together.
    pub reading: Reading,
    /// Whether any of them is estimated.
    pub estimated: bool,
    /// Whether the date lies in the window.
    pub in_fit: bool,
    /// Whether the value is a detect taken as a non-detect at its reporting limit.
    pub recensored: bool,
    /// Whether the value stands for a non-detect, as the site file asks.
    pub substituted: bool,
    /// The records whose numbers enter the value.
    pub records: Vec<RecordId>,
}

impl DateValue {
    /// Whether the substance was seen on the date.
    #[must_use]
    pub fn is_detect(&self) -> bool {
        self.reading.is_detect() && !self.substituted
    }

    /// Whether the date has a measured value, which is what needs count.
    #[must_use]
    pub fn is_measured(&self) -> bool {
        matches!(self.reading, Reading::Measured(_)) && !self.substituted
    }
}

/// One value a date, and what became of every candidate.
#[derive(Clone, Debug, PartialEq)]
pub struct Points {
    /// The window that was applied.
    pub window: Window,
    /// Dates ascending, those outside the window too.
    pub dates: Vec<DateValue>,
    /// The final fate of each candidate.
    pub fates: Vec<(RecordId, Fate)>,
    /// What people are told about some of them.
    pub told: Vec<(RecordId, Told)>,
    /// Detects that became non-detects at their own reporting limit.
    pub recensored: usize,
    /// Non-detects replaced by a number, as the site file asks.
    pub substituted: usize,
}

/// What the numeric core sees: times in years from the first used date and logarithms.
#[derive(Clone, Debug, PartialEq)]
pub struct Slices {
    /// Years of 365.25 days from the first date in the window.
    pub t: Vec<f64>,
    /// ln of the value, or of the limit.
    pub y: Vec<f64>,
    /// What each number is.
    pub mark: Vec<crate::numerics::Mark>,
}

impl Points {
    /// The values in the window, by date.
    pub fn fitted(&self) -> impl Iterator<Item = &DateValue> {
        self.dates.iter().filter(|value| value.in_fit)
    }

    /// First and last date in the window.
    #[must_use]
    pub fn span(&self) -> Option<Span> {
        let first = self.fitted().next()?.date;
        let last = self.fitted().last()?.date;
        Some(Span { first, last })
    }

    /// The slices that a fit reads.
    #[must_use]
    pub fn slices(&self) -> Slices {
        let first = self.span().map(|span| span.first);
        let mut slices = Slices { t: Vec::new(), y: Vec::new(), mark: Vec::new() };
        for value in self.fitted() {
            let days = first.map_or(0, |first| value.date.signed_duration_since(first).num_days());
            // Days between four-digit years are exact in an f64.
            #[allow(clippy::cast_precision_loss)]
            slices.t.push(days as f64 / DAYS_PER_YEAR);
            slices.y.push(value.reading.number().ln());
            slices.mark.push(match value.reading {
                Reading::Measured(_) => crate::numerics::Mark::Measured,
                Reading::Below(_) | Reading::Between(..) => crate::numerics::Mark::Below,
                Reading::Above(_) => crate::numerics::Mark::Above,
            });
        }
        slices
    }
}

impl Points {
    /// Writes down what became of each candidate of one date.
    fn account(&mut self, day: &[Candidate], merged: &MergedDate, in_fit: bool) {
        self.told.extend(merged.told.iter().cloned());
        for &record in &merged.lost {
            self.fates.push((record, Fate::Merged(Merged::SameDay)));
        }
        let n = u32::try_from(merged.used.len()).unwrap_or(u32::MAX);
        for candidate in day.iter().filter(|candidate| merged.used.contains(&candidate.record)) {
            let record = candidate.record;
            match candidate.role {
                // A duplicate stays quality control even where it is averaged in.
                SampleRole::Duplicate => self.told.push((record, Told::DuplicateAveraged)),
                SampleRole::Primary => {
                    let used = match (in_fit, n) {
                        (false, _) => UsedAs::OutsideFit,
                        (true, 1) => UsedAs::Alone,
                        (true, _) => UsedAs::Averaged,
                    };
                    self.fates.push((record, Fate::Used(used)));
                }
            }
            if n > 1 {
                self.told.push((record, Told::AveragedOf { n }));
            }
            if !in_fit {
                self.told.push((record, Told::OutsideFit));
            }
        }
    }
}

/// One value a date from a series' candidates.
///
/// In this order: what was known, what decisions exclude, the censoring point, the merge of each
/// date, the window, the substitution setting. No result depends on the order of the candidates.
#[must_use]
pub fn points(series: &WellSeries, rules: &MergeRules) -> Points {
    let mut points = Points {
        window: rules.window,
        dates: Vec::new(),
        fates: Vec::new(),
        told: Vec::new(),
        recensored: 0,
        substituted: 0,
    };
    let mut known = Vec::with_capacity(series.candidates.len());
    for candidate in &series.candidates {
        if candidate.date > rules.known_until {
            if candidate.role == SampleRole::Primary {
                points.fates.push((candidate.record, Fate::SetAside(SetAside::AfterAsOf)));
            }
        } else if let Some(place) = candidate.excluded_by {
            points.fates.push((candidate.record, Fate::Decision(place)));
        } else if rules.leave_out == LeaveOut::Estimated && candidate.estimated {
            // A rerun: its fates are nobody's.
        } else {
            known.push(candidate.clone());
        }
    }
    known.sort_by_key(|candidate| (candidate.date, candidate.role, candidate.record));
    let Recensored { known, recensored, limit_taken } = recensor(known, series.unit);
    points.recensored = recensored.len();
    points.told.extend(recensored.iter().map(|record| (*record, Told::Recensored)));
    points.told.extend(limit_taken.iter().map(|record| (*record, Told::DetectionLimitTaken)));
    for day in known.chunk_by(|a, b| a.date == b.date) {
        let Some(merged) = merge_date(day, rules.same_day, rules.duplicates) else { continue };
        let in_fit =
            rules.window.holds(day[0].date) && rules.leave_out != LeaveOut::Date(day[0].date);
        points.account(day, &merged, in_fit);
        let (reading, replaced) = substitute(merged.reading, rules.non_detects);
        points.substituted += usize::from(replaced);
        points.dates.push(DateValue {
            date: day[0].date,
            reading,
            estimated: merged.estimated,
            in_fit,
            recensored: merged.used.iter().any(|record| recensored.contains(record)),
            substituted: replaced,
            records: merged.used,
        });
    }
    if rules.leave_out == LeaveOut::Highest {
        let highest = points
            .dates
            .iter_mut()
            .filter(|value| value.in_fit && value.is_measured())
            .max_by(|a, b| a.reading.number().total_cmp(&b.reading.number()));
        if let Some(highest) = highest {
            highest.in_fit = false;
        }
    }
    points
}

/// The value a non-detect is replaced by, if the site file asks for it.
fn substitute(reading: Reading, setting: NonDetects) -> (Reading, bool) {
    match (reading, setting) {
        (Reading::Below(limit), NonDetects::AtLimit) => (Reading::Measured(limit), true),
        (Reading::Below(limit), NonDetects::AtHalf) => (Reading::Measured(limit / 2.0), true),
        _ => (reading, false),
    }
}
