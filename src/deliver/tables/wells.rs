//! wells.csv: one row a well.

use super::rows::{self, columns, words};
use crate::findings::{Cell, Column, Findings, WellFinding};
use crate::terms::Verdict;

/// Every column, in order.
pub const COLUMNS: &[Column<WellFinding>] = columns! { w: WellFinding;
    "site" => words(&w.site),
    "well" => words(&w.well),
    "well_role" => words(w.role.code()),
    "series" => Cell::Count(w.series),
    "undetected" => of(w, Verdict::Undetected),
    "too_few" => of(w, Verdict::TooFew),
    "rising" => of(w, Verdict::Rising),
    "below" => of(w, Verdict::Below),
    "attenuating" => of(w, Verdict::Attenuating),
    "flat" => of(w, Verdict::Flat),
    "undecided" => of(w, Verdict::Undecided),
    "over_limit_now" => Cell::Count(w.over_limit_now),
    "controlling_analyte" => words(w.controlling_analyte.as_deref().unwrap_or_default()),
    "reach_date" => w.reach_date.map_or(Cell::Empty, Cell::Date),
    "reach_earliest" => w.reach_earliest.map_or(Cell::Empty, Cell::Date),
    "reach_latest" => w.reach_latest.map_or(Cell::Empty, Cell::Date),
    "stands_in_the_way" => Cell::Count(w.stands_in_the_way),
    "last_sampled" => w.last_sampled.map_or(Cell::Empty, Cell::Date),
};

/// How many series of the well have a verdict.
fn of(well: &WellFinding, verdict: Verdict) -> Cell {
    let at = Verdict::ALL.iter().position(|&known| known == verdict);
    at.and_then(|at| well.verdicts.get(at)).map_or(Cell::Empty, |&n| Cell::Count(n))
}

/// The table.
#[must_use]
pub fn wells_csv(findings: &Findings) -> String {
    rows::text(COLUMNS, &findings.wells)
}
