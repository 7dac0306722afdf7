//! What later stages ask of a site.

use ebbwell::site::{JoinedBy, Listing, Role, Site, WellMatch};

use super::{day, site_with};

const LIMITS: &str = r#"
[settings]
goal-date = 2040-12-31

[[analyte]]
name = "Lead"
limits = [
    { value = "5 ug/L", from = 2036-01-12, source = "later" },
    { value = "15 ug/L", source = "always" },
    { value = "10 ug/L", from = 2027-11-01, source = "soon" },
]

[[analyte]]
name = "Copper"
limit = "1300 ug/L"
limit-from = 2000-01-01
goal-date = 2035-06-30

[[analyte]]
name = "Zinc"

[[well]]
name = "MW-1"
limits = [
    { analyte = "copper", value = "1 mg/L", from = 2030-01-01, source = "order" },
    { analyte = "Lead", value = "3 ug/L", from = 2031-01-01 },
    { analyte = "Lead", value = "7 ug/L" },
]
goal-date = 2032-01-31

[[well]]
name = "BG-1"
role = "background"
"#;

fn limit(site: &Site, well: &str, analyte: &str, on: &str) -> Option<String> {
    let limit = site.limit_for(well, analyte, day(on))?;
    Some(format!("{} {}", limit.value.value, limit.value.unit))
}

#[test]
fn the_limit_in_force_is_the_last_that_has_begun() {
    let site = site_with(LIMITS);
    for (on, expected) in [
        ("2020-01-01", "15 ug/L"),
        ("2027-10-31", "15 ug/L"),
        ("2027-11-01", "10 ug/L"),
        ("2036-01-11", "10 ug/L"),
        ("2036-01-12", "5 ug/L"),
    ] {
        assert_eq!(limit(&site, "MW-2", "Lead", on).as_deref(), Some(expected), "{on}");
    }
    assert_eq!(limit(&site, "MW-2", "Zinc", "2020-01-01"), None);
    assert_eq!(limit(&site, "MW-2", "Nickel", "2020-01-01"), None);
}

#[test]
fn before_the_first_has_begun_the_first_stands() {
    let site = site_with(LIMITS);
    let before = limit(&site, "MW-2", "Copper", "1999-12-31");
    assert_eq!(before.as_deref(), Some("1300 ug/L"));
    let site = site_with(
        "[[well]]\nname = \"MW-1\"\nlimits = [{ analyte = \"PCE\", value = \"9 ug/L\", \
         from = 2030-01-01 }]\n",
    );
    assert_eq!(limit(&site, "MW-1", "PCE", "2020-01-01").as_deref(), Some("9 ug/L"));
}

#[test]
fn a_wells_own_limit_goes_before_the_analytes_once_it_has_begun() {
    let site = site_with(LIMITS);
    assert_eq!(limit(&site, "MW-1", "Lead", "2030-01-01").as_deref(), Some("7 ug/L"));
    assert_eq!(limit(&site, "MW-1", "Lead", "2031-01-01").as_deref(), Some("3 ug/L"));
    assert_eq!(limit(&site, "MW-1", "Copper", "2029-12-31").as_deref(), Some("1300 ug/L"));
    assert_eq!(limit(&site, "MW-1", "Copper", "2030-01-01").as_deref(), Some("1 mg/L"));
    assert_eq!(limit(&site, "BG-1", "Copper", "2030-01-01").as_deref(), Some("1300 ug/L"));
}

#[test]
fn the_goal_is_the_wells_then_the_analytes_then_the_sites() {
    let site = site_with(LIMITS);
    assert_eq!(site.goal_for("MW-1", "Copper"), Some(day("2032-01-31")));
    assert_eq!(site.goal_for("BG-1", "Copper"), Some(day("2035-06-30")));
    assert_eq!(site.goal_for("unlisted", "Lead"), Some(day("2040-12-31")));
    assert_eq!(Site::bare().goal_for("MW-1", "Copper"), None);
}

#[test]
fn a_well_is_in_the_plume_unless_the_site_file_says_otherwise() {
    let site = site_with(LIMITS);
    assert_eq!(site.role_of("BG-1"), Role::Background);
    assert_eq!(site.role_of("MW-1"), Role::Plume);
    assert_eq!(site.role_of("unlisted"), Role::Plume);
}

const ALIASES: &str = r#"
[[well]]
name = "MW-1"
aliases = [
    { name = "MW1", who = "A", when = 2026-01-01, why = "laboratory spelling" },
    { name = "MW-2", from = 2021-04-01, to = 2021-06-30, who = "A", when = 2026-01-01, why = "labels swapped" },
]
[[well]]
name = "MW-2"
aliases = [
    { name = "MW-1", from = 2021-04-01, to = 2021-06-30, who = "A", when = 2026-01-01, why = "labels swapped" },
]
"#;

fn well(site: &Site, written: &str, on: Option<&str>) -> String {
    match site.well_of(written, on.map(day)) {
        WellMatch::Listed(well) => format!("listed {}", well.name),
        WellMatch::Alias(well, alias) => format!("{} as {}", well.name, alias.name),
        WellMatch::Unlisted => "unlisted".to_owned(),
    }
}

#[test]
fn an_alias_means_its_well_within_its_dates_and_no_longer() {
    let site = site_with(ALIASES);
    assert_eq!(well(&site, "MW1", Some("2020-01-01")), "MW-1 as MW1");
    assert_eq!(well(&site, "MW-2", Some("2021-03-31")), "listed MW-2");
    assert_eq!(well(&site, "MW-2", Some("2021-04-01")), "MW-1 as MW-2");
    assert_eq!(well(&site, "MW-2", Some("2021-06-30")), "MW-1 as MW-2");
    assert_eq!(well(&site, "MW-1", Some("2021-05-01")), "MW-2 as MW-1");
    assert_eq!(well(&site, "MW-2", Some("2021-07-01")), "listed MW-2");
}

#[test]
fn a_well_name_is_trimmed_and_never_otherwise_changed() {
    let site = site_with(ALIASES);
    assert_eq!(well(&site, "  MW-1 ", None), "listed MW-1");
    assert_eq!(well(&site, "MW1", None), "MW-1 as MW1");
    for other in ["mw-1", "MW 1", "MW-01", "MW-1R", ""] {
        assert_eq!(well(&site, other, Some("2020-01-01")), "unlisted", "{other}");
    }
}

const ANALYTES: &str = r#"
[[analyte]]
name = "cis-1,2-DCE"
cas = "156-59-2"
aliases = ["c12DCE"]
[[analyte]]
name = "Perc"
cas = "127-18-4"
[[analyte]]
name = "Radium-226"
[[analyte]]
name = "Local mixture"
"#;

#[test]
fn a_result_joins_by_cas_number_first_then_by_name_then_by_the_catalogue() {
    let site = site_with(ANALYTES);
    let cases = [
        (Some("156-59-2"), "anything", Some((0, JoinedBy::Cas))),
        (Some(" 127-18-4. "), "cis-1,2-DCE", Some((1, JoinedBy::Cas))),
        (Some(""), "CIS 1,2 dce", Some((0, JoinedBy::Name))),
        (None, "C12-DCE", Some((0, JoinedBy::Name))),
        (Some("79-01-6"), "local mixture", Some((3, JoinedBy::Name))),
        (None, "cis-1,2-Dichloroethylene", Some((0, JoinedBy::Synonym))),
        (None, "PCE", Some((1, JoinedBy::Synonym))),
        (None, "Ra-226", Some((2, JoinedBy::Synonym))),
        (None, "trans-1,2-dichloroethylene", None),
        (None, "", None),
    ];
    for (cas, name, expected) in cases {
        assert_eq!(site.analyte_of(cas, name), expected, "{cas:?} {name}");
    }
}

#[test]
fn half_lives_come_with_the_listed_nuclide() {
    let site = site_with(ANALYTES);
    let half_lives: Vec<Option<f64>> = site.analytes.iter().map(|a| a.half_life_years).collect();
    assert_eq!(half_lives, [None, None, Some(1600.0), None]);
}

#[test]
fn without_a_listed_analyte_everything_is_fitted() {
    assert_eq!(site_with("").listing, Listing::Everything);
    assert!(!site_with("").sets_unlisted_aside());
    assert!(site_with(ANALYTES).sets_unlisted_aside());
}

#[test]
fn a_site_is_known_by_its_name_and_aliases() {
    let site = site_with("aliases = [\"Quarry\"]\n");
    for (name, known) in [("old DEPOT", true), ("quarry", true), ("Old depot 2", false)] {
        assert_eq!(site.is_named(name), known, "{name}");
    }
}
