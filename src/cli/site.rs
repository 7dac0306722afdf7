//! SITE on the command line becomes sources, a checked site, and a place for outputs.

use std::io::Read;
use std::path::{Path, PathBuf};

use ebbwell::findings::InputHash;
use ebbwell::intake::Sources;
use ebbwell::intake::source::sha256_hex;
use ebbwell::run::{Place, SiteFileFacts};
use ebbwell::site::{Site, read, template};
use ebbwell::terms::nearest;

use super::exit::Exit;

/// What SITE means.
pub struct Opened {
    /// Where results come from.
    pub sources: Sources,
    /// The checked site.
    pub site: Site,
    /// The file it was read from.
    pub site_file: SiteFileFacts,
    /// Where outputs go by default.
    pub place: Place,
}

/// Why SITE could not be opened, in words, with the exit status.
pub struct Refused {
    /// What to tell.
    pub message: String,
    /// How to end.
    pub exit: Exit,
}

fn refused<T>(exit: Exit, message: impl Into<String>) -> Result<T, Refused> {
    Err(Refused { message: message.into(), exit })
}

/// Opens SITE.
pub fn open(sites: &[PathBuf], template: Option<&str>) -> Result<Opened, Refused> {
    let is_site_file = |path: &Path| path.extension().is_some_and(|e| e == "toml");
    let [only] = sites else {
        return match sites.iter().find(|path| path.is_dir() || is_site_file(path)) {
            Some(folder) => refused(
                Exit::Usage,
                format!(
                    "{}: a site folder stands alone; expected one site folder, or several \
                     results files. Run one command a site",
                    folder.display()
                ),
            ),
            None => bare(sites, template),
        };
    };
    if only.is_dir() {
        folder(only, template)
    } else if is_site_file(only) {
        // The folder of `site.toml` named alone is the current one.
        let parent = only.parent().filter(|parent| !parent.as_os_str().is_empty());
        with_file(parent.unwrap_or(Path::new(".")), only, template)
    } else {
        bare(sites, template)
    }
}

fn folder(folder: &Path, template: Option<&str>) -> Result<Opened, Refused> {
    let file = folder.join("site.toml");
    if !file.is_file() {
        return refused(
            Exit::Usage,
            format!(
                "{}: no site.toml in this folder; expected a site folder. Start one with `ebbwell \
                 new {} --template NAME`, or name the results files themselves",
                folder.display(),
                folder.display()
            ),
        );
    }
    with_file(folder, &file, template)
}

fn with_file(folder: &Path, file: &Path, template: Option<&str>) -> Result<Opened, Refused> {
    if template.is_some() {
        return refused(
            Exit::Usage,
            "--template is for bare results files; a site folder has its own site.toml. Leave \
             --template out, or name the results files",
        );
    }
    let bytes = match std::fs::read(file) {
        Ok(bytes) => bytes,
        Err(error) => {
            return refused(Exit::SiteFile, format!("{}: {error}", file.display()));
        }
    };
    let Ok(text) = String::from_utf8(bytes) else {
        return refused(
            Exit::SiteFile,
            format!("{}: not UTF-8; save the site file as UTF-8", file.display()),
        );
    };
    let shown = file.display().to_string();
    match read(&text, &shown) {
        Ok(site) => Ok(Opened {
            sources: Sources::Folder(folder.to_owned()),
            site,
            site_file: SiteFileFacts {
                file: Some(InputHash {
                    name: "site.toml".to_owned(),
                    bytes: text.len() as u64,
                    sha256: sha256_hex(text.as_bytes()),
                }),
                template: None,
            },
            place: Place::Beside { parent: folder.to_owned(), prefix: String::new() },
        }),
        Err(problems) => {
            let told: Vec<String> = problems.iter().map(|problem| format!("  {problem}")).collect();
            let n = problems.len();
            let s = if n == 1 { "problem" } else { "problems" };
            refused(Exit::SiteFile, format!("{shown} has {n} {s}:\n{}", told.join("\n")))
        }
    }
}

/// Results files without a site folder, or standard input.
fn bare(files: &[PathBuf], template: Option<&str>) -> Result<Opened, Refused> {
    let site = match template {
        None => Site::bare(),
        Some(name) => named_template(name)?,
    };
    let site_file = SiteFileFacts { file: None, template: template.map(str::to_owned) };
    if files.iter().any(|path| path.as_os_str() == "-") {
        if files.len() > 1 {
            return refused(Exit::Usage, "- stands alone: standard input is one results file");
        }
        let mut bytes = Vec::new();
        if let Err(error) = std::io::stdin().lock().read_to_end(&mut bytes) {
            return refused(Exit::Unreadable, format!("standard input: {error}"));
        }
        let place = Place::Beside { parent: PathBuf::from("."), prefix: String::new() };
        return Ok(Opened { sources: Sources::Standard(bytes), site, site_file, place });
    }
    let first = files.first().map_or(Path::new("results"), PathBuf::as_path);
    let parent = first.parent().filter(|parent| !parent.as_os_str().is_empty());
    let stem = first.file_stem().map_or_else(|| "results".into(), |stem| stem.to_string_lossy());
    let place = Place::Beside {
        parent: parent.unwrap_or(Path::new(".")).to_owned(),
        prefix: format!("{stem}-"),
    };
    Ok(Opened { sources: Sources::Files(files.to_vec()), site, site_file, place })
}

/// The site of a template's name.
fn named_template(name: &str) -> Result<Site, Refused> {
    match Site::from_template(name) {
        Some(site) => Ok(site),
        None => refused(Exit::Usage, unknown_template(name)),
    }
}

/// What is told of a template that does not exist.
pub fn unknown_template(name: &str) -> String {
    let names: Vec<&str> = template::ALL.iter().map(|template| template.name).collect();
    let near = nearest(name, names.iter().copied())
        .map_or_else(String::new, |near| format!(" (the nearest is {near})"));
    format!("no template is called {name:?}{near}; expected one of: {}", names.join(", "))
}
