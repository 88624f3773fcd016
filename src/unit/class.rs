//! Classes of machine and what common practice gives for each. Every figure here is *common practice*, from memory of
//! the trade: a range with its width, never a verdict.

use super::FigureId;
use crate::circuit::Param;
use serde::{Deserialize, Serialize};

/// Class of machine.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum MachineClass {
    /// Small ride-on or walk-behind with an integrated pump and motor.
    SmallIntegrated,
    /// Compact machine on wheels.
    #[default]
    CompactWheeled,
    /// Compact machine on tracks.
    CompactTracked,
    /// Roller.
    Roller,
    /// Loader, telehandler or lift truck with an automotive drive.
    Loader,
    /// Carrier with a wheel motor at each wheel.
    WheelMotorCarrier,
    /// Medium or large crawler.
    Crawler,
}

/// A practice figure: most likely value and relative standard spread (log scale).
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Spread {
    /// Most likely value, base unit of the figure's kind.
    pub value: f64,
    /// Relative standard spread, 1 sigma on a log scale.
    pub relative: f64,
}

/// Practice figures of a class.
#[derive(Clone, Copy, Debug)]
pub struct ClassPractice {
    /// Pump displacement, cm³/rev.
    pub pump: f64,
    /// Motor displacement of one motor, cm³/rev.
    pub motor: f64,
    /// Motor turns per wheel turn.
    pub ratio: f64,
    /// Rolling circumference, m.
    pub rolling: f64,
    /// Charge setting, bar.
    pub charge: f64,
    /// Loop relief, bar.
    pub relief: f64,
    /// Low idle, rpm.
    pub low_idle: f64,
    /// High idle, rpm.
    pub high_idle: f64,
    /// Share of such machines with loop flushing.
    pub flushing: f64,
    /// Share with a pressure limiter.
    pub limiter: f64,
    /// Share with two-speed motors.
    pub two_speed: f64,
    /// Share with brake release from charge.
    pub brake: f64,
}

impl MachineClass {
    /// Every class, in the order in which screens offer them.
    pub const ALL: [MachineClass; 7] = [
        MachineClass::CompactWheeled,
        MachineClass::CompactTracked,
        MachineClass::Roller,
        MachineClass::Loader,
        MachineClass::WheelMotorCarrier,
        MachineClass::Crawler,
        MachineClass::SmallIntegrated,
    ];

    /// Words for a screen.
    pub fn words(self) -> &'static str {
        match self {
            MachineClass::SmallIntegrated => "Small ride-on or walk-behind",
            MachineClass::CompactWheeled => "Compact machine, wheels",
            MachineClass::CompactTracked => "Compact machine, tracks",
            MachineClass::Roller => "Roller",
            MachineClass::Loader => "Loader, telehandler, lift truck",
            MachineClass::WheelMotorCarrier => "Carrier with wheel motors",
            MachineClass::Crawler => "Medium or large crawler",
        }
    }

    /// Practice figures of the class. Common practice, from memory.
    pub fn practice(self) -> ClassPractice {
        let p =
            |pump, motor, ratio, rolling, charge, relief, low_idle, high_idle, shares: [f64; 4]| {
                ClassPractice {
                    pump,
                    motor,
                    ratio,
                    rolling,
                    charge,
                    relief,
                    low_idle,
                    high_idle,
                    flushing: shares[0],
                    limiter: shares[1],
                    two_speed: shares[2],
                    brake: shares[3],
                }
            };
        match self {
            MachineClass::SmallIntegrated => p(
                16.0,
                16.0,
                22.0,
                1.6,
                7.0,
                210.0,
                1400.0,
                3200.0,
                [0.05, 0.02, 0.02, 0.1],
            ),
            MachineClass::CompactWheeled => p(
                45.0,
                480.0,
                1.0,
                2.4,
                17.0,
                300.0,
                1050.0,
                2600.0,
                [0.3, 0.15, 0.4, 0.6],
            ),
            MachineClass::CompactTracked => p(
                45.0,
                60.0,
                25.0,
                1.6,
                20.0,
                350.0,
                1050.0,
                2500.0,
                [0.45, 0.3, 0.7, 0.8],
            ),
            MachineClass::Roller => p(
                75.0,
                75.0,
                60.0,
                4.2,
                22.0,
                380.0,
                900.0,
                2400.0,
                [0.6, 0.4, 0.5, 0.8],
            ),
            MachineClass::Loader => p(
                90.0,
                110.0,
                20.0,
                3.8,
                24.0,
                400.0,
                850.0,
                2350.0,
                [0.5, 0.6, 0.5, 0.6],
            ),
            MachineClass::WheelMotorCarrier => p(
                75.0,
                500.0,
                1.0,
                3.6,
                22.0,
                380.0,
                900.0,
                2300.0,
                [0.5, 0.4, 0.5, 0.7],
            ),
            MachineClass::Crawler => p(
                110.0,
                130.0,
                60.0,
                2.6,
                26.0,
                420.0,
                850.0,
                2200.0,
                [0.7, 0.7, 0.7, 0.9],
            ),
        }
    }

    /// Practice value and width of a figure for this class; the width is honest where nothing is known.
    pub fn spread(self, figure: FigureId) -> Spread {
        let c = self.practice();
        let s = |value, relative| Spread { value, relative };
        match figure {
            FigureId::PumpDisplacement => s(c.pump, 0.35),
            FigureId::ChargeDisplacement => s(c.pump * 0.16, 0.40),
            FigureId::HighIdle => s(c.high_idle, 0.06),
            FigureId::ChargeSetting => s(c.charge, 0.22),
            FigureId::OilGrade => s(46.0, 0.25),
            FigureId::LowIdle => s(c.low_idle, 0.10),
            FigureId::MotorDisplacement => s(c.motor, 0.40),
            FigureId::OperatingSetting => s(c.charge - 1.7, 0.22),
            FigureId::LoopRelief => s(c.relief, 0.12),
            FigureId::Limiter => s(c.relief - 25.0, 0.12),
            FigureId::GearRatio => s(c.ratio, 0.5),
            FigureId::RollingCircumference => s(c.rolling, 0.2),
            FigureId::BrakeRelease => s((c.charge * 0.75).min(18.0), 0.15),
            // Half to all of the motor's torque at relief.
            FigureId::BrakeTorque => s(
                0.7 * c.relief * c.motor / (20.0 * core::f64::consts::PI),
                0.25,
            ),
            FigureId::FullCurrent => s(1000.0, 0.4),
            FigureId::FullPilot => s(18.0, 0.15),
            FigureId::LoopVolume => s(4.0 * (c.pump / 75.0), 0.35),
            FigureId::Altitude => s(150.0, 1.0),
            // The circuit's own sound machine, which grows with the pump.
            FigureId::PumpCaseLeakage | FigureId::MotorCaseLeakage => {
                s(Param::PumpLeak.healthy() * 200.0 * c.pump / 75.0, 0.35)
            }
            FigureId::PumpSlip | FigureId::MotorSlip => {
                let healthy = Param::PumpLeak.healthy() + Param::PumpAcross.healthy();
                s(healthy * 200.0 * c.pump / 75.0, 0.35)
            }
        }
    }
}
