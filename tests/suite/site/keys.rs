//! The keys of the design, of the reader and of the schema are the same.

use std::collections::BTreeSet;

use ebbwell::site::{Column, Setting, SiteFile, read, schema};
use serde_json::Value;

/// The documented keys: the table as it is written, and its keys; `>` goes into a nested table.
/// `means` of a decision says what `use-qualifier` means.
const DOCUMENTED: [(&str, &str); 22] = [
    ("[site]", "name authority citation aliases active-from active-to"),
    (
        "[settings]",
        "confidence goal-date horizon-years stale-after-years flat-margin round round-grace-days \
         rate-needs date-needs same-day duplicates non-detects limit-order why",
    ),
    ("[settings]>rate-needs", "dates detects"),
    ("[settings]>date-needs", "dates years detects"),
    ("[flags]", "short-record-years mostly-non-detects estimated-results duplicates-rpd"),
    (
        "[[results]]",
        "files layout sheet encoding separator columns date-order two-digit-years serial-dates \
         decimal thousands ppb-in-water uncertainty sample-types validation",
    ),
    (
        "[[analyte]]",
        "name cas aliases unit basis fraction medium limit limit-source limit-from limits goal-date",
    ),
    ("[[analyte]]>limits[]", "value from source"),
    ("[[well]]", "name role latitude longitude x y aliases depths limits goal-date"),
    ("[[well]]>aliases[]", "name from to who when why"),
    ("[[well]]>limits[]", "analyte value from source"),
    ("[[expected]]", "wells analytes every"),
    ("[[event]]", "date what restart wells kind who when why"),
    ("[[decision]]", "id kind means wells analytes from to samples file records who when why"),
    ("[[qualifier]]", "code condition means files who when why"),
    (
        "[[flowpath]]",
        "name wells seepage-velocity conductivity gradient porosity retardation bulk-density koc \
         foc dispersivity companion period",
    ),
    ("[[flowpath]]>wells[]", "well distance-m"),
    ("[[flowpath]]>period", "from to"),
    ("[[flowpath]]>gradient", "low high"),
    ("[[chain]]", "name members yields companion"),
    ("[vapour]", "temperature pressure"),
    ("[attainment]", "statistic rounds months non-detects trend citation"),
];

/// The keys marked as needed in the design.
const NEEDED: [(&str, &str); 10] = [
    ("[site]", "name"),
    ("[[results]]", "files"),
    ("[[analyte]]", "name"),
    ("[[well]]", "name"),
    ("[[event]]", "date restart what"),
    ("[[decision]]", "id kind when who why"),
    ("[[qualifier]]", "means when who why"),
    ("[[flowpath]]", "name wells"),
    ("[[chain]]", "members name"),
    ("[attainment]", "citation rounds statistic"),
];

/// The part of the schema that describes a table.
fn described<'s>(schema: &'s Value, table: &str) -> &'s Value {
    let mut here = schema;
    for step in table.split('>') {
        let key = step.trim_matches(['[', ']']);
        here = &here["properties"][key];
        if step.starts_with("[[") || step.ends_with("[]") {
            here = &here["items"];
        }
        if let Some(range) = here.get("anyOf") {
            here = &range[1];
        }
    }
    here
}

fn keys_of(value: &Value) -> BTreeSet<&str> {
    value["properties"]
        .as_object()
        .map(|keys| keys.keys().map(String::as_str).collect())
        .unwrap_or_default()
}

/// A site file in which a key of a table holds a value.
fn with_key(table: &str, key: &str, value: &str) -> String {
    let entry = format!("{key} = {value}");
    let (header, line) = match table.split_once('>') {
        None => (table, entry),
        Some((header, nested)) => match nested.strip_suffix("[]") {
            Some(list) => (header, format!("{list} = [{{ {entry} }}]")),
            None => (header, format!("{nested} = {{ {entry} }}")),
        },
    };
    format!("{header}\n{line}\n")
}

fn told(text: &str) -> String {
    let problems = read(text, "site.toml").err().unwrap_or_default();
    problems.iter().map(|problem| format!("{problem}\n")).collect()
}

#[test]
fn the_schema_holds_the_documented_keys_and_no_others() {
    let schema = schema();
    for (table, keys) in DOCUMENTED {
        let documented: BTreeSet<&str> = keys.split_whitespace().collect();
        assert_eq!(keys_of(described(&schema, table)), documented, "{table}");
        assert_eq!(described(&schema, table)["additionalProperties"], false, "{table}");
    }
    let tables: BTreeSet<&str> = DOCUMENTED
        .iter()
        .filter(|(table, _)| !table.contains('>'))
        .map(|(table, _)| table.trim_matches(['[', ']']))
        .collect();
    assert_eq!(keys_of(&schema), tables);
    assert_eq!(SiteFile::KEYS.iter().copied().collect::<BTreeSet<_>>(), tables);
}

#[test]
fn the_reader_knows_the_documented_keys_and_no_others() {
    for (table, keys) in DOCUMENTED {
        for key in keys.split_whitespace() {
            let told = told(&with_key(table, key, "true"));
            assert!(!told.contains("is not a key"), "{table} {key}\n{told}");
        }
        let told = told(&with_key(table, "zzz", "true"));
        assert!(told.contains("zzz is not a key"), "{table}\n{told}");
    }
}

#[test]
fn a_word_of_each_key_is_described_and_needed_keys_are_marked() {
    let schema = schema();
    for (table, keys) in DOCUMENTED {
        let here = described(&schema, table);
        for key in keys.split_whitespace() {
            let description = here["properties"][key]["description"].as_str().unwrap_or_default();
            assert!(description.len() > 3 && description.ends_with(['.', '}']), "{table} {key}");
        }
        if table.contains('>') {
            continue;
        }
        let needed = NEEDED.iter().find(|(name, _)| *name == table).map_or("", |(_, keys)| keys);
        let mut marked: Vec<&str> = here["required"]
            .as_array()
            .map(|keys| keys.iter().filter_map(Value::as_str).collect())
            .unwrap_or_default();
        marked.sort_unstable();
        assert_eq!(marked.join(" "), needed, "{table}");
    }
}

#[test]
fn the_schema_is_draft_seven_without_null_and_knows_the_words() {
    let schema = schema();
    assert_eq!(schema["$schema"], "http://json-schema.org/draft-07/schema#");
    assert!(!schema.to_string().contains("\"null\""));
    let columns = keys_of(&described(&schema, "[[results]]")["properties"]["columns"]).len();
    assert_eq!(columns, Column::ALL.len());
    let reasons = &described(&schema, "[settings]")["properties"]["why"];
    let settings: BTreeSet<&str> = Setting::ALL.iter().map(|setting| setting.code()).collect();
    assert_eq!(keys_of(reasons), settings);
    let documented = DOCUMENTED
        .iter()
        .filter(|(table, _)| ["[settings]", "[flags]"].contains(table))
        .flat_map(|(_, keys)| keys.split_whitespace())
        .filter(|key| !["limit-order", "why"].contains(key));
    assert_eq!(documented.collect::<BTreeSet<_>>(), settings);
    let rounds = described(&schema, "[settings]")["properties"]["round"]["oneOf"].to_string();
    for word in ["month", "quarter", "half-year", "year"] {
        assert!(rounds.contains(&format!("\"const\":\"{word}\"")), "{rounds}");
    }
}

#[test]
fn our_columns_are_the_canonical_ones() {
    let keys: Vec<&str> = Column::ALL.iter().map(|column| column.key()).collect();
    assert_eq!(
        keys.join(", "),
        "well, analyte, date, result, unit, site, cas, fraction, qualifier, detection_limit, \
         reporting_limit, sample_type, sample_id, depth, lab, time, uncertainty, basis, \
         detection_condition, status, medium, batch"
    );
    for column in Column::ALL {
        let text = format!(
            "[site]\nname = \"x\"\n[[results]]\nfiles = \"*\"\ncolumns = {{ {} = \"X\" }}\n",
            column.key()
        );
        assert_eq!(told(&text), "");
    }
}
