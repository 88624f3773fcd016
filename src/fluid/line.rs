//! Pressure lost in a straight line and its fittings, and oil pressed together.

use crate::quantity::typed::{
    KinematicViscosity, Length, MassDensity, Pressure, Volume, VolumeRate,
};
use core::f64::consts::PI;

/// Reynolds number at which flow in a smooth hose turns from laminar to turbulent. Common practice: 2000 to 2300.
pub const TURBULENT_FROM: f64 = 2300.0;

/// A line: bore, length, and the sum of its fittings' loss coefficients K.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Line {
    /// Inner diameter.
    pub bore: Length,
    /// Length.
    pub length: Length,
    /// Sum of the loss coefficients of elbows, tees and valves in it.
    pub fittings: f64,
}

impl Line {
    /// Mean speed of the oil, m/s.
    #[must_use]
    pub fn speed(&self, flow: VolumeRate) -> f64 {
        4.0 * flow.value / (PI * self.bore.value * self.bore.value)
    }

    /// Reynolds number.
    #[must_use]
    pub fn reynolds(&self, flow: VolumeRate, kinematic: KinematicViscosity) -> f64 {
        self.speed(flow).abs() * self.bore.value / kinematic.value
    }

    /// Pressure lost: Darcy-Weisbach with 64 / Re below [`TURBULENT_FROM`] (Hagen-Poiseuille) and Blasius above, plus the
    /// fittings.
    #[must_use]
    pub fn pressure_loss(
        &self,
        flow: VolumeRate,
        kinematic: KinematicViscosity,
        density: MassDensity,
    ) -> Pressure {
        let speed = self.speed(flow);
        let reynolds = self.reynolds(flow, kinematic);
        if reynolds == 0.0 {
            return Pressure::new::<uom::si::pressure::pascal>(0.0);
        }
        let friction = if reynolds < TURBULENT_FROM {
            64.0 / reynolds
        } else {
            0.3164 / reynolds.sqrt().sqrt()
        };
        let heads = friction * self.length.value / self.bore.value + self.fittings;
        Pressure::new::<uom::si::pressure::pascal>(
            heads * 0.5 * density.value * speed * speed.abs(),
        )
    }
}

/// Pressure of a column of oil.
#[must_use]
pub fn column(height: Length, density: MassDensity) -> Pressure {
    Pressure::new::<uom::si::pressure::pascal>(
        density.value * crate::quantity::factor::GRAVITY_M_S2 * height.value,
    )
}

/// By how much oil shrinks under a pressure rise: V Δp / K, with its bulk modulus K.
#[must_use]
pub fn compressed(volume: Volume, rise: Pressure, bulk_modulus: Pressure) -> Volume {
    volume * (rise / bulk_modulus)
}
