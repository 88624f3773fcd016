//! What an instrument makes uncertain, with common practice where none is named.

use crate::quantity::Measure;
use crate::readings::Port;
use crate::readings::instrument::Instrument;

/// Standard uncertainties of a reading, base unit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Accuracy {
    /// Bias of the instrument, shared by all its readings.
    pub bias: f64,
    /// Of each reading on its own: needle, counting, stopwatch.
    pub own: f64,
}

/// Accuracy of a reading: from its instrument, or of the instrument that is usual on such a port (common practice).
pub fn accuracy(instrument: Option<&Instrument>, port: Port, value: f64) -> Accuracy {
    match instrument {
        Some(i) => of_instrument(i, port, value),
        None => usual(port, value),
    }
}

fn of_instrument(instrument: &Instrument, port: Port, value: f64) -> Accuracy {
    let usual = usual(port, value);
    let bias = Measure::from_base(value, port.kind())
        .map_or(usual.bias, |m| instrument.bias_standard_uncertainty(m));
    let own = instrument.reading_standard_uncertainty();
    let sound = |v: f64, fallback: f64| {
        if v.is_finite() && v >= 0.0 {
            v
        } else {
            fallback
        }
    };
    Accuracy {
        bias: sound(bias, usual.bias),
        own: sound(own, usual.own).max(1e-6),
    }
}

/// A class 1.6 gauge of the usual span, a jug and a stopwatch, counted turns. Common practice.
fn usual(port: Port, value: f64) -> Accuracy {
    let gauge = |span: f64| Accuracy {
        bias: 0.016 * span / 3f64.sqrt(),
        own: span / 400.0,
    };
    let relative = |bias: f64, own: f64, least: f64| Accuracy {
        bias: bias * value.abs(),
        own: (own * value.abs()).max(least),
    };
    match port {
        Port::Charge | Port::Servo | Port::Pilot | Port::Release | Port::Shift => {
            gauge(if value > 40.0 { 60.0 } else { 40.0 })
        }
        Port::LoopA | Port::LoopB | Port::LoopDifference => gauge(600.0),
        Port::PumpCase | Port::MotorCase => gauge(10.0),
        Port::InletPull => gauge(1.0),
        Port::CoilCurrent => relative(0.015, 0.01, 5.0),
        Port::MotorDrain => relative(0.03, 0.03, 0.02),
        Port::ReturnFlow => relative(0.03, 0.02, 0.2),
        Port::EngineSpeed | Port::PumpShaft => relative(0.006, 0.004, 5.0),
        Port::MotorShaft | Port::Wheel => relative(0.004, 0.012, 0.05),
        Port::Ground => relative(0.01, 0.015, 0.05),
        Port::Knee => relative(0.01, 0.03, 30.0),
        Port::ResponseOut | Port::ResponseBack => Accuracy {
            bias: 0.0,
            own: 0.2,
        },
        Port::SettledTemperature => Accuracy {
            bias: 2.0,
            own: 2.0,
        },
    }
}
