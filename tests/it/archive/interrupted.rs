//! Whole or not at all: killed at any instant, a full disk, two at once, folders that may not be written.

use std::fs;
use std::process::{Command, Stdio};
use std::time::{Duration, Instant};

use super::{files, keep, read, root, skipped, text, tool};
use crate::bad_input::Case;
use crate::folder::held;

const KILLS: u64 = 200;

fn begun(case: &Case, words: &[&str]) -> Command {
    let mut command = Command::new(env!("CARGO_BIN_EXE_coilassay"));
    command
        .current_dir(case.dir.path())
        .args([
            "accept",
            "lot/lot.toml",
            "--quiet",
            "--date",
            "2026-12-05",
            "--archive",
        ])
        .args(words)
        .stdout(Stdio::null())
        .stderr(Stdio::piped());
    command
}

/// Instants spread over a run and a little beyond, in an order with no pattern (a linear congruential generator, seed 1).
#[test]
fn killed_at_200_instants_only_the_unfinished_run_is_lost() {
    let case = Case::of("undecided");
    assert_eq!(keep(&case).code, Some(3));
    let archive = root(&case);
    let start = Instant::now();
    assert_eq!(begun(&case, &["archive"]).status().unwrap().code(), Some(3));
    let whole = start.elapsed();
    let (mut known, mut state, mut killed) = (2, 1_u64, 0);
    for _ in 0..KILLS {
        state = state
            .wrapping_mul(6_364_136_223_846_793_005)
            .wrapping_add(1_442_695_040_888_963_407);
        let share = f64::from(u32::try_from(state >> 40).unwrap()) / f64::from(1 << 24);
        let mut child = begun(&case, &["archive"]).spawn().unwrap();
        std::thread::sleep(whole.mul_f64(1.2 * share));
        child.kill().unwrap();
        let finished = child.wait().unwrap().code();
        killed += u32::from(finished.is_none());
        let found = read(&archive);
        assert!(found.unreadable.is_empty(), "{:?}", found.unreadable);
        let now = found.runs.len();
        assert!(
            now == known || now == known + 1,
            "{known} runs became {now}"
        );
        assert!(
            finished.is_none() || now == known + 1,
            "a finished run is not there"
        );
        known = now;
    }
    assert!(killed > 20, "only {killed} of {KILLS} were killed");
    let numbers: Vec<i64> = read(&archive)
        .runs
        .iter()
        .map(|run| run.run.number)
        .collect();
    let expected: Vec<i64> = (1..=i64::try_from(known).unwrap()).collect();
    assert_eq!(
        numbers, expected,
        "every run takes the place of the one before"
    );
    let checked = tool(&case, &["recheck", "archive"]);
    assert_eq!(checked.code, Some(0), "{}{}", text(&checked), checked.err);
    assert!(text(&checked).contains(&format!("{known} same, 0 different, 0 could not")));
}

#[test]
fn a_killed_first_run_leaves_a_folder_that_can_be_begun_again() {
    let case = Case::of("undecided");
    fs::create_dir_all(root(&case).join("staging")).unwrap();
    fs::write(root(&case).join("staging/archive.json-1"), "{\"tool\"").unwrap();
    assert_eq!(keep(&case).code, Some(3));
    assert_eq!(files(&root(&case), "springs").len(), 1);
}

#[test]
fn eight_processes_write_at_once() {
    let case = Case::of("undecided");
    let children: Vec<_> = (0..8)
        .map(|_| begun(&case, &["archive"]).spawn().unwrap())
        .collect();
    for child in children {
        let output = child.wait_with_output().unwrap();
        let err = String::from_utf8(output.stderr).unwrap();
        assert_eq!(output.status.code(), Some(3), "{err}");
    }
    let found = read(&root(&case));
    assert_eq!((found.runs.len(), found.unreadable.len()), (8, 0));
    assert_eq!(coilassay::archive::latest(found.runs).len(), 1);
    assert_eq!(tool(&case, &["recheck", "archive"]).code, Some(0));
}

/// A limit on the size of files stands in for a full disk: the write fails in the middle.
#[test]
fn a_disk_that_fills_up_leaves_the_archive_as_it_was() {
    let case = Case::of("undecided");
    assert_eq!(keep(&case).code, Some(3));
    let before = held(&root(&case));
    let script = "ulimit -f 8; trap '' XFSZ; exec \"$0\" accept lot/lot.toml --archive archive";
    let output = Command::new("sh")
        .current_dir(case.dir.path())
        .args(["-c", script, env!("CARGO_BIN_EXE_coilassay")])
        .output()
        .unwrap();
    let err = String::from_utf8(output.stderr).unwrap();
    assert_eq!(
        (output.status.code(), output.stdout.len()),
        (Some(2), 0),
        "{err}"
    );
    assert!(
        err.contains("cannot write") && err.contains("the archive is as it was"),
        "{err}"
    );
    assert_eq!(held(&root(&case)), before);
}

/// Another disk in the place of one tree: a link to a file system in memory, where there is one.
#[test]
fn a_tree_on_another_disk_is_refused_by_name() {
    let case = Case::of("undecided");
    let memory = tempfile::Builder::new()
        .prefix("coilassay-test-")
        .tempdir_in("/dev/shm");
    let Ok(memory) = memory else {
        skipped("there is no /dev/shm here");
        return;
    };
    for tree in ["records", "springs"] {
        let archive = root(&case);
        assert_eq!(keep(&case).code, Some(3));
        for tree in ["records", "curves", "springs"] {
            fs::remove_dir_all(archive.join(tree)).unwrap();
        }
        std::os::unix::fs::symlink(memory.path(), archive.join(tree)).unwrap();
        let before = held(&archive);
        let ran = keep(&case);
        if ran.code == Some(3) {
            skipped("/dev/shm is no other disk here");
            return;
        }
        assert_eq!((ran.code, ran.out.len()), (Some(2), 0));
        assert!(ran.err.contains("lies on another disk"), "{}", ran.err);
        assert_eq!(held(&archive), before, "{tree}");
        fs::remove_dir_all(&archive).unwrap();
    }
}

/// A file where the folder should be stands in for a folder that may not be written: tests may run as root, who may all.
#[test]
fn an_archive_that_cannot_be_written_is_a_fault_before_anything_is_judged() {
    let case = Case::of("undecided");
    case.set("../file", "x");
    for place in ["file", "file/archive"] {
        let ran = case.run(&["--archive", place]);
        assert_eq!((ran.code, ran.out.len()), (Some(2), 0), "{place}");
        assert!(ran.err.contains("help:"), "{}", ran.err);
    }
    let locked = root(&case);
    fs::create_dir_all(&locked).unwrap();
    let mut rights = fs::metadata(&locked).unwrap().permissions();
    rights.set_readonly(true);
    fs::set_permissions(&locked, rights).unwrap();
    let may_all = fs::write(locked.join("staging"), "").is_ok();
    if may_all {
        skipped("this user may write read-only folders");
        return;
    }
    let ran = keep(&case);
    assert_eq!((ran.code, ran.out.len()), (Some(2), 0));
    assert!(ran.err.contains("cannot write"), "{}", ran.err);
}

#[test]
fn stale_staging_goes_and_fresh_staging_stays() {
    let case = Case::of("undecided");
    assert_eq!(keep(&case).code, Some(3));
    let staging = root(&case).join("staging");
    for (name, hours) in [("old", 25), ("young", 23)] {
        fs::create_dir(staging.join(name)).unwrap();
        fs::write(staging.join(name).join("springs.parquet"), "half").unwrap();
        let changed = std::time::SystemTime::now() - Duration::from_hours(hours);
        fs::File::open(staging.join(name))
            .unwrap()
            .set_modified(changed)
            .unwrap();
    }
    assert_eq!(keep(&case).code, Some(3));
    assert_eq!(crate::folder::names(&staging), ["young"]);
}
