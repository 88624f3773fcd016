//! Quick sets: the readings of an ordinary road call, in the order in which they are taken. Order and conditions are common
//! practice: charge first and on one gauge, loop pressure last and never beyond the stroke that tells.

use super::group::same;
use super::side::{Sides, Wanted};
use crate::readings::{Condition, Direction, Doing, EngineSpeed, Lever, Path, Port};

/// A set of readings that belong together.
#[derive(Clone, Copy, Debug)]
pub struct QuickSet {
    /// Stable id, for test ids.
    pub id: &'static str,
    /// Words on the button.
    pub words: &'static str,
    /// What it tells, in a few words.
    pub tells: &'static str,
    /// Only for a machine with two paths.
    pub two_path: bool,
    /// The readings, in order; each is taken left and right where its port is there twice.
    pub readings: fn() -> Vec<(Port, Condition)>,
}

/// Every set, in the order of a road call.
pub const SETS: [QuickSet; 8] = [
    QuickSet {
        id: "charge-neutral",
        words: "Charge, neutral",
        tells: "low and high idle on one gauge",
        two_path: false,
        readings: charge_neutral,
    },
    QuickSet {
        id: "charge-drive",
        words: "Charge, light drive",
        tells: "both ways, half lever, wheels clear",
        two_path: false,
        readings: charge_drive,
    },
    QuickSet {
        id: "speeds",
        words: "Speeds, both sides",
        tells: "left and right, both ways, wheels or tracks clear",
        two_path: true,
        readings: speeds,
    },
    QuickSet {
        id: "knee",
        words: "Knee",
        tells: "engine speed at which charge stops rising",
        two_path: false,
        readings: knee,
    },
    QuickSet {
        id: "case",
        words: "Case pressures",
        tells: "pump and motor case, high idle",
        two_path: false,
        readings: case,
    },
    QuickSet {
        id: "motor-drain",
        words: "Motor drain, neutral",
        tells: "jug and stopwatch, high idle",
        two_path: false,
        readings: motor_drain,
    },
    QuickSet {
        id: "held-forward",
        words: "Held, forward",
        tells: "build-up on side A: 5, 10, 20, 40 % lever",
        two_path: false,
        readings: held_forward,
    },
    QuickSet {
        id: "held-reverse",
        words: "Held, reverse",
        tells: "build-up on side B: 5, 10, 20, 40 % lever",
        two_path: false,
        readings: held_reverse,
    },
];

/// The sets for a machine, in order.
pub fn sets(sides: Sides) -> impl Iterator<Item = &'static QuickSet> {
    SETS.iter().filter(move |set| sides.any() || !set.two_path)
}

impl QuickSet {
    /// The readings of the set that are not there yet. Engine speed and temperature typed since do not make another
    /// reading of it: what the machine does, direction, lever, the idle it was set to and the side do.
    pub fn missing<'a>(
        &self,
        sides: Sides,
        there: impl Iterator<Item = (Port, Path, &'a Condition)> + Clone,
    ) -> Vec<Wanted> {
        (self.readings)()
            .into_iter()
            .flat_map(|(port, condition)| sides.wanted(port, condition))
            .filter(|wanted| {
                !there.clone().any(|(port, path, at)| {
                    (port, path) == (wanted.port, wanted.path) && alike(at, &wanted.condition)
                })
            })
            .collect()
    }

    /// True where the set reads a port on either side.
    pub fn has_sides(&self, sides: Sides) -> bool {
        (self.readings)().iter().any(|(port, _)| sides.has(*port))
    }
}

/// True where a reading's condition is that of the set, whatever has been measured since.
pub fn alike(taken: &Condition, planned: &Condition) -> bool {
    let mut plain = *taken;
    plain.oil = None;
    if matches!(plain.engine, EngineSpeed::Measured(_)) {
        plain.engine = planned.engine;
    }
    same(&plain, planned)
}

fn neutral(engine: EngineSpeed) -> Condition {
    Condition {
        engine,
        ..Condition::start()
    }
}

fn driven(doing: Doing, direction: Direction, lever: Lever, engine: EngineSpeed) -> Condition {
    Condition {
        doing,
        direction,
        lever,
        engine,
        ..Condition::start()
    }
}

fn charge_neutral() -> Vec<(Port, Condition)> {
    [EngineSpeed::LowIdle, EngineSpeed::HighIdle]
        .map(|engine| (Port::Charge, neutral(engine)))
        .to_vec()
}

fn charge_drive() -> Vec<(Port, Condition)> {
    [Direction::Forward, Direction::Reverse]
        .map(|way| {
            (
                Port::Charge,
                driven(Doing::Free, way, Lever::Half, EngineSpeed::HighIdle),
            )
        })
        .to_vec()
}

fn speeds() -> Vec<(Port, Condition)> {
    [Direction::Forward, Direction::Reverse]
        .map(|way| {
            (
                Port::Wheel,
                driven(Doing::Free, way, Lever::Full, EngineSpeed::HighIdle),
            )
        })
        .to_vec()
}

fn knee() -> Vec<(Port, Condition)> {
    vec![(Port::Knee, neutral(EngineSpeed::HighIdle))]
}

fn case() -> Vec<(Port, Condition)> {
    [Port::PumpCase, Port::MotorCase]
        .map(|port| (port, neutral(EngineSpeed::HighIdle)))
        .to_vec()
}

fn motor_drain() -> Vec<(Port, Condition)> {
    vec![(Port::MotorDrain, neutral(EngineSpeed::HighIdle))]
}

fn held(port: Port, way: Direction) -> Vec<(Port, Condition)> {
    [0.05, 0.1, 0.2, 0.4]
        .map(|share| {
            (
                port,
                driven(Doing::Held, way, Lever::Share(share), EngineSpeed::LowIdle),
            )
        })
        .to_vec()
}

fn held_forward() -> Vec<(Port, Condition)> {
    held(Port::LoopA, Direction::Forward)
}

fn held_reverse() -> Vec<(Port, Condition)> {
    held(Port::LoopB, Direction::Reverse)
}
