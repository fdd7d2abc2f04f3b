//! One table of a TOML file being read: every value knows its place, every wrong one is noted as a fault.
//! Elsewhere: opening the file and its unknown keys (`toml`).

use std::ops::Range;

use toml::de::{DeTable, DeValue};

use super::toml::{Reader, within};
use super::{Alphabet, printable};

/// A value and where it stands in the text.
#[derive(Clone, Debug)]
pub struct At<T> {
    /// The value.
    pub value: T,
    /// Bytes of the text it was read from.
    pub span: Range<usize>,
}

/// One table of a file being read; a missing table reads as an empty one.
#[derive(Clone, Copy)]
pub struct Table<'a> {
    reader: &'a Reader<'a>,
    items: Option<&'a DeTable<'a>>,
    path: &'static str,
    start: usize,
    end: usize,
}

impl<'a> Table<'a> {
    /// The root table of a file.
    pub(super) fn root(reader: &'a Reader<'a>, items: &'a DeTable<'a>) -> Self {
        let end = reader.first_line_end();
        Self {
            reader,
            items: Some(items),
            path: "",
            start: 0,
            end,
        }
    }

    /// Notes a fault at `span`.
    pub fn fault(&self, span: &Range<usize>, message: impl Into<String>, help: impl Into<String>) {
        self.reader
            .fault(span.clone(), &message.into(), help.into());
    }

    /// Notes that `key` is missing from this table.
    pub fn missing(&self, key: &str, help: impl Into<String>) {
        self.fault(
            &self.span(),
            format!("`{key}` is missing{}", within(self.path)),
            help,
        );
    }

    /// Where this table begins.
    pub fn span(&self) -> Range<usize> {
        self.start..self.end
    }

    /// Whether the file holds this table at all.
    pub fn is_present(&self) -> bool {
        self.items.is_some()
    }

    /// Whether the table holds `key`.
    pub fn has(&self, key: &str) -> bool {
        self.value(key).is_some()
    }

    pub(super) fn value(&self, key: &str) -> Option<(&'a DeValue<'a>, Range<usize>)> {
        debug_assert!(
            self.reader
                .keys
                .iter()
                .any(|(place, keys)| *place == self.path && keys.contains(&key)),
            "`{key}` is asked of `{}` but not listed there",
            self.path
        );
        let value = self.items?.get(key)?;
        Some((value.get_ref(), value.span()))
    }

    /// Where the value of `key` stands; this table's own place where it is missing.
    pub fn place(&self, key: &str) -> Range<usize> {
        self.value(key)
            .map_or_else(|| self.span(), |(_, span)| span)
    }

    pub(super) fn wrong(&self, key: &str, span: &Range<usize>, found: &DeValue<'_>, wanted: &str) {
        self.fault(
            span,
            format!("`{key}` is {} where {wanted} is wanted", article(found)),
            format!("write {wanted}"),
        );
    }

    fn sub_path(&self, key: &str) -> &'static str {
        let path = if self.path.is_empty() {
            key.to_owned()
        } else {
            format!("{}.{key}", self.path)
        };
        self.reader
            .keys
            .iter()
            .find(|(place, _)| *place == path)
            .map_or("?", |(place, _)| place)
    }

    /// The table under `key`; empty where it is missing.
    #[must_use]
    pub fn table(&self, key: &str) -> Self {
        let path = self.sub_path(key);
        let (items, span) = match self.value(key) {
            Some((DeValue::Table(items), span)) => (Some(items), span),
            Some((other, span)) => {
                self.wrong(key, &span, other, "a table");
                (None, span)
            }
            None => (None, self.span()),
        };
        Table {
            reader: self.reader,
            items,
            path,
            start: span.start,
            end: span.end,
        }
    }

    /// The tables under `[[key]]`.
    pub fn tables(&self, key: &str) -> Vec<Table<'a>> {
        let path = self.sub_path(key);
        let Some((value, span)) = self.value(key) else {
            return Vec::new();
        };
        let DeValue::Array(items) = value else {
            self.wrong(key, &span, value, "a list of tables");
            return Vec::new();
        };
        let mut tables = Vec::new();
        for item in items {
            match item.get_ref() {
                DeValue::Table(table) => tables.push(Table {
                    reader: self.reader,
                    items: Some(table),
                    path,
                    start: item.span().start,
                    end: item.span().end,
                }),
                other => self.wrong(key, &item.span(), other, "a table"),
            }
        }
        tables
    }

    /// Every key of this table with its text value (for free tags).
    pub fn all_texts(&self) -> Vec<(String, String)> {
        let mut texts = Vec::new();
        for (key, value) in self.items.into_iter().flatten() {
            match value.get_ref().as_str() {
                Some(text) => texts.push((
                    printable(key.get_ref(), &Alphabet::Any),
                    printable(text, &Alphabet::Any),
                )),
                None => self.wrong(
                    key.get_ref(),
                    &value.span(),
                    value.get_ref(),
                    "text in quotes",
                ),
            }
        }
        texts.sort();
        texts
    }
}

fn article(value: &DeValue<'_>) -> &'static str {
    match value {
        DeValue::String(_) => "text",
        DeValue::Integer(_) | DeValue::Float(_) => "a number",
        DeValue::Boolean(_) => "true or false",
        DeValue::Datetime(_) => "a date",
        DeValue::Array(_) => "a list",
        DeValue::Table(_) => "a table",
    }
}
