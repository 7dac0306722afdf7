//! Worked examples of the fitted line: W02, W14, W16.

use approx::assert_relative_eq;
use ebbwell::numerics::{Crossing, End, Kind, Parameters, Side};

use super::support::{CLOSED, Series, interval, located, printed, w02, w14};

/// Source: W02 (b), UG Example 21-7 on ln scale, computed in R 4.2.2 `lm`.
#[test]
fn w02_line_and_its_intervals() {
    let fit = w02().fitted();
    assert_eq!(fit.kind, Kind::LeastSquares);
    assert_relative_eq!(fit.intercept, 4.331650742, max_relative = CLOSED);
    assert_relative_eq!(fit.slope, -0.07225430721, max_relative = CLOSED);
    assert_relative_eq!(fit.sd, 0.3621068684, max_relative = CLOSED);
    assert_relative_eq!(fit.r_squared, 0.7980696386, max_relative = CLOSED);
    assert_relative_eq!(fit.slope_p, 4.96785e-4, max_relative = CLOSED);
    assert_relative_eq!(fit.log_likelihood, -2.915508634, max_relative = CLOSED);
    interval(fit.slope_interval(0.80), -0.0902032202, -0.0543053943, CLOSED);
    interval(fit.slope_interval(0.90), -0.0961492814, -0.0483593330, CLOSED);
    interval(fit.slope_interval(0.95), -0.1018861899, -0.0426224245, CLOSED);
    assert_relative_eq!(fit.fitted(36.0), 1.730495682, max_relative = CLOSED);
    interval(fit.level_interval(36.0, 0.95), 1.062692702, 2.398298662, CLOSED);
}

/// Source: W02 (b), limit 5 ppb, closed form in R 4.2.2.
#[test]
fn w02_dates_of_the_limit() {
    let fit = w02().fitted();
    let y0 = 5f64.ln();
    located(fit.crossing(y0, 0.95), [30.462731382, 37.675440182, 53.936440911], CLOSED);
    located(fit.crossing(y0, 0.90), [31.547249239, 37.675440182, 49.298892721], CLOSED);
}

/// Source: W02 (a), the same data on their own scale, limit 5, and the band at months 26 and 30.
#[test]
fn w02_on_the_linear_scale() {
    let mut series = w02();
    series.y.iter_mut().for_each(|y| *y = y.exp());
    let fit = series.fitted();
    assert_relative_eq!(fit.intercept, 54.940460899, max_relative = CLOSED);
    assert_relative_eq!(fit.slope, -1.602644503, max_relative = CLOSED);
    assert_relative_eq!(fit.sd, 3.949595653, max_relative = CLOSED);
    assert_relative_eq!(fit.level_interval(30.0, 0.90).high, 11.341365, max_relative = CLOSED);
    assert_relative_eq!(fit.level_interval(26.0, 0.90).high, 16.900908, max_relative = CLOSED);
    located(fit.crossing(5.0, 0.95), [28.027891395, 31.161284239, 35.639534468], CLOSED);
}

/// Source: W14, R 4.2.2 `survreg`; the level model from the same.
#[test]
fn w14_line_by_likelihood() {
    let fit = w14().fitted();
    assert_eq!(fit.kind, Kind::CensoredLikelihood);
    assert_eq!((fit.n, fit.detects, fit.non_detects, fit.uninformative), (16, 12, 4, 0));
    assert_eq!(fit.m, 14.0);
    assert_relative_eq!(fit.intercept, 3.883363380, max_relative = CLOSED);
    assert_relative_eq!(fit.slope, -0.8017700711, max_relative = CLOSED);
    assert_relative_eq!(fit.ml_scale, 0.2321973886, max_relative = CLOSED);
    assert_relative_eq!(fit.log_likelihood, -1.831351979, max_relative = CLOSED);
    let line = fit.censored().expect("W14 is fitted by likelihood");
    assert_relative_eq!(line.flat_fall(), 40.50843066, max_relative = CLOSED);
    assert_relative_eq!(fit.sd, 0.2321973886 * (14f64 / 12.0).sqrt(), max_relative = CLOSED);
    // The likelihood at the printed parameters, as any caller can ask for it.
    let there = Parameters { intercept: 3.883363380, slope: -0.8017700711, scale: 0.2321973886 };
    let value = line.likelihood().log_likelihood(there);
    assert_relative_eq!(value, -1.831351979, max_relative = CLOSED);
}

/// Source: W14, R 4.2.2 `survreg` variances by the delta method.
#[test]
fn w14_wald_variances() {
    let fit = w14().fitted();
    let wald = fit.censored().expect("W14 is fitted by likelihood").covariance();
    assert_relative_eq!(wald.intercept.sqrt(), 0.1128213153, max_relative = CLOSED);
    assert_relative_eq!(wald.slope.sqrt(), 0.0547795414, max_relative = CLOSED);
    assert_relative_eq!(wald.intercept_slope, -0.005143929396, max_relative = CLOSED);
}

/// Source: W14 "at m = 14", one implementation; printed to six digits.
#[test]
fn w14_profile_ends_at_the_effective_number() {
    let fit = w14().fitted();
    let line = fit.censored().expect("W14 is fitted by likelihood");
    printed(line.cut_off(0.90), 3.287826545, 9);
    printed(line.cut_off(0.95), 4.666563213, 9);
    let k = fit.slope_interval(0.90);
    printed(-k.high, 0.702199, 6);
    printed(-k.low, 0.916120, 6);
    let k = fit.slope_interval(0.95);
    printed(-k.high, 0.681093, 6);
    printed(-k.low, 0.944234, 6);
    let dates = |y0: f64, confidence| match fit.crossing(y0, confidence) {
        Crossing::Located { low, high, .. } => (low, high),
        other => panic!("not located: {other:?}"),
    };
    let (low, high) = dates(0.0, 0.90);
    printed(low, 4.416288, 6);
    printed(high, 5.302124, 6);
    let (low, high) = dates(0.0, 0.95);
    printed(low, 4.324363, 6);
    printed(high, 5.412958, 6);
    let (low, high) = dates(0.5f64.ln(), 0.95);
    printed(low, 5.065210, 6);
    printed(high, 6.423753, 6);
}

/// Source: W14, the table of cut-offs: χ² with one degree of freedom, m = 16 and m = 12, at 95 %.
#[test]
fn w14_profile_ends_at_other_cut_offs() {
    let fit = w14().fitted();
    let line = fit.censored().expect("W14 is fitted by likelihood");
    let cases = [
        (3.841458821, [-0.927639, -0.693434, 4.378057, 5.347473]),
        (4.545762587, [-0.941837, -0.682857, 4.332021, 5.403481]),
        (4.837230027, [-0.947606, -0.678624, 4.313647, 5.426300]),
    ];
    for (cut_off, expected) in cases {
        let ends = [
            End::Slope(Side::Low),
            End::Slope(Side::High),
            End::Crossing { y0: 0.0, side: Side::Low },
            End::Crossing { y0: 0.0, side: Side::High },
        ];
        for (end, expected) in ends.into_iter().zip(expected) {
            let found = line.end(end, cut_off).expect("W14 has every end");
            printed(found, expected, 6);
        }
    }
}

fn w16(y: [f64; 8]) -> Series {
    Series::measured(&[0.0, 1.0, 2.0, 3.0, 4.0, 5.0, 6.0, 7.0], &y)
}

/// Source: W16, series B1: one interval, though 70 wide.
#[test]
fn w16_a_significant_slope_locates_the_crossing() {
    let fit = w16([3.9, 3.4, 3.8, 3.1, 3.5, 2.9, 3.3, 2.8]).fitted();
    located(fit.crossing(1.6, 0.95), [10.981600412, 17.4, 80.999177457], CLOSED);
    let Crossing::Located { high, .. } = fit.crossing(1.6, 0.90) else {
        panic!("B1 is located at 90 % as well")
    };
    assert_relative_eq!(high, 43.498329461, max_relative = CLOSED);
}

/// Source: W16, series B2: two rays to 1.6, the whole line to 3.3.
#[test]
fn w16_a_slope_that_may_be_zero_gives_rays_or_nothing() {
    let fit = w16([3.9, 3.0, 3.8, 2.7, 3.9, 3.0, 3.3, 3.2]).fitted();
    let Crossing::TwoRays { before, after } = fit.crossing(1.6, 0.95) else {
        panic!("B2 to 1.6 is two rays")
    };
    assert_relative_eq!(before, -10.122956425, max_relative = CLOSED);
    assert_relative_eq!(after, 10.658155431, max_relative = CLOSED);
    assert_eq!(fit.crossing(3.3, 0.95), Crossing::WholeLine);
    let until = fit.earliest_crossing_after(7.0, 1.6, 0.95).expect("1.6 is excluded at 7");
    assert_relative_eq!(until, 10.658155431, max_relative = CLOSED);
    assert_eq!(fit.earliest_crossing_after(11.0, 1.6, 0.95), None);
    assert_eq!(fit.earliest_crossing_after(7.0, 3.3, 0.95), None);
    // One-sided 80 %: still no latest.
    assert!(matches!(fit.crossing(1.6, 0.60), Crossing::TwoRays { .. }));
}
