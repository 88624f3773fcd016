//! The first look at one reading more against the full assessment that follows it.

mod support;

use lowside::assessment::Assessment;
use lowside::faults::FaultId;
use lowside::ranking::Session;
use lowside::readings::{Direction::*, Doing, EngineSpeed::*, Lever, Port, Reading};
use support::*;

/// A call on the roller, as each machine would answer: what is read, under a sound machine and two broken ones.
fn call(at: usize) -> Vec<Reading> {
    let rpm = |v| Measured(base(v, lowside::quantity::Kind::RotationalSpeed));
    let held = |d, s| condition(Doing::Held, d, Lever::Share(s), rpm(1500.0));
    let free = |d| condition(Doing::Free, d, Lever::Half, HighIdle);
    let r = |id, port, c, v: [f64; 3]| reading(id, port, c, v[at]);
    vec![
        r("c-low", Port::Charge, neutral(LowIdle), [23.2, 14.0, 23.2]),
        r(
            "c-high",
            Port::Charge,
            neutral(HighIdle),
            [24.6, 19.0, 24.4],
        ),
        r("case", Port::PumpCase, neutral(HighIdle), [0.9, 0.9, 1.0]),
        r(
            "drain",
            Port::MotorDrain,
            neutral(HighIdle),
            [0.6, 0.6, 0.6],
        ),
        r("cf", Port::Charge, free(Forward), [23.6, 18.0, 23.2]),
        r("wf", Port::Wheel, free(Forward), [19.6, 19.2, 19.1]),
        r("f5", Port::LoopA, held(Forward, 0.05), [145.0, 140.0, 60.0]),
        r(
            "f10",
            Port::LoopA,
            held(Forward, 0.1),
            [290.0, 280.0, 120.0],
        ),
        r(
            "r10",
            Port::LoopB,
            held(Reverse, 0.1),
            [290.0, 280.0, 290.0],
        ),
        r("la", Port::LoopA, free(Forward), [60.0, 60.0, 60.0]),
    ]
}

fn share(a: &Assessment, id: FaultId) -> f64 {
    let of = |c: &lowside::assessment::Cause| {
        let at = c.ids.iter().position(|i| *i == id)?;
        c.shares.get(at).copied()
    };
    a.causes.iter().filter_map(of).sum()
}

fn distance(a: &Assessment, b: &Assessment) -> f64 {
    let ids = lowside::faults::all().iter().map(|f| f.id);
    0.5 * ids
        .map(|id| (share(a, id) - share(b, id)).abs())
        .sum::<f64>()
}

#[test]
fn the_first_look_is_close_to_what_follows_it() {
    let mut far = Vec::new();
    for at in 0..3 {
        let readings = call(at);
        let mut session = Session::default();
        session.assess(&roller(), &visit(readings[..3].to_vec()), &[]);
        for n in 4..=readings.len() {
            let now = visit(readings[..n].to_vec());
            let look = session.look(&roller(), &now, &[]).expect("little is new");
            assert!(look.trust.first_look);
            let full = session.assess(&roller(), &now, &[]);
            assert!(!full.trust.first_look);
            assert_eq!(look.windows, full.windows, "machine {at}, {n} readings");
            let total: f64 = look.causes.iter().map(|c| c.probability).sum();
            assert!((total - 1.0).abs() < 1e-9, "{total}");
            far.push((distance(&look, &full), at, n));
        }
    }
    let mean = far.iter().map(|f| f.0).sum::<f64>() / far.len() as f64;
    far.sort_by(|a, b| b.0.total_cmp(&a.0));
    assert!(mean < 0.05, "{mean} {far:?}");
    assert!(far[0].0 < 0.25, "{far:?}");
}

#[test]
fn a_corrected_value_moves_the_first_look_too() {
    let mut session = Session::default();
    let readings = call(0);
    let before = session.assess(&roller(), &visit(readings.clone()), &[]);
    let mut other = readings;
    other[1] = reading("c-high", Port::Charge, neutral(HighIdle), 9.0);
    let now = visit(other);
    let look = session.look(&roller(), &now, &[]).expect("nothing is new");
    assert!(look.trust.wrong_reading > before.trust.wrong_reading + 0.2);
}

#[test]
fn where_too_much_is_new_there_is_no_first_look() {
    let mut session = Session::default();
    let readings = call(0);
    assert!(
        session
            .look(&roller(), &visit(readings.clone()), &[])
            .is_none()
    );
    session.assess(&roller(), &visit(readings[..3].to_vec()), &[]);
    assert!(
        session
            .look(&roller(), &visit(readings.clone()), &[])
            .is_none()
    );
    let mut other = roller();
    other.ticks.motors = 2;
    let one_more = visit(readings[..4].to_vec());
    assert!(session.look(&other, &one_more, &[]).is_none());
    assert!(session.look(&roller(), &one_more, &[]).is_some());
}
