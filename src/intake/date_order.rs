//! The order of day and month, proved by the file's whole column or not at all.

use super::date::{parts, split_time};
use crate::site::DateOrder;

/// What a date column proves: a part above 12 can only be the day.
///
/// `None` where nothing is proved, and where the column proves both orders: then only those dates
/// are read that speak for themselves.
#[must_use]
pub fn proved<'a>(column: impl Iterator<Item = &'a str>) -> Option<DateOrder> {
    let (mut day_first, mut month_first) = (false, false);
    for text in column {
        let Some([a, b, _]) = parts(split_time(text.trim()).0) else { continue };
        if a.len() == 4 {
            continue;
        }
        day_first |= a.parse::<u32>().is_ok_and(|a| (13..=31).contains(&a));
        month_first |= b.parse::<u32>().is_ok_and(|b| (13..=31).contains(&b));
    }
    match (day_first, month_first) {
        (true, false) => Some(DateOrder::DayMonthYear),
        (false, true) => Some(DateOrder::MonthDayYear),
        _ => None,
    }
}

#[cfg(test)]
mod tests {
    use super::{DateOrder, proved};

    #[test]
    fn one_part_above_twelve_settles_the_column_and_two_orders_settle_nothing() {
        assert_eq!(proved(["01/02/2024", "14/03/2024"].into_iter()), Some(DateOrder::DayMonthYear));
        assert_eq!(proved(["01/02/2024", "03/14/2024"].into_iter()), Some(DateOrder::MonthDayYear));
        assert_eq!(proved(["01/02/2024", "2024-03-14"].into_iter()), None);
        assert_eq!(proved(["14/03/2024", "03/14/2024"].into_iter()), None);
    }
}
