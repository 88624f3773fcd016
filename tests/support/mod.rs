//! Builders shared by the tests.
#![allow(dead_code)] // each test file uses its own part

pub mod reference;

use lowside::quantity::{Kind, Measure};
use lowside::readings::{
    Condition, Direction, Doing, EngineSpeed, Lever, OilTemperature, Path, Place, Port, Reading,
    Seen, Stroked,
};
use lowside::record::Visit;
use lowside::unit::{Control, Figure, FigureId, Filter, MachineClass, Source, Tick, Ticks, Unit};

/// A measure in the base unit of its kind.
pub fn base(value: f64, kind: Kind) -> Measure {
    Measure::from_base(value, kind).expect("finite")
}

/// A figure from the manual.
pub fn figure(unit: &mut Unit, id: FigureId, value: f64) {
    let kind = lowside::unit::FIGURES
        .iter()
        .find(|f| f.id == id)
        .expect("listed")
        .kind;
    unit.figures.insert(
        id,
        Figure {
            value: Some(base(value, kind)),
            typed: String::new(),
            source: Source::Manual,
        },
    );
}

/// A roller of 75 cm³/rev with everything known: the reference of the physics tests.
pub fn roller() -> Unit {
    let mut u = Unit {
        id: "u".into(),
        name: "Roller".into(),
        class: MachineClass::Roller,
        ..Unit::default()
    };
    u.ticks = Ticks {
        flushing: Tick::Yes,
        limiter: Tick::No,
        control: Control::ManualFeedback,
        filter: Filter::PressureGaugeAfter,
        brake_from_charge: Tick::Yes,
        shift_from_charge: Tick::No,
        two_speed: Tick::No,
        bypass: Tick::Yes,
        slipping_drive: Tick::No,
        ..Ticks::default()
    };
    for (id, v) in [
        (FigureId::PumpDisplacement, 75.0),
        (FigureId::ChargeDisplacement, 15.0),
        (FigureId::HighIdle, 2400.0),
        (FigureId::LowIdle, 900.0),
        (FigureId::ChargeSetting, 22.0),
        (FigureId::OperatingSetting, 20.3),
        (FigureId::LoopRelief, 380.0),
        (FigureId::MotorDisplacement, 75.0),
        (FigureId::OilGrade, 46.0),
        (FigureId::GearRatio, 60.0),
    ] {
        figure(&mut u, id, v);
    }
    u
}

/// A condition with oil at 60 °C in the drain hose.
pub fn condition(
    doing: Doing,
    direction: Direction,
    lever: Lever,
    engine: EngineSpeed,
) -> Condition {
    Condition {
        doing,
        direction,
        lever,
        engine,
        oil: Some(OilTemperature {
            value: base(60.0, Kind::Temperature),
            place: Place::DrainHose,
        }),
        flushing_blocked: false,
        consumers_capped: false,
        stroked: Stroked::Both,
    }
}

/// Neutral at an idle.
pub fn neutral(engine: EngineSpeed) -> Condition {
    condition(Doing::Neutral, Direction::Forward, Lever::Full, engine)
}

/// Wheels held, the lever at a share of its travel, 1500 rpm measured.
pub fn held(direction: Direction, share: f64) -> Condition {
    let engine = EngineSpeed::Measured(base(1500.0, Kind::RotationalSpeed));
    condition(Doing::Held, direction, Lever::Share(share), engine)
}

/// Wheels free at half lever and high idle.
pub fn free(direction: Direction) -> Condition {
    condition(Doing::Free, direction, Lever::Half, EngineSpeed::HighIdle)
}

/// A steady reading.
pub fn reading(id: &str, port: Port, condition: Condition, value: f64) -> Reading {
    Reading {
        id: id.into(),
        port,
        condition,
        rigging: String::new(),
        seen: Some(Seen::Value {
            value: base(value, port.kind()),
        }),
        typed: String::new(),
        note: String::new(),
        path: Path::Left,
    }
}

/// A visit with these readings.
pub fn visit(readings: Vec<Reading>) -> Visit {
    Visit {
        id: "v".into(),
        unit: "u".into(),
        readings,
        ..Visit::default()
    }
}
