//! Per-lot figures as a table, one row for each lot and characteristic: what an engine computed over the archive comes back
//! in, and goes out in the same columns.

use std::collections::BTreeMap;
use std::io::Write;
use std::path::Path;

use jiff::civil::Date;
use serde::{Deserialize, Serialize};

use super::error::{ArchiveError, reading, shown};
use super::figures::{Figure, LotFigures};
use super::frame;
use super::read::LotHead;
use crate::quantity::Unit;
use crate::record::Decision;
use crate::text::{Alphabet, printable};

/// One row; the names are the table's columns, in this order. `tags` is a JSON object of texts, dates are YYYY-MM-DD.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
#[serde(deny_unknown_fields)]
struct Row {
    drawing: String,
    lot: String,
    supplier: Option<String>,
    date: String,
    received: Option<String>,
    rig: String,
    tags: String,
    decision: Decision,
    characteristic: String,
    at_length_mm: Option<f64>,
    unit: Unit,
    nominal: Option<f64>,
    lower: Option<f64>,
    upper: Option<f64>,
    springs: u64,
    mean: f64,
    standard_deviation: Option<f64>,
    own_uncertainty: Option<f64>,
    common_uncertainty: Option<f64>,
}

/// The columns of [`Row`].
const COLUMNS: [&str; 19] = [
    "drawing",
    "lot",
    "supplier",
    "date",
    "received",
    "rig",
    "tags",
    "decision",
    "characteristic",
    "at_length_mm",
    "unit",
    "nominal",
    "lower",
    "upper",
    "springs",
    "mean",
    "standard_deviation",
    "own_uncertainty",
    "common_uncertainty",
];

/// Why a table cannot be used.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
#[expect(missing_docs, reason = "the messages say it")]
pub enum TableError {
    #[error(transparent)]
    #[diagnostic(transparent)]
    File(#[from] ArchiveError),
    #[error("`{file}` cannot be read as a table of per-lot figures: {why}")]
    #[diagnostic(
        code(coilassay::archive::table),
        help("its columns are {}", COLUMNS.join(", "))
    )]
    Shape { file: String, why: String },
    #[error("row {row} of `{file}`: {what}")]
    #[diagnostic(
        code(coilassay::archive::table_row),
        help("rows are counted from 1 after the header")
    )]
    Row {
        file: String,
        row: usize,
        what: String,
    },
}

/// Reads a table of per-lot figures; Parquet where its name ends in `.parquet`, else CSV with commas and a header.
///
/// Rows of one drawing, lot, supplier and date are one lot; the lots come in the order of their first row.
///
/// # Errors
/// [`TableError`] where a column is missing or unknown, a figure is none, or a lot has one characteristic twice.
pub fn read_table(path: &Path) -> Result<Vec<LotFigures>, TableError> {
    let file = shown(path);
    let shape = |why: String| TableError::Shape {
        file: file.clone(),
        why: printable(&why, &Alphabet::Any),
    };
    let text = if path.extension().is_some_and(|end| end == "parquet") {
        frame::as_csv(path)?
    } else {
        std::fs::read(path).map_err(reading(path))?
    };
    let mut reader = csv::Reader::from_reader(text.as_slice());
    let rows: Result<Vec<Row>, csv::Error> = reader.deserialize().collect();
    let rows = rows.map_err(|fault| shape(fault.to_string()))?;
    if rows.is_empty() {
        return Err(shape("it holds no row".to_owned()));
    }
    let mut lots: Vec<LotFigures> = Vec::new();
    let mut places = BTreeMap::new();
    for (number, row) in (1..).zip(rows) {
        let faulty = |what| TableError::Row {
            file: file.clone(),
            row: number,
            what,
        };
        let (head, figure) = split(row).map_err(faulty)?;
        let key = (
            head.drawing.clone(),
            head.lot.clone(),
            head.supplier.clone(),
            head.date,
        );
        let place = *places.entry(key).or_insert(lots.len());
        add(&mut lots, place, head, figure).map_err(faulty)?;
    }
    Ok(lots)
}

fn add(
    lots: &mut Vec<LotFigures>,
    place: usize,
    head: LotHead,
    figure: Figure,
) -> Result<(), String> {
    let Some(lot) = lots.get_mut(place) else {
        lots.push(LotFigures {
            head,
            run: None,
            figures: vec![figure],
        });
        return Ok(());
    };
    if lot.head != head {
        return Err(
            "another row of this lot states another rig, decision, date received or tags"
                .to_owned(),
        );
    }
    let same = |one: &Figure| {
        one.characteristic == figure.characteristic && one.at_length_mm == figure.at_length_mm
    };
    if lot.figures.iter().any(same) {
        return Err("this characteristic of this lot stands in an earlier row already".to_owned());
    }
    lot.figures.push(figure);
    Ok(())
}

/// Writes per-lot figures as CSV, in the columns that [`read_table`] reads.
///
/// # Errors
/// Where `out` cannot be written.
pub fn write_table(lots: &[LotFigures], out: &mut impl Write) -> std::io::Result<()> {
    let mut writer = csv::WriterBuilder::new()
        .has_headers(false)
        .from_writer(out);
    writer.write_record(COLUMNS)?;
    for lot in lots {
        for figure in &lot.figures {
            writer
                .serialize(joined(&lot.head, figure))
                .map_err(std::io::Error::other)?;
        }
    }
    writer.flush()
}

fn joined(head: &LotHead, figure: &Figure) -> Row {
    Row {
        drawing: head.drawing.clone(),
        lot: head.lot.clone(),
        supplier: head.supplier.clone(),
        date: head.date.to_string(),
        received: head.received.map(|date| date.to_string()),
        rig: head.rig.clone(),
        tags: serde_json::to_string(&head.tags).unwrap_or_default(), // texts by text: nothing in them can fail
        decision: head.decision,
        characteristic: figure.characteristic.clone(),
        at_length_mm: figure.at_length_mm,
        unit: figure.unit,
        nominal: figure.nominal,
        lower: figure.lower,
        upper: figure.upper,
        springs: figure.springs,
        mean: figure.mean,
        standard_deviation: figure.standard_deviation,
        own_uncertainty: figure.own_uncertainty,
        common_uncertainty: figure.common_uncertainty,
    }
}

/// A row as lot and figures: finite, a spread where there are several springs, dates that are dates.
fn split(row: Row) -> Result<(LotHead, Figure), String> {
    let figures = [
        ("at_length_mm", row.at_length_mm),
        ("nominal", row.nominal),
        ("lower", row.lower),
        ("upper", row.upper),
        ("mean", Some(row.mean)),
    ];
    if let Some((name, _)) = figures
        .iter()
        .find(|(_, one)| one.is_some_and(|one| !one.is_finite()))
    {
        return Err(format!("{name} is not a finite number"));
    }
    let spreads = [
        ("standard_deviation", row.standard_deviation),
        ("own_uncertainty", row.own_uncertainty),
        ("common_uncertainty", row.common_uncertainty),
    ];
    let bad = |one: f64| !one.is_finite() || one < 0.0;
    if let Some((name, _)) = spreads.iter().find(|(_, one)| one.is_some_and(bad)) {
        return Err(format!("{name} is not a finite number of 0 or more"));
    }
    if row.springs == 0 {
        return Err("springs is 0".to_owned());
    }
    if (row.springs > 1) != row.standard_deviation.is_some() {
        return Err(format!(
            "standard_deviation must be there for two springs or more, and springs is {}",
            row.springs
        ));
    }
    let tags = serde_json::from_str(&row.tags);
    let head = LotHead {
        date: date("date", &row.date)?,
        received: row
            .received
            .map(|text| date("received", &text))
            .transpose()?,
        tags: tags.map_err(|_| "tags is no JSON object of texts".to_owned())?,
        drawing: row.drawing,
        lot: row.lot,
        supplier: row.supplier,
        rig: row.rig,
        decision: row.decision,
    };
    let figure = Figure {
        characteristic: row.characteristic,
        at_length_mm: row.at_length_mm,
        unit: row.unit,
        nominal: row.nominal,
        lower: row.lower,
        upper: row.upper,
        springs: row.springs,
        mean: row.mean,
        standard_deviation: row.standard_deviation,
        own_uncertainty: row.own_uncertainty,
        common_uncertainty: row.common_uncertainty,
    };
    Ok((head, figure))
}

fn date(name: &str, text: &str) -> Result<Date, String> {
    text.parse().map_err(|_| {
        let text = printable(text, &Alphabet::Any);
        format!("{name} is `{text}`, not a date like 2026-11-30")
    })
}
