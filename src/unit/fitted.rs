//! Which ports a unit has, as far as its ticks tell: the one place that knows. What is "don't know" may be there, so it is
//! offered; what a known build cannot have is not.

use super::{ChargeSource, Control, Tick, Ticks};
use crate::readings::Port;

/// Whether a unit has a part or a port.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Fitted {
    /// Fitted.
    Yes,
    /// Not known: it may be there.
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

/// A servo between the command and the swash.
fn servo(control: Control) -> Fitted {
    match control {
        Control::DirectManual => Fitted::No,
        Control::Unknown => Fitted::Maybe,
        _ => Fitted::Yes,
    }
}

/// A command by pilot pressure. Without feedback, pressure on the servo comes from a pilot valve or from coils.
fn pilot(control: Control) -> Fitted {
    match control {
        Control::HydraulicRemote | Control::SpeedSensing => Fitted::Yes,
        Control::PressureNoFeedback | Control::Unknown => Fitted::Maybe,
        _ => Fitted::No,
    }
}

/// A command by coil current.
fn coil(control: Control) -> Fitted {
    match control {
        Control::ElectricProportional | Control::ThreePosition => Fitted::Yes,
        Control::PressureNoFeedback | Control::Unknown => Fitted::Maybe,
        _ => Fitted::No,
    }
}

/// A charge pump with an inlet of its own.
fn own_inlet(source: ChargeSource) -> Fitted {
    match source {
        ChargeSource::OwnPump => Fitted::Yes,
        ChargeSource::Unknown => Fitted::Maybe,
        ChargeSource::Steering | ChargeSource::Implement => Fitted::No,
    }
}

impl Ticks {
    /// Whether the unit has a port. Where pump and engine are splined together the pump shaft still counts as one: its speed
    /// tells a stripped spline or coupling.
    pub fn port(&self, port: Port) -> Fitted {
        match port {
            Port::Servo => servo(self.control),
            Port::Pilot => pilot(self.control),
            Port::CoilCurrent => coil(self.control),
            Port::Release => self.brake_from_charge.into(),
            Port::Shift => self.two_speed.into(),
            Port::InletPull => own_inlet(self.charge_source),
            // Two pumps load one engine, and one ground speed belongs to neither side: wheel turns tell more.
            Port::EngineSpeed | Port::Ground if !self.paths.is_one() => Fitted::No,
            Port::Charge
            | Port::LoopA
            | Port::LoopB
            | Port::LoopDifference
            | Port::PumpCase
            | Port::MotorCase
            | Port::MotorDrain
            | Port::ReturnFlow
            | Port::EngineSpeed
            | Port::PumpShaft
            | Port::MotorShaft
            | Port::Wheel
            | Port::Ground
            | Port::Knee
            | Port::ResponseOut
            | Port::ResponseBack
            | Port::SettledTemperature => Fitted::Yes,
        }
    }

    /// Whether the unit can have a port: it has it, or nobody knows.
    pub fn may_have(&self, port: Port) -> bool {
        self.port(port) != Fitted::No
    }

    /// Every port that the unit can have, in the order in which screens offer them.
    pub fn ports(&self) -> impl Iterator<Item = Port> {
        Port::ALL.into_iter().filter(|port| self.may_have(*port))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn with(control: Control) -> Ticks {
        Ticks {
            control,
            ..Ticks::default()
        }
    }

    #[test]
    fn two_paths_are_not_read_where_they_work_on_one_thing() {
        let ticks = Ticks {
            paths: crate::unit::Paths::TwoSharedCharge,
            ..Ticks::default()
        };
        assert!(!ticks.may_have(Port::EngineSpeed) && !ticks.may_have(Port::Ground));
        assert!(ticks.may_have(Port::Wheel) && ticks.may_have(Port::PumpShaft));
    }

    #[test]
    fn nothing_is_left_out_where_nothing_is_known() {
        let ports: Vec<Port> = Ticks::default().ports().collect();
        assert_eq!(ports, Port::ALL);
        for port in [
            Port::Servo,
            Port::Pilot,
            Port::CoilCurrent,
            Port::Release,
            Port::Shift,
            Port::InletPull,
        ] {
            assert_eq!(Ticks::default().port(port), Fitted::Maybe, "{port:?}");
        }
    }

    #[test]
    fn a_known_control_leaves_out_what_it_cannot_have() {
        let command = |control| {
            [Port::Servo, Port::Pilot, Port::CoilCurrent].map(|port| with(control).port(port))
        };
        use Fitted::{Maybe, No, Yes};
        assert_eq!(command(Control::DirectManual), [No, No, No]);
        assert_eq!(command(Control::ManualFeedback), [Yes, No, No]);
        assert_eq!(command(Control::HydraulicRemote), [Yes, Yes, No]);
        assert_eq!(command(Control::ElectricProportional), [Yes, No, Yes]);
        assert_eq!(command(Control::SpeedSensing), [Yes, Yes, No]);
        assert_eq!(command(Control::PressureNoFeedback), [Yes, Maybe, Maybe]);
        assert_eq!(command(Control::ThreePosition), [Yes, No, Yes]);
        assert_eq!(command(Control::Unknown), [Maybe, Maybe, Maybe]);
    }

    #[test]
    fn a_tick_decides_on_its_port_alone() {
        let none = Ticks {
            brake_from_charge: Tick::No,
            two_speed: Tick::No,
            charge_source: ChargeSource::Steering,
            ..Ticks::default()
        };
        let missing: Vec<Port> = Port::ALL
            .into_iter()
            .filter(|port| !none.may_have(*port))
            .collect();
        assert_eq!(missing, [Port::InletPull, Port::Release, Port::Shift]);
    }

    #[test]
    fn a_pump_shaft_can_be_read_whatever_drives_it() {
        for slipping_drive in [Tick::Yes, Tick::No, Tick::Unknown] {
            let ticks = Ticks {
                slipping_drive,
                ..Ticks::default()
            };
            assert_eq!(ticks.port(Port::PumpShaft), Fitted::Yes);
        }
    }
}
