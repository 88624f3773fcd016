//! Cases whose ranking must come out the same natively and in wasm, and the file that holds what came out.

use super::*;
use lowside::ranking::assess;
use lowside::readings::{Direction::*, EngineSpeed::*};
use lowside::record::Answer;
use serde::{Deserialize, Serialize};

/// What the ranking of one case was.
#[derive(Debug, PartialEq, Serialize, Deserialize)]
pub struct Ranked {
    /// Case.
    pub case: String,
    /// Rows in order: member ids and probability.
    pub rows: Vec<(Vec<lowside::faults::FaultId>, f64)>,
}

/// Sharp, vague, contradictory and nearly empty calls.
pub fn cases() -> Vec<(&'static str, lowside::unit::Unit, Visit)> {
    let worn = visit(vec![
        reading("a", Port::Charge, neutral(LowIdle), 18.1),
        reading("b", Port::Charge, neutral(HighIdle), 24.1),
        reading("c", Port::ReturnFlow, neutral(LowIdle), 3.3),
        reading("d", Port::ReturnFlow, neutral(HighIdle), 22.0),
        reading("e", Port::Knee, neutral(HighIdle), 1300.0),
    ]);
    let one_side = visit(vec![
        reading("a", Port::LoopA, held(Forward, 0.05), 42.0),
        reading("b", Port::LoopA, held(Forward, 0.2), 210.0),
        reading("c", Port::LoopB, held(Reverse, 0.1), 300.0),
        reading("d", Port::Wheel, free(Forward), 17.0),
        reading("e", Port::Wheel, free(Reverse), 19.5),
    ]);
    let mut vague = visit(vec![reading("a", Port::Charge, neutral(HighIdle), 14.0)]);
    vague.observations.insert("foam".into(), Answer::Seen);
    vague.after_repair = Some(true);
    let mut wild = visit(vec![
        reading("a", Port::Charge, neutral(HighIdle), 0.0),
        reading("b", Port::Charge, free(Forward), 24.0),
        reading("c", Port::MotorDrain, neutral(HighIdle), 4.0),
        reading("d", Port::InletPull, neutral(HighIdle), 0.5),
    ]);
    wild.readings[0].seen = Some(Seen::Nothing);
    let quick = lowside::unit::Unit {
        id: "q".into(),
        class: MachineClass::CompactWheeled,
        ..Default::default()
    };
    vec![
        ("worn charge pump, known unit", roller(), worn.clone()),
        ("one side, known unit", roller(), one_side),
        ("one reading and foam, quick profile", quick.clone(), vague),
        ("contradictory, quick profile", quick, wild),
    ]
}

/// Ranks every case.
pub fn ranked() -> Vec<Ranked> {
    cases()
        .into_iter()
        .map(|(case, unit, visit)| Ranked {
            case: case.into(),
            rows: assess(&unit, &visit, &[])
                .causes
                .into_iter()
                .map(|c| (c.ids, c.probability))
                .collect(),
        })
        .collect()
}

/// Compares with the kept file: same order, probabilities within 1e-6.
pub fn compare(kept: &str) {
    let kept: Vec<Ranked> = serde_json::from_str(kept).expect("the kept file reads");
    let now = ranked();
    assert_eq!(kept.len(), now.len());
    for (k, n) in kept.iter().zip(&now) {
        assert_eq!(k.case, n.case);
        let order = |r: &Ranked| {
            r.rows
                .iter()
                .map(|(ids, _)| ids.clone())
                .collect::<Vec<_>>()
        };
        assert_eq!(order(k), order(n), "order of {}", k.case);
        for ((ids, a), (_, b)) in k.rows.iter().zip(&n.rows) {
            assert!((a - b).abs() < 1e-6, "{}: {ids:?} {a} {b}", k.case);
        }
        let sum: f64 = n.rows.iter().map(|r| r.1).sum();
        assert!(
            (sum - 1.0).abs() < 1e-9,
            "{}: probabilities sum to {sum}",
            n.case
        );
    }
}
