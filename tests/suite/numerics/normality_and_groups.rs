//! Shapiro and Wilk's test, and Kruskal and Wallis'.

use approx::assert_relative_eq;
use ebbwell::numerics::kruskal_wallis::mid_ranks;
use ebbwell::numerics::line::line;
use ebbwell::numerics::{ShapiroWilk, kruskal_wallis, shapiro_wilk};

use super::doubts_support::{expected, invented};
use super::support::{CLOSED, Random, printed, steps, w02};

/// W against 40-digit values (relative). Source: the quantiles and sums behind it lose two digits.
const SHAPIRO: f64 = 1e-13;

fn residuals(t: &[f64], y: &[f64]) -> Vec<f64> {
    let fit = line(t, y).expect("dates differ");
    t.iter().zip(y).map(|(t, y)| y - fit.fitted(*t)).collect()
}

fn told(values: &[f64]) -> ShapiroWilk {
    shapiro_wilk(values).expect("three values that differ")
}

fn logs(values: &[f64]) -> Vec<f64> {
    values.iter().map(|x| x.ln()).collect()
}

/// Source: W02 (a) and (b), residuals of UG Example 21-7; re-run in R 4.2.2.
#[test]
fn w02_residuals() {
    let series = w02();
    let ppb: Vec<f64> = series.y.iter().map(|y| y.exp()).collect();
    let test = told(&residuals(&series.t, &ppb));
    printed(test.w, 0.9613917, 7);
    printed(test.p, 0.8016, 4);
    let test = told(&residuals(&series.t, &series.y));
    printed(test.w, 0.9209936, 7);
    printed(test.p, 0.3653167, 7);
    assert_eq!(test.n, 10);
}

/// Source: W03, UG Example 17-5; computed in R 4.2.2.
#[test]
fn w03_residuals() {
    let (days, ppm) = super::doubts_support::w03();
    printed(told(&residuals(&days, &ppm)).w, 0.981553705, 9);
}

/// Source: W08, UG Examples 10-2 and 10-4, nickel; W10, UG Examples 21-1 and 21-2; R 4.2.2.
#[test]
fn w08_and_w10_samples() {
    let wells = [
        [58.8, 1.0, 262.0, 56.0, 8.7],
        [19.0, 81.5, 331.0, 14.0, 64.4],
        [39.0, 151.0, 27.0, 21.4, 578.0],
        [3.1, 942.0, 85.6, 10.0, 637.0],
    ];
    let all = wells.concat();
    let raw = told(&all);
    printed(raw.w, 0.678888828, 9);
    assert_relative_eq!(raw.p, 2.17927e-5, max_relative = 3e-6);
    let ln = told(&logs(&all));
    printed(ln.w, 0.9789460017, 10);
    printed(ln.p, 0.9197735, 7);
    let table = [
        (0.7578208, 0.0351075),
        (0.7397492, 0.0238534),
        (0.7065830, 0.0112078),
        (0.8150202, 0.1068146),
    ];
    for (well, (w, p)) in wells.iter().zip(table) {
        printed(told(well).w, w, 7);
        printed(told(well).p, p, 7);
    }
    let aldicarb = [
        ([19.9, 29.6, 18.7, 24.2], 0.54699),
        ([23.7, 21.9, 26.9, 26.1], 0.66178),
        ([5.6, 3.3, 2.3, 6.9], 0.70422),
    ];
    for (well, p) in aldicarb {
        printed(told(&well).p, p, 5);
    }
    let benzene = [0.5, 0.5, 1.6, 1.8, 1.1, 16.1, 1.6, 0.25];
    printed(told(&benzene).w, 0.5208992, 7);
    assert_relative_eq!(told(&benzene).p, 1.8415e-5, max_relative = 3e-5);
    printed(told(&logs(&benzene)).w, 0.896502, 6);
    printed(told(&logs(&benzene)).p, 0.26863, 5);
}

/// Source: W08: the exact branch; by hand 27/28, and (6/π)(asin √(27/28) − asin √(3/4)).
#[test]
fn three_values_have_an_exact_p() {
    let test = told(&[1.0, 2.0, 4.0]);
    assert_relative_eq!(test.w, 27.0 / 28.0, max_relative = 1e-14);
    printed(test.p, 0.636886845, 9);
    // The worst three values, W = 3/4, and evenly spaced ones, W = 1.
    assert_relative_eq!(told(&[1.0, 1.0, 2.0]).p, 0.0, epsilon = 1e-12);
    assert_relative_eq!(told(&[1.0, 2.0, 3.0]).p, 1.0, epsilon = 1e-7);
}

/// Source: `tests/reference/invented-diagnostics.csv`: 40 digits, and R 4.2.2 `shapiro.test` to 11.
#[test]
fn residuals_of_invented_series_agree_with_forty_digits() {
    let mut seen = 0;
    for (name, series) in &invented() {
        let Some(w) = expected(name, "shapiro_w") else { continue };
        let p = expected(name, "shapiro_p").expect("p beside W");
        let test = told(&residuals(&series.t, &series.y));
        assert_relative_eq!(test.w, w, max_relative = SHAPIRO);
        assert_relative_eq!(test.p, p, max_relative = 1e-9);
        seen += 1;
    }
    assert_eq!(seen, 9);
}

/// Source: the definition of a p-value: on normal samples it is evenly spread; 1,000 samples of
/// each size put the share under 0.05 within 0.03 … 0.07 (three standard errors are 0.021).
#[test]
fn normal_samples_are_called_normal_nineteen_times_of_twenty() {
    let mut random = Random(3);
    for n in [4, 8, 11, 12, 40, 400, 5_000] {
        let rounds = if n > 1_000 { 200 } else { 1_000 };
        let mut sample = || (0..n).map(|_| random.normal()).collect::<Vec<f64>>();
        let low = (0..rounds).filter(|_| told(&sample()).p < 0.05).count();
        let share = low as f64 / f64::from(rounds);
        let slack = 3.0 * (0.05 * 0.95 / f64::from(rounds)).sqrt();
        assert!((share - 0.05).abs() < slack, "n {n}: {share} under 0.05");
    }
}

/// Source: the interface: what cannot be assessed has no answer, and nothing overflows.
#[test]
fn what_has_no_shape_has_no_answer() {
    assert_eq!(shapiro_wilk(&[1.0, 2.0]), None);
    assert_eq!(shapiro_wilk(&[7.0; 30]), None);
    assert_eq!(shapiro_wilk(&vec![0.0; 5_001]), None);
    let many: Vec<f64> = (0..5_001).map(f64::from).collect();
    assert_eq!(shapiro_wilk(&many), None);
    assert!(shapiro_wilk(&many[1..]).is_some());
    assert_eq!(shapiro_wilk(&[1.0, f64::NAN, 2.0]), None);
    assert_eq!(shapiro_wilk(&[f64::MIN, 0.0, f64::MAX]), None);
    let wide = told(&[1e-300, 2e-300, 4e-300, 1e300]);
    assert!(wide.w > 0.6 && wide.w < 0.7 && wide.p > 0.0, "{wide:?}");
    // Any straight function of the values, in any order.
    let (small, large) = ([3.0, 1.0, 4.5, 1.5, 9.0], [3e200, 1e200, 4.5e200, 1.5e200, 9e200]);
    assert_relative_eq!(told(&small).w, told(&large).w, max_relative = 1e-14);
}

/// W06: UG Example 14-10, a row a month from January, columns 1983 to 1985.
pub fn w06() -> (Vec<f64>, Vec<f64>, Vec<usize>) {
    let rows = [
        [1.99, 2.01, 2.15],
        [2.10, 2.10, 2.17],
        [2.12, 2.17, 2.27],
        [2.12, 2.13, 2.23],
        [2.11, 2.13, 2.24],
        [2.15, 2.18, 2.26],
        [2.19, 2.25, 2.31],
        [2.18, 2.24, 2.32],
        [2.16, 2.22, 2.28],
        [2.08, 2.13, 2.22],
        [2.05, 2.08, 2.19],
        [2.08, 2.16, 2.22],
    ];
    let (mut t, mut y, mut season) = (vec![], vec![], vec![]);
    for (month, row) in rows.iter().enumerate() {
        for (year, value) in row.iter().enumerate() {
            t.push(1983.0 + year as f64 + month as f64 / 12.0);
            y.push(*value);
            season.push(month);
        }
    }
    (t, y, season)
}

/// Source: W06: Kruskal–Wallis by month, raw and with the straight trend taken out; R 4.2.2.
#[test]
fn w06_months_differ_once_the_trend_is_taken_out() {
    let (t, y, month) = w06();
    let raw = kruskal_wallis(&y, &month).expect("twelve months");
    assert_eq!((raw.groups, raw.smallest, raw.degrees), (12, 3, 11.0));
    printed(raw.h, 16.4688172, 7);
    printed(raw.p, 0.1245991, 7);
    let test = kruskal_wallis(&residuals(&t, &y), &month).expect("twelve months");
    printed(test.h, 32.1771772, 7);
    printed(test.p, 0.0007144, 7);
}

/// Source: W07, UG Example 14-4, arsenic by calendar quarter; R 4.2.2.
#[test]
fn w07_quarters_do_not_differ() {
    let ppb = [4.0, 7.2, 3.1, 3.5, 4.4, 5.1, 2.2, 6.3, 6.5, 7.5, 5.8, 5.9, 5.7, 4.1, 3.8, 4.3];
    let quarter: Vec<usize> = (0..16).map(|i| i % 4).collect();
    let test = kruskal_wallis(&ppb, &quarter).expect("four quarters");
    printed(test.h, 4.522058824, 9);
    printed(test.p, 0.2103311, 7);
}

/// Source: W12, UG Example 17-2, toluene, tie-corrected; R 4.2.2.
#[test]
fn w12_wells_differ_with_many_ties() {
    let background = [5.0, 7.5, 5.0, 5.0, 6.4, 5.0, 5.0, 5.0, 5.0, 5.0];
    let rest =
        [5.0, 12.5, 8.0, 5.0, 11.2, 5.0, 13.7, 15.3, 20.2, 25.1, 5.0, 20.1, 35.0, 28.2, 19.0];
    let values = [&background[..], &rest[..]].concat();
    let well: Vec<usize> = (0..25).map(|i| if i < 10 { 9 } else { (i - 10) / 5 }).collect();
    let test = kruskal_wallis(&values, &well).expect("four wells");
    assert_eq!((test.groups, test.smallest, test.degrees), (4, 5, 3.0));
    printed(test.h, 11.86931720, 8);
    printed(test.p, 0.00784450, 8);
}

/// Source: the textbook form with its separate correction for ties, on random data.
#[test]
fn kruskal_and_wallis_agree_with_the_textbook_form() {
    let mut random = Random(8);
    for _ in 0..200 {
        let n = random.whole(4, 60);
        let values: Vec<f64> = (0..n).map(|_| random.whole(0, 12) as f64).collect();
        let groups: Vec<usize> =
            (0..n).map(|i| if i < 2 { i } else { random.whole(0, 4) }).collect();
        let Some(test) = kruskal_wallis(&values, &groups) else { continue };
        let ranks = mid_ranks(&values);
        let n = n as f64;
        let squares: f64 = (0..5)
            .map(|group| {
                let own = ranks.iter().zip(&groups).filter(|(_, g)| **g == group);
                let (count, sum) = own.fold((0.0, 0.0), |(c, s), (r, _)| (c + 1.0, s + r));
                if count > 0.0 { sum * sum / count } else { 0.0 }
            })
            .sum();
        let mut sizes = [0.0f64; 13];
        values.iter().for_each(|v| sizes[*v as usize] += 1.0);
        let ties: f64 = sizes.iter().map(|u| u * u * u - u).sum();
        let plain = 12.0 / (n * (n + 1.0)) * squares - 3.0 * (n + 1.0);
        let h = plain / (1.0 - ties / (n * n * n - n));
        assert_relative_eq!(test.h, h, max_relative = CLOSED, epsilon = 1e-9);
    }
    assert_eq!(mid_ranks(&[3.0, 1.0, 3.0, 2.0, 3.0]), [4.0, 1.0, 4.0, 2.0, 4.0]);
}

/// Source: the interface.
#[test]
fn one_group_or_one_value_has_no_answer() {
    assert_eq!(kruskal_wallis(&[1.0, 2.0, 3.0], &[7, 7, 7]), None);
    assert_eq!(kruskal_wallis(&[1.0; 4], &[0, 0, 1, 1]), None);
    assert_eq!(kruskal_wallis(&steps(3), &[0, 1]), None);
    assert_eq!(kruskal_wallis(&[], &[]), None);
    let far = kruskal_wallis(&[1.0, 2.0], &[usize::MAX, 0]).expect("two groups");
    assert_relative_eq!(far.h, 1.0, max_relative = 1e-14);
}
