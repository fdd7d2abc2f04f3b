//! The plan tables against ISO 2859-1 / MIL-STD-105E, every letter and every cell.

use coilassay::sampling::{
    Aql, Arrow, CodeLetter, Level, PlanError, SinglePlan, State, probability_of_acceptance, single,
    tighter,
};

use crate::published::{Misses, rows};

/// A lot size and level that give each letter.
fn lot_for(letter: &str) -> (u64, Level) {
    for row in rows("iso2859_letters.csv") {
        for (level, cell) in Level::WORDS
            .map(|(_, level)| level)
            .into_iter()
            .zip(&row[2..])
        {
            if cell == letter {
                return (row[0].parse().unwrap(), level);
            }
        }
    }
    panic!("no lot size gives letter {letter}");
}

fn plan_in(state: State, letter: &str, aql: f64) -> SinglePlan {
    let (lot, level) = lot_for(letter);
    single(lot, level, Aql::try_from(aql).unwrap(), state).unwrap()
}

fn plan(letter: &str, aql: f64) -> SinglePlan {
    plan_in(State::Normal, letter, aql)
}

#[test]
fn every_code_letter_at_both_ends_of_its_row() {
    let mut wrong = Vec::new();
    let mut seen = 0;
    for row in rows("iso2859_letters.csv") {
        let from: u64 = row[0].parse().unwrap();
        let to: u64 = row[1].parse().unwrap_or(u64::MAX);
        for (level, letter) in Level::WORDS
            .map(|(_, level)| level)
            .into_iter()
            .zip(&row[2..])
        {
            for lot in [from, to] {
                seen += 1;
                let got = CodeLetter::of(lot, level).unwrap();
                if got.to_string() != *letter {
                    wrong.push(format!(
                        "lot {lot}, level {level:?}: got {got}, want {letter}"
                    ));
                }
            }
        }
    }
    assert!(wrong.is_empty(), "{wrong:#?}");
    assert_eq!(seen, 15 * 7 * 2);
}

#[test]
fn every_cell_of_every_state() {
    let mut wrong = Vec::new();
    let mut seen = 0;
    for (state, table) in [
        (State::Normal, "iso2859_normal.csv"),
        (State::Tightened, "iso2859_tightened.csv"),
        (State::Reduced, "iso2859_reduced.csv"),
    ] {
        for row in rows(table).iter().filter(|row| row[0] != "S") {
            seen += 1;
            let got = plan_in(state, &row[0], row[1].parse().unwrap());
            let arrow = match got.arrow {
                Arrow::None => "plan",
                Arrow::Down => "down",
                Arrow::Up => "up",
            };
            let got = format!(
                "{},{},{arrow},{},{},{},{}",
                got.printed_letter, row[1], got.letter, got.sample_size, got.accept, got.reject
            );
            if got != row.join(",") {
                wrong.push(format!("{table}: got {got}, want {}", row.join(",")));
            }
        }
    }
    assert!(wrong.is_empty(), "{wrong:#?}");
    assert_eq!(seen, 3 * 16 * 16);
    // The one cell of row S (no lot size gives that letter) is where the arrows of Q and R at 0.025 lead.
    let led = plan_in(State::Tightened, "Q", 0.025);
    assert_eq!(
        (led.letter.get(), led.sample_size, led.accept),
        ('S', 3150, 1)
    );
}

#[test]
fn anchors() {
    #[rustfmt::skip]
    const ROWS: [(&str, f64, Arrow, u32, u32, u32); 6] = [ // ISO 2859-1:1999 Table 2-A, from a published text
        ("J", 1.0, Arrow::None, 80, 2, 3),
        ("K", 1.0, Arrow::None, 125, 3, 4),
        ("H", 1.0, Arrow::None, 50, 1, 2),
        ("G", 1.0, Arrow::Down, 50, 1, 2),
        ("F", 1.0, Arrow::Up, 13, 0, 1),
        ("L", 10.0, Arrow::Up, 125, 21, 22),
    ];
    for (letter, aql, arrow, n, accept, reject) in ROWS {
        let got = plan(letter, aql);
        let got = (got.arrow, got.sample_size, got.accept, got.reject);
        assert_eq!(got, (arrow, n, accept, reject), "{letter} at {aql}");
    }
    // Lot 1200, level II, AQL 1.0: letter J
    let usual = single(1200, Level::II, Aql::try_from(1.0).unwrap(), State::Normal).unwrap();
    assert_eq!((usual.printed_letter.get(), usual.sample_size), ('J', 80));
}

#[test]
fn operating_characteristic_at_the_aql() {
    #[rustfmt::skip]
    const ROWS: [(State, &str, u32, f64, f64); 17] = [ // Ac, least and largest Pa(AQL) along the diagonal: own, scipy
        (State::Normal, "iso2859_normal.csv", 0, 0.8742, 0.8869), (State::Normal, "iso2859_normal.csv", 1, 0.9037, 0.9185),
        (State::Normal, "iso2859_normal.csv", 2, 0.9508, 0.9619), (State::Normal, "iso2859_normal.csv", 3, 0.9570, 0.9674),
        (State::Normal, "iso2859_normal.csv", 5, 0.9820, 0.9887), (State::Normal, "iso2859_normal.csv", 7, 0.9821, 0.9887),
        (State::Normal, "iso2859_normal.csv", 10, 0.9826, 0.9912), (State::Normal, "iso2859_normal.csv", 14, 0.9809, 0.9903),
        (State::Normal, "iso2859_normal.csv", 21, 0.9862, 0.9943),
        (State::Tightened, "iso2859_tightened.csv", 0, 0.8100, 0.8290), (State::Tightened, "iso2859_tightened.csv", 1, 0.7946, 0.8273),
        (State::Tightened, "iso2859_tightened.csv", 2, 0.857, 0.881), (State::Tightened, "iso2859_tightened.csv", 3, 0.848, 0.880),
        (State::Tightened, "iso2859_tightened.csv", 5, 0.8895, 0.918), (State::Tightened, "iso2859_tightened.csv", 8, 0.919, 0.950),
        (State::Tightened, "iso2859_tightened.csv", 12, 0.931, 0.959), (State::Tightened, "iso2859_tightened.csv", 18, 0.931, 0.964),
    ];
    let mut misses = Misses::default();
    for (state, name, accept, least, largest) in ROWS {
        let chances: Vec<f64> = rows(name)
            .iter()
            .filter(|row| row[2] == "plan" && row[5] == accept.to_string() && row[0] != "S")
            .map(|row| {
                let aql: f64 = row[1].parse().unwrap();
                probability_of_acceptance(&plan_in(state, &row[0], aql), aql / 100.0).unwrap()
            })
            .collect();
        let low = chances.iter().copied().fold(f64::NAN, f64::min);
        let high = chances.iter().copied().fold(f64::NAN, f64::max);
        // four digits are printed for normal and the small Ac, three for the rest
        let within = if state == State::Normal || accept < 2 {
            5e-5
        } else {
            5e-4
        };
        misses.absolute(&format!("{name} Ac {accept}, least"), low, least, within);
        misses.absolute(
            &format!("{name} Ac {accept}, largest"),
            high,
            largest,
            within,
        );
    }
    misses.none();
    // By hand, F at AQL 0.65 is n 20, Ac 0: 0.98^20 at 2 %
    let chance = probability_of_acceptance(&plan("F", 0.65), 0.02).unwrap();
    approx::assert_relative_eq!(
        chance,
        0.98_f64.powi(20),
        epsilon = 0.0,
        max_relative = 1e-12
    );
}

#[test]
fn what_the_table_does_not_have_is_refused() {
    let aql = Aql::try_from(1.0).unwrap();
    for found in [0, 1] {
        let refused = single(found, Level::II, aql, State::Normal);
        assert_eq!(refused, Err(PlanError::LotTooSmall { found, least: 2 }));
    }
    assert!(single(2, Level::II, aql, State::Normal).is_ok());
    for found in [0.0, 0.9, 15.0, -1.0, f64::NAN, f64::INFINITY] {
        let fault = Aql::try_from(found).unwrap_err().to_string();
        assert!(fault.contains("0.65, 1, 1.5, 2.5"), "{fault}");
    }
    assert_eq!(Aql::all().count(), 16);
    assert!(probability_of_acceptance(&plan("F", 0.65), 1.1).is_err());
}

#[test]
fn one_step_tighter_is_the_column_to_the_left() {
    let all: Vec<f64> = Aql::all().map(Aql::get).collect();
    for pair in all.windows(2) {
        let found = tighter(Aql::try_from(pair[1]).unwrap()).map(Aql::get);
        assert_eq!(found, Some(pair[0]));
    }
    assert!(tighter(Aql::try_from(0.01).unwrap()).is_none());
}
