//! Every sentinel fires on what it is there for, and nothing else does.

use super::simulated::{Yard, told};

#[test]
fn a_site_with_nothing_wrong_raises_nothing() {
    assert_eq!(told(&Yard::clean().check().arrival), [""; 0]);
}

#[test]
fn every_planted_slip_of_sixty_series_is_found_and_none_is_invented() {
    let yard = Yard::clean()
        // One result, a whole sample, and one analyte of a whole file, all off by 1,000.
        .plant(|s| (s.well, s.analyte, s.round) == (0, 0, 5), |s| s.result *= 1000.0)
        .plant(|s| (s.well, s.round) == (1, 2), |s| s.result /= 1000.0)
        .plant(|s| s.analyte == 4 && s.round / 4 == 2, |s| s.result *= 1000.0)
        .exchange(2, 3, 13)
        // Vinyl chloride that was never detected, replaced by half its limit at one well.
        .plant(|s| s.analyte == 3 && s.well == 10, |s| s.written = Some("0.25".into()))
        .plant(|s| s.analyte == 1 && s.round == 7, |s| s.written = Some("12.3".into()))
        .plant(|s| (s.well, s.analyte, s.round) == (5, 2, 12), |s| s.date = "2002-02-14".into())
        .plant(
            |s| (s.well, s.analyte, s.round) == (11, 3, 14),
            |s| {
                s.written = Some("<10".into());
                s.limit = 10.0;
            },
        );
    let mut yard = yard;
    yard.samples.retain(|s| (s.well, s.analyte, s.round) != (6, 1, 6));
    assert_eq!(
        told(&yard.check().arrival),
        [
            "unit-slip analyte results/2022.csv Chloride (48)",
            "unit-slip sample W-02 2020-08-14 (5)",
            "unit-slip result W-01 PCE 2021-05-14 (1)",
            "wells-swapped wells W-03 W-04 2023-05-14 (10)",
            "half-limit series W-11 Vinyl chloride (16)",
            "equal-batch batch results/2021.csv TCE 2021-11-14 (12)",
            "outside-site-life series W-06 cis-1,2-DCE 2002-02-14 (1)",
            "limit-over-limit series W-12 Vinyl chloride 2023-08-14 (1)",
            "missing-from-panel sample W-06 cis-1,2-DCE 2023-02-14 (4)",
            "missing-from-panel sample W-07 TCE 2021-08-14 (4)",
        ]
    );
}

#[test]
fn a_whole_file_in_another_unit_is_named_as_a_file() {
    let yard = Yard::clean().plant(|s| s.round / 4 == 3, |s| s.result *= 1000.0);
    // Vinyl chloride of two wells is never detected and cannot slip.
    assert_eq!(told(&yard.check().arrival), ["unit-slip file results/2023.csv (232)"]);
}

#[test]
fn a_factor_that_is_not_1000_and_a_series_that_scatters_widely_are_no_slip() {
    let yard = Yard::clean()
        .plant(|s| (s.well, s.analyte, s.round) == (0, 0, 5), |s| s.result *= 300.0)
        .plant(|s| (s.well, s.analyte, s.round) == (1, 1, 6), |s| s.result *= 3000.0);
    assert_eq!(told(&yard.check().arrival), [""; 0]);
    // From date to date a factor of thirty: 1,000 is within reach.
    let yard = Yard::clean()
        .plant(
            |s| (s.well, s.analyte) == (0, 0),
            |s| s.result *= 30.0_f64.powi([0, 1, -1][s.round % 3]),
        )
        .plant(|s| (s.well, s.analyte, s.round) == (0, 0, 9), |s| s.result *= 1000.0);
    assert_eq!(told(&yard.check().arrival), [""; 0]);
}

#[test]
fn what_is_suspected_stands_in_the_ledger_and_in_the_notes_and_changes_no_fate() {
    let yard =
        Yard::clean().plant(|s| (s.well, s.analyte, s.round) == (0, 0, 5), |s| s.result *= 1000.0);
    let (plain, planted) = (Yard::clean().check(), yard.check());
    assert_eq!(plain.run.outcomes, planted.run.outcomes);
    let notes: Vec<String> = planted
        .notes
        .iter()
        .map(|note| ebbwell::words::told::sentence(&note.told, note.records))
        .collect();
    let note = "1 record: suspected: a unit slip of 1,000; used as it stands";
    assert!(notes.iter().any(|said| said == note), "{notes:?}");
}

#[test]
fn three_of_a_kind_are_not_yet_many_halves_and_three_equal_values_no_batch() {
    let yard = Yard::clean()
        .plant(
            |s| s.analyte == 3 && s.well == 10 && s.round < 3,
            |s| s.written = Some("0.25".into()),
        )
        .plant(
            |s| s.analyte == 1 && s.round == 7 && s.well < 3,
            |s| s.written = Some("12.3".into()),
        );
    assert_eq!(told(&yard.check().arrival), [""; 0]);
}
