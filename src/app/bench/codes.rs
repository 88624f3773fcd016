//! Codes of fields for ids and tests, and figures as they are printed on this screen.

use crate::bench::stand::sheet::{Head, TextId};
use crate::bench::stand::uncertain::Uncertain;
use crate::bench::stand::{Channel, paper};
use crate::quantity::{DecimalMark, Decimals, Measure, Unit, UnitPrefs, format_with_unit};

/// Code of a column.
pub fn channel(channel: Channel) -> &'static str {
    match channel {
        Channel::Speed => "speed",
        Channel::Low => "low",
        Channel::High => "high",
        Channel::Flow => "flow",
        Channel::Case => "case",
        Channel::Torque => "torque",
        Channel::Power => "power",
        Channel::Inlet => "inlet",
        Channel::Outlet => "outlet",
        Channel::CaseOil => "case-oil",
        Channel::CasePressure => "case-pressure",
        Channel::ChargeFlow => "charge-flow",
        Channel::MakeUp => "make-up",
        Channel::ChargePressure => "charge-pressure",
        Channel::OutSpeed => "out-speed",
        Channel::OutTorque => "out-torque",
    }
}

/// Code of a figure of the head.
pub fn head(head: Head) -> &'static str {
    match head {
        Head::Displacement => "displacement",
        Head::ChargeDisplacement => "charge-displacement",
        Head::Stroke => "stroke",
        Head::RatedSpeed => "rated-speed",
        Head::RatedPressure => "rated-pressure",
        Head::Viscosity => "viscosity",
        Head::Index => "index",
        Head::HeatLost => "heat-lost",
    }
}

/// Code of a line of text.
pub fn text(text: TextId) -> &'static str {
    match text {
        TextId::Serial => "serial",
        TextId::Code => "code",
        TextId::Rotation => "rotation",
        TextId::Control => "control",
        TextId::Customer => "customer",
        TextId::CleanBefore => "clean-before",
        TextId::CleanAfter => "clean-after",
        TextId::Name => "name",
        TextId::Note => "note",
    }
}

/// The unit in which the shop wants a figure.
pub fn shown(prefs: &UnitPrefs, unit: Unit) -> Unit {
    match unit {
        // A count of seconds, a share and a shaft's rpm read alike everywhere.
        Unit::Percent | Unit::Second | Unit::Fraction | Unit::RevolutionPerMinute => unit,
        other => prefs.unit(other.kind()),
    }
}

/// "0.934 ± 0.012", as a percentage with its expanded uncertainty.
pub fn share(figure: Uncertain, mark: DecimalMark) -> String {
    paper::number(figure.value * 100.0, figure.expanded() * 100.0, "%", mark)
}

/// A figure in a base unit, with its expanded uncertainty, in the unit the shop wants.
pub fn in_unit(value: f64, expanded: f64, base: Unit, prefs: &UnitPrefs) -> String {
    let unit = shown(prefs, base);
    let of = |value: f64| {
        Measure::new(value, base)
            .ok()
            .and_then(|m| m.try_in_unit(unit).ok())
    };
    match (of(value), of(value + expanded)) {
        (Some(here), Some(there)) => {
            paper::number(here, (there - here).abs(), unit.symbol(), prefs.mark())
        }
        _ => "not to be told".to_owned(),
    }
}

/// A figure alone in the unit the shop wants.
pub fn plain(value: f64, base: Unit, prefs: &UnitPrefs) -> String {
    Measure::new(value, base).map_or_else(
        |_| "not to be told".to_owned(),
        |m| format_with_unit(m, shown(prefs, base), Decimals::Reading, prefs.mark()),
    )
}
