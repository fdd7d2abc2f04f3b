//! The one function that makes a foreign string safe to print, whatever it is printed on.

use std::fmt::Write;

/// What the page at hand can show.
pub enum Alphabet<'a> {
    /// Every character that is no control: terminals and browsers bring their own fonts.
    Any,
    /// Only characters for which this says yes; others are written as `[U+5F39]`.
    Only(&'a dyn Fn(char) -> bool),
}

/// A string from a file or a command line, fit to print: control and bidi-control characters become
/// U+FFFD (they can move text or hide it), characters outside `alphabet` become their code point.
pub fn printable(text: &str, alphabet: &Alphabet<'_>) -> String {
    let mut out = String::with_capacity(text.len());
    for character in text.chars() {
        let shown = if moves_text(character) {
            '\u{FFFD}'
        } else {
            character
        };
        match alphabet {
            Alphabet::Only(has) if !has(shown) => {
                // Writing into a string cannot fail.
                let _ = write!(out, "[U+{:04X}]", u32::from(character));
            }
            _ => out.push(shown),
        }
    }
    out
}

/// Controls, line separators, bidi controls (Unicode standard annex 9) and other invisible marks.
fn moves_text(character: char) -> bool {
    character.is_control()
        || matches!(character, '\u{00AD}' | '\u{034F}' | '\u{061C}' | '\u{200B}'..='\u{200F}' | '\u{2028}'..='\u{202E}' | '\u{2060}'..='\u{206F}' | '\u{FEFF}' | '\u{FFF9}'..='\u{FFFB}')
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn nothing_that_moves_text_gets_through() {
        assert_eq!(
            printable("a\u{1b}[31mb\u{202E}c\n", &Alphabet::Any),
            "a\u{FFFD}[31mb\u{FFFD}c\u{FFFD}"
        );
        assert_eq!(printable("弾 ok", &Alphabet::Any), "弾 ok");
        assert_eq!(
            printable("弾 ok", &Alphabet::Only(&|c| c.is_ascii())),
            "[U+5F3E] ok"
        );
    }
}
