//! `[service]`: what the spring is for. It bears on strength, buckling and frequency, and on no verdict.

use crate::formula::Seating;
use crate::text::Table;
use crate::units::System;

/// What the drawing says of service; nothing of it is ever assumed.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Service {
    /// Loads between which the spring works, N.
    pub load: Option<(f64, f64)>,
    /// Temperature, °C.
    pub temperature: Option<f64>,
    /// Frequency at which it is driven, Hz.
    pub frequency: Option<f64>,
    /// How it sits.
    pub seating: Option<Seating>,
    /// Whether the wire is shot peened.
    pub peened: bool,
    /// Whether set was removed by presetting.
    pub set_removed: bool,
}

/// Reads `[service]`.
pub(super) fn read_service(table: Table<'_>, units: System) -> Option<Service> {
    let seating = if table.has("seating") {
        Some(table.word("seating", &Seating::WORDS)?)
    } else {
        None
    };
    let load = if table.has("load") {
        Some(read_load(table.table("load"), units.force())?)
    } else {
        None
    };
    Some(Service {
        load,
        temperature: table.number("temperature").map(|number| number.value),
        frequency: table.positive("frequency").map(|number| number.value),
        seating,
        peened: table.flag("peened"),
        set_removed: table.flag("set_removed"),
    })
}

fn read_load(table: Table<'_>, force: f64) -> Option<(f64, f64)> {
    for key in ["from", "to"] {
        if !table.has(key) {
            table.missing(key, "write both loads: load = { from = 30.0, to = 150.0 }");
        }
    }
    let (from, to) = (
        table.not_negative("from")?.value,
        table.positive("to")?.value,
    );
    if from >= to {
        table.fault(
            &table.span(),
            "the service load does not run from a smaller to a larger one",
            "write for instance load = { from = 30.0, to = 150.0 }",
        );
        return None;
    }
    Some((from * force, to * force))
}
