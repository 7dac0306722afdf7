//! The `ebbwell` program: read the arguments, run the job, tell what was found.

mod cli;

use std::process::ExitCode;

fn main() -> ExitCode {
    cli::main()
}
