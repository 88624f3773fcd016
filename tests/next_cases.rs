//! What is offered next, on worked cases.

mod support;

use lowside::next::{Advice, advise};
use lowside::ranking::assess;
use lowside::readings::{Direction::*, Doing, EngineSpeed::*, Lever, Port};
use lowside::record::{Answer, Visit};
use lowside::unit::Unit;
use support::*;

fn advice(unit: &Unit, visit: &Visit) -> Advice {
    let a = assess(unit, visit, &[]);
    let advice = advise(unit, visit, &[], &a);
    for c in &a.causes[..3.min(a.causes.len())] {
        println!("  {:.3} {:?}", c.probability, c.ids);
    }
    for o in &advice.checks {
        println!(
            "  {} {:.2} bit {:.1} min hazard {} {}",
            o.id, o.bits, o.minutes, o.hazard, o.why
        );
        for f in o.foretold.iter().take(2) {
            println!(
                "       {:?} {:?}",
                f.port,
                f.would
                    .iter()
                    .map(|w| (
                        w.id,
                        (w.value * 10.0).round() / 10.0,
                        (w.low * 10.0).round() / 10.0,
                        (w.high * 10.0).round() / 10.0
                    ))
                    .collect::<Vec<_>>()
            );
        }
    }
    println!(
        "  {:?}\n  stop {:?} held {:?}",
        advice.repair.as_ref().map(|r| (r.id, r.minutes, r.now)),
        advice.stop,
        advice.held_back
    );
    advice
}

#[test]
fn a_call_that_has_just_begun_starts_with_looking_and_asking() {
    let a = advice(&roller(), &visit(vec![]));
    assert!(a.checks[0].hazard < 2, "{:?}", a.checks[0]);
    assert!(a.checks.iter().all(|c| c.hazard < 3));
    assert!(a.checks[0].minutes <= 10.0);
}

#[test]
fn consumer_and_worn_charge_pump_are_told_apart_before_anything_is_taken_off() {
    let mut v = visit(vec![
        reading("c-low", Port::Charge, neutral(LowIdle), 17.9),
        reading("c-high", Port::Charge, neutral(HighIdle), 24.1),
    ]);
    v.alone = Some(false);
    let a = advice(&roller(), &v);
    assert!(
        a.checks.iter().any(|c| [
            "cap-a-consumer",
            "return-flow-two-speeds",
            "charge-knee",
            "inlet-pull"
        ]
        .contains(&c.id.as_str())),
        "{:?}",
        a.checks
    );
    assert!(
        a.checks
            .iter()
            .all(|c| !c.why.is_empty() && c.bits > 0.0 && c.minutes > 0.0)
    );
}

#[test]
fn a_held_check_waits_for_its_gates() {
    let mut v = visit(vec![
        reading("c-low", Port::Charge, neutral(LowIdle), 23.3),
        reading("c-high", Port::Charge, neutral(HighIdle), 24.7),
        reading(
            "cf",
            Port::Charge,
            condition(Doing::Free, Forward, Lever::Half, HighIdle),
            23.8,
        ),
        reading(
            "cr",
            Port::Charge,
            condition(Doing::Free, Reverse, Lever::Half, HighIdle),
            23.8,
        ),
    ]);
    v.observations.insert("one-direction".into(), Answer::Seen);
    for alone in [None, Some(true), Some(false)] {
        v.alone = alone;
        let a = advice(&roller(), &v);
        // Level was never looked at: no check of the highest hazard, whoever is there.
        assert!(a.checks.iter().all(|c| c.hazard < 3), "{alone:?}");
        assert!(!a.held_back.is_empty());
    }
}

#[test]
fn a_machine_that_keeps_going_is_not_tested() {
    let id = lowside::observations::all()
        .find(|o| o.words.to_lowercase().contains("keeps going"))
        .expect("listed")
        .id;
    let mut v = visit(vec![]);
    v.observations.insert(id.into(), Answer::OperatorSays);
    let a = advice(&roller(), &v);
    assert!(a.checks.is_empty() && a.repair.is_none() && a.stop.is_some());
}

#[test]
fn what_was_read_is_not_offered_again() {
    let v = visit(vec![
        reading("c-low", Port::Charge, neutral(LowIdle), 17.9),
        reading("c-high", Port::Charge, neutral(HighIdle), 24.1),
    ]);
    let a = advice(&roller(), &v);
    let c = a.checks.iter().find(|c| c.id == "charge-two-speeds");
    assert!(c.is_none_or(|c| c.foretold.is_empty()), "{c:?}");
}
