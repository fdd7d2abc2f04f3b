//! The values a table answers with: texts, numbers, dates, words, shares; each wrong one noted at its place.

use toml::de::DeValue;

use super::table::{At, Table};
use super::toml::nearest;
use super::{Alphabet, printable};
use crate::units::System;

impl Table<'_> {
    /// The `units` key that every file may state; millimetres and newtons without it.
    pub fn system(&self) -> Option<System> {
        if self.has("units") {
            self.word("units", &[("mm-N", System::MmN), ("in-lbf", System::InLbf)])
        } else {
            Some(System::MmN)
        }
    }

    /// Text as written, for paths and column names, which must match byte for byte.
    pub fn raw_text(&self, key: &str) -> Option<At<String>> {
        let (value, span) = self.value(key)?;
        if let Some(text) = value.as_str() {
            return Some(At {
                value: text.to_owned(),
                span,
            });
        }
        self.wrong(key, &span, value, "text in quotes");
        None
    }

    /// Text made printable.
    pub fn text(&self, key: &str) -> Option<String> {
        self.raw_text(key)
            .map(|text| printable(&text.value, &Alphabet::Any))
    }

    /// Text made printable; a fault where it is missing.
    pub fn required_text(&self, key: &str, help: &str) -> Option<String> {
        if !self.has(key) {
            self.missing(key, help);
        }
        self.text(key)
    }

    /// A list of texts as written.
    pub fn raw_texts(&self, key: &str) -> Vec<At<String>> {
        let Some((value, span)) = self.value(key) else {
            return Vec::new();
        };
        let Some(items) = value.as_array() else {
            self.wrong(key, &span, value, "a list of texts");
            return Vec::new();
        };
        let mut texts = Vec::new();
        for item in items {
            match item.get_ref().as_str() {
                Some(text) => texts.push(At {
                    value: text.to_owned(),
                    span: item.span(),
                }),
                None => self.wrong(key, &item.span(), item.get_ref(), "text in quotes"),
            }
        }
        texts
    }

    /// A finite number, whole or not.
    pub fn number(&self, key: &str) -> Option<At<f64>> {
        let (value, span) = self.value(key)?;
        if !matches!(value, DeValue::Integer(_) | DeValue::Float(_)) {
            self.wrong(key, &span, value, "a number");
            return None;
        }
        let number = finite(value);
        if number.is_none() {
            self.fault(
                &span,
                format!("`{key}` is not a finite number"),
                "write a plain number",
            );
        }
        Some(At {
            value: number?,
            span,
        })
    }

    /// A list of finite numbers, such as `[140.0, 130.0]`.
    pub fn numbers(&self, key: &str) -> Vec<At<f64>> {
        let Some((value, span)) = self.value(key) else {
            return Vec::new();
        };
        let Some(items) = value.as_array() else {
            self.wrong(key, &span, value, "a list of numbers");
            return Vec::new();
        };
        let mut numbers = Vec::new();
        for item in items {
            match finite(item.get_ref()) {
                Some(value) => numbers.push(At {
                    value,
                    span: item.span(),
                }),
                None => self.wrong(key, &item.span(), item.get_ref(), "a finite number"),
            }
        }
        numbers
    }

    /// A number above zero.
    pub fn positive(&self, key: &str) -> Option<At<f64>> {
        self.number(key)
            .and_then(|number| self.above(key, number, f64::MIN_POSITIVE, "above zero"))
    }

    /// A number of zero or more.
    pub fn not_negative(&self, key: &str) -> Option<At<f64>> {
        self.number(key)
            .and_then(|number| self.above(key, number, 0.0, "zero or more"))
    }

    fn above(&self, key: &str, number: At<f64>, least: f64, wanted: &str) -> Option<At<f64>> {
        if number.value >= least {
            return Some(number);
        }
        self.fault(
            &number.span,
            format!("`{key}` is {}, not {wanted}", number.value),
            format!("write a number {wanted}"),
        );
        None
    }

    /// A whole number of zero or more.
    pub fn whole(&self, key: &str) -> Option<At<u64>> {
        let (value, span) = self.value(key)?;
        if let DeValue::Integer(whole) = value
            && let Ok(number) = u64::from_str_radix(whole.as_str(), whole.radix())
        {
            return Some(At {
                value: number,
                span,
            });
        }
        self.wrong(key, &span, value, "a whole number of zero or more");
        None
    }

    /// `true` or `false`; `false` where it is missing.
    pub fn flag(&self, key: &str) -> bool {
        let Some((value, span)) = self.value(key) else {
            return false;
        };
        value.as_bool().unwrap_or_else(|| {
            self.wrong(key, &span, value, "true or false");
            false
        })
    }

    /// A calendar date, written bare as 2026-03-02.
    pub fn date(&self, key: &str) -> Option<At<jiff::civil::Date>> {
        let (value, span) = self.value(key)?;
        let date = value
            .as_datetime()
            .filter(|stamp| stamp.time.is_none())
            .and_then(|stamp| stamp.to_string().parse().ok());
        if date.is_none() {
            self.wrong(
                key,
                &span,
                value,
                "a date such as 2026-03-02 without quotes",
            );
        }
        Some(At { value: date?, span })
    }

    /// One of a few words; a fault naming the nearest where it is none of them.
    pub fn word<T: Copy>(&self, key: &str, words: &[(&str, T)]) -> Option<T> {
        let written = self.raw_text(key)?;
        if let Some((_, meaning)) = words.iter().find(|(word, _)| *word == written.value) {
            return Some(*meaning);
        }
        let known: Vec<&str> = words.iter().map(|(word, _)| *word).collect();
        let near = nearest(&written.value, &known)
            .map_or(String::new(), |near| format!("did you mean \"{near}\"? "));
        self.fault(
            &written.span,
            format!("`{key}` is \"{}\"", written.value),
            format!("{near}one of: {}", known.join(", ")),
        );
        None
    }

    /// Whether the value under `key` is a table (as against a number or text).
    pub fn is_table(&self, key: &str) -> bool {
        matches!(self.value(key), Some((DeValue::Table(_), _)))
    }

    /// Whether the value under `key` is text.
    pub fn is_text(&self, key: &str) -> bool {
        matches!(self.value(key), Some((DeValue::String(_), _)))
    }

    /// A share written as text, `"5 %"`, as a fraction (0.05).
    pub fn share(&self, key: &str) -> Option<At<f64>> {
        let written = self.raw_text(key)?;
        let number = written
            .value
            .trim()
            .strip_suffix('%')
            .and_then(|number| number.trim().parse::<f64>().ok());
        let Some(percent) = number.filter(|percent| percent.is_finite() && *percent >= 0.0) else {
            let what = format!("`{key}` is \"{}\", not a share", written.value);
            self.fault(&written.span, what, "write a share such as \"5 %\"");
            return None;
        };
        Some(At {
            value: percent / 100.0,
            span: written.span,
        })
    }
}

/// A TOML number as a finite one.
fn finite(value: &DeValue<'_>) -> Option<f64> {
    match value {
        DeValue::Integer(whole) => i64::from_str_radix(whole.as_str(), whole.radix())
            .ok()
            .map(|whole| whole as f64),
        DeValue::Float(float) => float
            .as_str()
            .parse()
            .ok()
            .filter(|number: &f64| number.is_finite()),
        _ => None,
    }
}
