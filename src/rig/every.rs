//! How often a rig is to be checked on a reference spring.

use jiff::civil::Date;
use jiff::{Span, ToSpan};

use crate::text::Table;

/// How often, as written and as a stretch of days.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Every {
    /// As written.
    pub written: String,
    number: i64,
    unit: Unit,
}

#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Unit {
    Days,
    Weeks,
    Months,
}

impl Every {
    /// The last day on which a check made on `day` still holds; `None` beyond the calendar.
    pub fn holds_until(&self, day: Date) -> Option<Date> {
        let span: Span = match self.unit {
            Unit::Days => self.number.days(),
            Unit::Weeks => self.number.weeks(),
            Unit::Months => self.number.months(),
        };
        day.checked_add(span).ok()
    }
}

/// `check_every` of `[rig]`; a wrong one is noted as a fault.
pub(super) fn read_every(table: Table<'_>) -> Option<Every> {
    let written = table.text("check_every")?;
    let parts = written.trim().split_once(' ');
    let number = parts
        .and_then(|(number, _)| number.parse::<i64>().ok())
        .filter(|number| (1..=10_000).contains(number));
    let unit = match parts.map(|(_, unit)| unit.trim()) {
        Some("d" | "day" | "days") => Some(Unit::Days),
        Some("w" | "week" | "weeks") => Some(Unit::Weeks),
        Some("month" | "months") => Some(Unit::Months),
        _ => None,
    };
    if let (Some(number), Some(unit)) = (number, unit) {
        return Some(Every {
            written,
            number,
            unit,
        });
    }
    table.fault(
        &table.place("check_every"),
        format!("`check_every` is \"{written}\", not a number of days, weeks or months"),
        "write check_every = \"1 d\", \"2 w\" or \"3 months\"",
    );
    None
}
