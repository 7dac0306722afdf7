//! Facts about single records: sampled outside the site's life, not detected over the limit.

use super::history::{History, Seen};
use super::{Scope, Sentinel};
use crate::ledger::RecordId;
use crate::ledger::told::Suspicion;
use crate::site::Site;
use crate::terms::Reading;

/// Results dated before the site's first or after its last date, by series.
pub fn look(histories: &[History<'_>], site: &Site) -> Vec<Sentinel> {
    let outside = |seen: &Seen<'_>| {
        site.active_from.is_some_and(|from| seen.said.date < from)
            || site.active_to.is_some_and(|to| seen.said.date > to)
    };
    histories
        .iter()
        .filter_map(|history| of_series(history, Suspicion::OutsideLife, outside))
        .collect()
}

/// Non-detects whose limit is over the regulatory limit, by series; figure: the highest limit.
pub fn limits_over(histories: &[History<'_>]) -> Vec<Sentinel> {
    histories
        .iter()
        .filter_map(|history| {
            let limit = history.series.limit.as_ref()?.value;
            let over =
                |seen: &Seen<'_>| matches!(seen.said.reading, Reading::Below(at) if at > limit);
            let mut one = of_series(history, Suspicion::LimitOverLimit, over)?;
            let over = history.seen.iter().filter(|seen| over(seen));
            one.figure = over.map(|seen| seen.said.reading.number()).max_by(f64::total_cmp);
            Some(one)
        })
        .collect()
}

/// The sentinel of those records of a series for which something holds.
fn of_series(
    history: &History<'_>,
    kind: Suspicion,
    holds: impl Fn(&Seen<'_>) -> bool,
) -> Option<Sentinel> {
    let of: Vec<&Seen<'_>> = history.seen.iter().filter(|seen| holds(seen)).collect();
    let records: Vec<RecordId> = of.iter().map(|seen| seen.said.record).collect();
    let newest = of.last()?;
    let key = &history.series.key;
    let mut one = Sentinel::of(kind, Scope::Series, records);
    one.site.clone_from(&key.site);
    one.well = Some(key.well.clone());
    one.analyte = Some(key.analyte.clone());
    one.date = Some(newest.said.date);
    Some(one)
}
