//! Invented series for the tests of pages, tables, charts and folders. No number here is real.

pub use super::sample_run::{findings, run, site};
use chrono::{Days, NaiveDate};
use ebbwell::findings::{BandPoint, Fitted, OutcomeCount, SeriesFinding, UsedValue};
use ebbwell::series::SeriesKey;
use ebbwell::site::Role;
use ebbwell::terms::{
    Figure, Flag, FlagCode, Method, MoreRounds, Pace, PerYear, Reading, Span, Unit, Verdict,
    WhyNoDate, WhyNoRate, date_after, years_between,
};

/// A two-sided t quantile for the samples; what it is does not matter here.
const T: f64 = 1.8;

pub fn date(text: &str) -> NaiveDate {
    NaiveDate::parse_from_str(text, "%Y-%m-%d").expect("a date of the tests")
}

/// Quarterly dates from a first one.
pub fn quarters(first: &str, n: u64) -> Vec<NaiveDate> {
    (0..n).map(|i| date(first) + Days::new(i * 91)).collect()
}

/// A series without values, too few to say anything.
pub fn empty(well: &str, analyte: &str) -> SeriesFinding {
    SeriesFinding {
        key: SeriesKey {
            site: "Example Yard".into(),
            well: well.into(),
            analyte: analyte.into(),
            fraction: None,
            depth: None,
        },
        role: Role::Plume,
        cas: None,
        unit: Unit::UG_PER_L,
        limit: Some(5.0),
        limit_source: Some("40 CFR 141.61".into()),
        goal_date: None,
        samples: 0,
        detects: 0,
        sampled: None,
        last_result: None,
        verdict: Verdict::TooFew,
        pace: None,
        method: None,
        rate_per_year: None,
        rate_lower: None,
        rate_upper: None,
        level_at_start: None,
        level_now: None,
        level_now_lower: None,
        level_now_upper: None,
        share_over_limit_now: None,
        residual_sd_ln: None,
        r_squared: None,
        slope_p: None,
        slope_p_adjusted: None,
        kendall_s: None,
        kendall_p: None,
        sen_rate_per_year: None,
        sen_rate_lower: None,
        sen_rate_upper: None,
        reach_date: None,
        reach_earliest: None,
        reach_latest: None,
        reach_date_mean: None,
        exceed_date: None,
        exceed_earliest: None,
        required_rate_per_year: None,
        alternative_model: None,
        alternative_date: None,
        rounds_to_decisive: None,
        previous_verdict: None,
        reach_shift_years: None,
        why_no_rate: Some(WhyNoRate::Dates),
        why_no_date: Some(WhyNoDate::NoRate),
        flags: Vec::new(),
        beyond_horizon: false,
        earliest_beyond_horizon: false,
        latest_beyond_horizon: false,
        stands_in_the_way: false,
        values: Vec::new(),
        fitted: None,
        duplicates: Vec::new(),
        records: Vec::new(),
        horizon: None,
        alternative_denies: false,
        models: Vec::new(),
        adjusted: None,
        spans: Vec::new(),
        most_telling: None,
        more_rounds: MoreRounds::default(),
    }
}

/// A series with these readings, not fitted.
pub fn with(mut series: SeriesFinding, readings: &[(NaiveDate, Reading)]) -> SeriesFinding {
    series.values = readings
        .iter()
        .enumerate()
        .map(|(at, (date, reading))| UsedValue {
            date: *date,
            reading: *reading,
            estimated: false,
            in_fit: true,
            fitted_median: None,
            residual: None,
            records: vec![format!("results/lab.csv:{}", at + 2)],
        })
        .collect();
    counted(series)
}

/// Counts dates and detects in the window anew.
pub fn counted(mut series: SeriesFinding) -> SeriesFinding {
    let fit: Vec<UsedValue> = series.values.iter().filter(|v| v.in_fit).cloned().collect();
    series.samples = fit.len();
    series.detects = fit.iter().filter(|v| v.reading.is_detect()).count();
    series.sampled = fit.first().zip(fit.last()).map(|(a, b)| Span { first: a.date, last: b.date });
    series.last_result = fit.last().map(|v| v.reading);
    series.records =
        vec![OutcomeCount { outcome: "used", reason: String::new(), records: series.values.len() }];
    series
}

/// Fits a least-squares line through the readings' numbers, with band and dates. A stand-in for the
/// program's own fit, good enough to be drawn.
pub fn fitted(series: SeriesFinding) -> SeriesFinding {
    let mut series = counted(series);
    let Some(used) = series.sampled else { return series };
    let points: Vec<(f64, f64)> = series
        .values
        .iter()
        .filter(|value| value.in_fit)
        .map(|value| (years_between(used.first, value.date).0, value.reading.number().ln()))
        .collect();
    let n = points.len() as f64;
    let (mean_t, mean_y) =
        (points.iter().map(|p| p.0).sum::<f64>() / n, points.iter().map(|p| p.1).sum::<f64>() / n);
    let sxx: f64 = points.iter().map(|p| (p.0 - mean_t).powi(2)).sum();
    let b = points.iter().map(|p| (p.0 - mean_t) * (p.1 - mean_y)).sum::<f64>() / sxx;
    let line = |t: f64| mean_y + b * (t - mean_t);
    let rss: f64 = points.iter().map(|p| (p.1 - line(p.0)).powi(2)).sum();
    let s = (rss / (n - 2.0)).sqrt();
    let half = |t: f64| T * s * (1.0 / n + (t - mean_t).powi(2) / sxx).sqrt();
    let se = T * s / sxx.sqrt();
    let last = years_between(used.first, used.last).0;
    series.method = Some(Method::LeastSquares);
    series.why_no_rate = None;
    series.rate_per_year = Some(PerYear(-b));
    series.rate_lower = Some(PerYear(-b - se));
    series.rate_upper = Some(PerYear(-b + se));
    series.level_at_start = Some(line(0.0).exp());
    series.level_now = Some(line(last).exp());
    series.level_now_lower = Some((line(last) - half(last)).exp());
    series.level_now_upper = Some((line(last) + half(last)).exp());
    series.residual_sd_ln = Some(s);
    series.slope_p = Some(0.0123);
    series.verdict = match (-b - se > 0.0, -b + se < 0.0) {
        (true, _) => Verdict::Attenuating,
        (_, true) => Verdict::Rising,
        _ => Verdict::Undecided,
    };
    series.why_no_date = match series.verdict {
        Verdict::Rising => Some(WhyNoDate::Rising),
        Verdict::Undecided => Some(WhyNoDate::IntervalHoldsZero),
        _ => None,
    };
    if let (Some(limit), Verdict::Attenuating) = (series.limit, series.verdict) {
        let cross = |side: f64| {
            let mut t = 0.0;
            while line(t) + side * half(t) > limit.ln() && t < 400.0 {
                t += 0.01;
            }
            date_after(used.first, t)
        };
        series.reach_date = cross(0.0);
        series.reach_earliest = cross(-1.0);
        series.reach_latest = cross(1.0);
        series.reach_date_mean =
            date_after(used.first, (mean_y - limit.ln() + s * s / 2.0) / -b + mean_t);
    }
    let end = last * 3.0 + 1.0;
    series.fitted = Some(Fitted {
        used,
        band: (0..=120)
            .map(|i| end * f64::from(i) / 120.0)
            .filter_map(|t| {
                Some(BandPoint {
                    date: date_after(used.first, t)?,
                    median: line(t).exp(),
                    low: (line(t) - half(t)).exp(),
                    high: (line(t) + half(t)).exp(),
                })
            })
            .collect(),
    });
    for value in series.values.iter_mut().filter(|value| value.in_fit) {
        let median = line(years_between(used.first, value.date).0).exp();
        value.fitted_median = Some(median);
        if let Reading::Measured(v) = value.reading {
            value.residual = Some((v / median).ln());
        }
    }
    series
}

/// Readings on a line with a repeating scatter: start, rate a year, scatter.
pub fn scattered(
    dates: &[NaiveDate],
    start: f64,
    rate: f64,
    scatter: f64,
) -> Vec<(NaiveDate, Reading)> {
    const WAVE: [f64; 8] = [0.4, -0.9, 0.2, 1.0, -0.5, 0.1, -1.1, 0.7];
    dates
        .iter()
        .enumerate()
        .map(|(at, date)| {
            let t = years_between(dates[0], *date).0;
            let value = start * (-rate * t + scatter * WAVE[at % WAVE.len()]).exp();
            (*date, Reading::Measured(value))
        })
        .collect()
}

/// A clean decline towards its limit, with a goal.
pub fn decline() -> SeriesFinding {
    let dates = quarters("2018-02-14", 30);
    let mut series = fitted(with(empty("MW-3", "Benzene"), &scattered(&dates, 180.0, 0.28, 0.25)));
    series.goal_date = Some(date("2034-12-31"));
    series.pace = Some(Pace::Ahead);
    series.required_rate_per_year = Some(0.23);
    series.flags = vec![
        Flag::raised(FlagCode::Outlier, 0.003_1, 0.05),
        Flag::not_assessable(FlagCode::NotNormal, 0.05),
    ];
    series
}

/// A rise over the limit.
pub fn rise() -> SeriesFinding {
    let dates = quarters("2019-05-20", 22);
    let mut series =
        fitted(with(empty("MW-7", "Vinyl chloride"), &scattered(&dates, 3.0, -0.3, 0.3)));
    series.limit = Some(2.0);
    series.slope_p_adjusted = Some(0.0004);
    series.stands_in_the_way = true;
    series.flags = vec![Flag::raised(FlagCode::Stale, 2.25, 1.5)];
    series
}

/// Non-detects, estimated values, an interval, a value above the range, and dates before a restart.
pub fn mixed() -> SeriesFinding {
    let dates = quarters("2014-01-10", 40);
    let mut readings = scattered(&dates, 60.0, 0.35, 0.45);
    for at in [20, 24, 27, 28, 31, 33, 36, 38] {
        readings[at].1 = Reading::Below(if at < 30 { 10.0 } else { 2.0 });
    }
    readings[9].1 = Reading::Above(50.0);
    readings[25].1 = Reading::Between(2.0, 5.0);
    let mut series = with(empty("MW-12", "Trichloroethylene"), &readings);
    for at in 0..6 {
        series.values[at].in_fit = false;
    }
    for at in [22, 29, 34, 35] {
        series.values[at].estimated = true;
    }
    let mut series = fitted(series);
    series.method = Some(Method::CensoredLikelihood);
    series
}

/// Scatter without a trend, over the limit.
pub fn undecided() -> SeriesFinding {
    let dates = quarters("2020-03-01", 12);
    let mut series =
        fitted(with(empty("MW-9", "1,1-Dichloroethylene"), &scattered(&dates, 40.0, 0.02, 0.5)));
    series.limit = Some(7.0);
    series.reach_earliest = Some(date("2027-04-01"));
    series.flags = vec![
        Flag::fact(FlagCode::Unbounded, Figure::Absent),
        Flag::raised(FlagCode::ShortRecord, 3.0, 4.0),
    ];
    series
}

/// Three dates.
pub fn too_few() -> SeriesFinding {
    let dates = quarters("2024-03-01", 3);
    with(empty("MW-1", "Benzene"), &scattered(&dates, 8.0, 0.1, 0.1))
}

/// All non-detects.
pub fn undetected() -> SeriesFinding {
    let dates = quarters("2020-03-01", 10);
    let readings: Vec<_> = dates.iter().map(|date| (*date, Reading::Below(0.5))).collect();
    let mut series = with(empty("MW-2", "Benzene"), &readings);
    series.verdict = Verdict::Undetected;
    series.why_no_rate = None;
    series
}
