//! A simulated site of 60 series: twelve wells, five analytes, four years of quarters, a file a
//! year. Nothing in it is real; what is wrong with it is planted.

use std::fs;

use chrono::NaiveDate;
use ebbwell::findings::{Arrival, Findings};
use ebbwell::intake::Sources;
use ebbwell::ledger::told::Suspicion;
use ebbwell::run::{Formats, Job, Kind, SiteFileFacts, Stage, Watch, run};
use ebbwell::site::read;
use ebbwell::terms::Effort;
use tempfile::TempDir;

/// The site file; tests add blocks to it.
pub const SITE: &str = r#"
[site]
name = "Simulated Yard"
active-from = 2010-01-01
active-to = 2030-12-31
"#;

/// Analytes with their units and limits.
pub const ANALYTES: [(&str, &str, &str); 5] = [
    ("PCE", "ug/L", "5 ug/L"),
    ("TCE", "ug/L", "5 ug/L"),
    ("cis-1,2-DCE", "ug/L", "70 ug/L"),
    ("Vinyl chloride", "ug/L", "2 ug/L"),
    ("Chloride", "mg/L", "250 mg/L"),
];
/// Wells.
pub const WELLS: usize = 12;
/// Rounds, four a year.
pub const ROUNDS: usize = 16;

/// One record of the simulated site.
#[derive(Clone)]
pub struct Sample {
    pub well: usize,
    pub analyte: usize,
    pub round: usize,
    pub date: String,
    pub result: f64,
    /// What stands in the result cell where it is not the number.
    pub written: Option<String>,
    pub limit: f64,
    pub kind: &'static str,
}

/// The records of the site.
pub struct Yard {
    pub samples: Vec<Sample>,
    pub blocks: String,
}

/// Numbers from a seed, so that every run of the tests sees the same (a multiplicative step of
/// 64 bits, its upper half taken).
pub struct Numbers(pub u64);

impl Numbers {
    pub fn unit(&mut self) -> f64 {
        self.0 =
            self.0.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
        (self.0 >> 11) as f64 / (1_u64 << 53) as f64
    }

    /// About normal: the sum of twelve.
    pub fn normal(&mut self) -> f64 {
        (0..12).map(|_| self.unit()).sum::<f64>() - 6.0
    }
}

pub fn well(at: usize) -> String {
    format!("W-{:02}", at + 1)
}

impl Yard {
    /// The site as it should be: levels from 3 to 3,000, half-lives of two years and more, scatter
    /// of 15 %. Vinyl chloride at the last two wells is never detected.
    pub fn clean() -> Self {
        let mut numbers = Numbers(20_260_701);
        let mut samples = Vec::new();
        for well in 0..WELLS {
            for analyte in 0..ANALYTES.len() {
                let start = (3.0_f64.ln() + numbers.unit() * 1000.0_f64.ln()).exp();
                let rate = numbers.unit() * 0.3;
                for round in 0..ROUNDS {
                    let years = round as f64 / 4.0;
                    let level = start * (-rate * years + 0.15 * numbers.normal()).exp();
                    let absent = analyte == 3 && well >= WELLS - 2;
                    samples.push(Sample {
                        well,
                        analyte,
                        round,
                        date: date(round).to_string(),
                        result: level,
                        written: absent.then(|| "<0.5".to_owned()),
                        limit: 0.5,
                        kind: "Regular",
                    });
                }
            }
        }
        Self { samples, blocks: String::new() }
    }

    /// Changes the samples that are meant.
    pub fn plant(mut self, is: impl Fn(&Sample) -> bool, change: impl Fn(&mut Sample)) -> Self {
        let mut touched = 0;
        for sample in self.samples.iter_mut().filter(|sample| is(sample)) {
            change(sample);
            touched += 1;
        }
        assert!(touched > 0, "nothing was planted");
        self
    }

    /// Exchanges two wells in one round.
    pub fn exchange(self, a: usize, b: usize, round: usize) -> Self {
        self.plant(
            |s| s.round == round && (s.well == a || s.well == b),
            |s| s.well = if s.well == a { b } else { a },
        )
    }

    /// Reads and checks the site as the program would.
    pub fn check(&self) -> Findings {
        let place = TempDir::new().expect("a folder");
        let results = place.path().join("results");
        fs::create_dir_all(&results).expect("a folder");
        for year in 0..ROUNDS / 4 {
            let mut text =
                "well,analyte,date,result,unit,reporting_limit,sample_type,qualifier\n".to_owned();
            for s in self.samples.iter().filter(|s| s.round / 4 == year) {
                let (analyte, unit, _) = ANALYTES[s.analyte];
                let result = s.written.clone().unwrap_or_else(|| four_digits(s.result));
                text.push_str(&format!(
                    "{},\"{analyte}\",{},{result},{unit},{},{},\n",
                    well(s.well),
                    s.date,
                    s.limit,
                    s.kind
                ));
            }
            fs::write(results.join(format!("{}.csv", 2020 + year)), text).expect("a file");
        }
        let mut site = SITE.to_owned();
        for (name, unit, limit) in ANALYTES {
            site.push_str(&format!(
                "[[analyte]]\nname = {name:?}\nunit = {unit:?}\nlimit = {limit:?}\n\
                 limit-source = \"made up\"\n"
            ));
        }
        for at in 0..WELLS {
            site.push_str(&format!("[[well]]\nname = {:?}\n", well(at)));
        }
        check(Sources::Folder(place.path().to_owned()), &format!("{site}{}", self.blocks))
    }
}

/// The day of a round: the same for all wells.
pub fn date(round: usize) -> NaiveDate {
    let (year, month) = (2020 + round / 4, 2 + 3 * (round % 4));
    NaiveDate::from_ymd_opt(year as i32, month as u32, 14).expect("a date")
}

fn four_digits(value: f64) -> String {
    let digits = (3 - value.log10().floor() as i32).max(0) as usize;
    format!("{value:.digits$}")
}

struct Quiet;

impl Watch for Quiet {
    fn stage(&self, _: Stage, _: &str) {}

    fn stop(&self) -> bool {
        false
    }
}

/// Checks sources under a site file, as `ebbwell check` does, and writes nothing.
pub fn check(sources: Sources, site: &str) -> Findings {
    let site = read(site, "site.toml").unwrap_or_else(|problems| panic!("{problems:?}"));
    let job = Job {
        sources,
        site,
        site_file: SiteFileFacts::default(),
        as_of: None,
        today: NaiveDate::from_ymd_opt(2026, 12, 1).expect("a date"),
        effort: Effort::Full,
        kind: Kind::Check,
        place: None,
        formats: Formats { csv: true, json: true, svg: false },
        force: false,
        threads: Some(1),
    };
    run(&job, &Quiet).expect("a run").findings
}

/// Checks one table under a site file.
pub fn check_table(table: &str, site: &str) -> Findings {
    check(Sources::Standard(table.as_bytes().to_vec()), site)
}

/// Every sentinel as `kind: whom it concerns`.
pub fn told(arrival: &Arrival) -> Vec<String> {
    let fact = |kind| matches!(kind, Suspicion::LimitOverLimit);
    arrival
        .sentinels
        .iter()
        .filter(|one| !fact(one.kind) || one.figure.is_some())
        .map(|one| {
            let file = one.file.map(|file| arrival.file(file).to_owned());
            let parts = [
                Some(one.kind.code().to_owned()),
                Some(one.scope.code().to_owned()),
                file.filter(|_| one.well.is_none()),
                one.well.clone(),
                one.other_well.clone(),
                one.analyte.clone(),
                one.date.map(|date| date.to_string()),
            ];
            let parts: Vec<String> = parts.into_iter().flatten().collect();
            format!("{} ({})", parts.join(" "), one.records.len())
        })
        .collect()
}
