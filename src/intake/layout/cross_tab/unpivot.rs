//! The rows of a cross-tab in order: titles, heads, and cells that become records.

use std::collections::{BTreeMap, BTreeSet};

use csv::StringRecord;

use super::head::{Head, head, is_date};
use super::title::{Named, Title, named};
use super::{Context, KEYS, describe};
use crate::intake::address::letters;
use crate::intake::layout::long::HEADER_WITHIN;
use crate::intake::layout::own_cells;
use crate::intake::split::{Filled, Line};
use crate::intake::table::Described;
use crate::ledger::CrossTabProblem;
use crate::site::Column;

/// What a cross-tab gave.
pub(super) struct Unpivot {
    /// One line a filled cell.
    pub(super) lines: Vec<Line>,
    /// Empty cells.
    pub(super) empty: usize,
    /// What stands across in the first block.
    pub(super) across: Column,
    /// What lines beside the blocks say.
    pub(super) beside: Vec<String>,
    /// What was read as what.
    pub(super) described: Vec<Described>,
    /// Columns beside the keys, in the order of the made records.
    sides: Vec<Column>,
    /// Bytes read and bytes made: what stands at the left is written into every record.
    bytes: [usize; 2],
}

/// Any cross-tab may make this many bytes of records, and so many more for each byte read
/// (judgement: names are a few times as long as results).
const FREE_BYTES: usize = 32 << 20;
const MADE_A_BYTE: usize = 32;

/// The titles above a block.
#[derive(Default)]
struct Titles {
    analytes: Vec<(u64, Named)>,
    unit: Option<String>,
    /// Whether rows of a block have come since.
    used: bool,
    /// What stands at the left of those rows, each with its line.
    rows: BTreeMap<String, u64>,
    /// The last of those rows that says one thing and has no result.
    lone: Option<(u64, String)>,
}

impl Titles {
    fn add(&mut self, line: u64, title: Title) {
        if self.used {
            *self = Self::default();
        }
        self.analytes.extend(title.analyte.map(|named| (line, named)));
        self.unit = title.unit.or(self.unit.take());
    }

    /// An analyte in the corner is one more title.
    fn corner(&mut self, head: &Head) {
        self.analytes.extend(head.corner.clone().map(|named| (head.line, named)));
    }

    /// Looks at a row of the block. A line that says one thing and has no result may be a well
    /// without results, or a title whose analyte is not known; where the rows below it repeat those
    /// above it, it is the second, and nothing says which analyte they are of.
    fn row(&mut self, line: u64, head: &Head, own: &[String]) -> Result<(), CrossTabProblem> {
        self.used = true;
        if head.across == Column::Analyte || head.left.contains_key(&Column::Analyte) {
            return Ok(());
        }
        let mut filled = own.iter().enumerate().filter(|(_, cell)| !cell.is_empty());
        let Some((at, first)) = filled.next() else { return Ok(()) };
        if filled.next().is_none() && head.columns.first().is_some_and(|inside| at < *inside) {
            self.lone = Some((line, first.clone()));
            return Ok(());
        }
        let left: Vec<&str> =
            head.left.values().filter_map(|at| own.get(*at)).map(String::as_str).collect();
        let before = self.rows.insert(left.join("\u{1f}"), line);
        match (before, &self.lone) {
            (Some(before), Some((lone, text))) if before < *lone => {
                Err(CrossTabProblem::LostTitle {
                    line: *lone,
                    text: text.clone(),
                    repeats: [before, line],
                })
            }
            _ => Ok(()),
        }
    }

    /// The one analyte named above the block.
    fn analyte(&self) -> Result<Option<&Named>, CrossTabProblem> {
        let Some((line, first)) = self.analytes.first() else { return Ok(None) };
        match self.analytes.iter().find(|(_, named)| named != first) {
            None => Ok(Some(first)),
            Some((other, second)) => Err(CrossTabProblem::TwoTitles {
                lines: [*line, *other],
                titles: [first.name.clone(), second.name.clone()],
            }),
        }
    }
}

impl Unpivot {
    /// Reads all rows; none where no head stands near the top or nothing stands below one.
    pub(super) fn read(
        lines: &[Line],
        context: &Context<'_>,
    ) -> Result<Option<Self>, CrossTabProblem> {
        let mut first = None;
        for at in 0..lines.len().min(HEADER_WITHIN) {
            first = head(lines, at, context)?;
            if first.is_some() {
                break;
            }
        }
        let Some(first) = first else { return Ok(None) };
        let mut out = Self {
            lines: Vec::new(),
            empty: 0,
            across: first.across,
            beside: Vec::new(),
            described: Vec::new(),
            sides: Vec::new(),
            bytes: [0, 0],
        };
        let mut titles = Titles::default();
        let mut titled = BTreeSet::new();
        // The head of the rows below it, once its columns are settled.
        let (mut waiting, mut block): (Option<Head>, Option<Head>) = (None, None);
        let mut at = 0;
        while let Some(line) = lines.get(at) {
            at += 1;
            let own = own_cells(line);
            let filled: Vec<usize> = (0..own.len()).filter(|i| !own[*i].is_empty()).collect();
            if first.may_be_again(line, &own, context)
                && let Some(found) = head(lines, at - 1, context)?
            {
                at += usize::from(!found.units.is_empty());
                // A title speaks for one block: the next one has its own or none.
                if titles.used {
                    titles = Titles::default();
                }
                titles.corner(&found);
                titled.extend(found.corner.iter().map(|named| named.name.clone()));
                waiting = Some(found);
                continue;
            }
            let before = waiting.as_ref().or(block.as_ref());
            let inside = before.and_then(|head| head.columns.first()).copied();
            let texts: Vec<&str> = filled.iter().map(|i| own[*i].as_str()).collect();
            if filled.first().is_some_and(|i| inside.is_none_or(|inside| *i < inside))
                && let Some(title) = context.known.title(&texts)
            {
                if let Some(analyte) = &title.analyte {
                    titled.insert(analyte.name.clone());
                }
                titles.add(line.line, title);
                continue;
            }
            if let Some(head) = waiting.take() {
                let named = titles.analyte()?.is_some();
                let head = head.settle(named, &lines[at - 1..], context)?;
                let more = head.left.keys().filter(|c| !KEYS.contains(c) && !out.sides.contains(c));
                let more: Vec<Column> = more.copied().collect();
                out.sides.extend(more);
                block = Some(head);
            }
            match &block {
                Some(head) => {
                    titles.row(line.line, head, &own)?;
                    if let ([alone], Some(inside)) = (&filled[..], head.columns.first())
                        && alone < inside
                    {
                        out.beside.push(own[*alone].clone());
                    }
                    out.row(line, head, titles.analyte()?, titles.unit.as_deref());
                    out.bytes[0] += line.cells.as_slice().len();
                    if out.bytes[1] > FREE_BYTES + MADE_A_BYTE * out.bytes[0] {
                        return Err(CrossTabProblem::LongNames { line: line.line });
                    }
                    if out.described.is_empty() {
                        out.described = head.described();
                    }
                }
                None => out.beside.extend(filled.first().map(|i| own[*i].clone())),
            }
        }
        out.described.extend(titled.iter().map(|name| describe(name, Column::Analyte.key())));
        Ok(block.is_some().then_some(out))
    }

    /// The columns of the made records.
    pub(super) fn columns(&self) -> Vec<Column> {
        KEYS.into_iter().chain(self.sides.iter().copied()).collect()
    }

    /// Every filled cell of a row becomes a record.
    fn row(&mut self, line: &Line, head: &Head, title: Option<&Named>, unit: Option<&str>) {
        let cell = |at: usize| line.cells.get(at).unwrap_or_default().trim();
        let left = |column: Column| head.left.get(&column).map_or("", |at| cell(*at));
        let taken: BTreeSet<usize> = head.left.values().chain(&head.unused).copied().collect();
        let analyte = match (head.left.contains_key(&Column::Analyte), title) {
            (true, _) => named(left(Column::Analyte)),
            (false, Some(title)) => title.clone(),
            (false, None) => named(""),
        };
        let from_left: Box<[Filled]> = line
            .filled
            .iter()
            .filter(|f| head.left.values().any(|at| *at == f.column as usize))
            .copied()
            .collect();
        let width = line.cells.len().max(head.columns.last().map_or(0, |last| last + 1));
        for at in (0..width).filter(|at| !taken.contains(at)) {
            let across = head.columns.binary_search(&at).is_ok();
            let merged = line.filled.iter().any(|f| f.column as usize == at);
            // A merged result is one result: only words such as DRY stand for every cell of it.
            let digits = cell(at).bytes().any(|b| b.is_ascii_digit());
            if cell(at).is_empty() || (merged && digits) {
                self.empty += usize::from(across);
                continue;
            }
            let heads = if across { head.cells[at].as_str() } else { "" };
            let over = named(if head.across == Column::Analyte { heads } else { "" });
            let (shown, own_unit) = match head.across {
                Column::Analyte => (&over, head.units.get(&at).unwrap_or(&over.unit)),
                _ => (&analyte, &analyte.unit),
            };
            let units = [left(Column::Unit), own_unit.as_str(), unit.unwrap_or_default()];
            let unit = units.into_iter().find(|unit| !unit.is_empty()).unwrap_or_default();
            let key = |column: Column| if head.across == column { heads } else { left(column) };
            let mut cells = StringRecord::new();
            for text in [key(Column::Well), &shown.name, key(Column::Date), cell(at), unit] {
                cells.push_field(text);
            }
            for side in &self.sides {
                cells.push_field(left(*side));
            }
            self.bytes[1] += cells.as_slice().len();
            self.lines.push(Line {
                column: u32::try_from(at + 1).unwrap_or(u32::MAX),
                filled: if merged { line.filled.clone() } else { from_left.clone() },
                ..Line::whole(line.line, cells)
            });
        }
    }
}

impl Head {
    /// Whether a row may be a head like this one, asked of every row and so cheap.
    fn may_be_again(&self, line: &Line, own: &[String], context: &Context<'_>) -> bool {
        let text = |at: usize| own.get(at).map_or("", String::as_str);
        let same = |at: usize| !self.cells[at].is_empty() && text(at) == self.cells[at];
        line.line == self.line
            || self.left.values().chain(&self.open).any(|at| same(*at))
            || match self.across {
                Column::Date => self.columns.first().is_some_and(|at| is_date(text(*at), context)),
                _ => self.columns.iter().all(|at| same(*at)),
            }
    }

    /// What the head's cells were read as.
    fn described(&self) -> Vec<Described> {
        let shown = |at: usize| match self.cells.get(at).map_or("", String::as_str) {
            "" => format!("column {}", letters(u32::try_from(at + 1).unwrap_or(u32::MAX))),
            text => text.to_owned(),
        };
        let used: BTreeMap<usize, &'static str> = self
            .left
            .iter()
            .map(|(column, at)| (*at, column.key()))
            .chain(self.unused.iter().map(|at| (*at, "")))
            .collect();
        let mut described: Vec<Described> =
            used.into_iter().map(|(at, column)| describe(&shown(at), column)).collect();
        if let Some(&first) = self.columns.first() {
            let text = match self.columns.len() {
                1 => shown(first),
                n => format!("{} and {} more across", shown(first), n - 1),
            };
            described.push(describe(&text, self.across.key()));
        }
        described
    }
}
