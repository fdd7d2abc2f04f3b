//! What may stand behind an odd rate: a reading of the drawing, or a part left out. A caution, never a verdict.

use crate::drawing::{Coil, Drawing, rate};

/// A rate farther than this from the expected one is odd, relative.
const ODD: f64 = 0.1;
/// How near a reading must come to explain it, relative.
const EXPLAINS: f64 = 0.03;
/// Readings named at once.
const SHOWN: usize = 3;

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
    let whole = drawing.theory.rate.get();
    let mut found = Vec::new();
    if let [_, _, ..] = drawing.members.as_slice() {
        for (member, theory) in drawing.members.iter().zip(&drawing.theory.members) {
            found.push((
                1.0 - theory.share,
                format!("member `{}` missing", member.name),
            ));
        }
        return found;
    }
    let Some(member) = drawing.members.first() else {
        return found;
    };
    let (d, coil, n, shear) = (
        member.wire.nominal,
        member.mean_coil(),
        member.active.nominal,
        member.shear.modulus,
    );
    let mut add = |wire: f64, coil: f64, active: f64, shear: f64, words: &str| {
        if let (true, Some(found_rate)) = (
            wire > 0.0 && coil > wire && active > 0.0,
            rate(wire, coil, active, shear),
        ) {
            found.push((found_rate.get() / whole, words.to_owned()));
        }
    };
    match member.coil {
        Coil::Outside(_) => add(
            d,
            coil + d,
            n,
            shear,
            "the drawn outside diameter made as mean diameter",
        ),
        Coil::Mean(_) => {
            add(
                d,
                coil - d,
                n,
                shear,
                "the drawn mean diameter made as outside diameter",
            );
            add(
                d,
                coil + d,
                n,
                shear,
                "the drawn mean diameter made as inside diameter",
            );
        }
        Coil::Inside(_) => add(
            d,
            coil - d,
            n,
            shear,
            "the drawn inside diameter made as mean diameter",
        ),
    }
    add(
        d,
        coil,
        member.total,
        shear,
        "as many active coils as the drawing has total coils",
    );
    add(d, coil, n + 1.0, shear, "one active coil more than drawn");
    add(d, coil, n - 1.0, shear, "one active coil fewer than drawn");
    add(
        d,
        coil,
        n,
        70_000.0,
        "stainless wire (G 70 000 MPa) instead of the drawn material",
    );
    for share in [0.95, 0.96, 0.94, 0.92, 0.90, 1.05, 1.06, 1.08, 1.10] {
        add(
            d * share,
            coil,
            n,
            shear,
            &format!("wire of about {:.2} mm instead of {d:.2} mm", d * share),
        );
    }
    found
}
