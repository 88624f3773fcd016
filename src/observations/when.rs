//! When and where the machine fails.

use super::{BASE, Family, Group, Observation};
use crate::faults::FaultId as F;

// Columns: air, inl, chg, dead, flu, one, two, worn, null, ctl, sig, mot, drg, slp, eng, heat, ok.
pub const TABLE: &[Observation] = &[
    Observation {
        id: "weak-hot",
        words: "Good cold, weak hot",
        group: Group::WhenItFails,
        family: Family::Weak,
        row: [
            0.10, 0.04, 0.45, 0.03, 0.30, 0.20, 0.20, 0.75, 0.05, 0.15, 0.06, 0.03, 0.15, 0.05,
            0.12, 0.85, 0.03,
        ],
        exceptions: &[
            (F::SignalWeak, 0.45),
            (F::InterlockOrDerate, 0.15),
            (F::ServoLeak, 0.40),
            (F::CaseReturnRestricted, 0.25),
            (F::CaseCouplingShut, 0.10),
            (F::WrongOrWetOil, 0.45),
            (F::PressureLimiterStuck, 0.15),
            (F::PressureLimiterALow, 0.04),
            (F::PressureLimiterBLow, 0.04),
            (F::ChargeStarvedByFunction, 0.12),
            (F::ChargeFilterBlocked, 0.08),
            (F::NeutralReliefLow, 0.15),
            (F::OperatorOrLoad, 0.10),
        ],
        ..BASE
    },
    Observation {
        id: "bad-cold",
        words: "Bad cold, better warm",
        group: Group::WhenItFails,
        family: Family::Weak,
        row: [
            0.15, 0.70, 0.05, 0.02, 0.03, 0.05, 0.03, 0.02, 0.05, 0.12, 0.05, 0.08, 0.05, 0.03,
            0.10, 0.05, 0.05,
        ],
        exceptions: &[
            (F::OilTooThick, 0.92),
            (F::ChargeFilterBlocked, 0.40),
            (F::InputDriveSlipping, 0.15),
        ],
        ..BASE
    },
    Observation {
        id: "worse-tilted",
        words: "Worse on a slope or in a turn",
        group: Group::WhenItFails,
        family: Family::Air,
        row: [
            0.50, 0.08, 0.06, 0.02, 0.02, 0.05, 0.04, 0.06, 0.05, 0.06, 0.12, 0.04, 0.06, 0.10,
            0.06, 0.03, 0.02,
        ],
        exceptions: &[
            (F::OilLow, 0.65),
            (F::InletAir, 0.30),
            (F::ChargeStarvedByFunction, 0.30),
            (F::OperatorOrLoad, 0.15),
            (F::InterlockOrDerate, 0.15),
        ],
        ..BASE
    },
    Observation {
        id: "worse-with-other-function",
        words: "Worse while steering or another function works",
        group: Group::WhenItFails,
        row: [
            0.08, 0.06, 0.06, 0.03, 0.02, 0.03, 0.03, 0.05, 0.02, 0.04, 0.04, 0.03, 0.04, 0.03,
            0.45, 0.04, 0.03,
        ],
        exceptions: &[
            (F::ChargeStarvedByFunction, 0.85),
            (F::InputDriveSlipping, 0.30),
            (F::OperatorOrLoad, 0.20),
        ],
        ..BASE
    },
    Observation {
        id: "engine-pulls-down",
        words: "Engine pulls down in ordinary travel",
        group: Group::WhenItFails,
        family: Family::Weak,
        row: [
            0.03, 0.03, 0.03, 0.02, 0.03, 0.05, 0.04, 0.06, 0.04, 0.06, 0.02, 0.45, 0.60, 0.02,
            0.95, 0.06, 0.05,
        ],
        exceptions: &[
            (F::MotorStuckSmall, 0.70),
            (F::MotorStuckLarge, 0.05),
            (F::MotorShiftSupplyLow, 0.06),
            (F::LoopHoseRestricted, 0.25),
            (F::OperatorOrLoad, 0.35),
            (F::OilTooThick, 0.20),
        ],
        ..BASE
    },
    Observation {
        id: "engine-not-loaded",
        words: "Engine does not pull down when pushing hard",
        how: "At a load it meets in its work anyway; never against the parking brake.",
        group: Group::WhenItFails,
        family: Family::Weak,
        row: [
            0.50, 0.45, 0.55, 0.95, 0.10, 0.55, 0.85, 0.60, 0.10, 0.40, 0.55, 0.03, 0.03, 0.75,
            0.02, 0.35, 0.06,
        ],
        exceptions: &[
            (F::InterlockOrDerate, 0.75),
            (F::SignalWeak, 0.60),
            (F::PressureLimiterALow, 0.85),
            (F::PressureLimiterBLow, 0.85),
            (F::LoopReliefALow, 0.70),
            (F::LoopReliefBLow, 0.70),
            (F::LoopReliefAHigh, 0.02),
            (F::LoopReliefBHigh, 0.02),
            (F::CaseReturnRestricted, 0.12),
            (F::CaseCouplingShut, 0.10),
            (F::ControlOrificeBlocked, 0.12),
            (F::FeedbackLinkWorn, 0.15),
            (F::MotorStuckLarge, 0.05),
            (F::MotorShiftSupplyLow, 0.05),
            (F::LoopHoseRestricted, 0.25),
        ],
        ..BASE
    },
    Observation {
        id: "jerks-off-late",
        words: "Moves off late with a jerk",
        group: Group::WhenItFails,
        row: [
            0.12, 0.05, 0.08, 0.03, 0.02, 0.04, 0.02, 0.03, 0.08, 0.15, 0.05, 0.03, 0.25, 0.12,
            0.03, 0.03, 0.03,
        ],
        exceptions: &[(F::BrakeNotReleased, 0.45), (F::FeedbackLinkWorn, 0.25)],
        ..BASE
    },
];
