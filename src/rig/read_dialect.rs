//! Reads `[export]` of a rig file: how the tester writes its files.

use crate::text::Table;
use crate::units::{ForceUnit, LengthUnit};

use super::dialect::{
    Decimal, Delimiter, Dialect, Encoding, LoadColumn, Pushing, Rarer, SpringFrom, TravelColumn,
};
use super::open::Means;
use super::read_points::{Wide, check_long, read_wide};
use super::read_rarer::read_rarer;

/// `length` is the unit of the rig file's lengths in mm.
pub(super) fn read_export(table: Table<'_>, length: f64) -> Option<(Dialect, Means)> {
    if !table.is_present() {
        table.fault(
            &table.span(),
            "`export` is missing",
            "describe the export: header_line, delimiter, decimal, load, travel, spring",
        );
        return None;
    }
    let marks = read_marks(table);
    let header_line = table.whole("header_line").map(|line| line.value);
    if header_line.is_none() && !table.has("header_line") {
        let help =
            "write the line the column names stand on, counted from 1; 0 where there is none";
        table.missing("header_line", help);
    }
    let spring = read_spring(table.table("spring"));
    let (load, travel, points) = if table.is_table("points") {
        let Wide {
            load,
            travel,
            points,
        } = read_wide(table, length, spring.as_ref())?;
        (Some(load), Some((travel, Means::Length)), Some(points))
    } else {
        let travel = read_travel(table.table("travel"));
        let means = travel.as_ref().map(|(_, means)| *means);
        let points = if table.has("points") {
            Some(check_long(table, means?)?)
        } else {
            None
        };
        (read_load(table.table("load")), travel, points)
    };
    let rarer = read_rarer(table);
    let time = table.table("time");
    let time = if time.is_present() {
        Some(column(time)?)
    } else {
        None
    };
    let ((delimiter, decimal, encoding), (travel, means)) = (marks?, travel?);
    let dialect = Dialect {
        header_line: header_line?,
        units_line: table.whole("units_line").map(|line| line.value),
        delimiter,
        decimal,
        encoding,
        quoted: table.flag("quoted"),
        last_line_open: table.flag("last_line_open"),
        load: load?,
        travel,
        time,
        spring: spring?,
        rarer: Rarer { points, ..rarer? },
    };
    check_lines(table, &dialect)?;
    Some((dialect, means))
}

/// Delimiter, decimal mark and encoding.
fn read_marks(table: Table<'_>) -> Option<(Delimiter, Decimal, Encoding)> {
    if table.has("sheet") {
        return no_marks(table);
    }
    for (key, help) in [
        (
            "delimiter",
            "write delimiter = \",\" or \";\" or \"\\t\" or \"|\" or \"blanks\" or \"two blanks\"",
        ),
        ("decimal", "write decimal = \".\" or \",\""),
    ] {
        if !table.has(key) {
            table.missing(key, help);
        }
    }
    let delimiters = [
        (",", Delimiter::Comma),
        (";", Delimiter::Semicolon),
        ("\t", Delimiter::Tab),
        ("|", Delimiter::Pipe),
        ("blanks", Delimiter::Blanks),
        ("two blanks", Delimiter::TwoBlanks),
    ];
    let delimiter = table.word("delimiter", &delimiters);
    let decimal = table.word("decimal", &[(".", Decimal::Point), (",", Decimal::Comma)]);
    let encodings = [
        ("utf-8", Encoding::Utf8),
        ("windows-1252", Encoding::Windows1252),
        ("utf-16", Encoding::Utf16),
    ];
    let encoding = if table.has("encoding") {
        table.word("encoding", &encodings)
    } else {
        Some(Encoding::Utf8)
    };
    let (delimiter, decimal) = (delimiter?, decimal?);
    if delimiter == Delimiter::Comma && decimal == Decimal::Comma && !table.flag("quoted") {
        let what = "the decimal mark is also the delimiter";
        table.fault(
            &table.place("decimal"),
            what,
            "check both against a line of the export",
        );
        return None;
    }
    Some((delimiter, decimal, encoding?))
}

/// A workbook has cells and types of its own: no marks.
fn no_marks(table: Table<'_>) -> Option<(Delimiter, Decimal, Encoding)> {
    let textual = [
        "delimiter",
        "decimal",
        "encoding",
        "quoted",
        "last_line_open",
        "trailing_delimiter",
        "thousands",
        "line_end",
        "tables",
    ];
    if let Some(key) = textual.into_iter().find(|key| table.has(key)) {
        let what = format!("`{key}` is said of a workbook's sheet, which has no such thing");
        table.fault(
            &table.place(key),
            what,
            "remove it, or `sheet` if the export is text",
        );
        return None;
    }
    Some((Delimiter::Tab, Decimal::Point, Encoding::Utf8))
}

fn check_lines(table: Table<'_>, dialect: &Dialect) -> Option<()> {
    if dialect
        .units_line
        .is_some_and(|units| units <= dialect.header_line)
    {
        table.fault(
            &table.place("units_line"),
            "the units stand above the column names",
            "units_line counts from 1 and comes after header_line",
        );
        return None;
    }
    let wide = !dialect.rarer.length_columns().is_empty();
    if !wide && dialect.load.column == dialect.travel.column {
        table.fault(
            &table.place("load"),
            "load and travel name the same column",
            "name two columns of the export",
        );
        return None;
    }
    Some(())
}

pub(super) fn column(table: Table<'_>) -> Option<String> {
    if !table.has("column") {
        table.missing("column", "write column = \"…\" as it stands in the export");
    }
    table.raw_text("column").map(|column| column.value)
}

pub(super) fn unit<T: Copy>(
    table: Table<'_>,
    parse: fn(&str) -> Option<T>,
    known: &str,
) -> Option<T> {
    if !table.has("unit") {
        table.missing("unit", format!("write unit = one of {known}"));
    }
    let written = table.raw_text("unit")?;
    let found = parse(&written.value);
    if found.is_none() {
        table.fault(
            &written.span,
            format!("\"{}\" is not a unit known here", written.value),
            format!("one of {known}"),
        );
    }
    found
}

fn read_load(table: Table<'_>) -> Option<LoadColumn> {
    let column = column(table);
    let unit = unit(table, ForceUnit::parse, "N, kN, kgf, lbf");
    let pushing = read_pushing(table);
    Some(LoadColumn {
        column: column?,
        unit: unit?,
        pushing: pushing?,
    })
}

pub(super) fn read_pushing(table: Table<'_>) -> Option<Pushing> {
    let words = [
        ("positive", Pushing::Positive),
        ("negative", Pushing::Negative),
    ];
    if table.has("pushing") {
        table.word("pushing", &words)
    } else {
        Some(Pushing::Positive)
    }
}

#[derive(Clone, Copy, PartialEq)]
enum Meaning {
    Deflection,
    Length,
    Platen,
}

fn read_travel(table: Table<'_>) -> Option<(TravelColumn, Means)> {
    let column = column(table);
    let unit = unit(table, LengthUnit::parse, "mm, in");
    if !table.has("means") {
        table.missing(
            "means",
            "write means = \"deflection\", \"length\" or \"platen position\"",
        );
    }
    let meaning = table.word(
        "means",
        &[
            ("deflection", Meaning::Deflection),
            ("length", Meaning::Length),
            ("platen position", Meaning::Platen),
        ],
    )?;
    // A reading of the column, so in the column's unit.
    let gap = table
        .number("at_zero_gap")
        .zip(unit)
        .map(|(gap, unit)| gap.value * unit.millimetres());
    let means = match (meaning, gap) {
        (Meaning::Deflection, None) => Means::Deflection,
        (Meaning::Length, None) => Means::Length,
        (Meaning::Platen, Some(at_zero_gap)) => Means::PlatenPosition { at_zero_gap },
        (Meaning::Platen, None) => {
            table.missing("at_zero_gap", "a platen position needs the reading with the platens touching: at_zero_gap = 120.0");
            return None;
        }
        _ => {
            table.fault(
                &table.place("at_zero_gap"),
                "at_zero_gap belongs to a platen position only",
                "remove it, or write means = \"platen position\"",
            );
            return None;
        }
    };
    let pushing = read_pushing(table)?;
    if pushing == Pushing::Negative && means != Means::Deflection {
        let help = "remove it: a length says itself which way the spring goes, and so does a platen position with its at_zero_gap";
        table.fault(
            &table.place("pushing"),
            "only a deflection has a sign of pushing",
            help,
        );
        return None;
    }
    Some((
        TravelColumn {
            column: column?,
            unit: unit?,
            pushing,
        },
        means,
    ))
}

fn read_spring(table: Table<'_>) -> Option<SpringFrom> {
    let help = "write spring = { from = \"file name\" }, { from = \"table number\" }, { column = \"Specimen\" } or { after = \"Specimen:\" }";
    match (table.has("from"), table.has("column"), table.has("after")) {
        (true, false, false) => {
            let words = [
                ("file name", SpringFrom::FileName),
                ("table number", SpringFrom::TableNumber),
            ];
            let places = [("file name", 0_usize), ("table number", 1)];
            let place = table.word("from", &places)?;
            words.into_iter().nth(place).map(|(_, from)| from)
        }
        (false, true, false) => column(table).map(SpringFrom::Column),
        (false, false, true) => table
            .required_text("after", help)
            .map(SpringFrom::LineAfter),
        _ => {
            table.fault(
                &table.span(),
                "where a spring's id stands is stated in no way or in two ways",
                help,
            );
            None
        }
    }
}
