//! What the drawn spring should do, with formulas and sources in words.

use super::table::{Cell, Column, Row, Section, Table};
use crate::quantity::Unit;
use crate::record::{MemberFacts, StressFacts, TheoryFacts};
use crate::units::{Finite, System};
use crate::wording::{Place, figure, number, percent, unit_symbol, with_uncertainty, with_unit};

/// Where the formulas come from, as the section prints it.
const FORMULAS: [&str; 3] = [
    "Rate of a close-coiled spring of round wire: R = G·d⁴ / (8·D³·n), EN 13906-1 (strain energy in torsion; curvature and pitch left \
     out). The rate of a nested set is the sum of its members’ rates, each member carrying its share.",
    "Stress without correction: τ = 8·F·D / (π·d³). Static: × (1 + 1/(2w)), the direct-shear factor. Dynamic: × (w + 0.5)/(w − 0.75), \
     EN 13906-1. Wahl: × (4w − 1)/(4w − 4) + 0.615/w. The index is w = D/d. All stresses are theoretical.",
    "A measured rate inside the range the tolerances allow proves nothing; one outside it is a caution, never a verdict.",
];

/// The section.
pub(crate) fn section(theory: &TheoryFacts, show_in: System) -> Section {
    let mut text = vec![summary(theory, show_in)];
    text.extend(FORMULAS.map(str::to_owned));
    let mut tables = vec![members(theory, show_in)];
    tables.extend(
        theory
            .members
            .iter()
            .map(|member| stresses(member, show_in)),
    );
    Section {
        title: "Theory of the drawn spring".to_owned(),
        text,
        tables,
    }
}

fn summary(theory: &TheoryFacts, show_in: System) -> String {
    let rate = Unit::NewtonPerMillimetre;
    let finite = |value: f64| Finite::try_from(value).ok();
    let expanded = finite(2.0 * theory.rate_standard_uncertainty.get());
    let bound = |value| figure(Some(value), rate, Place::Uncertainty(expanded), show_in);
    let millimetres = |value| {
        with_unit(
            Some(value),
            Unit::Millimetre,
            Place::Significant(4),
            show_in,
        )
    };
    format!(
        "R = {} {} (k = 2, from the drawing’s tolerances; worst case {} to {}). Free length L0 = {}, solid length Lc = {}, smallest permitted \
         test length Ln = {}, load there Fn = {}.",
        with_uncertainty(finite(theory.rate_n_per_mm.get()), expanded, rate, show_in),
        unit_symbol(rate, show_in),
        bound(theory.rate_lowest),
        bound(theory.rate_highest),
        millimetres(theory.free_length_mm),
        millimetres(theory.solid_length_mm),
        millimetres(theory.smallest_length_mm),
        with_unit(
            Some(theory.full_load_n),
            Unit::Newton,
            Place::Significant(4),
            show_in
        ),
    )
}

fn members(theory: &TheoryFacts, show_in: System) -> Table {
    let length = unit_symbol(Unit::Millimetre, show_in);
    let columns = vec![
        Column::words("Spring"),
        Column::words("Material"),
        Column::words("Source of G"),
        Column::figures("G", unit_symbol(Unit::Megapascal, show_in)),
        Column::figures("d", length),
        Column::figures("D", length),
        Column::figures("n", ""),
        Column::figures("nt", ""),
        Column::figures("w", ""),
        Column::figures("R", unit_symbol(Unit::NewtonPerMillimetre, show_in)),
        Column::figures("Share", ""),
        Column::figures("Lc", length),
        Column::figures("Ln", length),
    ];
    let rows = theory.members.iter().map(|member| {
        let millimetres = |value| {
            Cell::from(figure(
                Some(value),
                Unit::Millimetre,
                Place::Significant(4),
                show_in,
            ))
        };
        Row::from([
            member.name.clone().into(),
            member.material.clone().into(),
            member.shear_modulus_source.clone().into(),
            figure(
                Some(member.shear_modulus_mpa),
                Unit::Megapascal,
                Place::Stated,
                show_in,
            )
            .into(),
            figure(
                Some(member.wire_mm),
                Unit::Millimetre,
                Place::Stated,
                show_in,
            )
            .into(),
            figure(
                Some(member.coil_mm),
                Unit::Millimetre,
                Place::Stated,
                show_in,
            )
            .into(),
            number(Some(member.active_coils), 4).into(),
            number(Some(member.total_coils), 4).into(),
            number(Some(member.index), 4).into(),
            figure(
                Some(member.rate_n_per_mm),
                Unit::NewtonPerMillimetre,
                Place::Significant(4),
                show_in,
            )
            .into(),
            percent(Some(member.share)).into(),
            millimetres(member.solid_length_mm),
            millimetres(member.smallest_length_mm),
        ])
    });
    Table::new("Springs as drawn", columns, rows.collect())
}

fn stresses(member: &MemberFacts, show_in: System) -> Table {
    let (length, stress) = (
        unit_symbol(Unit::Millimetre, show_in),
        unit_symbol(Unit::Megapascal, show_in),
    );
    let columns = vec![
        Column::figures("At length", length),
        Column::figures("Deflection", length),
        Column::figures("Load", unit_symbol(Unit::Newton, show_in)),
        Column::figures("τ", stress),
        Column::figures("τ static", stress),
        Column::figures("τ dynamic", stress),
        Column::figures("τ Wahl", stress),
    ];
    let rows = member.stress.iter().map(|at| stress_row(at, show_in));
    Table::new(
        format!("Theoretical stresses, {}", member.name),
        columns,
        rows.collect(),
    )
}

fn stress_row(at: &StressFacts, show_in: System) -> Row {
    let stress = |value| {
        Cell::from(figure(
            Some(value),
            Unit::Megapascal,
            Place::Significant(4),
            show_in,
        ))
    };
    Row::from([
        figure(
            Some(at.at_length_mm),
            Unit::Millimetre,
            Place::Stated,
            show_in,
        )
        .into(),
        figure(
            Some(at.deflection_mm),
            Unit::Millimetre,
            Place::Significant(4),
            show_in,
        )
        .into(),
        figure(
            Some(at.load_n),
            Unit::Newton,
            Place::Significant(4),
            show_in,
        )
        .into(),
        stress(at.uncorrected_mpa),
        stress(at.static_mpa),
        stress(at.dynamic_mpa),
        stress(at.wahl_mpa),
    ])
}
