//! Shared by the published checks: comparing with a printed figure, and naming the row where it does not agree.
#![allow(dead_code, reason = "each test file uses its own share")]

use lowside::quantity::{Kind, Measure, Unit};

/// Tolerance of a figure that is exact by definition.
pub const EXACT: f64 = 1e-12;

/// Compares with a printed figure to a relative tolerance (0.001 for 0.1 %).
pub fn close(row: &str, found: f64, printed: f64, tolerance: f64) {
    assert!(
        (found - printed).abs() <= tolerance * printed.abs(),
        "{row}: {found} against {printed} printed, off by {:.4} %",
        100.0 * (found / printed - 1.0)
    );
}

/// Compares with a printed figure to an absolute tolerance.
pub fn within(row: &str, found: f64, printed: f64, tolerance: f64) {
    assert!(
        (found - printed).abs() <= tolerance,
        "{row}: {found} against {printed} printed"
    );
}

/// A figure in a unit.
pub fn measure(value: f64, unit: Unit) -> Measure {
    Measure::new(value, unit).expect("a printed figure is finite")
}

/// A figure in one unit, in another.
pub fn convert(value: f64, from: Unit, to: Unit) -> f64 {
    measure(value, from)
        .try_in_unit(to)
        .expect("units of one kind")
}

/// A value in the base unit of a kind, in a unit of that kind.
pub fn from_base(value: f64, to: Unit) -> f64 {
    let kind: Kind = to.kind();
    Measure::from_base(value, kind)
        .expect("a finite figure")
        .in_unit(to)
}

/// Typed quantities from the units that books print.
pub mod book {
    use super::measure;
    use lowside::quantity::typed::{
        AngularVelocity, DisplacementPerRevolution, GaugePressure, Length, Power, Pressure, Torque,
        VolumeRate,
    };
    use lowside::quantity::{Measure, Unit};

    pub fn psi(value: f64) -> Pressure {
        gauge_psi(value) - GaugePressure::from_bar(0.0)
    }
    pub fn gauge_psi(value: f64) -> GaugePressure {
        measure(value, Unit::Psi)
            .gauge_pressure()
            .expect("a pressure")
    }
    pub fn bar(value: f64) -> Pressure {
        GaugePressure::from_bar(value) - GaugePressure::from_bar(0.0)
    }
    pub fn gpm(value: f64) -> VolumeRate {
        measure(value, Unit::UsGallonPerMinute)
            .volume_rate()
            .expect("a flow")
    }
    pub fn litres_per_minute(value: f64) -> VolumeRate {
        measure(value, Unit::LitrePerMinute)
            .volume_rate()
            .expect("a flow")
    }
    pub fn in3(value: f64) -> DisplacementPerRevolution {
        measure(value, Unit::CubicInchPerRevolution)
            .displacement()
            .expect("a displacement")
    }
    pub fn rpm(value: f64) -> AngularVelocity {
        measure(value, Unit::RevolutionPerMinute)
            .angular_velocity()
            .expect("a speed")
    }
    pub fn torque(value: f64, unit: Unit) -> Torque {
        measure(value, unit).torque().expect("a torque")
    }
    pub fn hp(value: f64) -> Power {
        measure(value, Unit::Horsepower).power().expect("a power")
    }
    pub fn length(value: f64, unit: Unit) -> Length {
        measure(value, unit).length().expect("a length")
    }

    pub fn in_psi(value: Pressure) -> f64 {
        in_unit(
            Measure::from_gauge_pressure(GaugePressure::above_air(value)),
            Unit::Psi,
        )
    }
    pub fn in_gpm(value: VolumeRate) -> f64 {
        in_unit(Measure::from_volume_rate(value), Unit::UsGallonPerMinute)
    }
    pub fn in_rpm(value: AngularVelocity) -> f64 {
        in_unit(
            Measure::from_angular_velocity(value),
            Unit::RevolutionPerMinute,
        )
    }
    pub fn in_in3(value: DisplacementPerRevolution) -> f64 {
        in_unit(
            Measure::from_displacement(value),
            Unit::CubicInchPerRevolution,
        )
    }
    pub fn in_torque(value: Torque, unit: Unit) -> f64 {
        in_unit(Measure::from_torque(value), unit)
    }
    pub fn in_hp(value: Power) -> f64 {
        in_unit(Measure::from_power(value), Unit::Horsepower)
    }

    fn in_unit(measure: Result<Measure, lowside::quantity::MeasureError>, unit: Unit) -> f64 {
        measure.expect("a finite figure").in_unit(unit)
    }
}
