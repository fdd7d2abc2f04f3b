//! Starter files: they pass `expect` and `accept` as they stand, and every line they offer may be put into force.

use assert_cmd::Command;
use std::path::Path;

use crate::bad_input::Case;

fn run(words: &[&str], folder: &Path) -> (Option<i32>, String, String) {
    let output = Command::cargo_bin("coilassay")
        .unwrap()
        .current_dir(folder)
        .args(words)
        .output()
        .unwrap();
    let text = |bytes: Vec<u8>| String::from_utf8(bytes).unwrap();
    (
        output.status.code(),
        text(output.stdout),
        text(output.stderr),
    )
}

#[test]
fn the_drafts_pass_on_the_sample() {
    let case = Case::of("accepted");
    let folder = case.path("");
    for (kind, file) in [("drawing", "drawing.toml"), ("lot", "draft-lot.toml")] {
        let (code, out, fault) = run(&["draft", kind, file], &folder);
        assert_eq!((code, out.as_str()), (Some(0), ""), "{fault}");
        let (_, shown, _) = run(&["draft", kind], &folder);
        assert_eq!(shown, case.text(file), "stdout and file differ");
        let (code, _, fault) = run(&["draft", kind, file], &folder);
        assert_eq!(code, Some(2), "a draft replaced a file");
        assert!(
            fault.contains(file) && fault.contains("not there yet"),
            "{fault}"
        );
    }
    let (code, out, fault) = run(&["expect", "drawing.toml"], &folder);
    assert_eq!(code, Some(0), "{out}{fault}");
    let (code, _, fault) = run(
        &["accept", "draft-lot.toml", "--date", "2026-12-01"],
        &folder,
    );
    assert_eq!(code, Some(0), "{fault}");
}

/// Each line offered after `# `, put into force alone, is read without a fault.
#[test]
fn every_line_offered_may_be_put_into_force() {
    let case = Case::of("accepted");
    let folder = case.path("");
    let draft = |kind| run(&["draft", kind], &folder).1;
    std::fs::write(
        folder.join("our-materials.toml"),
        "[[material]]\nname = \"x\"\nshear_modulus = 80000\nsource = \"y\"\n",
    )
    .unwrap();
    let drawing = draft("drawing");
    let mut tried = 0;
    for (number, line) in drawing.lines().enumerate() {
        let Some(offered) = line.strip_prefix("# ").filter(|line| key(line)) else {
            continue;
        };
        let changed: Vec<&str> = drawing
            .lines()
            .enumerate()
            .map(|(at, line)| if at == number { offered } else { line })
            .collect();
        case.set("changed.toml", changed.join("\n"));
        let (code, out, fault) = run(&["expect", "changed.toml"], &folder);
        assert!(code == Some(0), "{offered}: {out}{fault}");
        tried += 1;
    }
    assert!(tried > 15, "{tried}");
    case.set("drawing.toml", drawing);
    // Blocks of the lot belong together: all at once.
    let lot = draft("lot").replace("# [", "[");
    let whole: Vec<&str> = lot
        .lines()
        .map(|line| {
            line.strip_prefix("# ")
                .filter(|line| key(line))
                .unwrap_or(line)
        })
        .collect();
    let text = whole
        .join("\n")
        .replace("    [", "[")
        .replace("sample = [\"TG-01\", \"TG-02\"]", "");
    case.set("again/TG-07.csv", case.text("springs/TG-07.csv"));
    case.set("lot-2.toml", text);
    let (code, _, fault) = run(&["accept", "lot-2.toml", "--date", "2026-12-01"], &folder);
    assert_eq!(
        code,
        Some(2),
        "the repeat is a copy of the first measurement"
    );
    assert!(
        !fault.contains("unknown key") && fault.contains("again/TG-07.csv"),
        "{fault}"
    );
}

/// Whether a line is a key with its value.
fn key(line: &str) -> bool {
    let name = line.split(" = ").next().unwrap();
    line.contains(" = ")
        && name
            .chars()
            .all(|letter| letter.is_ascii_lowercase() || letter == '_')
}
