//! What is typed in a reading's field, and what was seen. One line of text holds every kind of answer, so that even a
//! half-typed one is part of the record and comes back after a reload:
//!
//! | text | answer |
//! | --- | --- |
//! | `24,5` or `350 psi` | a steady value |
//! | `18 … 22 bar` | the needle swings |
//! | `≥ 60 bar` | off the scale |
//! | `nothing` | no pressure, flow, speed or current |
//! | `× 80 %` | a share of another reading on the same instrument |
//! | `not possible: no port` | could not be taken |
//!
//! The signs are ones that nobody types by chance, so that a field never changes under the hand.

use crate::app::parts::Entry;
use crate::quantity::{Kind, Measure};
use crate::readings::{Condition, Direction, Doing, EngineSpeed, Lever, Port, Reading, Seen};

/// Kinds of answer.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Mode {
    /// A steady value.
    Value,
    /// Off the scale.
    OffScale,
    /// Nothing at all.
    Nothing,
    /// Swings.
    Swing,
    /// Share of another reading.
    Share,
    /// Could not be taken.
    NotPossible,
}

const BETWEEN: &str = " … ";
const OVER: &str = "≥ ";
const TIMES: &str = "× ";
const NOTHING: &str = "nothing";
const NOT_POSSIBLE: &str = "not possible: ";

/// The kind of answer that a reading holds or is being given.
pub fn mode(reading: &Reading) -> Mode {
    match &reading.seen {
        Some(Seen::Value { .. }) => Mode::Value,
        Some(Seen::Swing { .. }) => Mode::Swing,
        Some(Seen::OffScale { .. }) => Mode::OffScale,
        Some(Seen::Nothing) => Mode::Nothing,
        Some(Seen::ShareOf { .. }) => Mode::Share,
        Some(Seen::NotPossible { .. }) => Mode::NotPossible,
        None if reading.typed.starts_with(OVER) => Mode::OffScale,
        None if reading.typed.starts_with(TIMES) => Mode::Share,
        None if reading.typed.starts_with(NOT_POSSIBLE) => Mode::NotPossible,
        None if reading.typed.contains(BETWEEN) => Mode::Swing,
        None => Mode::Value,
    }
}

/// True while nothing was said at all: no answer and no text.
pub fn is_open(reading: &Reading) -> bool {
    reading.seen.is_none() && reading.typed.trim().is_empty()
}

/// Text and answer of one edit.
pub type Said = (String, Option<Seen>);

/// A steady value. At the inlet the pull counts, whichever way its sign was typed.
pub fn value(port: Port, entry: Entry) -> Said {
    let seen = entry
        .value
        .and_then(|value| at_port(port, value))
        .map(|value| Seen::Value { value });
    (entry.typed, seen)
}

/// "Nothing".
pub fn nothing() -> Said {
    (String::from(NOTHING), Some(Seen::Nothing))
}

/// Off the scale, with its top.
pub fn off_scale(entry: Entry) -> Said {
    (
        format!("{OVER}{}", entry.typed),
        entry.value.map(|top| Seen::OffScale { top }),
    )
}

/// The top of the scale as typed.
pub fn off_scale_typed(reading: &Reading) -> &str {
    reading.typed.strip_prefix(OVER).unwrap_or_default()
}

/// A swing between two values.
pub fn swing(port: Port, low: &Entry, high: &Entry) -> Said {
    let seen = match (
        low.value.and_then(|v| at_port(port, v)),
        high.value.and_then(|v| at_port(port, v)),
    ) {
        (Some(one), Some(other)) if one.base() <= other.base() => Some(Seen::Swing {
            low: one,
            high: other,
        }),
        (Some(one), Some(other)) => Some(Seen::Swing {
            low: other,
            high: one,
        }),
        _ => None,
    };
    (format!("{}{BETWEEN}{}", low.typed, high.typed), seen)
}

/// The ends of a swing as typed.
pub fn swing_typed(reading: &Reading) -> (&str, &str) {
    reading
        .typed
        .split_once(BETWEEN)
        .unwrap_or((&reading.typed, ""))
}

/// A share of the reading in another condition.
pub fn share(entry: Entry, other: Condition) -> Said {
    let seen = entry.value.map(|share| Seen::ShareOf {
        share: share.base(),
        other: Box::new(other),
    });
    (format!("{TIMES}{}", entry.typed), seen)
}

/// The share as typed.
pub fn share_typed(reading: &Reading) -> &str {
    reading.typed.strip_prefix(TIMES).unwrap_or_default()
}

/// Not possible, and why. An empty reason is still an answer: the reading is closed.
pub fn not_possible(why: &str) -> Said {
    (
        format!("{NOT_POSSIBLE}{why}"),
        Some(Seen::NotPossible {
            why: why.to_owned(),
        }),
    )
}

/// The text that opens a kind of answer which needs more typing.
pub fn opened(mode: Mode) -> Said {
    match mode {
        Mode::Value => (String::new(), None),
        Mode::OffScale => (String::from(OVER), None),
        Mode::Nothing => nothing(),
        Mode::Swing => (String::from(BETWEEN), None),
        Mode::Share => (String::from(TIMES), None),
        Mode::NotPossible => not_possible(""),
    }
}

/// A value as the record holds it for this port.
fn at_port(port: Port, value: Measure) -> Option<Measure> {
    match port {
        Port::InletPull => Measure::from_base(value.base().abs(), Kind::Pressure).ok(),
        _ => Some(value),
    }
}

/// A recorded value as its field shows it: a pull in a vacuum unit stands below the air. `typed_base` is the base value of
/// the text as it stands, whose sign is kept.
pub fn for_field(
    port: Port,
    value: Measure,
    is_vacuum: bool,
    typed_base: Option<f64>,
) -> Option<Measure> {
    let is_below = port == Port::InletPull && typed_base.map_or(is_vacuum, |base| base < 0.0);
    Measure::from_base(
        if is_below {
            -value.base()
        } else {
            value.base()
        },
        value.kind(),
    )
    .ok()
}

/// What a field for this port takes, ends included. Wide on purpose: a loop pressure typed as charge pressure is a reading
/// on the wrong port, and the ranking has to see it.
pub fn range(port: Port) -> Option<(Measure, Measure)> {
    let (low, high) = match (port, port.kind()) {
        (Port::LoopDifference, _) => (-700.0, 700.0),
        (Port::InletPull, _) => (-1.0, 1.0),
        (Port::PumpCase | Port::MotorCase, _) => (-1.0, 700.0),
        (_, Kind::Pressure) => (0.0, 700.0),
        (_, Kind::Flow) => (0.0, 1000.0),
        (_, Kind::RotationalSpeed) => (0.0, 10_000.0),
        (_, Kind::Current) => (0.0, 5000.0),
        (_, Kind::GroundSpeed) => (0.0, 120.0),
        (_, Kind::Time) => (0.0, 300.0),
        (_, Kind::Temperature) => (-50.0, 200.0),
        _ => return None,
    };
    let measure = |base| Measure::from_base(base, port.kind()).ok();
    measure(low).zip(measure(high))
}

/// What a share is taken of: the readings that a mechanic compares on one gauge, with the words for them.
pub fn comparisons(condition: &Condition) -> Vec<(&'static str, Condition)> {
    let mut others = Vec::new();
    match condition.engine {
        EngineSpeed::LowIdle => {
            others.push((
                "high idle",
                Condition {
                    engine: EngineSpeed::HighIdle,
                    ..*condition
                },
            ));
        }
        EngineSpeed::HighIdle | EngineSpeed::Measured(_) => {
            others.push((
                "low idle",
                Condition {
                    engine: EngineSpeed::LowIdle,
                    ..*condition
                },
            ));
        }
    }
    if condition.doing.is_neutral() {
        let driven = Condition {
            doing: Doing::Free,
            lever: Lever::Half,
            ..*condition
        };
        others.push(("light drive, half lever", driven));
        return others;
    }
    let (words, direction) = match condition.direction {
        Direction::Forward => ("reverse", Direction::Reverse),
        Direction::Reverse => ("forward", Direction::Forward),
    };
    others.insert(
        0,
        (
            words,
            Condition {
                direction,
                ..*condition
            },
        ),
    );
    others.push((
        "neutral",
        Condition {
            doing: Doing::Neutral,
            ..*condition
        },
    ));
    match condition.doing {
        Doing::Loaded => others.push((
            "driving, light",
            Condition {
                doing: Doing::Travel,
                ..*condition
            },
        )),
        Doing::Travel => others.push((
            "driving, loaded",
            Condition {
                doing: Doing::Loaded,
                ..*condition
            },
        )),
        _ => {}
    }
    others
}
