//! A lot of many files: however many there are, reading them side by side needs no deeper stack.

use assert_cmd::Command;

use crate::speed;

#[test]
fn twelve_hundred_exports_are_judged() {
    let work = tempfile::tempdir().unwrap();
    speed::many_files(work.path(), 1200, 200).unwrap();
    let ran = Command::cargo_bin("coilassay")
        .unwrap()
        .args(["accept", "--json"])
        .arg(work.path().join("lot.toml"))
        .output()
        .unwrap();
    assert_eq!(
        ran.status.code(),
        Some(0),
        "{}",
        String::from_utf8_lossy(&ran.stderr)
    );
    let record: serde_json::Value = serde_json::from_slice(&ran.stdout).unwrap();
    assert_eq!(record["springs"].as_array().unwrap().len(), 1200);
}
