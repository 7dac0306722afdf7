//! The site as checked: what every later stage reads, with every default filled in.

use std::collections::BTreeMap;

use chrono::NaiveDate;
use serde::Serialize;

use crate::terms::{Concentration, Unit};

use super::choices::{
    DecisionKind, Depths, Duplicates, EventKind, Meaning, NonDetects, Role, RoundLength, SameDay,
};
use super::delivery::{
    Column, DateOrder, Decimal, Encoding, Layout, SampleType, SerialDates, Sigma, TwoDigitYears,
};
use super::fraction::Fraction;

/// A site: limits, wells, settings and decisions, all of them checked.
#[derive(Clone, Debug, PartialEq)]
pub struct Site {
    /// The site's name; empty for bare results files, with or without a template.
    pub name: String,
    /// The authority that decides, as the site file names it.
    pub authority: Option<String>,
    /// The text printed with the caution.
    pub citation: Option<String>,
    /// Other names under which results files know the site.
    pub aliases: Vec<String>,
    /// First date of the site's monitoring.
    pub active_from: Option<NaiveDate>,
    /// Last date of the site's monitoring.
    pub active_to: Option<NaiveDate>,
    /// Whether analytes that are not listed are set aside.
    pub listing: Listing,
    /// Everything that changes a number.
    pub settings: Settings,
    /// Thresholds of flags.
    pub flags: FlagThresholds,
    /// How results files are read, in order of delivery; never empty.
    pub results: Vec<ResultsRule>,
    /// The listed analytes, in the order of the site file.
    pub analytes: Vec<Analyte>,
    /// The listed wells, in the order of the site file.
    pub wells: Vec<Well>,
    /// What each round should hold.
    pub expected: Vec<Expected>,
    /// What happened at the site, by date.
    pub events: Vec<Event>,
    /// Exclusions, windows and meanings for named records, in the order of the site file.
    pub decisions: Vec<Decision>,
    /// What the laboratory's qualifiers mean, in the order of the site file.
    pub qualifiers: Vec<Qualifier>,
}

/// What becomes of an analyte that is not listed.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
#[serde(rename_all = "kebab-case")]
pub enum Listing {
    /// It is set aside.
    Listed,
    /// Nothing is listed, so everything is fitted.
    Everything,
}

/// Everything in the site file that changes a number of every series.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Settings {
    /// The confidence of every two-sided interval.
    pub confidence: f64,
    /// The date by which limits are to be met.
    pub goal_date: Option<NaiveDate>,
    /// Years past the last used date beyond which a date is not told to people.
    pub horizon_years: f64,
    /// Years after which the newest result is stale.
    pub stale_after_years: f64,
    /// The rate, per year either way, within which an interval shows a flat series.
    pub flat_margin: f64,
    /// The length of a round.
    pub round: RoundLength,
    /// Days by which a sample may miss its round's edge.
    pub round_grace_days: u32,
    /// What a rate needs.
    pub rate_needs: RateNeeds,
    /// What a date needs.
    pub date_needs: DateNeeds,
    /// What several detects of one date give.
    pub same_day: SameDay,
    /// What field duplicates do.
    pub duplicates: Duplicates,
    /// What non-detects contribute to a fit.
    pub non_detects: NonDetects,
    /// Types of limits of the open standard that go before the others, the preferred first.
    pub limit_order: Vec<String>,
    /// The statistical settings and thresholds off their default, in the order of the site
    /// file's key list.
    pub off_default: Vec<OffDefault>,
}

/// The fewest data for a rate.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
pub struct RateNeeds {
    /// Dates.
    pub dates: usize,
    /// Measured values on distinct dates.
    pub detects: usize,
}

/// The fewest data for a date.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct DateNeeds {
    /// Dates.
    pub dates: usize,
    /// Years from the first to the last used date.
    pub years: f64,
    /// Measured values on distinct dates.
    pub detects: usize,
}

/// A statistical setting that is not at its default, and why.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct OffDefault {
    /// The key: `confidence`.
    pub key: String,
    /// The default.
    pub was: String,
    /// What the site file says.
    pub is: String,
    /// The reason given.
    pub why: String,
}

/// Thresholds of flags.
#[derive(Clone, Copy, Debug, PartialEq, Serialize)]
pub struct FlagThresholds {
    /// A record shorter than this many years is short.
    pub short_record_years: f64,
    /// The share of non-detects over which a series is mostly non-detects.
    pub mostly_non_detects: f64,
    /// The share of estimated detects over which the flag is raised.
    pub estimated_results: f64,
    /// The relative percent difference over which duplicates differ.
    pub duplicates_rpd: f64,
}

/// How the files that match a pattern are read.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct ResultsRule {
    /// The pattern, with `/` between folders, relative to the site folder.
    pub files: String,
    /// The layout, where it is declared.
    pub layout: Option<Layout>,
    /// The sheet of a workbook, where it is declared.
    pub sheet: Option<String>,
    /// The encoding, where it is declared.
    pub encoding: Option<Encoding>,
    /// The byte between cells, where it is declared.
    pub separator: Option<u8>,
    /// The file's header for each of our columns that is declared.
    pub columns: BTreeMap<Column, String>,
    /// The order of day and month, where it is declared.
    pub date_order: Option<DateOrder>,
    /// Whether years of two digits are read.
    pub two_digit_years: TwoDigitYears,
    /// Whether bare numbers in the date column are spreadsheet serials.
    pub serial_dates: SerialDates,
    /// The decimal mark.
    pub decimal: Decimal,
    /// The mark between thousands, where there is one.
    pub thousands: Option<char>,
    /// Whether `ppb` and `ppm` mean ug/L and mg/L.
    pub ppb_in_water: bool,
    /// What the uncertainty column holds, where it is declared.
    pub uncertainty: Option<Sigma>,
    /// The file's own words for sample types.
    pub sample_types: BTreeMap<String, SampleType>,
    /// To what stage the files were validated and by whom, in the site file's words.
    pub validation: Option<String>,
}

/// One analyte of the site file or a template.
#[derive(Clone, Debug, PartialEq)]
pub struct Analyte {
    /// The name shown in every output.
    pub name: String,
    /// The CAS number, trimmed.
    pub cas: Option<String>,
    /// Other names.
    pub aliases: Vec<String>,
    /// The unit asked for; a limit's unit goes before it.
    pub unit: Option<Unit>,
    /// What the number counts: `N`, `NO3`.
    pub basis: Option<String>,
    /// The fraction that results without one belong to.
    pub fraction: Option<Fraction>,
    /// The medium that counts.
    pub medium: Option<String>,
    /// The limits, the earliest first; one without a date goes before all others.
    pub limits: Vec<Limit>,
    /// The date by which the limit is to be met.
    pub goal_date: Option<NaiveDate>,
    /// The half-life of a radionuclide, from the catalogue.
    pub half_life_years: Option<f64>,
}

/// A limit, from its effective date.
#[derive(Clone, Debug, PartialEq)]
pub struct Limit {
    /// The concentration.
    pub value: Concentration,
    /// The date from which it is in force; without one, always.
    pub from: Option<NaiveDate>,
    /// The law or guideline.
    pub source: Option<String>,
}

/// One well of the site file.
#[derive(Clone, Debug, PartialEq)]
pub struct Well {
    /// The name.
    pub name: String,
    /// What the well is for.
    pub role: Role,
    /// Degrees north, WGS 84.
    pub latitude: Option<f64>,
    /// Degrees east, WGS 84.
    pub longitude: Option<f64>,
    /// Easting in the site's own grid.
    pub x: Option<f64>,
    /// Northing in the site's own grid.
    pub y: Option<f64>,
    /// Other names, each with its dates and its reason.
    pub aliases: Vec<WellAlias>,
    /// What results from several depths are, where it is said.
    pub depths: Option<Depths>,
    /// Limits of this well alone, by analyte and then by date.
    pub limits: Vec<WellLimit>,
    /// The date by which limits are to be met here.
    pub goal_date: Option<NaiveDate>,
}

/// Another name of a well, for a while or always.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct WellAlias {
    /// The name as results files write it.
    pub name: String,
    /// The first date on which it means this well.
    pub from: Option<NaiveDate>,
    /// The last date on which it means this well.
    pub to: Option<NaiveDate>,
    /// Who decided it.
    pub who: String,
    /// When it was decided.
    pub when: NaiveDate,
    /// Why.
    pub why: String,
}

/// A limit of one analyte at one well.
#[derive(Clone, Debug, PartialEq)]
pub struct WellLimit {
    /// The analyte, as it is listed.
    pub analyte: String,
    /// The limit.
    pub limit: Limit,
}

/// What each round should hold.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Expected {
    /// The wells; all listed ones where empty.
    pub wells: Vec<String>,
    /// The analytes as listed; all listed ones where empty.
    pub analytes: Vec<String>,
    /// Every so many months.
    pub every_months: u32,
}

/// Something that happened at the site.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Event {
    /// When it happened.
    pub date: NaiveDate,
    /// What happened.
    pub what: String,
    /// Whether records begin anew.
    pub restart: Restart,
    /// The wells it concerns; all where empty.
    pub wells: Vec<String>,
    /// What kind of event.
    pub kind: EventKind,
    /// Who decided that records begin anew.
    pub who: Option<String>,
    /// When that was decided.
    pub when: Option<NaiveDate>,
    /// Why.
    pub why: Option<String>,
}

/// Whether an event makes records begin anew.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
#[serde(rename_all = "kebab-case")]
pub enum Restart {
    /// The window of its wells begins on its date.
    Yes,
    /// It is marked and changes nothing.
    No,
}

/// A decision about named records.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Decision {
    /// Its name in the ledger: `decision:<id>`.
    pub id: String,
    /// What it does.
    pub kind: DecisionKind,
    /// What the records' qualifiers mean; said by `use-qualifier` and by nothing else.
    pub means: Option<Meaning>,
    /// The wells; all where empty.
    pub wells: Vec<String>,
    /// The analytes as listed; all where empty.
    pub analytes: Vec<String>,
    /// The first date.
    pub from: Option<NaiveDate>,
    /// The last date.
    pub to: Option<NaiveDate>,
    /// Sample identifiers; all where empty.
    pub samples: Vec<String>,
    /// The results file.
    pub file: Option<String>,
    /// Record numbers in that file; all where empty.
    pub records: Vec<u64>,
    /// Who decided.
    pub who: String,
    /// When.
    pub when: NaiveDate,
    /// Why.
    pub why: String,
}

/// What a qualifier or a detection condition means.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Qualifier {
    /// The code, as the laboratory writes it; either this or `condition` is there.
    pub code: Option<String>,
    /// The detection condition in words.
    pub condition: Option<String>,
    /// What it means.
    pub means: Meaning,
    /// Patterns of the files it holds for; all where empty.
    pub files: Vec<String>,
    /// Who decided.
    pub who: String,
    /// When.
    pub when: NaiveDate,
    /// Why, usually the laboratory's legend.
    pub why: String,
}
