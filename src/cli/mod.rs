//! Arguments become a job; what a run found out is told; the exit status follows from it.

mod args;
mod as_of;
mod clock;
mod commands;
mod exit;
mod fail_on;
mod job;
mod packagers;
mod progress;
mod site;
mod tell;

use std::process::ExitCode;

use clap::Parser;

/// Runs the program.
pub fn main() -> ExitCode {
    let args = args::Args::parse();
    // A fault of the program must not look like an answer: it is told, with its own status.
    let told = std::panic::catch_unwind(|| commands::run_command(&args));
    match told {
        Ok(exit) => exit.into(),
        Err(_) => exit::Exit::BrokenPromise.into(),
    }
}
