//! Figures made with a stopwatch: flow by jug, speed by counted turns, ground speed over a measured length.

use super::gum;
use crate::quantity::{Kind, Measure, MeasureError, Unit};
use thiserror::Error;

/// Limit of error of starting or stopping a watch by hand, s. Common practice.
pub const HAND_LIMIT_S: f64 = 0.2;
/// Limit of error of a jug's own marks, as a share. Common practice: kitchen and yard jugs 5 %, laboratory ware 1 %.
pub const JUG_MARK_SHARE: f64 = 0.05;
/// Limit of error of reading the level in a jug, as a share of what is in it: froth and tilt. Common practice.
pub const JUG_LEVEL_SHARE: f64 = 0.02;
/// Limit of error of counting turns past a mark, in turns. Common practice.
pub const TURN_LIMIT: f64 = 0.25;
/// Limit of error of a length paced out with a tape over the ground, as a share. Common practice.
pub const TAPE_SHARE: f64 = 0.005;

/// Why a timed figure cannot be made.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum TimedError {
    /// The watch shows nothing.
    #[error("the time must be more than zero; the watch shows {seconds} s")]
    NoTime {
        /// Time in s.
        seconds: f64,
    },
    /// Nothing was caught, counted or covered.
    #[error("the {what} must be more than zero")]
    Nothing {
        /// What: "volume", "number of turns", "length".
        what: &'static str,
    },
    /// A figure of another kind was given.
    #[error("a {wanted} was expected, not a {found}")]
    OtherKind {
        /// What was expected.
        wanted: Kind,
        /// What was given.
        found: Kind,
    },
    /// The quotient is no figure.
    #[error(transparent)]
    Measure(#[from] MeasureError),
}

/// A figure made with a stopwatch, with its uncertainty in two parts. Both in the base unit of the figure.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Timed {
    /// The figure.
    pub value: Measure,
    /// Standard uncertainty that all readings with this jug, tape or watch share.
    pub bias: f64,
    /// Standard uncertainty of this one reading.
    pub reading: f64,
}

impl Timed {
    /// Combined standard uncertainty, in the base unit of the figure.
    #[must_use]
    pub fn combined(&self) -> f64 {
        gum::combined(&[self.bias, self.reading])
    }
}

/// Flow from a volume caught in a time: 60 V / t. `mark_share` is the limit of error of the jug's marks
/// ([`JUG_MARK_SHARE`]).
///
/// # Errors
/// [`TimedError`].
pub fn jug_flow(volume: Measure, time: Measure, mark_share: f64) -> Result<Timed, TimedError> {
    let litres = positive(volume, Kind::Volume, "volume")?;
    let seconds = time_of(time)?;
    let flow = 60.0 * litres / seconds;
    Ok(Timed {
        value: Measure::new(flow, Unit::LitrePerMinute)?,
        bias: flow * gum::rectangular(mark_share),
        reading: flow * gum::combined(&[gum::rectangular(JUG_LEVEL_SHARE), watch_share(seconds)]),
    })
}

/// Speed of a wheel or shaft from turns counted past a mark in a time: 60 N / t.
///
/// # Errors
/// [`TimedError`].
pub fn counted_turns(turns: f64, time: Measure) -> Result<Timed, TimedError> {
    if turns.is_nan() || turns <= 0.0 {
        return Err(TimedError::Nothing {
            what: "number of turns",
        });
    }
    let seconds = time_of(time)?;
    let speed = 60.0 * turns / seconds;
    Ok(Timed {
        value: Measure::new(speed, Unit::RevolutionPerMinute)?,
        bias: 0.0,
        reading: speed
            * gum::combined(&[gum::rectangular(TURN_LIMIT) / turns, watch_share(seconds)]),
    })
}

/// Ground speed over a measured length: 3.6 s / t.
///
/// # Errors
/// [`TimedError`].
pub fn timed_ground_speed(length: Measure, time: Measure) -> Result<Timed, TimedError> {
    let metres = positive(length, Kind::Length, "length")?;
    let seconds = time_of(time)?;
    let speed = 3.6 * metres / seconds;
    Ok(Timed {
        value: Measure::new(speed, Unit::KilometrePerHour)?,
        bias: speed * gum::rectangular(TAPE_SHARE),
        reading: speed * watch_share(seconds),
    })
}

/// Standard uncertainty of a hand-stopped time as a share of it: once for the start, once for the stop.
fn watch_share(seconds: f64) -> f64 {
    gum::combined(&[
        gum::rectangular(HAND_LIMIT_S),
        gum::rectangular(HAND_LIMIT_S),
    ]) / seconds
}

fn positive(measure: Measure, kind: Kind, what: &'static str) -> Result<f64, TimedError> {
    let value = measure.base_of(kind).ok_or(TimedError::OtherKind {
        wanted: kind,
        found: measure.kind(),
    })?;
    if value > 0.0 {
        Ok(value)
    } else {
        Err(TimedError::Nothing { what })
    }
}

fn time_of(time: Measure) -> Result<f64, TimedError> {
    let seconds = time.base_of(Kind::Time).ok_or(TimedError::OtherKind {
        wanted: Kind::Time,
        found: time.kind(),
    })?;
    if seconds > 0.0 {
        Ok(seconds)
    } else {
        Err(TimedError::NoTime { seconds })
    }
}
