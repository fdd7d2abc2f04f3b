//! The row ledger: every line of an export is a point or set aside with its reason.

/// Why a line is no point.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum WhyAside {
    /// Above the header, or between header and units.
    Metadata,
    /// The column names.
    Header,
    /// The units.
    Units,
    /// Nothing, after the last point.
    BlankAtTheEnd,
    /// Between two tables.
    BetweenTables,
    /// Below the table.
    Footer,
}

impl WhyAside {
    /// The reason as results print it.
    pub const fn as_str(self) -> &'static str {
        match self {
            Self::Metadata => "metadata",
            Self::Header => "header",
            Self::Units => "units",
            Self::BlankAtTheEnd => "blank at the end",
            Self::BetweenTables => "between tables",
            Self::Footer => "footer",
        }
    }
}

/// Lines set aside, one after the other for one reason.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Aside {
    /// Why.
    pub reason: WhyAside,
    /// The first such line, 1-based.
    pub first_line: u64,
    /// The last such line.
    pub last_line: u64,
}

/// The row ledger of one export: `lines` = `points` + lines set aside.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Ledger {
    /// Lines in the file, counted by their line ends.
    pub lines: u64,
    /// Lines read as points, counted by the points handed on.
    pub points: u64,
    /// Lines set aside, in the order of the file.
    pub set_aside: Vec<Aside>,
}

impl Ledger {
    /// Sets a line aside; lines come in the order of the file, so that two of one reason in a row are neighbours.
    pub(super) fn set_aside(&mut self, reason: WhyAside, line: u64) {
        match self.set_aside.last_mut() {
            Some(last) if last.reason == reason => {
                last.last_line = line;
            }
            _ => self.set_aside.push(Aside {
                reason,
                first_line: line,
                last_line: line,
            }),
        }
    }

    /// Points and lines set aside together.
    pub(super) fn accounted(&self) -> u64 {
        let aside = self
            .set_aside
            .iter()
            .map(|aside| aside.last_line - aside.first_line + 1);
        self.points + aside.sum::<u64>()
    }
}
