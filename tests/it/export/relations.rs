//! What holds for any file: numbers are exact or refused, no block size matters, nothing panics.

use std::fmt::Write;

use coilassay::export::{BLOCK_BYTES, ExportError};
use coilassay::rig::{
    Decimal, Delimiter, Dialect, Each, Encoding, Rarer, SpringFrom, TableEnd, Tables,
};
use proptest::prelude::*;

use super::{Outcome, plain, read_in, told};

#[test]
fn a_thousand_springs_come_in_order_and_whole() {
    let mut text = "Specimen,Load,Travel\n".to_owned();
    for spring in 0..1000 {
        for point in 0..20 {
            writeln!(text, "{spring},{point}.25,{}", f64::from(point) / 8.0).unwrap();
        }
    }
    for block_bytes in [100, 1000, 5000, BLOCK_BYTES] {
        let (springs, read) = read_in(text.as_bytes(), &plain(), block_bytes).unwrap();
        assert_eq!((springs.len(), read.ledger.points), (1000, 20_000));
        for (spring, number) in springs.iter().zip(0_u64..) {
            assert_eq!(spring.id, number.to_string());
            assert_eq!(spring.first_line, 2 + 20 * number);
            let loads: Vec<f64> = (0..20).map(|point| f64::from(point) + 0.25).collect();
            assert_eq!(spring.load, loads);
        }
    }
}

/// Cells that are numbers, or nearly.
fn cell() -> impl Strategy<Value = String> {
    let digits = "[ ]{0,2}[+-]?[0-9]{0,24}(\\.[0-9]{0,24})?([eE][+-]?[0-9]{1,3})?[ ]{0,1}";
    let near = prop_oneof![
        Just("nan"),
        Just("+inf"),
        Just("1e"),
        Just("."),
        Just("1.2.3"),
        Just("0x1F"),
        Just("1_000"),
        Just("infinity")
    ];
    let plain = any::<f64>().prop_map(|value| value.to_string());
    prop_oneof![6 => digits, 3 => plain, 1 => near.prop_map(str::to_owned)]
}

/// A file much like an export, with a few things wrong.
fn spoilt() -> impl Strategy<Value = Vec<u8>> {
    let rows = prop::collection::vec((0..4_u8, cell(), -9..99_i32), 1..12);
    let junk: Vec<&[u8]> = vec![
        b"\n",
        b"\r",
        b"\r\n",
        b",",
        b"\0",
        b"\xFF",
        b"\"",
        b".",
        b" ",
        b"\xEF\xBB\xBF",
        b"x^",
    ];
    let junk = prop::sample::select(junk);
    let spoil = prop::collection::vec((any::<prop::sample::Index>(), junk, any::<bool>()), 0..3);
    (rows, spoil, any::<bool>()).prop_map(|(rows, spoil, honest)| {
        let mut bytes = b"Specimen,Load,Travel\n".to_vec();
        for (spring, load, travel) in rows {
            let load = if honest { "12.5".to_owned() } else { load };
            bytes.extend(format!("{},{load},{travel}\n", spring / 2).bytes());
        }
        for (index, junk, replace) in spoil {
            let at = index.index(bytes.len());
            let end = if replace { at + 1 } else { at };
            bytes.splice(at..end, junk.iter().copied());
        }
        bytes
    })
}

fn a_proper_answer(outcome: &Outcome) -> bool {
    match outcome {
        Ok((springs, read)) => {
            let points: usize = springs.iter().map(|spring| spring.load.len()).sum();
            points as u64 == read.ledger.points
        }
        Err(fault) => !matches!(
            fault,
            ExportError::Unreadable { .. } | ExportError::LedgerOpen { .. }
        ),
    }
}

/// The springs of an unquoted UTF-8 table under `plain`, read by the simplest means there are.
fn by_hand(text: &str) -> Option<Vec<(String, Vec<f64>)>> {
    let mut springs: Vec<(String, Vec<f64>)> = Vec::new();
    let mut lines = text.trim_start_matches('\u{FEFF}').lines();
    let header: Vec<&str> = lines.next()?.split(',').map(str::trim).collect();
    let position = |name: &str| header.iter().position(|cell| *cell == name);
    let (name, load) = (position("Specimen")?, position("Load")?);
    for line in lines.filter(|line| !line.trim().is_empty()) {
        let cells: Vec<&str> = line.split(',').collect();
        let value = cells.get(load)?.trim_start().parse().ok()?;
        let name = cells.get(name)?.trim();
        match springs.last_mut() {
            Some((last, loads)) if last == name => loads.push(value),
            _ => springs.push((name.to_owned(), vec![value])),
        }
    }
    Some(springs)
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 400, failure_persistence: None, ..ProptestConfig::default() })]

    /// A number is what `f64::from_str` says, or it is refused.
    #[test]
    fn numbers_are_exact(cells in prop::collection::vec(cell(), 1..4), comma in any::<bool>()) {
        let mut dialect = Dialect { delimiter: Delimiter::Semicolon, ..plain() };
        let mut text = "Specimen;Load;Travel\n".to_owned();
        if comma {
            dialect.decimal = Decimal::Comma;
        }
        for cell in &cells {
            let written = if comma { cell.replace('.', ",") } else { cell.clone() };
            writeln!(text, "a;{written};1").unwrap();
        }
        let wanted: Vec<Option<f64>> = cells.iter().map(|cell| cell.trim_start_matches(' ').parse().ok().filter(|value: &f64| value.abs() <= 1e100)).collect();
        match read_in(text.as_bytes(), &dialect, BLOCK_BYTES) {
            Ok((springs, _)) => {
                let bits = |value: f64| (value + 0.0).to_bits();
                let read: Vec<u64> = springs[0].load.iter().map(|value| bits(*value)).collect();
                let wanted: Option<Vec<u64>> = wanted.into_iter().map(|value| value.map(bits)).collect();
                prop_assert_eq!(Some(read), wanted);
            }
            Err(fault) => {
                let first = wanted.iter().position(Option::is_none);
                prop_assert!(first.is_some(), "{}", fault);
                prop_assert!(fault.to_string().contains(&format!("line {}, column `Load`", first.unwrap() + 2)), "{}", fault);
            }
        }
    }

    /// The same springs, ledger or fault for every block size.
    #[test]
    fn block_size_does_not_matter(bytes in spoilt(), block_bytes in 1..200_usize, quoted in any::<bool>(), open in any::<bool>(), western in any::<bool>()) {
        let encoding = if western { Encoding::Windows1252 } else { Encoding::Utf8 };
        let dialect = Dialect { quoted, last_line_open: open, encoding, ..plain() };
        let whole = read_in(&bytes, &dialect, BLOCK_BYTES);
        prop_assert!(a_proper_answer(&whole), "{}", told(&whole));
        prop_assert_eq!(told(&read_in(&bytes, &dialect, block_bytes)), told(&whole));
        if let (Ok((springs, _)), false, Ok(text)) = (&whole, quoted, std::str::from_utf8(&bytes)) && !western {
            let read: Vec<(String, Vec<f64>)> = springs.iter().map(|spring| (spring.identity.clone(), spring.load.clone())).collect();
            prop_assert_eq!(Some(read), by_hand(text));
        }
    }

    /// Any bytes are read or refused in the rarer forms too, and what comes out is no longer than what went in.
    #[test]
    fn any_bytes_in_rarer_forms(bytes in prop::collection::vec(prop_oneof![any::<u8>(), prop::sample::select(b"\n\r,;|\"1.e- '\tEL".to_vec())], 0..400), delimiter in 0..3_usize, traits in any::<[bool; 5]>(), block_bytes in 1..50_usize) {
        let delimiter = [Delimiter::Pipe, Delimiter::Blanks, Delimiter::TwoBlanks][delimiter];
        let [trailing, thousands, footer, returns, tables] = traits;
        let mut dialect = Dialect { delimiter, quoted: trailing, last_line_open: true, spring: SpringFrom::FileName, ..plain() };
        dialect.rarer = Rarer {
            trailing_delimiter: trailing,
            thousands: thousands.then_some('\''),
            footer: footer.then(|| "E".to_owned()),
            carriage_returns: returns,
            tables: tables.then_some(Tables { each: Each::Cycle, end: TableEnd::BlankLine }),
            ..Rarer::default()
        };
        let header: &[u8] = match delimiter {
            Delimiter::Pipe => b"Load|Travel\n",
            _ => b"Load  Travel\n",
        };
        let bytes = [header, &bytes].concat();
        let whole = read_in(&bytes, &dialect, BLOCK_BYTES);
        prop_assert!(a_proper_answer(&whole), "{}", told(&whole));
        prop_assert_eq!(told(&read_in(&bytes, &dialect, block_bytes)), told(&whole));
        if let Ok((springs, _)) = &whole {
            let points: usize = springs.iter().map(|spring| spring.load.len()).sum();
            prop_assert!(4 * points <= bytes.len());
        }
    }

    /// UTF-16 of any bytes is read or refused.
    #[test]
    fn any_bytes_as_utf_16(bytes in prop::collection::vec(any::<u8>(), 0..300), block_bytes in 1..50_usize) {
        let dialect = Dialect { encoding: Encoding::Utf16, spring: SpringFrom::FileName, ..plain() };
        let head: Vec<u8> = std::iter::once(0xFEFF).chain("Load,Travel\n".encode_utf16()).flat_map(u16::to_le_bytes).collect();
        let bytes = [head, bytes].concat();
        let whole = read_in(&bytes, &dialect, BLOCK_BYTES);
        let again = read_in(&bytes, &dialect, block_bytes);
        prop_assert_eq!(whole.is_ok(), again.is_ok());
        if whole.is_ok() {
            prop_assert_eq!(told(&again), told(&whole));
        }
    }

    /// A workbook of any bytes is refused, or read.
    #[test]
    fn any_bytes_as_workbook(bytes in prop::collection::vec(any::<u8>(), 1..300), zip in any::<bool>()) {
        let mut dialect = Dialect { spring: SpringFrom::FileName, ..plain() };
        dialect.rarer.sheet = Some("Run 1".to_owned());
        let bytes = if zip { [&b"PK\x03\x04"[..], &bytes].concat() } else { bytes };
        prop_assert!(read_in(&bytes, &dialect, BLOCK_BYTES).is_err());
    }

    /// Any bytes at all are read or refused.
    #[test]
    fn any_bytes(bytes in prop::collection::vec(prop_oneof![any::<u8>(), prop::sample::select(b"\n\r,;\"1.e- \0x".to_vec())], 0..300), headless in any::<bool>(), quoted in any::<bool>(), block_bytes in 1..50_usize) {
        let mut dialect = Dialect { quoted, last_line_open: true, spring: SpringFrom::FileName, ..plain() };
        dialect.header_line = u64::from(!headless);
        dialect.load.column = if headless { "1".into() } else { "Load".into() };
        dialect.travel.column = if headless { "2".into() } else { "Travel".into() };
        let bytes = if headless { bytes } else { [&b"Load,Travel\n"[..], &bytes].concat() };
        let whole = read_in(&bytes, &dialect, BLOCK_BYTES);
        prop_assert!(a_proper_answer(&whole), "{}", told(&whole));
        prop_assert_eq!(told(&read_in(&bytes, &dialect, block_bytes)), told(&whole));
    }
}
