//! Typed quantities for boundaries where the kind is known when the program is written.
//!
//! The types are those of `uom` (`f64`, SI), re-exported. Two are ours, because the dimension alone does not tell them
//! apart: [`GaugePressure`] and [`DisplacementPerRevolution`]. Each turns into a [`Measure`] with `Measure::from_…` and back
//! with `…_of`; the exact factors of this module apply, not the rounded ones of printed tables.

pub use uom::si::f64::{
    Angle, AngularVelocity, DynamicViscosity, ElectricCurrent, Frequency, KinematicViscosity,
    Length, Mass, MassDensity, Power, Pressure, Ratio, TemperatureInterval,
    ThermodynamicTemperature, Time, Torque, Velocity, Volume, VolumeRate,
};

use uom::si;

use super::factor::{CELSIUS_ZERO_K, RPM_RAD_S};
use super::{Kind, Measure, MeasureError};

/// Pressure above the air round the machine, as a gauge open to that air shows it. Negative under it.
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct GaugePressure(Pressure);

impl GaugePressure {
    /// From the difference to the air's pressure.
    #[must_use]
    pub fn above_air(difference: Pressure) -> Self {
        Self(difference)
    }

    /// From bar gauge.
    #[must_use]
    pub fn from_bar(bar: f64) -> Self {
        Self(Pressure::new::<si::pressure::pascal>(bar * 1e5))
    }

    /// In bar gauge.
    #[must_use]
    pub fn bar(self) -> f64 {
        self.0.get::<si::pressure::pascal>() / 1e5
    }

    /// The absolute pressure under this air.
    #[must_use]
    pub fn absolute(self, air: Pressure) -> Pressure {
        self.0 + air
    }
}

impl std::ops::Sub for GaugePressure {
    type Output = Pressure;

    /// The pressure difference: what drives a flow, and what no zero point touches.
    fn sub(self, other: Self) -> Pressure {
        self.0 - other.0
    }
}

/// Volume per revolution of a pump or motor.
#[derive(Debug, Clone, Copy, PartialEq, PartialOrd)]
pub struct DisplacementPerRevolution(Volume);

impl DisplacementPerRevolution {
    /// From the volume moved in one revolution.
    #[must_use]
    pub fn per_revolution(volume: Volume) -> Self {
        Self(volume)
    }

    /// From cm³ per revolution.
    #[must_use]
    pub fn from_cm3(cm3: f64) -> Self {
        Self(Volume::new::<si::volume::cubic_meter>(cm3 * 1e-6))
    }

    /// In cm³ per revolution.
    #[must_use]
    pub fn cm3(self) -> f64 {
        self.0.get::<si::volume::cubic_meter>() * 1e6
    }

    /// The flow at this shaft speed, nothing leaking.
    #[must_use]
    pub fn flow_at(self, speed: AngularVelocity) -> VolumeRate {
        let turns_per_second =
            speed.get::<si::angular_velocity::radian_per_second>() / core::f64::consts::TAU;
        VolumeRate::new::<si::volume_rate::cubic_meter_per_second>(
            self.0.get::<si::volume::cubic_meter>() * turns_per_second,
        )
    }
}

macro_rules! bridges {
    ($( $kind:ident $quantity:ty, $from:ident, $of:ident, |$q:ident| $to_base:expr, |$b:ident| $from_base:expr; )+) => {
        impl Measure {
            $(
                #[doc = concat!("A measure of this ", stringify!($quantity), ".\n\n# Errors\nAs [`Measure::new`].")]
                pub fn $from($q: $quantity) -> Result<Self, MeasureError> {
                    Self::from_base($to_base, Kind::$kind)
                }

                #[doc = concat!("This measure as a ", stringify!($quantity), ", if it is one.")]
                #[must_use]
                pub fn $of(self) -> Option<$quantity> {
                    self.base_of(Kind::$kind).map(|$b| $from_base)
                }
            )+
        }
    };
}

bridges! {
    Pressure GaugePressure, from_gauge_pressure, gauge_pressure,
        |q| q.bar(), |b| GaugePressure::from_bar(b);
    Flow VolumeRate, from_volume_rate, volume_rate,
        |q| q.get::<si::volume_rate::cubic_meter_per_second>() * 6e4,
        |b| VolumeRate::new::<si::volume_rate::cubic_meter_per_second>(b / 6e4);
    RotationalSpeed AngularVelocity, from_angular_velocity, angular_velocity,
        |q| q.get::<si::angular_velocity::radian_per_second>() / RPM_RAD_S,
        |b| AngularVelocity::new::<si::angular_velocity::radian_per_second>(b * RPM_RAD_S);
    Temperature ThermodynamicTemperature, from_temperature, temperature,
        |q| q.get::<si::thermodynamic_temperature::kelvin>() - CELSIUS_ZERO_K,
        |b| ThermodynamicTemperature::new::<si::thermodynamic_temperature::kelvin>(b + CELSIUS_ZERO_K);
    TemperatureDifference TemperatureInterval, from_temperature_interval, temperature_interval,
        |q| q.get::<si::temperature_interval::kelvin>(),
        |b| TemperatureInterval::new::<si::temperature_interval::kelvin>(b);
    Displacement DisplacementPerRevolution, from_displacement, displacement,
        |q| q.cm3(), |b| DisplacementPerRevolution::from_cm3(b);
    KinematicViscosity KinematicViscosity, from_kinematic_viscosity, kinematic_viscosity,
        |q| q.get::<si::kinematic_viscosity::square_meter_per_second>() * 1e6,
        |b| KinematicViscosity::new::<si::kinematic_viscosity::square_meter_per_second>(b / 1e6);
    Torque Torque, from_torque, torque,
        |q| q.get::<si::torque::newton_meter>(), |b| Torque::new::<si::torque::newton_meter>(b);
    Power Power, from_power, power,
        |q| q.get::<si::power::watt>() / 1e3, |b| Power::new::<si::power::watt>(b * 1e3);
    GroundSpeed Velocity, from_velocity, velocity,
        |q| q.get::<si::velocity::meter_per_second>() * 3.6,
        |b| Velocity::new::<si::velocity::meter_per_second>(b / 3.6);
    Length Length, from_length, length,
        |q| q.get::<si::length::meter>(), |b| Length::new::<si::length::meter>(b);
    Time Time, from_time, time,
        |q| q.get::<si::time::second>(), |b| Time::new::<si::time::second>(b);
    Current ElectricCurrent, from_current, current,
        |q| q.get::<si::electric_current::ampere>() * 1e3,
        |b| ElectricCurrent::new::<si::electric_current::ampere>(b / 1e3);
    Ratio Ratio, from_ratio, ratio,
        |q| q.get::<si::ratio::ratio>(), |b| Ratio::new::<si::ratio::ratio>(b);
    Mass Mass, from_mass, mass,
        |q| q.get::<si::mass::kilogram>(), |b| Mass::new::<si::mass::kilogram>(b);
    Angle Angle, from_angle, angle,
        |q| q.get::<si::angle::radian>() * (360.0 / core::f64::consts::TAU),
        |b| Angle::new::<si::angle::radian>(b * (core::f64::consts::TAU / 360.0));
    Volume Volume, from_volume, volume,
        |q| q.get::<si::volume::cubic_meter>() * 1e3, |b| Volume::new::<si::volume::cubic_meter>(b / 1e3);
    Density MassDensity, from_density, density,
        |q| q.get::<si::mass_density::kilogram_per_cubic_meter>(),
        |b| MassDensity::new::<si::mass_density::kilogram_per_cubic_meter>(b);
}
