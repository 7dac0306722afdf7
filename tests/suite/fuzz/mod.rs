//! Any bytes at all: a seeded mutator of our own over tables, workbooks and site files.
//!
//! The same seed makes the same inputs on every machine. Each input is read in a process of its own
//! kind (this binary again), so that a panic is caught, a stack that runs over or a hang is seen
//! from outside, and the peak of memory is that of the reading alone. The invariant: the ledger has
//! a row for each record.
//!
//! `EBBWELL_FUZZ=1000000 cargo test --release fuzz` works through a million inputs,
//! `EBBWELL_FUZZ_SEED=7` through others. An input that failed is written to the folder that the
//! message names; made small, it becomes a test in `kept`.

mod container;
mod kept;
mod memory;
mod mutate;
mod numbers;
mod read;
mod seeds;
mod share;

use std::path::Path;
use std::process::{Child, Command};
use std::time::{Duration, Instant};

use share::{Report, SHARE};
use tempfile::TempDir;

/// Inputs of an ordinary run of the tests.
const INPUTS: u64 = 20_000;
/// How long no input may take to be finished before the process is taken for hung.
const HUNG: Duration = Duration::from_secs(60);
/// Processes that work side by side.
const PROCESSES: u64 = 2;

/// A number from the environment.
fn asked(name: &str, otherwise: u64) -> u64 {
    match std::env::var(name) {
        Ok(text) => text.parse().unwrap_or_else(|_| panic!("{name}={text:?} is no number")),
        Err(_) => otherwise,
    }
}

#[test]
fn no_mutated_input_panics_hangs_swells_or_loses_a_record() {
    let inputs = asked("EBBWELL_FUZZ", INPUTS);
    let seed = asked("EBBWELL_FUZZ_SEED", 1);
    let place = TempDir::new().expect("a folder");
    let begun = Instant::now();
    let workers: Vec<Worker> = (0..PROCESSES)
        .map(|at| {
            let (from, to) = (inputs * at / PROCESSES, inputs * (at + 1) / PROCESSES);
            Worker::start(place.path(), seed, from, to)
        })
        .collect();
    let mut all = Report::default();
    for worker in workers {
        all.add(worker.finish());
    }
    println!(
        "{} inputs from seed {seed} in {:.1} s: {all}",
        all.inputs,
        begun.elapsed().as_secs_f64()
    );
    let failed = all.failures.len();
    if failed > 0 {
        let kept = place.keep();
        panic!(
            "{failed} of {inputs} failed, kept in {}:\n{}",
            kept.display(),
            all.failures.join("\n")
        );
    }
    assert_eq!(all.inputs, inputs);
}

/// One process with its share.
struct Worker {
    child: Child,
    report: std::path::PathBuf,
}

impl Worker {
    fn start(place: &Path, seed: u64, from: u64, to: u64) -> Self {
        let report = place.join(format!("report-{from}"));
        let binary = std::env::current_exe().expect("this binary");
        let child = Command::new(binary)
            .args(["fuzz::a_share_of_the_inputs_is_worked_through", "--exact", "--nocapture"])
            .env(SHARE, format!("{seed} {from} {to} {}", report.display()))
            .env("RUST_BACKTRACE", "0")
            .stdout(std::process::Stdio::null())
            .stderr(std::process::Stdio::null())
            .spawn()
            .expect("this binary starts");
        Self { child, report }
    }

    /// Waits, and kills a process in which nothing moves.
    fn finish(mut self) -> Report {
        let mut moved = (Instant::now(), share::progress(&self.report));
        let ended = loop {
            if let Some(ended) = self.child.try_wait().expect("a child of ours") {
                break Some(ended);
            }
            let now = share::progress(&self.report);
            if now != moved.1 {
                moved = (Instant::now(), now);
            } else if moved.0.elapsed() > HUNG {
                self.child.kill().expect("a child of ours");
                self.child.wait().expect("a child of ours");
                break None;
            }
            std::thread::sleep(Duration::from_millis(50));
        };
        let mut report = share::report(&self.report);
        let at = share::progress(&self.report);
        match ended {
            Some(status) if status.success() => {}
            Some(status) => report.failures.push(format!("input {at} ended the process: {status}")),
            None => report.failures.push(format!("input {at} hangs")),
        }
        report
    }
}

/// Works through the share that the environment names; without one, through a small one of its own.
#[test]
fn a_share_of_the_inputs_is_worked_through() {
    let place = TempDir::new().expect("a folder");
    let own = format!("99 0 200 {}", place.path().join("report").display());
    let asked = std::env::var(SHARE);
    let report = share::work(asked.as_deref().unwrap_or(&own));
    assert!(report.failures.is_empty(), "{}", report.failures.join("\n"));
    assert!(report.inputs > 0);
}

#[test]
fn what_the_harness_looks_for_is_found() {
    let caught = |work: &dyn Fn()| share::caught(&|| work());
    assert_eq!(caught(&|| {}), None);
    assert_eq!(caught(&|| panic!("planted")).as_deref(), Some("planted"));
    // Memory that is touched and freed again still shows.
    let (_, swollen) = memory::peak_of(|| std::hint::black_box(vec![1_u8; 64 << 20]).len());
    assert!(swollen >= 60 << 20, "{swollen}");
    let (_, nothing) = memory::peak_of(|| 1);
    assert!(nothing < 60 << 20, "{nothing}");
    // The same seed and number make the same input, and neighbours differ.
    let seeds = seeds::all();
    assert_eq!(mutate::input(&seeds, 5, 77).bytes, mutate::input(&seeds, 5, 77).bytes);
    assert_ne!(mutate::input(&seeds, 5, 77).bytes, mutate::input(&seeds, 5, 78).bytes);
}
