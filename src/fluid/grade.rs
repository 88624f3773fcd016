//! ISO 3448 viscosity grades.

use super::FluidError;
use serde::{Deserialize, Serialize};

/// The grades and their mid-point kinematic viscosity at 40 °C in mm²/s (ISO 3448).
const GRADES: [(u16, f64); 20] = [
    (2, 2.2),
    (3, 3.2),
    (5, 4.6),
    (7, 6.8),
    (10, 10.0),
    (15, 15.0),
    (22, 22.0),
    (32, 32.0),
    (46, 46.0),
    (68, 68.0),
    (100, 100.0),
    (150, 150.0),
    (220, 220.0),
    (320, 320.0),
    (460, 460.0),
    (680, 680.0),
    (1000, 1000.0),
    (1500, 1500.0),
    (2200, 2200.0),
    (3200, 3200.0),
];

/// An ISO VG grade: the number on the drum. Stored as that number.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash, Serialize, Deserialize)]
#[serde(into = "u16", try_from = "u16")]
pub struct IsoGrade(u16);

impl IsoGrade {
    /// VG 46, the most common in hydrostatic drives (common practice).
    pub const VG46: IsoGrade = IsoGrade(46);

    /// The grade with this number.
    ///
    /// # Errors
    /// [`FluidError::Grade`].
    pub fn new(number: u16) -> Result<Self, FluidError> {
        if GRADES.iter().any(|(grade, _)| *grade == number) {
            Ok(Self(number))
        } else {
            Err(FluidError::Grade { grade: number })
        }
    }

    /// The number on the drum.
    #[must_use]
    pub const fn number(self) -> u16 {
        self.0
    }

    /// All grades, thinnest first.
    pub fn all() -> impl Iterator<Item = IsoGrade> {
        GRADES.iter().map(|(grade, _)| IsoGrade(*grade))
    }

    /// Mid-point kinematic viscosity at 40 °C, mm²/s.
    #[must_use]
    pub fn middle(self) -> f64 {
        GRADES
            .iter()
            .find(|(grade, _)| *grade == self.0)
            .map_or(f64::from(self.0), |(_, middle)| *middle)
    }

    /// Lowest and highest kinematic viscosity at 40 °C, mm²/s: 10 % under and over the mid-point.
    #[must_use]
    pub fn limits(self) -> (f64, f64) {
        (0.9 * self.middle(), 1.1 * self.middle())
    }

    /// The grade that a kinematic viscosity at 40 °C in mm²/s falls in; none between the grades.
    #[must_use]
    pub fn of_viscosity(kv40: f64) -> Option<IsoGrade> {
        IsoGrade::all().find(|grade| {
            let (low, high) = grade.limits();
            (low..=high).contains(&kv40)
        })
    }
}

impl TryFrom<u16> for IsoGrade {
    type Error = FluidError;

    fn try_from(number: u16) -> Result<Self, FluidError> {
        Self::new(number)
    }
}

impl From<IsoGrade> for u16 {
    fn from(grade: IsoGrade) -> Self {
        grade.0
    }
}

impl std::fmt::Display for IsoGrade {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(f, "ISO VG {}", self.0)
    }
}
