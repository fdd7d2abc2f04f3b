//! A limit has one shape everywhere: `nominal` with one kind of tolerance, or `minimum` and/or `maximum`.

use crate::quantity::{Class, Quantity};
use crate::text::Table;

/// Limits of one quantity, in its own unit (N, mm, N/mm or %).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Limits {
    /// Nominal value.
    pub nominal: Option<f64>,
    /// Lower limit.
    pub lower: Option<f64>,
    /// Upper limit.
    pub upper: Option<f64>,
}

impl Limits {
    /// Half the width between two limits; `None` where there is only one.
    pub fn half_width(&self) -> Option<f64> {
        Some((self.upper? - self.lower?) / 2.0)
    }
}

/// One requirement of the drawing.
#[derive(Clone, Debug, PartialEq)]
pub struct Requirement {
    /// What is required.
    pub quantity: Quantity,
    /// Between which limits.
    pub limits: Limits,
    /// How grave a departure is.
    pub class: Class,
    /// The standard the limits come from, in words; `None` where the drawing states them.
    pub standard: Option<String>,
    /// For the rate of a stage, the longer and the shorter length it is fitted between, mm.
    pub between: Option<(f64, f64)>,
}

/// The words for a class in files.
pub const CLASSES: [(&str, Class); 3] = [
    ("critical", Class::Critical),
    ("major", Class::Major),
    ("minor", Class::Minor),
];

/// Reads the limits stated in `table`; `scale` turns the file's unit into the quantity's own.
/// Every fault is noted in the table; `None` where the limits cannot be used.
pub fn read_limits(table: Table<'_>, scale: f64) -> Option<Limits> {
    read_limits_of(table, "nominal", scale)
}

/// The same where the nominal value stands under another key.
pub(super) fn read_limits_of(table: Table<'_>, key: &str, scale: f64) -> Option<Limits> {
    let kinds = [
        table.has("tolerance"),
        table.has("plus") || table.has("minus"),
        table.has("minimum") || table.has("maximum"),
    ];
    let help =
        "write nominal with tolerance, or nominal with plus and minus, or minimum and/or maximum";
    if kinds.iter().filter(|kind| **kind).count() != 1 {
        table.fault(
            &table.span(),
            "a limit is stated in no way or in two ways at once",
            help,
        );
        return None;
    }
    let nominal = table.number(key).map(|number| number.value * scale);
    let (lower, upper) = if kinds[2] {
        let bound = |key| table.number(key).map(|number| number.value * scale);
        (bound("minimum"), bound("maximum"))
    } else {
        let Some(nominal) = nominal else {
            if !table.has(key) {
                table.missing(key, help);
            }
            return None;
        };
        let (minus, plus) = spread(table, nominal, scale)?;
        (Some(nominal - minus), Some(nominal + plus))
    };
    checked(
        table,
        key,
        Limits {
            nominal,
            lower,
            upper,
        },
    )
}

/// The two departures from nominal, each zero or more.
fn spread(table: Table<'_>, nominal: f64, scale: f64) -> Option<(f64, f64)> {
    if table.has("tolerance") {
        let tolerance = if table.is_text("tolerance") {
            table
                .share("tolerance")
                .map(|share| share.value * nominal.abs())
        } else {
            table
                .positive("tolerance")
                .map(|number| number.value * scale)
        }?;
        return Some((tolerance, tolerance));
    }
    let side = |key: &str| {
        if !table.has(key) {
            table.missing(key, "write both plus and minus");
        }
        table.not_negative(key).map(|number| number.value * scale)
    };
    let (minus, plus) = (side("minus"), side("plus"));
    Some((minus?, plus?))
}

fn checked(table: Table<'_>, key: &str, limits: Limits) -> Option<Limits> {
    if let (Some(lower), Some(upper)) = (limits.lower, limits.upper)
        && lower >= upper
    {
        let what = format!("the lower limit {lower} is not below the upper limit {upper}");
        table.fault(&table.span(), what, "put the limits the right way round");
        return None;
    }
    if let Some(nominal) = limits.nominal {
        let below = limits.lower.is_some_and(|lower| nominal < lower);
        let above = limits.upper.is_some_and(|upper| nominal > upper);
        if below || above {
            table.fault(
                &table.place(key),
                "the nominal value lies outside its own limits",
                "mend the nominal value or the limits",
            );
            return None;
        }
    }
    Some(limits)
}
