//! Entries of the words that are enums: complete by construction.

use super::{Entry, Kind, OURS};
use crate::ledger::{Merged, NonResult, Outcome, QualityControl, SetAside, UsedAs};
use crate::terms::{FlagCode, Method, Pace, Verdict, WhyNoDate, WhyNoRate};
use crate::words::{fate, fate_rules, flag, method, pace, reason, verdict};

/// An entry without place and formula, from this program.
fn ours(word: &'static str, kind: Kind, meaning: &'static str) -> Entry {
    Entry { word, kind, place: "", meaning, formula: None, source: OURS }
}

/// A reason of the ledger under its outcome.
fn under(outcome: Outcome, word: &'static str, meaning: &'static str) -> Entry {
    Entry { place: outcome.code(), ..ours(word, Kind::Reason, meaning) }
}

/// Every coded word.
#[must_use]
pub fn entries() -> Vec<Entry> {
    let verdicts = Verdict::ALL.iter().map(|&v| Entry {
        formula: verdict::formula(v),
        ..ours(v.code(), Kind::Verdict, verdict::meaning(v))
    });
    let paces = Pace::ALL.iter().map(|&p| Entry {
        formula: pace::formula(p),
        ..ours(p.code(), Kind::Pace, pace::meaning(p))
    });
    let methods = Method::ALL.iter().map(|&m| Entry {
        formula: method::formula(m),
        source: method::source(m),
        ..ours(m.code(), Kind::Method, method::meaning(m))
    });
    let flags = FlagCode::ALL.iter().map(|&f| Entry {
        formula: flag::formula(f),
        source: f.source(),
        ..ours(f.code(), Kind::Flag, flag::meaning(f))
    });
    let no_rate =
        WhyNoRate::ALL.iter().map(|&w| ours(w.code(), Kind::NoRate, reason::no_rate_meaning(w)));
    let no_date =
        WhyNoDate::ALL.iter().map(|&w| ours(w.code(), Kind::NoDate, reason::no_date_meaning(w)));
    verdicts
        .chain(paces)
        .chain(methods)
        .chain(flags)
        .chain(no_rate)
        .chain(no_date)
        .chain(ledger())
        .collect()
}

/// Outcomes and reasons.
fn ledger() -> impl Iterator<Item = Entry> {
    let outcomes =
        Outcome::ALL.iter().map(|&o| ours(o.code(), Kind::Outcome, fate::outcome_meaning(o)));
    let used = UsedAs::ALL.iter().map(|&u| under(Outcome::Used, u.code(), fate::used_as(u)));
    let merged = Merged::ALL.iter().map(|&m| under(Outcome::Merged, m.code(), fate::merged(m)));
    let none =
        NonResult::ALL.iter().map(|&n| under(Outcome::NonResult, n.code(), fate::non_result(n)));
    let control = QualityControl::ALL
        .iter()
        .map(|&q| under(Outcome::QualityControl, q.code(), fate::quality_control(q)));
    let aside =
        SetAside::ALL.iter().map(|&s| under(Outcome::SetAside, s.code(), fate_rules::set_aside(s)));
    outcomes.chain(used).chain(merged).chain(none).chain(control).chain(aside)
}
