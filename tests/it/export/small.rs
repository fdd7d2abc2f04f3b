//! The small table of caliper findings.

use std::io::Write;

use coilassay::export::{ExportError, SmallTable, read_small};
use miette::Diagnostic;

use super::pointed_at;

fn small(text: &str) -> Result<SmallTable, ExportError> {
    let mut file = tempfile::NamedTempFile::new().unwrap();
    file.write_all(text.as_bytes()).unwrap();
    read_small(file.path(), "caliper.csv")
}

#[test]
fn a_small_table() {
    let table = small("spring,free_length\r\n,mm\r\n\"7\", 62.1 \r\n8,\r\n9,six\r\n\r\n").unwrap();
    assert_eq!(table.header, ["spring", "free_length"]);
    assert_eq!(table.units, ["", "mm"]);
    assert_eq!(table.rows[0], (3, vec!["7".to_owned(), "62.1".to_owned()]));
    assert_eq!(table.number(0, 1).unwrap(), Some(62.1));
    assert_eq!(table.number(1, 1).unwrap(), None);
    assert_eq!(table.number(9, 9).unwrap(), None);
    let fault = table.number(2, 1).unwrap_err();
    let says = "`caliper.csv`, line 5, column `free_length`: found `six`, wanted a number";
    assert_eq!(
        (fault.to_string().as_str(), pointed_at(&fault).as_str()),
        (says, "six")
    );
    assert_eq!(
        table.spot(2, 0).unwrap().to_string(),
        "`caliper.csv`, line 5, column `spring`"
    );
    for (text, code) in [
        ("a,b\n,mm\n1,2,3\n", "many_cells"),
        ("a,b\n,mm\n1\n", "few_cells"),
        ("a,b\n,mm\n", "no_data"),
        ("a,a\n,mm\n1,2\n", "doubled"),
        ("a,b\n\n,mm\n1,2\n", "blank_line"),
        ("a,b\n,mm\n1,2", "open_line"),
        ("a,b\r,mm\r1,2\r", "carriage_return"),
    ] {
        let fault = small(text).unwrap_err();
        assert_eq!(
            fault.code().unwrap().to_string(),
            format!("coilassay::export::{code}"),
            "{text}"
        );
    }
}
