//! Limits of a check that holds the machine: seconds, heat, and the pressure to stop at.

use super::Hold;
use crate::checks::Check;
use crate::ranking::hold_time;
use crate::readings::{Doing, EngineSpeed, Lever};
use crate::unit::{FigureId, Unit};

/// Share of the plate setting at which the staged build-up stops first. Common practice.
const STOP_FIRST: f64 = 0.6;

/// How long, and up to what pressure, a check holds the machine; none where it holds nothing.
pub fn hold(unit: &Unit, check: &Check) -> Option<Hold> {
    let held = check.yields.iter().filter(|y| y.doing == Doing::Held);
    let figure = |id| {
        unit.known(id)
            .unwrap_or_else(|| unit.class.spread(id).value)
    };
    let rpm = held
        .clone()
        .map(|y| match y.condition(None).engine {
            EngineSpeed::LowIdle => figure(FigureId::LowIdle),
            EngineSpeed::HighIdle => figure(FigureId::HighIdle),
            EngineSpeed::Measured(m) => m.base(),
        })
        .fold(0.0, f64::max);
    if rpm <= 0.0 {
        return None;
    }
    let (seconds, rise) = hold_time(unit, rpm);
    let full = held.clone().any(|y| y.lever == Lever::Full);
    let setting = figure(FigureId::LoopRelief);
    Some(Hold {
        seconds,
        rise,
        stop_at: if full { setting } else { STOP_FIRST * setting },
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::checks;

    #[test]
    fn whatever_holds_the_machine_carries_seconds_and_a_pressure_to_stop_at() {
        let unit = Unit::default();
        let relief = unit.class.spread(FigureId::LoopRelief).value;
        for check in checks::all() {
            let held = check.yields.iter().any(|y| y.doing == Doing::Held);
            let limits = hold(&unit, check);
            assert_eq!(limits.is_some(), held, "{}", check.id);
            if let Some(h) = limits {
                assert!(h.seconds > 0.5 && h.seconds < 120.0, "{}: {h:?}", check.id);
                assert!((h.seconds * h.rise - 15.0).abs() < 1e-9);
                assert!(h.stop_at > 0.0 && h.stop_at <= relief);
            }
        }
    }
}
