//! One first-order line a series, or the reason there is none.
//!
//! A missing rate is a result: it goes on through dates, verdict and report.

use chrono::NaiveDate;

use crate::numerics::{FirstOrder, Interval, Kind, NoLine, Points as NumericPoints, first_order};
use crate::series::Points;
use crate::site::RateNeeds;
use crate::terms::{Method, PerYear, Span, WhyNoRate, Years, years_between};

/// A fitted line with the estimates that every later stage reads.
#[derive(Clone, Debug)]
pub struct Fit {
    /// The line: ln C against years from the first used date.
    pub line: FirstOrder,
    /// How it was fitted.
    pub method: Method,
    /// First and last used date.
    pub used: Span,
    /// The confidence of every interval here.
    pub confidence: f64,
    /// The rate, positive when falling.
    pub rate: PerYear,
    /// The rate's interval.
    pub rate_interval: Interval,
    /// The interval of the ln level at the last used date.
    pub level_now_ln: Interval,
}

/// What a rate needs, and how sure its intervals are.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct FitRules {
    /// The fewest data for a rate.
    pub needs: RateNeeds,
    /// The two-sided confidence.
    pub confidence: f64,
}

/// Fits the dates in the window.
///
/// # Errors
/// [`WhyNoRate`], the first reason that holds.
pub fn fit(points: &Points, rules: &FitRules) -> Result<Fit, WhyNoRate> {
    let used = points.span().ok_or(WhyNoRate::NoDatesInWindow)?;
    let dates = points.fitted().count();
    if dates < rules.needs.dates {
        return Err(WhyNoRate::Dates);
    }
    // Substituted values are fitted where the site file asks for them, but they are no detects.
    if points.fitted().filter(|value| value.is_measured()).count() < rules.needs.detects {
        return Err(WhyNoRate::Detects);
    }
    let slices = points.slices();
    let numeric = NumericPoints::new(&slices.t, &slices.y, &slices.mark)
        .map_err(|_| WhyNoRate::NotConverged)?;
    let line = first_order(numeric).map_err(|refusal| match refusal {
        NoLine::TooFewDates { .. } | NoLine::OneDate => WhyNoRate::Dates,
        NoLine::TooFewDetects { .. } => WhyNoRate::Detects,
        NoLine::OnALine => WhyNoRate::OnALine,
        NoLine::NotConverged { .. } => WhyNoRate::NotConverged,
    })?;
    let slope = line.slope_interval(rules.confidence);
    let last = years_between(used.first, used.last);
    let method = match line.kind {
        _ if points.substituted > 0 => Method::LeastSquaresSubstituted,
        Kind::LeastSquares => Method::LeastSquares,
        Kind::CensoredLikelihood => Method::CensoredLikelihood,
    };
    Ok(Fit {
        method,
        used,
        confidence: rules.confidence,
        rate: PerYear(-line.slope),
        rate_interval: Interval { low: -slope.high, high: -slope.low },
        level_now_ln: line.level_interval(last.0, rules.confidence),
        line,
    })
}

/// Where the rate's interval lies.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum RateSign {
    /// Wholly above zero: falling.
    Falling,
    /// Wholly below zero: rising.
    Rising,
    /// It holds zero.
    HoldsZero,
}

impl Fit {
    /// Where the rate's interval lies.
    #[must_use]
    pub fn sign(&self) -> RateSign {
        if self.rate_interval.low > 0.0 {
            RateSign::Falling
        } else if self.rate_interval.high < 0.0 {
            RateSign::Rising
        } else {
            RateSign::HoldsZero
        }
    }

    /// Years from the first used date.
    #[must_use]
    pub fn years(&self, date: NaiveDate) -> f64 {
        years_between(self.used.first, date).0
    }

    /// The record's length, last minus first used date.
    #[must_use]
    pub fn length(&self) -> Years {
        self.used.years()
    }

    /// The fitted median on a date.
    #[must_use]
    pub fn median(&self, date: NaiveDate) -> f64 {
        self.line.fitted(self.years(date)).exp()
    }

    /// The rate that would meet the limit by the goal date from the level at the last used date.
    ///
    /// # None
    /// The level meets the limit, or the goal is not after the last used date.
    #[must_use]
    pub fn required_rate(&self, limit: f64, goal: NaiveDate) -> Option<f64> {
        let years = years_between(self.used.last, goal).0;
        let level = self.level_now();
        (level > limit && years > 0.0).then(|| (level / limit).ln() / years)
    }

    /// The fitted median at the last used date.
    #[must_use]
    pub fn level_now(&self) -> f64 {
        self.median(self.used.last)
    }
}
