//! Everything that fits again: diagnostics, other models, what would change the answer, how much
//! more data it wants; and the pace, which waits for them.

pub mod rerun;
pub mod residuals;
pub mod shape;
pub mod influence;
pub mod choices;
pub mod plan;
pub mod pace;

use crate::judge::{Facts, Judged, Shown, sort_flags};
use crate::numerics::Points as NumericPoints;
use crate::series::MergeRules;
use crate::site::{Event, RateNeeds};
use crate::terms::{Adjusted, Alternative, Choice, ChoiceSpan, Flag, ModelFit, MoreRounds, Pace};

/// What refitting found out about one series.
#[derive(Clone, Debug, Default)]
pub struct Doubts {
    /// Flags that need refits, raised and not assessable.
    pub flags: Vec<Flag>,
    /// Every model on the same data.
    pub models: Vec<ModelFit>,
    /// The better model, where one is.
    pub alternative: Option<Alternative>,
    /// The rate's interval with correlation allowed for, where that is found.
    pub adjusted: Option<Adjusted>,
    /// The spans of the reruns, a kind each.
    pub spans: Vec<ChoiceSpan>,
    /// The single choice or sample that matters most.
    pub most_telling: Option<Choice>,
    /// How much more sampling would settle it.
    pub rounds: MoreRounds,
    /// The pace, after all of it.
    pub pace: Option<Pace>,
}

/// What the reruns need beside the facts.
#[derive(Clone, Copy, Debug)]
pub struct Setup<'a> {
    /// The rules by which the series' points were made.
    pub merge: &'a MergeRules,
    /// What a rate needs.
    pub rate_needs: RateNeeds,
    /// The site's events.
    pub events: &'a [Event],
}

/// Refits one series in every way that is asked.
#[must_use]
pub fn doubts(facts: &Facts<'_>, judged: &Judged, shown: &Shown, setup: &Setup<'_>) -> Doubts {
    let mut out = Doubts::default();
    if let Ok(fit) = facts.fit {
        let slices = facts.points.slices();
        if let Ok(points) = NumericPoints::new(&slices.t, &slices.y, &slices.mark) {
            let residual = residuals::diagnose(facts, fit, &slices);
            out.flags.extend(residual.flags);
            out.adjusted = residual.adjusted;
            let shape = shape::compare_models(facts, fit, points);
            out.flags.extend(shape.flags);
            out.models = shape.models;
            out.alternative = shape.alternative;
            out.flags.extend(influence::flags(facts, fit, points, setup));
            out.rounds = plan::more_rounds(facts, fit, &slices.t);
        }
        let reruns = choices::rerun_all(facts, setup);
        out.most_telling = choices::most_telling(facts, judged, shown, &reruns);
        out.spans = choices::spans(&reruns);
    }
    out.pace = pace::pace(facts, judged, shown, &out);
    sort_flags(&mut out.flags);
    out
}
