//! `expect`: calls, writes, prints.

use std::io::Write;

use miette::IntoDiagnostic;

use crate::job::{self, Ask};
use crate::model::expected_page;
use crate::report;
use crate::units::{Millimetres, Newtons};

use super::accept::{date, templates};
use super::args::ExpectArgs;
use super::folder::{self, Target};
use super::rig::listed;

pub(super) fn run(args: &ExpectArgs, quiet: bool, out: &mut impl Write) -> miette::Result<u8> {
    let target = args.out.as_deref().map(Target::of).transpose()?;
    let templates = templates(args.templates.as_deref())?;
    let ask = match (args.at_load, args.at_length) {
        (Some(load), _) => Ask::Load(Newtons::try_from(load).into_diagnostic()?),
        (None, Some(length)) => Ask::Length(Millimetres::try_from(length).into_diagnostic()?),
        (None, None) => Ask::Drawing,
    };
    let written = args.drawing.to_string_lossy();
    let mut expected = job::expect(&args.drawing, &written, ask, date(args.date)?)?;
    let show_in = args.show_in.into();
    let page = expected_page(&expected, show_in);
    if let Some(target) = &target {
        let files = if args.no_report {
            Vec::new()
        } else {
            report::expected(&expected, &page, show_in, &templates)?
        };
        expected.files = listed(&files);
        target.write(&files, &expected)?;
    }
    if let (Some(dir), false) = (&args.out, quiet) {
        // A notice; where stderr is gone there is nobody to read it.
        let _ = writeln!(std::io::stderr(), "written: {}", dir.display());
    }
    if args.json {
        folder::json(&expected, out).into_diagnostic()?;
    } else {
        write!(out, "{}", report::page_text(&page)).into_diagnostic()?;
    }
    Ok(u8::from(!expected.agrees))
}
