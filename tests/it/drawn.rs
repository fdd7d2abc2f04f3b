//! Drawings written for a test, in millimetres or in inches, and what `expect` makes of them.

use std::fmt::Write;

use coilassay::job::{Ask, expect};
use coilassay::record::Expected;
use coilassay::units::{Millimetres, Newtons};

pub(crate) const INCH: f64 = 25.4;
/// NIST SP 811 (2008), appendix B.8, exact: 0.453 592 37 × 9.806 65.
pub(crate) const LBF: f64 = 4.448_221_615_260_5;
pub(crate) const PSI: f64 = LBF / (INCH * INCH);

/// One spring, sizes in mm, G in MPa.
#[derive(Clone)]
pub(crate) struct Spring {
    pub(crate) name: &'static str,
    pub(crate) wire: f64,
    /// Key and value, `("mean_diameter", 16.0)`.
    pub(crate) coil: (&'static str, f64),
    pub(crate) active: f64,
    pub(crate) total: f64,
    pub(crate) ends: &'static str,
    pub(crate) free: f64,
    /// A material of the table, or G.
    pub(crate) material: Result<&'static str, f64>,
}

impl Spring {
    /// A spring of mean diameter D with closed ground ends.
    pub(crate) fn mean(
        wire: f64,
        coil: f64,
        active: f64,
        free: f64,
        material: Result<&'static str, f64>,
    ) -> Self {
        Self {
            name: "spring",
            wire,
            coil: ("mean_diameter", coil),
            active,
            total: active + 2.0,
            ends: "closed ground",
            free,
            material,
        }
    }
}

/// A drawing of these springs; `more` is written after them, in the file's own units. Figures keep all their digits.
pub(crate) fn text(arrangement: &str, springs: &[Spring], inches: bool, more: &str) -> String {
    let (length, stress) = if inches { (INCH, PSI) } else { (1.0, 1.0) };
    let units = if inches { "in-lbf" } else { "mm-N" };
    let mut text = format!(
        "units = \"{units}\"\n[drawing]\nnumber = \"X\"\narrangement = \"{arrangement}\"\n"
    );
    for one in springs {
        let material = match one.material {
            Ok(name) => format!("material = \"{name}\""),
            Err(shear) => format!(
                "shear_modulus = {}\nshear_modulus_source = \"the book\"",
                shear / stress
            ),
        };
        write!(
            text,
            "[[spring]]\nname = \"{}\"\nwire_diameter = {}\n{} = {}\nactive_coils = {}\ntotal_coils = {}\nends = \"{}\"\nfree_length = {}\n{material}\n",
            one.name, one.wire / length, one.coil.0, one.coil.1 / length, one.active, one.total, one.ends, one.free / length
        )
        .unwrap();
    }
    text + more
}

/// What `expect` makes of a drawing.
pub(crate) fn expected(text: &str, ask: Ask) -> miette::Result<Expected> {
    let folder = tempfile::tempdir().unwrap();
    let file = folder.path().join("drawing.toml");
    std::fs::write(&file, text).unwrap();
    expect(&file, "drawing.toml", ask, jiff::civil::date(2026, 12, 1))
}

/// The same of both unit systems, the inch one second; they agree in every figure that `expect --json` promises.
pub(crate) fn both(arrangement: &str, springs: &[Spring], ask: Ask) -> Expected {
    let of = |inches| expected(&text(arrangement, springs, inches, ""), ask).unwrap();
    let (metric, inch) = (of(false), of(true));
    let near = |a: f64, b: f64, what: &str| {
        assert!(
            (a - b).abs() <= 1e-9 * b.abs(),
            "{what}: {a} in mm, {b} in inches"
        );
    };
    near(metric.rate_n_per_mm.get(), inch.rate_n_per_mm.get(), "rate");
    near(
        metric.theory.full_load_n.get(),
        inch.theory.full_load_n.get(),
        "Fn",
    );
    near(
        metric.theory.rate_standard_uncertainty.get(),
        inch.theory.rate_standard_uncertainty.get(),
        "u(R)",
    );
    for (a, b) in metric.members.iter().zip(&inch.members) {
        near(a.index.get(), b.index.get(), "w");
        near(a.solid_length_mm.get(), b.solid_length_mm.get(), "Lc");
        near(a.smallest_length_mm.get(), b.smallest_length_mm.get(), "Ln");
        if let (Some(a), Some(b)) = (a.load_n, b.load_n) {
            near(a.get(), b.get(), "F");
        }
    }
    for (a, b) in metric.strength.iter().zip(&inch.strength) {
        near(a.stress_mpa.get(), b.stress_mpa.get(), "stress");
        near(a.limit_mpa.get(), b.limit_mpa.get(), "limit");
    }
    assert_eq!(metric.strength.len(), inch.strength.len());
    metric
}

pub(crate) fn at_load(newtons: f64) -> Ask {
    Ask::Load(Newtons::try_from(newtons).unwrap())
}

pub(crate) fn at_length(millimetres: f64) -> Ask {
    Ask::Length(Millimetres::try_from(millimetres).unwrap())
}
