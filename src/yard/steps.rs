//! The order of the check as data: steps with their minutes, what is looked at, what is read.

use super::field::Field;
use super::look::{Look, look, stands};
use super::sheet::Leg;
use crate::caution::Stands;
use crate::unit::Unit;

/// Minutes that the whole check takes at most, on either kind of machine.
pub const MINUTES: f64 = 10.0;

/// A step.
#[derive(Clone, Copy, Debug)]
pub struct Step {
    /// Stable id.
    pub id: &'static str,
    /// Title.
    pub title: &'static str,
    /// How it is done.
    pub how: &'static str,
    /// Minutes. Common practice, with permanent test couplings.
    pub minutes: f64,
    /// Look ids.
    pub looks: &'static [&'static str],
    /// Figures.
    pub fields: &'static [Field],
    /// Counts on cold oil too.
    pub cold: bool,
    /// Cautions.
    pub stands: &'static [Stands],
}

impl Step {
    /// What is looked at on this unit and this leg.
    #[must_use]
    pub fn looks_of(&self, unit: &Unit, leg: Leg) -> Vec<&'static Look> {
        self.looks
            .iter()
            .filter_map(|id| look(id))
            .filter(|look| (look.has)(unit) && look.leg.is_none_or(|only| only == leg))
            .collect()
    }

    /// Cautions of the step and of what is looked at, each once.
    #[must_use]
    pub fn cautions(&self, unit: &Unit, leg: Leg) -> Vec<Stands> {
        let mut out = self.stands.to_vec();
        for look in self.looks_of(unit, leg) {
            for stands in stands(look.id) {
                if !out.contains(stands) {
                    out.push(*stands);
                }
            }
        }
        out
    }
}

const WALK: Step = Step {
    id: "walk",
    title: "Walk round",
    how: "Engine off first. Before anything else the manual of the unit and the rules of the place.",
    minutes: 1.0,
    looks: &[
        "level",
        "oil",
        "leaks",
        "tow-valve",
        "interlocks",
        "filter-sign",
        "brake-glazed",
        "overheated",
        "debris",
        "track-tension",
    ],
    fields: &[],
    cold: true,
    stands: &[],
};

const IDLES: Step = Step {
    id: "idles",
    title: "Idles and oil temperature",
    how: "True engine speed by tachometer; temperature at the motor’s drain hose, the same place each time. From 45 °C on the rest counts.",
    minutes: 1.0,
    looks: &[],
    fields: &[Field::Oil, Field::LowIdle, Field::HighIdle],
    cold: true,
    stands: &[],
};

const CHARGE: Step = Step {
    id: "charge",
    title: "Charge in neutral",
    how: "One gauge, not moved. Low idle, then high idle.",
    minutes: 1.0,
    looks: &[],
    fields: &[Field::ChargeLow, Field::ChargeHigh],
    cold: false,
    stands: &[],
};

const KNEE: Step = Step {
    id: "knee",
    title: "Knee",
    how: "Bring the engine up slowly from low idle: at which speed does charge stop rising? Where it does not rise at all, enter the low idle.",
    minutes: 0.5,
    looks: &[],
    fields: &[Field::Knee],
    cold: false,
    stands: &[],
};

const CHARGE_DRIVE: Step = Step {
    id: "charge-drive",
    title: "Charge at half speed",
    how: "Half lever or less, light, the same gauge. Forward, then reverse.",
    minutes: 1.0,
    looks: &[],
    fields: &[Field::ChargeForward, Field::ChargeReverse],
    cold: false,
    stands: &[Stands::Driving],
};

const CHARGE_SIDES: Step = Step {
    id: "charge-drive",
    title: "Charge with each side stroked",
    how: "Half lever, light, the same gauge: left alone, right alone, both.",
    minutes: 1.0,
    looks: &[],
    fields: &[Field::ChargeLeft, Field::ChargeRight, Field::ChargeBoth],
    cold: false,
    stands: &[Stands::Driving],
};

const SPEED: Step = Step {
    id: "speed",
    title: "Full lever on the flat",
    how: "Count wheel turns for half a minute, or time the marked run; the same each time. Forward, then reverse.",
    minutes: 1.5,
    looks: &[],
    fields: &[
        Field::Distance,
        Field::ForwardTurns,
        Field::ForwardTime,
        Field::ReverseTurns,
        Field::ReverseTime,
        Field::EngineLight,
    ],
    cold: false,
    stands: &[Stands::Driving],
};

const SPEED_SIDES: Step = Step {
    id: "speed",
    title: "Full lever on the flat",
    how: "Count the turns of both sprockets over the same time, left here and right there. Forward, then reverse.",
    minutes: 1.0,
    looks: &["range-shift"],
    fields: &[
        Field::ForwardTurns,
        Field::ForwardTurnsRight,
        Field::ForwardTime,
        Field::ReverseTurns,
        Field::ReverseTurnsRight,
        Field::ReverseTime,
        Field::EngineLight,
    ],
    cold: false,
    stands: &[Stands::Driving],
};

const SLIP: Step = Step {
    id: "slip",
    title: "The same up the ramp",
    how: "Full lever forward up the yard ramp or against the drag, always the same one, counted or timed as on the flat.",
    minutes: 1.0,
    looks: &[],
    fields: &[Field::LoadedTurns, Field::LoadedTime, Field::EngineLoaded],
    cold: false,
    stands: &[Stands::Driving],
};

const STANDS: Step = Step {
    id: "neutral",
    title: "Neutral, stopping, parking brake",
    how: "Nobody in front, behind or below.",
    minutes: 1.0,
    looks: &["creep", "release", "park-brake"],
    fields: &[],
    cold: true,
    stands: &[],
};

const PATH: Step = Step {
    id: "path",
    title: "Straight run and spin",
    how: "Both levers full along the line, forward and reverse on the same lane; then one full spin turn to each side.",
    minutes: 1.0,
    looks: &[],
    fields: &[
        Field::Lane,
        Field::Track,
        Field::AsideForward,
        Field::AsideReverse,
        Field::SpinLeft,
        Field::SpinRight,
    ],
    cold: false,
    stands: &[Stands::Driving],
};

const HUBS: Step = Step {
    id: "hubs",
    title: "Hubs after the run",
    how: "Temperature of both hubs or sprocket motors, the same spot on each. They may be hot.",
    minutes: 0.5,
    looks: &[],
    fields: &[Field::HubLeft, Field::HubRight],
    cold: false,
    stands: &[],
};

const DRAIN: Step = Step {
    id: "drain",
    title: "Motor drain in neutral, where a tee is fitted",
    how: "High idle, true neutral. Only where a permanent tee is: no hose is opened for a yard check. Never cap a drain.",
    minutes: 0.5,
    looks: &[],
    fields: &[Field::Drain],
    cold: false,
    stands: &[Stands::Drain, Stands::Jug],
};

const DRAIN_SIDES: Step = Step {
    fields: &[Field::Drain, Field::DrainRight],
    ..DRAIN
};

const ONE_PATH: &[Step] = &[
    WALK,
    IDLES,
    CHARGE,
    KNEE,
    CHARGE_DRIVE,
    SPEED,
    SLIP,
    STANDS,
    DRAIN,
];

const TWO_PATHS: &[Step] = &[
    WALK,
    IDLES,
    CHARGE,
    KNEE,
    CHARGE_SIDES,
    SPEED_SIDES,
    SLIP,
    STANDS,
    PATH,
    HUBS,
    DRAIN_SIDES,
];

/// The steps of a unit, in order. Common practice.
#[must_use]
pub fn steps(unit: &Unit) -> &'static [Step] {
    if unit.ticks.paths.is_one() {
        ONE_PATH
    } else {
        TWO_PATHS
    }
}
