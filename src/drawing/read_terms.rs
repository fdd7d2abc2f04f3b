//! Reads `[rate_test]` and `[acceptance]` of a drawing.

use crate::text::{At, Table};

use super::read_plan::read_plan;
use super::terms::{
    Acceptance, Guard, Method, ORDINALS, Policy, RateTest, Rule, Stroke, Way, Window,
};

/// Reads `[rate_test]`.
pub(super) fn read_rate_test(table: Table<'_>, length: f64, force: f64) -> Option<RateTest> {
    let full_load = table.positive("full_load").map(|load| load.value * force);
    let stroke = match table.raw_text("stroke") {
        None => Some(Stroke {
            index: None,
            way: Way::Loading,
        }),
        Some(written) => read_stroke(table, &written),
    };
    let method = if table.has("method") {
        table.word(
            "method",
            &[("fit", Method::Fit), ("two-point", Method::TwoPoint)],
        )
    } else {
        Some(Method::Fit)
    };
    let window = if table.has("window") {
        read_window(table.table("window"), length)
    } else {
        Some(Window::FullLoad(0.3, 0.7))
    };
    Some(RateTest {
        window: window?,
        full_load,
        stroke: stroke?,
        method: method?,
    })
}

fn read_stroke(table: Table<'_>, written: &At<String>) -> Option<Stroke> {
    let (ordinal, way) = written
        .value
        .split_once(' ')
        .unwrap_or((&written.value, ""));
    let index = match ORDINALS.iter().position(|word| *word == ordinal) {
        Some(place) => Some(Some(place)),
        None => (ordinal == "last").then_some(None),
    };
    let way = match way {
        "loading" => Some(Way::Loading),
        "unloading" => Some(Way::Unloading),
        _ => None,
    };
    if let (Some(index), Some(way)) = (index, way) {
        return Some(Stroke { index, way });
    }
    let help = "write first, second, third, fourth, fifth or last, then loading or unloading: \"last loading\"";
    table.fault(
        &written.span,
        format!("\"{}\" names no stroke", written.value),
        help,
    );
    None
}

#[derive(Clone, Copy)]
enum Of {
    FullLoad,
    Deflection,
    Length,
}

fn read_window(table: Table<'_>, length: f64) -> Option<Window> {
    let words = [
        ("full load", Of::FullLoad),
        ("deflection to Ln", Of::Deflection),
        ("length", Of::Length),
    ];
    if !table.has("of") {
        table.missing(
            "of",
            "write of = \"full load\", \"deflection to Ln\" or \"length\"",
        );
    }
    for key in ["from", "to"] {
        if !table.has(key) {
            table.missing(key, "write both from and to");
        }
    }
    let of = table.word("of", &words)?;
    if matches!(of, Of::Length) {
        let (from, to) = (
            table.positive("from")?.value * length,
            table.positive("to")?.value * length,
        );
        if from <= to {
            table.fault(
                &table.span(),
                "the window's first length is not the longer one",
                "compression goes from the longer length to the shorter: from = 55.0, to = 48.0",
            );
            return None;
        }
        return Some(Window::Lengths(from, to));
    }
    let (from, to) = (table.share("from")?.value, table.share("to")?.value);
    if from >= to || to > 1.0 {
        table.fault(
            &table.span(),
            "the window does not run from a smaller to a larger share of at most 100 %",
            "write for instance from = \"30 %\", to = \"70 %\"",
        );
        return None;
    }
    Some(match of {
        Of::Deflection => Window::Deflection(from, to),
        _ => Window::FullLoad(from, to),
    })
}

/// Reads `[acceptance]`.
pub(super) fn read_acceptance(table: Table<'_>) -> Option<Acceptance> {
    let help = "agree the terms: [acceptance] rule = \"guarded\", plan = { by = \"attributes\", level = \"II\", aql = 1.0 }";
    if !table.is_present() {
        table.fault(
            &table.span(),
            "`acceptance` is missing: without terms no lot can be decided",
            help,
        );
        return None;
    }
    let optional = |key: &str| table.has(key);
    let rule = if optional("rule") {
        table.word(
            "rule",
            &[("guarded", Rule::Guarded), ("simple", Rule::Simple)],
        )
    } else {
        Some(Rule::Guarded)
    };
    let guard = if optional("guard") {
        table.word("guard", &[("t95", Guard::T95), ("U", Guard::U)])
    } else {
        Some(Guard::T95)
    };
    let undecided = if optional("undecided_springs") {
        table.word(
            "undecided_springs",
            &[
                ("report", Policy::Report),
                ("pass", Policy::Pass),
                ("fail", Policy::Fail),
            ],
        )
    } else {
        Some(Policy::Report)
    };
    if !optional("plan") {
        table.missing("plan", help);
        return None;
    }
    let plan = read_plan(table.table("plan"));
    Some(Acceptance {
        rule: rule?,
        guard: guard?,
        undecided: undecided?,
        plan: plan?,
    })
}
