//! What is told of a site file: everything at once, each on its line, with a next step.

use ebbwell::site::{ProblemKind, read};

use super::{told, told_with};

#[test]
fn ten_mistakes_are_told_at_once_each_on_its_line() {
    let text = "\
[site]
nmae = \"x\"

[settings]
confidence = 90
goal-date = \"2040-12-31\"
round = \"weekly\"
flat-margin = nan
duplicates = \"average\"

[[analyte]]
name = \"Benzene\"
limit = \"5 furlongs\"

[[well]]
name = \"MW-1\"
limits = [{ analyte = \"Benzen\", value = \"5 ug/L\" }]

[[decision]]
id = \"D1\"
kind = \"exclude\"
wells = [\"MW-1\"]
who = \"A. Reader\"
why = \"pump failed\"

[vapour]
temperature = \"15 C\"
";
    let problems = read(text, "site.toml").expect_err("mistakes");
    let found: Vec<(Option<usize>, &str)> =
        problems.iter().map(|problem| (problem.line, problem.key.as_str())).collect();
    assert_eq!(
        found,
        [
            (Some(1), "[site] name"),
            (Some(2), "[site] nmae"),
            (Some(5), "[settings] confidence"),
            (Some(6), "[settings] goal-date"),
            (Some(7), "[settings] round"),
            (Some(8), "[settings] flat-margin"),
            (Some(9), "[settings] duplicates"),
            (Some(13), "[[analyte]] limit"),
            (Some(17), "[[well]] limits[1].analyte"),
            (Some(19), "[[decision]] when"),
            (Some(26), "[vapour]"),
        ]
    );
}

#[test]
fn a_message_names_file_line_key_and_the_next_step() {
    assert_eq!(
        told_with("[settings]\nconfidnce = 0.95\n"),
        "site.toml:4: [settings] confidnce is not a key; the nearest is confidence"
    );
    let problems = read("", "sites/old depot/site.toml").expect_err("no site");
    assert_eq!(
        problems[0].to_string(),
        "sites/old depot/site.toml: [site] is missing; \
         write [site], and below it name = \"Former depot\""
    );
}

#[test]
fn a_key_that_resembles_none_is_answered_with_all_of_them() {
    assert_eq!(
        told_with("[flags]\nqqqq = 1\n"),
        "site.toml:4: [flags] qqqq is not a key; the keys here are short-record-years, \
         mostly-non-detects, estimated-results, duplicates-rpd"
    );
    assert!(told_with("[wells]\n").contains("wells is not a key; the nearest is well"));
}

#[test]
fn a_nested_key_is_shown_with_the_keys_around_it() {
    let text = "[settings]\nrate-needs = { dates = 4, detect = 3 }\n";
    let expected = "[settings] rate-needs.detect is not a key; the nearest is detects";
    assert_eq!(told_with(text), format!("site.toml:4: {expected}"));
    let text = "[settings.rate-needs]\ndetect = 3\n";
    assert_eq!(told_with(text), format!("site.toml:4: {expected}"));
}

#[test]
fn a_column_of_ours_that_does_not_exist_names_the_nearest() {
    let text = "[[results]]\nfiles = \"*.csv\"\ncolumns = { detection-limit = \"MDL\" }\n";
    assert!(told_with(text).ends_with(
        "[[results]] columns.detection-limit is not a key; the nearest is detection_limit"
    ));
}

#[test]
fn an_unknown_word_is_answered_with_the_words_allowed() {
    assert_eq!(
        told_with("[settings]\nround = \"weekly\"\n"),
        "site.toml:4: [settings] round is \"weekly\"; \
         its words are \"month\", \"quarter\", \"half-year\", \"year\""
    );
    let unit = told_with("[[analyte]]\nname = \"PCE\"\nunit = \"ppb\"\n");
    assert!(unit.contains("unit is \"ppb\"; its words are \"pg/L\", \"ng/L\", \"ug/L\""), "{unit}");
}

#[test]
fn values_of_another_type_say_what_is_wanted_and_what_was_found() {
    let cases = [
        ("[settings]\nconfidence = \"0.9\"", "confidence is text; it must be a number"),
        ("[settings]\nround = 3", "round is a whole number; it must be a word in quotes"),
        (
            "[settings]\nrate-needs = 4",
            "rate-needs is a whole number; it must be a table in braces",
        ),
        (
            "[settings]\ngoal-date = \"2040-12-31\"",
            "goal-date is text; it must be a date without quotes and without a time, \
             such as 2030-12-31",
        ),
        ("[settings]\ngoal-date = 2040-12-31T00:00:00", "goal-date is a date or time"),
        ("settings = 5", "[settings] is a whole number; it must be a table, its keys on lines"),
        ("[well]\nname = \"MW-1\"", "[[well]] is a table; it must be written in blocks"),
        ("[[settings]]", "[settings] is a list; it must be a table, its keys on lines"),
        ("[[analyte]]\nname = [\"PCE\"]", "name is a list; it must be text in quotes"),
        ("[[expected]]\nwells = \"MW-1\"", "wells is text; it must be a list in square brackets"),
        ("[[expected]]\nwells = [1]", "wells[1] is a whole number; it must be text in quotes"),
        ("[[expected]]\nevery = 1.5", "every is a number with a fraction; it must be a whole"),
        ("[[results]]\nfiles = \"*\"\nppb-in-water = 1", "must be true or false, without quotes"),
        ("[[analyte]]\nname = \"PCE\"\nlimit = 5", "it must be a concentration in quotes"),
    ];
    for (blocks, expected) in cases {
        // A key outside every table goes before the first header.
        let text = if blocks.starts_with('[') {
            format!("[site]\nname = \"x\"\n{blocks}\n")
        } else {
            format!("{blocks}\n[site]\nname = \"x\"\n")
        };
        let told = told(&text);
        assert!(told.contains(expected), "{blocks}\n{told}");
        assert_eq!(told.lines().count(), 1, "{told}");
    }
}

#[test]
fn what_stands_twice_is_told_with_the_first_line_where_it_is_known() {
    let cases = [
        ("authority = \"a\"\nauthority = \"b\"", "site.toml:4: [site] authority stands twice"),
        ("[flags]\n[flags]", "site.toml:4: [flags] stands twice"),
        (
            "[[analyte]]\nname = \"PCE\"\n[[analyte]]\nname = \"pce\"",
            "site.toml:6: [[analyte]] name \"pce\" stands twice, first on line 4",
        ),
        (
            "[[analyte]]\nname = \"PCE\"\n[[analyte]]\nname = \"Q\"\naliases = [\"R\", \"P-CE\"]",
            "site.toml:7: [[analyte]] aliases[2] \"P-CE\" stands twice, first on line 4",
        ),
        (
            "[[analyte]]\nname = \"Q\"\ncas = \"71-43-2\"\n[[analyte]]\nname = \"R\"\ncas = \"71-43-2.\"",
            "site.toml:8: [[analyte]] cas \"71-43-2.\" stands twice, first on line 5",
        ),
        (
            "[[well]]\nname = \"MW-1\"\n[[well]]\nname = \" MW-1\"",
            "site.toml:6: [[well]] name \"MW-1\" stands twice, first on line 4",
        ),
        (
            "[[results]]\nfiles = \"*.csv\"\n[[results]]\nfiles = \"*.csv\"",
            "site.toml:6: [[results]] files \"*.csv\" stands twice, first on line 4",
        ),
        (
            "[[expected]]\nwells = [\"MW-1\", \"MW-1\"]",
            "site.toml:4: [[expected]] wells[2] \"MW-1\" stands twice, first on line 4",
        ),
    ];
    for (blocks, expected) in cases {
        let told = told_with(blocks);
        assert_eq!(told, format!("{expected}; keep one of the two"), "{blocks}");
    }
    let wells = told_with("[[well]]\nname = \"001\"\n[[well]]\nname = \"1\"\n");
    assert_eq!(wells, "", "well names are never folded");
}

#[test]
fn needed_keys_that_are_absent_show_how_they_are_written() {
    let cases = [
        ("[[results]]", "files"),
        ("[[analyte]]", "name"),
        ("[[analyte]]\nname = \"A\"\nlimits = [{ source = \"x\" }]", "limits[1].value"),
        ("[[well]]", "name"),
        ("[[event]]\nwhat = \"x\"\nrestart = false", "date"),
        ("[[event]]\ndate = 2024-05-01\nrestart = false", "what"),
        ("[[event]]\ndate = 2024-05-01\nwhat = \"x\"", "restart"),
    ];
    for (blocks, key) in cases {
        let told = told_with(blocks);
        let name = key.rsplit('.').next().unwrap_or(key);
        assert!(told.contains(&format!("{key} is missing; write {name} = ")), "{told}");
        assert_eq!(told.lines().count(), 1, "{told}");
    }
}

#[test]
fn empty_texts_and_lists_and_control_characters_are_refused() {
    for (blocks, expected) in [
        ("authority = \"  \"", "[site] authority is empty; write a text"),
        ("aliases = []", "[site] aliases is empty; name at least one or leave the key out"),
        ("authority = \"a\\u0007b\"", "[site] authority is \"a\\u{7}b\"; it must be without"),
        ("authority = \"a\\u009bb\"", "[site] authority is \"a\\u{9b}b\"; it must be without"),
    ] {
        let told = told_with(blocks);
        assert!(told.contains(expected), "{told}");
    }
}

#[test]
fn after_a_syntax_error_what_only_follows_from_it_is_not_told() {
    // The broken line held the name: that the name is missing only follows.
    let told_once = told("[site]\nname \"x\"\n\n[settings]\nconfidnce = 1\n");
    let lines: Vec<&str> = told_once.lines().collect();
    assert_eq!(lines.len(), 2, "{told_once}");
    assert!(lines[0].starts_with("site.toml:2: [site] not readable here: "), "{told_once}");
    assert!(lines[1].contains("confidnce is not a key"), "{told_once}");
    // A broken header: its keys belong to no table.
    let header = told("[site\nname = \"x\"\n[settings]\nconfidnce = 1\n");
    assert_eq!(header.lines().count(), 2, "{header}");
    assert!(header.starts_with("site.toml:1: not readable here: unclosed table"), "{header}");
    // The block that lists the analyte is broken, so a reference to it is not judged.
    let reference = told_with(
        "[[analyte]]\nname = \"PCE\"\n[[analyte]]\nname \"TCE\"\n[[expected]]\nanalytes = [\"TCE\"]\n",
    );
    assert_eq!(reference.lines().count(), 1, "{reference}");
    // Other blocks are judged in full.
    let other = told("[site]\nname = \"x\"\n[settings]\nround \"x\"\n[[well]]\nrole = \"plume\"\n");
    assert!(other.contains("[[well]] name is missing"), "{other}");
}

#[test]
fn several_lines_that_cannot_be_read_are_told_at_once() {
    let text = "\
[site]
name = \"x
aliases = [\"a\", \"b\"
[settings]
confidence 0.9
horizon-years = 1e
round = quarter
[[well]]
name = \"MW-1\"
limits = [
  { analyte = \"A\", value = \"5 ug/L\"
]
rol = \"plume\"
[[well]
name = \"MW-2\"
";
    let told = told(text);
    let lines: Vec<&str> = told.lines().collect();
    let starts = [
        "site.toml:2: [site] not readable here: ",
        "site.toml:3: [site] not readable here: ",
        "site.toml:5: [settings] not readable here: ",
        "site.toml:6: [settings] not readable here: ",
        "site.toml:7: [settings] not readable here: ",
        "site.toml:10: [[well]] not readable here: ",
        "site.toml:13: [[well]] rol is not a key; the nearest is role",
        "site.toml:14: not readable here: ",
    ];
    assert_eq!(lines.len(), starts.len(), "{told}");
    for (line, start) in lines.iter().zip(starts) {
        assert!(line.starts_with(start), "{line}\n{start}");
    }
}

#[test]
fn dates_that_do_not_exist_or_lie_far_off_are_refused() {
    let impossible = told_with("[settings]\ngoal-date = 2041-02-29\n");
    assert!(
        impossible.starts_with("site.toml:4: [settings] not readable here: invalid date"),
        "{impossible}"
    );
    for date in ["0024-12-31", "1899-12-31", "3000-01-01"] {
        let told = told_with(&format!("[settings]\ngoal-date = {date}\n"));
        assert!(told.contains(&format!("is {date}; it must be a date of the years")), "{told}");
        assert_eq!(told.lines().count(), 1, "{told}");
    }
}

#[test]
fn work_that_is_not_built_is_an_error_that_says_so() {
    let cases = [
        "[[flowpath]]\nname = \"axis\"\nwells = [{ well = \"MW-1\", distance-m = 0 }]\n\
         gradient = { low = 0.001, high = 0.002 }\nporosity = 0.3",
        "[[chain]]\nname = \"ethenes\"\nmembers = [\"PCE\", \"TCE\"]\nyields = [1]",
        "[vapour]\ntemperature = \"15 C\"",
        "[attainment]\nstatistic = \"each result\"\nrounds = 8\ncitation = \"Order 7\"",
    ];
    for blocks in cases {
        let text = format!("[site]\nname = \"x\"\n{blocks}\n");
        let problems = read(&text, "site.toml").expect_err(blocks);
        assert_eq!(problems.len(), 1, "{blocks}\n{}", told(&text));
        assert_eq!(problems[0].kind, ProblemKind::NotBuilt, "{blocks}");
        assert!(problems[0].to_string().contains("not built yet"), "{blocks}");
    }
    for built in ["layout = \"long\"", "layout = \"cross-tab\"\nsheet = \"Data\""] {
        assert_eq!(told_with(&format!("[[results]]\nfiles = \"*\"\n{built}\n")), "");
    }
}

#[test]
fn lines_are_right_whatever_ends_them() {
    let text = "[settings]\nconfidnce = 1\n";
    let plain = told_with(text);
    let windows = told(&format!("[site]\nname = \"Old depot\"\n{text}").replace('\n', "\r\n"));
    let marked = told(&format!("\u{feff}[site]\nname = \"Old depot\"\n{text}"));
    assert!(plain.starts_with("site.toml:4: "), "{plain}");
    assert_eq!(windows, plain);
    assert_eq!(marked, plain);
    let broken = told("\u{feff}[site]\nname \"x\"\n");
    assert!(broken.starts_with("site.toml:2: [site] not readable here"), "{broken}");
}
