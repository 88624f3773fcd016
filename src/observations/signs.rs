//! What oil, ears and hands tell.

use super::{BASE, Family, Group, Observation, even};
use crate::faults::FaultId as F;

const PROBE: &str =
    "Contact probe, or an infrared gun on black tape. Hot surfaces, fan and shafts are close.";

// Columns: air, inl, chg, dead, flu, one, two, worn, null, ctl, sig, mot, drg, slp, eng, heat, ok.
pub const TABLE: &[Observation] = &[
    Observation {
        id: "level-low",
        words: "Oil level below the mark",
        how: "Level ground, cylinders as the manual says, engine off. The cap may be under pressure.",
        group: Group::Look,
        family: Family::Air,
        row: [
            0.50, 0.08, 0.06, 0.06, 0.05, 0.05, 0.05, 0.08, 0.04, 0.05, 0.04, 0.04, 0.04, 0.05,
            0.04, 0.08, 0.04,
        ],
        exceptions: &[
            (F::OilLow, 0.97),
            (F::InletAir, 0.15),
            (F::CaseCouplingShut, 0.25),
        ],
        ..BASE
    },
    Observation {
        id: "foam",
        words: "Foam or bubbles after 2 minutes of running",
        group: Group::Look,
        family: Family::Air,
        row: [
            0.80, 0.12, 0.05, 0.05, 0.04, 0.05, 0.05, 0.05, 0.03, 0.03, 0.03, 0.03, 0.03, 0.03,
            0.03, 0.08, 0.03,
        ],
        exceptions: &[(F::WrongOrWetOil, 0.45)],
        ..BASE
    },
    Observation {
        id: "milky",
        words: "Oil milky",
        group: Group::Look,
        row: [
            0.08, 0.04, 0.04, 0.03, 0.03, 0.03, 0.03, 0.05, 0.02, 0.02, 0.02, 0.02, 0.02, 0.02,
            0.02, 0.04, 0.02,
        ],
        exceptions: &[(F::WrongOrWetOil, 0.50)],
        ..BASE
    },
    Observation {
        id: "dark-or-burnt",
        words: "Oil dark or smells burnt",
        group: Group::Look,
        family: Family::Heat,
        row: [
            0.10, 0.08, 0.12, 0.06, 0.30, 0.20, 0.25, 0.40, 0.05, 0.08, 0.03, 0.06, 0.15, 0.08,
            0.05, 0.55, 0.05,
        ],
        exceptions: &[
            (F::PressureLimiterStuck, 0.30),
            (F::CaseReturnRestricted, 0.20),
            (F::CaseCouplingShut, 0.08),
            (F::WrongOrWetOil, 0.15),
            (F::CheckAShut, 0.06),
            (F::CheckBShut, 0.06),
            (F::PressureLimiterALow, 0.06),
            (F::PressureLimiterBLow, 0.06),
        ],
        ..BASE
    },
    Observation {
        id: "metal",
        words: "Metal in filter or drain",
        how: "Cut the element open, cloth and magnet. Look before new oil or a new filter goes in.",
        group: Group::Look,
        family: Family::Debris,
        row: [
            0.08, 0.10, 0.20, 0.25, 0.08, 0.15, 0.08, 0.55, 0.03, 0.06, 0.02, 0.05, 0.06, 0.25,
            0.02, 0.15, 0.03,
        ],
        exceptions: &[
            (F::ChargePumpWorn, 0.35),
            (F::NeutralReliefLow, 0.06),
            (F::ConsumerLeak, 0.06),
            (F::ChargeStarvedByFunction, 0.03),
            (F::InputDriveSlipping, 0.05),
            (F::CoolerDirty, 0.06),
            (F::CoolerBypassing, 0.06),
        ],
        ..BASE
    },
    Observation {
        id: "filter-sign",
        words: "Filter sign tripped with warm oil",
        group: Group::Look,
        family: Family::Debris,
        row: [
            0.05, 0.35, 0.20, 0.10, 0.04, 0.06, 0.04, 0.25, 0.03, 0.06, 0.02, 0.03, 0.03, 0.06,
            0.02, 0.08, 0.03,
        ],
        exceptions: &[
            (F::ChargeFilterBlocked, 0.85),
            (F::NeutralReliefLow, 0.05),
            (F::NeutralReliefStuckOpen, 0.10),
            (F::ConsumerLeak, 0.05),
            (F::ChargeStarvedByFunction, 0.04),
        ],
        ..BASE
    },
    Observation {
        id: "seal-weeps",
        words: "Shaft seal weeps",
        how: "Engine off. Card or stick, never a hand.",
        group: Group::Look,
        row: [
            0.05, 0.08, 0.04, 0.06, 0.06, 0.05, 0.04, 0.20, 0.03, 0.04, 0.02, 0.03, 0.04, 0.06,
            0.02, 0.30, 0.05,
        ],
        exceptions: &[
            (F::CaseReturnRestricted, 0.55),
            (F::CaseCouplingShut, 0.75),
            (F::CoolerBypassing, 0.12),
            (F::CoolerDirty, 0.12),
            (F::OilTooThin, 0.12),
            (F::WrongOrWetOil, 0.12),
            (F::NeutralReliefHigh, 0.15),
            (F::AssemblyError, 0.20),
        ],
        ..BASE
    },
    Observation {
        id: "whine-with-revs",
        words: "Whine or rattle that rises with revs",
        group: Group::Listen,
        family: Family::Noise,
        row: [
            0.75, 0.75, 0.12, 0.10, 0.05, 0.15, 0.08, 0.25, 0.03, 0.05, 0.02, 0.03, 0.05, 0.05,
            0.05, 0.12, 0.03,
        ],
        exceptions: &[
            (F::OilTooThick, 0.40),
            (F::CheckAShut, 0.50),
            (F::CheckBShut, 0.50),
            (F::ChargePumpWorn, 0.25),
            (F::ChargeFilterBlocked, 0.30),
            (F::LoopHoseRestricted, 0.35),
            (F::InputDriveSlipping, 0.20),
            (F::WrongOrWetOil, 0.25),
        ],
        ..BASE
    },
    Observation {
        id: "whine-cold",
        words: "Whine only when cold",
        group: Group::Listen,
        family: Family::Noise,
        row: [
            0.10, 0.60, 0.08, 0.03, 0.03, 0.05, 0.03, 0.05, 0.02, 0.03, 0.02, 0.02, 0.02, 0.02,
            0.03, 0.05, 0.06,
        ],
        exceptions: &[(F::OilTooThick, 0.75), (F::ChargeFilterBlocked, 0.30)],
        ..BASE
    },
    Observation {
        id: "relief-scream",
        words: "Relief screams when pushing",
        how: "At a load it meets in its work anyway; a few seconds only.",
        group: Group::Listen,
        family: Family::Noise,
        row: [
            0.03, 0.03, 0.03, 0.02, 0.06, 0.30, 0.10, 0.06, 0.05, 0.04, 0.02, 0.15, 0.25, 0.03,
            0.05, 0.06, 0.08,
        ],
        exceptions: &[
            (F::LoopReliefALow, 0.60),
            (F::LoopReliefBLow, 0.60),
            (F::CheckALeaking, 0.12),
            (F::CheckBLeaking, 0.12),
            (F::CheckAShut, 0.05),
            (F::CheckBShut, 0.05),
            (F::ShuttleStuckA, 0.06),
            (F::ShuttleStuckB, 0.06),
            (F::PressureLimiterALow, 0.03),
            (F::PressureLimiterBLow, 0.03),
            (F::PressureLimiterStuck, 0.60),
            (F::LoopReliefAHigh, 0.02),
            (F::LoopReliefBHigh, 0.02),
            (F::MotorStuckSmall, 0.35),
            (F::MotorStuckLarge, 0.06),
            (F::MotorShiftSupplyLow, 0.06),
            (F::OperatorOrLoad, 0.30),
        ],
        ..BASE
    },
    Observation {
        id: "cartridge-hot",
        words: "One loop cartridge hotter than the other by more than 15 K",
        how: PROBE,
        group: Group::Feel,
        family: Family::Heat,
        row: [
            0.02, 0.02, 0.04, 0.02, 0.02, 0.55, 0.30, 0.03, 0.02, 0.02, 0.02, 0.02, 0.03, 0.02,
            0.02, 0.03, 0.02,
        ],
        exceptions: &[
            (F::CheckALeaking, 0.65),
            (F::CheckBLeaking, 0.65),
            (F::CheckAShut, 0.05),
            (F::CheckBShut, 0.05),
            (F::ShuttleStuckA, 0.10),
            (F::ShuttleStuckB, 0.10),
            (F::PressureLimiterALow, 0.04),
            (F::PressureLimiterBLow, 0.04),
            (F::PressureLimiterStuck, 0.25),
            (F::LoopHoseRestricted, 0.05),
        ],
        ..BASE
    },
    Observation {
        id: "motor-case-hot",
        words: "Motor case hotter than pump case by more than 10 K",
        how: PROBE,
        group: Group::Feel,
        family: Family::Heat,
        row: [
            0.03, 0.03, 0.05, 0.02, 0.55, 0.08, 0.06, 0.30, 0.03, 0.02, 0.02, 0.05, 0.10, 0.03,
            0.03, 0.15, 0.04,
        ],
        exceptions: &[
            (F::MotorWorn, 0.50),
            (F::MotorWornAcross, 0.40),
            (F::PumpWorn, 0.06),
            (F::PumpWornAcross, 0.05),
            (F::OperatingReliefLow, 0.06),
            (F::ShuttleStuckA, 0.50),
            (F::ShuttleStuckB, 0.50),
        ],
        ..BASE
    },
    Observation {
        id: "hub-hot",
        words: "Hub, disc or drum hot",
        how: "Probe or the back of a hand held near it first: a dragging brake burns.",
        group: Group::Feel,
        row: [
            0.02, 0.02, 0.08, 0.10, 0.02, 0.02, 0.02, 0.02, 0.02, 0.02, 0.02, 0.02, 0.85, 0.15,
            0.02, 0.03, 0.03,
        ],
        exceptions: &[
            (F::BrakeNotReleased, 0.55),
            (F::InputDriveSlipping, 0.02),
            (F::NeutralReliefLow, 0.12),
            (F::ConsumerLeak, 0.15),
        ],
        ..BASE
    },
    Observation {
        id: "cooler-stays-cool",
        words: "Cooler cool although the oil is hot",
        how: "Probe both hoses of the cooler: hot in and hot out is a dirty cooler or a slow fan, cool is one that is passed by.",
        group: Group::Feel,
        row: even(0.04),
        exceptions: &[
            (F::CoolerBypassing, 0.88),
            (F::CaseReturnRestricted, 0.12),
            (F::CaseCouplingShut, 0.12),
            (F::CoolerDirty, 0.03),
        ],
        ..BASE
    },
];
