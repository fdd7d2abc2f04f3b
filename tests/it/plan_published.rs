//! The plan tables against ISO 2859-1 / MIL-STD-105E, every letter and every cell.

use coilassay::lot::{
    Aql, Arrow, CodeLetter, Level, PlanError, SinglePlan, normal_single, probability_of_acceptance,
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

fn plan(letter: &str, aql: f64) -> SinglePlan {
    let (lot, level) = lot_for(letter);
    normal_single(lot, level, Aql::try_from(aql).unwrap()).unwrap()
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
fn every_cell_of_normal_inspection() {
    let mut wrong = Vec::new();
    let table = rows("iso2859_normal.csv");
    for row in &table {
        let got = plan(&row[0], row[1].parse().unwrap());
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
            wrong.push(format!("got {got}, want {}", row.join(",")));
        }
    }
    assert!(wrong.is_empty(), "{wrong:#?}");
    assert_eq!(table.len(), 16 * 16);
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
    let usual = normal_single(1200, Level::II, Aql::try_from(1.0).unwrap()).unwrap();
    assert_eq!((usual.printed_letter.get(), usual.sample_size), ('J', 80));
}

#[test]
fn operating_characteristic_at_the_aql() {
    #[rustfmt::skip]
    const ROWS: [(u32, f64, f64); 9] = [ // Ac, least and largest Pa(AQL) along the diagonal: own, scipy, four digits
        (0, 0.8742, 0.8869), (1, 0.9037, 0.9185), (2, 0.9508, 0.9619), (3, 0.9570, 0.9674), (5, 0.9820, 0.9887),
        (7, 0.9821, 0.9887), (10, 0.9826, 0.9912), (14, 0.9809, 0.9903), (21, 0.9862, 0.9943),
    ];
    let table = rows("iso2859_normal.csv");
    let mut misses = Misses::default();
    for (accept, least, largest) in ROWS {
        let chances: Vec<f64> = table
            .iter()
            .filter(|row| row[2] == "plan" && row[5] == accept.to_string())
            .map(|row| {
                let aql: f64 = row[1].parse().unwrap();
                probability_of_acceptance(&plan(&row[0], aql), aql / 100.0).unwrap()
            })
            .collect();
        let low = chances.iter().copied().fold(f64::NAN, f64::min);
        let high = chances.iter().copied().fold(f64::NAN, f64::max);
        misses.absolute(&format!("Ac {accept}, least"), low, least, 5e-5);
        misses.absolute(&format!("Ac {accept}, largest"), high, largest, 5e-5);
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
        let refused = normal_single(found, Level::II, aql);
        assert_eq!(refused, Err(PlanError::LotTooSmall { found }));
    }
    assert!(normal_single(2, Level::II, aql).is_ok());
    for found in [0.0, 0.9, 15.0, -1.0, f64::NAN, f64::INFINITY] {
        let fault = Aql::try_from(found).unwrap_err().to_string();
        assert!(fault.contains("0.65, 1, 1.5, 2.5"), "{fault}");
    }
    assert_eq!(Aql::all().count(), 16);
    assert!(probability_of_acceptance(&plan("F", 0.65), 1.1).is_err());
}
