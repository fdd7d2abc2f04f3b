//! Rates by stage and knees of sets whose members engage one after the other.

use crate::quantity::{MOST_STAGES, Quantity};
use crate::spring::Theory;
use crate::text::Table;
use crate::units::System;

use super::by_standard::Ruling;
use super::limits::{Requirement, read_limits_of};
use super::requirements::{read_class, read_one};
use super::terms::{RateTest, Window};

/// Reads `[requirements.rate]`, or `[[requirements.rate]]` by stages.
pub(super) fn read_rates(
    table: Table<'_>,
    units: System,
    ruling: &Ruling,
) -> Option<Vec<Requirement>> {
    if table.is_table("rate") {
        let rate = table.table("rate");
        for key in ["stage", "between"] {
            if rate.has(key) {
                rate.fault(
                    &rate.place(key),
                    format!("`{key}` stands in a rate without stages"),
                    "write [[requirements.rate]] with double brackets, one for each stage",
                );
                return None;
            }
        }
        return read_one(rate, Quantity::Rate, units.rate(), ruling).map(|one| vec![one]);
    }
    let mut rates: Vec<Requirement> = Vec::new();
    for rate in table.tables("rate") {
        let read = read_stage(rate, units, ruling)?;
        if rates.iter().any(|known| known.quantity == read.quantity) {
            rate.fault(
                &rate.place("stage"),
                "this stage has a rate already",
                "state each stage once",
            );
            return None;
        }
        rates.push(read);
    }
    rates.sort_by_key(|one| match one.quantity {
        Quantity::RateOf(stage) => stage,
        _ => 0,
    });
    Some(rates)
}

fn read_stage(rate: Table<'_>, units: System, ruling: &Ruling) -> Option<Requirement> {
    let help = "write stage = 1 and between = [140.0, 130.0], the longer length first";
    for key in ["stage", "between"] {
        if !rate.has(key) {
            rate.missing(key, help);
        }
    }
    let stage = numbered(rate, "stage")?;
    let lengths = rate.numbers("between");
    let [from, to] = lengths.as_slice() else {
        if rate.has("between") {
            rate.fault(
                &rate.place("between"),
                "`between` does not hold two lengths",
                help,
            );
        }
        return None;
    };
    if from.value <= to.value {
        rate.fault(
            &rate.place("between"),
            "the first length is not the longer one",
            "compression goes from the longer length to the shorter: between = [140.0, 130.0]",
        );
        return None;
    }
    let scale = units.length();
    let read = read_one(rate, Quantity::RateOf(stage), units.rate(), ruling)?;
    Some(Requirement {
        between: Some((from.value * scale, to.value * scale)),
        ..read
    })
}

/// Reads `[requirements.knee]`, or `[[requirements.knee]]` with a number: limits of a length, `at_length` the nominal one.
pub(super) fn read_knees(table: Table<'_>, units: System) -> Option<Vec<Requirement>> {
    let tables = if table.is_table("knee") {
        vec![table.table("knee")]
    } else {
        table.tables("knee")
    };
    let mut knees: Vec<Requirement> = Vec::new();
    for knee in tables {
        let number = if knee.has("number") {
            numbered(knee, "number")?
        } else {
            1
        };
        let quantity = Quantity::Knee(number);
        if knees.iter().any(|known| known.quantity == quantity) {
            knee.fault(
                &knee.span(),
                "this knee is required twice",
                "write number = 2 for the second knee",
            );
            return None;
        }
        let limits = read_limits_of(knee, "at_length", units.length());
        let class = read_class(knee);
        knees.push(Requirement {
            quantity,
            limits: limits?,
            class: class?,
            standard: None,
            between: None,
        });
    }
    Some(knees)
}

fn numbered(table: Table<'_>, key: &str) -> Option<u8> {
    let written = table.whole(key)?;
    let number = u8::try_from(written.value)
        .ok()
        .filter(|number| (1..=MOST_STAGES).contains(number));
    if number.is_none() {
        table.fault(
            &written.span,
            format!("`{key}` is {}, not 1 to {MOST_STAGES}", written.value),
            "stages and knees are counted from the free length on",
        );
    }
    number
}

/// Holds rates by stage, knees and the window against the stages the drawn springs have.
pub(super) fn check_stages(
    root: Table<'_>,
    requirements: &[Requirement],
    test: &RateTest,
    theory: &Theory,
    judged: bool,
) {
    let table = root.table("requirements");
    let stages = theory.stages.len();
    if stages > usize::from(MOST_STAGES) {
        let what = format!("the set has {stages} stages; at most {MOST_STAGES} are judged");
        root.fault(&root.place("spring"), what, "check the free lengths");
        return;
    }
    for one in requirements {
        let (key, number, most) = match one.quantity {
            Quantity::RateOf(stage) => ("rate", usize::from(stage), stages),
            Quantity::Knee(knee) => ("knee", usize::from(knee), stages - 1),
            _ => continue,
        };
        if number > most {
            let what = format!(
                "{} is required, but the drawn springs have {stages} {}",
                one.quantity.title(),
                if stages == 1 { "stage" } else { "stages" }
            );
            table.fault(
                &table.place(key),
                what,
                "check stage or number, and the free lengths of the members",
            );
            return;
        }
        if let Some(between) = one.between {
            check_between(table, theory, number, between);
        }
    }
    if stages > 1 {
        check_window(root, requirements, test, theory, judged);
    }
}

/// The window of a stage lies inside the stage.
fn check_between(table: Table<'_>, theory: &Theory, stage: usize, (from, to): (f64, f64)) {
    let begins = theory
        .stages
        .get(stage - 1)
        .map_or(0.0, |stage| stage.from.get());
    let ends = theory
        .stages
        .get(stage)
        .map_or(theory.smallest.get(), |next| next.from.get());
    if from >= begins || to <= ends {
        let what = format!("the lengths of stage {stage} do not lie inside it");
        let help = format!(
            "this stage runs from {begins:.3} mm to {ends:.3} mm; keep clear of both ends, where it is not straight"
        );
        table.fault(&table.place("rate"), what, help);
    }
}

/// A window lies on one side of every knee, and a plain rate has no meaning.
fn check_window(
    root: Table<'_>,
    requirements: &[Requirement],
    test: &RateTest,
    theory: &Theory,
    judged: bool,
) {
    let help = "write [[requirements.rate]] with stage and between for each stage that is judged";
    let table = root.table("requirements");
    if requirements
        .iter()
        .any(|one| one.quantity == Quantity::Rate)
    {
        table.fault(
            &table.place("rate"),
            "a rate is required of a set whose members engage one after the other",
            help,
        );
        return;
    }
    let by_stage = requirements
        .iter()
        .any(|one| matches!(one.quantity, Quantity::RateOf(_)));
    match test.window {
        Window::Lengths(from, to) => {
            let knees = theory.stages.iter().skip(1).map(|stage| stage.from.get());
            for knee in knees.filter(|knee| (to..=from).contains(knee)) {
                root.fault(
                    &root.table("rate_test").place("window"),
                    format!("the window has the knee at {knee:.3} mm inside"),
                    "a window lies on one side of a knee",
                );
            }
        }
        Window::FullLoad(..) | Window::Deflection(..) if judged && !by_stage => {
            root.fault(
                &root.place("spring"),
                "the members engage one after the other, and no rate says between which lengths it is fitted",
                help,
            );
        }
        Window::FullLoad(..) | Window::Deflection(..) => {}
    }
}
