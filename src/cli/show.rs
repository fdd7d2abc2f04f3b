//! Shows a fault on stderr.

use std::io::{IsTerminal, Write};

use miette::{Diagnostic, GraphicalReportHandler, GraphicalTheme};

use super::args::Colour;

/// Columns a fault is laid out for; the same on every terminal, so that two people see the same lines.
const WIDTH: usize = 100;

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
