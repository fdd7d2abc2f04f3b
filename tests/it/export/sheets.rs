//! Sheets of workbooks: read like text, and refused by the name of the cell.

use std::path::{Path, PathBuf};

use coilassay::export::{BLOCK_BYTES, ExportError, RawCurve, WhyAside, read};
use coilassay::rig::{Dialect, Rarer, SpringFrom};
use miette::Diagnostic;
use rust_xlsxwriter::{ExcelDateTime, Format, Workbook};

use super::{Outcome, plain};

fn dialect() -> Dialect {
    let mut dialect = Dialect {
        header_line: 2,
        units_line: Some(3),
        spring: SpringFrom::FileName,
        rarer: Rarer {
            sheet: Some("Run 1".to_owned()),
            ..Rarer::default()
        },
        ..plain()
    };
    dialect.load.column = "Load".into();
    dialect.travel.column = "Travel".into();
    dialect
}

fn read_book(path: &Path, dialect: &Dialect) -> Outcome {
    let mut springs: Vec<RawCurve> = Vec::new();
    let read = read(path, "book.xlsx", dialect, BLOCK_BYTES, &mut |some| {
        springs.extend(some);
    })?;
    Ok((springs, read))
}

fn fixture(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR"))
        .join("tests/data/sheets")
        .join(name)
}

fn refused(path: &Path, code: &str, said: &str) {
    let fault: ExportError = read_book(path, &dialect()).unwrap_err();
    let (found, text) = (fault.code().unwrap().to_string(), fault.to_string());
    assert!(
        found == format!("coilassay::export::{code}") && text.contains(said),
        "{found}: {text}"
    );
}

/// A workbook whose cell B7 is written by `cell`.
fn with(folder: &Path, cell: impl FnOnce(&mut rust_xlsxwriter::Worksheet)) -> PathBuf {
    let mut book = Workbook::new();
    book.add_worksheet()
        .set_name("Notes")
        .unwrap()
        .write(0, 0, "nothing here")
        .unwrap();
    let sheet = book.add_worksheet().set_name("Run 1").unwrap();
    for (column, (name, unit)) in [("Travel", "mm"), ("Load", "N")].into_iter().enumerate() {
        let column = u16::try_from(column).unwrap();
        sheet.write(1, column, name).unwrap();
        sheet.write(2, column, unit).unwrap();
    }
    for row in 0..8_u32 {
        sheet.write(3 + row, 0, 0.5 * f64::from(row)).unwrap();
        sheet.write(3 + row, 1, 5.25 * f64::from(row)).unwrap();
    }
    cell(sheet);
    let path = folder.join("book.xlsx");
    book.save(&path).unwrap();
    path
}

#[test]
fn sheets_are_read_by_name() {
    let folder = tempfile::tempdir().unwrap();
    let xlsx = with(folder.path(), |_| {});
    for path in [xlsx, fixture("good.ods"), fixture("plain.xlsx")] {
        let (springs, read) = read_book(&path, &dialect()).unwrap();
        let [spring] = springs.as_slice() else {
            panic!("{springs:?}")
        };
        assert_eq!(spring.identity, "book");
        assert_eq!(
            spring.load,
            (0..8).map(|row| 5.25 * f64::from(row)).collect::<Vec<_>>()
        );
        assert_eq!(
            spring.travel,
            (0..8).map(|row| 0.5 * f64::from(row)).collect::<Vec<_>>()
        );
        assert_eq!((spring.line(0), spring.line(7)), (4, 11));
        assert_eq!((read.ledger.lines, read.ledger.points), (11, 8));
        let reasons: Vec<WhyAside> = read
            .ledger
            .set_aside
            .iter()
            .map(|aside| aside.reason)
            .collect();
        assert_eq!(
            reasons,
            [WhyAside::Metadata, WhyAside::Header, WhyAside::Units]
        );
        assert_eq!(read.sha256.len(), 64);
    }
}

#[test]
#[rustfmt::skip] // one cell a line
fn cells_that_hold_no_number_are_named_as_the_sheet_names_them() {
    let folder = tempfile::tempdir().unwrap();
    let at = folder.path();
    refused(&with(at, |s| { s.write(6, 1, "15,75").unwrap(); }), "cell", "cell B7, column `Load`: found the text `15,75`");
    refused(&with(at, |s| { s.write(6, 1, "15.75").unwrap(); }), "cell", "cell B7, column `Load`: found the text `15.75`");
    refused(&with(at, |s| { s.write(6, 1, true).unwrap(); }), "cell", "cell B7, column `Load`: found the truth value true");
    refused(&with(at, |s| { s.write_blank(6, 1, &Format::new()).unwrap(); s.clear_cell(6, 1); }), "cell", "cell B7, column `Load`: found nothing");
    refused(&with(at, |s| { s.write_formula(6, 1, rust_xlsxwriter::Formula::new("1/0").set_result("#DIV/0!")).unwrap(); }), "cell", "cell B7, column `Load`: found the");
    let date = Format::new().set_num_format("yyyy-mm-dd");
    refused(&with(at, |s| { s.write_with_format(6, 1, ExcelDateTime::from_ymd(2026, 12, 1).unwrap(), &date).unwrap(); }), "cell", "cell B7, column `Load`: found a date");
    refused(&with(at, |s| { s.write(9, 0, "x").unwrap(); }), "cell", "cell A10, column `Travel`: found the text `x`");
    refused(&fixture("text.ods"), "cell", "cell B7, column `Load`: found the text `15,75`");
    refused(&fixture("empty.ods"), "cell", "cell B7, column `Load`: found nothing");
    refused(&fixture("formula.ods"), "formula", "cell B7, column `Load`: a formula without a stored value");
    refused(&fixture("formula.xlsx"), "formula", "cell B7, column `Load`: a formula without a stored value");
}

#[test]
fn a_formula_with_its_value_is_read() {
    let folder = tempfile::tempdir().unwrap();
    let book = with(folder.path(), |sheet| {
        sheet
            .write_formula(
                6,
                1,
                rust_xlsxwriter::Formula::new("B6*1.5").set_result("15.75"),
            )
            .unwrap();
    });
    let (springs, _) = read_book(&book, &dialect()).unwrap();
    assert_eq!(springs[0].load[3].to_bits(), 15.75_f64.to_bits());
}

#[test]
fn what_is_no_such_sheet_is_refused() {
    let folder = tempfile::tempdir().unwrap();
    let other = Dialect {
        rarer: Rarer {
            sheet: Some("Run 2".to_owned()),
            ..Rarer::default()
        },
        ..dialect()
    };
    let fault = read_book(&fixture("good.ods"), &other)
        .unwrap_err()
        .to_string();
    assert!(
        fault.contains("no sheet `Run 2`; its sheets are `Notes`, `Run 1`"),
        "{fault}"
    );
    let text = folder.path().join("text.xlsx");
    std::fs::write(&text, "Travel,Load\n1,2\n").unwrap();
    refused(&text, "workbook", "is no workbook");
    let blank = with(folder.path(), |sheet| {
        sheet.write(13, 0, 9.0).unwrap();
        sheet.write(13, 1, 9.0).unwrap();
    });
    refused(&blank, "blank_line", "line 12");
    let far = with(folder.path(), |sheet| {
        sheet.write(1_048_575, 16_383, 1.0).unwrap();
    });
    refused(&far, "sheet_size", "1048576 rows of 16384 columns");
}
