//! Which check's precautions guard a reading.

use super::{Check, find};
use crate::readings::{Condition, Doing, Lever, Port};

/// The check that guards a reading of this port while the machine does this; none where nothing but looking is needed.
#[must_use]
pub fn for_condition(doing: Doing, port: Port) -> Option<&'static Check> {
    find(id(doing, port))
}

/// As [`for_condition`], with what the whole condition tells: full lever held, flushing blocked, consumers capped.
#[must_use]
pub fn for_reading(condition: &Condition, port: Port) -> Option<&'static Check> {
    let full = match condition.lever {
        Lever::Full => true,
        Lever::Share(share) => share > 0.5,
        Lever::Half | Lever::Feathered => false,
    };
    match condition.doing {
        Doing::Held if full => find("plateau"),
        Doing::Held | Doing::NeutralBridged | Doing::Overrun => {
            for_condition(condition.doing, port)
        }
        _ if condition.flushing_blocked => find("motor-drain-no-flushing"),
        _ if condition.consumers_capped => find("cap-a-consumer"),
        doing => for_condition(doing, port),
    }
}

fn id(doing: Doing, port: Port) -> &'static str {
    match (doing, port) {
        (Doing::Held, _) => "pressure-build-up",
        (Doing::NeutralBridged, _) => "bridge-the-servo",
        (Doing::Overrun, _) => "hold-back",
        (Doing::Neutral | Doing::NeutralFree, Port::Charge) => "charge-two-speeds",
        (_, Port::Charge) => "charge-both-ways",
        (_, Port::Knee) => "charge-knee",
        (_, Port::LoopA | Port::LoopB | Port::LoopDifference) => "free-run-difference",
        (_, Port::PumpCase | Port::MotorCase) => "case-pressures",
        (_, Port::InletPull) => "inlet-pull",
        (_, Port::Servo | Port::Pilot) => "servo-two-gauges",
        (_, Port::Release | Port::Shift) => "release-and-shift-pressure",
        (_, Port::CoilCurrent) => "coil-current",
        (_, Port::MotorDrain) => "motor-drain-in-neutral",
        (_, Port::ReturnFlow) => "return-flow-two-speeds",
        (_, Port::EngineSpeed | Port::PumpShaft) => "true-rpm",
        (Doing::Loaded, Port::MotorShaft | Port::Wheel | Port::Ground) => "slip-light-to-loaded",
        (_, Port::MotorShaft | Port::Wheel | Port::Ground) => "wheel-turns",
        (_, Port::ResponseOut | Port::ResponseBack) => "response-time",
        (_, Port::SettledTemperature) => "temperatures-by-place",
    }
}
