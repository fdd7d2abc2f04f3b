//! Which column of this file is which, from its own header and units line.

use std::ops::Range;

use super::error::ExportError;
use super::labels::{Units, Wanted};
use super::lines::{Context, content};
use super::spot::show;
use crate::rig::{Dialect, Pushing, SpringFrom};

/// A line above the table, kept for what it says.
#[derive(Clone, Debug)]
pub(super) struct HeadLine {
    pub(super) number: u64,
    pub(super) text: String,
}

/// The columns of a file, by their position.
#[derive(Clone, Debug)]
pub(super) struct Layout {
    /// The names of all columns, as the header writes them.
    pub(super) names: Vec<String>,
    pub(super) load: usize,
    /// `None` where the rig file says at which length each column of loads was read.
    pub(super) travel: Option<usize>,
    /// Further columns of loads, one for every length after the first.
    pub(super) beside: Vec<usize>,
    pub(super) time: Option<usize>,
    pub(super) spring: Option<usize>,
}

const LOAD: &str = "load";
const TRAVEL: &str = "travel";
const TIME: &str = "time";
const SPRING: &str = "spring's name";

impl Layout {
    /// The layout of a file with these lines above its table.
    ///
    /// # Errors
    /// Columns that are missing, doubled or named twice; units that contradict the rig file or are none.
    pub(super) fn new(
        context: &Context<'_>,
        header: &HeadLine,
        units: Option<&HeadLine>,
    ) -> Result<Self, ExportError> {
        let header = Row::of(context, header)?;
        let layout = Self::find(context, &header)?;
        layout.check_header_units(context, &header)?;
        if let Some(units) = units {
            layout.check_units_line(context, &Row::of(context, units)?)?;
        }
        Ok(layout)
    }

    /// The layout of a file without a header, whose first line of cells is `first`: columns `1`, `2`, ….
    ///
    /// # Errors
    /// As [`Layout::new`].
    pub(super) fn numbered(
        context: &Context<'_>,
        first: &HeadLine,
        units: Option<&HeadLine>,
    ) -> Result<Self, ExportError> {
        let mut header = Row::of(context, first)?;
        let count = header.cells.len();
        header.names = (1..=count).map(|number| number.to_string()).collect();
        let layout = Self::find(context, &header)?;
        if let Some(units) = units {
            layout.check_units_line(context, &Row::of(context, units)?)?;
        }
        Ok(layout)
    }

    fn find(context: &Context<'_>, header: &Row<'_>) -> Result<Self, ExportError> {
        let dialect = context.dialect;
        let spring = match &dialect.spring {
            SpringFrom::FileName | SpringFrom::LineAfter(_) | SpringFrom::TableNumber => None,
            SpringFrom::Column(name) => Some(header.position(SPRING, name)?),
        };
        let time = dialect.time.as_ref();
        let wide = dialect.rarer.length_columns();
        let travel = wide.is_empty().then_some(&dialect.travel.column);
        let further = wide.iter().skip(1);
        let layout = Self {
            load: header.position(LOAD, &dialect.load.column)?,
            travel: travel
                .map(|name| header.position(TRAVEL, name))
                .transpose()?,
            beside: further
                .map(|one| header.position(LOAD, &one.column))
                .collect::<Result<_, _>>()?,
            time: time.map(|name| header.position(TIME, name)).transpose()?,
            spring,
            names: header.names.clone(),
        };
        layout.refuse_shared(header)?;
        Ok(layout)
    }

    fn roles(&self) -> impl Iterator<Item = (&'static str, usize)> {
        let some = [(LOAD, Some(self.load)), (TRAVEL, self.travel)];
        let more = [(TIME, self.time), (SPRING, self.spring)];
        let beside = self.beside.iter().map(|column| (LOAD, Some(*column)));
        some.into_iter()
            .chain(beside)
            .chain(more)
            .filter_map(|(role, column)| Some((role, column?)))
    }

    fn refuse_shared(&self, header: &Row<'_>) -> Result<(), ExportError> {
        let mut taken: Vec<(&'static str, usize)> = Vec::new();
        for (role, column) in self.roles() {
            if let Some((first, _)) = taken.iter().find(|(_, other)| *other == column) {
                return Err(ExportError::SharedColumn {
                    at: header.spot(column, self.name(column)),
                    first,
                    second: role,
                });
            }
            taken.push((role, column));
        }
        Ok(())
    }

    /// The name of a column.
    pub(super) fn name(&self, column: usize) -> &str {
        self.names.get(column).map_or("", String::as_str)
    }

    /// Whether a column holds numbers that are used.
    pub(super) fn is_number(&self, column: usize) -> bool {
        self.is_load(column) || [self.travel, self.time].contains(&Some(column))
    }

    /// Whether a column holds loads.
    fn is_load(&self, column: usize) -> bool {
        column == self.load || self.beside.contains(&column)
    }

    /// What a number of a column is multiplied by: its unit in N (pushing positive), mm or s.
    pub(super) fn factor(&self, column: usize, dialect: &Dialect) -> f64 {
        if self.is_load(column) {
            match dialect.load.pushing {
                Pushing::Positive => dialect.load.unit.newtons(),
                Pushing::Negative => -dialect.load.unit.newtons(),
            }
        } else if Some(column) == self.travel {
            match dialect.travel.pushing {
                Pushing::Positive => dialect.travel.unit.millimetres(),
                Pushing::Negative => -dialect.travel.unit.millimetres(),
            }
        } else {
            1.0
        }
    }

    fn units(&self, context: &Context<'_>) -> Vec<(usize, Wanted)> {
        let dialect = context.dialect;
        let loads = std::iter::once(self.load).chain(self.beside.iter().copied());
        let mut wanted: Vec<(usize, Wanted)> = loads
            .map(|column| (column, Wanted::Force(dialect.load.unit)))
            .collect();
        let travel = self.travel.into_iter();
        wanted.extend(travel.map(|column| (column, Wanted::Length(dialect.travel.unit))));
        wanted.extend(self.time.map(|time| (time, Wanted::Seconds)));
        wanted
    }

    fn check_header_units(
        &self,
        context: &Context<'_>,
        header: &Row<'_>,
    ) -> Result<(), ExportError> {
        for (column, wanted) in self.units(context) {
            let name = self.name(column);
            if let Some(found) = wanted.contradicted_by(name) {
                return Err(ExportError::UnitContradicts {
                    at: header.spot(column, name),
                    found: show(found),
                    wanted: wanted.symbol(),
                });
            }
        }
        Ok(())
    }

    fn check_units_line(&self, context: &Context<'_>, units: &Row<'_>) -> Result<(), ExportError> {
        for (column, wanted) in self.units(context) {
            let cell = units.names.get(column).map_or("", String::as_str);
            let at = || units.spot(column, self.name(column));
            let (found, wanted_symbol) = (show(cell.trim()), wanted.symbol());
            match wanted.against(cell) {
                Units::Agree => {}
                Units::Contradict => {
                    return Err(ExportError::UnitContradicts {
                        at: at(),
                        found,
                        wanted: wanted_symbol,
                    });
                }
                Units::None => {
                    return Err(ExportError::NoUnit {
                        at: at(),
                        found,
                        wanted: wanted_symbol,
                    });
                }
            }
        }
        Ok(())
    }
}

/// A line above the table, cut into cells.
struct Row<'c> {
    context: &'c Context<'c>,
    line: &'c HeadLine,
    cells: Vec<Range<usize>>,
    names: Vec<String>,
}

impl<'c> Row<'c> {
    fn of(context: &'c Context<'c>, line: &'c HeadLine) -> Result<Self, ExportError> {
        let cells = context.cells(line.number, &line.text)?;
        let quoted = context.dialect.quoted;
        let held = |cell: &Range<usize>| {
            let cell = line.text.get(cell.clone()).unwrap_or_default();
            content(cell, quoted).trim().to_owned()
        };
        Ok(Self {
            names: cells.iter().map(held).collect(),
            context,
            line,
            cells,
        })
    }

    fn spot(&self, column: usize, name: &str) -> super::spot::Spot {
        let end = self.line.text.len();
        let cell = self.cells.get(column).cloned().unwrap_or(end..end);
        self.context
            .spot(self.line.number, &self.line.text, cell, Some(name))
    }

    /// The one column called `name`.
    fn position(&self, role: &'static str, name: &str) -> Result<usize, ExportError> {
        let mut named = (0..)
            .zip(&self.names)
            .filter(|(_, cell)| *cell == name.trim());
        match (named.next(), named.next()) {
            (Some((column, _)), None) => Ok(column),
            (Some((first, _)), Some((second, _))) => Err(ExportError::DoubledColumn {
                at: self.spot(second, name),
                role,
                first: first + 1,
                second: second + 1,
            }),
            (None, _) => self.but_for_case(role, name),
        }
    }

    /// The one column called `name` but for capitals: testers change them from one version to the next.
    fn but_for_case(&self, role: &'static str, name: &str) -> Result<usize, ExportError> {
        let wanted = name.trim().to_lowercase();
        let alike = |cell: &&String| cell.to_lowercase() == wanted;
        let place = self.names.iter().position(|cell| alike(&cell));
        match place {
            Some(place) if self.names.iter().filter(alike).count() == 1 => Ok(place),
            _ => Err(self.unknown(role, name)),
        }
    }

    fn unknown(&self, role: &'static str, name: &str) -> ExportError {
        let known: Vec<String> = self
            .names
            .iter()
            .map(|cell| format!("`{}`", show(cell)))
            .collect();
        let quotes = self.names.iter().any(|cell| cell.contains('"'));
        let advice = if self.names.len() == 1 {
            "the line has one cell only: mend `delimiter` or `header_line` in the rig file"
                .to_owned()
        } else if quotes && !self.context.dialect.quoted {
            "the header is in quotes: write quoted = true in the rig file".to_owned()
        } else if let Some(near) = nearest(name, &self.names) {
            format!("did you mean `{}`?", show(near))
        } else {
            "mend the column's name or `header_line` in the rig file".to_owned()
        };
        ExportError::UnknownColumn {
            at: self.context.spot(
                self.line.number,
                &self.line.text,
                0..self.line.text.len(),
                None,
            ),
            role,
            wanted: show(name),
            known: known.join(", "),
            advice,
        }
    }
}

/// The name nearest to `name`, capitals aside, if one is near.
fn nearest<'n>(name: &str, names: &'n [String]) -> Option<&'n str> {
    let wanted = name.trim().to_lowercase();
    let scored = names.iter().filter(|known| !known.is_empty()).map(|known| {
        let lower = known.to_lowercase();
        let inside = lower
            .split(|letter: char| !letter.is_alphanumeric())
            .any(|word| word == wanted);
        let distance = strsim::damerau_levenshtein(&wanted, &lower);
        (if inside { 0 } else { distance }, known)
    });
    scored
        .min_by_key(|(distance, _)| *distance)
        .filter(|(distance, known)| *distance <= 1 + known.chars().count() / 3)
        .map(|(_, known)| known.as_str())
}
