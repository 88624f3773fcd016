//! What is found when something is opened, swapped or moved by hand: the outcome of a check that leaves no reading.

use super::{BASE, Group, Observation, even};
use crate::faults::FaultId as F;

// Columns: air, inl, chg, dead, flu, one, two, worn, null, ctl, sig, mot, drg, slp, eng, heat, ok.
pub const TABLE: &[Observation] = &[
    Observation {
        id: "switch-does-not-change",
        words: "A seat, door, brake or neutral switch does not change",
        how: "Key on, engine off, one switch after the other, on the display or by meter. None bridged to drive.",
        group: Group::Found,
        row: even(0.03),
        exceptions: &[(F::InterlockOrDerate, 0.75), (F::BrakeNotReleased, 0.08)],
        ..BASE
    },
    Observation {
        id: "plugs-change-direction",
        words: "Bad direction changes over with the two control plugs",
        how: "Engine off while plugs are moved; low idle, a little lever: it goes the other way.",
        group: Group::Found,
        row: even(0.03),
        exceptions: &[
            (F::SignalLostForward, 0.90),
            (F::SignalLostReverse, 0.90),
            (F::SignalWeak, 0.10),
        ],
        ..BASE
    },
    Observation {
        id: "signals-change-sides",
        words: "Trouble changes sides with the control signals",
        how: "Engine off while plugs or pilot lines are moved; tracks or wheels clear; low idle, a little lever: left asks right.",
        group: Group::Found,
        two_path: true,
        row: [
            0.03, 0.03, 0.03, 0.03, 0.03, 0.03, 0.03, 0.03, 0.05, 0.12, 0.85, 0.03, 0.03, 0.03,
            0.03, 0.03, 0.03,
        ],
        exceptions: &[
            (F::ControlOrificeBlocked, 0.05),
            (F::FeedbackLinkWorn, 0.04),
            (F::ServoLeak, 0.04),
            (F::PathsStrokeMismatch, 0.25),
        ],
        ..BASE
    },
    Observation {
        id: "hoses-change-sides",
        words: "Trouble changes sides with the loop hoses",
        how: "Only after a clean debris check. Loop bled, tracks or wheels clear, no travel: the left pump drives the right motor.",
        group: Group::Found,
        two_path: true,
        row: [
            0.05, 0.05, 0.05, 0.05, 0.08, 0.90, 0.60, 0.50, 0.92, 0.92, 0.92, 0.05, 0.04, 0.04,
            0.05, 0.05, 0.05,
        ],
        exceptions: &[
            (F::PumpWorn, 0.92),
            (F::PumpWornAcross, 0.92),
            (F::MotorWorn, 0.05),
            (F::MotorWornAcross, 0.05),
            (F::TyreOrTrackMismatch, 0.03),
        ],
        ..BASE
    },
    Observation {
        id: "arm-gives-speed",
        words: "Arm moved by hand at the pump gives the speed that the lever does not",
        how: "Wheels clear, rod off at the arm, low idle, hand and spanner clear of an arm that jumps.",
        group: Group::Found,
        row: even(0.04),
        exceptions: &[
            (F::LinkageShortForward, 0.92),
            (F::LinkageShortReverse, 0.92),
            (F::FeedbackLinkWorn, 0.20),
            (F::InchingOff, 0.20),
        ],
        ..BASE
    },
    Observation {
        id: "shuttle-centred",
        words: "Shuttle spool stuck in the middle, or its spring broken",
        how: "Loop bled. The spool slides by its own weight; both springs whole.",
        group: Group::Found,
        row: even(0.02),
        exceptions: &[(F::ShuttleCentred, 0.92)],
        ..BASE
    },
    Observation {
        id: "shuttle-to-one-side",
        words: "Shuttle spool stuck to one side",
        how: "Loop bled. Note to which side before it is moved.",
        group: Group::Found,
        row: even(0.02),
        exceptions: &[(F::ShuttleStuckA, 0.92), (F::ShuttleStuckB, 0.92)],
        ..BASE
    },
    Observation {
        id: "flushing-relief-bad",
        words: "Flushing relief stuck, worn or wrongly shimmed",
        how: "Count shims, measure the spring; the manual has both.",
        group: Group::Found,
        row: even(0.03),
        exceptions: &[
            (F::OperatingReliefHigh, 0.90),
            (F::OperatingReliefLow, 0.88),
        ],
        ..BASE
    },
    Observation {
        id: "flushing-orifice-blocked",
        words: "Flushing orifice blocked",
        how: "Light through it? No drill.",
        group: Group::Found,
        row: even(0.02),
        exceptions: &[(F::FlushingOrificeBlocked, 0.95)],
        ..BASE
    },
    Observation {
        id: "cartridges-change-direction",
        words: "Bad direction changes over with the two loop cartridges",
        how: "Both marked, both of one setting, torqued as the manual says.",
        group: Group::Found,
        row: even(0.03),
        exceptions: &[
            (F::CheckALeaking, 0.92),
            (F::CheckBLeaking, 0.92),
            (F::CheckAShut, 0.90),
            (F::CheckBShut, 0.90),
            (F::LoopReliefALow, 0.92),
            (F::LoopReliefBLow, 0.92),
            (F::LoopReliefAHigh, 0.85),
            (F::LoopReliefBHigh, 0.85),
        ],
        ..BASE
    },
    Observation {
        id: "pump-alone-no-pressure",
        words: "Pump alone, its ports capped, builds no pressure at a small stroke",
        how: "Plugs of full pressure, chocks both ways, low idle, feathered. Not a reading of the whole drive: only so or not.",
        group: Group::Found,
        row: [
            0.15, 0.15, 0.20, 0.90, 0.05, 0.45, 0.45, 0.88, 0.05, 0.30, 0.50, 0.04, 0.04, 0.04,
            0.06, 0.15, 0.03,
        ],
        exceptions: &[
            (F::PumpWornAcross, 0.92),
            (F::MotorWorn, 0.05),
            (F::MotorWornAcross, 0.05),
            (F::LoopHoseRestricted, 0.04),
            (F::CheckAShut, 0.10),
            (F::CheckBShut, 0.10),
            (F::ShuttleStuckA, 0.04),
            (F::ShuttleStuckB, 0.04),
            (F::BypassOpen, 0.60),
            (F::PressureLimiterStuck, 0.03),
            (F::BrakeNotReleased, 0.04),
        ],
        ..BASE
    },
    Observation {
        id: "oil-runs-thin",
        words: "Oil runs down faster than new oil of the right grade",
        how: "Same temperature, two like bottles.",
        group: Group::Found,
        row: even(0.05),
        exceptions: &[(F::OilTooThin, 0.80), (F::WrongOrWetOil, 0.45)],
        ..BASE
    },
    Observation {
        id: "oil-runs-thick",
        words: "Oil runs down slower than new oil of the right grade",
        how: "Same temperature, two like bottles.",
        group: Group::Found,
        row: even(0.04),
        exceptions: &[(F::OilTooThick, 0.80), (F::WrongOrWetOil, 0.30)],
        ..BASE
    },
    Observation {
        id: "turns-hard-by-hand",
        words: "Wheel turns hard with the tow valve open",
        how: "No brake and no drive left: chocks and tow bar before the valve is touched.",
        group: Group::Found,
        row: even(0.05),
        exceptions: &[
            (F::BrakeDragging, 0.92),
            (F::BrakeNotReleased, 0.60),
            (F::AssemblyError, 0.10),
        ],
        ..BASE
    },
];
