//! What is refused, where, and in what words.

use std::fmt::Write;

use coilassay::export::{BLOCK_BYTES, ExportError, read};
use coilassay::rig::{Decimal, Delimiter, Dialect, Encoding, SpringFrom};
use miette::Diagnostic;

use super::{BENCH, bench, good, plain, pointed_at, read_all, read_in, rendered};

/// A refusal: the file, its code, what the message says, and the stretch pointed at.
type Refusal<'r> = (&'r [u8], &'r str, &'r str, &'r str);

fn refuse(dialect: &Dialect, rows: &[Refusal<'_>]) {
    let mut misses = Vec::new();
    for (bytes, code, says, points) in rows {
        let Err(fault) = read_all(bytes, dialect) else {
            misses.push(format!("read: {}", String::from_utf8_lossy(bytes)));
            continue;
        };
        let found = fault
            .code()
            .map(|code| code.to_string())
            .unwrap_or_default();
        let (message, cell) = (fault.to_string(), pointed_at(&fault));
        if found != format!("coilassay::export::{code}")
            || !message.contains(says)
            || cell != *points
        {
            misses.push(format!(
                "{found} `{message}` at `{cell}`, wanted {code} `{says}` at `{points}`"
            ));
        }
        assert!(
            fault
                .help()
                .is_some_and(|help| !help.to_string().is_empty())
        );
        assert!(!rendered(&fault).contains("Schema"), "polars speaks");
    }
    assert!(misses.is_empty(), "{}", misses.join("\n"));
}

#[test]
#[rustfmt::skip] // keeps the table a table
fn faults_of_the_head() {
    refuse(&plain(), &[
        (b"", "empty", "`lot/17.csv` is empty", ""),
        (b"\xEF\xBB\xBF", "empty", "is empty", ""),
        (b"Specimen,Load,Travel\n", "no_data", "1 lines, none of them a point", ""),
        (b"Specimen,Load,Travel", "no_data", "none of them a point", ""),
        (b"Specimen,Load,Travel\n\n\n", "no_data", "3 lines", ""),
        (b"Specimen,Laod,Travel\na,1,2\n", "column", "no column `Load` for the load; the columns are `Specimen`, `Laod`, `Travel`", "Specimen,Laod,Travel"),
        (b"Specimen,Load,Load,Travel\na,1,2,3\n", "doubled", "column 2 or column 3", "Load"),
        (b"\"Specimen\",\"Load\",\"Travel\"\na,1,2\n", "column", "no column `Specimen`", "\"Specimen\",\"Load\",\"Travel\""),
        (b"Specimen,Load,Tra\xFFvel\na,1,2\n", "encoding", "line 1: the byte 0xFF is no utf-8", "\u{FFFD}"),
        (b"\xFF\xFES\0\n\0", "utf16", "the mark of UTF-16 or UTF-32", ""),
        (b"\xFE\xFF\0S\0\n", "utf16", "the mark of UTF-16 or UTF-32", ""),
        (b"S\0p\0\n\0", "nul", "line 1: a NUL byte", "\u{FFFD}"),
    ]);
    let later = Dialect { header_line: 9, ..plain() };
    refuse(&later, &[(b"a\nb\n", "head", "header_line = 9, `lot/17.csv` has 2 lines", "")]);
    let later = Dialect { units_line: Some(3), ..plain() };
    refuse(&later, &[(b"Specimen,Load,Travel\nb\n", "head", "units_line = 3", "")]);
    refuse(&Dialect { units_line: Some(1), ..plain() }, &[(b"a\n", "units_line", "units_line = 1", "")]);
    refuse(&Dialect { decimal: Decimal::Comma, ..plain() }, &[(b"a\n", "commas", "both a comma", "")]);
    let time = Dialect { time: Some("Load".into()), ..plain() };
    refuse(&time, &[(b"Specimen,Load,Travel\na,1,2\n", "shared", "line 1, column `Load`: the rig file names this column twice", "Load")]);
    let western = Dialect { encoding: Encoding::Windows1252, ..plain() };
    refuse(&western, &[
        (b"\xEF\xBB\xBFSpecimen,Load,Travel\na,1,2\n", "mark", "the mark of UTF-8", ""),
        (b"Specimen,Load,Travel\n\xE4\x81,1,2\n", "encoding", "line 2: the byte 0x81 is no windows-1252", "\u{FFFD}"),
    ]);
}

#[test]
fn nearest_names_are_offered() {
    for (header, advice) in [
        ("Specimen,Laod,Travel", "did you mean `Laod`?"),
        ("Specimen,LOADS,Travel", "did you mean `LOADS`?"),
        ("Specimen,Load [N],Travel", "did you mean `Load [N]`?"),
        ("Specimen;Load;Travel", "`delimiter`"),
        ("\"Specimen\",\"Load\",\"Travel\"", "quoted = true"),
    ] {
        let fault = read_all(format!("{header}\na,1,2\n").as_bytes(), &plain()).unwrap_err();
        let help = fault.help().unwrap().to_string();
        assert!(help.contains(advice), "{header}: {help}");
    }
}

#[test]
#[rustfmt::skip] // keeps the table a table
fn faults_of_units() {
    for (header, wanted, says, cell) in [
        ("Specimen,Load [kN],Travel", "Load [kN]", "column `Load [kN]`: the export states `kN`, the rig file N", "Load [kN]"),
        ("Specimen,Load (lbf),Travel", "Load (lbf)", "states `lbf`", "Load (lbf)"),
        ("Specimen,Kraft in kN,Travel", "Kraft in kN", "states `kN`", "Kraft in kN"),
        ("Specimen,Force/kN,Travel", "Force/kN", "states `kN`", "Force/kN"),
    ] {
        let mut dialect = plain();
        dialect.load.column = wanted.into();
        refuse(&dialect, &[(format!("{header}\na,1,2\n").as_bytes(), "unit", says, cell)]);
    }
    let units = Dialect { units_line: Some(2), ..plain() };
    refuse(&units, &[
        (b"Specimen,Load,Travel\n,kN,mm\na,1,2\n", "unit", "line 2, column `Load`: the export states `kN`, the rig file N", "kN"),
        (b"Specimen,Load,Travel\n,N,[in]\na,1,2\n", "unit", "states `[in]`, the rig file mm", "[in]"),
        (b"Specimen,Load,Travel\n,N,volt\na,1,2\n", "no_unit", "line 2, column `Travel`: found `volt` in the units line, wanted mm", "volt"),
        (b"Specimen,Load,Travel\na,1,2\na,1,2\n", "no_unit", "found `1` in the units line, wanted N", "1"),
        (b"Specimen,Load,Travel\n,N\na,1,2\n", "no_unit", "found `` in the units line", ""),
    ]);
}

#[test]
#[rustfmt::skip] // keeps the table a table
fn faults_of_the_table() {
    const HEAD: &str = "Specimen,Load,Travel\n";
    let with = |rows: &str| format!("{HEAD}{rows}").into_bytes();
    let row = |rows: &str, code: &'static str, says: &'static str, points: &'static str| (with(rows), code, says, points);
    let table = [
        row("a,1,2\na,abc,2\n", "number", "line 3, column `Load`: found `abc`, wanted a number", "abc"),
        row("a,1,2\na,,2\n", "empty_cell", "line 3, column `Load`: an empty cell", ""),
        row("a,1,\n", "empty_cell", "line 2, column `Travel`", ""),
        row("a, ,2\n", "empty_cell", "column `Load`", " "),
        row("a,nan,2\n", "finite", "found `nan`", "nan"),
        row("a,1,-inf\n", "finite", "column `Travel`: found `-inf`", "-inf"),
        row("a,Infinity,2\n", "finite", "found `Infinity`", "Infinity"),
        row("a,1e101,2\n", "size", "found `1e101`", "1e101"),
        row("a,1e999,2\n", "size", "found `1e999`", "1e999"),
        row("a,1'234.5,2\n", "thousands", "found `1'234.5`", "1'234.5"),
        row("a,1\u{A0}234.5,2\n", "thousands", "thousands marks", "1\u{A0}234.5"),
        row("a,1.5 ,2\n", "blank", "found `1.5 `", "1.5 "),
        row("a,\"1.5\",2\n", "quoted", "found `\"1.5\"`", "\"1.5\""),
        row("\"a\",1.5,2\n", "quoted", "column `Specimen`", "\"a\""),
        row("a,1\n", "few_cells", "line 2: 2 cells, the header has 3", ""),
        row("a,1,2,3\n", "many_cells", "line 2: 4 cells, the header has 3", "3"),
        row("a,1,5,2,5\n", "many_cells", "5 cells", "2,5"),
        row("a,1,2,\n", "many_cells", "4 cells", ""),
        row("a,1,2,\na,1\n", "many_cells", "line 2", ""),
        row("a,1\na,1,2,\n", "few_cells", "line 2", ""),
        row("\na,1,2\n", "blank_line", "line 2: a blank line", ""),
        row("a,1,2\n \n\na,1,2\n", "blank_line", "line 3: a blank line", ""),
        row("a,1,2\na,1,2", "open_line", "line 3: the last line has no line end", ""),
        row("a,1,2\na,1", "open_line", "line 3: the last line has no line end", ""),
        row("a,1,2\r\ra,1,2\r\n", "carriage_return", "line 2: a carriage return", "\u{FFFD}"),
        row("a,1\r,2\n", "carriage_return", "line 2", "\u{FFFD}"),
        row("a,1,2\0\n", "nul", "line 2: a NUL byte", "\u{FFFD}"),
        row("a\0,1,2\n", "nul", "line 2: a NUL byte", "\u{FFFD}"),
        row(",1,2\n", "no_name", "line 2, column `Specimen`: a spring without a name", ""),
        row("a,1,2\n  ,1,2\n", "no_name", "line 3", "  "),
        row("a,1,2\nb,1,2\na,1,2\n", "returns", "line 4, column `Specimen`: spring `a` returns, after lines of another spring; it began on line 2", "a"),
        // the first fault counts, whatever finds it
        row("a,x,2\n\na,1,2\0\na,1\n", "number", "line 2", "x"),
        row("b,1,2\na,1,2\nb,x,2\n", "number", "line 4", "x"),
        row("b,1,2\na,1,2\nb,1,2\nb,x,2\n", "returns", "line 4", "b"),
    ];
    let rows: Vec<Refusal<'_>> = table.iter().map(|(bytes, code, says, points)| (&bytes[..], *code, *says, *points)).collect();
    refuse(&plain(), &rows);
    let latin = [HEAD.as_bytes(), b"a,1,2\n\xE4,1,2\n"].concat();
    refuse(&plain(), &[(&latin, "encoding", "line 3: the byte 0xE4 is no utf-8", "\u{FFFD}")]);
}

#[test]
#[rustfmt::skip] // keeps the table a table
fn faults_under_a_decimal_comma_and_of_time() {
    let with = |rows: &str| [BENCH, rows.as_bytes()].concat();
    let point = with("0,0;1,5;2;\r\n0,1;12.5;2;\r\n");
    let thousand = with("0,0;1.234;2;\r\n");
    let both = with("0,0;1.234,5;2;\r\n");
    let back = with("0,2;1,5;2;\r\n0,1;1,5;2;\r\n");
    let missing = with("0,2;1,5;2\r\n");
    refuse(&bench(), &[
        (&point, "point", "line 6, column `Prüfkraft`: found `12.5`, a point where", "12.5"),
        (&thousand, "point", "found `1.234`", "1.234"),
        (&both, "thousands", "found `1.234,5`", "1.234,5"),
        (&back, "time", "line 6, column `t`: time runs backwards, from 0.2 to 0.1", "0,1"),
        (&missing, "few_cells", "line 5: 3 cells, the header has 4", ""),
    ]);
    let semicolons = Dialect { delimiter: Delimiter::Semicolon, ..plain() };
    refuse(&semicolons, &[(b"Specimen;Load;Travel\na;1,5;2\n", "comma", "found `1,5`, a comma where", "1,5")]);
    let clock = Dialect { time: Some("t".into()), ..plain() };
    refuse(&clock, &[(b"Specimen,Load,Travel,t\na,1,2,5\nb,1,2,0\nb,x,2,1\n", "number", "line 4", "x")]);
    let (springs, _) = good(b"Specimen,Load,Travel,t\na,1,2,5\na,1,2,5\nb,1,2,0\n", &clock);
    assert_eq!(springs[1].time, Some(vec![0.0]));
}

#[test]
#[rustfmt::skip] // keeps the table a table
fn faults_of_quotes() {
    let quoted = Dialect { quoted: true, ..plain() };
    refuse(&quoted, &[
        (b"Specimen,Load,Travel\na,\"1,2\na,1,2\n", "quotes", "line 2: a cell whose quote is not closed", "\""),
        (b"Specimen,Load,Travel\na,1,\"\n", "quotes", "line 2: a cell whose quote is not closed", "\""),
        (b"Specimen,Load,Travel\na\"b,1,\"2\"\n", "quotes", "a quote inside a cell", "\""),
        (b"Specimen,Load,Travel\n\"a\"b,1,2\n", "quotes", "text after the closing quote", "b"),
        (b"Specimen,Load,Travel\na,\"\",2\n", "empty_cell", "column `Load`", "\"\""),
        (b"Specimen,Load,Travel\n\"\",1,2\n", "no_name", "column `Specimen`", "\"\""),
        (b"Specimen,Load,Travel\n\"a,1\",1\n", "few_cells", "2 cells", ""),
        (b"Specimen,Load,Travel,Note\na,1,2\n", "few_cells", "3 cells", ""),
    ]);
}

/// What the library would do in silence: text past its first hundred rows, short rows, cut numbers.
#[test]
fn text_far_down_is_found() {
    let mut text = "Specimen,Load,Travel\n".to_owned();
    for line in 0..5000 {
        writeln!(text, "a,{line},1").unwrap();
    }
    let early = text.replace("\na,50,1\n", "\na,overload,1\n");
    let late = text.replace("\na,4321,1\n", "\na,overload,1\n");
    for (text, line) in [(early, 52), (late, 4323)] {
        for block_bytes in [100, 1000, BLOCK_BYTES] {
            let fault = read_in(text.as_bytes(), &plain(), block_bytes).unwrap_err();
            let ExportError::NotANumber { at, found } = &fault else {
                panic!("{fault}");
            };
            assert_eq!(
                (at.line(), at.column(), found.as_str()),
                (line, Some("Load"), "overload")
            );
        }
    }
}

#[test]
fn a_fault_is_shown_under_its_line() {
    let fault = read_all(b"Specimen,Load,Travel\na,1,2\na,abc,2\n", &plain()).unwrap_err();
    let shown = rendered(&fault);
    for part in [
        "`lot/17.csv`, line 3, column `Load`: found `abc`, wanted a number",
        "[lot/17.csv:3:3]",
        "3 | a,abc,2",
        "line 3, character 3",
        "help: mend the cell",
    ] {
        assert!(shown.contains(part), "`{part}` is not in\n{shown}");
    }
}

#[test]
fn endless_lines_and_missing_files() {
    let long = [
        b"Specimen,Load,Travel\na,1,2\n".to_vec(),
        vec![b'7'; 3 << 20],
    ]
    .concat();
    let returns = [
        b"Specimen,Load,Travel\na,1,2\n".to_vec(),
        vec![b'\r'; 3 << 20],
    ]
    .concat();
    let ended = [&long[..], b"\na,1,2\n"].concat();
    for block_bytes in [4096, 1 << 20, BLOCK_BYTES] {
        for bytes in [&long, &ended] {
            let fault = read_in(bytes, &plain(), block_bytes).unwrap_err();
            assert!(
                matches!(&fault, ExportError::LineTooLong { at, .. } if at.line() == 3),
                "{fault}"
            );
        }
        let fault = read_in(&returns, &plain(), block_bytes).unwrap_err();
        assert!(
            matches!(&fault, ExportError::LoneCarriageReturn { at } if at.line() == 3),
            "{fault}"
        );
    }
    let folder = tempfile::tempdir().unwrap();
    let none = folder.path().join("none.csv");
    let fault = read(&none, "none.csv", &plain(), 8, &mut |_| {}).unwrap_err();
    assert_eq!(fault.to_string(), "cannot read `none.csv`");
    assert!(std::error::Error::source(&fault).is_some());
    let by_name = Dialect {
        spring: SpringFrom::FileName,
        ..plain()
    };
    let fault = read(&none, "..", &by_name, 8, &mut |_| {}).unwrap_err();
    assert!(matches!(fault, ExportError::NoSpringName { .. }));
}
