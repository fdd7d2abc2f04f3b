//! What few testers do: blanks and pipes between cells, trailing delimiters, thousands marks, footers, several tables,
//! units and names in lines above, UTF-16, carriage returns.

use coilassay::export::WhyAside;
use coilassay::rig::{
    Decimal, Delimiter, Dialect, Each, Encoding, Rarer, SpringFrom, TableEnd, Tables,
};
use miette::Diagnostic;

use super::{good, ledger_lines, pointed_at, read_all, read_in};

/// One spring a file, `Load` and `Travel` named on line 1.
fn one(rarer: Rarer) -> Dialect {
    Dialect {
        spring: SpringFrom::FileName,
        rarer,
        ..super::plain()
    }
}

fn loads(text: &[u8], dialect: &Dialect) -> Vec<f64> {
    let (springs, _) = good(text, dialect);
    springs.into_iter().flat_map(|spring| spring.load).collect()
}

fn refused(text: &[u8], dialect: &Dialect, code: &str, said: &str, at: &str) {
    let fault = read_all(text, dialect).unwrap_err();
    let (found, message) = (fault.code().unwrap().to_string(), fault.to_string());
    assert!(
        found == format!("coilassay::export::{code}") && message.contains(said),
        "{found}: {message}"
    );
    assert_eq!(pointed_at(&fault), at, "{message}");
}

#[test]
fn delimiters() {
    let pipe = Dialect {
        delimiter: Delimiter::Pipe,
        ..one(Rarer::default())
    };
    assert_eq!(
        loads(b"Load | Travel\n 1.5 | 0.1 \n2.5|0.2\n", &pipe),
        [1.5, 2.5]
    );
    let blanks = Dialect {
        delimiter: Delimiter::Blanks,
        ..one(Rarer::default())
    };
    assert_eq!(
        loads(b"  Load \t Travel\n  1.5    0.1  \n\t2.5 0.2\n", &blanks),
        [1.5, 2.5]
    );
    refused(
        b"Load Travel\n1.5 0.1\n2.5\n",
        &blanks,
        "few_cells",
        "1 cells, the header has 2",
        "",
    );
    refused(
        b"Load Travel\n1.5 0.1\n2.5 0.2 0.3\n",
        &blanks,
        "many_cells",
        "3 cells",
        "0.3",
    );
    refused(
        b"Load Travel\n1.5 0.1\nx 0.2\n",
        &blanks,
        "number",
        "found `x`",
        "x",
    );
    let mut wide = Dialect {
        delimiter: Delimiter::TwoBlanks,
        ..one(Rarer::default())
    };
    wide.load.column = "Peak load".into();
    assert_eq!(
        loads(b"Peak load   Travel\n1.5         0.1\n2.5\t0.2\n", &wide),
        [1.5, 2.5]
    );
}

#[test]
fn trailing_delimiters() {
    let trailing = one(Rarer {
        trailing_delimiter: true,
        ..Rarer::default()
    });
    assert_eq!(
        loads(b"Load,Travel,\n1.5,0.1,\n2.5,0.2,\n", &trailing),
        [1.5, 2.5]
    );
    assert_eq!(
        loads(b"Load,Travel\n1.5,0.1,\n2.5,0.2,\n", &trailing),
        [1.5, 2.5]
    );
    refused(
        b"Load,Travel,\n1.5,0.1,\n2.5,\n",
        &trailing,
        "few_cells",
        "1 cells",
        "",
    );
    refused(
        b"Load,Travel,\n1.5,0.1,7\n",
        &trailing,
        "many_cells",
        "3 cells",
        "7",
    );
}

#[test]
fn thousands() {
    let swiss = one(Rarer {
        thousands: Some('\''),
        ..Rarer::default()
    });
    assert_eq!(
        loads(
            b"Load,Travel\n1'234.5,0.1\n-12'345'678.25,1\n12.5,2\n",
            &swiss
        ),
        [1234.5, -12_345_678.25, 12.5]
    );
    for bad in ["1'23.5", "12'3456", "'123", "1.5'000", "1''234"] {
        refused(
            format!("Load,Travel\n{bad},0.1\n").as_bytes(),
            &swiss,
            "thousands",
            bad,
            bad,
        );
    }
    let german = Dialect {
        delimiter: Delimiter::Semicolon,
        decimal: Decimal::Comma,
        ..one(Rarer {
            thousands: Some('.'),
            ..Rarer::default()
        })
    };
    assert_eq!(
        loads(b"Load;Travel\n1.234,5;0,1\n1.234;1\n12,5;2\n", &german),
        [1234.5, 1234.0, 12.5]
    );
    refused(
        b"Load;Travel\n12.5;0,1\n",
        &german,
        "thousands",
        "12.5",
        "12.5",
    );
}

#[test]
fn a_footer_ends_the_table_and_must_be_there() {
    let footed = one(Rarer {
        footer: Some("End of test".into()),
        ..Rarer::default()
    });
    let (springs, read) = good(
        b"Load,Travel\n1,0\n2,1\n\nEnd of test, 2 points\nsigned: nobody\n",
        &footed,
    );
    assert_eq!(springs[0].load, [1.0, 2.0]);
    assert_eq!(
        ledger_lines(&read),
        [
            (WhyAside::Header, 1, 1),
            (WhyAside::BlankAtTheEnd, 4, 4),
            (WhyAside::Footer, 5, 6)
        ]
    );
    refused(
        b"Load,Travel\n1,0\n2,1\n",
        &footed,
        "no_footer",
        "`End of test`",
        "",
    );
    refused(
        b"Load,Travel\n1,0\n\n2,1\nEnd of test\n",
        &footed,
        "blank_line",
        "line 3",
        "",
    );
}

fn tables(each: Each, end: TableEnd, spring: SpringFrom) -> Dialect {
    let rarer = Rarer {
        tables: Some(Tables { each, end }),
        ..Rarer::default()
    };
    Dialect {
        spring,
        header_line: 2,
        rarer,
        ..super::plain()
    }
}

#[test]
fn a_table_for_each_spring() {
    let text =
        b"Specimen: A 1\nLoad,Travel\n1,0\n2,1\n\nSpecimen: B\nnote\nLoad,Travel\n3,0\n4,1\n5,2\n";
    let named = tables(
        Each::Spring,
        TableEnd::BlankLine,
        SpringFrom::LineAfter("Specimen".into()),
    );
    let (springs, read) = good(text, &named);
    let seen: Vec<(&str, &[f64], u64)> = springs
        .iter()
        .map(|one| (one.identity.as_str(), one.load.as_slice(), one.first_line))
        .collect();
    assert_eq!(
        seen,
        [("A 1", &[1.0, 2.0][..], 3), ("B", &[3.0, 4.0, 5.0], 9)]
    );
    assert_eq!(
        ledger_lines(&read),
        [
            (WhyAside::Metadata, 1, 1),
            (WhyAside::Header, 2, 2),
            (WhyAside::BetweenTables, 5, 7),
            (WhyAside::Header, 8, 8)
        ]
    );
    let numbered = tables(Each::Spring, TableEnd::BlankLine, SpringFrom::TableNumber);
    let called: Vec<String> = good(text, &numbered)
        .0
        .into_iter()
        .map(|one| one.identity)
        .collect();
    assert_eq!(called, ["17-1", "17-2"]);
    let nameless = String::from_utf8_lossy(text).replace("Specimen: B\n", "");
    refused(
        nameless.as_bytes(),
        &named,
        "nothing_stated",
        "`Specimen`, after which the spring's name",
        "Load,Travel",
    );
    let twice = String::from_utf8_lossy(text).replace("Specimen: B", "Specimen: A 1");
    refused(
        twice.as_bytes(),
        &named,
        "table_twice",
        "spring `A 1`",
        "A 1",
    );
    let lost = String::from_utf8_lossy(text).replace("note\nLoad,Travel\n", "");
    refused(lost.as_bytes(), &named, "row_outside", "line 7", "3,0");
    let blank = String::from_utf8_lossy(text).replace("4,1", "\n4,1");
    refused(blank.as_bytes(), &named, "row_outside", "line 11", "4,1");
}

#[test]
fn a_table_for_each_cycle() {
    let text = b"x\nt,Load,Travel\ns,N,mm\n0,1,0\n1,2,1\nt,Load,Travel\ns,N,mm\n0,3,0\n1,4,1\n";
    let mut cycles = tables(Each::Cycle, TableEnd::NextNames, SpringFrom::FileName);
    cycles.units_line = Some(3);
    cycles.time = Some("t".into());
    let (springs, read) = good(text, &cycles);
    let [spring] = springs.as_slice() else {
        panic!("{springs:?}")
    };
    assert_eq!(spring.load, [1.0, 2.0, 3.0, 4.0]);
    assert_eq!([0, 1, 2, 3].map(|row| spring.line(row)), [4, 5, 8, 9]);
    assert_eq!(read.ledger.points, 4);
    let other = String::from_utf8_lossy(text).replace("\ns,N,mm\n0,3", "\ns,kN,mm\n0,3");
    refused(other.as_bytes(), &cycles, "unit", "states `kN`", "kN");
    let ended = tables(
        Each::Cycle,
        TableEnd::Line("--".into()),
        SpringFrom::FileName,
    );
    assert_eq!(
        loads(
            b"x\nLoad,Travel\n1,0\n-- end\nLoad,Travel\n2,1\n-- end\n",
            &ended
        ),
        [1.0, 2.0]
    );
}

#[test]
fn units_stated_above_the_table() {
    let mut dialect = one(Rarer {
        unit_after: (Some("Force unit".into()), Some("Length unit".into())),
        ..Rarer::default()
    });
    dialect.header_line = 3;
    let text = "Force unit: N\nLength unit,mm,,\nLoad,Travel\n1,0\n2,1\n";
    assert_eq!(loads(text.as_bytes(), &dialect), [1.0, 2.0]);
    refused(
        text.replace(": N", ": lbf").as_bytes(),
        &dialect,
        "unit",
        "states `lbf`",
        "lbf",
    );
    refused(
        text.replace("mm,,", "in").as_bytes(),
        &dialect,
        "unit",
        "states `in`",
        "in",
    );
    refused(
        text.replace("Force unit: N", "Force").as_bytes(),
        &dialect,
        "nothing_stated",
        "`Force unit`",
        "Load,Travel",
    );
    refused(
        text.replace(": N", ": 7").as_bytes(),
        &dialect,
        "no_unit",
        "found `7`",
        "7",
    );
}

#[test]
fn names_whatever_their_capitals() {
    let upper = one(Rarer::default());
    assert_eq!(loads(b"LOAD,travel\n1,0\n2,1\n", &upper), [1.0, 2.0]);
    refused(
        b"LOAD,load,travel\n1,0,1\n",
        &upper,
        "column",
        "no column `Load`",
        "LOAD,load,travel",
    );
}

#[test]
fn utf_16_and_carriage_returns() {
    let wide = Dialect {
        encoding: Encoding::Utf16,
        ..one(Rarer::default())
    };
    let text = "Lo\u{e4}d,Travel,Load\r\n1,0,1.5\r\n2,1,2.5\r\n";
    for big in [true, false] {
        let units = std::iter::once(0xFEFF).chain(text.encode_utf16());
        let bytes: Vec<u8> = units
            .flat_map(|unit| {
                if big {
                    unit.to_be_bytes()
                } else {
                    unit.to_le_bytes()
                }
            })
            .collect();
        assert_eq!(loads(&bytes, &wide), [1.5, 2.5]);
        let half = &bytes[..bytes.len() - 1];
        assert!(read_in(half, &wide, 8).is_err(), "half a character");
    }
    let fault = read_in(text.as_bytes(), &wide, 8).unwrap_err();
    assert_eq!(fault.code().unwrap().to_string(), "coilassay::text::read");
    let returns = one(Rarer {
        carriage_returns: true,
        ..Rarer::default()
    });
    assert_eq!(loads(b"Load,Travel\r1.5,0\r2.5,1\r", &returns), [1.5, 2.5]);
    refused(
        b"Load,Travel\r\n1.5,0\r\n",
        &returns,
        "blank_line",
        "line 2",
        "",
    );
}
