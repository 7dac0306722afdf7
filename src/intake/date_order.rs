//! The order of day and month, proved by the file's whole column or not at all.

use super::date::{parts, split_time};
use crate::site::DateOrder;

/// What the dates of a column prove.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Evidence {
    /// Dates that only day first can be.
    pub day_first: usize,
    /// Dates that only month first can be.
    pub month_first: usize,
}

impl Evidence {
    /// Whether the column holds both orders.
    #[must_use]
    pub fn is_mixed(self) -> bool {
        self.day_first > 0 && self.month_first > 0
    }
}

/// Counts the dates whose order is certain: a part above 12 can only be the day.
#[must_use]
pub fn evidence<'a>(column: impl Iterator<Item = &'a str>) -> Evidence {
    let mut found = Evidence::default();
    for text in column {
        let Some([a, b, _]) = parts(split_time(text.trim()).0) else { continue };
        if a.len() == 4 {
            continue;
        }
        let day = |part: &str| part.parse::<u32>().is_ok_and(|part| (13..=31).contains(&part));
        let month = |part: &str| part.parse::<u32>().is_ok_and(|part| (1..=12).contains(&part));
        found.day_first += usize::from(day(a) && month(b));
        found.month_first += usize::from(day(b) && month(a));
    }
    found
}

/// The order that a date column proves.
///
/// `None` where nothing is proved, and where the column proves both orders: then only those dates
/// are read that speak for themselves.
#[must_use]
pub fn proved<'a>(column: impl Iterator<Item = &'a str>) -> Option<DateOrder> {
    let found = evidence(column);
    match (found.day_first, found.month_first) {
        (1.., 0) => Some(DateOrder::DayMonthYear),
        (0, 1..) => Some(DateOrder::MonthDayYear),
        _ => None,
    }
}

#[cfg(test)]
mod tests {
    use super::{DateOrder, Evidence, evidence, proved};

    #[test]
    fn one_part_above_twelve_settles_the_column_and_two_orders_settle_nothing() {
        assert_eq!(proved(["01/02/2024", "14/03/2024"].into_iter()), Some(DateOrder::DayMonthYear));
        assert_eq!(proved(["01/02/2024", "03/14/2024"].into_iter()), Some(DateOrder::MonthDayYear));
        assert_eq!(proved(["01/02/2024", "2024-03-14"].into_iter()), None);
        assert_eq!(proved(["14/03/2024", "03/14/2024"].into_iter()), None);
    }

    #[test]
    fn dates_of_either_order_are_counted() {
        let column = ["14/03/2024", "03/14/2024", "03/15/2024", "01/02/2024", "2024-03-14"];
        let found = evidence(column.into_iter());
        assert_eq!(found, Evidence { day_first: 1, month_first: 2 });
        assert!(found.is_mixed());
    }
}
