//! Ids that a person would read as the same: case, leading zeros, letters of another script, marks nobody sees.

use std::collections::BTreeMap;

use crate::record::Caution;

/// A caution naming the ids that look alike, where there are any.
pub(super) fn alike(ids: &[String]) -> Option<Caution> {
    let mut seen: BTreeMap<String, Vec<String>> = BTreeMap::new();
    for id in ids {
        seen.entry(plain(id)).or_default().push(id.clone());
    }
    let mut springs: Vec<String> = seen
        .into_values()
        .filter(|same| same.len() > 1)
        .flatten()
        .collect();
    for foreign in ids.iter().filter(|id| !id.is_ascii()) {
        let twin = ids.iter().find(|id| id.is_ascii() && reads_as(foreign, id));
        springs.extend(
            twin.into_iter()
                .flat_map(|twin| [twin.clone(), foreign.clone()]),
        );
    }
    springs.dedup();
    if springs.is_empty() {
        None
    } else {
        Some(Caution::IdsAlike { springs })
    }
}

/// Lower case, without leading zeros in any run of digits.
fn plain(id: &str) -> String {
    let lower = id.to_lowercase();
    let mut text = String::new();
    let mut in_number = false;
    for (place, character) in lower.char_indices() {
        let more = lower
            .get(place + character.len_utf8()..)
            .is_some_and(|rest| rest.starts_with(|c: char| c.is_ascii_digit()));
        if character == '0' && !in_number && more {
            continue;
        }
        in_number = character.is_ascii_digit();
        text.push(character);
    }
    text
}

/// Whether `foreign` could be read as the ASCII id `plain`: a foreign letter or digit may stand for any one, a mark that
/// is not printed for none.
fn reads_as(foreign: &str, plain: &str) -> bool {
    let visible: Vec<char> = foreign.chars().filter(|c| *c != '\u{FFFD}').collect();
    visible.len() == plain.len()
        && visible.iter().zip(plain.chars()).all(|(seen, wanted)| {
            seen.eq_ignore_ascii_case(&wanted) || (!seen.is_ascii() && seen.is_alphanumeric())
        })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_a_person_confuses_is_named_and_plain_numbers_are_not() {
        let named = |ids: &[&str]| {
            alike(&ids.iter().map(|id| (*id).to_owned()).collect::<Vec<_>>()).is_some()
        };
        assert!(named(&["TG-01", "tg-1"]));
        assert!(named(&["TG-01", "\u{422}G-01"]));
        assert!(named(&["TG-01", "TG-01\u{FFFD}"]));
        assert!(!named(&["1", "10", "100", "TG-01", "TG-10", "GT-01"]));
    }
}
