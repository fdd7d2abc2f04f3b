//! The judgement for the terminal: the decision first, then why. About thirty lines for any number of springs.

use crate::model::{Page, labelled};
use crate::record::{AcceptRecord, Decision, RequirementFacts, SpringResult, Verdict};
use crate::text::{Alphabet, printable};
use crate::units::{Finite, System};
use crate::wording;
use crate::wording::{Place, figure, with_unit};

/// Springs named one by one, failing and undecided each.
const NAMED: usize = 4;
/// Cautions written out.
const CAUTIONS: usize = 5;
/// Requirements written out.
const REQUIREMENTS: usize = 6;
/// Letters of a line; what is longer is cut and marked.
const LINE: usize = 300;

/// The summary, each foreign string made printable; it ends with a line end.
pub fn summary(record: &AcceptRecord, show_in: System) -> String {
    let mut lines = vec![format!(
        "{}: lot {}, drawing {}",
        wording::decision_word(record.decision),
        record.lot.number,
        labelled(&record.drawing.number, record.drawing.revision.as_deref())
    )];
    lines.extend(
        record
            .reasons
            .iter()
            .take(4)
            .map(|reason| format!("  {}", wording::why(reason))),
    );
    let classes = || record.plan.classes.iter();
    let mut besides: Vec<String> = classes().filter_map(wording::settled_early).collect();
    if record.decision == Decision::Undecided {
        besides.extend(classes().filter_map(wording::readings));
    }
    lines.extend(besides.into_iter().map(|line| format!("  {line}")));
    if let Some(state) = record.plan.state.as_ref().filter(|of| of.reason.is_some()) {
        lines.push(format!("  Inspection {}", wording::state(state)));
    }
    lines.push(format!("  {}", wording::simple_line(record)));
    lines.extend(record.lot.note.iter().map(|note| format!("  Note: {note}")));
    let requirements = &record.drawing.requirements;
    lines.extend(
        requirements
            .iter()
            .take(REQUIREMENTS)
            .map(|of| requirement(of, show_in)),
    );
    if requirements.len() > REQUIREMENTS {
        let more = rest(requirements.len(), REQUIREMENTS);
        lines.push(format!("  and {more} more in the report"));
    }
    lines.extend(named(record, Verdict::Fails, "failing", show_in));
    lines.extend(named(record, Verdict::Undecided, "undecided", show_in));
    lines.extend(
        record
            .cautions
            .iter()
            .take(CAUTIONS)
            .map(|of| format!("  Caution: {}", wording::caution(of, show_in))),
    );
    if record.cautions.len() > CAUTIONS {
        lines.push(format!(
            "  and {} more in the report",
            wording::count(rest(record.cautions.len(), CAUTIONS), "caution")
        ));
    }
    lines.into_iter().map(|line| cut(&line) + "\n").collect()
}

/// A page for the terminal: the decision, the grounds, the tables of page one, cautions.
pub fn page_summary(page: &Page) -> String {
    let mut lines = vec![format!("{}: {}", page.decision.word, page.subject)];
    lines.extend(page.decision.why.iter().map(|why| format!("  {why}")));
    lines.extend(
        page.notes
            .iter()
            .map(|note| format!("  {}: {}", note.label, note.text)),
    );
    for table in &page.tables {
        lines.push(format!("  {}:", table.caption));
        for row in &table.rows {
            let cells = row.cells.iter().zip(&table.columns).skip(1);
            let cells: Vec<String> = cells
                .filter(|(cell, _)| !cell.text.is_empty())
                .map(|(cell, column)| format!("{} {}", column.title, cell.text))
                .collect();
            let name = row.cells.first().map_or("", |cell| cell.text.as_str());
            lines.push(format!("    {name}: {}", cells.join(", ")));
        }
    }
    let cautions = page.cautions.iter().take(CAUTIONS);
    lines.extend(cautions.map(|caution| format!("  Caution: {caution}")));
    if page.cautions.len() > CAUTIONS {
        let more = wording::count(rest(page.cautions.len(), CAUTIONS), "caution");
        lines.push(format!("  and {more} more in the report"));
    }
    lines.into_iter().map(|line| cut(&line) + "\n").collect()
}

fn rest(all: usize, shown: usize) -> u64 {
    u64::try_from(all.saturating_sub(shown)).unwrap_or(u64::MAX)
}

fn cut(line: &str) -> String {
    let line = printable(&line.replace(['\n', '\r', '\t'], " "), &Alphabet::Any);
    if line.chars().count() <= LINE {
        return line;
    }
    line.chars().take(LINE - 1).chain(['…']).collect()
}

fn requirement(of: &RequirementFacts, show_in: System) -> String {
    let stated = |value: Option<Finite>| with_unit(value, of.unit, Place::Stated, show_in);
    let place = Place::Uncertainty(of.largest_expanded_uncertainty);
    let limits = match (of.lower, of.upper) {
        (Some(_), Some(_)) => format!(
            "limits {} to {}",
            figure(of.lower, of.unit, Place::Stated, show_in),
            stated(of.upper)
        ),
        (Some(_), None) => format!("at least {}", stated(of.lower)),
        (None, Some(_)) => format!("at most {}", stated(of.upper)),
        (None, None) => "no limit".to_owned(),
    };
    format!(
        "  {}: {} conform, {} fail, {} undecided; measured {} to {}, {limits}",
        wording::characteristic(&of.name, of.at_length_mm, show_in),
        of.conforming,
        of.failing,
        of.undecided,
        figure(of.smallest, of.unit, place, show_in),
        figure(of.largest, of.unit, place, show_in),
    )
}

fn named(record: &AcceptRecord, verdict: Verdict, word: &str, show_in: System) -> Vec<String> {
    let of: Vec<&SpringResult> = record
        .springs
        .iter()
        .filter(|spring| spring.verdict == verdict)
        .collect();
    let mut lines: Vec<String> = of
        .iter()
        .take(NAMED)
        .map(|spring| {
            format!(
                "  {word}: spring {}: {}",
                spring.id,
                crate::model::remarks(spring, show_in)
            )
        })
        .collect();
    let left: Vec<String> = of
        .iter()
        .skip(NAMED)
        .map(|spring| spring.id.clone())
        .collect();
    if !left.is_empty() {
        lines.push(format!("  {word} too: {}", wording::springs(&left)));
    }
    lines
}
