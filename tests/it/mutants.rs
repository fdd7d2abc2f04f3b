//! What a changed comparison, sign or constant would turn, and no other test sees.

use std::collections::BTreeSet;

use coilassay::characteristic::{Estimate, Line, Measured, Part};
use coilassay::drawing::{Guard, Limits, Policy, Rule};
use coilassay::lot::{Basis, ClassTerms, Decision, decide};
use coilassay::quantity::Class;
use coilassay::record::CharacteristicResult;
use coilassay::stats::Dof;
use coilassay::verdict::{Judged, Overall, Verdict, judge};

use crate::bad_input::Case;
use crate::lots::{Lot, edit};

fn judged(y: f64, rule: Rule, guard: Guard, (lower, upper): (Option<f64>, Option<f64>)) -> Judged {
    let line = Line::new("u", Part::Own, 0.1).with_dof(Dof::Finite(4.0));
    let limits = Limits {
        nominal: None,
        lower,
        upper,
    };
    let measured = Measured::Value(Estimate::new(y, vec![line]).unwrap());
    judge(&measured, &limits, rule, guard).unwrap()
}

/// A value on its limit conforms: limits are permissible values (JCGM 106:2012, 3.3.4; from memory).
#[test]
fn a_value_on_its_limit_conforms() {
    for (limits, inside, outside) in [
        ((Some(1.0), None), 1.0, 0.999_999),
        ((None, Some(1.0)), 1.0, 1.000_001),
    ] {
        let verdict = |y| judged(y, Rule::Simple, Guard::T95, limits).verdict;
        assert_eq!(verdict(inside), Verdict::Conforms, "{limits:?}");
        assert_eq!(verdict(outside), Verdict::Fails, "{limits:?}");
    }
}

/// t at 0.95 and 4 degrees of freedom 2.132; k for 95.45 % and 4 degrees of freedom 2.87 (GUM, table G.2; both from memory).
#[test]
fn few_degrees_of_freedom_widen_the_guard_band() {
    let of = |y, guard| judged(y, Rule::Guarded, guard, (None, Some(1.0)));
    let t95 = of(0.0, Guard::T95).guard.unwrap();
    assert!((t95 - 0.2132).abs() < 0.000_05, "{t95}");
    let expanded = of(0.0, Guard::U).guard.unwrap();
    assert!((expanded - 0.287).abs() < 0.000_5, "{expanded}");
    let at = of(1.0 - t95, Guard::T95).probability.unwrap();
    assert!((at - 0.95).abs() < 1e-9, "{at}");
}

/// Under simple acceptance too a spring counts in its gravest class only.
#[test]
fn a_simple_failure_counts_in_its_own_class_only() {
    let terms = |class, accept| ClassTerms {
        class,
        basis: Basis::All,
        sample_size: 3,
        accept,
        reject: accept + 1,
    };
    let spring = |failing: Option<Class>| {
        let verdict = failing.map_or(Verdict::Conforms, |_| Verdict::Fails);
        let overall = Overall {
            verdict,
            failing,
            undecided: BTreeSet::new(),
            unmeasured: BTreeSet::new(),
            simple: verdict,
            simple_failing: failing,
        };
        (String::new(), overall)
    };
    let springs = [spring(Some(Class::Major)), spring(None), spring(None)];
    let plan = [terms(Class::Major, 1), terms(Class::Minor, 0)];
    let outcome = decide(&plan, &springs, &[], Policy::Report);
    assert_eq!(
        (outcome.decision, outcome.simple),
        (Decision::Accepted, Decision::Accepted)
    );
}

fn named<'a>(of: &'a [CharacteristicResult], name: &str) -> &'a CharacteristicResult {
    of.iter().find(|one| one.name == name).unwrap()
}

/// The travel zero set under load F_z: L = L_ind + C·(F − F_z), so that every length is shorter by C·F_z, and the
/// frame's doubt of a load is rate · |F − F_z| · u(C).
#[test]
fn a_length_zero_set_under_load_shifts_every_length_by_the_frame() {
    let lot = Lot::new(17, 2); // C 0.0005 mm/N, U(C) 0.0002, k 2
    let at_zero = lot.judge();
    edit(
        &lot.rig(),
        &[("zeroed_at_load = 0.0", "zeroed_at_load = 40.0")],
    );
    let under_load = lot.judge();
    for (a, b) in at_zero.springs.iter().zip(&under_load.springs) {
        let value = |one: &CharacteristicResult| f64::from(one.value.unwrap());
        let free = |of| value(named(of, "free_length"));
        let shift = free(&b.characteristics) - free(&a.characteristics);
        assert!((shift + 0.02).abs() < 1e-9, "spring {}: {shift}", a.id);
        let frame = |of: &[CharacteristicResult]| {
            let load = named(of, "load");
            let line = load
                .budget
                .iter()
                .find(|line| line.source == "frame compliance");
            (value(load), f64::from(line.unwrap().contribution).abs())
        };
        let ((f, before), (g, after)) = (frame(&a.characteristics), frame(&b.characteristics));
        let wanted = (g - 40.0) / f;
        assert!(
            (after / before - wanted).abs() < 1e-3,
            "spring {}: {after} of {before}, not {wanted}",
            a.id
        );
    }
}

/// A recording that begins at 50 N has no known zero: its loads are told without an uncertainty and decide nothing.
#[test]
fn a_recording_that_begins_in_contact_proves_no_load() {
    let case = Case::of("accepted");
    case.rows(|rows| {
        let start = rows.iter().position(|row| row.2 > 50.0).unwrap();
        rows[start..].to_vec()
    });
    let (_, result) = case.judged(&[]);
    let all = result["springs"][0]["characteristics"].as_array().unwrap();
    let loads: Vec<_> = all.iter().filter(|one| one["name"] == "load").collect();
    assert!(!loads.is_empty());
    for load in loads {
        assert!(load["expanded_uncertainty"].is_null(), "{load}");
        assert_eq!(load["verdict"], "undecided");
    }
}

/// With two of three strokes presetting, the free length is that of the last stroke: shorter than the first one's by the set.
#[test]
fn presetting_strokes_give_no_free_length() {
    let figures = |recorded: u32| -> Vec<(f64, f64)> {
        let case = Case::of("accepted");
        case.sub("lot.toml", "findings = \"caliper.csv\"\n", "");
        let key = format!("presetting_recorded = {recorded}");
        case.sub("lot.toml", "presetting_recorded = 0", &key);
        let (_, result) = case.judged(&[]);
        let springs = result["springs"].as_array().unwrap();
        let one = |spring: &serde_json::Value| {
            let all = spring["characteristics"].as_array().unwrap();
            let value = |name: &str| {
                let found = all.iter().find(|one| one["name"] == name).unwrap();
                found["value"].as_f64().unwrap()
            };
            assert_eq!(spring["loading_strokes"], 3);
            (value("free_length"), value("set"))
        };
        springs.iter().map(one).collect()
    };
    for ((whole, set), (preset, _)) in figures(0).into_iter().zip(figures(2)) {
        assert!(set.abs() > 1e-6, "strokes all alike");
        assert!(
            (whole - preset - set).abs() < 1e-9,
            "{whole} − {preset}, not {set}"
        );
    }
}

/// Fit and two-point rate as the ends of a rectangular distribution: half-width over √3 is their difference over √12.
#[test]
fn the_shape_line_is_rectangular_between_both_rates() {
    let record = Lot::new(17, 1).judge();
    for spring in &record.springs {
        let rate = named(&spring.characteristics, "rate");
        let line = rate.budget.iter().find(|line| line.source == "shape");
        let two_point = spring.fit.as_ref().unwrap().two_point_rate.unwrap().get();
        let wanted = (f64::from(rate.value.unwrap()) - two_point).abs() / 12.0_f64.sqrt();
        let got = f64::from(line.unwrap().contribution);
        assert!((got - wanted).abs() < 1e-9, "spring {}", spring.id);
    }
}
