//! Units of concentration in water: a closed list, matched without regard to case.

use std::fmt;

/// What a unit measures; two units convert into each other only inside one dimension.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Dimension {
    /// Mass per volume of water.
    Mass,
    /// Amount of substance per volume of water.
    Amount,
    /// Radioactive activity per volume of water.
    Activity,
}

/// One unit of the closed list.
#[derive(Clone, Copy, PartialEq, Eq, Hash)]
pub struct Unit(u8);

struct Row {
    label: &'static str,
    dimension: Dimension,
    /// `value × up ÷ down` is the value in the dimension's base unit (ug/L, umol/L, pCi/L).
    /// Both are whole numbers, so a conversion rounds once in each step and never drifts.
    up: f64,
    down: f64,
}

const fn row(label: &'static str, dimension: Dimension, up: f64, down: f64) -> Row {
    Row { label, dimension, up, down }
}

/// The closed list (common practice, no source; spellings of the WQX unit list). 1 pCi = 0.037 Bq
/// (exact by the definition of the curie).
static UNITS: [Row; 15] = [
    row("pg/L", Dimension::Mass, 1.0, 1e6),
    row("ng/L", Dimension::Mass, 1.0, 1e3),
    row("ug/L", Dimension::Mass, 1.0, 1.0),
    row("mg/L", Dimension::Mass, 1e3, 1.0),
    row("g/L", Dimension::Mass, 1e6, 1.0),
    row("ng/mL", Dimension::Mass, 1.0, 1.0),
    row("ug/mL", Dimension::Mass, 1e3, 1.0),
    row("mg/mL", Dimension::Mass, 1e6, 1.0),
    row("nmol/L", Dimension::Amount, 1.0, 1e3),
    row("umol/L", Dimension::Amount, 1.0, 1.0),
    row("mmol/L", Dimension::Amount, 1e3, 1.0),
    row("pCi/L", Dimension::Activity, 1.0, 1.0),
    row("nCi/L", Dimension::Activity, 1e3, 1.0),
    row("mBq/L", Dimension::Activity, 1.0, 37.0),
    row("Bq/L", Dimension::Activity, 1e3, 37.0),
];

/// A unit as a laboratory writes it: the unit, and the basis it adds (`as N`, `CaCO3`).
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct UnitText {
    /// The unit of the closed list.
    pub unit: Unit,
    /// What the number counts, if the text says so: `N`, `NO3`, `CaCO3`.
    pub basis: Option<String>,
}

impl Unit {
    /// Micrograms per litre.
    pub const UG_PER_L: Self = Self(2);
    /// Milligrams per litre.
    pub const MG_PER_L: Self = Self(3);
    /// Picocuries per litre.
    pub const PCI_PER_L: Self = Self(11);

    /// Every unit of the list, in its order.
    pub fn all() -> impl Iterator<Item = Self> {
        (0..UNITS.len()).filter_map(|i| u8::try_from(i).ok()).map(Self)
    }

    /// The unit's position in the closed list, for storing it as a number.
    #[must_use]
    pub fn code(self) -> u8 {
        self.0
    }

    /// The unit with this position, if there is one.
    #[must_use]
    pub fn from_code(code: u8) -> Option<Self> {
        (usize::from(code) < UNITS.len()).then_some(Self(code))
    }

    /// The spelling used in every output: `ug/L`.
    #[must_use]
    pub fn label(self) -> &'static str {
        UNITS[usize::from(self.0)].label
    }

    /// What the unit measures.
    #[must_use]
    pub fn dimension(self) -> Dimension {
        UNITS[usize::from(self.0)].dimension
    }

    /// A value in this unit, written in another; `None` across dimensions.
    #[must_use]
    pub fn convert(self, value: f64, to: Self) -> Option<f64> {
        if self == to {
            return Some(value);
        }
        let (from, into) = (&UNITS[usize::from(self.0)], &UNITS[usize::from(to.0)]);
        if from.dimension != into.dimension {
            return None;
        }
        // The two quotients of whole numbers are exact, so the result is rounded once.
        let (up, down) = (from.up * into.down, from.down * into.up);
        Some(if up >= down && (up / down).fract() == 0.0 {
            value * (up / down)
        } else if (down / up).fract() == 0.0 {
            value / (down / up)
        } else {
            value * up / down
        })
    }

    /// Reads a unit as laboratories write it: any case, either micro sign, `mcg`, and a basis
    /// before or after (`mg/L as N`, `mg N/l`, `mg/l CaCO3`).
    #[must_use]
    pub fn read(text: &str) -> Option<UnitText> {
        let text: String = text
            .chars()
            .map(|c| match c {
                '\u{b5}' | '\u{3bc}' => 'u',
                c if c.is_whitespace() => ' ',
                c => c,
            })
            .collect();
        let text = text.trim().trim_start_matches('[').trim_end_matches(']').trim();
        let (head, basis) = split_basis(text)?;
        let lower = head.to_ascii_lowercase().replace(' ', "").replace("mcg", "ug");
        let unit = Self::all().find(|unit| unit.label().eq_ignore_ascii_case(&lower))?;
        Some(UnitText { unit, basis })
    }
}

/// Splits `mg/L as N`, `mg/l CaCO3`, `mg N/l` into the bare unit and its basis.
fn split_basis(text: &str) -> Option<(String, Option<String>)> {
    let (over, under) = text.split_once('/')?;
    let mut over = over.split(' ').filter(|word| !word.is_empty());
    let mut under = under.split(' ').filter(|word| !word.is_empty());
    let (mass, volume) = (over.next()?, under.next()?);
    let before: Vec<&str> = over.collect();
    let mut after: Vec<&str> = under.collect();
    if after.first().is_some_and(|word| word.eq_ignore_ascii_case("as")) {
        after.remove(0);
    }
    let words: Vec<&str> = before.into_iter().chain(after).collect();
    let basis = (!words.is_empty())
        .then(|| words.join(" ").trim_matches(|c| matches!(c, '(' | ')')).to_owned());
    Some((format!("{mass}/{volume}"), basis))
}

impl fmt::Display for Unit {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.label())
    }
}

impl fmt::Debug for Unit {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "Unit({})", self.label())
    }
}

impl PartialOrd for Unit {
    fn partial_cmp(&self, other: &Self) -> Option<std::cmp::Ordering> {
        Some(self.cmp(other))
    }
}

impl Ord for Unit {
    /// By spelling, which settles ties between equally common units the same way everywhere.
    fn cmp(&self, other: &Self) -> std::cmp::Ordering {
        self.label().cmp(other.label())
    }
}

#[cfg(test)]
mod tests {
    use super::{Dimension, Unit};

    fn read(text: &str) -> Option<(String, Option<String>)> {
        Unit::read(text).map(|t| (t.unit.label().to_owned(), t.basis))
    }

    #[test]
    fn both_micro_signs_mcg_and_any_case_read_as_micrograms() {
        for text in ["ug/L", "UG/L", "\u{b5}g/L", "\u{3bc}g/l", "mcg/L", " ug/l\u{a0}\u{a0}"] {
            assert_eq!(read(text), Some(("ug/L".into(), None)), "{text}");
        }
        assert_eq!(read("ppb"), None);
        assert_eq!(read("furlong/L"), None);
    }

    #[test]
    fn a_basis_is_kept_apart_from_the_unit() {
        for text in ["mg/L as N", "mg N/l", "mg/l N"] {
            assert_eq!(read(text), Some(("mg/L".into(), Some("N".into()))), "{text}");
        }
        assert_eq!(read("mg/l CaCO3"), Some(("mg/L".into(), Some("CaCO3".into()))));
    }

    #[test]
    fn conversion_inside_a_dimension_rounds_once() {
        let mg = Unit::MG_PER_L;
        assert_eq!(mg.convert(0.0053, Unit::UG_PER_L), Some(5.3));
        assert_eq!(Unit::UG_PER_L.convert(5.3, mg), Some(0.0053));
        let bq = Unit::read("Bq/L").map(|t| t.unit);
        // 20,000 pCi/L = 740 Bq/L, from 1 Ci = 3.7e10 Bq.
        assert_eq!(bq.and_then(|bq| bq.convert(740.0, Unit::PCI_PER_L)), Some(20_000.0));
        assert_eq!(mg.convert(1.0, Unit::PCI_PER_L), None);
        assert_eq!(mg.dimension(), Dimension::Mass);
    }
}
