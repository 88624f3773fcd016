//! The oil in the machine: what is known of it, and its properties at a temperature.

use super::viscosity_index::{kv100_from_index, viscosity_index};
use super::{FluidError, IsoGrade, ViscosityCurve};
use crate::quantity::typed::{
    DynamicViscosity, KinematicViscosity, MassDensity, ThermodynamicTemperature,
};
use crate::quantity::{Kind, Measure, factor::CELSIUS_ZERO_K};
use serde::{Deserialize, Serialize};
use uom::si;

/// Accepted density at 15 °C, kg/m³: light mineral oils to phosphate esters.
pub const DENSITY_RANGE: (f64, f64) = (780.0, 1250.0);
/// Density at 15 °C, kg/m³, of a mineral hydraulic oil whose density nobody wrote down. Common practice.
pub const USUAL_DENSITY: f64 = 870.0;
/// Share of its 15 °C volume by which mineral oil grows per K. Common practice.
pub const EXPANSION: f64 = 7.0e-4;
/// Viscosity index of a mineral oil whose index nobody wrote down. Common practice; multigrade oils have 140 to 180.
pub const USUAL_INDEX: f64 = 100.0;

/// What is known of an oil's viscosity.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize)]
#[serde(tag = "by", rename_all = "snake_case")]
pub enum OilViscosity {
    /// The grade on the drum and its viscosity index.
    Grade {
        /// ISO 3448 grade.
        grade: IsoGrade,
        /// Viscosity index (ASTM D2270).
        #[serde(default = "usual_index")]
        index: f64,
    },
    /// One viscosity and the viscosity index.
    Index {
        /// Kinematic viscosity at 40 °C.
        kv40: Measure,
        /// Viscosity index (ASTM D2270).
        #[serde(default = "usual_index")]
        index: f64,
    },
    /// Two viscosities, from the oil's data sheet or an analysis.
    TwoPoints {
        /// Kinematic viscosity at 40 °C.
        kv40: Measure,
        /// Kinematic viscosity at 100 °C.
        kv100: Measure,
    },
}

/// An oil as a person describes it. What is filled in need not be possible; [`Oil::properties`] says so.
#[derive(Debug, Clone, Copy, PartialEq, Serialize, Deserialize)]
pub struct Oil {
    /// What is known of its viscosity.
    pub viscosity: OilViscosity,
    /// Density at 15 °C, where known.
    #[serde(default)]
    pub density_15: Option<Measure>,
}

fn usual_index() -> f64 {
    USUAL_INDEX
}

impl Oil {
    /// Oil of this grade with the usual index and density of mineral oil.
    #[must_use]
    pub const fn of_grade(grade: IsoGrade) -> Self {
        Self {
            viscosity: OilViscosity::Grade {
                grade,
                index: USUAL_INDEX,
            },
            density_15: None,
        }
    }

    /// Its properties, ready for a temperature.
    ///
    /// # Errors
    /// [`FluidError`] with the figure that no oil has.
    pub fn properties(&self) -> Result<OilProperties, FluidError> {
        let kinematic = |measure: Measure, what: &'static str| {
            measure
                .base_of(Kind::KinematicViscosity)
                .ok_or(FluidError::OtherKind { what })
        };
        let (kv40, kv100) = match self.viscosity {
            OilViscosity::Grade { grade, index } => {
                (grade.middle(), kv100_from_index(grade.middle(), index)?)
            }
            OilViscosity::Index { kv40, index } => {
                let kv40 = kinematic(kv40, "viscosity at 40 °C")?;
                (kv40, kv100_from_index(kv40, index)?)
            }
            OilViscosity::TwoPoints { kv40, kv100 } => (
                kinematic(kv40, "viscosity at 40 °C")?,
                kinematic(kv100, "viscosity at 100 °C")?,
            ),
        };
        let density_15 = match self.density_15 {
            Some(measure) => measure
                .base_of(Kind::Density)
                .ok_or(FluidError::OtherKind {
                    what: "density at 15 °C",
                })?,
            None => USUAL_DENSITY,
        };
        OilProperties::new(ViscosityCurve::new(kv40, kv100)?, density_15)
    }

    /// Its viscosity index.
    ///
    /// # Errors
    /// As [`viscosity_index`].
    pub fn index(&self) -> Result<f64, FluidError> {
        match self.viscosity {
            OilViscosity::Grade { index, .. } | OilViscosity::Index { index, .. } => Ok(index),
            OilViscosity::TwoPoints { kv40, kv100 } => viscosity_index(kv40.base(), kv100.base()),
        }
    }
}

impl Default for Oil {
    fn default() -> Self {
        Self::of_grade(IsoGrade::VG46)
    }
}

/// Properties of one oil at any temperature. Plain `f64` for inner loops (°C, mm²/s, kg/m³, mPa·s); the functions that take
/// a [`ThermodynamicTemperature`] are for boundaries.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct OilProperties {
    /// Viscosity over temperature.
    pub curve: ViscosityCurve,
    density_15: f64,
}

impl OilProperties {
    /// From a viscosity curve and the density at 15 °C in kg/m³.
    ///
    /// # Errors
    /// [`FluidError::Density`] outside [`DENSITY_RANGE`].
    pub fn new(curve: ViscosityCurve, density_15: f64) -> Result<Self, FluidError> {
        let (low, high) = DENSITY_RANGE;
        if (low..=high).contains(&density_15) {
            Ok(Self { curve, density_15 })
        } else {
            Err(FluidError::Density {
                value: density_15,
                low,
                high,
            })
        }
    }

    /// Kinematic viscosity, mm²/s.
    #[must_use]
    pub fn kinematic_at(&self, celsius: f64) -> f64 {
        self.curve.kinematic_at(celsius)
    }

    /// Density, kg/m³: the 15 °C value less linear thermal expansion.
    #[must_use]
    pub fn density_at(&self, celsius: f64) -> f64 {
        self.density_15 * (1.0 - EXPANSION * (celsius.clamp(-60.0, 200.0) - 15.0))
    }

    /// Dynamic viscosity, mPa·s (cP): density × kinematic viscosity.
    #[must_use]
    pub fn dynamic_at(&self, celsius: f64) -> f64 {
        dynamic_viscosity(self.kinematic_at(celsius), self.density_at(celsius))
    }

    /// Kinematic viscosity at this temperature.
    #[must_use]
    pub fn kinematic(&self, temperature: ThermodynamicTemperature) -> KinematicViscosity {
        KinematicViscosity::new::<si::kinematic_viscosity::square_millimeter_per_second>(
            self.kinematic_at(celsius(temperature)),
        )
    }

    /// Density at this temperature.
    #[must_use]
    pub fn density(&self, temperature: ThermodynamicTemperature) -> MassDensity {
        MassDensity::new::<si::mass_density::kilogram_per_cubic_meter>(
            self.density_at(celsius(temperature)),
        )
    }

    /// Dynamic viscosity at this temperature.
    #[must_use]
    pub fn dynamic(&self, temperature: ThermodynamicTemperature) -> DynamicViscosity {
        DynamicViscosity::new::<si::dynamic_viscosity::millipascal_second>(
            self.dynamic_at(celsius(temperature)),
        )
    }
}

/// Dynamic viscosity in mPa·s (cP) from kinematic viscosity in mm²/s (cSt) and density in kg/m³.
#[must_use]
pub fn dynamic_viscosity(kinematic: f64, density: f64) -> f64 {
    kinematic * density * 1e-3
}

fn celsius(temperature: ThermodynamicTemperature) -> f64 {
    temperature.get::<si::thermodynamic_temperature::kelvin>() - CELSIUS_ZERO_K
}

/// A kind of oil found in hydrostatic drives, for choosing when only the drum is known.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct UsualOil {
    /// What stands on the drum.
    pub name: &'static str,
    /// Kinematic viscosity at 40 °C, mm²/s.
    pub kv40: f64,
    /// Viscosity index.
    pub index: f64,
}

/// Oils that machines are filled with. Viscosities of the engine and transmission oils are common practice, from memory;
/// the drum's own data sheet is better.
pub const USUAL_OILS: [UsualOil; 9] = [
    UsualOil {
        name: "ISO VG 32",
        kv40: 32.0,
        index: 100.0,
    },
    UsualOil {
        name: "ISO VG 46",
        kv40: 46.0,
        index: 100.0,
    },
    UsualOil {
        name: "ISO VG 68",
        kv40: 68.0,
        index: 100.0,
    },
    UsualOil {
        name: "ISO VG 46, high index",
        kv40: 46.0,
        index: 150.0,
    },
    UsualOil {
        name: "Engine oil SAE 10W",
        kv40: 40.0,
        index: 105.0,
    },
    UsualOil {
        name: "Engine oil SAE 10W-30",
        kv40: 70.0,
        index: 140.0,
    },
    UsualOil {
        name: "Engine oil SAE 15W-40",
        kv40: 105.0,
        index: 140.0,
    },
    UsualOil {
        name: "Tractor transmission oil (UTTO)",
        kv40: 60.0,
        index: 140.0,
    },
    UsualOil {
        name: "Automatic transmission fluid",
        kv40: 35.0,
        index: 170.0,
    },
];
