//! What a person does now: a few steps, the costliest first.

use crate::findings::{Arrival, RunFacts};
use crate::ledger::Outcome;
use crate::ledger::told::Suspicion;
use crate::words::completeness;
use crate::words::fate;
use crate::words::layout::Lines;
use crate::words::number::{count, counted};
use crate::words::page::account;
use crate::words::suspicion;

/// Steps about records set aside that the page names.
const REASONS: usize = 4;

/// The steps, numbered, and the next command.
pub fn to_do(lines: &mut Lines, run: &RunFacts, arrival: &Arrival, next: &str) {
    lines.heading("What to do now");
    let steps = steps(run, arrival);
    if steps.is_empty() {
        lines.paragraph("Nothing stands in the way.", 2);
    }
    for (at, step) in (1..).zip(&steps) {
        lines.hanging(&format!("{at}. {step}"), 2, 5);
    }
    lines.line(&format!("  Next  {next}"));
}

/// The steps, the costliest first.
#[must_use]
pub fn steps(run: &RunFacts, arrival: &Arrival) -> Vec<String> {
    let mut steps = Vec::new();
    if !run.unreadable.is_empty() {
        let files = counted(run.unreadable.len(), "file", "files");
        steps.push(format!("{files} could not be read: see above, and ask for them again."));
    }
    for &kind in &Suspicion::ALL {
        let n = arrival.of(kind).count();
        let fact = matches!(kind, Suspicion::LimitOverLimit | Suspicion::MissingFromPanel);
        if n > 0 && !fact {
            let found = counted(n, "case", "cases");
            let (label, step) = (suspicion::label(kind), suspicion::step(kind));
            steps.push(format!("{}, {found}: {step}.", capitalised(label)));
        }
    }
    let reasons = account::reasons(run, Outcome::SetAside);
    let doable: Vec<String> = reasons
        .iter()
        .filter_map(|reason| {
            let step = fate::what_to_do_by_code(&reason.reason)?;
            // A reason that asks for nothing is no step.
            if step.starts_with("nothing") {
                return None;
            }
            let what = fate::reason(reason.outcome, &reason.reason);
            Some(format!("{} set aside, {what}: {step}.", count(reason.records)))
        })
        .collect();
    let left = doable.len().saturating_sub(REASONS);
    steps.extend(doable.into_iter().take(REASONS));
    if left > 0 {
        steps.push(format!("{} for setting records aside: see below.", more_reasons(left)));
    }
    let quality = &arrival.quality;
    if let n @ 1.. = quality.send_back.len() {
        steps.push(format!(
            "Send {} back to the laboratory: their own limit is over the regulatory limit.",
            counted(n, "non-detect", "non-detects")
        ));
    }
    if let n @ 1.. = quality.blanks.detects.len() {
        let blanks = counted(n, "blank", "blanks");
        steps.push(format!("Something was found in {blanks}: look at the results of that batch."));
    }
    let lacking = &arrival.completeness.lacking;
    let unexplained = lacking.iter().filter(|one| completeness::why_code(one.why).is_empty());
    if let n @ 1.. = unexplained.count() {
        let results = counted(n, "result of this round is", "results of this round are");
        steps.push(format!("{results} missing without a reason: ask for them."));
    }
    steps
}

/// A sentence begins with a capital.
fn capitalised(text: &str) -> String {
    let mut rest = text.chars();
    let first: String = rest.next().map(|first| first.to_uppercase().collect()).unwrap_or_default();
    format!("{first}{}", rest.as_str())
}

fn more_reasons(n: usize) -> String {
    counted(n, "more reason", "more reasons")
}
