//! Which output folders are replaced, and what is kept.

use std::fs;
use std::path::Path;

use super::sample;
use ebbwell::deliver::files::{Content, Formats, OutFile, review_files};
use ebbwell::deliver::write::{Offence, write};
use ebbwell::deliver::{OutDir, Owner, WriteError, Written, may_write};
use ebbwell::findings::SiteFacts;

/// Writes two small files for the sample site.
pub fn put(folder: &Path, force: bool, text: &str) -> Result<Written, WriteError> {
    put_for(folder, force, text, &sample::site())
}

fn put_for(
    folder: &Path,
    force: bool,
    text: &str,
    site: &SiteFacts,
) -> Result<Written, WriteError> {
    let files = vec![
        OutFile::text("summary.csv", text.to_owned()),
        OutFile::text("charts/a.svg", format!("<svg>{text}</svg>")),
    ];
    let out = OutDir { path: folder.to_owned(), force };
    write(&out, &sample::run(), site, files, &|| false)
}

/// The names in a folder, folders with a slash.
pub fn names(folder: &Path) -> Vec<String> {
    let mut names: Vec<String> = fs::read_dir(folder)
        .expect("the folder")
        .map(|entry| {
            let entry = entry.expect("an entry");
            let slash = if entry.path().is_dir() { "/" } else { "" };
            format!("{}{slash}", entry.file_name().to_string_lossy())
        })
        .collect();
    names.sort();
    names
}

fn offence(result: Result<Written, WriteError>) -> (String, Offence) {
    match result {
        Err(WriteError::WouldOverwrite { name, offence, .. }) => (name, offence),
        other => panic!("{other:?}"),
    }
}

#[test]
fn a_folder_is_made_with_its_files_and_a_record_that_holds_their_hashes() {
    let here = tempfile::tempdir().expect("a folder");
    let out = here.path().join("deep/review");
    let written = put(&out, false, "one").expect("written");
    assert_eq!(names(&out), ["charts/", "run.json", "summary.csv"]);
    assert_eq!(names(&here.path().join("deep")), ["review/"], "nothing is left beside it");
    let run = fs::read_to_string(out.join("run.json")).expect("run.json");
    // SHA-256 of "one", from coreutils.
    let hash = "7692c3ad3540bb803c020b3aee66cd8887123234ea0c6e7143c0add73ff431ed";
    assert_eq!(written.outputs["summary.csv"], hash);
    assert!(run.contains(hash) && run.contains("charts/a.svg"));
}

#[test]
fn an_output_of_the_same_site_is_replaced_and_what_is_no_longer_written_goes() {
    let here = tempfile::tempdir().expect("a folder");
    let out = here.path().join("review");
    put(&out, false, "one").expect("written");
    let files = vec![OutFile::text("summary.csv", "two".into())];
    let dir = OutDir { path: out.clone(), force: false };
    write(&dir, &sample::run(), &sample::site(), files, &|| false).expect("replaced");
    assert_eq!(names(&out), ["run.json", "summary.csv"]);
    assert_eq!(fs::read_to_string(out.join("summary.csv")).expect("the file"), "two");
    assert_eq!(names(here.path()), ["review/"]);
}

#[test]
fn a_stranger_is_named_and_nothing_is_touched() {
    let here = tempfile::tempdir().expect("a folder");
    let out = here.path().join("review");
    put(&out, false, "one").expect("written");
    fs::write(out.join("charts/notes.txt"), "mine").expect("a note");
    let refused = put(&out, false, "two");
    let message = refused.as_ref().expect_err("refused").to_string();
    assert!(message.contains("notes.txt") && message.contains("--force"), "{message}");
    assert_eq!(offence(refused), ("charts/notes.txt".into(), Offence::Stranger));
    assert_eq!(fs::read_to_string(out.join("summary.csv")).expect("the file"), "one");
    assert_eq!(names(here.path()), ["review/"]);
}

#[test]
fn a_file_that_was_changed_is_named() {
    let here = tempfile::tempdir().expect("a folder");
    let out = here.path().join("review");
    put(&out, false, "one").expect("written");
    fs::write(out.join("summary.csv"), "edited").expect("an edit");
    assert_eq!(offence(put(&out, false, "two")), ("summary.csv".into(), Offence::Changed));
    let dir = OutDir { path: out.clone(), force: false };
    let early = may_write(&dir, &Owner::of(&sample::run(), &sample::site()));
    assert!(matches!(early, Err(WriteError::WouldOverwrite { .. })), "asked early too");
    let forced = put(&out, true, "two").expect("forced");
    assert!(forced.kept.is_empty());
    assert_eq!(fs::read_to_string(out.join("summary.csv")).expect("the file"), "two");
}

#[test]
fn force_keeps_every_file_that_is_not_ours() {
    let here = tempfile::tempdir().expect("a folder");
    let out = here.path().join("review");
    put(&out, false, "one").expect("written");
    fs::create_dir_all(out.join("photos/2024")).expect("a folder");
    fs::write(out.join("photos/2024/well.jpg"), "picture").expect("a picture");
    fs::write(out.join("notes.txt"), "mine").expect("a note");
    let written = put(&out, true, "two").expect("forced");
    assert_eq!(written.kept, ["notes.txt", "photos/2024/well.jpg"]);
    assert_eq!(fs::read_to_string(out.join("notes.txt")).expect("the note"), "mine");
    assert_eq!(fs::read_to_string(out.join("photos/2024/well.jpg")).expect("it"), "picture");
    assert_eq!(fs::read_to_string(out.join("summary.csv")).expect("the file"), "two");
    let again = put(&out, false, "three");
    assert_eq!(offence(again), ("notes.txt".into(), Offence::Stranger), "still a stranger");
}

#[test]
fn files_without_a_record_are_never_replaced_unless_forced() {
    let here = tempfile::tempdir().expect("a folder");
    let out = here.path().join("mine");
    fs::create_dir(&out).expect("a folder");
    put(&out, false, "one").expect("an empty folder is nobody's");
    fs::remove_file(out.join("run.json")).expect("removed");
    let (name, why) = offence(put(&out, false, "two"));
    assert_eq!((name.as_str(), why), ("charts/a.svg", Offence::NoRunJson));
    fs::write(out.join("run.json"), "{\"program\": \"another\"}").expect("another's");
    let (name, why) = offence(put(&out, false, "two"));
    assert_eq!((name.as_str(), why), ("run.json", Offence::UnreadableRunJson));
    put(&out, true, "two").expect("forced");
}

#[test]
fn another_sites_output_is_refused_and_bare_files_go_by_their_names() {
    let here = tempfile::tempdir().expect("a folder");
    let out = here.path().join("review");
    put(&out, false, "one").expect("written");
    let other = SiteFacts { name: "Other Yard".into(), ..sample::site() };
    let refused = put_for(&out, false, "two", &other);
    let message = refused.as_ref().expect_err("refused").to_string();
    assert!(message.contains("belongs to the site Example Yard"), "{message}");
    let bare = SiteFacts { name: String::new(), ..sample::site() };
    assert!(matches!(put_for(&out, false, "x", &bare), Err(WriteError::WouldOverwrite { .. })));
    let out = here.path().join("bare");
    put_for(&out, false, "one", &bare).expect("written");
    put_for(&out, false, "two", &bare).expect("the same results files");
    let mut run = sample::run();
    run.files.pop();
    let dir = OutDir { path: out, force: false };
    let refused = write(&dir, &run, &bare, Vec::new(), &|| false);
    let message = refused.expect_err("other results files").to_string();
    assert!(message.contains("results/2024.csv and 1 more"), "{message}");
}

#[test]
fn a_file_where_the_folder_would_be_is_refused_even_with_force() {
    let here = tempfile::tempdir().expect("a folder");
    let out = here.path().join("review");
    fs::write(&out, "a file").expect("a file");
    assert_eq!(offence(put(&out, true, "one")), (String::new(), Offence::NotAFolder));
    assert_eq!(fs::read_to_string(&out).expect("the file"), "a file");
}

#[test]
fn a_review_writes_every_format_asked_for() {
    let here = tempfile::tempdir().expect("a folder");
    let findings = sample::findings();
    let formats = Formats { csv: true, json: true, svg: true };
    let ledger = Content::Written(Box::new(|to| to.write_all(b"file\n")));
    let files = review_files(&findings, formats, ledger);
    let dir = OutDir { path: here.path().join("review"), force: false };
    let written = write(&dir, &findings.run, &findings.site, files, &|| false).expect("written");
    let names: Vec<&str> = written.outputs.keys().map(String::as_str).collect();
    assert_eq!(
        names,
        [
            "charts/MW-1--Benzene.svg",
            "charts/MW-12--Trichloroethylene.svg",
            "charts/MW-2--Benzene.svg",
            "charts/MW-3--Benzene.svg",
            "charts/MW-7--Vinyl_chloride.svg",
            "charts/MW-9--1_1-Dichloroethylene.svg",
            "flags.csv",
            "ledger.csv",
            "summary.csv",
            "summary.json",
            "used.csv",
            "wells.csv",
        ]
    );
    let formats = Formats { csv: false, json: true, svg: false };
    let files = review_files(&findings, formats, Content::Text(String::new()));
    assert_eq!(files.iter().map(|f| f.name.as_str()).collect::<Vec<_>>(), ["summary.json"]);
}
