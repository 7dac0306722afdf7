//! The head of a block: the row that names what stands across.

use std::collections::BTreeMap;

use super::Context;
use super::title::{Named, is_unit, named};
use crate::intake::date::{DateForm, DateText, date};
use crate::intake::header::mapping;
use crate::intake::layout::own_cells;
use crate::intake::split::Line;
use crate::ledger::CrossTabProblem;
use crate::site::{Column, DateOrder};

/// A row of more filled cells than this is no head (judgement: forty years of weekly dates).
const MOST_HEADS: usize = 2_048;
/// How many rows below a head show what a column holds (judgement).
const LOOK_BELOW: usize = 50;

/// A head, its columns told apart.
#[derive(Clone, Debug)]
pub(super) struct Head {
    /// The row's cells.
    pub(super) cells: Vec<String>,
    /// The row.
    pub(super) line: u64,
    /// What stands across.
    pub(super) across: Column,
    /// The columns across.
    pub(super) columns: Vec<usize>,
    /// The columns that say something about their whole row.
    pub(super) left: BTreeMap<Column, usize>,
    /// Columns whose meaning the head does not say.
    pub(super) open: Vec<usize>,
    /// Columns that are not used.
    pub(super) unused: Vec<usize>,
    /// The analyte that a corner cell names.
    pub(super) corner: Option<Named>,
    /// The units of a row below the head, by column.
    pub(super) units: BTreeMap<usize, String>,
}

/// Whether a text is a date, in whichever order.
pub(super) fn is_date(text: &str, context: &Context<'_>) -> bool {
    let form = DateForm {
        order: context.rule.date_order.or(Some(DateOrder::DayMonthYear)),
        two_digit_years: context.rule.two_digit_years,
        serials: context.rule.serial_dates,
    };
    let other =
        DateForm { order: context.rule.date_order.or(Some(DateOrder::MonthDayYear)), ..form };
    !text.is_empty()
        && (matches!(date(text, form), DateText::Date(..))
            || matches!(date(text, other), DateText::Date(..)))
}

/// The head that a row is, if it is one.
///
/// # Errors
/// [`CrossTabProblem::Lacks`] where analytes stand across dates and no column holds the well.
pub(super) fn head(
    lines: &[Line],
    at: usize,
    context: &Context<'_>,
) -> Result<Option<Head>, CrossTabProblem> {
    let cells = own_cells(&lines[at]);
    let filled = cells.iter().filter(|cell| !cell.is_empty()).count();
    if !(2..=MOST_HEADS).contains(&filled) {
        return Ok(None);
    }
    let Ok(found) = mapping(cells.iter().map(String::as_str), &context.rule.columns) else {
        return Ok(None);
    };
    if found.cells.contains_key(&Column::Result) {
        return Ok(None);
    }
    let free: Vec<usize> = found.unused.iter().map(|(at, _)| *at).collect();
    let mut head = Head {
        line: lines[at].line,
        across: Column::Date,
        columns: Vec::new(),
        left: found.cells,
        open: Vec::new(),
        unused: Vec::new(),
        corner: None,
        units: BTreeMap::new(),
        cells,
    };
    let below = &lines[at + 1..];
    let is = head.dates_across(&free, below, context)
        || head.analytes_across(&free, below, context)
        || head.wells_across(&free, below, context)?;
    Ok(is.then_some(head))
}

impl Head {
    fn declared(&self, column: Column, context: &Context<'_>) -> bool {
        context.rule.columns.contains_key(&column)
    }

    /// A word such as `Date` in the corner may name what stands across rather than its column.
    fn open_label(&mut self, column: Column, context: &Context<'_>) {
        if !self.declared(column, context)
            && let Some(at) = self.left.remove(&column)
        {
            self.open.push(at);
        }
    }

    fn dates_across(&mut self, free: &[usize], below: &[Line], context: &Context<'_>) -> bool {
        if self.declared(Column::Date, context) {
            return false;
        }
        let dates: Vec<usize> =
            free.iter().copied().filter(|at| is_date(&self.cells[*at], context)).collect();
        let Some(&first) = dates.first() else { return false };
        let label_first = self.left.get(&Column::Date).is_none_or(|at| *at < first);
        let named = [Column::Well, Column::Analyte].iter().any(|key| self.left.contains_key(key));
        // A row whose next one has a date in the same column is a record.
        let record = below.first().is_some_and(|line| {
            dates.iter().any(|at| is_date(line.cells.get(*at).unwrap_or_default().trim(), context))
        });
        if !label_first || record || (dates.len() < 2 && !named) {
            return false;
        }
        self.across = Column::Date;
        self.open_label(Column::Date, context);
        self.open.extend(free.iter().copied().filter(|at| *at < first));
        self.open.extend(headless(&self.cells, first, below));
        self.open.sort_unstable();
        self.unused.extend(free.iter().copied().filter(|at| *at > first && !dates.contains(at)));
        self.columns = dates;
        self.take_corner(context);
        true
    }

    fn analytes_across(&mut self, free: &[usize], below: &[Line], context: &Context<'_>) -> bool {
        let keyed = [Column::Well, Column::Date].iter().all(|key| self.left.contains_key(key));
        if !keyed || self.left.contains_key(&Column::Analyte) {
            return false;
        }
        let declared = [Column::Well, Column::Date].iter().all(|key| self.declared(*key, context));
        let analyte = |at: &usize| {
            context.known.is_analyte(&self.cells[*at])
                || below
                    .first()
                    .is_some_and(|line| is_unit(line.cells.get(*at).unwrap_or_default()))
        };
        if !free.iter().any(analyte) && (!declared || free.is_empty()) {
            return false;
        }
        let numbers = |at: &usize| {
            below.iter().take(LOOK_BELOW).any(|line| {
                let cell = line.cells.get(*at).unwrap_or_default().trim();
                cell.trim_start_matches(['<', '>', ' ', '.'])
                    .starts_with(|c: char| c.is_ascii_digit())
            })
        };
        let (columns, unused) = free.iter().partition(|at| analyte(at) || numbers(at));
        self.across = Column::Analyte;
        (self.columns, self.unused) = (columns, unused);
        self.unit_row(below);
        true
    }

    /// A row of units below a head of analytes.
    fn unit_row(&mut self, below: &[Line]) {
        let Some(line) = below.first() else { return };
        let cells = own_cells(line);
        let filled: Vec<usize> = (0..cells.len()).filter(|at| !cells[*at].is_empty()).collect();
        let all = filled.iter().all(|at| self.columns.contains(at) && is_unit(&cells[*at]));
        if all && !filled.is_empty() {
            self.units = filled.into_iter().map(|at| (at, cells[at].clone())).collect();
        }
    }

    fn wells_across(
        &mut self,
        free: &[usize],
        below: &[Line],
        context: &Context<'_>,
    ) -> Result<bool, CrossTabProblem> {
        if self.declared(Column::Well, context) {
            return Ok(false);
        }
        let dated = |at: usize| {
            let cell = below.first().and_then(|line| line.cells.get(at)).unwrap_or_default();
            is_date(cell.trim(), context)
        };
        // The corner may be empty, hold the analyte, or say `Well` of what stands across.
        let label = self.left.get(&Column::Well).copied();
        let date = match self.left.get(&Column::Date) {
            Some(&at) => at,
            None => label.unwrap_or(0),
        };
        let own = is_date(&self.cells[date], context);
        if own || !dated(date) || label.is_some_and(|at| at != date) {
            return Ok(false);
        }
        let columns: Vec<usize> = free.iter().copied().filter(|at| *at > date).collect();
        if columns.is_empty() || columns.iter().any(|at| is_date(&self.cells[*at], context)) {
            return Ok(false);
        }
        let analytes = columns.iter().any(|at| context.known.is_analyte(&self.cells[*at]));
        if analytes && !self.left.contains_key(&Column::Analyte) {
            return Err(self.lacks_across(Column::Analyte, Column::Well));
        }
        let names = columns.iter().map(|at| self.cells[*at].as_str());
        if context.rule.layout.is_none() && !context.known.are_wells(names) {
            return Ok(false);
        }
        self.across = Column::Well;
        self.left.remove(&Column::Well);
        self.left.insert(Column::Date, date);
        self.open = free.iter().copied().filter(|at| *at < date).collect();
        self.open.extend(headless(&self.cells, date, below));
        self.columns = columns;
        let corner = self.cells[date].clone();
        if context.known.is_analyte(&corner) {
            self.corner = Some(named(&corner));
        }
        self.take_corner(context);
        Ok(true)
    }

    /// An analyte in the corner names the block's.
    fn take_corner(&mut self, context: &Context<'_>) {
        let cells = &self.cells;
        let named_by = self.open.iter().map(|at| &cells[*at]);
        let mut corners = named_by.filter(|cell| context.known.is_analyte(cell));
        let corner = corners.next_back().map(|cell| named(cell));
        self.corner = self.corner.take().or(corner);
    }

    /// Gives the open columns their meaning by what else is known; those left over are not used.
    ///
    /// # Errors
    /// [`CrossTabProblem`] where more than one meaning is left, or marks have no one result.
    pub(super) fn settle(
        mut self,
        titled: bool,
        below: &[Line],
        context: &Context<'_>,
    ) -> Result<Self, CrossTabProblem> {
        let named = self.corner.is_some() || titled;
        let holds_analytes = |at: &usize| {
            let cells = below.iter().take(LOOK_BELOW).filter_map(|line| line.cells.get(*at));
            let mut cells = cells.map(str::trim).filter(|cell| !cell.is_empty()).peekable();
            cells.peek().is_some() && cells.all(|cell| context.known.is_known(cell))
        };
        if self.across != Column::Analyte && !self.left.contains_key(&Column::Analyte) && !named {
            let analytes: Vec<usize> = self.open.iter().copied().filter(holds_analytes).collect();
            let [at] = analytes[..] else { return Err(self.lacks(Column::Analyte)) };
            self.left.insert(Column::Analyte, at);
            self.open.retain(|open| *open != at);
        }
        if self.across == Column::Date && !self.left.contains_key(&Column::Well) {
            let [at] = self.open[..] else { return Err(self.lacks(Column::Well)) };
            if holds_analytes(&at) {
                return Err(self.lacks(Column::Well));
            }
            self.left.insert(Column::Well, at);
            self.open.clear();
        }
        self.unused.append(&mut self.open);
        self.unused.retain(|at| !self.left.values().any(|used| used == at));
        let limits = [Column::ReportingLimit, Column::DetectionLimit];
        let marks = [Column::Qualifier, Column::DetectionCondition, Column::Uncertainty];
        let shared = marks.iter().chain(limits.iter().filter(|_| self.across == Column::Analyte));
        for column in shared {
            if let Some(at) = self.left.get(column).filter(|_| self.columns.len() > 1) {
                let header = self.cells[*at].clone();
                return Err(CrossTabProblem::SharedMark { line: self.line, header });
            }
        }
        Ok(self)
    }

    fn lacks(&self, lacks: Column) -> CrossTabProblem {
        self.lacks_across(self.across, lacks)
    }

    fn lacks_across(&self, across: Column, lacks: Column) -> CrossTabProblem {
        CrossTabProblem::Lacks { line: self.line, across, lacks, found: self.cells.clone() }
    }
}

/// Columns left of the first one across that have no header and do have cells.
fn headless(cells: &[String], first: usize, below: &[Line]) -> Vec<usize> {
    let filled = |at: &usize| {
        below
            .iter()
            .take(LOOK_BELOW)
            .any(|line| line.cells.get(*at).is_some_and(|cell| !cell.trim().is_empty()))
    };
    (0..first).filter(|at| cells[*at].is_empty()).filter(filled).collect()
}
