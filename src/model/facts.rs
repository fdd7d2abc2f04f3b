//! The facts of page one: lot, drawing, rig, plan.

use serde::Serialize;

use crate::quantity::Unit;
use crate::record::{AcceptRecord, ClassPlan, ConditionFacts, PlanFacts, RigFacts, WindowOf};
use crate::units::System;
use crate::wording;
use crate::wording::count;
use crate::wording::{ABSENT, Place, number, with_unit};

/// A named fact.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Fact {
    /// Name.
    pub name: String,
    /// Value.
    pub value: String,
}

/// Facts about one thing.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Facts {
    /// What they are about.
    pub title: String,
    /// The facts.
    pub rows: Vec<Fact>,
}

pub(crate) fn fact(name: &str, value: impl Into<String>) -> Fact {
    Fact {
        name: name.to_owned(),
        value: value.into(),
    }
}

pub(crate) fn stated(name: &str, value: Option<&String>) -> Option<Fact> {
    value.map(|value| fact(name, value.clone()))
}

/// `GV-118 rev. B`.
pub(crate) fn labelled(number: &str, revision: Option<&str>) -> String {
    revision.map_or_else(
        || number.to_owned(),
        |revision| format!("{number} rev. {revision}"),
    )
}

/// All facts of page one.
pub(crate) fn all(record: &AcceptRecord, show_in: System) -> Vec<Facts> {
    vec![
        lot(record),
        drawing(record, show_in),
        rig(record),
        plan(record),
    ]
}

fn lot(record: &AcceptRecord) -> Facts {
    let lot = &record.lot;
    let measured = u64::try_from(record.springs.len()).unwrap_or(u64::MAX);
    let mut rows = vec![
        fact("Lot", lot.number.clone()),
        fact("Size", count(lot.size, "spring")),
        fact("Measured", count(measured, "spring")),
    ];
    rows.extend(
        [
            stated("Supplier", lot.supplier.as_ref()),
            stated("Received", lot.received.as_ref()),
            stated("Inspector", lot.inspector.as_ref()),
            stated("Sample drawn", lot.sample_drawn.as_ref()),
            stated("Supplier’s values", lot.supplier_values.as_ref()),
        ]
        .into_iter()
        .flatten(),
    );
    rows.extend(conditions(&lot.conditions));
    rows.extend(
        lot.tags
            .iter()
            .map(|(name, value)| fact(name, value.clone())),
    );
    Facts {
        title: "Lot".to_owned(),
        rows,
    }
}

fn conditions(of: &ConditionFacts) -> [Fact; 2] {
    let temperature = of.temperature_c.map_or_else(
        || "not stated; ±5\u{a0}K about 20\u{a0}°C allowed for".to_owned(),
        |value| format!("{}\u{a0}°C", number(Some(value), 4)),
    );
    let recorded = of.presetting_recorded;
    let strokes = match of.presetting_strokes {
        Some(strokes) => format!("{strokes} before the recording, {recorded} in it"),
        None => format!("not stated; {recorded} in the recording"),
    };
    [
        fact("Temperature", temperature),
        fact("Presetting strokes", strokes),
    ]
}

fn drawing(record: &AcceptRecord, show_in: System) -> Facts {
    let drawing = &record.drawing;
    let window = &record.window;
    let unit = match window.of {
        WindowOf::Load => Unit::Newton,
        WindowOf::Deflection | WindowOf::Length | WindowOf::Travel => Unit::Millimetre,
    };
    let of = match window.of {
        WindowOf::Load => "load",
        WindowOf::Deflection | WindowOf::Travel => "deflection",
        WindowOf::Length => "length",
    };
    let bound = |value| with_unit(Some(value), unit, Place::Significant(4), show_in);
    let mut rows = vec![fact(
        "Drawing",
        labelled(&drawing.number, drawing.revision.as_deref()),
    )];
    rows.extend(stated("Title", drawing.title.as_ref()));
    let members: Vec<String> = record
        .theory
        .members
        .iter()
        .map(|member| format!("{}: {}", member.name, member.material))
        .collect();
    rows.push(fact(
        "Springs",
        if members.is_empty() {
            ABSENT.to_owned()
        } else {
            members.join("; ")
        },
    ));
    rows.push(fact(
        "Rate window",
        format!(
            "{} ({of} {} to {})",
            window.stated,
            bound(window.from),
            bound(window.to)
        ),
    ));
    rows.push(fact(
        "Stroke, method",
        format!("{}, {}", window.stroke, window.method),
    ));
    rows.push(fact("Decision rule", drawing.rule.clone()));
    Facts {
        title: "Drawing".to_owned(),
        rows,
    }
}

fn rig(record: &AcceptRecord) -> Facts {
    of_bench(&record.rig)
}

/// The rig and its calibration.
pub(crate) fn of_bench(rig: &RigFacts) -> Facts {
    let dates = |dates: &Option<String>| {
        dates
            .clone()
            .unwrap_or_else(|| "no dates stated".to_owned())
    };
    let mut rows = vec![
        fact("Rig", rig.name.clone()),
        fact("Force", rig.force.clone()),
        fact("Force calibrated", dates(&rig.force_calibrated)),
        fact("Travel", rig.travel.clone()),
        fact("Travel calibrated", dates(&rig.travel_calibrated)),
        fact("Frame compliance", rig.compliance.clone()),
        fact("Travel means", rig.travel_means.clone()),
    ];
    rows.extend(stated("Last passed check", rig.checked.as_ref()));
    Facts {
        title: "Rig and calibration".to_owned(),
        rows,
    }
}

fn plan(record: &AcceptRecord) -> Facts {
    let plan = &record.plan;
    let mut rows = vec![fact("By", plan.by.clone())];
    if plan.source.replace(' ', "-") != plan.by && !plan.source.is_empty() {
        rows.push(fact("Source", plan.source.clone()));
    }
    rows.extend(
        plan.state
            .as_ref()
            .map(|state| fact("State of inspection", wording::state(state))),
    );
    rows.extend(stated("Inspection level", plan.level.as_ref()));
    rows.extend(stated("Code letter", plan.code_letter.as_ref()));
    rows.push(fact("Sample size", count(plan.sample_size, "spring")));
    rows.extend(arrows(&plan.classes).map(|words| fact("Arrow of the table", words)));
    rows.extend(numbers(plan).map(|numbers| fact("Accept, reject", numbers)));
    let counted = record
        .springs
        .iter()
        .filter(|spring| spring.in_sample)
        .count();
    rows.push(fact(
        "Counted",
        count(u64::try_from(counted).unwrap_or(u64::MAX), "spring"),
    ));
    Facts {
        title: "Plan".to_owned(),
        rows,
    }
}

/// Where an arrow of the table led; one line for classes it led alike.
fn arrows(classes: &[ClassPlan]) -> Option<String> {
    let mut led: Vec<(String, Vec<String>)> = Vec::new();
    for class in classes {
        let (Some(code), Some(used)) = (&class.code_letter, &class.used_letter) else {
            continue;
        };
        if code == used {
            continue;
        }
        let words = format!(
            "letter {code} leads by the arrow to {used}: n {}",
            class.sample_size
        );
        let name = class.class.word().to_owned();
        match led.iter_mut().find(|known| known.0 == words) {
            Some(known) => known.1.push(name),
            None => led.push((words, vec![name])),
        }
    }
    let lines: Vec<String> = led
        .iter()
        .map(|(words, names)| {
            if names.len() == classes.len() {
                words.clone()
            } else {
                format!("{}: {words}", wording::list(names))
            }
        })
        .collect();
    (!lines.is_empty()).then(|| lines.join("; "))
}

/// `major Ac 1, Re 2; minor Ac 2, Re 3`; `None` where no class is counted.
fn numbers(plan: &PlanFacts) -> Option<String> {
    let classes: Vec<String> = plan
        .classes
        .iter()
        .map(|of| format!("{} Ac {}, Re {}", of.class.word(), of.accept, of.reject))
        .collect();
    (!classes.is_empty()).then(|| classes.join("; "))
}
