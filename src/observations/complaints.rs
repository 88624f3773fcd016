//! Complaints.

use super::{BASE, Family, Group, Observation, even};
use crate::faults::FaultId as F;
use crate::readings::Path;

/// Id of the complaint that stops all work.
pub const RUNS_ON: &str = "runs-on";

// Columns: air, inl, chg, dead, flu, one, two, worn, null, ctl, sig, mot, drg, slp, eng, heat, ok.
pub const TABLE: &[Observation] = &[
    Observation {
        id: RUNS_ON,
        words: "Keeps going with the lever back in neutral",
        how: "Ask, never try it. If it is so: stop the engine, chock both ways, do not drive it onto a trailer.",
        group: Group::Complaint,
        row: [
            0.02, 0.02, 0.02, 0.02, 0.02, 0.03, 0.03, 0.02, 0.15, 0.08, 0.02, 0.02, 0.02, 0.02,
            0.02, 0.02, 0.02,
        ],
        exceptions: &[
            (F::StrokeStuck, 0.97),
            (F::ControlOrificeBlocked, 0.35),
            (F::FeedbackLinkWorn, 0.20),
            (F::LoopReliefBLow, 0.12),
            (F::LoopReliefALow, 0.06),
            (F::DrivetrainSlipping, 0.10),
        ],
        ..BASE
    },
    Observation {
        id: "weak-both-ways",
        words: "Weak or slow in both directions",
        group: Group::Complaint,
        family: Family::Weak,
        row: [
            0.45, 0.45, 0.55, 0.05, 0.10, 0.05, 0.85, 0.85, 0.05, 0.35, 0.06, 0.35, 0.55, 0.40,
            0.75, 0.60, 0.04,
        ],
        exceptions: &[
            (F::InterlockOrDerate, 0.35),
            (F::SignalWeak, 0.55),
            (F::InputDriveSlipping, 0.70),
            (F::LoopHoseRestricted, 0.45),
            (F::PressureLimiterStuck, 0.06),
            (F::CaseReturnRestricted, 0.20),
            (F::CaseCouplingShut, 0.12),
            (F::WrongOrWetOil, 0.45),
            (F::OperatorOrLoad, 0.30),
            (F::MotorStuckSmall, 0.70),
            (F::MotorStuckLarge, 0.05),
            (F::MotorShiftSupplyLow, 0.06),
            (F::ControlOrificeBlocked, 0.08),
            (F::PilotSupplyLow, 0.45),
            (F::FeedbackLinkWorn, 0.12),
            (F::InchingOff, 0.60),
            (F::LinkageShortForward, 0.05),
            (F::LinkageShortReverse, 0.05),
            (F::StrokeStuck, 0.03),
            (F::NeutralReliefHigh, 0.04),
        ],
        ..BASE
    },
    Observation {
        id: "one-direction",
        words: "Bad in one direction only",
        group: Group::Complaint,
        family: Family::Direction,
        row: [
            0.02, 0.02, 0.02, 0.02, 0.02, 0.90, 0.08, 0.04, 0.12, 0.35, 0.85, 0.02, 0.04, 0.05,
            0.02, 0.02, 0.02,
        ],
        exceptions: &[
            (F::LinkageShortForward, 0.95),
            (F::LinkageShortReverse, 0.95),
            (F::FeedbackLinkWorn, 0.10),
            (F::ControlOrificeBlocked, 0.10),
            (F::ServoLeak, 0.35),
            (F::PilotSupplyLow, 0.05),
            (F::InchingOff, 0.03),
            (F::InterlockOrDerate, 0.04),
            (F::SignalWeak, 0.08),
            (F::LoopHoseRestricted, 0.35),
            (F::StrokeStuck, 0.30),
        ],
        ..BASE
    },
    Observation {
        id: "no-drive",
        words: "No drive either way",
        group: Group::Complaint,
        family: Family::Weak,
        row: [
            0.08, 0.06, 0.12, 0.95, 0.02, 0.02, 0.15, 0.06, 0.02, 0.15, 0.15, 0.02, 0.12, 0.20,
            0.02, 0.02, 0.02,
        ],
        exceptions: &[
            (F::InterlockOrDerate, 0.50),
            (F::SignalWeak, 0.05),
            (F::SignalLostForward, 0.05),
            (F::SignalLostReverse, 0.05),
            (F::InchingOff, 0.25),
            (F::BrakeNotReleased, 0.35),
            (F::BrakeDragging, 0.05),
            (F::InputDriveSlipping, 0.15),
            (F::LinkageShortForward, 0.03),
            (F::LinkageShortReverse, 0.03),
            (F::ControlOrificeBlocked, 0.03),
            (F::FeedbackLinkWorn, 0.03),
            (F::OperatorOrLoad, 0.05),
        ],
        ..BASE
    },
    Observation {
        id: "creeps",
        words: "Creeps in neutral",
        how: "Ask, or see it with every driven wheel or track clear of the ground.",
        group: Group::Complaint,
        row: [
            0.03, 0.02, 0.02, 0.02, 0.02, 0.03, 0.02, 0.03, 0.93, 0.20, 0.03, 0.03, 0.02, 0.02,
            0.02, 0.02, 0.02,
        ],
        exceptions: &[
            (F::ServoNullOff, 0.60),
            (F::FeedbackLinkWorn, 0.50),
            (F::PilotSupplyLow, 0.03),
            (F::ControlOrificeBlocked, 0.08),
            (F::InchingOff, 0.03),
            (F::ServoLeak, 0.08),
        ],
        ..BASE
    },
    Observation {
        id: "surges",
        words: "Surges or hunts",
        group: Group::Complaint,
        family: Family::Air,
        row: [
            0.55, 0.25, 0.15, 0.05, 0.05, 0.12, 0.10, 0.10, 0.08, 0.35, 0.10, 0.04, 0.12, 0.15,
            0.20, 0.06, 0.02,
        ],
        exceptions: &[
            (F::FeedbackLinkWorn, 0.65),
            (F::CheckAShut, 0.50),
            (F::CheckBShut, 0.50),
            (F::SignalWeak, 0.20),
            (F::ChargeStarvedByFunction, 0.45),
            (F::WrongOrWetOil, 0.25),
            (F::LinkageShortForward, 0.10),
            (F::LinkageShortReverse, 0.10),
            (F::ControlOrificeBlocked, 0.15),
        ],
        ..BASE
    },
    Observation {
        id: "slow-to-answer",
        words: "Slow to answer the lever",
        group: Group::Complaint,
        family: Family::Weak,
        row: [
            0.45, 0.30, 0.40, 0.20, 0.05, 0.06, 0.06, 0.15, 0.05, 0.60, 0.06, 0.05, 0.12, 0.05,
            0.20, 0.12, 0.03,
        ],
        exceptions: &[
            (F::ControlOrificeBlocked, 0.95),
            (F::LinkageShortForward, 0.15),
            (F::LinkageShortReverse, 0.15),
            (F::SignalWeak, 0.25),
            (F::BrakeNotReleased, 0.30),
            (F::OilTooThick, 0.60),
        ],
        ..BASE
    },
    Observation {
        id: "top-speed-low",
        words: "Top speed low, pull normal",
        group: Group::Complaint,
        family: Family::Weak,
        row: [
            0.06, 0.06, 0.10, 0.02, 0.05, 0.05, 0.04, 0.10, 0.04, 0.50, 0.06, 0.50, 0.20, 0.04,
            0.35, 0.08, 0.03,
        ],
        exceptions: &[
            (F::MotorStuckLarge, 0.95),
            (F::MotorShiftSupplyLow, 0.85),
            (F::MotorStuckSmall, 0.03),
            (F::SignalWeak, 0.50),
            (F::InterlockOrDerate, 0.25),
            (F::PilotSupplyLow, 0.75),
            (F::ControlOrificeBlocked, 0.08),
            (F::FeedbackLinkWorn, 0.25),
            (F::LoopHoseRestricted, 0.35),
            (F::OperatorOrLoad, 0.15),
        ],
        ..BASE
    },
    Observation {
        id: "fast-in-low",
        words: "Too fast in the low range, poor pull",
        group: Group::Complaint,
        row: [
            0.02, 0.02, 0.02, 0.02, 0.02, 0.02, 0.02, 0.02, 0.02, 0.03, 0.02, 0.50, 0.02, 0.03,
            0.02, 0.02, 0.02,
        ],
        exceptions: &[
            (F::MotorStuckSmall, 0.90),
            (F::MotorStuckLarge, 0.02),
            (F::MotorShiftSupplyLow, 0.06),
            (F::OperatorOrLoad, 0.04),
        ],
        ..BASE
    },
    Observation {
        id: "rolls-in-neutral",
        words: "Rolls on a slope in neutral",
        how: "Ask, do not try it: with a bypass open or no charge the drive does not hold.",
        group: Group::Complaint,
        row: [
            0.20, 0.08, 0.15, 0.60, 0.03, 0.35, 0.65, 0.50, 0.08, 0.05, 0.03, 0.05, 0.02, 0.55,
            0.02, 0.25, 0.03,
        ],
        exceptions: &[
            (F::InputDriveSlipping, 0.06),
            (F::CheckAShut, 0.12),
            (F::CheckBShut, 0.12),
            (F::LoopReliefALow, 0.15),
            (F::LoopReliefBLow, 0.15),
            (F::PressureLimiterALow, 0.03),
            (F::PressureLimiterBLow, 0.03),
            (F::LoopHoseRestricted, 0.04),
            (F::CoolerDirty, 0.12),
            (F::CoolerBypassing, 0.12),
            (F::CaseReturnRestricted, 0.04),
            (F::CaseCouplingShut, 0.04),
        ],
        ..BASE
    },
    Observation {
        id: "hooks",
        words: "Pulls to one side",
        group: Group::Complaint,
        family: Family::Direction,
        two_path: true,
        row: [
            0.04, 0.03, 0.03, 0.02, 0.03, 0.30, 0.06, 0.40, 0.70, 0.35, 0.40, 0.45, 0.45, 0.40,
            0.02, 0.06, 0.03,
        ],
        exceptions: &[
            (F::OperatorOrLoad, 0.25),
            (F::InterlockOrDerate, 0.04),
            (F::InputDriveSlipping, 0.05),
            (F::ChargeStarvedByFunction, 0.02),
            (F::PathsNullMismatch, 0.8),
            (F::PathsStrokeMismatch, 0.85),
            (F::TyreOrTrackMismatch, 0.85),
        ],
        ..BASE
    },
    Observation {
        id: "pulls-left",
        words: "Pulls to the left going forward",
        group: Group::Complaint,
        family: Family::Direction,
        two_path: true,
        pulls: Some(Path::Left),
        row: [
            0.04, 0.03, 0.03, 0.02, 0.03, 0.30, 0.06, 0.40, 0.70, 0.35, 0.40, 0.45, 0.45, 0.40,
            0.02, 0.06, 0.03,
        ],
        exceptions: &[
            (F::OperatorOrLoad, 0.25),
            (F::InterlockOrDerate, 0.04),
            (F::InputDriveSlipping, 0.05),
            (F::ChargeStarvedByFunction, 0.02),
            (F::PathsNullMismatch, 0.8),
            (F::PathsStrokeMismatch, 0.85),
            (F::TyreOrTrackMismatch, 0.85),
        ],
        ..BASE
    },
    Observation {
        id: "pulls-right",
        words: "Pulls to the right going forward",
        group: Group::Complaint,
        family: Family::Direction,
        two_path: true,
        pulls: Some(Path::Right),
        row: [
            0.04, 0.03, 0.03, 0.02, 0.03, 0.30, 0.06, 0.40, 0.70, 0.35, 0.40, 0.45, 0.45, 0.40,
            0.02, 0.06, 0.03,
        ],
        exceptions: &[
            (F::OperatorOrLoad, 0.25),
            (F::InterlockOrDerate, 0.04),
            (F::InputDriveSlipping, 0.05),
            (F::ChargeStarvedByFunction, 0.02),
            (F::PathsNullMismatch, 0.8),
            (F::PathsStrokeMismatch, 0.85),
            (F::TyreOrTrackMismatch, 0.85),
        ],
        ..BASE
    },
    Observation {
        id: "turns-alike-and-bends",
        words: "Wheel turns alike left and right, and it still bends",
        how: "Tap the turns of each side over the same stretch, there and back. Stand off the line of the wheels.",
        group: Group::WhenItFails,
        family: Family::Direction,
        two_path: true,
        row: even(0.04),
        exceptions: &[(F::TyreOrTrackMismatch, 0.85), (F::OperatorOrLoad, 0.15)],
        ..BASE
    },
];
