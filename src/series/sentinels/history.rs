//! A series as sentinels see it: what each usable record says, and what its neighbours in time say.

use chrono::NaiveDate;

use crate::intake::Places;
use crate::intake::texts::Code;
use crate::ledger::RecordId;
use crate::numerics::median;
use crate::series::{SampleRole, WellSeries};
use crate::terms::Reading;

/// One record of a series.
#[derive(Clone, Copy, Debug)]
pub struct Seen {
    /// The record.
    pub record: RecordId,
    /// Its file.
    pub file: u32,
    /// Its batch; 0 where there is none.
    pub batch: Code,
    /// Its date.
    pub date: NaiveDate,
    /// What it says, in the series' unit.
    pub reading: Reading,
    /// Its own limits: reporting limit, detection limit.
    pub limits: [Option<f64>; 2],
    /// Marked as estimated.
    pub estimated: bool,
}

impl Seen {
    /// The natural logarithm of a measured value.
    #[must_use]
    pub fn ln(&self) -> Option<f64> {
        match self.reading {
            Reading::Measured(value) if value > 0.0 => Some(value.ln()),
            _ => None,
        }
    }
}

/// A series' records that may be used, by date.
pub struct History<'a> {
    /// The series.
    pub series: &'a WellSeries,
    /// Its samples up to the as-of date, without those that a decision excludes.
    pub seen: Vec<Seen>,
    /// How far measured values usually lie from the median of their neighbours, on the ln scale:
    /// 1.4826 × the median distance (the factor makes it a standard deviation for normal errors).
    /// None with fewer than five values.
    pub spread: Option<f64>,
}

impl<'a> History<'a> {
    /// The history of a series.
    #[must_use]
    pub fn of(series: &'a WellSeries, places: &Places<'_>, as_of: NaiveDate) -> Self {
        let usable = series.candidates.iter().filter(|candidate| {
            candidate.role == SampleRole::Primary
                && candidate.excluded_by.is_none()
                && candidate.date <= as_of
        });
        let mut seen: Vec<Seen> = usable
            .map(|candidate| Seen {
                record: candidate.record,
                file: places.file(candidate.record),
                batch: places.batch(candidate.record),
                date: candidate.date,
                reading: candidate.reading,
                limits: [candidate.reporting_limit, candidate.detection_limit],
                estimated: candidate.estimated,
            })
            .collect();
        seen.sort_by_key(|one| (one.date, one.record));
        let mut history = Self { series, seen, spread: None };
        history.spread = history.spread_of_all();
        history
    }

    /// The records nearest in time that count: two before and two after, at an end the four
    /// nearest; fewer where there are no more.
    pub fn neighbours(&self, at: usize, counts: impl Fn(&Seen) -> bool) -> Vec<&Seen> {
        const EACH_SIDE: usize = 2;
        const ALL: usize = 2 * EACH_SIDE;
        // What stands further away tells little, and a series of one date stays quick.
        const REACH: usize = 100;
        let before: Vec<&Seen> =
            self.seen[..at].iter().rev().take(REACH).filter(|one| counts(one)).take(ALL).collect();
        let after: Vec<&Seen> =
            self.seen[at + 1..].iter().take(REACH).filter(|one| counts(one)).take(ALL).collect();
        let from_after = ALL - before.len().min(EACH_SIDE);
        let after = &after[..after.len().min(from_after)];
        let from_before = (ALL - after.len()).min(before.len());
        before[..from_before].iter().chain(after).copied().collect()
    }

    fn spread_of_all(&self) -> Option<f64> {
        const FEWEST: usize = 5;
        const NORMAL: f64 = 1.4826;
        let off: Vec<f64> = (0..self.seen.len())
            .filter_map(|at| {
                let own = self.seen[at].ln()?;
                let date = self.seen[at].date;
                let near = self.neighbours(at, |one| one.date != date && one.ln().is_some());
                let near: Vec<f64> = near.into_iter().filter_map(Seen::ln).collect();
                Some((own - median(&near)?).abs())
            })
            .collect();
        (off.len() >= FEWEST).then(|| median(&off).map(|off| NORMAL * off)).flatten()
    }
}
