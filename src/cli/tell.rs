//! What people and other programs read: results on standard output, everything else on standard
//! error. A closed pipe ends quietly.

use std::io::{IsTerminal, Write};

use super::args::{Args, When};

/// How this run speaks.
#[derive(Clone, Copy, Debug)]
pub struct Voice {
    /// Only errors are told.
    pub quiet: bool,
    /// The terminal's width.
    pub width: usize,
    /// Whether bold and dim may be used on standard output.
    pub color: bool,
}

/// A page is at most this wide, and a pipe gets exactly this.
const WIDTH: usize = 100;
/// Narrower than this a table is no table.
const NARROWEST: usize = 60;

impl Voice {
    /// The voice that the arguments and the terminal ask for.
    pub fn of(args: &Args) -> Self {
        let terminal = std::io::stdout().is_terminal();
        let set = |name: &str| std::env::var_os(name).is_some_and(|value| !value.is_empty());
        let dumb = std::env::var_os("TERM").is_some_and(|term| term == "dumb");
        let color = match args.color {
            When::Always => true,
            When::Never => false,
            When::Auto => terminal && !set("NO_COLOR") && !dumb,
        };
        let columns = terminal_size::terminal_size()
            .filter(|_| terminal)
            .map_or(WIDTH, |(width, _)| usize::from(width.0));
        Self { quiet: args.quiet, width: columns.clamp(NARROWEST, WIDTH), color }
    }

    /// Writes the result to standard output.
    pub fn result(self, text: &str) {
        let mut out = std::io::stdout().lock();
        // A reader that went away wants no more; there is nobody to tell.
        let _ = out.write_all(text.as_bytes()).and_then(|()| out.flush());
    }

    /// Writes a page to standard output, unless quiet.
    pub fn page(self, text: &str) {
        if !self.quiet {
            self.result(text);
        }
    }

    /// Tells a warning on standard error, unless quiet.
    pub fn warn(self, text: &str) {
        if !self.quiet {
            let _ = writeln!(std::io::stderr().lock(), "ebbwell: {text}");
        }
    }

    /// Tells an error on standard error.
    pub fn error(self, text: &str) {
        let _ = writeln!(std::io::stderr().lock(), "ebbwell: {text}");
    }
}
