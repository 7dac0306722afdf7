//! Which dates of a series are fitted: all, those since a restart, or those a decision names.

use chrono::NaiveDate;

use super::{SeriesKey, Window};
use crate::site::{DecisionKind, Restart, Site};

/// The window of a series at a date: a decision's, else from the last restart on or before it.
#[must_use]
pub fn window_for(site: &Site, key: &SeriesKey, as_of: NaiveDate) -> Window {
    let names = |list: &[String], name: &str| list.is_empty() || list.iter().any(|n| n == name);
    let decided = site.decisions.iter().find(|decision| {
        decision.kind == DecisionKind::Window
            && names(&decision.wells, &key.well)
            && names(&decision.analytes, &key.analyte)
    });
    if let Some(decision) = decided {
        return Window { from: decision.from, to: decision.to };
    }
    let restarts = site.events.iter().filter(|event| {
        event.restart == Restart::Yes && event.date <= as_of && names(&event.wells, &key.well)
    });
    Window { from: restarts.map(|event| event.date).max(), to: None }
}
