//! The mapping that was applied: headers, names, fractions, units.

use std::collections::BTreeMap;

use crate::findings::{AppliedFacts, RunFacts};
use crate::words::clean::shown;
use crate::words::layout::Lines;
use crate::words::number::{count, counted};

/// Files of one mapping that the page names.
const FILES: usize = 4;
/// Names of one kind that the page lists.
const NAMES: usize = 12;

/// Which header was read as which column, which names and units as which: one line for all files
/// that agree.
pub fn read_as(lines: &mut Lines, run: &RunFacts) {
    let mut of_table: BTreeMap<(&str, &str), Vec<String>> = BTreeMap::new();
    for mapped in run.mapping.iter().filter(|mapped| !mapped.column.is_empty()) {
        let read = of_table.entry((&mapped.file, &mapped.sheet)).or_default();
        read.push(pair(&mapped.header, &mapped.column));
    }
    let mut by_mapping: BTreeMap<Vec<String>, Vec<String>> = BTreeMap::new();
    for ((file, sheet), read) in of_table {
        let table = if sheet.is_empty() { file.to_owned() } else { format!("{file}:{sheet}") };
        by_mapping.entry(read).or_default().push(table);
    }
    let applied = applied(&run.applied);
    if by_mapping.is_empty() && applied.is_empty() {
        return;
    }
    lines.heading("Read as");
    for (read, files) in by_mapping {
        let more = files.len().saturating_sub(FILES);
        let files: Vec<String> = files.iter().take(FILES).map(|file| shown(file)).collect();
        let more = if more == 0 { String::new() } else { format!(" and {more} more") };
        lines.hanging(&format!("{}{more}: {}", files.join(", "), read.join(", ")), 2, 4);
    }
    for line in applied {
        lines.hanging(&line, 2, 4);
    }
}

/// `Sample Date = date`, or the name alone where both agree.
fn pair(header: &str, column: &str) -> String {
    if header == column { shown(column) } else { format!("{} = {column}", shown(header)) }
}

/// One line a kind: `Wells: OW-2 = MW-2 (4)`.
fn applied(applied: &[AppliedFacts]) -> Vec<String> {
    let kinds = [
        ("well", "Wells by alias"),
        ("analyte", "Analytes by name or CAS number"),
        ("fraction", "Fraction taken as listed"),
        ("unit", "Units converted"),
    ];
    kinds
        .into_iter()
        .filter_map(|(what, title)| {
            let mut of: Vec<&AppliedFacts> =
                applied.iter().filter(|one| one.what == what).collect();
            // The commonest first; equals in their own order.
            of.sort_by_key(|one| std::cmp::Reverse(one.records));
            let more = of.len().saturating_sub(NAMES);
            let said: Vec<String> = of
                .iter()
                .take(NAMES)
                .map(|one| {
                    let (from, to) = (shown(&one.from), shown(&one.to));
                    let joint = if what == "unit" { "to" } else { "=" };
                    format!("{from} {joint} {to} ({})", count(one.records))
                })
                .collect();
            let more = match more {
                0 => String::new(),
                n => format!(", and {} in run.json", counted(n, "other", "others")),
            };
            (!said.is_empty()).then(|| format!("{title}: {}{more}", said.join(", ")))
        })
        .collect()
}
