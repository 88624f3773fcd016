//! Efficiencies of positive-displacement pumps, motors and hydrostatic transmissions, as ISO 4391 defines them.
//!
//! Two cautions belong to every figure from here. ISO 4409:2007 defines the hydro-mechanical efficiency for motors only; for
//! pumps the definition is ISO 4391's. And the volumetric efficiency is a flow factor, not an energy efficiency: at high
//! pressure part of what looks like leakage is oil pressed together in the dead volume, which does no harm and makes no
//! heat. [`loss`] keeps the two apart.
//!
//! Ratios are plain numbers, 1 for 100 %. A ratio above 1 is returned as it is: it means that an instrument lies, and hiding
//! it would hide that.

pub mod loss;

use crate::quantity::GaugePressure;
use crate::quantity::typed::{
    AngularVelocity, DisplacementPerRevolution, Power, Pressure, Torque, VolumeRate,
};
use core::f64::consts::TAU;
use thiserror::Error;
use uom::si;

/// Why a ratio cannot be formed.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Error)]
pub enum EfficiencyError {
    /// A figure that stands below the line is zero or points the other way.
    #[error("no efficiency without {what}: it must be more than zero")]
    NotPositive {
        /// What: "shaft speed", "torque", "flow", "pressure difference", "displacement", "input power".
        what: &'static str,
    },
}

/// The three efficiencies of one machine at one point. Overall is their product for an incompressible fluid.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Efficiencies {
    /// Volumetric.
    pub volumetric: f64,
    /// Hydro-mechanical.
    pub hydro_mechanical: f64,
    /// Overall.
    pub overall: f64,
}

impl Efficiencies {
    fn of(volumetric: f64, hydro_mechanical: f64) -> Self {
        Self {
            volumetric,
            hydro_mechanical,
            overall: volumetric * hydro_mechanical,
        }
    }
}

/// One steady point of a pump or motor on the bench. Flow is that of the high-pressure port.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct BenchPoint {
    /// Derived displacement (ISO 8426): volume per revolution extrapolated to no leakage.
    pub displacement: DisplacementPerRevolution,
    /// Shaft speed.
    pub speed: AngularVelocity,
    /// Pressure at the low port.
    pub low: GaugePressure,
    /// Pressure at the high port.
    pub high: GaugePressure,
    /// Flow at the high port.
    pub flow: VolumeRate,
    /// Torque at the shaft.
    pub torque: Torque,
}

impl BenchPoint {
    /// Pressure difference.
    #[must_use]
    pub fn difference(&self) -> Pressure {
        self.high - self.low
    }

    /// Efficiencies of a pump: q / (n V), Δp V / (2π T), and their product.
    ///
    /// # Errors
    /// [`EfficiencyError`].
    pub fn as_pump(&self) -> Result<Efficiencies, EfficiencyError> {
        let theory = theoretical_flow(self.displacement, self.speed).value;
        let theory = positive(theory, "displacement and shaft speed")?;
        let torque = positive(self.torque.value, "torque")?;
        let hydro_mechanical =
            theoretical_torque(self.displacement, self.difference()).value / torque;
        Ok(Efficiencies::of(self.flow.value / theory, hydro_mechanical))
    }

    /// Efficiencies of a motor: n V / q, 2π T / (Δp V), and their product.
    ///
    /// # Errors
    /// [`EfficiencyError`].
    pub fn as_motor(&self) -> Result<Efficiencies, EfficiencyError> {
        let flow = positive(self.flow.value, "flow")?;
        let theory = theoretical_torque(self.displacement, self.difference()).value;
        let theory = positive(theory, "displacement and pressure difference")?;
        let volumetric = theoretical_flow(self.displacement, self.speed).value / flow;
        Ok(Efficiencies::of(volumetric, self.torque.value / theory))
    }
}

/// Flow of a machine that does not leak: n V.
#[must_use]
pub fn theoretical_flow(
    displacement: DisplacementPerRevolution,
    speed: AngularVelocity,
) -> VolumeRate {
    displacement.flow_at(speed)
}

/// Torque of a machine without friction: Δp V / 2π.
#[must_use]
pub fn theoretical_torque(displacement: DisplacementPerRevolution, difference: Pressure) -> Torque {
    Torque::new::<si::torque::newton_meter>(difference.value * cubic_metres(displacement) / TAU)
}

/// Speed of a motor that does not leak: q / V.
///
/// # Errors
/// [`EfficiencyError`] without displacement.
pub fn theoretical_speed(
    displacement: DisplacementPerRevolution,
    flow: VolumeRate,
) -> Result<AngularVelocity, EfficiencyError> {
    let volume = positive(cubic_metres(displacement), "displacement")?;
    Ok(AngularVelocity::new::<
        si::angular_velocity::radian_per_second,
    >(TAU * flow.value / volume))
}

/// Pressure difference that gives a torque without friction: 2π T / V.
///
/// # Errors
/// [`EfficiencyError`] without displacement.
pub fn theoretical_difference(
    displacement: DisplacementPerRevolution,
    torque: Torque,
) -> Result<Pressure, EfficiencyError> {
    let volume = positive(cubic_metres(displacement), "displacement")?;
    Ok(Pressure::new::<si::pressure::pascal>(
        TAU * torque.value / volume,
    ))
}

/// Displacement that takes `flow` at `speed` when nothing leaks: q / n.
///
/// # Errors
/// [`EfficiencyError`] without speed.
pub fn displacement_for(
    flow: VolumeRate,
    speed: AngularVelocity,
) -> Result<DisplacementPerRevolution, EfficiencyError> {
    let turns = positive(speed.value / TAU, "shaft speed")?;
    Ok(DisplacementPerRevolution::from_cm3(
        flow.value / turns * 1e6,
    ))
}

/// Power of a flow under a pressure difference: Δp q.
#[must_use]
pub fn hydraulic_power(difference: Pressure, flow: VolumeRate) -> Power {
    difference * flow
}

/// Power at a shaft: 2π n T.
#[must_use]
pub fn shaft_power(torque: Torque, speed: AngularVelocity) -> Power {
    Power::new::<si::power::watt>(torque.value * speed.value)
}

/// Torque of a shaft that carries `power` at `speed`.
///
/// # Errors
/// [`EfficiencyError`] without speed.
pub fn shaft_torque(power: Power, speed: AngularVelocity) -> Result<Torque, EfficiencyError> {
    Ok(Torque::new::<si::torque::newton_meter>(
        power.value / positive(speed.value, "shaft speed")?,
    ))
}

/// Overall efficiency of a pump from both its ports: (p2 q2 − p1 q1) / (2π n T).
///
/// # Errors
/// [`EfficiencyError`] without input power.
pub fn pump_overall(
    inlet: (GaugePressure, VolumeRate),
    outlet: (GaugePressure, VolumeRate),
    torque: Torque,
    speed: AngularVelocity,
) -> Result<f64, EfficiencyError> {
    let watts = |(pressure, flow): (GaugePressure, VolumeRate)| pressure.bar() * 1e5 * flow.value;
    let input = positive(shaft_power(torque, speed).value, "input power")?;
    Ok((watts(outlet) - watts(inlet)) / input)
}

/// Overall efficiency of a motor from both its ports: 2π n T / (p1 q1 − p2 q2).
///
/// # Errors
/// [`EfficiencyError`] without input power.
pub fn motor_overall(
    inlet: (GaugePressure, VolumeRate),
    outlet: (GaugePressure, VolumeRate),
    torque: Torque,
    speed: AngularVelocity,
) -> Result<f64, EfficiencyError> {
    let watts = |(pressure, flow): (GaugePressure, VolumeRate)| pressure.bar() * 1e5 * flow.value;
    let input = positive(watts(inlet) - watts(outlet), "input power")?;
    Ok(shaft_power(torque, speed).value / input)
}

/// Overall efficiency of a transmission, shaft to shaft: T2 n2 / (T1 n1).
///
/// # Errors
/// [`EfficiencyError`] without input power.
pub fn transmission_overall(
    input: (Torque, AngularVelocity),
    output: (Torque, AngularVelocity),
) -> Result<f64, EfficiencyError> {
    let below = positive(shaft_power(input.0, input.1).value, "input power")?;
    Ok(shaft_power(output.0, output.1).value / below)
}

/// The third efficiency from overall and one other.
///
/// # Errors
/// [`EfficiencyError`] where the known one is not above zero.
pub fn remaining(overall: f64, known: f64) -> Result<f64, EfficiencyError> {
    Ok(overall / positive(known, "the other efficiency")?)
}

/// Displacement of an axial-piston machine: pistons × bore area × stroke, with the stroke of a swashplate on this pitch
/// circle (`diameter` × tan `angle`).
#[must_use]
pub fn swashplate_displacement(
    pistons: u8,
    bore: si::f64::Length,
    pitch_circle: si::f64::Length,
    angle: si::f64::Angle,
) -> DisplacementPerRevolution {
    let area = core::f64::consts::PI / 4.0 * bore.value * bore.value;
    let stroke = pitch_circle.value * crate::math::tan(angle.value);
    DisplacementPerRevolution::from_cm3(f64::from(pistons) * area * stroke * 1e6)
}

fn cubic_metres(displacement: DisplacementPerRevolution) -> f64 {
    displacement.cm3() * 1e-6
}

fn positive(value: f64, what: &'static str) -> Result<f64, EfficiencyError> {
    if value > 0.0 {
        Ok(value)
    } else {
        Err(EfficiencyError::NotPositive { what })
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::quantity::{Measure, Unit};

    fn point() -> BenchPoint {
        let speed = Measure::literal(1500.0, Unit::RevolutionPerMinute).angular_velocity();
        let flow = Measure::literal(71.0, Unit::LitrePerMinute).volume_rate();
        BenchPoint {
            displacement: DisplacementPerRevolution::from_cm3(50.0),
            speed: speed.expect("a speed"),
            low: GaugePressure::from_bar(20.0),
            high: GaugePressure::from_bar(220.0),
            flow: flow.expect("a flow"),
            torque: Torque::new::<si::torque::newton_meter>(170.0),
        }
    }

    #[test]
    fn overall_from_ports_is_the_product() {
        let pump = point().as_pump().expect("a running pump");
        let p = point();
        let overall =
            pump_overall((p.low, p.flow), (p.high, p.flow), p.torque, p.speed).expect("it turns");
        assert!((overall - pump.overall).abs() < 1e-12);
        let motor_point = BenchPoint {
            torque: Torque::new::<si::torque::newton_meter>(150.0),
            flow: p.flow * 1.1,
            ..p
        };
        let motor = motor_point.as_motor().expect("a running motor");
        let overall = motor_overall(
            (motor_point.high, motor_point.flow),
            (motor_point.low, motor_point.flow),
            motor_point.torque,
            motor_point.speed,
        );
        assert!((overall.expect("it turns") - motor.overall).abs() < 1e-12);
    }

    #[test]
    fn a_stopped_machine_has_no_efficiency_and_says_why() {
        let stopped = BenchPoint {
            speed: point().speed * 0.0,
            ..point()
        };
        assert!(
            stopped
                .as_pump()
                .is_err_and(|error| error.to_string().contains("shaft speed"))
        );
        let no_flow = BenchPoint {
            flow: point().flow * 0.0,
            ..point()
        };
        assert!(no_flow.as_motor().is_err());
        let nan = BenchPoint {
            torque: Torque::new::<si::torque::newton_meter>(f64::NAN),
            ..point()
        };
        assert!(nan.as_pump().is_err());
    }
}
