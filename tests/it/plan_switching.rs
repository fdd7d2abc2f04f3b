//! Zero-accept plans and the switching rules, against published values.

use coilassay::sampling::{Outcome, PastLot, Reason, State, next, zero_accept};

use crate::published::Misses;

#[test]
fn zero_accept_plans() {
    #[rustfmt::skip]
    const ROWS: [(u64, f64, f64, u64, u64, f64); 5] = [ // lot, LQ, risk, marked, n, chance: own, exact
        (50, 0.10, 0.10, 5, 18, 0.095_044_271_2), (100, 0.05, 0.10, 5, 37, 0.093_360_054_9), (500, 0.02, 0.10, 10, 102, 0.099_762_665_8),
        (1000, 0.01, 0.05, 10, 258, 0.049_795_803_3), (1200, 0.04, 0.10, 48, 56, 0.096_207_406_3),
    ];
    let mut misses = Misses::default();
    for (lot, quality, risk, marked, n, chance) in ROWS {
        let found = zero_accept(lot, quality, risk).unwrap();
        assert_eq!(
            (found.nonconforming, found.sample_size),
            (marked, n),
            "{lot}"
        );
        misses.absolute(&format!("{lot}"), found.accepted, chance, 5.1e-11);
    }
    misses.none();
    // ⌈100·0.07⌉ is 7 although the product is 7.000000000000001; less than one spring is one
    assert_eq!(zero_accept(100, 0.07, 0.1).unwrap().nonconforming, 7);
    assert_eq!(zero_accept(20, 0.001, 0.1).unwrap().nonconforming, 1);
    assert!(zero_accept(1, 0.1, 0.1).is_err());
    for absurd in [0.0, 1.0, -0.1, f64::NAN] {
        assert!(zero_accept(100, absurd, 0.1).is_err() && zero_accept(100, 0.1, absurd).is_err());
    }
}

fn lots(words: &str) -> Vec<PastLot> {
    words
        .split_whitespace()
        .enumerate()
        .map(|(number, word)| PastLot {
            date: jiff::civil::date(2026, 1, 1),
            lot: (number + 1).to_string(),
            outcome: match word {
                "a" | "t" | "0" => Outcome::Accepted,
                "r" => Outcome::Rejected,
                "!" => Outcome::Resumed,
                _ => Outcome::Undecided,
            },
            accept: if word == "0" { 0 } else { 2 },
            accepted_tighter: Some(word == "t"),
        })
        .collect()
}

/// ISO 2859-1:1999 clause 9. a accepted with Ac 2 but not one step tighter, t also tighter, 0 accepted with Ac 0,
/// r rejected, u undecided, ! resumed.
#[test]
fn switching() {
    let state = |words: &str, agreed: bool| next(&lots(words), State::Normal, agreed);
    #[rustfmt::skip]
    let rows: [(&str, bool, State); 21] = [
        ("", false, State::Normal),
        ("r a a a a", false, State::Normal),
        ("r a a a r", false, State::Tightened), // two of five
        ("r a a a a r", false, State::Normal), // the first is out of the five
        ("r r", false, State::Tightened),
        ("r u r", false, State::Tightened),
        ("r r a a a a", false, State::Tightened),
        ("r r a a a a a", false, State::Normal), // five in a row
        ("r r a a a u a a", false, State::Tightened), // an undecided lot breaks the row
        ("r r a a a a a r", false, State::Normal), // counting begins anew
        ("r r a a a a a r r", false, State::Tightened),
        ("t t t t t t t t t t", true, State::Reduced), // 10 × 3
        ("t t t t t t t t t t", false, State::Normal), // not agreed
        ("t t t t t t t t t", true, State::Normal),
        ("t t t t t a t t t t t t", true, State::Normal), // not one step tighter: 0
        ("0 0 0 0 0 0 0 0 0 0 0 0 0 0 0", true, State::Reduced), // 15 × 2
        ("0 0 0 0 0 0 0 0 0 0 0 0 0 0", true, State::Normal),
        ("t t t t t t t t t t a a a", true, State::Reduced),
        ("t t t t t t t t t t r", true, State::Normal),
        ("t t t t t t t t t t u", true, State::Normal),
        ("r r r r r r r a a a a a a", false, State::Tightened), // discontinued, and stays so
    ];
    for (words, agreed, wanted) in rows {
        assert_eq!(state(words, agreed).state, wanted, "{words}");
    }
    assert!(
        matches!(state("r r r a r r r r", false).reason, Reason::Discontinued { lot } if lot == "8")
    );
    assert!(
        matches!(state("r r r r r r r", false).reason, Reason::Discontinued { lot } if lot == "7")
    );
    assert!(matches!(
        state("r r r r r r r !", false).reason,
        Reason::Resumed { .. }
    ));
    assert_eq!(
        state("r r r r r r r ! a a a a a", false).state,
        State::Normal
    );
    assert!(
        matches!(state("a ! a", false).reason, Reason::Stays { score: 0 }),
        "nothing to resume"
    );
    let begun = next(&lots("a a a a a"), State::Tightened, false);
    assert!(matches!(begun.reason, Reason::FiveAccepted { lot } if lot == "5"));
}
