//! Layouts: workbooks and cross-tabs become the same records as long text.

mod any_cells;
mod by_hand;
mod cross_tabs;
mod grids;
mod hostile;
mod one_data_set;
mod workbooks;

use ebbwell::intake::{Sources, Tidy, tidy};
use ebbwell::ledger::{LedgerRow, Told};
use ebbwell::site::{Site, read};

/// A site that lists benzene and toluene.
pub(super) const SITE: &str = r#"
[site]
name = "Osier Yard"

[[analyte]]
name = "Benzene"
cas = "71-43-2"
limit = "5 ug/L"
limit-source = "40 CFR 141.61"

[[analyte]]
name = "Toluene"
cas = "108-88-3"
limit = "1 mg/L"
limit-source = "40 CFR 141.61"
"#;

/// The site, with what stands under `[[results]]`.
pub(super) fn site(results: &str) -> Site {
    let text = format!("{SITE}\n[[results]]\nfiles = \"*\"\n{results}\n");
    read(&text, "site.toml").unwrap_or_else(|problems| panic!("{problems:?}"))
}

pub(super) fn read_bytes(bytes: &[u8], site: &Site) -> Tidy {
    let tidy = tidy(&Sources::Standard(bytes.to_vec()), site, &|_| true);
    tidy.expect("a frame").expect("not stopped")
}

/// The ledger, every file read.
pub(super) fn ledger(bytes: &[u8], site: &Site) -> Vec<LedgerRow> {
    let tidy = read_bytes(bytes, site);
    assert_eq!(tidy.unreadable, []);
    assert_eq!(tidy.files[0].records, tidy.ledger.len());
    let detail = |told: &[&Told]| ebbwell::words::told::details(told.iter().copied());
    tidy.ledger_rows(site, &detail).expect("rows").collect()
}

/// Where each record stands and what it says: `Sheet1!C7 MW-1 Benzene 2024-03-05 4.2 ug/L`.
pub(super) fn records(bytes: &[u8], site: &Site) -> Vec<String> {
    let shown = |row: LedgerRow| {
        let place = ebbwell::intake::address::place("", &row.sheet, &row.record);
        let cells = [row.well, row.analyte, row.date, row.reported, row.unit, row.reason];
        let cells: Vec<String> = cells.into_iter().filter(|cell| !cell.is_empty()).collect();
        format!("{} {}", place.trim_start_matches(':'), cells.join(" "))
    };
    ledger(bytes, site).into_iter().map(shown).collect()
}

/// Why the one file could not be read.
pub(super) fn refusal(bytes: &[u8], site: &Site) -> String {
    let tidy = read_bytes(bytes, site);
    assert_eq!(tidy.ledger.len(), 0);
    let problems: Vec<String> = tidy
        .unreadable
        .iter()
        .map(|unreadable| ebbwell::words::unreadable::why(&unreadable.problem))
        .collect();
    problems.join("\n")
}

/// What is told about files.
pub(super) fn told(bytes: &[u8], site: &Site) -> Vec<String> {
    let tidy = read_bytes(bytes, site);
    tidy.told.iter().map(ebbwell::words::told::detail).collect()
}
