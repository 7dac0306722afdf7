//! Completions and the manual page, made from the arguments themselves.

use clap::CommandFactory;
use clap_complete::Shell;

use super::args::Args;

/// Completions for a shell.
pub fn completions(shell: Shell) -> String {
    let mut bytes = Vec::new();
    clap_complete::generate(shell, &mut Args::command(), "ebbwell", &mut bytes);
    String::from_utf8_lossy(&bytes).into_owned()
}

/// The manual page, one section a command.
pub fn man() -> String {
    let mut bytes = Vec::new();
    // Writing to a Vec cannot fail.
    let _ = clap_mangen::Man::new(Args::command()).render(&mut bytes);
    for command in Args::command().get_subcommands().filter(|command| !command.is_hide_set()) {
        let _ = clap_mangen::Man::new(command.clone()).render_description_section(&mut bytes);
        let _ = clap_mangen::Man::new(command.clone()).render_options_section(&mut bytes);
    }
    String::from_utf8_lossy(&bytes).into_owned()
}
