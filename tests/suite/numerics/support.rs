//! Builders and tolerances shared by the tests of `numerics`.

use approx::assert_relative_eq;
use ebbwell::numerics::{Crossing, FirstOrder, Interval, Mark, NoLine, Points, first_order};

/// Closed-form results against printed ones (relative). Source: methods note, section 2.
pub const CLOSED: f64 = 1e-6;

/// Figures of R's `survreg` and of NIST against ours, as far as both carry digits (relative).
pub const CERTIFIED: f64 = 1e-11;

/// Rows of a fixture under `tests/reference`, comments and the header left out.
pub fn reference(name: &str) -> Vec<Vec<String>> {
    let path = format!("{}/tests/reference/{name}", env!("CARGO_MANIFEST_DIR"));
    let text = std::fs::read_to_string(&path).expect("a fixture is readable");
    let rows = text.lines().filter(|line| !line.starts_with('#')).skip(1);
    rows.map(|line| line.split(',').map(str::to_owned).collect()).collect()
}

/// A number written in a fixture.
pub fn number(text: &str) -> f64 {
    text.parse().expect("a fixture's number is a number")
}

/// Days from 1970-01-01 to a date written as YYYY-MM-DD (Gregorian).
pub fn day(date: &str) -> f64 {
    let part = |range: std::ops::Range<usize>| number(&date[range]) as i64;
    let (year, month, day) = (part(0..4), part(5..7), part(8..10));
    // Counted from March, so that the leap day comes last.
    let (year, month) = if month < 3 { (year - 1, month + 9) } else { (year, month - 3) };
    let days = 365 * year + year / 4 - year / 100 + year / 400 + (153 * month + 2) / 5 + day;
    (days - 719_469) as f64
}

/// A series that owns its data.
#[derive(Clone, Debug)]
pub struct Series {
    pub t: Vec<f64>,
    pub y: Vec<f64>,
    pub mark: Vec<Mark>,
}

impl Series {
    pub fn measured(t: &[f64], y: &[f64]) -> Series {
        Series { t: t.to_vec(), y: y.to_vec(), mark: vec![Mark::Measured; t.len()] }
    }

    /// Concentrations as written by a laboratory: `<5` is a non-detect, `>5` above range.
    pub fn reported(t: &[f64], results: &str) -> Series {
        let mut series = Series { t: t.to_vec(), y: Vec::new(), mark: Vec::new() };
        for word in results.split_whitespace() {
            let (mark, number) = match (word.strip_prefix('<'), word.strip_prefix('>')) {
                (Some(limit), _) => (Mark::Below, limit),
                (_, Some(limit)) => (Mark::Above, limit),
                _ => (Mark::Measured, word),
            };
            let value: f64 = number.parse().expect("a test's result is a number");
            series.y.push(value.ln());
            series.mark.push(mark);
        }
        assert_eq!(series.t.len(), series.y.len(), "a test's times and results are equally many");
        series
    }

    pub fn points(&self) -> Points<'_> {
        Points::new(&self.t, &self.y, &self.mark).expect("a test's points are sound")
    }

    pub fn fit(&self) -> Result<FirstOrder, NoLine> {
        first_order(self.points())
    }

    pub fn fitted(&self) -> FirstOrder {
        self.fit().expect("a test's series has a line")
    }
}

/// The times 0, 1, 2, …
pub fn steps(n: usize) -> Vec<f64> {
    (0..n).map(|i| i as f64).collect()
}

/// W02: UG Example 21-7, TCE under corrective action, months and ppb.
pub fn w02() -> Series {
    Series::reported(
        &[2.0, 4.0, 8.0, 11.0, 13.0, 16.0, 20.0, 23.0, 26.0, 30.0],
        "54.2 44.3 45.4 38.3 27.1 30.2 28.3 17.6 14.7 4.1",
    )
}

/// W14: the two-limit series "C1" of the methods note; days since 2017-03-14.
pub fn w14() -> Series {
    let days = [0, 98, 182, 266, 371, 462, 553, 637, 735, 826, 924, 1001, 1099, 1197, 1281, 1365];
    let t: Vec<f64> = days.iter().map(|&day| f64::from(day) / 365.25).collect();
    Series::reported(&t, "46 31 38 22 27 17 19 9.6 12 <10 6.8 <5 7.1 <5 2.9 <2")
}

/// Asserts that a number agrees with one printed to so many digits after the point.
pub fn printed(found: f64, expected: f64, digits: i32) {
    let half = 0.5001 * 10f64.powi(-digits);
    assert!((found - expected).abs() <= half, "found {found}, printed {expected}");
}

/// Asserts that an interval has these ends (relative).
pub fn interval(found: Interval, low: f64, high: f64, tolerance: f64) {
    assert_relative_eq!(found.low, low, max_relative = tolerance);
    assert_relative_eq!(found.high, high, max_relative = tolerance);
}

/// Asserts that a crossing is located, with this estimate and these ends (relative).
pub fn located(found: Crossing, ends: [f64; 3], tolerance: f64) {
    let Crossing::Located { estimate, low, high } = found else {
        panic!("not located: {found:?}");
    };
    assert_relative_eq!(low, ends[0], max_relative = tolerance);
    assert_relative_eq!(estimate, ends[1], max_relative = tolerance);
    assert_relative_eq!(high, ends[2], max_relative = tolerance);
}

/// A reproducible stream of random numbers: SplitMix64 (Steele, Lea & Flood 2014).
pub struct Random(pub u64);

impl Random {
    fn bits(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mut x = self.0;
        x = (x ^ (x >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        x = (x ^ (x >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        x ^ (x >> 31)
    }

    /// Evenly between 0 and 1.
    pub fn unit(&mut self) -> f64 {
        (self.bits() >> 11) as f64 / (1u64 << 53) as f64
    }

    /// Evenly between two numbers.
    pub fn between(&mut self, low: f64, high: f64) -> f64 {
        low + (high - low) * self.unit()
    }

    /// A whole number from `low` to `high`, both included.
    pub fn whole(&mut self, low: usize, high: usize) -> usize {
        low + (self.unit() * (high - low + 1) as f64) as usize
    }

    /// A standard normal number (Box & Muller 1958).
    pub fn normal(&mut self) -> f64 {
        let radius = (-2.0 * (1.0 - self.unit()).ln()).sqrt();
        radius * (std::f64::consts::TAU * self.unit()).cos()
    }

    /// A monitoring record: 5 to 60 dates over up to 20 years, a rate of −0.5 to 1.5 a year, a
    /// scatter of 0.02 to 1.5, and limits such that about `censored` of it is below them.
    pub fn series(&mut self, censored: f64) -> Series {
        let n = self.whole(5, 60);
        let step = self.between(0.05, 1.0).min(20.0 / n as f64);
        let (rate, sd) = (self.between(-0.5, 1.5), self.between(-4.0, 0.4).exp());
        let start = self.between(-3.0, 8.0);
        let mut time = self.between(-5.0, 5.0);
        let mut series = Series { t: Vec::new(), y: Vec::new(), mark: Vec::new() };
        for _ in 0..n {
            time += step * self.between(0.3, 1.7);
            series.t.push(time);
            series.y.push(start - rate * time + sd * self.normal());
        }
        let mut sorted = series.y.clone();
        sorted.sort_by(f64::total_cmp);
        let low = sorted[((censored * n as f64) as usize).min(n - 1)];
        for y in &mut series.y {
            let limit = low + 0.7 * sd * self.normal();
            let below = *y < limit && censored > 0.0;
            series.mark.push(if below { Mark::Below } else { Mark::Measured });
            if below {
                *y = limit;
            }
        }
        series
    }
}
