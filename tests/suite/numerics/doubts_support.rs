//! The invented series, and what was computed of their residuals with 40 digits.

use std::collections::BTreeMap;

use ebbwell::numerics::Mark;

use super::support::{Series, day, number, reference};

/// Every series of `tests/reference/invented-series.csv` by name, times from its first date.
pub fn invented() -> BTreeMap<String, Series> {
    let mut all: BTreeMap<String, (f64, Series)> = BTreeMap::new();
    for row in reference("invented-series.csv") {
        let [name, date, mark, value, _] = &row[..] else { panic!("five columns: {row:?}") };
        let empty = Series { t: vec![], y: vec![], mark: vec![] };
        let (start, series) = all.entry(name.clone()).or_insert((day(date), empty));
        series.t.push((day(date) - *start) / 365.25);
        series.y.push(number(value).ln());
        series.mark.push(match mark.as_str() {
            "<" => Mark::Below,
            ">" => Mark::Above,
            _ => Mark::Measured,
        });
    }
    all.into_iter().map(|(name, (_, series))| (name, series)).collect()
}

/// A figure of `tests/reference/invented-diagnostics.csv`, where it has one.
pub fn expected(series: &str, quantity: &str) -> Option<f64> {
    let rows = reference("invented-diagnostics.csv");
    let row = rows.iter().find(|row| row[0] == series && row[1] == quantity);
    row.map(|row| number(&row[2]))
}

/// W03: UG Example 17-5, chloride: days since 2002-01-01 and ppm.
pub fn w03() -> (Vec<f64>, Vec<f64>) {
    let days = vec![
        76.0, 133.0, 233.0, 407.0, 513.0, 594.0, 688.0, 779.0, 846.0, 940.0, 1043.0, 1150.0,
        1260.0, 1330.0, 1385.0, 1499.0, 1577.0, 1682.0, 1759.0,
    ];
    let ppm = vec![
        11.5, 12.6, 13.8, 12.3, 12.8, 13.2, 14.1, 13.3, 13.1, 13.2, 15.3, 15.0, 15.2, 15.8, 16.1,
        15.1, 16.4, 17.7, 17.7,
    ];
    (days, ppm)
}
