//! Left and right on a machine with two drive paths: which ports are there twice, and how a reading says its side. On a machine
//! with one path no port is, and nothing names a side.

use crate::assessment::lower_first;
use crate::ranking::has_sides;
use crate::readings::{Condition, Path, Port, Reading};
use crate::unit::Unit;

/// A reading to be added: where, on which side, and what the machine does.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Wanted {
    /// Path; left where the port is there once.
    pub path: Path,
    /// Port.
    pub port: Port,
    /// Condition.
    pub condition: Condition,
}

/// Ports that a unit has on either side.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Sides {
    /// A bit a port, by its place in [`Port::ALL`].
    twice: u32,
}

fn bit(port: Port) -> u32 {
    let place = Port::ALL.iter().position(|other| *other == port);
    place.map_or(0, |place| 1 << place)
}

impl Sides {
    /// Of a unit.
    pub fn of(unit: &Unit) -> Sides {
        let twice = Port::ALL.into_iter().filter(|port| has_sides(unit, *port));
        Sides {
            twice: twice.map(bit).sum(),
        }
    }

    /// True on a machine with two paths.
    pub fn any(self) -> bool {
        self.twice != 0
    }

    /// True where a port is there twice.
    pub fn has(self, port: Port) -> bool {
        self.twice & bit(port) != 0
    }

    /// The side to name; none where the port is there once.
    pub fn side(self, port: Port, path: Path) -> Option<Path> {
        self.has(port).then_some(path)
    }

    /// The path that a reading counts for: left where the port is there once.
    pub fn path(self, port: Port, path: Path) -> Path {
        self.side(port, path).unwrap_or_default()
    }

    /// Paths on which a port can be read in this condition, left first: both where it is there twice, but not on a side that
    /// stands still while the other is stroked alone.
    pub fn paths(self, port: Port, condition: &Condition) -> Vec<Path> {
        if !self.has(port) {
            return vec![Path::Left];
        }
        let is_read = |path: &Path| condition.doing.is_neutral() || condition.stroked.has(*path);
        Path::BOTH.into_iter().filter(is_read).collect()
    }

    /// The readings of a port in a condition: left and right next to each other, for the comparison is the point.
    pub fn wanted(self, port: Port, condition: Condition) -> impl Iterator<Item = Wanted> {
        let paths = self.paths(port, &condition).into_iter();
        paths.map(move |path| Wanted {
            path,
            port,
            condition,
        })
    }

    /// The name of a port with its side.
    pub fn port(self, port: Port, path: Path) -> String {
        named(self.side(port, path), port.words())
    }

    /// The name of what is read, with its side.
    pub fn name(self, reading: &Reading) -> String {
        self.port(reading.port, reading.path)
    }
}

/// A name with the side in front.
pub fn named(side: Option<Path>, words: &str) -> String {
    // "A − B" is no word to be written small.
    let is_word = words.chars().nth(1).is_some_and(char::is_lowercase);
    let rest = if is_word {
        lower_first(words)
    } else {
        words.to_owned()
    };
    match side {
        None => words.to_owned(),
        Some(Path::Left) => format!("Left {rest}"),
        Some(Path::Right) => format!("Right {rest}"),
    }
}

/// Right against left where both are read in the same condition.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Against {
    /// Right less left, base unit of the port's kind.
    pub difference: f64,
    /// The difference as a share of the left; none where a share says nothing.
    pub share: Option<f64>,
}

/// Right against left. A share is told of what starts at nought and does not run through it.
pub fn against(port: Port, left: f64, right: f64) -> Option<Against> {
    let difference = right - left;
    if !difference.is_finite() {
        return None;
    }
    let is_signed = matches!(
        port,
        Port::LoopDifference
            | Port::InletPull
            | Port::PumpCase
            | Port::MotorCase
            | Port::SettledTemperature
    );
    let share = difference / left;
    Some(Against {
        difference,
        share: (!is_signed && left > 0.0 && right >= 0.0 && share.is_finite()).then_some(share),
    })
}
