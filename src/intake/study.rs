//! The study file as opened: which measurements there are, and who measured which spring when.

use std::path::{Path, PathBuf};

use crate::drawing::read_units;
use crate::quantity::Quantity;
use crate::text::{Alphabet, Keys, Source, Table, printable, read_toml};

use super::exports::Export;
use super::open::{named_file, read_exports};
use super::parts::{Conditions, read_conditions};

/// The keys a study file may hold.
#[rustfmt::skip] // keeps the list a list
pub const STUDY_KEYS: Keys = &[
    ("", &["units", "rig", "exports", "names", "table", "drawing", "study", "load", "conditions"]),
    ("study", &["note"]),
    ("load", &["at_length"]),
    ("conditions", &["temperature", "presetting_strokes", "presetting_recorded"]),
];

/// The places a name may hold.
const PLACES: [&str; 3] = ["{part}", "{operator}", "{trial}"];

/// A pattern of the measurements' names, as `{part}-{operator}-{trial}`.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Names {
    pieces: Vec<Piece>,
}

#[derive(Clone, Debug, PartialEq, Eq)]
enum Piece {
    Place(usize),
    Letters(String),
}

/// Where a measurement belongs.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Belongs {
    /// The spring.
    pub part: String,
    /// The operator; empty where there is only one.
    pub operator: String,
    /// The trial.
    pub trial: String,
}

impl Names {
    /// Reads a pattern.
    ///
    /// # Errors
    /// In words, what is wrong with it.
    pub fn parse(pattern: &str) -> Result<Self, String> {
        let mut pieces = Vec::new();
        let mut rest = pattern;
        while !rest.is_empty() {
            let mut places = PLACES.iter().enumerate();
            if let Some((at, place)) = places.find(|(_, place)| rest.starts_with(**place)) {
                if pieces.contains(&Piece::Place(at)) {
                    return Err(format!("{place} stands twice in it"));
                }
                if matches!(pieces.last(), Some(Piece::Place(_))) {
                    let why = "two places stand side by side in it, with nothing between";
                    return Err(why.to_owned());
                }
                pieces.push(Piece::Place(at));
                rest = rest.strip_prefix(place).unwrap_or("");
                continue;
            }
            let next = PLACES.iter().filter_map(|place| rest.find(place)).min();
            let (letters, tail) = rest.split_at(next.unwrap_or(rest.len()));
            pieces.push(Piece::Letters(letters.to_owned()));
            rest = tail;
        }
        for (at, place) in PLACES.iter().enumerate().filter(|(at, _)| *at != 1) {
            if !pieces.contains(&Piece::Place(at)) {
                return Err(format!("it lacks {place}"));
            }
        }
        Ok(Self { pieces })
    }

    /// What a name says by this pattern; `None` where it does not fit, or fits in more than one way.
    pub fn read(&self, name: &str) -> Option<Belongs> {
        let mut found = [String::new(), String::new(), String::new()];
        let mut rest = name;
        let mut pieces = self.pieces.iter().peekable();
        while let Some(piece) = pieces.next() {
            match piece {
                Piece::Letters(letters) => rest = rest.strip_prefix(letters.as_str())?,
                Piece::Place(place) => {
                    let end = match pieces.peek() {
                        Some(Piece::Letters(letters)) => rest.find(letters.as_str())?,
                        _ => rest.len(),
                    };
                    let (value, tail) = rest.split_at(end);
                    if value.is_empty() || self.holds_mark(value) {
                        return None;
                    }
                    value.clone_into(found.get_mut(*place)?);
                    rest = tail;
                }
            }
        }
        let [part, operator, trial] = found;
        rest.is_empty().then_some(Belongs {
            part,
            operator,
            trial,
        })
    }

    /// Whether a value holds one of the marks that part places: then it could be read in two ways.
    fn holds_mark(&self, value: &str) -> bool {
        let inner = self.pieces.iter().enumerate();
        let between = inner.filter(|(at, _)| *at > 0 && at + 1 < self.pieces.len());
        between
            .filter_map(|(_, piece)| match piece {
                Piece::Letters(letters) => Some(letters),
                Piece::Place(_) => None,
            })
            .any(|letters| value.contains(letters.as_str()))
    }
}

/// Where it stands which measurement is whose.
#[derive(Clone, Debug)]
pub enum Assigned {
    /// In the measurements' names.
    Names(Names),
    /// In a table: path as written, and where it lies.
    Table((String, PathBuf)),
}

/// A study file, opened and free of faults.
#[derive(Clone, Debug)]
pub struct StudyFile {
    /// The file.
    pub source: Source,
    /// The rig file.
    pub rig: (String, PathBuf),
    /// The exports.
    pub exports: Vec<Export>,
    /// Which is whose.
    pub assigned: Assigned,
    /// The drawing whose requirements are studied.
    pub drawing: Option<(String, PathBuf)>,
    /// Loads that are studied where there is no drawing.
    pub loads: Vec<Quantity>,
    /// A note to print.
    pub note: Option<String>,
    /// Conditions.
    pub conditions: Conditions,
}

/// Opens the study file at `path`, written as `as_written`.
///
/// # Errors
/// A report of every fault in the file.
pub fn open_study(path: &Path, as_written: &str) -> miette::Result<StudyFile> {
    let source = Source::open(path, as_written)?;
    Ok(read_toml(&source, STUDY_KEYS, |root| read(root, &source))?)
}

fn read(root: Table<'_>, source: &Source) -> Option<StudyFile> {
    let units = read_units(root)?;
    let rig = named_file(root, "rig", source);
    let exports = read_exports(root, source);
    let assigned = read_assigned(root, source);
    let drawing = if root.has("drawing") {
        Some(named_file(root, "drawing", source)?)
    } else {
        None
    };
    let mut loads = Vec::new();
    for load in root.tables("load") {
        if !load.has("at_length") {
            load.missing("at_length", "write the length: at_length = 48.0");
        }
        let at = load.positive("at_length")?.value * units.length();
        loads.push(Quantity::LoadAt(at.try_into().ok()?));
    }
    if drawing.is_some() && !loads.is_empty() {
        root.fault(
            &root.place("load"),
            "loads are named here and by the drawing",
            "leave [[load]] out: the drawing says which loads are studied",
        );
    }
    Some(StudyFile {
        source: source.clone(),
        rig: rig?,
        exports: exports?,
        assigned: assigned?,
        drawing,
        loads,
        note: root.table("study").text("note"),
        conditions: read_conditions(root.table("conditions"))?,
    })
}

fn read_assigned(root: Table<'_>, source: &Source) -> Option<Assigned> {
    let help = "write names = \"{part}-{operator}-{trial}\" as the exports are named (without extension), or table = \"study.csv\" with the columns measurement, part, operator, trial";
    match (root.has("names"), root.has("table")) {
        (true, false) => {
            let pattern = root.raw_text("names")?;
            match Names::parse(&pattern.value) {
                Ok(names) => Some(Assigned::Names(names)),
                Err(why) => {
                    let shown = printable(&pattern.value, &Alphabet::Any);
                    root.fault(
                        &pattern.span,
                        format!("\"{shown}\" is no pattern of names: {why}"),
                        help,
                    );
                    None
                }
            }
        }
        (false, true) => named_file(root, "table", source).map(Assigned::Table),
        (true, true) => {
            let what = "which measurement is whose is said by names and by a table";
            root.fault(&root.place("table"), what, "keep one of them");
            None
        }
        (false, false) => {
            root.missing("names", help);
            None
        }
    }
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, reason = "tests")]
    use super::*;

    fn read(pattern: &str, name: &str) -> Option<(String, String, String)> {
        let belongs = Names::parse(pattern).unwrap().read(name)?;
        Some((belongs.part, belongs.operator, belongs.trial))
    }

    #[test]
    fn names_say_whose_a_measurement_is() {
        let three = |a: &str, b: &str, c: &str| Some((a.to_owned(), b.to_owned(), c.to_owned()));
        assert_eq!(
            read("{part}-{operator}-{trial}", "TG07-B-2"),
            three("TG07", "B", "2")
        );
        assert_eq!(
            read("study {operator} {part}_{trial}x", "study A 7_12x"),
            three("7", "A", "12")
        );
        assert_eq!(read("{part}_{trial}", "9_1"), three("9", "", "1"));
        // A name with more marks than places could be read in two ways.
        assert_eq!(read("{part}-{operator}-{trial}", "TG-07-B-2"), None);
        assert_eq!(read("{part}-{operator}-{trial}", "TG07-B"), None);
        assert_eq!(read("{part}-{operator}-{trial}", "TG07--2"), None);
        assert_eq!(read("{part}_{trial}x", "9_1y"), None);
    }

    #[test]
    fn what_is_no_pattern_is_said() {
        for (pattern, why) in [
            ("{part}-{operator}", "it lacks {trial}"),
            ("{trial}", "it lacks {part}"),
            (
                "{part}{trial}",
                "two places stand side by side in it, with nothing between",
            ),
            ("{part}-{part}-{trial}", "{part} stands twice in it"),
        ] {
            assert_eq!(Names::parse(pattern), Err(why.to_owned()));
        }
    }
}
