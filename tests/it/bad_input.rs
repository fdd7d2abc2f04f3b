//! A sample copied and spoilt, for the `bad_input_*` files and `folder`; and what a refusal must look like.
//! Every bad input must end with status 2, name file, line and column where it has them, say what to do, and write nothing.

use std::fmt::Write;
use std::fs;
use std::path::{Path, PathBuf};

use assert_cmd::Command;
use tempfile::TempDir;

/// A sample, copied to be spoilt.
pub(crate) struct Case {
    pub(crate) dir: TempDir,
}

/// What a run left.
pub(crate) struct Ran {
    pub(crate) code: Option<i32>,
    pub(crate) out: Vec<u8>,
    pub(crate) err: String,
}

/// A row of the `accepted` sample: time, length, load.
pub(crate) type Row = (f64, f64, f64);

/// A case by name, what spoils it, and what the fault must say.
pub(crate) type Spoilt = (&'static str, fn(&Case), &'static [&'static str]);

pub(crate) fn copy(from: &Path, to: &Path) {
    fs::create_dir_all(to).unwrap();
    for entry in fs::read_dir(from).unwrap() {
        let entry = entry.unwrap();
        let place = to.join(entry.file_name());
        if entry.file_type().unwrap().is_dir() {
            copy(&entry.path(), &place);
        } else {
            fs::copy(entry.path(), place).unwrap();
        }
    }
}

impl Case {
    /// The sample `name`, in `lot/` of a temporary folder.
    pub(crate) fn of(name: &str) -> Self {
        let dir = tempfile::tempdir().unwrap();
        let sample = Path::new(env!("CARGO_MANIFEST_DIR"))
            .join("samples")
            .join(name);
        copy(&sample, &dir.path().join("lot"));
        Self { dir }
    }

    pub(crate) fn path(&self, file: &str) -> PathBuf {
        self.dir.path().join("lot").join(file)
    }

    pub(crate) fn text(&self, file: &str) -> String {
        fs::read_to_string(self.path(file)).unwrap()
    }

    pub(crate) fn set(&self, file: &str, text: impl AsRef<[u8]>) {
        let path = self.path(file);
        fs::create_dir_all(path.parent().unwrap()).unwrap();
        fs::write(path, text).unwrap();
    }

    /// Every `from` in a file becomes `to`; there must be one.
    pub(crate) fn sub(&self, file: &str, from: &str, to: &str) {
        let text = self.text(file);
        assert!(text.contains(from), "{file} has no {from}");
        self.set(file, text.replace(from, to));
    }

    /// Text in front of the lot file, where its top-level keys stand.
    pub(crate) fn top(&self, text: &str) {
        self.set("lot.toml", format!("{text}\n{}", self.text("lot.toml")));
    }

    /// Text at the end of the lot file.
    pub(crate) fn end(&self, text: &str) {
        self.set("lot.toml", format!("{}\n{text}\n", self.text("lot.toml")));
    }

    /// Lines from the one that begins with `from` up to the one that begins with `to`, taken out of a file.
    pub(crate) fn cut(&self, file: &str, from: &str, to: &str) {
        let text = self.text(file);
        let start = text.find(from).unwrap();
        let end = start + text[start..].find(to).unwrap();
        self.set(file, format!("{}{}", &text[..start], &text[end..]));
    }

    /// The exports of the `accepted` sample, row by row.
    pub(crate) fn rows(&self, change: impl Fn(Vec<Row>) -> Vec<Row>) {
        for spring in 1..=20 {
            let file = format!("springs/TG-{spring:02}.csv");
            let text = self.text(&file);
            let mut lines = text.lines();
            let mut out = lines.next().unwrap().to_owned() + "\n";
            let row = |line: &str| {
                let cells: Vec<f64> = line.split(',').map(|cell| cell.parse().unwrap()).collect();
                (cells[0], cells[1], cells[2])
            };
            for (time, length, load) in change(lines.map(row).collect()) {
                writeln!(out, "{time:.2},{length:.4},{load:.4}").unwrap();
            }
            self.set(&file, out);
        }
    }

    /// The loads of the `accepted` sample, each times `factor`.
    pub(crate) fn loads(&self, factor: f64) {
        self.rows(|rows| {
            rows.into_iter()
                .map(|row| (row.0, row.1, row.2 * factor))
                .collect()
        });
    }

    pub(crate) fn command(&self) -> Command {
        let mut command = Command::cargo_bin("coilassay").unwrap();
        command.current_dir(self.dir.path());
        command.args(["accept", "lot/lot.toml"]);
        command
    }

    pub(crate) fn run(&self, flags: &[&str]) -> Ran {
        let mut command = self.command();
        if !flags.contains(&"--date") {
            command.args(["--date", "2026-12-01"]);
        }
        let output = command.args(flags).output().unwrap();
        Ran {
            code: output.status.code(),
            out: output.stdout,
            err: String::from_utf8(output.stderr).unwrap(),
        }
    }

    /// The result, where the lot was judged.
    pub(crate) fn judged(&self, flags: &[&str]) -> (Option<i32>, serde_json::Value) {
        let ran = self.run(&[&["--json"], flags].concat());
        assert_ne!(ran.code, Some(2), "{}", ran.err);
        (ran.code, serde_json::from_slice(&ran.out).unwrap())
    }
}

/// A fault as one string without blanks and frames, so that line breaks do not matter.
pub(crate) fn squeezed(text: &str) -> String {
    text.chars()
        .filter(|c| !c.is_whitespace() && *c != '│')
        .collect()
}

/// What is wrong with the refusal of a spoilt sample: nothing, if all is as promised.
pub(crate) fn missed(sample: &str, (name, spoil, wanted): &Spoilt) -> Vec<String> {
    let case = Case::of(sample);
    spoil(&case);
    let ran = case.run(&["--json", "--no-report", "--out", "out"]);
    let said = squeezed(&ran.err);
    let mut misses = Vec::new();
    let mut miss = |what: String| misses.push(format!("{name}: {what}\n{}", ran.err));
    if ran.code != Some(2) {
        miss(format!("status {:?} instead of 2", ran.code));
    }
    if !ran.out.is_empty() {
        miss("something on stdout".to_owned());
    }
    let left = fs::read_dir(case.dir.path()).unwrap().count();
    if left != 1 {
        miss("something was written".to_owned());
    }
    if ran.err.contains('\u{1b}') || ran.err.contains('\u{202e}') {
        miss("a control character reached the terminal".to_owned());
    }
    for one in *wanted {
        if !said.contains(&squeezed(one)) {
            miss(format!("does not say `{one}`"));
        }
    }
    misses
}

pub(crate) fn all_refused(sample: &str, cases: &[Spoilt]) {
    let misses: Vec<String> = cases.iter().flat_map(|case| missed(sample, case)).collect();
    assert!(
        misses.is_empty(),
        "{} of {}:\n{}",
        misses.len(),
        cases.len(),
        misses.join("\n")
    );
}

/// The lot is refused, or not accepted, or one of the `named` cautions stands there.
pub(crate) fn not_silent(what: &str, case: &Case, named: &[&str]) -> Result<(), String> {
    let ran = case.run(&["--json"]);
    if ran.code != Some(0) {
        return Ok(());
    }
    let result: serde_json::Value = serde_json::from_slice(&ran.out).unwrap();
    let cautions = result["cautions"].to_string();
    if named.iter().any(|code| cautions.contains(code)) {
        return Ok(());
    }
    Err(format!("{what}: accepted, cautions {cautions}"))
}
