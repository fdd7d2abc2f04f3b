//! A table of materials of the user's own, beside the drawing.

use assert_cmd::Command;
use serde_json::Value;

use crate::drawing_tests::{changed, sample};

/// A table of the user's own, beside the drawing: its figures are used, its source is named, it stands in the provenance.
#[test]
fn a_table_of_ones_own() {
    let own = "[[material]]\nname = \"Works wire 7\"\nkind = \"cold drawn\"\nshear_modulus = { nominal = 80000, tolerance = 400 }\n\
               youngs_modulus = 200000\ndensity = 7.85\nsource = \"certificate 12\"\n\
               minimum_strength = [{ up_to_diameter = 3.0, strength = 1800 }, { up_to_diameter = 5.0, strength = 1700 }]\n";
    let run = |own: &str, material: &str| {
        let folder = tempfile::tempdir().unwrap();
        let text = changed(
            sample(),
            &[
                ("EN 10270-1 SH", material),
                (
                    "arrangement = \"single\"",
                    "arrangement = \"single\"\nmaterials = \"own.toml\"",
                ),
            ],
        );
        std::fs::write(folder.path().join("drawing.toml"), text).unwrap();
        std::fs::write(folder.path().join("own.toml"), own).unwrap();
        let output = Command::cargo_bin("coilassay")
            .unwrap()
            .args(["expect", "--json"])
            .arg(folder.path().join("drawing.toml"))
            .output()
            .unwrap();
        let text = |bytes: Vec<u8>| String::from_utf8(bytes).unwrap();
        (
            output.status.code(),
            text(output.stdout),
            text(output.stderr),
        )
    };
    let (code, out, fault) = run(own, "Works wire 7");
    assert_eq!(code, Some(0), "{fault}");
    let found: Value = serde_json::from_str(&out).unwrap();
    let member = &found["theory"]["members"][0];
    assert_eq!(member["shear_modulus_mpa"], 80_000.0);
    assert_eq!(member["shear_modulus_source"], "certificate 12");
    assert_eq!(found["provenance"]["inputs"][1]["role"], "materials");
    assert_eq!(found["strength"][0]["strength_mpa"], 1700.0);
    let (code, _, fault) = run(own, "Works wire 8");
    assert_eq!(code, Some(2));
    assert!(fault.contains("Works wire 7"), "{fault}");
    for (wrong, said) in [
        (own.replace("Works wire 7", "EN 10270-1"), "built-in table"),
        (
            own.replace("source = \"certificate 12\"\n", ""),
            "`source` is missing",
        ),
        (
            own.replace("up_to_diameter = 3.0", "up_to_diameter = 6.0"),
            "do not grow",
        ),
        (own.replace("density", "densitie"), "did you mean `density`"),
    ] {
        let (code, _, fault) = run(&wrong, "Works wire 7");
        assert_eq!(code, Some(2), "{said}");
        assert!(
            fault.contains(said) && fault.contains("own.toml"),
            "{said}: {fault}"
        );
    }
}
