//! The draft as text.

use crate::rig::{Decimal, Delimiter, Pushing};

use super::columns::Columns;
use super::form::Form;
use super::meaning::Meaning;
use super::sheet::{Sheet, quoted, shown};

/// A drafted rig file. `open` says that the export's last line has no line end, `springs` how many it holds.
pub fn write(
    form: &Form,
    columns: &Columns,
    meaning: &Meaning,
    open: bool,
    springs: usize,
) -> String {
    let mut sheet = Sheet::default();
    sheet.comment(&format!(
        "Drafted by coilassay from `{}`: how the export is written is read off the file,",
        form.name
    ));
    sheet.comment("what the bench is worth cannot be. Every line marked DOUBT wants an answer before anything is judged with it.");
    sheet.key(
        "units",
        "\"mm-N\"",
        "the figures of this file; the export's columns state their own units",
    );
    sheet.table("rig");
    sheet.key(
        "name",
        "\"unnamed bench\"",
        "write the name of the bench here",
    );
    table(&mut sheet, form, open);
    roles(&mut sheet, form, columns, meaning);
    sheet.comment(&format!(
        "{} in this export; the first goes through {} loading and {} unloading strokes",
        if springs == 1 {
            "one spring".to_owned()
        } else {
            format!("{springs} springs")
        },
        meaning.strokes.0,
        meaning.strokes.1
    ));
    if meaning.strokes.0 > 1 {
        sheet.doubt("are the first strokes presetting? Then write presetting_recorded under [conditions] of the lot file");
    }
    if meaning.starts_loaded {
        sheet.doubt("the recording seems to begin on a loaded spring: its loads have no known zero, and no free length comes from it");
    }
    bench(&mut sheet, meaning);
    sheet.finish()
}

fn table(sheet: &mut Sheet, form: &Form, open: bool) {
    sheet.table("export");
    let why = if form.header_line == 0 {
        "no line of names stands above the rows: columns are called \"1\", \"2\", …".to_owned()
    } else {
        format!(
            "line {} holds as many cells as the rows that begin on line {}, and names",
            form.header_line, form.first_row
        )
    };
    sheet.key("header_line", &form.header_line.to_string(), &why);
    if let Some(line) = form.units_line {
        sheet.key(
            "units_line",
            &line.to_string(),
            "every cell there is a unit or empty",
        );
    }
    let (mark, name) = match form.delimiter {
        Delimiter::Comma => (",", "commas"),
        Delimiter::Semicolon => (";", "semicolons"),
        Delimiter::Tab => ("\\t", "tabs"),
    };
    let width = form.names.len();
    sheet.key(
        "delimiter",
        &format!("\"{mark}\""),
        &format!("{name} part every row into {width} cells"),
    );
    let (mark, name) = match form.decimal {
        Decimal::Point => (".", "points"),
        Decimal::Comma => (",", "commas"),
    };
    sheet.doubts(&form.doubts);
    sheet.key(
        "decimal",
        &format!("\"{mark}\""),
        &format!("with {name} most cells are numbers"),
    );
    sheet.key(
        "encoding",
        &format!("\"{}\"", form.encoding.name()),
        "the first 64 KB decode so",
    );
    if form.quoted {
        sheet.key("quoted", "true", "cells stand in quotes");
    }
    if open {
        sheet.key("last_line_open", "true", "the last line has no line end; a file cut off in the middle of a number looks the same");
    }
}

fn roles(sheet: &mut Sheet, form: &Form, columns: &Columns, meaning: &Meaning) {
    let [of_load, of_travel, of_time, of_spring] = &columns.doubts;
    let [why_load, why_travel, why_time, why_spring] = &columns.why;
    let pushing = |pushing: Pushing| match pushing {
        Pushing::Positive => "positive",
        Pushing::Negative => "negative",
    };
    sheet.doubts(of_load);
    let (name, unit) = &columns.load;
    let load = format!(
        "{{ column = {}, unit = \"{}\", pushing = \"{}\" }}",
        quoted(name),
        unit.symbol(),
        pushing(meaning.load_pushing)
    );
    let sign = match meaning.load_pushing {
        Pushing::Positive => "its largest values are above 0",
        Pushing::Negative => "its largest values are below 0",
    };
    sheet.key("load", &load, &format!("{why_load}; {sign}"));
    sheet.doubts(of_travel.iter().chain(&meaning.doubts));
    let (name, unit) = &columns.travel;
    let negative = match meaning.travel_pushing {
        Pushing::Positive => "",
        Pushing::Negative => ", pushing = \"negative\"",
    };
    let travel = format!(
        "{{ column = {}, unit = \"{}\", means = \"{}\"{negative} }}",
        quoted(name),
        unit.symbol(),
        meaning.means
    );
    sheet.key("travel", &travel, &format!("{why_travel}; {}", meaning.why));
    sheet.doubts(of_time);
    if let Some(time) = &columns.time {
        sheet.key(
            "time",
            &format!("{{ column = {}, unit = \"s\" }}", quoted(time)),
            why_time,
        );
    }
    sheet.doubts(of_spring);
    let spring = columns.spring.as_ref().map_or_else(
        || "{ from = \"file name\" }".to_owned(),
        |name| format!("{{ column = {} }}", quoted(name)),
    );
    sheet.key("spring", &spring, why_spring);
    let used = [
        Some(&columns.load.0),
        Some(&columns.travel.0),
        columns.time.as_ref(),
        columns.spring.as_ref(),
    ];
    let rest: Vec<String> = form
        .names
        .iter()
        .filter(|name| !used.contains(&Some(name)))
        .map(|name| format!("`{}`", shown(name)))
        .collect();
    if !rest.is_empty() {
        sheet.comment(&format!("not used: {}", rest.join(", ")));
    }
}

fn bench(sheet: &mut Sheet, meaning: &Meaning) {
    let step = |step: Option<f64>| {
        step.map_or_else(
            || "{ unknown = \"declared negligible\" }".to_owned(),
            figure,
        )
    };
    let negligible = "\"declared negligible\"";
    sheet.table("force");
    sheet.doubt("no export says what the force scale is worth: state class = \"1\" (ISO 7500-1) or certificate = { relative = \"0.4 %\", k = 2 }; until then every report says that nothing is known of it");
    sheet.key("unknown", negligible, "to be replaced");
    sheet.key(
        "resolution",
        &step(meaning.steps.0),
        "the step that all loads of the first spring are multiples of, N",
    );
    sheet.comment("range = { from = 4.0, to = 200.0 }, calibrated = { on = 2026-03-02, until = 2027-03-02 }: from the certificate");
    sheet.table("travel");
    sheet.doubt("no export says what the travel scale is worth: state class = \"1\" (ISO 9513) or a certificate");
    sheet.key("unknown", negligible, "to be replaced");
    sheet.key(
        "resolution",
        &step(meaning.steps.1),
        "the step that all travels of the first spring are multiples of, mm",
    );
    if meaning.means == "length" {
        sheet.doubt("how well is the zero of the length scale known? It is usually the largest line of the budget: zero = { uncertainty = 0.02, k = 2 }");
        sheet.key(
            "zero",
            &format!("{{ unknown = {negligible} }}"),
            "to be replaced",
        );
    }
    sheet.table("frame");
    sheet.comment("compliance = { value = 0.00021, uncertainty = 0.00002, k = 2 }, mm/N, from a run plate on plate; until it is stated, page one");
    sheet.comment(
        "says that the frame is not corrected, and the budget allows for 1 % of the travel",
    );
    sheet.table("contact");
    sheet.key(
        "load",
        &figure(meaning.contact),
        "the load at which the spring counts as touched, N: about half a per cent of the largest",
    );
}

/// A figure as TOML takes it, rounded to what a display may have shown.
fn figure(value: f64) -> String {
    let rounded: f64 = format!("{value:.6e}").parse().unwrap_or(value);
    if rounded.fract() == 0.0 && rounded.abs() < 1e15 {
        format!("{rounded:.1}")
    } else {
        format!("{rounded}")
    }
}
