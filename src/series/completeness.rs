//! What each round should hold by `[[expected]]`, against what was received.

use std::collections::{BTreeMap, BTreeSet};

use chrono::{Datelike, NaiveDate};

use super::quality::is_of_the_well;
use super::round::{Round, RoundRules};
use crate::intake::texts::Code;
use crate::intake::{FrameError, Tidy};
use crate::ledger::{Fate, NonResult, QualityControl};
use crate::site::{Expected, Site};

/// Expected against received.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Completeness {
    /// Whether the site file says what to expect at all.
    pub asked: Asked,
    /// The rounds from the first with data to the current one, the oldest first.
    pub rounds: Vec<RoundCount>,
    /// What the current round lacks: by well, then analyte.
    pub lacking: Vec<Lacking>,
}

/// Whether the site file has an `[[expected]]`.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Asked {
    /// It says what each round should hold.
    Yes,
    /// It says nothing.
    #[default]
    No,
}

/// One round in numbers of wells × analytes.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct RoundCount {
    /// A date inside the round, for its name.
    pub date: NaiveDate,
    /// How many were due.
    pub due: usize,
    /// How many of them have a result that can be used.
    pub received: usize,
    /// How many have records, none of which can be used.
    pub not_used: usize,
    /// How many have no result and a reason for it.
    pub explained: usize,
    /// How many have nothing at all.
    pub missing: usize,
}

/// Something due that the current round lacks.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Lacking {
    /// The well.
    pub well: String,
    /// The analyte.
    pub analyte: String,
    /// Why, where a record says it.
    pub why: Why,
}

/// Why a round lacks a result.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Why {
    /// Nobody says.
    Unknown,
    /// A record says why there is no result.
    Gap(NonResult),
    /// There is a record, and its fate is not to be used.
    NotUsed(Fate),
}

/// What is known of one well and analyte in one round.
#[derive(Clone, Copy, Debug, Default)]
struct Held {
    dates: usize,
    gap: Option<NonResult>,
    not_used: Option<Fate>,
}

/// The account of records by well, analyte (0: the well as a whole) and round.
type Account = BTreeMap<(Code, Code), BTreeMap<Round, Held>>;

/// Holds what arrived against what the site file expects.
///
/// # Errors
/// [`FrameError`], which would be a fault of this program.
pub fn completeness(
    tidy: &Tidy,
    site: &Site,
    as_of: NaiveDate,
) -> Result<Completeness, FrameError> {
    if site.expected.is_empty() {
        return Ok(Completeness::default());
    }
    let rules = RoundRules { length: site.settings.round };
    let labels = labels(tidy, rules, site.settings.round_grace_days, as_of)?;
    let account = account(tidy, &labels, as_of)?;
    let mut dates: BTreeMap<Round, NaiveDate> = BTreeMap::new();
    for ((_, date), round) in &labels {
        if rules.of(*date) == *round {
            dates.insert(*round, *date);
        }
    }
    let current = current_round(&labels, rules, as_of);
    dates.entry(current).or_insert(as_of);
    let due = wanted(site, tidy);
    let mut found = Completeness { asked: Asked::Yes, ..Completeness::default() };
    let rounds: Vec<(Round, NaiveDate)> =
        dates.into_iter().filter(|(round, _)| *round <= current).collect();
    for (round, date) in rounds {
        let mut count =
            RoundCount { date, due: 0, received: 0, not_used: 0, explained: 0, missing: 0 };
        for (well, analyte, well_code, analyte_code, every) in &due {
            let codes = (*well_code, *analyte_code);
            // Before its first record nothing was asked of a well, but for the current round.
            let begun = account
                .get(&codes)
                .and_then(|rounds| rounds.keys().next())
                .is_some_and(|first| *first <= round);
            if !begun && round != current {
                continue;
            }
            let Some(needed) = dates_due(&account, codes, round, *every, rules) else { continue };
            count.due += 1;
            let why = match why(&account, codes, round, needed) {
                None => {
                    count.received += 1;
                    continue;
                }
                Some(why) => why,
            };
            match why {
                Why::Unknown => count.missing += 1,
                Why::Gap(_) => count.explained += 1,
                Why::NotUsed(_) => count.not_used += 1,
            }
            if round == current {
                let (well, analyte) = (well.clone(), analyte.clone());
                found.lacking.push(Lacking { well, analyte, why });
            }
        }
        found.rounds.push(count);
    }
    Ok(found)
}

/// Every well and analyte that some `[[expected]]` names, with the shortest interval of those that
/// do, and the codes under which records have them (0 where none has).
fn wanted(site: &Site, tidy: &Tidy) -> Vec<(String, String, Code, Code, u32)> {
    let mut every: BTreeMap<(String, String), u32> = BTreeMap::new();
    for Expected { wells, analytes, every_months } in &site.expected {
        let all_wells = || site.wells.iter().map(|well| well.name.clone()).collect();
        let all_analytes = || site.analytes.iter().map(|a| a.name.clone()).collect();
        let wells: Vec<String> = if wells.is_empty() { all_wells() } else { wells.clone() };
        let analytes: Vec<String> =
            if analytes.is_empty() { all_analytes() } else { analytes.clone() };
        for well in &wells {
            for analyte in &analytes {
                let months = every.entry((well.clone(), analyte.clone())).or_insert(*every_months);
                *months = (*months).min(*every_months);
            }
        }
    }
    let code = |name: &str| tidy.texts.known(name).unwrap_or_default();
    every
        .into_iter()
        .map(|((well, analyte), every)| {
            let codes = (code(&well), code(&analyte));
            (well, analyte, codes.0, codes.1, every)
        })
        .collect()
}

/// How many dates a round should hold of a well and analyte; none where it is not due because an
/// earlier round within the interval holds it.
fn dates_due(
    account: &Account,
    codes: (Code, Code),
    round: Round,
    every: u32,
    rules: RoundRules,
) -> Option<usize> {
    let months = u32::try_from(rules.months()).unwrap_or(1);
    if every <= months {
        return usize::try_from(months / every.max(1)).ok();
    }
    let back = i32::try_from(every / months).unwrap_or(i32::MAX);
    let of = account.get(&codes);
    let earlier = of.is_some_and(|rounds| {
        rounds.range(round.back(back.saturating_sub(1))..round).any(|(_, held)| held.dates > 0)
    });
    (!earlier).then_some(1)
}

/// Why a round lacks what is due; none where it holds it.
fn why(account: &Account, codes: (Code, Code), round: Round, needed: usize) -> Option<Why> {
    let held = account.get(&codes).and_then(|rounds| rounds.get(&round)).copied();
    let held = held.unwrap_or_default();
    if held.dates >= needed {
        return None;
    }
    let of_well = account.get(&(codes.0, 0)).and_then(|rounds| rounds.get(&round));
    let gap = held
        .gap
        .or_else(|| of_well.and_then(|held| held.gap))
        .or_else(|| destroyed(account, codes.0, round));
    Some(match (held.not_used, gap) {
        (Some(fate), _) => Why::NotUsed(fate),
        (None, Some(gap)) => Why::Gap(gap),
        (None, None) => Why::Unknown,
    })
}

/// A well that was destroyed stays so, until it holds something again.
fn destroyed(account: &Account, well: Code, round: Round) -> Option<NonResult> {
    let rounds = account.get(&(well, 0))?;
    let gone = |held: &Held| held.gap == Some(NonResult::Destroyed);
    let (since, _) = rounds.range(..round).rev().find(|(_, held)| gone(held))?;
    let again = account
        .range((well, 0)..=(well, Code::MAX))
        .any(|(_, rounds)| rounds.range(*since..=round).skip(1).any(|(_, held)| held.dates > 0));
    (!again).then_some(NonResult::Destroyed)
}

/// What each round holds of every well and analyte.
fn account(
    tidy: &Tidy,
    labels: &BTreeMap<(Code, NaiveDate), Round>,
    as_of: NaiveDate,
) -> Result<Account, FrameError> {
    let mut account = Account::new();
    let mut counted: BTreeSet<(Code, Code, NaiveDate)> = BTreeSet::new();
    for record in tidy.arrived()? {
        let Some(date) = record.date.filter(|date| *date <= as_of) else { continue };
        let Some(round) = labels.get(&(record.well, date)).copied() else { continue };
        let fate = tidy.ledger.fate(record.record);
        match fate {
            Fate::Candidate | Fate::Used(_) | Fate::Merged(_) | Fate::Decision(_) => {
                if counted.insert((record.well, record.analyte, date)) {
                    of(&mut account, record.well, record.analyte, round).dates += 1;
                }
            }
            Fate::NonResult(gap) => {
                of(&mut account, record.well, record.analyte, round).gap = Some(gap);
                if is_of_the_well(gap) {
                    of(&mut account, record.well, 0, round).gap = Some(gap);
                }
            }
            Fate::SetAside(_) if record.analyte != 0 => {
                of(&mut account, record.well, record.analyte, round).not_used = Some(fate);
            }
            Fate::SetAside(_) | Fate::QualityControl(_) => {}
        }
    }
    Ok(account)
}

/// What is held of a well and analyte in a round, to be added to.
fn of(account: &mut Account, well: Code, analyte: Code, round: Round) -> &mut Held {
    account.entry((well, analyte)).or_default().entry(round).or_default()
}

/// The round under which each well's dates are counted: the calendar's, or the neighbouring one for
/// a date within the days of grace of an edge, if its well has another date in this round and none
/// in that one.
fn labels(
    tidy: &Tidy,
    rules: RoundRules,
    grace: u32,
    as_of: NaiveDate,
) -> Result<BTreeMap<(Code, NaiveDate), Round>, FrameError> {
    let mut dates: BTreeMap<Code, BTreeSet<NaiveDate>> = BTreeMap::new();
    for record in tidy.arrived()? {
        let fate = tidy.ledger.fate(record.record);
        let counts = !matches!(
            fate,
            Fate::QualityControl(
                QualityControl::Blank | QualityControl::Spike | QualityControl::Reference
            )
        );
        if let Some(date) = record.date.filter(|date| counts && *date <= as_of && record.well != 0)
        {
            dates.entry(record.well).or_default().insert(date);
        }
    }
    let mut labels = BTreeMap::new();
    for (well, dates) in dates {
        let mut of_round: BTreeMap<Round, usize> = BTreeMap::new();
        for date in &dates {
            *of_round.entry(rules.of(*date)).or_default() += 1;
        }
        for date in dates {
            let round = rules.of(date);
            let others = of_round.get(&round).is_some_and(|dates| *dates > 1);
            let days = chrono::Days::new(u64::from(grace));
            let edges = [date.checked_sub_days(days), date.checked_add_days(days)];
            let mut beside = edges.into_iter().flatten().map(|edge| rules.of(edge));
            let free = beside.find(|edge| *edge != round && !of_round.contains_key(edge));
            let label = free.filter(|_| others && grace > 0).unwrap_or(round);
            labels.insert((well, date), label);
        }
    }
    Ok(labels)
}

/// The as-of date's own round where it is the last day of one, else that of the newest record.
fn current_round(
    labels: &BTreeMap<(Code, NaiveDate), Round>,
    rules: RoundRules,
    as_of: NaiveDate,
) -> Round {
    let of_as_of = rules.of(as_of);
    let ends = as_of.succ_opt().is_none_or(|next| next.day() == 1 && rules.of(next) != of_as_of);
    let newest = labels.keys().map(|(_, date)| rules.of(*date)).max();
    if ends { of_as_of } else { newest.unwrap_or(of_as_of) }
}
