//! Promises of intervals and of alternatives on random data: properties 6, 9, 11 and 16 of the
//! methods note, 1,000 cases each.

use ebbwell::numerics::tails::{student_quantile, student_upper};
use ebbwell::numerics::{
    Comparison, Crossing, Dropped, End, FirstOrder, Mark, Misfit, Side, compare,
};
use proptest::prelude::*;

use super::support::{Random, Series};

/// A random series, its fit, and a level that the line meets some way after the record. Every other
/// seed measures everything.
fn sound(seed: u64, share: f64) -> Option<(Series, FirstOrder, f64)> {
    let mut random = Random(seed);
    let series = random.series(if seed.is_multiple_of(2) { 0.0 } else { share });
    let fit = series.fit().ok()?;
    let ahead = random.between(-2.0, 10.0);
    let y0 = fit.fitted(series.t[series.t.len() - 1] + ahead);
    Some((series, fit, y0))
}

/// Whether a p is so near its threshold that rounding decides.
fn on_the_brink(p: f64, alpha: f64) -> bool {
    (p - alpha).abs() < 1e-6 * alpha
}

fn misfit(misfit: Misfit) -> f64 {
    match misfit {
        Misfit::Squares(rss) => rss,
        Misfit::LogLikelihood(value) => -value,
    }
}

fn finite(found: &Comparison) -> bool {
    let constant =
        found.constant.map_or(true, |c| c.level.is_finite() && misfit(c.misfit).is_finite());
    let plateau = found.plateau.map_or(true, |p| {
        let numbers = [p.ln_plateau, p.ln_height, p.rate, p.aicc, misfit(p.misfit)];
        numbers.iter().chain(&p.errors).all(|number| number.is_finite())
    });
    let two_rates = found.two_rates.map_or(true, |b| {
        [b.break_at, b.level, b.before, b.after, b.aicc, misfit(b.misfit)]
            .iter()
            .all(|number| number.is_finite())
    });
    constant && plateau && two_rates && found.first_order_aicc.is_none_or(f64::is_finite)
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(1000))]

    /// Source: property 6: the one-sided bound at 1 − α is the end at two-sided 1 − 2α, of rate,
    /// level and date alike: the value at which the one-sided test has p = α.
    #[test]
    fn a_one_sided_bound_is_a_two_sided_end(
        seed: u64, share in 0.0..0.6f64, alpha in 0.01..0.2f64
    ) {
        if let Some((series, fit, y0)) = sound(seed, share) {
            let confidence = 1.0 - 2.0 * alpha;
            let last = series.t[series.t.len() - 1];
            if let Some(line) = fit.line() {
                let student = |off: f64, error: f64| student_upper(off / error, line.degrees());
                let rate = fit.slope_interval(confidence);
                for end in [rate.low, rate.high] {
                    let p = student((end - fit.slope).abs(), line.slope_error());
                    prop_assert!((p / alpha - 1.0).abs() < 1e-8, "{p} for {alpha}");
                }
                let off = last - line.t_mean;
                let error = line.sd() * (1.0 / line.n as f64 + off * off / line.sxx).sqrt();
                let p = student(fit.level_interval(last, confidence).high - fit.fitted(last), error);
                prop_assert!((p / alpha - 1.0).abs() < 1e-8, "{p} for {alpha}");
            } else if let Some(line) = fit.censored() {
                let t = student_quantile(alpha, fit.m - 2.0);
                let one_sided = fit.m * (t * t / (fit.m - 2.0)).ln_1p();
                let bound = line.end(End::Slope(Side::Low), one_sided).expect("a slope has ends");
                let end = fit.slope_interval(confidence).low;
                prop_assert!((bound - end).abs() <= 1e-9 * (fit.slope - end));
                let bound = line.end(End::Crossing { y0, side: Side::High }, one_sided);
                if let Crossing::Located { high, estimate, .. } = fit.crossing(y0, confidence) {
                    let bound = bound.expect("a located crossing has a latest time");
                    prop_assert!((bound - high).abs() <= 1e-8 * (1.0 + high - estimate));
                }
            }
        }
    }

    /// Source: property 9: g < 1 exactly where the slope's p is under α; with bounds no latest time
    /// exactly where the fall at slope zero is within the cut-off.
    #[test]
    fn a_date_has_a_latest_exactly_where_the_rate_is_shown(
        seed: u64, share in 0.0..0.6f64, confidence in 0.6..0.99f64
    ) {
        if let Some((_, fit, y0)) = sound(seed, share) {
            let alpha = 1.0 - confidence;
            if on_the_brink(fit.slope_p, alpha) {
                return Ok(());
            }
            let shown = fit.slope_p < alpha;
            let located = matches!(fit.crossing(y0, confidence), Crossing::Located { .. });
            prop_assert_eq!(located, shown);
            if let Some(line) = fit.line() {
                let q = student_quantile(alpha / 2.0, line.degrees());
                let g = q * q * line.sd() * line.sd() / (line.slope * line.slope * line.sxx);
                prop_assert_eq!(g < 1.0, shown);
            } else if let Some(line) = fit.censored() {
                prop_assert_eq!(line.flat_fall() > line.cut_off(confidence), shown);
            }
        }
    }

    /// Source: property 11: where the one-sided bound exists, the direct test at t* has p < α exactly
    /// where the bound lies before t*. The direct test: is the level's upper end at t* under y0.
    #[test]
    fn the_direct_test_and_the_latest_date_say_the_same(
        seed: u64, share in 0.0..0.6f64, alpha in 0.01..0.2f64, ahead in 0.0..30.0f64
    ) {
        if let Some((series, fit, y0)) = sound(seed, share) {
            let confidence = 1.0 - 2.0 * alpha;
            let date = series.t[series.t.len() - 1] + ahead;
            let Crossing::Located { high, estimate, .. } = fit.crossing(y0, confidence) else {
                return Ok(());
            };
            // The statement is about falling lines, and not about a rounding.
            if fit.slope >= 0.0 || (high - date).abs() < 1e-6 * (1.0 + high - estimate) {
                return Ok(());
            }
            let under = fit.level_interval(date, confidence).high < y0;
            prop_assert_eq!(under, high < date);
            if let Some(line) = fit.line() {
                let off = date - line.t_mean;
                let error = line.sd() * (1.0 / line.n as f64 + off * off / line.sxx).sqrt();
                let p = student_upper((y0 - fit.fitted(date)) / error, line.degrees());
                prop_assert_eq!(p < alpha, high < date);
            }
        }
    }

    /// Source: property 16, and for log-likelihoods the same: a richer model fits no worse. The
    /// numbers of every model are plain.
    #[test]
    fn a_richer_model_fits_no_worse(seed: u64, share in 0.0..0.6f64) {
        if let Some((series, fit, _)) = sound(seed, share) {
            let found = compare(series.points(), &fit);
            prop_assert!(finite(&found), "{found:?}");
            let line = misfit(found.first_order);
            let slack = 1e-9 * (1.0 + line.abs());
            let constant = found.constant.map(|c| misfit(c.misfit));
            prop_assert!(constant.is_ok_and(|constant| line <= constant + slack), "{found:?}");
            if let Ok(two_rates) = found.two_rates {
                prop_assert!(misfit(two_rates.misfit) <= line + slack, "{found:?}");
            }
            if let Ok(plateau) = found.plateau {
                prop_assert!(misfit(plateau.misfit) <= line + slack, "{found:?}");
                // A rate that is not known within a factor of twenty is no rate.
                prop_assert!(plateau.errors[2] < 3.0, "{found:?}");
            }
        }
    }

    /// Source: properties 1 to 4 for the alternatives: a factor on concentrations, moved dates and
    /// another order of the points move what they should and nothing else.
    #[test]
    fn alternatives_move_with_units_dates_and_order(
        seed: u64, share in 0.0..0.5f64, up in -50.0..50.0f64, later in -100.0..100.0f64
    ) {
        let Some((series, fit, y0)) = sound(seed, share) else { return Ok(()) };
        let found = compare(series.points(), &fit);
        let moved = Series {
            t: series.t.iter().rev().map(|t| t + later).collect(),
            y: series.y.iter().rev().map(|y| y + up).collect(),
            mark: series.mark.iter().rev().copied().collect(),
        };
        let again = compare(moved.points(), &moved.fitted());
        let same = |x: f64, y: f64, by: f64| (x - y).abs() <= by * (1.0 + x.abs());
        if let (Ok(one), Ok(two)) = (found.plateau, again.plateau) {
            // Two starts may lead to two tops; those that do not are the same top.
            if same(one.aicc, two.aicc, 1e-7) {
                let near = 1e-4 * one.errors[0];
                prop_assert!((two.ln_plateau - up - one.ln_plateau).abs() <= near.max(1e-7));
                for t in [series.t[0], series.t[series.t.len() - 1] + 5.0] {
                    let off = two.fitted(t + later) - up - one.fitted(t);
                    prop_assert!(off.abs() <= 1e-4 * one.errors[0].max(one.errors[2]) + 1e-7);
                }
                prop_assert!(same(one.errors[2], two.errors[2], 1e-3));
                let (a, b) = (one.crossing(y0), two.crossing(y0 + up));
                prop_assert!(a.is_some() == b.is_some() || (one.ln_plateau - y0).abs() < 1e-5);
            }
        }
        if let (Ok(one), Ok(two)) = (found.two_rates, again.two_rates) {
            prop_assert!(same(one.aicc, two.aicc, 1e-5), "{one:?} {two:?}");
        }
        let name = |dropped: Dropped| std::mem::discriminant(&dropped);
        prop_assert_eq!(found.two_rates.err().map(name), again.two_rates.err().map(name));
    }
}

/// Source: bad input of issue 5: from 1e-300 to 1e300, ties, all on few dates, limits far above
/// everything. Nothing panics, no number is missing.
#[test]
fn nothing_breaks_the_comparison() {
    let mut random = Random(2024);
    for round in 0..3000 {
        let n = random.whole(3, 30);
        let wild = 10f64.powf(random.between(-6.0, 2.8));
        let mut series = Series { t: vec![], y: vec![], mark: vec![] };
        for _ in 0..n {
            let t = random.between(0.0, 12.0);
            series.t.push(if round % 3 == 0 { t.round() } else { t });
            series.y.push(wild * random.normal() - if round % 2 == 0 { t } else { 0.0 });
            series.mark.push(match random.whole(0, 9) {
                0 | 1 if round % 4 > 1 => Mark::Below,
                2 if round % 4 > 2 => Mark::Above,
                _ => Mark::Measured,
            });
        }
        if round % 5 == 0 {
            series.t.push(6.0);
            series.y.push(690.0);
            series.mark.push(Mark::Below);
        }
        if let Ok(fit) = series.fit() {
            let found = compare(series.points(), &fit);
            assert!(finite(&found), "{series:?}: {found:?}");
            let _ = found.better.map(|better| (better.crossing(0.0), better.fitted(1e4)));
        }
    }
}
