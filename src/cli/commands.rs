//! Each command: its job, its page, its exit status.

use std::path::{Path, PathBuf};

use ebbwell::deliver::{NewSiteError, check_json, explain_json, new_site, show_json, summary_json};
use ebbwell::findings::{Findings, SeriesFinding};
use ebbwell::run::{Error, Job, Kind, Ran, run};
use ebbwell::site::{Fraction, WellMatch, schema, template};
use ebbwell::terms::{folded, nearest, years_between};
use ebbwell::words::page::{self, CheckFacts, PageOptions};
use ebbwell::words::{clean, explain, unreadable};

use super::args::{Args, Command, HowArgs};
use super::clock::today;
use super::exit::Exit;
use super::fail_on::{FailOn, fail_on};
use super::job::job;
use super::packagers;
use super::progress::Progress;
use super::site::{Refused, unknown_template};
use super::tell::Voice;

/// Runs the command that was asked for.
pub fn run_command(args: &Args) -> Exit {
    let voice = Voice::of(args);
    match &args.command {
        Command::New { dir, template } => new(dir, template, voice),
        Command::Check { site, output } => {
            let job = job(&site.sites, &site.how, Some(output), Kind::Check);
            reading(job, voice, |ran| check_page(ran, &site.sites, &site.how, voice))
        }
        Command::Review { site, output, fail_on: words } => match fail_on(words) {
            Err(message) => {
                voice.error(&message);
                Exit::Usage
            }
            Ok(named) => {
                let job = job(&site.sites, &site.how, Some(output), Kind::Review);
                reading(job, voice, |ran| review_page(ran, &site.sites, &site.how, &named, voice))
            }
        },
        Command::Show { site, well, analyte, fraction, how } => {
            let job = job(std::slice::from_ref(site), how, None, Kind::Review);
            let wanted = Wanted::by_the_site(job.as_ref().ok(), well, analyte, fraction.as_deref());
            reading(job, voice, |ran| show_page(ran, site, &wanted, how, voice))
        }
        Command::Explain { word, json } => explained(word.as_deref(), *json, voice),
        Command::Schema => {
            voice.result(&format!("{:#}\n", schema()));
            Exit::Done
        }
        Command::Completions { shell } => {
            voice.result(&packagers::completions(*shell));
            Exit::Done
        }
        Command::Man => {
            voice.result(&packagers::man());
            Exit::Done
        }
    }
}

/// Runs a job and tells what came of it.
fn reading(job: Result<Job, Refused>, voice: Voice, tell: impl FnOnce(&Ran) -> Exit) -> Exit {
    let job = match job {
        Ok(job) => job,
        Err(refused) => {
            voice.error(&refused.message);
            return refused.exit;
        }
    };
    let progress = Progress::begin(!voice.quiet);
    let ran = run(&job, &progress);
    progress.end();
    match ran {
        Ok(ran) => {
            for (name, why) in &ran.findings.run.unreadable {
                voice.error(&format!("{}: {why}", clean::shown(name)));
            }
            warn_if_old(&job, &ran.findings, voice);
            let told = tell(&ran);
            let unread = !ran.findings.run.unreadable.is_empty();
            if unread { Exit::Unreadable } else { told }
        }
        Err(error) => {
            if let Error::NothingRead { unreadable: files } = &error {
                for file in files {
                    let why = unreadable::why(&file.problem);
                    voice.error(&format!("{}: {why}", clean::shown(&file.name)));
                }
            }
            voice.error(&error.to_string());
            Exit::of_status(error.exit_status())
        }
    }
}

/// A newest result that is old today is said here and in no file.
fn warn_if_old(job: &Job, findings: &Findings, voice: Voice) {
    let newest = findings.series.iter().filter_map(|series| series.sampled).map(|s| s.last).max();
    let Some(newest) = newest.filter(|_| job.as_of.is_none()) else { return };
    let age = years_between(newest, today()).0;
    if age > job.site.settings.stale_after_years {
        voice.warn(&format!(
            "the newest result is of {newest}, {age:.1} years before today; the review says what \
             was known then"
        ));
    }
}

/// What the pages need beside the findings.
fn options<'a>(ran: &Ran, site: &'a str, folder: Option<&'a str>, voice: Voice) -> PageOptions<'a> {
    PageOptions {
        width: voice.width,
        color: voice.color,
        site_argument: site,
        folder,
        charts_left_out: ran.charts_left_out,
    }
}

fn argument(sites: &[PathBuf]) -> String {
    let words: Vec<String> =
        sites.iter().map(|site| clean::shell_word(&site.display().to_string())).collect();
    words.join(" ")
}

/// Tells which files of the folder are not ours and were kept.
fn warn_kept(ran: &Ran, voice: Voice) {
    if let Some(folder) = ran.folder.as_ref().filter(|folder| !folder.kept.is_empty()) {
        voice.warn(&format!(
            "kept in {}, not written by this program: {}",
            folder.path.display(),
            folder.kept.join(", ")
        ));
    }
}

fn review_page(ran: &Ran, sites: &[PathBuf], how: &HowArgs, named: &FailOn, voice: Voice) -> Exit {
    warn_kept(ran, voice);
    if how.json {
        voice.result(&summary_json(&ran.findings));
    } else {
        let folder = ran.folder.as_ref().map(|folder| folder.path.display().to_string());
        let site = argument(sites);
        voice.page(&page::review(&ran.findings, &options(ran, &site, folder.as_deref(), voice)));
    }
    if named.found_in(&ran.findings) { Exit::Found } else { Exit::Done }
}

fn check_page(ran: &Ran, sites: &[PathBuf], how: &HowArgs, voice: Voice) -> Exit {
    warn_kept(ran, voice);
    let facts = CheckFacts {
        run: &ran.findings.run,
        site: &ran.findings.site,
        notes: &ran.findings.notes,
        arrival: &ran.findings.arrival,
        examples: &ran.examples,
    };
    if how.json {
        voice.result(&check_json(&facts));
    } else {
        let folder = ran.folder.as_ref().map(|folder| folder.path.display().to_string());
        let site = argument(sites);
        voice.page(&page::check(&facts, &options(ran, &site, folder.as_deref(), voice)));
    }
    Exit::Done
}

/// Which series `show` is asked for.
struct Wanted {
    well: String,
    analyte: String,
    fraction: Option<String>,
}

fn show_page(ran: &Ran, site: &Path, wanted: &Wanted, how: &HowArgs, voice: Voice) -> Exit {
    match wanted.find(&ran.findings) {
        Err(message) => {
            voice.error(&message);
            Exit::Usage
        }
        Ok(found) => {
            let site = argument(&[site.to_owned()]);
            for series in found {
                if how.json {
                    voice.result(&show_json(&ran.findings, series));
                } else {
                    let options = options(ran, &site, None, voice);
                    voice.page(&page::show(&ran.findings, series, &options));
                }
            }
            Exit::Done
        }
    }
}

impl Wanted {
    /// The well and analyte under the site's own names, where what was typed is an alias.
    fn by_the_site(job: Option<&Job>, well: &str, analyte: &str, fraction: Option<&str>) -> Self {
        let site = job.map(|job| &job.site);
        let listed_well = site.and_then(|site| match site.well_of(well, None) {
            WellMatch::Listed(listed) | WellMatch::Alias(listed, _) => Some(listed.name.clone()),
            WellMatch::Unlisted => None,
        });
        let listed_analyte = site
            .and_then(|site| site.analyte_of(Some(analyte), analyte).map(|(at, _)| (site, at)))
            .map(|(site, at)| site.analytes[at].name.clone());
        Self {
            well: listed_well.unwrap_or_else(|| well.to_owned()),
            analyte: listed_analyte.unwrap_or_else(|| analyte.to_owned()),
            fraction: fraction.map(str::to_owned),
        }
    }

    /// The series of the well and analyte, or what is nearest.
    fn find<'f>(&self, findings: &'f Findings) -> Result<Vec<&'f SeriesFinding>, String> {
        let of_well: Vec<&SeriesFinding> =
            findings.series.iter().filter(|series| series.key.well == self.well).collect();
        if of_well.is_empty() {
            let wells = findings.wells.iter().map(|well| well.well.as_str());
            return Err(unknown("well", &self.well, wells));
        }
        let is_meant = |series: &&&SeriesFinding| {
            folded(&series.key.analyte) == folded(&self.analyte)
                || series.cas.as_deref() == Some(self.analyte.as_str())
        };
        let of_analyte: Vec<&SeriesFinding> = of_well.iter().filter(is_meant).copied().collect();
        if of_analyte.is_empty() {
            let analytes = of_well.iter().map(|series| series.key.analyte.as_str());
            return Err(unknown("analyte", &self.analyte, analytes));
        }
        let Some(text) = self.fraction.as_deref() else { return Ok(of_analyte) };
        let fraction = Fraction::read(text);
        let found: Vec<&SeriesFinding> = of_analyte
            .iter()
            .filter(|series| fraction.is_some() && series.key.fraction == fraction)
            .copied()
            .collect();
        if found.is_empty() {
            let fractions = of_analyte.iter().map(|series| match series.key.fraction_code() {
                "" => "(none)",
                code => code,
            });
            return Err(unknown("fraction", text, fractions));
        }
        Ok(found)
    }
}

/// What is told of a name that is not there.
fn unknown<'a>(what: &str, written: &str, known: impl Iterator<Item = &'a str>) -> String {
    const MOST: usize = 12;
    let mut names: Vec<&str> = known.collect();
    names.sort_unstable();
    names.dedup();
    let near = nearest(written, names.iter().copied())
        .map_or_else(String::new, |near| format!("; the nearest is {}", clean::shown(near)));
    let more = names.len().saturating_sub(MOST);
    let listed: Vec<String> = names.iter().take(MOST).map(|name| clean::shown(name)).collect();
    let rest = if more > 0 { format!(" and {more} more") } else { String::new() };
    format!(
        "no {what} is called {:?} here{near}; expected one of: {}{rest}",
        clean::shown(written),
        listed.join(", ")
    )
}

fn explained(word: Option<&str>, json: bool, voice: Voice) -> Exit {
    let options = PageOptions {
        width: voice.width,
        color: voice.color,
        site_argument: "SITE",
        folder: None,
        charts_left_out: 0,
    };
    let entries = match word {
        None if json => explain::all(),
        None => {
            voice.result(&page::index(&options));
            return Exit::Done;
        }
        Some(word) => explain::find(word),
    };
    if entries.is_empty() {
        let word = word.unwrap_or_default();
        let near = explain::nearest(word)
            .map_or_else(String::new, |near| format!("; the nearest is {near}"));
        voice.error(&format!(
            "{:?} is not explained here{near}. `ebbwell explain` lists every word",
            clean::shown(word)
        ));
        return Exit::Usage;
    }
    voice.result(&if json { explain_json(&entries) } else { page::explain(&entries, &options) });
    Exit::Done
}

fn new(dir: &Path, name: &str, voice: Voice) -> Exit {
    let Some(template) = template::named(name) else {
        voice.error(&unknown_template(name));
        return Exit::Usage;
    };
    let site = dir.file_name().map_or_else(|| "site".into(), |name| name.to_string_lossy());
    match new_site(dir, &template.for_site(&site)) {
        Ok(()) => {
            let shown = clean::shell_word(&dir.display().to_string());
            voice.page(&page::begun(&shown, template.name));
            Exit::Done
        }
        Err(error) => {
            voice.error(&error.to_string());
            match error {
                NewSiteError::Exists { .. } => Exit::WouldOverwrite,
                _ => Exit::CannotWrite,
            }
        }
    }
}
