//! What a walk round the machine finds, engine off.

use super::{BASE, Family, Observation, even};
use crate::faults::FaultId as F;

pub const TABLE: &[Observation] = &[
    Observation {
        id: "lamp-or-code",
        words: "Warning lamp or stored code for the drive",
        how: "Key on, engine off. Seat, door, brake and neutral switches are the commonest.",
        row: [
            0.06, 0.08, 0.15, 0.35, 0.05, 0.05, 0.05, 0.06, 0.05, 0.08, 0.30, 0.10, 0.08, 0.04,
            0.20, 0.20, 0.05,
        ],
        exceptions: &[
            (F::InterlockOrDerate, 0.65),
            (F::SignalWeak, 0.20),
            (F::BrakeNotReleased, 0.20),
            (F::ChargeFilterBlocked, 0.30),
        ],
        ..BASE
    },
    Observation {
        id: "plug-or-earth-bad",
        words: "Control plug, wire or earth loose, green or chafed",
        how: "Engine off before a plug is moved.",
        row: [
            0.05, 0.05, 0.05, 0.05, 0.05, 0.05, 0.05, 0.05, 0.05, 0.06, 0.50, 0.06, 0.06, 0.05,
            0.06, 0.05, 0.06,
        ],
        exceptions: &[
            (F::InterlockOrDerate, 0.30),
            (F::BrakeNotReleased, 0.15),
            (F::MotorShiftSupplyLow, 0.25),
        ],
        ..BASE
    },
    Observation {
        id: "linkage-loose",
        words: "Rod bent, cable loose or play at the pump arm",
        how: "Engine off. More than about 1 mm of play at the arm matters (common practice).",
        row: even(0.06),
        exceptions: &[
            (F::LinkageShortForward, 0.75),
            (F::LinkageShortReverse, 0.75),
            (F::FeedbackLinkWorn, 0.55),
            (F::ControlNullOff, 0.35),
            (F::InchingOff, 0.50),
            (F::StrokeStuck, 0.15),
            (F::AssemblyError, 0.12),
        ],
        ..BASE
    },
    Observation {
        id: "tow-valve-open",
        words: "Tow (bypass) valve found open or not tight",
        how: "Chock both ways first: while it is open the drive does not brake.",
        row: even(0.02),
        exceptions: &[(F::BypassOpen, 0.75), (F::AssemblyError, 0.06)],
        ..BASE
    },
    Observation {
        id: "suction-joint-bad",
        words: "Suction hose soft or cracked, or a clamp loose",
        family: Family::Air,
        row: even(0.04),
        exceptions: &[
            (F::InletAir, 0.60),
            (F::InletRestricted, 0.25),
            (F::OilLow, 0.08),
            (F::AssemblyError, 0.12),
        ],
        ..BASE
    },
    Observation {
        id: "cooler-clogged",
        words: "Cooler fins clogged, or fan slow",
        how: "Light through the fins, engine off: electric fans start by themselves.",
        family: Family::Heat,
        row: even(0.12),
        exceptions: &[(F::CoolerDirty, 0.92)],
        ..BASE
    },
    Observation {
        id: "drain-coupling-shut",
        words: "Drain coupling half home, or a drain hose kinked",
        how: "Before the engine is started. Never cap a drain.",
        row: even(0.02),
        exceptions: &[
            (F::CaseCouplingShut, 0.85),
            (F::CaseReturnRestricted, 0.25),
            (F::AssemblyError, 0.10),
        ],
        ..BASE
    },
    Observation {
        id: "belt-slips",
        words: "Pump belt glazed, slack or squealing; clutch or coupling dust",
        how: "Engine off, guards back on before it turns.",
        row: even(0.03),
        exceptions: &[(F::InputDriveSlipping, 0.65), (F::ChargeDriveFailed, 0.06)],
        ..BASE
    },
    Observation {
        id: "shaft-turns-wheel-not",
        words: "Motor shaft turns, wheel stays behind",
        how: "Chalk marks; wheels clear, stand off the line of the wheel.",
        row: even(0.02),
        exceptions: &[(F::DrivetrainSlipping, 0.90)],
        ..BASE
    },
];
