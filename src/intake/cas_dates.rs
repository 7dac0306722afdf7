//! CAS numbers that a spreadsheet turned into dates, and which of them can be restored.
//!
//! `79-01-6` opened in a spreadsheet becomes 6 January 1979, shown in the style of the country.
//! Year, month and day are the three parts of the number again, the century perhaps added; the
//! check digit and the list of known numbers say which number it was. (The conversion itself is well
//! documented; that 72 of 15,810 federal CAS numbers have the shape of a date was counted.)

use super::date::{YEARS, parts, split_time};
use super::month_names::{month, named};
use crate::site::{CasCheck, Site, cas_check, catalogue};

/// The CAS number behind a date, if exactly one is behind it.
#[must_use]
pub fn restored(text: &str, site: &Site) -> Option<String> {
    let day = split_time(text.trim()).0;
    let mut whole = Vec::new();
    let mut partial = Vec::new();
    if let Some([a, b, c]) = parts(day) {
        if a.len() == 4 {
            whole.extend(numbers(a, b, c));
        } else if c.len() == 4 {
            // Either order of day and month; the check digit settles which.
            whole.extend(numbers(c, b, a).chain(numbers(c, a, b)));
        } else if c.len() == 2 {
            partial.extend([Partial::new(c, b, a), Partial::new(c, a, b)]);
        }
    } else if let Some(named) = named(day) {
        if named.year.len() == 4 {
            whole.extend(numbers(&named.year, &named.month.to_string(), &named.day));
        } else {
            partial.push(Partial::new(&named.year, &named.month.to_string(), &named.day));
        }
    } else {
        partial.push(month_and_year(day));
    }
    let partial: Vec<Partial> = partial.into_iter().flatten().collect();
    whole.retain(|cas| cas_check(cas) == CasCheck::Holds);
    for cas in known(site) {
        if partial.iter().any(|partial| partial.fits(cas)) {
            whole.push(cas.to_owned());
        }
    }
    whole.sort_unstable();
    whole.dedup();
    let of_known: Vec<String> = whole.iter().filter(|c| is_known(site, c)).cloned().collect();
    // A number that nobody knows is restored only where the cell can be nothing else: no sampling
    // date has such a year. One in ten dates passes the check digit by chance.
    let mut certain = if of_known.is_empty() { whole } else { of_known };
    let no_date = |cas: &String| {
        let year = cas.split('-').next().and_then(|head| head.parse::<i32>().ok());
        year.is_some_and(|year| year > *YEARS.end())
    };
    if certain.len() == 1 && (is_known(site, &certain[0]) || no_date(&certain[0])) {
        certain.pop()
    } else {
        None
    }
}

fn is_known(site: &Site, cas: &str) -> bool {
    known(site).any(|known| known == cas)
}

/// Every CAS number of the site file and of the catalogue.
fn known(site: &Site) -> impl Iterator<Item = &str> {
    let listed = site.analytes.iter().filter_map(|analyte| analyte.cas.as_deref());
    listed.chain(catalogue::all().iter().filter_map(|entry| entry.cas))
}

/// The numbers that year, month and day can be the parts of: the year with its century, or without
/// where the spreadsheet has added it.
fn numbers(year: &str, month: &str, day: &str) -> impl Iterator<Item = String> + use<> {
    let parts = parts_of(month, day);
    let heads = [Some(year.to_owned()), year.get(2..).map(str::to_owned)];
    heads.into_iter().flatten().filter_map(move |head| {
        let (month, day) = parts?;
        Some(format!("{head}-{month:02}-{day}"))
    })
}

/// Month and day as the second part and the check digit of a number.
fn parts_of(month: &str, day: &str) -> Option<(u32, u32)> {
    let (month, day) = (month.parse().ok()?, day.parse().ok()?);
    ((1..=12).contains(&month) && (1..=9).contains(&day)).then_some((month, day))
}

/// What is left of a number where the century, or the day too, is not shown.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
struct Partial {
    /// The last two digits of the first part.
    year: u32,
    month: u32,
    day: Option<u32>,
}

impl Partial {
    fn new(year: &str, month: &str, day: &str) -> Option<Self> {
        let (month, day) = parts_of(month, day)?;
        Some(Self { year: year.parse().ok()?, month, day: Some(day) })
    }

    fn fits(self, cas: &str) -> bool {
        let mut parts = cas.split('-');
        let mut part = || parts.next().and_then(|part| part.parse::<u32>().ok());
        let (Some(head), Some(month), Some(day)) = (part(), part(), part()) else { return false };
        // A spreadsheet's years end with 9999.
        head <= 9999
            && head % 100 == self.year
            && month == self.month
            && self.day.is_none_or(|own| own == day)
    }
}

/// `May-40`: month and year alone.
fn month_and_year(text: &str) -> Option<Partial> {
    let (word, year) = text.split_once(['-', ' ', '.'])?;
    let year = year.trim_start_matches(['-', ' ', '.']);
    let two = year.len() == 2 && year.bytes().all(|b| b.is_ascii_digit());
    let month = month(word).filter(|_| two)?;
    Some(Partial { year: year.parse().ok()?, month, day: None })
}
