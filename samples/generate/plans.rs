//! Samples `plans`: the good lot of `accepted` under the other kinds of plan, one drawing and one lot file each.

use crate::Outcome;
use crate::accepted::{LOT, REQUIREMENTS};
use crate::rigs::drawing;
use crate::text;
use std::path::Path;

/// Name, terms of the plan, and what the note says of it.
const PLANS: [(&str, &str, &str); 3] = [
    (
        "variables",
        r#"by = "variables", table = "MIL-STD-414 B", level = "IV", aql = 2.5"#,
        "a good lot under a plan by variables",
    ),
    (
        "zero-accept",
        r#"by = "zero-accept", limiting_quality = "12 %", consumer_risk = "10 %""#,
        "a good lot under a zero-accept plan",
    ),
    (
        "state",
        r#"by = "attributes", level = "II", aql = 2.5, reduced = "agreed""#,
        "a lot measured in part: tightened by --history history.csv, twelve springs are missing",
    ),
];

/// Past lots: two of five in a row not accepted.
const HISTORY: &str = "date,lot,decision,accept,accepted_tighter
2026-09-14,0411,accepted,1,
2026-09-28,0412,rejected,1,
2026-10-12,0413,accepted,1,
2026-10-26,0415,rejected,1,
";

/// Writes the samples.
///
/// # Errors
/// What the file system says.
pub(crate) fn write(folder: &Path) -> Outcome {
    for (name, plan, note) in PLANS {
        let acceptance = format!(
            "[acceptance]\nrule = \"guarded\"\nguard = \"t95\"\nundecided_springs = \"report\"\nplan = {{ {plan} }}\n"
        );
        let drawn = format!("tg-204-{name}.toml");
        text::file(&folder.join(&drawn), drawing(REQUIREMENTS, &acceptance))?;
        let lot = LOT
            .replace("\"tg-204.toml\"", &format!("\"{drawn}\""))
            .replace("\"bench-1.toml\"", "\"../accepted/bench-1.toml\"")
            .replace("\"springs/*.csv\"", "\"../accepted/springs/*.csv\"")
            .replace("\"caliper.csv\"", "\"../accepted/caliper.csv\"")
            .replace("a good lot on a good bench", note);
        text::file(&folder.join(format!("{name}.toml")), lot)?;
    }
    text::file(&folder.join("history.csv"), HISTORY)?;
    Ok(())
}
