//! A large yard from a seed: units and calls as they are in practice, with ids, texts and figures of ordinary length.
#![allow(dead_code)] // each test takes what it needs

use lowside::quantity::{Kind, Measure};
use lowside::readings::{
    Condition, Direction, Doing, EngineSpeed, Lever, OilTemperature, Place, Port, Reading, Rigging,
    Seen,
};
use lowside::record::{Answer, Book, Closing, IdOf, PutBack, Settings, Visit, new_id};
use lowside::unit::{Figure, FigureId, MachineClass, PortNote, Source, Tick, Unit};

/// Seeded chance (SplitMix64; Steele, Lea, Flood 2014).
struct Dice(u64);

impl Dice {
    fn next(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        z ^ (z >> 31)
    }

    fn below(&mut self, n: usize) -> usize {
        (self.next() % n as u64) as usize
    }

    fn id(&mut self, of: IdOf) -> String {
        let (a, b) = (self.next().to_le_bytes(), self.next().to_le_bytes());
        new_id(
            of,
            [a[0], a[1], a[2], a[3], a[4], a[5], a[6], a[7], b[0], b[1]],
        )
    }

    /// So many words of the trade.
    fn words(&mut self, most: usize) -> String {
        const WORDS: &[&str] = &[
            "weak", "going", "forward", "since", "last", "week", "hot", "cold", "creeps", "slowly",
            "noisy", "after", "the", "hose", "was", "changed", "oil", "milky", "no", "drive", "on",
            "grade", "left", "side", "lags", "operator", "new", "filter", "behind", "plate",
            "belly", "guard", "off", "white", "paint", "mark",
        ];
        let count = 2 + self.below(most);
        let words: Vec<&str> = (0..count).map(|_| WORDS[self.below(WORDS.len())]).collect();
        words.join(" ")
    }

    /// A figure as one reads it: three digits.
    fn read(&mut self, middle: f64) -> f64 {
        let value = middle * (0.7 + 0.6 * (self.below(1000) as f64) / 1000.0);
        let scale = if value >= 100.0 { 1.0 } else { 10.0 };
        (value * scale).round() / scale
    }
}

fn measure(value: f64, kind: Kind) -> Measure {
    Measure::from_base(value, kind).expect("a figure")
}

fn unit(dice: &mut Dice, number: usize) -> Unit {
    let mut unit = Unit {
        id: dice.id(IdOf::Unit),
        name: format!("T-{number}"),
        class: MachineClass::ALL[dice.below(MachineClass::ALL.len())],
        note: dice.words(24),
        ..Unit::default()
    };
    unit.ticks.flushing = [Tick::Yes, Tick::No, Tick::Unknown][dice.below(3)];
    unit.ticks.two_speed = [Tick::Yes, Tick::No][dice.below(2)];
    for (id, middle, kind) in [
        (FigureId::PumpDisplacement, 60.0, Kind::Displacement),
        (FigureId::ChargeDisplacement, 12.0, Kind::Displacement),
        (FigureId::HighIdle, 2500.0, Kind::RotationalSpeed),
        (FigureId::LowIdle, 950.0, Kind::RotationalSpeed),
        (FigureId::ChargeSetting, 22.0, Kind::Pressure),
        (FigureId::LoopRelief, 380.0, Kind::Pressure),
        (FigureId::OilGrade, 46.0, Kind::KinematicViscosity),
    ] {
        let value = dice.read(middle);
        let figure = Figure {
            value: Some(measure(value, kind)),
            typed: value.to_string(),
            source: Source::ALL[dice.below(4)],
        };
        unit.figures.insert(id, figure);
    }
    for port in [Port::Charge, Port::LoopA, Port::LoopB] {
        let note = PortNote {
            place: dice.words(6),
            adapter: "M14 x 1.5".into(),
            access_minutes: Some(5.0 + dice.below(30) as f64),
            ..PortNote::default()
        };
        unit.ports.insert(port, note);
    }
    unit
}

fn visit(dice: &mut Dice, unit: &str, at: usize) -> Visit {
    let moment = |minute: usize| {
        let (day, minutes) = (minute / 1440, minute % 1440);
        let (year, rest) = (2015 + day / 336, day % 336);
        format!(
            "{year}-{:02}-{:02}T{:02}:{:02}:00Z",
            1 + rest / 28,
            1 + rest % 28,
            minutes / 60,
            minutes % 60
        )
    };
    let mut visit = Visit {
        id: dice.id(IdOf::Visit),
        unit: unit.to_owned(),
        opened: moment(at * 1000 + dice.below(900)),
        complaint: dice.words(16),
        alone: Some(dice.below(2) == 0),
        after_repair: Some(false),
        note: if dice.below(3) == 0 {
            dice.words(20)
        } else {
            String::new()
        },
        ..Visit::default()
    };
    for id in [
        "weak-hot",
        "one-direction",
        "creeps",
        "level-low",
        "foam",
        "slow-to-answer",
    ] {
        if dice.below(2) == 0 {
            let answer = [Answer::Seen, Answer::NotSeen, Answer::OperatorSays][dice.below(3)];
            visit.observations.insert(id.into(), answer);
        }
    }
    let gauges = [
        ("gauge-60", Port::Charge),
        ("gauge-600", Port::LoopA),
        ("gauge-600", Port::LoopB),
    ];
    for (instrument, port) in gauges {
        let id = dice.id(IdOf::Rigging);
        visit.riggings.push(Rigging {
            id,
            instrument: instrument.into(),
            port,
        });
    }
    let oil = 45.0 + dice.below(40) as f64;
    let count = 6 + dice.below(7);
    for place in 0..count {
        let rig = place % 3;
        let (port, middle) = [
            (Port::Charge, 21.0),
            (Port::LoopA, 210.0),
            (Port::LoopB, 190.0),
        ][rig];
        let value = dice.read(middle);
        let condition = Condition {
            doing: [Doing::Neutral, Doing::Free, Doing::Travel, Doing::Held][place % 4],
            direction: [Direction::Forward, Direction::Reverse][place % 2],
            lever: if place % 4 == 3 {
                Lever::Share(0.1)
            } else {
                Lever::Full
            },
            engine: [EngineSpeed::HighIdle, EngineSpeed::LowIdle][dice.below(2)],
            oil: Some(OilTemperature {
                value: measure(oil, Kind::Temperature),
                place: Place::DrainHose,
            }),
            ..Condition::start()
        };
        visit.readings.push(Reading {
            id: dice.id(IdOf::Reading),
            port,
            path: lowside::readings::Path::Left,
            condition,
            rigging: visit.riggings[rig].id.clone(),
            seen: Some(Seen::Value {
                value: measure(value, Kind::Pressure),
            }),
            typed: value.to_string(),
            note: if dice.below(4) == 0 {
                dice.words(6)
            } else {
                String::new()
            },
        });
    }
    for (line, _) in lowside::call::put_back::lines(&visit.clone()) {
        visit.put_back.insert(line.into(), PutBack::Done);
    }
    visit.closed = Some(Closing {
        cause: [
            "charge-pump-worn",
            "check-a-leaking",
            "control-null-off",
            "",
        ][dice.below(4)]
        .into(),
        is_proved: true,
        proof: dice.words(8),
        done: dice.words(14),
        parts: dice.words(6),
        when: moment(at * 1000 + 950),
        ..Closing::default()
    });
    visit
}

/// A yard of so many units and calls.
pub fn yard(units: usize, visits: usize) -> Book {
    let mut dice = Dice(2026);
    let mut book = Book {
        settings: Settings::start(),
        ..Book::default()
    };
    let mut ids = Vec::new();
    for number in 1..=units {
        let unit = unit(&mut dice, number);
        ids.push(unit.id.clone());
        book.put_unit(unit);
    }
    for at in 0..visits {
        let unit = ids[dice.below(ids.len())].clone();
        book.put_visit(visit(&mut dice, &unit, at));
    }
    book
}
