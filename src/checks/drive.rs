//! Speeds, times, free running, servo and release pressures.

use super::{BASE, Check};
use super::{Idle, Yield};
use crate::readings::{Direction, Doing, Lever, Port};

const FORWARD: Direction = Direction::Forward;
const REVERSE: Direction = Direction::Reverse;

pub const TABLE: &[Check] = &[
    Check {
        id: "wheel-turns",
        title: "Count wheel turns",
        how: &[
            "Wheels clear, or a 20 m course: full lever, forward and reverse, left and right. Tap the counter, at least 30 s.",
            "Mark motor shaft and wheel with chalk: do both turn?",
        ],
        instruments: "chalk, tap counter, stopwatch",
        yields: &[
            Yield::driven(Port::Wheel, Doing::Free, FORWARD, Lever::Full),
            Yield::driven(Port::Wheel, Doing::Free, REVERSE, Lever::Full),
            Yield::driven(Port::Wheel, Doing::Free, FORWARD, Lever::Half),
            Yield::driven(Port::Wheel, Doing::Travel, FORWARD, Lever::Full),
            Yield::driven(Port::Wheel, Doing::Travel, REVERSE, Lever::Full),
            Yield::driven(Port::Ground, Doing::Travel, FORWARD, Lever::Full),
            Yield::driven(Port::MotorShaft, Doing::Free, FORWARD, Lever::Full),
        ],
        answers: &[
            "shaft-turns-wheel-not",
            "fast-in-low",
            "top-speed-low",
            "hooks",
            "turns-alike-and-bends",
        ],
        minutes_first: 5.0,
        minutes_again: 2.0,
        hazard: 2,
        precautions: &["Counting from beside the line of the wheel; no hand near lugs"],
        separates: "Stroke, motor size, one direction, one side.",
        ..BASE
    },
    Check {
        id: "slip-light-to-loaded",
        title: "Slip from light to loaded",
        how: &[
            "Same lever, same engine speed: count the wheel on the flat, then up a grade or against a drag.",
            "What is lost from light to loaded is leakage of any kind. No port is opened.",
        ],
        instruments: "counter, stopwatch, tachometer",
        yields: &[
            Yield::driven(Port::Wheel, Doing::Travel, FORWARD, Lever::Full),
            Yield::driven(Port::Wheel, Doing::Loaded, FORWARD, Lever::Full),
            Yield::driven(Port::Charge, Doing::Loaded, FORWARD, Lever::Full),
            Yield::driven(Port::EngineSpeed, Doing::Loaded, FORWARD, Lever::Full),
        ],
        answers: &["engine-not-loaded", "relief-scream"],
        minutes_first: 8.0,
        minutes_again: 4.0,
        hazard: 2,
        precautions: &[
            "Slope under the limit in the operator's manual",
            "Nobody below, run-out empty",
        ],
        separates: "Wear of any kind from short stroke.",
        ..BASE
    },
    Check {
        id: "response-time",
        title: "Time to full speed and back",
        how: &[
            "Wheels clear, warm: lever to full in one move, stop the watch at full speed; then back. Three times each way.",
        ],
        instruments: "stopwatch",
        yields: &[
            Yield::driven(Port::ResponseOut, Doing::Free, FORWARD, Lever::Full),
            Yield::driven(Port::ResponseBack, Doing::Free, FORWARD, Lever::Full),
        ],
        answers: &["slow-to-answer"],
        minutes_first: 3.0,
        minutes_again: 1.0,
        hazard: 2,
        precautions: &["The machine stops when the lever goes back"],
        separates: "Control orifice, servo, air, cold oil: what no steady reading shows.",
        ..BASE
    },
    Check {
        id: "free-run-difference",
        title: "Loop difference running free",
        how: &[
            "Gauges on both loop ports, wheels clear, half and full speed, forward and reverse.",
            "What it takes to turn nothing: brake drag, a hose blocked, a motor in the small position.",
        ],
        instruments: "two 0 to 600 bar, microbore hoses rated 630 bar or more",
        yields: &[
            Yield::driven(Port::LoopA, Doing::Free, FORWARD, Lever::Half),
            Yield::driven(Port::LoopB, Doing::Free, REVERSE, Lever::Half),
            Yield::driven(Port::LoopA, Doing::Free, FORWARD, Lever::Full),
            Yield::driven(Port::LoopB, Doing::Free, FORWARD, Lever::Full),
        ],
        minutes_first: 15.0,
        minutes_again: 3.0,
        hazard: 2,
        precautions: &[
            "Engine off and loop bled down to connect; no coupling made or broken under pressure",
            "Gauges and hoses rated over the loop relief, in any condition; no 0 to 60 bar gauge without a protector",
            "Hoses tied clear of wheels and tracks",
        ],
        separates: "Brake drag, motor size, a restricted hose.",
        put_back: &["Loop ports plugged"],
        ..BASE
    },
    Check {
        id: "servo-two-gauges",
        title: "Servo or pilot pressure, both sides",
        how: &[
            "Two gauges on the servo ports (or on the pilot lines), wheels clear, neutral and then full lever both ways.",
            "Pressure asked and stroke not there: servo or pump. No pressure: signal, supply or control.",
        ],
        instruments: "two 0 to 60 bar",
        yields: &[
            Yield::driven(Port::Servo, Doing::Free, FORWARD, Lever::Full),
            Yield::driven(Port::Servo, Doing::Free, REVERSE, Lever::Full),
            Yield::driven(Port::Pilot, Doing::Free, FORWARD, Lever::Full),
            Yield::driven(Port::Pilot, Doing::Free, REVERSE, Lever::Full),
            Yield::neutral(Port::Servo, Idle::High).doing(Doing::NeutralFree),
        ],
        minutes_first: 15.0,
        minutes_again: 2.0,
        hazard: 2,
        precautions: &[
            "Servo or pilot ports identified on the drawing by two signs: a loop port bursts these gauges",
            "Engine off to fit",
        ],
        separates: "Signal and control from servo and pump.",
        put_back: &["Servo and pilot ports plugged"],
        ..BASE
    },
    Check {
        id: "release-and-shift-pressure",
        title: "Brake release and shift pressure",
        how: &[
            "Gauge on the release line: travel asked; then on the shift line: range changed.",
            "Under the brake's own release pressure it drags (common practice: begins at 8 to 14 bar, fully off at 13 to 20 bar).",
        ],
        instruments: "0 to 60 bar",
        yields: &[
            Yield::driven(Port::Release, Doing::Free, FORWARD, Lever::Half),
            Yield::driven(Port::Shift, Doing::Free, FORWARD, Lever::Half),
        ],
        answers: &["jerks-off-late"],
        minutes_first: 10.0,
        minutes_again: 2.0,
        hazard: 2,
        precautions: &[
            "This check releases the brake: chocks in place, nobody in the line of travel",
            "Engine off to fit",
        ],
        separates: "Brake not released from a brake that drags; shift valve from shift piston; one-sided shift.",
        put_back: &["Release and shift lines connected"],
        ..BASE
    },
    Check {
        id: "slope-hold",
        title: "Hold on a mild ramp",
        how: &[
            "Facing up a mild ramp, neutral, brake released, seat belt on: metres it rolls in a minute.",
            "Not with a suspected bypass, no charge, or a control that may not come back.",
        ],
        instruments: "tape, stopwatch",
        answers: &["rolls-in-neutral"],
        minutes_first: 3.0,
        minutes_again: 3.0,
        hazard: 3,
        precautions: &[
            "Empty run-out below the machine",
            "Service or parking brake tried first and holds",
            "Seat belt on",
            "Charge read and good, tow valve seen shut, control comes back to neutral",
        ],
        separates: "Bypass and wear across.",
        ..BASE
    },
    Check {
        id: "hold-back",
        title: "Hold back downhill",
        how: &[
            "Mild grade, empty run-out, slow: lever eased back going down. The other side of the loop holds the machine.",
            "Not with a suspected bypass, no charge, low relief on the holding side, or a control that may not come back.",
        ],
        instruments: "0 to 600 bar on the holding side, or charge gauge; filmed",
        yields: &[
            Yield::driven(Port::LoopB, Doing::Overrun, FORWARD, Lever::Half),
            Yield::driven(Port::Charge, Doing::Overrun, FORWARD, Lever::Half),
        ],
        minutes_first: 20.0,
        minutes_again: 5.0,
        hazard: 3,
        precautions: &[
            "Empty run-out below the machine, slope under the limit in the operator's manual",
            "Service brake tried first and holds",
            "Seat belt on",
            "Charge read and good, tow valve seen shut, control comes back to neutral",
        ],
        separates: "The relief and check of the side that brakes.",
        put_back: &["Loop ports plugged"],
        ..BASE
    },
];
