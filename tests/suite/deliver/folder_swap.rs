//! Swaps that were stopped, disks that say no, runs at once.

use std::cell::Cell;
use std::fs::{self, File};
use std::io::{self, Write};
use std::path::Path;

use super::folder::{names, put};
use super::sample;
use ebbwell::deliver::files::OutFile;
use ebbwell::deliver::write::write;
use ebbwell::deliver::{OutDir, Owner, WriteError, may_write};

fn dir(path: &Path) -> OutDir {
    OutDir { path: path.to_owned(), force: false }
}

/// What a run leaves that was killed between the two renames of its swap.
fn stopped_swap(parent: &Path, name: &str) -> std::path::PathBuf {
    let stage = parent.join(format!(".{name}.ebbwell-Ab12"));
    fs::create_dir_all(stage.join("new")).expect("a staging folder");
    fs::write(stage.join("new/summary.csv"), "half").expect("a file");
    File::create(stage.join("lock")).expect("a lock file");
    fs::rename(parent.join(name), stage.join("old")).expect("moved aside");
    stage
}

#[test]
fn a_swap_that_was_stopped_is_healed_by_the_next_run() {
    let here = tempfile::tempdir().expect("a folder");
    let out = here.path().join("review");
    put(&out, false, "one").expect("written");
    stopped_swap(here.path(), "review");
    assert!(!out.exists());
    let owner = Owner::of(&sample::run(), &sample::site());
    may_write(&dir(&out), &owner).expect("healed");
    assert_eq!(fs::read_to_string(out.join("summary.csv")).expect("the file"), "one");
    assert_eq!(names(here.path()), ["review/"], "the staging folder is gone");
    put(&out, false, "two").expect("replaced");
}

#[test]
fn a_finished_swap_whose_old_output_was_left_loses_it_and_nothing_else() {
    let here = tempfile::tempdir().expect("a folder");
    let out = here.path().join("review");
    put(&out, false, "one").expect("written");
    stopped_swap(here.path(), "review");
    put(&here.path().join("other"), false, "other")
        .expect("another folder is none of its business");
    assert!(!out.exists());
    put(&out, false, "two").expect("written");
    stopped_swap(here.path(), "other");
    assert_eq!(fs::read_to_string(out.join("summary.csv")).expect("the file"), "two");
    let left = names(here.path());
    assert_eq!(left, [".other.ebbwell-Ab12/", "review/"]);
}

#[test]
fn the_staging_folder_of_a_run_at_work_is_left_alone() {
    let here = tempfile::tempdir().expect("a folder");
    let out = here.path().join("review");
    put(&out, false, "one").expect("written");
    let stage = here.path().join(".review.ebbwell-Zz99");
    fs::create_dir(&stage).expect("a folder");
    let lock = File::create(stage.join("lock")).expect("a lock file");
    lock.try_lock().expect("the lock");
    put(&out, false, "two").expect("replaced");
    assert!(stage.exists(), "its run still lives");
    drop(lock);
    put(&out, false, "three").expect("replaced");
    assert!(!stage.exists(), "its run has ended");
    let stranger = here.path().join(".review.ebbwell-mine");
    fs::create_dir(&stranger).expect("a folder");
    put(&out, false, "four").expect("replaced");
    assert!(stranger.exists(), "without our lock file it is not ours");
}

#[test]
fn a_run_that_is_stopped_leaves_the_earlier_output_whole() {
    let here = tempfile::tempdir().expect("a folder");
    let out = here.path().join("review");
    put(&out, false, "one").expect("written");
    for stop_at in 0..3 {
        let asked = Cell::new(0);
        let stop = || {
            asked.set(asked.get() + 1);
            asked.get() > stop_at
        };
        let files = vec![OutFile::text("a.csv", "a".into()), OutFile::text("b.csv", "b".into())];
        let result = write(&dir(&out), &sample::run(), &sample::site(), files, &stop);
        assert!(matches!(result, Err(WriteError::Stopped)), "{result:?}");
        assert_eq!(names(&out), ["charts/", "run.json", "summary.csv"]);
        assert_eq!(names(here.path()), ["review/"]);
    }
}

#[test]
fn a_full_disk_is_told_with_the_file_and_leaves_the_earlier_output_whole() {
    let here = tempfile::tempdir().expect("a folder");
    let out = here.path().join("review");
    put(&out, false, "one").expect("written");
    let full = |to: &mut dyn Write| {
        to.write_all(b"some")?;
        Err(io::Error::from(io::ErrorKind::StorageFull))
    };
    let files = vec![OutFile::written("summary.csv", full)];
    let result = write(&dir(&out), &sample::run(), &sample::site(), files, &|| false);
    let Err(WriteError::CannotWrite { path, source }) = result else { panic!("{result:?}") };
    assert!(path.ends_with("review/summary.csv"), "{}", path.display());
    assert_eq!(source.kind(), io::ErrorKind::StorageFull);
    let message = WriteError::CannotWrite { path, source }.to_string();
    assert!(message.contains("Make room") && message.contains("is whole"), "{message}");
    assert_eq!(fs::read_to_string(out.join("summary.csv")).expect("the file"), "one");
    assert_eq!(names(here.path()), ["review/"]);
}

#[test]
fn a_folder_that_cannot_be_made_is_told_as_such() {
    let here = tempfile::tempdir().expect("a folder");
    let file = here.path().join("file");
    fs::write(&file, "a file").expect("a file");
    // A folder below a file can be written by nobody, whatever the rights of who runs the tests.
    let result = put(&file.join("review"), false, "one");
    assert!(matches!(result, Err(WriteError::CannotWrite { .. })), "{result:?}");
    let owner = Owner::of(&sample::run(), &sample::site());
    let early = may_write(&dir(&file.join("review")), &owner);
    assert!(matches!(early, Err(WriteError::CannotWrite { .. })), "asked early too");
    let root = may_write(&dir(Path::new("/")), &owner);
    assert!(matches!(root, Err(WriteError::CannotWrite { .. })), "{root:?}");
}

#[cfg(unix)]
#[test]
fn a_link_to_a_folder_stays_a_link_and_files_are_readable_as_the_system_grants() {
    use std::os::unix::fs::PermissionsExt as _;
    let here = tempfile::tempdir().expect("a folder");
    let real = here.path().join("real");
    fs::create_dir(&real).expect("a folder");
    let link = here.path().join("link");
    std::os::unix::fs::symlink(&real, &link).expect("a link");
    put(&link, false, "one").expect("written");
    assert!(fs::symlink_metadata(&link).expect("the link").is_symlink());
    assert_eq!(names(&real), ["charts/", "run.json", "summary.csv"]);
    let plain = here.path().join("plain");
    fs::write(&plain, "").expect("a file");
    let mode = |path: &Path| fs::metadata(path).expect("it").permissions().mode() & 0o777;
    assert_eq!(mode(&real.join("summary.csv")), mode(&plain), "not the rights of a temporary file");
    let folder = here.path().join("folder");
    fs::create_dir(&folder).expect("a folder");
    put(&here.path().join("fresh"), false, "x").expect("written");
    assert_eq!(mode(&here.path().join("fresh")), mode(&folder));
    fs::set_permissions(&real, fs::Permissions::from_mode(0o710)).expect("rights");
    put(&link, false, "two").expect("replaced");
    assert_eq!(mode(&real), 0o710, "a folder's rights are its owner's choice");
}
