//! The order of day and month that breaks within a file.
//!
//! Where the column proves both orders, that is a fact. Where it does not, a stretch of dates is
//! suspected that lie far from every date of the file that can be read one way only, while with day
//! and month exchanged they lie beside one.

use std::collections::BTreeSet;

use chrono::{Datelike, NaiveDate};

use super::{Scope, Sentinel};
use crate::intake::{FrameError, Tidy};
use crate::ledger::RecordId;
use crate::ledger::told::Suspicion;

/// Days within which two dates belong to one round of sampling (judgement: a field crew's week).
const BESIDE: i64 = 7;
/// Days beyond which they do not.
const APART: i64 = 21;
/// How many dates must agree before a stretch is suspected (judgement: one is an odd visit).
const FEWEST: usize = 3;

/// Which part stands first.
#[derive(Clone, Copy, PartialEq, Eq)]
enum First {
    Day,
    Month,
}

/// One written date of a file.
struct Written {
    record: RecordId,
    read: Option<NaiveDate>,
    /// The order that its own parts prove; none where both are at most 12.
    proves: Option<First>,
    /// The date with day and month exchanged, where that is a date and another one.
    exchanged: Option<NaiveDate>,
}

/// Looks at the written dates of each file.
///
/// # Errors
/// [`FrameError`], which would be a fault of this program.
pub fn look(tidy: &Tidy) -> Result<Vec<Sentinel>, FrameError> {
    let mut found = Vec::new();
    let mut of: Vec<Written> = Vec::new();
    let mut current = 0;
    // Records stand file after file, so that one file's dates are held at a time.
    for record in tidy.arrived()? {
        if record.file != current {
            found.extend(of_file(current, &of));
            of.clear();
            current = record.file;
        }
        let Some((first, second)) = parts(tidy.texts.text(record.date_written)) else { continue };
        let proves = match (first > 12, second > 12) {
            (true, false) => Some(First::Day),
            (false, true) => Some(First::Month),
            _ => None,
        };
        let exchanged = record
            .date
            .and_then(|date| NaiveDate::from_ymd_opt(date.year(), date.day(), date.month()))
            .filter(|other| proves.is_none() && Some(*other) != record.date);
        of.push(Written { record: record.record, read: record.date, proves, exchanged });
    }
    found.extend(of_file(current, &of));
    Ok(found)
}

fn of_file(file: u32, dates: &[Written]) -> Option<Sentinel> {
    let records = proved_both(dates).or_else(|| misplaced(dates))?;
    let mut one = Sentinel::of(Suspicion::DayMonth, Scope::File, records);
    one.file = Some(file);
    Some(one)
}

/// Records that prove the order that fewer prove, if both are proved.
fn proved_both(dates: &[Written]) -> Option<Vec<RecordId>> {
    let proving = |order| dates.iter().filter(move |one| one.proves == Some(order));
    let (day, month) = (proving(First::Day).count(), proving(First::Month).count());
    if day == 0 || month == 0 {
        return None;
    }
    // Of equals the order that came second is the one that broke.
    let first = dates.iter().find_map(|one| one.proves)?;
    let other = match day.cmp(&month) {
        std::cmp::Ordering::Less => First::Day,
        std::cmp::Ordering::Greater => First::Month,
        std::cmp::Ordering::Equal if first == First::Day => First::Month,
        std::cmp::Ordering::Equal => First::Day,
    };
    Some(proving(other).map(|one| one.record).collect())
}

/// Records whose date lies beside the file's proved dates only with day and month exchanged, if
/// they are several and none between them says the contrary.
fn misplaced(dates: &[Written]) -> Option<Vec<RecordId>> {
    let proved: BTreeSet<NaiveDate> =
        dates.iter().filter(|one| one.proves.is_some()).filter_map(|one| one.read).collect();
    let off = |date: NaiveDate| {
        let before = proved.range(..=date).next_back();
        let after = proved.range(date..).next();
        let days = |other: &NaiveDate| date.signed_duration_since(*other).num_days().abs();
        [before, after].into_iter().flatten().map(days).min()
    };
    let beside = |date: NaiveDate| off(date).is_some_and(|days| days <= BESIDE);
    let apart = |date: NaiveDate| off(date).is_some_and(|days| days > APART);
    let mut stretch: Vec<&Written> = Vec::new();
    let mut best: Vec<&Written> = Vec::new();
    for one in dates {
        let (Some(read), Some(exchanged)) = (one.read, one.exchanged) else { continue };
        if apart(read) && beside(exchanged) {
            stretch.push(one);
            if stretch.len() > best.len() {
                best.clone_from(&stretch);
            }
        } else if beside(read) && apart(exchanged) {
            stretch.clear();
        }
    }
    (best.len() >= FEWEST).then(|| best.iter().map(|one| one.record).collect())
}

/// The first two numbers of a date like `05/02/2024`; none where the year stands first or a month
/// is named.
fn parts(text: &str) -> Option<(u32, u32)> {
    let date = text.trim().split([' ', 'T', 't']).next()?;
    let mut parts = date.split(['/', '-', '.']);
    let mut next = || parts.next().filter(|part| (1..=2).contains(&part.len()));
    let (first, second) = (next()?.parse().ok()?, next()?.parse().ok()?);
    parts.next().filter(|year| year.chars().all(|c| c.is_ascii_digit()))?;
    Some((first, second))
}
