//! Defaults, and a reason for each statistical setting off its default.

use ebbwell::site::{
    DateNeeds, Duplicates, FlagThresholds, NonDetects, OffDefault, RateNeeds, RoundLength, SameDay,
};

use super::{day, site_with, told_with};

#[test]
fn a_site_of_a_name_alone_has_the_defaults_of_the_design() {
    let site = site_with("");
    let settings = site.settings;
    assert_eq!(settings.confidence.to_string(), "0.9");
    assert_eq!(settings.goal_date, None);
    assert_eq!(settings.horizon_years.to_string(), "30");
    assert_eq!(settings.stale_after_years.to_string(), "1.5");
    assert_eq!(settings.flat_margin.to_string(), "0.0347");
    assert_eq!(settings.round, RoundLength::Quarter);
    assert_eq!(settings.round_grace_days, 14);
    assert_eq!(settings.rate_needs, RateNeeds { dates: 4, detects: 3 });
    assert_eq!(settings.date_needs, DateNeeds { dates: 8, years: 1.5, detects: 5 });
    assert_eq!(settings.same_day, SameDay::Mean);
    assert_eq!(settings.duplicates, Duplicates::Primary);
    assert_eq!(settings.non_detects, NonDetects::Censored);
    assert_eq!(settings.off_default, []);
    let thresholds = FlagThresholds {
        short_record_years: 4.0,
        mostly_non_detects: 0.5,
        estimated_results: 0.25,
        duplicates_rpd: 30.0,
    };
    assert_eq!(site.flags, thresholds);
}

/// Every statistical key: how it stands in the file, and the default that is told.
const STATISTICAL: [(&str, &str, &str, &str); 14] = [
    ("settings", "confidence", "0.95", "0.9"),
    ("settings", "horizon-years", "50", "30"),
    ("settings", "stale-after-years", "2.5", "1.5"),
    ("settings", "flat-margin", "0.05", "0.0347"),
    ("settings", "round-grace-days", "7", "14"),
    ("settings", "rate-needs", "{ dates = 6 }", "dates 4, detects 3"),
    ("settings", "date-needs", "{ years = 2 }", "dates 8, years 1.5, detects 5"),
    ("settings", "same-day", "\"highest\"", "mean"),
    ("settings", "duplicates", "\"average\"", "primary"),
    ("settings", "non-detects", "\"at-half\"", "censored"),
    ("flags", "short-record-years", "3", "4"),
    ("flags", "mostly-non-detects", "0.6", "0.5"),
    ("flags", "estimated-results", "0.5", "0.25"),
    ("flags", "duplicates-rpd", "20", "30"),
];

#[test]
fn a_statistical_setting_off_its_default_without_a_reason_is_told() {
    for (table, key, value, was) in STATISTICAL {
        let told = told_with(&format!("[{table}]\n{key} = {value}\n"));
        let expected = format!("site.toml:4: [{table}] {key} is ");
        assert!(told.starts_with(&expected), "{told}");
        let next = format!("in place of {was} and no reason is given; add {key} = \"…\" to why");
        assert!(told.contains(&next), "{told}");
    }
}

#[test]
fn a_reason_lets_it_stand_and_is_kept() {
    let mut blocks = String::from("[settings]\nwhy = { ");
    for (_, key, ..) in STATISTICAL {
        blocks.push_str(&format!("{key} = \"because of {key}\", "));
    }
    blocks.push_str("}\n");
    for table in ["settings", "flags"] {
        if table == "flags" {
            blocks.push_str("[flags]\n");
        }
        for (_, key, value, _) in STATISTICAL.iter().filter(|row| row.0 == table) {
            blocks.push_str(&format!("{key} = {value}\n"));
        }
    }
    let off = site_with(&blocks).settings.off_default;
    let keys: Vec<&str> = off.iter().map(|off| off.key.as_str()).collect();
    let all: Vec<&str> = STATISTICAL.iter().map(|row| row.1).collect();
    assert_eq!(keys, all);
    let first = OffDefault {
        key: "confidence".into(),
        was: "0.9".into(),
        is: "0.95".into(),
        why: "because of confidence".into(),
    };
    assert_eq!(off[0], first);
    assert_eq!(off[6].is, "dates 8, years 2, detects 5");
}

#[test]
fn goal_date_and_round_need_no_reason_and_nor_does_a_default_written_out() {
    let site = site_with(
        "[settings]\ngoal-date = 2040-12-31\nround = \"half-year\"\nconfidence = 0.9\n\
         rate-needs = { dates = 4, detects = 3 }\n[flags]\nduplicates-rpd = 30\n",
    );
    assert_eq!(site.settings.goal_date, Some(day("2040-12-31")));
    assert_eq!(site.settings.round, RoundLength::HalfYear);
    assert_eq!(site.settings.off_default, []);
}

#[test]
fn a_reason_for_a_setting_that_does_not_exist_is_told() {
    assert_eq!(
        told_with("[settings]\nwhy = { confidense = \"x\" }\n"),
        "site.toml:4: [settings] why.confidense is not a key; the nearest is confidence"
    );
    assert_eq!(told_with("[settings]\nwhy = { round = \"two visits a year\" }\n"), "");
}

#[test]
fn settings_out_of_range_say_the_range() {
    let cases = [
        ("settings", "confidence", "90", "from 0.5 to 0.999"),
        ("settings", "confidence", "1", "from 0.5 to 0.999"),
        ("settings", "horizon-years", "0", "from 1 to 1000"),
        ("settings", "stale-after-years", "-1", "from 0.1 to 100"),
        ("settings", "flat-margin", "0", "from 0.0001 to 10"),
        ("settings", "round-grace-days", "16", "from 0 to 15"),
        ("settings", "rate-needs", "{ dates = 2 }", "from 3 to 1000"),
        ("settings", "date-needs", "{ years = -1 }", "from 0 to 100"),
        ("flags", "mostly-non-detects", "50", "from 0 to 1"),
        ("flags", "duplicates-rpd", "201", "from 0 to 200"),
    ];
    for (table, key, value, range) in cases {
        let told = told_with(&format!("[{table}]\n{key} = {value}\n"));
        assert!(told.contains(&format!("it must be a number {range}")), "{told}");
    }
}

#[test]
fn grace_is_at_most_a_sixth_of_a_round_and_so_is_its_default() {
    for (round, default, most) in
        [("month", 5, 5), ("quarter", 14, 15), ("half-year", 14, 30), ("year", 14, 60)]
    {
        let head = format!("[settings]\nround = \"{round}\"\n");
        assert_eq!(site_with(&head).settings.round_grace_days, default, "{round}");
        let over = told_with(&format!("{head}round-grace-days = {}\n", most + 1));
        assert!(over.contains(&format!("from 0 to {most}")), "{over}");
        let why = "why = { round-grace-days = \"x\" }";
        let at = site_with(&format!("{head}round-grace-days = {most}\n{why}\n"));
        assert_eq!(at.settings.round_grace_days, most);
    }
}
