//! The units a person wants to read.

use serde::{Deserialize, Serialize};
use std::collections::BTreeMap;

use super::{DecimalMark, Decimals, Kind, Measure, Unit, edit_text, format_span, format_with_unit};

/// The chosen unit of each kind, the unit for a pull at the inlet, and the decimal mark.
///
/// In files it stands as kind and unit codes. Codes that this version does not know, or that do not fit, fall back to the
/// metric choice, so that settings of a newer version do not lock an older one out.
#[derive(Debug, Clone, PartialEq, Eq, Serialize, Deserialize)]
#[serde(into = "Stored", from = "Stored")]
pub struct UnitPrefs {
    /// Only choices that differ from the base unit of their kind.
    chosen: BTreeMap<Kind, Unit>,
    pull: Unit,
    mark: DecimalMark,
}

impl Default for UnitPrefs {
    fn default() -> Self {
        Self::metric()
    }
}

impl UnitPrefs {
    /// bar, L/min, °C, cm³/rev, N·m, kW, km/h, m; ratios in per cent; pull in bar below the air.
    #[must_use]
    pub fn metric() -> Self {
        Self {
            chosen: BTreeMap::from([(Kind::Ratio, Unit::Percent)]),
            pull: Unit::Bar,
            mark: DecimalMark::Point,
        }
    }

    /// psi, US gpm, °F, in³/rev, lbf·ft, hp, mph, ft, lb, US gal; ratios in per cent; pull in inches of mercury.
    #[must_use]
    pub fn us() -> Self {
        let mut prefs = Self::metric();
        for unit in [
            Unit::Psi,
            Unit::UsGallonPerMinute,
            Unit::DegreeFahrenheit,
            Unit::FahrenheitDifference,
            Unit::CubicInchPerRevolution,
            Unit::Centistokes,
            Unit::PoundForceFoot,
            Unit::Horsepower,
            Unit::MilePerHour,
            Unit::Foot,
            Unit::Pound,
            Unit::UsGallon,
            Unit::PoundPerUsGallon,
        ] {
            prefs.choose(unit);
        }
        prefs.pull = Unit::InchOfMercuryVacuum;
        prefs
    }

    /// The unit in which `kind` is shown.
    #[must_use]
    pub fn unit(&self, kind: Kind) -> Unit {
        self.chosen.get(&kind).copied().unwrap_or(kind.base_unit())
    }

    /// Shows the kind of `unit` in it from now on.
    pub fn choose(&mut self, unit: Unit) {
        if unit == unit.kind().base_unit() {
            self.chosen.remove(&unit.kind());
        } else {
            self.chosen.insert(unit.kind(), unit);
        }
    }

    /// The unit of a pull at the charge inlet: a pressure unit, often a vacuum one.
    #[must_use]
    pub fn pull_unit(&self) -> Unit {
        self.pull
    }

    /// Shows pulls in `unit`; a unit that is no pressure changes nothing.
    pub fn choose_pull(&mut self, unit: Unit) {
        if unit.kind() == Kind::Pressure {
            self.pull = unit;
        }
    }

    /// The decimal mark.
    #[must_use]
    pub fn mark(&self) -> DecimalMark {
        self.mark
    }

    /// Prints with this decimal mark from now on. Both are always taken when typed.
    pub fn choose_mark(&mut self, mark: DecimalMark) {
        self.mark = mark;
    }

    /// The measure as a reading, with its unit: `24.6 bar`.
    #[must_use]
    pub fn print(&self, measure: Measure) -> String {
        format_with_unit(
            measure,
            self.unit(measure.kind()),
            Decimals::Reading,
            self.mark,
        )
    }

    /// A span, with its unit: `18.0 to 25.4 bar`.
    #[must_use]
    pub fn print_span(&self, low: Measure, high: Measure) -> String {
        format_span(low, high, self.unit(low.kind()), self.mark)
    }

    /// The figure for a field that is to be edited, without the unit.
    #[must_use]
    pub fn edit_text(&self, measure: Measure) -> String {
        edit_text(measure, self.unit(measure.kind()), self.mark)
    }
}

/// How the choices stand in a file.
#[derive(Serialize, Deserialize)]
struct Stored {
    #[serde(default)]
    units: BTreeMap<String, String>,
    #[serde(default)]
    pull: String,
    #[serde(default)]
    decimal_mark: String,
}

impl From<UnitPrefs> for Stored {
    fn from(prefs: UnitPrefs) -> Self {
        let units = Kind::ALL
            .iter()
            .map(|kind| (kind_code(*kind), prefs.unit(*kind).code().to_owned()))
            .collect();
        let decimal_mark = match prefs.mark {
            DecimalMark::Point => "point",
            DecimalMark::Comma => "comma",
        };
        Self {
            units,
            pull: prefs.pull.code().to_owned(),
            decimal_mark: decimal_mark.to_owned(),
        }
    }
}

impl From<Stored> for UnitPrefs {
    fn from(stored: Stored) -> Self {
        let mut prefs = Self::metric();
        for kind in Kind::ALL {
            let unit = stored
                .units
                .get(&kind_code(kind))
                .and_then(|code| Unit::from_code(code));
            if let Some(unit) = unit.filter(|unit| unit.kind() == kind) {
                prefs.choose(unit);
            }
        }
        if let Some(unit) = Unit::from_code(&stored.pull) {
            prefs.choose_pull(unit);
        }
        if stored.decimal_mark == "comma" {
            prefs.mark = DecimalMark::Comma;
        }
        prefs
    }
}

/// The serde name of a kind: its plain name with underscores.
fn kind_code(kind: Kind) -> String {
    kind.name().replace(' ', "_")
}
