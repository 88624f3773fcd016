//! Held checks and pump isolation: last, or never.

use super::facts::NOT_ALONE;
use super::{BASE, Check, Idle, Yield};
use crate::readings::{Direction, Doing, Lever, Port};

const FORWARD: Direction = Direction::Forward;
const REVERSE: Direction = Direction::Reverse;

const BLOCKED: &str = "Motor blocked by capped ports, or machine against something that cannot move: not by the parking brake alone";
const NOBODY: &str = "Nobody in front or behind, nobody beside the hoses";
const KNOWN_GOOD: &str =
    "Oil level, charge pressure and oil temperature (40 to 80 °C) read and good";
const RATED: &str =
    "Gauge, hoses and caps rated over the loop relief; connected with engine off and loop bled";

const fn held(port: Port, direction: Direction, share: f64) -> Yield {
    Yield::driven(port, Doing::Held, direction, Lever::Share(share)).at(Idle::Middle)
}

pub const TABLE: &[Check] = &[
    Check {
        id: "pressure-build-up",
        title: "Staged build-up, motor blocked",
        how: &[
            "1200 to 1500 rpm. Creep the lever to 5, 10, 20 and 40 % of stroke, 3 to 5 s a step, 60 s rest between; stop at 60 % of the plate setting first.",
            "Straight: leakage of worn faces. Curved: a seat or bypass. Flat: relief or limiter.",
            "At full stroke a small leak reads like a healthy machine: the small steps tell, and they are safer.",
        ],
        instruments: "0 to 600 bar",
        yields: &[
            held(Port::LoopA, FORWARD, 0.05),
            held(Port::LoopA, FORWARD, 0.10),
            held(Port::LoopA, FORWARD, 0.20),
            held(Port::LoopA, FORWARD, 0.40),
            held(Port::LoopB, REVERSE, 0.05),
            held(Port::LoopB, REVERSE, 0.10),
            held(Port::LoopB, REVERSE, 0.20),
            held(Port::LoopB, REVERSE, 0.40),
        ],
        minutes_first: 21.0,
        minutes_again: 6.0,
        hazard: 3,
        precautions: &[
            BLOCKED,
            NOBODY,
            KNOWN_GOOD,
            RATED,
            "Pressure to stop at and seconds to hold read off and agreed",
            NOT_ALONE,
        ],
        separates: "Worn faces, leaking seat or bypass, relief or limiter: by the shape.",
        put_back: &[
            "Motor port caps off, hoses on and tight",
            "Loop ports plugged",
        ],
        ..BASE
    },
    Check {
        id: "plateau",
        title: "Plateau, motor blocked",
        how: &[
            "Only when the staged build-up leaves the question open. The least stroke at which the needle stops rising.",
            "Hold no longer than the seconds shown, then rest 60 s; two tries a side.",
            "Not a leak reading for charge: at full relief flow the low side's check starves it.",
        ],
        instruments: "0 to 600 bar",
        yields: &[
            Yield::driven(Port::LoopA, Doing::Held, FORWARD, Lever::Full).at(Idle::Middle),
            Yield::driven(Port::LoopB, Doing::Held, REVERSE, Lever::Full).at(Idle::Middle),
        ],
        minutes_first: 18.0,
        minutes_again: 3.0,
        hazard: 3,
        precautions: &[
            BLOCKED,
            NOBODY,
            KNOWN_GOOD,
            RATED,
            "Pressure to stop at and seconds to hold read off and agreed: 3 s at most at full flow, two tries a side",
            NOT_ALONE,
        ],
        separates: "Setting of relief or limiter.",
        put_back: &[
            "Motor port caps off, hoses on and tight",
            "Loop ports plugged",
        ],
        after: "pressure-build-up",
        ..BASE
    },
    Check {
        id: "isolate-the-pump",
        title: "Pump alone, its ports capped",
        how: &[
            "Loop hoses off at the pump, ports closed with full-pressure plugs. Low idle, feather the lever: does it build?",
            "Builds at small stroke: the pump is good, look at motor and lines. Does not: pump, cartridges or bypass.",
        ],
        instruments: "0 to 600 bar, full-pressure plugs",
        // No reading of the whole drive: the motor is off, and what the gauge shows is not what the circuit foretells.
        answers: &["pump-alone-no-pressure"],
        minutes_first: 35.0,
        minutes_again: 5.0,
        hazard: 3,
        precautions: &[
            "Chocks both ways before the spanner touches: no braking from the drive now",
            "Loop relieved: engine off, everything lowered, one turn behind a rag, waited",
            "Plugs rated 1.5 times the loop relief or more",
            KNOWN_GOOD,
            NOT_ALONE,
        ],
        separates: "Pump from motor; bypass; lines.",
        put_back: &["Loop hoses on and tight, filled, charge proved before driving"],
        ..BASE
    },
    Check {
        id: "bridge-the-servo",
        title: "Bridge the servo ports",
        how: &[
            "Engine off: short hose between the two servo ports. Wheels clear, low idle.",
            "Creeps bridged: the servo's own centre. Creeps only unbridged: the control.",
        ],
        instruments: "short hose rated for loop pressure",
        yields: &[
            Yield::driven(Port::Wheel, Doing::NeutralBridged, FORWARD, Lever::Full),
            Yield::driven(
                Port::LoopDifference,
                Doing::NeutralBridged,
                FORWARD,
                Lever::Full,
            ),
        ],
        minutes_first: 15.0,
        minutes_again: 3.0,
        hazard: 3,
        precautions: &[
            "Both servo ports identified on the drawing by two signs: a bridge across the loop fails with injection force",
            "Bridge hose rated for loop pressure all the same",
            "Engine off to fit and to remove: it can jump",
            NOT_ALONE,
        ],
        separates: "Control neutral from servo neutral.",
        put_back: &["Bridge hose off, servo ports plugged"],
        ..BASE
    },
];
