//! A figure beside the text that it was read from: what is typed is kept even where it cannot be read.

use super::{Measure, Unit};
use serde::{Deserialize, Serialize};

/// A figure as it was typed.
#[derive(Clone, Debug, Default, PartialEq, Serialize, Deserialize)]
#[serde(default)]
pub struct Typed {
    /// The text, with its unit behind it where that is another one than the field's own.
    pub typed: String,
    /// What it was read as; none while it is empty or cannot be read.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub value: Option<Measure>,
}

impl Typed {
    /// A figure to so many decimals. The text is what is shown, so the value is read from it.
    #[must_use]
    pub fn shown(value: f64, unit: Unit, places: usize) -> Typed {
        let typed = format!("{value:.places$}");
        let read = typed.parse().ok();
        Typed {
            value: read.and_then(|value: f64| Measure::new(value, unit).ok()),
            typed,
        }
    }

    /// True where there is nothing to keep.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.typed.is_empty() && self.value.is_none()
    }

    /// True where nothing but blanks stands in the field.
    #[must_use]
    pub fn is_blank(&self) -> bool {
        self.typed.trim().is_empty() && self.value.is_none()
    }

    /// The value in a unit; none where it cannot be read, or is a figure of another kind.
    #[must_use]
    pub fn value_in(&self, unit: Unit) -> Option<f64> {
        self.value?.try_in_unit(unit).ok()
    }
}
