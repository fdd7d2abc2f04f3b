//! Units as an export states them: in a header (`Load [kN]`, `Kraft in N`, `Force/N`) or in its units line.

use crate::units::{ForceUnit, LengthUnit};

/// Units of something else than a load in N or a travel in mm, or of another size; letters that also name
/// quantities (`F(s)`, `F(t)`) are left out.
const OTHERS: [&str; 31] = [
    "mN", "cN", "daN", "dN", "MN", "gf", "g", "kg", "ozf", "oz", "tonf", "kip", "Nm", "N/mm",
    "MPa", "kPa", "bar", "µm", "μm", "um", "nm", "cm", "dm", "m", "mil", "thou", "ft", "ms", "V",
    "mV", "%",
];

/// A unit the rig file states for a column.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Wanted {
    Force(ForceUnit),
    Length(LengthUnit),
    Seconds,
}

/// A unit that some word of an export names.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum UnitWord {
    /// Of a load.
    Force(ForceUnit),
    /// Of a travel.
    Length(LengthUnit),
    /// Seconds.
    Seconds,
    /// A unit of something else, or of another size.
    Other,
}

impl From<Stated> for UnitWord {
    fn from(stated: Stated) -> Self {
        match stated {
            Stated::Is(Wanted::Force(unit)) => Self::Force(unit),
            Stated::Is(Wanted::Length(unit)) => Self::Length(unit),
            Stated::Is(Wanted::Seconds) => Self::Seconds,
            Stated::Other => Self::Other,
        }
    }
}

/// The unit that `cell`, all of it, names.
pub fn unit_word(cell: &str) -> Option<UnitWord> {
    stated(cell).map(UnitWord::from)
}

/// The unit in a column name: in brackets, after ` in ` or the last `/`, or as its last word.
pub fn unit_in_name(name: &str) -> Option<UnitWord> {
    let clear = clear_labels(name).into_iter().find_map(stated);
    let found = clear.or_else(|| last_word(name).and_then(stated));
    found.map(UnitWord::from)
}

/// A unit that an export states.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Stated {
    Is(Wanted),
    Other,
}

impl Wanted {
    /// The unit's symbol.
    pub(super) const fn symbol(self) -> &'static str {
        match self {
            Self::Force(unit) => unit.symbol(),
            Self::Length(unit) => unit.symbol(),
            Self::Seconds => "s",
        }
    }

    fn same_kind(self, other: Self) -> bool {
        std::mem::discriminant(&self) == std::mem::discriminant(&other)
    }

    /// The unit in the column name `header` that contradicts this one.
    pub(super) fn contradicted_by(self, header: &str) -> Option<&str> {
        let clear = clear_labels(header)
            .into_iter()
            .find(|label| stated(label).is_some_and(|unit| unit != Stated::Is(self)));
        clear.or_else(|| {
            let label = last_word(header)?;
            let Some(Stated::Is(unit)) = stated(label) else {
                return None;
            };
            (unit != self && unit.same_kind(self)).then_some(label)
        })
    }

    /// What is wrong with `cell` of the units line: nothing, another unit, or no unit.
    pub(super) fn against(self, cell: &str) -> Units {
        match stated(cell) {
            Some(Stated::Is(unit)) if unit == self => Units::Agree,
            None if self == Self::Seconds && cell.trim().is_empty() => Units::Agree,
            Some(_) => Units::Contradict,
            None => Units::None,
        }
    }
}

/// How a cell of the units line stands to the rig file.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Units {
    Agree,
    Contradict,
    None,
}

fn stated(label: &str) -> Option<Stated> {
    let label = label
        .trim()
        .trim_matches(['[', ']', '(', ')', '{', '}', '<', '>']);
    let label = label.trim().trim_end_matches('.');
    let lower = label.to_lowercase();
    let known = |text: &str| {
        let force = ForceUnit::parse(text).map(Wanted::Force);
        force.or_else(|| LengthUnit::parse(text).map(Wanted::Length))
    };
    let seconds = [
        "s", "sec", "second", "seconds", "sek", "sekunde", "sekunden",
    ];
    if let Some(unit) =
        known(label).or_else(|| (label.chars().count() > 3).then(|| known(&lower))?)
    {
        return Some(Stated::Is(unit));
    }
    if seconds.contains(&lower.as_str()) {
        return Some(Stated::Is(Wanted::Seconds));
    }
    let other = OTHERS.contains(&label)
        || ["min", "h", "zoll", "minutes", "hours"].contains(&lower.as_str());
    other.then_some(Stated::Other)
}

/// What stands in brackets, after ` in ` or after the last `/`: there a unit is meant as one.
/// A single `s` or `t` there may as well be what the load is a function of.
fn clear_labels(header: &str) -> Vec<&str> {
    let mut labels = Vec::new();
    for (open, close) in [('[', ']'), ('(', ')'), ('{', '}'), ('<', '>')] {
        let mut rest = header;
        while let Some((_, after)) = rest.split_once(open) {
            let Some((inside, behind)) = after.split_once(close) else {
                break;
            };
            labels.push(inside.trim());
            rest = behind;
        }
    }
    labels.extend(header.rsplit_once(" in ").map(|(_, label)| label.trim()));
    labels.extend(header.rsplit_once('/').map(|(_, label)| label.trim()));
    labels.retain(|label| !matches!(*label, "" | "s" | "t"));
    labels
}

/// The last word of a header of several.
fn last_word(header: &str) -> Option<&str> {
    let (_, word) = header.trim().rsplit_once([' ', '_', ',', ':', '-'])?;
    Some(word)
}

#[cfg(test)]
mod tests {
    use super::*;

    const N: Wanted = Wanted::Force(ForceUnit::Newton);
    const MM: Wanted = Wanted::Length(LengthUnit::Millimetre);

    #[test]
    fn contradictions_in_a_header() {
        for (wanted, header, found) in [
            (N, "Load [kN]", "kN"),
            (N, "Load (lbf)", "lbf"),
            (N, "Kraft in kN", "kN"),
            (N, "Force/kN", "kN"),
            (N, "Force, lbf", "lbf"),
            (N, "Force_kgf", "kgf"),
            (N, "Load [daN]", "daN"),
            (N, "Load [mm]", "mm"),
            (N, "Kraft (kN) max", "kN"),
            (MM, "Weg [µm]", "µm"),
            (MM, "Travel (inch)", "inch"),
            (MM, "Travel in", "in"),
            (MM, "Weg [N]", "N"),
            (MM, "Weg in Zoll", "Zoll"),
            (Wanted::Force(ForceUnit::PoundForce), "Kraft in N", "N"),
            (Wanted::Seconds, "t [ms]", "ms"),
        ] {
            assert_eq!(wanted.contradicted_by(header), Some(found), "{header}");
        }
    }

    #[test]
    fn names_that_agree_or_state_nothing() {
        for header in [
            "Load",
            "Load [N]",
            "Load (Newton)",
            "Kraft in N",
            "Force/N",
            "Load N",
            "Load [1]",
            "F(s)",
            "F(t)",
            "Load in cell 2",
        ] {
            assert_eq!(N.contradicted_by(header), None, "{header}");
        }
        for header in ["Weg", "Weg [mm]", "Travel (MM)", "Position n", "s", "s(t)"] {
            assert_eq!(MM.contradicted_by(header), None, "{header}");
        }
        assert_eq!(Wanted::Seconds.contradicted_by("t [s]"), None);
    }

    #[test]
    fn the_units_line() {
        assert_eq!(N.against(" [N] "), Units::Agree);
        assert_eq!(MM.against("(mm)"), Units::Agree);
        assert_eq!(N.against("kN"), Units::Contradict);
        assert_eq!(N.against("mm"), Units::Contradict);
        assert_eq!(N.against(""), Units::None);
        assert_eq!(MM.against("12.5"), Units::None);
        assert_eq!(Wanted::Seconds.against(""), Units::Agree);
        assert_eq!(Wanted::Seconds.against("ms"), Units::Contradict);
    }
}
