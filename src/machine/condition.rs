//! From a condition to the parameters and scatter that hold in it.

use super::builds::Build;
use super::latent::{Act, Latents};
use super::twin::on_paths;
use crate::circuit::{Layout, Param as P, Params};
use crate::fluid::viscosity_index::kv100_from_index;
use crate::fluid::{ViscosityCurve, dynamic_viscosity};
use crate::readings::{Condition, Direction, Doing, EngineSpeed, Path, Place};
use crate::unit::{FigureId, Unit};

/// Viscosity index taken where nothing is known. Common practice for mineral oil in mobile machines.
const INDEX: f64 = 105.0;
/// Dynamic viscosity that the leakage figures are written for, mPa·s.
const REFERENCE: f64 = 27.5;

/// Oil at a condition, as it is believed.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Warmth {
    /// Temperature where it leaks, °C.
    pub celsius: f64,
    /// Its standard uncertainty, K.
    pub spread: f64,
    /// Kinematic viscosity there, mm²/s.
    pub kinematic: f64,
    /// Relative change of viscosity per K (negative).
    pub per_kelvin: f64,
    /// True where a temperature was taken at this reading.
    pub taken: bool,
}

impl Warmth {
    /// Oil at a condition. Without a temperature, warm oil with a wide spread is taken.
    pub fn of(unit: &Unit, condition: &Condition) -> Warmth {
        let (celsius, spread, taken) = match condition.oil {
            Some(t) => {
                let (shift, spread) = t.place.correction();
                (t.value.base() + shift, spread, true)
            }
            None => (60.0, 12.0, false),
        };
        let celsius = celsius.clamp(-30.0, 130.0);
        let kv40 = unit
            .known(FigureId::OilGrade)
            .unwrap_or(46.0)
            .clamp(7.0, 320.0);
        let curve =
            kv100_from_index(kv40, INDEX).and_then(|kv100| ViscosityCurve::new(kv40, kv100));
        let (kinematic, per_kelvin) = match curve {
            Ok(curve) => {
                let (k, slope) = curve.kinematic_and_slope_at(celsius);
                (k, slope / k)
            }
            // Outside the standard's range: a slope of 3 % per K round the value at 40 °C.
            Err(_) => (kv40 * crate::math::exp(-0.03 * (celsius - 40.0)), -0.03),
        };
        Warmth {
            celsius,
            spread,
            kinematic,
            per_kelvin,
            taken,
        }
    }

    /// Viscosity relative to the circuit's reference.
    pub fn relative(&self) -> f64 {
        let density =
            crate::fluid::USUAL_DENSITY * (1.0 - crate::fluid::EXPANSION * (self.celsius - 15.0));
        dynamic_viscosity(self.kinematic, density) / REFERENCE
    }
}

/// The layout of a build in a condition.
pub fn layout_for(build: &Build, condition: &Condition) -> Layout {
    Layout {
        held: [matches!(condition.doing, Doing::Held | Doing::Neutral); 2],
        bridged: Path::BOTH
            .map(|path| condition.doing == Doing::NeutralBridged && condition.stroked.has(path)),
        ..build.layout
    }
}

fn sign(condition: &Condition) -> f64 {
    match condition.direction {
        Direction::Forward => 1.0,
        Direction::Reverse => -1.0,
    }
}

/// Load (share of the loop relief) that a kind of work asks, its common spread and its own spread. Common practice.
fn load_share(doing: Doing) -> (f64, f64, f64) {
    match doing {
        Doing::Travel => (0.12, 0.05, 0.025),
        Doing::Loaded => (0.38, 0.13, 0.06),
        Doing::Overrun => (-0.22, 0.08, 0.04),
        _ => (0.0, 0.0, 0.0),
    }
}

fn engine_speed(unit: &Unit, engine: EngineSpeed) -> f64 {
    let figure = |id| {
        unit.known(id)
            .unwrap_or_else(|| unit.class.spread(id).value)
    };
    match engine {
        EngineSpeed::LowIdle => figure(FigureId::LowIdle),
        EngineSpeed::HighIdle => figure(FigureId::HighIdle),
        EngineSpeed::Measured(m) => m.base().clamp(50.0, 6000.0),
    }
}

/// Parameters of a build in a condition, before scatter.
pub fn apply(build: &Build, base: &Params, condition: &Condition) -> Params {
    let mut t = *base;
    t[P::Speed as usize] = engine_speed(&build.unit, condition.engine);
    t[P::Viscosity as usize] = Warmth::of(&build.unit, condition).relative();
    if !condition.doing.is_neutral() {
        let (share, _) = condition.lever.share();
        let (load, _, _) = load_share(condition.doing);
        let bar = load * t[P::LoopReliefA as usize];
        for path in Path::BOTH.into_iter().filter(|p| condition.stroked.has(*p)) {
            t[P::Lever.on(path)] = sign(condition) * share;
            if bar >= 0.0 {
                t[P::Load.on(path)] = bar;
            } else {
                t[P::Push.on(path)] = sign(condition) * bar;
            }
        }
    }
    for path in Path::BOTH {
        if condition.flushing_blocked {
            t[P::ShuttleTravel.on(path)] = 0.0;
        }
        if condition.consumers_capped {
            t[P::Consumers.on(path)] *= 1e-3;
        }
    }
    t
}

/// Scatter of the load: of the resistance, or of the push where the wheels drive.
fn load_act(i: usize, c: &Condition, size: f64) -> Act {
    if c.doing == Doing::Overrun {
        Act {
            condition: Some(i),
            path: Path::Left,
            param: P::Push,
            size: sign(c) * size,
        }
    } else {
        Act {
            condition: Some(i),
            path: Path::Left,
            param: P::Load,
            size,
        }
    }
}

/// Scatter that belongs to conditions: speed, temperature, lever, load.
pub fn condition_latents(unit: &Unit, conditions: &[Condition], latents: &mut Latents) {
    let mut own = Latents::default();
    one_path_latents(unit, conditions, &mut own);
    latents
        .0
        .extend(on_paths(own, unit.ticks.paths, conditions).0);
}

fn one_path_latents(unit: &Unit, conditions: &[Condition], latents: &mut Latents) {
    let act = |i: usize, param: P, size: f64| Act {
        condition: Some(i),
        path: Path::Left,
        param,
        size,
    };
    let every =
        |keep: &dyn Fn(&Condition) -> bool, make: &dyn Fn(usize, &Condition) -> Act| -> Vec<Act> {
            conditions
                .iter()
                .enumerate()
                .filter(|(_, c)| keep(c))
                .map(|(i, c)| make(i, c))
                .collect()
        };
    // Idle speeds that were not measured share what the profile does not know.
    for (engine, id) in [
        (EngineSpeed::LowIdle, FigureId::LowIdle),
        (EngineSpeed::HighIdle, FigureId::HighIdle),
    ] {
        let width = if unit.known(id).is_some() {
            0.03
        } else {
            unit.class.spread(id).relative
        };
        let words = if engine == EngineSpeed::LowIdle {
            "low idle"
        } else {
            "high idle"
        };
        latents.in_conditions(
            words,
            every(&|c| c.engine == engine, &|i, _| act(i, P::Speed, width)),
        );
    }
    // One tachometer: its scale error is shared by all speeds that were measured.
    let measured = |c: &Condition| matches!(c.engine, EngineSpeed::Measured(_));
    latents.in_conditions(
        "tachometer",
        every(&measured, &|i, _| act(i, P::Speed, 0.01)),
    );
    // One offset for each place that a temperature was taken at, and a little at each reading.
    for place in Place::ALL {
        let here = |c: &Condition| c.oil.is_some_and(|t| t.place == place);
        let acts = every(&here, &|i, c| {
            let w = Warmth::of(unit, c);
            act(i, P::Viscosity, w.per_kelvin * w.spread)
        });
        latents.in_conditions("oil temperature", acts);
    }
    for (i, c) in conditions.iter().enumerate() {
        let w = Warmth::of(unit, c);
        let own = if w.taken { 1.5 } else { w.spread };
        latents.in_conditions(
            "oil temperature",
            vec![act(i, P::Viscosity, w.per_kelvin * own)],
        );
    }
    let relief = unit
        .known(FigureId::LoopRelief)
        .unwrap_or_else(|| unit.class.spread(FigureId::LoopRelief).value);
    for doing in [Doing::Travel, Doing::Loaded, Doing::Overrun] {
        let (_, common, _) = load_share(doing);
        let acts = every(&|c| c.doing == doing, &|i, c| {
            load_act(i, c, common * relief)
        });
        latents.in_conditions("load on the wheels", acts);
    }
    for (i, c) in conditions.iter().enumerate() {
        if c.doing.is_neutral() {
            continue;
        }
        let (_, _, own) = load_share(c.doing);
        if own > 0.0 {
            latents.in_conditions("load on the wheels", vec![load_act(i, c, own * relief)]);
        }
        let (_, spread) = c.lever.share();
        latents.in_conditions("lever travel", vec![act(i, P::Lever, spread)]);
    }
}
