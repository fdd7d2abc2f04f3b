//! Writing interrupted: a full disk, a kill at any instant. Never half a result.

use std::fs;
use std::io::Write;
use std::process::{Command, Stdio};
use std::time::Duration;

use crate::bad_input::Case;
use crate::folder::{QUICK, held, names, whole};

/// A limit on the size of files stands in for a full disk: the write fails in the middle.
#[test]
fn a_disk_that_fills_up_leaves_the_older_result() {
    let case = Case::of("undecided");
    assert_eq!(case.run(&QUICK).code, Some(3));
    let before = held(&case.path("../out"));
    let script = "ulimit -f 8; trap '' XFSZ; exec \"$0\" accept lot/lot.toml --date 2026-12-05 --no-report --out \"$1\"";
    for place in ["out", "fresh"] {
        let output = Command::new("sh")
            .current_dir(case.dir.path())
            .args(["-c", script, env!("CARGO_BIN_EXE_coilassay"), place])
            .output()
            .unwrap();
        let err = String::from_utf8(output.stderr).unwrap();
        assert_eq!(
            (output.status.code(), output.stdout.len()),
            (Some(2), 0),
            "{err}"
        );
        assert!(
            err.contains("cannot write") && err.contains("help:"),
            "{err}"
        );
    }
    assert_eq!(held(&case.path("../out")), before);
    assert_eq!(
        names(case.dir.path()),
        ["lot", "out"],
        "no staging folder left"
    );
}

#[test]
fn a_full_tmpfs_leaves_nothing() {
    let case = Case::of("undecided");
    let small = case.path("../small");
    fs::create_dir(&small).unwrap();
    let mount = Command::new("mount")
        .args(["-t", "tmpfs", "-o", "size=24k", "tmpfs"])
        .arg(&small)
        .output();
    if !mount.is_ok_and(|output| output.status.success()) {
        writeln!(std::io::stderr(), "skipped: no tmpfs may be mounted here").unwrap();
        return;
    }
    let ran = case.run(&["--no-report", "--out", "small/out"]);
    let left = names(&small);
    Command::new("umount").arg(&small).output().unwrap();
    assert_eq!((ran.code, ran.out.len()), (Some(2), 0), "{}", ran.err);
    assert!(ran.err.contains("cannot write"), "{}", ran.err);
    assert!(left.is_empty(), "{left:?}");
}

/// Killed at any instant, the folder is the whole older or the whole newer result; between the two renames it may be
/// absent, the older one then lies whole in the hidden staging folder. The waits close in on the end of a run, where the
/// folder is moved.
#[test]
fn killed_at_any_instant_no_half_result_is_left() {
    let case = Case::of("undecided");
    case.run(&QUICK);
    let mut wait = Duration::ZERO;
    let (mut killed, mut done) = (0, 0);
    for step in 0..60_u32 {
        let date = format!("2026-11-{:02}", 1 + step % 28);
        let mut child = Command::new(env!("CARGO_BIN_EXE_coilassay"))
            .current_dir(case.dir.path())
            .args([
                "accept",
                "lot/lot.toml",
                "--no-report",
                "--out",
                "out",
                "--date",
                &date,
            ])
            .stdout(Stdio::null())
            .stderr(Stdio::null())
            .spawn()
            .unwrap();
        std::thread::sleep(wait);
        child.kill().unwrap();
        if let Some(code) = child.wait().unwrap().code() {
            assert_eq!(code, 3);
            done += 1;
            wait = wait.mul_f64(0.9);
        } else {
            killed += 1;
            wait = wait.mul_f64(1.15) + Duration::from_micros(200);
        }
        let out = case.path("../out");
        if out.exists() {
            whole(&out);
        } else {
            let hidden = names(case.dir.path())
                .into_iter()
                .filter(|name| name.starts_with(".coilassay-"));
            let older = hidden
                .map(|name| case.path("..").join(name).join("older"))
                .find(|path| path.exists());
            let older = older.unwrap();
            whole(&older);
            fs::rename(older, &out).unwrap();
        }
        for name in names(case.dir.path())
            .into_iter()
            .filter(|name| name.starts_with('.'))
        {
            fs::remove_dir_all(case.path("..").join(name)).unwrap();
        }
    }
    assert!(killed > 0, "{done} done, none killed");
}
