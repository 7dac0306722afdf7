//! Intake of the open water-quality layouts, and of names, dates and values in every usual spelling.

use ebbwell::intake::{Sources, Tidy, tidy};
use ebbwell::ledger::LedgerRow;
use ebbwell::site::{Site, read};

mod cells;
mod dates;
mod layouts;
mod names;
mod real_open;

/// A site file's text, checked.
fn site(text: &str) -> Site {
    read(text, "site.toml").unwrap_or_else(|problems| panic!("{problems:?}"))
}

/// One table from standard input.
fn read_text(site: &Site, text: &str) -> Tidy {
    let tidy = tidy(&Sources::Standard(text.as_bytes().to_vec()), site, &|_| true);
    let tidy = tidy.expect("a frame").expect("not stopped");
    assert_eq!(tidy.unreadable, []);
    tidy
}

/// The ledger of an intake, before any merge of dates.
fn rows_of(tidy: &Tidy, site: &Site) -> Vec<LedgerRow> {
    let detail =
        |told: &[&ebbwell::ledger::Told]| ebbwell::words::told::details(told.iter().copied());
    tidy.ledger_rows(site, &detail).expect("rows").collect()
}

/// Every usable record of a table as its value: `5` for a detect, `<0.5`, `>2000`, with ` e` behind
/// an estimated one; and the reason of every other record.
fn values(site: &Site, text: &str) -> Vec<String> {
    let mut tidy = read_text(site, text);
    let as_of = ebbwell::intake::names::date_of(40_000).expect("a date");
    let series = ebbwell::series::group(&mut tidy, site, as_of).expect("series");
    let mut values: Vec<(u32, String)> = Vec::new();
    for candidate in series.iter().flat_map(|one| &one.candidates) {
        let mark = if candidate.estimated { " e" } else { "" };
        values.push((candidate.record, format!("{}{mark}", spelled(candidate.reading))));
    }
    for (row, record) in rows_of(&tidy, site).iter().zip(0..) {
        if !row.outcome.is_empty() {
            values.push((record, row.reason.clone()));
        }
    }
    values.sort();
    values.into_iter().map(|(_, value)| value).collect()
}

fn spelled(reading: ebbwell::terms::Reading) -> String {
    use ebbwell::terms::Reading;
    match reading {
        Reading::Measured(v) => format!("{v}"),
        Reading::Below(v) => format!("<{v}"),
        Reading::Above(v) => format!(">{v}"),
        Reading::Between(low, high) => format!("{low}..{high}"),
    }
}
