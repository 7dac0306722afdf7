//! Checks that go across keys: analytes, wells, events, decisions, qualifiers, results.

use ebbwell::site::{
    Column, Decimal, DecisionKind, EventKind, Meaning, Restart, ResultsRule, SampleType,
    SerialDates, Sigma, TwoDigitYears,
};
use ebbwell::terms::Unit;

use super::{day, site_with, told_with};

/// Reads each block; each must give this one line, after its file, line and table.
fn each_is_told(cases: &[(&str, &str)]) {
    for (blocks, expected) in cases {
        let told = told_with(blocks);
        assert!(told.contains(expected), "{blocks}\n  {told}\n  {expected}");
        assert_eq!(told.lines().count(), 1, "{blocks}\n  {told}");
    }
}

#[test]
fn a_limit_carries_unit_basis_source_and_date() {
    let site = site_with(
        "[[analyte]]\nname = \"Nitrate as N\"\nunit = \"mg/L\"\nlimit = \"10 mg/L as N\"\n\
         limit-source = \"40 CFR 141.62(b)\"\nlimit-from = 1992-07-30\nfraction = \"total\"\n",
    );
    let analyte = &site.analytes[0];
    let limit = &analyte.limits[0];
    assert_eq!((limit.value.value.to_string(), limit.value.unit), ("10".into(), Unit::MG_PER_L));
    assert_eq!(limit.source.as_deref(), Some("40 CFR 141.62(b)"));
    assert_eq!(limit.from, Some(day("1992-07-30")));
    assert_eq!((analyte.basis.as_deref(), analyte.unit), (Some("N"), Some(Unit::MG_PER_L)));
}

#[test]
fn concentrations_that_cannot_be_a_limit_are_refused() {
    for text in [
        "5",
        "ug/L",
        "5ug/L",
        "0 ug/L",
        "-1 ug/L",
        "nan ug/L",
        "inf ug/L",
        "1e400 ug/L",
        "5 ppb",
        "5,0 ug/L",
        "<5 ug/L",
    ] {
        let told = told_with(&format!("[[analyte]]\nname = \"A\"\nlimit = \"{text}\"\n"));
        assert!(told.contains("it must be a positive number, a blank and a unit"), "{told}");
    }
}

#[test]
fn an_analytes_limits_agree_with_its_unit_basis_and_number() {
    let head = "[[analyte]]\nname = \"Benzene\"\n";
    let cases = [
        ("limit = \"5 ug/L\"\nlimits = [{ value = \"5 ug/L\" }]", "limits stands beside limit"),
        ("limit-source = \"x\"", "limit-source needs limit beside it"),
        ("limit-from = 2020-01-01", "limit-from needs limit beside it"),
        (
            "unit = \"pCi/L\"\nlimit = \"5 ug/L\"",
            "limit is in ug/L, which does not convert to pCi/L",
        ),
        (
            "limits = [{ value = \"5 ug/L\" }, { value = \"5 Bq/L\", from = 2020-01-01 }]",
            "limits[2].value is in Bq/L, which does not convert to ug/L",
        ),
        ("basis = \"NO3\"\nlimit = \"5 mg/L as N\"", "limit counts as N, and the analyte as NO3"),
        (
            "unit = \"mg/L as N\"\nlimit = \"5 mg/L as NO3\"",
            "limit counts as NO3, and the analyte as N",
        ),
        (
            "limits = [{ value = \"5 ug/L\" }, { value = \"6 ug/L\" }]",
            "limits[2].value a limit without a date stands twice, first on line 5",
        ),
        (
            "limits = [{ value = \"5 ug/L\", from = 2020-01-01 }, { value = \"6 ug/L\" }, \
             { value = \"7 ug/L\", from = 2020-01-01 }]",
            "limits[3].value a limit from 2020-01-01 stands twice, first on line 5",
        ),
        ("cas = \"71-43\"", "cas is \"71-43\"; it must be a CAS number"),
        ("cas = \"108-88-3\"", "cas is the CAS number of Toluene, and \"Benzene\" has 71-43-2"),
    ];
    for (keys, expected) in cases {
        each_is_told(&[(&format!("{head}{keys}\n"), expected)]);
    }
    // A check digit that fails is a reason to look, not to refuse.
    assert_eq!(told_with("[[analyte]]\nname = \"Local\"\ncas = \"56336-06-3\"\n"), "");
    let same = "[[analyte]]\nname = \"PFOS\"\naliases = [\"perfluorooctane sulfonic acid\", \
                \"perfluorooctanesulfonic acid\", \"PFOS\"]\n";
    assert_eq!(told_with(same), "", "two spellings of one name at one analyte");
}

#[test]
fn a_well_has_whole_coordinates_of_one_kind() {
    let head = "[[well]]\nname = \"MW-1\"\n";
    let cases = [
        ("latitude = 40", "latitude needs longitude beside it"),
        ("longitude = 40", "longitude needs latitude beside it"),
        ("x = 1", "x needs y beside it"),
        ("y = 1", "y needs x beside it"),
        ("latitude = 91\nlongitude = 0", "latitude is 91; it must be a number from -90 to 90"),
        ("latitude = 0\nlongitude = 181", "longitude is 181; it must be a number from -180 to 180"),
        ("latitude = 1\nlongitude = 1\nx = 1\ny = 1", "x stands beside latitude"),
    ];
    for (keys, expected) in cases {
        each_is_told(&[(&format!("{head}{keys}\n"), expected)]);
    }
}

#[test]
fn a_name_means_one_well_on_one_date() {
    let alias = |name: &str, dates: &str| {
        format!(
            "aliases = [{{ name = \"{name}\"{dates}, who = \"A\", when = 2026-01-01, why = \"x\" }}]\n"
        )
    };
    let two = |first: &str, second: &str| {
        format!("[[well]]\nname = \"A\"\n{first}[[well]]\nname = \"B\"\n{second}")
    };
    let early = ", to = 2020-12-31";
    let late = ", from = 2021-01-01";
    let overlapping = ", from = 2020-12-31";
    assert_eq!(told_with(&two(&alias("X", early), &alias("X", late))), "");
    assert_eq!(told_with(&two(&alias("B", early), "")), "", "another well's name for a while");
    each_is_told(&[
        (&two(&alias("X", early), &alias("X", overlapping)), "\"X\" stands twice, first on line 5"),
        (&two(&alias("X", ""), &alias("X", late)), "\"X\" stands twice, first on line 5"),
        (&two(&alias("B", ""), ""), "[[well]] aliases[1].name \"B\" stands twice, first on line 7"),
        (&two(&alias("X", ", from = 2022-01-01, to = 2021-01-01"), ""), "swap the two"),
    ]);
}

#[test]
fn references_to_unlisted_analytes_are_told_and_to_unlisted_wells_are_not() {
    let listed = "[[analyte]]\nname = \"Benzene\"\naliases = [\"B6\"]\n";
    let decision = "[[decision]]\nid = \"D\"\nkind = \"exclude\"\nwho = \"A\"\nwhen = 2026-01-01\n\
                    why = \"x\"\n";
    let missing = "names \"Benzen\", which is no listed analyte; the nearest is \"Benzene\"";
    each_is_told(&[
        (&format!("{listed}[[expected]]\nanalytes = [\"Benzen\"]\n"), missing),
        (&format!("{listed}{decision}analytes = [\"Benzen\"]\n"), missing),
        (
            &format!(
                "{listed}[[well]]\nname = \"W\"\nlimits = [{{ analyte = \"Benzen\", value = \"1 ug/L\" }}]\n"
            ),
            missing,
        ),
        (
            &format!("{listed}[[expected]]\nanalytes = [\"qqqq\"]\n"),
            "names \"qqqq\", which is no listed analyte; list it or correct the name",
        ),
    ]);
    let site = site_with(&format!(
        "{listed}{decision}analytes = [\"b6\", \"benzol\"]\nwells = [\"unlisted\"]\n"
    ));
    assert_eq!(site.decisions[0].analytes, ["Benzene", "Benzene"]);
    assert_eq!(site.decisions[0].wells, ["unlisted"]);
    // Nothing is listed, so nothing is unlisted.
    let bare = site_with("[[expected]]\nanalytes = [\"Anything\"]\nevery = 6\n");
    assert_eq!(bare.expected[0].analytes, ["Anything"]);
    assert_eq!(bare.expected[0].every_months, 6);
}

#[test]
fn a_well_named_by_its_alias_is_that_well() {
    let site = site_with(
        "[[well]]\nname = \"MW-1\"\naliases = [{ name = \"MW1\", who = \"A\", when = 2026-01-01, \
         why = \"x\" }]\n[[expected]]\nwells = [\"MW1\", \"MW-9\"]\n",
    );
    assert_eq!(site.expected[0].wells, ["MW-1", "MW-9"]);
    assert_eq!(site.expected[0].every_months, 3, "the length of a round");
}

#[test]
fn a_decision_never_stands_without_who_when_and_why() {
    let blocks = [
        ("[[decision]]\nid = \"D\"\nkind = \"exclude\"\nwells = [\"W\"]\n", "[[decision]]"),
        ("[[qualifier]]\ncode = \"B\"\nmeans = \"blank\"\n", "[[qualifier]]"),
        (
            "[[event]]\ndate = 2024-05-01\nwhat = \"dig\"\nrestart = true\nkind = \"dig\"\n",
            "[[event]]",
        ),
    ];
    let reasons = "who = \"A. Reader\"\nwhen = 2026-07-01\nwhy = \"the pump had failed\"\n";
    for (block, table) in blocks {
        let told = told_with(block);
        let lines: Vec<&str> = told.lines().collect();
        assert_eq!(lines.len(), 3, "{told}");
        for (line, key) in lines.iter().zip(["who", "when", "why"]) {
            assert!(line.contains(&format!("{table} {key} is missing; write {key} = ")), "{told}");
            assert!(line.ends_with("says who, when and why"), "{told}");
        }
        assert_eq!(told_with(&format!("{block}{reasons}")), "");
    }
    let alias = told_with("[[well]]\nname = \"W\"\naliases = [{ name = \"V\" }]\n");
    assert_eq!(alias.lines().count(), 3, "{alias}");
    let quiet = site_with("[[event]]\ndate = 2024-05-01\nwhat = \"dig\"\nrestart = false\n");
    assert_eq!(quiet.events[0].restart, Restart::No);
    assert_eq!(quiet.events[0].kind, EventKind::Other);
}

#[test]
fn events_are_in_order_of_date() {
    let site = site_with(
        "[[event]]\ndate = 2024-05-01\nwhat = \"b\"\nrestart = false\n\
         [[event]]\ndate = 2020-05-01\nwhat = \"a\"\nrestart = true\nwho = \"A\"\n\
         when = 2026-07-01\nwhy = \"soil dug out\"\nkind = \"dig\"\nwells = [\"MW-1\"]\n",
    );
    let what: Vec<&str> = site.events.iter().map(|event| event.what.as_str()).collect();
    assert_eq!(what, ["a", "b"]);
    assert_eq!((site.events[0].restart, site.events[0].kind), (Restart::Yes, EventKind::Dig));
    assert_eq!(site.events[0].why.as_deref(), Some("soil dug out"));
}

#[test]
fn a_decision_names_records_in_a_way_its_kind_can_use() {
    let decide = |keys: &str| {
        format!("[[decision]]\nid = \"D\"\nwho = \"A\"\nwhen = 2026-01-01\nwhy = \"x\"\n{keys}\n")
    };
    each_is_told(&[
        (&decide("kind = \"exclude\""), "[[decision]] names no records; give at least one of"),
        (&decide("kind = \"exclude\"\nrecords = [12]"), "records needs file beside it"),
        (
            &decide("kind = \"exclude\"\nfile = \"results/a.csv\"\nrecords = [0]"),
            "records[1] is 0; it must be a number from 1",
        ),
        (
            &decide("kind = \"exclude\"\nfile = \"results/a.csv\"\nrecords = [3, 3]"),
            "records[2] \"3\" stands twice",
        ),
        (
            &decide("kind = \"exclude\"\nfile = \"results/a.csv\"\nrecords = [-3]"),
            "records[1] is -3; it must be a whole number that is not negative",
        ),
        (
            &decide("kind = \"exclude\"\nfrom = 2025-01-01\nto = 2024-01-01"),
            "to is 2024-01-01, before its beginning on 2025-01-01",
        ),
        (&decide("kind = \"exclude\"\nfile = \"../a.csv\""), "must be inside the site folder"),
        (&decide("kind = \"window\"\nwells = [\"W\"]"), "kind needs from or to beside it"),
        (
            &decide("kind = \"window\"\nfrom = 2020-01-01\nsamples = [\"S\"]"),
            "samples says nothing beside kind = \"window\"",
        ),
        (&decide("kind = \"use-qualifier\"\nwells = [\"W\"]"), "kind needs means beside it"),
        (
            &decide("kind = \"exclude\"\nwells = [\"W\"]\nmeans = \"blank\""),
            "means says nothing beside a kind other than \"use-qualifier\"",
        ),
        (
            &format!(
                "{}{}",
                decide("kind = \"exclude\"\nwells = [\"W\"]"),
                decide("kind = \"exclude\"\nwells = [\"V\"]")
            ),
            "id \"D\" stands twice, first on line 4",
        ),
    ]);
    let site = site_with(&decide(
        "kind = \"use-qualifier\"\nmeans = \"estimated\"\nfile = \"results/a.csv\"\nrecords = [7, 9]",
    ));
    let decision = &site.decisions[0];
    assert_eq!(decision.kind, DecisionKind::UseQualifier);
    assert_eq!(decision.means, Some(Meaning::Estimated));
    assert_eq!(decision.records, [7, 9]);
}

#[test]
fn a_qualifier_is_one_code_or_one_condition() {
    let mean = |keys: &str| {
        format!(
            "[[qualifier]]\nmeans = \"blank\"\nwho = \"A\"\nwhen = 2026-01-01\nwhy = \"x\"\n{keys}\n"
        )
    };
    each_is_told(&[
        (&mean(""), "[[qualifier]] code is missing; write code = \"B\", or condition = \"…\""),
        (&mean("code = \"B\"\ncondition = \"Trace\""), "condition stands beside code"),
        (&mean("code = \"U J\""), "code is \"U J\"; it must be one code without blank"),
        (&mean("code = \"U,J\""), "code is \"U,J\"; it must be one code without blank"),
        (
            &format!("{}{}", mean("code = \"B\""), mean("code = \"B\"")),
            "code \"B\" stands twice, first on line 8",
        ),
        (&mean("code = \"B\"\nfiles = [\"/etc/*\"]"), "files[1] is \"/etc/*\"; it must be inside"),
    ]);
    let here = mean("code = \"B\"\nfiles = [\"results/old/*\"]");
    let site = site_with(&format!("{here}{}{}", mean("code = \"B\""), mean("condition = \"B\"")));
    assert_eq!(site.qualifiers.len(), 3);
    assert_eq!(site.qualifiers[0].files, ["results/old/*"]);
}

#[test]
fn a_results_block_is_read_whole() {
    let site = site_with(
        "[[results]]\nfiles = \"results/2019*.txt\"\nencoding = \"utf-16le\"\nseparator = \"\\t\"\n\
         columns = { result = \"Conc. (ug/L)\", detection_limit = \"MDL\" }\n\
         date-order = \"day-month-year\"\ntwo-digit-years = true\nserial-dates = \"1904\"\n\
         decimal = \"comma\"\nthousands = \".\"\nppb-in-water = true\nuncertainty = \"2-sigma\"\n\
         sample-types = { \"7\" = \"duplicate\" }\n",
    );
    let rule = &site.results[0];
    assert_eq!(rule.files, "results/2019*.txt");
    assert_eq!(rule.separator, Some(b'\t'));
    assert_eq!(rule.columns[&Column::Result], "Conc. (ug/L)");
    assert_eq!(rule.columns[&Column::DetectionLimit], "MDL");
    assert_eq!(rule.two_digit_years, TwoDigitYears::Read);
    assert_eq!(rule.serial_dates, SerialDates::From1904);
    assert_eq!((rule.decimal, rule.thousands), (Decimal::Comma, Some('.')));
    assert_eq!((rule.ppb_in_water, rule.uncertainty), (true, Some(Sigma::Two)));
    assert_eq!(rule.sample_types["7"], SampleType::Duplicate);
    assert_eq!(site_with("").results, [ResultsRule::plain()]);
}

#[test]
fn patterns_and_marks_that_cannot_work_are_refused() {
    let rule = |keys: &str| format!("[[results]]\nfiles = \"results/*.csv\"\n{keys}\n");
    let files = |files: &str| format!("[[results]]\nfiles = '{files}'\n");
    each_is_told(&[
        (
            &files("../other/*.csv"),
            "files is \"../other/*.csv\"; it must be inside the site folder",
        ),
        (&files("/data/*.csv"), "must be inside the site folder"),
        (&files("C:/data/*.csv"), "must be inside the site folder"),
        (&files("results\\*.csv"), "must be inside the site folder"),
        (&files("results/**.csv"), "must be a pattern with"),
        (&files("results/[ab.csv"), "must be a pattern with"),
        (&rule("separator = \"ab\""), "separator is \"ab\"; it must be one character in quotes"),
        (&rule("separator = \"x\""), "separator is \"x\"; it must be a comma, semicolon"),
        (&rule("separator = \".\""), "separator is \".\"; it must be a comma, semicolon"),
        (&rule("thousands = \".\"\ndecimal = \"point\""), "thousands is \".\""),
        (&rule("thousands = \",\"\ndecimal = \"comma\""), "thousands is \",\""),
        (&rule("thousands = \"0\""), "thousands is \"0\"; it must be a comma, point, blank"),
    ]);
    assert!(told_with(&files("results/**/*.csv")).is_empty());
}

#[test]
fn dates_of_the_sites_monitoring_are_in_order() {
    let site = site_with("active-from = 2001-01-01\nactive-to = 2030-12-31\n");
    assert_eq!(site.active_from, Some(day("2001-01-01")));
    assert_eq!(site.active_to, Some(day("2030-12-31")));
    each_is_told(&[(
        "active-from = 2030-12-31\nactive-to = 2001-01-01\n",
        "[site] active-to is 2001-01-01, before its beginning on 2030-12-31",
    )]);
}
