//! Which of a record's limits counts: by their types, in the declared order or the usual one.

use super::number::number;
use super::record::RecordReader;
use super::split::Line;
use crate::ledger::Told;
use crate::ledger::told::Expected;
use crate::site::{LimitType, limit_type};
use crate::terms::{Unit, folded};

/// A limit as written, with its type and its own unit.
#[derive(Clone, Debug, PartialEq)]
pub struct WrittenLimit {
    /// The type; empty where none is given.
    pub kind: String,
    /// The number.
    pub value: String,
    /// The unit; empty where it is the result's.
    pub unit: String,
}

/// The limits of a record that count; at most one of each class.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct TypedLimits {
    /// The reporting limit.
    pub reporting: Option<(f64, WrittenLimit)>,
    /// The detection limit.
    pub detection: Option<(f64, WrittenLimit)>,
}

impl RecordReader<'_> {
    /// The limits with types that stand in the line or in a detection-limit table beside the file.
    pub(super) fn typed_limits(&self, line: &Line, told: &mut Vec<Told>) -> TypedLimits {
        let open = &self.table.mapping.open;
        let cell = |at: Option<usize>| {
            at.and_then(|at| line.cells.get(at)).unwrap_or_default().trim().to_owned()
        };
        let in_line = open.limits.iter().map(|cells| WrittenLimit {
            kind: cell(cells.kind),
            value: cell(Some(cells.value)),
            unit: cell(cells.unit),
        });
        let mut written: Vec<WrittenLimit> = in_line.filter(|l| !l.value.is_empty()).collect();
        for (file, limit) in self.limits.of(self.table, line) {
            if !written.contains(limit) {
                told.push(Told::LimitJoined { file: file.to_owned() });
                written.push(limit.clone());
            }
        }
        self.choose(written, told)
    }

    fn choose(&self, written: Vec<WrittenLimit>, told: &mut Vec<Told>) -> TypedLimits {
        let order = &self.site.settings.limit_order;
        let mut ranked: Vec<(usize, LimitType, f64, WrittenLimit)> = Vec::new();
        for limit in written {
            let declared = order.iter().position(|kind| folded(kind) == folded(&limit.kind));
            let kind = limit_type(&limit.kind);
            match (kind, declared) {
                (LimitType::NoDetectionLimit, _) => {
                    told.push(Told::NoDetectionLimit { kind: limit.kind });
                    continue;
                }
                (LimitType::Unknown, None) => {
                    told.push(Told::LimitTypeUnknown { kind: limit.kind });
                    continue;
                }
                _ => {}
            }
            match number(&limit.value, self.table.numbers) {
                Some(value) if value > 0.0 => {
                    ranked.push((declared.unwrap_or(order.len()), kind, value, limit));
                }
                Some(_) => {}
                None => told.push(Told::Unreadable {
                    column: "limit",
                    found: limit.value,
                    expected: Expected::Limit,
                }),
            }
        }
        // Declared ones first, then by the usual order; of equal types the higher limit, which is
        // the safer one.
        ranked.sort_by(|a, b| (a.0, a.1).cmp(&(b.0, b.1)).then(b.2.total_cmp(&a.2)));
        let first = |holds: &dyn Fn(usize, LimitType) -> bool| {
            ranked
                .iter()
                .find(|(declared, kind, ..)| holds(*declared, *kind))
                .map(|(_, _, value, limit)| (*value, limit.clone()))
        };
        TypedLimits {
            // Whatever is declared first is what the laboratory reports down to.
            reporting: first(&|declared, kind| {
                declared < order.len() || matches!(kind, LimitType::Reporting(_))
            }),
            detection: first(&|_, kind| matches!(kind, LimitType::Detection(_))),
        }
    }
}

impl TypedLimits {
    /// The unit of the limit that counts for a non-detect, as written.
    #[must_use]
    pub fn unit(&self) -> Option<&str> {
        [&self.reporting, &self.detection]
            .into_iter()
            .flatten()
            .map(|(_, limit)| limit.unit.as_str())
            .find(|unit| !unit.is_empty())
    }

    /// Whether there is no limit.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.reporting.is_none() && self.detection.is_none()
    }

    /// Reporting and detection limit in the result's unit; one that cannot be converted is told.
    pub fn in_unit(&self, unit: Unit, told: &mut Vec<Told>) -> [Option<f64>; 2] {
        [&self.reporting, &self.detection].map(|limit| {
            let (value, limit) = limit.as_ref()?;
            if limit.unit.is_empty() {
                return Some(*value);
            }
            let converted = Unit::read(&limit.unit).and_then(|own| own.unit.convert(*value, unit));
            if converted.is_none() {
                told.push(Told::LimitUnit { unit: limit.unit.clone() });
            }
            converted
        })
    }

    /// The limit that counts for a non-detect, as the ledger shows it: with its unit where that is
    /// not the result's.
    #[must_use]
    pub fn shown(&self, result_unit: &str) -> String {
        let limit = self.reporting.as_ref().or(self.detection.as_ref());
        limit.map_or_else(String::new, |(_, limit)| {
            let own = limit.unit.as_str();
            if own.is_empty() || own == result_unit {
                limit.value.clone()
            } else {
                format!("{} {own}", limit.value)
            }
        })
    }
}
