//! Instruments found in a service van, to start a shop's own list with. Spans, classes and limits are common practice.

use super::{Accuracy, En837Class, Indication, Instrument, InstrumentKind};
use crate::quantity::{Measure, Unit};

/// The starter list. Ids are stable.
#[must_use]
pub fn usual_instruments() -> Vec<Instrument> {
    let class_1_6 = Accuracy::En837 {
        class: En837Class::C1_6,
    };
    let gauge = |id: &str, name: &str, low: f64, high: f64, division: f64| Instrument {
        id: id.to_owned(),
        name: name.to_owned(),
        what: InstrumentKind::PressureGauge,
        span_low: Measure::literal(low, Unit::Bar),
        span_high: Measure::literal(high, Unit::Bar),
        accuracy: class_1_6,
        indication: Indication::Needle,
        resolution: Some(Measure::literal(division, Unit::Bar)),
    };
    let digital =
        |id: &str, name: &str, what, low: f64, high: f64, unit: Unit, accuracy, step: Measure| {
            Instrument {
                id: id.to_owned(),
                name: name.to_owned(),
                what,
                span_low: Measure::literal(low, unit),
                span_high: Measure::literal(high, unit),
                accuracy,
                indication: Indication::Digital,
                resolution: Some(step),
            }
        };
    let kelvin = |value| Measure::literal(value, Unit::Kelvin);
    let rpm = |value| Measure::literal(value, Unit::RevolutionPerMinute);
    let of_reading = |share| Accuracy::OfReading { share };
    let fixed = |limit| Accuracy::Fixed { limit };
    vec![
        gauge("gauge-60", "Gauge 0 to 60 bar", 0.0, 60.0, 1.0),
        gauge("gauge-600", "Gauge 0 to 600 bar", 0.0, 600.0, 10.0),
        gauge("gauge-16", "Gauge 0 to 16 bar", 0.0, 16.0, 0.5),
        Instrument {
            what: InstrumentKind::VacuumGauge,
            ..gauge(
                "vacuum-1",
                "Vacuum gauge \u{2212}1 to 0 bar",
                -1.0,
                0.0,
                0.02,
            )
        },
        digital(
            "photo-tacho",
            "Photo tachometer",
            InstrumentKind::Tachometer,
            0.0,
            9999.0,
            Unit::RevolutionPerMinute,
            of_reading(0.000_5),
            rpm(1.0),
        ),
        digital(
            "dash-tacho",
            "Dash tachometer",
            InstrumentKind::Tachometer,
            0.0,
            4000.0,
            Unit::RevolutionPerMinute,
            of_reading(0.03),
            rpm(50.0),
        ),
        digital(
            "contact-probe",
            "Contact probe",
            InstrumentKind::Thermometer,
            -20.0,
            150.0,
            Unit::DegreeCelsius,
            fixed(kelvin(2.0)),
            kelvin(0.1),
        ),
        digital(
            "infrared-gun",
            "Infrared gun",
            InstrumentKind::InfraredThermometer,
            -20.0,
            300.0,
            Unit::DegreeCelsius,
            fixed(kelvin(2.0)),
            kelvin(0.1),
        ),
        digital(
            "flow-meter",
            "Turbine flow meter",
            InstrumentKind::FlowMeter,
            0.0,
            300.0,
            Unit::LitrePerMinute,
            of_reading(0.02),
            Measure::literal(0.1, Unit::LitrePerMinute),
        ),
        digital(
            "coil-meter",
            "Current meter in the coil lead",
            InstrumentKind::CurrentMeter,
            0.0,
            2000.0,
            Unit::Milliampere,
            of_reading(0.01),
            Measure::literal(1.0, Unit::Milliampere),
        ),
    ]
}
