//! `springs.csv`: one row per spring and characteristic, always in mm and N, figures as `result.json` holds them.

use rayon::prelude::*;

use crate::quantity::{Class, Unit};
use crate::record::{AcceptRecord, CharacteristicResult, SpringResult, Verdict};
use crate::units::{Finite, Millimetres, System};
use crate::wording;

/// Springs written by one thread at a time.
const CHUNK: usize = 256;

/// The columns; the unit of a row's figures stands in `unit`.
const HEADER: [&str; 32] = [
    "spring",
    "spring_verdict",
    "failing_class",
    "simple_verdict",
    "in_sample",
    "characteristic",
    "at_length_mm",
    "unit",
    "value",
    "expanded_uncertainty",
    "standard_uncertainty",
    "own_uncertainty",
    "common_uncertainty",
    "coverage_factor",
    "degrees_of_freedom",
    "nominal",
    "lower",
    "upper",
    "accept_lower",
    "accept_upper",
    "reject_lower",
    "reject_upper",
    "verdict",
    "reason",
    "conformance_probability",
    "class",
    "export",
    "window_first_line",
    "window_last_line",
    "points",
    "findings",
    "measurements",
];

/// The table as RFC 4180 text, UTF-8, rows ended by CR LF.
pub fn springs_csv(record: &AcceptRecord) -> Vec<u8> {
    let mut out = String::new();
    push(&mut out, HEADER.iter().map(|name| (*name).to_owned()));
    let parts: Vec<String> = record.springs.par_chunks(CHUNK).map(rows).collect();
    out.extend(parts);
    out.into_bytes()
}

/// The rows of some springs.
fn rows(springs: &[SpringResult]) -> String {
    let mut out = String::new();
    for spring in springs {
        if spring.characteristics.is_empty() {
            push(&mut out, row(spring, None));
        }
        for of in &spring.characteristics {
            push(&mut out, row(spring, Some(of)));
        }
    }
    out
}

fn row(spring: &SpringResult, of: Option<&CharacteristicResult>) -> impl Iterator<Item = String> {
    let verdict = |verdict: Option<Verdict>| verdict.map_or("", json_word).to_owned();
    let figure = |take: fn(&CharacteristicResult) -> Option<Finite>| {
        of.and_then(take)
            .map_or_else(String::new, |value| value.get().to_string())
    };
    let reason = of
        .and_then(|of| wording::verdict_reason(of, System::MmN))
        .unwrap_or_default();
    let fit = spring
        .fit
        .as_ref()
        .filter(|_| of.is_some_and(|of| of.name == "rate"));
    let findings: Vec<String> = spring
        .findings
        .iter()
        .map(|seen| format!("{}: {}", seen.class.word(), seen.text))
        .collect();
    [
        text(&spring.id),
        verdict(Some(spring.verdict)),
        spring.failing_class.map_or("", Class::word).to_owned(),
        verdict(Some(spring.simple_verdict)),
        spring.in_sample.to_string(),
        text(of.map_or("", |of| &of.name)),
        of.and_then(|of| of.at_length_mm)
            .map_or_else(String::new, |at: Millimetres| at.get().to_string()),
        of.map_or("", |of| Unit::symbol(of.unit)).to_owned(),
        figure(|of| of.value),
        figure(|of| of.expanded_uncertainty),
        figure(|of| of.standard_uncertainty),
        figure(|of| of.own_uncertainty),
        figure(|of| of.common_uncertainty),
        figure(|of| of.coverage_factor),
        figure(|of| of.degrees_of_freedom),
        figure(|of| of.nominal),
        figure(|of| of.lower),
        figure(|of| of.upper),
        figure(|of| of.accept_lower),
        figure(|of| of.accept_upper),
        figure(|of| of.reject_lower),
        figure(|of| of.reject_upper),
        verdict(of.and_then(|of| of.verdict)),
        text(&reason),
        figure(|of| of.conformance_probability),
        of.and_then(|of| of.class)
            .map_or("", Class::word)
            .to_owned(),
        fit.map_or_else(String::new, |fit| text(&fit.export)),
        fit.map_or_else(String::new, |fit| fit.first_line.to_string()),
        fit.map_or_else(String::new, |fit| fit.last_line.to_string()),
        fit.map_or_else(String::new, |fit| fit.points.to_string()),
        text(&findings.join("; ")),
        spring.measurements.len().to_string(),
    ]
    .into_iter()
}

/// The word `result.json` uses.
const fn json_word(verdict: Verdict) -> &'static str {
    match verdict {
        Verdict::Conforms => "conforms",
        Verdict::Fails => "fails",
        Verdict::Undecided => "undecided",
    }
}

/// Foreign text that no spreadsheet takes for a formula.
fn text(text: &str) -> String {
    match text.trim_start().chars().next() {
        Some('=' | '+' | '-' | '@') => format!("'{text}"),
        _ if text.starts_with(['\t', '\r', '\n']) => format!("'{text}"),
        _ => text.to_owned(),
    }
}

fn push(out: &mut String, fields: impl Iterator<Item = String>) {
    for (number, field) in fields.enumerate() {
        if number > 0 {
            out.push(',');
        }
        if field.contains(['"', ',', '\n', '\r']) || field.starts_with(' ') || field.ends_with(' ')
        {
            out.push('"');
            out.push_str(&field.replace('"', "\"\""));
            out.push('"');
        } else {
            out.push_str(&field);
        }
    }
    out.push_str("\r\n");
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn quotes_and_disarms() {
        let mut out = String::new();
        push(
            &mut out,
            ["a,b", "say \"no\"", "two\nlines", "17"]
                .into_iter()
                .map(text),
        );
        assert_eq!(out, "\"a,b\",\"say \"\"no\"\"\",\"two\nlines\",17\r\n");
        for formula in ["=1+1", "+1", "-1", "@SUM(A1)", "\t=1", " =1"] {
            assert!(text(formula).starts_with('\''), "{formula:?}");
        }
        assert_eq!(text("0044"), "0044");
    }
}
