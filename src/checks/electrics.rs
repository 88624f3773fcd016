//! Electrics and linkage before oil: no pipe opened.

use super::Yield;
use super::facts::NOT_ALONE;
use super::{BASE, Check};
use crate::readings::{Direction, Doing, Lever, Port};

pub const TABLE: &[Check] = &[
    Check {
        id: "interlock-and-codes",
        title: "Interlocks and codes",
        how: &[
            "Key on, engine off: lamps, stored codes, then seat, door, brake and neutral switches one by one.",
            "See each switch change on the display or by meter.",
        ],
        instruments: "display or reader, meter",
        answers: &["lamp-or-code", "switch-does-not-change"],
        minutes_first: 4.0,
        minutes_again: 2.0,
        hazard: 1,
        precautions: &[
            "Engine off and cannot be started by another person",
            "No seat or door switch strapped down to drive",
        ],
        separates: "A drive that is not asked from one that cannot.",
        put_back: &["Seat, door and brake switches as found: none bridged"],
        ..BASE
    },
    Check {
        id: "coil-current",
        title: "Coil current",
        how: &[
            "At the control plug: volts, ohms of both coils cold and hot, then current with the lever moved, both directions.",
            "If the coil is driven with key on and engine off, read it so. Otherwise wheels clear.",
            "Hot copper resists more: a hot coil on the same volts has about a quarter less current at 80 K more.",
        ],
        instruments: "series or clamp meter 0 to 3 A, ohms, volts",
        yields: &[
            Yield::driven(
                Port::CoilCurrent,
                Doing::Free,
                Direction::Forward,
                Lever::Full,
            ),
            Yield::driven(
                Port::CoilCurrent,
                Doing::Free,
                Direction::Reverse,
                Lever::Full,
            ),
        ],
        answers: &["plug-or-earth-bad"],
        minutes_first: 6.0,
        minutes_again: 2.0,
        hazard: 2,
        precautions: &[
            "Engine off while a plug is pulled or put on",
            "Meter leads tied clear of shafts and wheels",
        ],
        separates: "Signal lost or weak, forward against reverse, hot coil.",
        put_back: &["Control plugs home and locked"],
        ..BASE
    },
    Check {
        id: "swap-plugs",
        title: "Swap the control plugs",
        how: &[
            "Engine off: change the two control plugs over, forward and reverse (on two-path machines also left and right).",
            "Start at low idle. The machine answers the other way: lever a little only.",
            "The fault changes over: wire, plug or controller. It stays: coil, valve or pump.",
        ],
        instruments: "none",
        answers: &["plugs-change-direction"],
        minutes_first: 5.0,
        minutes_again: 2.0,
        hazard: 2,
        precautions: &[
            "Engine off while plugs are moved",
            "The person in the seat knows that it goes the other way",
        ],
        separates: "Signal from valve and pump, without a gauge.",
        put_back: &["Control plugs back on their own coils"],
        ..BASE
    },
    Check {
        id: "swap-side-signals",
        title: "Swap the control signals left and right",
        how: &[
            "Engine off: change the plugs or pilot lines of the left and the right pump over, forward with forward.",
            "Start at low idle, a little lever: left asks right. The trouble changes sides: signal, lever or controller. It stays: pump, motor or brake of that side.",
        ],
        instruments: "none; caps and rag for pilot lines",
        answers: &["signals-change-sides"],
        minutes_first: 5.0,
        minutes_again: 2.0,
        hazard: 3,
        precautions: &[
            "Engine off while plugs or lines are moved",
            "Every driven wheel or track clear of the ground; no travel while steering is reversed",
            "The person in the seat knows that left asks right",
            NOT_ALONE,
        ],
        separates: "Signal of a side from its hydraulics, without a gauge.",
        put_back: &["Control signals back on their own side, steering proved"],
        two_path: true,
        ..BASE
    },
    Check {
        id: "stroke-arm-by-hand",
        title: "Move the pump arm by hand",
        how: &[
            "Rod or cable off at the pump arm, low idle, mark the arm.",
            "Does the creep stop with the rod off? Does the arm go further than the rod took it, and speed with it?",
        ],
        instruments: "spanner, marker",
        answers: &["linkage-loose", "arm-gives-speed"],
        minutes_first: 10.0,
        minutes_again: 3.0,
        hazard: 2,
        precautions: &[
            "Every driven wheel or track clear of the ground: one wheel down drives it off the stands",
            "Hands and spanner out of the way of an arm that jumps",
            "Engine off to take the rod off and to refit it",
        ],
        separates: "Linkage from control from pump.",
        put_back: &["Control rod back on and locked, neutral proved"],
        ..BASE
    },
];
