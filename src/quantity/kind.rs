//! What is measured, without its unit.

use serde::{Deserialize, Serialize};
use std::fmt;

use super::Unit;

/// What a figure measures. The serde names (snake_case) stand in files that people keep: they never change.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Kind {
    /// Gauge pressure: above the air round the machine. A pull is negative.
    Pressure,
    /// Volume flow.
    Flow,
    /// Speed of a shaft, wheel or drum.
    RotationalSpeed,
    /// Temperature on a scale with its own zero.
    Temperature,
    /// Difference of two temperatures.
    TemperatureDifference,
    /// Volume per revolution of a pump or motor.
    Displacement,
    /// Kinematic viscosity.
    KinematicViscosity,
    /// Torque.
    Torque,
    /// Power, mechanical, hydraulic or thermal.
    Power,
    /// Speed over the ground.
    GroundSpeed,
    /// Length.
    Length,
    /// Time that passes (not a date).
    Time,
    /// Electric current, as in a control coil.
    Current,
    /// One figure over another of the same kind.
    Ratio,
    /// Mass.
    Mass,
    /// Plane angle, also turns of an adjuster.
    Angle,
    /// Volume.
    Volume,
    /// Mass per volume.
    Density,
}

impl Kind {
    /// Every kind, in the order in which a list of units shows them.
    pub const ALL: [Kind; 18] = [
        Kind::Pressure,
        Kind::Flow,
        Kind::RotationalSpeed,
        Kind::Temperature,
        Kind::TemperatureDifference,
        Kind::Displacement,
        Kind::KinematicViscosity,
        Kind::Torque,
        Kind::Power,
        Kind::GroundSpeed,
        Kind::Length,
        Kind::Time,
        Kind::Current,
        Kind::Ratio,
        Kind::Mass,
        Kind::Angle,
        Kind::Volume,
        Kind::Density,
    ];

    /// The unit in which the solver and the records hold this kind ([`Measure::base`](super::Measure::base)).
    #[must_use]
    pub const fn base_unit(self) -> Unit {
        match self {
            Kind::Pressure => Unit::Bar,
            Kind::Flow => Unit::LitrePerMinute,
            Kind::RotationalSpeed => Unit::RevolutionPerMinute,
            Kind::Temperature => Unit::DegreeCelsius,
            Kind::TemperatureDifference => Unit::Kelvin,
            Kind::Displacement => Unit::CubicCentimetrePerRevolution,
            Kind::KinematicViscosity => Unit::SquareMillimetrePerSecond,
            Kind::Torque => Unit::NewtonMetre,
            Kind::Power => Unit::Kilowatt,
            Kind::GroundSpeed => Unit::KilometrePerHour,
            Kind::Length => Unit::Metre,
            Kind::Time => Unit::Second,
            Kind::Current => Unit::Milliampere,
            Kind::Ratio => Unit::Fraction,
            Kind::Mass => Unit::Kilogram,
            Kind::Angle => Unit::Degree,
            Kind::Volume => Unit::Litre,
            Kind::Density => Unit::KilogramPerCubicMetre,
        }
    }

    /// The name in plain words, lower case: "rotational speed".
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Kind::Pressure => "pressure",
            Kind::Flow => "flow",
            Kind::RotationalSpeed => "rotational speed",
            Kind::Temperature => "temperature",
            Kind::TemperatureDifference => "temperature difference",
            Kind::Displacement => "displacement",
            Kind::KinematicViscosity => "kinematic viscosity",
            Kind::Torque => "torque",
            Kind::Power => "power",
            Kind::GroundSpeed => "ground speed",
            Kind::Length => "length",
            Kind::Time => "time",
            Kind::Current => "current",
            Kind::Ratio => "ratio",
            Kind::Mass => "mass",
            Kind::Angle => "angle",
            Kind::Volume => "volume",
            Kind::Density => "density",
        }
    }

    /// The units of this kind, base unit first.
    pub fn units(self) -> impl Iterator<Item = Unit> {
        Unit::ALL
            .iter()
            .copied()
            .filter(move |unit| unit.kind() == self)
    }
}

impl fmt::Display for Kind {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.name())
    }
}
