//! Expected against received.

use ebbwell::words::completeness::{lacking, statement};

use super::simulated::{Yard, check_table, date, well};

fn site(expected: &str) -> String {
    format!(
        "[site]\nname = \"x\"\n[[analyte]]\nname = \"PCE\"\nunit = \"ug/L\"\n[[analyte]]\n\
         name = \"TCE\"\nunit = \"ug/L\"\n[[well]]\nname = \"W-1\"\n[[well]]\nname = \"W-2\"\n\
         [[well]]\nname = \"W-3\"\n{expected}"
    )
}

const TABLE: &str = "\
well,analyte,date,result,unit,sample_type
W-1,PCE,2024-02-05,4,ug/L,Regular
W-1,TCE,2024-02-05,4,ug/L,Regular
W-2,PCE,2024-02-05,4,ug/L,Regular
W-2,TCE,2024-02-05,4,ug/L,Regular
W-3,PCE,2024-02-05,4,ug/L,Regular
W-1,PCE,2024-05-05,4,ug/L,Regular
W-1,TCE,2024-05-05,O.5,ug/L,Regular
W-2,PCE,2024-05-05,,,Dry
";

#[test]
fn a_round_is_told_with_the_reason_of_every_gap_that_has_one() {
    let findings = check_table(TABLE, &site("[[expected]]\nevery = 3\n"));
    assert_eq!(
        statement(&findings.arrival),
        [
            "2024-Q2: 1 of 6 results due received, 2 with a reason and no result, 1 received and \
             not used, 2 missing.",
            "1 earlier round: 1 complete; 0 results without a record, 0 with a reason.",
        ]
    );
    assert_eq!(
        lacking(&findings.arrival),
        [
            "W-1: TCE (received and set aside: the result cannot be read as a number)",
            "W-2: PCE, TCE (the well was dry)",
            "W-3: PCE, TCE (no record, no reason)",
        ]
    );
}

#[test]
fn what_is_sampled_once_a_year_is_due_once_a_year() {
    let expected = "[[expected]]\nwells = [\"W-1\"]\nevery = 3\n[[expected]]\nwells = [\"W-3\"]\n\
                    analytes = [\"PCE\"]\nevery = 12\n";
    let findings = check_table(TABLE, &site(expected));
    // W-3 was sampled in the round before; W-1's TCE cannot be read.
    assert_eq!(lacking(&findings.arrival).len(), 1);
    assert_eq!(findings.arrival.completeness.rounds.last().map(|round| round.due), Some(2));
}

#[test]
fn a_sample_a_few_days_past_the_edge_counts_for_the_round_it_belongs_to() {
    // The second quarter's sample was taken on 2 July, the third's in September.
    let table = "well,analyte,date,result,unit\nW-1,PCE,2024-02-05,4,ug/L\n\
                 W-1,PCE,2024-07-02,4,ug/L\nW-1,PCE,2024-09-05,4,ug/L\nW-2,PCE,2024-05-05,4,ug/L\n";
    let expected = "[[expected]]\nwells = [\"W-1\"]\nanalytes = [\"PCE\"]\nevery = 3\n";
    let rounds = check_table(table, &site(expected)).arrival.completeness.rounds;
    let held: Vec<(usize, usize)> =
        rounds.iter().map(|round| (round.due, round.received)).collect();
    assert_eq!(held, [(1, 1); 3]);
}

#[test]
fn a_destroyed_well_is_a_reason_until_it_holds_something_again() {
    let destroyed = "well,analyte,date,result,unit,sample_type\n\
                     W-1,PCE,2023-02-05,4,ug/L,Regular\nW-2,PCE,2023-02-05,4,ug/L,Regular\n\
                     W-1,PCE,2023-05-05,,,Destroyed\nW-2,PCE,2024-02-05,4,ug/L,Regular\n";
    let expected = "[[expected]]\nwells = [\"W-1\"]\nanalytes = [\"PCE\"]\nevery = 3\n";
    let told = lacking(&check_table(destroyed, &site(expected)).arrival);
    assert_eq!(told, ["W-1: PCE (the well is destroyed)"]);
    let again = format!("{destroyed}W-1,PCE,2023-08-05,4,ug/L,Regular\n");
    let told = lacking(&check_table(&again, &site(expected)).arrival);
    assert_eq!(told, ["W-1: PCE (no record, no reason)"]);
}

#[test]
fn without_an_expectation_nothing_is_missing_and_that_is_said() {
    let findings = check_table(TABLE, &site(""));
    assert_eq!(
        statement(&findings.arrival),
        ["The site file says nothing of what a round should hold ([[expected]])."]
    );
    assert!(findings.arrival.completeness.lacking.is_empty());
}

#[test]
fn a_full_site_is_complete_and_a_well_left_out_is_named() {
    let mut yard = Yard::clean();
    yard.blocks = "[[expected]]\nevery = 3\n".into();
    let full = yard.check();
    assert_eq!(lacking(&full.arrival), [""; 0]);
    assert!(full.arrival.completeness.rounds.iter().all(|r| (r.due, r.received) == (60, 60)));
    yard.samples.retain(|s| !(s.well == 4 && s.round == 15));
    let lacks = lacking(&yard.check().arrival);
    assert_eq!(lacks.len(), 1, "{lacks:?}");
    assert!(lacks[0].starts_with(&format!("{}: ", well(4))), "{lacks:?} on {}", date(15));
}
