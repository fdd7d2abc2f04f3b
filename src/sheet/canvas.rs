//! A sheet to draw on: plotters' SVG backend at ten times the size, because its coordinates are whole.

use plotters::prelude::{
    Color, DrawingBackend, IntoFont, RGBColor, SVGBackend, ShapeStyle, TextStyle,
};
use plotters::style::text_anchor::{HPos, Pos, VPos};
use plotters::style::{FontFamily, FontStyle, FontTransform};

use crate::record::Verdict;
use crate::wording::font;

/// Whole coordinates per unit of the drawing.
const SCALE: f64 = 10.0;
/// Width of every chart.
pub(crate) const WIDTH: f64 = 560.0;
/// Size of labels.
pub(crate) const TYPE: f64 = 12.0;
/// plotters divides sizes by this before it writes them.
const PLOTTERS_TYPE: f64 = 1.24;

pub(crate) const INK: RGBColor = RGBColor(0x1d, 0x26, 0x2c);
pub(crate) const FAINT: RGBColor = RGBColor(0x5b, 0x66, 0x6d);
pub(crate) const GRID: RGBColor = RGBColor(0xdd, 0xe1, 0xe4);
pub(crate) const FIELD: RGBColor = RGBColor(0x2f, 0x5f, 0x8a);
pub(crate) const LIMIT: RGBColor = RGBColor(0x8f, 0x2d, 0x14);
pub(crate) const FAILS: RGBColor = RGBColor(0xb0, 0x1e, 0x23);
pub(crate) const OPEN: RGBColor = RGBColor(0x7d, 0x5a, 0x00);
pub(crate) const THEORY: RGBColor = RGBColor(0x55, 0x3f, 0x8c);
pub(crate) const WINDOW: RGBColor = RGBColor(0x6c, 0x8f, 0x5a);

/// What the backend refuses, in its words.
#[derive(Debug, thiserror::Error)]
#[error("{0}")]
pub(crate) struct Refused(String);

/// What drawing gives.
pub(crate) type Drawn = Result<(), Refused>;

fn told<E: std::fmt::Display>(result: Result<(), E>) -> Drawn {
    result.map_err(|cause| Refused(cause.to_string()))
}

/// Where a text's position lies in it.
#[derive(Clone, Copy, Debug)]
pub(crate) enum Anchor {
    Start,
    Middle,
    End,
}

/// A point of the drawing, from its upper left corner.
pub(crate) type At = (f64, f64);

/// A drawing in the making.
pub(crate) struct Sheet<'a> {
    backend: SVGBackend<'a>,
}

/// The SVG text of what `draw` draws on a sheet of this height.
///
/// # Errors
/// What the backend reports.
pub(crate) fn drawn(
    title: &str,
    height: f64,
    draw: impl FnOnce(&mut Sheet<'_>) -> Drawn,
) -> Result<String, Refused> {
    let mut text = String::new();
    let size = (whole(WIDTH).unsigned_abs(), whole(height).unsigned_abs());
    {
        let mut sheet = Sheet {
            backend: SVGBackend::with_string(&mut text, size),
        };
        draw(&mut sheet)?;
        told(sheet.backend.present())?;
    }
    let body = text.split_once('\n').map_or("", |(_, body)| body);
    let title = escaped(title);
    Ok(format!(
        "<svg xmlns=\"http://www.w3.org/2000/svg\" viewBox=\"0 0 {} {}\" role=\"img\" aria-label=\"{title}\">\n<title>{title}</title>\n{}",
        size.0,
        size.1,
        body.replace("\n</text>", "</text>")
            .replace(" opacity=\"1\"", "")
    ))
}

fn escaped(text: &str) -> String {
    text.replace('&', "&amp;")
        .replace('<', "&lt;")
        .replace('>', "&gt;")
        .replace('"', "&quot;")
}

#[expect(
    clippy::cast_possible_truncation,
    reason = "clamped to what a drawing can hold"
)]
fn whole(length: f64) -> i32 {
    (length * SCALE).round().clamp(-1e6, 1e6) as i32
}

fn place((x, y): At) -> (i32, i32) {
    (whole(x), whole(y))
}

fn style(colour: RGBColor, alpha: f64, width: f64, filled: bool) -> ShapeStyle {
    ShapeStyle {
        color: colour.mix(alpha),
        filled,
        stroke_width: whole(width).unsigned_abs(),
    }
}

impl Sheet<'_> {
    /// A line through points.
    pub(crate) fn line(&mut self, points: &[At], colour: RGBColor, width: f64) -> Drawn {
        let points: Vec<(i32, i32)> = points.iter().copied().map(place).collect();
        told(
            self.backend
                .draw_path(points, &style(colour, 1.0, width, false)),
        )
    }

    /// A line that lets what lies under it shine through.
    pub(crate) fn faint_line(&mut self, points: &[At], colour: RGBColor, width: f64) -> Drawn {
        let points: Vec<(i32, i32)> = points.iter().copied().map(place).collect();
        told(
            self.backend
                .draw_path(points, &style(colour, 0.6, width, false)),
        )
    }

    /// A straight line broken into dashes.
    pub(crate) fn dashes(&mut self, from: At, to: At, colour: RGBColor, width: f64) -> Drawn {
        let length = (to.0 - from.0).hypot(to.1 - from.1);
        let step = 9.0;
        let mut done = 0.0;
        let along = |part: f64| {
            (
                from.0 + (to.0 - from.0) * part,
                from.1 + (to.1 - from.1) * part,
            )
        };
        while done < length {
            let end = (done + 5.5).min(length);
            self.line(&[along(done / length), along(end / length)], colour, width)?;
            done += step;
        }
        Ok(())
    }

    /// A filled area.
    pub(crate) fn area(&mut self, points: &[At], colour: RGBColor, alpha: f64) -> Drawn {
        let points: Vec<(i32, i32)> = points.iter().copied().map(place).collect();
        told(
            self.backend
                .fill_polygon(points, &style(colour, alpha, 0.0, true)),
        )
    }

    /// A filled rectangle between two corners.
    pub(crate) fn block(&mut self, from: At, to: At, colour: RGBColor, alpha: f64) -> Drawn {
        let (left, right) = (from.0.min(to.0), from.0.max(to.0));
        let (top, bottom) = (from.1.min(to.1), from.1.max(to.1));
        let style = style(colour, alpha, 0.0, true);
        told(
            self.backend
                .draw_rect(place((left, top)), place((right, bottom)), &style, true),
        )
    }

    /// A text; its position is its vertical middle.
    pub(crate) fn text(&mut self, text: &str, at: At, anchor: Anchor, colour: RGBColor) -> Drawn {
        self.letters(
            text,
            at,
            anchor,
            colour,
            FontTransform::None,
            FontStyle::Normal,
        )
    }

    /// A bold text.
    pub(crate) fn bold(&mut self, text: &str, at: At, anchor: Anchor, colour: RGBColor) -> Drawn {
        self.letters(
            text,
            at,
            anchor,
            colour,
            FontTransform::None,
            FontStyle::Bold,
        )
    }

    /// A text that reads upwards and ends at its position.
    pub(crate) fn upward(&mut self, text: &str, at: At, colour: RGBColor) -> Drawn {
        self.letters(
            text,
            at,
            Anchor::End,
            colour,
            FontTransform::Rotate270,
            FontStyle::Normal,
        )
    }

    fn letters(
        &mut self,
        text: &str,
        at: At,
        anchor: Anchor,
        colour: RGBColor,
        turn: FontTransform,
        weight: FontStyle,
    ) -> Drawn {
        let across = match anchor {
            Anchor::Start => HPos::Left,
            Anchor::Middle => HPos::Center,
            Anchor::End => HPos::Right,
        };
        let size = TYPE * SCALE * PLOTTERS_TYPE;
        let face = (FontFamily::Name(font::FAMILIES), size, weight)
            .into_font()
            .transform(turn);
        let style = TextStyle::from(face)
            .color(&colour)
            .pos(Pos::new(across, VPos::Center));
        told(
            self.backend
                .draw_text(&font::fitting(text), &style, place(at)),
        )
    }

    /// The mark of a verdict: a dot, a cross, a diamond.
    pub(crate) fn mark(&mut self, verdict: Verdict, (x, y): At, size: f64) -> Drawn {
        match verdict {
            Verdict::Conforms => {
                let style = style(FIELD, 1.0, 0.0, true);
                told(self.backend.draw_circle(
                    place((x, y)),
                    whole(size * 0.62).unsigned_abs(),
                    &style,
                    true,
                ))
            }
            Verdict::Fails => {
                self.line(&[(x - size, y - size), (x + size, y + size)], FAILS, 2.0)?;
                self.line(&[(x - size, y + size), (x + size, y - size)], FAILS, 2.0)
            }
            Verdict::Undecided => {
                let reach = size * 1.3;
                let corners = [
                    (x, y - reach),
                    (x + reach, y),
                    (x, y + reach),
                    (x - reach, y),
                    (x, y - reach),
                ];
                self.area(&corners, RGBColor(255, 255, 255), 1.0)?;
                self.line(&corners, OPEN, 1.6)
            }
        }
    }
}

/// The colour of a verdict; its mark's shape says the same.
pub(crate) const fn colour(verdict: Verdict) -> RGBColor {
    match verdict {
        Verdict::Conforms => FIELD,
        Verdict::Fails => FAILS,
        Verdict::Undecided => OPEN,
    }
}
