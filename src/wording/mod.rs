//! A record's data as finished text: figures with their rounding, reasons, cautions, advice, names; and the fonts it is
//! printed in. Elsewhere: what a record means (`verdict`, `lot`), what stands where (`model`).

mod bench;
mod caution;
mod drawing;
mod drawing_rate;
mod figure;
pub(crate) mod font;
mod lot;
mod odd;
mod plan;
mod spring;
mod strength;
mod track;

pub(crate) use bench::{
    bench_caution, check_reason, component_word, finding, repeat_reason, serving_word,
};
pub(crate) use caution::{STANDING, caution};
pub(crate) use drawing::drawing_finding;
pub use figure::{
    ABSENT, Place, figure, freedom, number, per_unit, percent, probability, unit_symbol,
    with_uncertainty, with_unit,
};
pub(crate) use lot::{decided, decision_word, simple_line, terms, why};
pub(crate) use odd::odd_lines;
pub(crate) use plan::{compared, readings, settled_early, state};
pub(crate) use spring::{absence, advice, disposition, rule_used, verdict_reason, verdict_word};
pub(crate) use strength::{stress_limit, stress_place, stress_rule, stress_taken};
pub(crate) use track::{chance, chart, culprit, rule, step, tracked, trend};

use crate::quantity::{Quantity, Unit};
use crate::units::{Millimetres, System};

/// Names listed in a sentence before the rest is counted.
const LISTED: usize = 8;

/// The full name of a characteristic: `rate R`, `load F at 48 mm`, `free length L0`.
pub(crate) fn characteristic(name: &str, at: Option<Millimetres>, show_in: System) -> String {
    match Quantity::from_name(name, at) {
        Some(Quantity::LoadAt(length)) => {
            let at = with_unit(Some(length), Unit::Millimetre, Place::Stated, show_in);
            format!("load F at {at}")
        }
        Some(quantity) if quantity.symbol() != quantity.title() => {
            format!("{} {}", quantity.title(), quantity.symbol())
        }
        Some(quantity) => quantity.title().to_owned(),
        None => match at {
            Some(_) => format!("{name} at {}", length(at, show_in)),
            None => name.to_owned(),
        },
    }
}

/// The short name for a column head: `R`, `F at 48`, `L0`.
pub(crate) fn symbol(name: &str, at: Option<Millimetres>, show_in: System) -> String {
    match Quantity::from_name(name, at) {
        Some(Quantity::LoadAt(length)) => format!(
            "F at {}",
            figure(Some(length), Unit::Millimetre, Place::Stated, show_in)
        ),
        Some(quantity) => quantity.symbol().to_owned(),
        None => characteristic(name, at, show_in),
    }
}

/// A length as stated, with its unit.
pub(crate) fn length(value: Option<Millimetres>, show_in: System) -> String {
    with_unit(value, Unit::Millimetre, Place::Stated, show_in)
}

/// `3 springs`, `1 spring`.
pub(crate) fn count(number: impl Into<u64>, thing: &str) -> String {
    let number = number.into();
    if number == 1 {
        format!("1 {thing}")
    } else {
        format!("{number} {thing}s")
    }
}

/// Some names, the first eight of them in full: `3, 7 and 12`, `1, 2, … and 40 more`.
pub(crate) fn list(names: &[String]) -> String {
    let (shown, rest) = names.split_at(names.len().min(LISTED));
    if !rest.is_empty() {
        return format!("{} and {} more", shown.join(", "), rest.len());
    }
    match shown.split_last() {
        Some((last, [])) => last.clone(),
        Some((last, before)) => format!("{} and {last}", before.join(", ")),
        None => "none".to_owned(),
    }
}

/// `spring 7`, `springs 3, 7 and 12`.
pub(crate) fn springs(names: &[String]) -> String {
    let word = if names.len() == 1 {
        "spring"
    } else {
        "springs"
    };
    format!("{word} {}", list(names))
}

/// The text with its first letter in upper case.
pub(crate) fn sentence(text: &str) -> String {
    let mut characters = text.chars();
    characters.next().map_or_else(String::new, |first| {
        first.to_uppercase().chain(characters).collect()
    })
}

#[cfg(test)]
mod tests {
    #![expect(clippy::unwrap_used, clippy::indexing_slicing, reason = "tests")]
    use super::*;

    #[test]
    fn names_and_lists() {
        let at = Some(Millimetres::try_from(48.0).unwrap());
        assert_eq!(
            characteristic("load", at, System::MmN),
            "load F at 48\u{a0}mm"
        );
        assert_eq!(
            characteristic("free_length", None, System::MmN),
            "free length L0"
        );
        assert_eq!(
            characteristic("hysteresis", None, System::MmN),
            "hysteresis"
        );
        assert_eq!(symbol("load", at, System::InLbf), "F at 1.88976");
        let names: Vec<String> = (1..=50).map(|n| n.to_string()).collect();
        assert_eq!(list(&names), "1, 2, 3, 4, 5, 6, 7, 8 and 42 more");
        assert_eq!(springs(&names[..1]), "spring 1");
        assert_eq!(springs(&names[..3]), "springs 1, 2 and 3");
        assert_eq!(sentence("élan"), "Élan");
    }
}
