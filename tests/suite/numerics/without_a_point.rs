//! The line without each of its points.

use approx::{assert_relative_eq, relative_eq};
use ebbwell::numerics::{
    Kind, LeftOut, Mark, NoLine, deletion_diagnostics, farthest, farthest_left_out, first_order,
    left_out, worth_leaving_out,
};
use proptest::prelude::*;

use super::support::{CLOSED, Random, Series, printed, steps, w02, w14};

fn all(series: &Series) -> Vec<LeftOut> {
    let every: Vec<usize> = (0..series.t.len()).collect();
    left_out(series.points(), &series.fitted(), &every)
}

fn without(series: &Series, index: usize) -> Series {
    let mut rest = series.clone();
    rest.t.remove(index);
    rest.y.remove(index);
    rest.mark.remove(index);
    rest
}

/// Source: W02: the studentized residuals of R 4.2.2, and 49.996 months to 5 ppb without the last
/// point instead of 37.675440182.
#[test]
fn w02_hangs_on_its_last_point() {
    let series = w02();
    let (fit, points) = (series.fitted(), all(&series));
    let last = points[9];
    printed(last.studentized.expect("measured"), -6.5840493, 7);
    let y0 = 5f64.ln();
    printed(last.line.expect("nine points").meets(y0).expect("it falls"), 49.996, 3);
    let shift = last.shift(&fit, y0).expect("both fall");
    assert_relative_eq!(shift, 49.996 - 37.675440182, max_relative = 1e-4);
    let far = farthest_left_out(&points, 10).expect("ten points");
    assert_eq!(far.index, 9);
    assert_relative_eq!(far.bonferroni_p, 0.003088571, max_relative = CLOSED);
    printed(points[6].studentized.expect("measured"), 1.4360955, 7);
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(1000))]

    /// Source: property 15 of the methods note: a refit without the point, and the closed forms.
    #[test]
    fn measured_points_left_out_equal_a_refit(seed: u64) {
        let series = Random(seed).series(0.0);
        let points = all(&series);
        let closed = deletion_diagnostics(&series.t, &series.y).expect("not on a line");
        let far = farthest(&closed).expect("five points or more");
        let found = farthest_left_out(&points, series.t.len()).expect("five points or more");
        prop_assert_eq!(found.index, far.index);
        for (point, closed) in points.iter().zip(closed) {
            let rest = without(&series, point.index).fitted();
            let line = point.line.expect("four points or more");
            for (found, refit) in [
                (line.slope, rest.slope), (line.intercept, rest.intercept), (line.sd, rest.sd),
                (line.m, rest.m),
            ] {
                // Slopes near zero and intercepts far from the data: beside the scatter.
                prop_assert!(relative_eq!(
                    found, refit, max_relative = 1e-10, epsilon = 1e-10 * rest.sd
                ), "{found} {refit}");
            }
            let (one, other) = (point.studentized.expect("measured"), closed.studentized);
            let other = other.expect("five points or more");
            prop_assert!(relative_eq!(one, other, max_relative = 1e-8, epsilon = 1e-10));
        }
    }

    /// Source: a fit from the beginning without the point, with non-detects and values above range.
    #[test]
    fn points_left_out_of_a_censored_fit_equal_a_refit(seed: u64, share in 0.05..0.6f64) {
        let mut series = Random(seed).series(share);
        if seed % 3 == 0 {
            series.mark[0] = Mark::Above;
        }
        if let Ok(fit) = series.fit() {
            let points = left_out(series.points(), &fit, &[0, 1, series.t.len() - 1]);
            for point in &points {
                let rest = without(&series, point.index).fit();
                match (point.line, rest) {
                    (Ok(line), Ok(rest)) => {
                        let close = 1e-6 * rest.sd;
                        prop_assert!(relative_eq!(line.sd, rest.sd, max_relative = 1e-6));
                        prop_assert!(relative_eq!(
                            line.slope, rest.slope, max_relative = 1e-6, epsilon = close
                        ));
                        prop_assert!(relative_eq!(
                            line.intercept, rest.intercept, max_relative = 1e-6, epsilon = close
                        ));
                        prop_assert_eq!(line.m, rest.m);
                    }
                    (Err(none), Err(refused)) => prop_assert_eq!(none, refused),
                    (found, refit) => prop_assert!(false, "{found:?} but {refit:?}"),
                }
            }
        }
    }
}

/// Source: the deletion residual by definition: (y − ŷ′)/(s′·√(1 + v/σ′²)) from the covariance of
/// the fit without the point.
#[test]
fn a_censored_deletion_residual_is_the_one_of_the_fit_without_it() {
    let series = w14();
    let points = all(&series);
    for point in &points {
        let rest = without(&series, point.index);
        let fit = first_order(rest.points()).expect("fifteen points");
        if series.mark[point.index] == Mark::Below {
            assert_eq!(point.studentized, None);
            continue;
        }
        let fitted = fit.censored().expect("non-detects");
        let (wald, t) = (fitted.covariance(), series.t[point.index]);
        let level = wald.intercept + 2.0 * t * wald.intercept_slope + t * t * wald.slope;
        let spread = (1.0 + level / (fit.ml_scale * fit.ml_scale)).sqrt();
        let residual = (series.y[point.index] - fit.fitted(t)) / (fit.sd * spread);
        let found = point.studentized.expect("measured");
        assert_relative_eq!(found, residual, max_relative = 1e-5, epsilon = 1e-7);
    }
    let far = farthest_left_out(&points, 12).expect("twelve detects");
    assert!(far.bonferroni_p > 0.05, "{far:?}");
    // One detect a hundred times too high is an outlier.
    let mut wild = series;
    wild.y[5] += 100f64.ln();
    let far = farthest_left_out(&all(&wild), 12).expect("twelve detects");
    assert_eq!(far.index, 5);
    assert!(far.bonferroni_p < 1e-4, "{far:?}");
}

/// Source: as a non-detect's limit rises it says nothing, and the deletion residual is that of
/// least squares without it (property 7 of the methods note).
#[test]
fn an_uninformative_non_detect_leaves_the_closed_forms() {
    let plain = w02();
    let mut series = plain.clone();
    series.t.push(12.0);
    series.y.push(60.0);
    series.mark.push(Mark::Below);
    let (points, least) = (all(&series), all(&plain));
    assert_eq!(series.fitted().kind, Kind::CensoredLikelihood);
    for (one, other) in points.iter().zip(&least) {
        let (one_line, other_line) = (one.line.expect("ten points"), other.line.expect("nine"));
        assert_relative_eq!(one_line.slope, other_line.slope, max_relative = 1e-6);
        assert_relative_eq!(one_line.sd, other_line.sd, max_relative = 1e-6);
        let (one, other) = (one.studentized.expect("measured"), other.studentized);
        assert_relative_eq!(one, other.expect("measured"), max_relative = 1e-5);
    }
}

/// Source: by hand: points that the line hangs on.
#[test]
fn points_that_the_line_hangs_on_are_told() {
    // Without any of three points there is no line.
    let three = Series::reported(&steps(3), "9 5 4");
    let reasons: Vec<_> = all(&three).iter().map(|point| point.line.err()).collect();
    assert_eq!(reasons, [Some(NoLine::TooFewDates { dates: 2 }); 3]);
    // Without the fourth the others lie on a line.
    let alone = Series::measured(&steps(6), &[5.0, 4.0, 3.0, 9.0, 1.0, 0.0]);
    let points = all(&alone);
    assert_eq!(points[3].line, Err(NoLine::OnALine));
    assert_eq!(points[3].studentized, Some(f64::INFINITY));
    let far = farthest_left_out(&points, 6).expect("six points");
    assert_eq!((far.index, far.bonferroni_p), (3, 0.0));
    // The third detect of a censored fit.
    let few = Series::reported(&steps(7), "90 <40 30 <40 <9 6 <5");
    let points = all(&few);
    assert_eq!(points[0].line, Err(NoLine::TooFewDetects { dates: 2 }));
    assert_eq!(points[0].studentized, None);
    assert!(points[1].line.is_ok());
    // The only non-detect: least squares is left.
    let one = Series::reported(&steps(6), "90 44 30 21 <9 6");
    let line = all(&one)[4].line.expect("five detects");
    assert_eq!(line.m, 5.0);
    // Level lines meet nothing.
    let level = Series::measured(&steps(5), &[1.0, 2.0, 1.0, 2.0, 1.0]);
    assert_eq!(all(&level)[2].shift(&level.fitted(), 0.0), None);
    // Indices and fits of other points.
    assert!(left_out(level.points(), &level.fitted(), &[5, 99]).is_empty());
    assert!(left_out(level.points(), &three.fitted(), &[0]).is_empty());
}

/// Source: rules.md 4: the largest Cook's distances; with non-detects evenly over the record.
#[test]
fn long_series_leave_out_the_points_that_matter() {
    let (series, censored) = (w02(), w14());
    assert_eq!(worth_leaving_out(series.points(), 10), steps_of(10));
    // Cook's D of W02: 2.041 at 9, 0.1334 at 6, 0.1153 at 1, 0.1015 at 0.
    assert_eq!(worth_leaving_out(series.points(), 3), [1, 6, 9]);
    assert_eq!(worth_leaving_out(series.points(), 0), [] as [usize; 0]);
    assert_eq!(worth_leaving_out(censored.points(), 4), [0, 5, 10, 15]);
    assert_eq!(worth_leaving_out(censored.points(), 1), [0]);
}

fn steps_of(n: usize) -> Vec<usize> {
    (0..n).collect()
}
