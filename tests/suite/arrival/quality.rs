//! The statement on quality: duplicates, blanks, marks, validation, non-detects to send back.

use ebbwell::words::quality::{blank, send_back, statement};

use super::simulated::{check_table, told};

const SITE: &str = r#"
[site]
name = "x"
[[results]]
files = "*"
validation = "stage 2A by the project chemist"
[[analyte]]
name = "PCE"
limit = "5 ug/L"
limit-source = "made up"
[[qualifier]]
code = "B"
means = "blank"
who = "chemist"
when = 2024-01-05
why = "legend"
"#;

const TABLE: &str = "\
well,analyte,date,result,unit,reporting_limit,sample_type,qualifier,batch
W-1,PCE,2024-03-05,40,ug/L,0.5,Regular,,L1
W-1,PCE,2024-03-05,60,ug/L,0.5,Duplicate,,L1
W-2,PCE,2024-03-05,20,ug/L,0.5,Regular,,L1
W-2,PCE,2024-03-05,21,ug/L,0.5,Field Duplicate,,L1
W-3,PCE,2024-03-05,1.2,ug/L,0.5,Regular,B,L1
W-4,PCE,2024-03-06,0.8,ug/L,0.5,Regular,J,L2
W-5,PCE,2024-03-06,30,ug/L,0.5,Regular,D,L2
W-6,PCE,2024-03-06,31,ug/L,0.5,Regular,H,L2
W-7,PCE,2024-03-06,32,ug/L,0.5,Regular,R,L2
W-8,PCE,2024-03-06,<10,ug/L,10,Regular,,L2
W-9,PCE,2024-03-06,33,ug/L,0.5,Duplicate,,L2
Trip Blank,PCE,2024-03-05,0.0004,mg/L,0.0005,Trip Blank,,L1
Trip Blank,PCE,2024-03-06,ND,ug/L,0.5,Trip Blank,,L2
Field Blank,PCE,2024-03-06,,ug/L,0.5,Field Blank,,L2
";

#[test]
fn the_statement_counts_what_came_with_the_results() {
    let findings = check_table(TABLE, SITE);
    assert_eq!(
        statement(&findings.arrival, findings.run.rpd_allowed),
        [
            "3 duplicates or splits, 1 without a sample of that date: 2 pairs compared, 1 within \
             the criterion (RPD 30 %; near the reporting limit the difference is at most that \
             limit), 1 over it.",
            "3 blanks, 1 without a result that can be read: something was found in 1, 1 clean.",
            "Marks carried along: 1 after the holding time, 1 from a dilution, 2 estimated, 1 found \
             in a blank too, 1 rejected.",
            "Validation: - (2 batches): stage 2A by the project chemist.",
            "1 non-detect has a limit over the regulatory limit and cannot show that it is met.",
        ]
    );
}

#[test]
fn a_blank_is_held_against_the_results_of_its_own_batch_alone() {
    let findings = check_table(TABLE, SITE);
    let found = &findings.arrival.quality.blanks.detects;
    assert_eq!(found.len(), 1);
    assert_eq!(
        blank(&found[0], &findings.arrival),
        "Trip Blank, PCE, 2024-03-05: 0.0004 mg/L; 1 of the 3 detects of its batch are under 5 \
         times that (-:13)"
    );
    let doubtful: Vec<&str> =
        found[0].doubtful.iter().map(|record| findings.arrival.place(*record)).collect();
    assert_eq!(doubtful, ["-:6"]);
}

#[test]
fn a_non_detect_over_the_limit_is_named_for_the_laboratory() {
    let findings = check_table(TABLE, SITE);
    let back = &findings.arrival.quality.send_back;
    assert_eq!(
        back.iter().map(|one| send_back(one, &findings.arrival)).collect::<Vec<_>>(),
        ["W-8, PCE, 2024-03-06: <10 ug/L, the limit is 5 ug/L (-:11)"]
    );
    assert_eq!(told(&findings.arrival), ["limit-over-limit series W-8 PCE 2024-03-06 (1)"]);
}

#[test]
fn without_any_quality_control_the_statement_says_so() {
    let table = "well,analyte,date,result,unit\nW-1,PCE,2024-03-05,4,ug/L\n";
    let findings = check_table(table, "[site]\nname = \"x\"\n");
    assert_eq!(
        statement(&findings.arrival, findings.run.rpd_allowed),
        [
            "No duplicates or splits came with the results.",
            "No blanks came with the results.",
            "No result is marked for holding time, dilution, estimation, blanks or rejection.",
            "Validation: the site file states no stage (`validation` under [[results]]).",
            "No non-detect has a limit over the regulatory limit.",
        ]
    );
}

#[test]
fn a_duplicate_is_compared_whatever_its_medium_is_called() {
    let site = format!("{SITE}\n[[analyte]]\nname = \"TCE\"\nunit = \"ug/L\"\nmedium = \"WG\"\n");
    let table = "well,analyte,date,result,unit,sample_type,medium\n\
                 W-1,TCE,2024-03-05,40,ug/L,Regular,WG\n\
                 W-1,TCE,2024-03-05,41,ug/L,Duplicate,WGQ\n\
                 W-2,TCE,2024-03-05,41,ug/L,Regular,WS\n";
    let findings = check_table(table, &site);
    assert_eq!(findings.arrival.quality.duplicates.compared, 1);
    let aside = findings.run.outcomes.iter().find(|count| count.outcome == "set-aside");
    assert_eq!(
        aside.map(|count| (count.reason.as_str(), count.records)),
        Some(("other-medium", 1))
    );
}
