//! The command line: where and when. Whatever changes a number stands in the site file.

use std::path::PathBuf;

use clap::{Args as ClapArgs, Parser, Subcommand, ValueEnum, ValueHint};

/// Screens first-order attenuation of groundwater contaminants, well by well.
///
/// Reads laboratory results, accounts for every record, fits ln C against time for each well and
/// analyte, says when a regulatory limit would be met and how sure that is, and names the fits
/// that cannot be trusted. It screens; cleanup decisions rest with the responsible regulator and
/// licensed professionals.
#[derive(Clone, Debug, Parser)]
#[command(
    name = "ebbwell",
    version,
    max_term_width = 100,
    arg_required_else_help = true,
    after_help = "Examples:\n  ebbwell review demo-wells\n  ebbwell show demo-wells MW-6 TCE\n  \
                  ebbwell new my-site --template chlorinated-solvents\n\nExit status: 0 done; \
                  1 something named by --fail-on was found; 2 wrong usage; 3 an input could not \
                  be read; 4 the site file is invalid; 5 an output would overwrite what the \
                  program did not write; 6 an output could not be written; 7 the program broke a \
                  promise; 130 interrupted."
)]
pub struct Args {
    /// What to do.
    #[command(subcommand)]
    pub command: Command,
    /// When colour is used.
    #[arg(long, global = true, value_enum, default_value_t = When::Auto, value_name = "WHEN")]
    pub color: When,
    /// No page, no progress, no warnings; errors are still told.
    #[arg(long, short, global = true)]
    pub quiet: bool,
}

/// What to do.
#[derive(Clone, Debug, Subcommand)]
pub enum Command {
    /// Start a site folder from a template.
    #[command(after_help = "Examples:\n  ebbwell new my-site --template fuel-release\n  \
                            ebbwell new depot --template metals-and-salts")]
    New {
        /// The folder to make.
        #[arg(value_hint = ValueHint::DirPath)]
        dir: PathBuf,
        /// Which limits to begin with.
        #[arg(long, value_name = "NAME")]
        template: String,
    },
    /// Read everything, fit nothing: what was read, what was not used and why.
    #[command(after_help = "Examples:\n  ebbwell check demo-wells\n  \
                            ebbwell check lab.csv --template fuel-release")]
    Check {
        /// Which site.
        #[command(flatten)]
        site: SiteArgs,
        /// What to write.
        #[command(flatten)]
        output: OutputArgs,
    },
    /// The main job: rates, verdicts and dates for every well and analyte.
    #[command(after_help = "Examples:\n  ebbwell review demo-wells\n  \
                            ebbwell review demo-wells --as-of 2026-Q2 --fail-on rising")]
    Review {
        /// Which site.
        #[command(flatten)]
        site: SiteArgs,
        /// What to write.
        #[command(flatten)]
        output: OutputArgs,
        /// Exit with 1 if a series has one of these verdicts or flags.
        #[arg(long, value_name = "VERDICT|FLAG,…", value_delimiter = ',')]
        fail_on: Vec<String>,
    },
    /// One series in full: its values, where each came from, the fit and its flags.
    #[command(after_help = "Examples:\n  ebbwell show demo-wells MW-6 TCE\n  \
                            ebbwell show demo-wells MW-5 7440-47-3 --fraction total")]
    Show {
        /// A site folder, a site.toml, or a results file.
        #[arg(value_hint = ValueHint::AnyPath)]
        site: PathBuf,
        /// The well.
        well: String,
        /// The analyte: its name, an alias or its CAS number.
        analyte: String,
        /// Which fraction, where there are several.
        #[arg(long)]
        fraction: Option<String>,
        /// When and how.
        #[command(flatten)]
        how: HowArgs,
    },
    /// Any flag, verdict, column, reason or method: meaning, formula, source.
    #[command(after_help = "Examples:\n  ebbwell explain results-deny-line\n  \
                            ebbwell explain reach_latest")]
    Explain {
        /// What to explain; without it, everything is listed.
        word: Option<String>,
        /// Write JSON instead of the page.
        #[arg(long)]
        json: bool,
    },
    /// The JSON schema of the site file.
    #[command(hide = true)]
    Schema,
    /// Completions for a shell.
    #[command(hide = true)]
    Completions {
        /// The shell.
        shell: clap_complete::Shell,
    },
    /// The manual page.
    #[command(hide = true)]
    Man,
}

/// Which site, and when.
#[derive(Clone, Debug, ClapArgs)]
pub struct SiteArgs {
    /// A site folder, its site.toml, or results files (- for standard input).
    #[arg(required = true, value_hint = ValueHint::AnyPath, value_name = "SITE")]
    pub sites: Vec<PathBuf>,
    /// When and how.
    #[command(flatten)]
    pub how: HowArgs,
}

/// When, with which limits for bare files, and how.
#[derive(Clone, Debug, ClapArgs)]
pub struct HowArgs {
    /// Limits and settings for bare results files: the name of a template.
    #[arg(long, value_name = "NAME")]
    pub template: Option<String>,
    /// What is known until then: 2026-09-30, 2026, 2026-H2, 2026-Q3 or 2026-07 (the last day).
    #[arg(long, value_name = "DATE")]
    pub as_of: Option<String>,
    /// How much is computed.
    #[arg(long, value_enum, default_value_t = EffortArg::Full)]
    pub effort: EffortArg,
    /// Write JSON to standard output instead of the page.
    #[arg(long)]
    pub json: bool,
    /// How many threads fit series; the output never depends on it.
    #[arg(long, value_name = "N", value_parser = clap::value_parser!(u16).range(1..=1024))]
    pub threads: Option<u16>,
}

/// What is written where.
#[derive(Clone, Debug, ClapArgs)]
pub struct OutputArgs {
    /// The output folder, in place of one named after the as-of date.
    #[arg(long, value_name = "DIR", value_hint = ValueHint::DirPath)]
    pub out: Option<PathBuf>,
    /// Which formats to write: csv, json, svg.
    #[arg(long, value_name = "FORMAT,…", value_delimiter = ',')]
    pub formats: Vec<String>,
    /// Replace our own files even where they were changed; what is not ours is kept.
    #[arg(long)]
    pub force: bool,
}

/// When colour is used.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub enum When {
    /// On a terminal that can, unless NO_COLOR is set.
    Auto,
    /// Always.
    Always,
    /// Never.
    Never,
}

/// How much is computed.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub enum EffortArg {
    /// No refits.
    Quick,
    /// Everything.
    Full,
}
