//! The condition: what the machine is doing while a reading is taken.

use super::Path;
use crate::quantity::Measure;
use serde::{Deserialize, Serialize};

/// What the machine is doing when a reading is taken.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Doing {
    /// Lever in neutral, parking brake set, machine chocked.
    Neutral,
    /// Lever in neutral, driven wheels or tracks clear of the ground and free to turn.
    NeutralFree,
    /// As [`Doing::NeutralFree`], with the two servo ports bridged.
    NeutralBridged,
    /// Stroked, driven wheels or tracks clear of the ground.
    Free,
    /// Stroked against a motor that cannot turn: ports capped or a real obstacle; never the parking brake alone.
    Held,
    /// Driving on the flat, lightly loaded.
    Travel,
    /// Driving up a grade or pulling a drag load.
    Loaded,
    /// Downhill or lever released: the wheels drive the motor.
    Overrun,
}

impl Doing {
    /// Every condition, in the order in which screens offer them.
    pub const ALL: [Doing; 8] = [
        Doing::Neutral,
        Doing::NeutralFree,
        Doing::Free,
        Doing::Travel,
        Doing::Loaded,
        Doing::Held,
        Doing::NeutralBridged,
        Doing::Overrun,
    ];

    /// True where the lever stands in neutral, so that direction and lever say nothing.
    pub fn is_neutral(self) -> bool {
        matches!(
            self,
            Doing::Neutral | Doing::NeutralFree | Doing::NeutralBridged
        )
    }

    /// Short name for a screen.
    pub fn words(self) -> &'static str {
        match self {
            Doing::Neutral => "Neutral",
            Doing::NeutralFree => "Neutral, wheels clear",
            Doing::NeutralBridged => "Neutral, servo bridged",
            Doing::Free => "Driven, wheels clear",
            Doing::Held => "Held (ports capped or real obstacle)",
            Doing::Travel => "Driving, light",
            Doing::Loaded => "Driving, loaded",
            Doing::Overrun => "Overrun",
        }
    }
}

/// Which way the machine is asked to go. Side A is the side that is high when it goes forward.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum Direction {
    /// Forward.
    #[default]
    Forward,
    /// Reverse.
    Reverse,
}

/// How far the lever, pedal or joystick is moved, as a mechanic can know it.
#[derive(Clone, Copy, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum Lever {
    /// Against the full stop.
    #[default]
    Full,
    /// About half.
    Half,
    /// Feathered: just enough to get an answer (about a tenth).
    Feathered,
    /// A known share of full travel, 0 to 1 (staged build-up: 0.05, 0.1, 0.2, 0.4).
    Share(f64),
}

impl Lever {
    /// Expected share of full travel (0 to 1) and its standard uncertainty. Common practice.
    pub fn share(self) -> (f64, f64) {
        match self {
            Lever::Full => (1.0, 0.01),
            Lever::Half => (0.5, 0.06),
            Lever::Feathered => (0.1, 0.03),
            Lever::Share(s) => {
                let s = s.clamp(0.0, 1.0);
                (s, (0.08 * s).max(0.005))
            }
        }
    }
}

/// Engine speed at the reading.
#[derive(Clone, Copy, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(rename_all = "snake_case")]
pub enum EngineSpeed {
    /// Low idle, as the profile has it.
    LowIdle,
    /// High idle (full throttle, unloaded), as the profile has it.
    #[default]
    HighIdle,
    /// Read off a tachometer at the reading.
    Measured(Measure),
}

/// Where a temperature was taken. The loop and the cases run hotter than the tank (common practice).
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum Place {
    /// Tank or sight glass.
    Tank,
    /// Motor drain hose, contact probe. The place that leakage is judged at.
    #[default]
    DrainHose,
    /// Motor housing.
    MotorCase,
    /// Pump housing.
    PumpCase,
    /// Cooler inlet hose.
    CoolerIn,
    /// Infrared gun on metal or paint.
    InfraredGun,
    /// A hand's guess: cold, warm, hot.
    Guessed,
}

impl Place {
    /// Every place, in the order in which screens offer them.
    pub const ALL: [Place; 7] = [
        Place::DrainHose,
        Place::Tank,
        Place::MotorCase,
        Place::PumpCase,
        Place::CoolerIn,
        Place::InfraredGun,
        Place::Guessed,
    ];

    /// Mean correction (K) to the temperature of the leaking oil and its standard uncertainty (K). Common practice.
    pub fn correction(self) -> (f64, f64) {
        match self {
            Place::DrainHose => (0.0, 3.0),
            Place::Tank => (15.0, 8.0),
            Place::MotorCase | Place::PumpCase => (2.0, 4.0),
            Place::CoolerIn => (3.0, 4.0),
            Place::InfraredGun => (8.0, 8.0),
            Place::Guessed => (0.0, 12.0),
        }
    }

    /// Short name for a screen.
    pub fn words(self) -> &'static str {
        match self {
            Place::Tank => "tank",
            Place::DrainHose => "drain hose",
            Place::MotorCase => "motor case",
            Place::PumpCase => "pump case",
            Place::CoolerIn => "cooler inlet",
            Place::InfraredGun => "infrared gun",
            Place::Guessed => "guessed by hand",
        }
    }
}

/// Oil temperature at the reading and where it was taken.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize)]
pub struct OilTemperature {
    /// The temperature.
    pub value: Measure,
    /// Where it was taken.
    #[serde(default)]
    pub place: Place,
}

/// A condition. Readings with the same condition are solved together.
#[derive(Clone, Copy, Debug, PartialEq, Serialize, Deserialize)]
pub struct Condition {
    /// What the machine is doing.
    pub doing: Doing,
    /// Direction asked; ignored in neutral.
    #[serde(default)]
    pub direction: Direction,
    /// Lever travel; ignored in neutral.
    #[serde(default)]
    pub lever: Lever,
    /// Engine speed.
    #[serde(default)]
    pub engine: EngineSpeed,
    /// Oil temperature; none where nobody looked (then warm with a wide spread is taken, and it is said).
    #[serde(default)]
    pub oil: Option<OilTemperature>,
    /// Flushing blocked for this reading, as the unit's manual allows.
    #[serde(default)]
    pub flushing_blocked: bool,
    /// Brake, shift and pilot consumers capped off for this reading.
    #[serde(default)]
    pub consumers_capped: bool,
    /// Which path is stroked on a machine with two.
    #[serde(default, skip_serializing_if = "Stroked::is_both")]
    pub stroked: Stroked,
}

/// Which path of two is stroked.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum Stroked {
    /// Both, or the only one.
    #[default]
    Both,
    /// Left alone.
    Left,
    /// Right alone.
    Right,
}

impl Stroked {
    /// Every choice, in the order in which screens offer them.
    pub const ALL: [Stroked; 3] = [Stroked::Both, Stroked::Left, Stroked::Right];

    /// True where both are.
    pub fn is_both(&self) -> bool {
        *self == Stroked::Both
    }

    /// True where a path is among them.
    pub fn has(self, path: Path) -> bool {
        match self {
            Stroked::Both => true,
            Stroked::Left => path == Path::Left,
            Stroked::Right => path == Path::Right,
        }
    }

    /// A path alone.
    pub fn alone(path: Path) -> Stroked {
        match path {
            Path::Left => Stroked::Left,
            Path::Right => Stroked::Right,
        }
    }

    /// Words for a screen.
    pub fn words(self) -> &'static str {
        match self {
            Stroked::Both => "both sides",
            Stroked::Left => "left side alone",
            Stroked::Right => "right side alone",
        }
    }
}

impl Condition {
    /// The same the other way round.
    pub fn reversed(self) -> Self {
        Condition {
            direction: match self.direction {
                Direction::Forward => Direction::Reverse,
                Direction::Reverse => Direction::Forward,
            },
            ..self
        }
    }

    /// Neutral at high idle with no temperature taken: the start of a new reading.
    pub fn start() -> Self {
        Condition {
            doing: Doing::Neutral,
            direction: Direction::Forward,
            lever: Lever::Full,
            engine: EngineSpeed::HighIdle,
            oil: None,
            flushing_blocked: false,
            consumers_capped: false,
            stroked: Stroked::Both,
        }
    }
}
