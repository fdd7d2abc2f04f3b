//! What a drawing makes of a standard: what it states itself wins, what the standard does not give is refused.

use coilassay::job::Ask;

use crate::drawn::expected;

pub(crate) fn sample(changes: &[(&str, &str)]) -> String {
    let mut text = std::fs::read_to_string("samples/accepted/tg-204.toml").unwrap();
    for (from, to) in changes {
        assert!(text.contains(from), "`{from}` is not there");
        text = text.replacen(from, to, 1);
    }
    text
}

const GENERAL: (&str, &str) = (
    "arrangement = \"single\"",
    "arrangement = \"single\"\ntolerances_by = \"EN 15800\"",
);

#[test]
fn what_the_drawing_states_wins() {
    // The first load has no tolerance of its own any more, the second keeps ±8 %.
    let of = expected(
        &sample(&[
            GENERAL,
            ("nominal = 212.0\ntolerance = \"8 %\"", "nominal = 212.0"),
        ]),
        Ask::Drawing,
    )
    .unwrap();
    let [first, second] = &of
        .requirements
        .iter()
        .filter(|one| one.name == "load")
        .collect::<Vec<_>>()[..]
    else {
        panic!()
    };
    assert_eq!(first.standard.as_deref(), Some("EN 15800 grade 2"));
    assert!(second.standard.is_none());
    assert!((second.upper.unwrap().get() - 403.0 * 1.08).abs() < 1e-9);
    // The drawn sizes too: De 36 ± 0.4 as stated against ± 0.50 (D 32, w 8), which widens theory's uncertainty.
    let u = |changes: &[(&str, &str)]| {
        expected(&sample(changes), Ask::Drawing)
            .unwrap()
            .theory
            .rate_standard_uncertainty
            .get()
    };
    let bare = ("{ nominal = 36.0, tolerance = 0.4 }", "36.0");
    let named = (
        "{ nominal = 36.0, tolerance = 0.4 }",
        "{ nominal = 36.0, standard = \"EN 15800 grade 2\" }",
    );
    assert!((u(&[GENERAL]) - u(&[])).abs() < 1e-12);
    assert!(u(&[GENERAL, bare]) > u(&[]) && u(&[bare]) < u(&[]));
    assert!((u(&[GENERAL, bare]) - u(&[named])).abs() < 1e-12);
}

#[test]
fn what_a_standard_does_not_give_is_refused_at_its_place() {
    for (changes, said) in [
        (
            vec![(
                "nominal = 10.6, tolerance = \"5 %\"",
                "nominal = 10.6, standard = \"EN 15800 grade 2\"",
            )],
            "two loads imply it",
        ),
        (
            vec![(
                "nominal = 10.6, tolerance = \"5 %\"",
                "nominal = 10.6, tolerance = \"5 %\", standard = \"EN 15800 grade 2\"",
            )],
            "at once",
        ),
        (
            vec![(
                "nominal = 212.0\ntolerance = \"8 %\"",
                "standard = \"EN 15800 grade 2\"",
            )],
            "needs the nominal value",
        ),
        (
            vec![(
                "nominal = 212.0\ntolerance = \"8 %\"",
                "nominal = 212.0\nstandard = \"EN 15800 grade 4\"",
            )],
            "one of: EN 15800 grade 1",
        ),
        (
            vec![
                (
                    "nominal = 212.0\ntolerance = \"8 %\"",
                    "nominal = 212.0\nstandard = \"EN 15800\"",
                ),
                ("nominal = 36.0", "nominal = 19.0"),
            ],
            "covers 4 to 20",
        ),
        (
            vec![("maximum = 38.4", "nominal = 38.4, standard = \"EN 15800\"")],
            "no tolerance for solid length",
        ),
        (
            vec![(
                "tolerance = 0.4 }",
                "tolerance = 0.4, standard = \"EN 15800\" }",
            )],
            "at once",
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
    let nested = std::fs::read_to_string("samples/nested/tg-350.toml").unwrap();
    let file = nested.replace(
        "nominal = 386.0\ntolerance = 35.0",
        "nominal = 386.0\nstandard = \"EN 15800\"",
    );
    let fault = format!("{:?}", expected(&file, Ask::Drawing).unwrap_err());
    assert!(fault.contains("this drawing has several"), "{fault}");
}
