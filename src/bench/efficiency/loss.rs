//! Where the efficiency goes: slip, compressed oil, viscous and dry friction.
//!
//! Wilson's model in the form of McCandlish & Dorey (Proc IMechE B 198(10), 1984, 165-174), with the displacement D per
//! radian:
//!
//! * flow lost = Cs D Δp / μ + (Δp ω D / B) (Vr + (1 + x) / 2)
//! * torque lost = Cv D μ ω + Cf D Δp
//!
//! Schlösser's model adds slip that grows with the root of pressure and torque that grows with the square of speed; Thoma
//! takes slip in proportion to pressure alone. Plain `f64` in SI inside: Pa, rad/s, Pa·s.

use super::Efficiencies;
use crate::quantity::typed::{
    AngularVelocity, DisplacementPerRevolution, DynamicViscosity, Pressure, Torque, VolumeRate,
};
use core::f64::consts::TAU;
use uom::si;

/// Coefficients of the loss model. All but the bulk modulus are pure numbers.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct LossModel {
    /// Slip, Cs.
    pub slip: f64,
    /// Viscous drag, Cv.
    pub viscous: f64,
    /// Dry friction, Cf.
    pub dry: f64,
    /// Dead volume over displaced volume, Vr.
    pub dead_volume: f64,
    /// Bulk modulus of the oil with its air, Pa.
    pub bulk_modulus: f64,
}

/// A state of the machine: what the losses depend on.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct State {
    /// Pressure difference.
    pub difference: Pressure,
    /// Shaft speed.
    pub speed: AngularVelocity,
    /// Dynamic viscosity.
    pub viscosity: DynamicViscosity,
}

impl State {
    /// μ ω / Δp, the number that slip and drag hang on. Zero without speed, infinite without pressure.
    #[must_use]
    pub fn duty(&self) -> f64 {
        self.viscosity.value * self.speed.value / self.difference.value
    }
}

impl LossModel {
    /// An axial-piston machine, to the order of magnitude: the defaults of an open modelling library that cites McCandlish &
    /// Dorey; bulk modulus 1.6 GPa.
    pub const AXIAL_PISTON: LossModel = LossModel {
        slip: 1.8e-9,
        viscous: 6.0e4,
        dry: 0.007,
        dead_volume: 0.54,
        bulk_modulus: 1.6e9,
    };

    /// Flow that slips past, without what compression takes.
    #[must_use]
    pub fn slip_flow(&self, displacement: DisplacementPerRevolution, state: &State) -> VolumeRate {
        flow(self.slip * per_radian(displacement) * state.difference.value / state.viscosity.value)
    }

    /// Flow that compression takes at the high port, at a share `x` of full displacement (1 for a fixed machine).
    #[must_use]
    pub fn compression_flow(
        &self,
        displacement: DisplacementPerRevolution,
        x: f64,
        state: &State,
    ) -> VolumeRate {
        let share =
            state.difference.value / self.bulk_modulus * (self.dead_volume + 0.5 * (1.0 + x));
        flow(share * state.speed.value * per_radian(displacement))
    }

    /// Torque lost to drag and friction.
    #[must_use]
    pub fn torque_loss(&self, displacement: DisplacementPerRevolution, state: &State) -> Torque {
        let viscous = self.viscous * state.viscosity.value * state.speed.value;
        let dry = self.dry * state.difference.value;
        Torque::new::<si::torque::newton_meter>(per_radian(displacement) * (viscous + dry))
    }

    /// Share of the theoretical flow that is lost at full displacement.
    fn flow_share(&self, state: &State) -> f64 {
        self.slip / state.duty()
            + state.difference.value / self.bulk_modulus * (self.dead_volume + 1.0)
    }

    /// Share of the theoretical torque that is lost.
    fn torque_share(&self, state: &State) -> f64 {
        self.viscous * state.duty() + self.dry
    }

    /// Efficiencies of a pump at full displacement. Below zero where it delivers nothing.
    #[must_use]
    pub fn pump(&self, state: &State) -> Efficiencies {
        Efficiencies::of(
            1.0 - self.flow_share(state),
            1.0 / (1.0 + self.torque_share(state)),
        )
    }

    /// Efficiencies of a motor at full displacement. Below zero where it cannot turn.
    #[must_use]
    pub fn motor(&self, state: &State) -> Efficiencies {
        Efficiencies::of(
            1.0 / (1.0 + self.flow_share(state)),
            1.0 - self.torque_share(state),
        )
    }

    /// Coefficients of a motor from two points of its data sheet at one speed and viscosity: volumetric and
    /// hydro-mechanical efficiency at a high pressure, hydro-mechanical efficiency at a low one. None where the points
    /// contradict the model (a coefficient comes out below zero, or both points are one).
    #[must_use]
    pub fn of_motor_points(
        high: (State, f64, f64),
        low: (State, f64),
        dead_volume: f64,
        bulk_modulus: f64,
    ) -> Option<LossModel> {
        let (state, volumetric, high_mechanical) = high;
        let (low_state, low_mechanical) = low;
        let compression = state.difference.value / bulk_modulus * (dead_volume + 1.0);
        let slip = state.duty() * (1.0 / volumetric - 1.0 - compression);
        let viscous = (high_mechanical - low_mechanical) / (low_state.duty() - state.duty());
        let dry = 1.0 - high_mechanical - viscous * state.duty();
        let sound = |coefficient: f64| coefficient.is_finite() && coefficient >= 0.0;
        (sound(slip) && sound(viscous) && sound(dry)).then_some(LossModel {
            slip,
            viscous,
            dry,
            dead_volume,
            bulk_modulus,
        })
    }
}

fn per_radian(displacement: DisplacementPerRevolution) -> f64 {
    displacement.cm3() * 1e-6 / TAU
}

fn flow(cubic_metres_per_second: f64) -> VolumeRate {
    VolumeRate::new::<si::volume_rate::cubic_meter_per_second>(cubic_metres_per_second)
}

#[cfg(all(test, not(target_arch = "wasm32")))]
mod tests {
    use super::*;
    use crate::bench::efficiency::{theoretical_flow, theoretical_torque};
    use proptest::prelude::*;

    fn state(bar: f64, rpm: f64, pascal_seconds: f64) -> State {
        State {
            difference: Pressure::new::<si::pressure::bar>(bar),
            speed: AngularVelocity::new::<si::angular_velocity::radian_per_second>(
                rpm * TAU / 60.0,
            ),
            viscosity: DynamicViscosity::new::<si::dynamic_viscosity::pascal_second>(
                pascal_seconds,
            ),
        }
    }

    #[test]
    fn contradicting_points_give_no_model() {
        let high = state(300.0, 1500.0, 0.026);
        assert_eq!(
            LossModel::of_motor_points((high, 0.999, 0.95), (high, 0.95), 0.5, 1.6e9),
            None
        );
        let low = state(10.0, 1500.0, 0.026);
        assert_eq!(
            LossModel::of_motor_points((high, 0.999, 0.95), (low, 0.8), 0.5, 1.6e9),
            None
        );
    }

    proptest! {
        #[test]
        fn efficiencies_are_the_losses(bar in 20.0_f64..450.0, rpm in 200.0_f64..3000.0, mu in 0.005_f64..0.1, cm3 in 10.0_f64..250.0) {
            let model = LossModel::AXIAL_PISTON;
            let state = state(bar, rpm, mu);
            let displacement = DisplacementPerRevolution::from_cm3(cm3);
            let theory = theoretical_flow(displacement, state.speed);
            let lost = model.slip_flow(displacement, &state) + model.compression_flow(displacement, 1.0, &state);
            prop_assert!((model.pump(&state).volumetric - (1.0 - (lost / theory).value)).abs() < 1e-12);
            prop_assert!((model.motor(&state).volumetric - (theory / (theory + lost)).value).abs() < 1e-12);
            let ideal = theoretical_torque(displacement, state.difference);
            let friction = model.torque_loss(displacement, &state);
            prop_assert!((model.motor(&state).hydro_mechanical - (1.0 - (friction / ideal).value)).abs() < 1e-12);
            prop_assert!((model.pump(&state).hydro_mechanical - (ideal / (ideal + friction)).value).abs() < 1e-12);
        }
    }
}
