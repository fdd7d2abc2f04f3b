//! Records to make reports of, built by hand; the figures are invented and belong together only roughly.

use coilassay::quantity::Class;
use coilassay::record::{
    AcceptRecord, CharacteristicResult, ClassPlan, Decision, DrawingFacts, FORMAT, Kind, LotReason,
    PlanFacts, Provenance, RequirementFacts, SimpleAcceptance, SpringResult, TOOL, Undecided,
    Verdict,
};
use coilassay::text::InputFile;
use coilassay::units::{Finite, Megapascals, Millimetres, Newtons, NewtonsPerMillimetre};

use super::facts;
use super::springs::{Draw, REQUIRED, spring};

pub(crate) fn fin(value: f64) -> Finite {
    Finite::try_from(value).unwrap()
}
pub(crate) fn mm(value: f64) -> Millimetres {
    Millimetres::try_from(value).unwrap()
}
pub(crate) fn n(value: f64) -> Newtons {
    Newtons::try_from(value).unwrap()
}
pub(crate) fn rate(value: f64) -> NewtonsPerMillimetre {
    NewtonsPerMillimetre::try_from(value).unwrap()
}
pub(crate) fn mpa(value: f64) -> Megapascals {
    Megapascals::try_from(value).unwrap()
}

fn requirements(springs: &[SpringResult]) -> Vec<RequirementFacts> {
    REQUIRED
        .iter()
        .map(|of| {
            let found: Vec<&CharacteristicResult> = springs
                .iter()
                .filter_map(|spring| {
                    spring
                        .characteristics
                        .iter()
                        .find(|it| it.name == of.name && it.at_length_mm == of.at.map(mm))
                })
                .collect();
            let values: Vec<f64> = found
                .iter()
                .filter_map(|it| it.value)
                .map(Finite::get)
                .collect();
            let mean = values.iter().sum::<f64>() / values.len() as f64;
            let square = values
                .iter()
                .map(|value| (value - mean).powi(2))
                .sum::<f64>();
            let count = |verdict| {
                let number = found
                    .iter()
                    .filter(|it| it.verdict == Some(verdict))
                    .count();
                u32::try_from(number).unwrap()
            };
            RequirementFacts {
                name: of.name.to_owned(),
                at_length_mm: of.at.map(mm),
                unit: of.unit,
                nominal: Some(fin(of.nominal)),
                lower: Some(fin(of.nominal - of.half)),
                upper: Some(fin(of.nominal + of.half)),
                class: of.class,
                mean: Some(fin(mean)),
                standard_deviation: (values.len() > 1)
                    .then(|| fin((square / (values.len() as f64 - 1.0)).sqrt())),
                smallest: values.iter().copied().reduce(f64::min).map(fin),
                largest: values.iter().copied().reduce(f64::max).map(fin),
                largest_expanded_uncertainty: Some(fin(of.expanded * 1.1)),
                conforming: count(Verdict::Conforms),
                failing: count(Verdict::Fails),
                undecided: count(Verdict::Undecided),
            }
        })
        .collect()
}

/// A lot of `ids`; `off(number)` is how far a spring's rate lies off, as a share.
pub(crate) fn record(ids: &[String], off: impl Fn(usize) -> f64) -> AcceptRecord {
    let mut draw = Draw(7);
    let springs: Vec<SpringResult> = ids
        .iter()
        .enumerate()
        .map(|(number, id)| spring(id, number, &mut draw, off(number)))
        .collect();
    let failing = springs
        .iter()
        .filter(|it| it.verdict == Verdict::Fails)
        .count() as u64;
    let undecided = springs
        .iter()
        .filter(|it| it.verdict == Verdict::Undecided)
        .count() as u64;
    let (decision, reason) = decided(failing, undecided);
    let class_plan = |class, aql: f64, accept| ClassPlan {
        class,
        aql: Some(fin(aql)),
        code_letter: Some("H".to_owned()),
        used_letter: Some("J".to_owned()),
        sample_size: ids.len() as u64,
        accept,
        reject: accept + 1,
        failing,
        undecided,
        accepted_at_aql: Some(fin(0.956)),
        missing: 0,
        to_accept: Some(undecided),
        to_reject: None,
        if_undecided_conform: decision,
        if_undecided_fail: decision,
    };
    AcceptRecord {
        format: FORMAT,
        kind: Kind::Accept,
        decision,
        reasons: vec![reason],
        simple: SimpleAcceptance {
            decision: if failing >= 2 {
                Decision::Rejected
            } else {
                Decision::Accepted
            },
            failing,
        },
        cautions: facts::cautions(ids),
        lot: facts::lot(),
        drawing: DrawingFacts {
            number: "GV-118".to_owned(),
            revision: Some("B".to_owned()),
            title: Some("Return spring, sluice valve".to_owned()),
            requirements: requirements(&springs),
            rule: "guarded".to_owned(),
            guard: "t95".to_owned(),
            undecided_springs: Undecided::Report,
        },
        theory: facts::theory(),
        window: facts::window(),
        rig: facts::rig(),
        plan: PlanFacts {
            by: "attributes".to_owned(),
            level: Some("II".to_owned()),
            code_letter: Some("J".to_owned()),
            sample_size: ids.len() as u64,
            accept: Some(1),
            reject: Some(2),
            classes: vec![
                class_plan(Class::Critical, 0.01, 0),
                class_plan(Class::Major, 1.0, 1),
                class_plan(Class::Minor, 2.5, 3),
            ],
            source: "ISO 2859-1".to_owned(),
            state: None,
            accepted_tighter: None,
            zero_accept: None,
            variables: Vec::new(),
            settling: Vec::new(),
        },
        process: Vec::new(),
        springs,
        provenance: Provenance {
            tool: TOOL.to_owned(),
            version: "0.1.0".to_owned(),
            date: "2026-12-01".to_owned(),
            flags: vec!["--show-in".to_owned(), "mm-N".to_owned()],
            inputs: inputs(ids),
            archive: None,
            ledgers: ids.iter().map(|id| facts::ledger(id)).collect(),
        },
        files: Vec::new(),
    }
}

fn decided(failing: u64, undecided: u64) -> (Decision, LotReason) {
    if failing >= 2 {
        (
            Decision::Rejected,
            LotReason::ProvenFailures {
                class: Class::Major,
                failing,
                reject: 2,
            },
        )
    } else if failing + undecided <= 1 {
        (
            Decision::Accepted,
            LotReason::WithinAcceptance {
                class: Class::Major,
                failing,
                undecided,
                accept: 1,
            },
        )
    } else {
        (
            Decision::Undecided,
            LotReason::UndecidedMatter {
                class: Class::Major,
                failing,
                undecided,
                accept: 1,
            },
        )
    }
}

fn inputs(ids: &[String]) -> Vec<InputFile> {
    let hash = |number: usize| {
        format!(
            "{:064x}",
            (number as u128 + 3).wrapping_mul(0x9e37_79b9_7f4a_7c15_f39c_c060_5ced_c835)
        )
    };
    let file = |role: &str, path: &str, number| InputFile {
        role: role.to_owned(),
        path: path.to_owned(),
        sha256: hash(number),
    };
    let mut inputs = vec![
        file("lot", "lot-4471.toml", 1),
        file("drawing", "gv-118.toml", 2),
        file("rig", "bench-2.toml", 3),
    ];
    inputs.extend(
        ids.iter()
            .enumerate()
            .map(|(number, id)| file("export", &format!("springs/{id}.csv"), number + 10)),
    );
    inputs
}
