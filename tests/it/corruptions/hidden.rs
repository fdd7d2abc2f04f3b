//! What no file can show: the rows are those of another, possible measurement. Each with the entry of the rig file, or
//! the check, that guards against it.

use super::{File, Row, joined, rows};

type Spoil = fn(&mut Vec<File>);

fn each(files: &mut [File], change: fn(Row) -> Row) {
    for file in files {
        let (header, all) = rows(std::str::from_utf8(&file.1).unwrap());
        let all: Vec<Row> = all.into_iter().map(change).collect();
        file.1 = joined(&header, &all).into_bytes();
    }
}

#[rustfmt::skip] // one way a line
pub(crate) const WAYS: &[(&str, &str, Spoil)] = &[
    ("the frame gives way by 0.001 mm/N and the rig file says 0.00012", "`rig verify` plate on plate: [frame] compliance", |f| each(f, |[t, l, x]| [t, l - 0.001 * x, x])),
    ("the force scale reads 0.8 % high", "`rig verify` with a reference spring: E_n of its loads; [force] certificate with error", |f| each(f, |[t, l, x]| [t, l, x * 1.008])),
    ("the travel scale reads 0.8 % high about 70 mm", "`rig verify` with a reference spring: E_n of its rate; [travel] certificate with error", |f| each(f, |[t, l, x]| [t, 70.0 + (l - 70.0) * 1.008, x])),
    ("the length zero is 0.4 mm off", "`rig verify`: E_n of the free length; [travel] zero, set_at_length; beyond 3 % page one asks", |f| each(f, |[t, l, x]| [t, l + 0.4, x])),
    ("one of the springs in another unit, without a word in its header", "units in the export's header or units line contradict the rig file; page one names the odd ratio", |f| each(&mut f[..1], |[t, l, x]| [t, l, x / 9.806_65])),
    ("two springs' names exchanged", "the tester names the file, not a person; marked springs; a repeat of one of them", |f| { let name = std::mem::take(&mut f[0].0); f[0].0 = std::mem::replace(&mut f[2].0, name); }),
    ("every spring measured warm, at 60 °C", "[conditions] temperature in the lot file", |f| each(f, |[t, l, x]| [t, l, x * 0.988])),
    ("the load's zero creeps by 3 N over the recording", "the empty readings at the end of the recording; `rig verify`", |f| each(f, |[t, l, x]| [t, l, x + 0.015 * t])),
    ("the travel scale slips by 1 mm in the air before the last stroke", "[requirements] set in the drawing: the spring seems to have set by as much", |f| each(f, |[t, l, x]| [t, if t > 100.0 { l - 1.0 } else { l }, x])),
    ("loads paired with the travel of the next row", "`rig verify` with a reference spring; [requirements] hysteresis", |f| {
        for file in f {
            let (header, all) = rows(std::str::from_utf8(&file.1).unwrap());
            let moved: Vec<Row> = all.windows(2).map(|w| [w[0][0], w[0][1], w[1][2]]).collect();
            file.1 = joined(&header, &moved).into_bytes();
        }
    }),
    ("an export renamed", "the tester names the file, not a person; the lot's `sample` list", |f| "renamed.csv".clone_into(&mut f[0].0)),
];
