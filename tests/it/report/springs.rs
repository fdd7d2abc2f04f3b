//! Springs of the records: invented figures that belong together only roughly.

use coilassay::curve::{Axis, Reduced};
use coilassay::quantity::{Class, Unit};
use coilassay::record::{
    AcceptRecord, Advice, BudgetFigure, CharacteristicResult, FindingResult, FitFacts, LackFacts,
    Part, Reason, RepeatFacts, SpringResult, Verdict,
};
use coilassay::units::Finite;

use super::fixture::{fin, mm, n, rate};

/// A repeatable draw, about normal, of spread 1.
pub(crate) struct Draw(pub(crate) u64);

impl Draw {
    fn next(&mut self) -> f64 {
        let mut sum = 0.0;
        for _ in 0..12 {
            self.0 = self
                .0
                .wrapping_mul(6_364_136_223_846_793_005)
                .wrapping_add(1_442_695_040_888_963_407);
            sum += (self.0 >> 11) as f64 / (1_u64 << 53) as f64;
        }
        sum - 6.0
    }
}

pub(crate) struct Limits {
    pub(crate) name: &'static str,
    pub(crate) at: Option<f64>,
    pub(crate) unit: Unit,
    pub(crate) nominal: f64,
    pub(crate) half: f64,
    pub(crate) expanded: f64,
    pub(crate) class: Class,
}

pub(crate) const REQUIRED: [Limits; 4] = [
    Limits {
        name: "rate",
        at: None,
        unit: Unit::NewtonPerMillimetre,
        nominal: 10.8,
        half: 0.54,
        expanded: 0.098,
        class: Class::Major,
    },
    Limits {
        name: "load",
        at: Some(48.0),
        unit: Unit::Newton,
        nominal: 151.0,
        half: 9.0,
        expanded: 1.24,
        class: Class::Major,
    },
    Limits {
        name: "load",
        at: Some(38.5),
        unit: Unit::Newton,
        nominal: 253.8,
        half: 14.0,
        expanded: 1.92,
        class: Class::Critical,
    },
    Limits {
        name: "free_length",
        at: None,
        unit: Unit::Millimetre,
        nominal: 62.0,
        half: 1.5,
        expanded: 0.061,
        class: Class::Minor,
    },
];

fn characteristic(of: &Limits, value: f64, spread: f64) -> CharacteristicResult {
    let expanded = of.expanded * spread;
    let (lower, upper) = (of.nominal - of.half, of.nominal + of.half);
    let u = expanded / 2.03;
    let guard = u * 1.69;
    let (verdict, reason) = if value < lower - guard {
        (Verdict::Fails, Some(Reason::BelowLower))
    } else if value > upper + guard {
        (Verdict::Fails, Some(Reason::AboveUpper))
    } else if value < lower + guard {
        (Verdict::Undecided, Some(Reason::LowerWithinUncertainty))
    } else if value > upper - guard {
        (Verdict::Undecided, Some(Reason::UpperWithinUncertainty))
    } else {
        (Verdict::Conforms, None)
    };
    let line = |source: &str, part, share: f64, dof: Option<f64>, counted| BudgetFigure {
        source: source.to_owned(),
        part,
        contribution: fin(u * share),
        degrees_of_freedom: dof.map(fin),
        counted,
    };
    CharacteristicResult {
        name: of.name.to_owned(),
        at_length_mm: of.at.map(mm),
        value: Some(fin(value)),
        standard_uncertainty: Some(fin(u)),
        own_uncertainty: Some(fin(u * 0.4)),
        common_uncertainty: Some(fin(u * 0.917)),
        expanded_uncertainty: Some(fin(expanded)),
        coverage_factor: Some(fin(2.03)),
        degrees_of_freedom: Some(fin(86.4)),
        unit: of.unit,
        nominal: Some(fin(of.nominal)),
        lower: Some(fin(lower)),
        upper: Some(fin(upper)),
        accept_lower: Some(fin(lower + guard)),
        accept_upper: Some(fin(upper - guard)),
        reject_lower: Some(fin(lower - guard)),
        reject_upper: Some(fin(upper + guard)),
        verdict: Some(verdict),
        reason,
        conformance_probability: Some(fin(match verdict {
            Verdict::Conforms => 0.9991,
            Verdict::Undecided => 0.62,
            Verdict::Fails => 0.0004,
        })),
        class: Some(of.class),
        budget: vec![
            line("force scale", Part::Common, 0.71, None, true),
            line("length zero", Part::Common, -0.52, None, true),
            line("frame compliance", Part::Common, 0.24, None, true),
            line("repeatability", Part::Own, 0.4, Some(9.0), true),
            line("fit", Part::Own, 0.11, Some(121.0), false),
        ],
    }
}

pub(crate) fn spring(id: &str, number: usize, draw: &mut Draw, off: f64) -> SpringResult {
    let r = 10.8 * (1.0 + off + 0.006 * draw.next());
    let l0 = 62.0 + 0.2 * draw.next();
    let values = [r, r * (l0 - 48.0), r * (l0 - 38.5), l0];
    let characteristics: Vec<_> = REQUIRED
        .iter()
        .zip(values)
        .map(|(of, value)| characteristic(of, value, 1.0 + 0.05 * draw.next()))
        .collect();
    let worst = |verdict| characteristics.iter().any(|of| of.verdict == Some(verdict));
    let verdict = if worst(Verdict::Fails) {
        Verdict::Fails
    } else if worst(Verdict::Undecided) {
        Verdict::Undecided
    } else {
        Verdict::Conforms
    };
    let export = format!("springs/{id}.csv");
    let undecided = characteristics
        .iter()
        .find(|of| of.verdict == Some(Verdict::Undecided));
    let advice = undecided.map(|of| Advice::BetterBench {
        name: of.name.clone(),
        at_length_mm: of.at_length_mm,
        expanded_uncertainty: Some(fin(of.expanded_uncertainty.unwrap().get() * 0.31)),
        unit: of.unit,
    });
    SpringResult {
        id: id.to_owned(),
        verdict,
        failing_class: characteristics
            .iter()
            .filter(|of| of.verdict == Some(Verdict::Fails))
            .filter_map(|of| of.class)
            .max(),
        simple_verdict: if verdict == Verdict::Undecided {
            Verdict::Conforms
        } else {
            verdict
        },
        in_sample: true,
        fit: Some(FitFacts {
            export: export.clone(),
            first_line: 131,
            last_line: 289,
            from_mm: mm(53.312),
            to_mm: mm(41.944),
            points: 159,
            effective_points: Some(fin(88.0 + number as f64)),
            lag1: Some(fin(0.28)),
            standard_error: rate(0.0021 + number as f64 * 1e-5),
            residual_sd_n: n(0.131),
            straightness_percent: Some(fin(0.14)),
            lack_of_fit: Some(LackFacts {
                f: fin(1.12),
                p: fin(0.29),
                bend_percent: fin(0.08),
                warns: false,
            }),
            two_point_rate: Some(rate(r * 1.0004)),
            robust_rate: Some(rate(r * 0.9998)),
        }),
        characteristics,
        loading_strokes: 3,
        measurements: vec![RepeatFacts {
            export,
            reason: None,
            invalid: None,
        }],
        odd: Vec::new(),
        findings: if number == 6 {
            vec![FindingResult {
                text: "end not ground".to_owned(),
                class: Class::Minor,
            }]
        } else {
            Vec::new()
        },
        advice: advice.into_iter().collect(),
    }
}

/// Curves of such springs, `points` a stroke.
pub(crate) fn curves(record: &AcceptRecord, points: u32) -> Vec<Reduced> {
    let mut draw = Draw(99);
    record
        .springs
        .iter()
        .map(|spring| {
            let value = |name: &str| {
                spring
                    .characteristics
                    .iter()
                    .find(|of| of.name == name)
                    .and_then(|of| of.value)
                    .map_or(10.0, Finite::get)
            };
            let (r, l0) = (value("rate"), value("free_length"));
            let at = |part: f64| l0 - 26.0 * part;
            let stroke = |back: bool, draw: &mut Draw| -> Vec<(f64, f64)> {
                (0..points)
                    .map(|step| {
                        let part = f64::from(step) / f64::from(points - 1);
                        let part = if back { 1.0 - part } else { part };
                        let x = at(part);
                        let lag = if back {
                            1.8 * part * (1.0 - part) * 4.0
                        } else {
                            0.0
                        };
                        (x, r * (l0 - x) - lag + 0.1 * draw.next())
                    })
                    .collect()
            };
            Reduced {
                id: spring.id.clone(),
                axis: Axis::Length,
                loading: stroke(false, &mut draw),
                unloading: stroke(true, &mut draw),
                residuals: (0..points / 2)
                    .map(|step| {
                        (
                            53.3 - 11.3 * f64::from(step) / f64::from(points / 2),
                            0.12 * draw.next() + 0.1 * (f64::from(step) / 20.0).sin(),
                        )
                    })
                    .collect(),
            }
        })
        .collect()
}
