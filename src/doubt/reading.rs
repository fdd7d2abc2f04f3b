//! What may stand behind an odd rate: a reading of the drawing, or a part left out. A caution, never a verdict.

use crate::drawing::{Drawing, Member, OtherCoil};
use crate::formula::rate;

/// A rate farther than this from the expected one is odd, relative.
const ODD: f64 = 0.1;
/// How near a reading must come to explain it, relative.
const EXPLAINS: f64 = 0.03;
/// Readings named at once.
const SHOWN: usize = 3;
/// Shear modulus of stainless spring wire as drawn, MPa: EN 13906-1:2013, 1.4310.
const STAINLESS: f64 = 70_000.0;
/// Wires off by a size or two, as shares of the drawn one.
const WIRES: [f64; 9] = [0.96, 0.95, 0.94, 0.92, 0.90, 1.05, 1.06, 1.08, 1.10];

/// Whether a rate is far from the expected one.
pub fn is_odd(rate: f64, expected: f64) -> bool {
    (rate / expected - 1.0).abs() > ODD
}

/// What would give `ratio` times the theory of `drawing`, in words: the readings within 3 %, nearest first, at most three.
pub fn reading(drawing: &Drawing, ratio: f64) -> Option<String> {
    let miss = |found: f64| (found / ratio - 1.0).abs();
    let mut near = candidates(drawing);
    near.retain(|(found, _)| miss(*found) <= EXPLAINS);
    near.sort_by(|a, b| miss(a.0).total_cmp(&miss(b.0)));
    let words: Vec<String> = near
        .into_iter()
        .map(|(_, words)| words)
        .take(SHOWN)
        .collect();
    (!words.is_empty()).then(|| words.join(", or "))
}

fn candidates(drawing: &Drawing) -> Vec<(f64, String)> {
    let members = drawing.members.iter().zip(&drawing.theory.members);
    match drawing.members.as_slice() {
        [member] => single(member, drawing.theory.rate.get()),
        _ => members
            .map(|(member, theory)| {
                (
                    1.0 - theory.share,
                    format!("member `{}` missing", member.name),
                )
            })
            .collect(),
    }
}

/// Wire, coil, active coils and shear modulus of a spring as it may have been made.
struct Made {
    wire: f64,
    coil: f64,
    active: f64,
    shear: f64,
}

fn single(member: &Member, theory: f64) -> Vec<(f64, String)> {
    let drawn = || Made {
        wire: member.wire.nominal,
        coil: member.mean_coil(),
        active: member.active.nominal,
        shear: member.material.shear,
    };
    let d = member.wire.nominal;
    let mut made: Vec<(Made, String)> = member
        .other_coils()
        .into_iter()
        .map(|(coil, other)| (Made { coil, ..drawn() }, diameter(other).to_owned()))
        .collect();
    let coils = [
        (
            member.total,
            "as many active coils as the drawing has total coils",
        ),
        (
            member.active.nominal + 1.0,
            "one active coil more than drawn",
        ),
        (
            member.active.nominal - 1.0,
            "one active coil fewer than drawn",
        ),
    ];
    made.extend(coils.map(|(active, words)| (Made { active, ..drawn() }, words.to_owned())));
    let stainless = Made {
        shear: STAINLESS,
        ..drawn()
    };
    made.push((
        stainless,
        format!("stainless wire (G {STAINLESS} MPa) instead of the drawn material"),
    ));
    made.extend(WIRES.map(|share| {
        let wire = d * share;
        (
            Made { wire, ..drawn() },
            format!("wire of about {wire:.2} mm instead of {d:.2} mm"),
        )
    }));
    let sound = |made: &Made| made.wire > 0.0 && made.coil > made.wire && made.active > 0.0;
    let ratio = |made: Made| {
        rate(made.wire, made.coil, made.active, made.shear).map(|found| found.get() / theory)
    };
    made.into_iter()
        .filter(|(made, _)| sound(made))
        .filter_map(|(made, words)| Some((ratio(made)?, words)))
        .collect()
}

/// A drawn diameter made as another one, in words.
const fn diameter(other: OtherCoil) -> &'static str {
    match other {
        OtherCoil::OutsideAsMean => "the drawn outside diameter made as mean diameter",
        OtherCoil::InsideAsMean => "the drawn inside diameter made as mean diameter",
        OtherCoil::MeanAsOutside => "the drawn mean diameter made as outside diameter",
        OtherCoil::MeanAsInside => "the drawn mean diameter made as inside diameter",
    }
}
