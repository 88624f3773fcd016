//! What is offered next, on worked cases.

mod support;

use lowside::next::{Advice, advise};
use lowside::ranking::{Session, assess};
use lowside::readings::{Direction::*, Doing, EngineSpeed::*, Lever, Port};
use lowside::record::{Answer, Visit};
use lowside::unit::Unit;
use support::*;

fn advice(unit: &Unit, visit: &Visit) -> Advice {
    let mut session = Session::default();
    let a = session.assess(unit, visit, &[]);
    let advice = advise(unit, visit, &[], &a, session.heavy());
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

/// Asked and walked round: nothing that stops work, level on the mark.
fn looked(mut v: Visit) -> Visit {
    for check in ["ask-the-operator", "walk-round"] {
        for id in lowside::checks::find(check).expect("listed").answers {
            v.observations
                .entry((*id).to_string())
                .or_insert(Answer::NotSeen);
        }
    }
    v
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
    let mut v = looked(visit(vec![
        reading("c-low", Port::Charge, neutral(LowIdle), 17.9),
        reading("c-high", Port::Charge, neutral(HighIdle), 24.1),
    ]));
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

fn check(id: &str) -> &'static lowside::checks::Check {
    lowside::checks::find(id).expect("listed")
}

#[test]
fn nobody_starts_or_drives_it_before_it_was_asked_and_looked_at() {
    let runs = |a: &Advice| {
        a.checks
            .iter()
            .filter(|c| !check(&c.id).yields.is_empty())
            .count()
    };
    let drives = |a: &Advice| {
        a.checks
            .iter()
            .filter(|c| {
                check(&c.id)
                    .yields
                    .iter()
                    .any(|y| y.doing != Doing::Neutral)
            })
            .count()
    };
    let mut v = visit(vec![]);
    let a = advice(&roller(), &v);
    assert_eq!(runs(&a), 0);
    assert!(
        a.held_back
            .iter()
            .any(|(_, why)| why.contains("keeps going"))
    );
    // All is answered but the one question: it is asked, though it tells little.
    v = looked(v);
    v.observations.remove("runs-on");
    let a = advice(&roller(), &v);
    assert_eq!(runs(&a), 0);
    assert!(a.checks.iter().any(|c| c.id == "ask-the-operator"));
    v.observations
        .insert("runs-on".into(), Answer::OperatorSaysNot);
    assert!(runs(&advice(&roller(), &v)) > 0);
    // Level not looked at: the engine may run, nothing turns.
    v.observations.remove("level-low");
    let a = advice(&roller(), &v);
    assert_eq!(drives(&a), 0);
    assert!(
        a.held_back
            .iter()
            .any(|(_, why)| why.contains("Walk round"))
    );
}

#[test]
fn a_gauge_that_stands_is_not_fitted_again() {
    let unit = roller();
    let none = visit(vec![]);
    let charge = visit(vec![reading("c", Port::Charge, neutral(HighIdle), 24.1)]);
    for id in [
        "charge-knee",
        "charge-both-ways",
        "work-another-function",
        "cap-a-consumer",
    ] {
        let c = check(id);
        assert_eq!(
            lowside::next::minutes(&unit, &none, c),
            c.minutes_first,
            "{id}"
        );
        assert_eq!(
            lowside::next::minutes(&unit, &charge, c),
            c.minutes_again,
            "{id}"
        );
    }
    // Another port: fitted anew, with the access of this unit on top.
    let mut far = roller();
    far.ports.entry(Port::InletPull).or_default().access_minutes = Some(25.0);
    let inlet = check("inlet-pull");
    assert_eq!(
        lowside::next::minutes(&far, &charge, inlet),
        inlet.minutes_first + 25.0
    );
}

#[test]
fn what_this_unit_does_not_have_is_not_offered() {
    let unit = roller();
    let v = visit(vec![]);
    for id in ["coil-current", "swap-plugs"] {
        assert!(!lowside::next::possible(&unit, &v, check(id)), "{id}");
    }
    let mut plain = roller();
    plain.ticks.control = lowside::unit::Control::DirectManual;
    for id in ["bridge-the-servo", "servo-two-gauges"] {
        assert!(lowside::next::possible(&unit, &v, check(id)), "{id}");
        assert!(!lowside::next::possible(&plain, &v, check(id)), "{id}");
    }
}

#[test]
fn the_plateau_waits_for_the_steps() {
    let mut v = visit(vec![]);
    assert!(!lowside::next::possible(&roller(), &v, check("plateau")));
    let y = check("pressure-build-up").yields[0];
    v.readings = vec![reading("a", y.port, y.condition(None), 200.0)];
    assert!(lowside::next::possible(&roller(), &v, check("plateau")));
}

#[test]
fn an_operators_word_leaves_room_for_ones_own_look() {
    let mut v = visit(vec![]);
    let open = |v: &Visit, id| {
        lowside::next::open_answers(&roller(), v, check(id))
            .iter()
            .any(|o| o.id == "slow-to-answer")
    };
    v.observations
        .insert("slow-to-answer".into(), Answer::OperatorSays);
    assert!(open(&v, "response-time") && !open(&v, "ask-the-operator"));
    v.observations.insert("slow-to-answer".into(), Answer::Seen);
    assert!(!open(&v, "response-time"));
}

fn good_charge() -> Vec<lowside::readings::Reading> {
    vec![
        reading("c-low", Port::Charge, neutral(LowIdle), 23.3),
        reading("c-high", Port::Charge, neutral(HighIdle), 24.7),
    ]
}

/// No fall of charge from neutral to drive: shuttle, relief and orifice look alike and are mended in one visit.
#[test]
fn a_set_that_one_action_serves_is_one_repair() {
    let free = |d| condition(Doing::Free, d, Lever::Half, HighIdle);
    let mut r = good_charge();
    r.push(reading("cf", Port::Charge, free(Forward), 24.7));
    r.push(reading("cr", Port::Charge, free(Reverse), 24.7));
    let v = looked(visit(r));
    let row = assess(&roller(), &v, &[]).causes[0].clone();
    assert!(row.ids.len() > 1, "{:?}", row.ids);
    let repair = advice(&roller(), &v).repair.expect("likely enough");
    assert!((repair.probability - row.probability).abs() < 1e-9);
    assert_eq!((&repair.repair, &repair.proof), (&row.action, &row.split));
    assert_eq!(repair.minutes, 45.0);
}

/// Seen open: shut it before anything is measured.
#[test]
fn a_quick_likely_repair_comes_before_checks() {
    let mut v = looked(visit(good_charge()));
    v.observations.insert("tow-valve-open".into(), Answer::Seen);
    v.observations.insert("weak-both-ways".into(), Answer::Seen);
    let a = advice(&roller(), &v);
    let repair = a.repair.expect("likely enough");
    assert_eq!(repair.id, lowside::faults::FaultId::BypassOpen);
    assert!(repair.now && repair.waits.is_empty() && !a.checks.is_empty());
    // Not where it takes hours.
    let mut v = looked(visit(good_charge()));
    for id in ["weak-both-ways", "weak-hot", "metal"] {
        v.observations.insert(id.into(), Answer::Seen);
    }
    let a = advice(&roller(), &v);
    assert!(a.repair.is_none_or(|r| r.minutes < 120.0 || !r.now));
}

fn starving() -> Visit {
    let mut v = looked(visit(vec![
        reading("c-low", Port::Charge, neutral(LowIdle), 20.0),
        reading("c-high", Port::Charge, neutral(HighIdle), 14.0),
        reading("i-low", Port::InletPull, neutral(LowIdle), 0.3),
        reading("i-high", Port::InletPull, neutral(HighIdle), 0.6),
    ]));
    v.observations
        .insert("whine-with-revs".into(), Answer::Seen);
    v
}

#[test]
fn a_repair_that_takes_evidence_away_waits_for_the_look_at_debris() {
    let mut v = starving();
    let repair = advice(&roller(), &v).repair.expect("likely enough");
    assert_eq!(repair.id, lowside::faults::FaultId::InletRestricted);
    assert!(
        !repair.now && repair.waits.contains("debris"),
        "{}",
        repair.waits
    );
    v.observations.insert("metal".into(), Answer::NotSeen);
    let repair = advice(&roller(), &v).repair.expect("likely enough");
    assert!(repair.now && repair.waits.is_empty());
}

#[test]
fn checking_ends_where_nothing_left_is_likely_to_change_what_leads() {
    let a = advice(&roller(), &starving());
    let stop = a.stop.expect("the end of checking");
    assert!(stop.contains("proved by: Inlet pull"), "{stop}");
    // A call that has just begun is not at its end.
    assert!(
        advice(&roller(), &looked(visit(good_charge())))
            .stop
            .is_none()
    );
}

fn low_relief(with_return: bool) -> Visit {
    let full = condition(Doing::Free, Forward, Lever::Full, HighIdle);
    let mut r = vec![reading("c-high", Port::Charge, neutral(HighIdle), 17.7)];
    if with_return {
        r.insert(0, reading("c-low", Port::Charge, neutral(LowIdle), 16.5));
        // Off for a reason of its own: the wheel is slow, which no charge relief explains.
        r.push(reading("w", Port::Wheel, full, 33.0));
        r.push(reading("r-low", Port::ReturnFlow, neutral(LowIdle), 11.8));
        r.push(reading("r-high", Port::ReturnFlow, neutral(HighIdle), 33.9));
    }
    looked(visit(r))
}

#[test]
fn a_protection_is_not_screwed_up_on_a_guess() {
    let mut doubted = 0;
    for with_return in [false, true] {
        let v = low_relief(with_return);
        let repair = advice(&roller(), &v).repair.expect("likely enough");
        assert_eq!(repair.id, lowside::faults::FaultId::NeutralReliefLow);
        if repair.probability < 0.8 {
            assert!(
                !repair.now && repair.waits.contains("protects"),
                "{}",
                repair.waits
            );
            doubted += 1;
        } else {
            assert!(repair.waits.is_empty());
        }
    }
    assert!(doubted > 0);
}

#[test]
fn a_repair_is_proved_by_the_readings_that_its_cause_explains() {
    let v = low_relief(true);
    let off: Vec<String> = assess(&roller(), &v, &[])
        .windows
        .iter()
        .filter(|w| w.standing == lowside::assessment::Standing::Low)
        .map(|w| w.reading.clone())
        .collect();
    assert!(off.contains(&"w".to_string()), "{off:?}");
    let repair = advice(&roller(), &v).repair.expect("likely enough");
    assert_eq!(repair.proved_by, ["c-low", "c-high"]);
}
