//! Whole assessments of worked cases.

mod support;

use lowside::assessment::Assessment;
use lowside::faults::FaultId;
use lowside::ranking::{Session, assess};
use lowside::readings::{Direction::*, Doing, EngineSpeed::*, Lever, Port};
use support::*;

fn print(a: &Assessment) {
    for w in &a.windows {
        println!(
            "  {:12} {:.2} {:.2} {:.2} read {:?} {:?} {:?} widest {} | {} {:?}",
            w.reading,
            w.low,
            w.middle,
            w.high,
            w.read,
            w.standing,
            w.source,
            w.widest,
            w.basis,
            w.remark
        );
    }
    for c in a.causes.iter().take(6) {
        println!("  {:5.1} % {:?} {}", 100.0 * c.probability, c.ids, c.title);
        for e in c.evidence.iter().take(3) {
            println!("         {:+.2} {}", e.weight, e.words);
        }
    }
    println!("  {:?} hold {:?}", a.trust, a.hold);
}

fn leader(a: &Assessment) -> &[FaultId] {
    &a.causes[0].ids
}

#[test]
fn a_worn_charge_pump_shows_in_its_curve_and_its_return() {
    let v = visit(vec![
        reading("c-low", Port::Charge, neutral(LowIdle), 18.1),
        reading("c-high", Port::Charge, neutral(HighIdle), 24.1),
        reading("r-low", Port::ReturnFlow, neutral(LowIdle), 3.3),
        reading("r-high", Port::ReturnFlow, neutral(HighIdle), 22.0),
    ]);
    let a = assess(&roller(), &v, &[]);
    print(&a);
    assert_eq!(leader(&a), [FaultId::ChargePumpWorn]);
}

#[test]
fn a_relief_held_open_keeps_the_return_normal() {
    let v = visit(vec![
        reading("c-low", Port::Charge, neutral(LowIdle), 11.8),
        reading("c-high", Port::Charge, neutral(HighIdle), 23.9),
        reading("r-low", Port::ReturnFlow, neutral(LowIdle), 12.4),
        reading("r-high", Port::ReturnFlow, neutral(HighIdle), 33.6),
    ]);
    let a = assess(&roller(), &v, &[]);
    print(&a);
    assert_eq!(leader(&a), [FaultId::NeutralReliefStuckOpen]);
}

#[test]
fn a_weak_forward_direction_points_at_one_cartridge() {
    let v = visit(vec![
        reading("c", Port::Charge, neutral(HighIdle), 24.6),
        reading("f5", Port::LoopA, held(Forward, 0.05), 42.0),
        reading("f10", Port::LoopA, held(Forward, 0.1), 92.0),
        reading("f20", Port::LoopA, held(Forward, 0.2), 232.0),
        reading("r5", Port::LoopB, held(Reverse, 0.05), 166.0),
        reading("r10", Port::LoopB, held(Reverse, 0.1), 322.0),
    ]);
    let a = assess(&roller(), &v, &[]);
    print(&a);
    assert!(
        leader(&a).contains(&FaultId::CheckALeaking),
        "{:?}",
        leader(&a)
    );
}

#[test]
fn a_healthy_machine_is_called_healthy_when_it_is() {
    let v = visit(vec![
        reading("c-low", Port::Charge, neutral(LowIdle), 23.4),
        reading("c-high", Port::Charge, neutral(HighIdle), 24.9),
        reading("cf", Port::Charge, free(Forward), 24.2),
        reading("cr", Port::Charge, free(Reverse), 24.2),
        reading("f10", Port::LoopA, held(Forward, 0.1), 330.0),
        reading("r10", Port::LoopB, held(Reverse, 0.1), 335.0),
        reading("drain", Port::MotorDrain, neutral(HighIdle), 0.8),
        reading("ret", Port::ReturnFlow, neutral(HighIdle), 33.0),
    ]);
    let a = assess(&roller(), &v, &[]);
    print(&a);
    assert!(
        a.windows
            .iter()
            .all(|w| w.standing == lowside::assessment::Standing::Within
                || w.standing == lowside::assessment::Standing::Edge)
    );
}

/// The call that the journey in the browser makes: a quick profile, six readings.
#[test]
fn a_quick_profile_is_enough_for_a_charge_side_fault() {
    let unit = lowside::unit::Unit {
        id: "q".into(),
        class: lowside::unit::MachineClass::Roller,
        ..Default::default()
    };
    let call = |low| {
        visit(vec![
            reading("c-low", Port::Charge, neutral(LowIdle), low),
            reading("c-high", Port::Charge, neutral(HighIdle), 21.0),
            reading("pump case", Port::PumpCase, neutral(HighIdle), 0.5),
            reading("motor case", Port::MotorCase, neutral(HighIdle), 0.7),
            reading("drain", Port::MotorDrain, neutral(HighIdle), 0.6),
            reading("f", Port::Charge, free(Forward), 20.5),
            reading("r", Port::Charge, free(Reverse), 20.5),
        ])
    };
    let a = assess(&unit, &call(9.0), &[]);
    print(&a);
    let astray = [
        FaultId::ChargePumpWorn,
        FaultId::NeutralReliefStuckOpen,
        FaultId::ConsumerLeak,
    ];
    assert!(
        leader(&a).iter().all(|id| astray.contains(id)),
        "{:?}",
        leader(&a)
    );
    let share = |a: &Assessment| {
        a.causes
            .iter()
            .filter(|c| c.ids.iter().any(|i| astray.contains(i)))
            .map(|c| c.probability)
            .sum::<f64>()
    };
    assert!(share(&a) > 0.6, "{}", share(&a));
    let b = assess(&unit, &call(20.0), &[]);
    print(&b);
    assert!(share(&b) < 0.2, "{}", share(&b));
}

#[test]
fn what_came_before_in_a_session_does_not_change_the_answer() {
    let all = [
        reading("c-low", Port::Charge, neutral(LowIdle), 18.1),
        reading("c-high", Port::Charge, neutral(HighIdle), 24.1),
        reading("r-low", Port::ReturnFlow, neutral(LowIdle), 3.3),
        reading(
            "wf",
            Port::Wheel,
            condition(Doing::Loaded, Forward, Lever::Full, HighIdle),
            30.0,
        ),
    ];
    let mut session = Session::default();
    for n in 1..=all.len() {
        let v = visit(all[..n].to_vec());
        let kept = session.assess(&roller(), &v, &[]);
        let fresh = assess(&roller(), &v, &[]);
        assert_eq!(kept.windows, fresh.windows, "{n} readings");
        for (a, b) in kept.causes.iter().zip(&fresh.causes) {
            assert_eq!(a.ids, b.ids, "{n} readings");
            assert!((a.probability - b.probability).abs() < 1e-6, "{n} readings");
        }
    }
}

#[test]
fn two_causes_are_shown_as_a_pair_with_what_each_explains() {
    // A charge pump that gives way at low idle, and a cartridge that leaks in one direction only: no one part does both.
    let v = visit(vec![
        reading("c-low", Port::Charge, neutral(LowIdle), 18.1),
        reading("c-high", Port::Charge, neutral(HighIdle), 24.1),
        reading("r-low", Port::ReturnFlow, neutral(LowIdle), 3.3),
        reading("r-high", Port::ReturnFlow, neutral(HighIdle), 22.0),
        reading("f5", Port::LoopA, held(Forward, 0.05), 42.0),
        reading("f10", Port::LoopA, held(Forward, 0.1), 92.0),
        reading("f20", Port::LoopA, held(Forward, 0.2), 232.0),
        reading("r5", Port::LoopB, held(Reverse, 0.05), 166.0),
        reading("r10", Port::LoopB, held(Reverse, 0.1), 322.0),
    ]);
    let a = assess(&roller(), &v, &[]);
    print(&a);
    let lead = &a.causes[0];
    assert_eq!(
        lead.ids,
        [FaultId::ChargePumpWorn, FaultId::CheckALeaking],
        "{:?}",
        lead.ids
    );
    let pair = lead.pair.as_ref().expect("a pair");
    assert!(pair.explains[0].contains(&"c-low".to_string()), "{pair:?}");
    assert!(pair.explains[1].contains(&"f10".to_string()), "{pair:?}");
    assert!(!pair.explains[0].contains(&"f10".to_string()), "{pair:?}");
    let sum: f64 = a.causes.iter().map(|c| c.probability).sum();
    assert!((sum - 1.0).abs() < 1e-9, "{sum}");
}

#[test]
fn one_cause_that_explains_everything_is_not_paired() {
    let v = visit(vec![
        reading("c-low", Port::Charge, neutral(LowIdle), 18.1),
        reading("c-high", Port::Charge, neutral(HighIdle), 24.1),
        reading("r-low", Port::ReturnFlow, neutral(LowIdle), 3.3),
        reading("r-high", Port::ReturnFlow, neutral(HighIdle), 22.0),
    ]);
    let a = assess(&roller(), &v, &[]);
    let paired: f64 = a
        .causes
        .iter()
        .filter(|c| c.pair.is_some())
        .map(|c| c.probability)
        .sum();
    assert!(paired < 0.1, "{paired}");
}
