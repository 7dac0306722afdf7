//! The values of one series as a table, each with the records it comes from, and its duplicates.

use crate::findings::{SeriesFinding, UsedValue};
use crate::words::clean::shown;
use crate::words::flag;
use crate::words::layout::{Align, Lines};
use crate::words::number::{iso, people, reading};

/// The value of every date, oldest first.
pub fn values(lines: &mut Lines, series: &SeriesFinding) {
    if series.values.is_empty() {
        lines.heading("No dated value");
        return;
    }
    lines.heading(&format!("Values, {}", series.unit.label()));
    let head = ["date", "value", "fitted", "residual", "", "file:record"];
    let mut rows: Vec<Vec<String>> = vec![head.iter().map(|name| (*name).to_owned()).collect()];
    rows.extend(series.values.iter().map(row));
    let aligned = [Align::Left, Align::Right, Align::Right, Align::Right, Align::Left, Align::Left];
    lines.rows(&rows, &aligned, 2);
}

fn row(value: &UsedValue) -> Vec<String> {
    let mut marks = Vec::new();
    if value.estimated {
        marks.push("estimated");
    }
    if !value.in_fit {
        marks.push("outside the fit");
    }
    let files: Vec<String> = value.records.iter().map(|place| shown(place)).collect();
    vec![
        iso(value.date),
        reading(value.reading),
        value.fitted_median.map_or_else(String::new, people),
        value.residual.map_or_else(String::new, people),
        marks.join(", "),
        files.join("; "),
    ]
}

/// Duplicates beside their parents.
pub fn duplicates(lines: &mut Lines, series: &SeriesFinding) {
    if series.duplicates.is_empty() {
        return;
    }
    lines.heading("Duplicates");
    for pair in &series.duplicates {
        let rpd = pair.rpd_percent.map_or_else(
            || "no relative difference, one is not measured".to_owned(),
            |rpd| format!("{} % apart", people(rpd)),
        );
        let label = flag::label(crate::terms::FlagCode::DuplicatesDiffer);
        let differs = if pair.differs { format!("; {label}") } else { String::new() };
        let (parent, twin) = (reading(pair.parent), reading(pair.duplicate));
        let place = shown(&pair.record);
        lines.hanging(
            &format!("{}  {parent} and {twin}: {rpd}{differs}  {place}", iso(pair.date)),
            2,
            4,
        );
    }
}
