//! How often the four suspicions fire on open results. Skips, saying so, where they are not beside
//! the project.

use std::collections::BTreeSet;
use std::fs;

use ebbwell::intake::Sources;
use ebbwell::ledger::told::Suspicion;
use ebbwell::words::suspicion::sentence;
use tempfile::TempDir;

use super::simulated::check;
use crate::real::{shared, site_folder};

#[test]
fn suspicions_fire_on_less_than_one_in_a_hundred_real_series() {
    let Some(shared) = shared() else { return };
    let place = TempDir::new().expect("a folder");
    let folder = site_folder(&shared, &place);
    let site = fs::read_to_string(folder.join("site.toml")).expect("a site file");
    let findings = check(Sources::Folder(folder), &site);
    let arrival = &findings.arrival;
    let suspicions =
        [Suspicion::UnitSlip, Suspicion::WellsSwapped, Suspicion::HalfLimit, Suspicion::EqualBatch];
    let mut series = BTreeSet::new();
    for kind in suspicions {
        for one in arrival.of(kind) {
            println!("{}: {}", kind.code(), sentence(one, arrival));
            for well in [&one.well, &one.other_well].into_iter().flatten() {
                series.insert((kind, well.clone(), one.analyte.clone()));
            }
        }
    }
    let all = findings.series.len();
    println!("{} of {all} series", series.len());
    assert!(all > 2_000, "{all} series");
    for kind in suspicions {
        let fired = series.iter().filter(|(of, ..)| *of == kind).count();
        assert!(100 * fired < all, "{}: {fired} of {all}", kind.code());
    }
}
