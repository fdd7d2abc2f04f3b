//! The share each member of a nested set carries, at the test lengths and at solid, in theory.

use plotters::style::RGBColor;

use super::{Chart, chart};
use crate::quantity::Unit;
use crate::record::{AcceptRecord, MemberFacts};
use crate::sheet::ChartError;
use crate::sheet::canvas::{Anchor, Drawn, INK, Sheet, TYPE, WIDTH};
use crate::sheet::plot::{EDGE, LEADING};
use crate::units::System;
use crate::wording::font;
use crate::wording::{Place, figure, per_unit, percent, unit_symbol, with_unit};

/// Fills of the members, light enough for dark letters; each part also carries its member's letter.
const FILLS: [RGBColor; 4] = [
    RGBColor(0xb9, 0xcd, 0xde),
    RGBColor(0xe6, 0xd3, 0xae),
    RGBColor(0xc6, 0xda, 0xbd),
    RGBColor(0xd8, 0xc6, 0xdf),
];
/// Height of a bar and of its row.
const BAR: f64 = 26.0;
const ROW: f64 = 36.0;

/// The chart; `None` for a single spring.
///
/// # Errors
/// [`ChartError`].
pub(super) fn chart_of(
    record: &AcceptRecord,
    show_in: System,
) -> Result<Option<Chart>, ChartError> {
    let members = &record.theory.members;
    // The members of a stack all carry the whole load.
    let shared = members.iter().map(|one| one.share.get()).sum::<f64>() < 1.5;
    let Some(first) = members.first().filter(|_| members.len() > 1 && shared) else {
        return Ok(None);
    };
    let rows = first.stress.len();
    let height = EDGE * 2.0 + LEADING * (members.len() as f64 + 0.8) + ROW * (rows as f64 + 1.0);
    let caption = "In theory, from the members’ geometry: shares of the rate, and of the load at each test length and at the solid length.";
    let made = chart(
        "shares",
        "Share each member carries",
        caption.to_owned(),
        height,
        |sheet| draw(sheet, members, rows, show_in),
    );
    made.map(Some)
}

fn letter(number: usize) -> char {
    ('A'..='Z').nth(number).unwrap_or('?')
}

fn fill(number: usize) -> RGBColor {
    FILLS.get(number % FILLS.len()).copied().unwrap_or(INK)
}

fn draw(sheet: &mut Sheet<'_>, members: &[MemberFacts], rows: usize, show_in: System) -> Drawn {
    let mut y = EDGE + LEADING * 0.5;
    for (number, member) in members.iter().enumerate() {
        sheet.block((EDGE, y - 6.0), (EDGE + 22.0, y + 6.0), fill(number), 1.0)?;
        sheet.bold(
            &letter(number).to_string(),
            (EDGE + 11.0, y),
            Anchor::Middle,
            INK,
        )?;
        let words = format!("{}, {}", member.name, member.material);
        sheet.text(
            &font::shortened(&font::fitting(&words), TYPE, WIDTH - EDGE - 50.0),
            (EDGE + 30.0, y),
            Anchor::Start,
            INK,
        )?;
        y += LEADING;
    }
    y += LEADING * 0.5;
    let rates: Vec<f64> = members
        .iter()
        .map(|member| member.rate_n_per_mm.get())
        .collect();
    bar(sheet, y, "rate", &rates, Unit::NewtonPerMillimetre, show_in)?;
    for row in 0..rows {
        y += ROW;
        let at: Vec<_> = members
            .iter()
            .filter_map(|member| member.stress.get(row))
            .collect();
        let loads: Vec<f64> = at.iter().map(|stress| stress.load_n.get()).collect();
        let length = at.first().map(|stress| stress.at_length_mm);
        let words = format!(
            "load at {}",
            with_unit(length, Unit::Millimetre, Place::Significant(4), show_in)
        );
        bar(sheet, y, &words, &loads, Unit::Newton, show_in)?;
    }
    Ok(())
}

fn bar(
    sheet: &mut Sheet<'_>,
    y: f64,
    words: &str,
    parts: &[f64],
    unit: Unit,
    show_in: System,
) -> Drawn {
    let total: f64 = parts.iter().map(|part| part.max(0.0)).sum();
    let (left, right) = (EDGE + 112.0, WIDTH - EDGE - 96.0);
    sheet.text(words, (EDGE, y + BAR / 2.0), Anchor::Start, INK)?;
    let sum = with_unit(
        crate::units::Finite::try_from(total).ok(),
        unit,
        Place::Significant(4),
        show_in,
    );
    sheet.text(
        &format!("= {sum}"),
        (right + 8.0, y + BAR / 2.0),
        Anchor::Start,
        INK,
    )?;
    if total <= 0.0 || per_unit(unit, show_in) <= 0.0 {
        return Ok(());
    }
    let mut from = left;
    for (number, part) in parts.iter().enumerate() {
        let share = part.max(0.0) / total;
        let to = from + (right - left) * share;
        sheet.block((from, y), (to, y + BAR), fill(number), 1.0)?;
        sheet.line(&[(to, y), (to, y + BAR)], INK, 0.8)?;
        let shown = figure(
            crate::units::Finite::try_from(*part).ok(),
            unit,
            Place::Significant(4),
            show_in,
        );
        let long = format!(
            "{}  {shown} {} · {}",
            letter(number),
            unit_symbol(unit, show_in),
            percent(Some(share))
        );
        let middle = format!("{}  {}", letter(number), percent(Some(share)));
        let short = letter(number).to_string();
        let fits = |text: &str| font::width(text, TYPE, false) + 6.0 <= to - from;
        if let Some(text) = [long, middle, short].into_iter().find(|text| fits(text)) {
            sheet.text(
                &text,
                (f64::midpoint(from, to), y + BAR / 2.0),
                Anchor::Middle,
                INK,
            )?;
        }
        from = to;
    }
    let corners = [
        (left, y),
        (right, y),
        (right, y + BAR),
        (left, y + BAR),
        (left, y),
    ];
    sheet.line(&corners, INK, 0.8)
}
