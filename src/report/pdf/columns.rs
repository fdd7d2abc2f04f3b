//! Widths of a table's columns on A4, from the widths of its texts, and places to break in words wider than their column.

use serde_json::{Map, Value, json};

use crate::wording::font;

/// Width between the margins of A4, in points: 210 mm less twice 16 mm.
const PAPER: f64 = 178.0 / 25.4 * 72.0;
/// Space a cell keeps beside its text, both sides, in points.
const PADDING: f64 = 6.5;
/// Type sizes a table may have, in points; the first at which its figures fit is taken.
const SIZES: [f64; 4] = [7.5, 7.0, 6.5, 6.0];
/// Type size of a hash against the table's.
const HASH: f64 = 0.75;
/// A column of words is not made narrower than this for its longest word, in ems.
const WORD: f64 = 9.0;

/// What a column needs, in ems.
struct Need {
    /// Type size against the table's.
    scale: f64,
    /// So that nothing breaks.
    whole: f64,
    /// So that no word breaks (or only a long one).
    least: f64,
}

/// Gives every table inside `value` its type size and the widths of its columns.
pub(super) fn fit(value: &mut Value) {
    match value {
        Value::Array(items) => items.iter_mut().for_each(fit),
        Value::Object(fields) if fields.contains_key("columns") && fields.contains_key("rows") => {
            table(fields);
        }
        Value::Object(fields) => fields.values_mut().for_each(fit),
        _ => {}
    }
}

fn table(fields: &mut Map<String, Value>) {
    let needs: Vec<Need> = array(fields, "columns")
        .enumerate()
        .map(|(number, column)| need(fields, column, number))
        .collect();
    let all = |size: f64, take: fn(&Need) -> f64| {
        needs
            .iter()
            .map(|need| take(need) * size + PADDING)
            .sum::<f64>()
    };
    let size = SIZES
        .into_iter()
        .find(|size| all(*size, |need| need.least) <= PAPER * 0.94)
        .unwrap_or(6.0);
    let (whole, least) = (all(size, |need| need.whole), all(size, |need| need.least));
    let spare = ((PAPER - least) / (whole - least).max(1e-9)).clamp(0.0, 1.0);
    let widths: Vec<f64> = needs
        .iter()
        .map(|need| need.least * size + PADDING + (need.whole - need.least) * size * spare)
        .collect();
    let stretch = PAPER / widths.iter().sum::<f64>().max(1.0);
    for row in fields
        .get_mut("rows")
        .and_then(Value::as_array_mut)
        .into_iter()
        .flatten()
    {
        let cells = row
            .get_mut("cells")
            .and_then(Value::as_array_mut)
            .into_iter()
            .flatten();
        for ((cell, width), need) in cells.zip(&widths).zip(&needs) {
            break_words(cell, (width * stretch - PADDING) / (size * need.scale));
        }
    }
    let rounded: Vec<f64> = widths
        .iter()
        .map(|width| (width * 100.0).round() / 100.0)
        .collect();
    fields.insert("widths".to_owned(), json!(rounded));
    fields.insert("size".to_owned(), json!(size));
}

fn array<'a>(fields: &'a Map<String, Value>, key: &str) -> impl Iterator<Item = &'a Value> {
    fields
        .get(key)
        .and_then(Value::as_array)
        .into_iter()
        .flatten()
}

fn text<'a>(value: &'a Value, key: &str) -> &'a str {
    value.get(key).and_then(Value::as_str).unwrap_or("")
}

fn need(fields: &Map<String, Value>, column: &Value, number: usize) -> Need {
    let holds = text(column, "holds");
    let scale = if holds == "hash" { HASH } else { 1.0 };
    let mut need = Need {
        scale,
        whole: 0.0,
        least: 0.0,
    };
    let mut take = |text: &str, heavy: bool, words: bool| {
        let whole = font::width(text, scale, heavy);
        let longest = text
            .split(' ')
            .map(|word| font::width(word, scale, heavy))
            .fold(0.0, f64::max);
        need.whole = need.whole.max(whole);
        need.least = need
            .least
            .max(if words { longest.min(WORD) } else { whole });
    };
    take(text(column, "title"), true, true);
    take(text(column, "unit"), false, true);
    for row in array(fields, "rows") {
        let cell = row
            .get("cells")
            .and_then(|cells| cells.get(number))
            .unwrap_or(&Value::Null);
        let heavy = text(cell, "mark") == "fails";
        take(text(cell, "text"), heavy, holds == "words");
        take(text(cell, "below"), heavy, holds == "words");
    }
    need
}

/// Gives words wider than `most` ems zero-width spaces to break at.
fn break_words(cell: &mut Value, most: f64) {
    let heavy = text(cell, "mark") == "fails";
    let Some(Value::String(shown)) = cell.get_mut("text") else {
        return;
    };
    if font::width(shown, 1.0, heavy) <= most {
        return;
    }
    let words = shown.split(' ').map(|word| {
        if font::width(word, 1.0, heavy) <= most {
            return word.to_owned();
        }
        let mut broken = String::new();
        for (number, letter) in word
            .chars()
            .filter(|letter| *letter != '\u{200b}')
            .enumerate()
        {
            if number > 0 && number % 3 == 0 {
                broken.push('\u{200b}');
            }
            broken.push(letter);
        }
        broken
    });
    *shown = words.collect::<Vec<_>>().join(" ");
}

#[cfg(test)]
mod tests {
    use super::*;

    fn fitted(cells: &[&str]) -> Value {
        let columns: Vec<Value> = ["words", "figures"]
            .iter()
            .map(|holds| json!({"title": "T", "unit": "", "holds": holds}))
            .collect();
        let rows: Vec<Value> = cells.iter().map(|text| json!({"cells": [{"text": text, "below": "", "mark": ""}, {"text": "151.3 ± 1.2", "below": "", "mark": ""}]})).collect();
        let mut value = json!({"some": {"columns": columns, "rows": rows}});
        fit(&mut value);
        value
    }

    #[test]
    fn a_word_wider_than_its_column_can_break() {
        let value = fitted(&[&"W".repeat(400), "17"]);
        let shown = value
            .pointer("/some/rows/0/cells/0/text")
            .and_then(Value::as_str)
            .unwrap_or("");
        assert!(shown.contains('\u{200b}'));
        assert_eq!(
            value.pointer("/some/rows/1/cells/0/text"),
            Some(&json!("17"))
        );
        assert_eq!(
            value
                .pointer("/some/widths")
                .and_then(Value::as_array)
                .map(Vec::len),
            Some(2)
        );
    }

    #[test]
    fn a_narrow_table_stays_whole() {
        let value = fitted(&["a few words"]);
        assert_eq!(value.pointer("/some/size"), Some(&json!(7.5)));
        assert_eq!(
            value.pointer("/some/rows/0/cells/0/text"),
            Some(&json!("a few words"))
        );
    }
}
