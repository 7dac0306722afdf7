//! What one sample says of a concentration.

use super::Unit;

/// A concentration with its unit, as a limit is written: `5 ug/L`.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Concentration {
    /// The number, positive and finite.
    pub value: f64,
    /// Its unit.
    pub unit: Unit,
}

impl Concentration {
    /// The same concentration in another unit; `None` across dimensions.
    #[must_use]
    pub fn in_unit(self, unit: Unit) -> Option<f64> {
        self.unit.convert(self.value, unit)
    }
}

/// What one result says, every number in the unit of its series.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Reading {
    /// Measured at this concentration.
    Measured(f64),
    /// Not detected: somewhere under this limit.
    Below(f64),
    /// Known only to lie between the two.
    Between(f64, f64),
    /// Over the range of the instrument: somewhere above this value.
    Above(f64),
}

impl Reading {
    /// Whether the substance was seen at all.
    #[must_use]
    pub fn is_detect(self) -> bool {
        !matches!(self, Self::Below(_))
    }

    /// The number that stands in a table beside the mark: the value, or the limit.
    #[must_use]
    pub fn number(self) -> f64 {
        match self {
            Self::Measured(v) | Self::Below(v) | Self::Above(v) => v,
            // The upper end is what is certain not to be exceeded.
            Self::Between(_, high) => high,
        }
    }

    /// The mark before the number in a table: `<`, `>` or nothing.
    #[must_use]
    pub fn mark(self) -> &'static str {
        match self {
            Self::Measured(_) => "",
            Self::Below(_) | Self::Between(..) => "<",
            Self::Above(_) => ">",
        }
    }

    /// Whether the reading proves a concentration at or under `limit` ("meets means at or under").
    #[must_use]
    pub fn meets(self, limit: f64) -> bool {
        match self {
            Self::Measured(v) | Self::Below(v) | Self::Between(_, v) => v <= limit,
            Self::Above(_) => false,
        }
    }

    /// Whether the reading is a detect over `limit`.
    #[must_use]
    pub fn exceeds(self, limit: f64) -> bool {
        match self {
            Self::Measured(v) => v > limit,
            Self::Between(low, _) => low > limit,
            Self::Above(v) => v >= limit,
            Self::Below(_) => false,
        }
    }
}
