//! The report of `rig repeat`.

use super::facts::{Facts, fact, of_bench, stated};
use super::page::{Page, PageDecision, look};
use super::page_one::Note;
use super::table::{Cell, Column, Row, Section, Table};
use crate::record::{
    RangeFacts, RepeatRecord, Serving, StudyFacts, VarianceRow, VariationShare, Verdict,
};
use crate::units::{Finite, System};
use crate::wording;
use crate::wording::{ABSENT, Place, figure, number, percent, unit_symbol, with_unit};

/// The page of a study, its figures in the units of `show_in`.
pub fn study_page(record: &RepeatRecord, show_in: System) -> Page {
    let subject = format!(
        "{}: {} by {}, {} each",
        record.rig,
        wording::count(wide(record.parts.len()), "spring"),
        wording::count(wide(record.operators.len()), "operator"),
        wording::count(record.trials, "trial")
    );
    let mut page = Page::begun(
        "study",
        "Repeatability of a rig",
        subject,
        &record.provenance,
        show_in,
    );
    page.decision = PageDecision {
        code: look(record.decision),
        word: wording::serving_word(record.decision).to_owned(),
        about: format!(
            "Whether what {} adds by itself and its operators is small against the tolerances.",
            record.rig
        ),
        why: record
            .reasons
            .iter()
            .map(|reason| wording::repeat_reason(reason, show_in))
            .collect(),
    };
    page.notes.extend(record.note.iter().map(|text| Note {
        label: "Note".to_owned(),
        text: text.clone(),
    }));
    page.facts = facts(record);
    page.tables = vec![overview(record, show_in), proposed(record, show_in)];
    page.cautions = record
        .cautions
        .iter()
        .map(|one| wording::bench_caution(one, show_in))
        .collect();
    let mut sections: Vec<Section> = record
        .studies
        .iter()
        .map(|study| section(study, show_in))
        .collect();
    sections.append(&mut page.sections);
    page.sections = sections;
    page
}

fn wide(number: usize) -> u64 {
    u64::try_from(number).unwrap_or(u64::MAX)
}

fn facts(record: &RepeatRecord) -> Vec<Facts> {
    let operators: Vec<String> = record
        .operators
        .iter()
        .filter(|name| !name.is_empty())
        .cloned()
        .collect();
    let mut rows = vec![
        fact("Studied on", record.judged_at.to_string()),
        fact("Springs", wording::list(&record.parts)),
    ];
    if !operators.is_empty() {
        rows.push(fact("Operators", wording::list(&operators)));
    }
    rows.push(fact("Trials", record.trials.to_string()));
    rows.extend(stated("Tolerances of drawing", record.drawing.as_ref()));
    let about = Facts {
        title: "Study".to_owned(),
        rows,
    };
    vec![about, of_bench(&record.bench)]
}

/// The share of a source in a study.
fn share<'a>(of: &'a StudyFacts, source: &str) -> Option<&'a VariationShare> {
    of.shares.iter().find(|share| share.source == source)
}

fn overview(record: &RepeatRecord, show_in: System) -> Table {
    let columns = vec![
        Column::words("Quantity"),
        Column::words("Unit"),
        Column::figures("s within a spring", ""),
        Column::figures("s of springs", ""),
        Column::figures("6 s of tolerance", ""),
        Column::figures("s of the study", ""),
        Column::figures("Categories", ""),
        Column::words("Serves"),
    ];
    let row = |of: &StudyFacts| {
        let sd = |value: Option<Finite>| figure(value, of.unit, Place::Significant(3), show_in);
        let within = share(of, "within");
        let serves = match of.serving {
            Some(Serving::Serves) => Cell::marked("serves", Verdict::Conforms),
            Some(Serving::Fails) => Cell::marked("does not serve", Verdict::Fails),
            Some(Serving::Undecided) => Cell::marked("undecided", Verdict::Undecided),
            None => Cell::from(ABSENT),
        };
        let name = wording::characteristic(&of.name, of.at_length_mm, show_in);
        Row::from([
            wording::sentence(&name).into(),
            unit_symbol(of.unit, show_in).into(),
            sd(Some(of.within_spring)).into(),
            sd(share(of, "part").map(|part| part.standard_deviation)).into(),
            percent(within.and_then(|within| within.of_tolerance)).into(),
            percent(within.and_then(|within| within.of_study)).into(),
            of.categories
                .map_or_else(|| ABSENT.to_owned(), |number| number.to_string())
                .into(),
            serves,
        ])
    };
    let rows = record.studies.iter().map(row);
    let mut table = Table::new("What the bench adds", columns, rows.collect());
    "s within a spring: repeats and operators. 6 s of tolerance: 6 s over the width of the tolerance, at most 10 % is good, at most 30 % \
     serves. s of the study: share of the whole study's variation, which depends on the springs chosen. Categories: groups of springs \
     the bench can tell apart, truncated."
        .clone_into(&mut table.note);
    table
}

fn proposed(record: &RepeatRecord, show_in: System) -> Table {
    let columns = vec![
        Column::words("[[repeatability]] of"),
        Column::figures("standard_deviation", ""),
        Column::words("Unit"),
        Column::figures("In the rig file now", ""),
    ];
    let rows = record.proposed.iter().map(|of| {
        let sd = |value: Option<Finite>| figure(value, of.unit, Place::Significant(3), show_in);
        Row::from([
            of.of.as_str().into(),
            sd(Some(of.standard_deviation)).into(),
            unit_symbol(of.unit, show_in).into(),
            sd(of.stated).into(),
        ])
    });
    let mut table = Table::new("For the rig file", columns, rows.collect());
    "The standard deviation within a spring; of several loads the largest. --write puts them into the rig file, in its units."
        .clone_into(&mut table.note);
    table
}

fn section(of: &StudyFacts, show_in: System) -> Section {
    let name = wording::sentence(&wording::characteristic(&of.name, of.at_length_mm, show_in));
    let model = match of.model.as_str() {
        "pooled" => {
            "The interaction of springs and operators is taken for scatter (p above 0.25) and pooled with the repeats."
        }
        _ if of.shares.iter().any(|share| share.source == "interaction") => {
            "The interaction of springs and operators stands by itself."
        }
        _ => "One operator: springs and repeats only.",
    };
    let mut tables = vec![
        variance(&of.variance, of, show_in),
        shares("Components", &of.shares, of, show_in),
    ];
    if !of.other_shares.is_empty() {
        let caption = match of.model.as_str() {
            "pooled" => "Components, interaction by itself",
            _ => "Components, interaction pooled",
        };
        tables.push(shares(caption, &of.other_shares, of, show_in));
    }
    tables.extend(
        of.ranges
            .as_ref()
            .map(|ranges| by_ranges(ranges, of, show_in)),
    );
    Section {
        title: name,
        text: vec![model.to_owned()],
        tables,
    }
}

fn variance(rows: &[VarianceRow], of: &StudyFacts, show_in: System) -> Table {
    let square = wording::per_unit(of.unit, show_in).powi(2);
    let unit = format!("({})²", unit_symbol(of.unit, show_in));
    let columns = vec![
        Column::words("Source"),
        Column::figures("Sum of squares", &unit),
        Column::figures("ν", ""),
        Column::figures("Mean square", &unit),
        Column::figures("F", ""),
        Column::figures("p", ""),
    ];
    let rows = rows.iter().map(|row| {
        let scaled = |value: Option<Finite>| number(value.map(|value| value.get() / square), 5);
        Row::from([
            wording::sentence(wording::component_word(&row.source)).into(),
            scaled(Some(row.sum_of_squares)).into(),
            number(Some(row.degrees_of_freedom), 5).into(),
            scaled(row.mean_square).into(),
            number(row.f, 4).into(),
            number(row.p, 3).into(),
        ])
    });
    Table::new("Crossed analysis of variance", columns, rows.collect())
}

fn shares(caption: &str, rows: &[VariationShare], of: &StudyFacts, show_in: System) -> Table {
    let columns = vec![
        Column::words("Source"),
        Column::figures("s", unit_symbol(of.unit, show_in)),
        Column::figures("Share of variance", ""),
        Column::figures("s of the study", ""),
        Column::figures("6 s of tolerance", ""),
    ];
    let rows = rows.iter().map(|row| {
        let sd = Some(row.standard_deviation);
        Row::from([
            wording::sentence(wording::component_word(&row.source)).into(),
            figure(sd, of.unit, Place::Significant(3), show_in).into(),
            percent(row.contribution).into(),
            percent(row.of_study).into(),
            percent(row.of_tolerance).into(),
        ])
    });
    Table::new(caption, columns, rows.collect())
}

fn by_ranges(of: &RangeFacts, study: &StudyFacts, show_in: System) -> Table {
    let shown = |value: Finite| with_unit(Some(value), study.unit, Place::Significant(4), show_in);
    let mut rows = vec![("Mean range of the repeats", shown(of.mean_range))];
    rows.extend(
        of.operator_range
            .map(|range| ("Range of the operators’ means", shown(range))),
    );
    rows.extend([
        ("Range of the springs’ means", shown(of.part_range)),
        ("s, repeats", shown(of.repeatability)),
        ("s, operators", shown(of.reproducibility)),
        ("s, both", shown(of.within)),
        ("s, springs", shown(of.part)),
        ("s, all", shown(of.total)),
    ]);
    let rows = rows
        .into_iter()
        .map(|(name, value)| Row::from([name.into(), value.into()]));
    let columns = vec![
        Column::words("By average and range"),
        Column::figures("", ""),
    ];
    Table::new("Average and range", columns, rows.collect())
}
