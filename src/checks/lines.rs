//! Low-pressure lines: case, drain, return.

use super::{BASE, Check};
use super::{Idle, Yield};
use crate::readings::{Direction, Doing, Lever, Port};

const HOT_OIL: &str = "Goggles and long gloves on: oil over 60 °C scalds";
const NOT_CAPPED: &str =
    "The drain stays open: what is plugged is the machine side, never the case";

pub const TABLE: &[Check] = &[
    Check {
        id: "case-pressures",
        title: "Case pressures",
        how: &[
            "Tee in the drain of pump case and of motor case, neutral high idle, then driven.",
            "Warm a few bar at most; more when cold (common practice: the unit's seal limit is in its manual).",
        ],
        instruments: "0 to 10 bar",
        yields: &[
            Yield::neutral(Port::PumpCase, Idle::High),
            Yield::neutral(Port::MotorCase, Idle::High),
            Yield::driven(Port::PumpCase, Doing::Free, Direction::Forward, Lever::Half),
            Yield::driven(
                Port::MotorCase,
                Doing::Free,
                Direction::Forward,
                Lever::Half,
            ),
        ],
        answers: &["seal-weeps", "drain-coupling-shut"],
        minutes_first: 10.0,
        minutes_again: 2.0,
        hazard: 1,
        precautions: &[
            "Engine off to fit, couplings pushed home",
            "Seals watched from the side; stop if one weeps more",
        ],
        separates: "Restricted return, worn motor, cold oil; and what charge is above case.",
        put_back: &["Drain couplings home, tees out"],
        ..BASE
    },
    Check {
        id: "return-flow-two-speeds",
        title: "Total return flow at two speeds",
        how: &[
            "Flow meter in the common return, full bore, neutral, low and high idle.",
            "All that the charge pump delivers comes back here: this is the charge pump's flow test, and says nothing of pump or motor wear.",
        ],
        instruments: "flow meter 5 to 60 L/min; no jug above 10 L/min",
        yields: &[
            Yield::neutral(Port::ReturnFlow, Idle::Low),
            Yield::neutral(Port::ReturnFlow, Idle::High),
        ],
        minutes_first: 15.0,
        minutes_again: 3.0,
        hazard: 2,
        precautions: &[
            "Meter of full bore, nothing throttled",
            "Hose end tied; tank level watched by someone",
            "No jug where more than 10 L/min can come: 30 L/min fills 5 L in 10 s",
            HOT_OIL,
        ],
        separates: "Worn charge pump from a relief held open from a leaking consumer.",
        put_back: &["Return line connected, level checked"],
        ..BASE
    },
    Check {
        id: "motor-drain-in-neutral",
        title: "Motor drain in neutral",
        how: &[
            "Motor drain hose off and led into a jug; the machine side plugged. Neutral, high idle, no creep, 30 s or more.",
            "In neutral a centred shuttle passes nothing, so this is the motor's own leak, blind to the pump.",
            "More than about 8 L/min (common practice) is flushing oil: neutral is off or the shuttle open. Stop, that is not leakage.",
            "Compare with the other side or with this unit's own past.",
        ],
        instruments: "jug 1 to 5 L and stopwatch",
        yields: &[Yield::neutral(Port::MotorDrain, Idle::High)],
        minutes_first: 12.0,
        minutes_again: 3.0,
        hazard: 2,
        precautions: &[
            "Low-pressure drain line identified: nothing else is opened",
            NOT_CAPPED,
            "Hose end tied into the jug, stop switch in reach",
            "Tank level enough for what is drawn",
            HOT_OIL,
        ],
        separates: "Motor case wear, without the pump.",
        put_back: &["Motor drain hose on, case full, level checked"],
        ..BASE
    },
    Check {
        id: "motor-drain-no-flushing",
        title: "Motor drain while driven, flushing blocked",
        how: &[
            "Only where the unit's manual shows how flushing is blocked. Then as in neutral, driven lightly, 2 minutes at most.",
            "With flushing open the drain in drive is mostly flushing oil and says next to nothing of wear.",
        ],
        instruments: "jug and stopwatch, or flow meter",
        yields: &[
            Yield::driven(
                Port::MotorDrain,
                Doing::Free,
                Direction::Forward,
                Lever::Half,
            )
            .flushing_blocked(),
            Yield::driven(
                Port::MotorDrain,
                Doing::Free,
                Direction::Reverse,
                Lever::Half,
            )
            .flushing_blocked(),
        ],
        minutes_first: 25.0,
        minutes_again: 5.0,
        hazard: 2,
        precautions: &[
            "Flushing blocked as the unit's manual shows, and a tag hung on the key",
            "2 minutes at most: the loop heats without flushing",
            NOT_CAPPED,
            "Hose end tied, clear of the wheels",
            HOT_OIL,
        ],
        separates: "Motor from pump under load.",
        put_back: &[
            "Flushing plug out, flushing open again",
            "Motor drain hose on, case full, level checked",
        ],
        ..BASE
    },
];
