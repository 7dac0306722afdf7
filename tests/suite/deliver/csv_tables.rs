//! The tables, column by column as the rules name them.

use super::sample;
use ebbwell::deliver::{flags_csv, ledger_csv, summary_csv, tables, used_csv, wells_csv};
use ebbwell::findings::{Findings, LedgerRow};
use ebbwell::site::Fraction;
use ebbwell::terms::{Figure, Flag, FlagCode, Reading};

/// The columns of rules.md, section 7.
const SUMMARY: &str = "site,well,well_role,analyte,cas,fraction,depth,unit,limit,limit_source,\
    goal_date,samples,detects,first_sampled,last_sampled,last_result,verdict,pace,method,\
    rate_per_year,rate_lower,rate_upper,half_life_years,half_life_lower,half_life_upper,\
    level_at_start,level_now,level_now_lower,level_now_upper,share_over_limit_now,residual_sd_ln,\
    r_squared,slope_p,slope_p_adjusted,kendall_s,kendall_p,sen_rate_per_year,sen_rate_lower,\
    sen_rate_upper,reach_date,reach_earliest,reach_latest,reach_date_mean,exceed_date,\
    exceed_earliest,required_rate_per_year,alternative_model,alternative_date,rounds_to_decisive,\
    previous_verdict,reach_shift_years,why_no_rate,why_no_date,flags";
const WELLS: &str = "site,well,well_role,series,undetected,too_few,rising,below,attenuating,flat,\
    undecided,over_limit_now,controlling_analyte,reach_date,reach_earliest,reach_latest,\
    stands_in_the_way,last_sampled";
const LEDGER: &str = "file,sheet,record,site,well,date,analyte,fraction,depth,reported,unit,\
    qualifier,reporting_limit,sample_id,outcome,reason,detail";
const FLAGS: &str = "site,well,analyte,fraction,depth,flag,figure,threshold,source,note";
const USED: &str = "site,well,analyte,fraction,depth,date,value,mark,estimated,in_fit,\
    fitted_median,residual,files_and_records";

/// One table as rows of (column, field), read by a reader that is not ours.
fn read(text: &str) -> Vec<Vec<(String, String)>> {
    let mut reader = csv::Reader::from_reader(text.as_bytes());
    let header = reader.headers().expect("a header").clone();
    reader
        .records()
        .map(|record| {
            let record = record.expect("a record of the header's length");
            header.iter().map(str::to_owned).zip(record.iter().map(str::to_owned)).collect()
        })
        .collect()
}

fn field<'a>(row: &'a [(String, String)], column: &str) -> &'a str {
    let found = row.iter().find(|(name, _)| name == column);
    &found.unwrap_or_else(|| panic!("{column}")).1
}

fn ledger(rows: Vec<LedgerRow>) -> String {
    let mut bytes = Vec::new();
    ledger_csv(rows, &mut bytes).expect("memory");
    String::from_utf8(bytes).expect("UTF-8")
}

#[test]
fn the_columns_are_those_of_the_rules_and_a_header_stands_without_rows_too() {
    let mut findings = sample::findings();
    let all = [
        (SUMMARY, summary_csv as fn(&Findings) -> String),
        (WELLS, wells_csv),
        (FLAGS, flags_csv),
        (USED, used_csv),
    ];
    for (columns, table) in all {
        assert_eq!(table(&findings).lines().next(), Some(columns));
    }
    assert_eq!(ledger(Vec::new()), format!("{LEDGER}\n"));
    findings.series.clear();
    assert_eq!(summary_csv(&findings), format!("{SUMMARY}\n"));
    assert_eq!(tables::all().len(), 5);
}

#[test]
fn lines_end_in_lf_and_there_is_no_byte_order_mark() {
    let findings = sample::findings();
    for text in [summary_csv(&findings), wells_csv(&findings), used_csv(&findings)] {
        assert!(text.starts_with("site,") && text.ends_with('\n') && !text.contains('\r'));
    }
}

#[test]
fn what_is_undefined_is_empty_and_numbers_have_six_digits() {
    let findings = sample::findings();
    let rows = read(&summary_csv(&findings));
    assert_eq!(rows.len(), findings.series.len());
    let few = rows.iter().find(|row| field(row, "verdict") == "too-few").expect("too few");
    for column in ["rate_per_year", "level_now", "reach_date", "pace", "method", "slope_p", "flags"]
    {
        assert_eq!(field(few, column), "", "{column}");
    }
    assert_eq!(field(few, "why_no_rate"), "dates");
    let fall = rows.iter().find(|row| field(row, "well") == "MW-3").expect("the decline");
    assert_eq!(field(fall, "flags"), "outlier", "a test that could not be made is not a flag");
    assert_eq!(field(fall, "goal_date"), "2034-12-31");
    assert_eq!(field(fall, "slope_p"), "0.0123");
    let rate = field(fall, "rate_per_year");
    assert!(rate.trim_start_matches("0.").len() <= 6, "{rate}");
    let text = summary_csv(&findings);
    assert!(!text.contains("NaN") && !text.contains("inf") && !text.contains("-0,"), "{text}");
    let clear = rows.iter().find(|row| field(row, "verdict") == "undetected").expect("undetected");
    assert_eq!(field(clear, "last_result"), "<0.5");
}

#[test]
fn a_well_that_looks_like_a_formula_is_guarded_in_every_table() {
    let mut findings = sample::findings();
    findings.series.truncate(1);
    findings.series[0].key.well = "=1+1".into();
    findings.series[0].flags = vec![Flag::raised(FlagCode::Gap, 1.5, 1.0)];
    findings.wells.truncate(1);
    findings.wells[0].well = "=1+1".into();
    let row = LedgerRow { well: "=1+1".into(), reported: "-5".into(), ..LedgerRow::default() };
    for text in [
        summary_csv(&findings),
        wells_csv(&findings),
        flags_csv(&findings),
        used_csv(&findings),
        ledger(vec![row]),
    ] {
        let rows = read(&text);
        assert_eq!(field(&rows[0], "well"), "'=1+1");
    }
    let row = LedgerRow { reported: "-5".into(), ..LedgerRow::default() };
    assert_eq!(field(&read(&ledger(vec![row]))[0], "reported"), "-5");
}

#[test]
fn flags_csv_tells_figures_thresholds_sources_and_what_was_not_assessable() {
    let mut findings = sample::findings();
    findings.series.truncate(1);
    findings.series[0].flags = vec![
        Flag::fact(FlagCode::DateWithheld, Figure::Word("years")),
        Flag::raised(FlagCode::Stale, 2.123_456_789, 1.5),
        Flag::not_assessable(FlagCode::Outlier, 0.05),
        Flag::fact(FlagCode::BeyondHorizon, Figure::Date(sample::date("2071-02-03"))),
    ];
    let rows = read(&flags_csv(&findings));
    let column = |name: &str| rows.iter().map(|row| field(row, name)).collect::<Vec<_>>();
    assert_eq!(column("flag"), ["date-withheld", "stale", "outlier", "beyond-horizon"]);
    assert_eq!(column("figure"), ["years", "2.12346", "", "2071-02-03"]);
    assert_eq!(column("threshold"), ["", "1.5", "0.05", ""]);
    assert!(column("source").iter().all(|source| !source.is_empty()));
    assert!(field(&rows[2], "note").contains("not assessable"));
}

#[test]
fn used_csv_lists_every_date_with_its_mark_and_its_records() {
    let mut findings = sample::findings();
    findings.series.retain(|series| series.key.well == "MW-12");
    findings.series[0].key.fraction = Some(Fraction::Dissolved);
    findings.series[0].values[9].records.push("results/other.csv:7".into());
    let rows = read(&used_csv(&findings));
    assert_eq!(rows.len(), findings.series[0].values.len());
    assert_eq!(field(&rows[0], "in_fit"), "no");
    assert_eq!(field(&rows[0], "fraction"), "dissolved");
    assert_eq!(field(&rows[0], "fitted_median"), "");
    assert_eq!(field(&rows[9], "mark"), ">");
    assert_eq!(field(&rows[9], "value"), "50");
    assert_eq!(field(&rows[9], "residual"), "");
    assert_eq!(field(&rows[9], "files_and_records"), "results/lab.csv:11; results/other.csv:7");
    assert_eq!(field(&rows[22], "estimated"), "yes");
    let below = findings.series[0].values.iter().position(|v| v.reading == Reading::Below(2.0));
    assert_eq!(field(&rows[below.expect("a non-detect")], "mark"), "<");
}

#[test]
fn wells_csv_counts_series_by_verdict() {
    let findings = sample::findings();
    let rows = read(&wells_csv(&findings));
    let rising = rows.iter().find(|row| field(row, "well") == "MW-7").expect("the rise");
    assert_eq!(field(rising, "rising"), "1");
    assert_eq!(field(rising, "attenuating"), "0");
    assert_eq!(field(rising, "over_limit_now"), "1");
}
