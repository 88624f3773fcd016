//! A reading that a check yields: port and condition, without the temperature of the day.

use crate::quantity::{Kind, Measure};
use crate::readings::{
    Condition, Direction, Doing, EngineSpeed, Lever, OilTemperature, Port, Stroked,
};

/// Engine speed (rpm) of held checks: 1200 to 1500 is common practice.
const MIDDLE: f64 = 1500.0;

/// Idle that a check is made at.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Idle {
    /// Low idle.
    Low,
    /// 1500 rpm: for held checks, that want neither idle.
    Middle,
    /// High idle.
    High,
}

/// A reading that a check yields.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Yield {
    /// What is read.
    pub port: Port,
    /// What the machine does.
    pub doing: Doing,
    /// Direction asked; without meaning in neutral.
    pub direction: Direction,
    /// Lever; without meaning in neutral.
    pub lever: Lever,
    /// Idle the throttle is left at.
    pub idle: Idle,
    /// Flushing blocked, as the unit's manual allows.
    pub flushing_blocked: bool,
    /// Consumers capped.
    pub consumers_capped: bool,
    /// Path stroked, on a machine with two.
    pub stroked: Stroked,
}

impl Yield {
    /// In neutral.
    pub const fn neutral(port: Port, idle: Idle) -> Yield {
        Yield {
            port,
            doing: Doing::Neutral,
            direction: Direction::Forward,
            lever: Lever::Full,
            idle,
            flushing_blocked: false,
            consumers_capped: false,
            stroked: Stroked::Both,
        }
    }

    /// Stroked, at high idle.
    pub const fn driven(port: Port, doing: Doing, direction: Direction, lever: Lever) -> Yield {
        Yield {
            doing,
            direction,
            lever,
            ..Yield::neutral(port, Idle::High)
        }
    }

    /// The same while something else is done.
    pub const fn doing(self, doing: Doing) -> Yield {
        Yield { doing, ..self }
    }

    /// The same at another idle.
    pub const fn at(self, idle: Idle) -> Yield {
        Yield { idle, ..self }
    }

    /// The same with flushing blocked.
    pub const fn flushing_blocked(self) -> Yield {
        Yield {
            flushing_blocked: true,
            ..self
        }
    }

    /// The same with one path stroked and the other at rest.
    pub const fn stroked(self, stroked: Stroked) -> Yield {
        Yield { stroked, ..self }
    }

    /// The same with consumers capped.
    pub const fn consumers_capped(self) -> Yield {
        Yield {
            consumers_capped: true,
            ..self
        }
    }

    /// The condition to read in, with the oil as it is now.
    #[must_use]
    pub fn condition(&self, oil: Option<OilTemperature>) -> Condition {
        Condition {
            doing: self.doing,
            direction: self.direction,
            lever: self.lever,
            engine: match self.idle {
                Idle::Low => EngineSpeed::LowIdle,
                Idle::Middle => Measure::from_base(MIDDLE, Kind::RotationalSpeed)
                    .map_or(EngineSpeed::LowIdle, EngineSpeed::Measured),
                Idle::High => EngineSpeed::HighIdle,
            },
            oil,
            flushing_blocked: self.flushing_blocked,
            consumers_capped: self.consumers_capped,
            stroked: self.stroked,
        }
    }
}
