//! The shape of the repository: who may use whom, how long files are, what stands where.
//!
//! Each rule is a function from sources to offences. It is asked twice: of the repository, where it
//! must find nothing, and of a made-up offence, where it must find something.

use std::collections::BTreeSet;
use std::fs;
use std::path::Path;

/// The longest a source file may be, in lines.
const MOST_LINES: usize = 400;

/// What may stand at the top of the repository, beside names that begin with a dot.
const TOP: [&str; 10] = [
    "Cargo.toml",
    "Cargo.lock",
    "README.md",
    "DEVELOPERS.md",
    "LICENSE",
    "src",
    "site-templates",
    "tests",
    "demo-wells",
    "target",
];

/// The parts of the program that are not the library.
const BINARY: [&str; 2] = ["cli", "main"];

/// Where each outside crate may be named: parts of the library, or single files of theirs. A crate
/// without a line here has no place yet, which is an offence too.
const PLACES: [(&str, &[&str]); 22] = [
    (
        "chrono",
        &[
            "terms", "site", "ledger", "intake", "series", "fit", "project", "judge", "doubts",
            "findings", "words", "deliver", "run", "cli",
        ],
    ),
    ("clap", &["cli", "main"]),
    ("clap_complete", &["cli"]),
    ("clap_mangen", &["cli"]),
    ("csv", &["intake", "deliver"]),
    ("ctrlc", &["cli", "main"]),
    ("encoding_rs", &["intake"]),
    ("glob", &["intake"]),
    ("indicatif", &["cli"]),
    ("plotters", &["deliver/charts"]),
    ("polars", &["intake", "series/grouping.rs"]),
    ("rayon", &["run"]),
    ("schemars", &["site", "findings"]),
    ("serde", &["terms", "site", "ledger", "findings", "deliver"]),
    ("serde_json", &["site", "deliver", "cli"]),
    ("sha2", &["intake", "deliver"]),
    ("statrs", &["numerics/tails.rs"]),
    ("strsim", &["terms"]),
    ("tempfile", &["deliver"]),
    ("terminal_size", &["cli"]),
    ("thiserror", &[""]),
    ("toml", &["site"]),
];

/// One source file: its path below `src` and its text.
struct Source {
    path: String,
    text: String,
}

impl Source {
    fn made_up(path: &str, text: &str) -> Self {
        Self { path: path.to_owned(), text: text.to_owned() }
    }

    /// The part of the program it belongs to: `fit` for `fit/mod.rs` and for `fit.rs`.
    fn part(&self) -> &str {
        let first = self.path.split('/').next().unwrap_or(&self.path);
        first.strip_suffix(".rs").unwrap_or(first)
    }

    /// Its lines without comments, each with its number.
    fn code(&self) -> impl Iterator<Item = (usize, &str)> {
        self.text.lines().enumerate().map(|(at, line)| (at + 1, uncommented(line)))
    }

    fn offence(&self, line: usize, what: &str) -> String {
        format!("src/{}:{line}: {what}", self.path)
    }
}

/// A line up to its comment; the two slashes of an address are not one.
fn uncommented(line: &str) -> &str {
    let comment = line.match_indices("//").find(|(at, _)| !line[..*at].ends_with(':'));
    comment.map_or(line, |(at, _)| &line[..at])
}

fn is_word(c: char) -> bool {
    c.is_alphanumeric() || c == '_'
}

/// Where a word stands by itself in a line.
fn words<'a>(line: &'a str, word: &'a str) -> impl Iterator<Item = usize> + 'a {
    line.match_indices(word).map(|(at, _)| at).filter(move |&at| {
        let before = line[..at].chars().next_back();
        let after = line[at + word.len()..].chars().next();
        !before.is_some_and(is_word) && !after.is_some_and(is_word)
    })
}

fn repository() -> &'static Path {
    Path::new(env!("CARGO_MANIFEST_DIR"))
}

/// Every source file of the program, in the order of its path.
fn sources() -> Vec<Source> {
    let mut found = Vec::new();
    let mut waiting = vec![String::new()];
    while let Some(folder) = waiting.pop() {
        for name in names_in(&repository().join("src").join(&folder)) {
            let path = if folder.is_empty() { name } else { format!("{folder}/{name}") };
            let full = repository().join("src").join(&path);
            if full.is_dir() {
                waiting.push(path);
            } else if path.ends_with(".rs") {
                let text = fs::read_to_string(&full).expect("a source file is text");
                found.push(Source { path, text });
            }
        }
    }
    found.sort_by(|a, b| a.path.cmp(&b.path));
    assert!(found.len() > 50, "only {} source files found", found.len());
    found
}

fn names_in(folder: &Path) -> Vec<String> {
    let entries = fs::read_dir(folder).expect("a folder of the repository can be read");
    entries
        .map(|entry| entry.expect("an entry").file_name().to_string_lossy().into_owned())
        .collect()
}

fn lib() -> String {
    fs::read_to_string(repository().join("src/lib.rs")).expect("src/lib.rs")
}

/// The `pub mod` lines of lib.rs: the direction of the data.
fn flow(lib: &str) -> Vec<String> {
    let named = lib.lines().filter_map(|line| line.strip_prefix("pub mod "));
    named.filter_map(|rest| rest.strip_suffix(';')).map(str::to_owned).collect()
}

/// The top modules that a source names, each with its line: after `crate::`, in `crate::{…}`, and
/// after as many `super::` as lead out of its part.
fn modules_named(source: &Source) -> Vec<(usize, String)> {
    let code: String = source.code().map(|(_, line)| format!("{line}\n")).collect();
    let depth = source.path.trim_end_matches("/mod.rs").split('/').count();
    let from_crate =
        words(&code, "crate").filter_map(|at| Some((at, code[at..].strip_prefix("crate::")?)));
    let from_super = words(&code, "super").filter(|&at| !code[..at].ends_with("super::"));
    let from_super = from_super.filter_map(|at| {
        let rest = code[at..].trim_start_matches("super::");
        let steps = (code.len() - at - rest.len()) / "super::".len();
        (steps >= depth).then_some((at, rest))
    });
    let named = from_crate.chain(from_super).flat_map(|(at, rest)| {
        let line = code[..at].matches('\n').count() + 1;
        first_words(rest).into_iter().map(move |word| (line, word))
    });
    named.collect()
}

/// The first word of a path, or the first words inside its braces: `{a::B, c::{D, E}}` gives `a`
/// and `c`.
fn first_words(path: &str) -> Vec<String> {
    let first = |item: &str| item.trim_start().chars().take_while(|&c| is_word(c)).collect();
    let Some(group) = path.strip_prefix('{') else { return vec![first(path)] };
    let mut depth = 0;
    let mut item = 0;
    let mut words = Vec::new();
    for (at, c) in group.char_indices() {
        if depth == 0 && (c == ',' || c == '}') {
            words.push(first(&group[item..at]));
            item = at + 1;
        }
        match c {
            '{' => depth += 1,
            '}' if depth == 0 => break,
            '}' => depth -= 1,
            _ => {}
        }
    }
    words
}

/// Uses of a part that stands further down the flow, and parts that the flow does not name.
fn against_the_flow(flow: &[String], sources: &[Source]) -> Vec<String> {
    let place = |part: &str| flow.iter().position(|named| named == part);
    let mut offences = Vec::new();
    for source in sources {
        let part = source.part();
        if BINARY.contains(&part) || part == "lib" {
            continue;
        }
        let Some(own) = place(part) else {
            offences.push(source.offence(1, "lib.rs does not name this part"));
            continue;
        };
        for (line, used) in modules_named(source) {
            if place(&used).is_some_and(|at| at > own) {
                offences.push(
                    source.offence(line, &format!("{part} uses {used}, which comes after it")),
                );
            }
        }
    }
    offences
}

fn too_long(sources: &[Source]) -> Vec<String> {
    let lines = |source: &Source| source.text.lines().count();
    let long = sources.iter().filter(|source| lines(source) > MOST_LINES);
    long.map(|source| source.offence(lines(source), "too long")).collect()
}

/// Names at the top of the repository that have no place there, and those that are missing.
fn misplaced_at_the_top(names: &[String]) -> Vec<String> {
    let strangers =
        names.iter().filter(|name| !name.starts_with('.') && !TOP.contains(&name.as_str()));
    let missing =
        TOP.iter().filter(|need| **need != "target" && !names.iter().any(|name| name == *need));
    strangers
        .map(|name| format!("stranger: {name}"))
        .chain(missing.map(|name| format!("missing: {name}")))
        .collect()
}

/// The crates of `[dependencies]`, as the code names them.
fn dependencies(manifest: &str) -> BTreeSet<String> {
    let table = manifest.lines().skip_while(|line| *line != "[dependencies]").skip(1);
    let entries = table.take_while(|line| !line.starts_with('['));
    entries
        .filter_map(|line| line.split_once(" = "))
        .map(|(name, _)| name.trim().replace('-', "_"))
        .collect()
}

/// Whether a line names an outside crate: `csv::…`, `use csv`, `extern crate csv`, `::csv::…`.
fn names_crate(line: &str, name: &str) -> bool {
    words(line, name).any(|at| {
        let (before, after) = (&line[..at], &line[at + name.len()..]);
        // `crate::csv` and `super::csv` are modules of ours; `::csv` is the crate.
        let ours = before.strip_suffix("::").is_some_and(|path| path.ends_with(is_word));
        let imported = before.ends_with("use ") || before.ends_with("extern crate ");
        !ours && (after.starts_with("::") || imported)
    })
}

/// Outside crates named where they have no place.
fn crates_out_of_place(places: &[(&str, &[&str])], sources: &[Source]) -> Vec<String> {
    let mut offences = Vec::new();
    for source in sources {
        let inside = |place: &str| match source.path.strip_prefix(place) {
            Some(rest) => {
                place.is_empty() || rest.is_empty() || rest == ".rs" || rest.starts_with('/')
            }
            None => false,
        };
        let barred =
            places.iter().filter(|(_, allowed)| !allowed.iter().any(|place| inside(place)));
        for (name, _) in barred {
            let lines = source.code().filter(|(_, line)| names_crate(line, name));
            offences.extend(lines.map(|(line, _)| source.offence(line, &format!("names {name}"))));
        }
    }
    offences
}

/// An absent number that would become 0 on its way out.
fn absent_made_zero(sources: &[Source]) -> Vec<String> {
    let ours = sources.iter().filter(|source| ["deliver", "findings"].contains(&source.part()));
    lines_with(ours, |line| line.contains("unwrap_or(0"), "an absent value becomes 0")
}

/// Printing by any part but the binary.
fn prints(sources: &[Source]) -> Vec<String> {
    let library = sources.iter().filter(|source| !BINARY.contains(&source.part()));
    let printing = |line: &str| {
        ["print", "println", "eprint", "eprintln", "dbg"]
            .iter()
            .any(|name| words(line, name).any(|at| line[at + name.len()..].starts_with("!(")))
    };
    lines_with(library, printing, "prints")
}

fn lines_with<'a>(
    sources: impl Iterator<Item = &'a Source>,
    offends: impl Fn(&str) -> bool,
    what: &str,
) -> Vec<String> {
    let mut offences = Vec::new();
    for source in sources {
        let lines = source.code().filter(|(_, line)| offends(line));
        offences.extend(lines.map(|(line, _)| source.offence(line, what)));
    }
    offences
}

#[track_caller]
fn none(offences: &[String]) {
    assert!(offences.is_empty(), "\n{}", offences.join("\n"));
}

#[test]
fn the_order_of_the_modules_is_the_direction_of_the_data() {
    let flow = flow(&lib());
    assert!(flow.first().is_some_and(|first| first == "numerics") && flow.len() > 10, "{flow:?}");
    none(&against_the_flow(&flow, &sources()));
}

#[test]
fn a_use_against_the_flow_would_be_found() {
    let flow = flow("pub mod terms;\npub mod fit;\npub mod judge;\n");
    let found =
        |path: &str, text: &str| against_the_flow(&flow, &[Source::made_up(path, text)]).len();
    assert_eq!(found("fit/line.rs", "use crate::judge::Verdict;"), 1);
    assert_eq!(found("fit/line.rs", "use crate::{\n    judge::Verdict,\n    terms::Unit,\n};"), 1);
    assert_eq!(found("fit/line.rs", "let verdict = super::super::judge::verdict();"), 1);
    assert_eq!(found("fit/mod.rs", "use super::{terms::Unit, judge};"), 1);
    assert_eq!(found("stray/mod.rs", ""), 1);
    assert_eq!(found("judge/mod.rs", "use crate::fit::Fit;\nuse super::terms;"), 0);
    assert_eq!(
        found("fit/line.rs", "use crate::terms::Unit; // for crate::judge\nuse super::judged;"),
        0
    );
    assert_eq!(found("cli/mod.rs", "use crate::judge;"), 0);
}

#[test]
fn no_source_file_is_too_long() {
    none(&too_long(&sources()));
    assert_eq!(too_long(&[Source::made_up("fit/mod.rs", &"\n".repeat(MOST_LINES + 1))]).len(), 1);
    assert_eq!(too_long(&[Source::made_up("fit/mod.rs", &"\n".repeat(MOST_LINES))]).len(), 0);
}

#[test]
fn the_top_of_the_repository_holds_what_belongs_there() {
    none(&misplaced_at_the_top(&names_in(repository())));
    let with =
        |name: &str| TOP.iter().copied().chain([name]).map(str::to_owned).collect::<Vec<_>>();
    assert_eq!(misplaced_at_the_top(&with("notes.txt")), ["stranger: notes.txt"]);
    assert_eq!(misplaced_at_the_top(&with(".editorconfig")).len(), 0);
    assert_eq!(misplaced_at_the_top(&with("x")[1..]), ["stranger: x", "missing: Cargo.toml"]);
}

#[test]
fn outside_crates_are_named_only_in_their_places() {
    let manifest = fs::read_to_string(repository().join("Cargo.toml")).expect("Cargo.toml");
    let listed = PLACES.iter().map(|(name, _)| (*name).to_owned()).collect();
    assert_eq!(dependencies(&manifest), listed, "each dependency has its line in PLACES");
    none(&crates_out_of_place(&PLACES, &sources()));
}

#[test]
fn a_crate_out_of_place_would_be_found() {
    let places: [(&str, &[&str]); 2] = [("csv", &["deliver/tables"]), ("polars", &["intake"])];
    let found = |path, text| crates_out_of_place(&places, &[Source::made_up(path, text)]).len();
    assert_eq!(found("fit/mod.rs", "use polars::prelude::DataFrame;"), 1);
    assert_eq!(found("fit/mod.rs", "let frame = ::polars::frame();"), 1);
    assert_eq!(found("deliver/tables2.rs", "csv::Writer::from_writer(out)"), 1);
    assert_eq!(found("deliver/tables/ledger.rs", "csv::Writer::from_writer(out)"), 0);
    assert_eq!(found("fit/mod.rs", "use super::csv::row; // not polars::frame"), 0);
    assert_eq!(found("intake/mod.rs", "use polars::prelude::DataFrame;"), 0);
    assert_eq!(
        dependencies(
            "[package]\nname = \"x\"\n\n[dependencies]\na-b = \"1\" # c = d\n\n[dev-dependencies]\ne = \"2\"\n"
        ),
        BTreeSet::from(["a_b".to_owned()])
    );
}

#[test]
fn an_absent_number_never_becomes_zero() {
    none(&absent_made_zero(&sources()));
    let offending = "let sd = fit.residual_sd.unwrap_or(0.0);";
    assert_eq!(
        absent_made_zero(&[Source::made_up("deliver/tables/summary.rs", offending)]).len(),
        1
    );
    assert_eq!(absent_made_zero(&[Source::made_up("findings/mod.rs", offending)]).len(), 1);
}

#[test]
fn only_the_binary_prints() {
    none(&prints(&sources()));
    assert_eq!(prints(&[Source::made_up("fit/mod.rs", "println!(\"fitted\");")]).len(), 1);
    assert_eq!(prints(&[Source::made_up("deliver/page.rs", "    eprintln!(\"{n}\");")]).len(), 1);
    assert_eq!(prints(&[Source::made_up("cli/tell.rs", "println!(\"{page}\");")]).len(), 0);
    assert_eq!(
        prints(&[Source::made_up("fit/mod.rs", "/// `println!(…)` is never used")]).len(),
        0
    );
}
