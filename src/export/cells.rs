//! What one cell says: a number, or the exact reason why it is none.

use std::ops::Range;

use super::error::ExportError;
use super::lines::{Context, content};
use super::spot::show;
use crate::rig::Decimal;
use crate::units::Finite;

/// Marks that separate thousands somewhere in the world, beside point and comma.
const THOUSANDS: [char; 8] = [
    '\'', '’', '_', ' ', '\u{A0}', '\u{2009}', '\u{202F}', '\u{2007}',
];

/// Why a cell is no number.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum NoNumber {
    Empty,
    Text,
    NotFinite,
    TooLarge,
    PointUnderComma,
    CommaUnderPoint,
    Thousands,
    BlankAfter,
}

/// The number a cell holds: exactly what `f64::from_str` makes of it, blanks before it aside.
/// It is refused where it times `factor` (the conversion to N, mm or s) is not of usable size.
pub(super) fn number(cell: &str, decimal: Decimal, factor: f64) -> Result<f64, NoNumber> {
    let bare = cell.trim_start_matches([' ', '\t']);
    if bare.is_empty() {
        return Err(NoNumber::Empty);
    }
    let parsed = match decimal {
        Decimal::Point => bare.parse::<f64>(),
        Decimal::Comma if bare.contains('.') => return Err(why(bare, decimal)),
        Decimal::Comma => bare.replace(',', ".").parse(),
    };
    let value = parsed.map_err(|_| why(bare, decimal))?;
    if spells_no_number(bare) {
        return Err(NoNumber::NotFinite);
    }
    match Finite::try_from(value * factor) {
        Ok(_) => Ok(value),
        Err(_) => Err(NoNumber::TooLarge),
    }
}

fn spells_no_number(bare: &str) -> bool {
    let word = bare.trim().trim_start_matches(['+', '-']);
    [
        "nan", "inf", "infinity", "1.#inf", "1.#qnan", "1.#ind", "#n/a", "#div/0!",
    ]
    .iter()
    .any(|spelling| word.eq_ignore_ascii_case(spelling))
}

/// Why `bare`, which is no number, is none.
fn why(bare: &str, decimal: Decimal) -> NoNumber {
    let text = bare.trim_end();
    let reads = |text: &str| text.parse::<f64>().is_ok();
    let (mark, other) = match decimal {
        Decimal::Point => ('.', ','),
        Decimal::Comma => (',', '.'),
    };
    if spells_no_number(text) {
        return NoNumber::NotFinite;
    }
    let plain = text.replace(mark, ".");
    if text.len() < bare.len() && !text.contains(other) && reads(&plain) {
        return NoNumber::BlankAfter;
    }
    if text.matches(other).count() == 1 && !text.contains(mark) && reads(&text.replace(other, "."))
    {
        return match decimal {
            Decimal::Point => NoNumber::CommaUnderPoint,
            Decimal::Comma => NoNumber::PointUnderComma,
        };
    }
    let bare_digits = |text: &str, marks: &dyn Fn(char) -> bool| {
        let digits = text.replace(marks, "");
        digits.len() < text.len() && reads(&digits.replace(mark, "."))
    };
    let separates = |letter: char| letter == other || THOUSANDS.contains(&letter);
    let many = text.matches(mark).count() > 1;
    if bare_digits(text, &separates) || many && bare_digits(text, &|letter| letter == mark) {
        return NoNumber::Thousands;
    }
    NoNumber::Text
}

/// A number without its thousands marks: whole groups of three digits before the decimal mark, and none behind it.
/// `None` where the marks stand elsewhere.
pub(super) fn ungrouped(cell: &str, mark: char, decimal: Decimal) -> Option<String> {
    let bare = cell.trim_start_matches([' ', '\t']);
    if !bare.contains(mark) {
        return Some(cell.to_owned());
    }
    let point = match decimal {
        Decimal::Point => '.',
        Decimal::Comma => ',',
    };
    let (whole, rest) = bare.find(point).map_or((bare, ""), |at| bare.split_at(at));
    let digits = whole.trim_start_matches(['+', '-', '"']);
    let mut groups = digits.split(mark);
    let all_digits = |group: &str| group.bytes().all(|byte| byte.is_ascii_digit());
    let first = groups
        .next()
        .is_some_and(|group| (1..=3).contains(&group.len()) && all_digits(group));
    let grouped = first
        && groups.all(|group| {
            group.trim_end_matches('"').len() == 3 && all_digits(group.trim_end_matches('"'))
        });
    (grouped && !rest.contains(mark)).then(|| whole.replace(mark, "") + rest)
}

impl Context<'_> {
    /// The number in `cell` of a line; on a fault, the fault with its place.
    pub(super) fn number(
        &self,
        line: u64,
        text: &str,
        cell: Range<usize>,
        column: &str,
        factor: f64,
    ) -> Result<f64, ExportError> {
        let written = text.get(cell.clone()).unwrap_or_default();
        let mut held = content(written, self.dialect.quoted);
        if self.dialect.delimiter.padded() {
            held = held.trim().to_owned().into();
        }
        let decimal = self.dialect.decimal;
        let plain = match self.dialect.rarer.thousands {
            Some(mark) => ungrouped(&held, mark, decimal),
            None => Some(held.to_string()),
        };
        let found = plain.map_or(Err(NoNumber::Thousands), |plain| {
            number(&plain, decimal, factor)
        });
        let reason = match found {
            Ok(value) => return Ok(value),
            Err(reason) => reason,
        };
        let at = self.spot(line, text, cell, Some(column));
        let found = show(&held);
        if !self.dialect.quoted && held.trim_start().starts_with('"') {
            return Err(ExportError::UnexpectedQuotes { at, found });
        }
        Err(match reason {
            NoNumber::Empty => ExportError::EmptyCell { at },
            NoNumber::Text => ExportError::NotANumber { at, found },
            NoNumber::NotFinite => ExportError::NotFinite { at, found },
            NoNumber::TooLarge => ExportError::TooLarge { at, found },
            NoNumber::PointUnderComma => ExportError::PointUnderComma { at, found },
            NoNumber::CommaUnderPoint => ExportError::CommaUnderPoint { at, found },
            NoNumber::Thousands => ExportError::ThousandsMarks { at, found },
            NoNumber::BlankAfter => ExportError::BlankAfter { at, found },
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers() {
        for (cell, value) in [("12.5", 12.5), ("  +1e-3", 1e-3), (".5", 0.5), ("5.", 5.0)] {
            assert_eq!(number(cell, Decimal::Point, 1.0), Ok(value));
            assert_eq!(
                number(&cell.replace('.', ","), Decimal::Comma, 1.0),
                Ok(value)
            );
        }
        assert_eq!(number("1e99", Decimal::Point, 1.0), Ok(1e99));
    }

    #[test]
    #[rustfmt::skip] // keeps the table a table
    fn reasons() {
        use Decimal::{Comma, Point};
        let rows = [
            ("", Point, NoNumber::Empty), ("  \t", Point, NoNumber::Empty),
            ("abc", Point, NoNumber::Text), ("1e", Point, NoNumber::Text), ("--1", Point, NoNumber::Text), ("0x10", Point, NoNumber::Text),
            ("nan", Point, NoNumber::NotFinite), ("-Infinity", Comma, NoNumber::NotFinite), ("+INF", Point, NoNumber::NotFinite), ("NaN ", Point, NoNumber::NotFinite), ("1.#QNAN", Point, NoNumber::NotFinite),
            ("1e101", Point, NoNumber::TooLarge), ("1e400", Point, NoNumber::TooLarge), ("-2e100", Comma, NoNumber::TooLarge),
            ("12.5", Comma, NoNumber::PointUnderComma), ("1.234", Comma, NoNumber::PointUnderComma), ("12,5", Point, NoNumber::CommaUnderPoint),
            ("1.234,5", Comma, NoNumber::Thousands), ("1,234.5", Point, NoNumber::Thousands), ("1 234,5", Comma, NoNumber::Thousands),
            ("1\u{A0}234,5", Comma, NoNumber::Thousands), ("1'234.5", Point, NoNumber::Thousands), ("1.234.567", Point, NoNumber::Thousands), ("1.234.567", Comma, NoNumber::Thousands),
            ("12.5 ", Point, NoNumber::BlankAfter), ("12,5 ", Comma, NoNumber::BlankAfter),
        ];
        let misses: Vec<_> = rows.iter().filter(|(cell, decimal, reason)| number(cell, *decimal, 1.0) != Err(*reason)).collect();
        assert!(misses.is_empty(), "{misses:?}");
    }

    #[test]
    fn size_counts_in_the_unit_after_conversion() {
        assert!(number("1e98", Decimal::Point, 1.0).is_ok());
        assert_eq!(
            number("1e98", Decimal::Point, 1000.0),
            Err(NoNumber::TooLarge)
        );
    }
}
