//! What is told about names, dates, units and limits as they arrive.

use super::clean::shown;
use super::number::counted;
use crate::ledger::Told;

/// The words of one note; empty for notes that are worded elsewhere.
pub(super) fn detail(told: &Told) -> String {
    match told {
        Told::UnitsDiffer { cell, column } => format!(
            "the result cell says {cell} and its unit is `{}`; which of them holds is not known",
            shown(column)
        ),
        Told::BasisTaken { analyte, basis } => {
            format!("{} without a basis, taken as {}", shown(analyte), shown(basis))
        }
        Told::CasRestored { written, cas } => {
            format!("CAS number {cas} restored from the date `{}`", shown(written))
        }
        Told::CasAgainstName { cas, written, listed } => format!(
            "CAS number {} is that of {} and stands beside `{}`; the number counts",
            shown(cas),
            shown(listed),
            shown(written)
        ),
        Told::WellTwins { wells } => {
            let names: Vec<String> = wells.iter().map(|well| shown(well)).collect();
            format!(
                "wells {} differ in spelling alone and are kept apart; if they are one well, an \
                 alias under [[well]] says so",
                names.join(", ")
            )
        }
        Told::MixedDates { file, day_first, month_first } => format!(
            "{}: {} with the day first and {} with the month first; split the file or correct it",
            shown(file),
            counted(*day_first, "date", "dates"),
            counted(*month_first, "date", "dates")
        ),
        Told::OpenLayout { file, layout, unused } => format!(
            "{}: {layout} of the open water-quality standard; {} of it not used",
            shown(file),
            counted(*unused, "column", "columns")
        ),
        Told::NoLimitColumns { file } => format!(
            "{} has no columns for limits; its non-detects need the detection-limit table beside it",
            shown(file)
        ),
        Told::NoDetectionLimit { kind } => {
            format!("limit type `{}` is no detection limit; ignored", shown(kind))
        }
        Told::LimitTypeUnknown { kind } => format!(
            "limit type `{}` has no rank; ignored (`limit-order` under [settings] gives it one)",
            shown(kind)
        ),
        Told::LimitUnit { unit } => {
            format!("a limit in `{}` cannot be held against the result; ignored", shown(unit))
        }
        Told::LimitJoined { file } => format!("its limit stands in {}", shown(file)),
        _ => String::new(),
    }
}
