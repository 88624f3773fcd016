//! The figures of a unit: each with its source, its unit as typed, and its width.

use crate::quantity::{Kind, Measure};
use crate::readings::Path;
use serde::{Deserialize, Serialize};

/// Where a figure comes from. It decides how wide the figure is taken.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum Source {
    /// The unit's own manual.
    Manual,
    /// Plate or stamp on the unit.
    Plate,
    /// Measured on this unit.
    Measured,
    /// Common practice for this class of machine, or a guess.
    #[default]
    Practice,
}

impl Source {
    /// Every source, in the order in which screens offer them.
    pub const ALL: [Source; 4] = [
        Source::Manual,
        Source::Plate,
        Source::Measured,
        Source::Practice,
    ];

    /// Words for a screen.
    pub fn words(self) -> &'static str {
        match self {
            Source::Manual => "manual",
            Source::Plate => "plate",
            Source::Measured => "measured",
            Source::Practice => "common practice",
        }
    }
}

/// A figure of the unit with its source.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct Figure {
    /// Value; none while what is typed cannot be read.
    #[serde(default)]
    pub value: Option<Measure>,
    /// The text as typed.
    #[serde(default)]
    pub typed: String,
    /// Source.
    #[serde(default)]
    pub source: Source,
}

/// What a bench found, beside the figure that holds it: a figure typed over since is no longer the bench's.
#[derive(Clone, Debug, PartialEq, Serialize, Deserialize)]
pub struct OnBench {
    /// When it stood there (ISO 8601).
    #[serde(default)]
    pub on: String,
    /// What was found.
    pub value: Measure,
    /// Standard uncertainty, as a share of it.
    #[serde(default)]
    pub share: f64,
    /// Of which side it was, where that is said.
    #[serde(default, skip_serializing_if = "Option::is_none")]
    pub path: Option<Path>,
}

/// Which figure. The first five are the ones that sharpen a quick profile most.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum FigureId {
    /// Main pump displacement.
    PumpDisplacement,
    /// Charge pump displacement.
    ChargeDisplacement,
    /// High idle.
    HighIdle,
    /// Neutral charge relief setting, above its drain.
    ChargeSetting,
    /// Oil kinematic viscosity at 40 °C (its ISO VG grade).
    OilGrade,
    /// Low idle.
    LowIdle,
    /// Displacement of one motor, large position.
    MotorDisplacement,
    /// Operating (flushing) charge relief setting, above motor case.
    OperatingSetting,
    /// Loop relief setting, above the gallery.
    LoopRelief,
    /// Pressure limiter setting.
    Limiter,
    /// Motor turns per wheel or sprocket turn.
    GearRatio,
    /// Rolling circumference of the wheel or sprocket pitch circle.
    RollingCircumference,
    /// Brake release pressure, fully released.
    BrakeRelease,
    /// Torque that the parking brake holds, at the motor shaft, all motors of the path together.
    BrakeTorque,
    /// Coil current at full stroke.
    FullCurrent,
    /// Pilot pressure at full stroke.
    FullPilot,
    /// Oil in the loop (lines, pump and motor), for the hold time.
    LoopVolume,
    /// Altitude of the site.
    Altitude,
    /// Leakage of the pump into its case at 200 bar of a side over the case and 27.5 mPa·s, from a bench run.
    PumpCaseLeakage,
    /// Slip of the pump, all that its high side loses, at 200 bar and 27.5 mPa·s, from a bench run.
    PumpSlip,
    /// Leakage of one motor into its case at 200 bar of a side over the case and 27.5 mPa·s, from a bench run.
    MotorCaseLeakage,
    /// Slip of one motor at 200 bar and 27.5 mPa·s, from a bench run.
    MotorSlip,
}

/// What a screen needs to ask for a figure.
#[derive(Clone, Copy, Debug)]
pub struct FigureAsk {
    /// Which.
    pub id: FigureId,
    /// Label.
    pub words: &'static str,
    /// Where to find it, in a few words.
    pub hint: &'static str,
    /// Kind.
    pub kind: Kind,
    /// Lowest accepted value, base unit of the kind.
    pub low: f64,
    /// Highest accepted value, base unit of the kind.
    pub high: f64,
}

/// Every figure that can be given, the five that matter most first.
pub const FIGURES: &[FigureAsk] = &[
    FigureAsk {
        id: FigureId::PumpDisplacement,
        words: "Main pump displacement",
        hint: "plate or code on the pump",
        kind: Kind::Displacement,
        low: 5.0,
        high: 1000.0,
    },
    FigureAsk {
        id: FigureId::ChargeDisplacement,
        words: "Charge pump displacement",
        hint: "manual; often 10 to 20 % of the main pump",
        kind: Kind::Displacement,
        low: 1.0,
        high: 250.0,
    },
    FigureAsk {
        id: FigureId::HighIdle,
        words: "High idle",
        hint: "full throttle, nothing loaded",
        kind: Kind::RotationalSpeed,
        low: 800.0,
        high: 5000.0,
    },
    FigureAsk {
        id: FigureId::ChargeSetting,
        words: "Charge relief setting",
        hint: "above case, as the manual gives it",
        kind: Kind::Pressure,
        low: 2.0,
        high: 60.0,
    },
    FigureAsk {
        id: FigureId::OilGrade,
        words: "Oil grade (mm²/s at 40 °C)",
        hint: "ISO VG number on the drum: 32, 46, 68",
        kind: Kind::KinematicViscosity,
        low: 7.0,
        high: 320.0,
    },
    FigureAsk {
        id: FigureId::LowIdle,
        words: "Low idle",
        hint: "throttle right back",
        kind: Kind::RotationalSpeed,
        low: 400.0,
        high: 2000.0,
    },
    FigureAsk {
        id: FigureId::MotorDisplacement,
        words: "Motor displacement (one motor, large)",
        hint: "plate or code on the motor",
        kind: Kind::Displacement,
        low: 5.0,
        high: 10000.0,
    },
    FigureAsk {
        id: FigureId::OperatingSetting,
        words: "Operating (flushing) relief setting",
        hint: "above motor case; a little below the charge relief",
        kind: Kind::Pressure,
        low: 2.0,
        high: 60.0,
    },
    FigureAsk {
        id: FigureId::LoopRelief,
        words: "Loop relief setting",
        hint: "stamp on the cartridge or manual",
        kind: Kind::Pressure,
        low: 60.0,
        high: 600.0,
    },
    FigureAsk {
        id: FigureId::Limiter,
        words: "Pressure limiter setting",
        hint: "manual",
        kind: Kind::Pressure,
        low: 50.0,
        high: 600.0,
    },
    FigureAsk {
        id: FigureId::GearRatio,
        words: "Motor turns per wheel turn",
        hint: "1 where the motor sits in the hub",
        kind: Kind::Ratio,
        low: 0.2,
        high: 400.0,
    },
    FigureAsk {
        id: FigureId::RollingCircumference,
        words: "Rolling circumference",
        hint: "one wheel turn, mark to mark on the ground",
        kind: Kind::Length,
        low: 0.3,
        high: 10.0,
    },
    FigureAsk {
        id: FigureId::BrakeRelease,
        words: "Brake release pressure",
        hint: "fully released, manual",
        kind: Kind::Pressure,
        low: 3.0,
        high: 60.0,
    },
    FigureAsk {
        id: FigureId::BrakeTorque,
        words: "Parking brake torque at the motor shaft",
        hint: "manual; all motors of the path together",
        kind: Kind::Torque,
        low: 5.0,
        high: 100_000.0,
    },
    FigureAsk {
        id: FigureId::FullCurrent,
        words: "Coil current at full stroke",
        hint: "manual",
        kind: Kind::Current,
        low: 50.0,
        high: 4000.0,
    },
    FigureAsk {
        id: FigureId::FullPilot,
        words: "Pilot pressure at full stroke",
        hint: "manual",
        kind: Kind::Pressure,
        low: 5.0,
        high: 60.0,
    },
    FigureAsk {
        id: FigureId::LoopVolume,
        words: "Oil in the loop",
        hint: "lines, pump and motor; 3 to 6 L on most",
        kind: Kind::Volume,
        low: 0.3,
        high: 60.0,
    },
    FigureAsk {
        id: FigureId::Altitude,
        words: "Altitude of the site",
        hint: "0 by the sea",
        kind: Kind::Length,
        low: -400.0,
        high: 5500.0,
    },
    FigureAsk {
        id: FigureId::PumpCaseLeakage,
        words: "Pump leakage into its case",
        hint: "from a bench run, told at 200 bar and 27.5 mPa·s",
        kind: Kind::Flow,
        low: 0.01,
        high: 200.0,
    },
    FigureAsk {
        id: FigureId::PumpSlip,
        words: "Pump slip, all of it",
        hint: "from a bench run, told at 200 bar and 27.5 mPa·s",
        kind: Kind::Flow,
        low: 0.01,
        high: 200.0,
    },
    FigureAsk {
        id: FigureId::MotorCaseLeakage,
        words: "Motor leakage into its case",
        hint: "from a bench run, told at 200 bar and 27.5 mPa·s",
        kind: Kind::Flow,
        low: 0.01,
        high: 200.0,
    },
    FigureAsk {
        id: FigureId::MotorSlip,
        words: "Motor slip, all of it",
        hint: "from a bench run, told at 200 bar and 27.5 mPa·s",
        kind: Kind::Flow,
        low: 0.01,
        high: 200.0,
    },
];
