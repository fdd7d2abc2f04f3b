//! The lots the reports are made of.

use coilassay::record::AcceptRecord;

use super::facts::member;
use super::fixture::record;

pub(crate) fn numbered(count: usize) -> Vec<String> {
    (1..=count).map(|number| number.to_string()).collect()
}

pub(crate) fn one() -> AcceptRecord {
    record(&numbered(1), |_| 0.0)
}

pub(crate) fn accepted() -> AcceptRecord {
    record(
        &numbered(32),
        |number| if number == 11 { 0.041 } else { 0.0 },
    )
}

pub(crate) fn undecided() -> AcceptRecord {
    record(
        &numbered(50),
        |number| if number % 17 == 3 { 0.043 } else { 0.0 },
    )
}

pub(crate) fn rejected() -> AcceptRecord {
    record(&numbered(200), |number| match number % 23 {
        5 => 0.08,
        11 => -0.055,
        17 => 0.043,
        _ => 0.0,
    })
}

pub(crate) fn nested() -> AcceptRecord {
    let mut record = accepted();
    record.theory.members = vec![
        member("outer", 3.2, 24.8, 8.0, 0.72),
        member("inner", 2.0, 15.0, 9.5, 0.28),
    ];
    record
}

pub(crate) fn hostile() -> AcceptRecord {
    let ids = [
        "W".repeat(400),
        "弹簧-17".to_owned(),
        "🙂 spring".to_owned(),
        "ctrl\u{1b}[31m\u{7}x\u{202e}y".to_owned(),
        "قياس ٣".to_owned(),
        "<b>&\"'</b> #set page(width: 1pt) $x$ `raw` @label".to_owned(),
        "=HYPERLINK(\"x\")".to_owned(),
        "Пружина Ω-4 žluťoučký".to_owned(),
        "two\nlines".to_owned(),
        "{{ report.lot }} {% raw %}".to_owned(),
    ];
    let mut record = record(&ids, |number| match number {
        0 => 0.09,
        3 => -0.08,
        5 => 0.045,
        _ => 0.0,
    });
    record.lot.number = "L".repeat(400);
    record.lot.supplier = Some("供应商 🙂".to_owned());
    record.lot.note = Some(format!("first line\nsecond {}", "x".repeat(300)));
    record.lot.tags.insert("t".repeat(120), "v".repeat(300));
    record.drawing.title = Some("<script>alert(1)</script> \u{202e}gnirps".to_owned());
    record.drawing.number = "D/".repeat(60);
    "試験機".clone_into(&mut record.rig.name);
    record
}
