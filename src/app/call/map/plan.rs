//! Where the ports stand on the drawing of the loop, and which of them this unit has.

use crate::readings::Port;
use crate::unit::{ChargeSource, Control, Tick, Ticks};

/// Width of the drawing, units.
pub const WIDTH: f64 = 400.0;
/// Height of the drawing, units.
pub const HEIGHT: f64 = 612.0;

/// Whether a part is drawn: firmly, with a query, or not at all.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Fitted {
    /// Fitted.
    Yes,
    /// Not known.
    Maybe,
    /// Not fitted.
    No,
}

impl From<Tick> for Fitted {
    fn from(tick: Tick) -> Self {
        match tick {
            Tick::Yes => Fitted::Yes,
            Tick::No => Fitted::No,
            Tick::Unknown => Fitted::Maybe,
        }
    }
}

impl Fitted {
    /// End of the class name.
    pub fn class(self) -> &'static str {
        match self {
            Fitted::Yes => "is-fitted",
            Fitted::Maybe => "is-maybe",
            Fitted::No => "is-absent",
        }
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

/// Whether the pump is stroked by a servo.
pub fn servo(control: Control) -> Fitted {
    match control {
        Control::DirectManual => Fitted::No,
        Control::Unknown => Fitted::Maybe,
        _ => Fitted::Yes,
    }
}

/// Whether the control is driven by coil current.
fn coil(control: Control) -> Fitted {
    match control {
        Control::ElectricProportional | Control::ThreePosition => Fitted::Yes,
        Control::Unknown | Control::PressureNoFeedback => Fitted::Maybe,
        _ => Fitted::No,
    }
}

/// Whether the control is driven by a pilot pressure.
fn pilot(control: Control) -> Fitted {
    match control {
        Control::HydraulicRemote | Control::SpeedSensing => Fitted::Yes,
        Control::PressureNoFeedback => Fitted::Maybe,
        _ => Fitted::No,
    }
}

/// Ports on the drawing, those the unit has not left out. Order: as one walks from the engine to the wheel and back to tank.
pub fn spots(ticks: &Ticks) -> Vec<Spot> {
    let spot = |port, name, x, y, label, fitted| Spot {
        port,
        name,
        x,
        y,
        label,
        fitted,
    };
    let (coil, pilot) = (coil(ticks.control), pilot(ticks.control));
    let command = if coil == Fitted::No || pilot == Fitted::Yes {
        spot(Port::Pilot, "Pilot", 46.0, 34.0, Label::Below, pilot)
    } else {
        spot(Port::CoilCurrent, "Coil", 46.0, 34.0, Label::Below, coil)
    };
    let own_inlet = match ticks.charge_source {
        ChargeSource::OwnPump => Fitted::Yes,
        ChargeSource::Unknown => Fitted::Maybe,
        ChargeSource::Steering | ChargeSource::Implement => Fitted::No,
    };
    let all = [
        spot(
            Port::EngineSpeed,
            "Engine",
            30.0,
            196.0,
            Label::Above,
            Fitted::Yes,
        ),
        command,
        spot(
            Port::Servo,
            "Servo",
            46.0,
            106.0,
            Label::Below,
            servo(ticks.control),
        ),
        spot(
            Port::LoopA,
            "Side A",
            142.0,
            96.0,
            Label::Above,
            Fitted::Yes,
        ),
        spot(
            Port::LoopB,
            "Side B",
            142.0,
            296.0,
            Label::Below,
            Fitted::Yes,
        ),
        spot(
            Port::Release,
            "Brake",
            356.0,
            30.0,
            Label::Below,
            ticks.brake_from_charge.into(),
        ),
        spot(
            Port::Shift,
            "Shift",
            356.0,
            108.0,
            Label::Below,
            ticks.two_speed.into(),
        ),
        spot(
            Port::Wheel,
            "Wheel",
            356.0,
            196.0,
            Label::Below,
            Fitted::Yes,
        ),
        spot(
            Port::MotorCase,
            "Motor case",
            356.0,
            290.0,
            Label::Below,
            Fitted::Yes,
        ),
        spot(
            Port::MotorDrain,
            "Motor drain",
            300.0,
            424.0,
            Label::Below,
            Fitted::Yes,
        ),
        spot(
            Port::Charge,
            "Charge",
            187.0,
            362.0,
            Label::Left,
            Fitted::Yes,
        ),
        spot(
            Port::PumpCase,
            "Pump case",
            46.0,
            300.0,
            Label::Below,
            Fitted::Yes,
        ),
        spot(
            Port::InletPull,
            "Inlet pull",
            236.0,
            528.0,
            Label::Right,
            own_inlet,
        ),
        spot(
            Port::ReturnFlow,
            "Return",
            46.0,
            548.0,
            Label::Below,
            Fitted::Yes,
        ),
    ];
    all.into_iter()
        .filter(|spot| spot.fitted != Fitted::No)
        .collect()
}

/// Whether a port for the command to the control is drawn.
pub fn has_command(ticks: &Ticks) -> bool {
    coil(ticks.control) != Fitted::No || pilot(ticks.control) != Fitted::No
}

/// Ports that have no place on the drawing, or none on this unit's: offered under it.
pub fn elsewhere(ticks: &Ticks) -> Vec<Port> {
    let drawn: Vec<Port> = spots(ticks).iter().map(|spot| spot.port).collect();
    ports(ticks)
        .into_iter()
        .filter(|port| !drawn.contains(port))
        .collect()
}

/// Every port that this unit can have, in the order in which screens offer them.
pub fn ports(ticks: &Ticks) -> Vec<Port> {
    let has = |port: Port| match port {
        Port::PumpShaft => ticks.slipping_drive != Tick::No,
        Port::Servo => servo(ticks.control) != Fitted::No,
        Port::Pilot => pilot(ticks.control) != Fitted::No,
        Port::CoilCurrent => coil(ticks.control) != Fitted::No,
        Port::Release => ticks.brake_from_charge != Tick::No,
        Port::Shift => ticks.two_speed != Tick::No,
        Port::InletPull => !matches!(
            ticks.charge_source,
            ChargeSource::Steering | ChargeSource::Implement
        ),
        _ => true,
    };
    Port::ALL.into_iter().filter(|port| has(*port)).collect()
}
