//! How long a machine may be held for one reading, where that comes from, and the rest after it.
//!
//! The seconds are the shorter of two: those in which the loop oil heats by what is allowed ([`hold_time`], for the stroke of the
//! condition), and those of common practice.

use crate::ranking::hold_time;
use crate::readings::{Condition, Doing, EngineSpeed};
use crate::unit::{FigureId, Unit};
use thiserror::Error;

/// Rest after a hold, s. Common practice.
pub const REST_S: f64 = 60.0;
/// Longest step of a staged build-up, s. Common practice: 3 to 5 s a step.
pub const STEP_S: f64 = 5.0;
/// Longest hold of a plateau, s. Common practice at full flow.
pub const PLATEAU_S: f64 = 3.0;
/// Stroke over which a held reading is a plateau, share of full.
const PLATEAU_FROM: f64 = 0.5;
/// Holds of a plateau on one side. Common practice.
pub const TRIES: u8 = 2;
/// Oil at which a machine may be held, °C. Common practice.
pub const OIL: (f64, f64) = (40.0, 80.0);
/// Longest drive with flushing blocked, s. Common practice.
pub const FLUSHING_BLOCKED_S: f64 = 120.0;

/// What the seconds rest on.
#[derive(Clone, Debug, PartialEq)]
pub enum Basis {
    /// Computed from figures of this unit, and shorter than common practice.
    Computed,
    /// Common practice, shorter than what this unit's figures would allow.
    Practice,
    /// Common practice, because figures of the unit are missing: their names.
    NoFigures(Vec<&'static str>),
}

/// A hold.
#[derive(Clone, Debug, PartialEq)]
pub struct Plan {
    /// Longest time, s.
    pub seconds: f64,
    /// Rest after it, s; none where nothing has to cool.
    pub rest: Option<f64>,
    /// How fast the loop oil heats at this stroke, K/s; none where that says nothing.
    pub rise: Option<f64>,
    /// What the seconds rest on.
    pub basis: Basis,
    /// Most holds on this side; none where there is no limit but the rest.
    pub tries: Option<u8>,
}

/// Why nothing is held now.
#[derive(Clone, Copy, Debug, PartialEq, Error)]
pub enum Refused {
    /// Cold oil.
    #[error(
        "oil at {celsius:.0} °C is too cold to hold: warm it up to 40 °C first (common practice)"
    )]
    Cold {
        /// Oil, °C.
        celsius: f64,
    },
    /// Hot oil.
    #[error(
        "oil at {celsius:.0} °C is too hot to hold: let it cool under 80 °C first (common practice)"
    )]
    Hot {
        /// Oil, °C.
        celsius: f64,
    },
}

/// The hold that a condition asks for; none where nothing limits the time. With the motor blocked, and with flushing blocked.
///
/// # Errors
/// [`Refused`] where the oil in the heading is too cold or too hot to be held.
pub fn plan(unit: &Unit, condition: &Condition) -> Result<Option<Plan>, Refused> {
    if condition.doing != Doing::Held {
        return Ok(condition.flushing_blocked.then_some(Plan {
            seconds: FLUSHING_BLOCKED_S,
            rest: None,
            rise: None,
            basis: Basis::Practice,
            tries: None,
        }));
    }
    if let Some(celsius) = condition.oil.map(|oil| oil.value.base()) {
        if celsius < OIL.0 {
            return Err(Refused::Cold { celsius });
        }
        if celsius > OIL.1 {
            return Err(Refused::Hot { celsius });
        }
    }
    let stroke = condition.lever.share().0.clamp(0.01, 1.0);
    let (full, rise) = hold_time(unit, rpm(unit, condition));
    // What is delivered, and with it the heat, goes with the stroke; under the relief it is less still.
    let computed = full / stroke;
    let is_plateau = stroke > PLATEAU_FROM;
    let practice = if is_plateau { PLATEAU_S } else { STEP_S };
    let missing = missing(unit);
    let basis = match missing.is_empty() {
        false => Basis::NoFigures(missing),
        true if computed < practice => Basis::Computed,
        true => Basis::Practice,
    };
    Ok(Some(Plan {
        seconds: computed.min(practice),
        rest: Some(REST_S),
        rise: Some(rise * stroke),
        basis,
        tries: is_plateau.then_some(TRIES),
    }))
}

/// Engine speed of a condition, rpm: as measured, else the profile's idle, else that of the class.
fn rpm(unit: &Unit, condition: &Condition) -> f64 {
    let figure = |id| {
        unit.known(id)
            .unwrap_or_else(|| unit.class.spread(id).value)
    };
    match condition.engine {
        EngineSpeed::LowIdle => figure(FigureId::LowIdle),
        EngineSpeed::HighIdle => figure(FigureId::HighIdle),
        EngineSpeed::Measured(speed) => speed.base(),
    }
}

/// Figures that the heat hangs on and that the profile does not have.
fn missing(unit: &Unit) -> Vec<&'static str> {
    [
        (FigureId::PumpDisplacement, "pump displacement"),
        (FigureId::LoopRelief, "loop relief setting"),
        (FigureId::LoopVolume, "oil in the loop"),
    ]
    .into_iter()
    .filter(|(id, _)| unit.known(*id).is_none())
    .map(|(_, name)| name)
    .collect()
}

impl Plan {
    /// Where the seconds come from, in words.
    #[must_use]
    pub fn source(&self) -> String {
        match &self.basis {
            Basis::Computed => {
                String::from("computed for this unit: the loop oil heats by 15 K in that time")
            }
            Basis::Practice => String::from("common practice"),
            Basis::NoFigures(missing) => format!(
                "common practice for the class: no figure of this unit supports a hold time ({} not in the profile)",
                missing.join(", ")
            ),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::quantity::{Kind, Measure};
    use crate::readings::{Lever, OilTemperature, Place};
    use crate::unit::{Figure, Source};

    fn known() -> Unit {
        let mut unit = Unit::default();
        for (id, value, kind) in [
            (FigureId::PumpDisplacement, 50.0, Kind::Displacement),
            (FigureId::LoopRelief, 420.0, Kind::Pressure),
            (FigureId::LoopVolume, 4.0, Kind::Volume),
        ] {
            let value = Measure::from_base(value, kind).ok();
            unit.figures.insert(
                id,
                Figure {
                    value,
                    typed: String::new(),
                    source: Source::Manual,
                },
            );
        }
        unit
    }

    fn held(lever: Lever) -> Condition {
        Condition {
            doing: Doing::Held,
            lever,
            engine: Measure::from_base(2000.0, Kind::RotationalSpeed)
                .map_or(EngineSpeed::HighIdle, EngineSpeed::Measured),
            ..Condition::start()
        }
    }

    fn at(celsius: f64, condition: Condition) -> Condition {
        let value = Measure::from_base(celsius, Kind::Temperature).expect("a temperature");
        Condition {
            oil: Some(OilTemperature {
                value,
                place: Place::DrainHose,
            }),
            ..condition
        }
    }

    #[test]
    fn full_flow_is_computed_and_small_strokes_stop_at_common_practice() {
        // 420 bar × 100 L/min: 70 kW into 4 L, 10.2 K/s; 15 K in 1.47 s.
        let full = plan(&known(), &held(Lever::Full))
            .expect("warm")
            .expect("held");
        assert!((full.seconds - 1.474).abs() < 0.01, "{full:?}");
        assert_eq!((&full.basis, full.tries), (&Basis::Computed, Some(TRIES)));
        // At a tenth the oil would bear 14.7 s; a step lasts 5 s at most all the same.
        let step = plan(&known(), &held(Lever::Share(0.1)))
            .expect("warm")
            .expect("held");
        assert_eq!(
            (step.seconds, &step.basis, step.tries),
            (STEP_S, &Basis::Practice, None)
        );
        assert!((step.rise.expect("heats") - 1.017).abs() < 0.01);
        assert_eq!(step.rest, Some(REST_S));
    }

    #[test]
    fn without_figures_it_says_so_and_never_allows_more_than_common_practice() {
        for lever in [Lever::Full, Lever::Half, Lever::Share(0.05)] {
            let plan = plan(&Unit::default(), &held(lever))
                .expect("warm")
                .expect("held");
            let most = if lever == Lever::Full {
                PLATEAU_S
            } else {
                STEP_S
            };
            assert!(plan.seconds > 0.0 && plan.seconds <= most, "{plan:?}");
            let Basis::NoFigures(missing) = &plan.basis else {
                panic!("{plan:?}");
            };
            assert_eq!(missing.len(), 3);
            assert!(
                plan.source().contains("common practice")
                    && plan.source().contains("oil in the loop")
            );
        }
    }

    #[test]
    fn cold_and_hot_oil_are_not_held() {
        let refused = |celsius| plan(&known(), &at(celsius, held(Lever::Full)));
        assert!(matches!(refused(39.0), Err(Refused::Cold { .. })));
        assert!(matches!(refused(81.0), Err(Refused::Hot { .. })));
        assert!(refused(40.0).is_ok() && refused(80.0).is_ok());
        // What is not held does not care.
        let neutral = at(20.0, Condition::start());
        assert_eq!(plan(&known(), &neutral), Ok(None));
    }

    #[test]
    fn blocked_flushing_ends_after_two_minutes() {
        let blocked = Condition {
            doing: Doing::Free,
            flushing_blocked: true,
            ..Condition::start()
        };
        let plan = plan(&known(), &blocked).expect("no hold").expect("limited");
        assert_eq!((plan.seconds, plan.rest), (FLUSHING_BLOCKED_S, None));
    }
}
