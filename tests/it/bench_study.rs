//! The repeatability study: the AIAG data set against its printed figures, the identities of the analysis, and an
//! analysis by hand.

use coilassay::bench::{Crossed, Model, Observation, analyse, average_and_range, categories};
use proptest::prelude::*;

use crate::published::{Misses, rows};

fn observation(part: &str, operator: &str, trial: &str, value: f64) -> Observation {
    Observation {
        part: part.to_owned(),
        operator: operator.to_owned(),
        trial: trial.to_owned(),
        value,
    }
}

/// The AIAG data set; see the fixture's head.
fn aiag() -> Crossed {
    let observations: Vec<Observation> = rows("grr_aiag.csv")
        .iter()
        .map(|row| observation(&row[2], &row[0], &row[1], row[3].parse().unwrap()))
        .collect();
    Crossed::new(&observations).unwrap()
}

/// Half a unit of the last printed digit.
fn digits(misses: &mut Misses, source: &str, got: f64, printed: &str) {
    let places = printed
        .split_once('.')
        .map_or(0, |(_, places)| places.len());
    let within = 0.5 * 10_f64.powi(-i32::try_from(places).unwrap()) * (1.0 + 1e-9);
    misses.absolute(source, got, printed.parse().unwrap(), within);
}

/// AIAG, Measurement Systems Analysis, crossed study 10 × 3 × 3: the table of the analysis of variance (from memory,
/// recomputed outside Rust).
#[test]
fn the_table_of_the_published_study() {
    let table = analyse(&aiag());
    let (operator, interaction) = (table.operator.unwrap(), table.interaction.unwrap());
    let mut misses = Misses::default();
    let rows = [
        ("part", table.part, "88.3619", 9.0),
        ("operator", operator, "3.1673", 2.0),
        ("part × operator", interaction, "0.3590", 18.0),
        ("repeats", table.error, "2.7589", 60.0),
        ("total", table.total, "94.6471", 89.0),
    ];
    for (name, effect, sum, dof) in rows {
        digits(&mut misses, name, effect.sum, sum);
        misses.absolute(name, effect.dof, dof, 0.0);
    }
    digits(&mut misses, "F part", table.part.f.unwrap(), "492.291");
    digits(&mut misses, "F operator", operator.f.unwrap(), "79.406");
    digits(
        &mut misses,
        "F interaction",
        interaction.f.unwrap(),
        "0.434",
    );
    digits(
        &mut misses,
        "p interaction",
        interaction.p.unwrap(),
        "0.974",
    );
    misses.none();
}

/// The components of both models, the same source; the negative interaction is set to 0.
#[test]
fn the_components_of_the_published_study() {
    let table = analyse(&aiag());
    assert_eq!(table.model, Model::Pooled);
    let pooled = *table.components();
    let mut misses = Misses::default();
    let variances = [
        ("repeatability", pooled.repeatability.variance(), "0.03997"),
        ("reproducibility", pooled.reproducibility(), "0.05146"),
        (
            "repeatability and reproducibility",
            pooled.within(),
            "0.09143",
        ),
        ("part", pooled.part.variance(), "1.08645"),
        ("total", pooled.total(), "1.17788"),
        (
            "contribution, %",
            100.0 * pooled.within() / pooled.total(),
            "7.76",
        ),
        (
            "study variation, %",
            100.0 * (pooled.within() / pooled.total()).sqrt(),
            "27.86",
        ),
        (
            "full: repeatability",
            table.full.repeatability.variance(),
            "0.045982222",
        ),
        (
            "full: operator",
            table.full.operator.unwrap().variance(),
            "0.052122922",
        ),
        ("full: part", table.full.part.variance(), "1.088672140"),
        (
            "full: interaction",
            table.full.interaction.unwrap().raw,
            "-0.008680",
        ),
    ];
    for (name, got, printed) in variances {
        digits(&mut misses, name, got, printed);
    }
    misses.none();
    assert!(table.full.interaction.unwrap().variance().abs() < f64::EPSILON);
    let number = categories(pooled.part.variance().sqrt(), pooled.within().sqrt());
    assert_eq!(number, Some(4), "4.875, truncated");
}

/// The same study by nested least squares outside Rust (`tests/independent/study.py`, numpy, run by hand), to 9 digits.
#[test]
fn an_independent_analysis_agrees() {
    let path = std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/independent/study.txt");
    let text = std::fs::read_to_string(path).unwrap();
    let table = analyse(&aiag());
    let (full, pooled) = (table.full, table.pooled.unwrap());
    let of = |component: Option<coilassay::bench::Component>| component.unwrap().raw;
    let ours = [
        ("sum part", table.part.sum),
        ("sum operator", table.operator.unwrap().sum),
        ("sum interaction", table.interaction.unwrap().sum),
        ("sum error", table.error.sum),
        ("sum total", table.total.sum),
        ("pooled repeatability", pooled.repeatability.raw),
        ("pooled operator", of(pooled.operator)),
        ("pooled part", pooled.part.raw),
        ("full repeatability", full.repeatability.raw),
        ("full interaction", of(full.interaction)),
        ("full operator", of(full.operator)),
        ("full part", full.part.raw),
    ];
    assert_eq!(text.lines().count(), ours.len());
    let mut misses = Misses::default();
    for (line, (name, got)) in text.lines().zip(ours) {
        let (told, figure) = line.rsplit_once(' ').unwrap();
        assert_eq!(told, name);
        misses.relative(name, got, figure.parse().unwrap(), 5e-10);
    }
    misses.none();
}

/// The same data by average and range (AIAG, printed with factors of four digits, hence 2e-4).
#[test]
fn average_and_range_of_the_published_study() {
    let found = average_and_range(&aiag()).unwrap();
    let mut misses = Misses::default();
    digits(&mut misses, "mean range", found.mean_range, "0.341667");
    digits(
        &mut misses,
        "operators' range",
        found.operator_range.unwrap(),
        "0.444667",
    );
    digits(&mut misses, "parts' range", found.part_range, "3.511111");
    for (name, got, printed) in [
        ("EV", found.repeatability, 0.201_86),
        ("AV", found.reproducibility, 0.229_67),
        ("GRR", found.within(), 0.305_77),
        ("PV", found.part, 1.104_60),
        ("TV", found.total(), 1.146_13),
        ("% GRR", 100.0 * found.within() / found.total(), 26.678),
    ] {
        misses.relative(name, got, printed, 2e-4);
    }
    misses.none();
}

/// AIAG's factors: K1 0.8862 and 0.5908 (2 and 3 trials), K2 0.7071 and 0.5231 (2 and 3 operators), K3 0.7071, 0.5231,
/// 0.4467, 0.4030, 0.3742, 0.3534, 0.3375, 0.3249, 0.3146 (2 to 10 parts); AIAG MSA, from memory.
#[test]
fn the_factors_of_average_and_range() {
    let study = |parts: u32, operators: u32, trials: u32, value: &dyn Fn(u32, u32, u32) -> f64| {
        let mut all = Vec::new();
        for operator in 0..operators {
            for part in 0..parts {
                for trial in 0..trials {
                    let name = |n: u32| n.to_string();
                    let y = value(part, operator, trial);
                    all.push(observation(&name(part), &name(operator), &name(trial), y));
                }
            }
        }
        average_and_range(&Crossed::new(&all).unwrap()).unwrap()
    };
    let mut misses = Misses::default();
    for (trials, k1) in [(2, "0.8862"), (3, "0.5908")] {
        let last = f64::from(trials - 1);
        let found = study(5, 2, trials, &|_, _, trial| f64::from(trial) / last);
        digits(&mut misses, "K1", found.repeatability, k1);
    }
    for (operators, k2) in [(2, "0.7071"), (3, "0.5231")] {
        let last = f64::from(operators - 1);
        let found = study(5, operators, 2, &|_, operator, _| {
            f64::from(operator) / last
        });
        digits(&mut misses, "K2", found.reproducibility, k2);
    }
    let k3 = [
        "0.7071", "0.5231", "0.4467", "0.4030", "0.3742", "0.3534", "0.3375", "0.3249", "0.3146",
    ];
    for (parts, k3) in (2..).zip(k3) {
        let found = study(parts, 2, 2, &|part, _, _| {
            f64::from(part) / f64::from(parts - 1)
        });
        digits(&mut misses, "K3", found.part, k3);
    }
    misses.none();
}

/// By hand, 2 parts × 2 operators × 2 trials. Cells (mean): A1 10, 12 (11); A2 20, 22 (21); B1 13, 15 (14); B2 25, 27 (26).
/// Grand mean 18; part means 12.5, 23.5: SS 4·2·5.5² = 242; operator means 16, 20: SS 4·2·2² = 32; interaction: each cell
/// leaves ±0.5: SS 2·4·0.25 = 2; repeats: four cells of 1² + 1²: 8; total 284.
/// Mean squares 242, 32, 2, 2 (dof 4): interaction F = 1, p = 0.374 (t of 4 at 1, two-sided: 0.3739), so pooled:
/// (2 + 8)/5 = 2; operator (32 − 2)/4 = 7.5; part (242 − 2)/4 = 60.
#[test]
fn an_analysis_by_hand() {
    let values = [
        ("1", "A", [10.0, 12.0]),
        ("2", "A", [20.0, 22.0]),
        ("1", "B", [13.0, 15.0]),
        ("2", "B", [25.0, 27.0]),
    ];
    let all: Vec<Observation> = values
        .iter()
        .flat_map(|(part, operator, two)| {
            let mut trial = 0;
            two.map(|value| {
                trial += 1;
                observation(part, operator, &trial.to_string(), value)
            })
        })
        .collect();
    let table = analyse(&Crossed::new(&all).unwrap());
    let mut misses = Misses::default();
    let sums = [
        (table.part, 242.0),
        (table.operator.unwrap(), 32.0),
        (table.interaction.unwrap(), 2.0),
        (table.error, 8.0),
        (table.total, 284.0),
    ];
    for (effect, sum) in sums {
        misses.absolute("sum", effect.sum, sum, 1e-12);
    }
    misses.absolute("p", table.interaction.unwrap().p.unwrap(), 0.3739, 5e-5);
    let components = table.components();
    misses.absolute("repeats", components.repeatability.variance(), 2.0, 1e-12);
    misses.absolute(
        "operator",
        components.operator.unwrap().variance(),
        7.5,
        1e-12,
    );
    misses.absolute("part", components.part.variance(), 60.0, 1e-12);
    misses.absolute("dof", table.repeatability_dof(), 5.0, 0.0);
    misses.none();
    // One operator only: parts 11 and 21 with repeats of variance 2: (2·2·25 − 2)/2 = 49.
    let one: Vec<Observation> = all.into_iter().filter(|one| one.operator == "A").collect();
    let table = analyse(&Crossed::new(&one).unwrap());
    assert!((table.components().part.variance() - 49.0).abs() < 1e-12);
    assert!(table.operator.is_none() && table.components().operator.is_none());
}

#[test]
fn what_is_no_crossed_study_is_refused() {
    let full = || {
        vec![
            observation("1", "A", "1", 1.0),
            observation("1", "A", "2", 1.1),
            observation("2", "A", "1", 2.0),
            observation("2", "A", "2", 2.1),
        ]
    };
    let said = |all: &[Observation]| Crossed::new(all).unwrap_err().to_string();
    assert!(Crossed::new(&full()).is_ok());
    assert_eq!(
        said(&full()[..3]),
        "part `2`, operator `A` has 1 trials where the others have 2"
    );
    assert_eq!(
        said(&full()[..2]),
        "the study has 1 springs where at least two are wanted"
    );
    let mut twice = full();
    twice[3].trial = "1".to_owned();
    assert_eq!(
        said(&twice),
        "trial `1` of part `2` by operator `A` stands twice"
    );
    let single = [full()[0].clone(), full()[2].clone()];
    assert!(said(&single).contains("1 trials of each spring"));
    assert!(said(&[]).contains("0 springs"));
}

/// Studies of 2 to 5 parts, 1 to 3 operators, 2 to 3 trials.
fn studies() -> impl Strategy<Value = Crossed> {
    (2_usize..6, 1_usize..4, 2_usize..4).prop_flat_map(|(parts, operators, trials)| {
        let values = prop::collection::vec(-50.0..50.0_f64, parts * operators * trials);
        values.prop_map(move |values| {
            let place = |n: usize| (n % parts, n / parts % operators, n / parts / operators);
            let all: Vec<Observation> = values
                .iter()
                .enumerate()
                .map(|(n, value)| {
                    let (part, operator, trial) = place(n);
                    observation(
                        &part.to_string(),
                        &operator.to_string(),
                        &trial.to_string(),
                        *value,
                    )
                })
                .collect();
            Crossed::new(&all).unwrap()
        })
    })
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(200))]

    /// Sums of squares and degrees of freedom add up; nothing depends on where zero is; a scale scales.
    #[test]
    fn the_table_adds_up(study in studies(), shift in -1e4..1e4_f64, scale in 0.1..10.0_f64) {
        let table = analyse(&study);
        let sum: f64 = [Some(table.part), table.operator, table.interaction, Some(table.error)]
            .into_iter().flatten().map(|effect| effect.sum).sum();
        let dof: f64 = [Some(table.part), table.operator, table.interaction, Some(table.error)]
            .into_iter().flatten().map(|effect| effect.dof).sum();
        prop_assert!((sum - table.total.sum).abs() <= 1e-9 * table.total.sum);
        prop_assert!((dof - table.total.dof).abs() < 1e-12);
        let mut moved = study.clone();
        for cell in &mut moved.cells {
            for value in &mut cell.values {
                *value = (*value + shift) * scale;
            }
        }
        let again = analyse(&moved);
        let wanted = table.components().within() * scale * scale;
        prop_assert!(again.model == table.model);
        prop_assert!((again.components().within() - wanted).abs() <= 1e-6 * wanted.max(1e-9));
        let ranges = (average_and_range(&study).unwrap(), average_and_range(&moved).unwrap());
        prop_assert!((ranges.1.within() - ranges.0.within() * scale).abs() <= 1e-6 * ranges.0.within().max(1e-9));
    }
}
