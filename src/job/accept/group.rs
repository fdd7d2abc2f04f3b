//! Readings as springs: repeats beside their first measurement, in natural order of the ids.

use std::collections::{HashMap, HashSet};

use crate::intake::{Lot, natural_order};
use crate::record::RepeatFacts;
use crate::text::{Alphabet, At, Fault, Faults, Place, printable};
use crate::verdict::Overall;

use super::super::read::Reading;
use super::error::AcceptError;
use super::springs::Judged;

/// One spring with all its measurements.
pub(super) struct Spring {
    /// The spring's id, printable; two springs are the same where this is.
    pub(super) id: String,
    /// Those that count, the first one first.
    pub(super) readings: Vec<Reading>,
    /// Those set aside as invalid.
    set_aside: Vec<Reading>,
    /// All of them, as the report lists them.
    pub(super) measurements: Vec<RepeatFacts>,
}

/// Groups readings into springs; `by_column` says that exports name their springs in a column.
///
/// # Errors
/// Where one spring is measured twice without a repeat entry, or the lot is smaller than its sample.
pub(super) fn springs(
    lot: &Lot,
    readings: Vec<Reading>,
    by_column: bool,
) -> miette::Result<Vec<Spring>> {
    let (first, again) = split(lot, readings);
    let mut springs: Vec<Spring> = Vec::new();
    let mut places: HashMap<String, usize> = HashMap::new();
    for reading in first {
        if let Some(known) = places
            .get(&reading.id)
            .and_then(|place| springs.get(*place))
        {
            return Err(twice(known, &reading).into());
        }
        places.insert(reading.id.clone(), springs.len());
        let measurements = vec![RepeatFacts {
            export: reading.export.clone(),
            reason: None,
            invalid: None,
        }];
        springs.push(Spring {
            id: reading.id.clone(),
            readings: vec![reading],
            set_aside: Vec::new(),
            measurements,
        });
    }
    add_repeats(lot, &mut springs, &places, again, by_column)?;
    check_size(lot, springs.len())?;
    let findings = lot
        .findings
        .iter()
        .map(|one| (&one.spring, "a [[finding]]"));
    for (spring, by) in findings.chain(lot.sample.iter().map(|one| (one, "the sample"))) {
        if !places.contains_key(&printed(&spring.value)) {
            return Err(unknown(lot, spring, by, &springs).into());
        }
    }
    refuse_copies(
        springs
            .iter()
            .flat_map(|spring| spring.readings.iter().chain(&spring.set_aside)),
    )?;
    springs.sort_by(|a, b| natural_order(&a.id, &b.id));
    Ok(springs)
}

/// Readings of the lot's own exports, and those of its repeats.
fn split(lot: &Lot, readings: Vec<Reading>) -> (Vec<Reading>, Vec<Reading>) {
    let repeats: Vec<String> = lot
        .repeats
        .iter()
        .map(|repeat| printed(&repeat.export.written))
        .collect();
    let exports: Vec<String> = lot
        .exports
        .iter()
        .map(|export| printed(&export.written))
        .collect();
    readings.into_iter().partition(|reading| {
        exports.contains(&reading.export) || !repeats.contains(&reading.export)
    })
}

/// A name from a file as springs and exports are told apart by it.
pub(super) fn printed(text: &str) -> String {
    printable(text.trim(), &Alphabet::Any)
}

fn twice(known: &Spring, second: &Reading) -> AcceptError {
    let (first, first_lines) = known
        .readings
        .first()
        .map_or((String::new(), (0, 0)), |one| {
            (one.export.clone(), one.lines)
        });
    AcceptError::Twice {
        spring: second.id.clone(),
        first,
        first_lines,
        second: second.export.clone(),
        second_lines: second.lines,
    }
}

/// A spring that the lot file names and no export holds, shown at its place.
fn unknown(lot: &Lot, spring: &At<String>, by: &str, springs: &[Spring]) -> Faults {
    let place = Place::in_text(&lot.source.name, &lot.source.text, spring.span.clone());
    let what = format!(
        "{by} names spring `{}`, but no export holds it",
        printed(&spring.value)
    );
    let help = format!("springs here: {}", known(springs));
    Faults::new(&lot.source.name, vec![Fault::new(what, help, Some(place))])
}

/// The first ids, for help.
pub(super) fn known(springs: &[Spring]) -> String {
    let ids: Vec<&str> = springs.iter().take(20).map(|one| one.id.as_str()).collect();
    ids.join(", ")
}

/// No two measurements agree in every digit: where they do, one is a copy.
fn refuse_copies<'a>(readings: impl Iterator<Item = &'a Reading>) -> Result<(), AcceptError> {
    let mut seen: HashMap<u64, &Reading> = HashMap::new();
    for reading in readings {
        if let Some(first) = seen.insert(reading.fingerprint, reading) {
            return Err(AcceptError::SamePoints {
                first: first.id.clone(),
                first_export: first.export.clone(),
                second: reading.id.clone(),
                second_export: reading.export.clone(),
            });
        }
    }
    Ok(())
}

fn add_repeats(
    lot: &Lot,
    springs: &mut [Spring],
    places: &HashMap<String, usize>,
    mut again: Vec<Reading>,
    by_column: bool,
) -> miette::Result<()> {
    for repeat in &lot.repeats {
        let export = printed(&repeat.export.written);
        let (of_this, rest): (Vec<Reading>, Vec<Reading>) = again
            .into_iter()
            .partition(|reading| reading.export == export);
        again = rest;
        let found = of_this.len();
        let Ok([reading]) = <[Reading; 1]>::try_from(of_this) else {
            let spring = printed(&repeat.spring.value);
            return Err(AcceptError::RepeatOfMany {
                spring,
                export,
                found,
            }
            .into());
        };
        let spring = printed(&repeat.spring.value);
        let Some(place) = places.get(&spring) else {
            return Err(unknown(lot, &repeat.spring, "a [[repeat]]", springs).into());
        };
        if by_column && reading.id != spring {
            let found = reading.id;
            return Err(AcceptError::RepeatOfOther {
                spring,
                export,
                found,
            }
            .into());
        }
        let Some(spring) = springs.get_mut(*place) else {
            continue;
        };
        if let Some(why) = &repeat.invalid {
            spring.set_aside.append(&mut spring.readings);
            for earlier in spring
                .measurements
                .iter_mut()
                .filter(|one| one.invalid.is_none())
            {
                earlier.invalid = Some(why.clone());
            }
        }
        spring.measurements.push(RepeatFacts {
            export,
            reason: Some(repeat.reason.clone()),
            invalid: None,
        });
        spring.readings.push(reading);
    }
    Ok(())
}

fn check_size(lot: &Lot, measured: usize) -> Result<(), Faults> {
    if measured as u64 <= lot.size.value {
        return Ok(());
    }
    let place = Place::in_text(&lot.source.name, &lot.source.text, lot.size.span.clone());
    let what = format!(
        "the lot is said to hold {} springs, but {measured} were measured",
        lot.size.value
    );
    Err(Faults::new(
        &lot.source.name,
        vec![Fault::new(
            what,
            "mend the size of the lot, or the exports",
            Some(place),
        )],
    ))
}

/// Springs with what holds for each, in order.
pub(super) type Ordered = Vec<(String, Overall)>;

/// The springs that may form the sample, in its order, and those that may not: where the lot file lists a `sample`, only
/// its springs may, as listed; else all, by id.
///
/// # Errors
/// Where `sample` names a spring twice.
pub(super) fn sample_order(lot: &Lot, judged: &[Judged]) -> Result<(Ordered, Ordered), Faults> {
    let entry = |one: &Judged| (one.result.id.clone(), one.overall.clone());
    if lot.sample.is_empty() {
        return Ok((judged.iter().map(entry).collect(), Vec::new()));
    }
    let by_id: HashMap<&str, &Judged> = judged
        .iter()
        .map(|one| (one.result.id.as_str(), one))
        .collect();
    let mut listed = Vec::new();
    let mut taken: HashSet<String> = HashSet::new();
    for wanted in &lot.sample {
        let id = printed(&wanted.value);
        if !taken.insert(id.clone()) {
            let place = Place::in_text(&lot.source.name, &lot.source.text, wanted.span.clone());
            let what = format!("spring `{id}` stands twice in the sample");
            let fault = Fault::new(what, "name each spring once", Some(place));
            return Err(Faults::new(&lot.source.name, vec![fault]));
        }
        listed.extend(by_id.get(id.as_str()).map(|one| entry(one)));
    }
    let rest = judged.iter().filter(|one| !taken.contains(&one.result.id));
    Ok((listed, rest.map(entry).collect()))
}
