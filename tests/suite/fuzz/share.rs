//! One process's share of the inputs, and what it reports.

use std::fmt;
use std::fs;
use std::panic::{AssertUnwindSafe, catch_unwind};
use std::path::{Path, PathBuf};
use std::time::Duration;

use super::mutate::input;
use super::read::read;
use super::{memory, seeds};

/// The variable that names a share: seed, first input, end, report.
pub const SHARE: &str = "EBBWELL_FUZZ_SHARE";

/// The longest that one input may take, in processor time.
const SLOWEST: Duration = Duration::from_secs(2);
/// The most memory that one input may take beyond what the process had before it.
const LARGEST: u64 = 200 * 1024 * 1024;

/// What became of a share.
#[derive(Default)]
pub struct Report {
    pub inputs: u64,
    /// Inputs in which something was read.
    pub read: u64,
    pub records: u64,
    pub slowest: Duration,
    pub slowest_input: u64,
    pub largest: u64,
    pub largest_input: u64,
    pub failures: Vec<String>,
}

impl Report {
    pub fn add(&mut self, other: Self) {
        self.inputs += other.inputs;
        self.read += other.read;
        self.records += other.records;
        if other.slowest > self.slowest {
            (self.slowest, self.slowest_input) = (other.slowest, other.slowest_input);
        }
        if other.largest > self.largest {
            (self.largest, self.largest_input) = (other.largest, other.largest_input);
        }
        self.failures.extend(other.failures);
    }

    fn text(&self) -> String {
        let numbers = [
            self.inputs,
            self.read,
            self.records,
            u64::try_from(self.slowest.as_micros()).unwrap_or(u64::MAX),
            self.slowest_input,
            self.largest,
            self.largest_input,
        ];
        let numbers: Vec<String> = numbers.iter().map(u64::to_string).collect();
        let failures: String = self
            .failures
            .iter()
            .map(|failure| format!("{}\n", failure.replace('\n', " ")))
            .collect();
        format!("{}\n{failures}", numbers.join(" "))
    }
}

impl fmt::Display for Report {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(
            f,
            "{} read, {} records; the slowest took {:.3} s (input {}), the largest {:.1} MB (input \
             {}); {} failed",
            self.read,
            self.records,
            self.slowest.as_secs_f64(),
            self.slowest_input,
            self.largest as f64 / f64::from(1 << 20),
            self.largest_input,
            self.failures.len()
        )
    }
}

/// The report that a process left.
pub fn report(path: &Path) -> Report {
    let text = fs::read_to_string(path).unwrap_or_default();
    let mut lines = text.lines();
    let numbers: Vec<u64> = lines
        .next()
        .unwrap_or_default()
        .split(' ')
        .filter_map(|number| number.parse().ok())
        .collect();
    let [inputs, read, records, slowest, slowest_input, largest, largest_input] = numbers[..]
    else {
        return Report::default();
    };
    Report {
        inputs,
        read,
        records,
        slowest: Duration::from_micros(slowest),
        slowest_input,
        largest,
        largest_input,
        failures: lines.map(str::to_owned).collect(),
    }
}

/// Which input a process is at.
pub fn progress(report: &Path) -> String {
    fs::read_to_string(report.with_extension("at")).unwrap_or_default()
}

/// The message of a panic, if there is one.
pub fn caught(work: &dyn Fn()) -> Option<String> {
    let panic = catch_unwind(AssertUnwindSafe(work)).err()?;
    let text = panic.downcast_ref::<&str>().map(|text| (*text).to_owned());
    text.or_else(|| panic.downcast_ref::<String>().cloned()).or_else(|| Some("a panic".to_owned()))
}

/// Works through a share.
pub fn work(share: &str) -> Report {
    let mut words = share.splitn(4, ' ');
    let mut number = || words.next().and_then(|word| word.parse().ok()).expect("a share");
    let (seed, from, to): (u64, u64, u64) = (number(), number(), number());
    let path = PathBuf::from(words.next().expect("a share names its report"));
    let at = path.with_extension("at");
    let folder = tempfile::TempDir::new().expect("a folder");
    let seeds = seeds::all();
    let mut report = Report::default();
    for number in from..to {
        fs::write(&at, number.to_string()).expect("the place can be written");
        let made = input(&seeds, seed, number);
        let begun = memory::processor_time();
        let (outcome, grown) = memory::peak_of(|| {
            let mut counted = None;
            let panic = {
                let counted = std::cell::RefCell::new(&mut counted);
                caught(&|| **counted.borrow_mut() = Some(read(&made, number, folder.path())))
            };
            match (panic, counted) {
                (Some(panic), _) => Err(format!("panics: {panic}")),
                (None, Some(counted)) => counted,
                (None, None) => Err("was not read".to_owned()),
            }
        });
        let took = memory::processor_time() - begun;
        report.inputs += 1;
        if took > report.slowest {
            (report.slowest, report.slowest_input) = (took, number);
        }
        if grown > report.largest {
            (report.largest, report.largest_input) = (grown, number);
        }
        let outcome = outcome.and_then(|records| {
            if took > SLOWEST || grown > LARGEST {
                return Err(format!("took {took:?} and {grown} bytes"));
            }
            Ok(records)
        });
        match outcome {
            Ok(records) => {
                report.read += u64::from(records > 0);
                report.records += records;
            }
            Err(why) => {
                let kept = path.with_file_name(format!("input-{number}.{}", made.kind.ending()));
                fs::write(&kept, &made.bytes).expect("the input can be kept");
                report.failures.push(format!("input {number} ({}) {why}", made.from));
            }
        }
        if number % 500 == 499 {
            fs::write(&path, report.text()).expect("the report can be written");
        }
    }
    fs::write(&path, report.text()).expect("the report can be written");
    report
}
