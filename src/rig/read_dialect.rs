//! Reads `[export]` of a rig file: how the tester writes its files.

use crate::text::Table;
use crate::units::{ForceUnit, LengthUnit};

use super::dialect::{
    Decimal, Delimiter, Dialect, Encoding, LoadColumn, Pushing, SpringFrom, TravelColumn,
};
use super::open::Means;

pub(super) fn read_export(table: Table<'_>) -> Option<(Dialect, Means)> {
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
    let load = read_load(table.table("load"));
    let travel = read_travel(table.table("travel"));
    let spring = read_spring(table.table("spring"));
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
    };
    check_lines(table, &dialect)?;
    Some((dialect, means))
}

/// Delimiter, decimal mark and encoding.
fn read_marks(table: Table<'_>) -> Option<(Delimiter, Decimal, Encoding)> {
    for (key, help) in [
        ("delimiter", "write delimiter = \",\" or \";\" or \"\\t\""),
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
    ];
    let delimiter = table.word("delimiter", &delimiters);
    let decimal = table.word("decimal", &[(".", Decimal::Point), (",", Decimal::Comma)]);
    let encodings = [
        ("utf-8", Encoding::Utf8),
        ("windows-1252", Encoding::Windows1252),
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
    if dialect.load.column == dialect.travel.column {
        table.fault(
            &table.place("load"),
            "load and travel name the same column",
            "name two columns of the export",
        );
        return None;
    }
    Some(())
}

fn column(table: Table<'_>) -> Option<String> {
    if !table.has("column") {
        table.missing("column", "write column = \"…\" as it stands in the export");
    }
    table.raw_text("column").map(|column| column.value)
}

fn unit<T: Copy>(table: Table<'_>, parse: fn(&str) -> Option<T>, known: &str) -> Option<T> {
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

fn read_pushing(table: Table<'_>) -> Option<Pushing> {
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
    let help = "write spring = { from = \"file name\" } or spring = { column = \"Specimen\" }";
    match (table.has("from"), table.has("column")) {
        (true, false) => table
            .word("from", &[("file name", ())])
            .map(|()| SpringFrom::FileName),
        (false, true) => column(table).map(SpringFrom::Column),
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
