//! Oil: viscosity and density at temperature, grades, cleanliness, and the air pressing on the tank.
//!
//! * [`Oil`] is what a person knows of the oil (grade, index, two viscosities); [`Oil::properties`] makes it computable.
//! * [`ViscosityCurve`] (ASTM D341) and [`OilProperties`] are plain `f64` in °C, mm²/s, kg/m³ and mPa·s, for inner loops.
//! * [`viscosity_index`](mod@viscosity_index) is ASTM D2270 both ways; [`IsoGrade`] is ISO 3448.
//! * [`remarks`] says what must stand beside a viscosity: its band, whether it is extrapolated, whether leakage can be
//!   judged at all.
//! * [`orifice`] and [`line`] are the passages it goes through.
//! * [`CleanlinessCode`] is ISO 4406; [`saybolt`] converts the seconds of old manuals; [`atmosphere`] gives the air's pressure
//!   at a height.

pub mod atmosphere;
mod band;
pub mod cleanliness;
mod error;
mod grade;
pub mod line;
mod oil;
pub mod orifice;
pub mod saybolt;
mod viscosity;
pub mod viscosity_index;
mod viscosity_index_table;

pub use band::{
    Band, COLD_START_HIGHEST, FITTED, Remarks, SHORT_TIME_LOWEST, TOO_COLD_TO_JUDGE,
    TOO_THICK_TO_JUDGE, remarks,
};
pub use cleanliness::CleanlinessCode;
pub use error::FluidError;
pub use grade::IsoGrade;
pub use oil::{
    DENSITY_RANGE, EXPANSION, Oil, OilProperties, OilViscosity, USUAL_DENSITY, USUAL_INDEX,
    USUAL_OILS, UsualOil, dynamic_viscosity,
};
pub use viscosity::{KV40_RANGE, KV100_RANGE, TEMPERATURE_RANGE, ViscosityCurve, leakage_growth};

#[cfg(all(test, not(target_arch = "wasm32")))]
mod tests;
