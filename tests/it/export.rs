//! Exports as testers write them. Here: what is read, and the means to read it in blocks of every size.
//! Beside: what is refused and where (`refusals`), what holds for any file (`relations`), findings (`small`).
#![expect(
    clippy::unwrap_used,
    clippy::panic,
    clippy::indexing_slicing,
    reason = "tests"
)]

mod refusals;
mod relations;
mod small;

use std::io::Write;
use std::ops::Range;

use coilassay::export::{BLOCK_BYTES, ExportError, RawCurve, Read, WhyAside, read};
use coilassay::rig::{
    Decimal, Delimiter, Dialect, Encoding, LoadColumn, Pushing, SpringFrom, TravelColumn,
};
use coilassay::units::{ForceUnit, LengthUnit};
use miette::{Diagnostic, GraphicalReportHandler, GraphicalTheme};

/// Comma, point, `Specimen,Load,Travel` on line 1, N and mm.
fn plain() -> Dialect {
    Dialect {
        header_line: 1,
        units_line: None,
        delimiter: Delimiter::Comma,
        decimal: Decimal::Point,
        encoding: Encoding::Utf8,
        quoted: false,
        last_line_open: false,
        load: LoadColumn {
            column: "Load".into(),
            unit: ForceUnit::Newton,
            pushing: Pushing::Positive,
        },
        travel: TravelColumn {
            column: "Travel".into(),
            unit: LengthUnit::Millimetre,
            pushing: Pushing::Positive,
        },
        time: None,
        spring: SpringFrom::Column("Specimen".into()),
    }
}

/// Semicolon, decimal comma, windows-1252, metadata, header on line 3, units on line 4, time, one spring a file.
fn bench() -> Dialect {
    Dialect {
        header_line: 3,
        units_line: Some(4),
        delimiter: Delimiter::Semicolon,
        decimal: Decimal::Comma,
        encoding: Encoding::Windows1252,
        load: LoadColumn {
            column: "Prüfkraft".into(),
            unit: ForceUnit::Newton,
            pushing: Pushing::Negative,
        },
        travel: TravelColumn {
            column: "Weg".into(),
            unit: LengthUnit::Millimetre,
            pushing: Pushing::Positive,
        },
        time: Some("t".into()),
        spring: SpringFrom::FileName,
        ..plain()
    }
}

const BENCH: &[u8] = b"Pr\xFCfung 12.03.2026\r\n\r\nt;Pr\xFCfkraft;Weg;Bemerkung\r\ns;N;mm;\r\n";

type Outcome = Result<(Vec<RawCurve>, Read), ExportError>;

fn read_in(bytes: &[u8], dialect: &Dialect, block_bytes: usize) -> Outcome {
    let mut file = tempfile::NamedTempFile::new().unwrap();
    file.write_all(bytes).unwrap();
    let mut springs = Vec::new();
    let mut each = |done: Vec<RawCurve>| {
        assert!(!done.is_empty());
        springs.extend(done);
    };
    let outcome = read(file.path(), "lot/17.csv", dialect, block_bytes, &mut each);
    outcome.map(|read| (springs, read))
}

fn rendered(fault: &ExportError) -> String {
    let handler = GraphicalReportHandler::new_themed(GraphicalTheme::none()).with_width(120);
    let mut out = String::new();
    handler.render_report(&mut out, fault).unwrap();
    out
}

/// Everything an outcome says, for comparison.
fn told(outcome: &Outcome) -> String {
    match outcome {
        Ok((springs, read)) => format!("{springs:?} {read:?}"),
        Err(fault) => rendered(fault),
    }
}

/// Reads in blocks of several sizes, demands the same from all, and gives it.
fn read_all(bytes: &[u8], dialect: &Dialect) -> Outcome {
    let whole = read_in(bytes, dialect, BLOCK_BYTES);
    for block_bytes in [1, 7, 64, 1024] {
        assert_eq!(told(&read_in(bytes, dialect, block_bytes)), told(&whole));
    }
    whole
}

fn good(bytes: &[u8], dialect: &Dialect) -> (Vec<RawCurve>, Read) {
    read_all(bytes, dialect).unwrap_or_else(|fault| panic!("{}", rendered(&fault)))
}

/// The stretch of the excerpt a fault points at.
fn pointed_at(fault: &ExportError) -> String {
    let label = fault.labels().and_then(|mut labels| labels.next());
    let (Some(label), Some(source)) = (label, fault.source_code()) else {
        return String::new();
    };
    let span = source.read_span(label.inner(), 0, 0).unwrap();
    let start = label.offset() - span.span().offset();
    let cell: Range<usize> = start..start + label.len();
    String::from_utf8_lossy(&span.data()[cell]).into_owned()
}

fn ledger_lines(read: &Read) -> Vec<(WhyAside, u64, u64)> {
    let asides = read.ledger.set_aside.iter();
    asides
        .map(|aside| (aside.reason, aside.first_line, aside.last_line))
        .collect()
}

#[test]
fn springs_by_column() {
    let text = b"Specimen,Load,Travel\na,1.5,0.1\na,2.5,0.2\n b ,-3,0\nb,4e0,+.5\n\n  \n";
    let (springs, read) = good(text, &plain());
    assert_eq!(springs.len(), 2);
    assert_eq!((springs[0].id.as_str(), springs[0].first_line), ("a", 2));
    assert_eq!(
        (&springs[0].load, &springs[0].travel),
        (&vec![1.5, 2.5], &vec![0.1, 0.2])
    );
    assert_eq!(
        (springs[1].identity.as_str(), springs[1].first_line),
        ("b", 4)
    );
    assert_eq!(
        (&springs[1].load, &springs[1].travel),
        (&vec![-3.0, 4.0], &vec![0.0, 0.5])
    );
    assert_eq!((read.ledger.lines, read.ledger.points), (7, 4));
    let aside = [(WhyAside::Header, 1, 1), (WhyAside::BlankAtTheEnd, 6, 7)];
    assert_eq!(ledger_lines(&read), aside);
}

#[test]
fn a_bench_with_everything() {
    let rows = b"0,0;-1,5;0,01;\r\n0,1; -2,25;0,02;ab 1.5\r\n0,1;0,0;1e1;x^\r\n";
    let (springs, read) = good(&[BENCH, rows].concat(), &bench());
    assert_eq!(springs.len(), 1);
    assert_eq!(
        (springs[0].id.as_str(), springs[0].export.as_str()),
        ("17", "lot/17.csv")
    );
    assert_eq!(springs[0].first_line, 5);
    assert_eq!(springs[0].load, [1.5, 2.25, 0.0]);
    assert!(springs[0].load[2].is_sign_positive());
    assert_eq!(springs[0].travel, [0.01, 0.02, 10.0]);
    assert_eq!(springs[0].time, Some(vec![0.0, 0.1, 0.1]));
    let aside = [
        (WhyAside::Metadata, 1, 2),
        (WhyAside::Header, 3, 3),
        (WhyAside::Units, 4, 4),
    ];
    assert_eq!(ledger_lines(&read), aside);
    assert_eq!((read.ledger.lines, read.ledger.points), (7, 3));
}

/// NIST SP 811 (2008), appendix B.8: 1 lbf = 4.448 222 N, 1 in = 25.4 mm.
#[test]
fn units_are_converted() {
    let mut dialect = plain();
    dialect.load.unit = ForceUnit::PoundForce;
    dialect.load.column = "Load [lbf]".into();
    dialect.travel.unit = LengthUnit::Inch;
    let (springs, _) = good(b"Specimen,Load [lbf],Travel\na,2,3\n", &dialect);
    approx::assert_relative_eq!(
        springs[0].load[0],
        8.896_444,
        epsilon = 0.0,
        max_relative = 1e-7
    );
    approx::assert_relative_eq!(
        springs[0].travel[0],
        76.2,
        epsilon = 0.0,
        max_relative = 1e-15
    );
}

#[test]
fn the_same_table_in_other_clothes() {
    let text = "Specimen,Load,Travel\na,1.5,0.1\nb,2.5,0.2\n";
    let (springs, plain_read) = good(text.as_bytes(), &plain());
    for dressed in [text.replace('\n', "\r\n"), format!("\u{FEFF}{text}")] {
        let (again, read) = good(dressed.as_bytes(), &plain());
        assert_eq!((&again, &read.ledger), (&springs, &plain_read.ledger));
        assert_ne!(read.sha256, plain_read.sha256);
    }
    let open = Dialect {
        last_line_open: true,
        ..plain()
    };
    assert_eq!(good(text.trim_end().as_bytes(), &open).0, springs);
    let tabs = Dialect {
        delimiter: Delimiter::Tab,
        ..plain()
    };
    assert_eq!(good(text.replace(',', "\t").as_bytes(), &tabs).0, springs);
    let quoted = Dialect {
        quoted: true,
        ..plain()
    };
    let text = "\"Specimen\",Load,\"Travel\"\n\"a\",\"1.5\",0.1\nb,2.5,\" 0.2\"\n";
    assert_eq!(good(text.as_bytes(), &quoted).0, springs);
    let commas = Dialect {
        decimal: Decimal::Comma,
        ..quoted
    };
    let text = "Specimen,Load,Travel\na,\"1,5\",\"0,1\"\nb,\"2,5\",\"0,2\"\n";
    assert_eq!(good(text.as_bytes(), &commas).0, springs);
}

#[test]
fn without_a_header_columns_are_numbered() {
    let mut dialect = Dialect {
        header_line: 0,
        spring: SpringFrom::Column("3".into()),
        ..plain()
    };
    dialect.load.column = "2".into();
    dialect.travel.column = "1".into();
    let (springs, read) = good(b"0.1,5,a\n0.2,6,a\n\n", &dialect);
    assert_eq!(
        (&springs[0].load, &springs[0].travel),
        (&vec![5.0, 6.0], &vec![0.1, 0.2])
    );
    assert_eq!(
        (springs[0].first_line, ledger_lines(&read)),
        (1, vec![(WhyAside::BlankAtTheEnd, 3, 3)])
    );
    let units = Dialect {
        units_line: Some(1),
        ..dialect.clone()
    };
    assert_eq!(good(b"mm,N,-\n0.1,5,a\n", &units).0[0].first_line, 2);
    let blank = read_all(b"\n0.1,5,a\n", &dialect).unwrap_err();
    assert!(matches!(&blank, ExportError::BlankLine { at } if at.line() == 1));
    assert!(matches!(
        read_all(b"\n \n", &dialect),
        Err(ExportError::NoData { lines: 2, .. })
    ));
}

/// Columns are found by this file's own header, never by their place in another one.
#[test]
fn swapped_columns_are_found() {
    let (one, _) = good(b"Specimen,Load,Travel\na,1,2\n", &plain());
    let (other, _) = good(b"Travel,Specimen,Load\n2,a,1\n", &plain());
    assert_eq!(one, other);
}

/// These bytes begin a zlib file, or a file with a mark; the library would unpack it, or drop the mark.
#[test]
fn a_name_that_begins_like_a_file() {
    let text = "Specimen,Load,Travel\n\u{FEFF}a,1,2\n\u{FEFF}a,1,2\n";
    let (springs, _) = good(text.as_bytes(), &plain());
    assert_eq!(
        (springs.len(), springs[0].identity.as_str()),
        (1, "\u{FEFF}a")
    );
    let text = b"Specimen,Load,Travel\nx^2,1,2\nx^2,3,4\nx\x01,5,6\n";
    let (springs, _) = good(text, &plain());
    assert_eq!(springs[0].load, [1.0, 3.0]);
    assert_eq!(
        (springs[1].id.as_str(), springs[1].identity.as_str()),
        ("x\u{FFFD}", "x\x01")
    );
}

#[test]
fn doubled_names_that_nobody_asks_for_are_no_harm() {
    let (springs, _) = good(b"x,Specimen,Load,Travel,x,,\n1,a,1,2,3,,\n", &plain());
    assert_eq!(springs[0].load, [1.0]);
}
