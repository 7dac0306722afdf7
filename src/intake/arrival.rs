//! What is told about a table as a whole: its open layout, missing limits, dates in two orders.

use super::date_order::evidence;
use super::table::Table;
use crate::ledger::Told;
use crate::site::Column;

/// The notes on one table, of whose records `joined` have limits in a detection-limit table.
#[must_use]
pub fn notes(table: &Table, joined: usize) -> Vec<Told> {
    let mut told = Vec::new();
    let open = &table.mapping.open;
    if let Some(layout) = open.layout {
        told.push(Told::OpenLayout {
            file: table.name.clone(),
            layout: layout.label(),
            unused: table.mapping.unused.len(),
        });
        let own = [Column::ReportingLimit, Column::DetectionLimit];
        let plain = own.iter().any(|column| table.mapping.cells.contains_key(column));
        if open.limits.is_empty() && !plain && joined == 0 {
            told.push(Told::NoLimitColumns { file: table.name.clone() });
        }
    }
    let dates = table.lines.iter().map(|line| table.cell(line, Column::Date));
    let evidence = evidence(dates);
    if evidence.is_mixed() {
        told.push(Told::MixedDates {
            file: table.name.clone(),
            day_first: evidence.day_first,
            month_first: evidence.month_first,
        });
    }
    told
}
