//! One gauge on charge.

use super::{BASE, Check};
use super::{Idle, Yield};
use crate::readings::{Direction, Doing, Lever, Port, Stroked};

const GAUGE: &str = "0 to 60 bar, class 1.0 (0 to 25 bar on small units)";
const PROVED: &str =
    "Charge port proved on the drawing, not guessed: a loop port bursts this gauge";

pub const TABLE: &[Check] = &[
    Check {
        id: "charge-two-speeds",
        title: "Charge pressure at two speeds",
        how: &[
            "Engine off to fit. The port is mostly on the charge pump cover or beside the charge filter; know which side of the filter.",
            "Neutral, low idle and high idle, warm. Leave the gauge on: differences on one gauge are sharp.",
            "Take case pressure too where you can: what counts is charge above case.",
        ],
        instruments: GAUGE,
        yields: &[
            Yield::neutral(Port::Charge, Idle::Low),
            Yield::neutral(Port::Charge, Idle::High),
        ],
        minutes_first: 10.0,
        minutes_again: 2.0,
        hazard: 1,
        precautions: &[PROVED, "Engine stopped while the gauge is fitted"],
        separates: "Whether the charge side is ill at all.",
        put_back: &["Charge port plugged"],
        ..BASE
    },
    Check {
        id: "charge-knee",
        title: "Speed where charge stops rising",
        how: &[
            "Hot, neutral: raise the throttle slowly from low idle, note the engine speed where the needle stops rising.",
            "Flat from the start is good. A late knee is a worn charge pump, a leak or a relief held open; flat and low is the setting.",
        ],
        instruments: "charge gauge and tachometer",
        yields: &[Yield::neutral(Port::Knee, Idle::High)],
        minutes_first: 13.0,
        minutes_again: 3.0,
        hazard: 1,
        precautions: &[PROVED, "Throttle raised slowly, hand on the stop"],
        separates: "Charge pump, relief, inlet, consumer: without any specification.",
        put_back: &["Charge port plugged"],
        ..BASE
    },
    Check {
        id: "charge-both-ways",
        title: "Charge while driven, forward and reverse",
        how: &[
            "Half stroke or less, light load, forward and reverse, the same gauge not moved. Film the needle.",
            "The difference between the two directions is the sharp evidence; the fall from neutral only where flushing is fitted.",
        ],
        instruments: GAUGE,
        yields: &[
            Yield::driven(Port::Charge, Doing::Free, Direction::Forward, Lever::Half),
            Yield::driven(Port::Charge, Doing::Free, Direction::Reverse, Lever::Half),
            Yield::driven(Port::Charge, Doing::Travel, Direction::Forward, Lever::Half),
            Yield::driven(Port::Charge, Doing::Travel, Direction::Reverse, Lever::Half),
        ],
        minutes_first: 14.0,
        minutes_again: 4.0,
        hazard: 2,
        precautions: &[
            PROVED,
            "Gauge hose tied clear of wheels and tracks, read from the seat or by phone film",
        ],
        separates: "Flushing, one direction, a shuttle stuck to one side.",
        put_back: &["Charge port plugged"],
        ..BASE
    },
    Check {
        id: "charge-one-side-alone",
        title: "Charge with one side driven alone",
        how: &[
            "Half stroke or less, light load: left alone, then right alone, then both, the same gauge not moved.",
            "A side that takes more than the other, or a fall while one side alone is driven, points to that side's leakage.",
        ],
        instruments: GAUGE,
        yields: &[
            Yield::driven(Port::Charge, Doing::Free, Direction::Forward, Lever::Half)
                .stroked(Stroked::Left),
            Yield::driven(Port::Charge, Doing::Free, Direction::Forward, Lever::Half)
                .stroked(Stroked::Right),
        ],
        minutes_first: 14.0,
        minutes_again: 3.0,
        hazard: 2,
        precautions: &[
            PROVED,
            "Tracks or wheels of both sides clear of the ground: one side driven alone turns the machine on the spot",
            "Gauge hose tied clear of wheels and tracks, read from the seat or by phone film",
        ],
        separates: "Which side takes the charge oil.",
        put_back: &["Charge port plugged"],
        two_path: true,
        ..BASE
    },
    Check {
        id: "cap-a-consumer",
        title: "Cap a consumer off",
        how: &[
            "Engine off: cap brake, shift, pilot or fan feed, one at a time, with rated caps. Then neutral, low idle.",
            "Charge that comes back names the leaking line.",
        ],
        instruments: "rated caps, charge gauge",
        yields: &[
            Yield::neutral(Port::Charge, Idle::Low).consumers_capped(),
            Yield::neutral(Port::Charge, Idle::High).consumers_capped(),
        ],
        // With the charge gauge to fit; 10 to cap where it stands already.
        minutes_first: 20.0,
        minutes_again: 10.0,
        hazard: 2,
        precautions: &[
            "A capped brake line keeps the brake on or, on some units, lets it roll: chocks both ways in place",
            "What is capped is a feed, not a drain",
            "Engine off while capping",
        ],
        separates: "A leaking consumer from a worn charge pump or a relief.",
        put_back: &["Brake, shift and pilot lines uncapped and tight"],
        ..BASE
    },
    Check {
        id: "work-another-function",
        title: "Work the steering or another function and watch charge",
        how: &[
            "Neutral, charge gauge in view: hold the steering at its stop, then work each function, then let go.",
            "Charge that falls with it is fed from that circuit.",
        ],
        instruments: "charge gauge",
        answers: &["worse-with-other-function"],
        minutes_first: 11.0,
        minutes_again: 1.0,
        hazard: 1,
        precautions: &["Area of arms, attachment and articulation empty of people"],
        separates: "Charge fed from another circuit.",
        put_back: &["Charge port plugged"],
        ..BASE
    },
    Check {
        id: "inlet-pull",
        title: "Inlet pull",
        how: &[
            "Tee at the charge pump inlet, low idle and high idle, warm; once cold if it is only bad cold.",
            "Much pull at speed: restriction. Less pull than normal with noise: air.",
        ],
        instruments: "vacuum gauge, −1 to +1.5 bar",
        yields: &[
            Yield::neutral(Port::InletPull, Idle::Low),
            Yield::neutral(Port::InletPull, Idle::High),
        ],
        minutes_first: 10.0,
        minutes_again: 2.0,
        hazard: 1,
        precautions: &[
            "Tee and fitting air-tight: or the check makes the fault",
            "Engine off to fit",
        ],
        separates: "Restricted inlet, suction filter, air leak.",
        put_back: &["Suction tee out, joint tight, level checked"],
        ..BASE
    },
];
