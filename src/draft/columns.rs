//! Which column is which, from names, units and what the columns hold.

use crate::export::{UnitWord, unit_in_name, unit_word};
use crate::units::{ForceUnit, LengthUnit};

use super::DraftError;
use super::form::{Form, number};
use super::sheet::shown;

/// Words of column names, best first.
const LOAD: [&str; 9] = [
    "load", "force", "kraft", "last", "fuerza", "carga", "charge", "effort", "forza",
];
const TRAVEL: [&str; 16] = [
    "length",
    "länge",
    "height",
    "höhe",
    "deflection",
    "federweg",
    "weg",
    "travel",
    "displacement",
    "position",
    "extension",
    "compression",
    "stroke",
    "course",
    "carrera",
    "corsa",
];
const TIME: [&str; 6] = ["time", "zeit", "elapsed", "temps", "tiempo", "tempo"];
const SPRING: [&str; 13] = [
    "spring", "feder", "specimen", "sample", "probe", "part", "piece", "teil", "ressort", "muelle",
    "molla", "serial", "test no",
];

/// The columns of an export, with the reason for each guess.
#[derive(Clone, Debug)]
pub struct Columns {
    /// Name and unit of the load column.
    pub load: (String, ForceUnit),
    /// Name and unit of the travel column.
    pub travel: (String, LengthUnit),
    /// The column of time in seconds.
    pub time: Option<String>,
    /// The column of spring names.
    pub spring: Option<String>,
    /// Reasons for load, travel, time and spring.
    pub why: [String; 4],
    /// What speaks against a guess, for each of them.
    pub doubts: [Vec<String>; 4],
}

/// One column as it looks.
struct Seen<'f> {
    name: &'f str,
    unit: Option<UnitWord>,
    values: Option<Vec<f64>>,
    /// Whether its cells change with nearly every row.
    steps: bool,
}

impl Seen<'_> {
    fn says(&self, words: &[&str]) -> Option<usize> {
        let lower = self.name.to_lowercase();
        let place = words.iter().position(|word| lower.contains(word));
        place.map(|place| words.len() - place)
    }

    fn moves(&self) -> bool {
        let Some(values) = &self.values else {
            return false;
        };
        values
            .windows(2)
            .any(|pair| matches!(pair, [a, b] if a.to_bits() != b.to_bits()))
    }
}

fn seen(form: &Form) -> Vec<Seen<'_>> {
    let column =
        |(place, name): (usize, &'_ String)| -> (usize, Option<UnitWord>, Option<Vec<f64>>) {
            let unit = form
                .units
                .get(place)
                .and_then(|cell| unit_word(cell))
                .or_else(|| unit_in_name(name));
            let values = form
                .rows
                .iter()
                .map(|row| number(row.get(place)?, form.decimal))
                .collect();
            (place, unit, values)
        };
    form.names
        .iter()
        .enumerate()
        .map(column)
        .filter_map(|(place, unit, values)| {
            let name = form.names.get(place)?;
            let cells = || form.rows.iter().filter_map(|row| row.get(place));
            let changes = cells().zip(cells().skip(1)).filter(|(a, b)| a != b).count();
            let steps = changes * 2 > form.rows.len();
            Some(Seen {
                name,
                unit,
                values,
                steps,
            })
        })
        .collect()
}

/// The columns of an export written in `form`.
///
/// # Errors
/// [`DraftError::NoColumn`] where load or travel cannot be told.
pub fn columns(form: &Form) -> Result<Columns, DraftError> {
    let all = seen(form);
    let mut doubts: [Vec<String>; 4] = Default::default();
    let [of_load, of_travel, of_time, of_spring] = &mut doubts;
    let (time, why_time) = time(&all, of_time);
    let spring = spring(&all, of_spring);
    let taken = |seen: &Seen<'_>| Some(seen.name) == time || Some(seen.name) == spring;
    let free: Vec<&Seen<'_>> = all
        .iter()
        .filter(|seen| !taken(seen) && seen.moves())
        .collect();
    let no_column = |role| DraftError::NoColumn {
        name: form.name.clone(),
        role,
        known: form
            .names
            .iter()
            .map(|name| format!("`{}`", shown(name)))
            .collect::<Vec<_>>()
            .join(", "),
    };
    let is_force = |seen: &&&Seen<'_>| matches!(seen.unit, Some(UnitWord::Force(_)));
    let is_length = |seen: &&&Seen<'_>| matches!(seen.unit, Some(UnitWord::Length(_)));
    let load = best(&free, &LOAD, is_force, is_length, of_load);
    let load = load.or_else(|| by_shape(&free, of_load));
    let load = load.ok_or_else(|| no_column("load"))?;
    let rest: Vec<&Seen<'_>> = free
        .into_iter()
        .filter(|seen| seen.name != load.name)
        .collect();
    let travel = best(&rest, &TRAVEL, is_length, is_force, of_travel);
    let travel = travel.or_else(|| only(&rest, of_travel));
    let travel = travel.ok_or_else(|| no_column("travel"))?;
    let force = force_of(load, of_load);
    let length = length_of(travel, of_travel);
    for (role, name) in [(0, load.name), (1, travel.name)] {
        if form.names.iter().filter(|other| *other == name).count() > 1
            && let Some(doubts) = doubts.get_mut(role)
        {
            doubts.push(
                "two columns have this name; give them different ones in the tester's settings"
                    .to_owned(),
            );
        }
    }
    let spring_why = match spring {
        Some(name) => format!(
            "`{}` speaks of springs, and its cells change where a measurement begins",
            shown(name)
        ),
        None => "no column names springs: one file, one spring".to_owned(),
    };
    Ok(Columns {
        why: [why(load, &LOAD), why(travel, &TRAVEL), why_time, spring_why],
        load: (load.name.to_owned(), force),
        travel: (travel.name.to_owned(), length),
        time: time.map(str::to_owned),
        spring: spring.map(str::to_owned),
        doubts,
    })
}

fn force_of(load: &Seen<'_>, doubts: &mut Vec<String>) -> ForceUnit {
    if let Some(UnitWord::Force(unit)) = load.unit {
        return unit;
    }
    doubts.push("the export states no unit known here for the load; N is assumed, and a wrong unit is a wrong verdict".to_owned());
    ForceUnit::Newton
}

fn length_of(travel: &Seen<'_>, doubts: &mut Vec<String>) -> LengthUnit {
    if let Some(UnitWord::Length(unit)) = travel.unit {
        return unit;
    }
    doubts.push("the export states no unit known here for the travel; mm is assumed, and a wrong unit is a wrong verdict".to_owned());
    LengthUnit::Millimetre
}

/// The column whose name and unit fit best; others that fit are a doubt.
fn best<'f, 'a>(
    all: &[&'f Seen<'a>],
    words: &[&str],
    fits: impl Fn(&&&Seen<'a>) -> bool,
    contradicts: impl Fn(&&&Seen<'a>) -> bool,
    doubts: &mut Vec<String>,
) -> Option<&'f Seen<'a>> {
    let score = |seen: &&&Seen<'a>| {
        let word = seen.says(words).unwrap_or(0);
        if contradicts(seen) {
            0
        } else {
            word + if fits(seen) { 2 * words.len() } else { 0 }
        }
    };
    let most = all
        .iter()
        .map(|seen| score(&seen))
        .max()
        .filter(|most| *most > 0)?;
    let chosen = all.iter().find(|seen| score(seen) == most)?;
    let others: Vec<String> = all
        .iter()
        .filter(|seen| score(seen) > 0 && seen.name != chosen.name)
        .map(|seen| format!("`{}`", shown(seen.name)))
        .collect();
    if !others.is_empty() {
        doubts.push(format!("{} would fit too", others.join(", ")));
    }
    Some(*chosen)
}

/// Of two columns without words and units, the load is the one that stands still at the start, in the air.
fn by_shape<'f, 'a>(all: &[&'f Seen<'a>], doubts: &mut Vec<String>) -> Option<&'f Seen<'a>> {
    let [a, b] = all else { return None };
    let early = |seen: &Seen<'_>| {
        let values = seen.values.as_ref()?;
        let low = values.iter().copied().fold(f64::INFINITY, f64::min);
        let high = values.iter().copied().fold(f64::NEG_INFINITY, f64::max);
        let first = values.first()?;
        let fifth = values.get(values.len() / 20)?;
        Some(((fifth - first) / (high - low)).abs())
    };
    doubts.push("neither name nor unit tells the load: of two columns, it is the one that moves less at the start".to_owned());
    Some(if early(a)? < early(b)? { *a } else { *b })
}

/// The only column left.
fn only<'f, 'a>(all: &[&'f Seen<'a>], doubts: &mut Vec<String>) -> Option<&'f Seen<'a>> {
    let [one] = all else { return None };
    doubts.push(
        "neither name nor unit tells the travel: it is the one column of numbers left".to_owned(),
    );
    Some(*one)
}

fn time<'f>(all: &[Seen<'f>], doubts: &mut Vec<String>) -> (Option<&'f str>, String) {
    let named = |seen: &&Seen<'_>| {
        seen.says(&TIME).is_some()
            || seen.name.trim().to_lowercase() == "t"
            || seen.unit == Some(UnitWord::Seconds)
    };
    let Some(found) = all.iter().find(named) else {
        return (None, String::new());
    };
    let grows = found.values.as_ref().is_some_and(|values| {
        values
            .windows(2)
            .all(|pair| matches!(pair, [a, b] if a <= b))
    });
    if !grows {
        doubts.push(format!(
            "`{}` speaks of time, but runs back or holds other things than numbers; it is left out",
            shown(found.name)
        ));
        return (None, String::new());
    }
    if found.unit.is_some_and(|unit| unit != UnitWord::Seconds) {
        doubts.push(format!(
            "`{}` is in another unit than seconds; it is left out",
            shown(found.name)
        ));
        return (None, String::new());
    }
    (
        Some(found.name),
        format!("`{}` speaks of time and never runs back", shown(found.name)),
    )
}

fn spring<'f>(all: &[Seen<'f>], doubts: &mut Vec<String>) -> Option<&'f str> {
    // `Federweg` speaks of a travel, and a count of points names no springs: its cells stand together where one goes on.
    let other = |seen: &Seen<'_>| {
        seen.unit.is_some()
            || seen.says(&LOAD).is_some()
            || seen.says(&TRAVEL).is_some()
            || seen.steps
    };
    let mut named = all
        .iter()
        .filter(|seen| seen.says(&SPRING).is_some() && !other(seen));
    let found = named.next()?;
    if let Some(other) = named.next() {
        doubts.push(format!("`{}` would fit too", shown(other.name)));
    }
    Some(found.name)
}

fn why(seen: &Seen<'_>, words: &[&str]) -> String {
    let name = shown(seen.name);
    match (seen.says(words), seen.unit) {
        (Some(_), Some(_)) => format!("the name `{name}` says so, and so does its unit"),
        (Some(_), None) => format!("the name `{name}` says so"),
        (None, Some(_)) => format!("the unit of `{name}` says so"),
        (None, None) => format!("`{name}` is what is left"),
    }
}
