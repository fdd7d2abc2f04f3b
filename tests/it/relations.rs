//! Relations that hold whatever the truth is, on small generated lots through the whole of `accept`: order, threads
//! and blocks, limits widened, uncertainty raised, a failing spring more, the rule.

use std::fmt::Write;
use std::fs;

use coilassay::lot::Decision;
use coilassay::record::{AcceptRecord, SpringResult};
use coilassay::verdict::Verdict;
use proptest::prelude::*;

use crate::lots::{Lot, edit, rewrite, same};

/// How good a verdict is for the spring.
const fn good(verdict: Verdict) -> u8 {
    match verdict {
        Verdict::Fails => 0,
        Verdict::Undecided => 1,
        Verdict::Conforms => 2,
    }
}

const fn good_lot(decision: Decision) -> u8 {
    match decision {
        Decision::Rejected => 0,
        Decision::Undecided => 1,
        Decision::Accepted => 2,
    }
}

/// The whole record as `result.json` holds it, the lot file's own hash left out.
fn bytes(mut record: AcceptRecord) -> Vec<u8> {
    record.provenance.inputs.retain(|input| input.role != "lot");
    serde_json::to_vec(&record).unwrap()
}

/// Pairs of the judged characteristics of two records of the same springs.
fn pairs<'a>(
    a: &'a AcceptRecord,
    b: &'a AcceptRecord,
) -> impl Iterator<Item = (String, Verdict, Verdict)> + 'a {
    let of_spring = |(a, b): (&'a SpringResult, &'a SpringResult)| {
        let id = a.id.clone();
        let whole = (format!("spring {id}"), a.verdict, b.verdict);
        let each = a.characteristics.iter().zip(&b.characteristics);
        let each = each.filter_map(move |(x, y)| {
            Some((format!("spring {id}, {}", x.name), x.verdict?, y.verdict?))
        });
        std::iter::once(whole).chain(each)
    };
    a.springs.iter().zip(&b.springs).flat_map(of_spring)
}

/// All springs of the lot in one file, in the given order, the spring in a column.
fn in_one_file(lot: &Lot, order: &[u64]) {
    let mut all = "Spring,Travel,Load\n".to_owned();
    for spring in order {
        let text = fs::read_to_string(lot.export(*spring)).unwrap();
        for line in text.lines().skip(1) {
            writeln!(all, "{spring},{line}").unwrap();
        }
    }
    fs::write(lot.place().join("springs/all.csv"), all).unwrap();
    for spring in order {
        fs::remove_file(lot.export(*spring)).unwrap();
    }
    edit(
        &lot.rig(),
        &[("{ from = \"file name\" }", "{ column = \"Spring\" }")],
    );
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 32, failure_persistence: None, ..ProptestConfig::default() })]

    #[test]
    fn files_in_any_order_threads_and_blocks_give_the_same_bytes(
        seed in any::<u32>(), number in 1_u64..=4, order in Just(vec![1_u64, 2, 3, 4]).prop_shuffle(),
    ) {
        let lot = Lot::new(u64::from(seed), number);
        let first = bytes(lot.judge());
        for block in [1 << 10, 8 << 20] {
            prop_assert!(bytes(lot.judge_in_blocks(Some(block))) == first, "blocks of {}", block);
        }
        for threads in [1, 8] {
            let pool = rayon::ThreadPoolBuilder::new().num_threads(threads).build().unwrap();
            prop_assert!(pool.install(|| bytes(lot.judge())) == first, "{} threads", threads);
        }
        let names: Vec<String> = order.iter().map(|id| format!("\"springs/{id}.csv\"")).collect();
        edit(&lot.place().join("lot.toml"), &[("\"springs/*.csv\"", &names.join(", "))]);
        prop_assert!(bytes(lot.judge()) == first, "files in the order {:?}", order);
    }

    #[test]
    fn springs_of_one_file_in_any_order_give_the_same_figures(
        seed in any::<u32>(), number in 1_u64..=4, order in Just(vec![1_u64, 2, 3, 4]).prop_shuffle(),
    ) {
        let lot = Lot::new(u64::from(seed), number);
        let apart = lot.judge();
        in_one_file(&lot, &order);
        same("springs in one file", &apart, &lot.judge(), 0.0);
        for block in [1 << 10, 8 << 20] {
            same("one file in blocks", &apart, &lot.judge_in_blocks(Some(block)), 0.0);
        }
    }

    #[test]
    fn wider_limits_make_no_spring_worse(seed in any::<u32>(), number in 1_u64..=4, wider in 1.0..1.5_f64) {
        let lot = Lot::new(u64::from(seed), number);
        let before = lot.judge();
        let (low, high) = (90.2 - 0.9 * wider, 90.2 + 0.9 * wider);
        let tolerance = |half: f64| format!("tolerance = {:.6}", half * wider);
        edit(&lot.drawing(), &[
            ("tolerance = 0.32", &tolerance(0.32)),
            ("tolerance = 10.0", &tolerance(10.0)),
            ("tolerance = 18.0", &tolerance(18.0)),
            ("minimum = 89.3, maximum = 91.1", &format!("minimum = {low:.6}, maximum = {high:.6}")),
        ]);
        let after = lot.judge();
        for (what, narrow, wide) in pairs(&before, &after) {
            prop_assert!(good(wide) >= good(narrow), "{what}: {narrow:?} became {wide:?}");
        }
        prop_assert!(good_lot(after.decision) >= good_lot(before.decision));
    }

    #[test]
    fn more_uncertainty_decides_nothing(seed in any::<u32>(), number in 1_u64..=4, more in 1.0..3.0_f64) {
        let lot = Lot::new(u64::from(seed), number);
        let before = lot.judge();
        let text = fs::read_to_string(lot.rig()).unwrap();
        let worse = text
            .replace("class = \"1\"", "class = \"2\"")
            .replace("class = \"0.5\"", "class = \"1\"")
            .replace("relative = \"0.8 %\"", &format!("relative = \"{} %\"", 0.8 * more))
            .replace("k = 2 }\nset_at", &format!("k = {:.3} }}\nset_at", 2.0 / more))
            .replace("k = 2 }\n\n[contact]", &format!("k = {:.3} }}\n\n[contact]", 2.0 / more));
        prop_assert!(worse != text);
        fs::write(lot.rig(), worse).unwrap();
        let after = lot.judge();
        for (what, fine, coarse) in pairs(&before, &after) {
            prop_assert!(
                coarse == fine || coarse == Verdict::Undecided,
                "{what}: {fine:?} became {coarse:?}"
            );
        }
        prop_assert!(after.decision == before.decision || after.decision == Decision::Undecided);
    }

    #[test]
    fn a_failing_spring_more_never_helps(
        seed in any::<u32>(), number in 1_u64..=4, first in any::<bool>(), size in 6_u64..30, aql in 0_usize..4,
    ) {
        let lot = Lot::new(u64::from(seed), number);
        edit(&lot.place().join("lot.toml"), &[("size = 4", &format!("size = {size}"))]);
        if aql > 0 {
            let aql = [1.0, 4.0, 10.0][aql - 1];
            let plan = format!("plan = {{ by = \"attributes\", level = \"II\", aql = {aql:.1} }}");
            edit(&lot.drawing(), &[("plan = { by = \"every-spring\" }", &plan)]);
        }
        let before = lot.judge();
        let id = if first { 0 } else { 5 };
        fs::copy(lot.export(1), lot.export(id)).unwrap();
        rewrite(&lot.export(id), |travel, load| (travel, 1.2 * load));
        let caliper = lot.place().join("caliper.csv");
        if caliper.exists() {
            let text = fs::read_to_string(&caliper).unwrap();
            fs::write(&caliper, format!("{text}{id},90.2\n")).unwrap();
        }
        let after = lot.judge();
        let added = after.springs.iter().find(|spring| spring.id == id.to_string()).unwrap();
        prop_assert_eq!(added.verdict, Verdict::Fails);
        prop_assert!(
            good_lot(after.decision) <= good_lot(before.decision),
            "{:?} became {:?}", before.decision, after.decision
        );
    }

    #[test]
    fn guarded_never_accepts_what_simple_rejects(seed in any::<u32>(), number in 1_u64..=4) {
        let lot = Lot::new(u64::from(seed), number);
        let guarded = lot.judge();
        edit(&lot.drawing(), &[("rule = \"guarded\"", "rule = \"simple\"")]);
        let simple = lot.judge();
        for (what, strict, plain) in pairs(&guarded, &simple) {
            prop_assert!(plain != Verdict::Undecided, "{what} is undecided under simple acceptance");
            prop_assert!(strict == plain || strict == Verdict::Undecided, "{what}: {strict:?}, simply {plain:?}");
        }
        prop_assert!(guarded.decision != Decision::Accepted || simple.decision == Decision::Accepted);
        prop_assert_eq!(guarded.simple.decision, simple.decision);
    }
}
