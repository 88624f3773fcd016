//! Units of measure: figures with their kind, reading what a person types, printing what they want to read.
//!
//! * [`Measure`] is a finite figure with its [`Kind`], held in the trade's own unit ([`Kind::base_unit`]: bar gauge, L/min,
//!   rpm, °C …), which is also the unit of the solver. [`Unit`] converts; [`factor`] holds the exact factors.
//! * [`parse`] reads `350 psi`, `24,5` or `2 400 rpm`; [`EntryError`] says in words why not.
//! * [`format_with_unit`], [`format_span`] and [`UnitPrefs`] print. Printed figures read back.
//! * [`typed`] re-exports the `uom` types for boundaries where the kind is fixed, and [`GaugePressure`].
//!
//! **Stable** (other modules and kept files lean on it): everything public here, above all the serde forms of [`Kind`],
//! [`Unit`] (codes), [`Measure`] (`{"value": 24.5, "unit": "bar"}`) and [`UnitPrefs`]. Units and kinds may be added.

mod entry;
mod error;
pub mod factor;
mod kind;
mod measure;
mod number;
mod prefs;
mod print;
mod retold;
mod spelling;
pub mod strokes;
mod text;
pub mod typed;
mod unit;

pub use entry::{EntryNote, LONGEST_ENTRY, Parsed, parse};
pub use error::EntryError;
pub use kind::Kind;
pub use measure::{LARGEST, Measure, MeasureError};
pub use prefs::UnitPrefs;
pub use print::{DecimalMark, Decimals, MINUS, edit_text, format, format_span, format_with_unit};
use print::{edited, figure_text, limit_text};
pub use retold::retold;
pub use text::Typed;
pub use typed::{DisplacementPerRevolution, GaugePressure};
pub use unit::Unit;

#[cfg(all(test, not(target_arch = "wasm32")))]
mod tests;
