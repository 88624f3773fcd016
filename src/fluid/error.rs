//! What is wrong with figures of an oil.

use thiserror::Error;

/// Why figures describe no oil. The texts name the accepted range.
#[derive(Debug, Clone, Copy, PartialEq, Error)]
pub enum FluidError {
    /// A viscosity at 40 °C or 100 °C outside what any hydraulic oil has.
    #[error(
        "kinematic viscosity at {celsius} °C is {value} mm²/s; an oil has {low} to {high} mm²/s there"
    )]
    Viscosity {
        /// Temperature of the figure.
        celsius: f64,
        /// The figure in mm²/s.
        value: f64,
        /// Lowest accepted.
        low: f64,
        /// Highest accepted.
        high: f64,
    },
    /// The oil would not get thinner with heat.
    #[error(
        "an oil is thinner at 100 °C than at 40 °C: {kv40} mm²/s at 40 °C against {kv100} mm²/s at 100 °C"
    )]
    NotFalling {
        /// At 40 °C, mm²/s.
        kv40: f64,
        /// At 100 °C, mm²/s.
        kv100: f64,
    },
    /// The viscosity index is not defined under 2 mm²/s at 100 °C (ASTM D2270).
    #[error("no viscosity index is defined under 2 mm²/s at 100 °C; this oil has {kv100} mm²/s")]
    IndexNotDefined {
        /// At 100 °C, mm²/s.
        kv100: f64,
    },
    /// A viscosity index that no oil of this grade reaches.
    #[error(
        "viscosity index {index}: with {kv40} mm²/s at 40 °C an index from {low:.0} to {high:.0} is possible"
    )]
    Index {
        /// The index.
        index: f64,
        /// At 40 °C, mm²/s.
        kv40: f64,
        /// Lowest possible.
        low: f64,
        /// Highest possible.
        high: f64,
    },
    /// No grade of ISO 3448.
    #[error(
        "{grade} is no ISO VG grade; the grades are 2, 3, 5, 7, 10, 15, 22, 32, 46, 68, 100, 150, 220, 320, 460 and up"
    )]
    Grade {
        /// The number.
        grade: u16,
    },
    /// A density that no hydraulic fluid has.
    #[error("density at 15 °C is {value} kg/m³; hydraulic fluids have {low} to {high} kg/m³")]
    Density {
        /// The figure in kg/m³.
        value: f64,
        /// Lowest accepted.
        low: f64,
        /// Highest accepted.
        high: f64,
    },
    /// A figure in a unit of another kind (a stored file that was edited by hand).
    #[error("{what}: a figure of another kind stands there")]
    OtherKind {
        /// Which figure.
        what: &'static str,
    },
}
