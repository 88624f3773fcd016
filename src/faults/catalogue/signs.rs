//! What each fault must and must not do to the readings of the reference machine: signs that hold for its build (closed-centre
//! flushing shuttle at the motor, cartridges into the gallery, neutral relief into the pump case), warm oil, engine speed held.

use super::{Fault, FaultId, find};
use crate::circuit::{Layout, Network, Param, Params, healthy};
use crate::faults::Bend;
use crate::readings::Port;

/// A state of the reference machine.
#[derive(Clone, Copy)]
struct Ask {
    speed: f64,
    lever: f64,
    load: f64,
    held: bool,
}

const NEUTRAL: Ask = Ask {
    speed: 2400.0,
    lever: 0.0,
    load: 0.0,
    held: false,
};
const LOW_IDLE: Ask = Ask {
    speed: 900.0,
    ..NEUTRAL
};
const FORWARD: Ask = Ask {
    lever: 0.5,
    load: 20.0,
    ..NEUTRAL
};
const REVERSE: Ask = Ask {
    lever: -0.5,
    load: 20.0,
    ..NEUTRAL
};
const LOADED: Ask = Ask {
    lever: 0.8,
    load: 150.0,
    ..NEUTRAL
};
const HELD: Ask = Ask {
    speed: 1500.0,
    lever: 0.1,
    load: 0.0,
    held: true,
};
const HELD_BACK: Ask = Ask {
    lever: -0.1,
    ..HELD
};

fn bent(bend: Bend, healthy: f64, severity: f64) -> f64 {
    let between = |a: f64, b: f64| a + (b - a) * severity;
    let along = |a: f64, b: f64| a * crate::math::pow(b / a, severity);
    match bend {
        Bend::Times(a, b) => healthy * along(a, b),
        Bend::TimesLinear(a, b) => healthy * between(a, b),
        Bend::Plus(a, b) | Bend::PlusEitherSign(a, b) => healthy + between(a, b),
        Bend::PlusGeometric(a, b) => healthy + along(a, b),
    }
}

fn read(bends: &[(Param, Bend)], severity: f64, ask: Ask, port: Port) -> f64 {
    let mut theta: Params = healthy();
    theta[Param::Speed as usize] = ask.speed;
    theta[Param::Lever as usize] = ask.lever;
    theta[Param::Load as usize] = ask.load;
    for (p, b) in bends {
        theta[*p as usize] = bent(*b, theta[*p as usize], severity);
    }
    let net = Network::new(Layout {
        held: [ask.held; 2],
        ..Layout::default()
    });
    let solution = net.solve(&theta, None).expect("a steady state");
    net.reading(port, &solution, &theta)
}

fn well(ask: Ask, port: Port) -> f64 {
    read(&[], 0.0, ask, port)
}

fn fault(id: FaultId) -> &'static Fault {
    find(id).expect("in the catalogue")
}

/// The reading of a fault's first way at a severity.
fn ill(id: FaultId, severity: f64, ask: Ask, port: Port) -> f64 {
    read(fault(id).effects[0].bends, severity, ask, port)
}

#[track_caller]
fn near(a: f64, b: f64, within: f64) {
    assert!((a - b).abs() <= within, "{a} is not {b} ± {within}");
}

const LOOP_SIDE: [FaultId; 12] = [
    FaultId::CheckALeaking,
    FaultId::CheckBLeaking,
    FaultId::CheckAShut,
    FaultId::CheckBShut,
    FaultId::LoopReliefALow,
    FaultId::LoopReliefBLow,
    FaultId::BypassOpen,
    FaultId::PumpWorn,
    FaultId::PumpWornAcross,
    FaultId::MotorWorn,
    FaultId::MotorWornAcross,
    FaultId::LoopHoseRestricted,
];

#[test]
fn all_the_charge_pump_delivers_comes_back_whatever_the_loop_does() {
    for id in LOOP_SIDE {
        for severity in [0.0, 0.5, 1.0] {
            near(
                ill(id, severity, NEUTRAL, Port::ReturnFlow),
                well(NEUTRAL, Port::ReturnFlow),
                0.3,
            );
        }
    }
}

#[test]
fn neutral_drain_sees_the_motor_and_not_the_pump() {
    let healthy = well(NEUTRAL, Port::MotorDrain);
    near(
        ill(FaultId::PumpWorn, 1.0, NEUTRAL, Port::MotorDrain),
        healthy,
        0.05,
    );
    near(
        ill(FaultId::MotorWornAcross, 0.5, NEUTRAL, Port::MotorDrain),
        healthy,
        0.2,
    );
    assert!(ill(FaultId::MotorWorn, 0.5, NEUTRAL, Port::MotorDrain) > 3.0 * healthy);
}

#[test]
fn pump_wear_takes_from_the_motor_drain_under_load() {
    let healthy = well(LOADED, Port::MotorDrain);
    assert!(ill(FaultId::PumpWorn, 0.6, LOADED, Port::MotorDrain) < healthy - 1.0);
}

#[test]
fn wear_across_leaves_charge_and_costs_push() {
    for id in [FaultId::PumpWornAcross, FaultId::MotorWornAcross] {
        near(
            ill(id, 0.7, LOADED, Port::Charge),
            well(LOADED, Port::Charge),
            0.3,
        );
        assert!(ill(id, 0.7, HELD, Port::LoopA) < 0.6 * well(HELD, Port::LoopA));
    }
}

#[test]
fn a_leaking_cartridge_never_lowers_charge_and_weakens_its_own_direction() {
    for severity in [0.0, 0.5, 0.9] {
        let charge = ill(FaultId::CheckALeaking, severity, FORWARD, Port::Charge);
        assert!(charge >= well(FORWARD, Port::Charge) - 0.05, "{charge}");
    }
    assert!(ill(FaultId::CheckALeaking, 0.5, HELD, Port::LoopA) < 0.5 * well(HELD, Port::LoopA));
    near(
        ill(FaultId::CheckALeaking, 0.5, HELD_BACK, Port::LoopB),
        well(HELD_BACK, Port::LoopB),
        1.0,
    );
}

#[test]
fn a_shut_check_hurts_the_other_direction() {
    let low_side = ill(FaultId::CheckAShut, 0.8, REVERSE, Port::LoopA);
    assert!(low_side < well(REVERSE, Port::LoopA) - 2.0, "{low_side}");
    near(
        ill(FaultId::CheckAShut, 0.8, FORWARD, Port::LoopA),
        well(FORWARD, Port::LoopA),
        1.0,
    );
}

#[test]
fn flushing_that_does_not_pass_reads_alike_whatever_stops_it() {
    let ids = [FaultId::OperatingReliefHigh, FaultId::ShuttleCentred];
    for ask in [NEUTRAL, FORWARD, REVERSE, LOADED] {
        for port in [Port::Charge, Port::LoopA, Port::MotorDrain] {
            near(
                ill(ids[0], 1.0, ask, port),
                ill(ids[1], 1.0, ask, port),
                0.1,
            );
        }
    }
    let fall = |id| ill(id, 1.0, NEUTRAL, Port::Charge) - ill(id, 1.0, FORWARD, Port::Charge);
    assert!(fall(ids[1]) < 0.2);
    assert!(well(NEUTRAL, Port::Charge) - well(FORWARD, Port::Charge) > 0.5);
}

#[test]
fn worn_charge_pump_and_restricted_inlet_have_opposite_speed_trends() {
    let lost =
        |id, severity, ask| well(ask, Port::ReturnFlow) - ill(id, severity, ask, Port::ReturnFlow);
    let worn =
        lost(FaultId::ChargePumpWorn, 0.5, LOW_IDLE) / lost(FaultId::ChargePumpWorn, 0.5, NEUTRAL);
    let starved = lost(FaultId::InletRestricted, 0.5, LOW_IDLE)
        / lost(FaultId::InletRestricted, 0.5, NEUTRAL);
    assert!(worn > 0.7 && starved < 0.3, "{worn} {starved}");
}

#[test]
fn a_relief_held_open_bleeds_low_idle_and_keeps_the_return() {
    let ratio = |id, s| ill(id, s, LOW_IDLE, Port::Charge) / ill(id, s, NEUTRAL, Port::Charge);
    assert!(ratio(FaultId::NeutralReliefStuckOpen, 0.7) < 0.7);
    assert!(ratio(FaultId::NeutralReliefLow, 0.7) > 0.8);
    near(
        ill(
            FaultId::NeutralReliefStuckOpen,
            0.7,
            NEUTRAL,
            Port::ReturnFlow,
        ),
        well(NEUTRAL, Port::ReturnFlow),
        0.5,
    );
    let leak = ill(FaultId::ConsumerLeak, 0.7, NEUTRAL, Port::ReturnFlow);
    assert!(leak < well(NEUTRAL, Port::ReturnFlow) - 4.0);
}

#[test]
fn a_restricted_return_lifts_the_gauge_and_not_charge_above_case() {
    for severity in [0.0, 0.5, 1.0] {
        let above = |charge: f64, case: f64| charge - case;
        let gauge = ill(
            FaultId::CaseReturnRestricted,
            severity,
            NEUTRAL,
            Port::Charge,
        );
        let case = ill(
            FaultId::CaseReturnRestricted,
            severity,
            NEUTRAL,
            Port::PumpCase,
        );
        assert!(gauge > well(NEUTRAL, Port::Charge) + 1.0);
        near(
            above(gauge, case),
            above(well(NEUTRAL, Port::Charge), well(NEUTRAL, Port::PumpCase)),
            0.6,
        );
    }
}

#[test]
fn what_only_sets_speed_says_nothing_in_charge() {
    for id in [
        FaultId::MotorStuckSmall,
        FaultId::LinkageShortForward,
        FaultId::LinkageShortReverse,
        FaultId::DrivetrainSlipping,
        FaultId::MotorShiftSupplyLow,
    ] {
        for ask in [NEUTRAL, FORWARD, REVERSE] {
            near(
                ill(id, 0.7, ask, Port::Charge),
                well(ask, Port::Charge),
                0.4,
            );
        }
    }
}

#[test]
fn neutral_off_shifts_the_shuttle_and_fills_the_motor_drain() {
    let off = ill(FaultId::ControlNullOff, 0.3, NEUTRAL, Port::MotorDrain);
    assert!(off > 5.0 * well(NEUTRAL, Port::MotorDrain));
}

/// Just noticeable must not be total, and total must not be just noticeable: what the drive still gives falls by stages.
#[test]
fn severity_spans_from_mild_to_no_push() {
    for (id, ask, port) in [
        (FaultId::CheckALeaking, HELD, Port::LoopA),
        (FaultId::BypassOpen, HELD, Port::LoopA),
        (FaultId::PumpWorn, HELD, Port::LoopA),
        (FaultId::MotorWorn, HELD, Port::LoopA),
        (FaultId::PumpWornAcross, HELD, Port::LoopA),
        (FaultId::OilLow, LOW_IDLE, Port::Charge),
        (FaultId::ChargePumpWorn, LOW_IDLE, Port::Charge),
        (FaultId::ConsumerLeak, LOW_IDLE, Port::Charge),
        (FaultId::NeutralReliefStuckOpen, LOW_IDLE, Port::Charge),
    ] {
        let (mild, total) = (
            ill(id, 0.0, ask, port) / well(ask, port),
            ill(id, 1.0, ask, port) / well(ask, port),
        );
        assert!(mild > 0.6 && mild < 1.0, "{id:?}: {mild}");
        assert!(total < 0.5, "{id:?}: {total}");
    }
}

#[test]
fn every_way_at_every_severity_has_a_state_in_neutral() {
    for f in super::all() {
        for effect in f.effects {
            for severity in [0.0, 0.25, 0.5, 0.75, 1.0] {
                for ask in [NEUTRAL, LOW_IDLE] {
                    let charge = read(effect.bends, severity, ask, Port::Charge);
                    assert!(
                        (-1.1..120.0).contains(&charge),
                        "{:?} {severity}: {charge}",
                        f.id
                    );
                }
            }
        }
    }
}
