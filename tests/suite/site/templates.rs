//! Every template reads cleanly, and its limits are the ones that were read in the law.

use std::collections::BTreeMap;

use approx::assert_relative_eq;
use ebbwell::site::template::{ALL, named, text};
use ebbwell::site::{FlagThresholds, Listing, Settings, Site, read};
use ebbwell::terms::Unit;

use super::{site, told};

/// The figures, with the source of each, as they were read; see the file's header.
const FIGURES: &str = include_str!("limits.csv");

struct Figure {
    template: &'static str,
    analyte: &'static str,
    value: f64,
    unit: Unit,
}

fn figures() -> Vec<Figure> {
    let rows = FIGURES.lines().filter(|line| !line.starts_with('#'));
    rows.map(|row| {
        let cells: Vec<&str> = row.split(';').collect();
        assert_eq!(cells.len(), 5, "{row}");
        let unit = Unit::read(cells[3]).expect("a unit in the figures");
        let value = cells[2].parse().expect("a number in the figures");
        Figure { template: cells[0], analyte: cells[1], value, unit: unit.unit }
    })
    .collect()
}

fn from_template(name: &str) -> Site {
    Site::from_template(name).unwrap_or_else(|| panic!("{}", told(text(name).expect("a template"))))
}

#[test]
fn every_template_reads_without_a_problem_and_names_each_limits_law() {
    for template in &ALL {
        let site = site(template.text);
        assert_eq!(site.listing, Listing::Listed, "{}", template.name);
        assert!(site.analytes.len() >= 6, "{}", template.name);
        for analyte in &site.analytes {
            assert!(analyte.unit.is_some() || !analyte.limits.is_empty(), "{}", analyte.name);
            for limit in &analyte.limits {
                let source = limit.source.as_deref().expect("a source");
                assert!(source.starts_with("US federal"), "{}: {source}", analyte.name);
                assert!(!source.contains("from memory"), "{}: {source}", analyte.name);
            }
        }
    }
}

#[test]
fn every_limit_in_force_is_the_figure_that_was_read_and_no_other_stands() {
    let figures = figures();
    for figure in &figures {
        let site = from_template(figure.template);
        let analyte = site.analyte_named(figure.analyte).expect(figure.analyte);
        assert_eq!(analyte.limits.len(), 1, "{}", figure.analyte);
        let value = analyte.limits[0].value.in_unit(figure.unit).expect("one dimension");
        assert_relative_eq!(value, figure.value, max_relative = 1e-12);
    }
    for template in &ALL {
        let with_limit: Vec<String> = from_template(template.name)
            .analytes
            .into_iter()
            .filter(|analyte| !analyte.limits.is_empty())
            .map(|analyte| analyte.name)
            .collect();
        let read: Vec<&str> =
            figures.iter().filter(|f| f.template == template.name).map(|f| f.analyte).collect();
        assert_eq!(with_limit, read, "{}", template.name);
    }
}

#[test]
fn a_limit_on_a_sum_stands_at_the_reported_sum_and_at_no_member() {
    let members = [
        ("chlorinated-solvents", "Chloroform", "Total trihalomethanes"),
        ("radionuclides", "Radium-226", "Radium-226+228"),
        ("radionuclides", "Radium-228", "Radium-226+228"),
        ("fuel-release", "m,p-Xylene", "Total xylenes"),
        ("fuel-release", "o-Xylene", "Total xylenes"),
    ];
    for (template, member, sum) in members {
        let site = from_template(template);
        assert!(site.analyte_named(member).expect(member).limits.is_empty(), "{member}");
        assert_eq!(site.analyte_named(sum).expect(sum).limits.len(), 1, "{sum}");
    }
    let fluorinated = from_template("fluorinated");
    assert!(fluorinated.analyte_named("PFBS").expect("PFBS").limits.is_empty());
}

#[test]
fn every_line_of_another_regime_reads_when_it_takes_the_place_of_the_limit() {
    let mut read_lines = 0;
    for template in &ALL {
        let lines: Vec<&str> = template.text.lines().collect();
        let others = lines.iter().enumerate().filter(|(_, line)| line.starts_with("# limits = "));
        for (at, other) in others {
            let block = lines[..at].iter().rposition(|l| *l == "[[analyte]]").expect("a block");
            let mut text: Vec<&str> = lines[..block].to_vec();
            let own = lines[block..at].iter().filter(|line| !line.starts_with("limit"));
            text.extend(own);
            text.push(other.trim_start_matches("# "));
            text.extend(&lines[at + 1..]);
            let site = site(&text.join("\n"));
            let name = lines[block + 1].trim_start_matches("name = ").trim_matches('"');
            let limits = &site.analyte_named(name).expect(name).limits;
            assert!(!limits.is_empty() && limits.iter().all(|l| l.source.is_some()), "{name}");
            read_lines += 1;
        }
    }
    assert!(read_lines > 60, "{read_lines} lines of other regimes");
}

#[test]
fn blocks_that_stand_as_comments_read_too() {
    let mut blocks = 0;
    for template in &ALL {
        let mut lines = template.text.lines().skip_while(|line| *line != "[[analyte]]").peekable();
        let mut extra = String::new();
        while let Some(line) = lines.next() {
            if line == "# [[analyte]]" {
                blocks += 1;
                extra.push_str("[[analyte]]\n");
                while let Some(line) = lines.next_if(|line| line.starts_with("# ")) {
                    extra.push_str(&format!("{}\n", line.trim_start_matches("# ")));
                }
            }
        }
        site(&format!("{}\n{extra}", template.text));
    }
    assert_eq!(blocks, 4);
}

#[test]
fn the_settings_that_a_template_shows_are_the_defaults() {
    for template in &ALL {
        let shown = |line: &&str| line.starts_with("# ") && line.contains(" = ");
        let lines: Vec<&str> = template
            .text
            .lines()
            .skip_while(|line| *line != "[settings]")
            .take_while(|line| !line.starts_with("# [[results]]"))
            .filter(|line| line.starts_with('[') || shown(line))
            .filter(|line| !line.contains("goal-date") && !line.contains("why = "))
            .map(|line| line.trim_start_matches("# "))
            .collect();
        assert_eq!(lines.len(), 17, "{}", lines.join("\n"));
        let site = site(&format!("[site]\nname = \"x\"\n{}", lines.join("\n")));
        assert_eq!(site.settings, Settings::default(), "{}", template.name);
        assert_eq!(site.flags, FlagThresholds::default(), "{}", template.name);
    }
}

#[test]
fn a_template_takes_the_sites_name_whatever_is_in_it() {
    for name in ["Old depot", "The \"Works\"", "back\\slash", "two\nlines"] {
        for template in &ALL {
            let site = site(&template.for_site(name));
            assert_eq!(site.name, name.replace('\n', " "), "{}", template.name);
        }
    }
}

#[test]
fn bare_files_have_no_site_name_and_an_unknown_template_is_none() {
    for template in &ALL {
        let site = from_template(template.name);
        assert_eq!(site.name, "");
        assert!(site.is_named("any site"));
        assert_eq!(named(template.name), Some(template));
        assert_eq!(text(template.name), Some(template.text));
    }
    assert_eq!(Site::from_template("fuel"), None);
    let bare = Site::bare();
    assert_eq!((bare.name.as_str(), bare.listing), ("", Listing::Everything));
    assert_eq!(bare.settings, Settings::default());
    assert_eq!(bare.results.len(), 1);
}

#[test]
fn analytes_of_a_template_are_known_to_the_catalogue_by_one_number_and_name() {
    for template in &ALL {
        let site = read(template.text, "site.toml").expect("reads");
        let mut seen = BTreeMap::new();
        for (index, analyte) in site.analytes.iter().enumerate() {
            let entry = ebbwell::site::catalogue::by_name(&analyte.name).expect(&analyte.name);
            assert_eq!(entry.cas, analyte.cas.as_deref(), "{}", analyte.name);
            assert_eq!(seen.insert(entry.name, index), None);
            for name in entry.synonyms.iter().chain([&entry.name]) {
                let found = site.analyte_of(None, name).map(|(at, _)| at);
                assert_eq!(found, Some(index), "{name}");
            }
        }
    }
}
