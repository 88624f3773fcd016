//! The tracking sheet of a visit, as it is kept: every text as it was typed, so that even what cannot be read comes back.

use super::adjust::Screws;
use super::run::{LANE, Machine, Run, RunError, Seen, Setting, Undercarriage};
use crate::quantity::{Measure, Typed, Unit, parse};
use serde::{Deserialize, Serialize};
use std::collections::BTreeMap;
use thiserror::Error;

/// Most runs on one sheet.
pub const LINES: usize = 200;

/// What is measured in a run.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum What {
    /// Turns of both wheels or sprockets over the same time.
    #[default]
    Turns,
    /// Turns of each, one after the other, each with its time.
    TurnsApart,
    /// Wheel or sprocket speeds.
    WheelSpeeds,
    /// Speeds over the ground of the two sides.
    SideSpeeds,
    /// Deviation over a distance.
    Path,
    /// One turn rolled out.
    RollOut,
}

/// To which side it went, by the seat.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Hand {
    /// Left.
    Left,
    /// Right.
    Right,
}

/// A field of a run.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Field {
    /// Left count, speed or roll-out.
    Left,
    /// Right count, speed or roll-out.
    Right,
    /// Time of both counts, or of the left one.
    Seconds,
    /// Time of the right count.
    SecondsRight,
    /// Length of the lane.
    Distance,
    /// Deviation, without its side.
    Aside,
    /// Stated standard uncertainty.
    Uncertainty,
}

/// A field of the sheet's head.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Head {
    /// Track width.
    Track,
    /// Speed at the low mark over full speed.
    Low,
    /// Speed at the half mark over full speed.
    Half,
    /// One turn of the null screw, share of full stroke.
    NullTurn,
    /// One turn of the full-stroke stop, share of full stroke.
    StopTurn,
}

impl What {
    /// Everything that can be measured.
    pub const ALL: [What; 6] = [
        What::Turns,
        What::TurnsApart,
        What::WheelSpeeds,
        What::SideSpeeds,
        What::Path,
        What::RollOut,
    ];

    /// The fields that have to be filled, and those that may be.
    #[must_use]
    pub fn fields(self) -> (&'static [Field], &'static [Field]) {
        use Field::{Aside, Distance, Left, Right, Seconds, SecondsRight, Uncertainty};
        match self {
            What::Turns => (&[Left, Right], &[Seconds, Uncertainty]),
            What::TurnsApart => (&[Left, Seconds, Right, SecondsRight], &[Uncertainty]),
            What::WheelSpeeds | What::SideSpeeds | What::RollOut => {
                (&[Left, Right], &[Uncertainty])
            }
            What::Path => (&[Distance, Aside], &[Uncertainty]),
        }
    }

    /// Unit in which a field is asked for, and the highest figure taken, in that unit. Nothing is under 0.
    #[must_use]
    pub fn asks(self, field: Field) -> (Unit, f64) {
        match (self, field) {
            (_, Field::Seconds | Field::SecondsRight) => (Unit::Second, 3_600.0),
            (_, Field::Distance) => (Unit::Metre, LANE),
            (What::Path, _) => (Unit::Metre, LANE),
            (What::RollOut, _) => (Unit::Metre, 20.0),
            (What::WheelSpeeds, _) => (Unit::RevolutionPerMinute, 5_000.0),
            (What::SideSpeeds, _) => (Unit::KilometrePerHour, 100.0),
            (What::Turns | What::TurnsApart, _) => (Unit::Turn, 100_000.0),
        }
    }
}

impl Head {
    /// Every field of the head.
    pub const ALL: [Head; 5] = [
        Head::Track,
        Head::Low,
        Head::Half,
        Head::NullTurn,
        Head::StopTurn,
    ];

    /// Unit in which it is asked for, lowest and highest taken, in that unit.
    #[must_use]
    pub fn asks(self) -> (Unit, f64, f64) {
        match self {
            Head::Track => (Unit::Metre, 0.2, 10.0),
            Head::Low => (Unit::Percent, 3.0, 60.0),
            Head::Half => (Unit::Percent, 20.0, 95.0),
            Head::NullTurn | Head::StopTurn => (Unit::Percent, 0.1, 200.0),
        }
    }
}

/// One run as it stands on the sheet.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Line {
    /// Stable id.
    pub id: String,
    /// What is measured.
    pub what: What,
    /// In which setting.
    pub setting: Setting,
    /// What was typed.
    pub fields: BTreeMap<Field, Typed>,
    /// To which side it went; none where nobody said.
    pub hand: Option<Hand>,
    /// Left out of the reckoning, though it stays on the sheet.
    #[serde(skip_serializing_if = "std::ops::Not::not")]
    pub is_left_out: bool,
}

/// Why a line is not reckoned with.
#[derive(Clone, Copy, Debug, PartialEq, Error)]
pub enum LineProblem {
    /// The mechanic left it out.
    #[error("left out")]
    LeftOut,
    /// Fields are empty.
    #[error("not filled in yet")]
    Missing,
    /// A field cannot be read.
    #[error("a field cannot be read; it says why beside it")]
    Unread,
    /// Nobody said to which side it went.
    #[error("say to which side it went, left or right by the seat")]
    NoHand,
    /// The figures cannot be.
    #[error(transparent)]
    Run(#[from] RunError),
}

impl Line {
    /// The figure of a field in the base unit that [`Run`] takes (m, s, rpm, m/s, turns).
    fn figure(&self, field: Field) -> Result<f64, LineProblem> {
        let typed = self.fields.get(&field).filter(|t| !t.is_blank());
        let value = typed.ok_or(LineProblem::Missing)?.value;
        let (unit, _) = self.what.asks(field);
        let unit = match unit {
            Unit::KilometrePerHour => Unit::MetrePerSecond,
            other => other,
        };
        value
            .and_then(|value| value.try_in_unit(unit).ok())
            .ok_or(LineProblem::Unread)
    }

    /// Changes what is measured. Texts stay; they are read anew in the unit that is asked for now.
    pub fn choose(&mut self, what: What) {
        self.what = what;
        for (field, typed) in &mut self.fields {
            let (unit, high) = what.asks(*field);
            let range = Measure::literal(0.0, unit)..=Measure::literal(high, unit);
            typed.value = parse(&typed.typed, unit.kind(), unit, Some(range))
                .ok()
                .map(|parsed| parsed.measure);
        }
    }

    fn optional(&self, field: Field) -> Result<Option<f64>, LineProblem> {
        match self.figure(field) {
            Ok(value) => Ok(Some(value)),
            Err(LineProblem::Missing) => Ok(None),
            Err(other) => Err(other),
        }
    }

    /// The run that the line tells.
    ///
    /// # Errors
    /// [`LineProblem`] says why it is none yet.
    pub fn run(&self, machine: &Machine) -> Result<Run, LineProblem> {
        if self.is_left_out {
            return Err(LineProblem::LeftOut);
        }
        let (left, right) = (Field::Left, Field::Right);
        let seen = match self.what {
            What::Turns => Seen::Turns {
                left: self.figure(left)?,
                right: self.figure(right)?,
                seconds: self.optional(Field::Seconds)?,
            },
            What::TurnsApart => Seen::TurnsApart {
                left: (self.figure(left)?, self.figure(Field::Seconds)?),
                right: (self.figure(right)?, self.figure(Field::SecondsRight)?),
            },
            What::WheelSpeeds => Seen::WheelSpeeds {
                left: self.figure(left)?,
                right: self.figure(right)?,
            },
            What::SideSpeeds => Seen::SideSpeeds {
                left: self.figure(left)?,
                right: self.figure(right)?,
            },
            What::RollOut => Seen::RollOut {
                left: self.figure(left)?,
                right: self.figure(right)?,
            },
            What::Path => {
                let (distance, aside) = (self.figure(Field::Distance)?, self.figure(Field::Aside)?);
                let left = match self.hand {
                    Some(Hand::Left) => aside,
                    Some(Hand::Right) => -aside,
                    None if aside == 0.0 => 0.0,
                    None => return Err(LineProblem::NoHand),
                };
                Seen::Path { distance, left }
            }
        };
        let run = Run {
            setting: self.setting,
            seen,
            uncertainty: self.optional(Field::Uncertainty)?,
        };
        run.check(machine)?;
        Ok(run)
    }
}

/// How a step of the work came out.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Answer {
    /// Looked at and good.
    Good,
    /// Not good: to be put right before going on.
    Off,
    /// This machine has none.
    None,
}

/// The tracking sheet of a visit.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct TrackingSheet {
    /// What carries the machine; none: not said.
    pub undercarriage: Option<Undercarriage>,
    /// The head of the sheet.
    pub head: BTreeMap<Head, Typed>,
    /// Steps of the work that were answered, by step id.
    pub steps: BTreeMap<String, Answer>,
    /// The runs, in the order made.
    pub runs: Vec<Line>,
    /// Fields written by a newer version: kept as they are.
    #[serde(flatten)]
    pub extra: BTreeMap<String, serde_json::Value>,
}

impl TrackingSheet {
    fn head(&self, field: Head, unit: Unit) -> Option<f64> {
        self.head.get(&field)?.value?.try_in_unit(unit).ok()
    }

    /// What the sheet says of the machine. `usual` stands in where it does not say what carries it.
    #[must_use]
    pub fn machine(&self, usual: Undercarriage) -> Machine {
        Machine {
            track: self.head(Head::Track, Unit::Metre),
            undercarriage: self.undercarriage.unwrap_or(usual),
            low: self.head(Head::Low, Unit::Fraction),
            half: self.head(Head::Half, Unit::Fraction),
            rolling: None,
        }
    }

    /// What one turn of each adjuster does.
    #[must_use]
    pub fn screws(&self) -> Screws {
        Screws {
            null: self.head(Head::NullTurn, Unit::Fraction),
            stop: self.head(Head::StopTurn, Unit::Fraction),
        }
    }

    /// Every line with its run, or why it is none.
    #[must_use]
    pub fn runs(&self, machine: &Machine) -> Vec<Result<Run, LineProblem>> {
        self.runs.iter().map(|line| line.run(machine)).collect()
    }
}
