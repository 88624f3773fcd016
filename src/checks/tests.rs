use super::{COMMON, HIGHEST_HAZARD, all, facts, find, for_condition, for_reading, hazard};
use crate::observations;
use crate::readings::{Condition, Direction, Doing, Lever, Port};
use std::collections::BTreeSet;

#[test]
fn ids_and_titles_differ_and_texts_are_there() {
    let ids: BTreeSet<&str> = all().map(|c| c.id).collect();
    let titles: BTreeSet<&str> = all().map(|c| c.title).collect();
    assert_eq!(ids.len(), all().count());
    assert_eq!(titles.len(), all().count());
    for c in all() {
        assert!(
            c.id.chars().all(|x| x.is_ascii_lowercase() || x == '-'),
            "{}",
            c.id
        );
        assert!(
            !c.how.is_empty() && !c.separates.is_empty() && !c.instruments.is_empty(),
            "{}",
            c.id
        );
        for text in c.how.iter().chain([&c.separates]) {
            assert!(
                !text.contains("  ") && (text.ends_with('.') || text.ends_with('?')),
                "{}: {text}",
                c.id
            );
        }
        assert_eq!(find(c.id).map(|f| f.title), Some(c.title));
    }
    assert!(find("no-such-check").is_none());
}

#[test]
fn the_checks_of_the_trade_are_all_there() {
    for id in [
        "ask-the-operator",
        "walk-round",
        "prove-the-gauges",
        "interlock-and-codes",
        "coil-current",
        "stroke-arm-by-hand",
        "true-rpm",
        "temperatures-by-place",
        "charge-two-speeds",
        "charge-knee",
        "charge-both-ways",
        "cap-a-consumer",
        "wheel-turns",
        "slip-light-to-loaded",
        "response-time",
        "case-pressures",
        "inlet-pull",
        "return-flow-two-speeds",
        "motor-drain-in-neutral",
        "motor-drain-no-flushing",
        "free-run-difference",
        "pressure-build-up",
        "plateau",
        "isolate-the-pump",
        "bridge-the-servo",
        "servo-two-gauges",
        "release-and-shift-pressure",
        "swap-cartridges",
        "swap-sides",
        "pull-the-shuttle",
        "debris",
        "oil-run-down",
        "roll-by-hand",
        "slope-hold",
        "work-another-function",
    ] {
        assert!(find(id).is_some(), "{id}");
    }
}

#[test]
fn minutes_and_hazards_are_plausible() {
    for c in all() {
        assert!(
            c.minutes_again >= 1.0 && c.minutes_again <= c.minutes_first && c.minutes_first <= 60.0,
            "{}",
            c.id
        );
        assert!(c.hazard <= HIGHEST_HAZARD, "{}", c.id);
        // A hazard without a fact to tick would be a warning without an action.
        assert_eq!(c.hazard >= 1, !c.precautions.is_empty(), "{}", c.id);
    }
}

#[test]
fn the_worst_checks_ask_for_a_second_person_or_a_tried_brake() {
    for c in all().filter(|c| c.hazard == HIGHEST_HAZARD) {
        assert!(c.precautions.len() >= 3, "{}", c.id);
        let text = c.precautions.join(" ");
        assert!(
            text.contains("Not alone") || text.contains("brake tried first"),
            "{}",
            c.id
        );
    }
}

#[test]
fn held_checks_never_stand_on_the_parking_brake_and_ask_what_is_known() {
    for c in all().filter(|c| c.yields.iter().any(|y| y.doing == Doing::Held)) {
        assert_eq!(c.hazard, HIGHEST_HAZARD, "{}", c.id);
        let text = facts(c, Doing::Held).join(" ");
        assert!(
            text.contains("Oil level, charge pressure and oil temperature"),
            "{}",
            c.id
        );
        assert!(
            text.contains("not by the parking brake alone")
                || text.contains("no braking from the drive"),
            "{}",
            c.id
        );
    }
}

#[test]
fn answers_and_orders_point_at_what_exists() {
    for c in all() {
        for id in c.answers {
            assert!(observations::find(id).is_some(), "{}: {id}", c.id);
        }
        assert!(c.after.is_empty() || find(c.after).is_some(), "{}", c.id);
    }
    // Every observation has a check that answers it.
    for o in observations::all() {
        let asked = all().any(|c| c.answers.contains(&o.id));
        let heard = o.id.starts_with("whine");
        assert!(asked || heard, "{}", o.id);
    }
}

#[test]
fn every_port_has_a_check_that_yields_it_or_guards_it() {
    for port in Port::ALL {
        let yields = all().any(|c| c.yields.iter().any(|y| y.port == port));
        assert!(yields || port == Port::LoopDifference, "{port:?}");
        for doing in Doing::ALL {
            let check = for_condition(doing, port).unwrap_or_else(|| panic!("{doing:?} {port:?}"));
            assert!(check.hazard >= 1, "{doing:?} {port:?}");
        }
    }
}

#[test]
fn a_reading_is_guarded_as_well_as_the_check_that_yields_it() {
    for c in all() {
        for y in c.yields {
            let guard = for_reading(&y.condition(None), y.port).expect("a guard");
            assert!(
                hazard(guard, y.doing) >= hazard(c, y.doing),
                "{} {:?}",
                c.id,
                y.port
            );
        }
    }
}

#[test]
fn the_condition_raises_the_hazard() {
    let case = find("case-pressures").unwrap();
    assert_eq!(hazard(case, Doing::Neutral), 1);
    assert_eq!(hazard(case, Doing::Free), 2);
    for doing in [Doing::Held, Doing::NeutralBridged, Doing::Overrun] {
        assert_eq!(hazard(case, doing), HIGHEST_HAZARD);
    }
}

#[test]
fn the_condition_picks_the_guard() {
    let at = |doing, lever| Condition {
        doing,
        lever,
        ..Condition::start()
    };
    let id = |condition: &Condition, port| for_reading(condition, port).map(|c| c.id);
    assert_eq!(
        id(&at(Doing::Held, Lever::Full), Port::LoopA),
        Some("plateau")
    );
    assert_eq!(
        id(&at(Doing::Held, Lever::Share(0.2)), Port::LoopA),
        Some("pressure-build-up")
    );
    assert_eq!(
        id(&at(Doing::Held, Lever::Feathered), Port::Charge),
        Some("pressure-build-up")
    );
    assert_eq!(
        id(&at(Doing::NeutralBridged, Lever::Full), Port::Wheel),
        Some("bridge-the-servo")
    );
    assert_eq!(
        id(&at(Doing::Overrun, Lever::Full), Port::LoopB),
        Some("hold-back")
    );
    assert_eq!(
        id(&at(Doing::Neutral, Lever::Full), Port::Charge),
        Some("charge-two-speeds")
    );
    assert_eq!(
        id(&at(Doing::Free, Lever::Half), Port::Charge),
        Some("charge-both-ways")
    );
    assert_eq!(
        id(&at(Doing::Neutral, Lever::Full), Port::MotorDrain),
        Some("motor-drain-in-neutral")
    );
    let blocked = Condition {
        flushing_blocked: true,
        ..at(Doing::Free, Lever::Half)
    };
    assert_eq!(
        id(&blocked, Port::MotorDrain),
        Some("motor-drain-no-flushing")
    );
    let capped = Condition {
        consumers_capped: true,
        ..at(Doing::Neutral, Lever::Full)
    };
    assert_eq!(id(&capped, Port::Charge), Some("cap-a-consumer"));
}

#[test]
fn facts_fit_what_the_machine_does() {
    let has = |list: &[&str], start: &str| list.iter().any(|f| f.contains(start));
    let wheel = find("wheel-turns").unwrap();
    let clear = facts(wheel, Doing::Free);
    assert!(has(&clear, "Every driven wheel") && has(&clear, "hand on the stop"));
    let driving = facts(wheel, Doing::Travel);
    assert!(has(&driving, "nobody walks alongside") && has(&driving, "carried low"));
    // A machine that drives has no chocks under it and no attachment on the ground.
    assert!(!has(&driving, "Chocks") && !has(&driving, "down on the ground"));
    let standing = facts(find("charge-two-speeds").unwrap(), Doing::Neutral);
    assert!(COMMON.iter().all(|f| standing.contains(f)));
    let held = facts(find("pressure-build-up").unwrap(), Doing::Held);
    assert!(has(&held, "Ports capped") && has(&held, "not by the parking brake alone"));
    assert!(facts(find("walk-round").unwrap(), Doing::Neutral).is_empty());
    for c in all() {
        for doing in Doing::ALL {
            let list = facts(c, doing);
            assert_eq!(list.is_empty(), hazard(c, doing) == 0, "{}", c.id);
            let unlike: BTreeSet<&str> = list.iter().copied().collect();
            assert_eq!(unlike.len(), list.len(), "{}", c.id);
        }
    }
}

#[test]
fn what_opens_a_line_has_something_to_put_back() {
    for id in [
        "cap-a-consumer",
        "motor-drain-in-neutral",
        "motor-drain-no-flushing",
        "isolate-the-pump",
        "bridge-the-servo",
        "roll-by-hand",
        "interlock-and-codes",
        "coil-current",
        "free-run-difference",
        "swap-sides",
    ] {
        assert!(!find(id).unwrap().put_back.is_empty(), "{id}");
    }
}

#[test]
fn yields_keep_their_condition() {
    let y = find("motor-drain-no-flushing").unwrap().yields[1];
    let c = y.condition(None);
    assert!(c.flushing_blocked && !c.consumers_capped);
    assert_eq!(c.direction, Direction::Reverse);
    assert_eq!(c.doing, Doing::Free);
}
