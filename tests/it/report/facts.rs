//! The facts about the lots that are the same for all of them.

use std::collections::BTreeMap;

use coilassay::record::{
    Caution, ConditionFacts, LedgerFacts, LotFacts, MemberFacts, RigFacts, SetAside, StressFacts,
    TheoryFacts, WindowFacts, WindowOf,
};

use super::fixture::{fin, mm, mpa, n, rate};

pub(crate) fn member(name: &str, wire: f64, coil: f64, turns: f64, share: f64) -> MemberFacts {
    let k = 81_500.0 * wire.powi(4) / (8.0 * coil.powi(3) * turns);
    let stress = |length: f64| {
        let force = k * (62.0 - length);
        let tau = 8.0 * force * coil / (std::f64::consts::PI * wire.powi(3));
        let w = coil / wire;
        StressFacts {
            at_length_mm: mm(length),
            deflection_mm: mm(62.0 - length),
            load_n: n(force),
            uncorrected_mpa: mpa(tau),
            static_mpa: mpa(tau * (1.0 + 0.5 / w)),
            dynamic_mpa: mpa(tau * (w + 0.5) / (w - 0.75)),
            wahl_mpa: mpa(tau * ((4.0 * w - 1.0) / (4.0 * w - 4.0) + 0.615 / w)),
        }
    };
    MemberFacts {
        name: name.to_owned(),
        material: "EN 10270-1 SH".to_owned(),
        shear_modulus_source: "EN 13906-1, cold drawn unalloyed steel, 20 °C".to_owned(),
        shear_modulus_mpa: mpa(81_500.0),
        wire_mm: mm(wire),
        coil_mm: mm(coil),
        active_coils: fin(turns),
        total_coils: fin(turns + 2.0),
        index: fin(coil / wire),
        rate_n_per_mm: rate(k),
        share: fin(share),
        solid_length_mm: mm(27.2),
        smallest_length_mm: mm(33.1),
        stress: [48.0, 38.5, 27.2].map(stress).to_vec(),
    }
}

pub(crate) fn cautions(ids: &[String]) -> Vec<Caution> {
    vec![
        Caution::ComplianceNotCorrected,
        Caution::CalibrationExpired {
            scale: "force".to_owned(),
            until: "2026-03-02".to_owned(),
        },
        Caution::Repeated {
            springs: ids.iter().take(12).cloned().collect(),
        },
        Caution::UncertaintyLarge {
            name: "load".to_owned(),
            at_length_mm: Some(mm(48.0)),
            share: fin(0.38),
        },
    ]
}

pub(crate) fn lot() -> LotFacts {
    LotFacts {
        number: "4471".to_owned(),
        size: 1200,
        supplier: Some("Example supplier".to_owned()),
        received: Some("2026-11-28".to_owned()),
        inspector: Some("Inspector 3".to_owned()),
        sample_drawn: Some("at random from 6 boxes".to_owned()),
        tags: BTreeMap::from([("wire heat".to_owned(), "H-210".to_owned())]),
        note: Some("Invented sample: these springs were never made.".to_owned()),
        concession: Some(
            "Load at 48 mm up to 162 N allowed by concession 12 for 200 springs.".to_owned(),
        ),
        supplier_values: None,
        not_inspected: vec!["solid length: no bench load high enough".to_owned()],
        conditions: ConditionFacts {
            temperature_c: Some(fin(21.0)),
            presetting_strokes: Some(3),
            presetting_recorded: 0,
        },
    }
}

pub(crate) fn theory() -> TheoryFacts {
    TheoryFacts {
        rate_n_per_mm: rate(10.73),
        rate_standard_uncertainty: rate(0.21),
        rate_lowest: rate(10.02),
        rate_highest: rate(11.49),
        free_length_mm: mm(62.0),
        solid_length_mm: mm(27.2),
        smallest_length_mm: mm(33.1),
        full_load_n: n(312.1),
        members: vec![member("return", 3.2, 24.8, 6.5, 1.0)],
    }
}

pub(crate) fn window() -> WindowFacts {
    WindowFacts {
        of: WindowOf::Load,
        from: fin(93.63),
        to: fin(218.5),
        stated: "30 % to 70 % of full load".to_owned(),
        stroke: "last loading".to_owned(),
        method: "fit".to_owned(),
    }
}

pub(crate) fn rig() -> RigFacts {
    RigFacts {
        name: "Bench 2".to_owned(),
        force: "class 1 of ISO 7500-1, resolution 0.01 N, 4 to 200 N".to_owned(),
        force_calibrated: Some("2026-03-02 … 2027-03-02".to_owned()),
        travel: "class 1 of ISO 9513, resolution 0.001 mm".to_owned(),
        travel_calibrated: Some("2026-03-02 … 2027-03-02".to_owned()),
        compliance: "0.00021 mm/N, U 0.00002 (k = 2)".to_owned(),
        checked: Some("2026-11-28 (RS-3)".to_owned()),
        travel_means: "deflection".to_owned(),
    }
}

pub(crate) fn ledger(id: &str) -> LedgerFacts {
    LedgerFacts {
        export: format!("springs/{id}.csv"),
        lines: 412,
        points: 404,
        set_aside: vec![
            SetAside {
                reason: "metadata".to_owned(),
                first_line: 1,
                last_line: 6,
            },
            SetAside {
                reason: "header".to_owned(),
                first_line: 7,
                last_line: 7,
            },
            SetAside {
                reason: "units".to_owned(),
                first_line: 8,
                last_line: 8,
            },
        ],
    }
}
