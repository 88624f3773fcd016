//! Flow through a sharp edge, and the spring-loaded poppet of a relief valve.

use crate::quantity::typed::{Length, MassDensity, Pressure, VolumeRate};
use uom::si::f64::Area;

/// Discharge coefficient of a sharp edge at high Reynolds number. Printed: 0.60 to 0.65; the limit of the ideal slot is
/// π / (π + 2) = 0.611.
pub const SHARP_EDGE: f64 = 0.61;

/// Flow through an opening: `Cd A √(2 Δp / ρ)`. Runs the way the pressure falls; the sign says which.
#[must_use]
pub fn orifice_flow(
    discharge: f64,
    area: Area,
    difference: Pressure,
    density: MassDensity,
) -> VolumeRate {
    let speed = (2.0 * difference.value.abs() / density.value).sqrt();
    si_flow((discharge * area.value * speed).copysign(difference.value))
}

/// Pressure difference at which an opening passes `flow`.
#[must_use]
pub fn orifice_difference(
    discharge: f64,
    area: Area,
    flow: VolumeRate,
    density: MassDensity,
) -> Pressure {
    let speed = flow.value / (discharge * area.value);
    si_pressure(0.5 * density.value * speed * speed.abs())
}

/// Discharge coefficient from a test.
#[must_use]
pub fn discharge_coefficient(
    flow: VolumeRate,
    area: Area,
    difference: Pressure,
    density: MassDensity,
) -> f64 {
    flow.value / (area.value * (2.0 * difference.value / density.value).sqrt())
}

/// Flow coefficient of a valve, `q / √(Δp / SG)`, in whatever units flow and pressure are given (US gpm and psi in the
/// trade's tables).
#[must_use]
pub fn flow_coefficient(flow: f64, difference: f64, specific_gravity: f64) -> f64 {
    flow / (difference / specific_gravity).sqrt()
}

/// Pressure difference across a valve of this flow coefficient, in the units of the coefficient.
#[must_use]
pub fn flow_coefficient_difference(coefficient: f64, flow: f64, specific_gravity: f64) -> f64 {
    let share = flow / coefficient;
    specific_gravity * share * share
}

/// Diameter of the round hole of this area.
#[must_use]
pub fn diameter_of(area: Area) -> Length {
    Length::new::<uom::si::length::meter>((4.0 * area.value / core::f64::consts::PI).sqrt())
}

/// A direct-acting relief: a poppet on a spring.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct PoppetRelief {
    /// Area that the pressure lifts.
    pub area: Area,
    /// Spring rate, N/m.
    pub rate: f64,
    /// How far the spring is pressed with the poppet on its seat.
    pub preload: Length,
}

impl PoppetRelief {
    /// Pressure difference at which the poppet leaves its seat.
    #[must_use]
    pub fn cracking(&self) -> Pressure {
        self.at_lift(Length::new::<uom::si::length::meter>(0.0))
    }

    /// Pressure difference that holds the poppet at this lift. At full lift, less the cracking pressure, it is the pressure
    /// override.
    #[must_use]
    pub fn at_lift(&self, lift: Length) -> Pressure {
        si_pressure(self.rate * (self.preload.value + lift.value) / self.area.value)
    }
}

fn si_flow(cubic_metres_per_second: f64) -> VolumeRate {
    VolumeRate::new::<uom::si::volume_rate::cubic_meter_per_second>(cubic_metres_per_second)
}

fn si_pressure(pascal: f64) -> Pressure {
    Pressure::new::<uom::si::pressure::pascal>(pascal)
}
