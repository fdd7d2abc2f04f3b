//! Shows a fault on stderr.

use std::io::{IsTerminal, Write};

use miette::{Diagnostic, GraphicalReportHandler, GraphicalTheme};

use super::args::Colour;
use crate::archive::Unreadable;

/// Columns a fault is laid out for; the same on every terminal, so that two people see the same lines.
const WIDTH: usize = 100;

/// Passed-over files named at once.
const SHOWN: usize = 20;

/// Names on stderr the files of an archive that were passed over.
pub(super) fn passed_over(files: &[Unreadable]) {
    let mut lines: Vec<String> = files
        .iter()
        .take(SHOWN)
        .map(Unreadable::to_string)
        .collect();
    if let Some(more @ 1..) = files.len().checked_sub(SHOWN) {
        lines.push(format!("{more} more"));
    }
    let mut err = std::io::stderr().lock();
    for line in lines {
        let _ = writeln!(err, "passed over: {line}"); // nothing can be said where stderr itself is gone
    }
}

/// Shows `fault` on stderr, in colour where `colour` and the terminal allow it.
pub fn show(fault: &miette::Report, colour: Colour) {
    let text = render(fault.as_ref(), wants_colour(colour));
    // Nothing can be said where stderr itself is gone.
    let _ = std::io::stderr().lock().write_all(text.as_bytes());
}

fn wants_colour(colour: Colour) -> bool {
    match colour {
        Colour::Always => true,
        Colour::Never => false,
        Colour::Auto => {
            std::env::var_os("NO_COLOR").is_none_or(|set| set.is_empty())
                && std::io::stderr().is_terminal()
        }
    }
}

fn render(fault: &dyn Diagnostic, colour: bool) -> String {
    let theme = if colour {
        GraphicalTheme::unicode()
    } else {
        GraphicalTheme::unicode_nocolor()
    };
    let handler = GraphicalReportHandler::new_themed(theme)
        .with_width(WIDTH)
        .with_links(false)
        .with_context_lines(1);
    let mut text = String::new();
    match handler.render_report(&mut text, fault) {
        Ok(()) => text,
        Err(_) => format!("{fault}\n"),
    }
}
