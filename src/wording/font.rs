//! The embedded fonts: which characters they have and how wide a text runs. Parsed on first use.

use std::sync::OnceLock;

use ttf_parser::Face;

use crate::text::{Alphabet, printable};

/// The regular face; see `templates/fonts/README.md`.
pub(crate) const REGULAR: &[u8] = include_bytes!("../../templates/fonts/OpenSans-Regular.ttf");
/// The bold face.
pub(crate) const BOLD: &[u8] = include_bytes!("../../templates/fonts/OpenSans-Bold.ttf");
/// The family, as charts ask for it; a page without it takes what it has.
pub(crate) const FAMILIES: &str = "Open Sans, sans-serif";

/// Width taken for a character that a face does not know, in ems.
const UNKNOWN_EM: f64 = 0.6;

/// The characters a report mostly holds: Latin to Cyrillic, and punctuation to mathematical signs.
const COMMON: [std::ops::Range<u32>; 2] = [0..0x500, 0x2000..0x2300];

/// A face and the advances of the common characters, in ems; `None` for one it does not have.
struct Known {
    face: Option<Face<'static>>,
    common: [Vec<Option<f64>>; 2],
}

impl Known {
    fn new(bytes: &'static [u8]) -> Self {
        let face = Face::parse(bytes, 0).ok();
        let common = COMMON.map(|codes| {
            let characters = codes.map(|code| char::from_u32(code).unwrap_or('\u{fffd}'));
            characters
                .map(|character| advance(face.as_ref(), character))
                .collect()
        });
        Self { face, common }
    }

    /// The advance of a character, in ems; `None` where the face does not have it.
    fn advance(&self, character: char) -> Option<f64> {
        let code = u32::from(character);
        for (codes, known) in COMMON.iter().zip(&self.common) {
            if codes.contains(&code) {
                let place = usize::try_from(code - codes.start).ok()?;
                return known.get(place).copied().flatten();
            }
        }
        advance(self.face.as_ref(), character)
    }
}

fn advance(face: Option<&Face<'_>>, character: char) -> Option<f64> {
    let face = face?;
    let units = face.glyph_hor_advance(face.glyph_index(character)?)?;
    Some(f64::from(units) / f64::from(face.units_per_em()))
}

fn regular() -> &'static Known {
    static KNOWN: OnceLock<Known> = OnceLock::new();
    KNOWN.get_or_init(|| Known::new(REGULAR))
}

fn bold() -> &'static Known {
    static KNOWN: OnceLock<Known> = OnceLock::new();
    KNOWN.get_or_init(|| Known::new(BOLD))
}

/// Whether both faces can show the character.
pub(crate) fn has(character: char) -> bool {
    regular().advance(character).is_some() && bold().advance(character).is_some()
}

/// A text fit for the embedded fonts: line ends become blanks, the rest goes through [`printable`].
pub(crate) fn fitting(text: &str) -> String {
    if text.bytes().all(|byte| matches!(byte, b' '..=b'~')) {
        return text.to_owned();
    }
    let text = text.replace(['\n', '\r', '\t'], " ");
    printable(&text, &Alphabet::Only(&has))
}

/// The width of a text in the unit of `size`.
pub(crate) fn width(text: &str, size: f64, heavy: bool) -> f64 {
    let known = if heavy { bold() } else { regular() };
    size * text
        .chars()
        .map(|c| known.advance(c).unwrap_or(UNKNOWN_EM))
        .sum::<f64>()
}

/// The text, or its beginning and `…` where it is wider than `most`.
pub(crate) fn shortened(text: &str, size: f64, most: f64) -> String {
    if width(text, size, false) <= most {
        return text.to_owned();
    }
    let mut left = most - width("…", size, false);
    let fits = text.chars().take_while(|character| {
        left -= size * regular().advance(*character).unwrap_or(UNKNOWN_EM);
        left >= 0.0
    });
    let kept: String = fits.collect();
    format!("{}…", kept.trim_end())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_fonts_have_what_the_report_writes() {
        let missing: String = "±≤≥×·√–—…²³⁴πµτνλ−∞≈äßŁżőşΩЖя“”’\u{fffd}\u{200b}\u{a0}"
            .chars()
            .filter(|character| !has(*character))
            .collect();
        assert_eq!(missing, "");
        assert!(!has('弹') && !has('🙂'));
    }

    #[test]
    fn figures_are_tabular() {
        for heavy in [false, true] {
            let one = width("1", 1000.0, heavy);
            assert!(one > 400.0);
            for digit in "023456789".chars() {
                assert!((width(&digit.to_string(), 1000.0, heavy) - one).abs() < 1e-9);
            }
        }
    }

    #[test]
    fn a_shortened_text_fits() {
        let short = shortened(&"W".repeat(400), 11.0, 60.0);
        assert!(short.ends_with('…') && width(&short, 11.0, false) <= 60.0);
        assert_eq!(shortened("17", 11.0, 60.0), "17");
    }
}
