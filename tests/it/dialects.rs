//! Exports in many forms, with the `[export]` of the rig file that reads each: shared by the counter-suite and the drafts.

use std::fmt::Write;

use crate::bench::Travel;
use crate::random::Random;

/// How an export is written.
#[derive(Clone, Debug)]
#[expect(clippy::struct_excessive_bools, reason = "each is a trait of its own")]
pub(crate) struct Form {
    pub(crate) encoding: &'static str,
    pub(crate) mark: bool,
    pub(crate) delimiter: &'static str,
    pub(crate) decimal: &'static str,
    pub(crate) line_end: &'static str,
    pub(crate) quoted: bool,
    pub(crate) metadata: usize,
    /// Where units stand: `header`, `row` or `nowhere`.
    pub(crate) units: &'static str,
    pub(crate) names: [&'static str; 4],
    pub(crate) load: (&'static str, f64),
    pub(crate) travel: (&'static str, f64),
    /// `length`, `deflection` or `platen position`.
    pub(crate) means: &'static str,
    pub(crate) pulls: bool,
    pub(crate) load_first: bool,
    pub(crate) time: bool,
    pub(crate) column: bool,
    pub(crate) extra: bool,
    pub(crate) open: bool,
    pub(crate) blank: bool,
    pub(crate) scientific: bool,
}

/// The reading of a platen position with the platens touching, mm.
pub(crate) const GAP: f64 = 250.0;

const NAMES: [[&str; 4]; 4] = [
    ["Time", "Travel", "Load", "Spring"],
    ["Zeit", "Weg", "Kraft", "Probe"],
    ["t", "Position", "Force", "Specimen"],
    ["Elapsed", "Höhe", "Last", "Feder Nº"],
];
const LOADS: [(&str, f64); 4] = [
    ("N", 1.0),
    ("kN", 1000.0),
    ("kgf", 9.806_65),
    ("lbf", 4.448_221_615_260_5),
];
const LENGTHS: [(&str, f64); 2] = [("mm", 1.0), ("in", 25.4)];

fn one<T: Copy>(random: &mut Random, of: &[T]) -> T {
    let share = random.unit();
    *of.iter()
        .enumerate()
        .find(|(place, _)| *place as f64 + 1.0 > share * of.len() as f64)
        .unwrap()
        .1
}

impl Form {
    /// A form drawn at random.
    pub(crate) fn drawn(random: &mut Random) -> Self {
        let decimal = one(random, &[".", ".", ","]);
        let delimiters: &[&str] = if decimal == "," {
            &[";", "\t"]
        } else {
            &[",", ";", "\t"]
        };
        let names = one(random, &NAMES);
        let encoding = if names[1].is_ascii() {
            one(random, &["utf-8", "utf-8", "windows-1252"])
        } else {
            one(random, &["utf-8", "windows-1252"])
        };
        let mut yes = |share: f64| random.unit() < share;
        let (mark, quoted, pulls, load_first, time) =
            (yes(0.3), yes(0.2), yes(0.25), yes(0.4), yes(0.5));
        let (column, extra, open, blank, scientific) =
            (yes(0.3), yes(0.3), yes(0.2), yes(0.3), yes(0.1));
        let (inch, metadata) = (yes(0.25), if yes(0.5) { 3 } else { 0 });
        Self {
            encoding,
            mark: mark && encoding == "utf-8",
            delimiter: one(random, delimiters),
            decimal,
            line_end: one(random, &["\n", "\n", "\r\n"]),
            quoted,
            metadata,
            units: one(random, &["header", "row", "nowhere"]),
            names,
            load: one(random, &LOADS),
            travel: LENGTHS[usize::from(inch)],
            means: one(
                random,
                &["length", "length", "deflection", "platen position"],
            ),
            pulls,
            load_first,
            time,
            column,
            extra,
            open: open && !blank,
            blank,
            scientific,
        }
    }

    /// What the bench that writes this form has for a travel scale.
    pub(crate) fn scale(&self) -> Travel {
        match self.means {
            "length" => Travel::Length,
            "deflection" => Travel::Deflection,
            _ => Travel::Position { at_zero_gap: GAP },
        }
    }

    /// N per unit of the load column.
    pub(crate) fn force_unit(&self) -> f64 {
        if self.pulls {
            -self.load.1
        } else {
            self.load.1
        }
    }

    /// Digits after the mark: the step is below 0.004 N and 0.001 mm.
    fn digits(&self) -> (usize, usize) {
        (
            if self.load.0 == "kN" { 6 } else { 3 },
            if self.travel.0 == "in" { 5 } else { 3 },
        )
    }

    /// The steps in N and mm.
    pub(crate) fn steps(&self) -> (f64, f64) {
        let (load, travel) = self.digits();
        let step = |digits: usize| 0.1_f64.powi(i32::try_from(digits).unwrap());
        (step(load) * self.load.1, step(travel) * self.travel.1)
    }

    fn number(&self, value: f64, digits: usize) -> String {
        let text = if self.scientific {
            format!("{value:.8E}")
        } else {
            format!("{value:.digits$}")
        };
        text.replace('.', self.decimal)
    }

    fn line(&self, cells: [String; 5]) -> String {
        let [time, travel, load, spring, extra] = cells;
        let mut all = Vec::new();
        if self.time {
            all.push(time);
        }
        if self.load_first {
            all.extend([load, travel]);
        } else {
            all.extend([travel, load]);
        }
        if self.extra {
            all.push(extra);
        }
        if self.column {
            all.insert(0, spring);
        }
        if self.quoted {
            all = all.iter().map(|cell| format!("\"{cell}\"")).collect();
        }
        all.join(self.delimiter)
    }

    fn labelled(&self, name: &str, unit: &str) -> String {
        match self.units {
            "header" => format!("{name} [{unit}]"),
            _ => name.to_owned(),
        }
    }

    /// The names of time, travel, load and spring as the header has them.
    pub(crate) fn labelled_names(&self) -> [String; 5] {
        self.header()
    }

    fn header(&self) -> [String; 5] {
        let [time, travel, load, spring] = self.names;
        [
            self.labelled(time, "s"),
            self.labelled(travel, self.travel.0),
            self.labelled(load, self.load.0),
            spring.to_owned(),
            "Channel 4".to_owned(),
        ]
    }

    /// The lines above the rows.
    fn head(&self) -> Vec<String> {
        let mut lines: Vec<String> = (0..self.metadata)
            .map(|line| {
                ["Compression test", "Operator: invented", "2026-11-30 07:12"][line % 3].to_owned()
            })
            .collect();
        lines.push(self.line(self.header()));
        if self.units == "row" {
            let units = ["s", self.travel.0, self.load.0, "", ""].map(str::to_owned);
            lines.push(self.line(units));
        }
        lines
    }

    /// The export of one spring, rows of time, travel and load as the bench shows them.
    pub(crate) fn export(&self, rows: &[[f64; 3]]) -> Vec<u8> {
        let (load_digits, travel_digits) = self.digits();
        let mut lines = self.head();
        lines.extend(rows.iter().map(|[time, travel, load]| {
            self.line([
                self.number(*time, 2),
                self.number(*travel, travel_digits),
                self.number(*load, load_digits),
                "S-1".to_owned(),
                self.number(0.25, 2),
            ])
        }));
        let mut text = lines.join(self.line_end);
        if !self.open {
            text += self.line_end;
        }
        if self.blank {
            text += self.line_end;
        }
        let mut bytes = if self.mark {
            b"\xEF\xBB\xBF".to_vec()
        } else {
            Vec::new()
        };
        match self.encoding {
            "windows-1252" => {
                bytes.extend(text.chars().map(|c| u8::try_from(u32::from(c)).unwrap()));
            }
            _ => bytes.extend(text.as_bytes()),
        }
        bytes
    }

    /// `[export]` of the rig file.
    pub(crate) fn rig(&self) -> String {
        let header = self.header();
        let line = self.metadata + 1;
        let mut text = format!(
            "[export]\nheader_line = {line}\ndelimiter = \"{}\"\ndecimal = \"{}\"\nencoding = \"{}\"\n",
            self.delimiter.replace('\t', "\\t"),
            self.decimal,
            self.encoding
        );
        if self.units == "row" {
            writeln!(text, "units_line = {}", line + 1).unwrap();
        }
        text += if self.quoted { "quoted = true\n" } else { "" };
        text += if self.open {
            "last_line_open = true\n"
        } else {
            ""
        };
        let pushing = if self.pulls { "negative" } else { "positive" };
        let (load, unit) = (&header[2], self.load.0);
        writeln!(
            text,
            "load = {{ column = \"{load}\", unit = \"{unit}\", pushing = \"{pushing}\" }}"
        )
        .unwrap();
        let gap = match self.means {
            "platen position" => format!(", at_zero_gap = {}", GAP / self.travel.1),
            _ => String::new(),
        };
        let (travel, unit, means) = (&header[1], self.travel.0, self.means);
        writeln!(
            text,
            "travel = {{ column = \"{travel}\", unit = \"{unit}\", means = \"{means}\"{gap} }}"
        )
        .unwrap();
        if self.time {
            writeln!(
                text,
                "time = {{ column = \"{}\", unit = \"s\" }}",
                header[0]
            )
            .unwrap();
        }
        match self.column {
            true => writeln!(text, "spring = {{ column = \"{}\" }}", header[3]).unwrap(),
            false => writeln!(text, "spring = {{ from = \"file name\" }}").unwrap(),
        }
        text
    }
}
