//! What is read, and where on the unit.

use crate::quantity::Kind;
use serde::{Deserialize, Serialize};

/// A place on the unit where something can be read, with what is read there.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Port {
    /// Charge gallery gauge port.
    Charge,
    /// Loop side A at the pump (high when the machine goes forward).
    LoopA,
    /// Loop side B at the pump (high when the machine goes in reverse).
    LoopB,
    /// Difference A minus B, taken with one switched gauge or paired transducers.
    LoopDifference,
    /// Pump case pressure.
    PumpCase,
    /// Motor case pressure.
    MotorCase,
    /// Depression at the charge pump inlet (positive: below atmosphere).
    InletPull,
    /// The higher of the two servo ports.
    Servo,
    /// Pilot pressure on the stroked side (hydraulic remote control).
    Pilot,
    /// Brake release line.
    Release,
    /// Motor shift line, shift asked.
    Shift,
    /// Coil current on the stroked side.
    CoilCurrent,
    /// Motor drain flow.
    MotorDrain,
    /// Total return flow to tank: the charge pump's delivery comes back here.
    ReturnFlow,
    /// Engine speed under this condition with the throttle left where it was.
    EngineSpeed,
    /// Pump shaft speed.
    PumpShaft,
    /// Speed of the motor shaft.
    MotorShaft,
    /// Speed of the driven wheel or sprocket.
    Wheel,
    /// Ground speed.
    Ground,
    /// Engine speed at which charge pressure stops rising.
    Knee,
    /// Time from lever full to full speed.
    ResponseOut,
    /// Time from lever back to stop.
    ResponseBack,
    /// Settled oil temperature in the tank after ordinary work.
    SettledTemperature,
}

impl Port {
    /// Every port, in the order in which screens offer them.
    pub const ALL: [Port; 23] = [
        Port::Charge,
        Port::LoopA,
        Port::LoopB,
        Port::LoopDifference,
        Port::PumpCase,
        Port::MotorCase,
        Port::InletPull,
        Port::Servo,
        Port::Pilot,
        Port::Release,
        Port::Shift,
        Port::CoilCurrent,
        Port::MotorDrain,
        Port::ReturnFlow,
        Port::EngineSpeed,
        Port::PumpShaft,
        Port::MotorShaft,
        Port::Wheel,
        Port::Ground,
        Port::Knee,
        Port::ResponseOut,
        Port::ResponseBack,
        Port::SettledTemperature,
    ];

    /// True where the two paths of a tandem share the port.
    pub fn is_common(self) -> bool {
        matches!(
            self,
            Port::Charge
                | Port::PumpCase
                | Port::InletPull
                | Port::Release
                | Port::ReturnFlow
                | Port::EngineSpeed
                | Port::PumpShaft
                | Port::Knee
                | Port::SettledTemperature
        )
    }

    /// Kind of quantity read here.
    pub fn kind(self) -> Kind {
        match self {
            Port::Charge
            | Port::LoopA
            | Port::LoopB
            | Port::LoopDifference
            | Port::PumpCase
            | Port::MotorCase
            | Port::InletPull
            | Port::Servo
            | Port::Pilot
            | Port::Release
            | Port::Shift => Kind::Pressure,
            Port::CoilCurrent => Kind::Current,
            Port::MotorDrain | Port::ReturnFlow => Kind::Flow,
            Port::EngineSpeed | Port::PumpShaft | Port::MotorShaft | Port::Wheel | Port::Knee => {
                Kind::RotationalSpeed
            }
            Port::Ground => Kind::GroundSpeed,
            Port::ResponseOut | Port::ResponseBack => Kind::Time,
            Port::SettledTemperature => Kind::Temperature,
        }
    }

    /// Name for a screen.
    pub fn words(self) -> &'static str {
        match self {
            Port::Charge => "Charge pressure",
            Port::LoopA => "Loop side A",
            Port::LoopB => "Loop side B",
            Port::LoopDifference => "Loop difference A − B",
            Port::PumpCase => "Pump case pressure",
            Port::MotorCase => "Motor case pressure",
            Port::InletPull => "Inlet pull",
            Port::Servo => "Servo pressure",
            Port::Pilot => "Pilot pressure",
            Port::Release => "Brake release pressure",
            Port::Shift => "Shift pressure",
            Port::CoilCurrent => "Coil current",
            Port::MotorDrain => "Motor drain flow",
            Port::ReturnFlow => "Total return flow",
            Port::EngineSpeed => "Engine speed held",
            Port::PumpShaft => "Pump shaft speed",
            Port::MotorShaft => "Motor shaft speed",
            Port::Wheel => "Wheel speed",
            Port::Ground => "Ground speed",
            Port::Knee => "Knee: speed where charge stops rising",
            Port::ResponseOut => "Time to full speed",
            Port::ResponseBack => "Time back to stop",
            Port::SettledTemperature => "Settled tank temperature",
        }
    }

    /// Highest pressure (bar) that this port can see in any condition, from the loop relief setting given; none where
    /// the port carries no pressure. A gauge of a smaller span must not go on it without a protector.
    pub fn highest_bar(self, loop_relief_bar: f64, charge_bar: f64) -> Option<f64> {
        match self {
            Port::LoopA | Port::LoopB | Port::LoopDifference => Some(loop_relief_bar + charge_bar),
            Port::Charge | Port::Servo | Port::Pilot | Port::Release | Port::Shift => {
                Some(2.0 * charge_bar)
            }
            Port::PumpCase | Port::MotorCase => Some(10.0),
            _ => None,
        }
    }
}
