//! What is mutated: the demo's files, tables made up for it, a workbook, site files.

use super::container::workbook;

/// What an input is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Kind {
    Table,
    Workbook,
    Site,
}

impl Kind {
    pub fn ending(self) -> &'static str {
        match self {
            Self::Table => "csv",
            Self::Workbook => "xlsx",
            Self::Site => "toml",
        }
    }
}

/// One seed.
pub struct Seed {
    pub name: &'static str,
    pub kind: Kind,
    pub bytes: Vec<u8>,
}

pub const DEMO_SITE: &str = include_str!("../../../demo-wells/site.toml");
pub const DEMO_TABLE: &str = include_str!("../../../demo-wells/results/2026-Q3_birch.txt");
pub const BARE_SITE: &str = "[site]\nname = \"Bare\"\n";

/// A site that declares what can be declared of a file, and decides what can be decided.
pub const DECLARING_SITE: &str = r#"
[site]
name = "Declared"
aliases = ["D"]
active-from = 2010-01-01
active-to = 2030-12-31

[settings]
duplicates = "average"
same-day = "highest"
why = { duplicates = "plan", same-day = "plan" }

[[results]]
files = "**"
date-order = "day-month-year"
two-digit-years = true
serial-dates = "1900"
decimal = "comma"
thousands = "."
ppb-in-water = true
uncertainty = "1-sigma"
sample-types = { "7" = "duplicate", "9" = "regular" }
validation = "stage 1"

[[analyte]]
name = "PCE"
cas = "127-18-4"
limit = "5 ug/L"
limit-source = "made up"

[[analyte]]
name = "Tritium"
unit = "pCi/L"

[[well]]
name = "MW-1"
depths = "separate"
aliases = [{ name = "B-1", to = 2020-12-31, who = "a", when = 2021-01-05, why = "b" }]

[[expected]]
every = 3

[[event]]
date = 2021-05-01
what = "dig"
restart = true
who = "a"
when = 2021-06-01
why = "b"

[[decision]]
id = "D1"
kind = "exclude"
wells = ["MW-8"]
who = "a"
when = 2024-05-01
why = "b"

[[qualifier]]
code = "E"
means = "estimated"
who = "a"
when = 2024-05-01
why = "b"
"#;

/// Every column once, with cells of every kind.
const EVERY_COLUMN: &str = "\
site,well,analyte,cas,date,time,result,unit,qualifier,detection_limit,reporting_limit,fraction,\
sample_type,sample_id,depth,lab,uncertainty,basis,detection_condition,status,medium,batch
D,MW-1,PCE,127-18-4,05/03/2024,08:15,\"1.204,5\",ug/L,,,\"0,5\",total,Regular,S-1,12,L,,,,,water,B1
D,B-1,tetrachloroethene,127-18-4,14/03/2019,,\"<0,5\",ug/L,U,\"0,2\",\"0,5\",T,Regular,S-2,12,L,,,,,water,B1
D,MW-1,PCE,,45366,,40,ppb,J,,,,Duplicate,S-1,12,L,,,,,water,B1
D,MW-2,Tritium,10028-17-8,15/03/24,10:00,-30,pCi/L,,,,,9,S-3,,L,12,,,Accepted,,B2
D,MW-2,Tritium,10028-17-8,16/06/24,10:00,300,Bq/L,E;D,,,,7,S-4,,L,12,as N,Not Detected,Rejected,,B2
D,Trip Blank,PCE,127-18-4,14/03/2024,,ND,ug/L,,,1,,Trip Blank,S-5,,L,,,,,,B1
D,MW-3,PCE,127-18-4,14/03/2024,,,,,,,,Dry,,,,,,,,,
D,MW-8,PCE,127-18-4,14/03/2024,,>2000,ug/L,,,1,,Regular,S-6,,L,,,Present Above Quantification Limit,,,B1
";

/// A long record of two wells, many dates.
fn long() -> String {
    let mut text = "Location;Sample Date;Parameter;Result;Units;Flag;RL\r\n".to_owned();
    for at in 0..120 {
        let (year, month) = (2010 + at / 12, 1 + at % 12);
        let well = if at % 2 == 0 { "MW-1" } else { "MW-1R" };
        text.push_str(&format!("{well};{year}-{month:02}-15;PCE;{}.{at};ug/L;;0.5\r\n", 200 - at));
    }
    text
}

/// UTF-16 with its mark.
fn utf16(text: &str) -> Vec<u8> {
    let mut bytes = vec![0xff, 0xfe];
    bytes.extend(text.encode_utf16().flat_map(u16::to_le_bytes));
    bytes
}

/// Every seed.
pub fn all() -> Vec<Seed> {
    let table = |name, bytes: &[u8]| Seed { name, kind: Kind::Table, bytes: bytes.to_vec() };
    let site = |name, text: &str| Seed { name, kind: Kind::Site, bytes: text.as_bytes().to_vec() };
    vec![
        table("demo 2016", include_bytes!("../../../demo-wells/results/2016-2020_alder.csv")),
        table("demo 2021", include_bytes!("../../../demo-wells/results/2021-2023_alder.csv")),
        table("demo 2024", include_bytes!("../../../demo-wells/results/2024-2025_birch.csv")),
        table("demo 2026", DEMO_TABLE.as_bytes()),
        table("every column", EVERY_COLUMN.as_bytes()),
        table("long", long().as_bytes()),
        table("utf-16", &utf16(DEMO_TABLE)),
        table(
            "quoted",
            b"well,analyte,date,result,unit\n\"MW-\"\"1\",\"P\nCE\",2024-03-05,\"4\",ug/L\n",
        ),
        table("one line", b"well,analyte,date,result,unit"),
        table("nothing", b""),
        Seed { name: "workbook", kind: Kind::Workbook, bytes: workbook(&[]) },
        site("demo site", DEMO_SITE),
        site("declaring site", DECLARING_SITE),
        site("template", include_str!("../../../site-templates/chlorinated-solvents.toml")),
    ]
}
