//! A figure with its kind: always finite, never without a unit.

use serde::{Deserialize, Serialize};
use std::cmp::Ordering;
use thiserror::Error;

use super::{Kind, Unit};

/// Largest magnitude a [`Measure`] holds, in the base unit of its kind. Nothing on a machine comes near it; it keeps every
/// conversion finite.
pub const LARGEST: f64 = 1e15;

/// Why a figure is no [`Measure`].
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum MeasureError {
    /// Not a number, or infinite.
    #[error("{kind}: the figure is not a finite number")]
    NotFinite {
        /// What was to be measured.
        kind: Kind,
    },
    /// Beyond [`LARGEST`].
    #[error("{kind}: the figure is beyond anything a machine shows (limit {LARGEST:e} {})", kind.base_unit())]
    TooLarge {
        /// What was to be measured.
        kind: Kind,
        /// The figure, in the base unit of the kind.
        base: f64,
    },
    /// A unit of another kind was asked for.
    #[error("{unit} is no unit of {kind}")]
    OtherKind {
        /// What is measured.
        kind: Kind,
        /// The unit that does not fit.
        unit: Unit,
    },
}

/// A figure with its kind. Held in the base unit of the kind ([`Kind::base_unit`]): bar gauge, L/min, rpm, °C, K, cm³/rev,
/// mm²/s, N·m, kW, km/h, m, s, mA, fraction, kg, °, L, kg/m³. Finite always.
///
/// In files it stands as `{"value": 24.5, "unit": "bar"}`; any unit is read back, the base unit is written.
///
/// Two measures compare only when they are of one kind (`partial_cmp` is `None` otherwise).
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize)]
#[serde(into = "Stored", try_from = "Stored")]
pub struct Measure {
    value_base: f64,
    kind: Kind,
}

impl Measure {
    /// `value` in `unit`.
    ///
    /// # Errors
    /// [`MeasureError::NotFinite`] and [`MeasureError::TooLarge`].
    pub fn new(value: f64, unit: Unit) -> Result<Self, MeasureError> {
        Self::from_base(unit.base_of_value(value), unit.kind())
    }

    /// `value` in the base unit of `kind`.
    ///
    /// # Errors
    /// As [`Measure::new`].
    pub fn from_base(value: f64, kind: Kind) -> Result<Self, MeasureError> {
        if !value.is_finite() {
            return Err(MeasureError::NotFinite { kind });
        }
        if value.abs() > LARGEST {
            return Err(MeasureError::TooLarge { kind, base: value });
        }
        // A negative zero would print a sign that means nothing.
        Ok(Self {
            value_base: if value == 0.0 { 0.0 } else { value },
            kind,
        })
    }

    /// A figure written in the program itself: tables, defaults, limits. For what comes from outside use [`Measure::new`].
    ///
    /// # Panics
    /// On a figure that is not finite or beyond [`LARGEST`]; in a `const` that stops the build.
    #[must_use]
    pub const fn literal(value: f64, unit: Unit) -> Self {
        let base = unit.base_of_value(value);
        assert!(
            base.is_finite() && base.abs() <= LARGEST,
            "a literal must be a finite figure of the trade"
        );
        Self {
            value_base: if base == 0.0 { 0.0 } else { base },
            kind: unit.kind(),
        }
    }

    /// What is measured.
    #[must_use]
    pub const fn kind(self) -> Kind {
        self.kind
    }

    /// The figure in the base unit of its kind.
    #[must_use]
    pub const fn base(self) -> f64 {
        self.value_base
    }

    /// The figure in the base unit if this measures `kind`; otherwise nothing.
    #[must_use]
    pub fn base_of(self, kind: Kind) -> Option<f64> {
        (self.kind == kind).then_some(self.value_base)
    }

    /// The figure in `unit`.
    ///
    /// A unit of another kind is a mistake of the caller: debug builds stop, release builds answer in the base unit of the
    /// measure's own kind. [`Measure::try_in_unit`] says so instead.
    #[must_use]
    pub fn in_unit(self, unit: Unit) -> f64 {
        debug_assert_eq!(
            unit.kind(),
            self.kind,
            "{unit:?} is no unit of {:?}",
            self.kind
        );
        self.in_fitting_unit(unit).0
    }

    /// The figure in `unit`.
    ///
    /// # Errors
    /// [`MeasureError::OtherKind`].
    pub fn try_in_unit(self, unit: Unit) -> Result<f64, MeasureError> {
        if unit.kind() == self.kind {
            Ok(unit.value_of_base(self.value_base))
        } else {
            Err(MeasureError::OtherKind {
                kind: self.kind,
                unit,
            })
        }
    }

    /// The figure in `unit`, or in the base unit where `unit` is of another kind; with the unit that was taken.
    pub(super) fn in_fitting_unit(self, unit: Unit) -> (f64, Unit) {
        let unit = if unit.kind() == self.kind {
            unit
        } else {
            self.kind.base_unit()
        };
        (unit.value_of_base(self.value_base), unit)
    }
}

impl PartialOrd for Measure {
    fn partial_cmp(&self, other: &Self) -> Option<Ordering> {
        if self.kind == other.kind {
            self.value_base.partial_cmp(&other.value_base)
        } else {
            None
        }
    }
}

/// How a measure stands in a file.
#[derive(Serialize, Deserialize)]
struct Stored {
    value: f64,
    unit: Unit,
}

impl From<Measure> for Stored {
    fn from(measure: Measure) -> Self {
        Self {
            value: measure.value_base,
            unit: measure.kind.base_unit(),
        }
    }
}

impl TryFrom<Stored> for Measure {
    type Error = MeasureError;

    fn try_from(stored: Stored) -> Result<Self, MeasureError> {
        Self::new(stored.value, stored.unit)
    }
}
