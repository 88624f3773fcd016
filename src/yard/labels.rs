//! Labels of the sheet's figures, on the screen and on paper.

use super::Field;
use crate::quantity::{Unit, UnitPrefs};
use crate::unit::Unit as Machine;

/// Label of a field and where to find the figure.
#[must_use]
pub fn field(field: Field, machine: &Machine) -> (&'static str, &'static str) {
    let one = machine.ticks.paths.is_one();
    match field {
        Field::Oil => ("Oil temperature", "where it was taken is asked above"),
        Field::LowIdle => ("Low idle", "tachometer, throttle right back"),
        Field::HighIdle => ("High idle", "tachometer, full throttle, nothing loaded"),
        Field::ChargeLow => ("Charge, low idle", ""),
        Field::ChargeHigh => ("Charge, high idle", ""),
        Field::Knee => (
            "Engine speed at the knee",
            "low idle where it rises no more",
        ),
        Field::ChargeForward => ("Charge, forward", ""),
        Field::ChargeReverse => ("Charge, reverse", ""),
        Field::ChargeLeft => ("Charge, left alone", ""),
        Field::ChargeRight => ("Charge, right alone", ""),
        Field::ChargeBoth => ("Charge, both", ""),
        Field::Drain if one => ("Motor drain, neutral", "only from a fitted tee"),
        Field::Drain => ("Left motor drain, neutral", "only from a fitted tee"),
        Field::DrainRight => ("Right motor drain, neutral", "only from a fitted tee"),
        Field::Distance => ("Marked run", "only where no turns are counted"),
        Field::ForwardTurns if one => (
            "Forward: wheel turns",
            "left empty where the marked run is timed",
        ),
        Field::ForwardTurns => ("Forward: left turns", ""),
        Field::ForwardTurnsRight => ("Forward: right turns", ""),
        Field::ForwardTime => ("Forward: time", ""),
        Field::ReverseTurns if one => ("Reverse: wheel turns", ""),
        Field::ReverseTurns => ("Reverse: left turns", ""),
        Field::ReverseTurnsRight => ("Reverse: right turns", ""),
        Field::ReverseTime => ("Reverse: time", ""),
        Field::EngineLight => (
            "Engine speed held on the flat",
            "without it slip and droop cannot be told apart",
        ),
        Field::LoadedTurns if one => ("Ramp: wheel turns", ""),
        Field::LoadedTurns => ("Ramp: left turns", ""),
        Field::LoadedTime => ("Ramp: time", ""),
        Field::EngineLoaded => ("Engine speed held on the ramp", ""),
        Field::Lane => ("Length of the run", ""),
        Field::AsideForward => (
            "Off the line, forward",
            "at the end of the run, whichever side",
        ),
        Field::AsideReverse => ("Off the line, reverse", ""),
        Field::Track => ("Track width", "middle to middle"),
        Field::SpinLeft => ("Spin to the left, full turn", ""),
        Field::SpinRight => ("Spin to the right, full turn", ""),
        Field::HubLeft => ("Left hub", ""),
        Field::HubRight => ("Right hub", ""),
    }
}

/// The unit that a field is asked in: the shop's, but turns in turns, times in seconds, lengths in metres or feet.
#[must_use]
pub fn unit(field: Field, prefs: &UnitPrefs) -> Unit {
    let (usual, _, _) = field.asks();
    match usual {
        Unit::Turn | Unit::Second => usual,
        Unit::Metre => match prefs.unit(usual.kind()) {
            Unit::Foot | Unit::Inch => Unit::Foot,
            _ => Unit::Metre,
        },
        other => prefs.unit(other.kind()),
    }
}
