//! What is measured on a machine with two sides, and in which setting.

use crate::unit::MachineClass;
use serde::{Deserialize, Serialize};
use thiserror::Error;

/// Which way the machine travels, by the seat.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Travel {
    /// Forward.
    #[default]
    Forward,
    /// Reverse.
    Reverse,
}

impl Travel {
    /// +1 forward, −1 in reverse.
    pub(super) fn sign(self) -> f64 {
        match self {
            Travel::Forward => 1.0,
            Travel::Reverse => -1.0,
        }
    }
}

/// How far both levers were.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Lever {
    /// A little: a quarter or less.
    Low,
    /// About half, both at the same mark.
    #[default]
    Half,
    /// As far as they go.
    Full,
}

/// What the sides had to push.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Load {
    /// Wheels or tracks clear of the ground.
    Free,
    /// Rolling on level firm ground.
    #[default]
    Level,
    /// Drawbar or grade.
    Loaded,
}

/// Travel range of the motors.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Gear {
    /// The slow one, or the only one.
    #[default]
    One,
    /// The fast one.
    Two,
}

/// Which way the machine's front looked on the lane. It decides to which hand the camber pushes.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Facing {
    /// As in the first run.
    #[default]
    Out,
    /// Turned round on the same lane.
    Back,
}

/// In which setting a run was made.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Serialize, Deserialize)]
#[serde(default)]
pub struct Setting {
    /// Direction of travel.
    pub travel: Travel,
    /// Levers.
    pub lever: Lever,
    /// Load.
    pub load: Load,
    /// Range.
    pub gear: Gear,
    /// Which way the front looked.
    pub facing: Facing,
}

/// What was seen.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Seen {
    /// A run on a lane from a straight start.
    Path {
        /// Length of the lane, straight, m.
        distance: f64,
        /// Where the middle of the machine ended beside the line, m; positive to the left of the seat.
        left: f64,
    },
    /// Wheel or sprocket turns of both sides, counted over the same time.
    Turns {
        /// Turns of the left side.
        left: f64,
        /// Turns of the right side.
        right: f64,
        /// Time, s; none where only the turns were compared.
        seconds: Option<f64>,
    },
    /// Wheel or sprocket turns of each side, counted one after the other, each with its own time.
    TurnsApart {
        /// Turns of the left side and seconds.
        left: (f64, f64),
        /// Turns of the right side and seconds.
        right: (f64, f64),
    },
    /// Wheel or sprocket speeds, rpm.
    WheelSpeeds {
        /// Left.
        left: f64,
        /// Right.
        right: f64,
    },
    /// Speeds of the two sides over the ground, m/s.
    SideSpeeds {
        /// Left.
        left: f64,
        /// Right.
        right: f64,
    },
    /// One turn rolled out on the ground, mark to mark, m. No setting bears on it.
    RollOut {
        /// Left.
        left: f64,
        /// Right.
        right: f64,
    },
}

/// One thing measured.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Run {
    /// The setting.
    pub setting: Setting,
    /// What was seen.
    pub seen: Seen,
    /// Its standard uncertainty where the mechanic states one, in the unit of what was measured (m sideways, turns on each
    /// count, rpm, m/s, m round the wheel). Otherwise common practice stands in.
    pub uncertainty: Option<f64>,
}

/// What carries the machine. A machine that skids its wheels or tracks sideways turns less than its width says.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Undercarriage {
    /// Two driven wheels; the others swivel.
    #[default]
    Swivel,
    /// Tracks.
    Tracks,
    /// Wheels that do not steer and skid sideways.
    SkidWheels,
}

/// What usually carries a machine of this class.
#[must_use]
pub fn usual_undercarriage(class: MachineClass) -> Undercarriage {
    match class {
        MachineClass::CompactTracked | MachineClass::Crawler => Undercarriage::Tracks,
        MachineClass::CompactWheeled => Undercarriage::SkidWheels,
        _ => Undercarriage::Swivel,
    }
}

impl Undercarriage {
    /// Effective over measured track width and its relative standard spread. Common practice, from memory.
    pub(super) fn scrub(self) -> (f64, f64) {
        match self {
            Undercarriage::Swivel => (1.0, 0.02),
            Undercarriage::Tracks => (1.15, 0.10),
            Undercarriage::SkidWheels => (1.4, 0.18),
        }
    }
}

/// What has to be known of the machine.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Machine {
    /// Distance between the middles of the two sides, m. None: no path run can be used.
    pub track: Option<f64>,
    /// What carries it.
    pub undercarriage: Undercarriage,
    /// Share of full speed at the low lever mark, where known.
    pub low: Option<f64>,
    /// Share of full speed at the half lever mark, where known.
    pub half: Option<f64>,
    /// Distance between the marks on the ground for one wheel turn, m, where known. For speeds in words only.
    pub rolling: Option<f64>,
}

/// Longest lane, m.
pub const LANE: f64 = 500.0;
/// Largest ratio of one side to the other that is still a tracking matter. Beyond it one side is not driving.
const RATIO: f64 = 2.0;

/// Why a run cannot be used.
#[derive(Clone, Copy, Debug, PartialEq, Error)]
pub enum RunError {
    /// Not a number.
    #[error("a figure is missing or is no number")]
    NotFinite,
    /// A distance, count or speed that must be more than nothing.
    #[error("{what} must be more than 0")]
    NotPositive {
        /// Which figure.
        what: &'static str,
    },
    /// A lane that is too long.
    #[error("the lane is longer than {LANE} m: give 1 to {LANE} m")]
    LaneTooLong,
    /// It bent by more than the lane is long: it went in a circle.
    #[error(
        "it ended further to the side than the lane is long: stop the run sooner, while it is within half the distance"
    )]
    TooFarAside,
    /// One side is more than twice as fast.
    #[error(
        "one side is more than {RATIO} times as fast as the other: that side is not driving as it should; this is a fault to find, not tracking to adjust"
    )]
    TooUneven,
    /// A path without a width.
    #[error(
        "a path run needs the track width of the machine (middle of one side to middle of the other)"
    )]
    NoTrack,
}

fn positive(value: f64, what: &'static str) -> Result<(), RunError> {
    if !value.is_finite() {
        Err(RunError::NotFinite)
    } else if value > 0.0 {
        Ok(())
    } else {
        Err(RunError::NotPositive { what })
    }
}

fn even(left: f64, right: f64) -> Result<(), RunError> {
    let ratio = right / left;
    if (1.0 / RATIO..=RATIO).contains(&ratio) {
        Ok(())
    } else {
        Err(RunError::TooUneven)
    }
}

impl Run {
    /// Whether the run can be used.
    ///
    /// # Errors
    /// [`RunError`] says what is wrong with it.
    pub fn check(&self, machine: &Machine) -> Result<(), RunError> {
        if let Some(u) = self.uncertainty {
            positive(u, "the uncertainty")?;
        }
        match self.seen {
            Seen::Path { distance, left } => {
                positive(distance, "the distance")?;
                if !left.is_finite() {
                    return Err(RunError::NotFinite);
                }
                if distance > LANE {
                    return Err(RunError::LaneTooLong);
                }
                if left.abs() > 0.7 * distance {
                    return Err(RunError::TooFarAside);
                }
                match machine.track {
                    Some(track) => positive(track, "the track width"),
                    None => Err(RunError::NoTrack),
                }
            }
            Seen::Turns {
                left,
                right,
                seconds,
            } => {
                positive(left, "the left count")?;
                positive(right, "the right count")?;
                if let Some(seconds) = seconds {
                    positive(seconds, "the time")?;
                }
                even(left, right)
            }
            Seen::TurnsApart { left, right } => {
                for (turns, seconds) in [left, right] {
                    positive(turns, "the count")?;
                    positive(seconds, "the time")?;
                }
                even(left.0 / left.1, right.0 / right.1)
            }
            Seen::WheelSpeeds { left, right } | Seen::SideSpeeds { left, right } => {
                positive(left, "the left speed")?;
                positive(right, "the right speed")?;
                even(left, right)
            }
            Seen::RollOut { left, right } => {
                positive(left, "the left roll-out")?;
                positive(right, "the right roll-out")?;
                even(left, right)
            }
        }
    }
}
