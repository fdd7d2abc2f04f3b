//! Tables in memory and as Parquet, by polars.

use std::io::{self, Cursor, Write};
use std::path::Path;

use polars::prelude::{
    BooleanChunked, Column, CompatLevel, CsvWriter, DataFrame, Float64Chunked, Int64Chunked,
    KeyValueMetadata, ParallelStrategy, ParquetCompression, ParquetReader, ParquetWriter,
    PolarsError, SchemaExt, SerReader, SerWriter, StringChunked,
};
use polars_parquet::write::schema_to_metadata_key;
use serde::Serialize;
use serde::de::DeserializeOwned;

use super::error::{ArchiveError, shown};
use super::place::LAYOUT;

/// The column that says which layout a file has; every layout has it.
pub(super) const LAYOUT_COLUMN: &str = "layout";

/// Writes a table as Parquet, compressed by snappy, which every engine reads.
///
/// polars would note its own form of text in the file, which other engines read as a form they can do little with: the note
/// says plain text instead.
pub(super) fn write(frame: &mut DataFrame, out: &mut impl Write) -> io::Result<()> {
    let plain = schema_to_metadata_key(&frame.schema().to_arrow(CompatLevel::oldest()));
    let note = vec![(plain.key, plain.value.unwrap_or_default())];
    ParquetWriter::new(out)
        .with_compression(ParquetCompression::Snappy)
        .with_key_value_metadata(Some(KeyValueMetadata::from_static(note)))
        .finish(frame)
        .map(|_| ())
        .map_err(|fault| match fault {
            PolarsError::IO { error, .. } => io::Error::new(error.kind(), error.to_string()),
            other => io::Error::other(other.to_string()),
        })
}

/// `columns` of the table in `bytes`, the Parquet file `path`; all where `None`.
///
/// # Errors
/// [`ArchiveError`] where it cannot be read, lacks a column, holds no row, or is of a newer layout.
pub(super) fn read(
    bytes: &[u8],
    path: &Path,
    columns: Option<&[&str]>,
) -> Result<DataFrame, ArchiveError> {
    let unreadable = |why: String| ArchiveError::Unreadable {
        file: shown(path),
        why,
    };
    let frame = match parquet(bytes, columns) {
        Ok(frame) => frame,
        Err(why) => {
            // A newer layout may have other columns: that is said rather than which one is missing.
            if let Ok(frame) = parquet(bytes, Some(&[LAYOUT_COLUMN])) {
                check_layout(&frame, path)?;
            }
            return Err(unreadable(why));
        }
    };
    check_layout(&frame, path)?;
    Ok(frame)
}

/// polars panics on some damaged files; here that is a fault as any other.
fn parquet(bytes: &[u8], columns: Option<&[&str]>) -> Result<DataFrame, String> {
    let wanted = columns.map(|columns| columns.iter().map(|one| (*one).to_owned()).collect());
    let read = || {
        ParquetReader::new(Cursor::new(bytes))
            .read_parallel(ParallelStrategy::None)
            .with_columns(wanted)
            .finish()
    };
    match std::panic::catch_unwind(std::panic::AssertUnwindSafe(read)) {
        Ok(Ok(frame)) => Ok(frame),
        Ok(Err(fault)) => Err(first_line(&fault)),
        Err(_) => Err("it is damaged".to_owned()),
    }
}

/// A Parquet file of another engine as CSV, figures in their shortest exact form.
///
/// # Errors
/// [`ArchiveError`] where it cannot be read.
pub(super) fn as_csv(path: &Path) -> Result<Vec<u8>, ArchiveError> {
    let unreadable = |why: String| ArchiveError::Unreadable {
        file: shown(path),
        why,
    };
    let bytes = std::fs::read(path).map_err(super::error::reading(path))?;
    let mut frame = parquet(&bytes, None).map_err(unreadable)?;
    let mut text = Vec::new();
    let written = CsvWriter::new(&mut text).finish(&mut frame);
    written.map_err(|fault| unreadable(first_line(&fault)))?;
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

/// A column of yes and no.
pub(super) fn bools<'f>(
    frame: &'f DataFrame,
    name: &str,
) -> Result<&'f BooleanChunked, PolarsError> {
    frame.column(name)?.bool()
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
