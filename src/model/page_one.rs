//! The decision, the notes, the plan and the requirements.

use serde::Serialize;

use super::facts::labelled;
use super::named;
use super::table::{Cell, Column, Row, Table};
use crate::quantity::Unit;
use crate::record::{AcceptRecord, Decision, Reason, RequirementFacts, Verdict, find};
use crate::units::{Finite, System};
use crate::wording;
use crate::wording::{ABSENT, Place, figure, unit_symbol};

/// The decision and why.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Deciding {
    /// `accepted`, `rejected`, `undecided`.
    pub code: &'static str,
    /// The word, large.
    pub word: &'static str,
    /// How many springs conform, fail, are undecided.
    pub counts: String,
    /// The grounds.
    pub why: Vec<String>,
    /// Failing and undecided springs of the sample by name, and what was seen.
    pub springs: Vec<String>,
    /// What simple acceptance would have said.
    pub simple: String,
    /// The rule, and how undecided springs count.
    pub terms: Vec<String>,
}

/// A labelled note.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Note {
    /// Label.
    pub label: String,
    /// Text.
    pub text: String,
}

/// What was inspected, in one line.
pub(crate) fn subject(record: &AcceptRecord) -> String {
    let drawing = &record.drawing;
    let label = labelled(&drawing.number, drawing.revision.as_deref());
    match &drawing.title {
        Some(title) => format!("{title}, drawing {label}, lot {}", record.lot.number),
        None => format!("Drawing {label}, lot {}", record.lot.number),
    }
}

/// How many of the springs have a verdict.
pub(crate) fn with_verdict(record: &AcceptRecord, verdict: Verdict) -> usize {
    record
        .springs
        .iter()
        .filter(|spring| spring.verdict == verdict)
        .count()
}

/// The decision.
pub(crate) fn deciding(record: &AcceptRecord, show_in: System) -> Deciding {
    let of = |verdict| with_verdict(record, verdict);
    Deciding {
        code: wording::decided(record.decision),
        word: wording::decision_word(record.decision),
        counts: format!(
            "Of {} measured {} conform, {} fail, {} undecided.",
            wording::count(
                u64::try_from(record.springs.len()).unwrap_or(u64::MAX),
                "spring"
            ),
            of(Verdict::Conforms),
            of(Verdict::Fails),
            of(Verdict::Undecided)
        ),
        why: why(record),
        springs: named::lines(record, show_in),
        simple: wording::simple_line(record),
        terms: wording::terms(&record.drawing),
    }
}

/// The grounds, and that springs still missing change nothing where that is so.
fn why(record: &AcceptRecord) -> Vec<String> {
    let classes = record.plan.classes.iter();
    let early = classes.filter_map(wording::settled_early);
    record
        .reasons
        .iter()
        .map(wording::why)
        .chain(early)
        .collect()
}

/// The lot's note, the concession, what was not inspected.
pub(crate) fn notes(record: &AcceptRecord) -> Vec<Note> {
    let note = |label: &str, text: &str| Note {
        label: label.to_owned(),
        text: text.to_owned(),
    };
    let lot = &record.lot;
    let mut notes = Vec::new();
    notes.extend(lot.note.as_deref().map(|text| note("Note", text)));
    notes.extend(
        lot.concession
            .as_deref()
            .map(|text| note("Concession (does not change the decision)", text)),
    );
    if !lot.not_inspected.is_empty() {
        notes.push(note("Not inspected", &lot.not_inspected.join("; ")));
    }
    if record.decision == Decision::Undecided && with_verdict(record, Verdict::Undecided) > 0 {
        let text = if record.plan.settling.is_empty() {
            "The table of the springs says for each undecided spring what would settle it."
        } else {
            "See the part “What would settle it”; the table of the springs has the advice for each one."
        };
        notes.push(note("What would settle it", text));
    }
    notes
}

/// The requirements with limits, counts and what was measured.
pub(crate) fn requirements(record: &AcceptRecord, show_in: System) -> Table {
    let columns = vec![
        Column::words("Requirement"),
        Column::figures("Conform", ""),
        Column::figures("Fail", ""),
        Column::figures("Undecided", ""),
        Column::words("Unit"),
        Column::words("Class"),
        Column::figures("Nominal", ""),
        Column::figures("Lower", ""),
        Column::figures("Upper", ""),
        Column::figures("Mean", ""),
        Column::figures("s", ""),
        Column::figures("Smallest", ""),
        Column::figures("Largest", ""),
        Column::figures("Largest U", ""),
    ];
    let rows = record
        .drawing
        .requirements
        .iter()
        .map(|of| requirement(of, not_inspected(record, of), show_in));
    let mut table = Table::new(
        "Requirements, and what was measured",
        columns,
        rows.collect(),
    );
    "Lower, upper: the limits of the drawing. Mean, s, smallest, largest: of the measured values. U: expanded uncertainty, 95.45 %."
        .clone_into(&mut table.note);
    table
}

/// Whether the lot file says that this requirement was not inspected.
fn not_inspected(record: &AcceptRecord, of: &RequirementFacts) -> bool {
    let key = (of.name.clone(), of.at_length_mm);
    let found = record
        .springs
        .iter()
        .filter_map(|spring| find(spring, &key));
    found
        .map(|one| &one.reason)
        .any(|reason| *reason == Some(Reason::NotInspected))
}

/// Springs that conform, fail, are undecided.
fn counts(of: &RequirementFacts, left_out: bool) -> [Cell; 3] {
    if left_out {
        return ["not inspected", ABSENT, ABSENT].map(Cell::from);
    }
    let emphasised = |number: u32, verdict: Verdict| {
        if number == 0 {
            Cell::from("0")
        } else {
            Cell::marked(number.to_string(), verdict)
        }
    };
    [
        of.conforming.to_string().into(),
        emphasised(of.failing, Verdict::Fails),
        emphasised(of.undecided, Verdict::Undecided),
    ]
}

fn requirement(of: &RequirementFacts, left_out: bool, show_in: System) -> Row {
    let unit: Unit = of.unit;
    let stated = |value: Option<Finite>| figure(value, unit, Place::Stated, show_in);
    let place = Place::Uncertainty(of.largest_expanded_uncertainty);
    let measured = |value: Option<Finite>| figure(value, unit, place, show_in);
    let [conform, fail, undecided] = counts(of, left_out);
    let name = wording::characteristic(&of.name, of.at_length_mm, show_in);
    Row::from([
        wording::sentence(&name).into(),
        conform,
        fail,
        undecided,
        unit_symbol(unit, show_in).into(),
        of.class.word().into(),
        stated(of.nominal).into(),
        stated(of.lower).into(),
        stated(of.upper).into(),
        measured(of.mean).into(),
        measured(of.standard_deviation).into(),
        measured(of.smallest).into(),
        measured(of.largest).into(),
        measured(of.largest_expanded_uncertainty).into(),
    ])
}
