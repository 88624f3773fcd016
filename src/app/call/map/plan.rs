//! Where the ports stand on the drawing of the loop, and which of them this unit has.

use crate::readings::Port;
use crate::unit::{Fitted, Ticks};

/// Width of the drawing, units.
pub const WIDTH: f64 = 400.0;
/// Height of the drawing, units.
pub const HEIGHT: f64 = 612.0;

/// End of the class name of a part that is drawn firmly, with a query, or not at all.
pub fn class(fitted: Fitted) -> &'static str {
    match fitted {
        Fitted::Yes => "is-fitted",
        Fitted::Maybe => "is-maybe",
        Fitted::No => "is-absent",
    }
}

/// Where the name of a port stands to its mark.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Label {
    /// Under it.
    Below,
    /// Over it.
    Above,
    /// To its left.
    Left,
    /// To its right.
    Right,
}

/// A port on the drawing.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Spot {
    /// Port.
    pub port: Port,
    /// Short name.
    pub name: &'static str,
    /// Place.
    pub x: f64,
    /// Place.
    pub y: f64,
    /// Where its name stands.
    pub label: Label,
    /// Whether the unit has it.
    pub fitted: Fitted,
}

/// Ports on the drawing, those the unit has not left out. Order: as one walks from the engine to the wheel and back to tank.
pub fn spots(ticks: &Ticks) -> Vec<Spot> {
    let spot = |port, name, x, y, label| Spot {
        port,
        name,
        x,
        y,
        label,
        fitted: ticks.port(port),
    };
    // One place for the command: the coil's, unless it is known to be oil. The other is offered under the drawing.
    let command = if !ticks.may_have(Port::CoilCurrent) || ticks.port(Port::Pilot) == Fitted::Yes {
        spot(Port::Pilot, "Pilot", 46.0, 34.0, Label::Below)
    } else {
        spot(Port::CoilCurrent, "Coil", 46.0, 34.0, Label::Below)
    };
    let all = [
        spot(Port::EngineSpeed, "Engine", 30.0, 196.0, Label::Above),
        command,
        spot(Port::Servo, "Servo", 46.0, 106.0, Label::Below),
        spot(Port::LoopA, "Side A", 142.0, 96.0, Label::Above),
        spot(Port::LoopB, "Side B", 142.0, 296.0, Label::Below),
        spot(Port::Release, "Brake", 356.0, 30.0, Label::Below),
        spot(Port::Shift, "Shift", 356.0, 108.0, Label::Below),
        spot(Port::Wheel, "Wheel", 356.0, 196.0, Label::Below),
        spot(Port::MotorCase, "Motor case", 356.0, 290.0, Label::Below),
        spot(Port::MotorDrain, "Motor drain", 300.0, 424.0, Label::Below),
        spot(Port::Charge, "Charge", 187.0, 362.0, Label::Left),
        spot(Port::PumpCase, "Pump case", 46.0, 300.0, Label::Below),
        spot(Port::InletPull, "Inlet pull", 236.0, 528.0, Label::Right),
        spot(Port::ReturnFlow, "Return", 46.0, 548.0, Label::Below),
    ];
    all.into_iter()
        .filter(|spot| spot.fitted != Fitted::No)
        .collect()
}

/// Whether a port for the command to the control is drawn.
pub fn has_command(ticks: &Ticks) -> bool {
    ticks.may_have(Port::CoilCurrent) || ticks.may_have(Port::Pilot)
}

/// Ports that have no place on the drawing, or none on this unit's: offered under it.
pub fn elsewhere(ticks: &Ticks) -> Vec<Port> {
    let drawn: Vec<Port> = spots(ticks).iter().map(|spot| spot.port).collect();
    ticks.ports().filter(|port| !drawn.contains(port)).collect()
}
