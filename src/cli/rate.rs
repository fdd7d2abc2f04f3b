//! `rate`: calls and prints.

use std::io::Write;

use miette::IntoDiagnostic;

use crate::export::Columns;
use crate::job::{self, Bench, RateOptions, RateResult};
use crate::quantity::Unit;
use crate::rig::Means;
use crate::units::{ForceUnit, LengthUnit, Millimetres, System};
use crate::wording::{Place, figure, odd_lines, with_uncertainty};

use super::args::RateArgs;

pub(super) fn run(args: &RateArgs, out: &mut impl Write) -> miette::Result<u8> {
    let at_lengths: Result<Vec<Millimetres>, _> = args
        .at_length
        .iter()
        .map(|length| Millimetres::try_from(*length))
        .collect();
    let options = RateOptions {
        bench: bench(args)?,
        at_lengths: at_lengths.into_diagnostic()?,
    };
    let results = job::rate(&args.exports, &options)?;
    if args.json {
        serde_json::to_writer(&mut *out, &results).into_diagnostic()?;
        writeln!(out).into_diagnostic()?;
    } else {
        for result in &results {
            print(result, out).into_diagnostic()?;
        }
        if results.iter().any(|result| !result.rig_known) {
            writeln!(out, "U holds the scatter about the line only: nothing is known of the bench. Give a rig file with --rig.").into_diagnostic()?;
        }
    }
    Ok(0)
}

fn bench(args: &RateArgs) -> miette::Result<Bench> {
    if let Some(rig) = &args.rig {
        return Ok(Bench::File(rig.clone()));
    }
    let (Some(load), Some(travel)) = (&args.load, &args.travel) else {
        return Ok(Bench::Nothing);
    };
    let wrong = |flag: &str, written: &str, wanted: &str| {
        miette::miette!(
            help = format!("write it as {wanted}"),
            "{flag} is `{written}`"
        )
    };
    let load = load
        .rsplit_once(':')
        .and_then(|(column, unit)| Some((column.to_owned(), ForceUnit::parse(unit)?)));
    let load = load.ok_or_else(|| {
        wrong(
            "--load",
            args.load.as_deref().unwrap_or(""),
            "COLUMN:UNIT with N, kN, kgf or lbf",
        )
    })?;
    let parts = travel.rsplit_once(':').and_then(|(rest, means)| {
        let (column, unit) = rest.rsplit_once(':')?;
        let means = match means {
            "deflection" => Means::Deflection,
            "length" => Means::Length,
            _ => return None,
        };
        Some(((column.to_owned(), LengthUnit::parse(unit)?), means))
    });
    let (travel, means) = parts.ok_or_else(|| {
        wrong(
            "--travel",
            travel,
            "COLUMN:UNIT:deflection or COLUMN:UNIT:length, with mm or in",
        )
    })?;
    Ok(Bench::Columns(Columns { load, travel }, means))
}

fn print(result: &RateResult, out: &mut impl Write) -> std::io::Result<()> {
    let shown = System::MmN;
    let rate = with_uncertainty(
        result.rate_n_per_mm,
        result.expanded_uncertainty_n_per_mm,
        Unit::NewtonPerMillimetre,
        shown,
    );
    writeln!(out, "{}  R = {rate} N/mm  ({})", result.id, result.export)?;
    let lines = result.lines.map_or(String::new(), |(first, last)| {
        format!(", lines {first}–{last}")
    });
    writeln!(
        out,
        "    last loading, 30 % to 70 % of the travel from contact to the greatest compression: {} points{lines}",
        result.points
    )?;
    let largest = figure(
        result.largest_load_n,
        Unit::Newton,
        Place::Significant(4),
        shown,
    );
    let straightness = figure(
        result.straightness_percent,
        Unit::Percent,
        Place::Significant(2),
        shown,
    );
    writeln!(
        out,
        "    largest load {largest} N, straightness {straightness} % of it"
    )?;
    for load in &result.loads {
        let text = with_uncertainty(
            load.load_n,
            load.expanded_uncertainty_n,
            Unit::Newton,
            shown,
        );
        writeln!(out, "    F at {} mm = {text} N", load.at_length_mm.get())?;
    }
    for odd in &result.odd {
        writeln!(out, "    {}", odd_lines(odd))?;
    }
    Ok(())
}
