//! Caliper findings: a small table of what was measured without the bench.

use std::collections::BTreeMap;
use std::path::Path;

use crate::export::{ExportError, SmallTable, Spot, read_small};
use crate::quantity::Quantity;
use crate::text::InputFile;
use crate::units::LengthUnit;

/// All caliper findings.
#[derive(Clone, Debug, Default)]
pub struct Caliper {
    /// Values in mm by spring id, as written.
    pub springs: BTreeMap<String, Vec<(Quantity, f64)>>,
    /// What the columns hold.
    pub measured: Vec<Quantity>,
    /// The file.
    pub input: Option<InputFile>,
}

/// Why findings cannot be used.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
#[expect(missing_docs, reason = "the messages say it")]
pub enum FindingsError {
    #[error(transparent)]
    #[diagnostic(transparent)]
    Table(#[from] ExportError),
    #[error("the findings in `{name}` have a column `{found}` where `{wanted}` is wanted")]
    #[diagnostic(
        code(coilassay::findings::column),
        help(
            "columns: spring, then any of free_length, outside_diameter, inside_diameter, wire_diameter, squareness, parallelism"
        )
    )]
    Column {
        name: String,
        found: String,
        wanted: &'static str,
    },
    #[error(
        "column `{column}` of the findings in `{name}` has the unit `{found}`, which is no unit of length"
    )]
    #[diagnostic(
        code(coilassay::findings::unit),
        help("write mm or in on the second line")
    )]
    Unit {
        name: String,
        column: String,
        found: String,
    },
    #[error("{at}: spring `{spring}` stands twice in the findings")]
    #[diagnostic(
        code(coilassay::findings::twice),
        help("keep one row for each spring"),
        forward(at)
    )]
    Twice { at: Spot, spring: String },
    #[error("{at}: a size of {value} is not above zero")]
    #[diagnostic(
        code(coilassay::findings::size),
        help("write the measured size, or leave the cell empty"),
        forward(at)
    )]
    Size { at: Spot, value: f64 },
    #[error(
        "the findings in `{name}` give {what}, but the lot file does not say how well the caliper measures it"
    )]
    #[diagnostic(
        code(coilassay::findings::uncertainty),
        help("write [caliper] {key} = {{ uncertainty = 0.02, k = 2 }} in the lot file")
    )]
    NoUncertainty {
        name: String,
        what: &'static str,
        key: &'static str,
    },
}

const KNOWN: [Quantity; 6] = [
    Quantity::FreeLength,
    Quantity::OutsideDiameter,
    Quantity::InsideDiameter,
    Quantity::WireDiameter,
    Quantity::Squareness,
    Quantity::Parallelism,
];

/// Reads the findings file; `uncertainties` are those the lot file states for its caliper.
///
/// # Errors
/// [`FindingsError`] with the cell at fault.
pub fn read_findings(
    path: &Path,
    as_written: &str,
    uncertainties: &[(&'static str, f64)],
) -> Result<Caliper, FindingsError> {
    let table = read_small(path, as_written)?;
    let columns = columns(&table)?;
    let filled = |column: usize| {
        table
            .rows
            .iter()
            .any(|(_, cells)| cells.get(column).is_some_and(|cell| !cell.is_empty()))
    };
    for (column, quantity, _) in &columns {
        if filled(*column)
            && !uncertainties
                .iter()
                .any(|(known, _)| *known == quantity.name())
        {
            return Err(FindingsError::NoUncertainty {
                name: table.name,
                what: quantity.title(),
                key: quantity.name(),
            });
        }
    }
    let mut springs = BTreeMap::new();
    for (place, (_, cells)) in table.rows.iter().enumerate() {
        let id = cells.first().cloned().unwrap_or_default();
        let values = values(&table, place, &columns)?;
        if springs.insert(id.clone(), values).is_some()
            && let Some(at) = table.spot(place, 0)
        {
            return Err(FindingsError::Twice { at, spring: id });
        }
    }
    let input = InputFile {
        role: "findings".to_owned(),
        path: table.name.clone(),
        sha256: table.sha256.clone(),
    };
    Ok(Caliper {
        springs,
        measured: columns.iter().map(|column| column.1).collect(),
        input: Some(input),
    })
}

fn values(
    table: &SmallTable,
    row: usize,
    columns: &[(usize, Quantity, f64)],
) -> Result<Vec<(Quantity, f64)>, FindingsError> {
    let mut values = Vec::new();
    for (column, quantity, scale) in columns {
        let Some(value) = table.number(row, *column)? else {
            continue;
        };
        let too_small = if quantity.may_be_zero() {
            value < 0.0
        } else {
            value <= 0.0
        };
        if too_small && let Some(at) = table.spot(row, *column) {
            return Err(FindingsError::Size { at, value });
        }
        values.push((*quantity, value * scale));
    }
    Ok(values)
}

/// Column, quantity and mm per unit of every column after the first.
fn columns(table: &SmallTable) -> Result<Vec<(usize, Quantity, f64)>, FindingsError> {
    let wrong = |found: &str, wanted| FindingsError::Column {
        name: table.name.clone(),
        found: found.to_owned(),
        wanted,
    };
    let first = table.header.first().map_or("", String::as_str);
    if first != "spring" {
        return Err(wrong(first, "spring"));
    }
    let mut columns = Vec::new();
    for (place, name) in table.header.iter().enumerate().skip(1) {
        let quantity = KNOWN.into_iter().find(|quantity| quantity.name() == name);
        let quantity = quantity.ok_or_else(|| {
            wrong(
                name,
                "free_length, outside_diameter, inside_diameter, wire_diameter, squareness or parallelism",
            )
        })?;
        let found = table.units.get(place).cloned().unwrap_or_default();
        let unit = LengthUnit::parse(&found);
        let unit = unit.ok_or_else(|| FindingsError::Unit {
            name: table.name.clone(),
            column: name.clone(),
            found,
        })?;
        columns.push((place, quantity, unit.millimetres()));
    }
    Ok(columns)
}
