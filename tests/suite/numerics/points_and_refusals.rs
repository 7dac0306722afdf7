//! What is refused, and what is not.

use ebbwell::numerics::{BadPoints, Kind, Mark, NoLine, Points};

use super::support::Series;

/// Source: house rule: checked once, at the door.
#[test]
fn points_are_equally_many_and_finite() {
    let marks = [Mark::Measured; 2];
    let lengths = BadPoints::Lengths { times: 2, values: 1, marks: 2 };
    assert_eq!(Points::new(&[0.0, 1.0], &[1.0], &marks).err(), Some(lengths));
    let bad = [f64::NAN, f64::INFINITY, f64::NEG_INFINITY];
    for value in bad {
        let found = Points::new(&[0.0, 1.0], &[1.0, value], &marks).err();
        assert_eq!(found, Some(BadPoints::NotFinite { index: 1 }));
        let found = Points::new(&[value, 1.0], &[1.0, 2.0], &marks).err();
        assert_eq!(found, Some(BadPoints::NotFinite { index: 0 }));
    }
    let points = Points::new(&[0.0, 1.0], &[1.0, 2.0], &marks).expect("sound points");
    assert_eq!((points.len(), points.is_empty(), points.all_measured()), (2, false, true));
}

fn refused(t: &[f64], results: &str) -> Option<NoLine> {
    Series::reported(t, results).fit().err()
}

/// Source: methods note 3.2, "Existence", and rule 3.2.
#[test]
fn too_little_is_refused_with_the_reason() {
    assert_eq!(refused(&[], ""), Some(NoLine::TooFewDates { dates: 0 }));
    assert_eq!(refused(&[0.0], "5"), Some(NoLine::TooFewDates { dates: 1 }));
    assert_eq!(refused(&[0.0, 1.0], "5 4"), Some(NoLine::TooFewDates { dates: 2 }));
    assert_eq!(refused(&[2.0; 4], "5 4 3 2"), Some(NoLine::OneDate));
    // Three measured values on one date, and non-detects later.
    assert_eq!(refused(&[0.0, 0.0, 0.0, 1.0, 2.0], "5 4 3 <2 <2"), Some(NoLine::OneDate));
    let t = [0.0, 1.0, 2.0, 3.0, 4.0];
    assert_eq!(refused(&t, "<5 <4 <3 <2 <1"), Some(NoLine::TooFewDetects { dates: 0 }));
    assert_eq!(refused(&t, "5 4 <3 <2 <1"), Some(NoLine::TooFewDetects { dates: 2 }));
    // Values above range are no measured ones.
    assert_eq!(refused(&t, ">5 >4 3 2 <1"), Some(NoLine::TooFewDetects { dates: 2 }));
}

/// Source: rule 3.2: on a line, unless a bound contradicts.
#[test]
fn detects_exactly_on_a_line_are_refused_unless_a_bound_contradicts() {
    let t = [0.0, 1.0, 2.0, 3.0, 4.0, 5.0];
    assert_eq!(refused(&t[..3], "8 4 2"), Some(NoLine::OnALine));
    assert_eq!(refused(&t[..4], "5 5 5 5"), Some(NoLine::OnALine));
    assert_eq!(refused(&t[..4], "8 4 2 <10"), Some(NoLine::OnALine));
    // A limit on the line itself does not contradict it.
    assert_eq!(refused(&t[..4], "8 4 2 <1"), Some(NoLine::OnALine));
    assert_eq!(refused(&t[..4], "8 4 2 >0.5"), Some(NoLine::OnALine));
    for results in ["8 4 2 <0.5", "8 4 2 >3", "8 4 2 <0.999", "5 5 5 <4.9", "8 4 2 <0.999999"] {
        let fit = Series::reported(&t[..4], results).fitted();
        assert_eq!(fit.kind, Kind::CensoredLikelihood);
        assert!(fit.ml_scale > 0.0 && fit.ml_scale.is_finite(), "{results}: {}", fit.ml_scale);
        let ends = fit.slope_interval(0.90);
        assert!(ends.low < fit.slope && fit.slope < ends.high, "{results}: {ends:?}");
    }
}

/// Source: rule 3.2: the measure is relative to the values, so that rounded data are never refused.
#[test]
fn nearly_on_a_line_is_a_line() {
    let t = [0.0, 1.0, 2.0, 3.0];
    for nudge in [1e-3, 1e-6, 1e-8] {
        for mark in [Mark::Measured, Mark::Below] {
            let mut series = Series::measured(&t, &[4.0, 3.0 + nudge, 2.0, 1.0]);
            series.mark[3] = mark;
            if mark == Mark::Below {
                series.y[3] = 1.5;
            }
            let fit = series.fitted();
            assert!((fit.slope + 1.0).abs() < 2.0 * nudge);
            let ends = fit.slope_interval(0.95);
            assert!(ends.low < fit.slope && fit.slope < ends.high && ends.high < -0.98);
        }
    }
}

/// Source: the ends of what a laboratory could ever write, on ln scale.
#[test]
fn concentrations_from_1e_minus_300_to_1e300_are_fitted() {
    let t = [0.0, 1.0, 2.0, 3.0, 4.0, 5.0, 6.0];
    let falling = Series::reported(&t, "1e300 2e200 3e100 1 1e-100 2e-200 <1e-300").fitted();
    let level = falling.level_interval(6.0, 0.9);
    assert!(falling.slope < -200.0 && level.low < level.high);
    for exponent in ["e-300", "e0", "e299"] {
        let results: Vec<String> =
            ["5", "4", "4.5", "3", "<2", "1.5", "<1"].map(|v| format!("{v}{exponent}")).into();
        let fit = Series::reported(&t, &results.join(" ")).fitted();
        let plain = Series::reported(&t, "5 4 4.5 3 <2 1.5 <1").fitted();
        assert!((fit.slope - plain.slope).abs() < 1e-10, "{exponent}: {}", fit.slope);
        assert!((fit.ml_scale - plain.ml_scale).abs() < 1e-10);
    }
}
