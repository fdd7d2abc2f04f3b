//! Reads what the drawing requires, and holds it against the rest of the drawing.

use crate::quantity::{Class, Quantity};
use crate::spring::Arrangement;
use crate::text::Table;
use crate::units::System;

use super::by_standard::Ruling;
use super::limits::{CLASSES, Requirement, read_limits};
use super::stages::{read_knees, read_rates};
use super::terms::{Acceptance, Aqls, PlanTerms, RateTest, Window};

/// The quantities stated under their own name, in the order they are judged and printed after the rate and loads.
const PLAIN: [Quantity; 10] = [
    Quantity::FreeLength,
    Quantity::SolidLength,
    Quantity::Hysteresis,
    Quantity::Set,
    Quantity::Straightness,
    Quantity::OutsideDiameter,
    Quantity::InsideDiameter,
    Quantity::WireDiameter,
    Quantity::Squareness,
    Quantity::Parallelism,
];

/// Reads `[requirements]`: rates first, knees, loads from the longest length down, then the others.
pub(super) fn read_requirements(
    table: Table<'_>,
    units: System,
    arrangement: Option<Arrangement>,
    ruling: &Ruling,
) -> Option<Vec<Requirement>> {
    let mut requirements = Vec::new();
    requirements.extend(read_rates(table, units, ruling)?);
    requirements.extend(read_knees(table, units)?);
    let mut loads = Vec::new();
    for load in table.tables("load") {
        loads.push(read_load(load, units, ruling)?);
    }
    loads.sort_by(|a, b| length_of(b).total_cmp(&length_of(a)));
    for pair in loads.windows(2) {
        if let [a, b] = pair
            && (length_of(a) - length_of(b)).abs() < 1e-9
        {
            table.fault(
                &table.place("load"),
                format!("two loads are required at {} mm", length_of(a)),
                "state each test length once",
            );
            return None;
        }
    }
    requirements.extend(loads);
    for quantity in PLAIN {
        if !table.has(quantity.name()) {
            continue;
        }
        let several = matches!(
            arrangement,
            Some(Arrangement::Nested | Arrangement::Stacked)
        );
        if quantity.by_caliper() && several {
            let what = format!(
                "a {} is that of one spring, and this drawing has several",
                quantity.title()
            );
            table.fault(
                &table.place(quantity.name()),
                what,
                "judge the members on drawings of their own",
            );
            return None;
        }
        let scale = match quantity {
            Quantity::Hysteresis | Quantity::Straightness => 1.0,
            _ => units.length(),
        };
        requirements.push(read_one(
            table.table(quantity.name()),
            quantity,
            scale,
            ruling,
        )?);
    }
    Some(requirements)
}

fn length_of(requirement: &Requirement) -> f64 {
    requirement
        .quantity
        .at_length()
        .map_or(0.0, crate::units::Millimetres::get)
}

fn read_load(table: Table<'_>, units: System, ruling: &Ruling) -> Option<Requirement> {
    if !table.has("at_length") {
        table.missing("at_length", "write the test length: at_length = 48.0");
    }
    let length = table.positive("at_length")?.value * units.length();
    read_one(
        table,
        Quantity::LoadAt(length.try_into().ok()?),
        units.force(),
        ruling,
    )
}

pub(super) fn read_one(
    table: Table<'_>,
    quantity: Quantity,
    scale: f64,
    ruling: &Ruling,
) -> Option<Requirement> {
    let (limits, standard) = if ruling.rules(table) {
        ruling
            .limits(table, quantity, scale)
            .map_or((None, None), |(limits, words)| (Some(limits), Some(words)))
    } else {
        (read_limits(table, scale), None)
    };
    let class = read_class(table);
    Some(Requirement {
        quantity,
        limits: limits?,
        class: class?,
        standard,
        between: None,
    })
}

/// The class of a requirement; major where none is stated.
pub(super) fn read_class(table: Table<'_>) -> Option<Class> {
    if table.has("class") {
        table.word("class", &CLASSES)
    } else {
        Some(Class::Major)
    }
}

/// Test lengths and window lengths must lie between solid and free.
pub(super) fn check_lengths(
    root: Table<'_>,
    requirements: &[Requirement],
    test: &RateTest,
    scale: f64,
    free: f64,
    solid: f64,
) {
    let shown = |length: f64| length / scale;
    let inside = |length: f64| length < free && length > solid;
    let between = format!(
        "a test length lies between the solid length {:.3} and the free length {:.3}",
        shown(solid),
        shown(free)
    );
    let tables = root.table("requirements").tables("load");
    for (requirement, table) in requirements
        .iter()
        .filter(|one| one.quantity.at_length().is_some())
        .zip(tables)
    {
        let at = table
            .positive("at_length")
            .map_or(length_of(requirement), |at| at.value * scale);
        if !inside(at) {
            table.fault(
                &table.place("at_length"),
                format!("no load can be measured at {}", shown(at)),
                between.clone(),
            );
        }
    }
    if let Window::Lengths(from, to) = test.window
        && !(inside(from) && inside(to))
    {
        root.fault(
            &root.table("rate_test").place("window"),
            "the window reaches beyond the spring's travel",
            between,
        );
    }
}

/// Every class that is required needs an AQL, unless it is zero-accept by nature.
pub(super) fn check_classes(
    root: Table<'_>,
    requirements: &[Requirement],
    acceptance: Option<&Acceptance>,
) {
    let Some(
        PlanTerms::Attributes {
            aql: Aqls::ByClass(given),
            ..
        }
        | PlanTerms::Variables {
            aql: Aqls::ByClass(given),
            ..
        },
    ) = acceptance.map(|terms| &terms.plan)
    else {
        return;
    };
    for class in Class::ALL {
        let wanted = class != Class::Critical && requirements.iter().any(|one| one.class == class);
        if wanted && !given.iter().any(|(known, _)| *known == class) {
            let what = format!("requirements of class {} have no AQL", class.word());
            root.fault(
                &root.table("acceptance").place("plan"),
                what,
                format!("add {} = … to aql", class.word()),
            );
        }
    }
}
