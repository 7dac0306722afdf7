//! Names of wells and analytes, CAS numbers, bases.

use std::collections::BTreeSet;

use super::{read_text, rows_of, site, values};

const HEADER: &str = "well,analyte,cas,date,result,unit\n";

fn site_with(blocks: &str) -> ebbwell::site::Site {
    site(&format!("[site]\nname = \"Osier Yard\"\n{blocks}"))
}

fn analyte(name: &str, keys: &str) -> String {
    format!("[[analyte]]\nname = \"{name}\"\n{keys}\n")
}

/// What a CAS cell beside an unknown name is joined to, and what is said about it.
fn joined(cas: &str) -> (String, String) {
    let listed = [
        analyte("Vinyl chloride", "cas = \"75-01-4\""),
        analyte("Dichloromethane", "cas = \"75-09-2\""),
        analyte("TCE", "cas = \"79-01-6\""),
        analyte("Palladium", "cas = \"7440-05-3\""),
    ];
    let site = site_with(&listed.concat());
    let rows = rows_of(
        &read_text(&site, &format!("{HEADER}OY-1,??,\"{cas}\",2024-03-05,4,ug/L\n")),
        &site,
    );
    let name = if rows[0].outcome.is_empty() { rows[0].analyte.clone() } else { String::new() };
    (name, rows[0].detail.clone())
}

#[test]
fn a_cas_number_eaten_as_a_date_is_restored_with_a_note() {
    for (cell, name) in [
        ("7440-05-03", "Palladium"),
        ("7440-05-03 00:00:00", "Palladium"),
        ("3/5/7440", "Palladium"),
        ("5/3/7440", "Palladium"),
        ("05/03/7440", "Palladium"),
        ("03.05.7440", "Palladium"),
        ("3-May-7440", "Palladium"),
        ("May-40", "Palladium"),
        ("3-May-40", "Palladium"),
        ("5/3/40", "Palladium"),
        ("1979-01-06", "TCE"),
        ("1/6/1979", "TCE"),
        ("6.1.1979", "TCE"),
        ("6-Jan-79", "TCE"),
        ("Jan-79", "TCE"),
        ("janv.-79", "TCE"),
        ("1975-01-04", "Vinyl chloride"),
        ("4/1/1975", "Vinyl chloride"),
        ("1975-09-02", "Dichloromethane"),
        ("2 September 1975", "Dichloromethane"),
        ("Sep-75", "Dichloromethane"),
    ] {
        let (found, detail) = joined(cell);
        assert_eq!(found, name, "{cell}");
        assert!(detail.contains(&format!("restored from the date `{cell}`")), "{detail}");
    }
}

#[test]
fn what_is_no_eaten_number_is_left_as_it_is() {
    for cell in ["7440-05-04", "2024-03-05", "1/7/1979", "Mar-24", "28748", "1979-13-06", "x"] {
        let (found, detail) = joined(cell);
        assert_eq!(found, "", "{cell}");
        assert!(!detail.contains("restored"), "{cell}: {detail}");
    }
    // A number that only fails its check digit is used as written.
    assert!(joined("79-01-7").1.contains("fails its check digit"));
}

#[test]
fn isomers_and_relatives_are_never_joined() {
    let limits = include_str!("../site/limits.csv");
    let mut names: BTreeSet<&str> = limits
        .lines()
        .filter(|line| !line.starts_with('#'))
        .filter_map(|line| line.split(';').nth(1))
        .collect();
    names.extend(["o-Xylene", "m,p-Xylene", "Total xylenes", "1,1-DCA", "1,2-DCA"]);
    assert!(names.len() > 30, "{names:?}");
    let blocks: String = names.iter().map(|name| analyte(name, "")).collect();
    let site = site_with(&blocks);
    for name in &names {
        let (at, _) = site.analyte_of(None, name).expect("listed");
        assert_eq!(&site.analytes[at].name, name);
        // With only the others listed, none of them answers.
        let others: String =
            names.iter().filter(|other| *other != name).map(|other| analyte(other, "")).collect();
        let found = site_with(&others);
        let found =
            found.analyte_of(None, name).map(|(at, by)| (found.analytes[at].name.clone(), by));
        assert_eq!(found, None, "{name}");
    }
    for (written, kept_from) in [
        ("1,2-Dichloroethene", "1,1-DCE"),
        ("1,1-Dichloroethene", "cis-1,2-DCE"),
        ("trans-1,2-Dichloroethylene", "cis-1,2-DCE"),
        ("1,2-Dichloroethane", "1,1-DCA"),
        ("1,1,2-Trichloroethane", "1,1,1-TCA"),
        ("Dichloroethene", "1,1-DCE"),
        ("1,1-Dichloroethane", "1,1-DCE"),
    ] {
        let only = site_with(&analyte(kept_from, ""));
        assert_eq!(only.analyte_of(None, written), None, "{written} and {kept_from}");
    }
}

#[test]
fn a_cas_number_beside_another_substances_name_counts_and_is_told() {
    let site = site_with(&analyte("1,1-DCE", "cas = \"75-35-4\""));
    let text = format!("{HEADER}OY-1,\"trans-1,2-Dichloroethene\",75-35-4,2024-03-05,4,ug/L\n");
    let rows = rows_of(&read_text(&site, &text), &site);
    assert_eq!(rows[0].analyte, "1,1-DCE");
    assert!(rows[0].detail.contains("75-35-4 is that of 1,1-DCE"), "{}", rows[0].detail);
}

const JOIN: &str = "[[decision]]\nid = \"J1\"\nkind = \"join\"\nwells = [\"OY-1\", \"OY-1R\", \"OY-1X\"]\n\
                    from = 2020-01-01\nwho = \"A\"\nwhen = 2026-07-01\nwhy = \"drilled anew\"\n";

#[test]
fn joining_wells_is_a_decision_with_its_dates() {
    let site = site_with(JOIN);
    let text = format!(
        "{HEADER}OY-1,Benzene,,2019-03-05,4,ug/L\nOY-1R,Benzene,,2019-06-05,5,ug/L\n\
         OY-1R,Benzene,,2020-03-05,6,ug/L\nOY-1X,Benzene,,2021-03-05,7,ug/L\n"
    );
    let tidy = read_text(&site, &text);
    let wells: Vec<String> = rows_of(&tidy, &site).into_iter().map(|row| row.well).collect();
    assert_eq!(wells, ["OY-1", "OY-1R", "OY-1", "OY-1"]);
    assert_eq!(tidy.decided, [2]);
    assert!(rows_of(&tidy, &site)[2].detail.contains("decision J1"));
}

#[test]
fn a_join_needs_two_wells_and_goes_by_wells_and_dates() {
    let problems = |join: &str| -> String {
        let text = format!("[site]\nname = \"x\"\n{join}");
        let problems = ebbwell::site::read(&text, "site.toml").expect_err("a problem");
        problems.iter().map(|problem| format!("{problem}\n")).collect()
    };
    let one = JOIN.replace(", \"OY-1R\", \"OY-1X\"", "");
    assert!(problems(&one).contains("the name that is kept"), "{}", problems(&one));
    let more = format!("{JOIN}samples = [\"S1\"]\n");
    assert!(problems(&more).contains("wells and dates"), "{}", problems(&more));
}

#[test]
fn wells_that_differ_in_spelling_alone_are_told_and_kept_apart() {
    let site = site_with("");
    let wells = ["MW-1", "MW1", "MW-01", "mw-1", "MW-1R", "MW-10", "MW-11", "OW-1"];
    let mut text = HEADER.to_owned();
    for (well, day) in wells.iter().zip(10..) {
        text.push_str(&format!("{well},Benzene,,2024-03-{day},4,ug/L\n"));
    }
    let tidy = read_text(&site, &text);
    let found: Vec<String> = rows_of(&tidy, &site).into_iter().map(|row| row.well).collect();
    assert_eq!(found, wells);
    let told: Vec<String> = tidy
        .told
        .iter()
        .map(|told| ebbwell::words::told::sentence(told, 0))
        .filter(|line| line.contains("differ in spelling alone"))
        .collect();
    assert_eq!(told.len(), 1, "{told:?}");
    assert!(told[0].starts_with("wells MW-01, MW-1, MW1, mw-1 differ"), "{told:?}");
}

#[test]
fn nitrate_without_a_basis_is_taken_as_listed_and_told() {
    let listed = analyte("Nitrate", "cas = \"14797-55-8\"\nbasis = \"N\"\nunit = \"mg/L\"");
    let site = site_with(&listed);
    let text = "well,analyte,cas,date,result,unit,basis\n\
                OY-1,Nitrate,14797-55-8,2024-03-05,4,mg/L,\n\
                OY-1,Nitrate,14797-55-8,2024-03-06,4,mg/L,as N\n\
                OY-1,Nitrate,14797-55-8,2024-03-07,4,mg/L as N,\n\
                OY-1,Nitrate,14797-55-8,2024-03-08,18,mg/L,as NO3\n\
                OY-1,Nitrate,14797-55-8,2024-03-09,18,mg NO3/L,\n";
    let rows = rows_of(&read_text(&site, text), &site);
    assert!(rows[0].detail.contains("Nitrate without a basis, taken as N"), "{}", rows[0].detail);
    assert!(rows[1..].iter().all(|row| !row.detail.contains("taken as")), "{rows:?}");
    assert_eq!(values(&site, text), ["4", "4", "4", "other-basis", "other-basis"]);
}
