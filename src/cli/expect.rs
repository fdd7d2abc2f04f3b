//! `expect`: calls and prints.

use std::io::Write;

use miette::IntoDiagnostic;

use crate::job::{self, Ask};
use crate::report;
use crate::units::{Millimetres, Newtons};

use super::accept::date;
use super::args::ExpectArgs;

pub(super) fn run(args: &ExpectArgs, out: &mut impl Write) -> miette::Result<u8> {
    let ask = match (args.at_load, args.at_length) {
        (Some(load), _) => Ask::Load(Newtons::try_from(load).into_diagnostic()?),
        (None, Some(length)) => Ask::Length(Millimetres::try_from(length).into_diagnostic()?),
        (None, None) => Ask::Drawing,
    };
    let date = date(args.date)?;
    let expected = job::expect(&args.drawing, &args.drawing.to_string_lossy(), ask, date)?;
    if args.json {
        serde_json::to_writer(&mut *out, &expected).into_diagnostic()?;
        writeln!(out).into_diagnostic()?;
    } else {
        let text = report::expected_text(&expected, args.show_in.into());
        write!(out, "{text}").into_diagnostic()?;
    }
    Ok(u8::from(!expected.agrees))
}
