//! `draft rig`: a rig file drafted from an export, and tried on it before it is shown.

use std::path::Path;
use std::sync::Arc;

use crate::curve::correct;
use crate::draft::{Columns, Form, columns, form, meaning, write};
use crate::export::{BLOCK_BYTES, ExportError, RawCurve, read};
use crate::rig::{Dialect, LoadColumn, Pushing, SpringFrom, TravelColumn};
use crate::text::{Head, Source};

/// The text of a rig file that reads the export at `written`.
///
/// # Errors
/// A report where no table is recognised, or the export is faulty in itself: what is written with the draft is the
/// fault the export has.
pub fn draft_rig(written: &str) -> miette::Result<String> {
    let path = Path::new(written);
    let head = Head::read(path, written)?;
    let form = form(&head)?;
    let columns = columns(&form)?;
    let mut dialect = plain(&form, &columns);
    let first = match first_spring(path, written, &dialect) {
        Err(ExportError::LastLineOpen { .. }) => {
            dialect.last_line_open = true;
            first_spring(path, written, &dialect)?
        }
        first => first?,
    };
    let Some((first, springs)) = first else {
        return Ok(String::new()); // an export without a point is refused before
    };
    let meaning = meaning(&first, &columns.travel.0);
    let mut text = write(&form, &columns, &meaning, dialect.last_line_open, springs);
    text.extend(tried(path, written, &text)?.map(|fault| format!("# DOUBT: read so, {fault}\n")));
    Ok(text)
}

/// Reads the export with the draft; what is wrong with its curves then.
fn tried(path: &Path, written: &str, text: &str) -> miette::Result<Option<String>> {
    let rig = crate::rig::from_source(&Source {
        name: "the draft".to_owned(),
        path: path.to_owned(),
        text: Arc::from(text),
        sha256: String::new(),
    })?;
    let mut fault = None;
    let mut each = |some: Vec<RawCurve>| {
        for spring in some {
            if let (None, Err(found)) = (&fault, correct(&spring, &rig)) {
                fault = Some(found.to_string());
            }
        }
    };
    read(path, written, &rig.dialect, BLOCK_BYTES, &mut each)?;
    Ok(fault)
}

/// The first spring of the export, and how many it holds.
fn first_spring(
    path: &Path,
    written: &str,
    dialect: &Dialect,
) -> Result<Option<(RawCurve, usize)>, ExportError> {
    let (mut first, mut springs) = (None, 0);
    let mut each = |some: Vec<RawCurve>| {
        springs += some.len();
        first = first.take().or(some.into_iter().next());
    };
    read(path, written, dialect, BLOCK_BYTES, &mut each)?;
    Ok(first.map(|first| (first, springs)))
}

/// The dialect in which loads and travel keep their signs.
fn plain(form: &Form, columns: &Columns) -> Dialect {
    Dialect {
        header_line: form.header_line,
        units_line: form.units_line,
        delimiter: form.delimiter,
        decimal: form.decimal,
        encoding: form.encoding,
        quoted: form.quoted,
        last_line_open: false,
        load: LoadColumn {
            column: columns.load.0.clone(),
            unit: columns.load.1,
            pushing: Pushing::Positive,
        },
        travel: TravelColumn {
            column: columns.travel.0.clone(),
            unit: columns.travel.1,
            pushing: Pushing::Positive,
        },
        time: columns.time.clone(),
        spring: columns
            .spring
            .clone()
            .map_or(SpringFrom::FileName, SpringFrom::Column),
    }
}
