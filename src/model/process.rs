//! What the sample says of the lot.

use super::table::{Cell, Column, Row, Section, Table};
use crate::record::{
    AcceptRecord, EstimatedFacts, IntervalFacts, ProcessFacts, ShapeFacts, Verdict,
};
use crate::units::{Finite, System};
use crate::wording;
use crate::wording::{ABSENT, Place, figure, number, unit_symbol};

/// The section; empty tables where nothing was measured.
pub(crate) fn section(record: &AcceptRecord, show_in: System) -> Section {
    let of = &record.process;
    let text = vec![
        "These figures speak of this lot as far as the sample was drawn at random from it, and of the supplier’s process only as far as \
         the lot stands for it. Intervals are 95 %. What all springs share of the bench’s uncertainty is whole in every one of them and \
         does not fall with the number of springs."
            .to_owned(),
    ];
    let tables = if of.is_empty() {
        Vec::new()
    } else {
        vec![
            spread(of, show_in),
            outside(of, show_in),
            tolerance(of, show_in),
        ]
    };
    Section {
        title: "What the sample says of the lot".to_owned(),
        text,
        tables,
    }
}

fn name(of: &ProcessFacts, show_in: System) -> Cell {
    wording::sentence(&wording::characteristic(&of.name, of.at_length_mm, show_in)).into()
}

fn place(of: &ProcessFacts) -> Place {
    let half = of.mean_interval.and_then(|interval| {
        Finite::try_from((interval.upper.get() - interval.lower.get()) / 2.0).ok()
    });
    Place::Uncertainty(half)
}

fn spread(of: &[ProcessFacts], show_in: System) -> Table {
    let columns = vec![
        Column::words("Characteristic"),
        Column::figures("Springs", ""),
        Column::words("Unit"),
        Column::figures("Mean", ""),
        Column::figures("95 %", ""),
        Column::figures("u common", ""),
        Column::figures("s of values", ""),
        Column::figures("s of springs", ""),
        Column::figures("95 %", ""),
        Column::words("Shape"),
        Column::words("Stand out"),
    ];
    let rows = of.iter().map(|of| {
        let at = place(of);
        let shown = |value: Option<Finite>| figure(value, of.unit, at, show_in);
        let between = |interval: Option<IntervalFacts>| match interval {
            Some(found) => format!(
                "{} … {}",
                shown(Some(found.lower)),
                shown(Some(found.upper))
            ),
            None => ABSENT.to_owned(),
        };
        let springs = of.springs_deviation;
        let deviation = match springs {
            Some(found) if found.value.get() <= 0.0 => "hidden by the bench".to_owned(),
            found => shown(found.map(|found| found.value)),
        };
        let outliers = if of.outliers.is_empty() {
            ABSENT.to_owned()
        } else {
            wording::list(&of.outliers)
        };
        Row::from([
            name(of, show_in),
            of.springs.to_string().into(),
            unit_symbol(of.unit, show_in).into(),
            shown(Some(of.mean)).into(),
            between(of.mean_interval).into(),
            shown(Some(of.common_uncertainty)).into(),
            shown(of.standard_deviation).into(),
            deviation.into(),
            between(springs.map(|found| found.interval)).into(),
            shape(&of.shape),
            outliers.into(),
        ])
    });
    let mut table = Table::new("Mean, spread and shape", columns, rows.collect());
    "s of springs: the spread of the values less the bench’s own scatter, √(s² − u²). Shape: Anderson–Darling test for a normal \
     distribution, 5 % level. Stand out: Grubbs’ test, 5 % on either side; no figure leaves them out."
        .clone_into(&mut table.note);
    table
}

fn shape(of: &ShapeFacts) -> Cell {
    let tested = |p: Finite| {
        if p.get() < 0.001 {
            "p < 0.001".to_owned()
        } else {
            format!("p {}", number(Some(p), 2))
        }
    };
    match of {
        ShapeFacts::TooFew => "not tested: fewer than 8".into(),
        ShapeFacts::NoSpread => "no spread".into(),
        ShapeFacts::Normal { p, .. } => format!("may be normal, {}", tested(*p)).into(),
        ShapeFacts::NotNormal { p, .. } => {
            Cell::marked(format!("not normal, {}", tested(*p)), Verdict::Undecided)
        }
    }
}

/// The mark beside a figure of the normal model: nothing only where a test found nothing against it.
const fn warned(of: &ProcessFacts) -> &'static str {
    match of.shape {
        ShapeFacts::Normal { .. } => "",
        ShapeFacts::NotNormal { .. } => " (!)",
        ShapeFacts::TooFew | ShapeFacts::NoSpread => " (?)",
    }
}

const WARNINGS: &str = "(!): the values are not normal, and the figure misleads; go by the count. (?): too few values to tell.";

fn estimated(of: Option<EstimatedFacts>, mark: &str, show: impl Fn(Finite) -> String) -> Cell {
    of.map_or_else(
        || ABSENT.into(),
        |found| Cell {
            text: format!("{}{mark}", show(found.value)),
            below: format!(
                "{} … {}",
                show(found.interval.lower),
                show(found.interval.upper)
            ),
            mark: "",
        },
    )
}

/// A share in percent with two significant digits.
fn share(of: Finite) -> String {
    let percent = 100.0 * of.get();
    if percent > 0.0 && percent < 0.001 {
        return "< 0.001\u{a0}%".to_owned();
    }
    format!("{}\u{a0}%", number(Some(percent), 2))
}

fn outside(of: &[ProcessFacts], show_in: System) -> Table {
    let columns = vec![
        Column::words("Characteristic"),
        Column::figures("Pp", ""),
        Column::figures("Ppk", ""),
        Column::figures("Outside by the normal model", ""),
        Column::figures("Outside by count", ""),
    ];
    let rows = of.iter().filter(|of| of.outside_count.is_some()).map(|of| {
        let mark = warned(of);
        let index = |value: Finite| number(Some(value), 3);
        let counted = of.outside_count.zip(of.outside_share).map_or_else(
            || ABSENT.into(),
            |(count, found)| Cell {
                text: format!("{count} of {}", of.springs),
                below: format!("{} … {}", share(found.lower), share(found.upper)),
                mark: "",
            },
        );
        Row::from([
            name(of, show_in),
            estimated(of.pp, mark, index),
            estimated(of.ppk, mark, index),
            estimated(of.outside_by_model, mark, share),
            counted,
        ])
    });
    let mut table = Table::new("Limits and spread", columns, rows.collect());
    let hidden = if of.iter().any(|of| of.bench_dominates) {
        " Not given where the bench’s own scatter makes up more than half of s²."
    } else {
        ""
    };
    table.note = format!(
        "Pp, Ppk: with the spread of the springs over this lot. Outside: of the limits as drawn; by count with exact (Clopper–Pearson) \
         bounds.{hidden} {WARNINGS}"
    );
    table
}

fn tolerance(of: &[ProcessFacts], show_in: System) -> Table {
    let columns = vec![
        Column::words("Characteristic"),
        Column::words("Unit"),
        Column::figures("99 % of the springs within", ""),
        Column::figures("99 % above", ""),
        Column::figures("99 % below", ""),
    ];
    let rows = of.iter().map(|of| {
        let mark = warned(of);
        let shown = |value: Finite| figure(Some(value), of.unit, place(of), show_in);
        let marked = |value: Option<Finite>| {
            value.map_or_else(
                || ABSENT.to_owned(),
                |value| format!("{}{mark}", shown(value)),
            )
        };
        let within = of.tolerance.map_or_else(
            || ABSENT.to_owned(),
            |found| format!("{} … {}{mark}", shown(found.lower), shown(found.upper)),
        );
        Row::from([
            name(of, show_in),
            unit_symbol(of.unit, show_in).into(),
            within.into(),
            marked(of.one_sided.map(|found| found.lower)).into(),
            marked(of.one_sided.map(|found| found.upper)).into(),
        ])
    });
    let mut table = Table::new(
        "Tolerance intervals, 95 % confidence",
        columns,
        rows.collect(),
    );
    table.note =
        format!("Exact factors for a normal distribution, on the values as measured. {WARNINGS}");
    table
}
