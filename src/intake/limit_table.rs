//! Detection-limit tables of the open standard, joined to their results.

use std::collections::BTreeMap;

use super::limit_types::WrittenLimit;
use super::split::Line;
use super::table::Table;
use crate::site::Column;

/// Well, sample and analyte as written: what a limit and its result share.
type Key = [String; 3];

/// One row of a detection-limit table.
#[derive(Clone, Debug, PartialEq)]
pub struct LimitRow {
    /// Well, sample and analyte.
    pub key: Key,
    /// The result's identifier; empty where the table has none.
    pub result_id: String,
    /// The limit.
    pub limit: WrittenLimit,
}

/// All detection-limit tables of a run.
#[derive(Clone, Debug, Default)]
pub struct LimitTables {
    rows: Vec<(String, LimitRow)>,
    matched: Vec<bool>,
    by_key: BTreeMap<Key, Vec<usize>>,
}

impl LimitTables {
    /// Adds a row of a file.
    pub fn push(&mut self, file: &str, row: LimitRow) {
        self.by_key.entry(row.key.clone()).or_default().push(self.rows.len());
        self.rows.push((file.to_owned(), row));
        self.matched.push(false);
    }

    /// The rows of one result: of equal result identifiers where both have one; without, those of
    /// well, sample and analyte, if they speak of one result alone.
    fn places(&self, table: &Table, line: &Line) -> Vec<usize> {
        if self.rows.is_empty() {
            return Vec::new();
        }
        let key = [Column::Well, Column::SampleId, Column::Analyte]
            .map(|column| table.cell(line, column).to_owned());
        let own = table.mapping.open.result_id.and_then(|at| line.cells.get(at));
        let own = own.map(str::trim).unwrap_or_default();
        let Some(places) = self.by_key.get(&key).filter(|_| !key[1].is_empty()) else {
            return Vec::new();
        };
        let id = |place: usize| self.rows[place].1.result_id.as_str();
        let named: Vec<usize> = places.iter().copied().filter(|&p| id(p) == own).collect();
        if !own.is_empty() && !named.is_empty() {
            return named;
        }
        let mut ids: Vec<&str> = places.iter().map(|&place| id(place)).collect();
        ids.sort_unstable();
        ids.dedup();
        let unnamed = own.is_empty() || ids == [""];
        if unnamed && ids.len() == 1 { places.clone() } else { Vec::new() }
    }

    /// The limits of one result, each with its table's file.
    pub fn of<'a>(
        &'a self,
        table: &Table,
        line: &Line,
    ) -> impl Iterator<Item = (&'a str, &'a WrittenLimit)> + use<'a> {
        let places = self.places(table, line);
        places.into_iter().map(|place| {
            let (file, row) = &self.rows[place];
            (file.as_str(), &row.limit)
        })
    }

    /// Notes which rows have their result in a table of results; how many of its records have one.
    pub fn note(&mut self, table: &Table) -> usize {
        let mut records = 0;
        for line in &table.lines {
            let places = self.places(table, line);
            records += usize::from(!places.is_empty());
            for place in places {
                self.matched[place] = true;
            }
        }
        records
    }

    /// Whether each row found its result, in the order of the rows.
    #[must_use]
    pub fn matched(&self) -> &[bool] {
        &self.matched
    }
}
