//! Records drawn from a known truth.

use ebbwell::numerics::normal::lower;
use ebbwell::numerics::{Mark, Points};

use super::random::Random;

/// What records are drawn from: ln(concentration) falls from 0 at the first date.
#[derive(Clone, Debug)]
pub struct Truth {
    /// Times of the dates, in years.
    pub t: Vec<f64>,
    /// Rate a year.
    pub rate: f64,
    /// Standard deviation of ln(concentration) about the line.
    pub sd: f64,
    /// Correlation of the errors of two neighbouring dates.
    pub correlation: f64,
    /// ln of the reporting limit of each date; minus infinity where everything is measured.
    pub limits: Vec<f64>,
}

/// One record.
#[derive(Clone, Debug)]
pub struct Record {
    /// Times, in years.
    pub t: Vec<f64>,
    /// ln(concentration), or ln of the reporting limit.
    pub y: Vec<f64>,
    /// How each is known.
    pub mark: Vec<Mark>,
}

/// How reporting limits go with the dates.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Limits {
    /// One for all dates.
    One,
    /// Every other date has one three times as high.
    InTurn,
    /// The first half of the dates has one three times as high.
    Falling,
}

impl Limits {
    /// ln of the factor on the lowest limit at date `i` of `n`.
    fn raised(self, i: usize, n: usize) -> f64 {
        let high = match self {
            Limits::One => false,
            Limits::InTurn => i % 2 == 1,
            Limits::Falling => i < n / 2,
        };
        if high { 3f64.ln() } else { 0.0 }
    }
}

impl Truth {
    /// Quarterly dates, independent errors, everything measured.
    pub fn quarterly(n: usize, rate: f64, sd: f64) -> Truth {
        Truth {
            t: (0..n).map(|i| i as f64 / 4.0).collect(),
            rate,
            sd,
            correlation: 0.0,
            limits: vec![f64::NEG_INFINITY; n],
        }
    }

    /// With errors that resemble those of the date before.
    pub fn correlated(self, correlation: f64) -> Truth {
        Truth { correlation, ..self }
    }

    /// With reporting limits at which so many dates are expected to be non-detects.
    pub fn with_non_detects(mut self, expected: f64, limits: Limits) -> Truth {
        let n = self.t.len();
        if expected > 0.0 {
            let (mut low, mut high) = (-1e3, 1e3);
            for _ in 0..200 {
                let middle = 0.5 * (low + high);
                self.limits = (0..n).map(|i| middle + limits.raised(i, n)).collect();
                if self.expected_non_detects() < expected { low = middle } else { high = middle }
            }
        }
        self
    }

    /// ln(concentration) of the true line at time `t`.
    pub fn level(&self, t: f64) -> f64 {
        -self.rate * t
    }

    /// Time of the last date.
    pub fn last(&self) -> f64 {
        self.t[self.t.len() - 1]
    }

    fn expected_non_detects(&self) -> f64 {
        let below = |(&t, &limit): (&f64, &f64)| lower((limit - self.level(t)) / self.sd);
        self.t.iter().zip(&self.limits).map(below).sum()
    }

    /// One record from this truth.
    ///
    /// # Formula
    /// ```text
    /// e₁ = σ·z₁     eᵢ = ρ·eᵢ₋₁ + σ·√(1 − ρ²)·zᵢ     a non-detect where −k·t + e is under the limit
    /// ```
    pub fn record(&self, random: &mut Random) -> Record {
        let mut record = Record { t: self.t.clone(), y: Vec::new(), mark: Vec::new() };
        let fresh = (1.0 - self.correlation * self.correlation).sqrt();
        let mut error = 0.0;
        for (i, (&t, &limit)) in self.t.iter().zip(&self.limits).enumerate() {
            let z = random.normal();
            error = if i == 0 { z } else { self.correlation * error + fresh * z };
            let y = self.level(t) + self.sd * error;
            let below = y < limit;
            record.y.push(if below { limit } else { y });
            record.mark.push(if below { Mark::Below } else { Mark::Measured });
        }
        record
    }
}

impl Record {
    /// The record as a fit sees it.
    pub fn points(&self) -> Points<'_> {
        Points::new(&self.t, &self.y, &self.mark).expect("a drawn record is sound")
    }

    /// Measured dates.
    pub fn detects(&self) -> usize {
        self.points().count(Mark::Measured)
    }

    /// Concentrations, where the first is `start` on the true line.
    pub fn concentrations(&self, start: f64) -> Vec<f64> {
        self.y.iter().map(|y| start * y.exp()).collect()
    }
}

/// A setting in which flags that ought not to be raised are counted: exact first-order data with
/// independent normal errors.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct FalseAlarms {
    /// Dates, a quarter apart.
    pub n: usize,
    /// Rate a year.
    pub rate: f64,
    /// Standard deviation of ln(concentration).
    pub sd: f64,
}

/// The two settings of issue 5: under 30 % of such series may carry a flag beyond those that say
/// that the record is short or the date far.
pub const FALSE_ALARMS: [FalseAlarms; 2] =
    [FalseAlarms { n: 12, rate: 1.0, sd: 0.3 }, FalseAlarms { n: 20, rate: 0.5, sd: 0.3 }];

impl FalseAlarms {
    /// Records of this setting, always the same ones.
    pub fn records(&self, count: usize) -> impl Iterator<Item = Record> {
        let truth = Truth::quarterly(self.n, self.rate, self.sd);
        let what = 0xFA15E ^ self.n as u64;
        (0..count as u64).map(move |run| truth.record(&mut Random::of(what, run)))
    }
}

/// Source: the expected number of non-detects is what was asked for; counted in 2,000 records, four
/// standard errors allowed.
#[test]
fn limits_give_the_share_of_non_detects_asked_for() {
    for limits in [Limits::One, Limits::InTurn, Limits::Falling] {
        for share in [0.2, 0.6] {
            let truth = Truth::quarterly(20, 0.3, 0.5).with_non_detects(20.0 * share, limits);
            let found: usize =
                (0..2000).map(|run| 20 - truth.record(&mut Random::of(1, run)).detects()).sum();
            let allowed = 4.0 * (20.0 * share * (1.0 - share) / 2000.0).sqrt();
            let mean = found as f64 / 2000.0;
            assert!((mean - 20.0 * share).abs() < allowed, "{limits:?} {share}: {mean}");
        }
    }
}

/// Source: a first-order autoregression: neighbours resemble each other by ρ, two apart by ρ².
#[test]
fn errors_resemble_each_other_as_asked() {
    let truth = Truth::quarterly(40, 0.0, 1.0).correlated(0.5);
    let (mut one, mut two, mut square, mut count) = (0.0, 0.0, 0.0, 0.0);
    for run in 0..2000 {
        let y = truth.record(&mut Random::of(2, run)).y;
        for i in 2..40 {
            one += y[i] * y[i - 1];
            two += y[i] * y[i - 2];
            square += y[i] * y[i];
            count += 1.0;
        }
    }
    assert!((square / count - 1.0f64).abs() < 0.03);
    assert!((one / square - 0.5f64).abs() < 0.02 && (two / square - 0.25f64).abs() < 0.02);
}

/// Source: the false-alarm settings draw exact first-order data: their mean residual is nothing and
/// their scatter σ.
#[test]
fn false_alarm_records_are_first_order() {
    for setting in FALSE_ALARMS {
        let (mut sum, mut square, mut count) = (0.0, 0.0, 0.0);
        for record in setting.records(1000) {
            assert_eq!((record.t.len(), record.detects()), (setting.n, setting.n));
            let concentrations = record.concentrations(100.0);
            for (t, c) in record.t.iter().zip(concentrations) {
                let e = (c / 100.0).ln() + setting.rate * t;
                sum += e;
                square += e * e;
                count += 1.0;
            }
        }
        let mean: f64 = sum / count;
        assert!(mean.abs() < 0.02 && ((square / count).sqrt() - setting.sd).abs() < 0.01);
    }
}
