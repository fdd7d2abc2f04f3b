//! Every figure of a record is found again where people read it.

use coilassay::quantity::Unit;
use coilassay::record::AcceptRecord;
use coilassay::report::springs_csv;
use coilassay::units::{Finite, System};
use coilassay::wording::{Place, figure};

use super::lots;
use super::pages::{file, read};

/// Every figure of the record's springs as the report rounds it.
fn figures(record: &AcceptRecord, show_in: System) -> Vec<(String, String)> {
    let mut all = Vec::new();
    for spring in &record.springs {
        for of in &spring.characteristics {
            let wide = Place::Uncertainty(of.expanded_uncertainty);
            let mut add = |what: &str, value: Option<Finite>, unit: Unit, place: Place| {
                if value.is_some() {
                    let name = format!("spring {} {} {what}", spring.id, of.name);
                    all.push((name, figure(value, unit, place, show_in)));
                }
            };
            add("value", of.value, of.unit, wide);
            add("U", of.expanded_uncertainty, of.unit, wide);
            add("u", of.standard_uncertainty, of.unit, Place::Significant(2));
            add("own", of.own_uncertainty, of.unit, Place::Significant(2));
            add(
                "common",
                of.common_uncertainty,
                of.unit,
                Place::Significant(2),
            );
            add("accept lower", of.accept_lower, of.unit, wide);
            add("accept upper", of.accept_upper, of.unit, wide);
            add("reject lower", of.reject_lower, of.unit, wide);
            add("reject upper", of.reject_upper, of.unit, wide);
            add("lower", of.lower, of.unit, Place::Stated);
            add("upper", of.upper, of.unit, Place::Stated);
            add("nominal", of.nominal, of.unit, Place::Stated);
        }
        let fit = spring.fit.as_ref().unwrap();
        let rate = fit
            .two_point_rate
            .map(|rate| Finite::try_from(rate.get()).unwrap());
        all.push((
            format!("spring {} two-point", spring.id),
            figure(
                rate,
                Unit::NewtonPerMillimetre,
                Place::Significant(5),
                show_in,
            ),
        ));
    }
    all
}

#[test]
fn every_figure_of_the_springs_stands_in_the_html() {
    for show_in in [System::MmN, System::InLbf] {
        let record = lots::rejected();
        let text = read(&file(&record, show_in, "report.html"));
        let words: std::collections::BTreeSet<&str> = text
            .split(|letter: char| letter.is_whitespace() || matches!(letter, '(' | ')' | ','))
            .collect();
        let all = figures(&record, show_in);
        assert!(all.len() > 9000);
        let missing: Vec<_> = all
            .iter()
            .filter(|(_, figure)| !words.contains(figure.as_str()))
            .collect();
        assert!(
            missing.is_empty(),
            "{} missing: {:?}",
            missing.len(),
            missing.iter().take(5).collect::<Vec<_>>()
        );
    }
}

#[test]
fn every_figure_of_the_springs_stands_in_the_csv() {
    let record = lots::rejected();
    let csv = String::from_utf8(springs_csv(&record)).unwrap();
    let rows: Vec<Vec<&str>> = csv.lines().map(|line| line.split(',').collect()).collect();
    assert_eq!(
        rows.len(),
        1 + record
            .springs
            .iter()
            .map(|spring| spring.characteristics.len())
            .sum::<usize>()
    );
    let mut found = rows.iter().skip(1);
    let mut missing = Vec::new();
    for spring in &record.springs {
        for of in &spring.characteristics {
            let row = found.next().unwrap();
            let figures = [
                of.value,
                of.expanded_uncertainty,
                of.standard_uncertainty,
                of.own_uncertainty,
                of.common_uncertainty,
                of.coverage_factor,
                of.degrees_of_freedom,
                of.nominal,
                of.lower,
                of.upper,
                of.accept_lower,
                of.accept_upper,
                of.reject_lower,
                of.reject_upper,
                of.conformance_probability,
            ];
            for figure in figures.into_iter().flatten() {
                // digit for digit what result.json holds
                if !row.iter().any(|cell| {
                    cell.parse::<f64>()
                        .is_ok_and(|value| value.to_bits() == figure.get().to_bits())
                }) {
                    missing.push((&spring.id, &of.name, figure));
                }
            }
        }
    }
    assert!(missing.is_empty(), "{missing:?}");
}
