//! 916 real series against R `survreg`, least squares and Theil–Sen computed elsewhere.

use std::collections::BTreeMap;
use std::path::PathBuf;

use ebbwell::numerics::{Kind, Mark, Points, certain_pairs, mann_kendall, theil_sen};

use super::support::{Series, number};

/// Likelihood fits against `survreg`: a slope as a share of its standard error, scale and standard
/// error relative, log-likelihood absolute. Source: a thousandth of what was asked for; reached to
/// 2e-11.
const LIKELIHOOD: f64 = 1e-9;

/// Closed forms against statsmodels and scipy (relative, and in standard errors for a slope).
const CLOSED_FORM: f64 = 1e-9;

/// Splits a line at its commas, quoted fields kept whole. The oracle's quotes hold no quotes.
fn fields(line: &str) -> Vec<String> {
    let mut all = vec![String::new()];
    let mut quoted = false;
    for character in line.chars() {
        match character {
            '"' => quoted = !quoted,
            ',' if !quoted => all.push(String::new()),
            other => all.last_mut().expect("there is always a field").push(other),
        }
    }
    all
}

/// A table as rows of named fields, or nothing where the folder of real results is absent.
fn table(name: &str) -> Option<Vec<BTreeMap<String, String>>> {
    let folder = PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("../shared/real");
    let text = std::fs::read_to_string(folder.join(name)).ok()?;
    let mut lines = text.lines();
    let header = fields(lines.next()?);
    Some(lines.map(|line| header.iter().cloned().zip(fields(line)).collect()).collect())
}

fn real_series() -> Option<BTreeMap<String, Series>> {
    let mut all: BTreeMap<String, Series> = BTreeMap::new();
    for row in table("oracle_series.csv")? {
        let series = all.entry(row["series"].clone()).or_insert_with(|| Series {
            t: vec![],
            y: vec![],
            mark: vec![],
        });
        series.t.push(number(&row["t"]));
        series.y.push(number(&row["value"]).ln());
        let below = row["qualifier"] == "<";
        series.mark.push(if below { Mark::Below } else { Mark::Measured });
    }
    Some(all)
}

/// Source: `oracle.csv` of open groundwater results (its PROVENANCE.md): R 4.2.2 `survreg`,
/// statsmodels, pymannkendall and scipy.
#[test]
fn real_series_agree_with_survreg_least_squares_and_theil_sen() {
    let (Some(series), Some(oracle)) = (real_series(), table("oracle.csv")) else {
        println!("skipped: ../shared/real is absent, so the 916 real series were not tried");
        return;
    };
    assert_eq!(oracle.len(), 916);
    let (mut censored, mut closed, mut differ) = (0, 0, 0);
    let mut worst: BTreeMap<&str, f64> = BTreeMap::new();
    for row in &oracle {
        let name = &row["series"];
        let value = |key: &str| number(&row[key]);
        let one = &series[name];
        let fit = one.fit().unwrap_or_else(|why| panic!("{name} has a line, not {why:?}"));
        let mut off = |what: &'static str, found: f64, most: f64| {
            assert!(found <= most, "{name}: {what} is off by {found:e}");
            let so_far = worst.entry(what).or_insert(0.0);
            *so_far = so_far.max(found);
        };
        // Non-detects tied under every value, as the oracle has them.
        let lowest = one.y.iter().copied().fold(f64::INFINITY, f64::min) - 1.0;
        let tied = one.y.iter().zip(&one.mark);
        let tied: Vec<f64> =
            tied.map(|(&y, &mark)| if mark == Mark::Below { lowest } else { y }).collect();
        let test = mann_kendall(&one.t, &tied).expect("eight dates or more");
        off("Kendall S", (test.s as f64 - value("mk_S")).abs(), 0.0);
        off("Kendall variance", (test.variance / value("mk_var") - 1.0).abs(), CLOSED_FORM);
        off("Kendall Z", (test.z - value("mk_z")).abs(), CLOSED_FORM);
        if fit.kind == Kind::CensoredLikelihood {
            censored += 1;
            let wald = fit.censored().expect("a likelihood fit").covariance();
            let error = wald.slope.sqrt();
            off("slope in errors", (fit.slope - value("b1")).abs() / error, LIKELIHOOD);
            off("scale", (fit.ml_scale / value("scale") - 1.0).abs(), LIKELIHOOD);
            off("standard error", (error / value("se_b1") - 1.0).abs(), LIKELIHOOD);
            off("log-likelihood", (fit.log_likelihood - value("loglik")).abs(), LIKELIHOOD);
            // The oracle ties all non-detects lowest; ours counts only pairs of certain order.
            let points = Points::new(&one.t, &one.y, &one.mark).expect("a sound series");
            let certain = certain_pairs(points).expect("pairs");
            differ += usize::from((certain.s as f64 - value("mk_S")).abs() > 0.5);
        } else {
            closed += 1;
            let error = value("ols_se");
            off("least squares", (fit.slope - value("ols_slope")).abs() / error, CLOSED_FORM);
            off("least squares p", (fit.slope_p / value("ols_p") - 1.0).abs(), CLOSED_FORM);
            let sen = theil_sen(&one.t, &one.y, 0.95).expect("dates differ");
            let off_sen = (sen.slope - value("ts_slope")).abs() / sen.slope.abs().max(1e-3);
            off("Theil-Sen", off_sen, CLOSED_FORM);
        }
    }
    println!("{censored} by likelihood, {closed} by least squares; worst: {worst:?}");
    println!(
        "S over certain pairs differs from S with non-detects tied lowest in {differ} of them"
    );
    assert_eq!((censored, closed), (202, 714));
}
