//! Reads what a rig file says of tables that hold loads at a few lengths instead of curves.

use crate::text::Table;
use crate::units::{ForceUnit, LengthUnit};

use super::dialect::{LengthColumn, LoadColumn, PointTable, Pushing, SpringFrom, TravelColumn};
use super::frame::Compliance;
use super::open::Means;
use super::read_dialect::{column, read_pushing, unit};

const HELP: &str = "write points = \"long\" beside load, travel and spring, or points = { wide = [{ column = \"F 70\", length = 70.0 }, …], unit = \"N\" }";

/// The columns of a table with one row for every spring.
pub(super) struct Wide {
    pub(super) load: LoadColumn,
    pub(super) travel: TravelColumn,
    pub(super) points: PointTable,
}

/// Reads `points = { wide = … }`; `length` is the unit of the rig file's lengths in mm.
pub(super) fn read_wide(
    export: Table<'_>,
    length: f64,
    spring: Option<&SpringFrom>,
) -> Option<Wide> {
    for key in ["load", "travel", "time", "tables"] {
        if export.has(key) {
            let what = format!("`{key}` stands beside a table with a column for every length");
            let help = "remove it: the columns, their lengths and their unit stand under `points`";
            export.fault(&export.place(key), what, help);
            return None;
        }
    }
    let table = export.table("points");
    if !matches!(spring?, SpringFrom::Column(_)) {
        let help = "write spring = { column = \"…\" }";
        let what = "a table with one row for every spring names them in a column";
        export.fault(&export.place("spring"), what, help);
        return None;
    }
    let columns = read_columns(table, length)?;
    let unit = unit(table, ForceUnit::parse, "N, kN, kgf, lbf")?;
    let pushing = read_pushing(table)?;
    let first = columns.first()?.column.clone();
    Some(Wide {
        load: LoadColumn {
            column: first.clone(),
            unit,
            pushing,
        },
        travel: TravelColumn {
            column: first,
            unit: LengthUnit::Millimetre,
            pushing: Pushing::Positive,
        },
        points: PointTable::Wide(columns),
    })
}

fn read_columns(table: Table<'_>, length: f64) -> Option<Vec<LengthColumn>> {
    let tables = table.tables("wide");
    if tables.len() < 2 {
        let what = "a rate needs loads at two lengths at least";
        table.fault(&table.place("wide"), what, HELP);
        return None;
    }
    let mut columns: Vec<LengthColumn> = Vec::new();
    for one in tables {
        if !one.has("length") {
            one.missing("length", HELP);
        }
        let (name, at) = (column(one), one.positive("length"));
        let (name, at) = (name?, at?.value * length);
        let known = columns
            .iter()
            .find(|known| known.column == name || known.length.total_cmp(&at).is_eq());
        if known.is_some() {
            let what = "a column or a length is named twice";
            one.fault(&one.span(), what, "name every column and every length once");
            return None;
        }
        columns.push(LengthColumn {
            column: name,
            length: at,
        });
    }
    Some(columns)
}

/// Checks `points = "long"` against what stands beside it.
pub(super) fn check_long(export: Table<'_>, means: Means) -> Option<PointTable> {
    export.word("points", &[("long", ())])?;
    if means != Means::Length {
        let what = "readings at a few places are kept by length, and travel means something else";
        let help = "write means = \"length\": without a curve there is no contact to count deflections from";
        export.fault(&export.place("travel"), what, help);
        return None;
    }
    for key in ["time", "tables"] {
        if export.has(key) {
            let what = format!("`{key}` belongs to curves, and the export holds none");
            export.fault(&export.place(key), what, "remove it, or `points`");
            return None;
        }
    }
    Some(PointTable::Long)
}

/// A frame that gives shifts every length by its own load, and a load at the drawn length was then not read.
pub(super) fn refuse_give(root: Table<'_>, frame: &Compliance) -> Option<()> {
    if !matches!(frame, Compliance::Measured { .. }) {
        return Some(());
    }
    let what = "the frame's give cannot be taken off readings at a few lengths: no load was read at the corrected length";
    let help = "let the tester correct its lengths, or write an allowance under [frame]";
    root.fault(&root.place("frame"), what, help);
    None
}
