//! Changes a rig file's text: figures found on the bench go in, everything else, comments and all, stays as it was.
//! Elsewhere: writing the file (`cli`).

use toml_edit::{ArrayOfTables, DocumentMut, InlineTable, Item, Table, TableLike, Value, value};

use crate::text::Source;
use crate::units::System;

use super::frame::Give;

/// Significant digits of an uncertainty that is written, and more digits of the value beside it.
const DIGITS: (i32, i32) = (2, 1);

/// One figure for a rig file, in mm and N.
#[derive(Clone, Debug, PartialEq)]
pub enum Change {
    /// The give of the frame, with half its expanded uncertainty (k = 2), mm/N.
    Compliance {
        /// The give.
        give: Give,
        /// Half of U, mm/N.
        standard: f64,
    },
    /// The within-spring standard deviation of a characteristic.
    Repeatability {
        /// The characteristic, as `[[repeatability]]` names it.
        of: &'static str,
        /// In N, mm, N/mm or %.
        standard_deviation: f64,
    },
}

/// A line that an edit changes.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Changed {
    /// It goes.
    Removed(String),
    /// It comes.
    Added(String),
}

/// A rig file's text before and after.
#[derive(Clone, Debug)]
pub struct Edited {
    /// The file with its new text.
    pub source: Source,
    /// SHA-256 of the file as it was read.
    pub was: String,
    /// The lines that differ, in order.
    pub lines: Vec<Changed>,
}

/// Why a rig file cannot be changed.
#[derive(Debug, thiserror::Error, miette::Diagnostic)]
#[expect(missing_docs, reason = "the messages say it")]
pub enum RigEditError {
    #[error("`{name}` cannot be changed: {what}")]
    #[diagnostic(
        code(coilassay::rig::edit),
        help("write the figures that are shown into the file by hand")
    )]
    Unfit { name: String, what: String },
}

/// The rig file `source` with `changes` in it, nothing written yet.
///
/// # Errors
/// [`RigEditError`] where the file is laid out in a way this does not know.
pub fn edit(source: &Source, changes: &[Change]) -> Result<Edited, RigEditError> {
    let unfit = |what: &str| RigEditError::Unfit {
        name: source.name.clone(),
        what: what.to_owned(),
    };
    let mut document: DocumentMut = source
        .text
        .parse()
        .map_err(|_| unfit("its TOML cannot be kept as it stands"))?;
    let units = match document.get("units").and_then(Item::as_str) {
        Some("in-lbf") => System::InLbf,
        _ => System::MmN,
    };
    for change in changes {
        let done = match change {
            Change::Compliance { give, standard } => frame(&mut document, give, *standard, units),
            Change::Repeatability {
                of,
                standard_deviation,
            } => repeatability(&mut document, of, standard_deviation / unit_of(of, units)),
        };
        done.ok_or_else(|| unfit("what it says of the frame or of repeatability is no table"))?;
    }
    let text = with_ends_of(&source.text, &document.to_string());
    let lines = difference(&source.text, &text);
    Ok(Edited {
        source: source.with_text(&text),
        was: source.sha256.clone(),
        lines,
    })
}

/// The new text with the line ends of the old one: `toml_edit` writes `\n` alone.
fn with_ends_of(old: &str, new: &str) -> String {
    let plain = new.replace("\r\n", "\n");
    if old.contains("\r\n") {
        plain.replace('\n', "\r\n")
    } else {
        plain
    }
}

fn unit_of(quantity: &str, units: System) -> f64 {
    match quantity {
        "rate" => units.rate(),
        "load" => units.force(),
        "hysteresis" | "straightness" => 1.0,
        _ => units.length(),
    }
}

fn frame(document: &mut DocumentMut, give: &Give, standard: f64, units: System) -> Option<()> {
    let frame = document.entry("frame").or_insert(Item::Table(Table::new()));
    let frame = frame.as_table_like_mut()?;
    if frame.get("compliance").is_none() {
        frame.insert("compliance", value(InlineTable::new()));
    }
    let compliance = frame.get_mut("compliance")?.as_table_like_mut()?;
    for key in ["unknown", "value", "table", "uncertainty", "k"] {
        compliance.remove(key);
    }
    let unit = units.length() / units.force();
    let expanded = rounded_up(2.0 * standard / unit, DIGITS.0);
    match give {
        Give::Line(per_newton) => {
            let last = last_place(expanded, DIGITS.0 + DIGITS.1);
            set(compliance, "value", to_place(per_newton / unit, last));
        }
        Give::Table(points) => {
            compliance.insert("table", Item::Value(rows(points, expanded, units)));
        }
    }
    set(compliance, "uncertainty", expanded);
    compliance.insert("k", value(2));
    if let Some(Value::InlineTable(inline)) =
        frame.get_mut("compliance").and_then(Item::as_value_mut)
    {
        let decor = inline.decor().clone();
        inline.fmt();
        *inline.decor_mut() = decor;
    }
    Some(())
}

/// The rows of a table but its first, which is no give at no load; each give is written to a tenth of its uncertainty.
fn rows(points: &[(f64, f64)], expanded: f64, units: System) -> Value {
    let mut array = toml_edit::Array::new();
    for (load, give) in points.iter().skip(1) {
        let (load, give) = (load / units.force(), give / units.length());
        let mut row = InlineTable::new();
        row.insert("load", to_place(load, last_place(load, 4)).into());
        row.insert(
            "give",
            to_place(give, last_place(expanded * load, 2)).into(),
        );
        let mut row = Value::InlineTable(row);
        row.decor_mut().set_prefix("\n    ");
        array.push_formatted(row);
    }
    array.set_trailing("\n");
    array.set_trailing_comma(true);
    Value::Array(array)
}

fn set(table: &mut dyn TableLike, key: &str, figure: f64) {
    table.insert(key, value(figure));
}

fn repeatability(document: &mut DocumentMut, of: &str, figure: f64) -> Option<()> {
    let figure = to_place(figure, last_place(figure, DIGITS.0 + DIGITS.1));
    let stated = document
        .entry("repeatability")
        .or_insert(Item::ArrayOfTables(ArrayOfTables::new()));
    let named = |table: &dyn TableLike| table.get("of").and_then(Item::as_str) == Some(of);
    match stated {
        Item::ArrayOfTables(tables) => {
            if let Some(table) = tables.iter_mut().find(|table| named(*table)) {
                replace(table, figure);
                return Some(());
            }
            let mut table = Table::new();
            table.insert("of", value(of));
            table.insert("standard_deviation", value(figure));
            tables.push(table);
        }
        Item::Value(Value::Array(tables)) => {
            let inline = tables.iter_mut().filter_map(Value::as_inline_table_mut);
            for table in inline {
                if named(table) {
                    replace(table, figure);
                    return Some(());
                }
            }
            let mut table = InlineTable::new();
            table.insert("of", of.into());
            table.insert("standard_deviation", figure.into());
            tables.push(table);
        }
        _ => return None,
    }
    Some(())
}

/// Puts a figure in the place of the one there, what stands around it kept.
fn replace(table: &mut dyn TableLike, figure: f64) {
    let key = "standard_deviation";
    let decor = table
        .get(key)
        .and_then(Item::as_value)
        .map(|old| old.decor().clone());
    let mut new = Value::from(figure);
    if let Some(decor) = decor {
        *new.decor_mut() = decor;
    }
    table.insert(key, Item::Value(new));
}

/// The power of ten of the last of `digits` significant digits.
fn last_place(figure: f64, digits: i32) -> i32 {
    let written = format!("{:e}", figure.abs());
    let exponent = written
        .rsplit_once('e')
        .and_then(|(_, power)| power.parse().ok());
    exponent.unwrap_or(0) - digits + 1
}

/// The figure at the nearest multiple of a power of ten, as a person would write it.
fn to_place(figure: f64, last: i32) -> f64 {
    let places = usize::try_from(-last).unwrap_or(0);
    format!("{figure:.places$}").parse().unwrap_or(figure)
}

/// The figure to so many digits, never below what it was.
fn rounded_up(figure: f64, digits: i32) -> f64 {
    let last = last_place(figure, digits);
    let near = to_place(figure, last);
    if near < figure {
        to_place(near + 10_f64.powi(last), last)
    } else {
        near
    }
}

/// The lines that go and come, by the longest common run of lines.
fn difference(old: &str, new: &str) -> Vec<Changed> {
    let (old, new): (Vec<&str>, Vec<&str>) = (old.lines().collect(), new.lines().collect());
    let wide = new.len() + 1;
    let mut common = vec![0_u32; (old.len() + 1) * wide];
    let at = |common: &[u32], i: usize, j: usize| common.get(i * wide + j).copied().unwrap_or(0);
    for (i, left) in old.iter().enumerate().rev() {
        for (j, right) in new.iter().enumerate().rev() {
            let longest = if left == right {
                at(&common, i + 1, j + 1) + 1
            } else {
                at(&common, i + 1, j).max(at(&common, i, j + 1))
            };
            if let Some(cell) = common.get_mut(i * wide + j) {
                *cell = longest;
            }
        }
    }
    let (mut i, mut j) = (0, 0);
    let mut lines = Vec::new();
    loop {
        match (old.get(i), new.get(j)) {
            (None, None) => return lines,
            (Some(left), Some(right)) if left == right => (i, j) = (i + 1, j + 1),
            (Some(left), None) => {
                lines.push(Changed::Removed((*left).to_owned()));
                i += 1;
            }
            (Some(left), Some(_)) if at(&common, i + 1, j) >= at(&common, i, j + 1) => {
                lines.push(Changed::Removed((*left).to_owned()));
                i += 1;
            }
            (_, Some(right)) => {
                lines.push(Changed::Added((*right).to_owned()));
                j += 1;
            }
        }
    }
}
