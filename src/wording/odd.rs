//! Short words for odd lines of an export.

use crate::record::{OddLines, Oddity};

/// Lines that are odd, and why: `lines 310–313: the load steps`.
pub(crate) fn odd_lines(of: &OddLines) -> String {
    let lines = if of.first_line == of.last_line {
        format!("line {}", of.first_line)
    } else {
        format!("lines {}–{}", of.first_line, of.last_line)
    };
    format!("{lines} of {}: {}", of.export, word(of.what))
}

const fn word(what: Oddity) -> &'static str {
    match what {
        Oddity::Saturated => "load cell at its end",
        Oddity::TravelStuck => "travel stuck",
        Oddity::StrayReadings => "stray reading",
        Oddity::RowsDoubled => "repeats the row before",
        Oddity::RowsMissing => "rows missing",
        Oddity::LoadSteps => "the load steps or the travel leaps back",
        Oddity::ZeroShifted => "another load on the empty platens",
        Oddity::LateStart => "starts on a loaded spring",
        Oddity::LoadCoarse => "loads in coarser steps than stated",
        Oddity::TravelCoarse => "travel in coarser steps than stated",
        Oddity::UnevenSampling => "unevenly sampled",
        Oddity::StrokesLeftOut => "short strokes left out",
        Oddity::OtherStrokeCount => "another number of strokes",
        Oddity::StrokesDiffer => "strokes differ",
        Oddity::Scatter => "loads scatter",
        Oddity::GaugeDiffers => "gauge and bench differ",
        Oddity::RepeatsDiffer => "repeats differ",
    }
}
