//! Tolerances by Machinery's Handbook through a drawing, in both unit systems; what the drawing states itself wins.

use coilassay::job::Ask;
use coilassay::record::Expected;

use crate::drawn::{INCH, LBF, Spring, expected, text};
use crate::published::Misses;

const NAMED: &str = "standard = \"Machinery's Handbook\"";

/// d 0.125 in, D 0.75 in (w 6), 4 coils on 2 in (2 to the inch): table 8 gives 0.015·2 = ±0.030 in, table 11 at 0.50 in 8 %.
fn end_to_end(in_inches: bool, general: bool, load_more: &str) -> miette::Result<Expected> {
    let (length, force) = if in_inches { (INCH, LBF) } else { (1.0, 1.0) };
    let drawn = Spring::mean(3.175, 19.05, 4.0, 50.8, Err(79_290.0));
    let own = if general { "" } else { NAMED };
    let comma = if general { "" } else { ", " };
    let more = format!(
        "[requirements]\nfree_length = {{ nominal = {}{comma}{own} }}\nsquareness = {{ {NAMED} }}\n[[requirements.load]]\nat_length = {}\nnominal = {}\n{}\n",
        50.8 / length,
        1.5 * INCH / length,
        462.5 / force,
        if load_more.is_empty() { own } else { load_more },
    );
    let mut file = text("single", &[drawn], in_inches, &more);
    if general {
        file = file.replace(
            "number = \"X\"",
            "number = \"X\"\ntolerances_by = \"Machinery's Handbook\"",
        );
        let bare = format!("mean_diameter = {}\n", 19.05 / length);
        assert!(file.contains(&bare));
        let stated = format!(
            "mean_diameter = {{ nominal = {}, tolerance = {} }}\n",
            19.05 / length,
            0.2 / length
        );
        file = file.replace(&bare, &stated);
    }
    expected(&file, Ask::Drawing)
}

#[test]
fn a_drawing_in_millimetres_and_in_inches() {
    let mut misses = Misses::default();
    for (in_inches, general) in [(false, false), (true, false), (false, true), (true, true)] {
        let source = format!("inches {in_inches}, general {general}");
        let of = end_to_end(in_inches, general, "")
            .unwrap_or_else(|fault| panic!("{source}: {fault:?}"));
        let one = |name: &str| of.requirements.iter().find(|one| one.name == name).unwrap();
        let (load, free) = (one("load"), one("free_length"));
        misses.absolute(&source, load.upper.unwrap().get(), 462.5 * 1.08, 1e-6);
        misses.absolute(&source, load.lower.unwrap().get(), 462.5 * 0.92, 1e-6);
        misses.absolute(
            &source,
            free.upper.unwrap().get(),
            50.8 + 0.030 * INCH,
            1e-9,
        );
        // Table 10, index 6: 2.5° at L0/D 2.0 and at 3.0.
        let lean = one("squareness").upper.unwrap().get();
        misses.absolute(&source, lean, 50.8 * 2.5_f64.to_radians().tan(), 1e-9);
        let said = load.standard.as_deref();
        assert_eq!(
            said,
            Some("Machinery's Handbook, 31st ed., tables 8 and 11"),
            "{source}"
        );
        assert!(of.agrees, "{source}: {:?}", of.findings);
    }
    misses.none();
}

#[test]
fn what_the_drawing_states_wins_over_the_handbook() {
    let of = end_to_end(false, true, "tolerance = \"5 %\"").unwrap();
    let load = of
        .requirements
        .iter()
        .find(|one| one.name == "load")
        .unwrap();
    assert!(load.standard.is_none() && (load.upper.unwrap().get() - 462.5 * 1.05).abs() < 1e-9);
    let both = format!("tolerance = \"5 %\"\n{NAMED}");
    let fault = format!("{:?}", end_to_end(false, false, &both).unwrap_err());
    assert!(
        fault.contains("at once") && fault.contains("line "),
        "{fault}"
    );
    let sample = |changes: &[(&str, &str)]| crate::standards_drawn::sample(changes);
    for (changes, said) in [
        (
            vec![
                (
                    "arrangement = \"single\"",
                    "arrangement = \"single\"\ntolerances_by = \"Machinery's Handbook\"",
                ),
                ("{ nominal = 36.0, tolerance = 0.4 }", "36.0"),
            ],
            "no tolerance for the coil diameter",
        ),
        (
            vec![(
                "nominal = 10.6, tolerance = \"5 %\"",
                "nominal = 10.6, standard = \"Machinery's Handbook\"",
            )],
            "no tolerance for the rate",
        ),
        (
            vec![(
                "at_length = 70.0\nnominal = 212.0\ntolerance = \"8 %\"",
                "at_length = 89.0\nnominal = 10.6\nstandard = \"Machinery's Handbook\"",
            )],
            "prints no load tolerance",
        ),
    ] {
        let fault = format!(
            "{:?}",
            expected(&sample(&changes), Ask::Drawing).unwrap_err()
        );
        assert!(
            fault.contains(said) && fault.contains("line "),
            "{said}: {fault}"
        );
    }
}
