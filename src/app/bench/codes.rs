//! Codes of fields for ids and tests, and figures as they are printed on this screen.

pub use crate::bench::stand::paper::{in_unit, plain, shown};
use crate::bench::stand::sheet::{Head, TextId};
use crate::bench::stand::uncertain::Uncertain;
use crate::bench::stand::{Channel, paper};
use crate::quantity::DecimalMark;

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

/// "93.4 ± 1.2 %", a share as a percentage with its expanded uncertainty.
pub fn share(figure: Uncertain, mark: DecimalMark) -> String {
    paper::number(figure.value * 100.0, figure.expanded() * 100.0, "%", mark)
}
