//! The columns of summary.csv and summary.json: one list, from which both are written.

use chrono::NaiveDate;

use super::SeriesFinding;
use crate::terms::{Reading, Standing};

/// One cell of a table, before it is written.
#[derive(Clone, Debug, PartialEq)]
pub enum Cell {
    /// Undefined: empty in CSV, null in JSON.
    Empty,
    /// Text.
    Text(String),
    /// A number.
    Number(f64),
    /// A count.
    Count(usize),
    /// A date.
    Date(NaiveDate),
    /// Codes joined by `;` in CSV, a list in JSON.
    Codes(Vec<&'static str>),
    /// A result with its mark, in the series' unit: `<0.5`.
    Marked(Reading),
}

/// One column: its name and how its cell is found.
pub struct Column<T> {
    /// The header.
    pub name: &'static str,
    /// The cell of one row.
    pub cell: fn(&T) -> Cell,
}

fn text(value: &str) -> Cell {
    if value.is_empty() { Cell::Empty } else { Cell::Text(value.to_owned()) }
}

fn code(value: Option<&'static str>) -> Cell {
    value.map_or(Cell::Empty, |code| Cell::Text(code.to_owned()))
}

fn number(value: Option<f64>) -> Cell {
    value.map_or(Cell::Empty, Cell::Number)
}

fn date(value: Option<NaiveDate>) -> Cell {
    value.map_or(Cell::Empty, Cell::Date)
}

macro_rules! columns {
    ($row:ident: $type:ty; $($name:literal => $cell:expr,)+) => {
        &[$(Column { name: $name, cell: |$row: &$type| $cell },)+]
    };
}

/// Every column of the summary, in order. To add one, add its line here and its explanation in
/// `words`; a test holds the two together.
pub const SUMMARY: &[Column<SeriesFinding>] = columns! { s: SeriesFinding;
    "site" => text(&s.key.site),
    "well" => text(&s.key.well),
    "well_role" => text(s.role.code()),
    "analyte" => text(&s.key.analyte),
    "cas" => text(s.cas.as_deref().unwrap_or_default()),
    "fraction" => text(s.key.fraction_code()),
    "depth" => text(s.key.depth_text()),
    "unit" => text(s.unit.label()),
    "limit" => number(s.limit),
    "limit_source" => text(s.limit_source.as_deref().unwrap_or_default()),
    "goal_date" => date(s.goal_date),
    "samples" => Cell::Count(s.samples),
    "detects" => Cell::Count(s.detects),
    "first_sampled" => date(s.sampled.map(|span| span.first)),
    "last_sampled" => date(s.sampled.map(|span| span.last)),
    "last_result" => s.last_result.map_or(Cell::Empty, Cell::Marked),
    "verdict" => text(s.verdict.code()),
    "pace" => code(s.pace.map(crate::terms::Pace::code)),
    "method" => code(s.method.map(crate::terms::Method::code)),
    "rate_per_year" => number(s.rate_per_year.map(|rate| rate.0)),
    "rate_lower" => number(s.rate_lower.map(|rate| rate.0)),
    "rate_upper" => number(s.rate_upper.map(|rate| rate.0)),
    "half_life_years" => number(s.half_life_years().0),
    "half_life_lower" => number(s.half_life_years().1),
    "half_life_upper" => number(s.half_life_years().2),
    "level_at_start" => number(s.level_at_start),
    "level_now" => number(s.level_now),
    "level_now_lower" => number(s.level_now_lower),
    "level_now_upper" => number(s.level_now_upper),
    "share_over_limit_now" => number(s.share_over_limit_now),
    "residual_sd_ln" => number(s.residual_sd_ln),
    "r_squared" => number(s.r_squared),
    "slope_p" => number(s.slope_p),
    "slope_p_adjusted" => number(s.slope_p_adjusted),
    "kendall_s" => number(s.kendall_s),
    "kendall_p" => number(s.kendall_p),
    "sen_rate_per_year" => number(s.sen_rate_per_year),
    "sen_rate_lower" => number(s.sen_rate_lower),
    "sen_rate_upper" => number(s.sen_rate_upper),
    "reach_date" => date(s.reach_date),
    "reach_earliest" => date(s.reach_earliest),
    "reach_latest" => date(s.reach_latest),
    "reach_date_mean" => date(s.reach_date_mean),
    "exceed_date" => date(s.exceed_date),
    "exceed_earliest" => date(s.exceed_earliest),
    "required_rate_per_year" => number(s.required_rate_per_year),
    "alternative_model" => code(s.alternative_model),
    "alternative_date" => date(s.alternative_date),
    "rounds_to_decisive" => s.rounds_to_decisive.map_or(Cell::Empty, Cell::Count),
    "previous_verdict" => code(s.previous_verdict.map(crate::terms::Verdict::code)),
    "reach_shift_years" => number(s.reach_shift_years),
    "why_no_rate" => code(s.why_no_rate.map(crate::terms::WhyNoRate::code)),
    "why_no_date" => code(s.why_no_date.map(crate::terms::WhyNoDate::code)),
    "flags" => Cell::Codes(raised(s)),
};

/// The codes of the raised flags, in their order; a test that could not be made is never listed.
fn raised(series: &SeriesFinding) -> Vec<&'static str> {
    let raised = series.flags.iter().filter(|flag| flag.standing == Standing::Raised);
    raised.map(|flag| flag.code.code()).collect()
}
