//! Which of a machine's drive paths is meant.

use serde::{Deserialize, Serialize};

/// A drive path: pump, loop and motor. A machine with one path has only [`Path::Left`], and no screen names it.
#[derive(
    Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize,
)]
#[serde(rename_all = "snake_case")]
pub enum Path {
    /// Left, as seen from the seat; or the only one.
    #[default]
    Left,
    /// Right, as seen from the seat.
    Right,
}

impl Path {
    /// Both.
    pub const BOTH: [Path; 2] = [Path::Left, Path::Right];

    /// The other one.
    pub fn other(self) -> Path {
        match self {
            Path::Left => Path::Right,
            Path::Right => Path::Left,
        }
    }

    /// Word for a screen.
    pub fn words(self) -> &'static str {
        match self {
            Path::Left => "left",
            Path::Right => "right",
        }
    }

    /// True for the left or only one: what stored data leaves out.
    pub fn is_left(&self) -> bool {
        *self == Path::Left
    }
}
