//! Tables in memory and as Parquet, by polars.

use std::io::{self, Cursor, Write};
use std::path::Path;

use polars::prelude::{
    Column, CsvWriter, DataFrame, Float64Chunked, Int64Chunked, ParallelStrategy,
    ParquetCompression, ParquetReader, ParquetWriter, PolarsError, SerReader, SerWriter,
    StringChunked,
};
use serde::Serialize;
use serde::de::DeserializeOwned;

use super::error::{ArchiveError, shown};
use super::place::LAYOUT;

/// The column that says which layout a file has; every layout has it.
pub(super) const LAYOUT_COLUMN: &str = "layout";

/// Writes a table as Parquet, compressed by snappy, which every engine reads.
pub(super) fn write(frame: &mut DataFrame, out: &mut impl Write) -> io::Result<()> {
    ParquetWriter::new(out)
        .with_compression(ParquetCompression::Snappy)
        .finish(frame)
        .map(|_| ())
        .map_err(|fault| match fault {
            PolarsError::IO { error, .. } => io::Error::new(error.kind(), error.to_string()),
            other => io::Error::other(other.to_string()),
        })
}

/// Reads `columns` of the Parquet file `path`, whole where `None`.
///
/// # Errors
/// [`ArchiveError`] where it cannot be read, lacks a column, holds no row, or is of a newer layout.
pub(super) fn read(path: &Path, columns: Option<&[&str]>) -> Result<DataFrame, ArchiveError> {
    let bytes = std::fs::read(path).map_err(super::error::reading(path))?;
    let wanted = columns.map(|columns| columns.iter().map(|one| (*one).to_owned()).collect());
    let read = |columns: Option<Vec<String>>| {
        ParquetReader::new(Cursor::new(bytes.as_slice()))
            .read_parallel(ParallelStrategy::None)
            .with_columns(columns)
            .finish()
    };
    let unreadable = |why: String| ArchiveError::Unreadable {
        file: shown(path),
        why,
    };
    let frame = match read(wanted) {
        Ok(frame) => frame,
        // A newer layout may have other columns: that is said rather than which one is missing.
        Err(fault) => match read(Some(vec![LAYOUT_COLUMN.to_owned()])) {
            Ok(frame) => {
                check_layout(&frame, path)?;
                return Err(unreadable(first_line(&fault)));
            }
            Err(_) => return Err(unreadable(first_line(&fault))),
        },
    };
    check_layout(&frame, path)?;
    Ok(frame)
}

/// A Parquet file of another engine as CSV, figures in their shortest exact form.
///
/// # Errors
/// [`ArchiveError`] where it cannot be read.
pub(super) fn as_csv(path: &Path) -> Result<Vec<u8>, ArchiveError> {
    let bytes = std::fs::read(path).map_err(super::error::reading(path))?;
    let mut text = Vec::new();
    ParquetReader::new(Cursor::new(bytes.as_slice()))
        .finish()
        .and_then(|mut frame| CsvWriter::new(&mut text).finish(&mut frame))
        .map_err(|fault| ArchiveError::Unreadable {
            file: shown(path),
            why: first_line(&fault),
        })?;
    Ok(text)
}

fn check_layout(frame: &DataFrame, path: &Path) -> Result<(), ArchiveError> {
    let found = i64s(frame, LAYOUT_COLUMN).ok().and_then(|one| one.get(0));
    match found {
        None => Err(ArchiveError::Unreadable {
            file: shown(path),
            why: "it states no layout in its column `layout`".to_owned(),
        }),
        Some(found) if found > LAYOUT => Err(ArchiveError::Newer {
            file: shown(path),
            found,
            known: LAYOUT,
        }),
        Some(_) => Ok(()),
    }
}

fn first_line(fault: &PolarsError) -> String {
    let text = fault.to_string();
    crate::text::printable(
        text.lines().next().unwrap_or(""),
        &crate::text::Alphabet::Any,
    )
}

/// A column of text.
pub(super) fn texts<'f>(
    frame: &'f DataFrame,
    name: &str,
) -> Result<&'f StringChunked, PolarsError> {
    frame.column(name)?.str()
}

/// A column of numbers.
pub(super) fn f64s<'f>(
    frame: &'f DataFrame,
    name: &str,
) -> Result<&'f Float64Chunked, PolarsError> {
    frame.column(name)?.f64()
}

/// A column of whole numbers.
pub(super) fn i64s<'f>(frame: &'f DataFrame, name: &str) -> Result<&'f Int64Chunked, PolarsError> {
    frame.column(name)?.i64()
}

/// A table being put together, one row after the other; every column is as long as there are rows.
#[derive(Default)]
pub(super) struct Columns(Vec<Column>);

impl Columns {
    /// The same value in every row.
    pub(super) fn same<T>(mut self, name: &'static str, value: T, rows: usize) -> Self
    where
        T: Clone,
        Vec<T>: IntoColumn,
    {
        self.0.push(vec![value; rows].into_column(name));
        self
    }

    /// A value of each row.
    pub(super) fn each<R, T>(mut self, name: &'static str, rows: &[R], of: impl Fn(&R) -> T) -> Self
    where
        Vec<T>: IntoColumn,
    {
        self.0
            .push(rows.iter().map(of).collect::<Vec<T>>().into_column(name));
        self
    }

    /// The table.
    ///
    /// # Errors
    /// Where two columns share a name.
    pub(super) fn frame(self) -> Result<DataFrame, PolarsError> {
        DataFrame::new_infer_height(self.0)
    }
}

/// What a column can be made of.
pub(super) trait IntoColumn {
    fn into_column(self, name: &'static str) -> Column;
}

macro_rules! into_column {
    ($($of:ty),*) => {$(
        impl IntoColumn for Vec<$of> {
            fn into_column(self, name: &'static str) -> Column {
                Column::new(name.into(), self)
            }
        }
    )*};
}

into_column!(
    i64,
    bool,
    f64,
    String,
    Option<i64>,
    Option<f64>,
    Option<String>,
    Option<bool>
);

/// The word an enum of the record has in `result.json`.
pub(super) fn word(value: &impl Serialize) -> Option<String> {
    let json = serde_json::to_value(value).ok()?;
    json.as_str().map(str::to_owned)
}

/// What `word` wrote, read back.
pub(super) fn unword<T: DeserializeOwned>(word: &str) -> Option<T> {
    serde_json::from_value(word.into()).ok()
}
