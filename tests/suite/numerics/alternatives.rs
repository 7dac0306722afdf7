//! Constant, first-order, plateau and two rates side by side.

use approx::{assert_relative_eq, relative_eq};
use ebbwell::numerics::{Better, Comparison, Dropped, Mark, Misfit, Plateau, TwoRates, compare};

use super::doubts_support::invented;
use super::support::{CLOSED, Random, Series, number, printed, reference, w02, w14};

/// Plateau parameters and their standard errors against R and 40-digit values (relative). Source:
/// the reference folder asks for these.
const PARAMETERS: f64 = 1e-5;
const ERRORS: f64 = 1e-3;

/// W17: the plateau series "D1" of the methods note.
pub fn w17() -> Series {
    let t = [
        0.0, 0.25, 0.5, 0.75, 1.0, 1.25, 1.5, 1.75, 2.0, 2.5, 3.0, 3.5, 4.0, 4.5, 5.0, 5.5, 6.0,
        6.5, 7.0, 8.0,
    ];
    let results = "940 700 610 430 350 300 210 200 150 105 72 61 49 52 40 45 38 44 37 41";
    Series::reported(&t, results)
}

/// W18: the two-segment series "D2" of the methods note.
pub fn w18() -> Series {
    let t =
        [0.0, 0.5, 1.0, 1.5, 2.0, 2.5, 3.0, 3.25, 3.5, 3.75, 4.0, 4.25, 4.5, 4.75, 5.0, 5.5, 6.0];
    Series::reported(&t, "520 500 470 495 440 455 420 330 270 225 160 140 105 88 66 42 24")
}

fn compared(series: &Series) -> Comparison {
    compare(series.points(), &series.fitted())
}

fn rss(misfit: Misfit) -> f64 {
    match misfit {
        Misfit::Squares(rss) => rss,
        Misfit::LogLikelihood(_) => panic!("all was measured: {misfit:?}"),
    }
}

fn constant_aicc(found: &Comparison) -> f64 {
    found.constant.expect("a constant level").aicc.expect("points enough")
}

fn first_order_aicc(found: &Comparison) -> f64 {
    found.first_order_aicc.expect("points enough")
}

/// Source: W17, R 4.2.2 `nls` and a grid of breaks.
#[test]
fn w17_levels_off_and_the_line_promises_a_date_that_the_plateau_denies() {
    let found = compared(&w17());
    let plateau = found.plateau.expect("W17 levels off");
    assert_relative_eq!(plateau.ln_plateau.exp(), 39.16950911, max_relative = CLOSED);
    assert_relative_eq!(plateau.ln_height.exp(), 907.969625, max_relative = CLOSED);
    assert_relative_eq!(plateau.rate, 1.058459415, max_relative = CLOSED);
    assert_relative_eq!(rss(plateau.misfit), 0.07996227558, max_relative = CLOSED);
    let errors = [0.03003170, 0.04036514, 0.02962748];
    for (found, expected) in plateau.errors.into_iter().zip(errors) {
        printed(found, expected, 8);
    }
    let two_rates = found.two_rates.expect("two rates can always be tried here");
    printed(two_rates.break_at, 3.2406326, 7);
    printed(two_rates.before, -0.8550389, 7);
    printed(two_rates.after, -0.0842885, 7);
    printed(rss(two_rates.misfit), 0.13425604, 8);
    printed(constant_aicc(&found), 7.92434, 5);
    printed(first_order_aicc(&found), -25.87074, 5);
    printed(two_rates.aicc, -85.78906, 5);
    printed(plateau.aicc, -99.77199, 5);
    assert_eq!(found.better, Some(Better::Plateau(plateau)));

    // The limit 5: the line reaches it, the plateau never does.
    let y0 = 5f64.ln();
    let line = w17().fitted();
    printed((y0 - line.intercept) / line.slope, 10.955, 3);
    assert_eq!(found.better.and_then(|better| better.crossing(y0)), None);
}

/// Source: W18, R 4.2.2; the plateau has the wrong curvature there.
#[test]
fn w18_has_two_rates_and_no_plateau() {
    let found = compared(&w18());
    assert_eq!(found.plateau, Err(Dropped::WrongCurvature));
    let two_rates = found.two_rates.expect("W18 has two rates");
    printed(two_rates.break_at, 3.02657320, 7);
    printed(two_rates.before, -0.0639501138, 8);
    printed(two_rates.after, -0.9476836283, 8);
    printed(rss(two_rates.misfit), 0.0230951846, 10);
    assert_eq!(two_rates.n_after, 10);
    printed(constant_aicc(&found), 2.65281, 5);
    printed(first_order_aicc(&found), -23.09770, 5);
    printed(two_rates.aicc, -96.76831, 5);
    assert_eq!(found.better, Some(Better::TwoRates(two_rates)));
}

/// Source: W02, methods note; times in months, so that a "year" is a month here.
#[test]
fn w02_constant_and_line_are_weighed() {
    let found = compared(&w02());
    printed(constant_aicc(&found), -0.83514, 5);
    printed(first_order_aicc(&found), -12.54775, 5);
    assert_eq!(found.better, None);
}

/// Source: W14, R 4.2.2 `survreg`: log-likelihoods of the constant and the line.
#[test]
fn w14_is_weighed_by_likelihood() {
    let found = compared(&w14());
    let constant = found.constant.expect("a constant level");
    let Misfit::LogLikelihood(value) = constant.misfit else { panic!("{constant:?}") };
    assert_relative_eq!(value, -22.08556731, max_relative = CLOSED);
    let penalty = |k: f64| 2.0 * k + 2.0 * k * (k + 1.0) / (16.0 - k - 1.0);
    let expected = 2.0 * 22.08556731 + penalty(2.0);
    assert_relative_eq!(constant_aicc(&found), expected, max_relative = CLOSED);
    let expected = 2.0 * 1.831351979 + penalty(3.0);
    assert_relative_eq!(first_order_aicc(&found), expected, max_relative = CLOSED);
}

/// Source: R 4.2.2 `nls` and `segmented` on S05, and 40-digit values, with and without bounds:
/// `tests/reference/alternatives.csv`, computed by `alternatives.py`.
#[test]
fn the_tailing_series_agrees_with_forty_digit_values() {
    let measured = &invented()["S05_tailing"];
    let bounded = |low: f64, high: f64| {
        let mut series = measured.clone();
        for (y, mark) in series.y.iter_mut().zip(&mut series.mark) {
            if *y < low.ln() - 1e-9 {
                (*y, *mark) = (low.ln(), Mark::Below);
            } else if *y > high.ln() {
                (*y, *mark) = (high.ln(), Mark::Above);
            }
        }
        series
    };
    let cases = [
        ("S05", measured.clone()),
        ("S05<9", bounded(9.0, 1e9)),
        ("S05<9>150", bounded(9.0, 150.0)),
    ];
    let rows = reference("alternatives.csv");
    for (case, series) in cases {
        let found = compared(&series);
        let plateau = found.plateau.expect("S05 levels off");
        let broken = found.two_rates.expect("S05 has room for a break");
        let misfit = |misfit| match misfit {
            Misfit::Squares(value) | Misfit::LogLikelihood(value) => value,
        };
        let expected = |what: &str| {
            let row = rows.iter().find(|row| row[0] == case && row[1] == what);
            row.map(|row| number(&row[2]))
        };
        let agree = |what: &str, found: f64, tolerance: f64| {
            let value = expected(what).expect("a row of the fixture");
            let agreed = relative_eq!(found, value, max_relative = tolerance);
            assert!(agreed, "{case} {what}: {found}, expected {value}");
        };
        agree("ln_plateau", plateau.ln_plateau, PARAMETERS);
        agree("ln_height", plateau.ln_height, PARAMETERS);
        agree("ln_rate", plateau.rate.ln(), PARAMETERS);
        agree("plateau_misfit", misfit(plateau.misfit), 1e-9);
        let errors = ["plateau_error", "height_error", "rate_error"];
        for (what, error) in errors.into_iter().zip(plateau.errors) {
            agree(what, error, ERRORS);
        }
        let constant = found.constant.expect("a constant level");
        agree("constant_level", constant.level, PARAMETERS);
        agree("constant_misfit", misfit(constant.misfit), 1e-9);
        agree("break_at", broken.break_at, PARAMETERS);
        agree("level", broken.level, PARAMETERS);
        agree("before", broken.before, PARAMETERS);
        agree("after", broken.after, PARAMETERS);
        agree("broken_misfit", misfit(broken.misfit), 1e-9);
    }
}

/// Source: the reference folder: on the clean series S01 the plateau collapses to zero.
#[test]
fn a_plateau_that_collapses_is_dropped() {
    let found = compared(&invented()["S01_clean"]);
    assert_eq!(found.plateau, Err(Dropped::NoPlateau));
    assert_eq!(found.better, None);
}

/// Source: the reasons as they are documented.
#[test]
fn an_alternative_that_cannot_be_fitted_says_why() {
    let short = Series::reported(&[0.0, 1.0, 2.0, 3.0], "9 5 4 1");
    let found = compared(&short);
    assert_eq!(found.plateau, Err(Dropped::TooFewPoints { n: 4, needed: 7 }));
    assert_eq!(found.two_rates, Err(Dropped::TooFewPoints { n: 4, needed: 8 }));
    assert_eq!(found.constant.expect("a level").aicc, None);
    assert_eq!((found.first_order_aicc, found.better), (None, None));

    let rising = compared(&invented()["S06_rising"]);
    assert_eq!(rising.plateau, Err(Dropped::NotFalling));

    let t: Vec<f64> = (0..12).map(|i| f64::from(i) / 8.0).collect();
    let hurried = Series::reported(&t, "90 80 85 70 60 64 55 50 45 46 40 33");
    assert_eq!(compared(&hurried).two_rates, Err(Dropped::NoRoom));

    let t: Vec<f64> = (0..12).map(f64::from).collect();
    let few = Series::reported(&t, "90 50 20 <9 <9 <9 <9 <9 <9 <9 <9 <9");
    let dropped = Dropped::TooFewDetects { dates: 3, needed: 4 };
    assert_eq!(compared(&few).plateau, Err(dropped));
    assert_eq!(compared(&few).two_rates, Err(dropped));
}

/// Source: a fall on the first date alone has no rate: any fast one fits as well.
#[test]
fn a_fall_that_rests_on_the_first_date_has_no_rate() {
    let t: Vec<f64> = (0..16).map(f64::from).collect();
    let spike = Series::reported(&t, "900 10 11 9 12 10 9 11 10 12 9 10 11 9 10 11");
    assert!(matches!(compared(&spike).plateau, Err(Dropped::NotConverged { .. })));

    // With the second date a thousandth over the others there is a best rate, known to nothing.
    let mut close = spike;
    close.y[1] = close.y[2..].iter().sum::<f64>() / 14.0 + 1e-3;
    assert!(matches!(compared(&close).plateau, Err(Dropped::NotConverged { .. })));
    // With half as much again there is one that means something.
    close.y[1] += 0.4;
    assert!(compared(&close).plateau.is_ok());
}

/// Source: each model's own formula, turned round.
#[test]
fn a_crossing_is_where_the_model_meets_the_level() {
    let plateau: Plateau = compared(&w17()).plateau.expect("W17 levels off");
    for y0 in [6.0, 4.5, 3.8, plateau.ln_plateau + 1e-9] {
        let t = plateau.crossing(y0).expect("over the plateau");
        assert_relative_eq!(plateau.fitted(t), y0, max_relative = 1e-9);
    }
    assert_eq!(plateau.crossing(plateau.ln_plateau), None);
    assert_eq!(plateau.crossing(-1e6), None);
    assert_eq!(plateau.crossing(1e6).map(|t| t < -1e5), Some(true));

    let broken: TwoRates = compared(&w18()).two_rates.expect("W18 has two rates");
    // Under the level at the break the last rate leads there, over it the first.
    for (y0, slope) in [(2.0, broken.after), (6.2, broken.before)] {
        let t = broken.crossing(y0).expect("both rates fall");
        assert_relative_eq!(broken.fitted(t), y0, max_relative = 1e-12);
        assert_eq!(slope == broken.after, t > broken.break_at);
    }
    // A record that rises after its break does not stay under anything.
    let rebound = TwoRates { after: 0.1, ..broken };
    assert_eq!(rebound.crossing(2.0), None);
    assert_eq!(rebound.crossing(6.2), None);
    // One that rose before it was never over what lies above its break.
    let peaked = TwoRates { before: 0.1, ..broken };
    assert_eq!(peaked.crossing(6.2), None);
    assert!(peaked.crossing(2.0).is_some());
}

/// Source: the rule: the lower criterion of the two, if under the line's by more than 4.
#[test]
fn the_better_model_is_the_lower_one_by_more_than_four() {
    let mut random = Random(57);
    let (mut none, mut plateau, mut two_rates) = (0, 0, 0);
    for round in 0..300 {
        let t: Vec<f64> = (0..24).map(|i| f64::from(i) / 3.0).collect();
        let mean = |t: f64| match round % 3 {
            0 => 5.0 - 0.4 * t,
            1 => (3.0 + 150.0 * (-0.9 * t).exp()).ln(),
            _ => 5.0 - 0.05 * t - 0.7 * (t - 4.0f64).max(0.0),
        };
        let y: Vec<f64> = t.iter().map(|&t| mean(t) + 0.3 * random.normal()).collect();
        let found = compared(&Series::measured(&t, &y));
        let line = first_order_aicc(&found);
        let offered = [found.plateau.ok().map(|p| p.aicc), found.two_rates.ok().map(|b| b.aicc)];
        let least = offered.into_iter().flatten().fold(f64::INFINITY, f64::min);
        match found.better {
            None => none += 1,
            Some(better) => {
                assert_eq!(better.aicc(), least);
                assert!(least < line - 4.0);
                match better {
                    Better::Plateau(_) => plateau += 1,
                    Better::TwoRates(_) => two_rates += 1,
                }
            }
        }
        assert_eq!(found.better.is_none(), least >= line - 4.0);
    }
    assert!(none > 90 && plateau > 80 && two_rates > 80, "{none} {plateau} {two_rates}");
}

/// Source: values that lie exactly on a curve leave rounding alone, and every number stays finite.
#[test]
fn exact_curves_are_found_and_stay_finite() {
    let t: Vec<f64> = (0..20).map(|i| f64::from(i) / 2.0).collect();
    let y: Vec<f64> = t.iter().map(|t| (4.0 + 90.0 * (-0.8 * t).exp()).ln()).collect();
    let found = compared(&Series::measured(&t, &y));
    let plateau = found.plateau.expect("a plateau");
    assert_relative_eq!(plateau.rate, 0.8, max_relative = 1e-6);
    assert!(plateau.aicc.is_finite());
    assert!(matches!(found.better, Some(Better::Plateau(_))));

    let y: Vec<f64> = t.iter().map(|t| 4.0 - 0.1 * t - 0.5 * (t - 4.2f64).max(0.0)).collect();
    let found = compared(&Series::measured(&t, &y));
    let broken = found.two_rates.expect("two rates");
    assert_relative_eq!(broken.break_at, 4.2, max_relative = 1e-6);
    assert!(broken.aicc.is_finite());
}
