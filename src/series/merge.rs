//! One value for one date.

use super::{Candidate, SampleRole};
use crate::ledger::{RecordId, Told};
use crate::site::{Duplicates, SameDay};
use crate::terms::Reading;

/// The value of one date, and who won.
#[derive(Clone, Debug, PartialEq)]
pub struct Merged {
    /// What the samples say together.
    pub reading: Reading,
    /// Whether any of the used ones is estimated.
    pub estimated: bool,
    /// Records whose numbers enter the value, ascending.
    pub used: Vec<RecordId>,
    /// Samples that lost; a duplicate never does, it stays quality control.
    pub lost: Vec<RecordId>,
    /// What is told.
    pub told: Vec<(RecordId, Told)>,
}

/// Merges the candidates of one date.
///
/// A detect beats a non-detect (told if the non-detect's limit lies under the detect); two
/// non-detects keep the lower limit; two or more detects give their mean over sorted values, or
/// the highest. A value above the range beats nothing but a non-detect, and two keep the higher.
///
/// # None
/// The date holds nothing but duplicates, and duplicates are not averaged in.
#[must_use]
pub fn merge_date(day: &[Candidate], same_day: SameDay, duplicates: Duplicates) -> Option<Merged> {
    let counts = |candidate: &&Candidate| match (candidate.role, duplicates) {
        (SampleRole::Primary, _) | (SampleRole::Duplicate, Duplicates::Average) => true,
        (SampleRole::Duplicate, Duplicates::Primary) => false,
    };
    let all: Vec<&Candidate> = day.iter().filter(counts).collect();
    let measured: Vec<(&Candidate, f64)> = all
        .iter()
        .filter_map(|candidate| match candidate.reading {
            Reading::Measured(v) => Some((*candidate, v)),
            _ => None,
        })
        .collect();
    let (reading, winners) =
        if measured.is_empty() { one_reading(&all)? } else { several_detects(&measured, same_day) };
    let mut used: Vec<RecordId> = winners.iter().map(|candidate| candidate.record).collect();
    used.sort_unstable();
    let mut lost: Vec<RecordId> = day
        .iter()
        .filter(|candidate| candidate.role == SampleRole::Primary)
        .map(|candidate| candidate.record)
        .filter(|record| !used.contains(record))
        .collect();
    lost.sort_unstable();
    let told = day
        .iter()
        .filter(|candidate| match candidate.reading {
            Reading::Below(limit) => reading.is_detect() && limit < reading.number(),
            _ => false,
        })
        .map(|candidate| (candidate.record, Told::NonDetectUnderDetect))
        .collect();
    let estimated = winners.iter().any(|candidate| candidate.estimated);
    Some(Merged { reading, estimated, used, lost, told })
}

/// Several measured values: the mean over sorted values, or the highest.
fn several_detects<'a>(
    measured: &[(&'a Candidate, f64)],
    same_day: SameDay,
) -> (Reading, Vec<&'a Candidate>) {
    // Sorted, so that the sum does not depend on the order of records.
    let mut sorted: Vec<f64> = measured.iter().map(|(_, v)| *v).collect();
    sorted.sort_by(f64::total_cmp);
    match same_day {
        SameDay::Mean => {
            #[allow(clippy::cast_precision_loss)] // a handful of results on one date
            let mean = sorted.iter().sum::<f64>() / sorted.len() as f64;
            (Reading::Measured(mean), measured.iter().map(|(candidate, _)| *candidate).collect())
        }
        SameDay::Highest => {
            let highest = sorted[sorted.len() - 1];
            let winner = measured.iter().find(|(_, v)| v.total_cmp(&highest).is_eq());
            (
                Reading::Measured(highest),
                winner.map(|(candidate, _)| *candidate).into_iter().collect(),
            )
        }
    }
}

/// No measured value: the highest value above the range, else the lowest limit.
fn one_reading<'a>(all: &[&'a Candidate]) -> Option<(Reading, Vec<&'a Candidate>)> {
    let above = all
        .iter()
        .filter(|candidate| matches!(candidate.reading, Reading::Above(_)))
        .max_by(|a, b| {
            a.reading.number().total_cmp(&b.reading.number()).then_with(|| b.record.cmp(&a.record))
        });
    let winner = above.or_else(|| {
        all.iter().min_by(|a, b| {
            a.reading.number().total_cmp(&b.reading.number()).then_with(|| a.record.cmp(&b.record))
        })
    });
    winner.map(|winner| (winner.reading, vec![*winner]))
}
