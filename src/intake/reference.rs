//! The certificate of a reference spring, as a check file repeats it.

use jiff::civil::Date;

use crate::quantity::Quantity;
use crate::rig::{read_calibrated, standard_of};
use crate::text::Table;
use crate::units::{Millimetres, System};

/// A certified value: the value and its standard uncertainty.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct CertifiedValue {
    /// Which quantity.
    pub quantity: Quantity,
    /// The value, in its unit.
    pub value: f64,
    /// U/k.
    pub standard: f64,
}

/// A certified reference spring.
#[derive(Clone, Debug)]
pub struct ReferenceSpring {
    /// Its name.
    pub name: String,
    /// Certificate.
    pub certificate: Option<String>,
    /// Calibrated on, and until.
    pub calibrated: Option<(Date, Date)>,
    /// Lengths between which the rate is certified, mm, the longer first.
    pub between: Option<(f64, f64)>,
    /// Rate, loads from the longest length down, free length.
    pub values: Vec<CertifiedValue>,
}

pub(super) fn read_reference(table: Table<'_>, units: System) -> Option<ReferenceSpring> {
    let name = table.required_text("name", "write the reference spring's name: name = \"RS-3\"");
    let rate = certified(table, "rate", Quantity::Rate, units.rate());
    let free = certified(table, "free_length", Quantity::FreeLength, units.length());
    let loads = read_loads(table, units);
    let between = read_between(table.table("rate"), units);
    let calibrated = read_calibrated(table.table("calibrated"));
    let (rate, free, loads) = (rate?, free?, loads?);
    for load in &loads {
        let at = load.quantity.at_length().map_or(0.0, Millimetres::get);
        if at >= free.value {
            let what = "a certified load lies at or beyond the certified free length";
            table.fault(
                &table.place("load"),
                what,
                "check lengths and units of the certificate",
            );
            return None;
        }
    }
    let mut values = vec![rate];
    values.extend(loads);
    values.push(free);
    Some(ReferenceSpring {
        name: name?,
        certificate: table.text("certificate"),
        calibrated,
        between,
        values,
    })
}

/// The lengths the rate is certified between; `None` where they are not stated, or where a fault was noted.
fn read_between(rate: Table<'_>, units: System) -> Option<(f64, f64)> {
    if !rate.has("from") && !rate.has("to") {
        return None;
    }
    let help = "write from and to, the longer length first: from = 80.0, to = 60.0";
    for key in ["from", "to"] {
        if !rate.has(key) {
            rate.missing(key, help);
        }
    }
    let (from, to) = (rate.positive("from")?.value, rate.positive("to")?.value);
    if from <= to {
        rate.fault(&rate.place("from"), "`from` is not the longer length", help);
        return None;
    }
    Some((from * units.length(), to * units.length()))
}

fn read_loads(table: Table<'_>, units: System) -> Option<Vec<CertifiedValue>> {
    let help = "write two or more [[reference.load]] with at_length, value, uncertainty and k";
    let mut loads = Vec::new();
    for load in table.tables("load") {
        if !load.has("at_length") {
            load.missing("at_length", help);
        }
        let at = load.positive("at_length")?.value * units.length();
        let quantity = Quantity::LoadAt(at.try_into().ok()?);
        loads.push(value_of(load, quantity, units.force())?);
    }
    let at = |one: &CertifiedValue| one.quantity.at_length().map_or(0.0, Millimetres::get);
    loads.sort_by(|a, b| at(b).total_cmp(&at(a)));
    let apart = loads
        .windows(2)
        .all(|pair| matches!(pair, [a, b] if at(a) - at(b) > 1e-9));
    if loads.len() < 2 || !apart {
        let what = format!("{} certified loads at lengths of their own", loads.len());
        let what = if apart {
            what
        } else {
            "two certified loads at one length".to_owned()
        };
        table.fault(
            &table.place("load"),
            format!("{what}, where two or more are wanted"),
            help,
        );
        return None;
    }
    Some(loads)
}

fn certified(table: Table<'_>, key: &str, quantity: Quantity, unit: f64) -> Option<CertifiedValue> {
    if !table.has(key) {
        table.missing(
            key,
            format!(
                "write {key} = {{ value = …, uncertainty = …, k = 2 }} as the certificate has it"
            ),
        );
        return None;
    }
    value_of(table.table(key), quantity, unit)
}

fn value_of(table: Table<'_>, quantity: Quantity, unit: f64) -> Option<CertifiedValue> {
    let help = "write value, uncertainty and k as the certificate has them";
    if !table.has("value") {
        table.missing("value", help);
    }
    let value = table.positive("value");
    let standard = standard_of(table, help);
    Some(CertifiedValue {
        quantity,
        value: value?.value * unit,
        standard: standard? * unit,
    })
}
