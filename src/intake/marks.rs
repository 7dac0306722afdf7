//! What qualifiers, detection condition and status of one record say together.

use chrono::NaiveDate;

use super::condition::{Condition, condition};
use super::qualifier::{Code as QualifierCode, Strictest, codes, usual};
use super::record::RecordReader;
use super::rows::{Dilution, Row};
use super::split::Line;
use super::texts::Texts;
use crate::ledger::{Fate, NonResult, SetAside, Told};
use crate::site::{Column, DecisionKind, Meaning, Qualifier};

/// What the marks of a record say together.
pub(super) struct Marks {
    /// The strictest meaning.
    pub(super) strictest: Option<Strictest>,
    /// Any of them says estimated.
    pub(super) estimated: bool,
    /// Diluted, or over the calibration.
    pub(super) dilution: Dilution,
    /// The fate of a record with a code that needs a legend.
    pub(super) unknown: Option<Fate>,
    /// The decision that said what a code means.
    pub(super) decided_by: Option<u16>,
}

impl RecordReader<'_> {
    /// What qualifiers, codes in the result cell, detection condition and status say.
    pub(super) fn marks(
        &self,
        line: &Line,
        row: &Row,
        day: Option<NaiveDate>,
        in_cell: &[String],
        texts: &Texts,
        told: &mut Vec<Told>,
    ) -> Result<Marks, Fate> {
        let mut marks = Marks {
            strictest: None,
            estimated: false,
            dilution: Dilution::None,
            unknown: None,
            decided_by: None,
        };
        let status = self.table.cell(line, Column::Status);
        if status.eq_ignore_ascii_case("rejected") {
            return Err(Fate::SetAside(SetAside::Rejected));
        }
        let decided = self
            .decided(DecisionKind::UseQualifier, row, day, texts)
            .and_then(|place| Some((place, self.site.decisions[usize::from(place)].means?)));
        let qualifier = texts.text(row.written.qualifier);
        for code in codes(qualifier).chain(in_cell.iter().map(String::as_str)) {
            let legend = self.legend(|q| q.code.as_deref() == Some(code));
            match legend.map_or_else(|| usual(code), QualifierCode::Means) {
                QualifierCode::Means(meaning) => marks.add(meaning, code, told),
                QualifierCode::NonDetectEstimated => {
                    marks.add(Meaning::NonDetect, code, told);
                    marks.estimated = true;
                }
                QualifierCode::HoldingTime => told.push(Told::HoldingTime),
                QualifierCode::NeedsLegend => match decided {
                    Some((place, meaning)) => {
                        marks.add(meaning, code, told);
                        marks.decided_by = Some(place);
                        told.push(Told::Decision {
                            id: self.site.decisions[usize::from(place)].id.clone(),
                        });
                    }
                    None => {
                        told.push(Told::UnknownQualifier { code: code.to_owned() });
                        marks.hold(Strictest::Unknown, SetAside::QualifierNeedsLegend);
                        if code.eq_ignore_ascii_case("e") {
                            marks.dilution = Dilution::OverCalibration;
                        }
                    }
                },
            }
        }
        let words = self.table.cell(line, Column::DetectionCondition);
        if !words.is_empty() {
            let legend = self.legend(|q| q.condition.as_deref() == Some(words));
            match legend.map_or_else(|| condition(words), Condition::Means) {
                Condition::Means(meaning) => marks.add(meaning, "", told),
                Condition::Gap => return Err(Fate::NonResult(NonResult::NotReported)),
                Condition::NeedsLegend => {
                    told.push(Told::UnknownCondition { condition: words.to_owned() });
                    marks.hold(Strictest::Unknown, SetAside::ConditionNeedsLegend);
                }
            }
        }
        match marks.strictest {
            Some(Strictest::Rejected) => Err(Fate::SetAside(SetAside::Rejected)),
            _ => Ok(marks),
        }
    }

    /// The site file's meaning of a code or condition in this file.
    fn legend(&self, is: impl Fn(&Qualifier) -> bool) -> Option<Meaning> {
        let name = self.table.name.as_str();
        let leaf = name.rsplit('/').next().unwrap_or(name);
        let here = |patterns: &[String]| {
            patterns.is_empty()
                || patterns.iter().any(|pattern| {
                    glob::Pattern::new(pattern).is_ok_and(|p| p.matches(name) || p.matches(leaf))
                })
        };
        self.site.qualifiers.iter().find(|q| is(q) && here(&q.files)).map(|q| q.means)
    }

    /// The first decision of a kind that names this record.
    pub(super) fn decided(
        &self,
        kind: DecisionKind,
        row: &Row,
        day: Option<NaiveDate>,
        texts: &Texts,
    ) -> Option<u16> {
        let holds = |list: &[String], text: &str| list.is_empty() || list.iter().any(|x| x == text);
        let place = self.site.decisions.iter().position(|decision| {
            decision.kind == kind
                && holds(&decision.wells, texts.text(row.well))
                && holds(&decision.analytes, texts.text(row.analyte))
                && holds(&decision.samples, texts.text(row.written.sample_id))
                && decision.from.is_none_or(|from| day.is_some_and(|day| from <= day))
                && decision.to.is_none_or(|to| day.is_some_and(|day| day <= to))
                && decision.file.as_ref().is_none_or(|file| {
                    self.table.name == *file || self.table.name.ends_with(&format!("/{file}"))
                })
                && (decision.records.is_empty() || decision.records.contains(&row.line))
        })?;
        u16::try_from(place).ok()
    }
}

impl Marks {
    fn add(&mut self, meaning: Meaning, code: &str, told: &mut Vec<Told>) {
        let strictest = Strictest::of(meaning);
        self.strictest = Some(self.strictest.map_or(strictest, |before| before.min(strictest)));
        self.estimated |= matches!(meaning, Meaning::Estimated | Meaning::Blank);
        if meaning == Meaning::Blank {
            told.push(Told::InBlank);
        }
        if meaning == Meaning::Informational && code.eq_ignore_ascii_case("d") {
            self.dilution = Dilution::Diluted;
        }
        if meaning == Meaning::AboveRange && code.eq_ignore_ascii_case("e") {
            self.dilution = Dilution::OverCalibration;
        }
    }

    fn hold(&mut self, strictest: Strictest, why: SetAside) {
        self.strictest = Some(self.strictest.map_or(strictest, |before| before.min(strictest)));
        self.unknown.get_or_insert(Fate::SetAside(why));
    }
}
