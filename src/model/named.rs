//! The springs of the sample by name: which fail or are undecided, by what, and what was seen on them.

use crate::quantity::{Class, Quantity};
use crate::record::{AcceptRecord, CharacteristicResult, Reason, SpringResult, Verdict};
use crate::units::{Finite, System};
use crate::wording;
use crate::wording::{Place, with_unit};

/// Findings by eye named on page one; the table of the springs has them all.
const SEEN: usize = 8;

/// Springs that share the characteristics they do not conform in, and the way they miss them.
struct Group<'a> {
    springs: Vec<String>,
    of: Vec<&'a CharacteristicResult>,
}

/// Lines for page one: failing springs, undecided springs, what was seen.
pub(crate) fn lines(record: &AcceptRecord, show_in: System) -> Vec<String> {
    let mut lines = Vec::new();
    for (verdict, word) in [
        (Verdict::Fails, "Failing"),
        (Verdict::Undecided, "Undecided"),
    ] {
        lines.extend(groups(record, verdict).iter().map(|group| {
            let missed: Vec<String> = group.of.iter().map(|of| missed(of, show_in)).collect();
            let springs = wording::springs(&group.springs);
            format!("{word}: {springs}: {}.", missed.join("; "))
        }));
    }
    lines.extend(seen(record));
    lines
}

/// Lines for the supplier: which springs, which characteristics, low or high.
pub(crate) fn short(record: &AcceptRecord) -> Vec<String> {
    let mut lines = Vec::new();
    for mut group in groups(record, Verdict::Fails) {
        while let Some(first) = group.of.first() {
            let reason = first.reason.clone();
            let (same, rest) = group.of.into_iter().partition(|of| of.reason == reason);
            group.of = rest;
            let springs = wording::sentence(&wording::springs(&group.springs));
            lines.push(format!("{springs}: {}.", sides(&same)));
        }
    }
    lines
}

/// `rate, loads and wire diameter below their lower limits`.
fn sides(same: &[&CharacteristicResult]) -> String {
    let loads = same.iter().filter(|of| of.at_length_mm.is_some()).count();
    let mut names: Vec<String> = Vec::new();
    for of in same {
        let name = match Quantity::from_name(&of.name, of.at_length_mm) {
            Some(Quantity::LoadAt(_)) if loads > 1 => "loads".to_owned(),
            Some(Quantity::LoadAt(_)) => "load".to_owned(),
            Some(quantity) => quantity.title().to_owned(),
            None => of.name.clone(),
        };
        if !names.contains(&name) {
            names.push(name);
        }
    }
    let side = match same.first().and_then(|of| of.reason.as_ref()) {
        Some(Reason::AboveUpper) => "above",
        _ => "below",
    };
    let bound = if side == "above" { "upper" } else { "lower" };
    let limits = if same.len() > 1 {
        format!("their {bound} limits")
    } else {
        format!("its {bound} limit")
    };
    format!("{} {side} {limits}", wording::list(&names))
}

/// Springs of the sample with this verdict, by what they miss, in the order of the drawing.
fn groups(record: &AcceptRecord, verdict: Verdict) -> Vec<Group<'_>> {
    let mut single: Vec<Group<'_>> = Vec::new();
    for spring in record.springs.iter().filter(|spring| spring.in_sample) {
        for of in spring.characteristics.iter().filter(|of| {
            of.verdict == Some(verdict) && (verdict == Verdict::Fails || open(spring, of))
        }) {
            match single.iter_mut().find(|group| alike(group, of)) {
                Some(group) => group.springs.push(spring.id.clone()),
                None => single.push(Group {
                    springs: vec![spring.id.clone()],
                    of: vec![of],
                }),
            }
        }
    }
    let mut groups: Vec<Group<'_>> = Vec::new();
    for one in single {
        match groups.iter_mut().find(|group| group.springs == one.springs) {
            Some(group) => group.of.extend(one.of),
            None => groups.push(one),
        }
    }
    groups
}

/// Whether what is undecided still matters: the spring fails nothing as grave.
fn open(spring: &SpringResult, of: &CharacteristicResult) -> bool {
    spring.failing_class < of.class
}

fn alike(group: &Group<'_>, of: &CharacteristicResult) -> bool {
    let kind = |of: &CharacteristicResult| of.reason.as_ref().map(std::mem::discriminant);
    group.of.first().is_some_and(|first| {
        first.name == of.name && first.at_length_mm == of.at_length_mm && kind(first) == kind(of)
    })
}

/// The characteristic and the limit concerned.
fn missed(of: &CharacteristicResult, show_in: System) -> String {
    let name = wording::characteristic(&of.name, of.at_length_mm, show_in);
    let limit = |value: Option<Finite>| with_unit(value, of.unit, Place::Stated, show_in);
    match &of.reason {
        Some(Reason::BelowLower | Reason::AboveUpper) => format!(
            "{name} {}",
            wording::verdict_reason(of, show_in).unwrap_or_default()
        ),
        Some(Reason::LowerWithinUncertainty) => format!(
            "{name}, the lower limit {} lies within the uncertainty",
            limit(of.lower)
        ),
        Some(Reason::UpperWithinUncertainty) => format!(
            "{name}, the upper limit {} lies within the uncertainty",
            limit(of.upper)
        ),
        Some(Reason::SolidNotReached { .. }) => {
            format!("{name}, the rise to solid was not reached")
        }
        Some(Reason::SolidBelowShortest { .. }) => {
            format!("{name}, below the shortest length reached")
        }
        Some(_) => format!(
            "{name}, {}",
            wording::verdict_reason(of, show_in).unwrap_or_default()
        ),
        None => name,
    }
}

/// What was seen, the same finding once for all springs that have it.
fn seen(record: &AcceptRecord) -> Vec<String> {
    let mut found: Vec<(&str, Class, Vec<String>)> = Vec::new();
    for spring in record.springs.iter().filter(|spring| spring.in_sample) {
        for one in &spring.findings {
            let known = found
                .iter_mut()
                .find(|known| known.0 == one.text && known.1 == one.class);
            match known {
                Some(known) => known.2.push(spring.id.clone()),
                None => found.push((&one.text, one.class, vec![spring.id.clone()])),
            }
        }
    }
    let left = found.len().saturating_sub(SEEN);
    let mut lines: Vec<String> = found
        .iter()
        .take(SEEN)
        .map(|(text, class, springs)| {
            let springs = wording::springs(springs);
            format!("Seen: {springs}, {text} ({}).", class.word())
        })
        .collect();
    if left > 0 {
        lines.push(format!("Seen: {left} more in the table of the springs."));
    }
    lines
}
