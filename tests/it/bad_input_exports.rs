//! Bad input through the binary: exports.

use crate::bad_input::{Case, all_refused};

const FIRST: &str = "springs/TG-01.csv";

#[test]
fn the_sample_itself_is_accepted() {
    assert_eq!(Case::of("accepted").run(&[]).code, Some(0));
}

#[test]
#[rustfmt::skip] // keeps the table a table
fn exports_that_are_no_table() {
    all_refused(
        "accepted",
        &[
            ("missing", |c| c.sub("lot.toml", "springs/*.csv", "springs/TG-77.csv"), &["springs/TG-77.csv", "help:"]),
            ("a folder", |c| c.sub("lot.toml", "springs/*.csv", "springs"), &["springs", "help:"]),
            ("empty", |c| c.set(FIRST, ""), &[FIRST, "is empty", "help:"]),
            ("header only", |c| c.set(FIRST, "Time [s],Length [mm],Load [N]\n"), &[FIRST, "no measurement", "help:"]),
            ("header beyond the end", |c| c.sub("bench-1.toml", "header_line = 1", "header_line = 900"), &["header_line", "900", "help:"]),
            ("header shifted", |c| c.set(FIRST, "x\n".to_owned() + &c.text(FIRST)), &[FIRST, "line 1", "Load [N]", "help:"]),
            ("header twice", |c| c.set(FIRST, c.text(FIRST).repeat(2)), &[FIRST, "line 437", "found `Time [s]`", "wanted a number"]),
            ("not ended", |c| c.set(FIRST, c.text(FIRST).trim_end()), &[FIRST, "line 436", "no line end", "last_line_open"]),
            ("cut in a row", |c| c.set(FIRST, &c.text(FIRST)[..c.text(FIRST).len() - 9]), &[FIRST, "line 436"]),
            ("old Mac line ends", |c| c.set(FIRST, c.text(FIRST).replace('\n', "\r")), &[FIRST, "carriage return"]),
            ("blank line inside", |c| c.set(FIRST, c.text(FIRST).replacen('\n', "\n\n", 9)), &[FIRST, "line 2", "blank line"]),
            ("NUL", |c| c.set(FIRST, c.text(FIRST).replace("91.935", "91\0935")), &[FIRST, "line 4", "NUL"]),
            ("UTF-16", |c| c.set(FIRST, [0xFF, 0xFE, b'a', 0]), &[FIRST, "UTF-16"]),
            ("not UTF-8", |c| c.set(FIRST, [c.text(FIRST).as_bytes(), b"1,\xE9,3\n"].concat()), &[FIRST, "line 437", "windows-1252"]),
        ],
    );
}

#[test]
#[rustfmt::skip] // keeps the table a table
fn cells_and_columns() {
    all_refused(
        "accepted",
        &[
            ("text", |c| c.set(FIRST, c.text(FIRST).replace("0.40,91.935", "0.40,abc")), &[FIRST, "line 4", "column `Length [mm]`", "found `abc`", "wanted a number"]),
            ("NaN", |c| c.set(FIRST, c.text(FIRST).replace("0.40,91.935", "0.40,NaN")), &[FIRST, "line 4", "column `Length [mm]`", "finite"]),
            ("infinity", |c| c.set(FIRST, c.text(FIRST).replace("0.40,91.935", "0.40,-inf")), &[FIRST, "line 4", "finite"]),
            ("too large", |c| c.set(FIRST, c.text(FIRST).replace("0.40,91.935", "0.40,1e999")), &[FIRST, "line 4", "no bench measures that"]),
            ("empty cell", |c| c.set(FIRST, c.text(FIRST).replace("0.40,91.935", "0.40,")), &[FIRST, "line 4", "Length [mm]"]),
            ("too few cells", |c| c.set(FIRST, c.text(FIRST).replace("0.40,91.935,", "0.40,")), &[FIRST, "line 4", "2 cells", "3"]),
            ("too many cells", |c| c.set(FIRST, c.text(FIRST).replace("0.40,", "0.40,7,")), &[FIRST, "line 4", "4 cells", "3"]),
            ("one too many, one too few", |c| { c.set(FIRST, c.text(FIRST).replace("0.40,", "0.40,7,").replace("0.57,91.698,", "0.57,")) }, &[FIRST, "line 4"]),
            ("decimal comma", |c| { c.set(FIRST, c.text(FIRST).replace(',', ";").replace('.', ",")); c.sub("bench-1.toml", "delimiter = \",\"", "delimiter = \";\""); c.sub("lot.toml", "springs/*.csv", FIRST); }, &[FIRST, "line 2", "found `0,12`", "decimal mark"]),
            ("comma twice", |c| c.sub("bench-1.toml", "decimal = \".\"", "decimal = \",\""), &["bench-1.toml", "decimal mark is also the delimiter"]),
            ("comma of decimals splits cells", |c| c.set(FIRST, c.text(FIRST).replace('.', ",")), &[FIRST, "line 2", "6 cells"]),
            ("blank after", |c| c.set(FIRST, c.text(FIRST).replacen("-0.06\n", "-0.06 \n", 1)), &[FIRST, "line 2", "Load [N]"]),
            ("unknown column", |c| c.sub("bench-1.toml", "Load [N]", "Lode [N]"), &[FIRST, "line 1", "no column `Lode [N]`", "did you mean `Load [N]`?"]),
            ("doubled column", |c| c.set(FIRST, c.text(FIRST).replace("Time [s]", "Load [N]")), &[FIRST, "line 1", "Load [N]"]),
            ("unit of the header", |c| c.set(FIRST, c.text(FIRST).replace("Load [N]", "Load [kN]")), &[FIRST, "line 1"]),
            ("time backwards", |c| c.set(FIRST, c.text(FIRST).replace("0.40,91.935", "0.10,91.935")), &[FIRST, "line 4", "Time [s]", "backwards"]),
            ("ESC and bidi", |c| { c.set(FIRST, c.text(FIRST).replace("91.935", "\u{1b}[31m\u{202e}9")) }, &[FIRST, "line 4", "wanted a number"]),
            ("ESC in a column name", |c| { c.set(FIRST, c.text(FIRST).replace("Load [N]", "L\u{1b}[31m\u{202e}")) }, &[FIRST, "line 1", "Load [N]"]),
        ],
    );
}

#[test]
#[rustfmt::skip] // keeps the table a table
fn curves_that_are_none() {
    all_refused(
        "accepted",
        &[
            ("no contact", |c| c.loads(0.0), &[FIRST, "lines 2–436", "never makes contact", "contact load", "help:"]),
            ("few points", |c| c.rows(|rows| rows.into_iter().step_by(16).collect()), &[FIRST, "in the window", "three are the least", "help:"]),
            ("sign turned", |c| { c.sub("bench-1.toml", "pushing = \"positive\"", "pushing = \"negative\"") }, &[FIRST, "pushing = \"negative\""]),
            ("columns swapped", |c| { (1..=20).for_each(|n| { let f = format!("springs/TG-{n:02}.csv"); c.sub(&f, "Length [mm],Load [N]", "Load [N],Length [mm]"); }) }, &[FIRST, "help:"]),
            ("length read as deflection", |c| { c.sub("bench-1.toml", "means = \"length\"", "means = \"deflection\"") }, &[FIRST, "read as a deflection", "means"]),
        ],
    );
    all_refused(
        "rejected",
        &[
            ("deflection read as length", |c| { c.sub("bench-4.toml", "means = \"deflection\" }\nspring", "means = \"length\" }\nspring") }, &["bench-4.toml", "zero"]),
            ("units line wrong", |c| c.sub("bench-4.toml", "unit = \"N\"", "unit = \"lbf\""), &["federn/1.csv", "line 8", "lbf"]),
            ("units line of no units", |c| c.sub("bench-4.toml", "units_line = 8", "units_line = 9"), &["federn/1.csv", "line 9"]),
        ],
    );
    all_refused(
        "undecided",
        &[
            ("spring returns", |c| c.sub("float-springs.txt", "\n3\t", "\n1\t"), &["float-springs.txt", "1"]),
            ("spring without a name", |c| { c.set("float-springs.txt", c.text("float-springs.txt").replacen("\n3\t", "\n\t", 1)) }, &["float-springs.txt", "Specimen"]),
            ("repeat of many", |c| c.set("again/float-springs-7.txt", c.text("float-springs.txt")), &["repeat of spring `7`", "13 springs", "help:"]),
        ],
    );
}
