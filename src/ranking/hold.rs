//! How long a full-stroke held check may last: the relief turns the whole delivery into heat in the little oil of the loop.

use crate::unit::{FigureId, Unit};

/// Temperature rise allowed in one held check, K. Common practice.
const ALLOWED: f64 = 15.0;
/// Heat that a litre of oil takes up, kJ/(L·K): 0.86 kg/L × 2.0 kJ/(kg·K).
const HEAT_CAPACITY: f64 = 1.72;

/// Longest time (s) of a full-stroke held check at an engine speed, and the rise per second (K/s):
/// P = Δp·Q/600 (kW from bar and L/min); t = ΔT·m·c/P.
pub fn hold_time(unit: &Unit, rpm: f64) -> (f64, f64) {
    let figure = |id| {
        unit.known(id)
            .unwrap_or_else(|| unit.class.spread(id).value)
    };
    let flow = figure(FigureId::PumpDisplacement) * rpm * 1e-3;
    let power = figure(FigureId::LoopRelief) * flow / 600.0;
    let rise = power / (HEAT_CAPACITY * figure(FigureId::LoopVolume));
    (ALLOWED / rise, rise)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::quantity::{Kind, Measure};
    use crate::unit::{Figure, Source};

    #[test]
    fn seventy_kilowatts_into_four_litres_is_ten_kelvin_a_second() {
        // Δp 420 bar × 100 L/min / 600 = 70 kW; 70 / (4 L × 1.72 kJ/(L·K)) = 10.2 K/s.
        let mut unit = Unit::default();
        for (id, v, kind) in [
            (FigureId::PumpDisplacement, 50.0, Kind::Displacement),
            (FigureId::LoopRelief, 420.0, Kind::Pressure),
            (FigureId::LoopVolume, 4.0, Kind::Volume),
        ] {
            let value = Measure::from_base(v, kind).ok();
            unit.figures.insert(
                id,
                Figure {
                    value,
                    typed: String::new(),
                    source: Source::Manual,
                },
            );
        }
        let (seconds, rise) = hold_time(&unit, 2000.0);
        assert!((rise - 10.17).abs() < 0.02, "{rise}");
        assert!((seconds - 1.47).abs() < 0.01, "{seconds}");
    }
}
