//! A series as sentinels see it: what each usable record says, and what its neighbours in time say.

use chrono::NaiveDate;

use crate::intake::Places;
use crate::intake::texts::Code;
use crate::numerics::median;
use crate::series::{Candidate, SampleRole, WellSeries};
use crate::terms::Reading;

/// One record of a series, and where it stands.
#[derive(Clone, Copy, Debug)]
pub struct Seen<'a> {
    /// What it says.
    pub said: &'a Candidate,
    /// Its file.
    pub file: u32,
    /// Its batch; 0 where there is none.
    pub batch: Code,
}

impl Seen<'_> {
    /// The natural logarithm of a measured value.
    #[must_use]
    pub fn ln(&self) -> Option<f64> {
        match self.said.reading {
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
    pub seen: Vec<Seen<'a>>,
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
        let mut seen: Vec<Seen<'_>> = usable
            .map(|said| Seen {
                said,
                file: places.file(said.record),
                batch: places.batch(said.record),
            })
            .collect();
        seen.sort_by_key(|one| (one.said.date, one.said.record));
        let mut history = Self { series, seen, spread: None };
        history.spread = history.spread_of_all();
        history
    }

    /// The records nearest in time that count: two before and two after, at an end the four
    /// nearest; fewer where there are no more.
    pub fn neighbours(&self, at: usize, counts: impl Fn(&Seen<'_>) -> bool) -> Vec<&Seen<'a>> {
        const EACH_SIDE: usize = 2;
        const ALL: usize = 2 * EACH_SIDE;
        // What stands further away tells little, and a series of one date stays quick.
        const REACH: usize = 100;
        let before: Vec<&Seen<'a>> =
            self.seen[..at].iter().rev().take(REACH).filter(|one| counts(one)).take(ALL).collect();
        let after: Vec<&Seen<'a>> =
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
                let date = self.seen[at].said.date;
                let near = self.neighbours(at, |one| one.said.date != date && one.ln().is_some());
                let near: Vec<f64> = near.into_iter().filter_map(|one| one.ln()).collect();
                Some((own - median(&near)?).abs())
            })
            .collect();
        (off.len() >= FEWEST).then(|| median(&off).map(|off| NORMAL * off)).flatten()
    }
}
