//! The one place that opens TOML: unknown keys are refused with the nearest known one, and all faults of meaning of
//! a file are collected. Elsewhere: what a table answers (`table`).

use std::cell::RefCell;
use std::ops::Range;

use toml::de::{DeTable, DeValue};

use super::table::Table;
use super::{Alphabet, Fault, Faults, Place, Source, printable};

/// The keys each table of a file may hold; the table's path as the first entry, `""` for the root.
pub type Keys = &'static [(&'static str, &'static [&'static str])];

pub(super) struct Reader<'a> {
    source: &'a Source,
    pub(super) keys: Keys,
    faults: RefCell<Vec<Fault>>,
}

/// Reads a TOML file by `build`, which asks the root table for what it needs and notes every fault there.
///
/// # Errors
/// [`Faults`]: one fault of grammar, or every unknown key and every fault of meaning together.
pub fn read_toml<T>(
    source: &Source,
    keys: Keys,
    build: impl FnOnce(Table<'_>) -> Option<T>,
) -> Result<T, Faults> {
    let root = DeTable::parse(&source.text).map_err(|fault| {
        let place = fault
            .span()
            .map(|span| Place::in_text(&source.name, &source.text, span));
        let message = printable(fault.message(), &Alphabet::Any);
        Faults::new(
            &source.name,
            vec![Fault::new(message, "mend the TOML at this place", place)],
        )
    })?;
    let reader = Reader {
        source,
        keys,
        faults: RefCell::default(),
    };
    reader.refuse_unknown(root.get_ref(), "");
    let answer = build(Table::root(&reader, root.get_ref()));
    let faults = reader.faults.into_inner();
    match answer {
        Some(whole) if faults.is_empty() => Ok(whole),
        _ => Err(Faults::new(&source.name, faults)),
    }
}

impl Reader<'_> {
    /// Where the first line ends: what is missing at the top of a file is shown there.
    pub(super) fn first_line_end(&self) -> usize {
        self.source.text.lines().next().map_or(0, str::len)
    }

    pub(super) fn fault(&self, span: Range<usize>, message: &str, help: String) {
        let place = Place::in_text(&self.source.name, &self.source.text, span);
        self.faults.borrow_mut().push(Fault::new(
            printable(message, &Alphabet::Any),
            help,
            Some(place),
        ));
    }

    fn refuse_unknown(&self, table: &DeTable<'_>, path: &str) {
        let Some((_, known)) = self.keys.iter().find(|(place, _)| *place == path) else {
            return;
        };
        for (key, value) in table {
            let name = key.get_ref().as_ref();
            if !known.contains(&name) && !known.contains(&"*") {
                self.fault(
                    key.span(),
                    &format!("unknown key `{name}`{}", within(path)),
                    self.advice(name, path, known),
                );
                continue;
            }
            let inner = if path.is_empty() {
                name.to_owned()
            } else {
                format!("{path}.{name}")
            };
            match value.get_ref() {
                DeValue::Table(table) => self.refuse_unknown(table, &inner),
                DeValue::Array(items) => {
                    for item in items {
                        if let DeValue::Table(table) = item.get_ref() {
                            self.refuse_unknown(table, &inner);
                        }
                    }
                }
                _ => {}
            }
        }
    }

    fn advice(&self, name: &str, path: &str, known: &[&str]) -> String {
        let elsewhere = self
            .keys
            .iter()
            .find(|(place, keys)| *place != path && keys.contains(&name));
        if let Some((place, _)) = elsewhere {
            let home = if place.is_empty() {
                "at the top of the file".to_owned()
            } else {
                format!("under `{place}`")
            };
            return format!("`{name}` belongs {home}");
        }
        match nearest(name, known) {
            Some(near) => format!("did you mean `{near}`?"),
            None => format!("known here: {}", known.join(", ")),
        }
    }
}

pub(super) fn within(path: &str) -> String {
    if path.is_empty() {
        String::new()
    } else {
        format!(" in `{path}`")
    }
}

pub(super) fn nearest<'k>(name: &str, known: &[&'k str]) -> Option<&'k str> {
    let scored = known
        .iter()
        .map(|key| (strsim::damerau_levenshtein(name, key), *key));
    scored
        .min_by_key(|(distance, _)| *distance)
        .filter(|(distance, key)| *distance <= 1 + key.len() / 3)
        .map(|(_, key)| key)
}
