//! Sites, wells, analytes and fractions: as listed, by alias, or as written.

use std::collections::HashMap;

use chrono::NaiveDate;

use super::cas_dates::restored;
use super::record::RecordReader;
use super::split::Line;
use super::texts::{Code, Texts};
use crate::ledger::{Fate, SetAside, Told};
use crate::site::{
    CasCheck, Column, DecisionKind, Fraction, JoinedBy, Site, WellMatch, cas_check, catalogue,
};
use crate::terms::{folded, nearest};

/// Who and what a record is about.
#[derive(Clone, Copy, Debug)]
pub struct Resolved {
    /// The site.
    pub site: Code,
    /// Whether the record belongs to another site.
    pub other_site: bool,
    /// The well, 0 where there is none.
    pub well: Code,
    /// The decision that joined it to another well.
    pub joined_by: Option<u16>,
    /// The analyte as shown, 0 where there is none.
    pub analyte: Code,
    /// The CAS number.
    pub cas: Code,
    /// Its place among the listed analytes.
    pub listed: Option<usize>,
    /// 0 none, 1 dissolved, 2 total.
    pub fraction: u8,
    /// Why the record cannot belong to a series, if it cannot.
    pub refused: Option<Fate>,
}

/// What is remembered of names between records.
#[derive(Default)]
pub struct Names {
    analytes: HashMap<(Code, Code), Analyte>,
}

/// A distinct pair of CAS number and analyte name, looked up once.
#[derive(Clone)]
struct Analyte {
    listed: Option<usize>,
    shown: Code,
    cas: Code,
    told: Vec<Told>,
    refused: Option<Fate>,
}

/// Days since 1970-01-01.
#[must_use]
pub fn day_number(date: NaiveDate) -> i32 {
    let epoch = NaiveDate::from_ymd_opt(1970, 1, 1).map(|e| date.signed_duration_since(e));
    // Years are checked to lie between 1900 and 2200, so the count fits.
    epoch.and_then(|days| i32::try_from(days.num_days()).ok()).unwrap_or(i32::MAX)
}

/// The date of a day number.
#[must_use]
pub fn date_of(day: i32) -> Option<NaiveDate> {
    let epoch = NaiveDate::from_ymd_opt(1970, 1, 1)?;
    epoch.checked_add_signed(chrono::TimeDelta::days(i64::from(day)))
}

/// The number of a fraction in the frame.
#[must_use]
pub fn fraction_number(fraction: Option<Fraction>) -> u8 {
    match fraction {
        None => 0,
        Some(Fraction::Dissolved) => 1,
        Some(Fraction::Total) => 2,
    }
}

/// The fraction of a number in the frame.
#[must_use]
pub fn fraction_of(number: u8) -> Option<Fraction> {
    match number {
        1 => Some(Fraction::Dissolved),
        2 => Some(Fraction::Total),
        _ => None,
    }
}

impl Names {
    /// Finds site, well, analyte and fraction of one line.
    pub fn resolve(
        &mut self,
        reader: &RecordReader<'_>,
        line: &Line,
        day: Option<NaiveDate>,
        texts: &mut Texts,
        told: &mut Vec<Told>,
    ) -> Resolved {
        let site = reader.site;
        let cell = |column| reader.table.cell(line, column);
        let written_site = cell(Column::Site);
        let shown_site = if site.name.is_empty() { written_site } else { site.name.as_str() };
        let other_site = !written_site.is_empty() && !site.is_named(written_site);
        let well = well_name(site, cell(Column::Well), day, told);
        let joined = joined(site, &well, day);
        let well = joined.map_or(well, |(place, kept)| {
            told.retain(|told| !matches!(told, Told::WellNotListed { .. }));
            told.push(Told::Decision { id: site.decisions[usize::from(place)].id.clone() });
            kept.to_owned()
        });
        let analyte = self.analyte(reader, line, texts);
        told.extend(analyte.told.iter().cloned());
        let medium = cell(Column::Medium);
        let wanted = analyte.listed.and_then(|at| site.analytes[at].medium.as_deref());
        let other_medium =
            wanted.is_some_and(|wanted| !medium.is_empty() && folded(wanted) != folded(medium));
        let (fraction, other_fraction) =
            fraction(site, analyte.listed, cell(Column::Fraction), texts.text(analyte.shown), told);
        let refused = analyte
            .refused
            .or(other_medium.then_some(Fate::SetAside(SetAside::OtherMedium)))
            .or(other_fraction.then_some(Fate::SetAside(SetAside::OtherFraction)));
        Resolved {
            site: texts.code(shown_site),
            other_site,
            well: texts.code(&well),
            joined_by: joined.map(|(place, _)| place),
            analyte: analyte.shown,
            cas: analyte.cas,
            listed: analyte.listed,
            fraction,
            refused,
        }
    }
}

impl Names {
    /// The analyte of a line: by its CAS number and name; where those are not listed or empty, by
    /// the further names that the open standard carries.
    fn analyte(&mut self, reader: &RecordReader<'_>, line: &Line, texts: &mut Texts) -> Analyte {
        let (site, table) = (reader.site, reader.table);
        let cas = texts.code(table.cell(line, Column::Cas));
        let mut looked_up = |name: &str, texts: &mut Texts| {
            let pair = (cas, texts.code(name));
            self.analytes.entry(pair).or_insert_with(|| analyte(site, pair, texts)).clone()
        };
        let first = looked_up(table.cell(line, Column::Analyte), texts);
        if first.refused.is_none() {
            return first;
        }
        for &at in &table.mapping.open.other_names {
            let name = line.cells.get(at).unwrap_or_default().trim();
            if !name.is_empty() {
                let other = looked_up(name, texts);
                if other.refused.is_none() {
                    return other;
                }
            }
        }
        first
    }
}

/// The well that a decision joins this one to on a date, and the decision's place.
fn joined<'a>(site: &'a Site, well: &str, day: Option<NaiveDate>) -> Option<(u16, &'a str)> {
    let place = site.decisions.iter().position(|decision| {
        decision.kind == DecisionKind::Join
            && decision.wells.iter().skip(1).any(|name| name == well)
            && decision.from.is_none_or(|from| day.is_some_and(|day| from <= day))
            && decision.to.is_none_or(|to| day.is_some_and(|day| day <= to))
    })?;
    let kept = site.decisions[place].wells.first()?;
    Some((u16::try_from(place).ok()?, kept))
}

/// The well's own name, by alias where the date says so.
fn well_name(site: &Site, written: &str, day: Option<NaiveDate>, told: &mut Vec<Told>) -> String {
    match site.well_of(written, day) {
        _ if written.is_empty() => String::new(),
        WellMatch::Listed(well) => well.name.clone(),
        WellMatch::Alias(well, _) => {
            let well = well.name.clone();
            told.push(Told::WellAlias { written: written.to_owned(), well: well.clone() });
            well
        }
        WellMatch::Unlisted => {
            if !site.wells.is_empty() {
                told.push(Told::WellNotListed { well: written.to_owned() });
            }
            written.to_owned()
        }
    }
}

/// The analyte that a distinct pair of CAS number and name means.
fn analyte(site: &Site, (cas, name): (Code, Code), texts: &mut Texts) -> Analyte {
    let (mut cas_text, written) = (texts.text(cas).to_owned(), texts.text(name).to_owned());
    let mut told = Vec::new();
    let mut cas = cas;
    if !cas_text.is_empty() && cas_check(&cas_text) != CasCheck::Holds {
        match restored(&cas_text, site) {
            Some(number) => {
                told.push(Told::CasRestored { written: cas_text, cas: number.clone() });
                cas = texts.code(&number);
                cas_text = number;
            }
            None => told.push(Told::CasCheckDigit { cas: cas_text.clone() }),
        }
    }
    if written.is_empty() && cas_text.is_empty() {
        let refused = Some(Fate::SetAside(SetAside::NoAnalyte));
        return Analyte { listed: None, shown: 0, cas: 0, told, refused };
    }
    let given = (!cas_text.is_empty()).then_some(cas_text.as_str());
    if let Some((at, by)) = site.analyte_of(given, &written) {
        let listed = &site.analytes[at];
        let named = catalogue::by_name(&written);
        let meant = catalogue::find(listed.cas.as_deref(), &listed.name);
        if by == JoinedBy::Cas && named.is_some() && meant.is_some() && named != meant {
            told.push(Told::CasAgainstName {
                cas: cas_text.clone(),
                written: written.clone(),
                listed: listed.name.clone(),
            });
        } else if folded(&written) != folded(&listed.name) && !written.is_empty() {
            told.push(Told::AnalyteJoined {
                written: written.clone(),
                listed: listed.name.clone(),
                by,
            });
        }
        let cas = listed.cas.clone().unwrap_or(cas_text);
        let (shown, cas) = (texts.code(&listed.name), texts.code(&cas));
        return Analyte { listed: Some(at), shown, cas, told, refused: None };
    }
    let refused = site.sets_unlisted_aside().then_some(Fate::SetAside(SetAside::AnalyteNotListed));
    if refused.is_some() {
        let near = nearest(&written, site.analytes.iter().map(|a| a.name.as_str()));
        let near = near.map(str::to_owned);
        told.push(Told::AnalyteNotListed { written: written.clone(), nearest: near });
    }
    let shown = if written.is_empty() { cas } else { name };
    Analyte { listed: None, shown, cas, told, refused }
}

/// The fraction's number, and whether it is one that the analyte does not ask for.
fn fraction(
    site: &Site,
    listed: Option<usize>,
    written: &str,
    analyte: &str,
    told: &mut Vec<Told>,
) -> (u8, bool) {
    let asked = listed.and_then(|at| site.analytes[at].fraction);
    if written.is_empty() {
        if let Some(asked) = asked {
            told.push(Told::FractionAssumed {
                analyte: analyte.to_owned(),
                fraction: asked.code().to_owned(),
            });
        }
        return (fraction_number(asked), false);
    }
    match Fraction::read(written) {
        None => (0, true),
        Some(read) => (fraction_number(Some(read)), asked.is_some_and(|asked| asked != read)),
    }
}

/// Without a listing, names that share a CAS number or a folded spelling are one analyte: shown in
/// the commonest spelling, then the bytewise least.
pub fn unite_spellings(rows: &mut [super::rows::Row], texts: &Texts) {
    let mut cas_of_name: HashMap<String, Option<Code>> = HashMap::new();
    for row in rows.iter().filter(|row| row.listed.is_none() && row.cas != 0) {
        cas_of_name
            .entry(folded(texts.text(row.analyte)))
            // A name under two CAS numbers does not say which it is.
            .and_modify(|cas| *cas = cas.filter(|cas| *cas == row.cas))
            .or_insert(Some(row.cas));
    }
    let mut spellings: HashMap<(Code, String), HashMap<Code, usize>> = HashMap::new();
    let identity = |row: &super::rows::Row| {
        let name = folded(texts.text(row.analyte));
        let cas =
            if row.cas == 0 { cas_of_name.get(&name).copied().flatten() } else { Some(row.cas) };
        match cas {
            Some(cas) => (cas, String::new()),
            None => (0, name),
        }
    };
    let open = |row: &super::rows::Row| row.listed.is_none() && row.analyte != 0;
    for row in rows.iter().filter(|row| open(row)) {
        *spellings.entry(identity(row)).or_default().entry(row.analyte).or_default() += 1;
    }
    let shown: HashMap<(Code, String), Code> = spellings
        .into_iter()
        .filter_map(|(identity, counts)| {
            let best = counts
                .into_iter()
                .max_by(|a, b| a.1.cmp(&b.1).then_with(|| texts.text(b.0).cmp(texts.text(a.0))))?;
            Some((identity, best.0))
        })
        .collect();
    for row in rows.iter_mut().filter(|row| open(row)) {
        let identity = identity(row);
        if let Some(&analyte) = shown.get(&identity) {
            row.analyte = analyte;
            row.cas = identity.0;
        }
    }
}
