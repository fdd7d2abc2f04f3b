//! Reads what few testers do from `[export]`: several tables, footers, thousands marks, units in lines above, workbooks.

use crate::text::Table;

use super::dialect::{Each, Rarer, TableEnd, Tables};

/// What may part thousands.
const THOUSANDS: [(&str, char); 6] = [
    ("'", '\''),
    ("’", '’'),
    (".", '.'),
    (",", ','),
    (" ", ' '),
    ("\u{A0}", '\u{A0}'),
];

pub(super) fn read_rarer(table: Table<'_>) -> Option<Rarer> {
    let thousands = if table.has("thousands") {
        Some(table.word("thousands", &THOUSANDS)?)
    } else {
        None
    };
    if thousands.is_some() && table.text("decimal") == table.text("thousands") {
        let what = "the decimal mark also parts thousands";
        table.fault(
            &table.place("thousands"),
            what,
            "look at a number above 1000 in the export",
        );
        return None;
    }
    let carriage_returns =
        table.has("line_end") && table.word("line_end", &[("cr", true), ("lf", false)])?;
    let text = |table: Table<'_>, key: &str, help: &str| -> Option<Option<String>> {
        if table.has(key) {
            table.required_text(key, help).map(Some)
        } else {
            Some(None)
        }
    };
    let after =
        "write unit_after = \"Force unit:\", what stands before the unit in a line above the table";
    let tables = if table.table("tables").is_present() {
        Some(read_tables(table.table("tables"))?)
    } else {
        None
    };
    if tables.is_some()
        && table
            .whole("header_line")
            .is_some_and(|line| line.value == 0)
    {
        let what = "several tables are told apart by their column names, and header_line is 0";
        table.fault(
            &table.place("tables"),
            what,
            "write the line of the first column names",
        );
        return None;
    }
    let footer = text(
        table,
        "footer",
        "write footer = \"End of test\", how the first line below the table begins",
    )?;
    Some(Rarer {
        trailing_delimiter: table.flag("trailing_delimiter"),
        thousands,
        footer,
        carriage_returns,
        unit_after: (
            text(table.table("load"), "unit_after", after)?,
            text(table.table("travel"), "unit_after", after)?,
        ),
        tables,
        sheet: text(
            table,
            "sheet",
            "write sheet = \"…\", the name on the sheet's tab",
        )?,
        points: None,
    })
}

fn read_tables(tables: Table<'_>) -> Option<Tables> {
    for key in ["each", "end"] {
        if !tables.has(key) {
            tables.missing(
                key,
                "write tables = { each = \"spring\", end = \"blank line\" }",
            );
        }
    }
    let each = tables.word("each", &[("spring", Each::Spring), ("cycle", Each::Cycle)]);
    let ends = [("blank line", 0_usize), ("next names", 1), ("line", 2)];
    let end = match tables.word("end", &ends)? {
        0 => TableEnd::BlankLine,
        1 => TableEnd::NextNames,
        _ => TableEnd::Line(tables.required_text(
            "end_line",
            "write end_line = \"…\": how the line below each table begins",
        )?),
    };
    if tables.has("end_line") && !matches!(end, TableEnd::Line(_)) {
        tables.fault(
            &tables.place("end_line"),
            "end_line goes with end = \"line\" only",
            "remove one of them",
        );
        return None;
    }
    Some(Tables { each: each?, end })
}
