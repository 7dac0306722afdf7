//! What each round should hold, against what was received.

use super::clean::shown;
use super::fate;
use super::number::counted;
use super::round;
use crate::findings::Arrival;
use crate::ledger::Fate;
use crate::series::completeness::{Asked, Lacking, RoundCount, Why};

/// The current round in a sentence, and the earlier ones in another.
#[must_use]
pub fn statement(arrival: &Arrival) -> Vec<String> {
    let found = &arrival.completeness;
    if found.asked == Asked::No {
        return vec![
            "The site file says nothing of what a round should hold ([[expected]]).".into(),
        ];
    }
    let Some((current, earlier)) = found.rounds.split_last() else { return Vec::new() };
    let mut said =
        vec![format!("{}: {}.", round::label(current.date, arrival.round), counts(current))];
    if !earlier.is_empty() {
        let full = earlier.iter().filter(|one| one.received == one.due).count();
        let missing: usize = earlier.iter().map(|one| one.missing).sum();
        let explained: usize = earlier.iter().map(|one| one.explained).sum();
        said.push(format!(
            "{}: {full} complete; {} without a record, {explained} with a reason.",
            counted(earlier.len(), "earlier round", "earlier rounds"),
            counted(missing, "result", "results"),
        ));
    }
    said
}

/// One round in numbers.
fn counts(one: &RoundCount) -> String {
    let parts: Vec<String> = [
        (one.explained, "with a reason and no result"),
        (one.not_used, "received and not used"),
        (one.missing, "missing"),
    ]
    .into_iter()
    .filter(|(n, _)| *n > 0)
    .map(|(n, what)| format!("{n} {what}"))
    .collect();
    let rest = if parts.is_empty() { String::new() } else { format!(", {}", parts.join(", ")) };
    format!("{} of {} received{rest}", one.received, counted(one.due, "result due", "results due"))
}

/// What lacks, grouped by well and reason: `MW-10: PCE, TCE (the well was dry)`.
#[must_use]
pub fn lacking(arrival: &Arrival) -> Vec<String> {
    let same = |a: &Lacking, b: &Lacking| (&a.well, a.why) == (&b.well, b.why);
    arrival
        .completeness
        .lacking
        .chunk_by(same)
        .map(|of| {
            let analytes: Vec<String> = of.iter().map(|one| shown(&one.analyte)).collect();
            format!("{}: {} ({})", shown(&of[0].well), analytes.join(", "), why(of[0].why))
        })
        .collect()
}

/// Why something lacks.
#[must_use]
pub fn why(why: Why) -> String {
    match why {
        Why::Unknown => "no record, no reason".into(),
        Why::Gap(gap) => fate::non_result(gap).into(),
        Why::NotUsed(Fate::SetAside(reason)) => {
            format!("received and set aside: {}", fate::set_aside(reason))
        }
        Why::NotUsed(_) => "received and not used".into(),
    }
}

/// The reason's code; empty where none is given.
#[must_use]
pub fn why_code(why: Why) -> String {
    match why {
        Why::Unknown => String::new(),
        Why::Gap(gap) => gap.code().to_owned(),
        Why::NotUsed(fate) => fate.reason(|_| String::new()),
    }
}
