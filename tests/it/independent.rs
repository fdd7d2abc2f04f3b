//! An independent hand: the figures of `samples/accepted` recomputed outside Rust (`tests/independent/recompute.py`,
//! numpy, run by hand, 12 digits printed), to 9 digits.

use std::collections::BTreeMap;
use std::path::Path;

use coilassay::job::{Options, accept};
use coilassay::record::{AcceptRecord, SpringResult};

use crate::published::Misses;

/// Nine digits.
const WITHIN: f64 = 5e-10;
/// Columns of the script's output that a record holds.
const COLUMNS: usize = 13;

fn record() -> AcceptRecord {
    let lot = Path::new(env!("CARGO_MANIFEST_DIR")).join("samples/accepted/lot.toml");
    let options = Options {
        date: jiff::civil::date(2026, 12, 1),
        units_confirmed: false,
        strict: false,
        keep: coilassay::job::Keep::default(),
        block_bytes: None,
        flags: Vec::new(),
        memory: coilassay::job::Memory::Nothing,
        past: None,
    };
    accept(&lot, "lot.toml", &options).unwrap().record
}

fn recomputed() -> String {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/independent/accepted.txt");
    std::fs::read_to_string(path).unwrap()
}

/// Figures by row name and column, from tables under a line of column names.
fn tables(text: &str) -> BTreeMap<String, BTreeMap<String, f64>> {
    let mut rows: BTreeMap<String, BTreeMap<String, f64>> = BTreeMap::new();
    let mut columns: Vec<&str> = Vec::new();
    for line in text.lines() {
        let words: Vec<&str> = line.split_whitespace().collect();
        let figures: Option<Vec<f64>> =
            words.iter().skip(1).map(|word| word.parse().ok()).collect();
        match figures {
            Some(figures) if figures.len() == columns.len() && !figures.is_empty() => {
                let named = columns.iter().map(|name| (*name).to_owned()).zip(figures);
                rows.entry(words[0].to_owned()).or_default().extend(named);
            }
            _ => columns = words,
        }
    }
    rows
}

/// What a record says of a spring under the script's names.
fn figures(record: &AcceptRecord, spring: &SpringResult) -> BTreeMap<String, f64> {
    let mut figures = BTreeMap::new();
    for of in &spring.characteristics {
        let name = of
            .at_length_mm
            .map_or_else(|| of.name.clone(), |at| format!("{}_{}", of.name, at.get()));
        figures.extend(of.value.map(|value| (name, value.get())));
    }
    let fit = spring.fit.as_ref().unwrap();
    let straightness = fit.straightness_percent.unwrap().get();
    let more = [
        ("rate_se", fit.standard_error.get()),
        ("residual_sd", fit.residual_sd_n.get()),
        (
            "largest_residual",
            straightness / 100.0 * record.theory.full_load_n.get(),
        ),
        ("points", fit.points as f64),
        ("window_from", fit.from_mm.get()),
        ("window_to", fit.to_mm.get()),
    ];
    figures.extend(more.map(|(name, figure)| (name.to_owned(), figure)));
    figures
}

#[test]
fn every_spring_to_nine_digits() {
    let (record, text) = (record(), recomputed());
    let wanted = tables(text.split("springs (").nth(1).unwrap());
    let mut misses = Misses::default();
    assert_eq!(record.springs.len(), 20);
    for spring in &record.springs {
        let (row, got) = (&wanted[&spring.id], figures(&record, spring));
        let mut compared = 0;
        for (name, want) in row {
            // The length at contact is a figure of the script's own, beside the gauge's.
            if let Some(got) = got.get(name) {
                misses.relative(&format!("{}, {name}", spring.id), *got, *want, WITHIN);
                compared += 1;
            }
        }
        assert_eq!(compared, COLUMNS, "{}: {got:?} for {row:?}", spring.id);
    }
    misses.none();
}

#[test]
fn means_and_spreads_to_nine_digits() {
    let (record, text) = (record(), recomputed());
    let wanted = tables(text.split("mean and SD over the springs").nth(1).unwrap());
    let mut misses = Misses::default();
    for of in &record.drawing.requirements {
        let name = of
            .at_length_mm
            .map_or_else(|| of.name.clone(), |at| format!("{}_{}", of.name, at.get()));
        let row = &wanted[&name];
        misses.relative(
            &format!("mean {name}"),
            of.mean.unwrap().get(),
            row["mean"],
            WITHIN,
        );
        let spread = of.standard_deviation.unwrap().get();
        misses.relative(&format!("SD {name}"), spread, row["std"], WITHIN);
    }
    assert_eq!(record.drawing.requirements.len(), 7);
    misses.none();
}

/// The figure after `name` in `text`.
fn after(text: &str, name: &str) -> f64 {
    let rest = text.split(name).nth(1).unwrap();
    rest.split_whitespace().next().unwrap().parse().unwrap()
}

#[test]
fn theory_window_and_plan_to_nine_digits() {
    let (record, text) = (record(), recomputed());
    let (theory, member) = (&record.theory, &record.theory.members[0]);
    let mut misses = Misses::default();
    let figures = [
        (" w ", member.index.get()),
        ("  R ", member.rate_n_per_mm.get()),
        ("  Lc ", member.solid_length_mm.get()),
        (
            "  Sa ",
            member.smallest_length_mm.get() - member.solid_length_mm.get(),
        ),
        ("  Ln ", member.smallest_length_mm.get()),
        ("rate of all members ", theory.rate_n_per_mm.get()),
        (": Fn ", theory.full_load_n.get()),
        ("full load: ", record.window.from.get()),
        ("to", record.window.to.get()),
    ];
    for (name, got) in figures {
        let want = if name == "to" {
            after(text.split("full load: ").nth(1).unwrap(), " to ")
        } else {
            after(&text, name)
        };
        misses.relative(name, got, want, WITHIN);
    }
    for stress in &member.stress {
        let place = format!("at {} mm: ", stress.at_length_mm.get());
        misses.relative(&place, stress.load_n.get(), after(&text, &place), WITHIN);
        let rest = text
            .split(&place)
            .nth(1)
            .unwrap()
            .split("Wahl: ")
            .nth(1)
            .unwrap();
        let printed = rest
            .split_whitespace()
            .map_while(|word| word.parse::<f64>().ok());
        let got = [
            stress.uncorrected_mpa,
            stress.static_mpa,
            stress.dynamic_mpa,
            stress.wahl_mpa,
        ];
        let printed: Vec<f64> = printed.collect();
        assert_eq!(printed.len(), got.len(), "{place}");
        for (got, want) in got.into_iter().zip(printed) {
            misses.relative(&format!("stress {place}"), got.get(), want, WITHIN);
        }
    }
    misses.none();
    let plan = &record.plan;
    let line = format!(
        "letter {}, AQL 2.5: n {}, Ac {}, Re {}",
        plan.code_letter.as_deref().unwrap(),
        plan.sample_size,
        plan.accept.unwrap(),
        plan.reject.unwrap()
    );
    assert!(text.contains(&line), "{line}");
}
