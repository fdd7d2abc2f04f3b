//! The one gate every string of the model passes before it reaches a page.

use serde_json::Value;

use crate::text::{Alphabet, printable};
use crate::wording::font;

/// Letters a PDF line is sure to hold; a longer word gets places to break.
const LONGEST_WORD: usize = 64;
/// Letters between two such places.
const STRETCH: usize = 16;

/// Makes every string of `value` fit for a browser, which brings its own fonts.
pub(super) fn for_browser(value: &mut Value) {
    walk(value, &|text| {
        if !plain(text) {
            *text = printable(&text.replace(['\n', '\r', '\t'], " "), &Alphabet::Any);
        }
    });
}

/// Makes every string of `value` fit for the embedded fonts, words of any length able to break.
pub(super) fn for_print(value: &mut Value) {
    walk(value, &|text| {
        if !plain(text) {
            *text = font::fitting(text);
        }
        if text.len() > LONGEST_WORD {
            *text = breakable(text);
        }
    });
}

fn plain(text: &str) -> bool {
    text.bytes().all(|byte| matches!(byte, b' '..=b'~'))
}

fn walk(value: &mut Value, pass: &dyn Fn(&mut String)) {
    match value {
        Value::String(text) => pass(text),
        Value::Array(items) => items.iter_mut().for_each(|item| walk(item, pass)),
        Value::Object(fields) => fields.values_mut().for_each(|field| walk(field, pass)),
        Value::Null | Value::Bool(_) | Value::Number(_) => {}
    }
}

/// A zero-width space in every stretch of a word that no line may hold.
fn breakable(text: &str) -> String {
    let words = text.split(' ').map(|word| {
        if word.chars().count() <= LONGEST_WORD {
            return word.to_owned();
        }
        let letters: Vec<char> = word.chars().collect();
        let stretches = letters
            .chunks(STRETCH)
            .map(|stretch| stretch.iter().collect::<String>());
        stretches.collect::<Vec<_>>().join("\u{200b}")
    });
    words.collect::<Vec<_>>().join(" ")
}

#[cfg(test)]
mod tests {
    use super::*;

    fn passed(mut value: Value, gate: fn(&mut Value)) -> Value {
        gate(&mut value);
        value
    }

    #[test]
    fn every_string_passes() {
        let value =
            serde_json::json!({"a": ["x\u{1b}[1m", {"b": "弹\u{202e}"}], "n": 3, "none": null});
        let browser =
            serde_json::json!({"a": ["x\u{fffd}[1m", {"b": "弹\u{fffd}"}], "n": 3, "none": null});
        let print = serde_json::json!({"a": ["x\u{fffd}[1m", {"b": "[U+5F39]\u{fffd}"}], "n": 3, "none": null});
        assert_eq!(passed(value.clone(), for_browser), browser);
        assert_eq!(passed(value, for_print), print);
    }

    #[test]
    fn a_long_word_can_break_and_a_hash_does_not() {
        let long = passed(Value::from("W".repeat(400)), for_print);
        assert_eq!(
            long.as_str().map(|text| text.matches('\u{200b}').count()),
            Some(24)
        );
        let hash = Value::from("0123456789abcdef".repeat(4));
        assert_eq!(passed(hash.clone(), for_print), hash);
    }
}
