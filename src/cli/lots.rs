//! `lots`: calls and prints.

use std::io::Write;

use miette::IntoDiagnostic;

use crate::archive::{Figure, LotFigures, write_table};
use crate::job::{self, Query};
use crate::text::{Alphabet, printable};
use crate::units::System;
use crate::wording::{Place, decided, figure};

use super::args::LotsArgs;
use super::show::passed_over;

pub(super) fn run(args: &LotsArgs, out: &mut impl Write) -> miette::Result<u8> {
    let query = Query {
        drawing: args.drawing.clone(),
        lot: args.lot.clone(),
        supplier: args.supplier.clone(),
        since: args.since,
        until: args.until,
        tags: args.tag.clone(),
        superseded: args.superseded,
    };
    let found = job::lots(&args.source, &query)?;
    if args.json {
        serde_json::to_writer(&mut *out, &found.lots).into_diagnostic()?;
        writeln!(out).into_diagnostic()?;
    } else if args.figures {
        write_table(&found.lots, out).into_diagnostic()?;
    } else {
        for lot in &found.lots {
            print(lot, out).into_diagnostic()?;
        }
    }
    passed_over(&found.unreadable);
    Ok(if found.unreadable.is_empty() {
        0
    } else {
        super::COULD_NOT
    })
}

fn print(lot: &LotFigures, out: &mut impl Write) -> std::io::Result<()> {
    let shown = |text: &str| printable(text, &Alphabet::Any);
    let head = &lot.head;
    let supplier = head
        .supplier
        .as_deref()
        .map_or(String::new(), |name| format!(", {}", shown(name)));
    writeln!(
        out,
        "{}  {}  lot {}{supplier}: {}",
        head.when(),
        shown(&head.drawing),
        shown(&head.lot),
        decided(head.decision)
    )?;
    if let Some(run) = &lot.run {
        writeln!(out, "    {run}, judged {}", run.judged_at)?;
    }
    let tags: Vec<String> = head
        .tags
        .iter()
        .map(|(tag, value)| format!("{} = {}", shown(tag), shown(value)))
        .collect();
    let tags = if tags.is_empty() {
        String::new()
    } else {
        format!("; {}", tags.join(", "))
    };
    writeln!(out, "    rig {}{tags}", shown(&head.rig))?;
    lot.figures.iter().try_for_each(|one| figures(one, out))
}

fn figures(of: &Figure, out: &mut impl Write) -> std::io::Result<()> {
    let text = |value: Option<f64>, digits| {
        figure(value, of.unit, Place::Significant(digits), System::MmN)
    };
    let at = of
        .at_length_mm
        .map_or(String::new(), |at| format!(" at {at} mm"));
    let spread = of
        .standard_deviation
        .map_or(String::new(), |sd| format!(", s {}", text(Some(sd), 2)));
    writeln!(
        out,
        "    {}{at}: mean {}{spread} {} over {} springs",
        of.characteristic.replace('_', " "),
        text(Some(of.mean), 5),
        of.unit.symbol(),
        of.springs
    )
}
