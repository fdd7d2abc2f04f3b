//! Reads `plan` under `[acceptance]` of a drawing.

use crate::text::{At, Table};

use super::limits::CLASSES;
use super::terms::{AQLS, AQLS_414, Aqls, Level, Level414, PlanTerms, State};

/// The one table of plans by variables.
const TABLE_414: &str = "MIL-STD-414 B";

#[derive(Clone, Copy)]
enum By {
    Attributes,
    Variables,
    ZeroAccept,
    EverySpring,
}

/// A table of acceptance quality limits and its name.
#[derive(Clone, Copy)]
struct Known {
    name: &'static str,
    aqls: &'static [f64],
}

const ATTRIBUTES: Known = Known {
    name: "ISO 2859-1",
    aqls: &AQLS,
};
const VARIABLES: Known = Known {
    name: "MIL-STD-414 Table B",
    aqls: &AQLS_414,
};

/// Reads the plan.
pub(super) fn read_plan(table: Table<'_>) -> Option<PlanTerms> {
    if !table.has("by") {
        table.missing(
            "by",
            "write by = \"attributes\", \"variables\", \"zero-accept\" or \"every-spring\"",
        );
    }
    let words = [
        ("attributes", By::Attributes),
        ("variables", By::Variables),
        ("zero-accept", By::ZeroAccept),
        ("every-spring", By::EverySpring),
    ];
    match table.word("by", &words)? {
        By::EverySpring => {
            only(table, "every-spring", &[]);
            Some(PlanTerms::EverySpring)
        }
        By::Attributes => read_attributes(table),
        By::Variables => read_variables(table),
        By::ZeroAccept => read_zero_accept(table),
    }
}

/// Notes every key that means nothing beside this plan.
fn only(table: Table<'_>, by: &str, allowed: &[&str]) {
    let keys = [
        "level",
        "aql",
        "state",
        "reduced",
        "table",
        "designed",
        "limiting_quality",
        "consumer_risk",
    ];
    for key in keys {
        if table.has(key) && !allowed.contains(&key) {
            let what = format!("`{key}` means nothing in a plan by = \"{by}\"");
            table.fault(&table.place(key), what, format!("leave `{key}` out"));
        }
    }
}

fn read_attributes(table: Table<'_>) -> Option<PlanTerms> {
    only(table, "attributes", &["level", "aql", "state", "reduced"]);
    let level = if table.has("level") {
        table.word("level", &Level::WORDS)
    } else {
        Some(Level::II)
    };
    let state = read_state(table);
    let agreed = [("agreed", true), ("not agreed", false)];
    let reduced_agreed = if table.has("reduced") {
        table.word("reduced", &agreed)
    } else {
        Some(false)
    };
    let aql = read_aqls(table, ATTRIBUTES);
    Some(PlanTerms::Attributes {
        level: level?,
        aql: aql?,
        state: state?,
        reduced_agreed: reduced_agreed?,
    })
}

fn read_state(table: Table<'_>) -> Option<State> {
    if table.has("state") {
        table.word("state", &State::WORDS)
    } else {
        Some(State::Normal)
    }
}

fn read_variables(table: Table<'_>) -> Option<PlanTerms> {
    let help = "write table = \"MIL-STD-414 B\" with an AQL, or designed = { p1 = \"1 %\", alpha = \"5 %\", p2 = \"5 %\", beta = \"10 %\" }";
    if table.has("table") == table.has("designed") {
        let what = "a plan by variables needs a table or the two points it is designed for";
        table.fault(&table.place("by"), what, help);
        return None;
    }
    if table.has("designed") {
        only(table, "variables", &["designed"]);
        return read_designed(table.table("designed"));
    }
    only(table, "variables", &["table", "level", "aql", "state"]);
    table.word("table", &[(TABLE_414, ())])?;
    let level = if table.has("level") {
        table.word("level", &Level414::WORDS)
    } else {
        Some(Level414::IV)
    };
    let state = read_state(table);
    if state == Some(State::Reduced) {
        let what = "reduced plans by variables are another table of MIL-STD-414, not Table B";
        table.fault(
            &table.place("state"),
            what,
            "write \"normal\" or \"tightened\"",
        );
    }
    let aql = read_aqls(table, VARIABLES);
    Some(PlanTerms::Variables {
        level: level?,
        aql: aql?,
        state: state?,
    })
}

fn read_designed(table: Table<'_>) -> Option<PlanTerms> {
    let help = "write shares: p1 = \"1 %\", alpha = \"5 %\", p2 = \"5 %\", beta = \"10 %\"";
    let share = |key: &'static str| read_share(table, key, help);
    let (p1, alpha, p2, beta) = (share("p1"), share("alpha"), share("p2"), share("beta"));
    let (p1, alpha, p2, beta) = (p1?, alpha?, p2?, beta?);
    if p1.value >= p2.value {
        let what = "p1 is not below p2: the quality to accept is worse than the one to reject";
        table.fault(&p1.span, what, help);
        return None;
    }
    if alpha.value + beta.value >= 1.0 {
        let what = "alpha and beta together reach 100 %: no plan is needed for that";
        table.fault(&alpha.span, what, help);
        return None;
    }
    Some(PlanTerms::Designed {
        p1: p1.value,
        alpha: alpha.value,
        p2: p2.value,
        beta: beta.value,
    })
}

fn read_zero_accept(table: Table<'_>) -> Option<PlanTerms> {
    only(table, "zero-accept", &["limiting_quality", "consumer_risk"]);
    let help = "write limiting_quality = \"4 %\", consumer_risk = \"10 %\"";
    let share = |key: &'static str| read_share(table, key, help);
    let (limiting_quality, consumer_risk) = (share("limiting_quality"), share("consumer_risk"));
    Some(PlanTerms::ZeroAccept {
        limiting_quality: limiting_quality?.value,
        consumer_risk: consumer_risk?.value,
    })
}

/// A share above 0 and below 100 %.
fn read_share(table: Table<'_>, key: &'static str, help: &str) -> Option<At<f64>> {
    if !table.has(key) {
        table.missing(key, help);
        return None;
    }
    let share = table.share(key)?;
    if share.value > 0.0 && share.value < 1.0 {
        return Some(share);
    }
    let what = format!(
        "`{key}` is {} %, not above 0 and below 100 %",
        100.0 * share.value
    );
    table.fault(&share.span, what, help);
    None
}

fn read_aqls(table: Table<'_>, of: Known) -> Option<Aqls> {
    if !table.has("aql") {
        table.missing(
            "aql",
            "write aql = 1.0, or aql = { critical = 0.010, major = 1.0, minor = 2.5 }",
        );
        return None;
    }
    if !table.is_table("aql") {
        return table
            .number("aql")
            .and_then(|aql| known_aql(table, &aql, of))
            .map(Aqls::All);
    }
    let by = table.table("aql");
    let mut classes = Vec::new();
    for (word, class) in CLASSES {
        if let Some(aql) = by.number(word) {
            classes.push((class, known_aql(by, &aql, of)?));
        }
    }
    Some(Aqls::ByClass(classes))
}

fn known_aql(table: Table<'_>, aql: &At<f64>, of: Known) -> Option<f64> {
    let found = of
        .aqls
        .iter()
        .copied()
        .find(|known| (known - aql.value).abs() < 1e-9);
    if found.is_none() {
        let known: Vec<String> = of.aqls.iter().map(f64::to_string).collect();
        table.fault(
            &aql.span,
            format!("{} % is no AQL of {}", aql.value, of.name),
            format!("one of: {}", known.join(", ")),
        );
    }
    found
}
