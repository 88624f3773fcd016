//! Oil caught in a jug: litres and seconds as they were typed or stopped, the flow they make, and how far off it may be.
//!
//! A jug is for a trickle. From [`MOST`] on it fills faster than a hand gets clear of it, so no flow is made of such a catch.

use super::instrument::timed::{JUG_MARK_SHARE, Timed, TimedError, jug_flow};
use super::{Port, Reading, Seen};
use crate::quantity::{Kind, Measure, Typed, Unit};
use serde::{Deserialize, Serialize};
use thiserror::Error;

/// Most that is caught in a jug, L/min. Common practice: 30 L/min fills a 5 L jug in 10 s.
pub const MOST: f64 = 10.0;
/// Time from which the hand on the watch hardly counts any more, s. Common practice.
pub const LONG_ENOUGH_S: f64 = 30.0;
/// Least and most that a jug's field takes, L.
pub const VOLUME: (f64, f64) = (0.01, 50.0);
/// Least and most that its watch's field takes, s.
pub const TIME: (f64, f64) = (1.0, 1800.0);
/// How far a reading may lie from the flow of its catch and still be its figure, as a share: the field shows it rounded.
const ROUNDED: f64 = 0.006;

/// What was caught, as typed.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct JugCatch {
    /// Oil in the jug; typed without a unit it is in the shop's unit of volume.
    #[serde(skip_serializing_if = "Typed::is_empty")]
    pub volume: Typed,
    /// Time it took.
    #[serde(skip_serializing_if = "Typed::is_empty")]
    pub time: Typed,
}

/// Why a catch makes no flow.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum CatchError {
    /// One of the two is not there, or cannot be read.
    #[error("litres and seconds both make the flow: put in what is missing")]
    Missing,
    /// More than a jug is for.
    #[error(
        "{flow:.0} L/min is too much for a jug: it overflows before a hand is clear of it. Stop the engine, take a flow meter of \
         full bore; no jug above {most:.0} L/min (common practice)",
        most = MOST
    )]
    TooMuch {
        /// The flow, L/min.
        flow: f64,
    },
    /// No quotient.
    #[error(transparent)]
    Timed(#[from] TimedError),
}

impl JugCatch {
    /// True where nothing stands in either field.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.volume.is_blank() && self.time.is_blank()
    }

    /// The flow: 60 V / t, with the jug's marks, the level in it and the hand on the watch as its uncertainty
    /// ([`jug_flow`]).
    ///
    /// # Errors
    /// [`CatchError`].
    pub fn flow(&self) -> Result<Timed, CatchError> {
        let (Some(volume), Some(time)) = (self.volume.value, self.time.value) else {
            return Err(CatchError::Missing);
        };
        let made = jug_flow(volume, time, JUG_MARK_SHARE)?;
        if made.value.base() > MOST {
            return Err(CatchError::TooMuch {
                flow: made.value.base(),
            });
        }
        Ok(made)
    }

    /// The flow where it is the figure that a reading holds; none once another figure was typed over it.
    #[must_use]
    pub fn behind(&self, reading: &Reading) -> Option<Timed> {
        let Some(Seen::Value { value }) = &reading.seen else {
            return None;
        };
        let made = self.flow().ok()?;
        let (read, flow) = (value.base_of(Kind::Flow)?, made.value.base());
        ((read - flow).abs() <= ROUNDED * flow).then_some(made)
    }

    /// True where it was caught for less time than common practice asks.
    #[must_use]
    pub fn is_short(&self) -> bool {
        self.time
            .value_in(Unit::Second)
            .is_some_and(|seconds| seconds < LONG_ENOUGH_S)
    }
}

/// True where a jug and a watch can read this port.
#[must_use]
pub fn reads(port: Port) -> bool {
    port.kind() == Kind::Flow
}

/// The flow to as many digits as a jug is worth, in a unit: three.
#[must_use]
pub fn rounded(flow: Measure, unit: Unit) -> Option<Measure> {
    let value = flow.try_in_unit(unit).ok()?;
    let value: f64 = format!("{value:.2e}").parse().ok()?;
    Measure::new(value, unit).ok()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::readings::{Condition, Path};

    fn caught(litres: f64, seconds: f64) -> JugCatch {
        JugCatch {
            volume: Typed::shown(litres, Unit::Litre, 3),
            time: Typed::shown(seconds, Unit::Second, 1),
        }
    }

    fn read(value: Measure) -> Reading {
        Reading {
            id: "r1".to_owned(),
            port: Port::MotorDrain,
            path: Path::Left,
            condition: Condition::start(),
            rigging: String::new(),
            seen: Some(Seen::Value { value }),
            typed: String::new(),
            note: String::new(),
        }
    }

    #[test]
    fn two_litres_in_thirty_one_seconds() {
        let made = caught(2.0, 31.0).flow().expect("a flow");
        assert!((made.value.base() - 120.0 / 31.0).abs() < 1e-12);
        // By hand: marks 5 % / √3; level 2 % / √3; the watch twice 0.2 s / √3 in 31 s.
        let marks = 0.05 / 3f64.sqrt();
        let own = (0.02f64.powi(2) / 3.0 + 2.0 * 0.2f64.powi(2) / 3.0 / 31.0f64.powi(2)).sqrt();
        assert!((made.bias / made.value.base() - marks).abs() < 1e-12);
        assert!((made.reading / made.value.base() - own).abs() < 1e-12);
        assert!(!caught(2.0, 31.0).is_short() && caught(2.0, 12.0).is_short());
    }

    #[test]
    fn more_than_a_jug_is_for_is_refused_with_what_to_do_instead() {
        let why = caught(5.0, 10.0).flow().expect_err("30 L/min");
        assert_eq!(why, CatchError::TooMuch { flow: 30.0 });
        let words = why.to_string();
        assert!(
            words.contains("flow meter") && words.contains("10 L/min"),
            "{words}"
        );
        // The limit itself is still a catch.
        assert!(caught(5.0, 30.0).flow().is_ok());
        assert!(caught(5.01, 30.0).flow().is_err());
    }

    #[test]
    fn half_a_catch_is_none() {
        for half in [
            JugCatch {
                time: Typed::default(),
                ..caught(2.0, 31.0)
            },
            JugCatch {
                volume: Typed {
                    typed: "two".to_owned(),
                    value: None,
                },
                ..caught(2.0, 31.0)
            },
            JugCatch::default(),
        ] {
            assert_eq!(half.flow(), Err(CatchError::Missing));
        }
        assert!(JugCatch::default().is_empty() && !caught(2.0, 31.0).is_empty());
        assert!(matches!(caught(2.0, 0.0).flow(), Err(CatchError::Timed(_))));
    }

    #[test]
    fn a_figure_typed_over_it_is_not_the_jugs_any_more() {
        let jug = caught(2.0, 31.0);
        let flow = jug.flow().expect("a flow").value;
        for unit in [Unit::LitrePerMinute, Unit::UsGallonPerMinute] {
            let shown = rounded(flow, unit).expect("a figure");
            assert!(jug.behind(&read(shown)).is_some(), "{unit}");
        }
        let other = Measure::new(4.2, Unit::LitrePerMinute).expect("a flow");
        assert_eq!(jug.behind(&read(other)), None);
    }

    #[test]
    fn every_flow_is_read_with_a_jug_and_nothing_else_is() {
        for port in Port::ALL {
            assert_eq!(
                reads(port),
                matches!(port, Port::MotorDrain | Port::ReturnFlow)
            );
        }
    }
}
