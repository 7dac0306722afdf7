//! The site file, its templates, its catalogue of analytes, its schema.

mod blocks;
mod facts;
mod hostile;
mod keys;
mod lookup;
mod problems;
mod settings;
mod templates;

use chrono::NaiveDate;
use ebbwell::site::{Problem, Site, read};

/// Reads a site file that must be without a problem.
fn site(text: &str) -> Site {
    read(text, "site.toml").unwrap_or_else(|problems| panic!("{}", lines(&problems)))
}

/// Reads the blocks below a `[site]` of their own that must be without a problem.
fn site_with(blocks: &str) -> Site {
    site(&with_name(blocks))
}

/// What is told of a site file, a line each; empty if nothing is.
fn told(text: &str) -> String {
    read(text, "site.toml").map_or_else(|problems| lines(&problems), |_| String::new())
}

/// What is told of blocks below a `[site]` of their own. The blocks begin on line 3.
fn told_with(blocks: &str) -> String {
    told(&with_name(blocks))
}

fn with_name(blocks: &str) -> String {
    format!("[site]\nname = \"Old depot\"\n{blocks}")
}

fn lines(problems: &[Problem]) -> String {
    problems.iter().map(Problem::to_string).collect::<Vec<_>>().join("\n")
}

fn day(text: &str) -> NaiveDate {
    text.parse().expect("a date in the test")
}
